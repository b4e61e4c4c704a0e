"""The table of kinds: what each row makes of its keys."""

import math

import numpy as np
import pytest

from xcol.filters.signal import GAUSSIAN_RISE, Boxcar, FirstOrder, GaussianFilter
from xcol.filters.tube import Tube
from xcol.filters.washout import WashedOut
from xcol.flowpath.bed import Bed
from xcol.flowpath.elements import Block, Bore, Cell, Electronics, Loop, Mixed, Stream
from xcol.flowpath.kinds import KINDS, KINDS_LATER
from xcol.flowpath.reader import parse
from xcol.flowpath.unknowns import LogBetween
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


def injection_of(keys):
    """The injection's element, its filter at D = 1e-9 m²/s, and σ² in µL²."""
    text = FILE.format(part='{ mixer = "1 uL" }').replace('inject = "2 uL"', keys)
    instrument = parse(text, "f")
    (element,) = instrument.parts[0].elements
    made = element.filter(instrument.stream(instrument.parts[0], 1e-9), read_here=False)
    return element, made, float(made.variance()) * (instrument.flow * 1e9) ** 2


def test_an_injection_without_its_loop_is_a_plug_that_may_be_smeared():
    for keys in ('inject = "2 uL"', 'inject = "2 uL", loop = "20 uL"', 'inject = "2 uL", loop = "2 uL"'):
        element, _, variance = injection_of(keys)
        assert variance == pytest.approx(4 / 12)
        assert [unknown.what for unknown in element.unknowns] == ["form of the injection"]
    (known,) = {len(injection_of('inject = "2 uL", loop = "20 uL", emptied = "reversed"')[0].unknowns)}
    assert known == 0


def test_a_full_loop_is_washed_out_through_its_bore():
    element, made, variance = injection_of('inject = "20 uL", loop = "20 uL x 0.5 mm"')
    tube = Tube(20e-9 / (math.pi / 4 * 0.5e-3**2), 0.5e-3, 0.5e-6 / 60, 1e-9)
    assert isinstance(element, Loop)
    assert variance == pytest.approx(float(WashedOut(tube).variance()) * (0.5e-6 / 60 * 1e9) ** 2, rel=1e-12)
    assert {unknown.what for unknown in element.unknowns} == {"bend", "bore"}
    assert made.delay() == pytest.approx(WashedOut(tube).delay())


def test_a_loop_filled_in_part_leaves_as_a_plug_or_through_its_rest():
    loop = 'loop = "20 uL x 0.3 mm"'
    _, reversed_, plug = injection_of(f'inject = "5 uL", {loop}, emptied = "reversed"')
    assert plug == pytest.approx(25 / 12)
    assert reversed_.delay() == pytest.approx(2.5e-9 / (0.5e-6 / 60))
    same, made, through = injection_of(f'inject = "5 uL", {loop}, emptied = "same way", filled = "part"')
    rest = Tube(15e-9 / (math.pi / 4 * 0.3e-3**2), 0.3e-3, 0.5e-6 / 60, 1e-9)
    assert through == pytest.approx(25 / 12 + float(rest.variance()) * (0.5e-6 / 60 * 1e9) ** 2, rel=1e-12)
    assert made.delay() == pytest.approx((2.5e-9 + 15e-9) / (0.5e-6 / 60))
    assert "bend" in {unknown.what for unknown in same.unknowns}
    open_, _, printed = injection_of(f'inject = "5 uL", {loop}')
    assert printed == plug
    assert "way of emptying" in {unknown.what for unknown in open_.unknowns}


def test_a_file_s_bend_serves_tubes_and_loops_and_no_fitting():
    text = 'bend_radius = "5 cm"\n' + FILE.format(part='{ fitting = "a", bore = "0.2 mm", length = "5 mm" }')
    text = text.replace('inject = "2 uL"', 'inject = "2 uL", loop = "2 uL x 0.25 mm"').replace(
        "  { detector",
        '  { tube = "5 cm x 0.2 mm" },\n  { tube = "5 cm x 0.2 mm", coil_diameter = "4 cm" },\n  { detector',
    )
    parts = parse(text, "f").parts
    assert [part.elements[0].curvature for part in (parts[0], parts[1], parts[3], parts[4])] == [20, 0, 20, 50]


def test_a_loop_has_a_bend_of_its_own():
    for key in ('bend_radius = "2 cm"', 'coil_diameter = "4 cm"'):
        element, _, variance = injection_of(f'inject = "20 uL", loop = "20 uL x 0.25 mm", {key}')
        assert element.curvature == pytest.approx(50)
        assert variance < injection_of('inject = "20 uL", loop = "20 uL x 0.25 mm"')[2]


def test_cells_with_a_path_length_are_straight_bores():
    def cell_of(keys):
        text = FILE.format(part='{ mixer = "1 uL" }').replace('cell = "2.5 uL"', keys)
        return parse(text, "f").parts[-1].elements[0]

    straight = cell_of('cell = "8 uL", path_length = "10 mm"')
    stream = Stream(1e-6 / 60, 1e-9)
    made = straight.filter(stream, read_here=True)
    assert float(made.variance()) / (8e-9 / stream.flow) ** 2 == pytest.approx(1.284, rel=1e-3)
    passed = straight.filter(stream, read_here=False)
    assert passed == Tube(10e-3, pytest.approx(math.sqrt(4 * 8e-9 / (math.pi * 10e-3))), 1e-6 / 60, 1e-9)
    tanks = cell_of('cell = "8 uL", path_length = "10 mm", tanks = 3')
    assert tanks.filter(stream, read_here=True).variance() == pytest.approx((8e-9 / stream.flow) ** 2 / 3)
    plug = cell_of('cell = "8 uL"')
    assert plug.filter(stream, read_here=True).variance() == pytest.approx((8e-9 / stream.flow) ** 2 / 12)
    assert plug.length == 10e-3


def test_a_cell_between_a_plug_and_a_bore_has_a_variance_between():
    stream = Stream(1e-6 / 60, 1e-9)
    ends = [float(Cell(8e-9, likeness=end).filter(stream, read_here=True).variance()) for end in (0.0, 1.0)]
    middle = Cell(8e-9, likeness=np.array([0.0, 0.5, 1.0])).filter(stream, read_here=True).variance()
    assert middle == pytest.approx([ends[0], math.sqrt(ends[0] * ends[1]), ends[1]], rel=1e-9)


def test_response_is_the_rise_of_a_first_order_filter_and_may_be_anything():
    (filter_,) = electronics_of('response = "0.5 s"')
    assert filter_.made.tau == pytest.approx(0.5 / math.log(9))
    (unknown,) = filter_.unknowns
    best, worst = (unknown.put(filter_, end).made.variance() for end in (unknown.ends.best, unknown.ends.worst))
    assert worst / best == pytest.approx(21.2, abs=0.05)
    assert worst == pytest.approx(0.25)


def test_several_filters_are_a_contribution_each():
    keys = 'filters = [{ time_constant = "0.1 s" }, { rise_time = "0.2 s", filter = "gaussian" }, { response = "1 s" }]'
    found = electronics_of(keys)
    assert [filter_.contribution for filter_ in found] == ["filter 1", "filter 2", "filter 3"]
    assert found[0].made == FirstOrder(0.1, 1.0)
    assert found[1].made == GaussianFilter(0.2 / GAUSSIAN_RISE)
    assert electronics_of('filters = { time_constant = "0.1 s" }')[0].made == FirstOrder(0.1, 1.0)


def test_dwell_is_the_time_of_averaging_and_the_rate_that_of_the_points():
    (_, rate) = electronics_of('time_constant = "0.1 s", rate = "5 Hz", dwell = "50 ms"')
    assert rate.made == Boxcar(0.05)
    assert rate.period == pytest.approx(0.2)
    (_, alone) = electronics_of('time_constant = "0.1 s", dwell = "50 ms"')
    assert (alone.made, alone.period) == (Boxcar(0.05), None)


def test_a_fitting_remixes_unless_it_says_otherwise():
    size = '"a", bore = "0.2 mm", length = "4 mm"'
    for word, remixed, unknown in (("", 1, True), (", remix = true", 1, False), (", remix = false", 0, False)):
        (element,) = part_of(f"{{ fitting = {size}{word} }}").elements
        assert element.remixed == remixed
        assert ("remixing" in {one.what for one in element.unknowns}) is unknown
    (volume,) = part_of('{ fitting = "0.5 uL", remix = true }').elements
    assert [unknown.what for unknown in volume.unknowns] == ["mixing"]


def test_tolerances_come_from_the_file_the_catalog_or_are_assumed(tmp_path):
    def bores(keys, head=""):
        part = parse(head + FILE.format(part=f'{{ tube = "20 cm x 0.25 mm"{keys} }}'), str(tmp_path / "f")).parts[1]
        return {
            unknown.what: unknown.spread.relative for unknown in part.elements[0].unknowns if unknown.what != "bend"
        }

    assert bores("") == {"bore": 0.05, "length": 0.02}
    assert bores(', bore_tolerance = "8 %", length_tolerance = 0') == {"bore": pytest.approx(0.08)}
    (tmp_path / "mine.toml").write_text(
        '[[tubing]]\nbore = "0.25 mm"\ntolerance = "3 %"\ntolerance_from = "our calipers"\nmaterials = ["steel"]\n'
        'source = "notebook"\n',
        encoding="utf-8",
    )
    assert bores("", 'catalogs = ["mine.toml"]\n') == {"bore": pytest.approx(0.03), "length": 0.02}


def test_a_tube_of_known_volume_keeps_it_whatever_its_bore():
    (element,) = part_of('{ tube = "a", volume = "10 uL", bore = "0.2 mm", volume_tolerance = "5 %" }').elements
    puts = {unknown.what: unknown.put for unknown in element.unknowns}
    assert set(puts) == {"bend", "bore", "volume"}
    assert puts["bore"](element, 1.1).volume == pytest.approx(10e-9)
    assert puts["bore"](element, 1.1).bore == pytest.approx(0.22e-3)
    assert puts["volume"](element, 1.1).volume == pytest.approx(11e-9)


def test_a_cell_of_no_volume_has_nothing_unknown():
    text = FILE.format(part='{ mixer = "1 uL" }').replace('cell = "2.5 uL"', 'cell = "0 uL", path_length = "10 mm"')
    cell = parse(text, "f").parts[-1].elements[0]
    assert cell == Cell(0.0)
    assert cell.unknowns == ()


def test_part_filled_in_words_counts_though_all_of_it_is_injected():
    _, made, variance = injection_of('inject = "20 uL", loop = "20 uL x 0.5 mm", filled = "part", emptied = "same way"')
    assert variance == pytest.approx(400 / 12)
    assert made.delay() == pytest.approx(10e-9 / (0.5e-6 / 60))


def test_what_is_put_into_a_column():
    (bed,) = part_of('{ column = "2.1 x 50 mm, 1.7 um", total_porosity = 0.6 }').elements
    stream = Stream(0.4e-6 / 60, 1e-9)
    worst, best = bed.plates_range(stream)
    (quality,) = (unknown for unknown in bed.unknowns if unknown.what == "plates")
    middle = quality.put(bed, 0.5).plates_for(stream)
    assert middle == pytest.approx(math.sqrt(worst * best))
    keys = 'plates = 9000, bore_tolerance = "2 %", length_tolerance = "1 %"'
    (sized,) = part_of(f'{{ column = "2.1 x 50 mm, 1.7 um", {keys} , total_porosity = 0.6 }}').elements
    puts = {unknown.what: unknown.put for unknown in sized.unknowns}
    assert puts["bore"](sized, 1.1).void_volume == pytest.approx(1.21 * sized.void_volume)
    assert puts["length"](sized, 1.1).void_volume == pytest.approx(1.1 * sized.void_volume)
    assert puts["plates"](sized, 1.1).plates == pytest.approx(9900)


def test_what_is_put_into_an_injection_a_fitting_and_a_cell():
    element, _, _ = injection_of('inject = "2 uL", volume_tolerance = "10 %"')
    puts = {unknown.what: unknown.put for unknown in element.unknowns}
    assert puts["volume"](element, 1.1).volume == pytest.approx(2.2e-9)
    (fitting,) = part_of('{ fitting = "0.5 uL" }').elements
    (mixing,) = (unknown for unknown in fitting.unknowns if unknown.what == "mixing")
    assert mixing.spread == LogBetween(1 / 12, 1.35)
    assert mixing.put(fitting, 1.35).tanks == pytest.approx(1 / 1.35)


def test_a_bore_near_a_stock_bore_has_its_tolerance(tmp_path):
    (tmp_path / "mine.toml").write_text(
        '[[tubing]]\nbore = "0.30 mm"\ntolerance = "3 %"\ntolerance_from = "our calipers"\nmaterials = ["steel"]\n'
        'source = "notebook"\n',
        encoding="utf-8",
    )
    for bore, relative in (("0.31 mm", 0.03), ("0.36 mm", 0.05)):
        text = 'catalogs = ["mine.toml"]\n' + FILE.format(part=f'{{ tube = "20 cm x {bore}" }}')
        (tube,) = parse(text, str(tmp_path / "f")).parts[1].elements
        (spread,) = (unknown.spread for unknown in tube.unknowns if unknown.what == "bore")
        assert spread.relative == pytest.approx(relative)


def test_a_bore_of_no_length_mixes_nothing():
    assert Bore(0.0, 0.2e-3, remixed=1.0).remixes == 0
    assert Bore(0.01, 0.2e-3, remixed=1.0).remixes == 1
