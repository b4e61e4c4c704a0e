"""Write xcol/filters/laminar_modes.py: the eigenvalues of laminar flow in a round tube.

Run from the top of the repository: ``python tests/generate/laminar_modes.py``.
"""

from pathlib import Path

from xcol.filters.laminar import POLYNOMIALS, solve_modes

TARGET = Path("xcol/filters/laminar_modes.py")


def table() -> str:
    """Return the module's text."""
    eigenvalues, coupling = solve_modes(POLYNOMIALS)
    rows = zip(eigenvalues[1:], coupling[0, 1:] ** 2, strict=True)
    lines = "\n".join(f"        ({value!r}, {weight!r})," for value, weight in (map(float, r) for r in rows))
    return f'''"""Eigenvalues λ_j and weights β_j² of laminar flow in a round tube (see laminar.py).

Made by tests/generate/laminar_modes.py; a test makes the table again and compares.
"""

import numpy as np

_TABLE = np.array(
    [
{lines}
    ]
)
EIGENVALUES = _TABLE[:, 0]
WEIGHTS = _TABLE[:, 1]
'''


if __name__ == "__main__":
    TARGET.write_text(table(), encoding="utf-8")
