"""What can be wrong with an input, with its place."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass


@dataclass(frozen=True)
class Place:
    """Where in the user's input something stands; empty fields are not known or do not apply."""

    file: str = ""
    line: int | None = None
    part: str = ""
    key: str = ""

    def __str__(self) -> str:
        """Return 'file, line 8, part 2 (tube "to column"), key "tube"', as far as known."""
        pieces = [
            self.file,
            f"line {self.line}" if self.line is not None else "",
            self.part,
            f'key "{self.key}"' if self.key else "",
        ]
        return ", ".join(piece for piece in pieces if piece)


@dataclass(frozen=True)
class Fault:
    """One thing that is wrong: its place, what was read, what was expected, and a suggestion."""

    place: Place
    read: str
    expected: str
    suggestion: str

    def __str__(self) -> str:
        """Return the message in four lines."""
        return f"{self.place}\n  read:      {self.read}\n  expected:  {self.expected}\n  try:       {self.suggestion}"


class InputError(Exception):
    """The input cannot be used; ``faults`` lists everything that was found wrong with it."""

    def __init__(self, faults: tuple[Fault, ...]) -> None:
        super().__init__(faults)
        self.faults = faults

    def __str__(self) -> str:
        """Return all messages, in the order of the input."""
        return "\n\n".join(str(fault) for fault in self.faults)


def refusal(place: Place, read: str, expected: str, suggestion: str) -> InputError:
    """Return the error of one fault."""
    return InputError((Fault(place, read, expected, suggestion),))


def nearest(word: str, known: Iterable[str], alike: float = 0.6) -> str:
    """Return the known word that is closest to this one, or '' where none is ``alike`` enough (0 to 1)."""
    import difflib  # noqa: PLC0415  (only on the way to an error)

    found = difflib.get_close_matches(word, list(known), n=1, cutoff=alike)
    return found[0] if found else ""
