"""The chain of filters between the injection and what one detector records."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.flowpath.bed import Bed
from xcol.flowpath.elements import Bore, Element, Stream

if TYPE_CHECKING:
    from collections.abc import Sequence

    from xcol.filters.interface import Filter, Real
    from xcol.flowpath.model import Instrument, Part
    from xcol.liquids.estimate import Estimate


@dataclass(frozen=True)
class Link:
    """One element of the chain: whose it is, and on which side of the columns it stands.

    ``side`` is "before", "between" (two columns), "after", or "signal" (electronics).
    """

    part: Part
    element: Element
    side: str
    read_here: bool  # in the detector whose record this is


def links(instrument: Instrument, detector: Part) -> tuple[Link, ...]:
    """Return what the band meets from the injection to this detector's record, columns included.

    Another detector's electronics never count, nor does what stands behind the detector.
    """
    first, last = instrument.injection, detector.position
    columns = [p.position for p in instrument.parts if p.kind == "column" and first < p.position < last]
    chain = []
    for part in instrument.parts[first - 1 : last]:
        read_here = part.position == last
        if not columns or part.position < columns[0]:
            side = "before"
        elif part.position > columns[-1]:
            side = "after"
        else:
            side = "between"
        for element in part.elements:
            if element.of_signal and not read_here:
                continue
            chain.append(Link(part, element, "signal" if element.of_signal else side, read_here))
    return tuple(chain)


@dataclass(frozen=True)
class Segment:
    """Links that spread the band together: one, or a run of tubes with nothing that mixes between them.

    ``places`` are theirs in the chain; ``joined`` has one entry between two tubes of a run: 1 where the layers run
    on, 0 where the stream is mixed anew (an array, where draws differ in it).
    """

    places: tuple[int, ...]
    joined: tuple[Real, ...] = ()


def segments(elements: Sequence[Element]) -> list[Segment]:
    """Part the elements of a chain into segments.

    What mixes the stream anew ends a run; electronics and what has no size do not.
    """
    found: list[Segment] = []
    tubes: list[int] = []
    joined: list[Real] = []
    pending: Real = 1.0  # whether the layers still run on from the last tube

    def end_run() -> None:
        if tubes:
            found.append(Segment(tuple(tubes), tuple(joined)))
            tubes.clear()
            joined.clear()

    for place, element in enumerate(elements):
        passes = 1.0 - element.remixes
        if _is_never(passes):
            end_run()
        pending = pending * passes if tubes else 1.0
        if not isinstance(element, Bore):
            found.append(Segment((place,)))
            continue
        if tubes:
            joined.append(pending)
        tubes.append(place)
        pending = passes  # a bore that mixes does so at both of its ends
        if _is_never(passes):
            end_run()
    end_run()
    return found


def _is_never(weight: Real) -> bool:
    return np.ndim(weight) == 0 and not weight


def filter_of(link: Link, stream: Stream, element: Element | None = None) -> Filter:
    """Return the link's own filter for a stream, or that of an ``element`` in its place."""
    return (element or link.element).filter(stream, read_here=link.read_here)


def delays(instrument: Instrument, detector: Part, estimate: Estimate) -> list[tuple[Part, float]]:
    """Return the mean delay [s] of every link outside the columns, with its part.

    Of a solute of this diffusion coefficient: a loop that is washed out delays what diffuses slowly a little more.
    """
    return [
        (link.part, float(filter_of(link, instrument.stream(link.part, link.part.diffusion_of(estimate))).delay()))
        for link in links(instrument, detector)
        if not isinstance(link.element, Bed)
    ]


def transit(instrument: Instrument, detector: Part, estimate: Estimate) -> float:
    """Mean delay [s] of everything outside the columns, from the valve's turn to the record."""
    return sum(delay for _, delay in delays(instrument, detector, estimate))


def dead_time(instrument: Instrument, detector: Part) -> float:
    """Hold-up time of the columns upstream of a detector [s]; 0 without a column."""
    beds = (link.element for link in links(instrument, detector))
    return sum(float(bed.void_volume) for bed in beds if isinstance(bed, Bed)) / instrument.flow
