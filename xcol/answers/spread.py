"""How far what stands outside the columns spreads a band: the variance of each link of a chain.

One piece of code for what is printed (all peaks at once), for the ends of the ranges, and for the draws of what is
unknown (all draws at once): what changes is the elements that are put in, and the shape of the arrays.
"""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.tube import Tube, shares
from xcol.flowpath.bed import Bed
from xcol.flowpath.chain import Link, Segment, filter_of, segments
from xcol.flowpath.elements import Bore, InBore
from xcol.flowpath.unknowns import REMIXING

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.filters.interface import Filter, Real
    from xcol.flowpath.elements import Element, Stream
    from xcol.flowpath.model import Part

    Values = npt.NDArray[np.float64]


_CLOSED_UP = 8  # tubes beside a link up to which its gain is computed with them closed up
_OFTEN = 0.01  # share of the draws from which a link's own row may be the largest and not stand for its gain
_ALONE = Segment(())


@dataclass(frozen=True)
class LinkSpread:
    """What a link contributes: variance [s²], ``own`` and what it shares with other tubes of its run.

    ``half`` is half of what it shares, the other half is in the other tubes' rows.
    """

    own: Values
    half: Values
    tube: Tube | None = None
    run_t_star: Values | None = None  # of the whole run of tubes that it belongs to
    segment: Segment = _ALONE  # the run that it belongs to

    @property
    def variance(self) -> Values:
        """Variance of its row [s²]."""
        return self.own + self.half


class Spread:
    """The variance of a chain outside the columns, of one ``shape``: one entry a peak, or a draw."""

    def __init__(
        self,
        chain: Sequence[Link],
        stream: Callable[[Part], Stream],
        shape: tuple[int, ...],
        elements: Sequence[Element] | None = None,
    ) -> None:
        self._chain = chain
        self._elements = [link.element for link in chain] if elements is None else list(elements)
        self._stream = stream
        self._filters: dict[int, Filter] = {}
        self._known: dict[Segment, list[LinkSpread]] = {}
        self._own: dict[int, Real] = {}  # what tubes add by themselves: the same in any run
        self.zero = np.zeros(shape)

    @cached_property
    def rows(self) -> dict[int, LinkSpread]:
        """What each link but the columns contributes, by its place in the chain."""
        found = {
            place: spread
            for segment in self._segments(range(len(self._chain)))
            for place, spread in zip(segment.places, self._spreads(segment), strict=True)
        }
        return dict(sorted(found.items()))

    def total(self, removed: int | None = None) -> Values:
        """Return the variance [s²] of the chain, or of it without one link, a run of tubes closing up."""
        kept = [place for place in range(len(self._chain)) if place != removed]
        variances = (spread.variance for segment in self._segments(kept) for spread in self._spreads(segment))
        return sum(variances, self.zero)

    def gain(self, place: int) -> Values:
        """Return the variance [s²] that goes with a link, the tubes beside it closing up.

        Beside more than ``_CLOSED_UP`` tubes its row stands for it, which is a little less: the others have n² shared
        terms each.
        """
        row = self.rows[place]
        beside = self._beside(place)
        tubes = [other for other in beside if isinstance(self._elements[other], Bore)]
        if not tubes or len(tubes) > _CLOSED_UP:
            return row.variance
        before = row.variance + sum(self.rows[other].variance for other in tubes)
        closed = (spread for segment in self._segments(beside) for spread in self._spreads(segment) if spread.tube)
        return self.zero + before - sum(spread.variance for spread in closed)

    def gains(self) -> list[Values]:
        """Return the gain of every link, in the order of ``rows``, exact for those that are often the largest.

        What mixes the stream gains no more than its own row, since tubes that close up spread more: where that row is
        the largest in next to no draw, it stands for the gain.
        """
        tubes = {place for place in self.rows if isinstance(self._elements[place], Bore)}
        found = {place: self.gain(place) if place in tubes else row.variance for place, row in self.rows.items()}
        leads = np.stack(list(found.values())).argmax(axis=0)
        often = np.bincount(leads.ravel(), minlength=len(found)) > _OFTEN * leads.size
        for place, is_often in zip(self.rows, often, strict=True):
            if is_often and place not in tubes:
                found[place] = self.gain(place)
        return list(found.values())

    def _beside(self, place: int) -> list[int]:
        """Return the places around one, up to what is certain to mix the stream anew on either side."""
        found: list[int] = []
        for way in (range(place - 1, -1, -1), range(place + 1, len(self._elements))):
            for other in way:
                mixes = self._elements[other].remixes
                if np.ndim(mixes) == 0 and mixes >= 1 and not isinstance(self._elements[other], Bore):
                    break
                found.append(other)
        return sorted(found)

    def dean(self, place: int) -> Values | None:
        """Return the Dean number of a tube of the chain [-], None for what is none."""
        element, part = self._elements[place], self._chain[place].part
        if not isinstance(element, InBore):
            return None
        return self.zero + self._stream(part).dean(element.bore, element.curvature)

    def _segments(self, places: Sequence[int]) -> Iterator[Segment]:
        """Part the links at these places into segments, columns left out."""
        for segment in segments([self._elements[place] for place in places]):
            if not isinstance(self._elements[places[segment.places[0]]], Bed):
                yield Segment(tuple(places[at] for at in segment.places), segment.joined)

    def filter(self, place: int) -> Filter:
        """Return the filter that a link is."""
        if place not in self._filters:
            link = self._chain[place]
            self._filters[place] = filter_of(link, self._stream(link.part), self._elements[place])
        return self._filters[place]

    def _spreads(self, segment: Segment) -> list[LinkSpread]:
        if any(np.ndim(joined) for joined in segment.joined):  # not to be told from another by its value
            return self._compute(segment)
        if segment not in self._known:
            self._known[segment] = self._compute(segment)
        return self._known[segment]

    def _compute(self, segment: Segment) -> list[LinkSpread]:
        filters = [self.filter(place) for place in segment.places]
        tubes = [one for one in filters if isinstance(one, Tube)]
        if len(tubes) < len(filters) or not isinstance(self._elements[segment.places[0]], InBore):
            return [LinkSpread(self.zero + one.variance(), self.zero) for one in filters]
        run: Real = sum(tube.t_star for tube in tubes)
        known = [self._own[place] for place in segment.places if place in self._own]
        own, half = shares(tubes, segment.joined, known if len(known) == len(tubes) else None)
        self._own |= dict(zip(segment.places, own, strict=True))
        return [
            LinkSpread(self.zero + one, self.zero + other, tube, self.zero + run, segment)
            for one, other, tube in zip(own, half, tubes, strict=True)
        ]


def at_end(element: Element, *, worst: bool, joined: bool) -> Element:
    """Return an element with all that is unknown of its mixing at its worst, or at its best.

    ``joined``: where nobody knows whether it mixes the stream of the tubes beside it, it does not.
    """
    for unknown in element.unknowns:
        if unknown.what == REMIXING:
            element = unknown.put(element, 0.0 if joined else 1.0)
        elif unknown.ends is not None:
            element = unknown.put(element, unknown.ends.worst if worst else unknown.ends.best)
    return element
