"""From the text of a path file to the instrument, or to all of its faults."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from xcol.errors import InputError
from xcol.flowpath.file_keys import FILE_KEYS
from xcol.flowpath.reader import MOST_PARTS, parse

HEAD = 'flow = "0.5 mL/min"\nviscosity = "0.9 mPa s"\ndiffusion = "1e-9 m^2/s"\n'
INJECT = '  { inject = "2 uL" },\n'
COLUMN = '  { column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 },\n'
DETECTOR = '  { detector = "UV", cell = "2.5 uL", time_constant = "0.1 s" },\n'


def path(*parts, head=HEAD, tail=""):
    return head + "path = [\n" + "".join(parts) + "]\n" + tail


def test_a_plain_file(plain):
    instrument = parse(plain, "f.toml")
    assert instrument.flow == pytest.approx(0.5e-6 / 60)
    assert [part.kind for part in instrument.parts] == ["inject", "tube", "column", "tube", "detector"]
    assert [part.position for part in instrument.parts] == [1, 2, 3, 4, 5]
    assert [peak.k for peak in instrument.peaks] == [1, 4]
    assert instrument.parts[1].place.line == 6
    assert not instrument.warnings


def test_every_example_is_read_without_a_fault(examples):
    files = sorted(examples.glob("*.toml"))
    assert len(files) >= 7
    for file in files:
        text = file.read_text(encoding="utf-8")
        assert "nvented" in text.splitlines()[0]
        assert parse(text, file.name).parts


def test_tables_are_the_same_as_the_list(plain):
    lines = []
    for line in plain.splitlines():
        entry = line.strip().rstrip(",")
        if entry.startswith("{"):
            kind = "peaks" if "k =" in entry else "path"
            pairs = entry.strip("{} ").replace('", ', '"\n').replace("000, ", "000\n").replace("1, ", "1\n")
            lines.append(f"[[{kind}]]\n" + pairs.replace("4, ", "4\n"))
        elif entry not in ("path = [", "peaks = [", "]"):
            lines.append(line)
    tables, listed = parse("\n".join(lines), "f.toml"), parse(plain, "f.toml")
    assert [part.elements for part in tables.parts] == [part.elements for part in listed.parts]
    assert [(p.k, p.diffusion) for p in tables.peaks] == [(p.k, p.diffusion) for p in listed.peaks]


def test_the_kind_key_may_stand_anywhere_and_hold_size_or_name():
    short = parse(path(INJECT, '  { tube = "30 cm x 0.17 mm", name = "a" },\n', COLUMN, DETECTOR), "f")
    for entry in (
        '{ name = "a", tube = "30 cm x 0.17 mm" }',
        '{ bore = "0.17 mm", tube = "a", length = "30 cm" }',
        '{ length = "300 mm", bore = "170 um", name = "a", tube = "anything" }',
    ):
        long = parse(path(INJECT, f"  {entry},\n", COLUMN, DETECTOR), "f")
        assert long.parts[1].elements[0].length == pytest.approx(short.parts[1].elements[0].length)
        assert long.parts[1].elements[0].bore == pytest.approx(short.parts[1].elements[0].bore)
        assert long.parts[1].name == "a"


def test_a_name_may_begin_with_a_number_where_the_size_is_given():
    part = parse(path(INJECT, '  { fitting = "2 um frit", volume = "0.5 uL" },\n', COLUMN, DETECTOR), "f").parts[1]
    assert part.name == "2 um frit"
    assert part.elements[0].volume == pytest.approx(0.5e-9)


def test_without_peaks_four_retention_factors_are_shown_and_said_to_be_assumed():
    instrument = parse(path(INJECT, COLUMN, DETECTOR), "f")
    assert [peak.k for peak in instrument.peaks] == [1, 2, 5, 10]
    assert any("k = 1, 2, 5" in assumption.text for assumption in instrument.assumed)


def test_a_path_without_a_column_needs_none_unless_something_asks_for_one(faults_of):
    instrument = parse(path(INJECT, DETECTOR), "f")
    assert [peak.k for peak in instrument.peaks] == [None]
    for key in ("k = 1", 'retention = "1 min"', 'elution_volume = "1 mL"'):
        faults = faults_of(path(INJECT, DETECTOR, tail=f"peaks = [ {{ {key} }} ]\n"))
        assert len(faults) == 1
        assert "column" in faults[0].expected


# what is wrong with a file; the key (or "") and the line at which it is found
WRONG = {
    "no flow": (path(INJECT, COLUMN, DETECTOR, head='viscosity = "1 cP"\ndiffusion = "1e-9 m^2/s"\n'), "flow", None),
    "bare flow": (path(INJECT, COLUMN, DETECTOR).replace('"0.5 mL/min"', "0.5"), "flow", 1),
    "flow is a volume": (path(INJECT, COLUMN, DETECTOR).replace('"0.5 mL/min"', '"0.5 mL"'), "flow", 1),
    "negative flow": (path(INJECT, COLUMN, DETECTOR).replace('"0.5', '"-0.5'), "flow", 1),
    "flow too large for the column": (path(INJECT, COLUMN, DETECTOR).replace('"0.5', '"300'), "flow", 1),
    "flow too small for the column": (path(INJECT, COLUMN, DETECTOR).replace("0.5 mL", "0.05 uL"), "flow", 1),
    "no path": (HEAD, "path", None),
    "path is a text": (HEAD + 'path = "x"\n', "path", 4),
    "empty path": (HEAD + "path = []\n", "path", 4),
    "no injection": (path(COLUMN, DETECTOR), "path", 4),
    "no detector": (path(INJECT, COLUMN), "path", 4),
    "two injections": (path(INJECT, INJECT, COLUMN, DETECTOR), "inject", 6),
    "detector first": (path(DETECTOR, INJECT), "path", 4),
    "column behind the detector": (path(INJECT, DETECTOR, COLUMN), "", 7),
    "unknown key of the file": (path(INJECT, COLUMN, DETECTOR, head=HEAD + 'tempreature = "30 C"\n'), "tempreature", 4),
    "unknown kind": (path(INJECT, '  { injekt = "2 uL" },\n', COLUMN, DETECTOR), "", 6),
    "unknown key": (path(INJECT, COLUMN.replace("plates", "plats"), DETECTOR), "plats", 6),
    "two kinds": (path(INJECT, '  { tube = "3 cm x 1 mm", mixer = "1 uL" },\n', COLUMN, DETECTOR), "mixer", 6),
    "empty part": (path(INJECT, "  { },\n", COLUMN, DETECTOR), "", 6),
    "part is a text": (path(INJECT, '  "tube",\n', COLUMN, DETECTOR), "", 6),
    "no unit": (path(INJECT, '  { tube = "30 cm x 0.17" },\n', COLUMN, DETECTOR), "tube", 6),
    "number for a size": (path("  { inject = 2 },\n", COLUMN, DETECTOR), "inject", 5),
    "bool for a size": (path("  { inject = true },\n", COLUMN, DETECTOR), "inject", 5),
    "list for a size": (path("  { inject = [2] },\n", COLUMN, DETECTOR), "inject", 5),
    "negative size": (path('  { inject = "-2 uL" },\n', COLUMN, DETECTOR), "inject", 5),
    "absurd size": (path('  { inject = "2 m^3" },\n', COLUMN, DETECTOR), "inject", 5),
    "outside diameter": (path(INJECT, '  { tube = "30 cm x 1/16 in" },\n', COLUMN, DETECTOR), "tube", 6),
    "bore of zero": (path(INJECT, '  { tube = "30 cm x 0 mm" },\n', COLUMN, DETECTOR), "tube", 6),
    "name and no size": (path(INJECT, '  { tube = "to column" },\n', COLUMN, DETECTOR), "tube", 6),
    "half a size": (path(INJECT, '  { tube = "to column", bore = "1 mm" },\n', COLUMN, DETECTOR), "", 6),
    "size twice": (path(INJECT, '  { tube = "3 cm x 1 mm", bore = "1 mm" },\n', COLUMN, DETECTOR), "bore", 6),
    "three sizes": (
        path(INJECT, '  { tube = "a", bore = "1 mm", length = "3 cm", volume = "1 uL" },\n', COLUMN, DETECTOR), "", 6
    ),
    "two ways to a size": (
        path(INJECT, '  { fitting = "a", volume = "1 uL", gap = "1 mm" },\n', COLUMN, DETECTOR), "", 6
    ),
    "more than the loop holds": (path('  { inject = "20 uL", loop = "10 uL" },\n', COLUMN, DETECTOR), "loop", 5),
    "no plates and no particle": (path(INJECT, '  { column = "2.1 x 100 mm" },\n', DETECTOR), "plates", 6),
    "no plates of a packing without a curve": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", packing = "SEC" },\n', DETECTOR), "plates", 6
    ),
    "unknown packing": (path(INJECT, COLUMN.replace("plates", 'packing = "shell", plates'), DETECTOR), "packing", 6),
    "half a curve": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", knox = { A = 1, B = 2 } },\n', DETECTOR), "knox", 6
    ),
    "a curve that is none": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", knox = [1, 2, 3] },\n', DETECTOR), "knox", 6
    ),
    "unknown key of a curve": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", knox = { A = 1, B = 2, D = 3 } },\n', DETECTOR), "knox.D", 6
    ),
    "a curve below h = 1": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", knox = { A = 0, B = 0, C = 0 } },\n', DETECTOR), "knox", 6
    ),
    "plates_at without plates": (
        path(INJECT, '  { column = "2.1 x 100 mm, 3 um", plates_at = "0.5 mL/min" },\n', DETECTOR), "plates_at", 6
    ),
    "plates_at without a particle": (
        path(INJECT, '  { column = "2.1 x 100 mm", plates = 9000, plates_at = "1 mL/min" },\n', DETECTOR),
        "plates_at", 6,
    ),
    "bend radius and coil": (
        path(INJECT, '  { tube = "3 cm x 1 mm", bend_radius = "3 cm", coil_diameter = "6 cm" },\n', COLUMN, DETECTOR),
        "coil_diameter", 6,
    ),
    "bend radius and coil of the file": (
        path(INJECT, COLUMN, DETECTOR, head=HEAD + 'bend_radius = "3 cm"\ncoil_diameter = "6 cm"\n'), "coil_diameter", 5
    ),
    "a bend as wide as the bore": (
        path(INJECT, '  { tube = "3 cm x 1 mm", bend_radius = "1 mm" },\n', COLUMN, DETECTOR), "bend_radius", 6
    ),
    "a bend without a unit": (
        path(INJECT, '  { tube = "3 cm x 1 mm", bend_radius = 3 },\n', COLUMN, DETECTOR), "bend_radius", 6
    ),
    "a bend of a fitting": (
        path(INJECT, '  { fitting = "1 uL", bend_radius = "3 cm" },\n', DETECTOR), "bend_radius", 6
    ),
    "a bend of a loop of unknown bore": (
        path('  { inject = "2 uL", loop = "9 uL", coil_diameter = "4 cm" },\n', COLUMN, DETECTOR), "coil_diameter", 5
    ),
    "filled without a loop": (path('  { inject = "2 uL", filled = "full" },\n', COLUMN, DETECTOR), "filled", 5),
    "emptied without a loop": (path('  { inject = "2 uL", emptied = "reversed" },\n', COLUMN, DETECTOR), "emptied", 5),
    "a full loop of which a part is injected": (
        path('  { inject = "2 uL", loop = "9 uL", filled = "full" },\n', COLUMN, DETECTOR), "filled", 5
    ),
    "the same way through a loop of unknown bore": (
        path('  { inject = "2 uL", loop = "9 uL", emptied = "same way" },\n', COLUMN, DETECTOR), "emptied", 5
    ),
    "emptied in another word": (
        path('  { inject = "2 uL", loop = "9 uL", emptied = "slowly" },\n', COLUMN, DETECTOR), "emptied", 5
    ),
    "a loop's bore without a unit": (
        path('  { inject = "2 uL", loop = "9 uL x 0.5" },\n', COLUMN, DETECTOR), "loop", 5
    ),
    "response and rise time": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", response = "0.2 s"')), "response", 7
    ),
    "a form of response": (
        path(INJECT, COLUMN, '  { detector = "UV", response = "1 s", filter = "boxcar" },\n'), "filter", 7
    ),
    "filters beside a time constant": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", filters = [{ rise_time = "1 s" }]')),
        "time_constant", 7,
    ),
    "filters beside stages": (
        path(INJECT, COLUMN, '  { detector = "UV", stages = 2, filters = [{ rise_time = "1 s" }] },\n'), "stages", 7
    ),
    "a port beside a volume": (
        path(INJECT, '  { fitting = "1 uL", port = "1/16 in" },\n', COLUMN, DETECTOR), "port", 6
    ),
    "the file's bend as wide as a bore": (
        path(INJECT, '  { tube = "3 cm x 1 mm" },\n', COLUMN, DETECTOR, head=HEAD + 'bend_radius = "1 mm"\n'),
        "bend_radius", 4,
    ),
    "a coil as wide as the loop's bore": (
        path('  { inject = "9 uL", loop = "9 uL x 1 mm", coil_diameter = "2 mm" },\n', COLUMN, DETECTOR),
        "coil_diameter", 5,
    ),
    "a filter of the list without a time": (
        path(INJECT, COLUMN, '  { detector = "UV", filters = [{ filter = "boxcar" }] },\n'), "filters[1].filter", 7
    ),
    "an empty filter of the list": (
        path(INJECT, COLUMN, '  { detector = "UV", filters = [{ }] },\n'), "filters[1]", 7
    ),
    "an empty list of filters": (path(INJECT, COLUMN, '  { detector = "UV", filters = [] },\n'), "filters", 7),
    "unknown key of a filter": (
        path(INJECT, COLUMN, '  { detector = "UV", filters = [{ rise = "1 s" }] },\n'), "filters[1].rise", 7
    ),
    "a dwell longer than the period": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", rate = "5 Hz", dwell = "0.5 s"')), "dwell", 7
    ),
    "a volume that keeps its layers": (
        path(INJECT, '  { fitting = "1 uL", remix = false },\n', COLUMN, DETECTOR), "remix", 6
    ),
    "remix in a word": (path(INJECT, '  { fitting = "1 uL", remix = "no" },\n', COLUMN, DETECTOR), "remix", 6),
    "tolerance as a length": (
        path(INJECT, '  { tube = "3 cm x 1 mm", bore_tolerance = "5 um" },\n', COLUMN, DETECTOR), "bore_tolerance", 6
    ),
    "unknown liquid": (path(INJECT, COLUMN, DETECTOR, head=HEAD + 'mobile_phase = "beer"\n'), "mobile_phase", 4),
    "a mobile phase without parts": (
        path(INJECT, COLUMN, DETECTOR, head=HEAD + 'mobile_phase = "water/ACN"\n'), "mobile_phase", 4
    ),
    "far too hot": (
        path(INJECT, COLUMN, DETECTOR, head='flow = "0.5 mL/min"\nmobile_phase = "hexane"\ntemperature = "200 C"\n'),
        "temperature", 3,
    ),
    "catalogs is a number": (path(INJECT, COLUMN, DETECTOR, head=HEAD + "catalogs = 3\n"), "catalogs", 4),
    "plates above length over particle": (path(INJECT, COLUMN.replace("12000", "120000"), DETECTOR), "plates", 6),
    "particle in mm": (path(INJECT, COLUMN.replace("3 um", "3 mm"), DETECTOR), "column", 6),
    "total porosity of 65": (path(INJECT, COLUMN.replace("0.6 ", "65 "), DETECTOR), "total_porosity", 6),
    "void volume above the empty column": (
        path(INJECT, COLUMN.replace("total_porosity = 0.6", 'void_volume = "2 mL"'), DETECTOR), "void_volume", 6
    ),
    "porosity and void volume": (
        path(INJECT, COLUMN.replace("0.6 ", '0.6, void_volume = "0.2 mL" '), DETECTOR), "total_porosity", 6
    ),
    "cell of an absurd bore": (
        path(INJECT, COLUMN, DETECTOR.replace("cell", 'path_length = "1 m", cell').replace("2.5 uL", "1 nL").replace(
            "1 m\"", "900 mm\"").replace("1 nL", "0.05 nL")), "path_length", 7
    ),
    "time constant and rise time": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", rise_time = "0.2 s"')), "rise_time", 7
    ),
    "time constant of a boxcar": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", filter = "boxcar"')), "time_constant", 7
    ),
    "stages of a gaussian": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", filter = "gaussian", stages = 2')), "stages", 7
    ),
    "a filter without a time": (path(INJECT, COLUMN, '  { detector = "MS", filter = "gaussian" },\n'), "filter", 7),
    "rate and cycle": (
        path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', '"0.1 s", rate = "5 Hz", cycle = "0.2 s"')), "cycle", 7
    ),
    "tanks of no cell": (path(INJECT, COLUMN, '  { detector = "MS", tanks = 2 },\n'), "tanks", 7),
    "a wavelength for a cell": (path(INJECT, COLUMN, '  { detector = "254 nm" },\n'), "detector", 7),
    "no diffusion": (
        path(INJECT, COLUMN, DETECTOR, head=HEAD.replace('diffusion = "1e-9 m^2/s"\n', "")), "diffusion", None
    ),
    "peaks is a number": (path(INJECT, COLUMN, DETECTOR, tail="peaks = 2\n"), "peaks", 9),
    "peak is a number": (path(INJECT, COLUMN, DETECTOR, tail="peaks = [ 2 ]\n"), "", 9),
    "peak without a place": (path(INJECT, COLUMN, DETECTOR, tail='peaks = [ { name = "a" } ]\n'), "", 9),
    "peak with two places": (
        path(INJECT, COLUMN, DETECTOR, tail='peaks = [ { k = 1, retention = "2 min" } ]\n'), "retention", 9
    ),
    "negative k": (path(INJECT, COLUMN, DETECTOR, tail="peaks = [ { k = -1 } ]\n"), "k", 9),
    "retention before the hold-up": (
        path(INJECT, COLUMN, DETECTOR, tail='peaks = [ { retention = "5 s" } ]\n'), "retention", 9
    ),
    "elution volume before the hold-up": (
        path(INJECT, COLUMN, DETECTOR, tail='peaks = [ { elution_volume = "50 uL" } ]\n'), "elution_volume", 9
    ),
    "unknown key of a peak": (path(INJECT, COLUMN, DETECTOR, tail="peaks = [ { k = 1, kk = 2 } ]\n"), "kk", 9),
    "cm2/s for m2/s": (
        path(INJECT, COLUMN, DETECTOR, tail='peaks = [ { k = 1, diffusion = "1e-5 m^2/s" } ]\n'), "diffusion", 9
    ),
    "too many plates for a peak": (
        path(INJECT, COLUMN, DETECTOR, tail="peaks = [ { k = 1, plates = 99999 } ]\n"), "plates", 9
    ),
    "a header that swallows the path": (
        'flow = "1 mL/min"\n[conditions]\n' + path(INJECT, COLUMN, DETECTOR, head=""), "path", 3
    ),
}  # fmt: skip


@pytest.mark.parametrize(("text", "key", "line"), WRONG.values(), ids=WRONG.keys())
def test_what_is_wrong_is_found_at_its_place(text, key, line, faults_of):
    faults = faults_of(text)
    found = [fault for fault in faults if fault.place.key == key and fault.place.line == line]
    assert found, [str(fault.place) for fault in faults]
    for fault in faults:
        assert fault.place.file == "file.toml"
        assert fault.read
        assert fault.expected
        assert fault.suggestion
        if fault.place.line and fault.place.key not in ("path", "peaks", "tempreature", "conditions", *FILE_KEYS):
            assert fault.place.part


LATER = {
    **{
        key: path(INJECT, COLUMN, DETECTOR, head=HEAD + f"{key} = {value}\n")
        for key, value in {
            "gradient": '{ from = "5 %" }',
            "sample_solvent": '"water"', "require": '{ plates_kept = "90 %" }',
            "runs": "[]",
        }.items()
    },
    **{
        key: path(INJECT, COLUMN, DETECTOR, tail=f"peaks = [ {{ k = 1, {key} = {value} }} ]\n")
        for key, value in {
            "k_start": "5", "S": "4", "k_in_sample": "2",
        }.items()
    },
    **{
        f"detector {key}": path(INJECT, COLUMN, DETECTOR.replace('"0.1 s"', f'"0.1 s", {key} = {value}'))
        for key, value in {"flow": '"1 mL/min"'}.items()
    },
    **{
        f"column {key}": path(INJECT, COLUMN.replace("12000", f"12000, {key} = {value}"), DETECTOR)
        for key, value in {"role": '"guard"', "k_factor": "1"}.items()
    },
    **{
        f"inject {key}": path(f'  {{ inject = "2 uL", {key} = {value} }},\n', COLUMN, DETECTOR)
        for key, value in {"loop_in_line": "true", "fraction": "{}"}.items()
    },
    **{
        kind: path(INJECT, COLUMN, f"  {{ {kind} = {value} }},\n", DETECTOR)
        for kind, value in {
            "split": '"tee", fraction = "45 %"', "addition": '"0.1 mL/min"', "switch": '"valve"',
        }.items()
    },
}  # fmt: skip


@pytest.mark.parametrize(("key", "text"), LATER.items(), ids=LATER.keys())
def test_what_is_not_computed_yet_is_refused_not_ignored(key, text, faults_of):
    (fault,) = faults_of(text)
    assert fault.place.key == key.split()[-1]
    assert "not yet" in fault.expected


def test_remix_true_is_what_a_fitting_does():
    assert parse(path(INJECT, '  { fitting = "1 uL", remix = true },\n', COLUMN, DETECTOR), "f").parts[1]


def test_all_faults_come_together_in_the_order_of_the_file(faults_of):
    text = path(
        '  { inject = 2 },\n', '  { tube = "30 cm x 0.17" },\n', '  { injekt = "2 uL" },\n',
        '  { column = "2.1 x 100 mm, 3 um", plates = 12000, porosity = 0.6 }\n', DETECTOR.replace("s\"", "mm\""),
        head="flow = 1.0 mL/min\n",
    )  # fmt: skip
    faults = faults_of(text)
    assert faults[0].place.key == "diffusion"  # nowhere, so it has no line
    lines = [fault.place.line for fault in faults[1:]]
    assert lines == sorted(lines)
    assert lines == [1, 3, 4, 5, 6, 6, 7]


def test_a_flow_that_cannot_be_is_found_beside_other_faults(faults_of):
    text = path(INJECT, '  { tube = "30 cm" },\n', COLUMN, DETECTOR).replace("0.5 mL/min", "300 mL/min")
    assert {fault.place.key for fault in faults_of(text)} == {"flow", "tube"}


def test_no_peaks_are_no_peaks_however_they_are_written(faults_of):
    assert len(parse(path(INJECT, COLUMN, DETECTOR, tail="peaks = []\n"), "f").peaks) == 4
    bare = path(INJECT, COLUMN, DETECTOR, head='flow = "0.5 mL/min"\n', tail="peaks = []\n")
    assert [fault.place.key for fault in faults_of(bare)] == ["diffusion"]


def test_near_words_are_proposed(faults_of):
    for wrong, right in (
        ("tempreature", "temperature"), ("flow_rate", "flow"), ("eluent", "mobile_phase"), ("visocsity", "viscosity"),
    ):  # fmt: skip
        faults = faults_of(path(INJECT, COLUMN, DETECTOR, head=HEAD + f'{wrong} = "x"\n'))
        assert faults[0].suggestion.startswith(right)
    for wrong, right in (
        ("capillary", "tube"),
        ("union", "fitting"),
        ("detecter", "detector"),
        ("waste", "outlet"),
    ):
        faults = faults_of(path(INJECT, f'  {{ {wrong} = "1 uL" }},\n', COLUMN, DETECTOR))
        assert right in faults[0].suggestion


def test_a_path_of_too_many_parts_is_refused(faults_of):
    faults = faults_of(path(INJECT, *['  { mixer = "1 uL" },\n'] * MOST_PARTS, DETECTOR))
    assert len(faults) == 1


SYMBOLS = [
    '"',
    "}",
    "{",
    ",",
    "=",
    "]",
    "[",
    "\n",
    "x",
    "”",
    " ",
    "0",
    "-",
    "mm",
    "1e999",
    "nan",
    "true",
    "#",
    ".",
    "'",
]


PEAKS = 'peaks = [ { name = "a", k = 1 }, { retention = "2 min" } ]\n'
BY_NAME = path(
    INJECT, '  { column = "2.1 x 100 mm, 3 um", packing = "core-shell" },\n', DETECTOR,
    head='flow = "0.5 mL/min"\nmobile_phase = "0.1 % formic acid in water/ACN 60:40"\nambient = "22 degC"\n',
    tail='peaks = [ { k = 1, solute = "caffeine" }, { k = 2, molar_mass = "1 kDa", molecule = "small" },'
    ' { k = 2, diffusion = "1e-9 m^2/s", at = { temperature = "30 C" } } ]\n',
)  # fmt: skip


@settings(max_examples=600)
@given(
    by_name=st.booleans(),
    cuts=st.lists(
        st.tuples(st.floats(0, 1), st.integers(0, 4), st.sampled_from(["", *SYMBOLS])), min_size=1, max_size=4
    ),
)
def test_a_file_with_anything_cut_out_or_put_in_is_read_or_refused(by_name, cuts):
    text = BY_NAME if by_name else path(INJECT, COLUMN, DETECTOR, tail=PEAKS)
    for where, cut, put in cuts:
        at = int(where * len(text))
        text = text[:at] + put + text[at + cut :]
    try:
        instrument = parse(text, "f")
    except InputError as error:
        faults = error.faults
        text = str(error)
    else:
        faults, text = (), ""
        assert instrument.detectors
    assert bool(faults) == bool(text)
