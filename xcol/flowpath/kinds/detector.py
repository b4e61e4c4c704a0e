"""The detector as a kind of part: cell, noise filter, data rate."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING

from xcol.filters.signal import (
    BOXCAR_RISE,
    GAUSSIAN_RISE,
    Boxcar,
    FirstOrder,
    GaussianFilter,
    first_order_rise,
)
from xcol.flowpath.elements import Cell, Electronics, Element
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Choice, Key, Later, Measure, Number
from xcol.flowpath.kinds.table import DROP, TANKS, VOLUMES, Elements, Kind, one_size
from xcol.units import FREQUENCY, LENGTH, TIME, VOLUME

if TYPE_CHECKING:
    from xcol.filters.interface import Filter

_SECONDS = Measure(TIME, 1e-6, 600.0, zero=True)


def _detector(draft: Draft) -> Elements:
    elements: list[Element] = []
    cell = draft.number("cell")
    if cell is not None:
        tanks = draft.number("tanks")
        if tanks is None and cell > 0:
            draft.assume(
                "no mixing in cell",
                "the cell passes as a plug, the best case: a real one can be 15 times worse, and more for "
                "slow molecules",
            )
        elements.append(Cell(cell, tanks))
        if draft.number("path_length") is not None:
            draft.assume("cell path not used", "the path length serves to check the cell volume only")
    elif draft.number("tanks") is not None or draft.number("path_length") is not None:
        key = "tanks" if draft.number("tanks") is not None else "path_length"
        draft.fault(key, "the cell's volume with it", 'cell = "10 uL"')
    elements += _noise_filter(draft)
    rate, cycle = draft.number("rate"), draft.number("cycle")
    if rate is not None and cycle is not None:
        draft.fault("cycle", "rate or cycle, not both", "leave one out")
    period = 1 / rate if rate else cycle
    if period:
        draft.assume("averaging between points", "the signal is averaged over the whole time between points")
        elements.append(Electronics(Boxcar(period), "rate", period))
    return tuple(elements)


def _noise_filter(draft: Draft) -> list[Element]:
    """Return the detector's noise filter; none where there is no setting, or where it is at fault."""
    tau, rise = draft.number("time_constant"), draft.number("rise_time")
    if _is_contradictory(draft) or (tau is None and rise is None):
        return []
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
    return [Electronics(made, "filter")]


def _is_contradictory(draft: Draft) -> bool:
    """Report filter settings that do not go together; return whether there are any."""
    has_tau, has_rise = ("time_constant" in draft.values), ("rise_time" in draft.values)
    form = draft.text("filter")
    if has_tau and has_rise:
        draft.fault("rise_time", "time_constant or rise_time, not both", "leave one out")
    elif not has_tau and not has_rise:
        given = [key for key in ("filter", "stages") if key in draft.values]
        for key in given:
            draft.fault(key, "time_constant or rise_time with it", 'time_constant = "0.1 s"')
        return bool(given)
    elif form == "boxcar" and has_tau:
        expected = "no time constant: a boxcar has none"
        draft.fault("time_constant", expected, "rise_time (10-90 %), or rate alone")
    elif form in ("gaussian", "boxcar") and "stages" in draft.values:
        draft.fault("stages", "stages of a first-order filter only", "leave stages out")
    else:
        return False
    return True


DETECTOR = Kind(
    name="detector",
    meaning="a detector: its cell, its noise filter, its data rate",
    example='{ detector = "UV", cell = "10 uL", time_constant = "0.5 s", rate = "5 Hz" }',
    keys=(
        Key("cell", VOLUMES, "volume of the cell"),
        Key("tanks", TANKS, "number of tanks that the cell mixes like"),
        Key("path_length", Measure(LENGTH, 1e-5, 1.0), "optical path of the cell"),
        Key("time_constant", _SECONDS, "time constant of each stage; σ of a Gaussian filter"),
        Key("rise_time", _SECONDS, "10-90 % rise time of the whole filter"),
        Key("filter", Choice(("first-order", "gaussian", "boxcar")), "form of the filter"),
        Key("stages", Number(1, 20, "a number of stages", whole=True), "equal stages"),
        Key("rate", Measure(FREQUENCY, 1e-3, 1e5, otherwise="cycle, for the time between points"), "data rate"),
        Key("cycle", Measure(TIME, 1e-5, 1e3, otherwise="rate, for a frequency"), "time between data points"),
        DROP,
        Key("response", Later("time_constant or rise_time"), "response time, meaning unknown"),
        Key("dwell", Later("rate alone"), "averaging time, where shorter than the period"),
        Key("filters", Later("time_constant or rise_time"), "several filters"),
    ),
    ways=(),
    size=one_size("cell", VOLUME),
    elements=_detector,
    sizes={"cell": ("cell",), "filter": ("time_constant", "rise_time"), "rate": ("rate", "cycle")},
)
