"""What a review found wrong once."""

import pytest

from xcol.answers.budget import budget
from xcol.flowpath.reader import parse

HEAD = 'flow = "1 mL/min"\nviscosity = "0.9 mPa s"\n'
COLUMN = '{ column = "4.6 x 150 mm, 5 um", plates = 11000, total_porosity = 0.65 }'


def answer_of(parts, peaks="", head=HEAD):
    text = head + "path = [\n" + ",\n".join(parts) + "\n]\n" + (peaks or 'diffusion = "1e-9 m^2/s"\n')
    return budget(parse(text, "f"))


def peaks(entry):
    return f'peaks = [ {{ name = "a", diffusion = "1e-9 m^2/s", {entry} }} ]\n'


BETWEEN = ['{ inject = "20 uL" }', COLUMN, '{ detector = "UV", cell = "10 uL" }', '{ tube = "30 cm x 0.2 mm" }', COLUMN,
           '{ detector = "RI", cell = "10 uL" }']  # fmt: skip


def test_a_column_may_have_a_name_and_its_sizes_in_keys():
    named = COLUMN.replace('"4.6 x 150 mm, 5 um"', '"main", bore = "4.6 mm", length = "150 mm", particle = "5 um"')
    by_name = answer_of(['{ inject = "20 uL" }', named, '{ detector = "UV" }'])
    short = answer_of(['{ inject = "20 uL" }', COLUMN, '{ detector = "UV" }'])
    for one, other in zip(by_name.detectors[0].peaks, short.detectors[0].peaks, strict=True):
        assert one.plates_observed == pytest.approx(other.plates_observed)


def test_retention_at_a_first_detector_between_two_columns():
    first = answer_of(BETWEEN, peaks("k = 2")).detectors[0].peaks[0]
    again = answer_of(BETWEEN, peaks(f'retention = "{first.retention!r} s"'))
    assert again.detectors[0].peaks[0].peak.k == pytest.approx(2)


def test_retention_at_a_detector_before_the_column_is_refused(faults_of):
    parts = ['{ inject = "20 uL" }', '{ detector = "a" }', COLUMN, '{ detector = "b" }']
    (fault,) = faults_of(HEAD + "path = [\n" + ",\n".join(parts) + "\n]\n" + peaks('retention = "6 min"'))
    assert fault.place.key == "retention"


def test_a_peak_s_plates_are_shared_by_columns_of_which_a_detector_sees_some():
    first, last = answer_of(BETWEEN, peaks("k = 1, plates = 20000")).detectors
    assert last.peaks[0].plates_column == pytest.approx(20000)
    assert first.peaks[0].plates_column == pytest.approx(10000)


def test_a_block_s_volume_delays_and_changes_no_variance():
    def with_volume(text):
        block = f'{{ block = "4 uL^2"{text} }}'
        tube = '{ tube = "10 cm x 0.25 mm" }'
        return answer_of(['{ inject = "20 uL" }', tube, block, tube, COLUMN, '{ detector = "UV" }']).detectors[0]

    without, some = with_volume(""), with_volume(', volume = "8 uL"')
    assert some.delay - without.delay == pytest.approx(0.48)
    assert some.peaks[0].variance_extra == pytest.approx(without.peaks[0].variance_extra)


def test_no_length_in_the_short_form_is_no_length():
    tube = parse(
        HEAD + 'diffusion = "1e-9 m^2/s"\npath = [{inject = "1 uL"}, {tube = "0 cm x 0.25 mm"}, {detector = "UV"}]', "f"
    )
    assert tube.parts[1].elements[0].length == 0
    assert tube.parts[1].elements[0].bore == pytest.approx(0.25e-3)


BARE = '{ column = "4.6 x 100 mm", plates = 9000 }'


def test_a_column_without_particle_takes_what_is_left_of_the_pump_pressure():
    parts = ['{ inject = "20 uL" }', COLUMN, BARE, '{ detector = "UV", cell = "1 uL", time_constant = "0.1 s" }']
    found = answer_of(parts, head=HEAD + 'pump_pressure = "120 bar"\n')
    first, second = (row.drop.value for row in found.pressure.rows if row.part.kind == "column")
    alone = answer_of([*parts[:2], parts[3]]).pressure.total.value
    assert first == pytest.approx(alone)
    assert first + second == pytest.approx(120e5)
    assert not found.warnings
    assert not any("bed" in assumption.short for assumption in found.instrument.assumed)


def test_two_of_them_share_it_by_length_and_say_so():
    short = BARE.replace("100 mm", "50 mm").replace("9000", "4500")
    found = answer_of(
        ['{ inject = "20 uL" }', BARE, short, '{ detector = "UV" }'], head=HEAD + 'pump_pressure = "120 bar"\n'
    )
    first, second = (row.drop.value for row in found.pressure.rows if row.part.kind == "column")
    assert first == pytest.approx(2 * second)
    assert any("share" in warning for warning in found.warnings)


def test_the_pump_pressure_is_the_first_inlet_where_nothing_else_is_known():
    column = COLUMN.replace("0.65 }", '0.65, max_pressure = "100 bar" }')
    head = 'flow = "1 mL/min"\npump_pressure = "120 bar"\n'
    found = answer_of(
        ['{ inject = "20 uL" }', column, '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }'], head=head
    )
    assert found.pressure.rows[1].inlet.value == pytest.approx(120e5)
    assert any("above its limit" in warning for warning in found.warnings)


def test_a_cut_tube_is_no_more_unmixed_than_the_whole():
    def warnings(*tubes):
        peak = peaks("k = 1").replace("1e-9", "2e-11")
        parts = ['{ inject = "20 uL" }', *tubes, COLUMN, '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }']
        return [w for w in answer_of(parts, peak).warnings if "unmixed" in w]

    assert not warnings('{ tube = "40 cm x 0.25 mm" }')
    assert not warnings('{ tube = "20 cm x 0.25 mm" }', '{ tube = "20 cm x 0.25 mm" }')
    assert warnings('{ tube = "10 cm x 0.25 mm" }')


def test_numbers_without_end_are_refused(faults_of):
    for digits in (400, 5000):
        for key in ("plates", "k"):
            column = COLUMN.replace("11000", "9" * digits) if key == "plates" else COLUMN
            tail = peaks(f"k = {'9' * digits}") if key == "k" else peaks("k = 1")
            faults = faults_of(
                HEAD + f'path = [\n{{ inject = "2 uL" }},\n{column},\n{{ detector = "UV" }},\n]\n' + tail
            )
            assert len(faults) == 1
            assert faults[0].place.line
            assert len(str(faults[0])) < 400
    (fault,) = faults_of(
        f"flow = {'9' * 400}\npath = [ {{ inject = '2 uL' }}, {{ detector = 'UV' }} ]\ndiffusion = '1e-9 m^2/s'"
    )
    assert fault.place.key == "flow"


def test_names_lose_their_control_characters():
    text = (
        HEAD
        + 'diffusion = "1e-9 m^2/s"\n'
        + 'path = [{inject = "1 uL", name = "a\\u001b[2Jb"}, {detector = "c\\u0000\\u009b31m"}]'
    )
    assert [part.name for part in parse(text, "f").parts] == ["a [2Jb", "c 31m"]


def test_long_words_are_cut(faults_of):
    for text in (f"{'x' * 50000} = 1\n", f'title = "{"x" * 50000}"\n'):
        faults = faults_of(
            text + 'flow = "1 mL/min"\npath = [{ inject = "1 uL" }, { detector = "UV" }]\ndiffusion = "1e-9 m^2/s"\n'
        )
        assert max(len(str(fault)) for fault in faults) < 800


@pytest.mark.parametrize(
    ("old", "new", "proposed"),
    [
        ('"20 cm x 0.2 mm"', '"25 cm x 5 in"', "5 thou"),
        ('"20 cm x 0.2 mm"', '"25 x 0.12"', "25 cm x 0.12 mm"),
        ('"20 cm x 0.2 mm"', '"25 cm x 5/1000 in"', "5 thou"),
        ('tube = "20 cm x 0.2 mm"', 'tube = "a", length = "20 cm", radius = "0.1 mm"', "twice"),
        ('"1 s"', '"1 s", rate = "0.05 s"', "cycle"),
        ('"1 s"', '"1 s", cycle = "20 Hz"', "rate"),
        ("11000", '"9 000"', "9000"),
        ("11000", '"9,000"', "9000"),
        ("4.6 x 150 mm, 5 um", "2.1 x 50 cm, 2.5 um", "2.1 mm x 50 cm"),
        ("4.6 x 150 mm, 5 um", "4.6 x 150 mm, 5", '"5 um"'),
        ('{ tube = "20 cm x 0.2 mm" }', '{ loop = "3 uL" }', "inject"),
        ('"20 cm x 0.2 mm" }', '"20 cm x 0.2 mm", bend = 3 }', "bend_radius"),
        ('"1 s"', '"1 s", flows = 3', "not compute"),
    ],
)
def test_suggestions_lead_on(old, new, proposed, faults_of):
    detector = '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }'
    parts = ['{ inject = "2 uL" }', '{ tube = "20 cm x 0.2 mm" }', COLUMN, detector]
    text = HEAD + "path = [\n" + ",\n".join(parts) + "\n]\n" + peaks("k = 1")
    assert old in text
    faults = faults_of(text.replace(old, new, 1))
    assert any(proposed in fault.suggestion for fault in faults), [fault.suggestion for fault in faults]


def test_microlitres_as_clinics_write_them():
    text = HEAD + 'diffusion = "1e-9 m^2/s"\npath = [{inject = "3 mcL"}, {detector = "UV"}]'
    assert parse(text, "f").parts[0].elements[0].volume == pytest.approx(3e-9)


@pytest.mark.parametrize(
    ("head", "parts", "word"),
    [
        (HEAD.replace("0.9 mPa s", "0.8 Pa s"), [], "viscosity"),
        (HEAD, ['{ tube = "a", volume = "5 mL", bore = "0.12 mm" }'], "long"),
        (HEAD, ['{ fitting = "100 uL" }'], "unusual here"),
        (HEAD, ['{ detector = "UV", cell = "1 uL", time_constant = "1 s" }'], "name"),
        (HEAD, ['{ column = "2.1 x 250 mm, 5 um", plates = 40000 }'], "per metre"),
    ],
)
def test_more_slips(head, parts, word):
    parts = ['{ inject = "2 uL" }', *parts, COLUMN, '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }']
    assert any(word in warning for warning in answer_of(parts, head=head).warnings)


def test_a_detector_without_a_cell_is_said_to_have_none():
    found = answer_of(['{ inject = "2 uL" }', COLUMN, '{ detector = "MS", rate = "5 Hz" }'])
    assert any("no cell" in assumption.short for assumption in found.instrument.assumed)
    assert not any("filter is not counted" in warning for warning in found.warnings)


def test_an_outlet_behind_the_last_detector_is_how_a_path_ends():
    parts = [
        '{ inject = "2 uL" }',
        COLUMN,
        '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }',
        '{ outlet = "waste" }',
    ]
    assert not answer_of(parts).warnings


GOOD = ['{ inject = "2 uL" }', '{ tube = "20 cm x 0.2 mm" }', COLUMN,
        '{ detector = "UV", cell = "1 uL", time_constant = "1 s" }']  # fmt: skip


def text_of(parts, tail="", head=HEAD):
    return head + "path = [\n" + ",\n".join(parts) + "\n]\n" + (tail or 'diffusion = "1e-9 m^2/s"\n')


def test_two_peaks_of_one_name_are_warned_of():
    two = 'peaks = [ { name = "Late", k = 2 }, { name = "late", k = 5 } ]\n'
    answer = answer_of(GOOD, two, head=HEAD + 'diffusion = "1e-9 m^2/s"\n')
    assert any('"Late"' in warning and "--peak" in warning for warning in answer.warnings)


def test_a_slow_flow_may_be_a_bore_in_the_wrong_unit(faults_of):
    text = text_of([GOOD[0], '{ column = "75 x 150 mm, 3 um", plates = 9000 }', GOOD[3]]).replace("1 mL", "300 nL")
    assert "75 um" in faults_of(text)[0].suggestion


def test_keys_of_the_file_below_the_parts_are_sent_up(faults_of):
    tables = '[[path]]\ninject = "2 uL"\n[[path]]\ndetector = "UV"\nflow = "1 mL/min"\nviscosity = "0.9 cP"\n'
    faults = faults_of(tables + 'diffusion = "1e-9 m^2/s"\npeaks = [ { name = "a" } ]\n')
    assert all("above the first part" in f.suggestion for f in faults if f.place.key in ("viscosity", "peaks"))
    assert {f.place.key for f in faults} >= {"flow", "viscosity", "peaks"}


def test_a_header_that_nobody_needs_is_to_be_deleted(faults_of):
    faults = faults_of("[conditions]\n" + text_of(GOOD))
    assert any("delete the header" in fault.suggestion for fault in faults)
    assert not any(fault.read == "nothing" and fault.place.key == "flow" for fault in faults)


def test_a_retention_that_is_too_early_names_what_delays_most(faults_of):
    slow = GOOD[3].replace('"1 s"', '"90 s"')
    (fault,) = faults_of(text_of([*GOOD[:3], slow], peaks('retention = "1 min"')))
    assert 'detector "UV"' in fault.expected


def test_a_column_written_without_its_comma():
    column = COLUMN.replace("4.6 x 150 mm, 5 um", "4.6 x 150 mm 5 um")
    assert parse(text_of([GOOD[0], column, GOOD[3]]), "f").parts[1].elements[0].particle == pytest.approx(5e-6)


@pytest.mark.parametrize(
    ("old", "new", "proposed"),
    [
        ("11000", '"18k"', "18000"),
        ("4.6 x 150 mm, 5 um", "C18 4.6 x 150 mm, 5 um", 'column = "4.6 x 150 mm, 5 um", name = "C18"'),
        ("4.6 x 150 mm, 5 um", "4.6x150, 5", '"4.6 x 150 mm, 5 um"'),
        ('{ tube = "20 cm x 0.2 mm" }', '{ fitting = "0.5 mm" }', "gap"),
        ('{ tube = "20 cm x 0.2 mm" }', '{ tube = "5 uL" }', "volume and bore"),
        ('{ inject = "2 uL" }', '{ inject = "2 uL", drop = "2 bar" }', "leave it out"),
        ("total_porosity = 0.65", 'total_porosity = "ca. 0.55"', "0.65"),
        ("total_porosity = 0.65", "total_porosity = 0.55, interstitial_porosity = 0.58", "leave it out"),
    ],
)
def test_more_suggestions_lead_on(old, new, proposed, faults_of):
    text = text_of(GOOD)
    assert old in text
    faults = faults_of(text.replace(old, new, 1))
    assert any(proposed in fault.suggestion for fault in faults), [fault.suggestion for fault in faults]


@pytest.mark.parametrize(
    ("parts", "tail"),
    [
        ([*GOOD[1:], GOOD[0]], ""),
        (GOOD, peaks('rt = "2 min"')),
        ([GOOD[0], '{ tube = "a", length = "20 cm", id = "0.2 mm" }', *GOOD[2:]], ""),
    ],
)
def test_a_fault_has_no_echo(parts, tail, faults_of):
    assert len(faults_of(text_of(parts, tail))) == 1


def test_a_huge_number_in_any_notation_is_a_fault(faults_of):
    (fault,) = faults_of(text_of(GOOD).replace('"1 mL/min"', "0x" + "f" * 5000, 1))
    assert fault.place.key == "flow"


@pytest.mark.parametrize("key", ["filter", "stages", "cell", "rate", "name", "note"])
def test_a_huge_number_for_any_key_is_a_fault(key, faults_of):
    detector = '{ detector = "UV", time_constant = "1 s", ' + f"{key} = 0x{'f' * 5000} }}"
    faults = faults_of(text_of([*GOOD[:3], detector]))
    assert {fault.place.key for fault in faults} == {key}


@pytest.mark.parametrize(
    ("part", "word"),
    [
        ('{ block = "4 uL^2", at_flow = "10 mL/min" }', "measured at"),
        ('{ tube = "valve", name = "line", length = "1 cm", bore = "0.2 mm" }', "second name"),
        ('{ detector = "big", cell = "800 uL", time_constant = "1 s" }', "large for a column"),
    ],
)
def test_slips_of_the_second_trial(part, word):
    warnings = answer_of([*GOOD[:3], part, GOOD[3]]).warnings
    assert any(word in warning for warning in warnings), warnings


def test_a_measured_total_has_no_range():
    bare = '{ column = "4.6 x 100 mm", plates = 9000 }'
    found = answer_of([GOOD[0], COLUMN, bare, GOOD[3]], head=HEAD + 'pump_pressure = "120 bar"\n')
    total = found.pressure.total
    assert total.low == pytest.approx(total.high) == pytest.approx(120e5)


def assumed_of(*lines, part='{ inject = "20 uL" }', before=""):
    parts = ",\n".join(
        [*([before] if before else []), part, '{ tube = "20 cm x 0.2 mm" }', COLUMN, '{ detector = "MS" }']
    )
    text = "\n".join(['flow = "1 mL/min"', 'diffusion = "1e-9 m^2/s"', *lines]) + f"\npath = [\n{parts}\n]\n"
    return " ".join(assumption.text for assumption in parse(text, "f").assumed)


def test_what_is_assumed_of_injection_and_tubes_is_what_their_ranges_are():
    viscous = 'viscosity = "1 cP"'
    assert "goes to a bend" in assumed_of(viscous)
    assert "goes to a bend" not in assumed_of()  # no viscosity, no bends
    assert "bent like that" in assumed_of(viscous, 'bend_radius = "4 cm"')
    assert "bent like that" not in assumed_of('bend_radius = "4 cm"')
    assert "goes to V²/4" in assumed_of(viscous)
    known = '{ inject = "20 uL", loop = "50 uL", emptied = "reversed", volume_tolerance = "3 %" }'
    assert "goes to V²/4" not in assumed_of(viscous, part=known)
    assert "goes to V²/4" in assumed_of(viscous, before='{ tube = "9 cm x 0.2 mm", name = "from the pump" }')
