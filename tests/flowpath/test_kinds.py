"""The table of kinds: what each row makes of its keys."""

import math

import pytest

from xcol.filters.signal import GAUSSIAN_RISE, Boxcar, FirstOrder, GaussianFilter
from xcol.flowpath.bed import Bed
from xcol.flowpath.elements import Block, Bore, Cell, Electronics, Mixed
from xcol.flowpath.kinds import KINDS, KINDS_LATER
from xcol.flowpath.reader import parse
from xcol.report.topics import TOPICS

FILE = """\
flow = "0.5 mL/min"
viscosity = "0.9 mPa s"
diffusion = "1e-9 m^2/s"
path = [
  {{ inject = "2 uL" }},
  {part},
  {{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 }},
  {{ detector = "UV", cell = "2.5 uL", time_constant = "0.1 s" }},
]
"""


def part_of(text):
    return parse(FILE.format(part=text), "f").parts[1]


def test_every_kind_is_explained_and_has_an_example_that_reads():
    names = {topic.name for topic in TOPICS}
    for kind in KINDS.values():
        assert kind.name in names
        assert kind.meaning
        assert len({key.name for key in kind.all_keys}) == len(kind.all_keys)
        assert all(key.meaning for key in kind.all_keys)
        if kind.name not in ("inject", "detector", "outlet"):
            assert part_of(kind.example).kind == kind.name
    assert not set(KINDS) & set(KINDS_LATER)


def test_tubes():
    assert part_of('{ tube = "20 cm x 0.5 mm" }').elements == (Bore(0.2, 0.5e-3),)
    (by_volume,) = part_of('{ tube = "a", bore = "0.5 mm", volume = "39.27 uL" }').elements
    assert by_volume.length == pytest.approx(0.2, rel=1e-4)


def test_fittings():
    assert part_of('{ fitting = "0.5 uL" }').elements == (Mixed(0.5e-9, 1.0, "fitting"),)
    assert part_of('{ fitting = "a", volume = "0.5 uL", tanks = 3 }').elements[0].tanks == 3
    (bored,) = part_of('{ fitting = "a", bore = "0.5 mm", length = "5 mm" }').elements
    assert isinstance(bored, Bore)
    assert bored.remixed == 1
    (gap,) = part_of('{ fitting = "a", gap = "0.5 mm" }').elements
    assert gap.volume == pytest.approx(math.pi / 4 * (25.4e-3 / 16) ** 2 * 0.5e-3)
    (other,) = part_of('{ fitting = "a", gap = "0.5 mm", port = "1/8 in" }').elements
    assert other.volume == pytest.approx(4 * gap.volume)


def test_mixer_block_injection():
    assert part_of('{ mixer = "3 uL", tanks = 2.5 }').elements[0].tanks == 2.5
    assert part_of('{ block = "4 uL^2" }').elements[0].measured == pytest.approx(4e-18)
    (block,) = part_of('{ block = "autosampler", variance = "4 uL2", volume = "8 uL" }').elements
    assert isinstance(block, Block)
    assert block.volume == pytest.approx(8e-9)
    instrument = parse(FILE.format(part='{ mixer = "1 uL" }').replace('"2 uL"', '"a", volume = "2 uL"', 1), "f")
    assert instrument.parts[0].elements[0].volume == pytest.approx(2e-9)
    assert instrument.parts[0].name == "a"


def test_columns():
    (bed,) = part_of('{ column = "2.1 x 50 mm, 1.7 um", plates = 9000 }').elements
    assert isinstance(bed, Bed)
    assert bed.void_volume == pytest.approx(0.65 * math.pi / 4 * 2.1e-3**2 * 0.05)  # assumed, and said
    assert bed.porosity == (0.40, 0.36, 0.42)
    (known,) = part_of(
        '{ column = "2.1 x 50 mm, 1.7 um", plates = 9000, void_volume = "0.1 mL", interstitial_porosity = "38 %" }'
    ).elements
    assert known.void_volume == pytest.approx(1e-7)
    assert known.porosity == pytest.approx((0.38, 0.38, 0.38))


def electronics_of(keys):
    text = FILE.format(part='{ mixer = "1 uL" }').replace('time_constant = "0.1 s"', keys)
    return [e for e in parse(text, "f").parts[-1].elements if isinstance(e, Electronics)]


def test_noise_filters():
    assert electronics_of('time_constant = "0.1 s"')[0].made == FirstOrder(0.1, 1.0)
    assert electronics_of('time_constant = "100 ms", stages = 3')[0].made == FirstOrder(0.1, 3.0)
    assert electronics_of('time_constant = "0.1 s", filter = "gaussian"')[0].made == GaussianFilter(0.1)
    assert electronics_of("stages = 1, time_constant = '0.1 s'")[0].made.variance() == pytest.approx(0.01)
    for stages, c in ((1, 2.197), (2, 2.374), (3, 2.437), (4, 2.468)):
        made = electronics_of(f'rise_time = "1 s", stages = {stages}')[0].made
        assert math.sqrt(made.variance()) == pytest.approx(1 / c, rel=3e-4)
    made = electronics_of('rise_time = "1 s", filter = "gaussian"')[0].made
    assert made.variance() == pytest.approx(1 / GAUSSIAN_RISE**2)
    made = electronics_of('rise_time = "1 s", filter = "boxcar"')[0].made
    assert math.sqrt(made.variance()) == pytest.approx(1 / 2.771, rel=3e-4)
    assert isinstance(made, Boxcar)


def test_rate_and_cycle_say_the_same():
    by_rate = electronics_of('time_constant = "0.1 s", rate = "5 Hz"')[1].made
    by_cycle = electronics_of('time_constant = "0.1 s", cycle = "200 ms"')[1].made
    assert by_rate.dwell == pytest.approx(by_cycle.dwell) == pytest.approx(0.2)


def test_a_detector_may_have_no_cell_and_no_filter():
    text = FILE.format(part='{ mixer = "1 uL" }').replace('cell = "2.5 uL", time_constant', "cycle")
    assert [e.contribution for e in parse(text, "f").parts[-1].elements] == ["rate"]
    short = FILE.format(part='{ mixer = "1 uL" }').replace('"UV", cell = "2.5 uL"', '"2.5 uL"')
    assert parse(short, "f").parts[-1].elements[0] == Cell(2.5e-9)


def test_every_part_carries_its_limits_and_measured_drop():
    part = part_of('{ mixer = "1 uL", drop = "2 bar", max_pressure = "300 bar", max_drop = "5 bar", note = "x" }')
    assert (part.drop, part.max_pressure, part.max_drop) == pytest.approx((2e5, 3e7, 5e5))
