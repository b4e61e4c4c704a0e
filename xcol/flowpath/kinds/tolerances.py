"""How far sizes are off: from the file's own tolerance, the catalog's, or as assumed; and how parts mix."""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import replace
from typing import TYPE_CHECKING, Any

from xcol.catalog_kinds import TUBING
from xcol.flowpath.elements import PLUG, Bore, Loop
from xcol.flowpath.unknowns import BEND, REMIXING, Between, Ends, Factor, LogBetween, OneOf, Unknown, scaling, setting
from xcol.units import LENGTH, write

if TYPE_CHECKING:
    from xcol.filters.interface import Real
    from xcol.flowpath.findings import Draft

_BORE, _LENGTH = 0.05, 0.02  # relative, 90 %: assumed where neither file nor catalog says
PLATES = 0.10
TIGHTEST_BEND = 0.03  # m, assumed for tubes of which nobody says how they are bent
_STOCK = 0.06  # a bore within so much of a stock bore is taken as that

SIZES = ("bore", "length", "volume")

# σ²/V²: what a measured valve passage of 0.2 µL showed, over the one of a plug (J. Liq. Chromatogr. 1982, abstract),
# and the smeared injection of a valve of which nothing is known (assumed)
_WORST_FITTING = 1.35
_WORST_INJECTION = 1 / 4


def check_tolerances(draft: Draft, *known: str) -> None:
    """Warn of tolerances of sizes that this part does not have."""
    for size in SIZES:
        if f"{size}_tolerance" in draft.values and size not in known:
            draft.warn(f"{size}_tolerance is not used: it has no {size} that its variance hangs on")


def tolerance_of(draft: Draft, size: str, put: Callable[[Any, Real], Any]) -> tuple[Unknown, ...]:
    """Return the unknown that a size [bore, length, volume] is; none where it is exact, or nothing is assumed of it."""
    relative = draft.number(f"{size}_tolerance")
    if relative is None and size == "bore":
        relative, whose = _of_stock(draft)
        draft.findings.assume("tolerances", f"bores ±{100 * relative:g} % ({whose}), for the intervals only")
    elif relative is None and size == "length":
        relative = _LENGTH
        draft.findings.assume("tolerances", f"lengths of tubes ±{100 * relative:g} % (assumed), for the intervals only")
    if not relative:
        return ()
    settle = f"{size} of {{name}}, measured"
    return (Unknown(size, Factor(relative), put, settle=settle),)


def _of_stock(draft: Draft) -> tuple[float, str]:
    """Return the tolerance of the bore, and where it comes from: of the nearest stock tubing, or assumed."""
    bore = draft.number("bore")
    rows = [row for row in draft.catalogs.rows(TUBING) if bore and abs(row.bore / bore - 1) <= _STOCK]
    if not rows:
        return _BORE, "assumed"
    nearest = min(rows, key=lambda row: abs(row.bore - (bore or 0.0)))
    return nearest.tolerance, nearest.tolerance_from


def bore_keeping_volume(element: Any, factor: Real) -> Any:
    """Return a tube or loop of another bore and of the same volume."""
    return replace(element, bore=element.bore * factor, length=element.length / factor**2)


def bend(curvature: float | None) -> tuple[float, tuple[Unknown, ...]]:
    """Return the curvature [1/m] that is computed with, and what is unknown of it; None: none was entered.

    One that was entered is not drawn, and keeps its range: measured coils take less than theory says.
    """
    if curvature is not None:
        entered = f"bent at {write(1 / curvature, 'cm', LENGTH)} all along, as entered"
        ends = Ends(curvature, 0.0, entered, "straight: measured coils lie between")
        return curvature, (Unknown(BEND, None, setting("curvature"), ends),)
    tightest = 1 / TIGHTEST_BEND
    ends = Ends(tightest, 0.0, f"bent at {write(TIGHTEST_BEND, 'cm', LENGTH)} all along (assumed)", "straight")
    settle = "bend_radius of {name}"
    return 0.0, (Unknown(BEND, Between(0.0, tightest), setting("curvature"), ends, settle),)


def check_bends(draft: Draft, key: str, elements: Iterable[object]) -> None:
    """Report a bend that is no wider than the bore of one of the tubes and loops that it serves."""
    bores = [float(one.bore) for one in elements if isinstance(one, Bore | Loop) and 2 * one.bore * one.curvature > 1]
    if bores:
        draft.fault(key, f"a bend much wider than the bore, {write(max(bores), 'mm', LENGTH)}", "check its unit")


def injection_form() -> Unknown:
    """Return how an injection enters of which the loop is not described."""
    ends = Ends(PLUG, _WORST_INJECTION, "a plug", "smeared to V²/4 (assumed)")
    settle = "the loop with its bore"
    return Unknown("form of the injection", Between(PLUG, _WORST_INJECTION), setting("spread"), ends, settle)


def way_of_emptying(rest: str) -> Unknown:
    """Return which way a loop is emptied; ``rest`` says in words what the plug then passes."""
    ends = Ends(0.0, 1.0, "emptied the other way, a plug", f"emptied the same way, through {rest}")
    return Unknown("way of emptying", OneOf((0.0, 1.0)), setting("same_way"), ends, "which way the loop is emptied")


def mixing_of_volume() -> Unknown:
    """Return how a fitting's volume mixes of which nobody says the tanks."""

    def put(element: Any, relative: Real) -> Any:
        return replace(element, tanks=1 / relative)

    ends = Ends(PLUG, _WORST_FITTING, "passed as a plug", "as a measured valve passage, 1.35 V²")
    return Unknown("mixing", LogBetween(PLUG, _WORST_FITTING), put, ends, "{run} with {name}, and without it")


def remixing() -> Unknown:
    """Return whether a fitting mixes the stream of the tubes beside it."""
    # it has no ends of its own: what it is worth shows in the tubes beside it
    return Unknown(REMIXING, OneOf((0.0, 1.0)), setting("remixed"), settle="{run} with {name}, and without it")


def mixing_of_cell(length: float, assumed: bool) -> Unknown:
    """Return how a cell mixes, between a plug and a straight bore of this ``length`` [m]."""
    shown = f"a straight bore of {write(length, 'mm', LENGTH)}{' (assumed)' if assumed else ''}"
    ends = Ends(0.0, 1.0, "a plug", f"as {shown}")
    settle = "{run} (cell's mixing)"
    return Unknown("mixing", Between(0.0, 1.0), setting("likeness"), ends, settle)


def say_of_plates(draft: Draft) -> None:
    """List what is assumed of plates that were entered, of a column or for a peak."""
    draft.findings.assume("tolerances", f"plates ±{100 * PLATES:g} % (assumed), for the intervals only")


def plates_of_column(draft: Draft) -> Unknown:
    """Return how far entered plates are off."""
    say_of_plates(draft)
    return Unknown("plates", Factor(PLATES), scaling("plates"), settle="N measured with your analyte at this flow")


def quality_of_packing() -> Unknown:
    """Return where, between the worst and the best of such packings, a column lies."""
    return Unknown("plates", Between(0.0, 1.0), setting("quality"), settle="plates, measured or from the certificate")


def total_porosity(usual: float, span: tuple[float, float]) -> Unknown:
    """Return what is unknown of a void volume of which the total porosity was assumed to be the ``usual`` one."""

    def put(element: Any, value: Real) -> Any:
        return replace(element, void_volume=element.void_volume * value / usual)

    return Unknown("total porosity", Between(*span), put, settle="total_porosity, or a measured void_volume")
