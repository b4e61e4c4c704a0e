"""The rows of a budget: what each contribution adds, and between which ends it may lie."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

import numpy as np

from xcol.answers.spread import LinkSpread, Spread, at_end
from xcol.filters.curved import HIGHEST_DEAN
from xcol.filters.washout import WashedOut
from xcol.flowpath.elements import Bore, InBore, Loop
from xcol.flowpath.unknowns import BEND, REMIXING
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
    extra_without: float = 0.0  # variance outside the columns without it
    tube: TubeFigures | None = None
    washed_t_star: float | None = None  # of a loop or a cell that is washed out
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
    ends = _ends(instrument, chain)
    bent = next(end for end in ends if not end.worst).spread
    found = {}
    for place, spread in printed.rows.items():
        link, made = chain[place], printed.filter(place)
        variances = np.stack([spread.variance, *(end.spread.rows[place].variance for end in ends)])
        figures = _figures(spread, bent.rows[place], bent.dean(place), printed.zero)
        words = [_words(link, None, bent.dean(place)), *(_words(link, end, bent.dean(place)) for end in ends)]
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
                low=float(variances[:, n].min()),
                high=float(variances[:, n].max()),
                at_low=words[_end(variances[:, n], lowest=True)],
                at_high=words[_end(variances[:, n], lowest=False)],
                tube=figures[n] if figures else None,
                washed_t_star=float((printed.zero + made.tube.t_star)[n]) if isinstance(made, WashedOut) else None,
                form=_form(link.element),
            )
            for n in range(len(instrument.peaks))
        ]
    return found


@dataclass(frozen=True)
class _End:
    """A chain with all that is unknown of its mixing at one end."""

    worst: bool
    joined: bool | None  # whether layers run on through fittings of which nobody knows; None: there are none
    spread: Spread


def _ends(instrument: Instrument, chain: tuple[Link, ...]) -> list[_End]:
    """Return the chain at its best and at its worst, with fittings mixing the stream and not, where that is unknown.

    Whether a fitting that mixes helps hangs on the tubes beside it: straight ones, yes; bent ones, hardly, or not.
    """
    open_ = any(unknown.what == REMIXING for link in chain for unknown in link.element.unknowns)
    found = []
    for worst in (False, True):
        for joined in (False, True) if open_ else (None,):
            elements = [at_end(link.element, worst=worst, joined=bool(joined)) for link in chain]
            found.append(_End(worst, joined, spread_of(instrument, chain, elements)))
    return found


def _end(variances: Values, *, lowest: bool) -> int:
    """Return which of the variances, printed and at the ends, is the lowest or highest: an end where it is both."""
    ends = variances[1:]
    at = int(ends.argmin() if lowest else ends.argmax())
    beyond = variances[0] < ends[at] if lowest else variances[0] > ends[at]
    return 0 if beyond and not np.isclose(variances[0], ends[at], rtol=1e-9) else 1 + at


def _words(link: Link, end: _End | None, dean: Values | None) -> str:
    """Return in words what a link is like at an end; None: as printed."""
    element = link.element
    unknowns = [unknown for unknown in element.unknowns if unknown.ends is not None]
    words = []
    if isinstance(element, InBore) and link.part.viscosity is None:
        unknowns = [unknown for unknown in unknowns if unknown.what != BEND]
        words.append("straight: without a viscosity bends are not computed")
    if end is not None:
        words += [u.ends.at_worst if end.worst else u.ends.at_best for u in unknowns if u.ends is not None]
    highest = float(dean.max(initial=0.0)) if dean is not None else 0.0
    if highest > HIGHEST_DEAN and not (end and end.worst):
        words.append(f"De {significant(highest)} taken as {HIGHEST_DEAN:g}, an upper estimate")
    if end is not None and isinstance(element, Bore) and not any(words):
        words.append("beside straight tubes" if end.worst else "beside bent tubes")
    if end is not None and end.joined is not None and isinstance(element, Bore):
        words.append(
            "its layers running on through the fitting" if end.joined else "mixed anew in the fitting beside it"
        )
    return ", ".join(word for word in words if word) or "as entered"


def _form(element: Element) -> str:
    """Return how a loop is emptied, where that is more than a plug."""
    if not isinstance(element, Loop):
        return ""
    return FULL if element.injected is None else SAME_WAY if element.same_way else ""


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
