"""How sure an answer is, in words: intervals, which part leads, what would decide it."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from xcol.answers.likely import SURE
from xcol.answers.rows import FULL, SAME_WAY
from xcol.report.budget_tables import shares, three
from xcol.report.labels import contribution_name, name_of, short_name

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, PeakBudget
    from xcol.answers.likely import Influence, Likely
    from xcol.answers.rows import Row

_COULD_LEAD = 0.1  # share of the draws from which a part is named among those that could lead
_MOST_NAMED = 3
_SETTLES = 0.05  # share of the variance of the answer from which an unknown is worth settling
LOSES_LITTLE = 0.97  # share of the plates that is kept all over the interval: nothing is worth changing

# where the longest bar is another part's than the one that leads in most draws
_WHY_OTHER = "Bars show tubes at their worst, plugs at their best; the draws all between."

# what to do about the part that leads, by contribution; by kind where several kinds have one
_ACTIONS = {
    "tube": "a narrower or shorter {name}",
    "fitting": "a smaller {name}",
    "mixer": "a smaller {name}",
    "block": "a {name} that spreads less",
    "cell": "a smaller cell of {name}",
    "rate": "a faster rate of {name}",
}
_ABOUT_INJECTION = {
    FULL: "a smaller or narrower loop, or a part of it",
    SAME_WAY: "emptying the loop the other way, or a smaller or narrower one",
}
_FILTER = "a faster filter of {name}"


def figures(interval: tuple[float, float]) -> str:
    """Return an interval of figures with three digits: '103-208'."""
    low, high = (three(end) for end in interval)
    return high if low == high else f"{low}-{high}"


def beyond(printed: float, interval: tuple[float, float], peak: PeakBudget) -> str:
    """Say which end of its range a printed figure is, where it lies outside of its interval; "" within it."""
    low, high = interval
    if low <= printed <= high:
        return ""
    if printed > high:
        plugs = any(row.contribution in ("injection", "cell") and row.variance < row.high for row in peak.rows)
        return "plugs printed, the best" if plugs else "printed at its best"
    straight = any(row.tube is not None and row.tube.strength == 0 and row.low < row.variance for row in peak.rows)
    return "tubes printed straight, the worst" if straight else "printed at its worst"


def verdict_on_parts(likely: Likely, peak: PeakBudget, draws: int) -> list[str]:
    """Return which part to change first, or what could lead and what would decide it, a line each."""
    if likely.plates_kept is not None and likely.plates_kept[0] >= LOSES_LITTLE:
        return [f"Nothing is worth changing at this k: {shares(likely.plates_kept)} of the plates are kept."]
    leads = f"of {draws} draws"
    row = likely.leader
    if row is not None:
        return [f"Surest gain: {_action(row)} (leads in {_of_draws(likely.leaders[0][1])} {leads})."]
    tubes = [(row, share) for row, share in likely.leaders if row.tube is not None and share >= _COULD_LEAD]
    if len(tubes) > 1 and sum(share for _, share in tubes) >= SURE:
        listed = ", ".join(_named(row) for row, _ in tubes[:_MOST_NAMED])
        share = _of_draws(sum(share for _, share in tubes))
        return [f"Surest gain: narrower or shorter tubes, {listed} (one of them leads in {share} {leads})."]
    named = [pair for pair in likely.leaders if pair[1] >= _COULD_LEAD][:_MOST_NAMED]
    if len(named) < 2:
        named = list(likely.leaders[:2])
    if not named:
        return []
    listed = ", ".join(f"{_named(row)} {_of_draws(share)}" for row, share in named).replace(" %", " % of draws", 1)
    lines = [f"Could lead: {listed}."]
    settles = [
        f"a faster {_named(row)}, a setting" for row, _ in named if row.side == "signal" and not row.low < row.high
    ]
    settles += what_settles(likely, [row for row, _ in named], has_column=peak.plates_column is not None)
    if settles:
        lines.append(f"To decide: {'; '.join(settles[:2])}.")
    largest = max(peak.rows, key=lambda row: row.variance)
    if largest is not named[0][0]:
        lines.append(_WHY_OTHER)
    return lines


def what_settles(likely: Likely, rows: list[Row], *, has_column: bool) -> list[str]:
    """Return what would decide between rows: what settles the unknowns of their parts that matter most."""
    parts = {row.part.position for row in rows}
    found: dict[str, None] = {}
    for influence in likely.influences:
        if influence.part is None or influence.part.position not in parts or influence.share < _SETTLES:
            continue
        if influence.settle and len(found) < 2:
            found[settle_in_words(influence, has_column=has_column)] = None
    return list(found)


def interval_line(likely: Likely, peak: PeakBudget, answer: Budget, draws: int, seed: int) -> str:
    """Return the intervals of a peak's headline figures in a sentence."""
    pieces = []
    if likely.plates_observed is not None and likely.plates_kept is not None:
        pieces.append(f"{figures(likely.plates_observed)} plates recorded, {shares(likely.plates_kept)} kept")
    low, high = (answer.in_uL2(end) for end in likely.variance_extra)
    pieces.append(f"{figures((low, high))} µL² added")
    sigmas = tuple(end**0.5 for end in likely.variance_total)
    pieces.append(f"σ {figures((sigmas[0], sigmas[1]))} s")
    text = f"90 % of {draws} draws (seed {seed}): {', '.join(pieces)}"
    if peak.plates_kept is not None and likely.plates_kept is not None:
        remark = beyond(peak.plates_kept, likely.plates_kept, peak)
        text += f" ({remark})" if remark else ""
    return text + "."


def ends_line(peak: PeakBudget) -> str:
    """Return the answer with every part at its best and at its worst, and what tubes and cells have in that."""
    ends = peak.plates_kept_range
    if ends is None:
        return ""
    worst, best = ends
    text = (
        f"Mixing end to end, every part at its best or worst: {shares(ends)} kept, {shares((1 - best, 1 - worst))} lost"
    )
    for name, group in (
        ("tubes", [row for row in peak.rows if row.tube is not None]),
        ("cells", [row for row in peak.rows if row.contribution == "cell"]),
    ):
        low = _lost_with(peak, sum(row.low - row.variance for row in group))
        high = _lost_with(peak, sum(row.high - row.variance for row in group))
        if low < high:
            text += f", by {name} alone {shares((low, high))}"
    return text + "."


def _lost_with(peak: PeakBudget, more: float) -> float:
    """Return the share of the plates that is lost with so much more variance [s²] than printed."""
    return 1 - peak.variance_column / (peak.variance_total + more)


def _of_draws(share: float) -> str:
    """Return a share of the draws in whole per cent, rounded down: nine of ten are nine of ten."""
    return f"{math.floor(100 * share + 1e-9)} %"


def _action(row: Row) -> str:
    if row.contribution == "injection":
        return _ABOUT_INJECTION.get(row.form, "inject less")
    return _ACTIONS.get(row.contribution, _FILTER).format(name=_plain_name(row))


def _named(row: Row) -> str:
    """Return a contribution without its size: 'UV time constant', 'injection', 'valve to column'."""
    if row.contribution == "injection":
        return short_name(row.part) if row.part.name else "injection"
    name = short_name(row.part) if row.part.name else f"{row.part.kind} (part {row.part.position})"
    return contribution_name(row.part, row.contribution, name)


def _plain_name(row: Row) -> str:
    return f'"{short_name(row.part)}"' if row.part.name else name_of(row.part)


def unknown_in_words(influence: Influence) -> str:
    """Return an unknown with the name of its part: 'bend of valve to column', 'mixing of UV cell'."""
    part = influence.part
    if part is None or (part.kind == "inject" and not part.name):
        return influence.what
    cell = " cell" if influence.what == "mixing" and part.kind == "detector" else ""
    return f"{influence.what} of {name_of(part)}{cell}"


def settle_in_words(influence: Influence, *, has_column: bool) -> str:
    """Return what would settle an unknown, with its part's name; a path without a column is the union run itself."""
    name = short_name(influence.part) if influence.part is not None else ""
    run = "a union run" if has_column else "this path's variance, measured"
    return influence.settle.format(name=name, run=run)
