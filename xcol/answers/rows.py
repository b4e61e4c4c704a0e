"""The rows of a budget: what each contribution adds, and between which ends it may lie."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

import numpy as np

from xcol.answers.spread import LinkSpread, Spread, at_end
from xcol.filters.curved import HIGHEST_DEAN
from xcol.flowpath.elements import InBore, Loop
from xcol.units import significant

if TYPE_CHECKING:
    from xcol.answers.spread import Values
    from xcol.flowpath.chain import Link
    from xcol.flowpath.elements import Element, Stream
    from xcol.flowpath.model import Instrument, Part


FULL, SAME_WAY = "full", "same way"  # how a loop is emptied that spreads more than a plug


@dataclass(frozen=True)
class Row:
    """One contribution to the broadening of one peak; variances [s²], volume [m³]."""

    part: Part
    contribution: str
    side: str
    volume: float
    variance: float
    share_extra: float
    share_total: float
    plates_kept_without: float | None
    low: float  # at the best that is possible of what is unknown of its mixing
    high: float  # at the worst
    at_low: str  # the reason for each end in words
    at_high: str
    tube: TubeFigures | None = None
    form: str = ""  # of a loop: FULL, or SAME_WAY (filled in part)
    compression: float = 1.0  # θ, 1 for isocratic elution


@dataclass(frozen=True)
class TubeFigures:
    """What a report says of a tube besides its row; ``bent`` is that at the bend entered, or at the assumed one.

    ``run_t_star`` is of the whole run of tubes that it belongs to; variances [s²] are the tube's own, without
    what it shares with others of its run. ``strength`` is De²·Sc of the row's own variance.
    """

    t_star: float
    run_t_star: float
    longtube_variance: float
    strength: float
    straight_variance: float
    bent_variance: float
    bent_dean: float
    bent_strength: float


def spread_of(instrument: Instrument, chain: tuple[Link, ...], elements: Sequence[Element] | None = None) -> Spread:
    """Return the spread of a chain for all peaks at once."""

    def stream(part: Part) -> Stream:
        return instrument.stream(part, np.array([peak.diffusion_in(part) for peak in instrument.peaks]))

    return Spread(chain, stream, (len(instrument.peaks),), elements)


def rows_of(instrument: Instrument, chain: tuple[Link, ...], printed: Spread) -> dict[int, list[Row]]:
    """Return the row of each link but the columns, one entry a peak, by its place; shares are still to come."""
    ends = [
        spread_of(instrument, chain, [at_end(link.element, worst=worst) for link in chain]) for worst in (False, True)
    ]
    best, worst = (spread.rows() for spread in ends)
    found = {}
    for place, spread in printed.rows().items():
        link = chain[place]
        dean = ends[0].dean(place)
        at_low, at_high = _reasons(link, dean, apart=spread.segment.places == worst[place].segment.places)
        figures = _figures(spread, best[place], dean, printed.zero)
        found[place] = [
            Row(
                part=link.part,
                contribution=link.element.contribution,
                side=link.side,
                volume=float(link.element.volume),
                variance=float(spread.variance[n]),
                share_extra=0.0,
                share_total=0.0,
                plates_kept_without=None,
                low=float(min(best[place].variance[n], spread.variance[n])),
                high=float(max(worst[place].variance[n], spread.variance[n])),
                at_low=at_low,
                at_high=at_high,
                tube=figures[n] if figures else None,
                form=_form(link.element),
            )
            for n in range(len(instrument.peaks))
        ]
    return found


def _form(element: Element) -> str:
    """Return how a loop is emptied, where that is more than a plug."""
    if not isinstance(element, Loop):
        return ""
    return FULL if element.injected is None else SAME_WAY if element.same_way else ""


def _reasons(link: Link, dean: Values | None, *, apart: bool) -> tuple[str, str]:
    """Return why a link's variance is as low and as high as it may be; ``apart``: its run never reaches further."""
    element = link.element
    low = [unknown.ends.at_best for unknown in element.unknowns if unknown.ends]
    high = [unknown.ends.at_worst for unknown in element.unknowns if unknown.ends]
    if isinstance(element, InBore) and link.part.viscosity is None:
        low = high = ["straight: without a viscosity bends are not computed"]
    if dean is not None and dean.max(initial=0.0) > HIGHEST_DEAN:
        low = [*low, f"De {significant(float(dean.max()))} taken as {HIGHEST_DEAN:g}, an upper estimate"]
    if not apart:
        low, high = [*low, "mixed anew in the fitting beside it"], [*high, "its layers running on through the fitting"]
    found = [", ".join(piece for piece in words if piece) or "as entered" for words in (low, high)]
    return found[0], found[1]


def _figures(spread: LinkSpread, bent: LinkSpread, dean: Values | None, zero: Values) -> list[TubeFigures] | None:
    """Return the figures of a tube, one entry a peak; None for what is none."""
    tube = spread.tube
    if tube is None or bent.tube is None or spread.run_t_star is None or dean is None:
        return None
    straight = replace(tube, strength=0.0).variance()
    longtube = tube.longtube_variance()
    bends = (bent.own, dean, bent.tube.strength)
    columns = (tube.t_star, spread.run_t_star, longtube, tube.strength, straight, *bends)
    return [TubeFigures(*map(float, figures)) for figures in zip(*(zero + column for column in columns), strict=True)]
