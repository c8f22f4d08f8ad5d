"""Published numbers of a stock beside what its composition computes."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.blends.blend import Blend
from screener.blends.lab_numbers import Laboratory, Number, numbers_of
from screener.blends.lab_sheet import LabSheet
from screener.blends.stocks import Published, Stock

STEPS = 50  # of the distillation
_POINTS = {"T10": 0.1, "T50": 0.5, "T90": 0.9}
_KEYS = {"tvp": "tvp", **dict.fromkeys(_POINTS, "distillation")}


@dataclass(frozen=True)
class Beside:
    """A published number with the computed one in the same SI unit, NaN where the test has no answer for the liquid.

    name as on a laboratory sheet; R [unit of the value] reproducibility of the method.
    """

    name: str
    published: Published
    computed: float
    R: float

    @property
    def difference(self) -> float:
        """Computed less published, in the unit of the value."""
        return self.computed - self.published.value

    @property
    def in_R(self) -> float:
        """Computed less published in units of the reproducibility. [-]"""
        return self.difference / self.R


def published_beside_computed(item: Stock) -> tuple[Beside, ...]:
    """Every published number of a stock beside the computed one.

    Parameters
    ----------
    item : Stock
        A stock; its published numbers took no part in its composition.

    Returns
    -------
    tuple of Beside
        In the order of the passport; empty for a stock without published numbers. A Reid vapour pressure is that
        of the wet apparatus (ASTM D323), a distillation point that of `distillation_d86` by volume evaporated.

    Source
    ------
    Methods of `screener.volatility` and `screener.fire`; reproducibilities of data/volatility/reproducibility.csv.
    """
    if not item.published:
        return ()
    one = {
        p.number: p.value for p in item.published if p.number in ("density_15", "dvpe", "rvp", "flash_point")
    }
    sheet = LabSheet(
        **one,
        tvp=tuple((p.at, p.value) for p in item.published if p.number == "tvp"),
        distillation=tuple((_POINTS[p.number], p.value) for p in item.published if p.number in _POINTS),
        product="crude" if item.product == "crude" else "",
        rvp_chamber="wet",
    )
    numbers = numbers_of(sheet)
    blend = Blend.of({f"stock:{item.name}": 1.0})
    laboratory = Laboratory(blend.names, blend.fluid, numbers, blend.product, STEPS)
    values = laboratory.measure(np.atleast_2d(blend.volume_fractions))[0]
    found = [next(i for i, number in enumerate(numbers) if _same(number, p)) for p in item.published]
    return tuple(
        Beside(numbers[i].name, p, float(values[i]), numbers[i].R)
        for i, p in zip(found, item.published, strict=True)
    )


def _same(number: Number, published: Published) -> bool:
    """Whether a number of the sheet is the published one."""
    argument = _POINTS.get(published.number, published.at)
    return number.key == _KEYS.get(published.number, published.number) and (
        argument is None or number.argument == argument
    )
