"""Slips: odd values are warned of and still computed."""

import pytest

from xcol.flowpath.reader import parse

FILE = """\
flow = "{flow}"
viscosity = "{viscosity}"
diffusion = "1e-9 m^2/s"
path = [
  {{ inject = "{inject}" }},
  {{ tube = "{tube}", name = "line" }},
  {{ column = "{column}", plates = {plates}, {porosity} }},
  {{ detector = "UV", {detector} }},
  {behind}
]
"""
USUAL = {
    "flow": "0.5 mL/min",
    "viscosity": "0.9 mPa s",
    "inject": "2 uL",
    "tube": "30 cm x 0.17 mm",
    "column": "2.1 x 100 mm, 3 um",
    "plates": "12000",
    "porosity": "total_porosity = 0.6",
    "detector": 'cell = "2.5 uL", time_constant = "0.1 s"',
    "behind": "",
}


def warnings_of(**changed):
    return parse(FILE.format(**(USUAL | changed)), "f.toml").warnings


def test_what_is_usual_has_no_warning():
    assert warnings_of() == ()
    for tube in ("30 cm x 0.005 in", "30 cm x 0.13 mm", "30 cm x 0.18 mm", "30 cm x 75 um", "1 m x 0.5 mm"):
        assert warnings_of(tube=tube) == ()
    assert warnings_of(column="2.1 x 100 mm, 3 um", porosity='void_volume = "0.2 mL"') == ()
    assert warnings_of(inject='2 uL", loop = "20 uL x 0.5 mm') == ()
    assert warnings_of(tube='30 cm x 0.17 mm", bend_radius = "2 cm') == ()
    for detector in ('cell = "2 uL", response = "0.5 s"', 'cell = "2 uL", filters = [{ rise_time = "0.2 s" }]'):
        assert warnings_of(detector=detector) == ()


@pytest.mark.parametrize(
    ("changed", "word"),
    [
        ({"tube": '30 cm x 0.17 mm", volume_tolerance = "3 %'}, "not used"),
        ({"inject": '2 uL", bore_tolerance = "3 %'}, "not used"),
        ({"tube": '30 cm x 0.17 mm", bend_radius = "3 mm'}, "bend"),
        ({"tube": '30 cm x 0.17 mm", coil_diameter = "5 m'}, "bend"),
        ({"inject": '2 uL", loop = "20 uL x 0.03 mm'}, "long"),
        ({"inject": '2 uL", loop = "20 uL x 3 mm'}, "long"),
        ({"detector": 'cell = "2.5 uL", response = "20 s"'}, "response"),
        ({"tube": "30 cm x 1.59 mm"}, "outside diameter"),
        ({"tube": "30 cm x 0.0625 in"}, "outside diameter"),
        ({"tube": "30 cm x 0.794 mm"}, "outside diameter"),
        ({"tube": "30 cm x 2.5 mm"}, "wide"),
        ({"tube": "30 cm x 0.25 in"}, "wide"),
        ({"tube": "30 cm x 0.010 mm"}, "0.01 in"),
        ({"tube": "30 cm x 0.089 mm"}, "radius"),
        ({"tube": "30 m x 0.17 mm"}, "long"),
        ({"tube": "0.5 mm x 0.17 mm"}, "5 bores"),
        ({"column": "1.05 x 100 mm, 3 um"}, "radius"),
        ({"column": "100 x 2.1 mm, 3 um"}, "length first"),
        ({"column": "2.1 x 100 mm, 100 um", "plates": "500"}, "particle"),
        ({"column": "2.1 x 100 mm", "plates": "90000"}, "per metre"),
        ({"column": "2.1 x 100 mm"}, "particle size"),
        ({"plates": "300"}, "few"),
        ({"porosity": "total_porosity = 0.4"}, "interstitial"),
        ({"porosity": 'void_volume = "0.13 mL"'}, "interstitial"),
        ({"porosity": "total_porosity = 0.95"}, "high"),
        ({"porosity": "total_porosity = 0.6, interstitial_porosity = 0.5"}, "interstitial"),
        ({"flow": "10 mL/min"}, "mm/s"),
        ({"flow": "1 uL/min"}, "mm/s"),
        ({"inject": "500 uL"}, "void volume"),
        ({"inject": "2 mL", "column": "10 x 250 mm, 5 um"}, "unusual here"),
        ({"detector": 'cell = "2.5 uL"'}, "filter"),
        ({"detector": 'cell = "500 uL", time_constant = "0.1 s"'}, "unusual here"),
        ({"detector": 'cell = "0.05 uL", path_length = "50 mm", time_constant = "0.1 s"'}, "path length"),
        ({"detector": 'cell = "2.5 uL", time_constant = "100 s"'}, "time_constant"),
        ({"detector": 'cell = "2.5 uL", time_constant = "0.1 s", max_pressure = "4 kPa"'}, "unit"),
        ({"behind": '{ tube = "1 m x 0.5 mm", name = "waste" },'}, "behind the last detector"),
        ({"viscosity": "0.05 mPa s", "tube": "30 cm x 0.06 mm", "flow": "5 mL/min"}, "Reynolds"),
    ],
)
def test_what_is_odd_is_warned_of(changed, word):
    found = warnings_of(**changed)
    assert any(word in warning for warning in found), found


def test_parts_in_odd_places():
    text = FILE.format(**USUAL)
    before = text.replace("path = [\n", 'path = [\n  { mixer = "50 uL" },\n')
    assert any("before the injection" in warning for warning in parse(before, "f").warnings)
    outlet = FILE.format(**(USUAL | {"behind": '{ outlet = "waste" },\n  { tube = "1 m x 0.5 mm" },'}))
    assert any("not the end" in warning for warning in parse(outlet, "f").warnings)


def test_without_viscosity_it_is_said_that_there_is_no_pressure():
    text = FILE.format(**USUAL).replace('viscosity = "0.9 mPa s"\n', "")
    assert any("viscosity" in warning for warning in parse(text, "f").warnings)


def test_slow_diffusion_is_odd():
    text = FILE.format(**USUAL) + 'peaks = [ { k = 1, diffusion = "1e-9 cm^2/s" } ]\n'
    assert any("cm^2/s" in warning for warning in parse(text, "f").warnings)
