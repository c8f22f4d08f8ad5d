"""The JSON object of `check --json`: SI throughout, null where a number does not exist."""

from __future__ import annotations

import json
import math
from dataclasses import asdict

from screener import __version__

SCHEMA = "screener.check/1"


def check_object(screenings, exit_code: int) -> dict:
    """One object for all cases screened."""
    from screener.memo import data_digest

    return {
        "schema": SCHEMA,
        "software": {"name": "screener", "version": __version__, "property_data": data_digest()},
        "units": "SI; a finding names its own unit",
        "exit_code": exit_code,
        "cases": [case_object(screening) for screening in screenings],
    }


def case_object(screening) -> dict:
    """Inputs as entered and in SI, liquids, findings, sources of one case."""
    from screener.memo.appendix import source_title

    case, contents = screening.case, screening.case.tank.contents
    result = screening.to_dict()
    keys = sorted({*screening.sources, *(key for f in screening.findings for key in f.sources)})
    return without_nan(
        {
            "title": case.title,
            "reference": case.reference,
            "file": case.source,
            "digest": case.digest,
            "exit_code": screening.exit_code,
            "inputs": [asdict(echo) for echo in case.inputs],
            "liquids": {
                "receipt": _liquid(case.blend),
                "heel": _liquid(contents.blend) if contents else None,
            },
            **result,
            "sources": {key: source_title(key) for key in keys},
        }
    )


def _liquid(blend) -> dict:
    return {
        "title": blend.title,
        "parts": [asdict(part) for part in blend.parts],
        "mole_fractions": dict(zip(blend.names, map(float, blend.z))),
        "molar_mass": blend.MW,
        "density_15_degC": blend.density_15,
        "report": asdict(blend.report),
    }


def without_nan(value):
    """Plain data in which a number that does not exist is null."""
    if isinstance(value, dict):
        return {key: without_nan(item) for key, item in value.items()}
    if isinstance(value, (list, tuple)):
        return [without_nan(item) for item in value]
    if hasattr(value, "item") and not isinstance(value, str):
        value = value.item()
    return None if isinstance(value, float) and not math.isfinite(value) else value


def as_text(value: dict) -> str:
    """JSON text of an object."""
    return json.dumps(value, indent=2, ensure_ascii=False, allow_nan=False)
