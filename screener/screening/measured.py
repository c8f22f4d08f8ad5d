"""What laboratory sheets changed, said beside the findings that rest on it: measured, computed, factor."""

from __future__ import annotations

from screener.blends.measured import pressure_factor, told
from screener.ground.constants import ZERO_CELSIUS
from screener.screening.context import Context
from screener.screening.finding import MEASURED, Fact
from screener.screening.wording import say
from screener.states.lanes import HEEL, RECEIPT


def _kPa(value: float) -> str:
    return f"{value / 1000.0:.4g} kPa"


def _degC(value: float) -> str:
    return f"{value - ZERO_CELSIUS:.1f} degC"


def measured_note(blend, *keys: str) -> str:
    """The note beside a number that a sheet holds under one of the keys, '' where it does not."""
    return say("note", "measured") if any(blend.figure(key) for key in keys) else ""


def pressure_facts(context: Context, k: int) -> tuple[Fact, ...]:
    """Measured and computed vapour pressure of the parts of liquid k, and its factor; () where none was measured."""
    facts = []
    for name, blend in context.parts(k):
        if not blend.measured:
            continue
        one = told(blend.measured)
        taken = one or blend.measured[0]
        note = say("note", "pressure-method", R=_kPa(taken.reproducibility)) if one else say("note", "no-factor-told")
        facts += [
            Fact(f"{taken.what} of the {name}{MEASURED}", taken.value, "Pa", note),
            Fact(f"{taken.what} of the {name}, computed", taken.computed, "Pa"),
        ]
    if not facts:
        return ()
    note = say("note", "slope" if k in (RECEIPT, HEEL) else "mixture-factor")
    factor = float(context.lanes.measured.factor[context.i, k])
    return (*facts, Fact("factor on computed vapour pressures", factor, "-", note))


def with_doubt(note: str, *blends) -> str:
    """A note beside figures of the blends, with what makes them doubtful where a sheet holds no vapour pressure."""
    known = all(blend.vapour_pressure_known for blend in blends)
    return say("note", note) if known else f"{say('note', note)}; {say('unknown', 'unmeasured')}"


def flash_facts(context: Context, k: int) -> tuple[Fact, ...]:
    """Measured and computed flash points of the parts of liquid k."""
    facts = []
    for name, blend in context.parts(k):
        found = blend.figure("flash_point")
        if found is None:
            continue
        note = say("note", "flash-method", R=f"{found.reproducibility:.1f} K")
        facts += [
            Fact(f"flash point of the {name}{MEASURED}", found.value, "K",
                 note if k in (RECEIPT, HEEL) else say("note", "flash-shift")),
            Fact(f"flash point of the {name}, computed", found.computed, "K"),
        ]  # fmt: skip
    return tuple(facts) if facts else pressure_facts(context, k)


def flash_caps(context: Context, k: int) -> tuple[str, ...]:
    """What keeps the flash point of liquid k from giving room: sheets whose composition does not flash as measured.

    A part without a measured flash point rests on its vapour pressure, so a misfit of that counts instead.
    """
    parts = context.parts(k)
    if not all(blend.figure("flash_point") for _, blend in parts) and (caps := context.misfit_caps(k)):
        return caps
    for name, blend in parts:
        found = blend.figure("flash_point")
        if found is not None and not abs(found.misfit) <= 1.0:
            return (say("cap", "misfit-flash", liquid=name, R=f"{abs(found.misfit):.1f}"),)
    return ()


def measured_assumptions(name: str, blend) -> list[str]:
    """Which measured values of a liquid took the place of computed ones, as sentences."""
    rows = []
    if blend.measured:
        one = told(blend.measured)
        taken = one or blend.measured[0]
        rows.append(say(
            "assumed", "measured-pressure" if one else "measured-blind", liquid=name, what=taken.what,
            value=_kPa(taken.value), computed=_kPa(taken.computed), R=_kPa(taken.reproducibility),
            factor=f"{pressure_factor(blend.measured)[0]:.4f}",
        ))  # fmt: skip
        others = [f"{m.what} {_kPa(m.value)} (computed {_kPa(m.computed)}, factor {m.ratio:.4f})"
                  for m in blend.measured if m is not taken]  # fmt: skip
        if others:
            rows.append(say("assumed", "measured-beside", liquid=name, others="; ".join(others)))
    for key, show in (("flash_point", _degC), ("density_15", lambda rho: f"{rho:.1f} kg/m3")):
        found = blend.figure(key)
        if found is not None:
            words = "measured-flash" if key == "flash_point" else "measured-density"
            rows.append(say("assumed", words, liquid=name, value=show(found.value), computed=show(found.computed)))
    sour = blend.figure("h2s")
    if sour is not None:
        rows.append(say("assumed", "measured-sulfide", liquid=name, value=f"{1e6 * sour.value:.3g} ppm"))
    return rows
