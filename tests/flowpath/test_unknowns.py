"""How unknowns are spread: their quantiles, their ends, and what they do to an element."""

import numpy as np
import pytest

from xcol.answers.draws import Draws
from xcol.flowpath.elements import Bore
from xcol.flowpath.unknowns import Between, Factor, LogBetween, OneOf, scaling, setting

MANY = Draws(50_000, 3)


def test_ninety_per_cent_of_a_factor_lie_within_its_tolerance():
    for relative in (0.02, 0.05, 0.5):
        values = MANY.of("a", Factor(relative))
        inside = (values > 1 / (1 + relative)) & (values < 1 + relative)
        assert inside.mean() == pytest.approx(0.9, abs=0.006)
        assert np.log(values).mean() == pytest.approx(0, abs=0.01 * relative + 1e-4)
        assert (values > 1).mean() == pytest.approx(0.5, abs=0.01)
    odd = Draws(101, 3).of("a", Factor(0.1))
    assert odd.shape == (101,)
    assert np.all(np.isfinite(odd))


def test_between_and_log_between():
    low, middle, high = np.quantile(MANY.of("a", Between(2.0, 4.0)), [0.05, 0.5, 0.95])
    assert (low, middle, high) == pytest.approx((2.1, 3.0, 3.9), abs=0.02)
    low, middle, high = np.quantile(MANY.of("a", LogBetween(1.0, 100.0)), [0.05, 0.5, 0.95])
    assert np.log10([low, middle, high]) == pytest.approx([0.1, 1.0, 1.9], abs=0.02)


def test_one_of_a_few_at_even_odds():
    values, counts = np.unique(MANY.of("a", OneOf((1.0, 2.0, 5.0))), return_counts=True)
    assert list(values) == [1, 2, 5]
    assert counts / MANY.count == pytest.approx(1 / 3, abs=0.01)


def test_what_is_put_into_an_element():
    bore = Bore(0.4, 0.25e-3)
    assert scaling("bore")(bore, 1.1).bore == pytest.approx(0.275e-3)
    assert setting("curvature")(bore, np.array([0.0, 30.0])).curvature[1] == 30
    assert bore.bore == 0.25e-3
