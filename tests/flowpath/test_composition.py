"""What people write for a mobile phase."""

import pytest
from hypothesis import example, given, settings
from hypothesis import strategies as st

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
    "water with 5 % acetonitrile": ("acetonitrile", 5, "water", 95),
    "hexane/2-propanol 90:10": ("n-hexane", 90, "2-propanol", 10),
    "heptane/1,4-dioxane 80:20": ("n-heptane", 80, "1,4-dioxane", 20),
    "ethyl acetate/hexane 1:4": ("ethyl acetate", 20, "n-hexane", 80),
    "water/acetonitrile/THF 60:30:10": ("water", 60, "acetonitrile", 30, "tetrahydrofuran", 10),
    "water": ("water", 100),
    "100 % water": ("water", 100),
    "MeCN": ("acetonitrile", 100),
    "water/methanol 0:100": ("methanol", 100),
    "water/H2O 50:50": ("water", 100),
}
DISSOLVED = {
    "0.1 % formic acid in water": ("water", 100),
    "water + 0.1 % TFA": ("water", 100),
    "water (0.1 % formic acid)/acetonitrile 40:60": ("water", 40, "acetonitrile", 60),
    "20 mM phosphate buffer pH 2.5": ("water", 100),
    "phosphate buffered saline": None,
    "PBS": ("water", 100),
    "methanol/20 mM phosphate pH 2.5 60:40": ("methanol", 60, "water", 40),
    "acetonitrile/0.1 % TFA in water 30:70": ("acetonitrile", 30, "water", 70),
    "0.1 % TFA in acetonitrile": ("acetonitrile", 100),
    "5 mM ammonium formate pH 3/ACN 20:80": ("water", 20, "acetonitrile", 80),
    "10 mM ammonium acetate in methanol/water 50:50": ("methanol", 50, "water", 50),
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
    if expected:
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
    "acetonitrile/water 60": "parts",
    "acetonitrile/water 60 %": '"acetonitrile/water 40:60"',
    "60 % ACN/water": '"acetonitrile/water 60:40"',
    "ACN 60 %": '"acetonitrile/water 60:40"',
    "ACN 60:40": '"acetonitrile/water 60:40"',
    "acetonitrle/water 60:40": '"acetonitrile"',
    "beer": "viscosity",
    "acetic acid/hexane 1:99": "viscosity",
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
