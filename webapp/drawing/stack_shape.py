"""Where the parts of a closure are, seen from the protected side: logs, posts and guides."""

from __future__ import annotations

from dataclasses import dataclass
from itertools import groupby, pairwise

from loads.checks import Verdict
from loads.closure.layout import Layout, layout_of
from loads.records.closure import Closure
from webapp.drawing.svg import Point

_LEAST_GAP = 0.012


@dataclass(frozen=True, kw_only=True)
class Run:
    """Logs of one bay that lie on one another and have the same verdict.

    Attributes
    ----------
    left, right, bottom, top
        Across from the left abutment, and elevation. [m]
    first, last
        Numbers of its lowest and its highest log, counted from the sill.
    verdict
        Of each of them; None for logs that are not in place.
    """

    left: float
    right: float
    bottom: float
    top: float
    first: int
    last: int
    verdict: Verdict | None


@dataclass(frozen=True, kw_only=True)
class Upright:
    """A post, or a guide at an abutment.

    Attributes
    ----------
    name
        For example "post 1".
    left, right, bottom, top
        Across from the left abutment, and elevation. [m]
    verdict
        None for a guide that nobody checks.
    """

    name: str
    left: float
    right: float
    bottom: float
    top: float
    verdict: Verdict | None


@dataclass(frozen=True, kw_only=True)
class StackShape:
    """A closure as a crew sees it.

    Attributes
    ----------
    layout
        Spans, counts and heights.
    on_hand
        Logs on hand for each bay.
    bays
        Ends of each bay across. [m]
    runs
        Logs, in place and not.
    posts, guides
        Uprights, from the left.
    top
        Highest elevation of any part. [m]
    """

    layout: Layout
    on_hand: tuple[int, ...]
    bays: tuple[tuple[float, float], ...]
    runs: tuple[Run, ...]
    posts: tuple[Upright, ...]
    guides: tuple[Upright, Upright]
    top: float

    @property
    def width(self) -> float:
        """Width between the abutments. [m]."""
        return self.bays[-1][1]

    @property
    def rows(self) -> int:
        """Logs of the highest stack, in place or on hand."""
        return max(*self.on_hand, self.layout.rows)

    @property
    def outline(self) -> list[Point]:
        """Outline of the logs in place, or of those on hand where none is, (across, elevation). [m]."""
        counts = self.layout.counts if self.layout.rows else self.on_hand
        ring = [(0.0, self.layout.sill)]
        for bay, ((left, right), count) in enumerate(zip(self.bays, counts, strict=True)):
            top = self.layout.sill + count * self.layout.log_height
            middle = 0.0 if bay == 0 else (self.bays[bay - 1][1] + left) / 2
            end = right if bay == len(self.bays) - 1 else (right + self.bays[bay + 1][0]) / 2
            ring += [(middle, top), (end, top)]
        return [*ring, (self.width, self.layout.sill)]

    def absent(self, bay: int) -> int:
        """Logs on hand that are not in place in a bay, counted from 0."""
        return self.on_hand[bay] - self.layout.counts[bay]


def shape_of(closure: Closure, verdicts: dict[str, Verdict], missing: Verdict) -> StackShape:
    """Lay out the parts of a closure.

    Parameters
    ----------
    closure
        The record.
    verdicts
        Verdict of every part by its name.
    missing
        Verdict of a log or post that is not among them.
    """
    layout = layout_of(closure)
    gap = max(layout.bearing + layout.strip, _LEAST_GAP * sum(layout.clear))
    bays, left = [], 0.0
    for width in layout.clear:
        bays.append((left, left + width))
        left += width + gap
    top = layout.sill + max(closure.post_height, layout.log_height * max(closure.on_hand))
    post_top = layout.sill + closure.post_height
    posts = tuple(
        Upright(
            name=f"post {number}",
            left=before[1],
            right=after[0],
            bottom=layout.sill,
            top=post_top,
            verdict=verdicts.get(f"post {number}", missing),
        )
        for number, (before, after) in enumerate(pairwise(bays), 1)
    )
    ends = (("left guide", -gap, 0.0), ("right guide", bays[-1][1], bays[-1][1] + gap))
    left_guide, right_guide = (
        Upright(name=name, left=a, right=b, bottom=layout.sill, top=top, verdict=verdicts.get(name))
        for name, a, b in ends
    )
    return StackShape(
        layout=layout,
        on_hand=closure.on_hand,
        bays=tuple(bays),
        runs=tuple(
            run
            for bay, ends_of in enumerate(bays)
            for run in _runs(layout, bay, ends_of, closure.on_hand[bay], verdicts, missing)
        ),
        posts=posts,
        guides=(left_guide, right_guide),
        top=top,
    )


def _runs(
    layout: Layout,
    bay: int,
    ends: tuple[float, float],
    on_hand: int,
    verdicts: dict[str, Verdict],
    missing: Verdict,
) -> list[Run]:
    placed = layout.counts[bay]
    rows = [(row, verdicts.get(f"bay {bay + 1} log {row}", missing)) for row in range(1, placed + 1)]
    alike: list[tuple[Verdict | None, list[int]]] = [
        (verdict, [row for row, _ in group]) for verdict, group in groupby(rows, key=lambda item: item[1])
    ]
    if on_hand > placed:
        alike.append((None, list(range(placed + 1, on_hand + 1))))
    return [
        Run(
            left=ends[0],
            right=ends[1],
            bottom=layout.sill + (numbers[0] - 1) * layout.log_height,
            top=layout.sill + numbers[-1] * layout.log_height,
            first=numbers[0],
            last=numbers[-1],
            verdict=verdict,
        )
        for verdict, numbers in alike
    ]
