"""What nobody knows exactly of a part: how it is spread, at which ends it is best and worst, what would settle it."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import TYPE_CHECKING, Any, Protocol

import numpy as np

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.filters.interface import Real

    Values = npt.NDArray[np.float64]
    Uniform01 = Callable[[], Values]  # each call gives new numbers between 0 and 1, one a draw

BEND = "bend"  # what a tube's unknown curvature is called
REMIXING = "remixing"  # and whether a fitting mixes the stream of the tubes beside it

_NINETY = 1.6448536269514722  # 90 % of a normal distribution lie within so many σ of its middle


class Distribution(Protocol):
    """How the values of an unknown are distributed."""

    def draw(self, uniform: Uniform01) -> Values:
        """Return one value a draw."""
        ...


@dataclass(frozen=True)
class Factor:
    """A factor of about 1, log-normal: 90 % lie between 1/(1 + relative) and 1 + relative."""

    relative: float

    def draw(self, uniform: Uniform01) -> Values:
        """Return factors (Box and Muller's transform: of two uniform numbers two normal ones)."""
        numbers = uniform()
        half = (len(numbers) + 1) // 2
        radius, angle = np.sqrt(-2 * np.log(numbers[:half])), 2 * math.pi * numbers[-half:]
        normal = np.concatenate([radius * np.cos(angle), radius * np.sin(angle)])[: len(numbers)]
        factors: Values = np.exp(math.log1p(self.relative) / _NINETY * normal)
        return factors


@dataclass(frozen=True)
class Between:
    """Anything from ``low`` to ``high`` alike."""

    low: float
    high: float

    def draw(self, uniform: Uniform01) -> Values:
        """Return values."""
        return self.low + (self.high - self.low) * uniform()


@dataclass(frozen=True)
class LogBetween:
    """Anything from ``low`` to ``high``, both above 0, each factor alike."""

    low: float
    high: float

    def draw(self, uniform: Uniform01) -> Values:
        """Return values."""
        values: Values = self.low * (self.high / self.low) ** uniform()
        return values


@dataclass(frozen=True)
class OneOf:
    """One of a few values, at even odds."""

    values: tuple[float, ...]

    def draw(self, uniform: Uniform01) -> Values:
        """Return values."""
        return np.array(self.values)[(uniform() * len(self.values)).astype(np.int64)]


@dataclass(frozen=True)
class Ends:
    """The value at which the part broadens least, and that at which it broadens most, each in words."""

    best: float
    worst: float
    at_best: str
    at_worst: str


@dataclass(frozen=True)
class Unknown:
    """One thing about an element that nobody knows exactly.

    ``put`` returns the element with a value, or an array of values, of this unknown. ``spread`` is None where it was
    entered, and is not drawn; ``ends`` are those of the range that stands beside the element's variance (None: a
    tolerance, which only the draws have); ``settle`` says what would settle it, with {name} for the part's name and
    {run} for a union run.
    """

    what: str
    spread: Distribution | None
    put: Callable[[Any, Real], Any]
    ends: Ends | None = None
    settle: str = ""


def scaling(field: str) -> Callable[[Any, Real], Any]:
    """Return what multiplies a field of an element by a factor."""

    def put(element: Any, factor: Real) -> Any:
        return replace(element, **{field: getattr(element, field) * factor})

    return put


def setting(field: str) -> Callable[[Any, Real], Any]:
    """Return what sets a field of an element."""

    def put(element: Any, value: Real) -> Any:
        return replace(element, **{field: value})

    return put
