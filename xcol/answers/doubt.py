"""How far an answer hangs on the diffusion coefficients that were estimated."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from xcol.answers.budget import recorded

if TYPE_CHECKING:
    from xcol.answers.budget import Budget
    from xcol.flowpath.model import Peak


@dataclass(frozen=True)
class Doubt:
    """What is recorded over the doubt of D: total variance [s²], and plates (None without a column).

    Each from the smallest to the largest of three: at D/(1+u), at D, at D·(1+u).
    """

    variance: tuple[float, float]
    plates: tuple[float, float] | None

    @property
    def spread(self) -> float:
        """Share by which the smallest is below the largest."""
        low, high = self.plates or self.variance
        return 1 - low / high if high else 0.0


def over_diffusion(answer: Budget) -> list[list[Doubt | None]]:
    """Return for every detector and peak, in their order, the doubt; None where D was entered."""
    instrument = answer.instrument
    unsure = [n for n, peak in enumerate(instrument.peaks) if peak.estimate.uncertainty > 0]
    if not unsure:
        return [[None] * len(instrument.peaks) for _ in answer.detectors]
    factors = {n: 1 + instrument.peaks[n].estimate.uncertainty for n in unsure}
    slow = tuple(_at(instrument.peaks[n], 1 / factors[n]) for n in unsure)
    fast = tuple(_at(instrument.peaks[n], factors[n]) for n in unsure)
    moved = replace(instrument, peaks=(*slow, *fast))
    found = []
    for here in answer.detectors:
        ends = recorded(moved, here.detector)
        doubts: list[Doubt | None] = [None] * len(here.peaks)
        for place, n in enumerate(unsure):
            at_d = (here.peaks[n].variance_total, here.peaks[n].plates_observed)
            doubts[n] = _doubt((ends[place], at_d, ends[place + len(unsure)]))
        found.append(doubts)
    return found


def _at(peak: Peak, factor: float) -> Peak:
    """Return the peak with its diffusion coefficient times a factor."""
    return replace(peak, estimate=replace(peak.estimate, value=peak.estimate.value * factor))


def _doubt(three: tuple[tuple[float, float | None], ...]) -> Doubt:
    variances = [variance for variance, _ in three]
    plates = [number for _, number in three if number is not None]
    return Doubt((min(variances), max(variances)), (min(plates), max(plates)) if plates else None)
