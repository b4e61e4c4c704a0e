"""The text of a path file, or a clear word on why there is none."""

from __future__ import annotations

import sys
from pathlib import Path

from xcol.errors import InputError, Place, nearest, refusal

MOST_BYTES = 1_000_000  # a path file has a few thousand

_UTF16 = (b"\xff\xfe", b"\xfe\xff")


def read_text(name: str, what: str = "a path file", begin: str = 'begin with flow = "1.0 mL/min"') -> str:
    """Return the text of a file ("-": standard input), line ends as \\n, without a byte order mark.

    ``what`` it should be, and how such a file begins, are for messages. Raises ``InputError`` for what
    cannot be one: missing, a directory, unreadable, empty,
    larger than 1 MB, binary, or not UTF-8.
    """
    place = Place(file="standard input" if name == "-" else name)
    data = _bytes(name, place, what)
    if len(data) > MOST_BYTES:
        raise refusal(place, "more than 1 MB", f"{what} of a few kB", f"the name of {what}")
    if data.startswith(_UTF16):
        raise refusal(place, "text in UTF-16", "text in UTF-8", "save it again, with the encoding UTF-8")
    if zeros := data.count(b"\x00"):
        raise _with_zeros(data, zeros, place, what)
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        raise refusal(
            Place(place.file, line),
            f"the byte {data[error.start]:#04x}, which is not UTF-8",
            "text in UTF-8",
            "save it again, with the encoding UTF-8 (a µ or ° is the usual cause)",
        ) from None
    if not text.strip():
        raise refusal(place, "an empty file", what, begin)
    return text.replace("\r\n", "\n").replace("\r", "\n")


def _with_zeros(data: bytes, zeros: int, place: Place, what: str) -> InputError:
    """Return the refusal of a text in UTF-16 without its mark, a stray zero byte, or a binary file."""
    if zeros > 0.4 * len(data):
        return refusal(
            place,
            "text in UTF-16, or no text at all",
            "text in UTF-8",
            "save it again, with the encoding UTF-8",
        )
    if all(byte >= 32 or byte in b"\t\r\n\x00" for byte in data):
        line = data.count(b"\n", 0, data.index(b"\x00")) + 1
        return refusal(Place(place.file, line), "a zero byte", "text", "type the line anew")
    return refusal(place, "a binary file", f"{what}: text in TOML", f"the name of {what}")


def _bytes(name: str, place: Place, what: str) -> bytes:
    if name == "-":
        if sys.stdin is None:
            raise refusal(place, "nothing: it is closed", what, f"the name of {what}")
        return sys.stdin.buffer.read(MOST_BYTES + 1)
    path = Path(name)
    if not name.strip():
        raise refusal(Place("(no name)"), "an empty name", f"the name of {what}", f"the name of {what}")
    try:
        if path.is_dir():
            raise refusal(place, "a directory", what, _files_in(path) or f"the name of {what}")
        with path.open("rb") as stream:
            return stream.read(MOST_BYTES + 1)
    except FileNotFoundError:
        near = _near(path)
        raise refusal(place, "no such file", what, near or "check the name") from None
    except (OSError, ValueError) as error:
        words = error.strerror if isinstance(error, OSError) and error.strerror else str(error)
        raise refusal(place, words.lower(), "a file that can be read", "check name and rights") from None


def _files_in(folder: Path) -> str:
    found = sorted(path.name for path in folder.glob("*.toml"))[:3]
    return "one of its files: " + ", ".join(found) if found else ""


def _near(path: Path) -> str:
    try:
        names = tuple(entry.name for entry in path.parent.iterdir())
    except OSError:
        return ""
    near = nearest(path.name, names)
    return str(path.with_name(near)) if near else ""
