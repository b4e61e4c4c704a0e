"""A mobile phase as people write it -> its liquids in volume parts.

"acetonitrile/water 60:40", "60:40 ACN:H2O", "40 % methanol in water", "0.1 % formic acid in water",
"methanol/20 mM phosphate pH 2.5 (60/40)". What is dissolved in a liquid is left out, and said so.
"""

from __future__ import annotations

import re
from dataclasses import dataclass
from typing import TYPE_CHECKING

from xcol.catalogs import MIXTURES, SOLVENTS
from xcol.liquids.mobile_phase import Component, MobilePhase
from xcol.units import UnitError, plain, quote

if TYPE_CHECKING:
    from xcol.catalog_records import Mixture, Solvent
    from xcol.catalogs import Catalogs

LONGEST = 200  # characters
MOST_LIQUIDS = 6
DILUTE_PERCENT, DILUTE_MOLAR = 2.0, 0.2  # above, a solution is noticeably more viscous than its liquid
MOST_DISSOLVED = 5.0  # per cent of something unknown that may be an additive of water

_EXPECTED = 'liquids in volume parts, as in "acetonitrile/water 60:40"'
_NUMBER = r"\d{1,4}(?:[.,]\d{1,4})?"
_PARTS = re.compile(
    rf"(?<![\w.,])[(\[]?\s*({_NUMBER}(?:\s*[:/]\s*{_NUMBER})+)(?!\w|[.,]\d|\s*(?:%|m?M\b|mmol|mol|g/|mg))\s*[)\]]?"
    r"\s*,?\s*(?:[(\[]?(?:v/v(?:/v)*|vol(?:ume)?\b\.?|by volume)\s*[)\]]?)?",
    re.I,
)
_BY_WEIGHT = re.compile(r"\b(?:w/w|m/m|w/v|wt|weight|by mass)\b", re.I)
_VOLUME_WORDS = re.compile(r"[(\[]?\b(?:v/v(?:/v)*|by volume)\b[)\]]?", re.I)
_PERCENT_FIRST = re.compile(rf"({_NUMBER})\s*(?:%|per ?cent)\s*(.+)", re.I)
_PERCENT_LAST = re.compile(rf"(.+?)\s*[,(]?\s*({_NUMBER})\s*(?:%|per ?cent)\s*\)?", re.I)
_WITHIN = re.compile(r"(.+?)\s+(?:in|dissolved in)\s+(.+)", re.I)
_WITH = re.compile(r"(.+?)\s*(?:\bwith\b|\bcontaining\b|\bplus\b|\+|,|;|&)\s*(.+)", re.I)
_AQUEOUS = re.compile(  # what is dissolved in water, where nobody wrote the water
    r"\b(?:buffer\w*|phosphate|citrate|borate|(?:bi)?carbonate|tris|hepes|mes|mops|pbs|saline|nacl|kcl|"
    rf"sodium|potassium|ammonium|lithium|aqueous|aq|ph\s*{_NUMBER}|{_NUMBER}\s*(?:mM|mmol(?:/l)?|mol/l|M))\b",
    re.I,
)
_PERCENT_OF = re.compile(rf"({_NUMBER})\s*(?:%|per ?cent)")
_MOLAR = re.compile(rf"({_NUMBER})\s*(m?)(?:M\b|mol/[lL]|mol\b)")


@dataclass(frozen=True)
class Composition:
    """The mobile phase as read, with what was left out of it and what to warn of."""

    phase: MobilePhase
    left_out: tuple[str, ...] = ()
    warnings: tuple[str, ...] = ()


@dataclass(frozen=True)
class _Piece:
    """One liquid of the text: its share in per cent where it stands with it, and what it was typed as."""

    solvent: Solvent
    percent: float | None = None
    solution: str = ""  # as typed, where something is dissolved in it


def read_composition(text: str, catalogs: Catalogs) -> Composition:
    """Read a mobile phase; raises ``UnitError`` with what was read, expected, and a suggestion."""
    shown = quote(text)
    if len(text) > LONGEST:
        raise UnitError(shown, f"{_EXPECTED}, {LONGEST} characters at most", "a shorter text")
    if _BY_WEIGHT.search(text):
        raise UnitError(f"{shown}, by weight", _EXPECTED, "the volume parts")
    words = plain(text)
    found = list(_PARTS.finditer(words))
    if len(found) > 1:
        raise UnitError(f"{shown}, with volume parts in two places", _EXPECTED, "the parts once")
    parts: list[float] | None = None
    if found:
        parts = [_float(number) for number in re.split(r"[:/]", found[0][1])]
        words = f"{words[: found[0].start()]} {words[found[0].end() :]}"
    words = " ".join(_VOLUME_WORDS.sub(" ", words).split()).strip(" ,;=")
    if not words:
        raise UnitError(shown, _EXPECTED, "the names of the liquids before their parts")
    pieces = _pieces(words, shown, catalogs, has_parts=parts is not None)
    if len(pieces) > MOST_LIQUIDS:
        raise UnitError(f"{shown}, {len(pieces)} liquids", f"{MOST_LIQUIDS} liquids at most", "the main ones")
    fractions = _fractions(pieces, parts, shown)
    together: dict[str, Component] = {}
    for piece, fraction in zip(pieces, fractions, strict=True):
        before = together.get(piece.solvent.name)
        if fraction > 0:
            total = fraction + (before.fraction if before else 0.0)
            together[piece.solvent.name] = Component(piece.solvent, total)
    solutions = [piece for piece in pieces if piece.solution]
    left_out = tuple(f"{quote(piece.solution)} is taken as {piece.solvent.name}" for piece in solutions)
    warnings = tuple(warning for piece in solutions if (warning := _concentrated(piece)))
    return Composition(MobilePhase(tuple(together.values()), _excesses(catalogs)), left_out, warnings)


def water_of(catalogs: Catalogs) -> MobilePhase:
    """Return water, in which the catalog's diffusion coefficients were measured."""
    water = catalogs.find(SOLVENTS, "water")
    return MobilePhase((Component(water, 1.0),) if water else ())


def _excesses(catalogs: Catalogs) -> dict[str, Mixture]:
    found: dict[str, Mixture] = {}
    for mixture in catalogs.rows(MIXTURES):
        solvent = catalogs.find(SOLVENTS, mixture.liquid)
        if solvent is not None:
            found.setdefault(solvent.name, mixture)
    return found


def _pieces(words: str, shown: str, catalogs: Catalogs, *, has_parts: bool) -> list[_Piece]:
    """Return the liquids of a text without its volume parts."""
    if re.search(r"\s*[/|:]\s*", words):
        named = [word.strip(" ,;") for word in re.split(r"[/|:]", words)]
        return [_piece(word, shown, catalogs) for word in named if word]
    if catalogs.find(SOLVENTS, words):
        return [_piece(words, shown, catalogs)]
    for listed in (re.split(r"\s+and\s+|\s*[,;+]\s*|\s+-\s+", words), *_at_hyphens(words)):
        pieces = [_solvent_piece(word, catalogs) for word in listed]
        known = [piece for piece in pieces if piece]
        if len(known) == len(pieces) > 1:
            return known
    if not has_parts and (pair := _solvent_within(words, shown, catalogs)):
        return pair
    return [_piece(words, shown, catalogs)]


def _at_hyphens(words: str) -> list[list[str]]:
    """Return the ways to cut "acetonitrile-water" at one hyphen."""
    return [[words[: m.start()], words[m.end() :]] for m in re.finditer("-", words)]


def _solvent_piece(word: str, catalogs: Catalogs) -> _Piece | None:
    """Return a liquid, with its per cent where they stand with it; None for anything else."""
    word = word.strip()
    if solvent := catalogs.find(SOLVENTS, word):
        return _Piece(solvent)
    if (match := _PERCENT_FIRST.fullmatch(word)) and (solvent := catalogs.find(SOLVENTS, match[2])):
        return _Piece(solvent, _float(match[1]))
    if (match := _PERCENT_LAST.fullmatch(word)) and (solvent := catalogs.find(SOLVENTS, match[1])):
        return _Piece(solvent, _float(match[2]))
    return None


def _solvent_within(words: str, shown: str, catalogs: Catalogs) -> list[_Piece]:
    """Read "40 % methanol in water" and "water with 5 % acetonitrile": one liquid in another."""
    for pattern, small, large in ((_WITHIN, 1, 2), (_WITH, 2, 1)):
        match = pattern.fullmatch(words)
        if match and (part := _solvent_piece(match[small], catalogs)) and part.percent is not None:
            rest = _piece(match[large], shown, catalogs)
            if rest.percent is None and part.percent < 100:
                return [part, _Piece(rest.solvent, 100 - part.percent, rest.solution)]
    return []


def _piece(word: str, shown: str, catalogs: Catalogs) -> _Piece:
    """Return one liquid: a pure one, or the one in which something is dissolved."""
    if piece := _solvent_piece(word, catalogs):
        return piece
    for pattern, liquid in ((_WITHIN, 2), (_WITH, 1)):
        if (match := pattern.fullmatch(word)) and (solvent := catalogs.find(SOLVENTS, match[liquid])):
            return _Piece(solvent, None, word)
    water = catalogs.find(SOLVENTS, "water")
    amounts = [_float(number) for number in _PERCENT_OF.findall(word)]
    if water and (_AQUEOUS.search(word) or (amounts and max(amounts) <= MOST_DISSOLVED)):
        return _Piece(water, None, word)
    if (match := re.fullmatch(rf"(.+?)\s+({_NUMBER})", word)) and catalogs.find(SOLVENTS, match[1]):
        raise UnitError(f"{shown}, with one number", _EXPECTED, "the parts of all liquids")
    near = catalogs.near(SOLVENTS, word)
    raise UnitError(
        f"{shown}, in which {quote(word)} is not a liquid known here",
        f"{_EXPECTED}; xcol catalog solvents lists what is known",
        f'"{near}"' if near else 'viscosity = "0.9 mPa s" and each peak\'s diffusion, or a catalog of your own',
    )


def _fractions(pieces: list[_Piece], parts: list[float] | None, shown: str) -> list[float]:
    """Return the volume fraction of each liquid."""
    names = "/".join(piece.solvent.name for piece in pieces)
    given = [piece.percent for piece in pieces if piece.percent is not None]
    if parts is not None and given:
        raise UnitError(f"{shown}, with per cent and parts", _EXPECTED, "one of the two")
    if parts is None and len(pieces) == 1:
        if given and given[0] != 100:
            rest = 100 - given[0]
            raise UnitError(shown, _EXPECTED, f'"{names}/water {given[0]:g}:{rest:g}", if the rest is water')
        return [1.0]
    example = ":".join({2: ("60", "40"), 3: ("60", "30", "10")}.get(len(pieces), ("1",) * len(pieces)))
    values = parts if parts is not None else given
    if len(values) != len(pieces):
        if not values:
            read = f"{shown}, without volume parts"
        elif parts is None:
            read = f"{shown}, with the per cent of some of its liquids"
            if len(pieces) == 2 and 0 < given[0] < 100:
                share = given[0] if pieces[0].percent is not None else 100 - given[0]
                example = f"{share:g}:{100 - share:g}"
        else:
            read = f"{shown}, {len(values)} volume parts and {len(pieces)} liquid{'s' if len(pieces) > 1 else ''}"
            if len(pieces) == 1 and len(values) == 2:
                names, example = f"{names}/water", f'{values[0]:g}:{values[1]:g}", if the other liquid is water'
                raise UnitError(read, f"{_EXPECTED}, one part for each liquid", f'"{names} {example}')
        raise UnitError(read, f"{_EXPECTED}, one part for each liquid", f'"{names} {example}"')
    total = sum(values)
    if total <= 0:
        raise UnitError(f"{shown}, with parts that are all 0", _EXPECTED, f'"{names} {example}"')
    if parts is None and abs(total - 100) > 0.5:
        raise UnitError(f"{shown}, {total:g} % together", f"{_EXPECTED}, or per cent that add up to 100", "check them")
    return [value / total for value in values]


def _concentrated(piece: _Piece) -> str:
    """Warn of a solution that is noticeably more viscous than its liquid."""
    percent = [_float(number) for number in _PERCENT_OF.findall(piece.solution)]
    molar = [_float(number) * (1e-3 if milli else 1.0) for number, milli in _MOLAR.findall(piece.solution)]
    if any(value > DILUTE_PERCENT for value in percent) or any(value > DILUTE_MOLAR for value in molar):
        return (
            f"{quote(piece.solution)} is taken as {piece.solvent.name}: at this concentration its viscosity is higher; "
            "enter viscosity if you know it"
        )
    return ""


def _float(number: str) -> float:
    return float(number.strip().replace(",", "."))
