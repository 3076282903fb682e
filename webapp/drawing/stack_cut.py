"""Section through the logs of a closure, with post and brace behind them."""

from __future__ import annotations

import math

from webapp.drawing.stack_shape import StackShape
from webapp.drawing.svg import Point
from webapp.drawing.view import View

_LEAST_LOG = 6.0
_LEAST_POST = 8.0
_STRUT = 70.0
_SPARE = 26.0


def log_width(view: View) -> float:
    """Width of the logs in section. [px]."""
    closure = view.reading.closure
    section = closure.log.section if closure else None
    thickness = section.thickness.value if section and section.thickness else 0.0
    return max(thickness * view.scale.per_metre, _LEAST_LOG)


def post_width(view: View) -> float:
    """Depth of a post in section. [px]."""
    post = view.reading.closure.post if view.reading.closure else None
    section = post.section if post else None
    depth = section.thickness.value if section and section.thickness else 0.0
    return max(depth * view.scale.per_metre, _LEAST_POST)


def stack_reach(view: View) -> float:
    """Room that logs, post and brace take on the protected side of the face. [px]."""
    stack, closure = view.reading.stack, view.reading.closure
    if stack is None or closure is None or not stack.posts:
        return log_width(view) + _SPARE
    brace = closure.post.brace if closure.post else None
    reach = log_width(view) + post_width(view) + _SPARE
    if brace is None:
        return reach
    angle = brace.angle.value
    return reach + (brace.height.value * view.scale.per_metre / math.tan(angle) if angle > 0 else _STRUT)


def draw_stack_cut(view: View, stack: StackShape, face: float, edge: float) -> None:
    """Draw post and brace, then the logs of the bay with most of them.

    Parameters
    ----------
    view
        The section.
    stack
        The closure.
    face, edge
        Where the flood side of the logs is, and the protected end of the water drawn. [px]
    """
    width = log_width(view)
    if stack.posts:
        _draw_post(view, stack, face + width, edge)
    sheet, scale, layout = view.sheet, view.scale, stack.layout
    bay = max(range(len(layout.counts)), key=lambda bay: (layout.counts[bay], stack.on_hand[bay]))
    low, placed, high = (
        scale.y(layout.sill + count * layout.log_height)
        for count in (0, layout.counts[bay], stack.on_hand[bay])
    )
    if high < placed:
        sheet.shape(
            [_box(face, face + width, high, placed)],
            fill="none",
            stroke=sheet.palette.faint,
            width=1.2,
            dashes="3 3",
        )
    if placed < low:
        withheld = "8 5" if view.reading.assessed is None else None
        ring = _box(face, face + width, placed, low)
        sheet.shape([ring], fill=sheet.palette.face, stroke=sheet.palette.ink, width=1.6, dashes=withheld)
    if layout.log_height * scale.per_metre >= 3:
        for row in range(1, layout.counts[bay]):
            y = scale.y(layout.sill + row * layout.log_height)
            sheet.line([(face, y), (face + width, y)], stroke=sheet.palette.ink, width=0.8)


def _box(left: float, right: float, upper: float, lower: float) -> list[Point]:
    return [(left, lower), (right, lower), (right, upper), (left, upper)]


def _draw_post(view: View, stack: StackShape, front: float, edge: float) -> None:
    sheet, scale, closure = view.sheet, view.scale, view.reading.closure
    post = closure.post if closure else None
    width = post_width(view)
    upright = stack.posts[0]
    foot, top = scale.y(upright.bottom), scale.y(upright.top)
    brace = post.brace if post else None
    if brace is not None:
        height = scale.y(upright.bottom + brace.height.value)
        start = front + width
        reach = (foot - height) / math.tan(brace.angle.value) if brace.angle.value > 0 else math.inf
        share = min(1.0, max(edge - start - 8, 12) / reach) if math.isfinite(reach) else 0.0
        end = (
            (start + reach * share, height + (foot - height) * share)
            if math.isfinite(reach)
            else (min(start + _STRUT, edge - 6), height)
        )
        sheet.line([(start, height), end], stroke=sheet.palette.ink, width=5)
        sheet.line([(start, height), end], stroke=sheet.palette.face, width=2.4)
        if share == 1.0:
            sheet.rectangle(end[0] - 7, foot - 3, 14, 4, fill=sheet.palette.ink)
    ring = _box(front, front + width, top, foot)
    sheet.shape([ring], fill=sheet.palette.face, stroke=sheet.palette.ink, width=1.3)
    sheet.rectangle(front - 2, foot - 3, width + 8, 4, fill=sheet.palette.ink)
