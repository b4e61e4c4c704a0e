"""Labels and units of reports."""

import pytest

from xcol.flowpath.reader import parse
from xcol.report.labels import contribution_label, name_of, show
from xcol.units import FLOW, LENGTH, PRESSURE, RATIO, TEMPERATURE, TIME, VARIANCE, VOLUME


@pytest.mark.parametrize(
    ("value", "quantity", "text"),
    [
        (5e-6, LENGTH, "5 µm"), (0.254e-3, LENGTH, "0.254 mm"), (0.4, LENGTH, "400 mm"), (1.2, LENGTH, "1.2 m"),
        (20e-9, VOLUME, "20 µL"), (60e-12, VOLUME, "60 nL"), (1.62e-6, VOLUME, "1.62 mL"),
        (1e-6 / 60, FLOW, "1 mL/min"), (0.3e-9 / 60, FLOW, "300 nL/min"), (5e-9 / 60, FLOW, "5 µL/min"),
        (588.0, TIME, "9.8 min"), (0.5, TIME, "0.5 s"), (0.005, TIME, "5 ms"), (4e7, PRESSURE, "400 bar"),
        (303.15, TEMPERATURE, "30 °C"), (4e-18, VARIANCE, "4 µL²"), (0.65, RATIO, "0.65"), (11000.0, None, "11000"),
    ],
)  # fmt: skip
def test_values_have_a_unit_of_their_size(value, quantity, text):
    assert show(value, quantity) == text


def test_parts_are_called_by_name_or_by_what_they_are(plain):
    parts = parse(plain.replace(', name = "to cell"', "").replace('"UV"', '"UV", name = "VWD"'), "f").parts
    assert [name_of(part) for part in parts] == [
        "inject",
        "to column",
        "column 2.1 x 100 mm",
        "tube 250 x 0.17 mm",
        "VWD",
    ]
    assert contribution_label(parts[0], "injection") == "injected 2 µL"
    assert contribution_label(parts[4], "cell") == "VWD cell 2.5 µL"
    assert contribution_label(parts[4], "filter") == "VWD time constant 0.1 s"
    assert contribution_label(parts[4], "rate") == "VWD rate 10 Hz"
