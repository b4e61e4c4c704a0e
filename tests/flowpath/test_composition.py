"""What people write for a mobile phase."""

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

from xcol.catalog_kinds import SOLVENTS
from xcol.catalogs import Catalogs
from xcol.flowpath.composition import read_composition, water_of
from xcol.units import UnitError

KNOWN = Catalogs()

READ = {
    "acetonitrile/water 60:40": ("acetonitrile", 60, "water", 40),
    "ACN/H2O 60:40": ("acetonitrile", 60, "water", 40),
    "60:40 MeCN:water": ("acetonitrile", 60, "water", 40),
    "acetonitrile-water (60/40, v/v)": ("acetonitrile", 60, "water", 40),
    "acetonitrile:water = 60:40": ("acetonitrile", 60, "water", 40),
    "acetonitrile and water 3:2": ("acetonitrile", 60, "water", 40),
    "60 % acetonitrile, 40 % water": ("acetonitrile", 60, "water", 40),
    "60% ACN / 40% water": ("acetonitrile", 60, "water", 40),
    "60 % acetonitrile in water": ("acetonitrile", 60, "water", 40),
    "ACETONITRILE / WATER  0.6 : 0.4": ("acetonitrile", 60, "water", 40),
    "water/MeOH 70:30": ("water", 70, "methanol", 30),
    "water/ACN 47,5:52,5": ("water", 47.5, "acetonitrile", 52.5),
    "water with 5 % acetonitrile": ("water", 95, "acetonitrile", 5),
    "hexane/2-propanol 90:10": ("n-hexane", 90, "2-propanol", 10),
    "heptane/1,4-dioxane 80:20": ("n-heptane", 80, "1,4-dioxane", 20),
    "ethyl acetate/hexane 1:4": ("ethyl acetate", 20, "n-hexane", 80),
    "water/acetonitrile/THF 60:30:10": ("water", 60, "acetonitrile", 30, "tetrahydrofuran", 10),
    "water": ("water", 100),
    "100 % water": ("water", 100),
    "MeCN": ("acetonitrile", 100),
    "water/methanol 0:100": ("methanol", 100),
    "water/H2O 50:50": ("water", 100),
    "methanol + water (70 + 30)": ("methanol", 70, "water", 30),
    "methanol – water (40:60)": ("methanol", 40, "water", 60),
    "65 water / 35 methanol": ("water", 65, "methanol", 35),
    "deionised water": ("water", 100),
    "H₂O/CH₃CN 50:50": ("water", 50, "acetonitrile", 50),
    "acetonitrile (HPLC grade)/water 60:40": ("acetonitrile", 60, "water", 40),
    "methanol (MeOH)": ("methanol", 100),
    "acetonitrile–water (60:40, v/v)": ("acetonitrile", 60, "water", 40),
    "Methanol: Water (70: 30 %v/v)": ("methanol", 70, "water", 30),
    "ACN/water 60%:40%": ("acetonitrile", 60, "water", 40),
    "hexane 90/2-propanol 10": ("n-hexane", 90, "2-propanol", 10),
    "60％ acetonitrile, 40％ water": ("acetonitrile", 60, "water", 40),
    "acetonitrile 60% in water": ("acetonitrile", 60, "water", 40),
    "hexane with 10 % IPA": ("n-hexane", 90, "2-propanol", 10),
    "HPLC-grade acetonitrile / water 60:40": ("acetonitrile", 60, "water", 40),
}
DISSOLVED = {
    "0.1 % formic acid in water": ("water", 100),
    "water + 0.1 % TFA": ("water", 100),
    "water (0.1 % formic acid)/acetonitrile 40:60": ("water", 40, "acetonitrile", 60),
    "20 mM phosphate buffer pH 2.5": ("water", 100),
    "PBS": ("water", 100),
    "methanol/20 mM phosphate pH 2.5 60:40": ("methanol", 60, "water", 40),
    "acetonitrile/0.1 % TFA in water 30:70": ("acetonitrile", 30, "water", 70),
    "0.1 % TFA in acetonitrile": ("acetonitrile", 100),
    "5 mM ammonium formate pH 3/ACN 20:80": ("water", 20, "acetonitrile", 80),
    "10 mM ammonium acetate in methanol/water 50:50": ("methanol", 50, "water", 50),
    "water/acetonitrile (0.1% TFA) 40:60": ("water", 40, "acetonitrile", 60),
    "water/acetonitrile 40:60, 0.1 % TFA": ("water", 40, "acetonitrile", 60),
    "acetonitrile (0.1% TFA)": ("acetonitrile", 100),
    "acetonitrile pH 2.5": ("acetonitrile", 100),
    "5 mM ammonium acetate methanol": ("methanol", 100),
    "hexane/IPA 90:10 (0.1% TFA)": ("n-hexane", 90, "2-propanol", 10),
    "hexane:isopropanol:DEA 90:10:0.1": ("n-hexane", 90, "2-propanol", 10),
    "methanol/water/acetic acid 50:50:1": ("methanol", 50, "water", 50),
    "acetonitrile/water (60:40, v/v) containing 0.1% formic acid": ("acetonitrile", 60, "water", 40),
    "60% phosphate buffer pH 7 and 40% MeOH": ("water", 60, "methanol", 40),
    "70% 0.1% formic acid in water, 30% acetonitrile": ("water", 70, "acetonitrile", 30),
    "10 mM ammonium formate, 5% water, 95% ACN": ("water", 5, "acetonitrile", 95),
    "90 % ACN in 10 mM ammonium formate": ("acetonitrile", 90, "water", 10),
    "hexane with 2% ethanol and 0.1% TFA": ("n-hexane", 98, "ethanol", 2),
    "20 mM phosphate, 150 mM NaCl, pH 7.4": ("water", 100),
    "50 mM KH2PO4 pH 2.5-acetonitrile (80:20)": ("water", 80, "acetonitrile", 20),
    "10 mmol/L ammonium acetate/ACN 50:50": ("water", 50, "acetonitrile", 50),
    "0.1 M Tris-HCl pH 8": ("water", 100),
    "50 µM EDTA in water": ("water", 100),  # both micro signs
    "50 μM EDTA in water": ("water", 100),
    "0.1% aqueous TFA / ACN 60:40": ("water", 60, "acetonitrile", 40),
    "5 mM heptane sulfonate/ACN 70:30": ("water", 70, "acetonitrile", 30),
    "phosphate buffer (pH 3.0 with H3PO4)-acetonitrile 80:20": ("water", 80, "acetonitrile", 20),
    "ACN/water 60:40 w/ 0.1% TFA": ("acetonitrile", 60, "water", 40),
}


def parts(composition):
    pairs = [(c.solvent.name, pytest.approx(100 * c.fraction)) for c in composition.phase.components]
    return tuple(value for pair in pairs for value in pair)


@pytest.mark.parametrize(("text", "expected"), READ.items(), ids=READ)
def test_liquids_and_their_parts_are_understood(text, expected):
    composition = read_composition(text, KNOWN)
    assert parts(composition) == expected
    assert not composition.left_out
    assert not composition.warnings


@pytest.mark.parametrize(("text", "expected"), DISSOLVED.items(), ids=DISSOLVED)
def test_what_is_dissolved_is_left_out_and_said_so(text, expected):
    composition = read_composition(text, KNOWN)
    assert parts(composition) == expected
    assert len(composition.left_out) == 1
    assert not composition.warnings


@pytest.mark.parametrize(
    "text",
    ["6 M guanidine hydrochloride in water", "acetonitrile/500 mM sodium chloride 5:95", "5 % acetic acid in water"],
)
def test_a_concentrated_solution_is_warned_of(text):
    assert read_composition(text, KNOWN).warnings


WRONG = {
    "acetonitrile/water": '"acetonitrile/water 60:40"',
    "acetonitrile/water 60": '"acetonitrile/water 60:40"',
    "acetonitrile/water 60 %": '"acetonitrile/water 40:60"',
    "60 % ACN/water": '"acetonitrile/water 60:40"',
    "ACN 60 %": '"acetonitrile/water 60:40"',
    "ACN 60:40": '"acetonitrile/water 60:40"',
    "acetonitrle/water 60:40": '"acetonitrile"',
    "2-propanol in hexane 10 %": '"2-propanol/n-hexane 10:90"',
    "methanol in water (40 %)": '"methanol/water 40:60"',
    "ACN in 0.1% TFA 40%": '"acetonitrile/water 40:60"',
    "hexane with IPA 10%": '"n-hexane/2-propanol 90:10"',
    "0.1% FA in water/MeOH 5%": '"water/methanol 95:5"',
    "MeOH with 10 mM ammonium acetate 90%": '"methanol/water 90:10"',
    "80% aqueous methanol": '"methanol/water 80:20"',
    "hexane ethanol 90:10": "their volume parts",
    "H2O 70/30 + 0.1% HCOOH": "",
    "A/B 65:35": "one composition",
    "gradient water/ACN 95:5": "one composition",
    "beer": "viscosity",
    "acetonitrle + 0.1% FA/water + 0.1% FA 50:50": '"acetonitrile"',
    "0.1% FA in acetonitrle": '"acetonitrile"',
    "honey buffer": "",
    "NMP + 10 mM LiBr": "",
    "glycerol + 10 mM NaCl": "",
    "10 mM ammonium formate in 90% acetonitrile": '"acetonitrile/water 90:10"',
    "60% aqueous acetonitrile": '"acetonitrile/water 60:40"',
    "5-95% ACN in water": "one composition",
    "350 mL MeOH + 650 mL buffer": "",
    "20% ACN + 0.1% TFA": '"acetonitrile/water 20:80"',
    "ACN + 5 % water + 0.1 % FA": '"acetonitrile/water 95:5"',
    "dichloromethane 1 % methanol": "/methanol",
    "40 % B": "",
    "TFA": "",
    "NMP": "leave it out",
    "acetic acid/hexane 10:90": "viscosity",
    "isopropyl acetate/hexane 10:90": "",
    "10 % sulfolane/water": "",
    "60:40": "names",
    "": "names",
    "ACN/water 60:40:10": '"acetonitrile/water',
    "water/acetonitrile/THF 60:40": "60:30:10",
    "ACN/water 60:40 w/w": "volume",
    "ACN 60:40 water 30:70": "once",
    "0:0 water/ACN": "60:40",
    "70 % acetonitrile, 40 % water": "",
    "water/water/water/water/water/water/water 1:1:1:1:1:1:1": "",
    "x" * 300: "shorter",
}


@pytest.mark.parametrize(("text", "suggestion"), WRONG.items(), ids=[text[:30] for text in WRONG])
def test_what_cannot_be_read_one_way_is_refused_with_a_suggestion(text, suggestion):
    with pytest.raises(UnitError) as caught:
        read_composition(text, KNOWN)
    assert suggestion in caught.value.suggestion
    assert caught.value.read
    assert caught.value.expected


def test_water_alone_is_water():
    assert water_of(KNOWN).is_water
    assert read_composition("0.1 % TFA", KNOWN).phase.is_water
    assert not read_composition("water/ACN 95:5", KNOWN).phase.is_water


@pytest.mark.parametrize("text", ["methanol/water 70:20", "hexane/water 90:10", "water/DCM 50:50"])
def test_odd_parts_and_liquids_that_do_not_mix_are_warned_of(text):
    assert len(read_composition(text, KNOWN).warnings) == 1


NAMED = st.sampled_from(["acetonitrile", "MeOH", "water", "hexane", "THF", "IPA"])
BESIDE = st.sampled_from(
    ["", " (0.1% TFA)", " + 0.1 % FA", ", 10 mM ammonium acetate", " 0.1% TFA", " pH 2.5", " (HPLC grade)", " buffer"]
)


@settings(max_examples=300)
@given(
    first=NAMED, second=NAMED, beside=st.tuples(BESIDE, BESIDE, BESIDE),
    joint=st.sampled_from(["/", ":", " - ", " and ", " + ", ", ", " in "]), share=st.integers(1, 99),
)  # fmt: skip
def test_a_liquid_that_is_named_is_in_the_phase_or_the_text_is_refused(first, second, beside, joint, share):
    text = f"{first}{beside[0]}{joint}{second}{beside[1]} {share}:{100 - share}{beside[2]}"
    try:
        composition = read_composition(text, KNOWN)
    except UnitError:
        return
    names = {component.solvent.name for component in composition.phase.components}
    assert {KNOWN.find(SOLVENTS, first).name, KNOWN.find(SOLVENTS, second).name} <= names


WORDS = st.sampled_from(
    ["acetonitrile", "water", "ACN", "/", ":", " ", "60", "40", "%", "in", "and", "0.1", "formic acid", "mM", "-", "(",
     ")", ",", "+", "M", "1e9", "é", "v/v", "w/w", "buffer"]
)  # fmt: skip


@settings(max_examples=500)
@given(words=st.lists(WORDS, max_size=12))
@example(words=["60", ":", "40", "/", "0"])
def test_any_text_is_read_or_refused(words):
    text = " ".join(words)
    try:
        composition = read_composition(text, KNOWN)
    except UnitError:
        return
    fractions = [component.fraction for component in composition.phase.components]
    assert sum(fractions) == pytest.approx(1.0)
    assert all(fraction > 0 for fraction in fractions)


@given(share=st.floats(0.5, 99.5), order=st.booleans())
def test_order_and_scale_of_the_parts_change_nothing(share, order):
    names, values = ("acetonitrile", "water"), (round(share, 2), round(100 - share, 2))
    plain = read_composition(f"{'/'.join(names)} {values[0]:g}:{values[1]:g}", KNOWN).phase
    if order:
        names, values = names[::-1], values[::-1]
    other = read_composition(f"{'/'.join(names)} {values[0] / 10:.3f}:{values[1] / 10:.3f}", KNOWN).phase
    assert other.viscosity_at(303.15) == pytest.approx(plain.viscosity_at(303.15), rel=1e-9)
