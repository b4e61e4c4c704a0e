"""Time of 100,000 draws of a 12-part path against the bare NumPy arithmetic of the same formulas.

Run by hand: ``python tests/benchmarks/draws.py``. Prints a ratio, and never fails on it. The bare arithmetic is
written out below for this one path: the same uniform numbers, the same functions of t* and De²Sc, one line a part.
"""

import math
import statistics
import time
from pathlib import Path

import numpy as np

from xcol.answers.budget import budget
from xcol.answers.draws import Draws
from xcol.answers.likely import Sampler
from xcol.filters.curved import bent_variance
from xcol.flowpath.reader import parse
from xcol.flowpath.unknowns import Between, Factor, LogBetween, OneOf

PATH = Path(__file__).with_name("twelve.toml").read_text(encoding="utf-8")
COUNT = 100_000
RUNS = 7
FLOW, VISCOSITY, DENSITY, DIFFUSION = 0.5e-6 / 60, 0.8e-3, 1000.0, 9e-10


def bare():
    """Return share of the plates kept by the MS of k = 2, one a draw, and what was drawn."""
    draws = Draws(COUNT, 1)
    numbers = iter(range(100))
    drawn = []

    def draw(spread):
        drawn.append(draws.of(f"bare {next(numbers)}", spread))
        return drawn[-1]

    def tube(length, bore):
        bend = draw(Between(0.0, 1 / 0.03))
        bore = bore * draw(Factor(0.05))
        length = length * draw(Factor(0.02))
        t = math.pi * DIFFUSION * length / FLOW
        reynolds = 4 * DENSITY * FLOW / (math.pi * bore * VISCOSITY)
        dean = np.minimum(reynolds * np.sqrt(bore / 2 * bend), 20.0)
        velocity = FLOW / (math.pi / 4 * bore**2)
        return (
            t,
            (bore / 2) ** 2 / DIFFUSION,
            dean**2 * VISCOSITY / (DENSITY * DIFFUSION),
            (2 * DIFFUSION * length / velocity**3),
        )

    def alone(one):
        t, unit, strength, axial = one
        return unit**2 * bent_variance(t, strength) + axial

    def shared(one, other, joined):
        strength = np.maximum(one[2], other[2])
        whole, left, right = (bent_variance(t, strength) for t in (one[0] + other[0], one[0], other[0]))
        return joined * one[1] * other[1] * (whole - left - right)

    injected = (5e-9 / FLOW) ** 2 * draw(Between(1 / 12, 1 / 4))
    first = tube(0.35, 0.17e-3)
    remixed = draw(OneOf((0.0, 1.0)))
    filtered = (0.3e-9 / FLOW) ** 2 * draw(LogBetween(1 / 12, 1.35))
    second, third, fourth = tube(0.12, 0.13e-3), tube(0.08, 0.12e-3), tube(0.25, 0.12e-3)
    cell_bore = math.sqrt(4 * 2.5e-9 / (math.pi * 0.01))
    t = math.pi * DIFFUSION * 0.01 / FLOW
    whole = (
        float(bent_variance(t, 0.0)) / t**2
        + 2 * DIFFUSION * 0.01 / (4 * FLOW / (math.pi * cell_bore**2)) ** 3 / (2.5e-9 / FLOW) ** 2
    )
    cell = (2.5e-9 / FLOW) ** 2 / 12 * (12 * whole) ** draw(Between(0.0, 1.0))
    fifth = tube(0.6, 0.17e-3)
    draw(OneOf((0.0, 1.0)))
    union = (math.pi / 4 * (25.4e-3 / 16) ** 2 * 0.2e-3 / FLOW) ** 2 * draw(LogBetween(1 / 12, 1.35))
    extra = injected + alone(first) + alone(second) + shared(first, second, 1 - remixed) + filtered
    extra = extra + alone(third) + alone(fourth) + cell + alone(fifth) + union + 0.2**2 / 12
    column = sum(
        (0.54 * math.pi / 4 * 3e-3**2 * length / FLOW * 3) ** 2 / (plates * draw(Factor(0.1)))
        for length, plates in ((0.05, 9000), (0.1, 18000))
    )
    return column / (column + extra), drawn


def bare_interval():
    """Return the interval, with all that goes with it done in plain NumPy: the sorts and the shares of the scatter."""
    kept, drawn = bare()
    ordered = np.sort(kept)
    for values in drawn:
        np.var(kept[np.argsort(values)].reshape(20, -1).mean(axis=1))
    return ordered[[COUNT // 20, COUNT - COUNT // 20]]


def ours(answer):
    """Return the program's own interval."""
    at = answer.detectors[-1]
    return Sampler(answer, COUNT, 1).of(at, at.peaks[1]).plates_kept


def seconds(call, *given):
    """Return the time that a call takes."""
    begin = time.perf_counter()
    call(*given)
    return time.perf_counter() - begin


def main() -> None:
    """Time the three in turn and print the medians of the ratios."""
    answer = budget(parse(PATH, "twelve.toml"))
    print("intervals of the plates kept:", ours(answer), bare_interval())
    times = [(seconds(ours, answer), seconds(bare), seconds(bare_interval)) for _ in range(RUNS)]
    whole, formulas, interval = (statistics.median(column) for column in zip(*times, strict=True))
    print(f"{COUNT} draws: {whole:.3f} s; bare arithmetic {formulas:.3f} s, with sorts and shares {interval:.3f} s")
    print(f"ratio to the bare arithmetic {statistics.median(a / b for a, b, _ in times):.2f}", end=", ")
    print(f"with sorts and shares {statistics.median(a / c for a, _, c in times):.2f}")


if __name__ == "__main__":
    main()
