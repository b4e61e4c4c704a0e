"""The detector as a kind of part: cell, noise filter, data rate."""

from __future__ import annotations

import math
from dataclasses import replace
from typing import TYPE_CHECKING

from xcol.filters.signal import (
    BOXCAR_RISE,
    GAUSSIAN_RISE,
    Boxcar,
    FirstOrder,
    GaussianFilter,
    first_order_rise,
)
from xcol.flowpath.elements import USUAL_CELL_LENGTH, Cell, Electronics, Element
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Choice, Key, Measure, Number, Tables
from xcol.flowpath.kinds.table import DROP, TANKS, VOLUMES, Elements, Kind, one_size
from xcol.flowpath.kinds.tolerances import check_tolerances, mixing_of_cell, tolerance_of
from xcol.flowpath.unknowns import Ends, OneOf, Unknown, scaling
from xcol.units import FREQUENCY, LENGTH, TIME, VOLUME, write

if TYPE_CHECKING:
    from xcol.filters.interface import Filter, Real

_SECONDS = Measure(TIME, 1e-6, 600.0, zero=True)


# What people mean by a response time: σ is the time over the factor. The first is what is computed with.
_READINGS = (
    (first_order_rise(1), "10-90 % of a first-order filter"),
    (1.0, "a time constant, 0-63 %"),
    (math.log(10), "0-90 % of a first-order filter"),
    (GAUSSIAN_RISE, "10-90 % of a Gaussian"),
    (BOXCAR_RISE, "10-90 % of a boxcar"),
    (math.log(100), "0-99 % of a first-order filter"),
)
_TIMES = ("time_constant", "rise_time", "response")
_FILTER_EXAMPLE = 'filters = [{ time_constant = "0.1 s" }, { rise_time = "0.2 s", filter = "gaussian" }]'


def _detector(draft: Draft) -> Elements:
    check_tolerances(draft, *(("volume",) if draft.number("cell") is not None else ()))
    elements: list[Element] = [*_cell(draft)]
    if "filters" in draft.values:
        elements += _several_filters(draft)
    else:
        elements += _noise_filter(draft, "filter")
    rate, cycle, dwell = draft.number("rate"), draft.number("cycle"), draft.number("dwell")
    if rate is not None and cycle is not None:
        draft.fault("cycle", "rate or cycle, not both", "leave one out")
    period = 1 / rate if rate else cycle
    if dwell is not None and period and dwell > period * (1 + 1e-9):
        draft.fault("dwell", f"at most the time between points, {write(period, 's', TIME)}", "check dwell and rate")
    if period and dwell is None:
        draft.assume("averaging between points", "the signal is averaged over the whole time between points")
    if period or dwell:
        elements.append(Electronics(Boxcar(period or 0.0 if dwell is None else dwell), "rate", period))
    return tuple(elements)


def _cell(draft: Draft) -> list[Element]:
    volume, tanks, length = draft.number("cell"), draft.number("tanks"), draft.number("path_length")
    if volume is None:
        if tanks is not None or length is not None:
            key = "tanks" if tanks is not None else "path_length"
            draft.fault(key, "the cell's volume with it", 'cell = "10 uL"')
        return []
    sizes = tolerance_of(draft, "volume", scaling("volume"))
    if tanks is not None:
        if length is not None:
            draft.assume("cell as tanks", "the cell mixes as its tanks; the path length only checks its volume")
        return [Cell(volume, tanks, unknowns=sizes)]
    if length is not None:
        draft.assume(
            "cell a straight bore",
            f"the cell is a straight bore of {write(length, 'mm', LENGTH)} that is read over its volume, the worst "
            "case: turns at its ends and what they mix make it better, down to a plug",
        )
    elif volume:
        draft.assume(
            "no mixing in cell",
            "the cell passes as a plug, the best case; the range goes to a straight bore of 10 mm",
        )
    if not volume:
        return [Cell(0.0)]
    mixing = mixing_of_cell(length or USUAL_CELL_LENGTH, length is None)
    likeness = 0.0 if length is None else 1.0
    return [Cell(volume, None, length or USUAL_CELL_LENGTH, likeness, (mixing, *sizes))]


def _several_filters(draft: Draft) -> list[Element]:
    """Return the filters of a list, each a contribution of its own."""
    if beside := [key for key in (*_TIMES, "filter", "stages") if key in draft.values]:
        draft.fault(beside[0], "filters alone: the list has all of them", f"move {beside[0]} into filters")
        return []
    found: list[Element] = []
    for number, inner in enumerate(draft.lists["filters"], start=1):
        if not set(_TIMES) & set(inner.written) and not inner.has_fault:
            inner.fault("", "time_constant, rise_time or response", _FILTER_EXAMPLE, "a filter without a time")
        found += _noise_filter(inner, f"filter {number}")
    return found


def _noise_filter(draft: Draft, contribution: str) -> list[Element]:
    """Return a noise filter of the detector; none where there is no setting, or where it is at fault."""
    tau, rise, response = (draft.number(key) for key in _TIMES)
    if _is_contradictory(draft) or (tau is None and rise is None and response is None):
        return []
    if response is not None:
        return [_response(draft, response, contribution)]
    form, stages = draft.text("filter"), int(draft.number("stages") or 1)
    if form is None:
        key = "time_constant" if rise is None else "rise_time"
        count = f"{stages} equal first-order stages" if stages > 1 else "one first-order stage"
        draft.assume("first-order filter", f"{key} read as that of {count}")
    made: Filter
    if form == "gaussian":
        made = GaussianFilter(rise / GAUSSIAN_RISE if rise is not None else tau or 0.0)
    elif form == "boxcar":
        made = Boxcar((rise or 0.0) / BOXCAR_RISE * math.sqrt(12))
    elif rise is not None:
        made = FirstOrder(rise / first_order_rise(stages) / math.sqrt(stages), float(stages))
    else:
        made = FirstOrder(tau or 0.0, float(stages))
    return [Electronics(made, contribution)]


def _response(draft: Draft, response: float, contribution: str) -> Element:
    """Return the filter of a response time of which nobody says what it means."""

    def put(element: Electronics, factor: Real) -> Electronics:
        return replace(element, made=FirstOrder(response / factor))

    usual, words = _READINGS[0]
    draft.assume("response 10-90 %", f"response read as {words}; the range goes over all its readings")
    best, worst = max(_READINGS), min(_READINGS)
    ends = Ends(best[0], worst[0], f"response read as {best[1]}", f"response read as {worst[1]}")
    spread = OneOf(tuple(factor for factor, _ in _READINGS))
    unknown = Unknown("meaning of response", spread, put, ends, "what response means, time_constant or rise_time")
    return Electronics(FirstOrder(response / usual), contribution, unknowns=(unknown,))


def _is_contradictory(draft: Draft) -> bool:
    """Report filter settings that do not go together; return whether there are any."""
    given = [key for key in _TIMES if key in draft.values]
    form = draft.text("filter")
    if len(given) > 1:
        draft.fault(given[1], f"{' or '.join(given)}, not {'both' if len(given) == 2 else 'all'}", "leave one out")
    elif not given or given == ["response"]:
        others = [key for key in ("filter", "stages") if key in draft.values]
        for key in others:
            draft.fault(key, "time_constant or rise_time with it", 'time_constant = "0.1 s"')
        return bool(others)
    elif form == "boxcar" and given == ["time_constant"]:
        expected = "no time constant: a boxcar has none"
        draft.fault("time_constant", expected, "rise_time (10-90 %), or rate alone")
    elif form in ("gaussian", "boxcar") and "stages" in draft.values:
        draft.fault("stages", "stages of a first-order filter only", "leave stages out")
    else:
        return False
    return True


_FILTER_KEYS = (
    Key("time_constant", _SECONDS, "time constant of each stage; σ of a Gaussian filter"),
    Key("rise_time", _SECONDS, "10-90 % rise time of the whole filter"),
    Key("response", _SECONDS, "response time, of which nobody says what it means"),
    Key("filter", Choice(("first-order", "gaussian", "boxcar")), "form of the filter"),
    Key("stages", Number(1, 20, "a number of stages", whole=True), "equal stages"),
)

DETECTOR = Kind(
    name="detector",
    meaning="a detector: its cell, its noise filter, its data rate",
    example='{ detector = "UV", cell = "10 uL", time_constant = "0.5 s", rate = "5 Hz" }',
    keys=(
        Key("cell", VOLUMES, "volume of the cell"),
        Key("tanks", TANKS, "number of tanks that the cell mixes like"),
        Key("path_length", Measure(LENGTH, 1e-5, 1.0), "optical path of the cell"),
        *_FILTER_KEYS,
        Key("filters", Tables(_FILTER_KEYS, _FILTER_EXAMPLE), "several filters, each a table"),
        Key("rate", Measure(FREQUENCY, 1e-3, 1e5, otherwise="cycle, for the time between points"), "data rate"),
        Key("cycle", Measure(TIME, 1e-5, 1e3, otherwise="rate, for a frequency"), "time between data points"),
        Key("dwell", _SECONDS, "time over which the signal is averaged, where shorter than that between points"),
        DROP,
    ),
    ways=(),
    size=one_size("cell", VOLUME),
    elements=_detector,
    sizes={"cell": ("cell",), "filter": _TIMES, "rate": ("rate", "cycle", "dwell")},
)
