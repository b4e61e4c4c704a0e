"""What ``xcol explain`` knows: one topic for every kind of part and for the figures of a report."""

from xcol.report.topics.liquids import LIQUIDS
from xcol.report.topics.parts import PARTS
from xcol.report.topics.quantities import QUANTITIES
from xcol.report.topics.ranges import RANGES
from xcol.report.topics.topic import Topic

__all__ = ["TOPICS", "Topic"]

TOPICS: tuple[Topic, ...] = (*PARTS, *QUANTITIES, *RANGES, *LIQUIDS)
