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


def test_a_missing_catalog_is_named_beside_the_file_s_own_faults(folder):
    with pytest.raises(InputError) as caught:
        parse(text('catalogs = ["none.toml"]', peak="kk = 2"), str(folder / "path.toml"))
    places = {(fault.place.file.rsplit("/")[-1], fault.place.key) for fault in caught.value.faults}
    assert ("none.toml", "") in places
    assert ("path.toml", "kk") in places
