"""What every finding of one case reads: the case, its lanes, and sentences about them."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from screener.blends import Blend
from screener.ground.status import Status, words
from screener.screening.finding import Condition
from screener.screening.wording import say
from screener.states.case import Case
from screener.states.fire import FireStates
from screener.states.lanes import LIQUIDS, Lanes
from screener.states.measured import flash_known

MONTHS = ("January", "February", "March", "April", "May", "June", "July", "August", "September",
          "October", "November", "December")  # fmt: skip
_GASES = ("nitrogen", "oxygen", "carbon dioxide", "methane", "hydrogen sulfide", "hydrogen")


@dataclass(frozen=True)
class Context:
    """Case i of a table of lanes."""

    lanes: Lanes
    i: int
    fire: FireStates | None = None  # of the same lanes
    full: bool = False  # facts beside a finding are worked out too

    @property
    def case(self) -> Case:
        return self.lanes.inputs.cases[self.i]

    def input(self, name: str) -> float:
        """An input of this case in SI, NaN if not given."""
        return float(self.lanes.inputs[name][self.i])

    def missing(self, *names: str) -> list[str]:
        """Case-file paths of the named inputs that are not given."""
        return self.lanes.inputs.missing(self.i, *names)

    @property
    def barometer(self) -> float:
        return float(self.lanes.weather.barometer[self.i])

    def liquids(self):
        """Indices of the liquids this case has."""
        return [k for k in range(len(LIQUIDS)) if self.lanes.present[self.i, k]]

    def liquid_name(self, k: int) -> str:
        """'receipt', 'heel' or 'mixture'; 'blend' where nothing is received."""
        name = LIQUIDS[k][0]
        return "blend" if name == "receipt" and self.case.line.receipt is None else name

    def condition(self, k: int, when: str, where: str, level: str | None = None) -> Condition:
        return Condition(self.liquid_name(k), LIQUIDS[k][1] if level is None else level, when, where)

    @property
    def hottest_day(self) -> str:
        """When the hottest surface happens, in words."""
        reading = self.case.site.liquid_temperature
        if reading is not None:
            return f"gauge reading of {reading.read_on}"
        month = int(self.lanes.weather.month[self.i])
        return f"hottest day, {MONTHS[month - 1]}" if month else "hottest day of the year"

    def surface_missing(self) -> list[str]:
        """What the hottest surface lacks."""
        if not np.isnan(self.input("reading")):
            return []
        paths = self.missing("ambient_high")
        kind = self.case.tank.kind
        if np.isnan(self.lanes.weather.insolation[self.i]):
            paths += ["site.latitude or site.design_insolation"]
        if not self.case.tank.surface and kind != "underground":
            paths += ["tank.surface"]
        if kind == "underground":
            paths = ["site.liquid_temperature"]
        return paths

    def own_missing(self, k: int) -> list[str]:
        """What the composition and own temperature of liquid k lack."""
        names = []
        if k != 1 and self.case.line.receipt is not None:
            names.append("receipt_temperature")
        if k != 0 and self.case.tank.contents is not None:
            names.append("heel_temperature")
        if k > 1:
            names += ["heel_volume", "shell_diameter", ("level_low", "level_normal", "level_high")[k - 2]]
        return self.missing(*names)

    def liquid_caps(self, k: int) -> tuple[str, ...]:
        """What keeps every vapour pressure of liquid k from giving room: a second liquid, a measured one not met.

        A liquid that splits in two is not the one liquid whose bubble point was worked out.
        """
        split = (say("cap", "splits"),) if self.lanes.second.splits[self.i, k] else ()
        return split + self.misfit_caps(k)

    def misfit_caps(self, k: int) -> tuple[str, ...]:
        """A composition that misses a measured vapour pressure by more than its reproducibility gives no room.

        The measured value is taken, but its slope and its vapour are those of a composition that the
        sheet contradicts: one of its numbers, the start or the sample is not of this liquid, and
        which one a computation cannot tell.
        """
        for name, blend in self.parts(k):
            worst = max(blend.measured, key=lambda m: abs(m.misfit), default=None)
            if worst is not None and not abs(worst.misfit) <= 1.0:
                return (say("cap", "misfit", liquid=name, what=worst.what, R=f"{abs(worst.misfit):.1f}"),)
        return ()

    def parts(self, k: int) -> list[tuple[str, Blend]]:
        """The blends of which liquid k may hold some, each with its name."""
        named = [(self.liquid_name(0), self.case.blend)] if k != 1 else []
        if k != 0 and self.case.tank.contents is not None:
            named.append(("heel", self.case.tank.contents.blend))
        return named

    def unmeasured(self, k: int) -> str:
        """Why no vapour pressure of liquid k counts, '' if it does.

        A composition fitted to a laboratory sheet that holds no vapour pressure
        reproduces the rest of the sheet, not its light end.
        """
        blends = [blend for _, blend in self.parts(k)]
        if not all(blend.vapour_pressure_known for blend in blends):
            return say("unknown", "unmeasured")
        factor = self.lanes.measured.factor[self.i, k]
        return "" if math.isfinite(factor) or not any(b.measured for b in blends) else say("unknown", "no-factor")

    def unmeasured_flash(self, k: int) -> str:
        """Why no flash point of liquid k counts, '' if it does.

        A sheet with neither a flash point nor a vapour pressure leaves the light end open, which decides both.
        """
        return "" if all(flash_known(blend) for _, blend in self.parts(k)) else say("unknown", "unmeasured-flash")

    def why_no_hot_pressure(self, k: int) -> str:
        """Why the bubble pressure of the hottest liquid is not known, '' if it is."""
        P = self.lanes.P_hot[self.i, k, 1]
        if math.isfinite(P):
            return self.unmeasured(k)
        paths = self.surface_missing() + self.own_missing(k)
        if paths:
            return say("unknown", "missing", paths=", ".join(dict.fromkeys(paths)))
        if np.isnan(self.lanes.T_hot[self.i, k, 1]):
            return say("unknown", "no-surface")
        return self.no_pressure(k, self.lanes.status_hot[self.i, k, 1])

    def no_pressure(self, k: int, status) -> str:
        """Why a vapour pressure of liquid k could not be worked out, where no input is missing."""
        return self.unmeasured(k) or say("unknown", "no-bubble", why=self._status_words(status))

    def _status_words(self, status) -> str:
        gaps = self.lanes.fluid.missing
        if int(status) == Status.NO_PARAMETERS and gaps:
            return f"{words(status)}: {', '.join('+'.join(pair) for pair in gaps[:4])}"
        return words(status)

    def typical_cap(self) -> tuple[str, ...]:
        """A range of typical days does not bound the hottest one: a cap for every hottest-day finding."""
        ambient = self.case.site.ambient
        if ambient is not None and ambient.meaning == "typical" and self.case.site.liquid_temperature is None:
            return (say("cap", "typical"),)
        return ()

    def holds_gas(self) -> bool:
        """Whether the receipt's own composition holds a permanent gas."""
        blend = self.case.blend
        return any(share > 0.0 and name in _GASES for name, share in zip(blend.names, blend.z))
