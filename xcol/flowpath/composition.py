"""A mobile phase as people write it -> its liquids in volume parts.

"acetonitrile/water 60:40", "60:40 ACN:H2O", "40 % methanol in water", "water (0.1 % FA)/ACN (0.1 % FA) 30:70",
"methanol/20 mM phosphate pH 2.5 (60/40)". What is dissolved in a liquid is left out, and said so. Every word
must be one that is known here (composition_words.py): nothing is read over, so that no liquid gets lost.
"""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import TYPE_CHECKING

from xcol.catalog_kinds import MIXTURES, SOLVENTS
from xcol.flowpath.composition_words import Sort, Word, line_of, words_of
from xcol.liquids.mobile_phase import Component, MobilePhase
from xcol.units import UnitError, quote

if TYPE_CHECKING:
    from collections.abc import Sequence

    from xcol.catalog_records import Mixture, Solvent
    from xcol.catalogs import Catalogs

LONGEST = 200  # characters
MOST_LIQUIDS = 6
DILUTE_PERCENT, DILUTE_MOLAR = 2.0, 0.2  # above, a solution is noticeably more viscous than its liquid
DISSOLVED_DOUBT = 0.50  # relative, of such a solution's viscosity
TRACE = 0.02  # share of a part that may be an additive by name alone, as in "acetonitrile/water/TFA 30:70:0.1"

_NAMING = (Sort.SOLVENT, Sort.SOLUTE, Sort.BUFFER, Sort.AQUEOUS, Sort.PH, Sort.UNKNOWN, Sort.WEIGHT)
_EXPECTED = 'liquids in volume parts, as in "acetonitrile/water 60:40"'


@dataclass(frozen=True)
class Composition:
    """The mobile phase as read, with what was left out of it and what to warn of."""

    phase: MobilePhase
    left_out: tuple[str, ...] = ()
    warnings: tuple[str, ...] = ()


@dataclass(frozen=True)
class _Piece:
    """What stands between two separators: a liquid, or (without one) only something dissolved.

    ``percent`` and ``part`` are the liquid's own share, where it stands with it; ``dissolved`` says that
    something else does as well, ``watery`` that it is a solution in water even where no water is named.
    """

    text: str
    start: int
    end: int
    solvent: Solvent | None
    percent: float | None = None
    part: float | None = None
    leading: bool = False  # its per cent stand before its name
    dissolved: bool = False
    watery: bool = False
    concentrated: bool = False


def read_composition(text: str, catalogs: Catalogs) -> Composition:
    """Read a mobile phase; raises ``UnitError`` with what was read, expected, and a suggestion."""
    shown = quote(text)
    if len(text) > LONGEST:
        raise UnitError(shown, f"{_EXPECTED}, {LONGEST} characters at most", "a shorter text")
    line = line_of(text)
    every = words_of(line, catalogs)
    words, parts = _without_parts(every, shown)
    if not any(word.sort in _NAMING for word in words):
        raise UnitError(shown, _EXPECTED, "the names of the liquids before their parts")
    _refuse_unknown(words, shown, catalogs)
    entered = sum(parts or ())
    line = _blanked(line, every)
    pieces = _pieces(words, line, shown, catalogs, parts)
    liquids, parts, traces = _liquids(pieces, parts, shown)
    fractions = _fractions(liquids, parts, shown, rest=_tells_the_rest(liquids, words, line))
    together: dict[str, Component] = {}
    for piece, fraction in zip(liquids, fractions, strict=True):
        if piece.solvent is not None and fraction > 0:
            before = together.get(piece.solvent.name)
            total = fraction + (before.fraction if before else 0.0)
            together[piece.solvent.name] = Component(piece.solvent, total)
    solutions = [piece for piece in pieces if piece.dissolved]
    more = DISSOLVED_DOUBT if any(piece.concentrated for piece in solutions) else 0.0
    phase = MobilePhase(tuple(together.values()), excesses_of(catalogs), more)
    left_out = [_left_out(piece) for piece in (*solutions, *traces)]
    return Composition(
        phase, tuple(dict.fromkeys(left_out)), tuple(_warnings(solutions, (entered, sum(parts or ())), phase))
    )


def water_of(catalogs: Catalogs) -> MobilePhase:
    """Return water, in which the catalog's diffusion coefficients were measured."""
    water = catalogs.find(SOLVENTS, "water")
    return MobilePhase((Component(water, 1.0),) if water else ())


def excesses_of(catalogs: Catalogs) -> dict[str, Mixture]:
    """Return the measured mixtures with water by the name of the other liquid."""
    found: dict[str, Mixture] = {}
    for mixture in catalogs.rows(MIXTURES):
        solvent = catalogs.find(SOLVENTS, mixture.liquid)
        if solvent is not None:
            found.setdefault(solvent.name, mixture)
    return found


def _without_parts(words: list[Word], shown: str) -> tuple[list[Word], list[float] | None]:
    """Take the volume parts out of the words; None where there are none."""
    found = [word for word in words if word.sort is Sort.PARTS]
    if len(found) > 1:
        raise UnitError(f"{shown}, with volume parts in two places", _EXPECTED, "the parts once")
    kept = [word for word in words if word.sort not in (Sort.PARTS, Sort.NOISE)]
    while kept and kept[-1].sort in (Sort.SLASH, Sort.COMMA):
        kept.pop()
    while kept and kept[0].sort in (Sort.SLASH, Sort.COMMA):
        kept.pop(0)
    return kept, list(found[0].values) if found else None


def _blanked(line: str, words: list[Word]) -> str:
    """Return the line with blanks for what is no part of a name: the parts, "v/v"."""
    for word in words:
        if word.sort is Sort.PARTS or (word.sort is Sort.NOISE and "/" in word.text):
            line = line[: word.start] + " " * len(word.text) + line[word.end :]
    return line


def _tells_the_rest(liquids: list[_Piece], words: list[Word], line: str) -> bool:
    """Whether the liquid without a share is the rest: "40 % X in Y", "X 40 % in Y", "Y with 40 % X"."""
    shared = [piece for piece in liquids if piece.percent is not None]
    if len(shared) != 1 or any(word.sort is Sort.SLASH and not word.inside for word in words):
        return False
    (piece,) = shared
    behind, before = line[piece.end :].split(), line[: piece.start].lower().split()
    if behind and behind[0].lower() == "in":
        return True
    joined = bool(before) and before[-1] in ("with", "containing", "contains", "w/")
    first_water = piece is liquids[0] and bool(behind) and behind[0].lower() in ("with", "w/")
    return (joined and piece.leading) or (first_water and all(other.watery for other in liquids[1:]))


def _refuse_unknown(words: list[Word], shown: str, catalogs: Catalogs) -> None:
    if any(word.sort is Sort.WEIGHT for word in words):
        raise UnitError(f"{shown}, by weight", _EXPECTED, "the volume parts")
    unknown = next((word for word in words if word.sort is Sort.UNKNOWN), None)
    if unknown is None:
        return
    read = f"{shown}, in which {quote(unknown.text)} is not known here"
    place = words.index(unknown)
    if unknown.text.lower() in ("a", "b", "gradient", "→", "->", ">"):
        raise UnitError(read, f"{_EXPECTED}: gradients are not computed yet", "one composition, its liquids by name")
    if unknown.text == "-" and 0 < place < len(words) - 1 and words[place + 1].sort is Sort.PERCENT:
        raise UnitError(f"{shown}, a range", f"{_EXPECTED}: gradients are not computed yet", "one composition")
    near = catalogs.near(SOLVENTS, unknown.text)
    by_hand = "viscosity and each peak's diffusion, or a catalog of your own"
    suggestion = f'"{near}"' if near else f"{by_hand}; or leave it out, if it is a dilute additive"
    raise UnitError(read, f"{_EXPECTED}; xcol catalog solvents lists what is known", suggestion)


def _pieces(words: list[Word], line: str, shown: str, catalogs: Catalogs, parts: list[float] | None) -> list[_Piece]:
    """Cut the words into liquids and what is dissolved: at slashes, or else at commas, "and", "+" and "with"."""
    strong = any(word.sort is Sort.SLASH and not word.inside for word in words)
    found: list[_Piece] = []
    for chunk in _cut(words, (Sort.SLASH,) if strong else (Sort.COMMA,)):
        groups = _cut(chunk, (Sort.COMMA, Sort.IN))
        smaller = [_piece(group, line, shown) for group in groups if any(w.sort is not Sort.BRACKET for w in group)]
        dissolved_in = len(smaller) == 2 and smaller[0].solvent is None and smaller[1].solvent is not None
        found += [_merged(smaller, line, shown)] if smaller and (strong or dissolved_in) else smaller
    if not strong and not any(piece.solvent for piece in found):  # all of it is one solution
        found = [_merged(found, line, shown)]
    water = catalogs.find(SOLVENTS, "water")
    rest = any(word.sort is Sort.IN for word in words)
    return [
        replace(piece, solvent=water) if _is_water(piece, found, strong=strong, parts=parts, rest=rest) else piece
        for piece in found
    ]


def _is_water(piece: _Piece, pieces: list[_Piece], *, strong: bool, parts: list[float] | None, rest: bool) -> bool:
    """Whether a solution of which no liquid is named stands for water, beside the other pieces."""
    if piece.solvent or not piece.watery:
        return False
    if strong or len(pieces) == 1 or piece.percent is not None or piece.part is not None:
        return True
    if parts is not None:  # "acetonitrile, 0.1 % TFA 60:40"
        return len(parts) == len(pieces) and not any(other.solvent and other.solvent.is_water for other in pieces)
    liquids = [other for other in pieces if other.solvent]  # "90 % ACN in 10 mM ammonium formate"
    return rest and len(liquids) == 1 and liquids[0].percent is not None and piece.start > liquids[0].start


def _cut(words: Sequence[Word], at: tuple[Sort, ...]) -> list[list[Word]]:
    groups: list[list[Word]] = [[]]
    for word in words:
        if word.sort in at and not word.inside:
            groups.append([])
        else:
            groups[-1].append(word)
    return [group for group in groups if group]


def _piece(words: list[Word], line: str, shown: str) -> _Piece:
    """Read one piece: its liquid, the numbers that belong to it, and whether anything is dissolved in it."""
    start, end = words[0].start, words[-1].end
    text = " ".join(line[start:end].split()).rstrip(" ,;(")
    solvents = {word.solvent.name: word.solvent for word in words if word.solvent}
    if len(solvents) > 1:
        read = f"{shown}, with {' and '.join(solvents)} side by side"
        raise UnitError(read, _EXPECTED, f'"{"/".join(solvents)}" and their volume parts')
    solvent = next(iter(solvents.values()), None)
    dissolved = [word for word in words if word.sort in (Sort.SOLUTE, Sort.BUFFER, Sort.PH, Sort.AQUEOUS)]
    sorts = {word.sort for word in words}
    in_water = bool(sorts & {Sort.BUFFER, Sort.PH, Sort.MOLAR, Sort.AQUEOUS})
    own: list[float] = []
    others: list[float] = []
    numbers = [word for word in words if word.sort in (Sort.PERCENT, Sort.NUMBER, Sort.MOLAR)]
    for number in numbers:
        after = _next(words, number)
        if number.sort is Sort.PERCENT:
            of_solute = after is not None and after.sort is Sort.SOLUTE and Sort.BUFFER not in sorts
            (others if of_solute else own).append(number.values[0])
    if solvent and Sort.AQUEOUS in sorts and not solvent.is_water:
        share = f"{own[0]:g}:{100 - own[0]:g}" if own and own[0] < 100 else "60:40"
        raise UnitError(f"{shown}, a mixture with water", _EXPECTED, f'"{solvent.name}/water {share}"')
    parts = [number.values[0] for number in numbers if number.sort is Sort.NUMBER]
    molar = [number.values[0] for number in numbers if number.sort is Sort.MOLAR]
    if len(own) > 1 or len(parts) > 1 or (own and parts) or (molar and not dissolved):
        raise UnitError(
            f"{shown}, with numbers that read more than one way in {quote(text)}", _EXPECTED, "one for each"
        )
    return _Piece(
        text,
        start,
        end,
        solvent,
        own[0] if own else None,
        parts[0] if parts else None,
        words[0].sort is Sort.PERCENT,
        bool(dissolved),
        in_water or bool(dissolved and others),
        any(value > DILUTE_PERCENT for value in others) or any(value > DILUTE_MOLAR for value in molar),
    )


def _next(words: list[Word], word: Word) -> Word | None:
    """Return the word that a number belongs to: the one behind it, brackets aside."""
    behind = words[words.index(word) + 1 :]
    return next((other for other in behind if other.sort not in (Sort.BRACKET, Sort.AQUEOUS)), None)


def _merged(pieces: list[_Piece], line: str, shown: str) -> _Piece:
    """Return what stands between two slashes as one piece: a liquid with all that is dissolved in it."""
    named = {piece.solvent.name: piece for piece in pieces if piece.solvent}
    if len(named) > 1:
        read = f"{shown}, with {' and '.join(named)} in one part"
        raise UnitError(read, _EXPECTED, f'"{"/".join(named)}" and their volume parts')
    liquid = next(iter(named.values()), pieces[0])
    shares = [piece.percent for piece in pieces if piece.percent is not None]
    parts = [piece.part for piece in pieces if piece.part is not None]
    start, end = pieces[0].start, pieces[-1].end
    text = " ".join(line[start:end].split()).rstrip(" ,;(")
    if len(shares) > 1 or len(parts) > 1:
        raise UnitError(f"{shown}, with more than one number in {quote(text)}", _EXPECTED, "one for each liquid")
    return _Piece(
        text,
        start,
        end,
        liquid.solvent,
        shares[0] if shares else None,
        parts[0] if parts else None,
        pieces[0].leading,
        any(piece.dissolved for piece in pieces),
        any(piece.watery for piece in pieces),
        any(piece.concentrated for piece in pieces),
    )


def _liquids(
    pieces: list[_Piece], parts: list[float] | None, shown: str
) -> tuple[list[_Piece], list[float] | None, list[_Piece]]:
    """Return the liquids with their parts, and the additives that have a part of their own."""
    liquids = [piece for piece in pieces if piece.solvent]
    traces = [piece for piece in pieces if piece.solvent is None and piece.dissolved]
    if len(pieces) > MOST_LIQUIDS:
        raise UnitError(f"{shown}, {len(pieces)} liquids", f"{MOST_LIQUIDS} liquids at most", "the main ones")
    if not liquids:
        read = f"{shown}, which names no liquid"
        raise UnitError(read, _EXPECTED, 'the liquid as well, as in "0.1 % formic acid in water"')
    if parts is not None and traces and len(parts) == len(pieces):
        shares = [part for piece, part in zip(pieces, parts, strict=True) if piece.solvent is None]
        if sum(shares) > TRACE * sum(parts):
            raise UnitError(
                f"{shown}, in which {quote(traces[0].text)} is more than an additive",
                f"{_EXPECTED}; xcol catalog solvents lists what is known",
                "viscosity and each peak's diffusion, or a catalog of your own",
            )
        parts = [part for piece, part in zip(pieces, parts, strict=True) if piece.solvent]
        return liquids, parts, [replace(piece, dissolved=True) for piece in traces]
    return liquids, parts, []


def _fractions(pieces: list[_Piece], parts: list[float] | None, shown: str, *, rest: bool) -> list[float]:
    """Return the volume fraction of each liquid; ``rest``: the one without a share takes what is left."""
    names = [piece.solvent.name for piece in pieces if piece.solvent]
    percent = [piece.percent for piece in pieces]
    given = [share for share in percent if share is not None]
    beside = [piece.part for piece in pieces if piece.part is not None]
    if (parts is not None and (given or beside)) or (given and beside):
        raise UnitError(f"{shown}, with shares given twice", _EXPECTED, "them once")
    if parts is None and len(pieces) == 1 and not beside and given in ([], [100.0]):
        return [1.0]
    if rest and len(given) == len(pieces) - 1 and 0 < sum(given) < 100:
        return [(100 - sum(given) if share is None else share) / 100 for share in percent]
    values = parts if parts is not None else given or beside
    if len(values) != len(pieces):
        raise _wrong_count(names, values, percent, parts, shown)
    total = sum(values)
    if total <= 0:
        raise UnitError(f"{shown}, with parts that are all 0", _EXPECTED, _example(names, []))
    if given and abs(total - 100) > 0.5:
        if len(pieces) == 1:
            raise _wrong_count(names, values, percent, parts, shown)
        raise UnitError(f"{shown}, {total:g} % together", f"{_EXPECTED}, or per cent that add up to 100", "check them")
    if len(pieces) == 1 and beside:
        raise _wrong_count(names, values, percent, parts, shown)
    return [value / total for value in values]


def _wrong_count(
    names: list[str], values: list[float], percent: list[float | None], parts: list[float] | None, shown: str
) -> UnitError:
    """Return the error for liquids and shares that do not go together, with the likely reading."""
    expected = f"{_EXPECTED}, one part for each liquid"
    if len(names) == 1 and len(values) == 2:
        suggestion = f"{_example(names, values)}, if the other liquid is {_other(names[0])}"
        return UnitError(f"{shown}, 2 volume parts and 1 liquid", expected, suggestion)
    if len(names) == 1 and len(values) == 1 and 0 < values[0] < 100:
        suggestion = f"{_example(names, [values[0], 100 - values[0]])}, if the rest is {_other(names[0])}"
        return UnitError(f"{shown}, a share of one liquid alone", expected, suggestion)
    if not values:
        return UnitError(f"{shown}, without volume parts", expected, _example(names, []))
    if parts is not None:
        return UnitError(f"{shown}, {len(values)} volume parts and {len(names)} liquids", expected, _example(names, []))
    if len(names) == 2 and len(values) == 1 and 0 < values[0] < 100:
        first = values[0] if percent[0] is not None else 100 - values[0]
        either = (_example(names, [share, 100 - share]) for share in (first, 100 - first))
        return UnitError(f"{shown}, with the share of one liquid", expected, " or ".join(either))
    return UnitError(f"{shown}, with the shares of some liquids", expected, _example(names, []))


def _example(names: list[str], values: list[float]) -> str:
    names = list(dict.fromkeys(names))
    if len(names) == 1:
        names.append(_other(names[0]))
    usual = {2: [60.0, 40.0], 3: [60.0, 30.0, 10.0]}.get(len(names), [1.0] * len(names))
    return f'"{"/".join(names)} {":".join(f"{value:g}" for value in values or usual)}"'


def _other(name: str) -> str:
    """Return the likely liquid beside this one, for a suggestion."""
    return "acetonitrile" if name == "water" else "water"


def _left_out(piece: _Piece) -> str:
    if piece.solvent is None:
        return f"{quote(piece.text)} is left out"
    return f"{quote(piece.text)} is taken as {piece.solvent.name}"


def _warnings(solutions: list[_Piece], totals: tuple[float, float], phase: MobilePhase) -> list[str]:
    """Warn of what is noticeably more viscous than its liquid, of odd parts, and of liquids that do not mix.

    ``totals``: of all parts, and of those of the liquids alone.
    """
    found = [
        f"{quote(piece.text)}: at this concentration the viscosity is higher than the liquid's; enter it if you know it"
        for piece in solutions
        if piece.concentrated
    ]
    if 80 <= totals[0] <= 120 and all(abs(total - 100) > 0.5 for total in totals):
        found.append(f"the parts add up to {totals[0]:g}, not 100: read as {phase.name}")
    apart = [c.solvent.name for c in phase.components if not c.solvent.mixes_with_water]
    if apart and any(c.solvent.is_water for c in phase.components):
        found.append(f"{' and '.join(apart)} and water do not mix in all parts: one liquid phase is taken")
    return found
