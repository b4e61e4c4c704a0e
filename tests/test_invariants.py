"""What must hold for any path (models: splitting, order, spelling, nothing added by nothing)."""

import math

import pytest
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st

from xcol.answers.budget import budget
from xcol.flowpath.reader import parse

bores = st.sampled_from([0.05, 0.1, 0.127, 0.178, 0.254, 0.5])
tubes = st.tuples(st.floats(5, 900), bores).map(lambda pair: f'{{ tube = "{pair[0]!r} mm x {pair[1]} mm" }}')
mixing = st.one_of(
    st.floats(0.01, 20).map(lambda v: f'{{ fitting = "{v!r} uL" }}'),
    st.tuples(st.floats(0.1, 50), st.floats(1, 20)).map(lambda p: f'{{ mixer = "{p[0]!r} uL", tanks = {p[1]!r} }}'),
    st.floats(0.01, 20).map(lambda v: f'{{ block = "{v!r} uL^2", volume = "1 uL" }}'),
    st.tuples(st.floats(0.5, 5), bores).map(
        lambda p: f'{{ fitting = "a", length = "{p[0]!r} mm", bore = "{p[1]} mm" }}'
    ),
)
sides = st.lists(st.one_of(tubes, mixing), max_size=5)
conditions = st.fixed_dictionaries(
    {
        "flow": st.floats(0.05, 2),
        "diffusion": st.floats(1e-11, 5e-9),
        "k": st.just(0.0) | st.floats(0.01, 20),
        "inject": st.just(0.0) | st.floats(0.01, 50),
        "bend": st.none() | st.floats(0.5, 200),  # cm, of all tubes
        # None: all is entered; otherwise liquid, plates and diffusion come from the catalogs
        "liquid": st.none() | st.fixed_dictionaries(
            {
                "organic": st.sampled_from(["acetonitrile", "methanol", "THF"]),
                "percent": st.integers(1, 99),
                "celsius": st.floats(20, 70),
                "ambient": st.none() | st.floats(15, 40),
                "mass": st.floats(60, 490),
            }
        ),
    }
)  # fmt: skip

BY_CURVE = '{ column = "2.1 x 100 mm, 3 um", packing = "core-shell", total_porosity = 0.6 }'
COLUMN = '{ column = "2.1 x 100 mm, 3 um", plates = 12000, total_porosity = 0.6 }'
DETECTOR = '{ detector = "UV", cell = "2.5 uL", time_constant = "0.1 s", rate = "10 Hz" }'


def peak_of(before, after, c, flow_unit="mL/min", flow_factor=1.0):
    liquid = c["liquid"]
    bend = f'bend_radius = "{c["bend"]!r} cm"\n' if c["bend"] else ""
    parts = [f'{{ inject = "{c["inject"]!r} uL" }}', *before, BY_CURVE if liquid else COLUMN, *after, DETECTOR]
    head = 'viscosity = "0.8 mPa s"\n' if bend and not liquid else ""
    text, solute = (
        f'{head}{bend}flow = "{c["flow"] * flow_factor!r} {flow_unit}"\n',
        f'diffusion = "{c["diffusion"]!r} m^2/s"',
    )
    if liquid:
        share = liquid["percent"]
        text += f'mobile_phase = "{liquid["organic"]}/water {share}:{100 - share}"\n'
        text += f'temperature = "{liquid["celsius"]!r} degC"\n'
        text += f'ambient = "{liquid["ambient"]!r} degC"\n' if liquid["ambient"] else ""
        solute = f'molar_mass = "{liquid["mass"]!r} g/mol"'
    text += "path = [\n" + ",\n".join(parts) + f"\n]\npeaks = [ {{ k = {c['k']!r}, {solute} }} ]\n"
    answer = budget(parse(text, "f"))
    return answer.detectors[0], answer.detectors[0].peaks[0]


def runs(parts):
    """Cut a side into what may be reordered: runs of tubes, and single mixing parts."""
    groups: list[list[str]] = []
    for part in parts:
        if "tube" in part and groups and "tube" in groups[-1][-1]:
            groups[-1].append(part)
        else:
            groups.append([part])
    return groups


@settings(max_examples=60)
@given(before=sides, after=sides, c=conditions)
def test_observed_plates_are_positive_finite_and_at_most_the_column_s(before, after, c):
    detector, peak = peak_of(before, after, c)
    assert 0 < peak.plates_observed <= peak.plates_column * (1 + 1e-12)
    assert math.isfinite(peak.variance_total)
    # behind a bend fast and slow have changed places, and what a narrow tube shares may be less than nothing
    assert c["bend"] or all(row.variance >= 0 for row in peak.rows)
    assert peak.variance_extra >= 0
    assert detector.delay > 0
    assert sum(row.variance for row in peak.rows) == pytest.approx(peak.variance_extra)
    assert all(row.low <= row.variance <= row.high for row in peak.rows)
    worst, best = peak.plates_kept_range
    assert 0 < worst <= peak.plates_kept <= best <= 1 + 1e-12


@settings(max_examples=40)
@given(before=sides, after=sides, c=conditions)
def test_bending_every_tube_broadens_nothing(before, after, c):
    straight, bent = (peak_of(before, after, c | {"bend": bend})[1] for bend in (None, c["bend"] or 3.0))
    assert bent.variance_extra <= straight.variance_extra * (1 + 1e-9)
    assert bent.plates_observed >= straight.plates_observed * (1 - 1e-9)


@settings(max_examples=60)
@given(before=sides, after=sides, c=conditions, data=st.data())
def test_cutting_a_tube_changes_nothing(before, after, c, data):
    share = data.draw(st.floats(0.01, 0.99))
    length, bore = data.draw(st.floats(20, 900)), data.draw(bores)
    at = data.draw(st.integers(0, len(before)))
    whole = f'{{ tube = "{length!r} mm x {bore} mm" }}'
    halves = [
        f'{{ tube = "a", length = "{part!r} mm", bore = "{bore} mm" }}'
        for part in (length * share, length * (1 - share))
    ]
    one = peak_of([*before[:at], whole, *before[at:]], after, c)
    two = peak_of([*before[:at], *halves, *before[at:]], after, c)
    assert two[0].delay == pytest.approx(one[0].delay, rel=1e-9)
    assert two[1].variance_extra == pytest.approx(one[1].variance_extra, rel=1e-9)


@settings(max_examples=60, suppress_health_check=[HealthCheck.filter_too_much])
@given(before=sides, after=sides, c=conditions, data=st.data())
def test_the_order_on_one_side_changes_nothing(before, after, c, data):
    assume(len(runs(before)) > 1)
    moved = []
    for group in data.draw(st.permutations(runs(before))):
        moved += group[::-1] if data.draw(st.booleans()) else group
    assume(moved != before)
    assume(sorted(map(len, runs(moved))) == sorted(map(len, runs(before))))  # no two runs came together
    one, two = peak_of(before, after, c), peak_of(moved, after, c)
    assert two[1].variance_extra == pytest.approx(one[1].variance_extra, rel=1e-9)
    assert two[1].plates_observed == pytest.approx(one[1].plates_observed, rel=1e-9)


NOTHING = ['{ fitting = "0 uL" }', '{ mixer = "0 uL" }', '{ fitting = "a", gap = "0 mm" }', '{ block = "0 uL^2" }',
           '{ tube = "a", length = "0 mm", bore = "0.2 mm" }', '{ tube = "a", volume = "0 uL", bore = "0.2 mm" }',
           '{ fitting = "a", length = "0 mm", bore = "0.2 mm" }']  # fmt: skip


@settings(max_examples=60)
@given(before=sides, after=sides, c=conditions, at=st.integers(0, 5), nothing=st.sampled_from(NOTHING))
def test_no_length_and_no_volume_add_nothing(before, after, c, at, nothing):
    at = min(at, len(before))
    one = peak_of(before, after, c)
    two = peak_of([*before[:at], nothing, *before[at:]], after, c)
    assert two[0].delay == pytest.approx(one[0].delay, rel=1e-12)
    assert two[1].variance_extra == pytest.approx(one[1].variance_extra, rel=1e-9)


@settings(max_examples=40)
@given(before=sides, after=sides, c=conditions)
def test_the_spelling_of_units_changes_nothing(before, after, c):
    spelled = [
        part.replace(" mm x ", "mm × ").replace(" mm", "e-1 cm").replace(" uL", " µl").replace("^2", "²")
        if "e" not in part.split('"')[1] else part
        for part in before
    ]  # fmt: skip
    one = peak_of(before, after, c)
    two = peak_of(spelled, after, c, "uL/min", 1000.0)
    assert two[1].variance_extra == pytest.approx(one[1].variance_extra, rel=1e-7)


@settings(max_examples=40)
@given(before=sides, after=sides, c=conditions)
def test_volumes_and_seconds_agree_through_the_flow(before, after, c):
    _, peak = peak_of(before, after, c)
    flow = c["flow"] * 1e-6 / 60
    for row in peak.rows:
        if row.contribution == "injection":
            assert row.variance * flow**2 == pytest.approx((c["inject"] * 1e-9) ** 2 / 12)
        if row.contribution == "filter":
            assert row.variance == pytest.approx(0.01)
