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
PATH = """\
title = "Invented: twelve parts"
flow = "0.5 mL/min"
viscosity = "0.8 mPa s"
temperature = "40 degC"
path = [
  { inject = "5 uL", loop = "20 uL" },
  { tube = "35 cm x 0.17 mm", name = "valve to filter" },
  { fitting = "inline filter", volume = "0.3 uL" },
  { tube = "12 cm x 0.13 mm", name = "filter to first column" },
  { column = "3.0 x 50 mm, 2.7 um", plates = 9000, total_porosity = 0.54, max_pressure = "600 bar" },
  { tube = "8 cm x 0.12 mm", name = "between columns" },
  { column = "3.0 x 100 mm, 2.7 um", plates = 18000, total_porosity = 0.54, max_pressure = "600 bar" },
  { tube = "25 cm x 0.12 mm", name = "column to cell" },
  { detector = "UV", cell = "2.5 uL", time_constant = "0.05 s", rate = "20 Hz", max_pressure = "60 bar" },
  { tube = "60 cm x 0.17 mm", name = "UV to MS" },
  { fitting = "union", gap = "0.2 mm" },
  { detector = "MS", rate = "5 Hz" },
]
peaks = [
  { name = "a", k = 1, diffusion = "1.0e-9 m^2/s" }, { name = "b", k = 2, diffusion = "9.0e-10 m^2/s" },
  { name = "c", k = 5, diffusion = "8.0e-10 m^2/s" }, { name = "d", k = 10, diffusion = "7.0e-10 m^2/s" },
]
"""
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
