"""Topics as text, JSON, CSV and Markdown."""

from __future__ import annotations

import csv
import io
from typing import TYPE_CHECKING, Any

from xcol import __version__
from xcol.errors import Fault, InputError, Place, nearest
from xcol.flowpath.keys import Key, Later
from xcol.flowpath.kinds import KINDS
from xcol.report.sheet import Grid
from xcol.report.topics import TOPICS, Topic
from xcol.units import quote

if TYPE_CHECKING:
    from xcol.report.sheet import Sheet

SCHEMA = "xcol.explain/1"


def find(word: str | None) -> tuple[Topic, ...]:
    """Return the topic of that name or other word; all topics without a word."""
    if word is None:
        return TOPICS
    asked = _normal(word)
    for topic in TOPICS:
        if asked in (topic.name, f"{topic.name}s"):
            return (topic,)
    for topic in TOPICS:
        if asked in map(_normal, topic.words):
            return (topic,)
    names = tuple(topic.name for topic in TOPICS)
    words = {other: topic.name for topic in TOPICS for other in topic.words}
    near = nearest(asked, (*names, *words))
    fault = Fault(
        Place(key="TOPIC"),
        quote(word),
        f"one of {', '.join(names)}",
        f"xcol explain {words.get(near, near) or 'budget'}",
    )
    raise InputError((fault,))


def _normal(word: str) -> str:
    """Return a word in lower case, with plain spaces and a plain u for both micro signs."""
    return " ".join(word.lower().replace("_", " ").replace("µ", "u").replace("μ", "u").split())


def topics_text(topics: tuple[Topic, ...], sheet: Sheet, *, in_full: bool) -> None:
    """Write topics in full, or as a list of their names."""
    if not in_full:
        sheet.line("Topics of xcol explain TOPIC", "bold")
        for topic in topics:
            sheet.line(f"{topic.name:<13} {topic.title}", indent=2)
        return
    for topic in topics:
        sheet.line(f"{topic.name}: {topic.title}", "bold")
        sheet.line(topic.model)
        sheet.line()
        for line in topic.formula:
            sheet.line(line, indent=4, hang=2)
        sheet.line()
        sheet.line(f"Range: {topic.holds}", hang=2)
        sheet.line(f"Example: {topic.worked()}", hang=2)
        sheet.line(f"Sources: {'; '.join(topic.sources)}", hang=2)
        if kind := KINDS.get(topic.name):
            sheet.line()
            sheet.line(f"In a path file: {kind.example}, {kind.meaning}. Its keys:", hang=2)
            rows = tuple((key.name, key.meaning, _state(key)) for key in kind.all_keys)
            sheet.grid(Grid(("key", "", ""), rows, (False, False, False)), indent=4, flexible=1)


def topics_record(topics: tuple[Topic, ...]) -> dict[str, Any]:
    """Return topics as one JSON object."""
    return {
        "schema": SCHEMA,
        "version": __version__,
        "topics": [
            {
                "name": topic.name,
                "title": topic.title,
                "model": topic.model,
                "formula": list(topic.formula),
                "holds": topic.holds,
                "example": topic.worked(),
                "sources": list(topic.sources),
                "keys": _keys(topic),
            }
            for topic in topics
        ],
    }


def _keys(topic: Topic) -> list[dict[str, Any]]:
    kind = KINDS.get(topic.name)
    keys = kind.all_keys if kind else ()
    return [{"key": key.name, "meaning": key.meaning, "computed": not isinstance(key.read, Later)} for key in keys]


def _state(key: Key) -> str:
    return "not yet" if isinstance(key.read, Later) else ""


def topics_csv(topics: tuple[Topic, ...]) -> str:
    """Return one line a topic, as CSV."""
    out = io.StringIO()
    writer = csv.writer(out, lineterminator="\n")
    writer.writerow(("name", "title", "formula", "holds", "example", "sources"))
    for topic in topics:
        formula, sources = "; ".join(topic.formula), "; ".join(topic.sources)
        row = (topic.name, topic.title, formula, topic.holds, topic.worked(), sources)
        writer.writerow(row)
    return out.getvalue()


def topics_markdown(topics: tuple[Topic, ...]) -> str:
    """Return topics in Markdown."""
    pieces = []
    for topic in topics:
        pieces += [f"# {topic.title} ({topic.name})\n", topic.model + "\n"]
        pieces.append("\n".join(f"    {line}" for line in topic.formula) + "\n")
        pieces += [f"Range: {topic.holds}\n", f"Example: {topic.worked()}\n"]
        pieces.append(f"Sources: {'; '.join(topic.sources)}\n")
    return "\n".join(pieces)
