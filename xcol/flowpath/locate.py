"""Where in a TOML text each key stands: the standard reader gives values without their lines."""

from __future__ import annotations

import re
from bisect import bisect_right

Path = tuple[str | int, ...]

_BLANK = re.compile(r"(?:[ \t\r\n]+|#[^\n]*)*")
_BARE_KEY = re.compile(r"[A-Za-z0-9_-]+")
_PLAIN_VALUE = re.compile(r"[^,\]}\n#]*")
_STRINGS = (
    re.compile(r'"""(?:\\.|[^\\])*?"""(?:"{0,2})', re.S),
    re.compile(r"'''.*?'''(?:'{0,2})", re.S),
    re.compile(r'"(?:\\.|[^"\\\n])*"'),
    re.compile(r"'[^'\n]*'"),
)


def key_lines(text: str) -> dict[Path, int]:
    """Return the 1-based line of every key and list entry of a **valid** TOML text.

    >>> key_lines('flow = "1 mL/min"\\npath = [\\n  { inject = "20 uL" },\\n]')[("path", 0, "inject")]
    3
    """
    return _Scan(text).lines


class KeyLines:
    """The lines of a file's keys, looked up by path."""

    def __init__(self, lines: dict[Path, int]) -> None:
        self._lines = lines

    def line(self, path: Path) -> int | None:
        """Return the line of one key, None where it is not in the file."""
        return self._lines.get(path)

    def of(self, *path: str | int) -> dict[str, int]:
        """Return the lines of the keys right below a path, and its own as ""."""
        depth = len(path)
        found = {
            str(key[depth]): line for key, line in self._lines.items() if len(key) == depth + 1 and key[:depth] == path
        }
        if path in self._lines:
            found[""] = self._lines[path]
        return found


class _Scan:
    """One pass over the text; trusts it to be valid, and stops quietly where it is not."""

    def __init__(self, text: str) -> None:
        self.text = text
        self.at = 0
        self.lines: dict[Path, int] = {}
        self._ends = [match.start() for match in re.finditer("\n", text)]
        self._tables: dict[Path, int] = {}  # how many [[tables]] of each name
        self._document()

    def _line(self) -> int:
        return bisect_right(self._ends, self.at - 1) + 1

    def _skip(self, pattern: re.Pattern[str]) -> str:
        match = pattern.match(self.text, self.at)
        if not match:
            return ""
        self.at = match.end()
        return match[0]

    def _next(self) -> str:
        self._skip(_BLANK)
        return self.text[self.at : self.at + 1]

    def _note(self, path: Path) -> None:
        self.lines.setdefault(path, self._line())

    def _document(self) -> None:
        table: Path = ()
        while char := self._next():
            before = self.at
            if char == "[":
                table = self._header()
            else:
                self._pair(table)
            if self.at == before:  # not valid after all
                return

    def _header(self) -> Path:
        line_at = self.at
        several = self.text.startswith("[[", self.at)
        self.at += 2 if several else 1
        names = self._key()
        self._skip(re.compile(r"[ \t]*\]{1,2}"))
        path: Path = ()
        for name in names[:-1]:
            path = (*path, name)
            if path in self._tables:
                path = (*path, self._tables[path] - 1)
        path = (*path, *names[-1:])
        end, self.at = self.at, line_at
        self._note(path)
        self.at = end
        if several:
            self._tables[path] = self._tables.get(path, 0) + 1
            path = (*path, self._tables[path] - 1)
        end, self.at = self.at, line_at
        self._note(path)
        self.at = end
        return path

    def _key(self) -> list[str]:
        names = []
        while True:
            self._skip(re.compile(r"[ \t]*"))
            if self.text[self.at : self.at + 1] in ('"', "'"):
                names.append(self._string()[1:-1])
            elif name := self._skip(_BARE_KEY):
                names.append(name)
            else:
                return names
            if not self._skip(re.compile(r"[ \t]*\.")):
                return names

    def _string(self) -> str:
        return next((found for form in _STRINGS if (found := self._skip(form))), "")

    def _pair(self, table: Path) -> None:
        start = self.at
        path: Path = table
        names = self._key()
        end, self.at = self.at, start
        for name in names:
            path = (*path, name)
            self._note(path)
        self.at = end
        if self._next() == "=":
            self.at += 1
            self._value(path)

    def _value(self, path: Path) -> None:
        char = self._next()
        if char in ('"', "'"):
            self._string()
        elif char == "{":
            self._entries(path, "}")
        elif char == "[":
            self._entries(path, "]")
        else:
            self._skip(_PLAIN_VALUE)

    def _entries(self, path: Path, end: str) -> None:
        self.at += 1
        index = 0
        while (char := self._next()) and char != end:
            before = self.at
            if end == "}":
                self._pair(path)
            else:
                self._note((*path, index))
                self._value((*path, index))
                index += 1
            if self._next() == ",":
                self.at += 1
            elif self.at == before:
                return
        self.at += 1
