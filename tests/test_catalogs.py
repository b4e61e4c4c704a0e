"""Catalog files and their records."""

import dataclasses
import re
import tomllib

import pytest

from xcol import catalogs
from xcol.catalog_kinds import COLUMNS, KINDS, MATERIALS, MIXTURES, PACKINGS, SOLUTES, SOLVENTS, TUBING
from xcol.catalogs import Catalogs
from xcol.errors import InputError
from xcol.flowpath.composition import read_composition, water_of
from xcol.liquids.viscosity import organic_viscosity

KNOWN = Catalogs()


@pytest.fixture
def other(tmp_path, monkeypatch):
    """Read catalogs from an empty folder of the test's own."""
    monkeypatch.setattr(catalogs, "_FOLDERS", (tmp_path,))
    catalogs._shipped.cache_clear()
    yield tmp_path
    catalogs._shipped.cache_clear()


@pytest.mark.parametrize("kind", KINDS, ids=[kind.name for kind in KINDS])
def test_the_shipped_catalogs_are_read_and_every_row_has_a_name_of_its_own_and_a_source(kind):
    rows = KNOWN.rows(kind)
    assert len(rows) >= 3
    assert all(row.source and not row.file for row in rows)
    names = [catalogs.normal(name) for row in rows for name in (row.name, *row.also)]
    assert len(set(names)) == len(names)
    for row in rows:
        assert all(KNOWN.find(kind, name) is row for name in (row.name, *row.also, row.name.upper()))


def test_what_rows_refer_to_is_there():
    for column in KNOWN.rows(COLUMNS):
        assert KNOWN.find(PACKINGS, column.packing)
    for mixture in KNOWN.rows(MIXTURES):
        assert KNOWN.find(SOLVENTS, mixture.liquid)
    for tubing in KNOWN.rows(TUBING):
        assert tubing.materials
        assert all(KNOWN.find(MATERIALS, name) for name in tubing.materials)
    for material in KNOWN.rows(MATERIALS):
        assert all(KNOWN.find(SOLVENTS, name) for name in material.avoid)


def test_values_lie_within_their_ranges():
    for packing in KNOWN.rows(PACKINGS):
        assert packing.total_range[0] <= packing.total_porosity <= packing.total_range[1]
        assert packing.interstitial_range[0] <= packing.interstitial_porosity <= packing.interstitial_range[1]
        assert packing.interstitial_porosity < packing.total_porosity
        if packing.knox:
            ends = zip(packing.knox_best, packing.knox, packing.knox_worst, strict=True)
            assert all(best < usual < worst for best, usual, worst in ends)
    for column in KNOWN.rows(COLUMNS):
        assert column.particle < column.bore < column.length


def test_the_inches_on_a_reel_are_its_bore_and_no_row_is_named_by_a_colour():
    reels = [row for row in KNOWN.rows(TUBING) if row.reel_inches]
    assert len(reels) >= 6
    assert all(row.reel_inches * 0.0254 == pytest.approx(row.bore, rel=0.02) for row in reels)
    bores = [row.bore for row in KNOWN.rows(TUBING)]
    assert bores == sorted(bores)
    assert any(bore == pytest.approx(0.254e-3) for bore in bores)
    words = " ".join(name.lower() for kind in KINDS for row in KNOWN.rows(kind) for name in (row.name, *row.also))
    assert not re.search(r"\b(red|yellow|blue|orange|green|black|natural|grey|gray)\b", words)


# Atomic weights (IUPAC, conventional, from memory), and Le Bas increments in cm³/mol (from memory).
ATOMS = {"C": 12.011, "H": 1.008, "N": 14.007, "O": 15.999, "S": 32.06}
LE_BAS = {
    "C": 14.8, "H": 3.7, "O": 7.4, "O of a methyl ester": 9.1, "O of a higher ester": 11.0, "O of an acid": 12.0,
    "N secondary": 12.0, "ring of six": -15.0, "naphthalene ring": -30.0, "anthracene ring": -47.5,
}  # fmt: skip


def test_molar_masses_are_those_of_the_formulas():
    named = [row for row in KNOWN.rows(SOLUTES) if row.formula]
    assert len(named) >= 30
    for row in named:
        atoms = re.findall(r"([A-Z][a-z]?)(\d*)", row.formula)
        mass = sum(ATOMS[atom] * int(count or 1) for atom, count in atoms)
        assert row.molar_mass * 1e3 == pytest.approx(mass, abs=0.05), row.name


def test_molar_volumes_are_those_of_the_increments_that_the_source_states():
    counted = 0
    for row in KNOWN.rows(SOLUTES):
        if "increments" in row.source:
            total, atoms = 0.0, {}
            for piece in row.source.split(": ", 2)[-1].split(", "):
                count, name = re.fullmatch(r"(\d+ )?(.+)", piece).groups()
                total += int(count or 1) * LE_BAS[name]
                if count:
                    atoms[name[0]] = atoms.get(name[0], 0) + int(count)
            assert row.molar_volume * 1e6 == pytest.approx(total), row.name
            formula = {atom: int(count or 1) for atom, count in re.findall(r"([A-Z])(\d*)", row.formula)}
            assert atoms == formula, row.name
            counted += 1
    assert counted >= 10


GOOD = (
    '[[tubing]]\nbore = "0.1 mm"\nreel = "0.004 in"\ntolerance = "5 %"\ntolerance_from = "assumed"\nsource = "a test"\n'
)


@pytest.mark.parametrize(
    ("old", "new", "key"),
    [
        ('"0.1 mm"', "0.1", "bore"),
        ('"0.1 mm"', '"0.1"', "bore"),
        ('"0.1 mm"', '"0.1 s"', "bore"),
        ('"0.1 mm"', '"-1 mm"', "bore"),
        ('"0.1 mm"', "true", "bore"),
        ('bore = "0.1 mm"', "", "bore"),
        ('"0.004 in"', '"0 in"', "reel"),
        ('"5 %"', '"300 %"', "tolerance"),
        ('"a test"', '" "', "source"),
        ('source = "a test"', "", "source"),
        ("tolerance_from", "tolerance_form", "tolerance_from"),
        ('source = "a test"', 'source = "a test"\ncolour = "red"', "colour"),
        ('source = "a test"', 'source = "a test"\nmaterials = "steel"', "materials"),
        ('source = "a test"', 'source = "a test"\nalso = [1]', "also"),
    ],
)
def test_an_invalid_row_is_named_by_file_and_line(other, old, new, key):
    (other / "tubing.toml").write_text("# a comment\n" + GOOD + "\n" + GOOD.replace(old, new))
    with pytest.raises(InputError) as caught:
        Catalogs().rows(TUBING)
    faults = caught.value.faults
    assert {(fault.place.file, fault.place.line) for fault in faults} == {("tubing.toml", 9)}
    assert key in [fault.place.key for fault in faults]
    assert all(fault.expected for fault in faults)


PACKING = (
    '[[packing]]\nname = "a"\ntotal_porosity = 0.6\ntotal_range = [0.5, 0.7]\ninterstitial_porosity = 0.4\n'
    'interstitial_range = [0.3, 0.5]\nsource = "a test"\n'
)


@pytest.mark.parametrize("span", ["0.6", "[0.6]", "[0.7, 0.6]", "[0.6, 1.2]", '["a", "b"]', "[true, 0.5]"])
def test_a_range_is_two_fractions(other, span):
    (other / "packings.toml").write_text(PACKING.replace("[0.5, 0.7]", span))
    with pytest.raises(InputError) as caught:
        Catalogs().rows(PACKINGS)
    assert caught.value.faults[0].place.key == "total_range"


CURVE = "{ A = 1, B = 2, C = 0.1 }"


@pytest.mark.parametrize(
    ("more", "key"),
    [
        ("knox = [1, 2, 3]", "knox"),
        ("knox = { A = 1, B = 2 }", "knox"),
        ("knox = { A = 0, B = 2, C = 3 }", "knox"),
        ("knox = { A = 1, B = -2, C = 3 }", "knox"),
        ("knox = { A = 1, B = nan, C = 3 }", "knox"),
        ("knox = { A = 1, B = 2, C = 3, D = 4 }", "knox"),
        ('knox = { A = 1, B = 2, C = 3, velocity = "fast" }', "knox"),
        (f"knox = {CURVE}\nknox_best = {{ A = 2, B = 2, C = 0.1 }}", "knox"),
        (f"knox = {CURVE}\nknox_worst = {{ A = 0.5, B = 2, C = 0.1 }}", "knox"),
        ("interstitial_porosity = 0.6", "interstitial_porosity"),
    ],
)
def test_a_packing_s_curves_and_porosities_go_together(other, more, key):
    text = PACKING if "inter" not in more else PACKING.replace("interstitial_porosity = 0.4\n", "")
    (other / "packings.toml").write_text(f"{text}{more}\n")
    with pytest.raises(InputError) as caught:
        Catalogs().rows(PACKINGS)
    assert caught.value.faults[0].place.key == key


def test_a_curve_alone_has_no_range(other):
    (other / "packings.toml").write_text(f"{PACKING}knox = {CURVE}\n")
    (packing,) = Catalogs().rows(PACKINGS)
    assert packing.knox == packing.knox_best == packing.knox_worst == (1, 2, 0.1)
    assert packing.velocity == "hold-up"


def test_a_solute_needs_a_mass_or_a_measured_value_and_that_its_temperature(other):
    for text in ('[[solute]]\nname = "a"\nsource = "b"\n',
                 '[[solute]]\nname = "a"\nsource = "b"\ndiffusion = "1e-9 m^2/s"\n'):  # fmt: skip
        (other / "solutes.toml").write_text(text)
        with pytest.raises(InputError) as caught:
            Catalogs().rows(SOLUTES)
        assert caught.value.faults[0].place.key in ("molar_mass", "at")


SOLVENT = {
    "name": "x", "molar_mass": "100 g/mol", "density": "900 kg/m^3", "expansion": 1e-3, "association": 1.0,
    "viscosity": [-4.0, 1.0, 0.0], "span": ["10 degC", "80 degC"], "uncertainty": "5 %", "source": "a test",
}  # fmt: skip


@pytest.mark.parametrize(
    ("key", "value"),
    [
        ("viscosity", [1, 2]),
        ("viscosity", [50.0, 1.0, 0.0]),
        ("viscosity", [float("nan"), 1.0, 0.0]),
        ("viscosity", [1e9, 1.0, 0.0]),
        ("viscosity", "thick"),
        ("viscosity", [["20 degC", "1 mPa s"]]),
        ("viscosity", [["20 degC", "1 mPa s"], ["20 degC", "1.1 mPa s"]]),
        ("viscosity", [["20 degC", "1 bar"], ["30 degC", "1.1 mPa s"]]),
        ("viscosity", [[20, 1], [30, 1]]),
        ("viscosity", [["20 degC", "1 mPa s"], ["40 degC", "1.4 mPa s"]]),
        ("viscosity", "1 mPa s"),
        ("mixes_with_water", "no"),
        pytest.param("name", int("f" * 5000, 16), id="huge"),
        ("expansion", float("inf")),
        ("expansion", 10**400),
        ("association", float("nan")),
        ("span", ["80 degC", "10 degC"]),
        ("span", [10, 80]),
        ("uncertainty", "300 %"),
        ("density", "900"),
    ],
)
def test_an_invalid_solvent_is_refused(key, value):
    lines = {"": 1, key: 2}
    found, faults = catalogs.records_of({"solvent": [SOLVENT]}, "f", "f", lambda table, number: lines)
    assert len(found) == 1
    assert not faults
    found, faults = catalogs.records_of({"solvent": [SOLVENT | {key: value}]}, "f", "f", lambda table, number: lines)
    assert not found
    assert {(fault.place.key, fault.place.line) for fault in faults} == {(key, 2)}


def test_all_invalid_rows_are_named_together(other):
    (other / "tubing.toml").write_text(GOOD.replace("0.1 mm", "0.1 s") + GOOD.replace("5 %", "5"))
    with pytest.raises(InputError) as caught:
        Catalogs().rows(TUBING)
    assert [fault.place.line for fault in caught.value.faults] == [1, 7]


def test_a_catalog_that_cannot_be_read_and_none_at_all(other, monkeypatch):
    with pytest.raises(InputError):
        Catalogs().rows(TUBING)
    (other / "tubing.toml").write_text("[[tubing]")
    with pytest.raises(InputError):
        Catalogs().rows(TUBING)
    monkeypatch.setattr(catalogs, "_FOLDERS", (other / "missing",))
    with pytest.raises(InputError):
        catalogs.folder()


def records(*tables):
    data = {}
    for table, row in tables:
        data.setdefault(table, []).append({"source": "a test", **row})
    found, faults = catalogs.records_of(data, "mine.toml", "mine.toml", lambda table, number: {"": number + 1})
    assert not faults
    return found


def test_own_rows_are_added_and_stand_in_place_of_shipped_ones():
    ours = {"name": "our marker", "molar_mass": "310 g/mol"}
    theirs = {"name": "Caffeine", "diffusion": "6.0e-10 m^2/s", "at": "20 degC"}
    known = Catalogs(records(("solute", ours), ("solute", theirs)))
    assert known.find(SOLUTES, "our marker").molar_mass == pytest.approx(0.31)
    assert known.find(SOLUTES, "caffeine").diffusion == pytest.approx(6e-10)
    assert len(known.rows(SOLUTES)) == len(KNOWN.rows(SOLUTES)) + 1
    (remark,) = known.remarks()
    assert "mine.toml" in remark
    assert '"Caffeine"' in remark


def test_a_later_row_of_the_same_name_stands_and_a_name_stands_before_another_s_other_name():
    first, second = ({"name": "x", "molar_mass": f"{mass} g/mol"} for mass in (100, 200))
    known = Catalogs(records(("solute", first), ("solute", second)))
    assert [row.molar_mass for row in known.rows(SOLUTES)[:2]] == pytest.approx([0.2, 0.03204])
    known = Catalogs(records(("solute", {"name": "BSA", "molar_mass": "66 kDa"})))
    assert known.find(SOLUTES, "bsa").diffusion is None
    assert known.find(SOLUTES, "bovine serum albumin").diffusion is None  # it takes over the other names


def test_two_rows_of_one_name_and_loose_ends_are_told():
    twins = records(("solute", {"name": "x", "molar_mass": "1 kDa"}), ("solute", {"name": "X", "molar_mass": "2 kDa"}))
    assert len(Catalogs(twins).remarks()) == 1
    loose = records(
        ("column", {"name": "c", "bore": "1 mm", "length": "1 cm", "particle": "3 um", "packing": "coreshel"}),
        ("mixture", {"name": "m", "liquid": "beer", "excess": [1, 0, 0, 0], "heat": 0, "span": ["1 degC", "2 degC"],
                     "uncertainty": "3 %", "far": "9 degC", "uncertainty_far": "5 %"}),
    )  # fmt: skip
    places = [(fault.place.file, fault.place.key) for fault in Catalogs(loose).loose_ends()]
    assert places == [("mine.toml", "packing"), ("mine.toml", "liquid")]
    assert not KNOWN.loose_ends()


def test_an_own_liquid_under_another_name_keeps_what_is_known_of_it():
    own = records(("solvent", {"name": "ACN", "molar_mass": "41 g/mol", "density": "0.78 g/mL",
                               "viscosity": [["20 degC", "0.36 mPa s"], ["40 degC", "0.30 mPa s"]]}))  # fmt: skip
    known = Catalogs(own)
    assert known.find(SOLVENTS, "acetonitrile").file == "mine.toml"
    mixed = read_composition("acetonitrile/water 40:60", known).phase.viscosity(298.15)
    assert mixed.uncertainty == pytest.approx(0.03)
    assert mixed.value * 1e3 == pytest.approx(0.88, abs=0.02)


def test_another_name_that_is_a_shipped_one_is_told_and_never_hides_a_shipped_liquid():
    row = {k: SOLVENT[k] for k in ("molar_mass", "density", "viscosity")}
    known = Catalogs(records(("solvent", row | {"name": "our diluent", "also": ["water", "ACN", "ours"]})))
    assert [remark.split('"')[1] for remark in known.remarks()] == ["water", "ACN"]
    phase = read_composition("ours/water 20:80", known).phase
    assert [component.solvent.name for component in phase.components] == ["our diluent", "water"]
    assert known.find(SOLVENTS, "ACN").name == "our diluent"
    assert known.find(SOLVENTS, "acetonitrile").name == "acetonitrile"


def test_an_own_water_is_still_water():
    for row in ({"viscosity": [["20 degC", "1.0 mPa s"], ["40 degC", "0.65 mPa s"]]}, {"viscosity": "IAPWS"}):
        for name in ("water", "H2O"):
            own = records(("solvent", {"name": name, "molar_mass": "18 g/mol", "density": "1 g/mL"} | row))
            known = Catalogs(own)
            assert water_of(known).is_water
            assert read_composition("hexane/water 90:10", known).warnings  # they do not mix
            mixed = read_composition("ACN/water 40:60", known).phase.viscosity(298.15)
            assert mixed.value * 1e3 == pytest.approx(0.885, abs=0.02)
            assert mixed.uncertainty == pytest.approx(0.03)


def test_another_liquid_may_have_the_formula_of_water_and_has_its_own_density():
    row = {"name": "heavy water", "molar_mass": "20.03 g/mol", "density": "1104 kg/m^3", "viscosity": "IAPWS"}
    phase = read_composition("heavy water", Catalogs(records(("solvent", row)))).phase
    assert phase.density(298.15) == pytest.approx(1104)
    assert not phase.is_water


def test_measured_points_give_a_viscosity():
    points = [["20 degC", "2.0 mPa s"], ["30 degC", "1.5 mPa s"], ["40 degC", "1.17 mPa s"]]
    (row,) = records(
        ("solvent", {"name": "x", "molar_mass": "100 g/mol", "density": "900 kg/m^3", "viscosity": points})
    )
    assert row.span == pytest.approx((293.15, 313.15))
    for temperature, viscosity in points:
        kelvin, expected = float(temperature.split()[0]) + 273.15, float(viscosity.split()[0])
        assert organic_viscosity(kelvin, row.viscosity) * 1e3 == pytest.approx(expected, rel=0.01)


def test_a_shipped_row_can_be_read_again_as_an_own_one():
    for kind in KINDS:
        row = KNOWN.rows(kind)[0]
        data = tomllib.loads(catalogs.row_text(row))
        (again,), faults = catalogs.records_of(data, "f", "f", lambda table, number: {})
        assert not faults
        assert again == dataclasses.replace(row, file="f")
        assert catalogs.row_text(again) == ""


def test_unknown_tables_are_refused():
    for data in ({"solvnt": [{}]}, {"solute": 3}, {"solute": [3]}, {"path": []}):
        found, faults = catalogs.records_of(data, "mine.toml", "mine.toml", lambda table, number: {})
        assert not found
        assert len(faults) == 1
        assert faults[0].place.file == "mine.toml"


def test_near_names_are_proposed():
    assert KNOWN.near(SOLUTES, "cafeine") == "caffeine"
    assert KNOWN.near(SOLVENTS, "acetonitril") == "acetonitrile"
    assert KNOWN.near(SOLVENTS, "qqqq") == ""
