"""Smooth interpolation in tables with equal steps: cubic pieces between nodes, for floats and for arrays.

scipy has the same, and takes longer to import than a whole budget takes to compute.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.filters.interface import Real

    Array = npt.NDArray[np.float64]

# rows are the coefficients of 1, x, x² and x³, columns value and slope at 0, value and slope at 1
_HERMITE = np.array(
    [[1.0, 0.0, 0.0, 0.0], [0.0, 1.0, 0.0, 0.0], [-3.0, -2.0, 3.0, -1.0], [2.0, 1.0, -2.0, 1.0]],
)


def monotone_slopes(values: Array) -> Array:
    """Return slopes at the nodes of a table, per step along its last axis (5 nodes or more), that keep it monotone.

    Of the fourth order in the step, and no more than three times the smaller step on both sides.
    Source of the bound: Fritsch and Carlson, SIAM J. Numer. Anal. 17 (1980) 238, from memory.
    """
    steps = np.diff(values, axis=-1)
    before, after = steps[..., :-1], steps[..., 1:]
    middle = (before + after) / 2
    inner = middle.copy()
    inner[..., 1:-1] = (8 * (values[..., 3:-1] - values[..., 1:-3]) - (values[..., 4:] - values[..., :-4])) / 12
    most = 3 * np.minimum(np.abs(before), np.abs(after))
    inner = np.sign(middle) * np.clip(inner * np.sign(middle), 0.0, np.where(before * after > 0, most, 0.0))
    return np.concatenate([steps[..., :1], inner, steps[..., -1:]], axis=-1)


class Curve:
    """A curve through ``values`` at nodes from ``start`` on, ``step`` apart, with these slopes per step."""

    def __init__(self, start: float, step: float, values: Array, slopes: Array) -> None:
        self._start, self._step, self._last = start, step, len(values) - 2
        ends = np.stack([values[:-1], slopes[:-1], values[1:], slopes[1:]])
        self._pieces = _HERMITE @ ends

    def __call__(self, at: Real) -> Array:
        """Return the curve at any shape of points; beyond the nodes its end pieces go on."""
        piece, x = _place(at, self._start, self._step, self._last)
        c = [one.take(piece) for one in self._pieces]
        result: Array = c[0] + x * (c[1] + x * (c[2] + x * c[3]))
        return result


class Surface:
    """A surface through ``values`` on a grid, with monotone slopes along both axes.

    ``starts`` and ``steps`` are those of the rows and of the columns. Monotone along every line of the grid.
    """

    def __init__(self, starts: tuple[float, float], steps: tuple[float, float], values: Array) -> None:
        self._starts, self._steps = starts, steps
        self._last = (values.shape[0] - 2, values.shape[1] - 2)
        along_rows = monotone_slopes(values)
        along_columns = monotone_slopes(values.T).T
        twist = monotone_slopes(along_rows.T).T
        corners = [[values, along_rows], [along_columns, twist]]  # by the order of the slope along rows, columns
        # for each cell the 4 x 4 numbers: (value, slope) at the cell's lower and upper row, by those of its columns
        cells = np.empty((*(n + 1 for n in self._last), 4, 4))
        for r, (upper, order_r) in enumerate([(0, 0), (0, 1), (1, 0), (1, 1)]):
            for c, (right, order_c) in enumerate([(0, 0), (0, 1), (1, 0), (1, 1)]):
                table = corners[order_r][order_c]
                cells[..., r, c] = table[upper : upper + cells.shape[0], right : right + cells.shape[1]]
        pieces = _HERMITE @ cells @ _HERMITE.T
        # one table for each coefficient, so that an array of points takes each from neighbouring memory
        self._pieces = np.ascontiguousarray(np.moveaxis(pieces.reshape(-1, 4, 4), 0, -1))

    def __call__(self, row: Real, column: Real) -> Array:
        """Return the surface at points of one shape, or of shapes that broadcast; both within the grid."""
        (i, x), (j, y) = (
            _place(value, start, step, last)
            for value, start, step, last in zip((row, column), self._starts, self._steps, self._last, strict=True)
        )
        cell = i * (self._last[1] + 1) + j
        result: Array = np.zeros(np.shape(cell))
        for coefficients in self._pieces[::-1]:
            c = [one.take(cell) for one in coefficients]
            result = result * x + (c[0] + y * (c[1] + y * (c[2] + y * c[3])))
        return result


def _place(at: Real, start: float, step: float, last: int) -> tuple[npt.NDArray[np.int64], Array]:
    """Return the piece that points lie in, from 0 to ``last``, and how far into it, in steps."""
    place = (np.asarray(at, dtype=np.float64) - start) / step
    piece = np.minimum(np.maximum(place, 0.0), last).astype(np.int64)
    return piece, place - piece
