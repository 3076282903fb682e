"""The face of a closure: the stacks of logs in place, as the panel that the water presses on."""

from __future__ import annotations

from itertools import accumulate, pairwise
from typing import Any

from loads.closure.layout import Layout
from loads.quantity import Quantity
from loads.records.closure import Closure
from loads.records.panel import Panel
from loads.units import from_si


def face_panel(closure: Closure, layout: Layout) -> Panel:
    """Panel with the whole loaded width of a closure, up to the top of each stack.

    A rectangle where all bays hold as many logs, otherwise an outline that steps up and down between them;
    with a bay that holds none, the stacks are set side by side, as pressure knows elevations only. Without
    any log it is a face of no width, one log high, which nothing presses on.
    """
    unit = closure.log.height.unit
    shared: dict[str, Any] = {
        "id": closure.id,
        "name": closure.name,
        "bottom": closure.sill,
        "sediment": closure.sediment,
        "limits": closure.limits,
        "rated_level": closure.rated_level,
        "note": closure.note,
    }
    if len(set(layout.counts)) == 1:
        rows = layout.rows
        width = made_length(layout.loaded_width if rows else 0.0, unit)
        height = made_length(max(rows, 1) * layout.log_height, unit)
        return Panel.model_construct(shape="rectangle", width=width, height=height, **shared)
    ring = tuple((made_length(x, unit), made_length(z, unit)) for x, z in steps_of(layout))
    return Panel.model_construct(shape="outline", points=ring, **shared)


def made_length(value: float, unit: str) -> Quantity:
    """A length that follows from those entered."""
    text = f"{from_si(value, unit, 'length'):.6g} {unit}"
    return Quantity(text=text, kind="length", unit=unit, value=value, low=value, high=value)


def steps_of(layout: Layout) -> list[tuple[float, float]]:
    """Outline of stacks of unequal height, (across, up from the sill), anticlockwise. [m, m]."""
    columns = _columns(layout)
    if min(layout.counts) == 0:
        columns = sorted((column for column in columns if column[1] > 0), key=lambda column: -column[1])
    edges = [0.0, *accumulate(width for width, _ in columns)]
    ring = [(0.0, 0.0), (edges[-1], 0.0)]
    for (left, right), (_, height) in reversed(list(zip(pairwise(edges), columns, strict=True))):
        if ring[-1][1] != height or len(ring) == 2:
            ring.append((right, height))
            ring.append((left, height))
        else:
            ring[-1] = (left, height)
    return ring


def _columns(layout: Layout) -> list[tuple[float, float]]:
    """Width and height of each stack and of each strip of a post between two, from the left."""
    heights = [count * layout.log_height for count in layout.counts]
    columns = []
    for bay, (span, height) in enumerate(zip(layout.spans.tolist(), heights, strict=True)):
        columns.append((span, height))
        if layout.strip > 0 and bay + 1 < len(heights):
            columns.append((layout.strip, max(height, heights[bay + 1])))
    return columns
