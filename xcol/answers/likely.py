"""How sure the answer is: 90 % intervals over what is unknown, which part leads, which unknown matters most.

All unknowns are drawn together, each by itself, and go through the very formulas of the budget.
"""

from __future__ import annotations

from collections.abc import Callable, Iterable
from dataclasses import dataclass, replace
from functools import cached_property
from typing import TYPE_CHECKING

import numpy as np

from xcol.answers.draws import Draws
from xcol.answers.spread import Spread
from xcol.flowpath.bed import Bed
from xcol.flowpath.chain import links
from xcol.flowpath.kinds.tolerances import PLATES
from xcol.flowpath.unknowns import Factor

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.answers.budget import Budget, DetectorBudget, PeakBudget
    from xcol.answers.rows import Row
    from xcol.answers.spread import Values
    from xcol.filters.interface import Real
    from xcol.flowpath.chain import Link
    from xcol.flowpath.elements import Element, Stream
    from xcol.flowpath.model import Part, Peak

DRAWS, SEED = 2000, 1
SURE = 0.9  # share of the draws in which a part must lead to be named
_ENDS = (0.05, 0.95)  # shares of the draws: what lies between them is the interval
_BLOCK = 25_000  # draws that are computed together
_RANKED = 20_000  # draws that the ranking of the unknowns looks at: it is good to 1 % by then
_BINS = 20  # of draws in the order of one unknown, for its share of the variance

Interval = tuple[float, float]
DIFFUSION, VISCOSITY, PLATES_UNKNOWN = "D", "viscosity", "plates"  # unknowns of a peak, of the liquid


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
    """One unknown as it was drawn: of an element of a part, of the peak, or of the liquid (no part)."""

    what: str
    part: Part | None
    settle: str
    values: Values
    element: Element | None = None
    put: Callable[[Element, Real], Element] | None = None

    @cached_property
    def order(self) -> npt.NDArray[np.int64]:
        """The draws in the order of the values, one row a bin."""
        values = self.values[:_RANKED]
        size = len(values) // _BINS
        return np.argsort(values)[: size * _BINS].reshape(_BINS, size)


@dataclass(frozen=True)
class _Sums:
    """What the draws of a block come to: variances [s²], retention in the columns [s], how often each row leads."""

    extra: Values
    column: Values
    time: Values
    leads: npt.NDArray[np.int64]


class Sampler:
    """Draws what is unknown of an instrument, and answers for each peak at each detector when it is asked."""

    def __init__(self, answer: Budget, count: int = DRAWS, seed: int = SEED) -> None:
        self._instrument = answer.instrument
        self.draws = Draws(count, seed)
        self._drawn: dict[str, _Drawn] = {}
        self._found: dict[tuple[int, int], Likely] = {}

    def of(self, at: DetectorBudget, peak: PeakBudget) -> Likely:
        """Return how sure the answer for this peak at this detector is."""
        key = (at.detector.position, self._instrument.peaks.index(peak.peak))
        if key not in self._found:
            self._found[key] = self._compute(at, peak, key[1])
        return self._found[key]

    def _compute(self, at: DetectorBudget, peak: PeakBudget, number: int) -> Likely:
        chain = links(self._instrument, at.detector)
        drawn = [*self._of_chain(chain, peak.peak), *self._of_peak(peak.peak, number)]
        starts = range(0, self.draws.count, _BLOCK)
        sums = [self._block(chain, peak, drawn, slice(start, start + _BLOCK)) for start in starts]
        extra, column, time = (
            np.concatenate(parts) for parts in zip(*((one.extra, one.column, one.time) for one in sums), strict=True)
        )
        total = column + extra
        kept = column / total if peak.plates_column is not None else None
        return Likely(
            variance_extra=_interval(extra),
            variance_total=_interval(total),
            plates_column=_interval(time**2 / column) if kept is not None else None,
            plates_observed=_interval(time**2 / total) if kept is not None else None,
            plates_kept=_interval(kept) if kept is not None else None,
            leaders=_leaders(peak.rows, np.sum([one.leads for one in sums], axis=0) / self.draws.count),
            influences=_influences(drawn, extra if kept is None else kept),
        )

    def _of_chain(self, chain: tuple[Link, ...], peak: Peak) -> list[_Drawn]:
        """Return what is unknown of the elements of a chain, drawn: the same in every chain and for every peak."""
        found = []
        for link in chain:
            place = next(n for n, element in enumerate(link.part.elements) if element is link.element)
            for unknown in link.element.unknowns:
                if unknown.spread is None:
                    continue
                if peak.plates is not None and unknown.what == PLATES_UNKNOWN:
                    continue  # the peak's own plates are in place of the column's
                key = f"part {link.part.position}.{place} {unknown.what}"
                if key not in self._drawn:
                    values = self.draws.of(key, unknown.spread)
                    self._drawn[key] = _Drawn(
                        unknown.what, link.part, unknown.settle, values, link.element, unknown.put
                    )
                found.append(self._drawn[key])
        return found

    def _of_peak(self, peak: Peak, number: int) -> list[_Drawn]:
        """Return what is unknown of a peak and of the liquid, drawn, where it was estimated."""
        viscosity = self._instrument.viscosity
        unsure = (
            (DIFFUSION, f"peak {number} D", peak.estimate.uncertainty, "D, measured or looked up"),
            (VISCOSITY, "viscosity", viscosity.uncertainty if viscosity else 0.0, "viscosity, measured"),
            (
                PLATES_UNKNOWN,
                f"peak {number} plates",
                PLATES if peak.plates is not None else 0.0,
                "N measured with your analyte at this flow",
            ),
        )
        for what, key, uncertainty, settle in unsure:
            if uncertainty and key not in self._drawn:
                self._drawn[key] = _Drawn(what, None, settle, self.draws.of(key, Factor(uncertainty)))
        return [self._drawn[key] for _, key, uncertainty, _ in unsure if uncertainty]

    def _block(self, chain: tuple[Link, ...], at: PeakBudget, drawn: list[_Drawn], block: slice) -> _Sums:
        """Compute a block of the draws; blocks, because what fits into the processor's cache is much quicker."""
        peak = at.peak
        elements = [link.element for link in chain]
        factors: dict[str, Real] = {}
        for one in drawn:
            if one.put is None:
                factors[one.what] = one.values[block]
                continue
            place = next(n for n, link in enumerate(chain) if link.element is one.element)
            elements[place] = one.put(elements[place], one.values[block])
        count = len(range(self.draws.count)[block])

        def stream(part: Part) -> Stream:
            here = self._instrument.stream(part, peak.diffusion_in(part) * factors.get(DIFFUSION, 1.0))
            if here.viscosity is None or VISCOSITY not in factors:
                return here
            return replace(here, viscosity=here.viscosity * factors[VISCOSITY])

        spread = Spread(chain, stream, (count,), elements)
        rows = list(spread.rows.values())
        leads = np.stack(spread.gains()).argmax(axis=0)
        beds = [(link.part, element) for link, element in zip(chain, elements, strict=True)]
        time, column = _columns(beds, stream, peak)
        if peak.plates is not None:
            # the plates are those of all columns together, whatever each of them has
            last = links(self._instrument, self._instrument.detectors[-1])
            whole, variance = _columns([(link.part, link.element) for link in last], stream, peak)
            entered, column = _columns([(link.part, link.element) for link in chain], stream, peak)
            column = column * (time / entered) ** 2 * whole**2 / variance / (peak.plates * factors[PLATES_UNKNOWN])
        if peak.retention is not None and at.columns:  # what was recorded holds, whatever the void volume is
            entered = at.retention - at.delay
            column, time = column * (entered / time) ** 2, entered
        return _Sums(
            extra=sum((row.variance for row in rows), spread.zero),
            column=spread.zero + column,
            time=spread.zero + time,
            leads=np.bincount(leads, minlength=len(rows)),
        )


def _columns(found: Iterable[tuple[Part, Element]], stream: Callable[[Part], Stream], peak: Peak) -> tuple[Real, Real]:
    """Return retention time [s] in the columns among these elements and their variance [s²]; 0 where there is none."""
    passed = [element.retained(stream(part), peak.k or 0.0) for part, element in found if isinstance(element, Bed)]
    return sum(one.delay() for one in passed), sum(one.variance() for one in passed)


def _interval(values: Real) -> Interval:
    ordered = np.sort(values)
    low, high = (ordered[round(end * (len(ordered) - 1))] for end in _ENDS)
    return float(low), float(high)


def _leaders(rows: tuple[Row, ...], shares: Values) -> tuple[tuple[Row, float], ...]:
    return tuple(sorted(zip(rows, map(float, shares), strict=True), key=lambda pair: -pair[1]))


def _influences(drawn: list[_Drawn], answers: Values) -> tuple[Influence, ...]:
    shares = _shares(drawn, answers[:_RANKED])
    found = [Influence(one.what, one.part, share, one.settle) for one, share in zip(drawn, shares, strict=True)]
    return tuple(sorted(found, key=lambda influence: -influence.share))


def _shares(drawn: list[_Drawn], answers: Values) -> list[float]:
    """Return the share of the variance of ``answers`` that each unknown alone explains, var(E[answer|value])/var.

    By the means of bins of equal size in the order of the unknown; what they scatter by chance is taken off.
    Source: first-order index of Sobol', Math. Comput. Simul. 55 (2001) 271, from memory.
    """
    total = float(np.var(answers))
    if not total or len(answers) < _BINS or not drawn:
        return [0.0] * len(drawn)
    orders = np.stack([one.order for one in drawn])
    between = answers[orders].mean(axis=2).var(axis=1)
    within = np.maximum(total - between, 0.0) / orders.shape[2]
    return [float(share) for share in np.clip((between - within) / total, 0.0, 1.0)]
