"""The tables of the full report: every contribution to a peak, its tubes, and what its answer hangs on."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.report.budget_tables import of_draws, or_dash, percent, span_of, three
from xcol.report.labels import contribution_label
from xcol.report.sheet import Grid
from xcol.report.sureness import settle_in_words, unknown_in_words
from xcol.units import significant

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, PeakBudget
    from xcol.answers.likely import Likely
    from xcol.answers.rows import Row

_MOST_UNKNOWNS, _LEAST_SHARE = 6, 0.02  # of the ranking that is shown

Column = tuple[str, bool, list[str]]  # header, right-aligned, cells


def detail_grid(answer: Budget, peak: PeakBudget, likely: Likely | None, *, wide: bool) -> Grid:
    """Return every contribution to one peak; ``wide`` with side, s² and share of all."""
    leads = {id(row): share for row, share in likely.leaders} if likely else {}
    columns: list[Column] = [
        ("part", False, [contribution_label(row.part, row.contribution) for row in peak.rows]),
        ("held, µL", True, [_held(row) for row in peak.rows]),
        ("µL²", True, [three(answer.in_uL2(row.variance)) for row in peak.rows]),
        ("best-worst", True, [span_of(answer, row.low, row.high) for row in peak.rows]),
        ("share", True, [percent(row.share_extra) for row in peak.rows]),
        ("if gone", True, [percent(row.plates_kept_without) for row in peak.rows]),
    ]
    if leads:
        columns.append(("leads", True, [of_draws(leads[id(row)]) if leads[id(row)] else "" for row in peak.rows]))
    if wide:
        columns[1:1] = [("side", False, [row.side for row in peak.rows])]
        columns += [
            ("s²", True, [three(row.variance) for row in peak.rows]),
            ("of all", True, [percent(row.share_total) for row in peak.rows]),
        ]
    return _grid(columns)


def tubes_grid(answer: Budget, peak: PeakBudget) -> Grid:
    """Return each tube by itself, without what it shares: t*, Dean number, De²Sc, and µL² straight, bent and long."""
    tubes = [(row, row.tube) for row in peak.rows if row.tube is not None]
    return _grid(
        [
            ("tube", False, [contribution_label(row.part, row.contribution) for row, _ in tubes]),
            ("t*", True, [three(tube.t_star) for _, tube in tubes]),
            ("De", True, [or_dash(tube.bent_dean or None) for _, tube in tubes]),
            ("De²Sc", True, [or_dash(tube.bent_strength or None) for _, tube in tubes]),
            ("straight", True, [three(answer.in_uL2(tube.straight_variance)) for _, tube in tubes]),
            (
                "bent",
                True,
                [three(answer.in_uL2(tube.bent_variance)) if tube.bent_strength else "-" for _, tube in tubes],
            ),
            ("long-tube", True, [three(answer.in_uL2(tube.longtube_variance)) for _, tube in tubes]),
        ]
    )


def unknowns_grid(likely: Likely, *, has_column: bool) -> Grid:
    """Return the unknowns that move the answer most, each with what would settle it."""
    shown = [one for one in likely.influences if one.share >= _LEAST_SHARE][:_MOST_UNKNOWNS]
    return _grid(
        [
            ("unknown", False, [unknown_in_words(one) for one in shown]),
            ("share", True, [percent(one.share) for one in shown]),
            ("what settles it", False, [settle_in_words(one, has_column=has_column) for one in shown]),
        ]
    )


def reasons_grid(peak: PeakBudget) -> Grid:
    """Return for each contribution with a range why it is as low and as high as it may be."""
    rows = [row for row in peak.rows if row.low < row.high]
    return _grid(
        [
            ("part", False, [contribution_label(row.part, row.contribution) for row in rows]),
            ("best", False, [row.at_low for row in rows]),
            ("worst", False, [row.at_high for row in rows]),
        ]
    )


def _grid(columns: list[Column]) -> Grid:
    return Grid(
        tuple(header for header, _, _ in columns),
        tuple(zip(*(cells for _, _, cells in columns), strict=True)),
        tuple(right for _, right, _ in columns),
    )


def _held(row: Row) -> str:
    return significant(row.volume * 1e9) if row.side != "signal" else "-"
