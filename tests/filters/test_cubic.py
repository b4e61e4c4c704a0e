"""Interpolation in tables: against scipy's, monotone, and with floats as with arrays."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from scipy.interpolate import CubicHermiteSpline

from xcol.filters.cubic import Curve, Surface, monotone_slopes

X = np.linspace(0.0, 3.0, 13)


def test_a_curve_is_the_cubic_through_values_and_slopes():
    values, slopes = np.sin(X), np.cos(X)
    ours = Curve(0.0, 0.25, values, slopes * 0.25)
    theirs = CubicHermiteSpline(X, values, slopes)
    at = np.linspace(-0.1, 3.1, 100)  # a little beyond the ends, too
    assert ours(at) == pytest.approx(theirs(at), abs=1e-13)
    assert float(ours(1.3)) == pytest.approx(float(theirs(1.3)), abs=1e-13)
    assert ours(at.reshape(4, 25)).shape == (4, 25)


def test_a_surface_that_is_a_product_is_that_of_its_curves():
    first, second = np.exp(-X), 1 / (1 + X[:7])
    made = Surface((0.0, 0.0), (0.25, 0.25), np.outer(first, second))
    curves = [Curve(0.0, 0.25, values, monotone_slopes(values)) for values in (first, second)]
    rows, columns = np.linspace(0, 3, 31), np.linspace(0, 1.5, 16)
    product = np.outer(curves[0](rows), curves[1](columns))
    assert made(rows[:, None], columns[None, :]) == pytest.approx(product, rel=1e-12)
    assert float(made(1.1, 0.6)) == pytest.approx(float(curves[0](1.1) * curves[1](0.6)), rel=1e-12)


def test_slopes_of_a_smooth_curve_are_of_the_fourth_order():
    errors = []
    for nodes in (21, 41):
        x = np.linspace(0, 2, nodes)
        slopes = monotone_slopes(np.exp(x)) / (x[1] - x[0])
        errors.append(np.abs(slopes - np.exp(x))[2:-2].max())
    assert errors[1] < errors[0] / 12


@settings(max_examples=200)
@given(st.lists(st.floats(0, 1), min_size=5, max_size=12))
def test_a_curve_through_falling_values_falls(steps):
    values = -np.cumsum(steps)
    curve = Curve(0.0, 1.0, values, monotone_slopes(values))
    assert np.all(np.diff(curve(np.linspace(0, len(values) - 1, 400))) <= 1e-12)
