"""The words of a mobile phase: liquids of the catalog, what is dissolved in them, numbers, and what joins them."""

from __future__ import annotations

import re
import unicodedata
from dataclasses import dataclass, replace
from enum import Enum, auto
from typing import TYPE_CHECKING

from xcol.catalog_kinds import SOLVENTS
from xcol.catalogs import normal
from xcol.units import plain

if TYPE_CHECKING:
    from xcol.catalog_records import Solvent
    from xcol.catalogs import Catalogs


class Sort(Enum):
    """What a word is."""

    SOLVENT = auto()
    SOLUTE = auto()  # an additive or a salt
    BUFFER = auto()  # a word for a solution in water
    AQUEOUS = auto()
    PH = auto()
    PARTS = auto()  # 60:40
    PERCENT = auto()
    MOLAR = auto()  # mol/L
    NUMBER = auto()
    SLASH = auto()  # / : | between liquids
    COMMA = auto()  # , ; + & and
    IN = auto()  # in, with, containing
    BRACKET = auto()
    NOISE = auto()
    WEIGHT = auto()
    UNKNOWN = auto()


@dataclass(frozen=True)
class Word:
    """One word, or a number with its unit; ``inside``: it stands in brackets."""

    sort: Sort
    text: str
    start: int = 0  # its place in the line
    values: tuple[float, ...] = ()
    solvent: Solvent | None = None
    inside: bool = False

    @property
    def end(self) -> int:
        """The place behind it."""
        return self.start + len(self.text)


_NUMBER = r"\d{1,4}(?:[.,]\d{1,4})?"
_PREFIXES = {"m": 1e-3, "u": 1e-6, "µ": 1e-6, "μ": 1e-6}
_END = r"(?![\w%])"
_SHARE = rf"{_NUMBER}\s*%?"
_NO_UNIT = r"(?:(?<=%)|(?!\w|-[A-Za-z]|[.,]\d|\s*(?:%|mM|M\b|mmol|mol)))"
_RULES: tuple[tuple[Sort, re.Pattern[str]], ...] = (
    (Sort.NOISE, re.compile(r"\(?\[?\b(?:v\s*/\s*v(?:\s*/\s*v)*|by volume|vol/vol)\b\]?\)?", re.I)),
    (Sort.NOISE, re.compile(r"\d{1,2}\s*[x×](?!\w)", re.I)),
    (Sort.NOISE, re.compile(r"\d{1,4}\s*(?:ppm|mg/L)\b", re.I)),
    (Sort.WEIGHT, re.compile(r"\b(?:w/w|m/m|w/v|wt\.?|by weight|by mass|weight)(?!\w)", re.I)),
    (Sort.PH, re.compile(rf"\bpH\s*[=\-]?\s*(?:of\s*)?{_NUMBER}(?!\w)", re.I)),
    (Sort.MOLAR, re.compile(rf"({_NUMBER})\s*(?:([muµμ]?)(?:M|mol\s*/\s*[lL])|(m)mol|N)(?!\w)")),
    (Sort.PARTS, re.compile(rf"(?:{_SHARE}(?:\s*[:/]\s*{_SHARE})+|{_NUMBER}(?:\s*\+\s*{_NUMBER})+){_NO_UNIT}")),
    (Sort.PERCENT, re.compile(rf"({_NUMBER})\s*(?:%|per ?cent\b|vol\.?\s*-?%)", re.I)),
    (Sort.NUMBER, re.compile(rf"({_NUMBER}){_END}")),
    (Sort.IN, re.compile(r"\b(?:in|with|containing|dissolved in|contains)\b|\bw/", re.I)),
    (Sort.COMMA, re.compile(r"[,;+&]|\band\b|\bplus\b|(?<=\s)[-–—](?=\s)", re.I)),
    (Sort.SLASH, re.compile(r"[/|:]")),
    (Sort.BRACKET, re.compile(r"[()\[\]{}]")),
    (Sort.NOISE, re.compile(r"=|\b(?:HPLC|LC-?MS|UHPLC|MS|grade|gradient grade|ultrapure|pure|DI|deioni[sz]ed|"
                            r"distilled|purified|[a-z]+-?Q(?=\s+water)|each|both|adjusted|to|of|with NaOH|modified|"
                            r"degassed|filtered|anhydrous|(?:un)?stabili[sz]ed|eluent|isocratic)\b", re.I)),
)  # fmt: skip
_BUFFER = re.compile(r"\b(?:buffer(?:ed)?|pbs|saline|tris|hepes|mes|mops|bis-tris)(?!\w)", re.I)
_AQUEOUS = re.compile(r"\b(?:aqueous|aq\.?|solution)(?!\w)", re.I)
_SOLUTE = re.compile(
    r"\b(?:"
    r"(?:pentane|hexane|heptane|octane)[\s\-]?sulfon\w+(?: acid)?|"
    r"(?:trifluoro|difluoro|heptafluoro)?\s?(?:acetic|butyric) acid|tfa|dfa|hfba|formic acid|fa|hcooh|hoac|acoh|"
    r"ch3cooh|"
    r"(?:ortho)?[\s\-]?phosphoric acid|h3po4|sul(?:f|ph)uric acid|h2so4|hydrochloric acid|hcl|perchloric acid|hclo4|"
    r"methanesulfonic acid|citric acid|boric acid|(?:tri|di)ethylamine|tea|dea|ammonia|nh3|nh4oh|naoh|koh|"
    r"(?:di|mono|tri)?-?(?:sodium|potassium|ammonium|lithium|triethylammonium|tetrabutylammonium)|"
    r"(?:di|mono)?-?(?:hydrogen)?-?(?:phosphate|formate|acetate|citrate|borate|tartrate|(?:bi|hydrogen)?carbonate|"
    r"chloride|sul(?:f|ph)ate|hydrogensulfate|perchlorate|fluoride|bromide|iodide|nitrate|hydroxide|trifluoroacetate)|"
    r"dihydrogen|hydrogen|dibasic|monobasic|edta|sds|dodecyl|nacl|kcl|libr|na2so4|na2co3|naoac|msa|teaa|tbahs|naclo4|"
    r"nh4(?:oac|ac|hco2|fa|hco3|cl)|kh2po4|k2hpo4|nah2po4|na2hpo4|nahco3|guanidine|hydrochloride|urea|arginine|"
    r"additives?|modifier|salt"
    r")(?!\w)",
    re.I,
)
_ANYTHING = re.compile(r"\w[\w.\-]*(?:\s+(?:acetate|acid|alcohol|ether|chloride|sulfoxide|carbonate))*|.")


def line_of(text: str) -> str:
    """Return a text as its words are looked for: on one line, with plain digits and signs."""
    return plain(unicodedata.normalize("NFKC", text.replace("\u2236", ":")))


def words_of(line: str, catalogs: Catalogs) -> list[Word]:
    """Return the words of a mobile phase in their order; what is not known is a word of its own."""
    names = _names(catalogs, line.lower())
    found: list[Word] = []
    depth, at = 0, 0
    while at < len(line):
        if line[at].isspace():
            at += 1
            continue
        word = _word_at(line, at, names)
        if word.sort is Sort.BRACKET:
            depth += 1 if word.text in "([{" else -1
        found.append(replace(word, inside=depth > 0))
        at = word.end
    return [_joined(found, index) for index in range(len(found))]


def _joined(words: list[Word], index: int) -> Word:
    """Tell what a hyphen joins: liquids, like a slash; the words of a salt, "Tris-HCl"; anything else is not known."""
    word = words[index]
    if word.text in "-\u2010\u2011\u2013\u2014" and 0 < index < len(words) - 1:
        sides = {words[index - 1].sort, words[index + 1].sort}
        if sides <= {Sort.SOLUTE, Sort.BUFFER, Sort.NOISE}:
            return replace(word, sort=Sort.NOISE)
        salty = {Sort.SOLVENT, Sort.SOLUTE, Sort.BUFFER, Sort.PH, Sort.MOLAR, Sort.BRACKET}
        if Sort.SOLVENT in sides and sides <= salty:
            return replace(word, sort=Sort.SLASH)
    return word


def _names(catalogs: Catalogs, lower: str) -> list[tuple[re.Pattern[str], Solvent]]:
    """Return a pattern for each name of a liquid of which the first word is in a text, in lower case.

    The longest first; spaces and hyphens are alike.
    """
    names = {normal(name) for row in catalogs.rows(SOLVENTS) for name in (row.name, *row.also)}
    present = (name for name in names if name.partition(" ")[0] in lower)
    listed = [(name, row) for name in present if (row := catalogs.find(SOLVENTS, name))]
    listed.sort(key=lambda pair: (-len(pair[0]), pair[0]))
    return [
        (re.compile(r"[\s\-]*".join(map(re.escape, name.split())) + r"(?!\w|[\s\-]*sulfon)", re.I), row)
        for name, row in listed
    ]


def _word_at(line: str, at: int, names: list[tuple[re.Pattern[str], Solvent]]) -> Word:
    for pattern, solvent in names:
        if match := pattern.match(line, at):
            return Word(Sort.SOLVENT, match[0], at, solvent=solvent)
    for sort, pattern in ((Sort.BUFFER, _BUFFER), (Sort.AQUEOUS, _AQUEOUS), (Sort.SOLUTE, _SOLUTE), *_RULES):
        if match := pattern.match(line, at):
            return Word(sort, match[0], at, _values(sort, match))
    match = _ANYTHING.match(line, at)
    return Word(Sort.UNKNOWN, match[0] if match else line[at], at)


def _values(sort: Sort, match: re.Match[str]) -> tuple[float, ...]:
    if sort is Sort.PARTS:
        return tuple(_float(number) for number in re.findall(_NUMBER, match[0]))
    if sort is Sort.MOLAR:
        return (_float(match[1]) * _PREFIXES.get(match[2] or match[3], 1.0),)
    return (_float(match[1]),) if sort in (Sort.PERCENT, Sort.NUMBER) else ()


def _float(number: str) -> float:
    return float(number.strip().replace(",", "."))
