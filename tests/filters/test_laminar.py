"""Laminar flow in a tube: the table, Φ(t*), limits, and an independent solution."""

import numpy as np
import pytest
from scipy.linalg import expm

from xcol.filters import laminar, laminar_modes, straight_table


def made_by(script):
    """The names that the module of a generating script has, made again."""
    made: dict = {}
    exec(compile(script.table(), "table", "exec"), made)
    return made


def test_the_table_is_what_its_script_makes(script_of):
    made = made_by(script_of("laminar_modes"))
    # the last eigenvalues, 1e9 times the first, differ between linear algebra libraries
    assert made["EIGENVALUES"][:25] == pytest.approx(laminar_modes.EIGENVALUES[:25], rel=1e-7)
    assert made["WEIGHTS"][:25] == pytest.approx(laminar_modes.WEIGHTS[:25], rel=1e-5)
    t = np.logspace(-4, 2, 30)
    x = np.multiply.outer(t, made["EIGENVALUES"])
    again = ((x + np.expm1(-x)) / made["EIGENVALUES"] ** 2) @ (2 * made["WEIGHTS"])
    assert again == pytest.approx(laminar.dimensionless_variance(t), rel=1e-7)


def test_the_table_in_t_star_is_what_its_script_makes(script_of):
    made = made_by(script_of("straight_table"))
    assert made["LOG_T_STARS"] == pytest.approx(straight_table.LOG_T_STARS, abs=1e-14)
    assert made["LOG_MOMENTS"] == pytest.approx(straight_table.LOG_MOMENTS, abs=1e-6)
    ends = made["THIRD_SLOPE"], made["THIRD_START"]
    assert ends == pytest.approx((straight_table.THIRD_SLOPE, straight_table.THIRD_START), rel=1e-5)


def test_between_the_nodes_of_the_table_it_is_as_good():
    t = np.logspace(-6, 6, 3001)
    assert laminar.dimensionless_variance(t) == pytest.approx(laminar.variance_by_modes(t), rel=1e-7)
    t = np.logspace(-5, 4, 1001)
    assert laminar.dimensionless_third_moment(t) == pytest.approx(laminar.run_third_moment([t], [1.0]), rel=1e-6)
    assert float(laminar.dimensionless_variance(0.0)) == 0


def test_t_star_of_a_relative_variance():
    t = np.logspace(-5, 5, 301)
    assert laminar.t_star_of(laminar.relative_variance(t)) == pytest.approx(t, rel=1e-8)
    assert float(laminar.t_star_of(0.22379)) == pytest.approx(0.1, rel=1e-4)


def test_the_fourth_moment_is_that_of_the_transfer_function():
    """The fourth derivative of H at 0 by central differences with Richardson's extrapolation."""
    for t_star in (0.01, 0.1, 1.0, 10.0):
        fourth = float(laminar.fourth_moment(t_star))

        def derivative(step, t_star=t_star):
            h = laminar.run_transfer([t_star], [1.0], step * np.arange(-3.0, 4.0)).real
            return float(h @ [-1, 12, -39, 56, -39, 12, -1]) / (6 * step**4)

        step = 0.2 / fourth**0.25
        assert (16 * derivative(step) - derivative(2 * step)) / 15 == pytest.approx(fourth, rel=2e-3)
    gaussian = 3 * laminar.dimensionless_variance(1e5) ** 2
    assert float(laminar.fourth_moment(1e5)) == pytest.approx(float(gaussian), rel=1e-3)


def test_the_first_eigenvalue_and_the_sums_of_the_constants():
    assert laminar_modes.EIGENVALUES[0] == pytest.approx(12.8398, abs=5e-5)
    weights, rates = laminar_modes.WEIGHTS, laminar_modes.EIGENVALUES
    assert 2 * (weights / rates).sum() == pytest.approx(1 / 24, rel=1e-7)
    assert 2 * (weights / rates**2).sum() == pytest.approx(1 / 384, rel=1e-7)


def test_the_number_of_polynomials_does_not_matter():
    t = np.array([1e-4, 1e-3, 0.01, 0.1, 1.0, 10.0])
    for polynomials in (32, 48, 64):
        rates, coupling = laminar.solve_modes(polynomials)
        x = np.multiply.outer(t, rates[1:])
        v = ((x + np.expm1(-x)) / rates[1:] ** 2) @ (2 * coupling[0, 1:] ** 2)
        assert v == pytest.approx(laminar.dimensionless_variance(t), rel=2e-6)


def test_a_long_tube_has_the_two_closed_terms():
    t = np.array([1.0, 3.0, 10.0, 1e3, 1e6])
    closed = 1 / (24 * t) - 1 / (384 * t**2)
    assert laminar.relative_variance(t) == pytest.approx(closed, rel=3e-7)
    assert pytest.approx(float(laminar.relative_variance(0.3)), rel=6e-3) == 1 / (24 * 0.3) - 1 / (384 * 0.3**2)


def test_phi_falls_monotonically_from_unmixed_to_mixed():
    t = np.logspace(-6, 6, 2000)
    phi = laminar.relative_variance(t)
    assert np.all(np.isfinite(phi))
    assert np.all(np.diff(phi) < 0)
    assert laminar.relative_variance(1e-3) < 1


def finite_volumes(t_stars, units, cells=240):
    """Second and third central moment by finite volumes in r and one matrix exponential a tube.

    Independent of the program: other variables, other discretisation, raw moments made central.
    """
    edges = np.linspace(0, 1, cells + 1)
    centres = (edges[1:] + edges[:-1]) / 2
    areas = np.pi * (edges[1:] ** 2 - edges[:-1] ** 2)
    speed = 2 * (1 - (edges[1:] ** 2 + edges[:-1] ** 2) / 2)  # mean of 2(1 − r²) over the cell
    conductance = 2 * np.pi * edges[1:-1] / np.diff(centres)
    diffusion = np.zeros((cells, cells))
    for i, g in enumerate(conductance):
        diffusion[i, i] -= g
        diffusion[i, i + 1] += g
        diffusion[i + 1, i + 1] -= g
        diffusion[i + 1, i] += g
    generator = diffusion / (areas * speed)[:, None]
    slowness = np.diag(1 / speed)
    moments = np.zeros(4 * cells)
    moments[:cells] = 1
    # dm_n/dt* = generator·m_n + n·w·slowness·m_{n−1}, from the outlet backwards
    for t, w in zip(reversed(t_stars), reversed(units), strict=True):
        block = np.kron(np.eye(4), generator)
        for n in (1, 2, 3):
            rows, columns = slice(n * cells, (n + 1) * cells), slice((n - 1) * cells, n * cells)
            block[rows, columns] = n * w * slowness
        moments = expm(block * t) @ moments
    flux = areas * speed / (areas * speed).sum()
    m1, m2, m3 = (flux @ moments[n * cells : (n + 1) * cells] for n in (1, 2, 3))
    return m2 - m1**2, m3 - 3 * m1 * m2 + 2 * m1**3


@pytest.mark.parametrize(("t_stars", "units"), [([0.1], [1.0]), ([0.05, 0.1, 0.03], [1.0, 0.5, 3.0]), ([1.5], [2.0])])
def test_second_and_third_moment_against_finite_volumes(t_stars, units):
    variance, third = finite_volumes(t_stars, units)
    assert laminar.run_third_moment(t_stars, units) == pytest.approx(third, rel=5e-3)
    if len(t_stars) == 1:
        assert units[0] ** 2 * laminar.dimensionless_variance(t_stars[0]) == pytest.approx(variance, rel=2e-3)


def test_the_third_moment_of_a_cut_tube_is_that_of_the_whole():
    whole = laminar.run_third_moment([0.2], [3.0])
    assert laminar.run_third_moment([0.05, 0.15], [3.0, 3.0]) == pytest.approx(whole, rel=1e-10)
    assert laminar.run_third_moment([0.0, 0.2], [5.0, 3.0]) == pytest.approx(whole, rel=1e-10)


@pytest.mark.parametrize("t_star", [30.0, 39.0, 41.0, 1e3, 1e6])
def test_the_transfer_function_of_long_tubes(t_star):
    """In the long limit it tends to a Gaussian; at any t* its curvature is the variance."""
    variance = float(laminar.dimensionless_variance(t_star))
    sigma = variance**0.5
    omega = np.array([-2.0, -1.0, 0.0, 1.0, 2.0]) * 0.05 / sigma
    log = np.log(laminar.run_transfer([t_star], [1.0], omega))
    step = omega[3]
    second = -(log[4] * -1 + 16 * log[3] - 30 * log[2] + 16 * log[1] - log[0]) / (12 * step**2)
    third = (log[4] - 2 * log[3] + 2 * log[1] - log[0]) / (2 * step**3)
    assert second.real == pytest.approx(variance, rel=1e-5)
    skew = float(laminar.run_third_moment([t_star], [1.0])) / sigma**3
    assert third.imag / sigma**3 == pytest.approx(skew, rel=0.02, abs=2e-4)
    h = laminar.run_transfer([t_star], [1.0], np.array([1.0, 2.0]) / sigma)
    assert np.abs(h) == pytest.approx(np.exp([-0.5, -2.0]), abs=0.3 / t_star)


def test_both_ways_through_a_tube_agree_where_they_meet():
    omega = np.linspace(0.01, 0.5, 9)
    short, long = (laminar.run_transfer([t], [1.0], omega) for t in (39.999, 40.001))
    assert np.allclose(np.log(short) * 40.001 / 39.999, np.log(long), rtol=1e-4)
