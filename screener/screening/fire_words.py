"""Sentences about fire that depend on what the case describes."""

from __future__ import annotations

from screener.screening.wording import say


def ways_in(context) -> str:
    """The ways in which air gets into the vapour space of this tank, joined in one phrase."""
    case = context.case
    ways = ["filling"] if case.line.receipt is not None else []
    if case.line.draw_rate is not None or case.line.suction is not None:
        ways.append("draw-down")
    ways.append("vacuum-vent" if case.tank.vents else "open-vent")
    if "floating" in case.tank.kind:
        ways.append("landed")
    if case.tank.blanket is not None:
        ways.append("blanket")
    phrases = [say("ways", way) for way in (*ways, "hatch")]
    return ", ".join(phrases[:-1]) + " or " + phrases[-1]
