"""Topics: the figures of a report."""

from __future__ import annotations

import math

from xcol.catalogs import Catalogs
from xcol.flowpath.hydraulics import bed_drop, reynolds_number, tube_drop
from xcol.report.topics.topic import Topic
from xcol.units import significant

_FLOW = 1e-6 / 60


def _pressure() -> str:
    tube = float(tube_drop(_FLOW, 2.0, 0.3e-3, 0.89e-3)) / 1e5
    usual = Catalogs().usual_packing()
    tight, loose = usual.interstitial_range
    porosities = (usual.interstitial_porosity, loose, tight)
    bed = [float(bed_drop(_FLOW, 0.15, 4.6e-3, 0.9e-3, 5e-6, e)) / 1e5 for e in porosities]
    at, low, high = (significant(value) for value in bed)
    return (
        f"water at 1 mL/min through 2 m x 0.3 mm: {significant(tube)} bar; 0.9 mPa s through 4.6 x 150 "
        f"mm, 5 µm: {at} bar ({low} to {high} for a bed of {loose:g} to {tight:g})"
    )


def _reynolds() -> str:
    number = float(reynolds_number(_FLOW, 0.25e-3, 0.9e-3, 1000.0))
    return f"1 mL/min, 0.9 mPa s, in 0.25 mm: Re = {significant(number)}"


def _width() -> str:
    half = 2 * math.sqrt(2 * math.log(2))
    return f"σ = 1 s: {significant(half, 4)} s at half height, 4 s between the tangents at the base"


def _budget() -> str:
    return f"10 % more variance: {significant(100 * (1 - 1 / 1.1))} % of the plates lost"


def _retention() -> str:
    return "t0 = 100 s, 2 s outside the column: a peak recorded at 302 s has k = (302 − 2)/100 − 1 = 2"


QUANTITIES = (
    Topic(
        "budget",
        "How the parts add up",
        "Every part between the injection and the record is a linear filter of the signal in time. Mean "
        "delays, variances and third central moments of such filters add. The sum is made in s²; what "
        "is shown in µL² is s² times the square of the column's flow. Parts behind a detector add "
        "nothing to it. N if gone is the plate number recorded without that part.",
        (
            "σ²_total = σ²_before + σ²_column + σ²_between + σ²_after + σ²_signal [s²]",
            "N recorded/N column = σ²_column/σ²_total",
        ),
        "Isocratic elution; parts that are linear and independent of each other, runs of tubes aside.",
        ("additivity of the cumulants of independent delays",),
        _budget,
        ("sum", "share", "of added", "n if gone", "µL²", "uL2", "s²"),
    ),
    Topic(
        "pressure",
        "Pressure",
        "A part's inlet carries its own drop and all drops downstream, to atmosphere. Tubes by "
        "Hagen-Poiseuille, beds by Kozeny-Carman with the interstitial porosity, which is rarely known: "
        "the range is that of usual beds. A measured drop, or pump_pressure (the columns then take "
        "what the rest does not explain), is better. Cells, mixers and the volumes of fittings have no drop unless it "
        "is entered. A limit that was not entered is not checked.",
        (
            "tube: ΔP = 128·η·L·F/(π·d⁴)",
            "bed: ΔP = 180·η·u·L·(1−ε)²/(ε³·d_p²),  u = F/(π/4·d²), ε interstitial",
        ),
        "Laminar flow (Reynolds number below 2000); the viscosity at each part's temperature.",
        ("Hagen-Poiseuille", "Carman 1937, constant 180, from memory"),
        _pressure,
        ("bar", "drop", "inlet", "limit", "max_pressure", "kozeny", "carman", "poiseuille", "bed"),
    ),
    Topic(
        "reynolds",
        "Reynolds number",
        "Inertia over viscosity. Above about 2000 the flow is not laminar, and neither the variance of a "
        "tube nor its pressure drop can be trusted.",
        ("Re = 4·ρ·F/(π·d·η)",),
        "The density is that of the mobile phase, or 1000 kg/m³ where neither is entered.",
        ("definition",),
        _reynolds,
        ("re", "laminar", "turbulent", "density"),
    ),
    Topic(
        "width",
        "Widths",
        "The widths shown are those of a Gaussian with the total variance. A peak with much plumbing in "
        "it tails, and is then narrower at half height than this.",
        ("W½ = 2.355 σ,  tangent base width = 4 σ",),
        "Gaussian peaks.",
        ("common practice, no source",),
        _width,
        ("w½", "half height", "base", "sigma", "σ"),
    ),
    Topic(
        "retention",
        "Retention and the delay outside the column",
        "A recorded retention or elution volume is the mean of the recorded peak, counted from the "
        "valve's turn. The mean delay of everything outside the columns is taken off before k is "
        "computed: half the injected volume, tubes, fittings, half the cell (all of it where it mixes as tanks, or is "
        "passed on the way to a later detector), the filter's time constants, "
        "half the time between data points.",
        ("k = (t_R − t_outside)/t0 − 1",),
        "Recorded at the first detector.",
        ("definition",),
        _retention,
        ("k", "elution volume", "delay", "transit", "t_r"),
    ),
)
