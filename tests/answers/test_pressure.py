"""Pressure along the path."""

import pytest

from xcol.answers.pressure import pressures
from xcol.flowpath.hydraulics import bed_drop, tube_drop
from xcol.flowpath.reader import parse

FLOW = 0.5e-6 / 60
FILE = """\
flow = "0.5 mL/min"
viscosity = "0.9 mPa s"
diffusion = "1e-9 m^2/s"
{head}
path = [
  {{ inject = "2 uL" }},
  {{ tube = "30 cm x 0.17 mm", name = "to column" }},
  {{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 {column} }},
  {{ tube = "25 cm x 0.10 mm", name = "to cell" }},
  {{ detector = "UV", cell = "2.5 uL", time_constant = "0.1 s" {detector} }},
  {{ tube = "1 m x 0.10 mm", name = "waste" {waste} }},
]
"""


def profile(head="", column="", detector="", waste=""):
    return pressures(parse(FILE.format(head=head, column=column, detector=detector, waste=waste), "f"))


BEFORE, BEHIND, WASTE = (
    float(tube_drop(FLOW, length, bore, 0.9e-3)) for length, bore in ((0.3, 0.17e-3), (0.25, 1e-4), (1, 1e-4))
)
BED, LEAST, MOST = (float(bed_drop(FLOW, 0.1, 2.1e-3, 0.9e-3, 3e-6, e)) for e in (0.40, 0.42, 0.36))


def test_an_inlet_carries_its_own_drop_and_all_downstream():
    rows = profile().rows
    assert [row.drop.value for row in rows] == pytest.approx([0, BEFORE, BED, BEHIND, 0, WASTE])
    inlets = [row.inlet.value for row in rows]
    assert inlets[4] == inlets[5] == pytest.approx(WASTE)
    assert inlets[0] == pytest.approx(BEFORE + BED + BEHIND + WASTE)
    assert profile().total.low == pytest.approx(BEFORE + LEAST + BEHIND + WASTE)
    assert profile().total.high == pytest.approx(BEFORE + MOST + BEHIND + WASTE)
    assert rows[1].reynolds == pytest.approx(4 * 1000 * FLOW / (3.14159265 * 0.17e-3 * 0.9e-3))
    assert rows[2].reynolds is None


def test_measured_drops_come_before_computed_ones():
    rows = profile(column=', drop = "180 bar"', detector=', drop = "3 bar"').rows
    assert rows[2].drop.value == rows[2].drop.low == rows[2].drop.high == pytest.approx(180e5)
    assert rows[4].inlet.value == pytest.approx(3e5 + WASTE)


def test_the_columns_take_what_the_rest_does_not_explain_of_the_pump_pressure():
    found = profile(head='pump_pressure = "250 bar"')
    assert found.total.value == found.total.low == pytest.approx(250e5)
    assert found.rows[2].drop.value == pytest.approx(250e5 - BEFORE - BEHIND - WASTE)
    assert not found.warnings


def test_two_columns_share_it_as_their_beds_would():
    second = '},\n  { column = "2.1 x 50 mm, 3 um", plates = 6000, total_porosity = 0.6'
    found = profile(head='pump_pressure = "200 bar"', column=second)
    first, other = (row.drop.value for row in found.rows if row.part.kind == "column")
    assert first == pytest.approx(2 * other)


@pytest.mark.parametrize(
    ("head", "column", "word"),
    [
        ('pump_pressure = "2 bar"', "", "contradicts"),
        ('pump_pressure = "900 bar"', "", "frit"),
        ('pump_pressure = "60 bar"', "", "frit"),
        ('pump_pressure = "150 bar"', ', drop = "300 bar"', "contradicts"),
    ],
)
def test_a_pump_pressure_that_cannot_be_is_said_to_be_one(head, column, word):
    assert any(word in warning for warning in profile(head=head, column=column).warnings)


def test_a_part_above_its_limit_is_named():
    found = profile(detector=', max_pressure = "1 bar"')
    assert len(found.limits) == 1
    assert "limit" in found.limits[0]
    assert '"UV"' in found.limits[0]
    assert not profile(detector=', max_pressure = "100 bar"').limits


def test_a_limit_within_the_range_may_be_exceeded():
    limit = (BED + BEHIND + WASTE) * 1.1 / 1e5
    (warning,) = profile(column=f', max_pressure = "{limit} bar"').limits
    assert "may be above its limit" in warning


def test_the_drop_has_a_limit_of_its_own():
    (warning,) = profile(waste=', max_drop = "2 bar"').limits
    assert "drop" in warning
    assert "limit" in warning


def test_without_viscosity_a_limit_is_not_checked():
    text = FILE.format(head="", column="", detector=', max_pressure = "100 bar"', waste="")
    found = pressures(parse(text.replace('viscosity = "0.9 mPa s"', ""), "f"))
    assert found.total is None
    assert any("not checked" in warning for warning in found.warnings)


def test_without_a_particle_what_is_upstream_is_not_computed():
    text = FILE.format(head="", column="", detector="", waste="").replace(", 3 um", "")
    rows = pressures(parse(text, "f")).rows
    assert rows[2].drop is rows[1].inlet is None
    assert rows[3].inlet.value == pytest.approx(BEHIND + WASTE)
