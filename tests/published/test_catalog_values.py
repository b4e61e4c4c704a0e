"""The catalogs of liquids against the recommended values that they were taken from, and against chemicals.

The recommended table: density and expansion by CoolProp and thermo 0.6 (computed), association factors by Wilke and
Chang 1955, Hayduk and Laudie 1974 (from memory) and Miyabe, J. Sep. Sci. 34 (2011) 2119 (abstract read).
"""

import warnings

import numpy as np
import pytest

from xcol.catalog_kinds import SOLVENTS
from xcol.catalogs import Catalogs
from xcol.liquids.mobile_phase import Component, MobilePhase

KNOWN = Catalogs()

# g/mol, kg/m³ at 25 °C, 10⁻³/K, psi
TABLE = {
    "water": (18.015, 997.1, 0.397, 2.26),
    "acetonitrile": (41.05, 776.8, 1.41, 1.37),
    "methanol": (32.04, 786.4, 1.22, 1.9),
    "ethanol": (46.07, 785.2, 1.13, 1.5),
    "2-propanol": (60.10, 781.9, 1.31, 1.0),
    "tetrahydrofuran": (72.11, 880.2, 1.25, 1.0),
    "n-hexane": (86.18, 655.0, 1.43, 1.0),
    "n-heptane": (100.20, 679.7, 1.27, 1.0),
    "dichloromethane": (84.93, 1318.5, 1.50, 1.0),
    "ethyl acetate": (88.11, 893.8, 1.37, 1.0),
}


@pytest.mark.parametrize("name", TABLE)
def test_the_recommended_values_are_in_the_catalog(name):
    mass, density, expansion, association = TABLE[name]
    row = KNOWN.find(SOLVENTS, name)
    assert row.molar_mass * 1e3 == pytest.approx(mass)
    assert row.density == pytest.approx(density)
    assert row.expansion * 1e3 == pytest.approx(expansion)
    assert row.association == pytest.approx(association)


@pytest.fixture(scope="module")
def chemicals():
    """The package chemicals, with the tables that are read on first use."""
    found = pytest.importorskip("chemicals")
    with warnings.catch_warnings():
        warnings.simplefilter("ignore")  # the library's own, of how it reads its tables
        from chemicals import viscosity, volume

        viscosity._load_mu_data()
        volume._load_rho_data()
    return found


@pytest.mark.parametrize("name", [row.name for row in KNOWN.rows(SOLVENTS) if row.viscosity])
def test_every_liquid_lies_within_the_scatter_of_compilations_over_its_range(name, chemicals):
    """DIPPR (Perry 8th ed.) and VDI PPDS, each with its own coefficients; density by DIPPR."""
    from chemicals.dippr import EQ101, EQ105
    from chemicals.viscosity import PPDS9, mu_data_Perrys_8E_2_313, mu_data_VDI_PPDS_7
    from chemicals.volume import rho_data_Perry_8E_105_l

    row = KNOWN.find(SOLVENTS, name)
    cas, liquid = chemicals.CAS_from_any(name), MobilePhase((Component(row, 1.0),))
    assert row.molar_mass * 1e3 == pytest.approx(chemicals.MW(cas), abs=0.01)
    for temperature in np.linspace(*row.span, 8):
        value, others = liquid.viscosity(float(temperature)), []
        if cas in mu_data_Perrys_8E_2_313.index:
            found = mu_data_Perrys_8E_2_313.loc[cas]
            others.append(EQ101(temperature, *(found[f"C{n}"] for n in range(1, 6))))
        if cas in mu_data_VDI_PPDS_7.index:
            found = mu_data_VDI_PPDS_7.loc[cas]
            others.append(PPDS9(temperature, *(found[letter] for letter in "ABCDE")))
        assert others
        low, high = 1 / (1 + value.uncertainty), 1 + value.uncertainty
        assert min(others) * low <= value.value <= max(others) * high
        found = rho_data_Perry_8E_105_l.loc[cas]
        density = EQ105(temperature, found["C1"], found["C2"], found["C3"], found["C4"]) * chemicals.MW(cas) * 1e-3
        assert liquid.density(float(temperature)) == pytest.approx(density, rel=0.01)
