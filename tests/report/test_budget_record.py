"""The JSON of a budget against the contract, and CSV."""

import csv
import io
import json
import math

import pytest

from xcol.answers.budget import budget
from xcol.answers.likely import Sampler
from xcol.flowpath.reader import parse, read
from xcol.report.budget_record import budget_csv, budget_record

TOP = {"schema", "version", "title", "flow_mL_min", "assumed", "warnings", "cautions", "pressure", "detectors"}
PRESSURE = {"part", "name", "flow_mL_min", "drop_bar", "inlet_bar", "max_pressure_bar"}
PEAK = {
    "name", "k", "retention_s", "diffusion_m2_s", "plates_column", "plates_observed", "plates_kept",
    "interval_plates_kept", "resolution_kept", "variance_column_uL2", "variance_extra_uL2", "variance_total_uL2",
    "variance_total_s2", "sigma_total_s", "width_half_s", "width_base_s", "extra_volume_uL", "parts",
}  # fmt: skip
ROW = {
    "part", "name", "position", "contribution", "side", "volume_uL", "tstar", "bend_De2Sc", "compression",
    "variance_uL2", "variance_low_uL2", "variance_high_uL2", "variance_s2", "variance_longtube_uL2", "share_extra",
    "share_total", "plates_kept_without",
}  # fmt: skip


def records(examples):
    for file in sorted(examples.glob("*.toml")):
        yield file.stem, budget_record(budget(read(str(file))))


def test_the_keys_of_the_contract(examples):
    for _, record in records(examples):
        assert set(record) >= TOP
        assert record["schema"] == "xcol.budget/1"
        assert all(set(row) >= PRESSURE for row in record["pressure"])
        for detector in record["detectors"]:
            assert set(detector) >= {"name", "delay_s", "peaks"}
            for peak in detector["peaks"]:
                assert set(peak) >= PEAK
                assert all(set(row) >= ROW for row in peak["parts"])
        json.dumps(record, allow_nan=False)


def test_volumes_and_seconds_agree_through_the_flow(examples):
    for _, record in records(examples):
        flow = record["flow_mL_min"] * 1000 / 60  # µL/s
        for detector in record["detectors"]:
            for peak in detector["peaks"]:
                assert peak["variance_total_uL2"] == pytest.approx(peak["variance_total_s2"] * flow**2)
                assert peak["sigma_total_s"] ** 2 == pytest.approx(peak["variance_total_s2"])
                assert peak["width_base_s"] == pytest.approx(4 * peak["sigma_total_s"])
                assert peak["width_half_s"] == pytest.approx(2.354820045 * peak["sigma_total_s"])
                assert peak["extra_volume_uL"] == pytest.approx(peak["delay_s"] * flow)
                parts = peak["parts"]
                assert sum(row["variance_uL2"] for row in parts) == pytest.approx(peak["variance_extra_uL2"])
                assert all(r["variance_uL2"] == pytest.approx(r["variance_s2"] * flow**2) for r in parts)
                assert {row["side"] for row in parts} <= {"before", "between", "after", "signal"}
                assert all((row["tstar"] is not None) == (row["variance_longtube_uL2"] is not None) for row in parts)


INTERVALS = {
    "interval_plates_kept": "plates_kept", "interval_resolution_kept": "resolution_kept",
    "interval_plates_observed": "plates_observed", "interval_variance_extra_uL2": "variance_extra_uL2",
    "interval_variance_total_uL2": "variance_total_uL2", "interval_sigma_total_s": "sigma_total_s",
    "interval_width_half_s": "width_half_s", "interval_plates_column": "plates_column",
}  # fmt: skip


def test_without_draws_there_are_ends_and_no_intervals(examples):
    for _, record in records(examples):
        assert record["draws"] is record["seed"] is None
        for detector in record["detectors"]:
            for peak in detector["peaks"]:
                assert all(peak[key] is None for key in INTERVALS)
                assert peak["leaders"] == peak["influences"] == []
                for row in peak["parts"]:
                    assert row["variance_low_uL2"] <= row["variance_uL2"] <= row["variance_high_uL2"]
                    assert row["low_because"]
                    assert row["high_because"]
                    assert (row["bend_De2Sc"] is None) == (row["tstar"] is None)
                    assert row["compression"] == 1


def test_every_headline_figure_has_an_interval_with_draws(examples):
    for file in examples.glob("*.toml"):
        answer = budget(read(str(file)))
        record = budget_record(answer, Sampler(answer, 200, 5))
        assert (record["draws"], record["seed"]) == (200, 5)
        for detector in record["detectors"]:
            for peak in detector["peaks"]:
                for key, figure in INTERVALS.items():
                    if peak[figure] is None:
                        assert peak[key] is None
                        continue
                    low, high = peak[key]
                    assert 0 < low <= high
                    assert 0.2 < peak[figure] / low < 5
                assert sum(leader["share_of_draws"] for leader in peak["leaders"]) == pytest.approx(1)
                assert len(peak["leaders"]) == len(peak["parts"])
                shares = [one["share_of_scatter"] for one in peak["influences"]]
                assert shares == sorted(shares, reverse=True)
                assert all(0 <= share <= 1 for share in shares)


def test_numbers_are_not_rounded(examples):
    record = budget_record(budget(read(str(examples / "brewery-narrow.toml"))))
    row = record["detectors"][0]["peaks"][0]["parts"][0]
    assert row["variance_uL2"] == pytest.approx(400 / 12, rel=1e-12)


def test_pressures_and_limits(examples):
    record = budget_record(budget(read(str(examples / "sugar-two-detectors.toml"))))
    by_name = {row["name"]: row for row in record["pressure"]}
    assert by_name["RI"]["max_pressure_bar"] == pytest.approx(5)
    assert by_name["UV"]["max_pressure_bar"] is None
    assert by_name["RI"]["inlet_bar"] == pytest.approx(by_name["RI waste line"]["drop_bar"])
    assert by_name["UV to RI"]["inlet_bar"] == pytest.approx(
        sum(by_name[name]["drop_bar"] for name in ("UV to RI", "RI inlet line", "RI waste line"))
    )
    assert by_name["UV"]["drop_bar"] == 0


def test_csv_has_a_line_for_each_row_and_no_formula(plain):
    answer = budget(parse(plain.replace('"to cell"', '"=1+1"').replace('"first"', '"@a"'), "f"))
    rows = list(csv.DictReader(io.StringIO(budget_csv(answer))))
    assert len(rows) == sum(len(peak.rows) for found in answer.detectors for peak in found.peaks)
    assert all(not cell.startswith(("=", "@", "+")) for row in rows for cell in row.values())
    assert math.isclose(float(rows[0]["variance_uL2"]), 4 / 12)
