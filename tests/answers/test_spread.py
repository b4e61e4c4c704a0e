"""The spread of a chain: one piece of code for peaks, ends and draws."""

import numpy as np
import pytest

from xcol.answers.spread import Spread, at_end
from xcol.flowpath.chain import links
from xcol.flowpath.reader import parse

TEXT = """\
flow = "0.5 mL/min"
viscosity = "0.9 mPa s"
path = [
  { inject = "4 uL" },
  { tube = "20 cm x 0.2 mm" },
  { tube = "10 cm x 0.3 mm" },
  { fitting = "union", bore = "0.2 mm", length = "4 mm", remix = false },
  { tube = "30 cm x 0.2 mm" },
  { detector = "UV", cell = "5 uL", response = "0.5 s", rate = "10 Hz" },
]
peaks = [ { diffusion = "1e-9 m^2/s" } ]
"""


@pytest.fixture
def chain():
    instrument = parse(TEXT, "f")
    return instrument, links(instrument, instrument.detectors[0])


def spread_of(chain, diffusion, elements=None):
    instrument, found = chain
    return Spread(found, lambda part: instrument.stream(part, diffusion), np.shape(diffusion), elements)


def test_many_at_once_are_each_by_itself(chain):
    diffusion = np.array([2e-10, 1e-9, 3e-9])
    together = spread_of(chain, diffusion)
    for n, one in enumerate(diffusion):
        alone = spread_of(chain, np.array([one]))
        assert together.total()[n] == pytest.approx(alone.total()[0], rel=1e-12)
        for place, row in together.rows.items():
            assert row.variance[n] == pytest.approx(alone.rows[place].variance[0], rel=1e-12)


def test_rows_add_up_and_a_fitting_that_does_not_remix_is_part_of_the_run(chain):
    spread = spread_of(chain, np.array([1e-9]))
    rows = spread.rows
    assert sum(row.variance for row in rows.values()) == pytest.approx(spread.total())
    assert {row.segment.places for row in rows.values() if row.tube} == {(1, 2, 3, 4)}
    assert all(row.half > 0 for row in rows.values() if row.tube)
    for place in rows:
        assert spread.gain(place) == pytest.approx(spread.total() - spread.total(place), rel=1e-9)


def path(*parts):
    text = 'flow = "0.5 mL/min"\nviscosity = "0.9 mPa s"\npath = [ { inject = "1 uL" },\n' + ",\n".join(parts)
    instrument = parse(text + ',\n{ detector = "MS" } ]\npeaks = [ { diffusion = "1e-9 m^2/s" } ]\n', "f")
    return instrument, links(instrument, instrument.detectors[0])


TUBES = ['{ tube = "20 cm x 0.2 mm" }', '{ tube = "10 cm x 0.3 mm" }', '{ tube = "30 cm x 0.1 mm" }']
UNION = '{ fitting = "u", bore = "0.2 mm", length = "3 mm"'


@pytest.mark.parametrize(
    "parts",
    [
        TUBES,
        [TUBES[0], '{ fitting = "0.2 uL", remix = true }', *TUBES[1:]],
        [TUBES[0], f"{UNION}, remix = true }}", *TUBES[1:]],
        [TUBES[0], f"{UNION}, remix = false }}", *TUBES[1:]],
        [TUBES[0], '{ mixer = "0 uL" }', '{ fitting = "0.1 uL" }', '{ fitting = "0.3 uL" }', TUBES[1]],
        ['{ fitting = "0.2 uL" }', TUBES[0], '{ block = "1 uL^2" }', TUBES[2], f"{UNION} }}"],
    ],
)
def test_the_gain_is_what_goes_with_a_link(parts):
    made = path(*parts)
    spread = spread_of(made, np.array([1e-9, 3e-10]))
    for place in spread.rows:
        assert spread.gain(place) == pytest.approx(spread.total() - spread.total(place), rel=1e-9, abs=1e-12)
    # drawn: fittings that mix in some draws and in others do not
    mixed = np.array([0.0, 1.0])
    drawn = [
        next((u.put(link.element, mixed) for u in link.element.unknowns if u.what == "remixing"), link.element)
        for link in made[1]
    ]
    both = spread_of(made, np.array([1e-9, 1e-9]), drawn)
    for place in both.rows:
        assert both.gain(place) == pytest.approx(both.total() - both.total(place), rel=1e-9, abs=1e-12)
    exact = np.stack([both.gain(place) for place in both.rows])
    assert np.array_equal(np.stack(both.gains()).argmax(axis=0), exact.argmax(axis=0))


def test_beside_many_tubes_the_row_stands_for_the_gain():
    made = path(*[f'{{ tube = "{5 + n} cm x 0.2 mm" }}' for n in range(12)])
    spread = spread_of(made, np.array([1e-9]))
    for place in (1, 6, 12):
        gain, exact = spread.gain(place)[0], (spread.total() - spread.total(place))[0]
        assert gain == spread.rows[place].variance[0]
        assert 0.5 * exact < gain < 1.01 * exact


def test_a_straight_cell_that_is_passed_through_is_a_part_of_its_own():
    text = (
        'flow = "0.5 mL/min"\npath = [ { inject = "1 uL" }, { tube = "9 cm x 0.2 mm" },\n'
        '{ detector = "UV", cell = "2 uL", path_length = "10 mm" }, { tube = "9 cm x 0.2 mm" }, { detector = "MS" } ]\n'
        'peaks = [ { diffusion = "1e-9 m^2/s" } ]\n'
    )
    instrument = parse(text, "f")
    spread = spread_of((instrument, links(instrument, instrument.detectors[1])), np.array([1e-9]))
    assert [row.segment.places for row in spread.rows.values() if row.tube] == [(1,), (3,)]


def test_all_at_its_best_is_less_than_all_at_its_worst(chain):
    ends = [[at_end(link.element, worst=worst, joined=worst) for link in chain[1]] for worst in (False, True)]
    best, worst = (spread_of(chain, np.array([1e-9]), elements).total() for elements in ends)
    assert best < spread_of(chain, np.array([1e-9])).total() < worst


def test_the_dean_number_is_that_of_a_tube(chain):
    spread = spread_of(chain, np.array([1e-9]))
    assert spread.dean(0) is None
    assert spread.dean(1)[0] == 0
    bent = spread_of(chain, np.array([1e-9]), [at_end(link.element, worst=False, joined=False) for link in chain[1]])
    assert bent.dean(1)[0] > bent.dean(2)[0] > 1  # Re goes as 1/d, De as 1/√d
