"""Kinds of part that the stream passes: injection, tubes, fittings, mixers, blocks, the outlet."""

from __future__ import annotations

import math

from xcol.filters.volumes import dead_gap_volume
from xcol.flowpath.elements import Block, Bore, Injected, Mixed
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Key, Later, Measure, Only, Text, yes
from xcol.flowpath.kinds.table import (
    DROP,
    TANKS,
    TUBE_BORES,
    TUBE_LENGTHS,
    VOLUMES,
    Elements,
    Kind,
    must,
    one_size,
)
from xcol.flowpath.shorthand import tube_size
from xcol.units import FLOW, LENGTH, VARIANCE, VOLUME, write


def _inject(draft: Draft) -> Elements:
    return (Injected(must(draft, "volume")),)


INJECT = Kind(
    name="inject",
    meaning="the injected volume; the path begins here",
    example='{ inject = "20 uL" }',
    keys=(
        Key("volume", VOLUMES, "injected volume"),
        Key(
            "loop",
            Only(
                VOLUMES,
                lambda raw: isinstance(raw, str) and any(sign in raw.lower() for sign in "x×*,;"),
                'the loop\'s volume alone, loop = "20 uL"',
            ),
            "volume that the loop holds",
        ),
        Key("filled", Later(), "loop filled in full or in part"),
        Key("emptied", Later(), "loop emptied the same way or reversed"),
        Key("fraction", Later("the injected volume"), "fraction of a first dimension"),
        Key("loop_in_line", Later(), "loop that stays in line"),
    ),
    ways=(("volume",),),
    size=one_size("volume", VOLUME),
    elements=_inject,
    sizes={"injection": ("volume",)},
)


def _tube(draft: Draft) -> Elements:
    bore = must(draft, "bore")
    length = draft.number("length")
    if length is None:
        length = must(draft, "volume") / (math.pi / 4 * bore**2)
    return (Bore(length, bore),)


TUBE = Kind(
    name="tube",
    meaning="a connecting tube",
    example='{ tube = "40 cm x 0.25 mm", name = "valve to column" }',
    keys=(
        Key("length", TUBE_LENGTHS, "length"),
        Key("bore", TUBE_BORES, "inside diameter"),
        Key("volume", VOLUMES, "volume, in place of the length"),
        Key("material", Text(60), "material, for your own record"),
        DROP,
        Key("bend_radius", Later(), "radius of its bends"),
        Key("coil_diameter", Later(), "diameter of its coil"),
    ),
    ways=(("length", "bore"), ("volume", "bore")),
    size=tube_size,
    elements=_tube,
    sizes={},
)


def _fitting(draft: Draft) -> Elements:
    tanks = draft.number("tanks")
    if draft.number("bore") is not None:
        if tanks is not None:
            draft.fault(
                "tanks",
                "tanks for a volume or a gap only",
                "give volume in place of bore and length",
            )
        return (Bore(must(draft, "length"), must(draft, "bore"), False, "fitting"),)
    volume = draft.number("volume")
    if volume is None:
        port = draft.number("port")
        if port is None:
            port = 25.4e-3 / 16
            draft.assume("port 1/16 in", "port of 1/16 in (1.59 mm) around the gap")
        volume = float(dead_gap_volume(port, must(draft, "gap")))
    if tanks is None:
        draft.assume("fittings mix fully", "the volume mixes as one stirred tank")
    return (Mixed(volume, tanks or 1.0, "fitting"),)


FITTING = Kind(
    name="fitting",
    meaning="a union, tee body, frit, filter or valve passage",
    example='{ fitting = "divert valve", volume = "0.5 uL" }',
    keys=(
        Key("volume", VOLUMES, "volume"),
        Key("bore", TUBE_BORES, "diameter of the passage"),
        Key("length", TUBE_LENGTHS, "length of the passage"),
        Key("gap", Measure(LENGTH, 1e-6, 0.02, zero=True), "length of a dead gap in the port"),
        Key("port", Measure(LENGTH, 1e-4, 0.02, fraction=True), "diameter of the port"),
        Key("tanks", TANKS, "number of tanks that it mixes like"),
        Key(
            "remix",
            Only(yes, lambda raw: raw is not True, "leave remix out"),
            "whether it mixes the stream across the bore",
        ),
        DROP,
    ),
    ways=(("volume",), ("bore", "length"), ("gap",)),
    size=one_size("volume", VOLUME),
    elements=_fitting,
    sizes={"fitting": ("volume", "gap", "length")},
)


def _mixer(draft: Draft) -> Elements:
    tanks = draft.number("tanks")
    if tanks is None:
        draft.assume("mixer: one tank", "the volume mixes as one stirred tank")
    return (Mixed(must(draft, "volume"), tanks or 1.0, "mixer"),)


MIXER = Kind(
    name="mixer",
    meaning="a mixing volume",
    example='{ mixer = "50 uL", tanks = 2 }',
    keys=(
        Key("volume", VOLUMES, "volume"),
        Key("tanks", TANKS, "number of tanks that it mixes like"),
        DROP,
    ),
    ways=(("volume",),),
    size=one_size("volume", VOLUME),
    elements=_mixer,
    sizes={"mixer": ("volume",)},
)


def _block(draft: Draft) -> Elements:
    volume = draft.number("volume")
    if volume is None:
        volume = 0.0
        draft.assume("block without delay", "no volume entered: the block delays nothing")
    draft.assume("blocks mix", "the stream leaves it mixed across the bore")
    measured_at = draft.number("at_flow")
    if measured_at is not None:
        draft.assume(
            "blocks constant in uL2",
            f"its variance, measured at {write(measured_at, 'mL/min', FLOW)}, taken as the same in µL² at this flow",
        )
        return (Block(must(draft, "variance"), volume),)
    draft.assume("blocks constant in uL2", "its variance in µL² taken as the same at every flow")
    return (Block(must(draft, "variance"), volume),)


BLOCK = Kind(
    name="block",
    meaning="a module that is known only by its measured variance",
    example='{ block = "autosampler", variance = "4 uL^2", volume = "8 uL" }',
    keys=(
        Key("variance", Measure(VARIANCE, 1e-30, 1e-8, zero=True), "measured variance"),
        Key("at_flow", Measure(FLOW, 1e-15, 1e-5), "flow of the measurement"),
        Key("volume", VOLUMES, "volume that it holds"),
        DROP,
    ),
    ways=(("variance",),),
    size=one_size("variance", VARIANCE),
    elements=_block,
    sizes={"block": ("variance",)},
)


def _outlet(draft: Draft) -> Elements:
    return ()


OUTLET = Kind(
    name="outlet",
    meaning="the end of the path: a collector, waste",
    example='{ outlet = "fraction collector" }',
    keys=(),
    ways=(),
    size=None,
    elements=_outlet,
    sizes={},
)
