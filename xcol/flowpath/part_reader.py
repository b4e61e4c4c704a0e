"""One entry of the path -> a part of the instrument."""

from __future__ import annotations

import re
from collections.abc import Callable, Iterable
from typing import Any

from xcol.catalog_records import Record
from xcol.catalogs import Catalogs
from xcol.errors import nearest
from xcol.flowpath import slips
from xcol.flowpath.file_keys import FILE_KEYS, OTHER_WORDS
from xcol.flowpath.findings import Draft, Findings
from xcol.flowpath.keys import Key, Later, Measure, Sizes, Table, Tables, Tolerance, as_typed, tables_in
from xcol.flowpath.kinds import KINDS, KINDS_LATER, Kind
from xcol.flowpath.model import Part, Reading
from xcol.units import UnitError, described, plain, quote

ANY_KIND = (*KINDS, *KINDS_LATER)


def read_part(
    raw: object, position: int, file: str, lines: dict[str, int], findings: Findings, catalogs: Catalogs
) -> tuple[str, Part | None]:
    """Return the entry's kind ("" if unknown) and the part, None where faults were found in it."""
    draft = Draft("", "", position, file, lines, findings, catalogs)
    if not isinstance(raw, dict):
        draft.fault(
            "",
            'a part in braces, { tube = "40 cm x 0.25 mm" }',
            "put the part in { }",
            described(raw),
        )
        return "", None
    kind = _kind_of(raw, draft)
    if kind is None:
        return next((word for word in raw if word in KINDS_LATER), ""), None
    draft.kind = kind.name
    draft.name = _name(raw, kind)
    before = len(findings.faults)
    _read_keys(raw, kind, draft)
    _read_size(raw[kind.name], kind, draft)
    if len(findings.faults) == before:
        slips.of_part(draft)
    if len(findings.faults) > before:
        return kind.name, None
    elements = kind.elements(draft)
    if len(findings.faults) > before:
        return kind.name, None
    return kind.name, Part(
        kind=kind.name,
        name=draft.name,
        position=position,
        place=draft.place(),
        elements=elements,
        readings=tuple(_readings(kind, draft)),
        drop=draft.number("drop"),
        max_pressure=draft.number("max_pressure"),
        max_drop=draft.number("max_drop"),
        temperature=draft.number("temperature"),
    )


def read_keys(raw: dict[str, object], keys: Iterable[Key], draft: Draft) -> None:
    """Read the values of these keys into the draft; faults go to its findings."""
    for key in keys:
        if key.name not in raw:
            continue
        draft.written[key.name] = as_typed(raw[key.name])
        try:
            draft.values[key.name] = key.read(raw[key.name])
        except UnitError as error:
            draft.findings.fault_of(draft.place(key.name), error)
            continue
        if isinstance(key.read, Table):
            draft.inner[key.name] = _inner(key.name, tables_in(raw[key.name])[0], key.read.keys, draft)
        elif isinstance(key.read, Tables):
            draft.lists[key.name] = [
                _inner(f"{key.name}[{number}]", table, key.read.keys, draft)
                for number, table in enumerate(tables_in(raw[key.name]), start=1)
            ]


def _inner(name: str, table: dict[str, object], keys: Iterable[Key], draft: Draft) -> Draft:
    """Return the draft of an inner table, read."""
    inner = draft.table(name)
    read_keys(table, keys, inner)
    refuse_unknown(table, keys, (), inner)
    return inner


def refuse_unknown(raw: dict[str, object], keys: Iterable[Key], others: tuple[str, ...], draft: Draft) -> None:
    """Report what is neither one of the keys nor one of the ``others``, with the nearest that is."""
    named = {key.name: key for key in keys}
    known = (*others, *named)
    for word in raw:
        if word in known:
            continue
        near = OTHER_WORDS.get(word) or OTHER_WORDS.get(word.lower(), "")
        near = near if near in known else nearest(word.lower()[:60], known)
        suggestion = near or "leave it out, or put it into note"
        if word == "drop":  # a measured drop is no limit
            suggestion = "leave it out: this kind of part has none"
        elif word in FILE_KEYS or word == "peaks":
            suggestion = f"move it above the first part: {word} belongs to the file"
        elif near in named and isinstance(named[near].read, Later):
            suggestion = f"{near}, which this version does not compute yet: leave it out"
        elif word.lower() in ("radius", "r") and near == "bore":
            suggestion = "bore, with twice the value: a bore is a diameter"
        listed = ", ".join(w for w in known if w in others or not isinstance(named[w].read, Later))
        shown = plain(word)[:40]
        draft.fault(word, f"one of its keys: {listed}", suggestion, f'the key "{shown}", which is not known here')


def _kind_of(raw: dict[str, object], draft: Draft) -> Kind | None:
    """Return the part's kind, None with a fault where there is not exactly one that is known."""
    found = [word for word in raw if word in ANY_KIND]
    if len(found) == 1 and found[0] in KINDS:
        return KINDS[found[0]]
    if len(found) == 1:
        draft.kind = found[0]
        try:
            Later("leave the part out")(raw[found[0]])
        except UnitError as error:
            draft.findings.fault_of(draft.place(found[0]), error)
        return None
    if found:
        words = " and ".join(f'"{word}"' for word in found)
        draft.fault(
            found[1],
            "one kind of part in each pair of braces",
            "one part a line: " + ", ".join(f"{{ {word} = ... }}" for word in found),
            f"{words} in one part",
        )
        return None
    known = ", ".join(KINDS)
    spoken = [(word, OTHER_WORDS.get(word.lower(), "")) for word in raw]
    guess = next(
        (f'"{kind}" for "{word}"' for word, kind in spoken if kind in ANY_KIND),
        next(
            (f'"{near}" for "{word}"' for word in raw if (near := nearest(word.lower(), ANY_KIND))),
            "",
        ),
    )
    owners = [kind for kind in KINDS.values() for word in raw if any(key.name == word for key in kind.keys)]
    if not guess and len(owners) == 1:
        guess = owners[0].example
    shown = ", ".join(f'"{plain(word)[:30]}"' for word in raw) or "an empty part"
    draft.fault("", f"a part with its kind: {known}", guess or KINDS["tube"].example, shown)
    return None


def _read_keys(raw: dict[str, object], kind: Kind, draft: Draft) -> None:
    read_keys(raw, kind.all_keys, draft)
    refuse_unknown(raw, kind.all_keys, (kind.name,), draft)


def _read_size(raw: object, kind: Kind, draft: Draft) -> None:
    """Read the kind key's value: a size when it reads as one, otherwise the part's name."""
    given = [way for way in kind.ways if all(key in draft.written for key in way)]
    started = {key for way in kind.ways for key in way if key in draft.written}
    draft.written[kind.name] = as_typed(raw)
    if not isinstance(raw, str | int | float) or isinstance(raw, bool) or not as_typed(raw).strip():
        draft.fault(kind.name, f"a size or a name, as in {kind.example}", kind.example, described(raw))
        return
    text = as_typed(raw)
    if not started and _is_row(text, kind, draft, draft.catalogs.own):  # even where it reads as a size
        return
    begins_with_number = text.lstrip(" +-−≈~<>.,")[:1].isdigit()
    sizes, error = _sizes(text, kind)
    if sizes is not None:
        _take_sizes(sizes, started, kind, draft)
        return
    if not started and _is_row(text, kind, draft, draft.catalogs.find):
        return
    if isinstance(raw, str) and (given or not begins_with_number or kind.size is None):
        if draft.name and plain(text) != draft.name and "name" in draft.written:
            draft.warn(f"{quote(text)} is a second name: left out")
        draft.name = draft.name or plain(text)[:60]
        if kind.ways and not given:
            _size_is_missing(started, kind, draft)
        if len(given) > 1:
            ways = " or ".join(" and ".join(way) for way in kind.ways)
            draft.fault("", f"its size once: {ways}", "leave the others out", "more than one size")
        return
    if error is not None:
        suggestion = error.suggestion
        if len(kind.ways) > 1 and not re.search(r"[x×*]\s*[\d.]", text):  # one size where two belong
            others = " or ".join(" and ".join(way) for way in kind.ways)
            suggestion += f"; or a name here, and the size as {others}"
        if not kind.ways:  # a size is not needed, so this may be a name
            suggestion += f', or name = "{text[:40]}" if it is the name'
        draft.findings.fault(draft.place(kind.name), error.read, error.expected, suggestion)


def _sizes(text: str, kind: Kind) -> tuple[dict[str, float] | None, UnitError | None]:
    """Return the sizes that a text reads as, or why it does not (no reason, where the kind has no size)."""
    try:
        return (kind.size(text) if kind.size else None), None
    except UnitError as error:
        return None, error


def _is_row(text: str, kind: Kind, draft: Draft, look_up: Callable[[Any, str], Record | None]) -> bool:
    """Take a part from the catalog's row of that name; return whether there is one."""
    row = look_up(kind.catalog, text) if kind.catalog and kind.of_row else None
    if row is None or kind.of_row is None:
        return False
    draft.row = row
    draft.values |= kind.of_row(row, draft)
    return True


def _take_sizes(sizes: dict[str, float], started: set[str], kind: Kind, draft: Draft) -> None:
    place = draft.place(kind.name)
    text = draft.written[kind.name]
    for name, value in sizes.items():
        if name in draft.written or started:
            other = name if name in draft.written else min(started)
            draft.fault(other, f"the size once: {kind.name} = {quote(text)} has it already", "leave it out")
            continue
        key = kind.key(name)
        try:
            if key and isinstance(key.read, Measure):
                key.read.check(value, text)
        except UnitError as error:
            draft.findings.fault(place, f"{name} in {error.read}", error.expected, error.suggestion)
        draft.values[name] = value


def _size_is_missing(started: set[str], kind: Kind, draft: Draft) -> None:
    ways = ", or ".join(" and ".join(way) for way in kind.ways)
    if draft.has_fault:
        return
    if started:
        missing = sorted({key for way in kind.ways for key in way if way[0] in started} - started)
        read = f"{' and '.join(sorted(started))} alone"
        draft.fault("", f"its size: {ways}", f"add {' and '.join(missing) or ways}", read)
        return
    shown = draft.written[kind.name]
    near = draft.catalogs.near(kind.catalog, shown) if kind.catalog else ""
    suggestion = _size_within(shown, kind) or (f'{kind.name} = "{near}", of the catalog' if near else kind.example)
    draft.fault(kind.name, f"its size: {ways}", suggestion, f"{quote(shown)}, a name, and no size")


def _size_within(text: str, kind: Kind) -> str:
    """Propose to part a size from the name that stands before it, as in "C18 3.0 x 100 mm"."""
    for match in re.finditer(r"(?<=\s)\d", text):
        size, name = text[match.start() :].strip(), text[: match.start()].strip(" ,;")
        try:
            if kind.size:
                kind.size(size)
                return f'{kind.name} = "{size}", name = "{name}"'
        except UnitError:
            continue
    return ""


def _name(raw: dict[str, object], kind: Kind) -> str:
    """Return the part's name, as far as it can be told before its size has been read."""
    given, value = raw.get("name"), raw.get(kind.name)
    if isinstance(given, str) and given.strip():
        return plain(given)[:60]
    if isinstance(value, str) and not value.lstrip(" +-.,")[:1].isdigit():
        return plain(value)[:60]
    return ""


def _readings(kind: Kind, draft: Draft) -> Iterable[Reading]:
    for key in kind.all_keys:
        value = draft.values.get(key.name)
        inner = [draft.inner[key.name]] if key.name in draft.inner else draft.lists.get(key.name, [])
        if inner:
            for number, one in enumerate(inner, start=1):
                shown = ", ".join(
                    typed if word == "filter" else f"{word} {typed}" for word, typed in one.written.items()
                )
                yield Reading(key.name if len(inner) == 1 else f"{key.name} {number}", shown)
        elif isinstance(key.read, Sizes):
            names = (key.name, f"{key.name} bore")
            for name, size, measure in zip(names, draft.sizes(key.name), key.read.measures, strict=False):
                yield Reading(name, size, measure.quantity)
        elif isinstance(key.read, Tolerance) and isinstance(value, float):
            yield Reading(key.name, f"±{100 * value:g} %")
        elif isinstance(value, bool):
            yield Reading(key.name, "true" if value else "false")
        elif key.name != "name" and isinstance(value, float | int | str):
            yield Reading(key.name, value, key.quantity)
