"""Draws: the same for the same seed, whatever else is drawn."""

import numpy as np

from xcol.answers.draws import Draws
from xcol.flowpath.unknowns import Between

UNIFORM = Between(0.0, 1.0)


def test_a_seed_gives_the_same_draws_and_another_seed_others():
    assert np.array_equal(Draws(500, 1).of("bore", UNIFORM), Draws(500, 1).of("bore", UNIFORM))
    assert not np.array_equal(Draws(500, 1).of("bore", UNIFORM), Draws(500, 2).of("bore", UNIFORM))


def test_an_unknown_has_its_own_stream_whatever_is_drawn_before_it():
    draws = Draws(500, 1)
    draws.of("length", UNIFORM)
    assert np.array_equal(draws.of("bore", UNIFORM), Draws(500, 1).of("bore", UNIFORM))
    alike = np.corrcoef(Draws(20_000, 1).of("bore", UNIFORM), Draws(20_000, 1).of("length", UNIFORM))[0, 1]
    assert abs(alike) < 0.03


def test_the_draws_do_not_change_from_one_machine_to_another():
    assert np.round(Draws(3, 1).of("bore", UNIFORM), 6).tolist() == [0.106108, 0.473137, 0.847751]


def test_draws_are_inside_of_their_ends():
    values = Draws(100_000, 1).of("bore", UNIFORM)
    assert 0 < values.min() < 1e-3
    assert 1 - 1e-3 < values.max() < 1
