"""How sure an answer is, in words: intervals, which part leads, what would decide it."""

from __future__ import annotations

from typing import TYPE_CHECKING

from xcol.answers.likely import SURE
from xcol.answers.rows import FULL, SAME_WAY
from xcol.report.budget_tables import figures, of_draws, shares
from xcol.report.labels import contribution_name, name_of, quoted, short_name

if TYPE_CHECKING:
    from xcol.answers.budget import Budget, PeakBudget
    from xcol.answers.likely import Influence, Likely
    from xcol.answers.rows import Row

_COULD_LEAD = 0.1  # share of the draws from which a part is named among those that could lead
_MOST_NAMED = 3
_SETTLES = 0.05  # share of the variance of the answer from which an unknown is worth settling
LOSES_LITTLE = 0.97  # share of the plates that is kept all over the interval: nothing is worth changing

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


def beyond(likely: Likely, peak: PeakBudget) -> str:
    """Say which end of its range a printed figure is, where it lies outside of its interval; "" within it."""
    low, high = likely.variance_extra
    kept = peak.plates_kept
    inside = kept is None or likely.plates_kept is None or likely.plates_kept[0] <= kept <= likely.plates_kept[1]
    if low <= peak.variance_extra <= high and inside:
        return ""
    worse = peak.variance_extra > (low + high) / 2
    groups = {"tubes": 0.0, "loop": 0.0, "injection": 0.0, "cell": 0.0, "": 0.0}
    for row in peak.rows:
        groups[_group(row)] += row.variance - row.low if worse else row.high - row.variance
    most = max(groups, key=lambda group: groups[group])
    return (_WORSE if worse else _BETTER)[most]


# what is printed at one end of its range, by what has most in that
_WORSE = {
    "tubes": "tubes printed straight",
    "loop": "the loop printed straight",
    "cell": "the cell printed as a straight bore",
    "injection": "printed at its worse end",
    "": "printed at its worse end",
}
_BETTER = {
    "tubes": "bends printed all along",
    "loop": "the loop printed at its best",
    "cell": "the cell printed as a plug",
    "injection": "the injection printed as a plug",
    "": "printed at its better end",
}


def _group(row: Row) -> str:
    if row.tube is not None:
        return "tubes"
    if row.contribution == "injection" and row.form:
        return "loop"
    return row.contribution if row.contribution in ("injection", "cell") else ""


def verdict_on_parts(likely: Likely, peak: PeakBudget, draws: int) -> list[str]:
    """Return which part to change first, or what could lead and what would decide it, a line each."""
    if likely.plates_kept is not None and likely.plates_kept[0] >= LOSES_LITTLE:
        return [f"Nothing is worth changing at this k: {shares(likely.plates_kept)} of the plates are kept."]
    if not likely.variance_extra[1] > 0:
        return []
    leads = f"of {draws} draws"
    row = likely.leader
    if row is not None:
        return [f"Surest gain: {_action(row)} (leads in {of_draws(likely.leaders[0][1])} {leads})."]
    tubes = [(row, share) for row, share in likely.leaders if row.tube is not None and share >= _COULD_LEAD]
    if len(tubes) > 1 and sum(share for _, share in tubes) >= SURE:
        listed = ", ".join(_named(row) for row, _ in tubes[:_MOST_NAMED])
        share = of_draws(sum(share for _, share in tubes))
        return [f"Surest gain: narrower or shorter tubes, {listed} (one of them leads in {share} {leads})."]
    named = [pair for pair in likely.leaders if pair[1] >= _COULD_LEAD][:_MOST_NAMED]
    if len(named) < 2:
        named = list(likely.leaders[:2])
    if not named:
        return []
    pieces = [f"{_named(row)} {of_draws(share)}" for row, share in named]
    pieces[0] += " of draws"
    lines = [f"Could lead: {', '.join(pieces)}."]
    rows = [row for row, _ in named]
    sentences = []
    if settles := what_settles(likely, rows, has_column=peak.plates_column is not None):
        sentences.append(f"To decide: {'; '.join(settles)}.")
    if settings := [_named(row) for row in rows if row.side == "signal" and not row.low < row.high]:
        sentences.append(f"Free to try: a faster {settings[0]}.")
    lines += [" ".join(sentences)] if sentences else []
    return lines + [why for why in (_why_other(max(peak.rows, key=lambda row: row.variance), rows[0]),) if why]


def _why_other(longest: Row, leader: Row) -> str:
    """Say why the longest bar is another part's than the one that leads in most draws; "" where it is the same."""
    if longest is leader:
        return ""
    ends = [(row, _end_of(row)) for row in (longest, leader)]
    if ends[0][1] == ends[1][1]:
        return ""
    said = [f"{_named(row)} at its {end}" for row, end in ends if end]
    return f"Bars as printed: {', '.join(said)}; the draws lie between."


def _end_of(row: Row) -> str:
    """Return at which end of its range a row is printed, "best" or "worst"; "" where at neither."""
    if row.variance - row.low <= 1e-6 * row.high < row.high - row.low:
        return "best"
    return "worst" if row.high - row.variance <= 1e-6 * row.high < row.high - row.low else ""


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
    remark = beyond(likely, peak)
    return text + (f" ({remark})." if remark else ".")


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


def _action(row: Row) -> str:
    if row.contribution == "injection":
        return _ABOUT_INJECTION.get(row.form, "inject less")
    return _ACTIONS.get(row.contribution, _FILTER).format(name=_plain_name(row))


def _named(row: Row) -> str:
    """Return a contribution without its size: 'UV time constant', 'injection', 'valve to column'."""
    if row.contribution == "injection":
        return quoted(row.part) if row.part.name else "injection"
    if row.part.kind == "detector":
        return contribution_name(row.part, row.contribution, short_name(row.part))
    return quoted(row.part) if row.part.name else f"{row.part.kind} (part {row.part.position})"


def _plain_name(row: Row) -> str:
    return quoted(row.part) if row.part.name else name_of(row.part)


def unknown_in_words(influence: Influence) -> str:
    """Return an unknown with the name of its part: 'bend of valve to column', 'mixing of UV cell'."""
    part = influence.part
    if part is None or (part.kind == "inject" and not part.name):
        return f"{influence.what} of the loop" if part and influence.what in ("bend", "bore") else influence.what
    cell = " cell" if influence.what == "mixing" and part.kind == "detector" else ""
    return f"{influence.what} of {name_of(part)}{cell}"


def settle_in_words(influence: Influence, *, has_column: bool) -> str:
    """Return what would settle an unknown, with its part's name; a path without a column is the union run itself."""
    name = quoted(influence.part) if influence.part is not None else ""
    run = "a union run" if has_column else "this path's variance, measured"
    return influence.settle.format(name=name, run=run)
