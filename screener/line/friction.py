"""Friction of a full pipe."""

from __future__ import annotations

import numpy as np

# Steel line in oil service, intermediate condition: 0.2 mm; Idelchik, Handbook of Hydraulic Resistance,
# as tabulated by the library fluids (read in its table).
DEFAULT_ROUGHNESS = 2.0e-4
# Sharp-edged nozzle flush with the tank wall; Rennels and Hudson, Pipe Flow, 2012, as given by fluids.
# Older handbooks print 0.5.
ENTRANCE_LOSS = 0.57


def friction_factor(reynolds, relative_roughness):
    """Darcy friction factor, one smooth curve over laminar and turbulent flow.

    Parameters
    ----------
    reynolds : float or array, shape (n,)
        Reynolds number. [-]
    relative_roughness : float or array, shape (n,)
        Roughness over bore. [-]

    Returns
    -------
    array, shape (n,) or ()
        Darcy factor; NaN at rest and where an argument is no state of a pipe. [-]

    Validity
    --------
    Relative roughness below 0.05. Within about 2 % of Colebrook in turbulent flow.

    Source
    ------
    Churchill, Friction-factor equation spans all fluid-flow regimes, 1977, as carried by the library fluids.
    """
    from fluids.vectorized import Churchill_1977

    reynolds, rough = np.broadcast_arrays(
        np.asarray(reynolds, dtype=float), np.asarray(relative_roughness, dtype=float)
    )
    # Below a Reynolds number of 1e-3 the powers of the formula leave double precision; nothing flows there.
    good = (reynolds > 1e-3) & np.isfinite(reynolds) & (rough >= 0.0) & (rough <= 0.05)
    factor = Churchill_1977(np.where(good, reynolds, 1.0e5), np.where(good, rough, 0.0))
    return np.where(good, factor, np.nan)
