"""How large a field sheet may be set so that all of it stands on one page, from the room its texts take.

Lengths are in millimetres on paper; the size of the type is in points. What is printed as PDF is laid out and
set smaller if the estimate was short; what is opened in a browser rests on the estimate.
"""

from __future__ import annotations

import math
from collections.abc import Iterable
from dataclasses import dataclass

from webapp.drawing.measure import text_width

SIZES = (13.0, 12.5, 12.0, 11.5, 11.0, 10.5, 10.0, 9.5, 9.0, 8.5, 8.0)
"""Sizes of type that are tried, the largest first; a sheet of usual length is set in 12 pt or more. [pt]"""
LINE = 1.16
"""Height of a line over the size of the type."""
PICTURE = (58.0, 42.0)
"""Width and height of the picture of the stack. [mm]"""
CODE = 37.0
"""Side of the picture of the link. [mm]"""
LABEL = 18.0
"""Width of the labels at the left. [mm]"""
SHEETS = {"letter": (193.9, 266.9), "A4": (188.0, 284.5)}
"""Width and height between the margins. [mm]"""

_MM = 25.4 / 72
_PAD = 1.4
_USUAL = 0.79
UNSEEN, SEEN = 2.0, -18.0
"""Room kept free where nobody lays the page out before it is printed, and where it is tried. [mm]"""


@dataclass(frozen=True, kw_only=True)
class Block:
    """Texts set in one column: each text begins a line."""

    texts: tuple[str, ...]
    width: float
    """Of the column. [mm]"""
    scale: float = 1.0
    """Size of its type over that of the sheet."""
    least: float = 0.0
    """Height that it takes at least. [mm]"""
    extra: float = 0.0
    """Height in widths of the letter m that is there besides the texts."""

    def height(self, size: float) -> float:
        """Height with its padding. [mm]."""
        type_size = size * self.scale * _MM
        lines = sum(rows_of(text, self.width / type_size) for text in self.texts)
        return max(lines * type_size * LINE + self.extra * size * _MM, self.least) + _PAD


def rows_of(text: str, ems: float) -> int:
    """Lines that a text takes in a column, as words usually run.

    Examples
    --------
    >>> rows_of("sill and slots clean", 40.0), rows_of("sill and slots clean " * 10, 40.0)
    (1, 3)
    """
    return max(math.ceil(text_width(text, 1.0) * _USUAL / ems), 1)


def type_size(blocks: Iterable[Block], paper: str, *, free: float = UNSEEN) -> float:
    """Largest size at which blocks that stand under each other fit on a sheet; the smallest when none does.

    Parameters
    ----------
    blocks
        From head to foot.
    paper
        A key of `SHEETS`.
    free
        Height to be left free. [mm]
    """
    stacked, room = list(blocks), SHEETS[paper][1] - free
    return next((size for size in SIZES if sum(block.height(size) for block in stacked) <= room), SIZES[-1])
