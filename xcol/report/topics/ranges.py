"""Topics: ranges and intervals, and the bends that most of them hang on."""

from __future__ import annotations

from xcol.filters.curved import bend_strength, dean_number
from xcol.filters.tube import Tube
from xcol.flowpath.hydraulics import reynolds_number
from xcol.report.topics.topic import Topic
from xcol.units import significant

_FLOW = 1e-6 / 60


def _bend() -> str:
    reynolds = float(reynolds_number(_FLOW, 0.254e-3, 0.9e-3, 1000.0))
    dean = float(dean_number(reynolds, 0.254e-3, 1 / 0.04))
    strength = float(bend_strength(dean, 0.9e-3 / (1000.0 * 1e-9)))
    straight, bent = (
        float(Tube(0.4, 0.254e-3, _FLOW, 1e-9, s).variance()) * (_FLOW * 1e9) ** 2 for s in (0.0, strength)
    )
    return (
        f"40 cm x 0.254 mm at 1 mL/min, 0.9 mPa s, D = 1e-9 m²/s, bent at 4 cm: De = {significant(dean)}, De²·Sc = "
        f"{significant(strength)}; {significant(bent)} µL² in place of {significant(straight)} straight"
    )


def _likely() -> str:
    usual, *ends = (float(Tube(0.4, bore * 0.254e-3, _FLOW, 1e-9).variance()) for bore in (1.0, 1 / 1.05, 1.05))
    less, more = (100 * (end / usual - 1) for end in ends)
    return f"40 cm x 0.254 mm with a bore ±5 %: {significant(less)} to +{significant(more)} % of its variance"


RANGES = (
    Topic(
        "bend",
        "Bends and coils",
        "In a bend a secondary flow carries the fast middle outwards and back along the wall: it mixes the stream "
        "across the bore, and the variance falls, in long tubes to a fifth. One number rules it, De²·Sc: ordinary "
        "tubes on a bench, bent at a few centimetres, have 1e4 to 1e5 and are deep in that range. Nobody knows how a "
        "tube on a bench is bent, so a tube without bend_radius or coil_diameter is printed as straight, the worst "
        "case, with the range down to a bend of 3 cm all along; the draws take any curvature between. Both keys are "
        "also understood at the top of the file, for all tubes and loops.",
        (
            "De = Re·√(a/R),  a = bore/2, R the radius of the bend, Re on the diameter",
            "Sc = η/(ρ·D)",
            "σ² = V²·Φ(t*, De²·Sc): 0.083 V² at t* = 0.1 and De²·Sc = 1e4, 0.224 V² straight",
        ),
        "Dean's first-order secondary flow, De to about 20: above, the value at 20 is kept, an upper estimate. "
        "De²·Sc up to 1e6: above, the value there is kept. Measured coils have 20 to 40 % less variance than "
        "straight tubes, less than the theory of a uniform coil takes: tubes are bent here and straight there, and "
        "the truth lies between.",
        (
            "moment equations with Dean's secondary flow (Dean, Phil. Mag. 1927, 1928, from memory), solved and "
            "tabulated by tests/generate/curved_table.py",
            "De²·Sc as the parameter, a fifth in the limit: Johnson and Kamm, J. Fluid Mech. 172 (1986) 329, abstract",
            "measured coils: J. Chromatogr. A 1659 (2021) 462578, abstract",
        ),
        _bend,
        ("bends", "coil", "coils", "curved", "dean", "de", "de²sc", "bend_radius", "coil_diameter"),
    ),
    Topic(
        "likely",
        "Ranges, intervals, and which part leads",
        "best-worst is the range of a line over what is not known of how it mixes: --full says what each end is. "
        "likely is the 90 % interval of a figure when all that is unknown is drawn together, each by itself, and put "
        "through the same formulas (2000 draws; --draws, --seed; the same file and seed give the same text; "
        "--no-interval leaves them out). A part is named as the surest gain only when its removal would gain most in "
        "9 of 10 draws, tubes together only when one of them does; otherwise those that could lead are named, and "
        "what would decide between them. --full also lists, for each unknown, the share of the scatter that it alone "
        "explains: the first is worth settling first. A union run settles much: a union in place of the column, a "
        "peak recorded, its variance by moments; beside the same path without its column in xcol budget, what is "
        "more than tubes and injection is the cell's.",
        (
            "bore ±5 %, length ±2 %, plates ±10 % (90 %, log-normal, assumed; bore_tolerance and the like, or a "
            "catalog, take their place); D and viscosity by their own ± where they were estimated",
            (
                "curvature even from straight to 1/(3 cm), a bend that was entered as it is; cell between a plug and a "
                "straight bore, each factor alike"
            ),
            "injection V²/12 to V²/4, even; fitting V²/12 to 1.35 V², each factor alike, and even odds that it mixes "
            "the stream; response any of its readings; a total porosity that was assumed, anything usual",
        ),
        "What nobody could know of a described instrument; not a wrong entry, a void in a column, or a part that was "
        "left out. A printed figure outside of its interval is an end of it: tubes are printed straight (the worst), "
        "injections and cells as plugs (the best).",
        (
            "spreads of tolerances and of mixing: common practice, no source; bends and cells by the models of bend "
            "and detector",
            "first-order share of the variance: Sobol', Math. Comput. Simul. 55 (2001) 271, from memory",
        ),
        _likely,
        (
            "interval",
            "intervals",
            "range",
            "ranges",
            "best-worst",
            "draws",
            "uncertainty",
            "surest",
            "leads",
            "tolerance",
        ),
    ),
)
