"""How much room words take, estimated for the widest of the usual system fonts; where labels go."""

from __future__ import annotations

import unicodedata
from functools import lru_cache

_NARROW = frozenset("iljtfrI.,:;'|!()[]/- \u00a0\u202f·")
_WIDE = frozenset("mwMW@%—…▲▼")


@lru_cache(maxsize=4096)
def _ems(text: str) -> float:
    total = 0.0
    for letter in text:
        if letter in _NARROW:
            total += 0.4
        elif letter in _WIDE or unicodedata.east_asian_width(letter) in "WF":
            total += 1.0
        elif letter.isupper():
            total += 0.72
        else:
            total += 0.63
    return total


def text_width(text: str, size: float, *, bold: bool = False) -> float:
    """Estimated width of a line of text. [px]."""
    return _ems(text) * size * (1.1 if bold else 1.0)


def shortened(text: str, width: float, size: float, *, bold: bool = False) -> str:
    """Text cut to a width, with an ellipsis where something is missing."""
    if text_width(text, size, bold=bold) <= width:
        return text
    while text and text_width(text + "…", size, bold=bold) > width:
        text = text[:-1]
    return text.rstrip() + "…"


def wrapped(text: str, width: float, size: float, *, lines: int, bold: bool = False) -> list[str]:
    """Text broken between words into at most so many lines, the last one cut to the width if need be."""
    rows: list[str] = []
    for word in text.split(" "):
        joined = f"{rows[-1]} {word}" if rows else word
        if rows and (text_width(joined, size, bold=bold) <= width or len(rows) == lines):
            rows[-1] = joined
        else:
            rows.append(word)
    return [shortened(row, width, size, bold=bold) for row in rows if row]


def spread(wanted: list[float], gap: float, low: float, high: float) -> list[float]:
    """Places for labels in a column, in order, at least `gap` apart, as near as can be to where they belong.

    Parameters
    ----------
    wanted
        Places in rising order. [px]
    gap
        Least distance between neighbours; less where they do not all fit. [px]
    low, high
        Ends of the column. [px]

    Returns
    -------
    list of float
        Places in the same order. [px]

    Examples
    --------
    >>> spread([10.0, 12.0, 50.0], 10.0, 0.0, 60.0)
    [6.0, 16.0, 50.0]
    """
    last = len(wanted) - 1
    if last > 0:
        gap = min(gap, (high - low) / last)
    groups: list[tuple[float, int]] = []
    for position, place in enumerate(wanted):
        mean, count = place - position * gap, 1
        while groups and groups[-1][0] > mean:
            before, size = groups.pop()
            mean = (before * size + mean * count) / (size + count)
            count += size
        groups.append((mean, count))
    starts = [min(max(mean, low), high - last * gap) for mean, count in groups for _ in range(count)]
    return [start + position * gap for position, start in enumerate(starts)]
