"""The measured binary sets of tests/measured/binary: points, quality, isotherms and isobars.

Quality A: smooth, and the pure ends agree with reference vapour pressures within about 1 %. Quality B:
scatter of some percent, or no pure ends. B sets are scored and never fitted. Rows with use = 0 are left out.
"""

from __future__ import annotations

import csv
import re
from dataclasses import dataclass
from pathlib import Path

import numpy as np

from screener.species import find

FOLDER = Path(__file__).resolve().parent / "binary"
NAMES = tuple(sorted(path.stem for path in FOLDER.glob("*.csv")))
QUALITY_B = (
    "hc02_n-butane_n-octane", "hc14_benzene_n-heptane", "hc16_m-xylene_toluene", "hc17_isooctane_n-hexane",
    "hc20_cyclohexane_toluene",
)  # fmt: skip
WITHOUT_CAS = {"wy02_ethanol_water_101kPa": ("64-17-5", "7732-18-5")}  # its header names the system only


@dataclass(frozen=True)
class BinarySet:
    """T (n,) [K], P (n,) [Pa], x1 (n,) [-], y1 (n,) [-] or None; curve (n,) numbers isotherms or isobars."""

    name: str
    species: tuple[str, str]
    source: str
    T: np.ndarray
    P: np.ndarray
    x1: np.ndarray
    y1: np.ndarray | None
    curve: np.ndarray

    @property
    def x(self):
        """Mole fractions (n, 2). [-]"""
        return np.stack([self.x1, 1.0 - self.x1], axis=1)

    @property
    def quality(self) -> str:
        """A or B."""
        return "B" if self.name in QUALITY_B else "A"


def read(name: str) -> BinarySet:
    """A measured set by the name of its file."""
    lines = (FOLDER / f"{name}.csv").read_text(encoding="utf-8").splitlines()
    cas = re.findall(r"CAS (\d+-\d+-\d+)", "\n".join(lines[:3])) or WITHOUT_CAS[name]
    rows = list(csv.DictReader(line for line in lines if not line.startswith("#")))
    rows = [row for row in rows if row.get("use", "1") != "0"]
    T, P, x1 = (np.array([float(row[column]) for row in rows]) for column in ("T_K", "P_Pa", "x1"))
    y1 = np.array([float(row["y1"]) for row in rows]) if "y1" in rows[0] else None
    species = tuple(find(one).name for one in cas)
    return BinarySet(name, species, lines[0].removeprefix("# source: "), T, P, x1, y1, _curves(T, P))


def _curves(T, P):
    """Isotherms (to 1 K) or isobars (to 1 kPa), whichever are fewer, numbered from 0."""
    by_T, by_P = np.round(T), np.round(P, -3)
    steps = by_T if np.unique(by_T).size <= np.unique(by_P).size else by_P
    return np.unique(steps, return_inverse=True)[1]


def scatter(one: BinarySet, error) -> float:
    """How far the errors (n,) of a set scatter about a smooth curve. [unit of error]

    Mean distance of a point from the line between its two neighbours in composition on its own isotherm or
    isobar, brought to the deviation of one point. Curvature counts as scatter, so it is rather too large.
    """
    apart = []
    for k in np.unique(one.curve):
        on = np.flatnonzero(one.curve == k)
        on = on[np.argsort(one.x1[on], kind="stable")]
        x, e = one.x1[on], np.asarray(error)[on]
        span = x[2:] - x[:-2]
        w = np.where(span > 0.0, (x[1:-1] - x[:-2]) / np.where(span > 0.0, span, 1.0), 0.5)
        apart.append((e[1:-1] - (1.0 - w) * e[:-2] - w * e[2:]) / np.sqrt(1.0 + w**2 + (1.0 - w) ** 2))
    return float(np.abs(np.concatenate(apart)).mean())
