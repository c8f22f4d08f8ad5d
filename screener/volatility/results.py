"""What the volatility tests return: frozen arrays, one entry per lane, with a status."""

from __future__ import annotations

from dataclasses import dataclass, fields

import numpy as np

from screener.ground.errors import NotConverged
from screener.ground.status import Status, words


@dataclass(frozen=True)
class Lanes:
    """Common face of a batched result: which lanes hold an answer."""

    status: np.ndarray

    @property
    def ok(self) -> np.ndarray:
        """Boolean mask (n,) of the lanes with an answer."""
        return self.status == Status.CONVERGED

    def require(self):
        """The result itself, if every lane has an answer; else NotConverged."""
        bad = np.flatnonzero(~self.ok)
        if bad.size:
            residual = getattr(self, "residual", np.full(self.status.shape, np.nan))
            raise NotConverged(tuple(bad), tuple(words(s) for s in self.status[bad]), tuple(residual[bad]))
        return self


@dataclass(frozen=True)
class CellPressure(Lanes):
    """A liquid closed into a cell with a vapour space.

    T (n,) [K], ratio (n,) [-] vapour space over charge, P (n,) [Pa] vapour pressure of
    the fuel, P_air (n,) [Pa] of dissolved air (zero when none was asked for), beta (n,)
    [-] vapour mole fraction, x and y (n, c) [-], expansion (n,) [-] liquid volume in
    the cell over charge volume, iterations (n,), residual (n,) [-] largest change of
    ln K in the last step.
    """

    T: np.ndarray
    ratio: np.ndarray
    P: np.ndarray
    P_air: np.ndarray
    beta: np.ndarray
    x: np.ndarray
    y: np.ndarray
    expansion: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray

    @property
    def P_total(self) -> np.ndarray:
        """Vapour pressure plus air (n,). [Pa]"""
        return self.P + self.P_air


@dataclass(frozen=True)
class TestPressure(Lanes):
    """A standard vapour-pressure test at 37.8 degC.

    P (n,) [Pa] the figure the method reports (a DVPE, or a gauge pressure for the Reid
    method), P_total (n,) [Pa] absolute pressure in the cell, P_vapour (n,) [Pa] that of
    the fuel alone at the ratio of the method, P_air (n,) [Pa], method in words.
    """

    __test__ = False  # not a test class, whatever a test collector thinks of its name

    P: np.ndarray
    P_total: np.ndarray
    P_vapour: np.ndarray
    P_air: np.ndarray
    method: str


@dataclass(frozen=True)
class RatioTemperature(Lanes):
    """Temperature at which vapour and liquid stand in a given volume ratio.

    T (n,) [K], ratio (n,) [-], P (n,) [Pa] total pressure, iterations (n,), residual
    (n,) [-] ln of pressure reached over pressure asked.
    """

    T: np.ndarray
    ratio: np.ndarray
    P: np.ndarray
    iterations: np.ndarray
    residual: np.ndarray


def empty(kind, n: int, c: int, status, **known):
    """A result of `kind` filled with NaN but for what is known."""
    values = {}
    for field in fields(kind):
        if field.name in known:
            values[field.name] = known[field.name]
        elif field.name in ("x", "y"):
            values[field.name] = np.full((n, c), np.nan)
        elif field.name == "iterations":
            values[field.name] = np.zeros(n, dtype=int)
        else:
            values[field.name] = np.full(n, np.nan)
    values["status"] = np.broadcast_to(np.asarray(status), (n,)).copy()
    return kind(**values)
