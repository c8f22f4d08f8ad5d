"""Worked examples of textbooks, each within its printed digits.

`allowed` is the rounding of the printed figures, or of the hand arithmetic
behind them where the note says so; all relative.
"""

import dataclasses

import numpy as np
import pytest

from screener.equilibrium import Fluid, rachford_rice
from screener.equilibrium.unifac import Unifac
from screener.ground.constants import ZERO_CELSIUS, R

pytestmark = pytest.mark.published

MMHG = 101325.0 / 760.0  # [Pa]


def test_raoult_flash_of_three_paraffins():
    """Y.V.C. Rao, Chemical Engineering Thermodynamics (1997), Example 11.5, p. 386: 90 degC, 200 kPa."""
    A, B, C = np.array([[6.87632, 1075.78, 233.205], [6.91058, 1189.64, 226.205], [6.89386, 1264.37, 216.64]]).T
    psat = 10.0 ** (A - B / (90.0 + C)) * MMHG
    found = rachford_rice(np.array([0.3, 0.3, 0.4]), psat / 200e3)
    assert found.beta[0] == pytest.approx(0.248, rel=0.006)  # the book works with a trial ratio of 3 digits
    assert found.x[0] == pytest.approx([0.2246, 0.3045, 0.4709], rel=0.002)
    assert found.y[0] == pytest.approx([0.5285, 0.2863, 0.1851], rel=0.002)


def test_raoult_dew_temperature_of_four_hydrocarbons():
    """M.D. Koretsky, Engineering and Chemical Thermodynamics, Examples 8.1 and 8.2, p. 470: 1 bar."""
    A, B, C = np.array(
        [[9.2131, 2477.07, -39.94], [9.1325, 2766.63, -50.5], [9.2164, 2697.55, -48.78], [9.2535, 2911.32, -56.51]]
    ).T
    z = np.array([0.3, 0.3, 0.2, 0.2])
    T = np.linspace(340.0, 360.0, 2001)  # 0.01 K apart: finer than the printed 349 K
    found = rachford_rice(z, np.exp(A - B / (T[:, None] + C)))
    at = int(np.nanargmin(np.abs(found.beta - 1.0)))
    assert T[at] == pytest.approx(349.0, rel=0.002)
    assert found.x[at] == pytest.approx([0.091, 0.345, 0.159, 0.405], rel=0.01)


def test_liquid_volume_of_cyclohexane():
    """Gmehling, Kolbe, Kleiber, Rarey, Chemical Thermodynamics for Process Simulation, Example 5.11."""
    fluid = Fluid.from_constants([553.6], [4.075e6], [0.2092], [0.08416])
    assert fluid.volume(353.85, 101325.0, [1.0], "L")[0] == pytest.approx(1.1087e-4, rel=1e-4)


def test_octane_volumes_and_departures():
    """Y.V.C. Rao (1997), Examples 3.16 (p. 78) and 8.7 (p. 282): n-octane, 427.85 K, 0.215 MPa, R = 8.314."""
    fluid = Fluid.from_constants([569.4], [2.497e6], [0.398], [0.11423])
    T, P, one = 427.85, 0.215e6, [1.0]
    assert fluid.volume(T, P, one, "V")[0] == pytest.approx(0.01514, rel=1e-3)
    assert fluid.volume(T, P, one, "L")[0] == pytest.approx(0.0002003, rel=1e-3)
    step = 1e-3
    slope = np.diff(fluid.ln_phi(np.array([T - step, T + step]), P, one, "V")[:, 0])[0] / (2.0 * step)
    H = -R * T * T * slope
    S = H / T - R * fluid.ln_phi(T, P, one, "V")[0, 0]
    assert H == pytest.approx(-890.1, rel=3e-3)  # four digits through a chain of rounded intermediate values
    assert S == pytest.approx(-1.398, rel=3e-3)


def test_redlich_kwong_volumes_of_butane():
    """Smith, Van Ness, Abbott, Introduction to Chemical Engineering Thermodynamics, Example 3.8."""
    fluid = Fluid.from_constants([425.1], [3.796e6], [0.2], [0.05812], eos="SRK")
    original = dataclasses.replace(fluid, alpha=lambda T: (T[:, None] / 425.1) ** -0.5)
    assert original.volume(350.0, 9.4573e5, [1.0], "V")[0] == pytest.approx(2.555e-3, rel=1e-3)
    assert original.volume(350.0, 9.4573e5, [1.0], "L")[0] == pytest.approx(1.333e-4, rel=1e-3)


def original_unifac(groups) -> Unifac:
    """UNIFAC with the original parameter table (Hansen et al., Ind. Eng. Chem. Res. 30 (1991) 2352, in thermo)."""
    from thermo import unifac

    unifac.load_unifac_ip()
    numbers = sorted({k for g in groups for k in g})
    sub = [unifac.UFSG[k] for k in numbers]
    a = [[0.0 if i.main_group_id == j.main_group_id else unifac.UFIP[i.main_group_id][j.main_group_id] for j in sub]
         for i in sub]
    counts = [[g.get(k, 0) for k in numbers] for g in groups]
    return Unifac.of(counts, [s.R for s in sub], [s.Q for s in sub], [s.main_group_id for s in sub], a, power=1.0)


def test_unifac_hexane_butanone():
    """Gmehling, Kolbe, Kleiber, Rarey, Problem 5.22: 60 degC, equimolar."""
    model = original_unifac([{1: 2, 2: 4}, {1: 1, 2: 1, 18: 1}])
    gamma = np.exp(model.at(np.array([60.0 + ZERO_CELSIUS])).ln_gamma(np.array([[0.5, 0.5]])))
    assert gamma[0] == pytest.approx([1.4276, 1.36466], rel=2e-4)


def test_unifac_acetone_pentane():
    """Poling, Prausnitz, O'Connell, Properties of Gases and Liquids, 5th edition, Example 8-12: 307 K."""
    model = original_unifac([{1: 1, 18: 1}, {1: 2, 2: 3}])
    gamma = np.exp(model.at(np.array([307.0])).ln_gamma(np.array([[0.047, 0.953]])))
    assert gamma[0] == pytest.approx([4.99, 1.005], rel=1e-3)
