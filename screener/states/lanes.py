"""Cases become one table of lanes.

Every case gives five liquids: the receipt alone, the heel alone, and their
mixture with the tank filled to its low, normal and high level. All arrays run
over (case, liquid) and, where a temperature is known only within a range, over
(case, liquid, edge) with edges low, best, high. One case or two thousand take
the same path; a lane that cannot be worked out holds NaN and its status.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from screener.blends import mix, union
from screener.equilibrium import Fluid
from screener.ground.status import Status
from screener.species import find
from screener.states.arrival import AIR, Arrival, arrival, vapour_with_air
from screener.states.inputs import Inputs
from screener.states.measured import Measured, density_ratios, measured_of, sour_shares
from screener.states.pressures import bubble, psat_errors, relative_spread, with_edges
from screener.states.second_liquid import SecondLiquids, second_liquids
from screener.states.volumes import density_15, expansion
from screener.states.weather import Weather
from screener.tank import horizontal_liquid_volume, vertical_liquid_volume

SOUR_GAS = "hydrogen sulfide"
LIQUIDS = (("receipt", ""), ("heel", ""), ("mixture", "low"), ("mixture", "normal"), ("mixture", "high"))
RECEIPT, HEEL, LOW, NORMAL, HIGH = range(5)
EDGES = ("low", "best", "high")
BEST = 1


@dataclass(frozen=True)
class Lanes:
    """The table of lanes of n cases over c species.

    z (n, 5, c) [-]; level (n, 5) at which each liquid is judged [m];
    present (n, 5); T_own (n, 5) temperature the liquid brings along [K];
    T_hot (n, 5, 3) hottest liquid [K]; P_hot, P_hot_low, P_hot_high (n, 5) its
    bubble pressure with range [Pa]; P_legal (n, 5, 3) the same at
    the highest monthly mean, the high end at the own temperature if that is higher [Pa];
    arrival of the receipt; beta_gas (n,) its vapour fraction with the air it is
    stated to hold, NaN where none is stated; y_hot vapour compositions; status_* per lane; measured what
    laboratory sheets say, whose factor is in every pressure here.
    """

    inputs: Inputs
    weather: Weather
    fluid: Fluid
    names: tuple[str, ...]
    z: np.ndarray
    level: np.ndarray
    present: np.ndarray
    T_own: np.ndarray
    T_hot: np.ndarray
    P_hot: np.ndarray
    y_hot: np.ndarray
    status_hot: np.ndarray
    T_legal: np.ndarray
    P_legal: np.ndarray
    status_legal: np.ndarray
    arrival: Arrival
    beta_gas: np.ndarray
    worst_residual: float
    failed: int
    second: SecondLiquids
    measured: Measured


def _any_air(cases) -> bool:
    return any(case.line.receipt and case.line.receipt.dissolved_gas == "air-saturated" for case in cases)


def blends_of(cases):
    """Receipt and heel (2 lists of n) of every case; the receipt again where there is no heel."""
    return [case.blend for case in cases], [
        case.tank.contents.blend if case.tank.contents else case.blend for case in cases
    ]


def _compositions(inputs):
    """names (c,), composition (2, n, c) of receipt and heel, and which cases have a heel (n,)."""
    cases = inputs.cases
    blends, heels = blends_of(cases)
    names, Z = union(blends + heels)
    sour = np.stack([inputs["hydrogen_sulfide"], sour_shares(heels)])
    wanted = (*AIR,) * _any_air(cases) + (SOUR_GAS,) * bool((sour > 0.0).any())
    extra = [name for name in wanted if name not in names]
    Z = np.pad(Z, ((0, 0), (0, len(extra)))).reshape(2, len(cases), -1)
    names += tuple(extra)
    if SOUR_GAS in names:
        # Of a liquid that was measured the share is the whole of it: what its fit put among the parts goes.
        whole = np.isfinite(np.stack([sour_shares(blends), sour_shares(heels)]))
        Z = _with_sour_gas(names, Z, sour, whole)
    has_heel = np.array([case.tank.contents is not None for case in cases])
    return names, Z, has_heel


def _with_sour_gas(names, z, share, whole):
    """Liquids z (..., c) with hydrogen sulfide of the mass share (...) dissolved beside the parts given, or in place
    of what they hold where whole (...); a liquid whose share is NaN is left as it is. [-]"""
    MW, at = np.array([find(name).MW for name in names]), names.index(SOUR_GAS)
    with_gas = z.copy()
    with_gas[..., at] = np.where(whole, 0.0, with_gas[..., at])
    with_gas[..., at] += share / (1.0 - share) * (with_gas @ MW) / MW[at]
    change = np.isfinite(share) & (whole | (share > 0.0))
    return np.where(change[..., None], with_gas / with_gas.sum(axis=-1, keepdims=True), z)


def filled_volumes(inputs) -> np.ndarray:
    """Liquid volume (n, 3) with the tank at its low, normal and high level. [m3]"""
    levels = np.stack([inputs["level_low"], inputs["level_normal"], inputs["level_high"]], axis=1)
    lying = np.isfinite(inputs["tank_length"])[:, None]
    D, length = inputs["shell_diameter"][:, None], inputs["tank_length"][:, None]
    upright = vertical_liquid_volume(D, inputs["shell_height"][:, None], levels)
    return np.where(lying, horizontal_liquid_volume(D, np.where(lying, length, 1.0), levels), upright)


def _mixtures(inputs, fluid, Z, has_heel):
    """z (n, 5, c), T_own (n, 5), present (n, 5) and what was measured of receipt, heel and their mixtures.

    The receipt is filled on the heel until the level stands at low, normal and
    high; where the heel alone stands above a level, the lane of that level is
    heel alone. Volumes at tank temperature become standard volumes by the
    volume correction of the trade; standard volumes add without shrinkage. The
    mixture's temperature is the mean weighted by heat capacity taken as equal
    per mass.
    """
    n = len(has_heel)
    T_r, T_h = inputs["receipt_temperature"], inputs["heel_temperature"]
    heel_volume = np.where(has_heel, inputs["heel_volume"], np.nan)[:, None]
    filled = filled_volumes(inputs)
    received = np.maximum(filled - heel_volume, 0.0) / expansion(fluid, T_r, Z[0])[:, None]
    left = np.minimum(heel_volume, filled) / expansion(fluid, T_h, Z[1])[:, None]
    z = np.empty((n, 5, fluid.c))
    z[:, RECEIPT], z[:, HEEL] = Z
    for k in range(3):
        z[:, LOW + k] = mix(fluid.names, Z[0], received[:, k], Z[1], left[:, k])
    blends = blends_of(inputs.cases)
    mass_r = received * density_15(fluid, Z[0])[:, None]
    mass_h = left * density_15(fluid, Z[1])[:, None]
    moles = np.stack([mass_r / (Z[0] @ fluid.MW)[:, None], mass_h / (Z[1] @ fluid.MW)[:, None]])
    measured = measured_of(fluid, Z, *blends, moles, np.stack([mass_r, mass_h]))
    mass_r, mass_h = (m * density_ratios(b)[:, None] for m, b in zip((mass_r, mass_h), blends))
    share = mass_r / (mass_r + mass_h)
    T_own = np.column_stack([T_r, T_h, share * T_r[:, None] + (1.0 - share) * T_h[:, None]])
    present = np.column_stack([np.ones(n, bool), np.repeat(has_heel[:, None], 4, axis=1)])
    return z, T_own, present, measured


def _hottest_liquid(weather: Weather, T_own, has_receipt):
    """Hottest liquid (n, 5, 3): the surface of the hottest day, or the liquid's own temperature if warmer.

    Where the case describes a receipt or a heel, its temperature has to be
    known; a liquid that only stands in the tank follows the weather.
    """
    own = np.where(has_receipt[:, None], T_own, np.where(np.isnan(T_own), -np.inf, T_own))
    own[:, RECEIPT] = np.where(has_receipt, T_own[:, RECEIPT], -np.inf)
    return np.maximum(weather.T_surface[:, None, :], own[:, :, None])


def _legal_temperatures(weather: Weather, T_own) -> np.ndarray:
    """Highest monthly mean, and the warmest a month's storage can be (n, 5, 2). [K]

    A liquid that comes in warmer than the monthly mean of the air may keep the
    tank above it; its own temperature bounds that, and is the high end.
    """
    mean = np.broadcast_to(weather.T_legal[:, None], T_own.shape)
    return np.stack([mean, np.where(T_own > mean, T_own, mean)], axis=-1)


def evaluate(inputs: Inputs, weather: Weather) -> Lanes:
    """Work out every liquid of every case: compositions, bubble pressures, the receipt's flash."""
    cases = inputs.cases
    names, Z, has_heel = _compositions(inputs)
    fluid = Fluid.of(names)
    z, T_own, present, measured = _mixtures(inputs, fluid, Z, has_heel)
    has_receipt = np.array([case.line.receipt is not None for case in cases])
    T_hot = _hottest_liquid(weather, T_own, has_receipt)
    known = present & np.isfinite(z).all(axis=-1)
    errors = psat_errors(names)

    factor = measured.factor[:, :, None]
    P_hot, y, status_hot, res_hot, asked_hot = bubble(fluid, T_hot, z[:, :, None, :], known[:, :, None], factor)
    spread = measured.wider(relative_spread(y, errors))
    P_hot = with_edges(P_hot, spread)
    T_legal = _legal_temperatures(weather, T_own)
    P_two, y_legal, status_legal, res_legal, asked_legal = bubble(
        fluid, T_legal, z[:, :, None, :], known[:, :, None], factor
    )
    spread = measured.wider(relative_spread(y_legal, errors))
    P_legal = with_edges(P_two[:, :, [0, 0, 1]], spread[:, :, [0, 0, 1]])

    came, res_receipt, asked_receipt = arrival(
        fluid, z[:, RECEIPT], T_own[:, RECEIPT], weather.barometer, errors, has_receipt, measured
    )
    beta_gas = vapour_with_air(
        fluid, z[:, RECEIPT], T_own[:, RECEIPT], inputs, weather.barometer, measured.factor[:, RECEIPT]
    )
    residuals = np.concatenate([res_hot[asked_hot], res_legal[asked_legal], res_receipt[asked_receipt]])
    statuses = np.concatenate([status_hot[asked_hot], status_legal[asked_legal], came.status[asked_receipt]])
    level = np.column_stack(
        [inputs[k] for k in ("level_low", "level_low", "level_low", "level_normal", "level_high")]
    )
    # The liquid phase of the model has to be the stable one: its own bubble pressure, without the factor.
    second = second_liquids(
        fluid, z, present, T_hot[:, :, BEST], P_hot[:, :, BEST] / measured.factor, weather.T_cold[:, BEST],
        weather.barometer,
    )  # fmt: skip
    return Lanes(
        inputs, weather, fluid, names, z, level, present, T_own, T_hot, P_hot, y[:, :, BEST],
        status_hot, weather.T_legal, P_legal, status_legal[:, :, 0], came, beta_gas,
        float(np.nanmax(residuals, initial=0.0)), int((statuses != Status.CONVERGED).sum()), second, measured,
    )  # fmt: skip


def method_spread(lanes: Lanes, y, i: int, k: int) -> np.ndarray:
    """Relative method spread (m,) of vapour pressures of liquid k of case i whose vapour is y (m, c). [-]"""
    spread, m = relative_spread(np.asarray(y), psat_errors(lanes.names)), lanes.measured
    return np.maximum(spread, m.doubt[i, k]) + m.widening[i, k]
