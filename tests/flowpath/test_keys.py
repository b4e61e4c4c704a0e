"""How values are read."""

import datetime

import pytest

from xcol.flowpath.keys import Choice, Later, Measure, Number, Sizes, Tables, Text, Tolerance, YesOrNo
from xcol.flowpath.shorthand import loop_size
from xcol.units import LENGTH, RATIO, VOLUME, UnitError, described

BORE = Measure(LENGTH, 1e-6, 1e-2)
SHARE = Measure(RATIO, 0.2, 0.99)


def test_a_measure_is_a_text_with_its_unit():
    assert BORE("0.25 mm") == pytest.approx(0.25e-3)
    assert SHARE(0.65) == SHARE("65 %") == SHARE("0.65") == pytest.approx(0.65)


@pytest.mark.parametrize(
    "raw", [0.25, 1, True, None, [], {}, "", "  ", datetime.date(2020, 1, 1), "x", "75 mm", "-1 mm"]
)
def test_what_is_no_bore(raw):
    with pytest.raises(UnitError) as caught:
        BORE(raw)
    assert caught.value.suggestion


def test_a_bare_number_is_offered_in_the_units_that_make_sense():
    with pytest.raises(UnitError) as caught:
        BORE(75)
    assert '"75 um"' in caught.value.suggestion
    assert '"75 mm"' not in caught.value.suggestion


def test_an_absurd_size_is_offered_in_a_unit_that_makes_sense():
    with pytest.raises(UnitError) as caught:
        BORE("75 mm")
    assert '"75 um"' in caught.value.suggestion
    with pytest.raises(UnitError) as caught:
        SHARE(65)
    assert '"65 %"' in caught.value.suggestion


def test_zero_only_where_it_is_allowed():
    assert Measure(LENGTH, 1e-6, 1.0, zero=True)("0 mm") == 0
    with pytest.raises(UnitError):
        BORE("0 mm")


@pytest.mark.parametrize("raw", [11000, 11000.0, "11000", "1.1e4"])
def test_a_number(raw):
    assert Number(1, 1e8, "a plate number")(raw) == 11000


@pytest.mark.parametrize("raw", [True, "x", "11000 mm", 0, -1, 1e9, float("nan"), float("inf"), [], "11,000"])
def test_what_is_no_number(raw):
    with pytest.raises(UnitError):
        Number(1, 1e8, "a plate number")(raw)


def test_whole_numbers():
    assert Number(1, 20, "stages", whole=True)(2.0) == 2
    with pytest.raises(UnitError):
        Number(1, 20, "stages", whole=True)(2.5)


def test_texts_are_one_line_without_control_characters():
    assert Text()(" a\x1b[31m\n b ") == "a [31m b"
    for raw in (1, [], "x" * 201):
        with pytest.raises(UnitError):
            Text()(raw)


def test_choices_propose_the_nearest():
    forms = Choice(("first-order", "gaussian"))
    assert forms("First_Order") == "first-order"
    with pytest.raises(UnitError) as caught:
        forms("gausian")
    assert "gaussian" in caught.value.suggestion


def test_what_is_not_computed_yet_is_refused():
    with pytest.raises(UnitError) as caught:
        Later()("x")
    assert "not yet" in caught.value.expected


def test_tolerances_are_shares_with_or_without_a_sign_in_front():
    read = Tolerance()
    assert [read(raw) for raw in ("5 %", "±5%", "+/- 5 %", 0.05, "0,05", 0)] == pytest.approx([0.05] * 5 + [0])
    for wrong in ("5", 5, "5 um", "-5 %", "60 %", True, [], "", 10**400):
        with pytest.raises(UnitError) as caught:
            read(wrong)
        assert "share" in caught.value.expected


def test_yes_or_no_is_not_a_word():
    assert YesOrNo()(True) is True
    assert YesOrNo()(False) is False
    for wrong in ("false", 0, None):
        with pytest.raises(UnitError):
            YesOrNo()(wrong)


def test_sizes_in_one_text():
    read = Sizes(loop_size, (Measure(VOLUME, 1e-12, 1e-3), Measure(LENGTH, 1e-6, 0.01)))
    assert read("20 uL") == (2e-8,)
    assert read("20 µL × 0.5 mm") == pytest.approx((2e-8, 5e-4))
    for wrong in ("20", 20, "20 uL x 0.5", "20 uL x 0.5 mm x 1 mm", "20 mm x 0.5 mm", "20 uL x 5 m", "", [], "-1 uL"):
        with pytest.raises(UnitError):
            read(wrong)


def test_a_list_of_tables_or_one_table():
    read = Tables((), "[{ }]")
    assert read([{"a": 1}])
    assert read({"a": 1})
    for wrong in ([], "x", [1], [{}, 2], 3):
        with pytest.raises(UnitError):
            read(wrong)


def test_values_are_described():
    assert described([]) == "a list"
    assert described({}) == "a table"
    assert described("") == "an empty text"
    assert len(described("y" * 1000)) < 80
