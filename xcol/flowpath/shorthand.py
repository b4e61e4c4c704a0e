"""The short way to write sizes: "40 cm x 0.010 in", "4.6 x 150 mm, 5 um"."""

from __future__ import annotations

import re
from typing import TYPE_CHECKING

from xcol.units import LENGTH, VOLUME, UnitError, missing_unit, parse, quote, split

if TYPE_CHECKING:
    from xcol.flowpath.findings import Draft

# "x" separates sizes only before a number, so that no unit is ever cut; a comma separates unless
# it is a decimal comma, which has a digit on either side.
_BY = re.compile(r"\s*[xX×*]\s*(?=[\d.,+\-])")
_THEN = re.compile(r"\s*(?:;|,(?!\d)|(?<!\d),)\s*|(?<=[A-WYZa-wyzµμ])\s+(?=\d)")
_INSIDE = re.compile(r"\s*(?:\bi\.?d\.?|\binside diameter|\bbore|\blong|\bparticles?)\s*$", re.I)
_OUTSIDE = re.compile(r"(?:\bo\.?d\.?(?![a-z])|\boutside diameter|\bouter diameter)", re.I)
_RADIUS = re.compile(r"\bradius\b", re.I)


def tube_size(text: str) -> dict[str, float]:
    """Read length and bore [m] of a tube, in either order: the smaller of the two is the bore.

    >>> tube_size("40 cm x 0.25 mm")
    {'length': 0.4, 'bore': 0.00025}
    """
    expected = 'length and bore, as in "40 cm x 0.25 mm" or "40 cm x 0.010 in"'
    sizes = _sizes(text, expected)
    if len(sizes) != 2 or len(_THEN.split(text.strip())) != 1:
        raise UnitError(quote(text), expected, _tube_advice(sizes))
    bare = [size for size in sizes if not split(size)[1]]
    if bare:
        options = " or ".join(f'"{reading}"' for reading in _with_units(sizes))
        missing = " and ".join(bare)
        raise UnitError(f"{quote(text)}: {missing} without a unit", expected, options)
    small, large = sorted(parse(size, LENGTH) for size in sizes)
    if small < 0:
        raise UnitError(f"{quote(text)}, a size below zero", expected, "sizes above zero")
    if small == 0:  # no length, rather than no bore
        small, large = large, small
    return {"length": large, "bore": small}


def loop_size(text: str) -> tuple[float, ...]:
    """Read a loop's volume [m³] and, where given, its bore [m].

    >>> loop_size("20 uL x 0.5 mm")
    (2e-08, 0.0005)
    """
    expected = 'the loop\'s volume, or its volume and bore, as in "20 uL x 0.5 mm"'
    sizes = _sizes(text, expected)
    if len(sizes) > 2:
        raise UnitError(quote(text), expected, "in this form; anything else can go into note")
    first = parse(sizes[0], VOLUME)
    return (first,) if len(sizes) == 1 else (first, parse(sizes[1], LENGTH))


def loop_of(draft: Draft) -> tuple[float | None, float | None]:
    """Return volume [m³] and bore [m] of the loop of an injection, None where they are not given."""
    sizes = draft.sizes("loop")
    return (sizes[0] if sizes else None), (sizes[1] if len(sizes) > 1 else None)


def column_size(text: str) -> dict[str, float]:
    """Read bore, length and, where given, particle diameter [m] of a column.

    The trade writes the unit of bore and length once; the smaller of the two is the bore.

    >>> {key: round(value * 1e3, 6) for key, value in column_size("2,1 x 50 mm, 1,8 µm").items()}
    {'bore': 2.1, 'length': 50.0, 'particle': 0.0018}
    """
    expected = 'bore x length and particle, as in "4.6 x 150 mm, 5 um"'
    pieces = _pieces(text)
    sizes = _sizes(pieces[0], expected) if pieces else []
    if len(sizes) == 3 and len(pieces) == 1:  # "4.6 x 150 mm x 5 um" reads one way only
        pieces.append(sizes.pop())
    if len(sizes) != 2 or len(pieces) > 2:
        advice = "in this form; a pore size and the like can go into note"
        raise UnitError(quote(text), expected, advice)
    (first, first_unit), (second, second_unit) = (split(size) for size in sizes)
    if not second_unit:
        rest = _particle(pieces)
        raise UnitError(
            f"{quote(text)}: {second:g} without a unit",
            expected,
            f'"{first:g} x {second:g} mm{rest}"',
        )
    if second_unit not in LENGTH.everyday:
        raise UnitError(quote(text), expected, "in this form, with a comma before the particle")
    if not first_unit and second_unit != "mm":  # "2.1 x 5 cm" may mean 2.1 mm or 21 mm
        rest = _particle(pieces)
        raise UnitError(
            f"{quote(text)}: {first:g} without a unit, beside one in {second_unit}",
            expected,
            f'"{first:g} mm x {second:g} {second_unit}{rest}"',
        )
    if not first_unit:
        sizes[0] = f"{sizes[0]} {second_unit}"
    small, large = sorted(parse(size, LENGTH) for size in sizes)
    result = {"bore": small, "length": large}
    if len(pieces) == 2:
        particle = _INSIDE.sub("", pieces[1])
        if not split(particle)[1]:
            raise missing_unit(particle, LENGTH, ("um",))
        result["particle"] = parse(particle, LENGTH)
    return result


def _particle(pieces: list[str]) -> str:
    """Return what follows bore and length, with its unit, to be offered again."""
    if len(pieces) < 2:
        return ""
    return f", {pieces[1]}" + ("" if re.search(r"[A-Za-zµμ]", pieces[1]) else " um")


def length_first(text: str) -> bool:
    """Whether a column's length was written before its bore.

    >>> length_first("150 x 4.6 mm, 5 um"), length_first("4.6 x 150 mm, 5 um")
    (True, False)
    """
    first, second = (split(size) for size in _sizes(_pieces(text)[0], "")[:2])
    unit = second[1] or first[1]
    return parse(f"{first[0]} {first[1] or unit}", LENGTH) > parse(f"{second[0]} {unit}", LENGTH)


def _pieces(text: str) -> list[str]:
    return [piece for piece in _THEN.split(text.strip()) if piece]


def _sizes(text: str, expected: str) -> list[str]:
    if _OUTSIDE.search(text):
        raise UnitError(
            f"{quote(text)}, with an outside diameter",
            expected,
            "the bore (inside diameter) alone; the outside diameter can go into note",
        )
    if _RADIUS.search(text):
        raise UnitError(f"{quote(text)}, with a radius", expected, "the bore, which is a diameter")
    return [_INSIDE.sub("", size).strip() for size in _BY.split(text.strip())]


def _with_units(sizes: list[str]) -> list[str]:
    """Return the likely readings of a tube's sizes of which one or both lack the unit."""
    if not any(split(size)[1] for size in sizes):
        large = max(sizes, key=lambda size: split(size)[0])
        return [" x ".join(f"{s} {long if s is large else short}" for s in sizes)
                for long, short in (("cm", "mm"), ("mm", "mm"))]  # fmt: skip
    bare = next(size for size in sizes if not split(size)[1])
    units = ("mm", "in") if split(bare)[0] < 1.5 else ("cm", "mm")
    return [" x ".join(f"{s} {unit}" if s is bare else s for s in sizes) for unit in units]


def _tube_advice(sizes: list[str]) -> str:
    try:
        length = parse(sizes[0], LENGTH) if len(sizes) == 1 else 0.0
    except UnitError:
        length = 0.0
    if length > 0:
        return f'"{sizes[0]} x 0.25 mm", with the tube\'s own bore'
    return 'two sizes with an x between them, as in "40 cm x 0.25 mm"; anything else can go into note'
