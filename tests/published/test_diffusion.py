"""Diffusion correlations against measured values and the package polykin.

Rows of tests/data/diffusion.csv: handbook-type values, from memory. polykin: extra "reference".
"""

import csv
import math

import numpy as np
import pytest

from xcol.catalog_kinds import SOLUTES
from xcol.catalogs import Catalogs
from xcol.flowpath.composition import read_composition
from xcol.liquids import diffusion as d
from xcol.liquids.viscosity import water_viscosity

KNOWN = Catalogs()
PSI_M = read_composition("water", KNOWN).phase.association_mass()


@pytest.fixture
def rows(root):
    with (root / "tests" / "data" / "diffusion.csv").open(encoding="utf-8") as file:
        return list(csv.DictReader(file))


def errors(rows, estimate, *, small):
    found = {}
    for row in rows:
        if bool(row["lebas_volume_cm3_mol"]) == small:
            temperature = float(row["T_C"]) + 273.15
            value = estimate(row, temperature, water_viscosity(temperature))
            found[row["solute"]] = float(value / float(row["D_m2_s"]) - 1)
    return found


def volume(row):
    return float(row["lebas_volume_cm3_mol"]) * 1e-6


def mass(row):
    return float(row["molar_mass_g_mol"]) * 1e-3


METHODS = {
    "Wilke-Chang from the Le Bas volume": lambda row, t, eta: d.wilke_chang(t, eta, volume(row), PSI_M),
    "Wilke-Chang from the molar mass": lambda row, t, eta: d.wilke_chang(t, eta, d.molar_volume_of(mass(row)), PSI_M),
    "Hayduk-Laudie": lambda row, t, eta: d.hayduk_laudie(eta, volume(row)),
    "Hayduk-Minhas": lambda row, t, eta: d.hayduk_minhas_water(t, eta, volume(row)),
}
# method: median error, worst size. The first and third were computed outside the project for psi 2.26 (+0.3 %, 16 %;
# +0.7 %, 16 %); the second and fourth are this project's own figures, held so that a change is seen.
STATED = {
    "Wilke-Chang from the Le Bas volume": (0.003, 0.164),
    "Wilke-Chang from the molar mass": (-0.015, 0.204),
    "Hayduk-Laudie": (0.007, 0.155),
    "Hayduk-Minhas": (-0.014, 0.399),
}


@pytest.mark.parametrize("method", METHODS)
def test_small_molecules_are_predicted_with_the_stated_errors(rows, method, capsys):
    found = errors(rows, METHODS[method], small=True)
    values = np.array(list(found.values()))
    with capsys.disabled():
        print(
            f"\n{method}: median {100 * np.median(values):+.1f} %, median size {100 * np.median(abs(values)):.1f} %, "
            f"worst {100 * max(values, key=abs):+.1f} %"
        )
    median, worst = STATED[method]
    assert len(found) == 18
    assert np.median(values) == pytest.approx(median, abs=0.002)
    assert abs(values).max() == pytest.approx(worst, abs=0.002)


def test_the_uncertainty_of_small_molecules_covers_nine_in_ten(rows):
    from_mass = math.hypot(d.SMALL_IN_WATER, d.FROM_MASS)
    for method, stated in zip(METHODS, (d.SMALL_IN_WATER, from_mass), strict=False):
        values = np.array(list(errors(rows, METHODS[method], small=True).values()))
        assert np.mean(abs(values) <= stated) >= 0.9
        assert np.mean(abs(values) <= stated / 3) < 0.9  # and is not far too large


def test_globular_proteins_lie_within_the_stated_uncertainty_and_a_rod_does_not(rows, capsys):
    found = errors(rows, lambda row, t, eta: d.young_carroad_bell(t, eta, mass(row)), small=False)
    rod = found.pop("fibrinogen")
    with capsys.disabled():
        print("\nYoung-Carroad-Bell: " + ", ".join(f"{name} {100 * error:+.0f} %" for name, error in found.items()))
    values = np.array(list(found.values()))
    assert np.mean(abs(values) <= d.GLOBULAR) >= 0.85
    assert abs(values).max() == pytest.approx(0.25, abs=0.01)
    assert rod == pytest.approx(0.75, abs=0.02)


def test_the_relation_of_volume_to_mass_is_that_of_the_same_molecules(rows):
    ratios = np.array([volume(row) / mass(row) for row in rows if row["lebas_volume_cm3_mol"]])
    assert d.molar_volume_of(1.0) == pytest.approx(ratios.mean(), rel=0.02)
    assert ratios.std() / ratios.mean() == pytest.approx(0.12, abs=0.015)


def test_the_two_relations_meet_in_water_near_the_switch():
    masses = np.linspace(0.1, 2, 1901)
    eta = water_viscosity(298.15)
    ratio = d.wilke_chang(298.15, eta, d.molar_volume_of(masses), PSI_M) / d.young_carroad_bell(298.15, eta, masses)
    assert masses[np.argmin(abs(ratio - 1))] == pytest.approx(d.SWITCH, rel=0.1)
    # 5,800 g/mol: the relation for small molecules is 45 % low
    small = d.wilke_chang(298.15, eta, d.molar_volume_of(5.8), PSI_M)
    assert small / d.young_carroad_bell(298.15, eta, 5.8) == pytest.approx(0.53, abs=0.03)


def test_the_catalog_holds_the_measured_values(rows):
    for row in rows:
        solute = KNOWN.find(SOLUTES, row["solute"])
        assert solute.diffusion == pytest.approx(float(row["D_m2_s"]))
        assert solute.at == pytest.approx(float(row["T_C"]) + 273.15)
        assert solute.molar_mass == pytest.approx(mass(row))
        assert (solute.molar_volume is None) == (not row["lebas_volume_cm3_mol"])


def test_the_correlations_agree_with_polykin():
    """polykin takes the solute's molar mass and its density as a liquid, for the volume."""
    pytest.importorskip("polykin")
    from polykin.properties.diffusion import DL_Hayduk_Minhas, DL_Wilke_Chang

    for celsius, cm3 in ((10, 37.0), (25, 96.0), (40, 196.0), (60, 340.0)):
        temperature, eta = celsius + 273.15, float(water_viscosity(celsius + 273.15))
        theirs = DL_Wilke_Chang(T=temperature, MA=0.1, MB=18.015e-3, rhoA=0.1 / (cm3 * 1e-6), viscB=eta, phi=2.26)
        assert d.wilke_chang(temperature, eta, cm3 * 1e-6, 2.26 * 18.015e-3) == pytest.approx(theirs, rel=1e-6)
        theirs = DL_Hayduk_Minhas(T=temperature, method="aqueous", MA=0.1, rhoA=0.1 / (cm3 * 1e-6), viscB=eta)
        assert d.hayduk_minhas_water(temperature, eta, cm3 * 1e-6) == pytest.approx(theirs, rel=1e-6)
