"""What lies between the injection and one detector's record."""

import pytest

from xcol.flowpath.chain import dead_time, links, segments, transit
from xcol.flowpath.reader import parse

FILE = """\
flow = "0.6 mL/min"
diffusion = "1e-9 m^2/s"
path = [
  { inject = "6 uL" },
  { tube = "10 cm x 0.2 mm" },
  { tube = "10 cm x 0.3 mm" },
  { column = "2.1 x 50 mm, 3 um", plates = 5000, void_volume = "0.1 mL" },
  { tube = "10 cm x 0.1 mm" },
  { column = "2.1 x 50 mm, 3 um", plates = 5000, void_volume = "0.1 mL" },
  { fitting = "1 uL" },
  { tube = "10 cm x 0.2 mm" },
  { detector = "first", cell = "2 uL", time_constant = "0.5 s", rate = "5 Hz" },
  { tube = "10 cm x 0.2 mm" },
  { fitting = "0 uL" },
  { tube = "10 cm x 0.2 mm" },
  { detector = "second", cell = "4 uL", tanks = 2, rise_time = "1 s" },
  { tube = "10 cm x 0.2 mm" },
]
"""


@pytest.fixture
def instrument():
    return parse(FILE, "f")


def test_sides_and_what_counts_at_each_detector(instrument):
    first, second = instrument.detectors
    at_first = [
        (link.element.contribution, link.side) for link in links(instrument, first) if link.part.kind != "column"
    ]
    assert at_first == [
        ("injection", "before"), ("tube", "before"), ("tube", "before"), ("tube", "between"),
        ("fitting", "after"), ("tube", "after"), ("cell", "after"), ("filter", "signal"),
        ("rate", "signal"),
    ]  # fmt: skip
    at_second = [(link.part.name, link.element.contribution) for link in links(instrument, second)]
    assert ("first", "cell") in at_second
    assert ("first", "filter") not in at_second
    assert ("first", "rate") not in at_second
    assert at_second[-1] == ("second", "filter")


def test_tubes_are_one_run_until_something_mixes_the_stream(instrument):
    chain = links(instrument, instrument.detectors[1])
    found = [segment.places for segment in segments([link.element for link in chain])]
    runs = [places for places in found if len(places) > 1]
    assert [[chain[index].part.position for index in run] for run in runs] == [[2, 3], [10, 12]]
    assert sorted(place for places in found for place in places) == list(range(len(chain)))


def test_the_transit_is_the_sum_of_the_mean_delays(instrument):
    flow = 0.6e-6 / 60
    tubes = [3.14159265 / 4 * bore**2 * 0.1 for bore in (0.2e-3, 0.3e-3, 0.1e-3, 0.2e-3)]
    first = (3e-9 + sum(tubes) + 1e-9 + 1e-9) / flow + 0.5 + 0.1
    assert transit(instrument, instrument.detectors[0], instrument.peaks[0].estimate) == pytest.approx(first)
    more = 2 * 3.14159265 / 4 * 0.2e-3**2 * 0.1
    # the first cell is passed through whole, its electronics are not met; the second is two tanks
    second = (3e-9 + sum(tubes) + 1e-9 + 2e-9 + more + 4e-9) / flow + 1 / 2.1972245773
    assert transit(instrument, instrument.detectors[1], instrument.peaks[0].estimate) == pytest.approx(second)
    assert dead_time(instrument, instrument.detectors[0]) == pytest.approx(0.2e-6 / flow)
