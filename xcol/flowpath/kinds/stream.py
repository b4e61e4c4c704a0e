"""Kinds of part that the stream passes: injection, tubes, fittings, mixers, blocks, the outlet."""

from __future__ import annotations

import math

from xcol.filters.volumes import dead_gap_volume
from xcol.flowpath.elements import Block, Bore, Injected, Loop, Mixed
from xcol.flowpath.file_keys import BEND_RADIUS, COIL_DIAMETER, curvature_of
from xcol.flowpath.findings import Draft
from xcol.flowpath.keys import Choice, Key, Later, Measure, Sizes, Text, YesOrNo
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
from xcol.flowpath.kinds.tolerances import (
    bend,
    bore_keeping_volume,
    check_bends,
    check_tolerances,
    injection_form,
    mixing_of_volume,
    remixing,
    tolerance_of,
    way_of_emptying,
)
from xcol.flowpath.shorthand import loop_of, loop_size, tube_size
from xcol.flowpath.unknowns import Unknown, scaling
from xcol.units import FLOW, LENGTH, VARIANCE, VOLUME, write


def _inject(draft: Draft) -> Elements:
    volume, (loop, bore) = must(draft, "volume"), loop_of(draft)
    emptied = draft.text("emptied")
    needs = (("filled", "emptied") if loop is None else ()) + (("bend_radius", "coil_diameter") if bore is None else ())
    if given := [key for key in needs if key in draft.values]:
        draft.fault(given[0], "the loop with it", 'loop = "20 uL x 0.5 mm", its volume and bore')
        return ()
    in_part = loop is not None and (volume < loop * (1 - 1e-9) or draft.text("filled") == "part")
    if draft.text("filled") == "full" and loop is not None and volume < loop * (1 - 1e-9):
        draft.fault("filled", "the whole loop injected", 'filled = "part", or inject what the loop holds')
    if in_part and emptied == SAME_WAY and bore is None:
        draft.fault("emptied", "the loop's bore with it", 'loop = "20 uL x 0.5 mm"')
    check_tolerances(draft, "volume", *(("bore",) if bore else ()))
    sizes = tolerance_of(draft, "volume", scaling("volume"))
    if loop is not None and bore is None:
        draft.assume(
            "loop without bore",
            "the loop's bore is not entered: it counts as an injection without one; full, it can be more than 5 plugs",
        )
    if loop is None or bore is None:
        form = () if in_part and emptied == REVERSED else (injection_form(),)
        return (Injected(volume, unknowns=(*form, *sizes)),)
    length = loop / (math.pi / 4 * bore**2)
    curvature, bends = bend(curvature_of(draft))
    check_bends(draft, _bend_key(draft), (Loop(length, bore, curvature=curvature),))
    if in_part and emptied == REVERSED:  # its bore does not matter
        return (Loop(length, bore, volume, 0.0, curvature, tolerance_of(draft, "volume", scaling("injected"))),)
    bores = tolerance_of(draft, "bore", bore_keeping_volume)
    if in_part:
        sizes = tolerance_of(draft, "volume", scaling("injected"))
        rest = f"{write(loop - volume, 'uL', VOLUME)} of the loop"
        ways = () if emptied else (way_of_emptying(rest),)
        same_way = float(emptied == SAME_WAY)
        return (Loop(length, bore, volume, same_way, curvature, (*ways, *bends, *bores, *sizes)),)
    if emptied:
        draft.assume("full loop", "which way a full loop is emptied makes no difference")
    sizes = tolerance_of(draft, "volume", scaling("length"))
    return (Loop(length, bore, None, 0.0, curvature, (*bends, *bores, *sizes)),)


SAME_WAY, REVERSED = "same way", "reversed"

INJECT = Kind(
    name="inject",
    meaning="the injected volume; the path begins here",
    example='{ inject = "20 uL" }',
    keys=(
        Key("volume", VOLUMES, "injected volume"),
        Key("loop", Sizes(loop_size, (VOLUMES, TUBE_BORES)), "volume that the loop holds, and its bore"),
        Key(
            "filled", Choice(("full", "part"), (("partial", "part"), ("partly", "part"))), "loop filled in full or part"
        ),
        Key(
            "emptied",
            Choice(
                (SAME_WAY, REVERSED),
                (
                    ("same", SAME_WAY),
                    ("same-way", SAME_WAY),
                    ("backwards", REVERSED),
                    ("backflush", REVERSED),
                    ("back-flush", REVERSED),
                    ("other way", REVERSED),
                ),
            ),
            "which way a loop filled in part is emptied: as it was filled, or the other way",
        ),
        Key("bend_radius", BEND_RADIUS.read, "radius at which the loop is bent, all along"),
        Key("coil_diameter", COIL_DIAMETER.read, "diameter of the coil that the loop is wound to"),
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
    curvature, bends = bend(curvature_of(draft))
    if length is None:
        length = must(draft, "volume") / (math.pi / 4 * bore**2)
        check_tolerances(draft, "bore", "volume")
        volumes = tolerance_of(draft, "volume", scaling("length"))
        sizes = (*tolerance_of(draft, "bore", bore_keeping_volume), *volumes)
    else:
        check_tolerances(draft, "bore", "length")
        sizes = _bore_and_length(draft)
    tube = Bore(length, bore, 0.0, curvature, (*bends, *sizes))
    check_bends(draft, _bend_key(draft), (tube,))
    return (tube,)


def _bend_key(draft: Draft) -> str:
    return "bend_radius" if "bend_radius" in draft.values else "coil_diameter"


def _bore_and_length(draft: Draft) -> tuple[Unknown, ...]:
    return (*tolerance_of(draft, "bore", scaling("bore")), *tolerance_of(draft, "length", scaling("length")))


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
        BEND_RADIUS,
        COIL_DIAMETER,
    ),
    ways=(("length", "bore"), ("volume", "bore")),
    size=tube_size,
    elements=_tube,
    sizes={},
)


def _fitting(draft: Draft) -> Elements:
    tanks, remix = draft.number("tanks"), draft.values.get("remix")
    mixes = () if remix is not None else (remixing(),)
    if draft.number("bore") is not None:
        if tanks is not None:
            draft.fault(
                "tanks",
                "tanks for a volume or a gap only",
                "give volume in place of bore and length",
            )
        check_tolerances(draft, "bore", "length")
        unknowns = (*mixes, *_bore_and_length(draft))
        remixed = 0.0 if remix is False else 1.0
        return (Bore(must(draft, "length"), must(draft, "bore"), remixed, 0.0, unknowns, "fitting"),)
    if remix is False:
        draft.fault(
            "remix", "bore and length with it: a volume or a gap mixes the stream", "bore and length, or no remix"
        )
    volume = draft.number("volume")
    if volume is not None and "port" in draft.values:
        draft.fault("port", "gap with it: a volume needs no port", "leave port out")
    if volume is None:
        port = draft.number("port")
        if port is None:
            port = 25.4e-3 / 16
            draft.assume("port 1/16 in", "port of 1/16 in (1.59 mm) around the gap")
        volume = float(dead_gap_volume(port, must(draft, "gap")))
    check_tolerances(draft, "volume")
    sizes = tolerance_of(draft, "volume", scaling("volume"))
    if tanks is None:
        draft.assume("fittings mix fully", "the volume mixes as one stirred tank")
        mixes = (*mixes, mixing_of_volume())
    return (Mixed(volume, tanks or 1.0, "fitting", unknowns=(*mixes, *sizes)),)


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
        Key("remix", YesOrNo(), "whether it mixes the stream across the bore"),
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
    check_tolerances(draft, "volume")
    return (
        Mixed(must(draft, "volume"), tanks or 1.0, "mixer", unknowns=tolerance_of(draft, "volume", scaling("volume"))),
    )


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
    check_tolerances(draft)
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
    check_tolerances(draft)
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
