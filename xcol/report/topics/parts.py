"""Topics: the kinds of part."""

from __future__ import annotations

import math

from xcol.filters.block import MeasuredBlock
from xcol.filters.column import Column, void_volume
from xcol.filters.signal import Boxcar, FirstOrder, first_order_rise
from xcol.filters.tube import Tube, TubeRun
from xcol.filters.volumes import Plug, TanksInSeries, dead_gap_volume
from xcol.filters.washout import WashedOut
from xcol.report.topics.topic import Topic
from xcol.units import significant

_FLOW = 1e-6 / 60  # 1 mL/min
_SQUARE = (_FLOW * 1e9) ** 2  # s² to µL²


def _shown(variance: object) -> str:
    return f"{significant(float(variance) * _SQUARE, zeros=True)} µL²"  # type: ignore[arg-type]


def _tube() -> str:
    tube = Tube(0.4, 0.254e-3, _FLOW, 1e-9)
    return (
        f"40 cm x 0.254 mm at 1 mL/min, D = 1e-9 m²/s: t* = {significant(float(tube.t_star))}, "
        f"{_shown(tube.variance())}; the long-tube formula gives {_shown(tube.longtube_variance())}"
    )


def _run() -> str:
    first, second = Tube(0.2, 0.254e-3, _FLOW, 1e-9), Tube(0.2, 0.178e-3, _FLOW, 1e-9)
    mixed = float(first.variance()) + float(second.variance())
    return (
        f"20 cm x 0.254 mm and 20 cm x 0.178 mm: {_shown(TubeRun((first, second)).variance())} as one "
        f"run, {_shown(mixed)} if a fitting between them mixed the stream"
    )


def _fitting() -> str:
    volume = float(dead_gap_volume(25.4e-3 / 16, 0.5e-3))
    return (
        f"a gap of 0.5 mm in a 1/16 in port holds {significant(volume * 1e9)} µL: "
        f"{_shown(TanksInSeries(volume, _FLOW).variance())} as one stirred tank"
    )


def _mixer() -> str:
    return f"50 µL as two tanks: {_shown(TanksInSeries(50e-9, _FLOW, 2.0).variance())}"


def _column() -> str:
    dead_time = float(void_volume(4.6e-3, 0.15, 0.65)) / _FLOW
    column = Column(dead_time, 2.0, 11000.0)
    return (
        f"4.6 x 150 mm, total porosity 0.65, at 1 mL/min: t0 = {significant(dead_time)} s; a band of "
        f"k = 2 with 11000 plates has {_shown(column.variance())}"
    )


def _block() -> str:
    block = MeasuredBlock(4e-18, 8e-9, _FLOW)
    return (
        f"4 µL² and 8 µL at 1 mL/min: {significant(float(block.variance()))} s², "
        f"{significant(float(block.delay()))} s of delay"
    )


def _detector() -> str:
    return (
        f"a 10 µL cell at 1 mL/min as a plug: {_shown(Plug(10e-9, _FLOW).variance())}; as one stirred tank: "
        f"{_shown(TanksInSeries(10e-9, _FLOW).variance())}; as a straight bore of 10 mm, D = 1e-9 m²/s: "
        f"{_shown(WashedOut(Tube(10e-3, 1.128e-3, _FLOW, 1e-9)).variance())}"
    )


def _filter() -> str:
    tau = 0.5 / first_order_rise(1)
    return (
        f"0.5 s as a time constant: {_shown(FirstOrder(0.5).variance())} at 1 mL/min; as a 10-90 % rise "
        f"time: {_shown(FirstOrder(tau).variance())}"
    )


def _inject() -> str:
    tube = Tube(20e-9 / (math.pi / 4 * 0.5e-3**2), 0.5e-3, _FLOW, 1e-9)
    return (
        f"20 µL injected at 1 mL/min: {_shown(Plug(20e-9, _FLOW).variance())} as a plug; from a full loop of 0.5 mm "
        f"bore, D = 1e-9 m²/s, {_shown(WashedOut(tube).variance())}"
    )


def _rate() -> str:
    return f"5 Hz, averaged over 0.2 s: {_shown(Boxcar(0.2).variance())} at 1 mL/min"


def _outlet() -> str:
    return "an outlet behind the last detector: 0 µL²"


PARTS = (
    Topic(
        "inject",
        "Injection",
        "Without a loop that is described, the injected volume enters as a plug: a rectangle in time. This is the best "
        'case, and the range goes to V²/4 (assumed). With loop = "20 uL x 0.5 mm", its volume and bore, it is as the '
        "loop is: full (where as much is injected as it holds), and washed out through its own bore, which is 5 "
        "plugs for 20 µL in 0.5 mm at 1 mL/min and more for slow molecules; or filled in part, and then a plug where "
        'it is emptied the other way (emptied = "reversed"), and a plug that passes the rest of the loop, a tube, '
        'where it is emptied the "same way". Where the file does not say which way, the plug is printed and the range '
        "goes to the other.",
        (
            "plug: σ² = (V/F)²/12 [s²],  V²/12 [µL²];  mean delay V/(2F)",
            "full loop: of the density 1 − F(t), F of the loop as a tube: mean m₂/2m₁, second moment m₃/3m₁",
            "σ²/V² at t* 0.02, 0.1, 0.5: 0.456, 0.224, 0.122;  1/12 for a long loop",
        ),
        "Any flow. A loop is printed as straight; its range goes to a coil of 3 cm. What the sample's solvent does "
        "at the column head is not counted yet.",
        (
            "variance of a rectangular distribution; Sternberg, Adv. Chromatogr. 2 (1966) 205, from memory",
            "washing-out by residence time theory; Danckwerts, Chem. Eng. Sci. 2 (1953) 1, from memory",
        ),
        _inject,
        ("injection", "plug", "loop", "sample"),
    ),
    Topic(
        "tube",
        "Connecting tube",
        "Laminar flow: the middle of the stream runs ahead, diffusion across the bore evens it out. "
        "The exact variance at the outlet comes from the moment equations of that problem. It hangs "
        "on t* = D·t/a² = π·D·L/F, in which the bore does not appear. The textbook formula is the "
        "limit for long t*; connecting tubes have t* of 0.01 to 0.5, where it is 8 to 1.1 times too "
        "large. A short tube's variance grows as L² and hardly with flow or D; a long one's as L, F "
        "and 1/D. At any t* it grows as the fourth power of the bore, axial diffusion left out.",
        (
            "σ² = V²·Φ(t*),  V = π/4·d²·L,  t* = π·D·L/F",
            "Φ → 1/(24 t*) − 1/(384 t*²) for t* > 1;  0.224 at 0.1;  0.536 at 0.01",
            "and along the tube 2·D·L/u³ [s²], u the mean velocity",
        ),
        "Round, Reynolds number below 2000. Below t* = 0.001 entrance effects blur it. Bends mix the stream and lower "
        "the variance, up to 5 times (xcol explain bend): a straight tube is the worst case, and is what is printed "
        "unless the file gives bend_radius or coil_diameter.",
        (
            "Aris, Proc. R. Soc. A 235 (1956) 67 (method of moments), from memory",
            "Taylor, Proc. R. Soc. A 219 (1953) 186; Golay 1958 (long-tube limit), from memory",
        ),
        _tube,
        ("tubing", "capillary", "t*", "tstar", "long-tube", "longtube", "taylor", "aris", "bore"),
    ),
    Topic(
        "run",
        "Tubes that follow each other",
        "Laminar flow keeps its layers through a change of bore, so what is slow in the first tube is "
        "slow in the next, and their delays are correlated: a run of straight tubes spreads more than the sum "
        "of its tubes. Cutting a tube in two changes nothing. A row shows the tube's own variance and "
        "half of what it shares; N if gone is computed again without the tube, the run closing up. A "
        "fitting, mixer, cell or column between straight tubes mixes the stream anew, which lowers the variance: "
        "taking such a fitting out can cost plates. Behind a strong bend fast and slow have changed places: such tubes "
        "share next to nothing, or less than nothing.",
        (
            "σ² = Σ w_i²·V(t_i) + Σ_{i<j} w_i·w_j·[V(t_i+d+t_j) − V(t_i+d) − V(d+t_j) + V(d)] [s²]",
            "V(t) = t²·Φ(t),  w = a²/D,  t the tubes' t*,  d the t* between i and j",
        ),
        "Exact for straight tubes with nothing between them. Where bends differ, what two tubes share is taken with "
        "the stronger bend of the two. Whether a fitting mixes the stream is rarely known: that it does is printed, "
        "the worst of the tubes beside it is that it does not (even odds in the draws); remix says which.",
        ("moment equations of laminar flow with piecewise bore, as for a tube",),
        _run,
        ("runs", "series of tubes"),
    ),
    Topic(
        "fitting",
        "Fitting, union, frit, valve passage",
        "A volume or a dead gap is one stirred tank, unless tanks says otherwise. A bore with a length "
        "is a short tube, mixed at both ends; with remix = false it is a part of the run of tubes beside it.",
        ("σ² = (V/F)²/n [s²]", "gap: V = π/4·d_port²·gap"),
        "Real fittings lie on either side of a tank: the range goes from a plug, V²/12, to 1.35 V², which a measured "
        "valve passage of 0.2 µL showed (J. Liq. Chromatogr. 1982, abstract). That a fitting mixes the stream of the "
        "tubes beside it is the best case for them.",
        ("tanks in series: Levenspiel, Chemical Reaction Engineering, from memory",),
        _fitting,
        ("union", "gap", "dead volume", "frit", "valve", "port"),
    ),
    Topic(
        "mixer",
        "Mixing volume",
        "n equal stirred tanks in series; one tank mixes perfectly, many tanks only delay.",
        ("σ² = (V/F)²/n [s²]", "third central moment 2(V/F)³/n² [s³]"),
        "n of 1 and above; need not be whole.",
        ("tanks in series: Levenspiel, Chemical Reaction Engineering, from memory",),
        _mixer,
        ("tanks", "tank"),
    ),
    Topic(
        "column",
        "Column",
        "The column's own band is a Gaussian of its plate number. The plates are those entered, or come from "
        "the reduced plate height (xcol explain plate-height): a certificate's hold at its own flow, k and "
        "analyte, and have the maker's plumbing inside; plates_at gives that flow. "
        "Columns in series add their times and variances.",
        (
            "t0 = V0/F,  V0 = ε_total·π/4·d²·L",
            "σ = t0·(1+k)/√N [s]",
            "N recorded / N column = σ²_column/σ²_total;  resolution kept = its root",
        ),
        "Isocratic elution; plates without plates_at hold at any flow. A reduced plate height below 1 is refused.",
        ("definition of the plate number",),
        _column,
        ("plates", "n", "kept", "resolution", "rs kept", "void volume", "porosity", "own"),
    ),
    Topic(
        "block",
        "Measured block",
        "A module that is known only by its measured variance, an autosampler with all it holds, for "
        "instance. The variance is taken as constant in µL² at every flow, the form as Gaussian.",
        ("σ² = σ²_measured/F² [s²]",),
        "Near the flow at which it was measured.",
        ("common practice, no source",),
        _block,
        ("module", "variance"),
    ),
    Topic(
        "detector",
        "Detector: cell",
        "The cell is read over its volume: a plug, which is the best case, as many stirred tanks as are given, or, "
        "with path_length, a straight bore that is read over its volume, which is the worst case. The range goes "
        "from the plug to that bore (of 10 mm where no path length is given), at this flow and for this molecule. "
        "Filter and data rate act on the signal of this detector only. A cell on the way to a later detector is a "
        "part of that one's path (a straight bore is then a tube); its electronics are not.",
        (
            "plug (V/F)²/12;  n tanks (V/F)²/n [s²]",
            "straight bore: as a full loop, of the density 1 − F(t), with t* = π·D·L/F",
        ),
        "A straight 10 mm bore has 1.28 V² at 1 mL/min and D = 1e-9 m²/s, 15 plugs, and more for slow molecules: 2.9 "
        "V² for an antibody at 0.3 mL/min.",
        (
            "variance of a rectangular distribution; Sternberg, Adv. Chromatogr. 2 (1966) 205, from memory",
            "residence time theory; Danckwerts, Chem. Eng. Sci. 2 (1953) 1, from memory",
        ),
        _detector,
        ("cell", "uv", "ri"),
    ),
    Topic(
        "filter",
        "Noise filter of the detector",
        "A time constant τ is that of each first-order stage, or σ of a Gaussian filter. A rise time is "
        "10-90 % of the whole filter. A word like 'response' can mean either, or the time to 90 or "
        "99 %: the readings span a factor of 21 in variance. response is taken as 10-90 % of a first-order filter, its "
        "range goes over all readings, and the draws take each alike: look it up. filters lists several.",
        (
            "first order: σ² = n·τ² [s²], n stages",
            "rise time: σ = t_rise/c,  c = 2.197, 2.374, 2.437, 2.468 for 1 to 4 stages",
            "c = 2.563 for a Gaussian, 2.771 for a boxcar",
        ),
        "In volume it grows with the square of the flow.",
        (
            "ln 9 = 2.197 time constants for 10-90 % of a first-order step",
            "IUPAC Gold Book R05345, R05346 (response time, rise time)",
        ),
        _filter,
        ("time constant", "rise time", "response", "electronics", "signal"),
    ),
    Topic(
        "rate",
        "Data rate",
        "The signal is averaged between two data points over the whole time between them, or over dwell where that is "
        "given. Averaging broadens; sampling alone only scatters.",
        ("σ² = dwell²/12 [s²], dwell = 1/rate unless it is given",),
        "20 points across 4σ add 0.33 % to the variance, 10 points 1.3 %.",
        ("variance of a rectangular distribution",),
        _rate,
        ("sampling", "points", "cycle", "dwell"),
    ),
    Topic(
        "outlet",
        "Outlet",
        "The end of the path: a collector, or waste. It broadens nothing that is recorded.",
        ("σ² = 0",),
        "Behind the last detector.",
        ("definition",),
        _outlet,
        ("waste", "collector"),
    ),
)
