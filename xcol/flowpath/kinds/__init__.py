"""The table of kinds of part: for each its keys, how its size is written, what it consists of.

A new kind of part is a row here (in ``stream.py`` or a module of its own), its filter in
``xcol/filters/`` and its entry in ``xcol/report/topics/``.
"""

from xcol.flowpath.kinds.column import COLUMN
from xcol.flowpath.kinds.detector import DETECTOR
from xcol.flowpath.kinds.stream import BLOCK, FITTING, INJECT, MIXER, OUTLET, TUBE
from xcol.flowpath.kinds.table import COMMON, Kind

__all__ = ["COMMON", "KINDS", "KINDS_LATER", "Kind"]

KINDS: dict[str, Kind] = {kind.name: kind for kind in (INJECT, TUBE, FITTING, MIXER, COLUMN, BLOCK, DETECTOR, OUTLET)}

# Kinds that the format has and that this version does not compute yet.
KINDS_LATER = ("split", "addition", "switch")
