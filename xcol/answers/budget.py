"""The main question: what each part adds to the width of the peaks, and what it costs in plates.

All variances are summed in s²; what is shown in µL² is s² times the square of the column's flow.
"""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import TYPE_CHECKING

import numpy as np

from xcol.answers.pressure import Pressures, pressures
from xcol.filters.column import Column
from xcol.filters.laminar import UNMIXED_BELOW
from xcol.filters.tube import Tube
from xcol.flowpath.chain import Link, filter_of, links, run_of, segments, transit
from xcol.flowpath.elements import Bed, Electronics, Stream
from xcol.flowpath.model import beds_of

if TYPE_CHECKING:
    from collections.abc import Iterable, Iterator, Sequence

    import numpy.typing as npt

    from xcol.filters.interface import Filter
    from xcol.flowpath.model import Instrument, Part, Peak

    Values = npt.NDArray[np.float64]

HALF_WIDTH = 2 * math.sqrt(2 * math.log(2))  # width at half height of a Gaussian, in σ
FEW_POINTS = 10  # across 4σ: fewer, and the averaging between points adds more than 1.3 %


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
    t_star: float | None = None
    run_t_star: float | None = None  # of the whole run of tubes that it belongs to
    longtube_variance: float | None = None
    compression: float = 1.0  # θ, 1 for isocratic elution


@dataclass(frozen=True)
class ColumnBand:
    """One column's own part of a peak: variance [s²] and plates."""

    part: Part
    variance: float
    plates: float


@dataclass(frozen=True)
class PeakBudget:
    """One peak at one detector; times [s], variances [s²], None where there is no column.

    ``columns_range`` is the fewest and most plates that the columns may have where their N comes from
    a reduced plate height curve.
    """

    peak: Peak
    retention: float  # mean of the recorded peak, from the valve's turn
    plates_column: float | None
    variance_column: float
    variance_extra: float
    rows: tuple[Row, ...]
    columns: tuple[ColumnBand, ...]
    points: float | None  # data points across 4σ
    columns_range: tuple[float, float] | None = None

    @property
    def variance_total(self) -> float:
        """Variance of the recorded peak [s²]."""
        return self.variance_column + self.variance_extra

    @property
    def plates_kept(self) -> float | None:
        """Share of the column's plates that is recorded, σ²_column/σ²_total."""
        return self.variance_column / self.variance_total if self.plates_column else None

    @property
    def plates_observed(self) -> float | None:
        """Plates of the recorded peak."""
        return self.plates_column * (self.plates_kept or 0.0) if self.plates_column else None

    @property
    def resolution_kept(self) -> float | None:
        """Share of the column's resolution that is recorded: the root of the plates kept."""
        return math.sqrt(self.plates_kept) if self.plates_kept is not None else None

    @property
    def sigma(self) -> float:
        """Standard deviation of the recorded peak [s]."""
        return math.sqrt(self.variance_total)

    @property
    def width_half(self) -> float:
        """Width at half height of the recorded peak [s], as a Gaussian."""
        return HALF_WIDTH * self.sigma

    @property
    def width_half_column(self) -> float:
        """Width at half height [s] that the columns alone would give."""
        return HALF_WIDTH * math.sqrt(self.variance_column)


@dataclass(frozen=True)
class DetectorBudget:
    """What one detector records: mean delay outside the columns [s], and the peaks."""

    detector: Part
    delay: float
    peaks: tuple[PeakBudget, ...]


@dataclass(frozen=True)
class Budget:
    """The answer: every peak at every detector, and the pressure along the path."""

    instrument: Instrument
    pressure: Pressures
    detectors: tuple[DetectorBudget, ...]
    warnings: tuple[str, ...]
    cautions: tuple[str, ...]

    def in_uL2(self, variance: float) -> float:
        """Return a variance [s²] in µL²: times the square of the column's flow."""
        return variance * (self.instrument.flow * 1e9) ** 2

    @property
    def unchecked(self) -> tuple[Part, ...]:
        """Columns and detectors for which no pressure limit was entered."""
        return _unchecked(self.instrument)


def budget(instrument: Instrument) -> Budget:
    """Return the budget of every peak at every detector.

    >>> from xcol.flowpath.reader import parse
    >>> text = 'flow = "1 mL/min"\\ndiffusion = "1e-9 m^2/s"\\nviscosity = "0.9 cP"\\npath = ['
    >>> text += '{inject = "20 uL"}, {column = "4.6 x 150 mm, 5 um", plates = 11000},'
    >>> text += '{tube = "30 cm x 0.010 in"}, {detector = "10 uL", time_constant = "0.5 s"}]'
    >>> peak = budget(parse(text, "example")).detectors[0].peaks[1]
    >>> peak.peak.k, round(peak.plates_observed)
    (2.0, 10153)
    """
    profile = pressures(instrument)
    detectors = tuple(_at_detector(instrument, detector) for detector in instrument.detectors)
    warnings = [*profile.limits, *profile.warnings, *instrument.warnings, *_remarks(detectors)]
    return Budget(instrument, profile, detectors, tuple(warnings), _cautions(instrument))


def recorded(instrument: Instrument, detector: Part) -> list[tuple[float, float | None]]:
    """Return of every peak at a detector the total variance [s²] and the plates recorded (None: no column).

    What ``budget`` returns of them without the rows, and so without a computation for each link left out.
    """
    chain = links(instrument, detector)
    extra = _Spread(instrument.flow, chain, instrument.peaks).total()
    found: list[tuple[float, float | None]] = []
    for peak, outside in zip(instrument.peaks, extra, strict=True):
        time, bands = _own_bands(instrument, chain, peak)
        total = sum(band.variance for band in bands) + float(outside)
        found.append((total, time**2 / total if bands else None))
    return found


def _at_detector(instrument: Instrument, detector: Part) -> DetectorBudget:
    chain = links(instrument, detector)
    delay = transit(instrument, detector)
    spread = _Spread(instrument.flow, chain, instrument.peaks)
    rows = spread.rows()
    extra = sum((row.variance for row in rows.values()), spread.zero)
    without = {index: spread.total(index) for index in rows}

    peaks = []
    for n, peak in enumerate(instrument.peaks):
        column_time, bands = _own_bands(instrument, chain, peak)
        column = sum(band.variance for band in bands)
        total = column + float(extra[n])
        peaks.append(
            PeakBudget(
                peak=peak,
                retention=delay + column_time,
                plates_column=column_time**2 / column if bands else None,
                variance_column=column,
                variance_extra=float(extra[n]),
                rows=tuple(
                    Row(
                        part=row.link.part,
                        contribution=row.link.element.contribution,
                        side=row.link.side,
                        volume=row.link.element.volume,
                        variance=float(row.variance[n]),
                        share_extra=float(row.variance[n] / extra[n]) if extra[n] else 0.0,
                        share_total=float(row.variance[n]) / total if total else 0.0,
                        plates_kept_without=column / (column + float(without[i][n])) if bands else None,
                        t_star=None if row.t_star is None else float(row.t_star[n]),
                        run_t_star=None if row.run_t_star is None else float(row.run_t_star[n]),
                        longtube_variance=None if row.longtube is None else float(row.longtube[n]),
                    )
                    for i, row in rows.items()
                ),
                columns=bands,
                points=_points(chain, total),
                columns_range=_columns_range(instrument, chain, peak),
            )
        )
    return DetectorBudget(detector, delay, tuple(peaks))


def _beds_passed(instrument: Instrument, parts: Iterable[Part], peak: Peak) -> list[tuple[Part, Bed, Stream]]:
    """Return the columns among these parts, each with what flows through it of one peak."""
    return [(part, bed, Stream(instrument.flow, peak.diffusion_in(part))) for part in parts for bed in beds_of([part])]


def _columns_range(instrument: Instrument, chain: tuple[Link, ...], peak: Peak) -> tuple[float, float] | None:
    """Return the fewest and most plates of the columns together, where N comes from a curve."""
    passed = _beds_passed(instrument, _parts(chain), peak)
    spans = [bed.plates_range(stream) for _, bed, stream in passed]
    if peak.plates is not None or not any(spans):
        return None
    time = sum(bed.void_volume for _, bed, _ in passed)
    ends = []
    for end in (0, 1):
        variance = 0.0
        for span, (_, bed, stream) in zip(spans, passed, strict=True):
            variance += bed.void_volume**2 / float(span[end] if span else bed.plates_for(stream))
        ends.append(time**2 / variance)
    return ends[0], ends[1]


def _own_bands(instrument: Instrument, chain: tuple[Link, ...], peak: Peak) -> tuple[float, tuple[ColumnBand, ...]]:
    """Return retention time [s] in the chain's columns, and each one's own band.

    A peak's own ``plates`` are those of all columns of the path together; each column's variance
    is scaled alike, so that a detector between columns gets its share.
    """

    def columns(parts: Iterable[Part]) -> list[tuple[Part, Column]]:
        passed = _beds_passed(instrument, parts, peak)
        return [(part, bed.retained(stream, peak.k or 0.0)) for part, bed, stream in passed]

    scale = 1.0
    if peak.plates is not None:
        every = [column for _, column in columns(instrument.parts)]
        time, variance = sum(float(c.delay()) for c in every), sum(float(c.variance()) for c in every)
        scale = time**2 / peak.plates / variance
    passed = columns(_parts(chain))
    bands = tuple(
        ColumnBand(part, float(column.variance()) * scale, float(column.plates) / scale) for part, column in passed
    )
    return sum(float(column.delay()) for _, column in passed), bands


def _parts(chain: tuple[Link, ...]) -> tuple[Part, ...]:
    """Return the parts of a chain, each once."""
    return tuple({link.part.position: link.part for link in chain}.values())


@dataclass(frozen=True)
class _LinkSpread:
    """What a link contributes, for all peaks at once; arrays have one entry a peak."""

    link: Link
    variance: Values
    t_star: Values | None = None
    run_t_star: Values | None = None
    longtube: Values | None = None


class _Spread:
    """The variance of the chain outside the columns, for all peaks at once."""

    def __init__(self, flow: float, chain: tuple[Link, ...], peaks: tuple[Peak, ...]) -> None:
        self._flow = flow
        self._chain = chain
        self._peaks = peaks
        self._known: dict[tuple[int, ...], list[Values]] = {}
        self.zero = np.zeros(len(peaks))

    def rows(self) -> dict[int, _LinkSpread]:
        """Return what each link but the columns contributes, in the order of the chain."""
        rows: dict[int, _LinkSpread] = {}
        for group in self._groups(range(len(self._chain))):
            filters = self._filters(group)
            tubes = [part for part in filters if isinstance(part, Tube)]
            run = self.zero + sum(tube.t_star for tube in tubes)
            for index, part, variance in zip(group, filters, self._shares(group), strict=True):
                link = self._chain[index]
                if isinstance(part, Tube):
                    own, longtube = self.zero + part.t_star, self.zero + part.longtube_variance()
                    rows[index] = _LinkSpread(link, variance, own, run, longtube)
                else:
                    rows[index] = _LinkSpread(link, variance)
        return dict(sorted(rows.items()))

    def total(self, removed: int | None = None) -> Values:
        """Return the variance [s²] of the chain, or of it without one link, a run of tubes closing up."""
        kept = [index for index in range(len(self._chain)) if index != removed]
        return sum((share for group in self._groups(kept) for share in self._shares(group)), self.zero)

    def _groups(self, indices: Sequence[int]) -> Iterator[tuple[int, ...]]:
        """Group links into what mixes on its own, columns left out."""
        for places in segments([self._chain[index] for index in indices]):
            group = tuple(indices[place] for place in places)
            if not isinstance(self._chain[group[0]].element, Bed):
                yield group

    def _shares(self, group: tuple[int, ...]) -> list[Values]:
        if group not in self._known:
            filters = self._filters(group)
            run = run_of(filters)
            shares = run.shares() if run.tubes else [part.variance() for part in filters]
            self._known[group] = [self.zero + share for share in shares]
        return self._known[group]

    def _filters(self, group: tuple[int, ...]) -> list[Filter]:
        """Return the filters of a segment, each with the diffusion coefficients at its own temperature."""
        parts = [self._chain[index].part for index in group]
        diffusion = [np.array([peak.diffusion_in(part) for peak in self._peaks]) for part in parts]
        return [filter_of(self._chain[i], self._flow, d) for i, d in zip(group, diffusion, strict=True)]


def _points(chain: tuple[Link, ...], variance: float) -> float | None:
    """Return the data points across 4σ, None where no rate was entered."""
    for link in chain:
        if isinstance(link.element, Electronics) and link.element.period:
            return 4 * math.sqrt(variance) / link.element.period
    return None


def _remarks(detectors: tuple[DetectorBudget, ...]) -> list[str]:
    """Say what is odd about the answer itself."""
    found = []
    for answer in detectors:
        few = [p for p in answer.peaks if p.points is not None and p.points < FEW_POINTS]
        if few:
            worst = min(few, key=lambda p: p.points or 0.0)
            found.append(
                f'{answer.detector.label}: {worst.points:.1f} data points across 4σ of "{worst.peak.name}"'
                ": raise the rate, 20 or more are wanted"
            )
        unmixed = {
            row.part.label
            for p in answer.peaks
            for row in p.rows
            if row.run_t_star is not None and 0 < row.run_t_star < UNMIXED_BELOW
        }
        if unmixed:
            found.append(
                f"nearly unmixed flow (t* below {UNMIXED_BELOW:g}) in {', '.join(sorted(unmixed))}: entrance "
                "effects blur the variance"
            )
    return list(dict.fromkeys(found))


def _cautions(instrument: Instrument) -> tuple[str, ...]:
    unchecked = [part.label for part in _unchecked(instrument)]
    found = [
        "Before opening a line: pump off, pressure at zero, eye protection; check that tubing and seals "
        "suit solvent and pressure. The instrument's documents, local rules and licensed practice come "
        "first.",
    ]
    if unchecked:
        found.append(f"Pressure limits not checked (none entered): {', '.join(unchecked)}.")
    if any(part.kind == "detector" and part.elements and part.elements[0].volume > 0
           for part in instrument.parts):  # fmt: skip
        found.append(
            "A plugged waste line brings a cell to whatever pressure the pump allows, not to the figure computed here."
        )
    return tuple(found)


def _unchecked(instrument: Instrument) -> tuple[Part, ...]:
    return tuple(part for part in instrument.parts if part.kind in ("column", "detector") and part.max_pressure is None)
