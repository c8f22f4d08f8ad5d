"""The iteration that flash, trials and saturation points share, on problems with known answers."""

import numpy as np
import pytest

from screener.equilibrium.fixed_point import TOLERANCE, solve


class Linear:
    """image(u) = A u + b, lane by lane; the fixed point is (1 - A)^-1 b."""

    def __init__(self, A, b):
        self.A, self.b = A, b

    def take(self, lanes):
        return Linear(self.A[lanes], self.b[lanes])

    def image(self, u):
        return np.einsum("nij,nj->ni", self.A, u) + self.b


class Never:
    """No fixed point: image(u) = u + 1."""

    def take(self, lanes):
        return self

    def image(self, u):
        return u + 1.0


class Holes:
    """Cosine with a hole: no number is returned right of 1."""

    def take(self, lanes):
        return self

    def image(self, u):
        return np.where(u > 1.0, np.nan, np.cos(u))


def linear(eigenvalues, lanes=50, seed=30):
    generator = np.random.default_rng(seed)
    c = len(eigenvalues)
    Q = np.linalg.qr(generator.normal(size=(lanes, c, c)))[0]
    return Linear(Q @ (np.array(eigenvalues)[:, None] * np.swapaxes(Q, 1, 2)), generator.normal(size=(lanes, c)))


@pytest.mark.parametrize(
    "eigenvalues, most",
    [
        ([0.05, 0.02, -0.03, 0.01], 9),  # nearly ideal vapour
        ([0.95, 0.1, 0.05, -0.1], 20),  # one slow direction: plain substitution would need some 450
        ([-1.5, 0.2, 0.1, 0.0], 20),  # plain substitution diverges
        ([0.9, 0.8, 0.7, 0.6], 45),
    ],
)  # fmt: skip
def test_linear_problems(eigenvalues, most):
    problem = linear(eigenvalues)
    found = solve(problem, np.zeros((50, 4)), np.ones((50, 4), dtype=bool))
    exact = np.linalg.solve(np.eye(4) - problem.A, problem.b[:, :, None])[:, :, 0]
    assert found.converged.all()
    assert found.iterations.max() <= most
    # the error of u is that of the residual times 1/(1 - largest eigenvalue)
    assert np.abs(found.u - exact).max() <= 1.1 * TOLERANCE * 2.0 / (1.0 - max(eigenvalues))


def test_residual_belongs_to_the_point_returned():
    problem = linear([0.5, 0.3, 0.1, -0.2])
    found = solve(problem, np.zeros((50, 4)), np.ones((50, 4), dtype=bool))
    assert np.abs(problem.image(found.u) - found.u).max(axis=1) == pytest.approx(found.residual, rel=1e-6, abs=1e-15)


def test_absent_entries_stay_where_they_are():
    present = np.ones((50, 4), dtype=bool)
    present[:, 2] = False
    start = np.full((50, 4), 7.0)
    found = solve(linear([0.5, 0.3, 0.1, -0.2]), start, present)
    assert (found.u[:, 2] == 7.0).all() and found.converged.all()


def test_lane_without_fixed_point_is_left_open_and_the_cap_holds():
    found = solve(Never(), np.zeros((3, 2)), np.ones((3, 2), dtype=bool), plain=10, newton=5)
    assert not found.converged.any() and found.iterations.max() <= 15
    assert found.residual == pytest.approx(np.ones(3))


def test_numbers_lost_on_the_way_are_recovered():
    found = solve(Holes(), np.array([[0.3], [0.99]]), np.ones((2, 1), dtype=bool))
    assert found.converged.all()
    assert found.u[:, 0] == pytest.approx(0.7390851332151607, abs=1e-9)  # the root of cos u = u


def test_lane_of_a_batch_equals_the_single_run():
    problem = linear([0.95, 0.1, 0.05, -0.1])
    present = np.ones((50, 4), dtype=bool)
    batch = solve(problem, np.zeros((50, 4)), present)
    for i in (0, 17, 49):
        alone = solve(problem.take(np.array([i])), np.zeros((1, 4)), present[:1])
        assert batch.u[i] == pytest.approx(alone.u[0], rel=1e-9, abs=1e-9)
