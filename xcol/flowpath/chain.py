"""The chain of filters between the injection and what one detector records."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.filters.tube import Tube, TubeRun
from xcol.flowpath.elements import Bed, Bore, Element, Stream

if TYPE_CHECKING:
    from collections.abc import Sequence

    from xcol.filters.interface import Filter, Real
    from xcol.flowpath.model import Instrument, Part


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


def segments(chain: Sequence[Link]) -> list[tuple[int, ...]]:
    """Group the chain, as indices into it: tubes with nothing between them are one segment.

    Everything else is a segment of its own. What mixes the stream anew ends a run; electronics and
    what has no size do not.
    """
    groups: list[tuple[int, ...]] = []
    run: list[int] = []

    def end_run() -> None:
        if run:
            groups.append(tuple(run))
            run.clear()

    for index, link in enumerate(chain):
        if isinstance(link.element, Bore) and link.element.layered:
            run.append(index)
            continue
        if link.element.remixes:
            end_run()
        groups.append((index,))
    end_run()
    return groups


def filter_of(link: Link, flow: float, diffusion: Real) -> Filter:
    """Return the link's own filter for a solute of this diffusion coefficient [m²/s] in it."""
    return link.element.filter(Stream(flow, diffusion), read_here=link.read_here)


def run_of(filters: Sequence[Filter]) -> TubeRun:
    """Return the tubes among the filters of a segment as one run."""
    return TubeRun(tuple(tube for tube in filters if isinstance(tube, Tube)))


def delays(instrument: Instrument, detector: Part) -> list[tuple[Part, float]]:
    """Return the mean delay [s] of every link outside the columns, with its part."""
    # no part's mean delay depends on diffusion
    return [
        (link.part, float(filter_of(link, instrument.flow, 1e-9).delay()))
        for link in links(instrument, detector)
        if not isinstance(link.element, Bed)
    ]


def transit(instrument: Instrument, detector: Part) -> float:
    """Mean delay [s] of everything outside the columns, from the valve's turn to the record."""
    return sum(delay for _, delay in delays(instrument, detector))


def dead_time(instrument: Instrument, detector: Part) -> float:
    """Hold-up time of the columns upstream of a detector [s]; 0 without a column."""
    beds = (link.element for link in links(instrument, detector))
    return sum(bed.void_volume for bed in beds if isinstance(bed, Bed)) / instrument.flow
