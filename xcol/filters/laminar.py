"""Laminar flow in a straight round tube: the exact spread of residence times at its outlet.

In s = (r/a)² and t* = D·t/a² the moments of the residence time obey

    2(1−s)·∂m_n/∂t* = 4·∂/∂s(s·∂m_n/∂s) + n·m_{n−1},   m_0 = 1,   no flux at the wall

(radially mixed at the inlet, averaged with the flow at the outlet). Galerkin projection on
polynomials in s turns this into a symmetric eigenproblem, solved once; all else is closed form in
its eigenvalues λ_j and in the matrix C that couples the modes.

Sources: the moment method of Aris, Proc. R. Soc. A 235 (1956) 67; long-tube limit of Taylor, Proc.
R. Soc. A 219 (1953) 186; both from memory.
"""

from __future__ import annotations

from functools import cache
from typing import TYPE_CHECKING

import numpy as np

from xcol.filters.cubic import Curve
from xcol.filters.laminar_modes import EIGENVALUES, WEIGHTS
from xcol.filters.straight_table import LOG_MOMENTS, LOG_T_STARS, THIRD_SLOPE, THIRD_START

if TYPE_CHECKING:
    import numpy.typing as npt

    from xcol.filters.interface import Real

    Matrix = npt.NDArray[np.float64]

# 32 to 64 polynomials agree to 8 digits for t* ≥ 1e-3 and to 3e-6 at 1e-5; more of them only lose
# digits, since the largest eigenvalue grows with the fourth power of their number and more.
POLYNOMIALS = 40
# Below this the entrance and axial diffusion blur the picture: the flow is nearly unmixed.
UNMIXED_BELOW = 1e-3
_UNMIXED_SLOPE = -0.365  # of the third moment over t*³ against t*, both as logarithms, below the table
# From this t* on, and below this dimensionless frequency, the slowest mode alone is left (the next
# one has decayed to e^−500 of it).
SLOW_BEYOND, SLOW_BELOW = 40.0, 5.0
_STEP = float(LOG_T_STARS[1] - LOG_T_STARS[0])
_FIRST, _LAST = (float(t) for t in np.exp(LOG_T_STARS[[0, -1]]))
_LOG_RELATIVE, _LOG_THIRD = (
    Curve(float(LOG_T_STARS[0]), _STEP, LOG_MOMENTS[:, column], LOG_MOMENTS[:, column + 1] * _STEP) for column in (0, 2)
)

_QUADRATURE = 48  # points of the integral for the fourth moment: 40 to 80 agree to 8 digits
FAST_BEYOND = 1e6  # decay constants times t* from which a mode follows the others at once


def solve_modes(polynomials: int) -> tuple[Matrix, Matrix]:
    """Solve the eigenproblem with this many shifted Legendre polynomials.

    Returns the eigenvalues λ of all modes, shape (n,), ascending from 0, and the coupling matrix
    C = VᵀAV − 1, shape (n, n), in the basis in which the flow-weighted mass matrix is 1. C[0, 0] is
    0: the mean delay has been taken out, so that moments come out central.
    """
    points, weights = np.polynomial.legendre.leggauss(polynomials + 2)
    s, weights = (points + 1) / 2, weights / 2
    values = np.polynomial.legendre.legvander(points, polynomials - 1)
    slopes = np.zeros_like(values)
    for i in range(1, polynomials):  # P'_i = P'_{i−2} + (2i−1) P_{i−1}
        slopes[:, i] = (2 * i - 1) * values[:, i - 1] + (slopes[:, i - 2] if i > 1 else 0)
    scale = np.sqrt(2 * np.arange(polynomials) + 1)  # makes the area mass ∫P_iP_j ds the unit matrix
    values, slopes = values * scale, 2 * slopes * scale
    stiffness = 4 * (slopes * (weights * s)[:, None]).T @ slopes
    flow_mass = 2 * (values * (weights * (1 - s))[:, None]).T @ values
    inverse = np.linalg.inv(np.linalg.cholesky(flow_mass))
    eigenvalues, vectors = np.linalg.eigh(inverse @ stiffness @ inverse.T)
    eigenvalues[0] = 0.0  # the constant: nothing decays
    modes = inverse.T @ vectors
    return eigenvalues, modes.T @ modes - np.eye(polynomials)


@cache
def modes() -> tuple[Matrix, Matrix]:
    """Return eigenvalues and coupling matrix with the program's number of polynomials."""
    return solve_modes(POLYNOMIALS)


def variance_by_modes(t_star: Real) -> Real:
    """Variance of the dimensionless residence time, V(t*) = t*²Φ(t*), from its definition; any shape.

    V(t*) = 2 Σ_j β_j² (t*/λ_j − (1 − e^{−λ_j t*})/λ_j²), β_j the coupling of mode j to the mean.
    """
    x = np.multiply.outer(t_star, EIGENVALUES)
    # λ²·(the bracket) = x − 1 + e⁻ˣ, written so that short tubes keep their digits
    result: Real = ((x + np.expm1(-x)) / EIGENVALUES**2) @ (2 * WEIGHTS)
    return result


def dimensionless_variance(t_star: Real) -> Real:
    """Variance of the dimensionless residence time, V(t*) = t*²Φ(t*); any shape.

    From a table in ln t*, within 1e-7 of ``variance_by_modes``, since many draws need it. Valid for
    t* ≥ 0; below 1e-3 see ``UNMIXED_BELOW``.

    >>> round(float(dimensionless_variance(0.1)) / 0.1**2, 5)
    0.22379
    """
    t = np.asarray(t_star, dtype=np.float64)
    if not t.size:
        return t
    inside = np.minimum(np.maximum(t, _FIRST), _LAST)
    variance = np.square(t) * np.exp(_LOG_RELATIVE(np.log(inside)))
    if t.max() > _LAST:
        variance = np.where(t > _LAST, t / 24 - 1 / 384, variance)
    short = (t < _FIRST) & (t > 0)
    if short.any():
        variance = np.array(variance)
        variance[short] = variance_by_modes(t[short])
    result: Real = variance
    return result


def relative_variance(t_star: Real) -> Real:
    """Φ(t*) = σ_t²/t̄² without axial diffusion; ``t_star`` > 0, any shape.

    >>> round(float(relative_variance(1.0)), 5)  # 1/24 − 1/384
    0.03906
    """
    return dimensionless_variance(t_star) / np.square(t_star)


def t_star_of(relative: Real) -> Real:
    """Return the t* at which a straight tube has this Φ, the inverse of ``relative_variance``; any shape.

    >>> round(float(t_star_of(0.22379)), 4)
    0.1
    """
    phi = np.asarray(relative, dtype=np.float64)
    # 1/(24t) − 1/(384t²) for long tubes, solved for 1/t; the curve of the table otherwise
    long = 1 / (8 - np.sqrt(64 - 384 * np.minimum(phi, 1 / 6)))
    nodes = LOG_MOMENTS[::-1, 0]
    log_t = np.interp(np.log(phi), nodes, LOG_T_STARS[::-1])
    for _ in range(4):  # from within 1e-3 to the last digit
        step = 1e-6
        value, ahead = _LOG_RELATIVE(log_t), _LOG_RELATIVE(log_t + step)
        log_t = log_t - (value - np.log(phi)) * step / (ahead - value)
    result: Real = np.where(phi < np.exp(LOG_MOMENTS[-1, 0]), long, np.exp(log_t))
    return result


def dimensionless_third_moment(t_star: Real) -> Real:
    """Third central moment of the dimensionless residence time of one tube [-]; ``t_star`` > 0, any shape.

    From a table in ln t*, within 1e-7 of ``run_third_moment``. Below 1e-5, where the modes do not suffice, the slope
    of the table's beginning goes on, on its way to the −1/3 of flow that nothing mixes but a layer at the wall: 2 %
    of the variance of a full loop at 1e-7.
    """
    t = np.asarray(t_star, dtype=np.float64)
    inside = np.minimum(np.maximum(t, _FIRST), _LAST)
    short = np.minimum(t, _FIRST) / _FIRST
    relative = np.exp(_LOG_THIRD(np.log(inside))) * short**_UNMIXED_SLOPE
    result: Real = np.where(t > _LAST, THIRD_START + THIRD_SLOPE * t, t**3 * relative)
    return result


class _Moments:
    """The modes of the first and second moment on their way through tubes, each step in closed form.

    b₁' = −Λb₁ + wβ and b₂' = −Λb₂ + 2wC b₁, of which μ₃' = 3wβ·b₂; ``w`` = a²/D [s], axes before the modes' own.
    """

    def __init__(self, shape: tuple[int, ...]) -> None:
        eigenvalues, coupling = modes()
        self._rates, self._beta, self._inner = eigenvalues[1:], coupling[0, 1:], coupling[1:, 1:]
        self._diagonal = np.diag(self._inner)
        gaps = np.subtract.outer(self._rates, self._rates)
        np.fill_diagonal(gaps, np.inf)  # the diagonal has a limit of its own, below
        self._mixed = (self._inner / gaps).T
        self.first: Matrix = np.zeros((*shape, len(self._rates)))
        self.second: Matrix = np.zeros_like(self.first)

    def through(self, t: Matrix, w: Matrix) -> Matrix:
        """Go through a tube, ``t`` its t* and ``w`` with a last axis of one; return what it adds to μ₃."""
        rates = self._rates
        decay = np.exp(-rates * t)
        integral = -np.expm1(-rates * t) / rates  # of the decay
        steady = w * self._beta / rates
        moving = self.first - steady
        pushed = steady @ self._inner.T  # C·steady
        # Σ_k C_jk r_k (e^{−λ_k t} − e^{−λ_j t})/(λ_j − λ_k), and the same integrated over t
        swept = (moving * decay) @ self._mixed - decay * (moving @ self._mixed)
        swept_integral = (moving * integral) @ self._mixed - integral * (moving @ self._mixed)
        swept += self._diagonal * moving * t * decay
        swept_integral += self._diagonal * moving * (integral - t * decay) / rates
        second_integral = self.second * integral + 2 * w * (pushed * (t - integral) / rates + swept_integral)
        self.second = self.second * decay + 2 * w * (pushed * integral + swept)
        self.first = steady + moving * decay
        added: Matrix = 3 * (w * second_integral) @ self._beta
        return added


def run_third_moment(t_stars: list[Real], time_units: list[Real]) -> Real:
    """Third central moment [s³] of tubes in a row whose layers run on from one to the next.

    ``t_stars`` [-] and ``time_units`` w = a²/D [s], one entry a tube, each a float or an array of
    one common shape.
    """
    shape = np.broadcast_shapes(*(np.shape(t) for t in [*t_stars, *time_units]))
    state = _Moments(shape)
    total: Real = np.zeros(shape)
    for t_star, unit in zip(t_stars, time_units, strict=True):
        t, w = (np.broadcast_to(np.asarray(value, dtype=np.float64), shape)[..., None] for value in (t_star, unit))
        total = total + state.through(t, w)
    return total


def fourth_moment(t_star: Real) -> Real:
    """Fourth central moment of the dimensionless residence time of one tube [-]; any shape.

    μ₄' = 4β·b₃ with b₃' = −Λb₃ + 3(C b₂ + βμ₂); the order of both integrals exchanged,
    μ₄ = 12 ∫ b₁(t*−t)·(C b₂(t) + βμ₂(t)) dt, by Gauss-Legendre quadrature, denser at both ends.
    """
    eigenvalues, coupling = modes()
    x, weights = np.polynomial.legendre.leggauss(_QUADRATURE)
    angle = np.pi / 4 * (x + 1)
    t = np.multiply.outer(t_star, np.sin(angle) ** 2)  # its derivative is t*·sin 2θ
    state = _Moments(t.shape)
    state.through(t[..., None], np.ones((*t.shape, 1)))
    pushed = state.second @ coupling[1:, 1:].T + variance_by_modes(t)[..., None] * coupling[0, 1:]  # type: ignore[index]
    left = np.asarray(t_star, dtype=np.float64)[..., None] - t
    first = -np.expm1(-eigenvalues[1:] * left[..., None]) * coupling[0, 1:] / eigenvalues[1:]
    integrand = (first * pushed).sum(axis=-1)
    result: Real = 12 * t_star * (integrand @ (weights * np.pi / 4 * np.sin(2 * angle)))
    return result


def run_transfer(t_stars: list[Real], time_units: list[Real], omega: Real) -> npt.NDArray[np.complex128]:
    """H(ω) about the mean delay of tubes in a row whose layers run on; S + omega.shape.

    ``t_stars`` [-] and ``time_units`` a²/D [s] one entry a tube, of one common shape S; ``omega``
    [rad/s]. Applies exp(−(Λ + iωwC)t*) of each tube to the constant, the last tube first.
    """
    eigenvalues, _ = modes()
    shape = np.broadcast_shapes(*(np.shape(t) for t in [*t_stars, *time_units]))
    frequencies = np.atleast_1d(np.asarray(omega, dtype=np.float64)).ravel()
    stretch = [np.broadcast_to(np.asarray(t, dtype=np.float64), shape).ravel() for t in t_stars]
    units = [np.broadcast_to(np.asarray(w, dtype=np.float64), shape).ravel() for w in time_units]
    result = np.empty((int(np.prod(shape)), frequencies.size), dtype=np.complex128)
    for index in range(result.shape[0]):
        state = np.zeros((frequencies.size, len(eigenvalues)), dtype=np.complex128)
        state[:, 0] = 1.0
        for t, w in zip(reversed(stretch), reversed(units), strict=True):
            state = _through_tube(float(t[index]), float(w[index]) * frequencies, state)
        result[index] = state[:, 0]
    return result.reshape(shape + np.shape(omega))


def _through_tube(t_star: float, frequencies: Matrix, state: npt.NDArray[np.complex128]) -> npt.NDArray[np.complex128]:
    """Apply exp(−(Λ + iΩC)t*) to the state of each frequency Ω [-], shape (frequencies, modes)."""
    slow = (np.abs(frequencies) <= SLOW_BELOW) & (t_star > SLOW_BEYOND)
    result = np.empty_like(state)
    if slow.any():
        result[slow] = _by_slowest_mode(t_star, frequencies[slow], state[slow])
    if not slow.all():
        result[~slow] = _by_all_modes(t_star, frequencies[~slow], state[~slow])
    return result


def _by_all_modes(t_star: float, frequencies: Matrix, state: npt.NDArray[np.complex128]) -> npt.NDArray[np.complex128]:
    """Do the same by the eigenvalues of Λ + iΩC.

    Modes that decay within a millionth of the tube follow the others at once, x_f = −R_ff⁻¹R_fs x_s.
    Leaving them in would cost digits: eigenvalues come out to 1e-16 of the largest.
    """
    eigenvalues, coupling = modes()
    rates = np.diag(eigenvalues) + 1j * frequencies[:, None, None] * coupling
    kept = int(np.count_nonzero(eigenvalues * t_star <= FAST_BEYOND))
    follow = -np.linalg.solve(rates[:, kept:, kept:], rates[:, kept:, :kept])
    reduced = rates[:, :kept, :kept] + rates[:, :kept, kept:] @ follow
    roots, vectors = np.linalg.eig(reduced)
    weights = np.linalg.solve(vectors, state[:, :kept, None])
    inner = vectors @ (np.exp(-roots * t_star)[..., None] * weights)
    result: npt.NDArray[np.complex128] = np.concatenate([inner, follow @ inner], axis=1)[..., 0]
    return result


def _by_slowest_mode(
    t_star: float, frequencies: Matrix, state: npt.NDArray[np.complex128]
) -> npt.NDArray[np.complex128]:
    """Do the same for a long tube, where all modes but the slowest have decayed.

    A general eigenvalue routine finds the slowest mode to 1e-16 of the fastest, which is 1e9 times
    faster: too coarse once it is multiplied by a long t*. Here it comes from its own equations,
    scaled with Λ: (Λ + iΩC − μ)x = −iΩβ, μ = iΩβ·x, iterated from μ = 0.
    """
    eigenvalues, coupling = modes()
    roots = np.sqrt(eigenvalues[1:])
    scaled = coupling[1:, 1:] / np.multiply.outer(roots, roots)
    beta = coupling[0, 1:] / roots
    turn = 1j * frequencies
    matrix = np.eye(len(roots)) + turn[:, None, None] * scaled
    mu = np.zeros(len(frequencies), dtype=np.complex128)
    for _ in range(12):  # the error falls by more than 20 times at each step
        shifted = matrix - mu[:, None, None] * np.diag(1 / eigenvalues[1:])
        inner = np.linalg.solve(shifted, -turn[:, None, None] * beta[:, None])[..., 0]
        mu = turn * (inner @ beta)
    mode = np.concatenate([np.ones((len(frequencies), 1)), inner / roots], axis=1)
    share = (mode * state).sum(axis=1) / (mode * mode).sum(axis=1) * np.exp(-mu * t_star)
    result: npt.NDArray[np.complex128] = mode * share[:, None]
    return result
