"""What a topic of ``xcol explain`` holds."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass


@dataclass(frozen=True)
class Topic:
    """The model behind a line of a report; ``worked`` computes its number with the program itself."""

    name: str
    title: str
    model: str
    formula: tuple[str, ...]
    holds: str  # where it holds, and what it leaves out
    sources: tuple[str, ...]
    worked: Callable[[], str]
    words: tuple[str, ...] = ()  # other words that lead here
