"""TOML's own complaints, translated for people who write a path file once a month.

The standard reader stops at the first complaint. Where the slip is a known one it is noted, mended
in memory (never in the file), and reading goes on, so that all faults of a file come together.
"""

from __future__ import annotations

import re
import tomllib
from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from xcol.errors import Fault, Place
from xcol.units import quote

MOST_MENDED = 50

_CURLY = "“”„‟‘’‚‛«»"
_AT = re.compile(r"\(at line (\d+), column (\d+)\)")
_BLANK = re.compile(r"[ \t]*(?:#[^\n]*)?")
_SPACED_KEY = re.compile(r"[A-Za-z]\w*(?:[ \t]+[A-Za-z]\w*)+(?=[ \t]*=)")
_KEY_AND_EQUALS = re.compile(r"[ \t]*[A-Za-z_][\w-]*[ \t]*=")


@dataclass(frozen=True)
class _Slip:
    """What the translation says of a slip, and the text without it (None: cannot be mended)."""

    read: str
    expected: str
    suggestion: str
    mended: str | None
    at: int


@dataclass(frozen=True)
class _Spot:
    """The place of a complaint: the text, the offset in it, and the reader's own words."""

    text: str
    at: int
    message: str

    @property
    def char(self) -> str:
        return self.text[self.at : self.at + 1]

    @property
    def start(self) -> int:
        """Offset of the line's first character."""
        return self.text.rfind("\n", 0, self.at) + 1

    @property
    def end(self) -> int:
        """Offset of the line's end."""
        found = self.text.find("\n", self.at)
        return len(self.text) if found < 0 else found

    @property
    def line(self) -> str:
        return self.text[self.start : self.end]

    @property
    def in_part(self) -> bool:
        """Whether a '{' is open on this line before the place."""
        before = self.text[self.start : self.at]
        return before.count("{") > before.count("}")

    def replaced(self, start: int, end: int, new: str) -> str:
        return self.text[:start] + new + self.text[end:]


def load(text: str, file: str) -> tuple[dict[str, Any] | None, str, list[Fault]]:
    """Parse a TOML text.

    Returns the data (None where nothing could be made of it), the text that was parsed, which has
    the lines of the original, and the faults found in its TOML.
    """
    faults: list[Fault] = []
    for _ in range(MOST_MENDED):
        try:
            return tomllib.loads(text), text, faults
        except RecursionError:
            read, expected = "lists in lists, very deep", "a list of parts, one level deep"
            faults.append(Fault(Place(file), read, expected, "path = [ { inject = ... }, ... ]"))
            return None, text, faults
        except tomllib.TOMLDecodeError as error:
            spot = _spot(text, str(error))
        except ValueError:  # a whole number of more digits than Python reads
            faults.append(_too_many_digits(text, file))
            return None, text, faults
        slip = next((found for rule in _RULES if (found := rule(spot))), None) or _unknown(spot)
        line = text.count("\n", 0, min(slip.at, max(len(text.rstrip()) - 1, 0))) + 1
        faults.append(Fault(Place(file, line), slip.read, slip.expected, slip.suggestion))
        if slip.mended is None or slip.mended == text:
            return None, text, faults
        text = slip.mended
    return None, text, faults


def _too_many_digits(text: str, file: str) -> Fault:
    longest = max(re.finditer(r"\d+", text), key=lambda match: len(match[0]))
    place = Place(file, text.count("\n", 0, longest.start()) + 1)
    return Fault(place, f"a number of {len(longest[0])} digits", "a number", "fewer digits")


def _spot(text: str, message: str) -> _Spot:
    match = _AT.search(message)
    if not match:
        return _Spot(text, len(text), message)
    start = 0
    for _ in range(int(match[1]) - 1):
        start = text.find("\n", start) + 1
    return _Spot(text, min(start + int(match[2]) - 1, len(text)), message)


def _curly_quotes(spot: _Spot) -> _Slip | None:
    if spot.char not in _CURLY or not spot.char:
        return None
    straight = re.sub(f"[{_CURLY}]", '"', spot.line)
    return _Slip(
        f"{quote(spot.line)}, with typographic quotes",
        'straight quotes, "..."',
        straight.strip(),
        spot.replaced(spot.start, spot.end, straight),
        spot.at,
    )


def _end_of_document(spot: _Spot) -> _Slip | None:
    if "(at end of document)" not in spot.message or not spot.message.startswith(
        ("Invalid value", "Unclosed", "Invalid initial character")
    ):
        return None
    tail = spot.text.rstrip()
    last_line = tail[tail.rfind("\n") + 1 :]
    closing = "} ]" if last_line.count("{") > last_line.count("}") else "]"
    return _Slip(
        "the end of the file, inside a list or a part",
        f'the closing "{closing}"',
        f'"{closing}" at the end',
        tail + closing,
        len(tail),
    )


def _broken_part(spot: _Spot) -> _Slip | None:
    """A part that goes on on the next line, or that lacks its closing brace."""
    if not spot.in_part or not _inside_table(spot):
        return None
    after = _BLANK.match(spot.text, spot.at)
    stop = after.end() if after else spot.at
    if spot.text[stop : stop + 1] not in ("\n", "\r"):
        return None
    following = spot.text[stop:].lstrip()
    shown = quote(spot.line)
    if not re.match(r"[A-Za-z_][\w-]*[ \t]*=(?!=)|\}|,", following) or not _closes(following):
        body = spot.line[: stop - spot.start].rstrip().rstrip(",")
        return _Slip(
            f'{shown}, a part without its closing "}}"',
            'a part between "{" and "}"',
            f"{body.strip()} }},",
            spot.replaced(spot.start, stop, f"{body} }},"),
            spot.at,
        )
    close = spot.text.find("}", stop)
    lines = spot.text[stop:close].count("\n")
    # joined here, with the line breaks put behind it, so that the lines below keep their numbers
    comment = re.sub(r"#[^\n]*", "", spot.text[spot.at : close])
    joined = spot.text[: spot.at] + re.sub(r"\s*\n\s*", " ", comment) + "}"
    rest = spot.text[close + 1 :]
    comma = "," if rest.lstrip(" \t").startswith(",") else ""
    rest = rest.lstrip(" \t")[1:] if comma else rest
    return _Slip(
        f"{shown}, a part that goes on on the next line",
        'a part on one line, from "{" to "}"',
        "join the lines (or write the part as a [[path]] table, one key a line)",
        joined + comma + "\n" * lines + rest,
        spot.at,
    )


def _closes(following: str) -> bool:
    close, opening = following.find("}"), following.find("{")
    return close >= 0 and (opening < 0 or close < opening)


def _comma_before_brace(spot: _Spot) -> _Slip | None:
    comma = spot.text.rfind(",", 0, spot.at)
    if spot.char != "}" or comma < 0 or spot.text[comma + 1 : spot.at].strip():
        return None
    return _Slip(
        f'{quote(spot.line)}, a comma before "}}"',
        'no comma before "}"',
        (spot.text[spot.start : comma] + spot.text[comma + 1 : spot.end]).strip(),
        spot.replaced(comma, comma + 1, " "),
        spot.at,
    )


def _missing_comma_between_parts(spot: _Spot) -> _Slip | None:
    if not spot.message.startswith("Unclosed array") or spot.char not in '{;"':
        return None
    before = len(spot.text[: spot.at].rstrip())
    if spot.char == ";":
        mended = spot.replaced(spot.at, spot.at + 1, ",")
    else:
        comment = spot.text.rfind("#", spot.text.rfind("\n", 0, before) + 1, before)
        if comment >= 0 and spot.text[comment:before].count('"') == 0:
            before = len(spot.text[:comment].rstrip())
        mended = spot.replaced(before, before, ",")
    line_start = spot.text.rfind("\n", 0, before) + 1
    line_end = spot.text.find("\n", before)
    shown = spot.text[line_start : line_end if line_end >= 0 else len(spot.text)]
    return _Slip(
        f"{quote(shown)}, without a comma behind it",
        "a comma between two parts",
        f"{spot.text[line_start:before].strip()},",
        mended,
        before - 1,
    )


def _foreign_sign(spot: _Spot) -> _Slip | None:
    """A comment in the manner of other formats, or a space that is none."""
    if spot.char == "\u00a0":
        line = spot.line.replace("\u00a0", " ")
        mended = spot.replaced(spot.start, spot.end, line)
        read, expected = f"{quote(spot.line)}, with a no-break space", "plain spaces between words"
        return _Slip(read, expected, "type the space anew", mended, spot.at)
    before = spot.text[spot.start : spot.at]
    if not (spot.text.startswith("//", spot.at) or (spot.char == ";" and not before.strip())):
        return None
    length = 2 if spot.char == "/" else 1
    return _Slip(
        f"{quote(spot.line)}, a comment that does not begin with #",
        "comments that begin with #",
        f"# {spot.text[spot.at + length : spot.end].strip()}",
        spot.replaced(spot.at, spot.at + length, "#"),
        spot.at,
    )


def _open_list(spot: _Spot) -> _Slip | None:
    """A new statement where the list before it has not ended, or a part without its opening brace."""
    if not spot.message.startswith(("Invalid value", "Unclosed array")):
        return None
    if spot.text[spot.start : spot.at].strip() or not (_KEY_AND_EQUALS.match(spot.line) or spot.char == "["):
        return None
    if re.search(r"\}\s*,?\s*(?:#.*)?$", spot.line) and spot.line.count("{") < spot.line.count("}"):
        return _Slip(
            f'{quote(spot.line)}, a part without its opening "{{"',
            'a part between "{" and "}"',
            f"{{ {spot.line.strip()}",
            spot.replaced(spot.at, spot.at, "{ "),
            spot.at,
        )
    before = len(spot.text[: spot.start].rstrip())
    return _Slip(
        f"{quote(spot.line)}, inside a list that has not ended",
        'the closing "]" of the list before it',
        'a line with "]" above it',
        spot.replaced(before, before, "]"),
        spot.at,
    )


def _missing_comma_in_part(spot: _Spot) -> _Slip | None:
    before = spot.text[spot.start : spot.at].rstrip()
    if not _inside_table(spot) or not before.endswith(('"', "'")):
        return None
    if not _KEY_AND_EQUALS.match(spot.text, spot.at):
        return None
    mended = spot.replaced(spot.start + len(before), spot.start + len(before), ",")
    fixed = before + "," + spot.text[spot.start + len(before) : spot.end]
    return _Slip(
        f"{quote(spot.line)}, without a comma between two keys",
        "a comma between two keys",
        fixed.strip(),
        mended,
        spot.at,
    )


def _value_without_quotes(spot: _Spot) -> _Slip | None:
    before = spot.text[spot.start : min(spot.at + 1, spot.end)]
    equals = before.rfind("=")
    if equals < 0 or not re.match(r"\s*[\w.+<>~-]", spot.text[spot.start + equals + 1 : spot.end]):
        return None
    begin = spot.start + equals + 1
    line_rest = spot.text[begin : spot.end]
    in_part = before[:equals].count("{") > before[:equals].count("}")
    ending = re.search(r"\s*(?:,\s*[A-Za-z_]\w*\s*=|,\s*$|\}|#|$)" if in_part else r"\s*(?:#|$)", line_rest)
    value = line_rest[: ending.start() if ending else len(line_rest)].strip()
    if not value or '"' in value or "'" in value:
        return None
    stop = begin + line_rest.index(value) + len(value)
    return _Slip(
        f"{quote(value)}, without quotes",
        "a value with a unit, or a text, in quotes",
        f'{_key_before(before, equals)} = "{value}"',
        spot.replaced(begin, stop, f' "{value}"'),
        spot.at,
    )


def _open_string(spot: _Spot) -> _Slip | None:
    if not spot.message.startswith(("Illegal character '\\n'", "Illegal character '\\r'")):
        return None
    body = re.sub(r"\s*(?:\}\s*,?|,)?\s*$", "", spot.line)
    return _Slip(
        f"{quote(spot.line)}, a text without its closing quote",
        'a text between two quotes, "..."',
        f'{body.strip()}"{spot.line[len(body) :].rstrip()}',
        spot.replaced(spot.start + len(body), spot.start + len(body), '"'),
        spot.at,
    )


def _no_equals(spot: _Spot) -> _Slip | None:
    if not spot.message.startswith("Expected '=' after a key"):
        return None
    if spot.char in ":\"'":
        new = "=" if spot.char == ":" else "= "
        mended = spot.replaced(spot.at, spot.at + (spot.char == ":"), new)
    elif spaced := next(
        (m for m in _SPACED_KEY.finditer(spot.line) if m.start() <= spot.at - spot.start <= m.end()), None
    ):
        start = spot.start + spaced.start()
        mended = spot.replaced(start, start + len(spaced[0]), re.sub(r"[ \t]+", "_", spaced[0]))
    else:
        return None
    fixed = mended[spot.start :].split("\n", 1)[0]
    return _Slip(quote(spot.line), "key = value, the key in one word", fixed.strip(), mended, spot.at)


def _given_twice(spot: _Spot) -> _Slip | None:
    if not spot.message.startswith(
        ("Cannot overwrite", "Duplicate", "Cannot mutate", "Cannot declare", "Cannot redefine")
    ):
        return None
    mended = None
    if not spot.in_part and _KEY_AND_EQUALS.match(spot.line):
        mended = spot.replaced(spot.start, spot.start, "#")
    return _Slip(
        f"{quote(spot.line)}, a key or table that was given before",
        "each key once (and the parts either in path = [...] or as [[path]] tables)",
        "leave one of them out",
        mended,
        spot.at - 1,
    )


def _backslash(spot: _Spot) -> _Slip | None:
    if "\\" not in spot.message or "\\" not in spot.line:
        return None
    fixed = spot.line.replace("\\", "/")
    return _Slip(
        f"{quote(spot.line)}, with a backslash",
        "a text without backslashes",
        fixed.strip(),
        spot.replaced(spot.start, spot.end, fixed),
        spot.at,
    )


def _unknown(spot: _Spot) -> _Slip:
    words = _AT.sub("", spot.message.splitlines()[0]).strip()
    if spot.line.count('"') % 2:
        return _Slip(
            f"{quote(spot.line)}, with an odd number of quotes",
            'each text between two quotes, "..."',
            "look for the text that lacks one",
            None,
            spot.at,
        )
    return _Slip(
        quote(spot.line) if spot.line.strip() else "the end of the file",
        "lines of TOML: key = value, lists in [ ], parts in { }",
        f"look at this line and the one above it ({words[:1].lower()}{words[1:]})",
        None,
        spot.at,
    )


def _inside_table(spot: _Spot) -> bool:
    return spot.message.startswith(
        ("Unclosed inline table", "Invalid initial character for a key part", "Expected '='")
    )


def _key_before(before: str, equals: int) -> str:
    match = re.search(r"([\w-]+)\s*$", before[:equals])
    return match[1] if match else "key"


_RULES: tuple[Callable[[_Spot], _Slip | None], ...] = (
    _curly_quotes,
    _foreign_sign,
    _end_of_document,
    _open_string,
    _comma_before_brace,
    _broken_part,
    _missing_comma_between_parts,
    _open_list,
    _missing_comma_in_part,
    _given_twice,
    _backslash,
    _value_without_quotes,
    _no_equals,
)
