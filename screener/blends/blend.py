"""A blend: shares of species and stocks become one composition."""

from __future__ import annotations

import math
from collections.abc import Mapping
from dataclasses import dataclass, field
from functools import lru_cache
from typing import TYPE_CHECKING

import numpy as np

from screener.blends.parts import Part, assumptions, checked_shares, component, read_basis
from screener.equilibrium import Fluid
from screener.ground.constants import T_15C, T_60F
from screener.ground.errors import CaseErrors, InputError
from screener.species import columns, find
from screener.volatility import liquid_expansion

if TYPE_CHECKING:
    from screener.blends.lab_sheet import LabSheet
    from screener.blends.measured import MeasuredFigure, MeasuredPressure


@dataclass(frozen=True)
class Report:
    """What was assumed on the way from the parts to the composition.

    assumed holds sentences ready to print, sources the origin of every stock used, and
    residuals the misfit of measured figures (name, value, computed, reproducibility),
    empty for a blend that was not fitted to a laboratory sheet.
    """

    assumed: tuple[str, ...] = ()
    sources: tuple[str, ...] = ()
    residuals: tuple[tuple[str, float, float, float], ...] = ()

    @property
    def misfits(self) -> dict[str, float]:
        """Computed less measured in units of the reproducibility, by number. [-]"""
        return {name: (computed - value) / R for name, value, computed, R in self.residuals}


@dataclass(frozen=True)
class Blend:
    """A liquid of known composition.

    names (c,) species with a share above zero, moles (c,) mole fractions, parts as given,
    product the commodity group for volume correction ('' when the density chooses).
    Standard volumes at 15 degC add without shrinkage. measured holds the vapour pressures of the
    laboratory sheet a blend was fitted to, the most direct first, each with its ratio to the computed
    one; vapour_pressure_known is False when that sheet had none; figures holds every number of the
    sheet in its order. A mixture measures nothing.
    """

    names: tuple[str, ...]
    moles: tuple[float, ...]
    parts: tuple[Part, ...] = ()
    title: str = ""
    product: str = ""
    report: Report = field(default_factory=Report)
    measured: tuple[MeasuredPressure, ...] = ()
    vapour_pressure_known: bool = True
    figures: tuple[MeasuredFigure, ...] = ()

    @classmethod
    def of(
        cls, parts: Mapping[str, float], basis: str = "volume", at: str = "15 degC", title: str = ""
    ) -> Blend:
        """A blend from shares of species and stocks.

        Parameters
        ----------
        parts : mapping of str to float
            Shares that sum to 1, by "species:NAME", "stock:NAME" or a name that only one
            of the two tables knows. [-]
        basis : str
            "volume" (standard volumes, no shrinkage), "mass" or "mole".
        at : str
            "15 degC" or "60 degF": the temperature at which shares of volume hold.
        title : str
            Name to print; made from the parts when empty.

        Returns
        -------
        Blend
            Equal species of different parts are merged.

        Raises
        ------
        UnknownName
            A name in no table, with the nearest names; CaseErrors with all of them where they are several.
        InputError
            A share that is negative or no number, or a sum off 1 by more than 0.0005.

        Source
        ------
        Species data of data/species, compositions of data/stocks; ideal mixing of
        standard volumes is a rule of this program.
        """
        basis, T_at = read_basis(basis, at)
        shares = checked_shares(parts)
        total = sum(shares.values())
        read, faults = [], []
        for i, (key, share) in enumerate(shares.items()):
            try:
                read.append(component(key, share / total, basis, at, f"parts[{i}]"))
            except InputError as fault:
                faults.append(fault)
        if faults:
            raise faults[0] if len(faults) == 1 else CaseErrors(faults)
        moles: dict[str, float] = {}
        volume: dict[str, float] = {}
        for part in read:
            amount, v = _amount(part, basis, T_at)
            volume[part.product] = volume.get(part.product, 0.0) + amount * v
            for name, z in zip(part.names, part.moles, strict=True):
                moles[name] = moles.get(name, 0.0) + amount * z
        names, z = _normalised(moles)
        product = "crude" if volume.get("crude", 0.0) > 0.5 * sum(volume.values()) else ""
        text = title or " + ".join(f"{100.0 * part.share:.4g} % {part.name}" for part in read)
        assumed = Report(*assumptions(read, basis, at, total))
        return cls(names, z, tuple(part.part for part in read), text, product, assumed)

    @classmethod
    def from_lab(cls, sheet: LabSheet, start: Blend | None = None) -> Blend:
        """The blend whose computed tests reproduce a laboratory sheet.

        Parameters
        ----------
        sheet : LabSheet
            Measured numbers in SI.
        start : Blend, optional
            The recipe as far as it is known; without it the distillation curve is cut.

        Returns
        -------
        Blend
            `.report.residuals` holds each number measured, computed and its reproducibility;
            `.measured` the vapour pressures.

        Raises
        ------
        InputError
            Numbers that no composition reproduces together, named; or a bare sheet without
            density and three points of the distillation.

        Source
        ------
        Bounded least squares of `screener.blends.lab_fit`, a rule of this program; weights in
        data/volatility/reproducibility.csv, an evidence mark per row.
        """
        from screener.blends.lab_fit import fitted_blend

        return fitted_blend(sheet, start)

    @property
    def z(self) -> np.ndarray:
        """Mole fractions (c,). [-]"""
        return np.array(self.moles)

    @property
    def w(self) -> np.ndarray:
        """Mass fractions (c,). [-]"""
        mass = self.z * _table(self.names).MW
        return mass / mass.sum()

    @property
    def volume_fractions(self) -> np.ndarray:
        """Shares of the volume at 15 degC (c,), no shrinkage. [-]"""
        volume = self.z * _volumes(self.names)
        return volume / volume.sum()

    @property
    def fluid(self) -> Fluid:
        """The fluid of these species with the model of every blend."""
        return _fluid(self.names)

    @property
    def MW(self) -> float:
        """Mean molar mass. [kg/mol]"""
        return float(self.z @ _table(self.names).MW)

    @property
    def v_15(self) -> float:
        """Molar volume at 15 degC. [m3/mol]"""
        return float(self.z @ _volumes(self.names))

    @property
    def density_15(self) -> float:
        """Density at 15 degC. [kg/m3]"""
        return self.MW / self.v_15

    def figure(self, key: str, at: float = 0.0) -> MeasuredFigure | None:
        """The measured number of a laboratory sheet, None where there is none.

        Parameters
        ----------
        key : str
            As in data/volatility/reproducibility.csv: "density_15", "flash_point", "h2s".
        at : float
            Volume fraction evaporated of a "distillation" point. [-]

        Returns
        -------
        MeasuredFigure or None
            The first with this key.

        Source
        ------
        The laboratory sheet; nothing is computed.
        """
        return next((one for one in self.figures if one.key == key and one.at == at), None)

    @property
    def oxygenates(self) -> dict[str, float]:
        """Volume fractions at 15 degC of the alcohols and ethers present. [-]"""
        return {
            name: float(v)
            for name, v in zip(self.names, self.volume_fractions, strict=True)
            if find(name).family in ("alcohol", "ether")
        }

    @property
    def volume_group(self) -> str:
        """Commodity group for `density_at`: "crude", or "" when the density chooses."""
        return self.product

    def expansion(self, T):
        """Volume at T [K] over volume at 15 degC, (n,). [-]"""
        return liquid_expansion(self.fluid, T, self.z, product=self.product or None)

    def mixed_with(self, other: Blend, *, volume: float, other_volume: float, title: str = "") -> Blend:
        """This blend and another, in standard volumes.

        Parameters
        ----------
        other : Blend
            The second liquid.
        volume : float
            Volume of this blend at 15 degC. [m3]
        other_volume : float
            Volume of the other at 15 degC. [m3]
        title : str
            Name to print; made from both titles when empty.

        Returns
        -------
        Blend
            The mixture. For many volumes at once see `union` and `mix`.

        Raises
        ------
        InputError
            A volume is negative or no number, or both are zero.

        Source
        ------
        Ideal mixing of standard volumes, a rule of this program.
        """
        for path, value in (("volume", volume), ("other_volume", other_volume)):
            if not (math.isfinite(value) and value >= 0.0):
                raise InputError(path, value, f"{value} is not a volume", "zero or more")
        if not volume + other_volume > 0.0:
            raise InputError("volume", volume, "both volumes are zero", "at least one above zero")
        amounts = (volume / self.v_15, other_volume / other.v_15)
        moles: dict[str, float] = {}
        for blend, amount in zip((self, other), amounts, strict=True):
            for name, z in zip(blend.names, blend.moles, strict=True):
                moles[name] = moles.get(name, 0.0) + amount * z
        names, z = _normalised(moles)
        share = volume / (volume + other_volume)
        parts = tuple(p.scaled(share) for p in self.parts) + tuple(p.scaled(1.0 - share) for p in other.parts)
        text = title or f"{100 * share:.4g} % ({self.title}) + {100 * (1 - share):.4g} % ({other.title})"
        crude = share * (self.product == "crude") + (1.0 - share) * (other.product == "crude")
        both = Report(
            assumed=tuple(dict.fromkeys(self.report.assumed + other.report.assumed)),
            sources=tuple(dict.fromkeys(self.report.sources + other.report.sources)),
        )
        known = self.vapour_pressure_known and other.vapour_pressure_known
        product = "crude" if crude > 0.5 else ""
        return Blend(names, z, parts, text, product, both, vapour_pressure_known=known)


def _amount(part, basis: str, T_at: float) -> tuple[float, float]:
    """Moles of a part, and its molar volume at 15 degC [m3/mol], for its share on the basis."""
    table, z = _table(part.names), np.array(part.moles)
    v = float(z @ _volumes(part.names))
    if basis == "mole":
        return part.share, v
    if basis == "mass":
        return part.share / float(z @ table.MW), v
    if T_at == T_15C:
        return part.share / v, v
    swollen = liquid_expansion(_fluid(part.names), T_60F, z, product=part.product or None)[0]
    if not math.isfinite(swollen):
        raise InputError(
            part.name,
            None,
            f"no liquid volume of {part.name} at 60 degF",
            "shares by mass or mole, or at 15 degC",
        )
    return part.share / (v * swollen), v


def _normalised(moles: dict[str, float]) -> tuple[tuple[str, ...], tuple[float, ...]]:
    present = {name: n for name, n in moles.items() if n > 0.0}
    total = sum(present.values())
    return tuple(present), tuple(n / total for n in present.values())


@lru_cache(maxsize=256)
def _table(names: tuple[str, ...]):
    return columns(names)


@lru_cache(maxsize=256)
def _volumes(names: tuple[str, ...]) -> np.ndarray:
    table = _table(names)
    return table.MW / table.rho_15


@lru_cache(maxsize=128)
def _fluid(names: tuple[str, ...]) -> Fluid:
    return Fluid.of(names)
