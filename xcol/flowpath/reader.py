"""A path file -> the described instrument, or everything that is wrong with the file at once."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import replace
from pathlib import Path
from typing import TYPE_CHECKING, Any

from xcol.errors import InputError, Place
from xcol.flowpath import slips
from xcol.flowpath.bed import Bed
from xcol.flowpath.catalog_files import read_catalogs
from xcol.flowpath.conditions import Conditions, check_range, density_of, read_conditions
from xcol.flowpath.elements import Bore, Cell, Injected, Loop
from xcol.flowpath.file_keys import FILE_KEYS, curvature_of
from xcol.flowpath.findings import Draft, Findings
from xcol.flowpath.kinds.tolerances import bend, check_bends
from xcol.flowpath.locate import KeyLines, key_lines
from xcol.flowpath.model import Assumption, Instrument, Part, Peak
from xcol.flowpath.part_reader import read_keys, read_part, refuse_unknown
from xcol.flowpath.peak_diffusion import solute_of
from xcol.flowpath.peak_reader import check_diffusion, check_positions, estimates_of, peaks_of, read_peaks
from xcol.flowpath.source import read_text
from xcol.flowpath.toml_text import load
from xcol.flowpath.unknowns import BEND
from xcol.units import VISCOSITY, described, write

if TYPE_CHECKING:
    from xcol.catalogs import Catalogs
    from xcol.flowpath.elements import Element
    from xcol.liquids.estimate import Estimate

MOST_PARTS = 100


def read(name: str, catalogs: Iterable[str] = ()) -> Instrument:
    """Read a path file ("-": standard input), with catalog files of the user's own.

    Raises ``InputError`` with every fault that was found, each with its place.
    """
    return parse(read_text(name), "standard input" if name == "-" else name, catalogs)


def parse(text: str, file: str, catalogs: Iterable[str] = ()) -> Instrument:
    """Read the text of a path file; ``file`` is its name in messages, and names its folder.

    ``catalogs`` are names of catalog files, whose rows stand before those that the file names itself.
    """
    findings = Findings()
    data, mended, faults = load(text, file)
    findings.faults += faults
    if data is None:
        raise InputError(tuple(faults))
    lines = KeyLines(key_lines(mended))

    top = Draft("file", "", 0, file, lines.of(), findings)
    read_keys(data, FILE_KEYS.values(), top)
    refuse_unknown(data, FILE_KEYS.values(), ("path", "peaks"), top)
    beside = [str(Path(file).parent / name) for name in top.texts("catalogs")]
    before = len(findings.faults)
    top.catalogs = read_catalogs([*beside, *catalogs], findings)
    if len(findings.faults) > before:  # what a catalog lacks would be missed all over the path
        findings.raise_faults()
    if "flow" not in data:
        _report_missing_flow(data, file, lines, findings)

    kinds, parts = _read_path(data, file, lines, findings, top.catalogs)
    drafts = read_peaks(data.get("peaks"), file, lines, findings, top.catalogs)
    check_positions(drafts, "column" in kinds or not kinds)
    check_diffusion(drafts, data.get("peaks") not in (None, []), top)
    conditions = read_conditions(top, "column" in kinds).with_columns(parts)
    slips.of_temperatures(conditions, parts, findings)
    estimates = _estimates(conditions, parts, drafts, top)
    flow = top.number("flow")
    if flow is not None and findings.faults:  # what can be told all the same
        slips.flow_in_columns(flow, parts, top.place("flow"), findings)
    findings.raise_faults()
    if conditions.phase is not None:
        slips.of_materials(parts, conditions.phase, top.catalogs, findings)
    if (curvature := curvature_of(top)) is not None:
        parts = [_bent(part, curvature) for part in parts]
        key = "bend_radius" if "bend_radius" in top.values else "coil_diameter"
        check_bends(top, key, [element for part in parts for element in part.elements])
    findings.raise_faults()
    instrument = _instrument(top, conditions, [conditions.applied_to(part) for part in parts])
    return _with_peaks(instrument, drafts, estimates, top)


def _estimates(conditions: Conditions, parts: list[Part], drafts: list[Draft], top: Draft) -> list[Estimate | None]:
    """Return the peaks' diffusion coefficients; none of them where the liquid is not known at a temperature."""
    places = {conditions.temperature: top.place("temperature"), conditions.ambient: top.place("ambient")}
    places |= {part.temperature: part.place for part in parts if part.temperature is not None}
    phase = conditions.phase if conditions.entered is None else None
    known = [
        check_range(phase, temperature, place, top.findings)
        for temperature, place in places.items()
        if phase is not None and temperature is not None
    ]
    wanted = "mobile_phase" not in top.written or conditions.phase is not None  # or the fault is there already
    if all(known) and wanted:
        return estimates_of(drafts, top, conditions)
    for draft in drafts:  # what can be told all the same
        if "solute" in draft.values:
            solute_of(draft)
    return []


def _report_missing_flow(data: dict[str, Any], file: str, lines: KeyLines, findings: Findings) -> None:
    """Report that there is no flow, or where it has gone: below a header that took it."""
    if any(isinstance(table, dict) and "flow" in table for table in data.values()):
        return  # the header is reported as what is wrong
    for index, entry in enumerate(_list(data.get("path"))):
        if isinstance(entry, dict) and "flow" in entry:
            place = Place(file, lines.line(("path", index, "flow")), "", "flow")
            findings.fault(place, "flow inside a part", "flow above the parts", "move it above the first part")
            return
    findings.fault(Place(file, None, "", "flow"), "nothing", "the flow rate", 'flow = "1.0 mL/min"')


def _list(value: object) -> list[Any]:
    return value if isinstance(value, list) else []


def _instrument(top: Draft, conditions: Conditions, parts: list[Part]) -> Instrument:
    return Instrument(
        title=top.text("title") or "",
        flow=top.number("flow") or 0.0,
        mobile_phase=conditions.phase.name if conditions.phase else "",
        viscosity=conditions.viscosity,
        density=density_of(top, conditions),
        temperature=conditions.known,
        pump_pressure=top.number("pump_pressure"),
        bend_radius=1 / curvature if (curvature := curvature_of(top)) else None,
        parts=tuple(parts),
        peaks=(),
        place=Place(top.file),
        files=(top.file, *(str(Path(top.file).parent / name) for name in top.texts("catalogs"))),
    )


def _with_peaks(
    instrument: Instrument, drafts: list[Draft], estimates: list[Estimate | None], top: Draft
) -> Instrument:
    findings = top.findings
    _notes_on_names(instrument, findings)
    slips.of_path(instrument, top.place("flow"), findings)
    peaks = peaks_of(drafts, instrument, estimates, findings)
    _warn_of_twins([peak.name for peak in peaks], "peaks", findings)
    _notes_on_beds(instrument, findings)
    slips.of_scaled_plates(instrument, peaks, findings)
    _notes_on_liquid(instrument, peaks, findings)
    findings.raise_faults()
    return replace(
        instrument,
        peaks=peaks,
        assumed=(
            *(found for found in findings.assumed if found.leads),
            *_ends_of_ranges(instrument),
            *(found for found in findings.assumed if not found.leads),
        ),
        warnings=tuple(findings.warnings),
    )


def _notes_on_liquid(instrument: Instrument, peaks: tuple[Peak, ...], findings: Findings) -> None:
    """Say which numbers are the user's own, and which come from the mobile phase."""
    viscosity = instrument.viscosity
    if viscosity is not None and not viscosity.entered:
        shown = write(viscosity.value, "mPa s", VISCOSITY)
        findings.assume("viscosity computed", f"viscosity {shown}: {viscosity.stated}", leads=True)
    if instrument.temperature is None and any(not peak.estimate.entered for peak in peaks):
        findings.assume("temperature 25 degC", "no temperature entered: D estimated at 25 °C", leads=True)
    typed = {
        "viscosity": viscosity is not None and viscosity.entered,
        "diffusion coefficients": any(peak.estimate.entered for peak in peaks),
    }
    own = [name for name, is_own in typed.items() if is_own]
    if own:
        short = " and ".join(own).replace("diffusion coefficients", "D")
        verb = "is" if own == ["viscosity"] else "are"
        findings.assume(f"{short} as entered", f"{' and '.join(own)} {verb} taken as entered, at whatever temperature")


def _notes_on_names(instrument: Instrument, findings: Findings) -> None:
    _warn_of_twins([part.name for part in instrument.detectors if part.name], "detectors", findings)
    for part in instrument.detectors:
        if not any(isinstance(element, Cell) for element in part.elements):
            findings.assume("no cell", f"{part.label}: no cell entered, none counted")


def _warn_of_twins(names: list[str], what: str, findings: Findings) -> None:
    lower = [name.lower() for name in names]
    for name in dict.fromkeys(name for name in names if lower.count(name.lower()) > 1):
        option = what.removesuffix("s")
        findings.warn(f'{lower.count(name.lower())} {what} have the name "{name}": --{option} finds the first')
        return


def _notes_on_beds(instrument: Instrument, findings: Findings) -> None:
    """Say what the columns' pressure drops rest on, where they are computed at all."""
    for part in instrument.parts:
        for bed in part.elements:
            if not isinstance(bed, Bed) or part.drop is not None or instrument.pump_pressure is not None:
                continue
            if bed.particle is None:
                findings.warn(
                    f"{part.label}: no particle size: its pressure drop is not computed (enter it, or a measured drop)"
                )
            elif bed.porosity_is_assumed and instrument.viscosity is not None:
                value, low, high = bed.porosity
                findings.assume(
                    f"bed {value:g}",
                    f"{part.label}: interstitial porosity {value:g} ({low:g} to {high:g}), for the pressure "
                    f"drop only; {bed.porosity_from}",
                )


def _bent(part: Part, curvature: float) -> Part:
    """Return a tube or a loop that has the file's own bend where it gives none itself."""
    if part.kind not in ("tube", "inject"):
        return part

    def bent(element: Element) -> Element:
        drawn = [unknown for unknown in element.unknowns if unknown.what == BEND and unknown.spread is not None]
        if not isinstance(element, Bore | Loop) or not drawn:
            return element
        rest = (unknown for unknown in element.unknowns if unknown.what != BEND)
        entered, bends = bend(curvature)
        return replace(element, curvature=entered, unknowns=(*bends, *rest))

    return replace(part, elements=tuple(bent(element) for element in part.elements))


def _ends_of_ranges(instrument: Instrument) -> list[Assumption]:
    """Return at which end of their range injection and tubes are printed."""
    found = []
    elements = [element for part in instrument.parts for element in part.elements]
    tubes = [element for element in elements if isinstance(element, Bore | Loop)]
    unknowns = [unknown for tube in tubes for unknown in tube.unknowns]
    if tubes and instrument.viscosity is None:
        found.append(Assumption("tubes straight", "tubes are straight: without a viscosity bends are not computed"))
    elif any(unknown.what == BEND and unknown.spread is not None for unknown in unknowns):
        text = (
            "tubes without bend_radius are printed as straight, the worst case; their range goes to a bend of 3 cm all "
            "along, and the draws take any curvature between"
        )
        found.append(Assumption("tubes straight", text))
    if instrument.viscosity is not None and any(tube.curvature for tube in tubes):
        text = (
            "tubes with bend_radius or coil_diameter are bent like that all along, as theory has it; their range goes "
            "to straight: measured coils have 20 to 40 % less (J. Chromatogr. A 1659 (2021) 462578, abstract)"
        )
        found.append(Assumption("tubes bent all along", text))
    injected = instrument.parts[instrument.injection - 1].elements[0]
    if isinstance(injected, Injected):
        text = "the injection is printed as a plug, the best case; its range goes to V²/4"
        has_range = any(unknown.ends for unknown in injected.unknowns)
        found.append(Assumption("injection a plug", text if has_range else "the injection is a plug"))
    elif isinstance(injected, Loop) and injected.injected is None:
        found.append(Assumption("loop washed out", "the loop is full, and is washed out through its own bore"))
    elif isinstance(injected, Loop):
        way = "the same way, through the rest of the loop" if injected.same_way else "the other way, as a plug"
        found.append(Assumption("loop filled in part", f"the loop is filled in part, and emptied {way}"))
    return found


def _read_path(
    data: dict[str, Any], file: str, lines: KeyLines, findings: Findings, catalogs: Catalogs
) -> tuple[list[str], list[Part]]:
    """Return the kinds of all entries, in order, and the parts that could be read."""
    entries = data.get("path")
    place = Place(file, lines.line(("path",)), "", "path")
    if entries is None:
        under = next((k for k, v in data.items() if isinstance(v, dict) and "path" in v), None)
        if under:
            move = f"move path above [{under}], or write {under} = {{ ... }} on one line"
            findings.fault(
                Place(file, lines.line((under, "path")), "", "path"),
                f"path under the header [{under}], which takes all keys below it",
                "path above the first [header]",
                move if under in FILE_KEYS else f"delete the header [{under}]",
            )
        elif not any(word.lower() in ("path", "paths", "part", "parts") for word in data):
            example = 'path = [ { inject = "20 uL" }, { column = ... }, { detector = "UV" } ]'
            findings.fault(place, "nothing", "the parts in order of flow", example)
        return [], []
    if not isinstance(entries, list):
        example = (
            "[[path]], with two brackets, above each part"
            if isinstance(entries, dict)
            else ("path = [ { ... }, { ... } ]")
        )
        findings.fault(place, described(entries), "a list of parts", example)
        return [], []
    if len(entries) > MOST_PARTS:
        findings.fault(place, f"{len(entries)} parts", f"at most {MOST_PARTS}", "fewer parts")
        return [], []
    found = [
        read_part(entry, index + 1, file, lines.of("path", index), findings, catalogs)
        for index, entry in enumerate(entries)
    ]
    kinds = [kind for kind, _ in found]
    _check_kinds(kinds, entries, place, lines, findings)
    return kinds, [part for _, part in found if part is not None]


def _check_kinds(kinds: list[str], entries: list[Any], place: Place, lines: KeyLines, findings: Findings) -> None:
    """Report a path without injection or detector, and a second injection.

    An entry whose kind is not known might be the one that is missed, so nothing is said then.
    """
    if "" not in kinds:
        for kind, example in (
            ("inject", 'begin with { inject = "20 uL" }'),
            ("detector", 'add { detector = "UV", cell = "10 uL", time_constant = "0.1 s" }'),
        ):
            if kind not in kinds:
                what = "an injection" if kind == "inject" else "a detector"
                read = f"{len(entries)} parts, and no {kind}" if entries else "an empty list"
                findings.fault(place, read, f"{what} in the path", example)
    for index, kind in enumerate(kinds):
        if kind == "inject" and "inject" in kinds[:index]:
            where = Place(place.file, lines.line(("path", index)), f"part {index + 1} (inject)", "inject")
            findings.fault(where, "a second injection", "one injection", "leave one of them out")
    if "inject" in kinds and "detector" in kinds:
        last = len(kinds) - 1 - kinds[::-1].index("detector")
        first = kinds.index("inject")
        if last < first:
            findings.fault(place, "all detectors before the injection", "parts in order of flow",
                           "begin with the injection")  # fmt: skip
        for index, kind in enumerate(kinds if first < last else []):
            if kind == "column" and not first < index < last:
                where = Place(place.file, lines.line(("path", index)), f"part {index + 1} (column)")
                findings.fault(where, "a column that is not between injection and last detector",
                               "parts in order of flow", "move it between them")  # fmt: skip
