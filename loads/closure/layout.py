"""How a closure is put together: spans, stacks, posts and guides, and what width of water each takes.

A log spans from middle to middle of its bearings and is loaded over that length; the strip of a post between
the bearings of its two bays takes the water directly. So logs and strips together take all of it, once.
"""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from loads.arrays import FloatArray
from loads.records.closure import Closure

Indices = NDArray[np.intp]
Pieces = tuple[tuple[float, float], ...]
"""Widths of water, each with the elevation it reaches up to: (top, width). [m, m]"""


@dataclass(frozen=True, kw_only=True)
class Upright:
    """A post or a guide.

    Attributes
    ----------
    name
        For example "post 1".
    pieces
        Widths of water that it takes.
    across
        Middle of a post, or edge of the opening, from the left abutment. [m]
    """

    name: str
    pieces: Pieces
    across: float

    @property
    def width(self) -> float:
        """Width of water at the foot. [m]."""
        return sum(width for _, width in self.pieces)

    @property
    def top(self) -> float:
        """Highest elevation from which it takes load. [m]."""
        return max((top for top, _ in self.pieces), default=float("nan"))


@dataclass(frozen=True, kw_only=True)
class Layout:
    """Geometry of a closure.

    Attributes
    ----------
    sill
        Elevation. [m]
    log_height
        Effective height of a log. [m]
    clear
        Clear width of each bay. [m]
    bearing
        Bearing length at each end of a log, zero when not entered. [m]
    strip
        Width of a post between the bearings of its two bays. [m]
    counts
        Logs in place in each bay.
    """

    sill: float
    log_height: float
    clear: tuple[float, ...]
    bearing: float
    strip: float
    counts: tuple[int, ...]

    @cached_property
    def spans(self) -> FloatArray:
        """Span of each bay's logs, middle to middle of bearings, shape (b,). [m]."""
        return np.array(self.clear) + self.bearing

    @cached_property
    def tops(self) -> FloatArray:
        """Top of each bay's stack, shape (b,). [m]."""
        return self.sill + self.log_height * np.array(self.counts, dtype=float)

    @property
    def lowest_top(self) -> float:
        """Top of the lowest stack, where water goes over first. [m]."""
        return float(self.tops.min())

    @property
    def highest_top(self) -> float:
        """Top of the highest stack. [m]."""
        return float(self.tops.max())

    @property
    def rows(self) -> int:
        """Logs of the highest stack."""
        return max(self.counts)

    @cached_property
    def edges(self) -> FloatArray:
        """Elevations of the joints from the sill up, shape (rows + 1,). [m]."""
        return self.sill + self.log_height * np.arange(self.rows + 1, dtype=float)

    @cached_property
    def bay_of(self) -> Indices:
        """Bay of every log, from 0, shape (m,)."""
        return np.repeat(np.arange(len(self.counts)), self.counts)

    @cached_property
    def row_of(self) -> Indices:
        """Place of every log in its stack, from 0 at the sill, shape (m,)."""
        return np.concatenate([np.arange(count) for count in self.counts]).astype(np.intp)

    @cached_property
    def distinct_logs(self) -> Indices:
        """Logs of the first bay of each width and number of logs, shape (d,)."""
        first: dict[tuple[float, int], int] = {}
        for bay, kind in enumerate(zip(self.clear, self.counts, strict=True)):
            first.setdefault(kind, bay)
        return np.flatnonzero(np.isin(self.bay_of, list(first.values())))

    @cached_property
    def log_names(self) -> tuple[str, ...]:
        """Name of every log."""
        pairs = zip(self.bay_of.tolist(), self.row_of.tolist(), strict=True)
        return tuple(f"bay {bay + 1} log {row + 1}" for bay, row in pairs)

    @cached_property
    def posts(self) -> tuple[Upright, ...]:
        """Posts between the bays, from the left."""
        found, across = [], 0.0
        for number, ((left, right), (left_top, right_top)) in enumerate(
            zip(pairwise(self.spans.tolist()), pairwise(self.tops.tolist()), strict=True), 1
        ):
            gap = self.bearing + self.strip
            across += left - self.bearing + gap
            pieces = (
                (left_top, left / 2),
                (right_top, right / 2),
                (max(left_top, right_top), self.strip),
            )
            found.append(
                Upright(name=f"post {number}", pieces=_merged(pieces, self.sill), across=across - gap / 2)
            )
        return tuple(found)

    @cached_property
    def guides(self) -> tuple[Upright, Upright]:
        """Guides at the left and right abutment, seen from the protected side; bay 1 is at the left."""
        ends = (("left guide", 0, 0.0), ("right guide", -1, self.opening))
        left, right = (
            Upright(
                name=name,
                pieces=_merged(((float(self.tops[bay]), float(self.spans[bay]) / 2),), self.sill),
                across=across,
            )
            for name, bay, across in ends
        )
        return left, right

    @property
    def opening(self) -> float:
        """Width between the abutments. [m]."""
        return sum(self.clear) + (len(self.clear) - 1) * (self.bearing + self.strip)

    @property
    def loaded_width(self) -> float:
        """Width of water that logs and posts take together. [m]."""
        return float(self.spans.sum()) + (len(self.clear) - 1) * self.strip


def _merged(pieces: Pieces, sill: float) -> Pieces:
    """Pieces that reach equally high as one; none where there is no log or no width."""
    tops = dict.fromkeys(top for top, width in pieces if width > 0 and top > sill)
    return tuple((top, sum(width for own, width in pieces if own == top)) for top in tops)


def layout_of(closure: Closure) -> Layout:
    """Layout of a closure with its logs in place."""
    log, post = closure.log, closure.post
    bearing = log.bearing_length.value if log.bearing_length else 0.0
    width = post.width.value if post and post.width else 0.0
    return Layout(
        sill=closure.sill.value,
        log_height=log.height.value,
        clear=closure.widths,
        bearing=bearing,
        strip=max(width - bearing, 0.0),
        counts=closure.in_place,
    )
