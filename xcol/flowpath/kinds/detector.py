"""The detector as a kind of part: cell, noise filter, data rate."""

from __future__ import annotations

import math

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
from xcol.units import FREQUENCY, LENGTH, TIME

_SECONDS = Measure(TIME, 1e-6, 600.0, zero=True)


def _detector(draft: Draft) -> Elements:
    elements: list[Element] = []
    cell = draft.number("cell")
    if cell is not None:
        tanks = draft.number("tanks")
        if tanks is None and cell > 0:
            draft.assume("no mixing in cell", "the cell passes as a plug, the best case: a real one can be 15 times worse")
        elements.append(Cell(cell, tanks))
        if draft.number("path_length") is not None:
            draft.assume(
                "cell path not used", "the path length serves to check the cell volume only"
            )
    elif draft.number("tanks") is not None or draft.number("path_length") is not None:
        key = "tanks" if draft.number("tanks") is not None else "path_length"
        draft.fault(key, "the cell's volume with it", 'cell = "10 uL"')
    elements += _noise_filter(draft)
    rate, cycle = draft.number("rate"), draft.number("cycle")
    if rate is not None and cycle is not None:
        draft.fault("cycle", "rate or cycle, not both", "leave one out")
    period = 1 / rate if rate else cycle
    if period:
        draft.assume(
            "averaging between points", "the signal is averaged over the whole time between points"
        )
        elements.append(Electronics(Boxcar(period), "rate"))
    return tuple(elements)


def _noise_filter(draft: Draft) -> list[Element]:
    """Return the detector's noise filter; at most one of time_constant and rise_time is given."""
    tau, rise = draft.number("time_constant"), draft.number("rise_time")
    form, stages = draft.text("filter"), draft.number("stages")
    if tau is not None and rise is not None:
        draft.fault("rise_time", "time_constant or rise_time, not both", "leave one out")
        return []
    if tau is None and rise is None:
        for key in ("filter", "stages"):
            if key in draft.values:
                draft.fault(key, "time_constant or rise_time with it", 'time_constant = "0.1 s"')
        return []
    if form == "boxcar" and tau is not None:
        draft.fault(
            "time_constant",
            "no time constant: a boxcar has none",
            "rise_time (10-90 %), or rate alone",
        )
        return []
    if stages is not None and form in ("gaussian", "boxcar"):
        draft.fault("stages", "stages of a first-order filter only", "leave stages out")
        return []
    if form is None:
        draft.assume(
            "first-order filter",
            f"{'time_constant' if rise is None else 'rise_time'} read as that of "
            f"{f'{stages:g} equal' if stages else 'one'} first-order stage{'s' if stages else ''}",
        )
    count = int(stages or 1)
    if form == "gaussian":
        return [
            Electronics(GaussianFilter(tau if rise is None else rise / GAUSSIAN_RISE), "filter")
        ]
    if form == "boxcar" and rise is not None:
        return [Electronics(Boxcar(rise / BOXCAR_RISE * math.sqrt(12)), "filter")]
    if rise is not None:
        tau = rise / first_order_rise(count) / math.sqrt(count)
    return [Electronics(FirstOrder(tau or 0.0, float(count)), "filter")]


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
        Key("rate", Measure(FREQUENCY, 1e-3, 1e5), "data rate"),
        Key("cycle", Measure(TIME, 1e-5, 1e3), "time between data points"),
        DROP,
        Key("response", Later("time_constant or rise_time"), "response time, meaning unknown"),
        Key("dwell", Later("rate alone"), "averaging time, where shorter than the period"),
        Key("filters", Later("time_constant or rise_time"), "several filters"),
    ),
    ways=(),
    size=one_size("cell", VOLUMES),
    elements=_detector,
)
