"""Draws of what is unknown: for every unknown a number of values, the same ones for the same seed."""

from __future__ import annotations

import random
from typing import TYPE_CHECKING

import numpy as np

if TYPE_CHECKING:
    from xcol.answers.spread import Values
    from xcol.flowpath.unknowns import Distribution

_TO_UNIT = 2.0**-32


class Draws:
    """``count`` draws of each unknown; a ``seed`` gives the same ones everywhere.

    Each unknown has a stream of its own, so that what is drawn of one does not hang on how many others there are.
    (The standard library's generator: numpy's own takes 10 ms to import.)
    """

    def __init__(self, count: int, seed: int) -> None:
        self.count, self.seed = count, seed

    def of(self, key: str, spread: Distribution) -> Values:
        """Return the values of the unknown of this name, shape (count,)."""
        stream = random.Random(f"{self.seed}/{key}")

        def uniform() -> Values:
            whole = np.frombuffer(stream.randbytes(4 * self.count), dtype="<u4")
            return (whole + 0.5) * _TO_UNIT

        return spread.draw(uniform)
