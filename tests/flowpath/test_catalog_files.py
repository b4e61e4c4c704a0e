"""Catalogs of the user's own, from the path file and from the command line."""

import pytest

from xcol.errors import InputError
from xcol.flowpath.reader import parse

MINE = """[[solute]]
name       = "our marker"
molar_mass = "310 g/mol"
diffusion  = "5.4e-10 m^2/s"
at         = "25 degC"
source     = "an invented notebook"

[[column]]
name     = "our C18"
bore     = "2.1 mm"
length   = "100 mm"
particle = "2.7 um"
packing  = "core-shell"
plates   = 17000
source   = "an invented certificate"
"""


def text(catalogs='catalogs = ["mine.toml"]', column='{ column = "our C18" }', peak='solute = "our marker"'):
    return f"""flow = "0.4 mL/min"
mobile_phase = "water"
{catalogs}
path = [ {{ inject = "2 uL" }}, {column}, {{ detector = "2 uL", time_constant = "0.1 s" }} ]
peaks = [ {{ k = 2, {peak} }} ]
"""


@pytest.fixture
def folder(tmp_path):
    (tmp_path / "mine.toml").write_text(MINE)
    return tmp_path


def test_own_rows_are_found_beside_the_path_file(folder):
    found = parse(text(), str(folder / "path.toml"))
    assert found.peaks[0].diffusion == pytest.approx(5.4e-10)
    bed = found.beds[0]
    assert (bed.bore, bed.length, bed.particle, bed.plates) == pytest.approx((2.1e-3, 0.1, 2.7e-6, 17000))
    assert bed.void_volume == pytest.approx(0.54 * 3.4636e-7, rel=1e-3)
    assert found.parts[1].name == "our C18"
    assert not [warning for warning in found.warnings if "mine" in warning]


def test_own_rows_are_found_by_the_command_line_s_name(folder):
    found = parse(text(""), "path.toml", [str(folder / "mine.toml")])
    assert found.peaks[0].diffusion == pytest.approx(5.4e-10)


def test_a_row_in_place_of_a_shipped_one_is_warned_of(folder):
    (folder / "mine.toml").write_text(MINE.replace("our marker", "caffeine"))
    found = parse(text(peak='solute = "caffeine"'), str(folder / "path.toml"))
    assert found.peaks[0].diffusion == pytest.approx(5.4e-10)
    assert any("caffeine" in warning and "mine.toml" in warning for warning in found.warnings)


def test_an_own_column_stands_even_where_its_name_reads_as_a_size(folder):
    (folder / "mine.toml").write_text(MINE.replace("our C18", "2.1 x 100 mm, 2.7 um"))
    found = parse(text(column='{ column = "2.1 x 100 mm, 2.7 um" }'), str(folder / "path.toml"))
    assert found.beds[0].plates == 17000
    assert found.beds[0].void_volume == pytest.approx(0.54 * 3.4636e-7, rel=1e-3)


def test_an_own_column_needs_no_packing(folder):
    (folder / "mine.toml").write_text(MINE.replace('packing  = "core-shell"\n', ""))
    found = parse(text(), str(folder / "path.toml"))
    assert found.beds[0].void_volume == pytest.approx(0.65 * 3.4636e-7, rel=1e-3)
    assert any("porosity" in assumption.text for assumption in found.assumed)


def test_shipped_columns_are_found_by_their_name():
    found = parse(text("", '{ column = "2.1 x 50 mm, 2.7 um, core-shell" }', 'molar_mass = "200 g/mol"'), "path.toml")
    assert found.beds[0].length == pytest.approx(0.05)
    assert found.beds[0].plates is None


@pytest.mark.parametrize(
    ("old", "new", "line", "key"),
    [
        ('"310 g/mol"', "310", 3, "molar_mass"),
        ('"310 g/mol"', '"310 g"', 3, "molar_mass"),
        ("[[column]]", "[[colum]]", 8, "colum"),
        ('"core-shell"', '"coreshel"', None, "packing"),
        ('"an invented certificate"', '""', 15, "source"),
        ('at         = "25 degC"\n', "", 1, "at"),
        ('"310 g/mol"', '"310 g/mol', 3, ""),
    ],
)
def test_an_invalid_row_is_named_by_file_and_line(folder, old, new, line, key):
    (folder / "mine.toml").write_text(MINE.replace(old, new))
    with pytest.raises(InputError) as caught:
        parse(text(), str(folder / "path.toml"))
    fault = next(fault for fault in caught.value.faults if fault.place.file.endswith("mine.toml"))
    assert (fault.place.line, fault.place.key) == (line, key)


def test_a_catalog_that_is_missing_or_wrong_is_named_alone(folder):
    """What it lacks would be missed all over the path."""
    for catalogs in ('["none.toml"]', '["mine.toml", "none.toml"]', '"none.toml"'):
        with pytest.raises(InputError) as caught:
            parse(text(f"catalogs = {catalogs}"), str(folder / "path.toml"))
        (fault,) = caught.value.faults
        assert fault.place.file.endswith("none.toml")
        assert "catalog" in fault.expected


def test_what_the_file_enters_stands_before_its_catalog(folder):
    column = '{ column = "our C18", plates = 9000, total_porosity = 0.6 }'
    found = parse(text(column=column), str(folder / "path.toml"))
    assert found.beds[0].plates == 9000
    assert found.beds[0].void_volume == pytest.approx(0.6 * 3.4636e-7, rel=1e-3)
    assert not any("17000" in assumption.text for assumption in found.assumed)
    assert any("17000" in assumption.text for assumption in parse(text(), str(folder / "path.toml")).assumed)


def test_an_own_column_may_have_all_that_a_certificate_has(folder):
    more = 'plates = 17000\nplates_at = "0.3 mL/min"\ntotal_porosity = "52 %"\nmax_pressure = "500 bar"'
    (folder / "mine.toml").write_text(MINE.replace("plates   = 17000", more))
    found = parse(text(), str(folder / "path.toml"))
    assert found.beds[0].plates_at == pytest.approx(0.3e-6 / 60)
    assert found.beds[0].void_volume == pytest.approx(0.52 * 3.4636e-7, rel=1e-3)
    assert found.parts[1].max_pressure == pytest.approx(500e5)
    curve = parse(text(column='{ column = "our C18", knox = { A = 1, B = 2, C = 0.1 } }'), str(folder / "path.toml"))
    assert curve.beds[0].plates is None


def test_a_misspelled_column_of_a_catalog_is_proposed(folder):
    with pytest.raises(InputError) as caught:
        parse(text(column='{ column = "our C8" }'), str(folder / "path.toml"))
    assert "our C18" in caught.value.faults[0].suggestion


def test_an_own_solute_is_small_or_globular_by_its_mass(folder):
    row = MINE.replace('diffusion  = "5.4e-10 m^2/s"\nat         = "25 degC"\n', "")
    for mass, author in (("310 g/mol", "Wilke"), ("31 kDa", "Young")):
        (folder / "mine.toml").write_text(row.replace("310 g/mol", mass))
        assert author in parse(text(), str(folder / "path.toml")).peaks[0].estimate.origin
