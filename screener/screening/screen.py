"""A case in, findings out. One case or two thousand take the same path."""

from __future__ import annotations

import numpy as np

from screener.ground.constants import ZERO_CELSIUS
from screener.screening.cautions import with_cautions
from screener.screening.context import Context
from screener.screening.draft import finish
from screener.screening.finding import Finding, Screening
from screener.screening.fire import flash, oxygen, space, switch_loading
from screener.screening.fire_information import fire_information, ladder
from screener.screening.flow import npsh, suction
from screener.screening.headroom import with_headroom
from screener.screening.health import hatch
from screener.screening.information import information
from screener.screening.notes import assumptions, reservations, sources
from screener.screening.rules import packs_of
from screener.screening.vapour import boiling, hottest, legal, receipt
from screener.screening.venting import inbreathing, outbreathing, pressure_setting, vacuum_setting
from screener.states.case import Case
from screener.states.fire import fire_states
from screener.states.quantities import bubble_curve, flows, table

CURVE = np.arange(-10.0, 61.0, 2.5) + ZERO_CELSIUS  # temperatures of the picture [K]


def findings_of(context: Context, stream) -> tuple[Finding, ...]:
    """Every finding of one case, worst first; equals keep the order of the criteria."""
    rules = packs_of(context, stream) or (None,)
    drafts = [boiling(context)]
    drafts += [legal(context, rule) for rule in rules] + [hottest(context, rule) for rule in rules]
    drafts += [receipt(context), suction(context, stream), npsh(context, stream)]
    drafts += [outbreathing(context, stream), inbreathing(context, stream)]
    drafts += [pressure_setting(context, stream), vacuum_setting(context, stream)]
    findings = [finish(draft) for draft in drafts]
    inerting = finish(oxygen(context))
    drafts = (space(context, inerting), flash(context), hatch(context), switch_loading(context))
    findings += [inerting, *map(finish, drafts)]
    return tuple(sorted(with_cautions(context, findings), key=lambda finding: finding.rank))


def _pictures(context: Context, findings) -> dict:
    """Bubble pressures over temperature, and the vapour space month by month where months are given."""
    months = ladder(context, findings)
    curve = bubble_curve(context.lanes, context.i, CURVE)
    return curve | ({"ladder": months} if months else {})


def screen(case: Case) -> Screening:
    """Screen one case: findings worst first, with headroom, context and the curve for the pictures."""
    return screen_many((case,), full=True)[0]


def screen_many(cases, *, full: bool = False) -> tuple[Screening, ...]:
    """Screen many cases as one batch of lanes.

    Without `full` the fuel's own figures, the headroom search and the curve are
    left out: they cost more than the findings themselves.
    """
    cases = tuple(cases)
    lanes = table(cases)
    stream = flows(lanes)
    fire = fire_states(lanes, stream.breathing.volume)
    results = []
    for i in range(len(cases)):
        context = Context(lanes, i, fire, full)
        findings = findings_of(context, stream)
        if full:
            findings = with_headroom(context, stream, findings)
        results.append(
            Screening(
                case=cases[i],
                findings=findings,
                information=information(context) + fire_information(context) if full else (),
                assumptions=assumptions(context),
                reservations=reservations(context),
                curve=_pictures(context, findings) if full else {},
                sources=sources(context, findings),
            )
        )
    return tuple(results)
