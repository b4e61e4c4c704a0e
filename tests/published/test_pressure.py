"""Pressure and flow numbers against published values and reference libraries."""

import math

import pytest

from xcol.flowpath.hydraulics import bed_drop, reynolds_number, tube_drop
from xcol.units import PRESSURE, convert, parse

FLOW = 1e-6 / 60


# A maker's page on restrictors (read): 2 m x 0.3 mm at 1 mL/min has about 0.2 MPa with water, 0.1 MPa with
# methanol. Viscosities at 20 °C, 1.00 and 0.59 mPa s (from memory); Hagen-Poiseuille gives 0.168 and 0.092 for
# the ambient ones.
def test_a_restrictor():
    water, methanol = (float(tube_drop(FLOW, 2.0, 0.3e-3, eta)) / 1e6 for eta in (1.0e-3, 0.55e-3))
    assert water == pytest.approx(0.168, rel=0.01)
    assert methanol == pytest.approx(0.092, rel=0.01)
    assert round(water, 1) == 0.2
    assert round(methanol, 1) == 0.1


# Arithmetic, 1 bar = 14.504 psi = 0.1 MPa.
def test_units_of_pressure():
    assert convert(1e5, "psi", PRESSURE) == pytest.approx(14.504, abs=5e-4)
    assert parse("14.504 psi", PRESSURE) == pytest.approx(parse("0.1 MPa", PRESSURE), rel=1e-4)


# The package `fluids` (general-purpose; extra "reference").
def test_reynolds_number_and_laminar_friction_against_fluids():
    fluids = pytest.importorskip("fluids")
    for bore, flow in ((0.127e-3, FLOW), (0.5e-3, FLOW / 10), (1e-3, 10 * FLOW)):
        velocity = flow / (math.pi / 4 * bore**2)
        re = fluids.Reynolds(V=velocity, D=bore, rho=990.0, mu=0.9e-3)
        assert reynolds_number(flow, bore, 0.9e-3, 990.0) == pytest.approx(re, rel=1e-9)
        friction = fluids.friction.friction_laminar(re)
        drop = friction * 1.5 / bore * 990.0 * velocity**2 / 2
        assert tube_drop(flow, 1.5, bore, 0.9e-3) == pytest.approx(drop, rel=1e-9)


def test_a_packed_bed_against_fluids():
    fluids = pytest.importorskip("fluids")
    velocity = FLOW / (math.pi / 4 * 4.6e-3**2)
    # Carman's own form ends in 180 times the laminar term; its inertial term is next to nothing here
    found = fluids.packed_bed.Carman(dp=5e-6, voidage=0.4, vs=velocity, rho=990.0, mu=0.9e-3, L=0.15)
    assert bed_drop(FLOW, 0.15, 4.6e-3, 0.9e-3, 5e-6, 0.4) == pytest.approx(found, rel=0.02)
