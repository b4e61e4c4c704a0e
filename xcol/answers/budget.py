"""The main question: what each part adds to the width of the peaks, and what it costs in plates.

All variances are summed in s²; what is shown in µL² is s² times the square of the column's flow.
"""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from xcol.answers.pressure import Pressures, pressures
from xcol.answers.rows import Row, rows_of, spread_of
from xcol.filters.column import Column
from xcol.filters.curved import HIGHEST_DEAN
from xcol.filters.laminar import UNMIXED_BELOW
from xcol.flowpath.chain import Link, links, transit
from xcol.flowpath.elements import Electronics
from xcol.flowpath.model import beds_of

if TYPE_CHECKING:
    from collections.abc import Iterable

    from xcol.flowpath.bed import Bed
    from xcol.flowpath.elements import Stream
    from xcol.flowpath.model import Instrument, Part, Peak

HALF_WIDTH = 2 * math.sqrt(2 * math.log(2))  # width at half height of a Gaussian, in σ
FEW_POINTS = 10  # across 4σ: fewer, and the averaging between points adds more than 1.3 %


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
    delay: float  # mean delay outside the columns
    retention: float  # mean of the recorded peak, from the valve's turn
    plates_column: float | None
    variance_column: float
    variance_extra: float
    rows: tuple[Row, ...]
    columns: tuple[ColumnBand, ...]
    points: float | None  # data points across 4σ
    columns_range: tuple[float, float] | None = None

    @property
    def plates_kept_range(self) -> tuple[float, float] | None:
        """Share of the plates that is recorded with every part at its worst, and at its best."""
        if self.plates_column is None:
            return None
        worst, best = (max(sum(ends), 0.0) for ends in zip(*((row.high, row.low) for row in self.rows), strict=True))
        return self.variance_column / (self.variance_column + worst), self.variance_column / (
            self.variance_column + best
        )

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
    """What one detector records of the peaks."""

    detector: Part
    peaks: tuple[PeakBudget, ...]

    @property
    def delay(self) -> float:
        """Mean delay outside the columns [s]; of the first peak, where a washed-out loop delays each by its own D."""
        return self.peaks[0].delay


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
    warnings = [*profile.limits, *profile.warnings, *_remarks(detectors), *instrument.warnings]
    return Budget(instrument, profile, detectors, tuple(warnings), _cautions(instrument))


def recorded(instrument: Instrument, detector: Part) -> list[tuple[float, float | None]]:
    """Return of every peak at a detector the total variance [s²] and the plates recorded (None: no column).

    What ``budget`` returns of them without the rows, and so without a computation for each link left out.
    """
    chain = links(instrument, detector)
    extra = spread_of(instrument, chain).total()
    found: list[tuple[float, float | None]] = []
    for peak, outside in zip(instrument.peaks, extra, strict=True):
        time, bands = _own_bands(instrument, chain, peak)
        total = sum(band.variance for band in bands) + float(outside)
        found.append((total, time**2 / total if bands else None))
    return found


def _at_detector(instrument: Instrument, detector: Part) -> DetectorBudget:
    chain = links(instrument, detector)
    printed = spread_of(instrument, chain)
    rows = rows_of(instrument, chain, printed)
    extra = printed.total()
    without = {place: printed.total(place) for place in rows}

    peaks = []
    for n, peak in enumerate(instrument.peaks):
        column_time, bands = _own_bands(instrument, chain, peak)
        column = sum(band.variance for band in bands)
        outside = float(extra[n])
        peaks.append(
            PeakBudget(
                peak=peak,
                delay=(delay := transit(instrument, detector, peak.estimate)),
                retention=delay + column_time,
                plates_column=column_time**2 / column if bands else None,
                variance_column=column,
                variance_extra=outside,
                rows=tuple(
                    replace(
                        row[n],
                        share_extra=row[n].variance / outside if outside else 0.0,
                        share_total=row[n].variance / (column + outside) if column + outside else 0.0,
                        extra_without=float(without[place][n]),
                        plates_kept_without=column / (column + float(without[place][n])) if bands else None,
                    )
                    for place, row in rows.items()
                ),
                columns=bands,
                points=_points(chain, column + outside),
                columns_range=_columns_range(instrument, chain, peak),
            )
        )
    return DetectorBudget(detector, tuple(peaks))


def _beds_passed(instrument: Instrument, parts: Iterable[Part], peak: Peak) -> list[tuple[Part, Bed, Stream]]:
    """Return the columns among these parts, each with what flows through it of one peak."""
    return [(part, bed, instrument.stream(part, peak.diffusion_in(part))) for part in parts for bed in beds_of([part])]


def _columns_range(instrument: Instrument, chain: tuple[Link, ...], peak: Peak) -> tuple[float, float] | None:
    """Return the fewest and most plates of the columns together, where N comes from a curve."""
    passed = _beds_passed(instrument, _parts(chain), peak)
    spans = [bed.plates_range(stream) for _, bed, stream in passed]
    if peak.plates is not None or not any(spans):
        return None
    time = sum(float(bed.void_volume) for _, bed, _ in passed)
    ends = []
    for end in (0, 1):
        variance = 0.0
        for span, (_, bed, stream) in zip(spans, passed, strict=True):
            variance += float(bed.void_volume) ** 2 / float(span[end] if span else bed.plates_for(stream))
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
            if 0 < (row.tube.run_t_star if row.tube else row.washed_t_star or 0.0) < UNMIXED_BELOW
        }
        if unmixed:
            found.append(
                f"nearly unmixed flow (t* below {UNMIXED_BELOW:g}) in {', '.join(sorted(unmixed))}: entrance "
                "effects blur the variance"
            )
        above = {
            row.part.label
            for p in answer.peaks
            for row in p.rows
            if row.tube is not None and row.tube.strength and row.tube.bent_dean > HIGHEST_DEAN
        }
        if above:
            found.append(
                f"Dean number above {HIGHEST_DEAN:g} in {', '.join(sorted(above))}: its bend is computed as at "
                f"{HIGHEST_DEAN:g}, an upper estimate of the variance"
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
