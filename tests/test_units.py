"""Units: text to SI and back."""

import math

import pint
import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol import units
from xcol.units import (
    DENSITY,
    DIFFUSION,
    FLOW,
    FREQUENCY,
    LENGTH,
    MOLAR_MASS,
    MOLAR_VOLUME,
    PRESSURE,
    QUANTITIES,
    RATIO,
    TEMPERATURE,
    TIME,
    VARIANCE,
    VISCOSITY,
    VOLUME,
    UnitError,
    convert,
    parse,
    significant,
    write,
)

EVERYDAY = [(quantity, unit) for quantity in QUANTITIES for unit in quantity.everyday if unit not in ("", "%")]


@pytest.mark.parametrize(("quantity", "unit"), EVERYDAY, ids=lambda value: str(getattr(value, "name", value)))
def test_the_everyday_table_is_what_the_registry_says(quantity, unit):
    registry = units.registry()
    name = unit.removeprefix("1/")
    found = registry.Unit(name) ** (-1 if unit.startswith("1/") else 1)
    zero = registry.Quantity(0.0, found).to(quantity.si).magnitude
    one = registry.Quantity(1.0, found).to(quantity.si).magnitude
    factor, offset = units._factor(unit, quantity, unit)
    assert one - zero == pytest.approx(factor, rel=1e-12)
    assert zero == pytest.approx(offset, abs=1e-9)


@pytest.mark.parametrize(
    ("text", "quantity", "value"),
    [
        ("40 cm", LENGTH, 0.4),
        ("0.010 in", LENGTH, 2.54e-4),
        ("10 thou", LENGTH, 2.54e-4),
        ("10 mil", LENGTH, 2.54e-4),
        ('0.005"', LENGTH, 1.27e-4),
        ("1,8 µm", LENGTH, 1.8e-6),
        ("1.8 μm", LENGTH, 1.8e-6),
        ("0,010 in", LENGTH, 2.54e-4),
        (".5 mm", LENGTH, 5e-4),
        ("5e-3 m", LENGTH, 5e-3),
        ("1 ft", LENGTH, 0.3048),
        ("20 uL", VOLUME, 2e-8),
        ("20µl", VOLUME, 2e-8),
        ("3 mm3", VOLUME, 3e-9),
        ("3 mm³", VOLUME, 3e-9),
        ("3 mm^3", VOLUME, 3e-9),
        ("1.2 cm**3", VOLUME, 1.2e-6),
        ("0.4 mL/min", FLOW, 0.4e-6 / 60),
        ("0.4 ml/min", FLOW, 0.4e-6 / 60),
        ("300 nL / min", FLOW, 3e-10 / 60),
        ("1 mL min^-1", FLOW, 1e-6 / 60),
        ("1 mL·min⁻¹", FLOW, 1e-6 / 60),
        ("0.5 s", TIME, 0.5),
        ("100 ms", TIME, 0.1),
        ("9.8 min", TIME, 588),
        ("5 Hz", FREQUENCY, 5),
        ("5 1/s", FREQUENCY, 5),
        ("145.04 psi", PRESSURE, 1.0e6),
        ("40 MPa", PRESSURE, 4e7),
        ("400 bar", PRESSURE, 4e7),
        ("30 degC", TEMPERATURE, 303.15),
        ("30 °C", TEMPERATURE, 303.15),
        ("30 C", TEMPERATURE, 303.15),
        ("303.15 K", TEMPERATURE, 303.15),
        ("86 degF", TEMPERATURE, 303.15),
        ("-4 °C", TEMPERATURE, 269.15),
        ("0.9 mPa s", VISCOSITY, 9e-4),
        ("0.9 mPa·s", VISCOSITY, 9e-4),
        ("0.9 mPa*s", VISCOSITY, 9e-4),
        ("0.9 cP", VISCOSITY, 9e-4),
        ("1e-5 cm2/s", DIFFUSION, 1e-9),
        ("1.0e-9 m²/s", DIFFUSION, 1e-9),
        ("362 g/mol", MOLAR_MASS, 0.362),
        ("362 Da", MOLAR_MASS, 0.362),
        ("150 kDa", MOLAR_MASS, 150),
        ("37 cm3/mol", MOLAR_VOLUME, 3.7e-5),
        ("0.78 g/mL", DENSITY, 780),
        ("4 uL^2", VARIANCE, 4e-18),
        ("4 µL²", VARIANCE, 4e-18),
        ("4 uL2", VARIANCE, 4e-18),
        ("65 %", RATIO, 0.65),
        ("65 per cent", RATIO, 0.65),
        ("0.65", RATIO, 0.65),
    ],
)
def test_what_people_type(text, quantity, value):
    assert parse(text, quantity) == pytest.approx(value, rel=2e-5)


@pytest.mark.parametrize(
    ("text", "quantity"),
    [
        ("40", LENGTH),
        ("", LENGTH),
        ("mm", LENGTH),
        ("40 mL", LENGTH),
        ("40 furlong", LENGTH),
        ("40 MM", LENGTH),
        ("1,000 mm", LENGTH),
        ("1.2.3 mm", LENGTH),
        ("1 2 mm", LENGTH),
        ("2+2 mm", LENGTH),
        ("2*2 mm", LENGTH),
        ("(2) mm", LENGTH),
        ("1/2 mm", LENGTH),
        ("1/16 in", LENGTH),
        ("1/3 in", LENGTH),
        ("1/0 in", LENGTH),
        ("2**3 mm", LENGTH),
        ("5 m^9^9^9", LENGTH),
        ("5 mm^99", LENGTH),
        ("5 mm**9**9**9", LENGTH),
        ("5 m m m m m m", LENGTH),
        ("5 " + "m" * 5000, LENGTH),
        ("9" * 5000 + " mm", LENGTH),
        ("1e999 mm", LENGTH),
        ("1e99999999 mm", LENGTH),
        ("1e308 m", LENGTH.__class__("a length", "m", ("mm",), {"m": 1e10})),
        ("nan mm", LENGTH),
        ("inf mm", LENGTH),
        ("1.0 x 10^-9 m^2/s", DIFFUSION),
        ("__import__('os') mm", LENGTH),
        ("5 mm; 6 mm", LENGTH),
        ("5 degC", LENGTH),
        ("1e-9 1/m^2 s", DIFFUSION),
        ("2 1/mL min", FLOW),
        ("1 \u0441P", VISCOSITY),
        ("5 %", LENGTH),
        ("5 lambda", LENGTH),
        ("5 mm\x00", LENGTH),
    ],
)
def test_what_is_refused(text, quantity):
    with pytest.raises(UnitError) as caught:
        parse(text, quantity)
    assert caught.value.read
    assert caught.value.expected
    assert caught.value.suggestion
    assert len(str(caught.value)) < 600


def test_inch_fractions_are_read_where_a_port_is_asked_for():
    assert parse("1/16 in", LENGTH, fraction=True) == pytest.approx(1.5875e-3)
    assert parse('1/16"', LENGTH, fraction=True) == pytest.approx(1.5875e-3)
    assert parse("1 1/4 in", LENGTH, fraction=True) == pytest.approx(0.03175)
    for text in ("1/3 in", "1/16 mm", "1/0 in"):
        with pytest.raises(UnitError):
            parse(text, LENGTH, fraction=True)


def test_a_power_of_ten_is_offered_in_one_number():
    with pytest.raises(UnitError) as caught:
        parse("1.0·10⁻⁹ m²/s", DIFFUSION)
    assert "1.0e-9" in caught.value.suggestion


def test_a_wrong_kind_says_what_the_unit_is():
    with pytest.raises(UnitError) as caught:
        parse("5 bar", LENGTH)
    assert "a pressure" in caught.value.read


def test_a_unit_in_the_wrong_case_is_offered_in_the_right_one():
    with pytest.raises(UnitError) as caught:
        parse("5 ML/MIN", FLOW)
    assert "mL/min" in caught.value.suggestion or "ml/min" in caught.value.suggestion


@given(st.text(max_size=120))
def test_any_text_is_a_number_or_a_unit_error(text):
    for quantity in (LENGTH, RATIO, TEMPERATURE):
        try:
            value = parse(text, quantity)
        except UnitError:
            continue
        assert math.isfinite(value)


@given(
    st.sampled_from([(q, u) for q, u in EVERYDAY]),
    st.floats(1e-6, 1e6),
)
def test_there_and_back(pair, number):
    quantity, unit = pair
    value = parse(f"{number!r} {unit}", quantity)
    assert convert(value, unit, quantity) == pytest.approx(number, rel=1e-9, abs=1e-9)


# A unit of the same name means another thing in the default registry, or nothing there.
DIFFERENT = {"C", "mPas", "cc", "mil", "thou", "celsius", "kDa", "Da", "P", "cP", "degF"}


def test_against_the_default_registry_of_pint():
    default = pint.UnitRegistry()
    compared = 0
    for quantity, unit in EVERYDAY:
        name = unit.removeprefix("1/")
        if quantity in (TEMPERATURE, MOLAR_MASS) or name in DIFFERENT or name == "um^3":
            continue
        found = default.Unit(name) ** (-1 if unit.startswith("1/") else 1)
        # hertz is a turn per second for some registries, a plain 1/s here
        value = (1.0 * found).to(quantity.si).magnitude
        assert value == pytest.approx(quantity.everyday[unit], rel=1e-9), unit
        compared += 1
    assert compared > 60


@pytest.mark.parametrize(
    ("value", "text"),
    [(0, "0"), (8331.2, "8330"), (0.00925926, "0.00926"), (0.5, "0.5"), (999.6, "1000"), (1e-9, "1e-9"),
     (1.5e7, "1.5e7"), (-12.345, "-12.3"), (float("inf"), "inf")],
)  # fmt: skip
def test_three_significant_digits(value, text):
    assert significant(value) == text


@given(st.floats(1e-12, 1e12))
def test_significant_digits_are_within_half_a_step(value):
    assert float(significant(value)) == pytest.approx(value, rel=5.1e-3)
    assert float(significant(value, zeros=True)) == float(significant(value))


def test_writing_has_the_unit():
    assert write(1e-6 / 60, "mL/min", FLOW) == "1 mL/min"
    assert write(0.65, "", RATIO) == "0.65"


def test_a_letter_of_another_alphabet_is_named():
    with pytest.raises(UnitError) as caught:
        parse("1 \u0441P", VISCOSITY)
    assert "cyrillic" in caught.value.read


def test_a_fraction_without_a_unit_is_offered_with_one():
    with pytest.raises(UnitError) as caught:
        parse("1/16", LENGTH, fraction=True)
    assert caught.value.suggestion == '"1/16 in"'
