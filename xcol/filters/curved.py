"""Laminar flow in a bent tube: a secondary flow mixes the stream across the bore and lowers the variance.

For Dean numbers De up to about 20 Dean's first-order secondary flow is enough, and the only new parameter is
De²·Sc (Johnson and Kamm, J. Fluid Mech. 172 (1986) 329, abstract). The table holds the share that a bend takes
of the variance of a straight tube at the same t*, so that a bend that fades joins it without a step.
"""

from __future__ import annotations

from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.cubic import Curve, Surface, monotone_slopes
from xcol.filters.curved_table import LOG_STRENGTHS, LOG_T_STARS, TAKEN, TAKEN_OF_LONG
from xcol.filters.laminar import dimensionless_variance

if TYPE_CHECKING:
    from xcol.filters.cubic import Array
    from xcol.filters.interface import Real

# Above this Dean number the axial profile changes, too: the value there is kept, an upper estimate.
HIGHEST_DEAN = 20.0
_BLOCK = 8192  # points that are computed together
_WEAKEST, _STRONGEST = (float(end) for end in np.exp(LOG_STRENGTHS[[0, -1]]))
_SHORTEST, _LONGEST = (float(end) for end in np.exp(LOG_T_STARS[[0, -1]]))
_STEPS = (float(LOG_STRENGTHS[1] - LOG_STRENGTHS[0]), float(LOG_T_STARS[1] - LOG_T_STARS[0]))
_TAKEN = Surface((float(LOG_STRENGTHS[0]), float(LOG_T_STARS[0])), _STEPS, TAKEN)
_TAKEN_OF_LONG = Curve(float(LOG_STRENGTHS[0]), _STEPS[0], TAKEN_OF_LONG, monotone_slopes(TAKEN_OF_LONG))


def dean_number(reynolds: Real, bore: Real, curvature: Real) -> Real:
    """Dean number De = Re·√(a/R) [-]; Reynolds number on the diameter, ``bore`` [m], ``curvature`` 1/R [1/m].

    >>> round(float(dean_number(94.3, 0.25e-3, 1 / 0.03)), 2)
    6.09
    """
    result: Real = reynolds * np.sqrt(bore / 2 * curvature)
    return result


def bend_strength(dean: Real, schmidt: Real) -> Real:
    """De²·Sc [-], with De no higher than ``HIGHEST_DEAN``; ``schmidt`` number η/(ρ·D) [-].

    >>> round(float(bend_strength(6.09, 900.0)))
    33379
    """
    result: Real = np.square(np.minimum(dean, HIGHEST_DEAN)) * schmidt
    return result


def long_tube_ratio(strength: Real) -> Real:
    """Dispersion g of a long bent tube over that of a straight one [-], for this De²·Sc; any shape.

    >>> round(float(long_tube_ratio(1000.0)), 4)
    0.4836
    """
    inside = _within(strength, _WEAKEST, _STRONGEST)
    return _faded(_TAKEN_OF_LONG(np.log(inside)), strength)


def bent_variance(t_star: Real, strength: Real) -> Real:
    """Variance of the dimensionless residence time in a bent tube, t*²·Φ(t*, De²Sc); shapes broadcast.

    ``strength`` is De²·Sc [-], 0 for a straight tube; beyond 1e6 the value at 1e6 is kept. Within 0.1 % of the
    moment equations up to 1e5 and 0.5 % at 1e6. Monotone in both.

    >>> round(float(bent_variance(0.1, 1e4)) / 0.1**2, 4)
    0.0832
    """
    t = np.asarray(t_star, dtype=np.float64)
    if np.ndim(strength) == 0 and strength == 0:
        return dimensionless_variance(t)
    t, bends = np.broadcast_arrays(t, np.asarray(strength, dtype=np.float64))
    if t.size <= _BLOCK:
        return _bent(t, bends)
    found = np.empty(t.size)
    t_stars, bends = t.reshape(-1), bends.reshape(-1)
    for start in range(0, t.size, _BLOCK):  # what fits into the processor's cache is much quicker
        block = slice(start, start + _BLOCK)
        found[block] = _bent(t_stars[block], bends[block])
    return found.reshape(t.shape)


def _bent(t: Array, strength: Array) -> Real:
    inside = _within(t, _SHORTEST, _LONGEST)
    taken = _TAKEN(np.log(_within(strength, _WEAKEST, _STRONGEST)), np.log(inside))
    taken = taken * np.square(np.minimum(t / _SHORTEST, 1.0))  # the flow has had less and less time to mix
    variance: Real = dimensionless_variance(np.minimum(t, _LONGEST)) * _faded(taken, strength)
    if np.max(t, initial=0.0) > _LONGEST:  # from here on the variance is a line
        variance = variance + np.maximum(t - _LONGEST, 0.0) / 24 * long_tube_ratio(strength)
    return variance


def _within(value: Real, low: float, high: float) -> Real:
    result: Real = np.minimum(np.maximum(value, low), high)
    return result


def _faded(taken: Real, strength: Real) -> Real:
    """Return what is left of 1; what a bend weaker than the table takes fades with the square of its strength."""
    result: Real = 1 - taken * np.square(np.minimum(np.asarray(strength) / _WEAKEST, 1.0))
    return result
