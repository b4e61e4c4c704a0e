"""How sure the answer is: 90 % intervals over what is unknown, which part leads, which unknown matters most.

All unknowns are drawn together, each by itself, and go through the very formulas of the budget.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass, replace
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from xcol.answers.draws import Draws
from xcol.answers.spread import Spread
from xcol.flowpath.bed import Bed
from xcol.flowpath.chain import links
from xcol.flowpath.elements import Element, Stream
from xcol.flowpath.kinds.tolerances import PLATES
from xcol.flowpath.unknowns import Factor

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.rows import Row
    from xcol.answers.spread import Values
    from xcol.filters.column import Column
    from xcol.filters.interface import Real
    from xcol.flowpath.chain import Link
    from xcol.flowpath.model import Instrument, Part, Peak

DRAWS, SEED = 2000, 1
SURE = 0.9  # share of the draws in which a part must lead to be named
_ENDS = (5.0, 95.0)  # per cent: what lies between them is the interval
_BINS = 20  # of draws in the order of one unknown, for its share of the variance

Interval = tuple[float, float]


@dataclass(frozen=True)
class Influence:
    """An unknown, with the share of the answer's variance over the draws that it alone explains (first order)."""

    what: str
    part: Part | None  # None: not of a part
    share: float
    settle: str  # what would settle it


@dataclass(frozen=True)
class Likely:
    """The 90 % intervals of one peak at one detector; plates and what is kept are None without a column.

    ``leaders`` are the rows by the share of the draws in which taking them away would gain most, largest first.
    """

    variance_extra: Interval  # s²
    variance_total: Interval  # s²
    plates_column: Interval | None
    plates_observed: Interval | None
    plates_kept: Interval | None
    leaders: tuple[tuple[Row, float], ...]
    influences: tuple[Influence, ...]

    @property
    def leader(self) -> Row | None:
        """The row that leads whatever the unknowns are, None where none does."""
        row, share = self.leaders[0] if self.leaders else (None, 0.0)
        return row if share >= SURE else None


@dataclass(frozen=True)
class _Drawn:
    """One unknown as it was drawn."""

    what: str
    part: Part | None
    values: Values
    settle: str

    @cached_property
    def order(self) -> npt.NDArray[np.int64]:
        """The draws in the order of the values, one row a bin."""
        size = len(self.values) // _BINS
        return np.argsort(self.values, kind="stable")[: size * _BINS].reshape(_BINS, size)


class Sampler:
    """Draws what is unknown of an instrument, and answers for each peak at each detector when it is asked."""

    def __init__(self, answer: Budget, count: int = DRAWS, seed: int = SEED) -> None:
        self._instrument = answer.instrument
        self.draws = Draws(count, seed)
        self._elements: dict[tuple[int, int], tuple[Element, list[_Drawn]]] = {}
        self._found: dict[tuple[int, int], Likely] = {}

    def of(self, at: DetectorBudget, peak: PeakBudget) -> Likely:
        """Return how sure the answer for this peak at this detector is."""
        key = (at.detector.position, self._instrument.peaks.index(peak.peak))
        if key not in self._found:
            self._found[key] = self._compute(at, peak, key[1])
        return self._found[key]

    def _compute(self, at: DetectorBudget, peak: PeakBudget, number: int) -> Likely:
        chain = links(self._instrument, at.detector)
        elements = [self._element(link) for link in chain]
        drawn = [one for _, found in elements for one in found]
        stream = self._streams(peak.peak, number, drawn)
        spread = Spread(chain, stream, (self.draws.count,), [element for element, _ in elements])
        rows = spread.rows()
        extra = sum((row.variance for row in rows.values()), spread.zero)
        time, column = self._columns(chain, peak.peak, number, stream, drawn)
        total = column + extra
        kept = column / total if peak.plates_column is not None else None
        return Likely(
            variance_extra=_interval(extra),
            variance_total=_interval(total),
            plates_column=_interval(time**2 / column) if kept is not None else None,
            plates_observed=_interval(time**2 / total) if kept is not None else None,
            plates_kept=_interval(kept) if kept is not None else None,
            leaders=_leaders(peak.rows, [row.gain for row in rows.values()]),
            influences=_influences(drawn, extra if kept is None else kept),
        )

    def _element(self, link: Link) -> tuple[Element, list[_Drawn]]:
        """Return the link's element with all that is unknown of it drawn, the same in every chain."""
        position, place = link.part.position, link.part.elements.index(link.element)
        if (position, place) not in self._elements:
            element, found = link.element, []
            for unknown in link.element.unknowns:
                values = self.draws.of(f"part {position}.{place} {unknown.what}", unknown.spread)
                element = unknown.put(element, values)
                found.append(_Drawn(unknown.what, link.part, values, unknown.settle))
            self._elements[position, place] = element, found
        return self._elements[position, place]

    def _streams(self, peak: Peak, number: int, drawn: list[_Drawn]) -> _Streams:
        """Return what flows with D and viscosity drawn, where they were estimated."""
        factors: dict[str, Real] = {"D": 1.0, "viscosity": 1.0}
        viscosity = self._instrument.viscosity
        unsure = (
            ("D", f"peak {number} D", peak.estimate.uncertainty, "D, measured or looked up"),
            ("viscosity", "viscosity", viscosity.uncertainty if viscosity else 0.0, "viscosity, measured"),
        )
        for what, key, uncertainty, settle in unsure:
            if uncertainty:
                factors[what] = self.draws.of(key, Factor(uncertainty))
                drawn.append(_Drawn(what, None, np.asarray(factors[what]), settle))
        return _Streams(self._instrument, peak, factors["D"], factors["viscosity"])

    def _columns(
        self, chain: tuple[Link, ...], peak: Peak, number: int, stream: _Streams, drawn: list[_Drawn]
    ) -> tuple[Real, Real]:
        """Return retention time [s] in the columns of the chain and their variance [s²]; 0 without a column."""

        def columns(found: Iterable[tuple[Part, Element]]) -> list[Column]:
            return [bed.retained(stream(part), peak.k or 0.0) for part, bed in found if isinstance(bed, Bed)]

        passed = columns((link.part, self._element(link)[0]) for link in chain)
        time, variance = sum(one.delay() for one in passed), sum(one.variance() for one in passed)
        if peak.plates is None or not passed:
            return time, variance
        # the peak's own plates are those of all columns together, whatever each of them has
        last = links(self._instrument, self._instrument.detectors[-1])
        every = columns((link.part, link.element) for link in last)
        factor = self.draws.of(f"peak {number} plates", Factor(PLATES))
        drawn[:] = [one for one in drawn if one.what != "plates"]
        drawn.append(_Drawn("plates", None, factor, "N measured with your analyte at this flow"))
        nominal = columns((link.part, link.element) for link in chain)
        whole = sum(one.delay() for one in every) ** 2 / sum(one.variance() for one in every)
        return time, sum(one.variance() for one in nominal) * whole / (peak.plates * factor)


@dataclass(frozen=True)
class _Streams:
    """What flows through each part, with factors on diffusion coefficient and viscosity."""

    instrument: Instrument
    peak: Peak
    diffusion: Real
    viscosity: Real

    def __call__(self, part: Part) -> Stream:
        """Return what flows through this part."""
        stream = self.instrument.stream(part, self.peak.diffusion_in(part) * self.diffusion)
        return stream if stream.viscosity is None else replace(stream, viscosity=stream.viscosity * self.viscosity)


def _interval(values: Real) -> Interval:
    low, high = np.percentile(values, _ENDS)
    return float(low), float(high)


def _leaders(rows: tuple[Row, ...], gains: list[Values]) -> tuple[tuple[Row, float], ...]:
    if not rows:
        return ()
    stacked = np.stack(gains)
    counts = np.bincount(stacked.argmax(axis=0), minlength=len(rows)) / stacked.shape[1]
    return tuple(sorted(zip(rows, map(float, counts), strict=True), key=lambda pair: -pair[1]))


def _influences(drawn: list[_Drawn], answers: Values) -> tuple[Influence, ...]:
    found = [Influence(one.what, one.part, _share(one.order, answers), one.settle) for one in drawn]
    return tuple(sorted(found, key=lambda influence: -influence.share))


def _share(order: npt.NDArray[np.int64], answers: Values) -> float:
    """Return the share of the variance of ``answers`` that one unknown alone explains, var(E[answer|value])/var.

    By the means of bins of equal size in the order of the unknown; what they scatter by chance is taken off.
    Source: first-order index of Sobol', Math. Comput. Simul. 55 (2001) 271, from memory.
    """
    total = float(np.var(answers))
    if not total or not order.size:
        return 0.0
    binned = answers[order]
    means = binned.mean(axis=1)
    between = float(np.var(means))
    within = max(total - between, 0.0) / order.shape[1]
    return float(min(max((between - within) / total, 0.0), 1.0))
