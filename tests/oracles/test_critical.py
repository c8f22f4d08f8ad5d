"""Where bubble lines end: critical points of mixtures traced by teqp, vapour pressures next to critical points."""

import numpy as np
import pytest

from screener.equilibrium import Fluid, bubble_pressure, dew_pressure
from screener.ground.status import Status

# Tc [K], Pc [Pa], omega [-] of methane and n-hexane, rounded; any values would do for comparing two codes
TC, PC, OMEGA = [190.6, 507.6], [4.6e6, 3.025e6], [0.011, 0.30]
R = 8.31446261815324  # [J/mol/K] CODATA 2018
Z_CRITICAL = 0.3074013086987  # Peng-Robinson, from its triple root


@pytest.fixture(scope="module")
def model():
    import teqp

    return teqp.canonical_PR(TC, PC, OMEGA)


@pytest.fixture(scope="module")
def ours():
    return Fluid.from_constants(TC, PC, OMEGA, [0.016, 0.086])


def test_critical_line(model, ours):
    """Just below the critical line in temperature a bubble point at its pressure, just above it none."""
    import teqp

    options = teqp.TCABOptions()
    options.init_dt, options.max_dt, options.rel_err, options.abs_err = 1.0, 500.0, 1e-6, 1e-6
    options.polish = True
    start = np.array([0.0, PC[1] / (Z_CRITICAL * R * TC[1])])
    rows = model.trace_critical_arclength_binary(TC[1], start, "", options)
    share = np.array([row["rho0 / mol/m^3"] / (row["rho0 / mol/m^3"] + row["rho1 / mol/m^3"]) for row in rows])
    picked = [int(np.abs(share - wanted).argmin()) for wanted in (0.2, 0.4, 0.6, 0.75, 0.85)]
    T, P = (np.array([rows[i][name] for i in picked]) for name in ("T / K", "p / Pa"))
    x = np.stack([share[picked], 1.0 - share[picked]], axis=1)
    below, above = bubble_pressure(ours, T - 0.05, x), bubble_pressure(ours, T + 0.05, x)
    assert below.ok.all() and (above.status == Status.NO_SOLUTION).all()
    lower = bubble_pressure(ours, T - 0.10, x)
    # straight on from two points of a line that bends by 1e-3 per K2 or less, next to the end of it
    assert 2.0 * below.P - lower.P == pytest.approx(P, rel=1e-4)
    assert np.abs(np.log(below.K)).max() < 0.05
    dew = dew_pressure(ours, T - 0.05, x)
    assert dew.ok.all() and (dew.P < below.P).all()


@pytest.mark.parametrize("i", [0, 1])
def test_vapour_pressure_next_to_the_critical_point(model, ours, i):
    """Against the saturated densities of teqp's superancillary equations."""
    share = np.eye(2)[i]
    for Tr in (0.9, 0.99, 0.999, 0.9999):
        T = Tr * TC[i]
        rho = np.array(model.superanc_rhoLV(T, i))
        P = [R * T * one * (1.0 + model.get_Ar01(T, one, share)) for one in rho]
        found = bubble_pressure(ours, T, share)
        assert found.ok[0]
        # the vapour's density carries the error of the ancillary, 1e-12 or so over the flatness of P(rho) there
        assert found.P[0] == pytest.approx(P[1], rel=1e-9)
