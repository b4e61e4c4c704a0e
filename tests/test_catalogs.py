"""Catalog files and their records."""

import pytest

from xcol import catalogs
from xcol.errors import InputError


@pytest.fixture
def other(tmp_path, monkeypatch):
    """Read catalogs from an empty folder of the test's own."""
    monkeypatch.setattr(catalogs, "_FOLDERS", (tmp_path,))
    for read in (catalogs.packings, catalogs.tubing):
        read.cache_clear()
    yield tmp_path
    for read in (catalogs.packings, catalogs.tubing):
        read.cache_clear()


def test_the_shipped_catalogs_are_read_and_every_row_has_a_source():
    for packing in catalogs.packings().values():
        assert packing.source
        assert packing.total_range[0] <= packing.total_porosity <= packing.total_range[1]
        assert packing.interstitial_range[0] <= packing.interstitial <= packing.interstitial_range[1]
    bores = [row.bore for row in catalogs.tubing()]
    assert bores == sorted(bores)
    assert any(bore == pytest.approx(0.254e-3) for bore in bores)
    assert all(row.source for row in catalogs.tubing())


def test_the_inches_on_a_reel_are_its_bore():
    reels = [row for row in catalogs.tubing() if row.reel_inches]
    assert len(reels) >= 6
    assert all(row.reel_inches * 0.0254 == pytest.approx(row.bore, rel=0.02) for row in reels)


GOOD = '[[tubing]]\nbore_mm = 0.1\nreel_in = 0.004\nsource = "a test"\n'


@pytest.mark.parametrize(
    ("old", "new", "key"),
    [
        ("0.1\n", '"0.1 mm"\n', "bore_mm"),
        ("0.1\n", "-1\n", "bore_mm"),
        ("0.1\n", "true\n", "bore_mm"),
        ("0.004", "0", "reel_in"),
        ('"a test"', '" "', "source"),
    ],
)
def test_an_invalid_row_is_named(other, old, new, key):
    (other / "tubing.toml").write_text(GOOD + GOOD.replace(old, new))
    with pytest.raises(InputError) as caught:
        catalogs.tubing()
    place = caught.value.faults[0].place
    assert (place.file, place.part, place.key) == ("tubing.toml", "row 2", key)


@pytest.mark.parametrize("span", ["0.6", "[0.6]", "[0.7, 0.6]", "[0.6, 1.2]", '["a", "b"]'])
def test_a_range_is_two_fractions(other, span):
    (other / "packings.toml").write_text(
        f'[[packing]]\nname = "a"\ntotal_porosity = 0.6\ntotal_range = {span}\ninterstitial = 0.4\n'
        'interstitial_range = [0.3, 0.5]\nsource = "a test"\n'
    )
    with pytest.raises(InputError) as caught:
        catalogs.packings()
    assert caught.value.faults[0].place.key == "total_range"


def test_a_catalog_that_cannot_be_read_and_none_at_all(other, monkeypatch):
    with pytest.raises(InputError):
        catalogs.tubing()
    (other / "tubing.toml").write_text("[[tubing]")
    with pytest.raises(InputError):
        catalogs.tubing()
    monkeypatch.setattr(catalogs, "_FOLDERS", (other / "missing",))
    with pytest.raises(InputError):
        catalogs.folder()
