"""TOML's complaints, translated."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from xcol.flowpath.toml_text import load

GOOD = 'path = [\n  { inject = "20 uL" },\n  { tube = "40 cm x 0.25 mm", name = "a" },\n]\nflow = "1 mL/min"\n'
DATA = {"path": [{"inject": "20 uL"}, {"tube": "40 cm x 0.25 mm", "name": "a"}], "flow": "1 mL/min"}


def test_a_good_text_has_no_faults():
    assert load(GOOD, "f") == (DATA, GOOD, [])


@pytest.mark.parametrize(
    ("old", "new", "line"),
    [
        ('"20 uL" },', '"20 uL" }', 2),  # no comma between parts
        ('"20 uL" },', '"20 uL" } # first', 2),
        ('"20 uL" },', '"20 uL", },', 2),  # comma before the brace
        ('mm", name', 'mm",\n    name', 3),  # broken over two lines
        ('"a" },', '"a"\n  },', 3),
        ('mm", name', 'mm", # comment\n  name', 3),
        ('"20 uL"', "“20 uL”", 2),  # curly quotes
        ('"20 uL"', "„20 uL“", 2),
        ('"20 uL"', "20 uL", 2),  # no quotes
        ('"40 cm x 0.25 mm"', "40 cm x 0.25 mm", 3),
        ('"a"', "a", 3),
        ('"1 mL/min"', "1 mL/min", 5),
        ('"1 mL/min"', "1 mL/min # flow", 5),
        ('"20 uL"', '"20 uL', 2),  # no closing quote
        ('"1 mL/min"', '"1 mL/min', 5),
        ('mm", name', 'mm" name', 3),  # no comma between keys
        ("},\n]", "};\n]", 3),
        ('"20 uL" },', '"20 uL" };', 2),
        ("flow =", "flow :", 5),
        ("flow =", "flow", 5),
        ('"20 uL" },', '"20 uL",', 2),  # no closing brace
        ("]\n", "\n", 5),  # no closing bracket
        ('"1 mL/min"', '"1 mL\\min"', 5),
    ],
)
def test_one_slip_is_one_fault_with_its_line_and_the_rest_is_read(old, new, line):
    text = GOOD.replace(old, new, 1)
    assert text != GOOD
    data, mended, faults = load(text, "f")
    assert [fault.place.line for fault in faults] == [line]
    assert faults[0].read
    assert faults[0].suggestion
    assert data is not None
    assert data["path"][0] == DATA["path"][0]
    assert data["path"][1] == DATA["path"][1]
    assert data["flow"].split()[0] == "1"
    assert mended.count("\n") == text.count("\n")


def test_several_slips_are_all_found_and_keep_their_lines():
    text = (
        'flow = 1.0 mL/min\nviscosity: "0.9 cP"\ndiffusion = “1e-9 m^2/s”\npath = [\n  { inject = "20 uL", }\n'
        '  { tube = "40 cm x 0.25 mm",\n    name = "a" },\n  { mixer = "1 uL" tanks = 2 },\n]\n'
    )
    data, _, faults = load(text, "f")
    assert [fault.place.line for fault in faults] == [1, 2, 3, 5, 5, 6, 8]
    assert [list(part) for part in data["path"]] == [["inject"], ["tube", "name"], ["mixer", "tanks"]]


@pytest.mark.parametrize(
    "text",
    ['flow = "1"\nflow = "2"\n', "path = []\n[[path]]\n", "= 1\n", 'a = "\x01"\n', "a = (\n", "[a\n", "a = [1, 2\n",
     '{ detector = "UV, cell = "10 uL" }\n', "a = {", "a = [ {"],
)  # fmt: skip
def test_other_slips_have_a_line_and_a_suggestion(text):
    _, _, faults = load(text, "f")
    assert faults
    assert all(fault.place.line and fault.suggestion and fault.expected for fault in faults)


def test_very_deep_lists_are_refused():
    data, _, faults = load("a = " + "[" * 20000, "f")
    assert data is None
    assert len(faults) == 1


@given(st.text(alphabet="[]{}=,\"'#\n ab.1:;“”\\\t-", max_size=80))
def test_any_text_ends_with_data_or_faults(text):
    data, _, faults = load(text, "f")
    assert data is not None or faults


@given(st.data())
def test_a_good_text_with_any_character_taken_out_or_put_in(data):
    at = data.draw(st.integers(0, len(GOOD)))
    put = data.draw(st.sampled_from(["", '"', "}", "{", ",", "=", "]", "[", "\n", "x", "”", " "]))
    cut = data.draw(st.integers(0, 2))
    text = GOOD[:at] + put + GOOD[at + cut :]
    found, mended, faults = load(text, "f")
    assert found is not None or faults
    assert all(1 <= (fault.place.line or 1) <= text.count("\n") + 1 for fault in faults)
    assert mended is not None
