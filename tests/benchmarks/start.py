"""Whole-process time of ``xcol budget`` on a 12-part file against importing the dependencies.

Run by hand or by CI, in an environment with a plain install of xcol: ``python tests/benchmarks/start.py``.
Prints ratios, and never fails on them. The two are timed in turn, so that both see the same machine.
"""

import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

NAIVE = "import numpy, pint, rich.table, typer; pint.UnitRegistry()"
PATH = Path(__file__).with_name("twelve.toml").read_text(encoding="utf-8")
# the same path, its liquid, columns and solutes by name
BY_NAME = (
    PATH.replace('viscosity = "0.8 mPa s"', 'mobile_phase = "water/acetonitrile 60:40"\nambient = "22 degC"')
    .replace("plates = 9000", 'packing = "core-shell"')
    .replace("plates = 18000", 'packing = "core-shell"')
    .replace('diffusion = "1.0e-9 m^2/s"', 'solute = "caffeine"')
    .replace('diffusion = "9.0e-10 m^2/s"', 'molar_mass = "300 g/mol"')
)
RUNS = 15


def seconds(command: list[str], folder: str) -> float:
    """Return the time that one run of a command takes, away from the sources: the installed package."""
    begin = time.perf_counter()
    subprocess.run(command, check=True, stdout=subprocess.DEVNULL, cwd=folder)
    return time.perf_counter() - begin


def main() -> None:
    """Time the commands in turn and print the medians and the median of the ratios."""
    with tempfile.TemporaryDirectory() as folder:
        path = Path(folder) / "twelve.toml"
        path.write_text(PATH, encoding="utf-8")
        by_name = Path(folder) / "by-name.toml"
        by_name.write_text(BY_NAME, encoding="utf-8")
        naive = [sys.executable, "-c", NAIVE]
        commands = {
            "budget": [sys.executable, "-m", "xcol", "budget", str(path)],
            "budget, by name": [sys.executable, "-m", "xcol", "budget", str(by_name)],
            "budget --full": [sys.executable, "-m", "xcol", "budget", str(path), "--full"],
            "budget --format json": [sys.executable, "-m", "xcol", "budget", str(path), "--format", "json"],
            "check": [sys.executable, "-m", "xcol", "check", str(path)],
            "explain": [sys.executable, "-m", "xcol", "explain"],
        }
        for command in commands.values():
            seconds(command, folder)
        seconds(naive, folder)
        for name, command in commands.items():
            pairs = [(seconds(command, folder), seconds(naive, folder)) for _ in range(RUNS)]
            ours, theirs = (statistics.median(column) for column in zip(*pairs, strict=True))
            ratio = statistics.median(one / other for one, other in pairs)
            print(f"xcol {name}: {ours:.3f} s, naive imports {theirs:.3f} s, ratio {ratio:.2f}")


if __name__ == "__main__":
    main()
