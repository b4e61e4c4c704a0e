"""Write xcol/filters/straight_table.py: second and third moment of a straight tube against t*.

Run from the top of the repository: ``python tests/generate/straight_table.py``. The values are the sums over all
modes of laminar.py; the slopes are theirs, too (of the third moment by central differences).
"""

from pathlib import Path

import numpy as np

from xcol.filters.laminar import run_third_moment, variance_by_modes
from xcol.filters.laminar_modes import EIGENVALUES, WEIGHTS

TARGET = Path("xcol/filters/straight_table.py")
NODES_IN_DECADE = 24
T_STARS = 10.0 ** (np.arange(-5 * NODES_IN_DECADE, NODES_IN_DECADE // 2 + 1) / NODES_IN_DECADE)
STEP = 1e-4  # of ln t*, for the slopes of the third moment


def table():
    """Return the module's text."""
    variance = variance_by_modes(T_STARS)
    rise = -np.expm1(-np.multiply.outer(T_STARS, EIGENVALUES)) @ (2 * WEIGHTS / EIGENVALUES)
    third = [np.log(run_third_moment([T_STARS * np.exp(step)], [1.0])) for step in (-STEP, 0.0, STEP)]
    log_t = np.log(T_STARS)
    columns = (
        np.log(variance) - 2 * log_t,
        T_STARS * rise / variance - 2,
        third[1] - 3 * log_t,
        (third[2] - third[0]) / (2 * STEP) - 3,
    )
    rows = "\n".join(f"        ({a:.12f}, {b:.12f}, {c:.12f}, {d:.9f})," for a, b, c, d in zip(*columns, strict=True))
    end = T_STARS[-1]
    moments = [float(run_third_moment([t], [1.0])) for t in (end, 2 * end)]
    slope = (moments[1] - moments[0]) / end
    return f'''"""Moments of laminar flow in a straight tube over t*² and t*³ (see laminar.py), a row each t*.

Made by tests/generate/straight_table.py; a test makes the table again and compares. The columns are ln Φ, its
slope over ln t*, the logarithm of the third central moment over t*³, and its slope.
"""

import numpy as np

LOG_T_STARS = np.log(10.0) * np.arange({-5 * NODES_IN_DECADE}, {NODES_IN_DECADE // 2 + 1}) / {NODES_IN_DECADE}

LOG_MOMENTS = np.array(
    [
{rows}
    ]
)
# beyond the table the third central moment is a line: its slope, and its value at t* = 0
THIRD_SLOPE, THIRD_START = {slope:.12g}, {moments[0] - slope * end:.12g}
'''


if __name__ == "__main__":
    TARGET.write_text(table(), encoding="utf-8")
