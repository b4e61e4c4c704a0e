"""The short way to write sizes."""

import pytest

from xcol.flowpath.shorthand import column_size, length_first, tube_size
from xcol.units import UnitError


@pytest.mark.parametrize(
    "text",
    ["40 cm x 0.25 mm", "40cm x 0.25mm", "40 cm × 0.25 mm", "40 cm * 0.25 mm", "0.25 mm x 40 cm",
     "400 mm X 250 µm", "40 cm x 0,25 mm", "40 cm x 0.25 mm ID", "40 cm x 0.25 mm i.d.", "40 cm long x 0.25 mm bore",
     "0.4 m x0.25mm", "40cmx0.25mm"],
)  # fmt: skip
def test_tubes(text):
    assert tube_size(text) == pytest.approx({"length": 0.4, "bore": 0.25e-3})


@pytest.mark.parametrize(
    "text",
    ["4.6 x 150 mm, 5 um", "4.6x150mm, 5um", "4.6 mm x 150 mm, 5 µm", "4,6 x 150 mm, 5,0 um", "4.6 x 150 mm; 5 um",
     "150 x 4.6 mm, 5 um", "4.6 mm x 15 cm, 5 um", "4.6 × 150 mm, 5 um particles", "4.6 x 150 mm x 5 um",
     "4.6 x 150 mm,5 um"],
)  # fmt: skip
def test_columns(text):
    assert column_size(text) == pytest.approx({"bore": 4.6e-3, "length": 0.15, "particle": 5e-6})


def test_a_column_without_particle():
    assert column_size("2.1 x 50 mm") == pytest.approx({"bore": 2.1e-3, "length": 0.05})


def test_the_order_of_a_column_is_noticed_in_any_units():
    assert length_first("150 x 4.6 mm, 5 um")
    assert not length_first("4.6 x 150 mm, 5 um")
    assert not length_first("4.6 mm x 0.15 m, 5 um")


@pytest.mark.parametrize(
    "text",
    ["40 cm", "40 x 0.25 mm", "40 cm x 0.25", "40 x 0.25", "40 cm x 0.25 mm x 1/16 in", "40 cm x 1/16 in",
     "40 cm x 0.25 mm o.d.", "40 cm x 0.25 mm OD", "40 cm x 0.125 mm radius", "x", "", "40 cm x",
     "40 cm x 0.25 mm, 5 um", "-40 cm x 0.25 mm",
     "40 cm x 2 uL", "2 x 20 cm x 0.25 mm"],
)  # fmt: skip
def test_tubes_that_are_refused(text):
    with pytest.raises(UnitError) as caught:
        tube_size(text)
    assert caught.value.suggestion


@pytest.mark.parametrize(
    "text",
    ["4.6 x 150", "4.6 x 150, 5 um", "4.6 mm x 150, 5 um", "4.6 x 150 mm, 5", "4.6", "150 mm, 5 um",
     "4.6 x 150 mm, 5 um, 2", "2.1 x 50 cm, 2.5 um", "4.6 x 150 mm, 5 um, 100 A",
     "4.6 x 150 x 5", "", ",", "4.6 x 150 uL, 5 um"],
)  # fmt: skip
def test_columns_that_are_refused(text):
    with pytest.raises(UnitError):
        column_size(text)


def test_a_missing_unit_is_offered_in_the_user_s_own_order():
    with pytest.raises(UnitError) as caught:
        tube_size("40 cm x 0.010")
    assert '"40 cm x 0.010 in"' in caught.value.suggestion
