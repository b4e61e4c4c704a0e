"""Write xcol/filters/curved_table.py: what a bend takes off the variance of a tube.

Run from the top of the repository: ``python tests/generate/curved_table.py`` (minutes). With ``--convergence`` it
prints instead how the figures of three strengths of bend change with the number of polynomials and of steps.

The moment equations of laminar flow in a bend, with Dean's first-order secondary flow (Dean, Phil. Mag. 4 (1927)
208; 5 (1928) 673, from memory), in units of the radius and of a²/D:

    2(1−r²)·∂m₁/∂t* = ∇²m₁ − 4·De²Sc·(u·∇m₁) + 1,   no flux at the wall

u has the stream function r(1−r²)²(4−r²) sin θ/1152. Of m₁ only what is left of it after the mean, t*, is kept; the
variance V(t*) of the dimensionless residence time is the integral over t* of twice its area mean. Galerkin
projection on Zernike's polynomials R_kj(r) cos kθ, k + 2j ≤ ``degree``, in which all integrals are exact; in t* an
L-stable third-order Runge-Kutta method (Alexander, SIAM J. Numer. Anal. 14 (1977) 1006, from memory) whose
steps double with every octave of t*.
"""

import sys
import textwrap
from concurrent.futures import ProcessPoolExecutor
from dataclasses import dataclass
from functools import cache
from pathlib import Path

import numpy as np
from scipy import sparse
from scipy.interpolate import CubicSpline
from scipy.sparse.linalg import splu
from scipy.special import eval_jacobi

TARGET = Path("xcol/filters/curved_table.py")
NODES_IN_DECADE = 12
T_STARS = 10.0 ** (np.arange(-5 * NODES_IN_DECADE, NODES_IN_DECADE + 1) / NODES_IN_DECADE)
STRENGTHS = 10.0 ** (np.arange(NODES_IN_DECADE, 6 * NODES_IN_DECADE + 1) / NODES_IN_DECADE)  # De²Sc
STEPS = 32  # in an octave of t*
FIRST = 1e-7  # t* of the first octave's end


def degree_for(strength):
    """Degree at which the figures have settled: to 1e-4 up to 1e5, to 0.3 % at 1e6."""
    return 60 if strength <= 1e4 else 120 if strength <= 1e5 else 240


@dataclass(frozen=True)
class Matrices:
    """Flow mass 2∫(1−r²)φφ, stiffness ∫∇φ·∇φ, advection ∫φ u·∇φ, the area means ∫φ and the constant 1.

    Every integral is a mean over the area of the disk; shape (n, n) or (n,).
    """

    mass: sparse.csc_matrix
    stiffness: sparse.csc_matrix
    advection: sparse.csc_matrix
    means: np.ndarray
    one: np.ndarray


@cache
def matrices(degree):
    """Return the matrices of the polynomials of this degree and below."""
    x, weights = np.polynomial.legendre.leggauss(degree + 12)
    r = (x + 1) / 2
    w = weights / 2 * r
    stream = np.polynomial.Polynomial([0, 1]) * np.polynomial.Polynomial([1, 0, -1]) ** 2
    stream = stream * np.polynomial.Polynomial([4, 0, -1]) / 1152
    over_r, slope = stream(r) / r, stream.deriv()(r)
    angular = [2.0] + [1.0] * degree  # ∫cos²kθ over the circle, over π
    values, slopes = [], []
    for k in range(degree + 1):
        v, d = _radial(k, (degree - k) // 2 + 1, r)
        scale = np.sqrt(angular[k] * (v * v) @ w)[:, None]
        values.append(v / scale)
        slopes.append(d / scale)

    blocks = {name: [[None] * (degree + 1) for _ in range(degree + 1)] for name in ("mass", "stiffness", "advection")}
    for k, (v, d) in enumerate(zip(values, slopes, strict=True)):
        blocks["mass"][k][k] = angular[k] * (v * (w * 2 * (1 - r * r))) @ v.T
        blocks["stiffness"][k][k] = angular[k] * ((d * w) @ d.T + (v * (w * k * k / r**2)) @ v.T)
        # u·∇ of v cos kθ, u_r = (stream/r) cos θ and u_θ = −stream′ sin θ, as cos (k±1)θ
        for other, sign in ((k + 1, -1), (k - 1, 1)):
            if 0 <= other <= degree:
                part = 0.5 * (over_r * d + sign * k * slope / r * v) * (2 if k == 0 else 1)
                blocks["advection"][other][k] = angular[other] * (values[other] * w) @ part.T
    size = sum(len(v) for v in values)
    means, one = np.zeros(size), np.zeros(size)
    means[: len(values[0])] = 2 * values[0] @ w
    one[0] = 1 / values[0][0, 0]
    return Matrices(*(sparse.block_array(block, format="csc") for block in blocks.values()), means, one)


def _radial(k, count, r):
    """Return r^k·P_j^(0,k)(2r²−1) and its slope, shape (count, len(r))."""
    v, d = np.empty((count, r.size)), np.empty((count, r.size))
    for j in range(count):
        jacobi = eval_jacobi(j, 0, k, 2 * r * r - 1)
        inner = (j + k + 1) / 2 * eval_jacobi(j - 1, 1, k + 1, 2 * r * r - 1) if j else 0.0
        v[j] = r**k * jacobi
        d[j] = (k * r ** (k - 1) * jacobi if k else 0.0) + r**k * 4 * r * inner
    return v, d


def variances(strength, degree, steps=STEPS):
    """Return V(t*) at ``T_STARS`` for this De²Sc, shape (73,)."""
    m = matrices(degree)
    flow = m.stiffness + 4 * strength * m.advection
    source = m.means - m.mass @ m.one
    gamma = 0.4358665215084590
    middle = (1 + gamma) / 2
    b1, b2 = -(6 * gamma**2 - 16 * gamma + 1) / 4, (6 * gamma**2 - 20 * gamma + 5) / 4
    state, total, t = np.zeros(len(source)), 0.0, 0.0
    step = FIRST / steps
    times, totals = [], []
    while t < T_STARS[-1]:
        stage = splu((m.mass + gamma * step * flow).tocsc())
        for _ in range(steps):
            k1 = stage.solve(source - flow @ state)
            first = state + gamma * step * k1
            k2 = stage.solve(source - flow @ (state + step * (middle - gamma) * k1))
            second = state + step * ((middle - gamma) * k1 + gamma * k2)
            k3 = stage.solve(source - flow @ (state + step * (b1 * k1 + b2 * k2)))
            state = state + step * (b1 * k1 + b2 * k2 + gamma * k3)
            total += 2 * step * m.means @ (b1 * first + b2 * second + gamma * state)
            t += step
            times.append(t)
            totals.append(total)
        step = t / steps
    log_t = np.log(times)
    relative = CubicSpline(log_t, np.log(totals) - 2 * log_t)  # ln Φ is the smoother one
    return T_STARS**2 * np.exp(relative(np.log(T_STARS)))


def long_tube_ratio(strength, degree):
    """Return g, the dispersion of a long bent tube over that of a straight one [-]."""
    m = matrices(degree)
    row = sparse.csc_matrix(m.mass @ m.one)
    bordered = sparse.block_array([[m.stiffness + 4 * strength * m.advection, row.T], [row, None]], format="csc")
    steady = splu(bordered).solve(np.append(m.means - m.mass @ m.one, 0.0))[:-1]
    return 48 * m.means @ steady


def row_of(strength, degree=None):
    """Return V over that of a straight tube at ``T_STARS``, and g, for one De²Sc."""
    degree = degree or degree_for(strength)
    return variances(strength, degree) / straight(), long_tube_ratio(strength, degree)


@cache
def straight():
    """Return V(t*) of a straight tube at ``T_STARS``, by the same steps."""
    return variances(0.0, 60)


def table():
    """Return the module's text."""
    with ProcessPoolExecutor() as pool:
        rows = list(pool.map(row_of, STRENGTHS[::-1]))[::-1]
    # a last digit of noise must not make a stronger bend mix less
    taken = np.maximum.accumulate([np.maximum(1 - row, 0.0) for row, _ in rows])
    return text_of(taken, np.array([1 - g for _, g in rows]))


def text_of(taken, taken_of_long):
    """Return the module's text with these values."""
    listed = "\n".join(f"        (\n{_wrapped(row, 12)}\n        )," for row in taken)
    return f'''"""Share of a straight tube's variance that a bend takes (see curved.py): De²Sc down, t* across.

Made by tests/generate/curved_table.py; a test makes some of its rows again and compares.
"""

import numpy as np

LOG_STRENGTHS = np.log({STRENGTHS[0]:g}) + np.log(10.0) / {NODES_IN_DECADE} * np.arange({STRENGTHS.size})  # ln De²Sc
LOG_T_STARS = np.log({T_STARS[0]:g}) + np.log(10.0) / {NODES_IN_DECADE} * np.arange({T_STARS.size})  # ln t*

_PER_UNIT = 1e6
# fmt: off
TAKEN = np.array(
    [
{listed}
    ]
) / _PER_UNIT
# of the dispersion in a long tube
TAKEN_OF_LONG = np.array([
{_wrapped(taken_of_long, 4)}
]) / _PER_UNIT
'''


def _wrapped(values, indent):
    """Return values in millionths, in lines of 120 columns."""
    text = ", ".join(f"{value * 1e6:.0f}" for value in values) + ","
    return textwrap.fill(text, 118, initial_indent=" " * indent, subsequent_indent=" " * indent)


def show_convergence():
    """Print figures of three strengths for rising degrees, and for steps half as long."""
    shown = [int(np.argmin(abs(np.log(T_STARS / t)))) for t in (1e-3, 1e-2, 1e-1, 1.0)]
    for strength, degrees in ((1e3, (20, 40, 60)), (1e5, (60, 90, 120, 160)), (1e6, (120, 160, 200, 240, 280))):
        for degree in degrees:
            v = variances(strength, degree)
            phi = ", ".join(f"{v[i] / T_STARS[i] ** 2:.6f}" for i in shown)
            print(f"De²Sc {strength:.0e}, degree {degree:3d}: g {long_tube_ratio(strength, degree):.6f}, Φ {phi}")
    for steps in (STEPS // 2, STEPS, 2 * STEPS):
        v = variances(1e4, 60, steps)
        phi = ", ".join(f"{v[i] / T_STARS[i] ** 2:.7f}" for i in shown)
        print(f"De²Sc 1e+04, {steps} steps an octave: Φ {phi}")


if __name__ == "__main__":
    if "--convergence" in sys.argv:
        show_convergence()
    else:
        TARGET.write_text(table(), encoding="utf-8")
