"""Front view of a closure as a crew sees it from the protected side: numbered logs, posts, bays, levels."""

from __future__ import annotations

import math
from dataclasses import dataclass

from loads.checks import SEVERITY, Verdict
from webapp.drawing.facts import verdict_texts
from webapp.drawing.measure import text_width, wrapped
from webapp.drawing.palette import MARKS
from webapp.drawing.reading import bare_elevation
from webapp.drawing.sheet import Sheet
from webapp.drawing.stack_shape import Run, StackShape, Upright
from webapp.drawing.svg import Point
from webapp.drawing.view import SIDES, View

_LEAST_POST = 7.0
_NUMBER_STEP = 13.0
_STEPS = (1, 2, 5, 10, 20, 50)
_LEAST_BAY = 26.0
_MARK_ROOM = 16.0
_OVERHANG = 7.0


@dataclass(frozen=True, kw_only=True)
class Place:
    """Where across a view the parts of a closure lie.

    Attributes
    ----------
    left, across
        Left abutment, and pixels to a metre. [px]
    post
        Width drawn of posts and guides. [px]
    """

    left: float
    across: float
    post: float

    def x(self, metres: float) -> float:
        """Place of a distance from the left abutment. [px]."""
        return self.left + metres * self.across


def place_in(view: View, stack: StackShape) -> Place:
    """Fit a closure between the ends of a view, with room for the marks of levels at both sides."""
    reading = view.reading
    marks = [reading.record.rated_level and reading.record.rated_level.value]
    marks += [reading.first_limit.level] if reading.first_limit else []
    labels = [text_width(bare_elevation(z, reading.system), view.size - 1, bold=True) for z in marks if z]
    side = (max(labels) + _MARK_ROOM if labels else 0) + 2 * _LEAST_POST
    room = view.right - view.left - 2 * side
    across = min(view.scale.per_metre, room / stack.width)
    gap = stack.posts[0].right - stack.posts[0].left if stack.posts else 0.0
    drawn = stack.width * across
    return Place(
        left=(view.left + view.right - drawn) / 2, across=across, post=max(gap * across, _LEAST_POST)
    )


def draw_stack(view: View, stack: StackShape) -> list[str]:
    """Draw logs, posts, guides and levels; return captions."""
    place = place_in(view, stack)
    _draw_sill(view, stack, place)
    for run in stack.runs:
        _draw_run(view.sheet, view, run, place)
    _draw_joints(view, stack, place)
    for post in stack.posts:
        _draw_post(view, post, place)
    for guide in stack.guides:
        _draw_guide(view, guide, place)
    for side in reversed(SIDES):
        view.water_line(
            side, place.x(0) - place.post - _OVERHANG, place.x(stack.width) + place.post + _OVERHANG
        )
    _number_logs(view, stack, place)
    _name_bays(view, stack, place)
    _mark_levels(view, stack, place)
    captions = [f"{view.reading.show(stack.width, 'length')} wide, logs numbered from the sill"]
    if place.across < view.scale.per_metre * (1 - 1e-9):
        captions.append("width not to scale")
    return captions


def _ring(left: float, right: float, upper: float, lower: float) -> list[Point]:
    return [(left, lower), (right, lower), (right, upper), (left, upper)]


def _draw_sill(view: View, stack: StackShape, place: Place) -> None:
    sheet, y = view.sheet, view.scale.y(stack.layout.sill)
    left, right = place.x(0) - place.post - _OVERHANG, place.x(stack.width) + place.post + _OVERHANG
    sheet.line([(left, y), (right, y)], stroke=sheet.palette.ink, width=1.6)


def _draw_run(sheet: Sheet, view: View, run: Run, place: Place) -> None:
    upper, lower = view.scale.clamped(run.top), view.scale.clamped(run.bottom)
    left, right = place.x(run.left), place.x(run.right)
    if run.verdict is None:
        ring = _ring(left, right, upper, lower)
        sheet.shape([ring], fill="none", stroke=sheet.palette.faint, width=1.2, dashes="3 3")
        return
    inset = MARKS[run.verdict].width * 0.5
    sheet.verdict_shape([_ring(left + inset, right - inset, upper + inset, lower - inset)], run.verdict)


def _draw_joints(view: View, stack: StackShape, place: Place) -> None:
    """Joints between the logs in place, heavy, and between those that are not, dashed."""
    sheet, scale, layout = view.sheet, view.scale, stack.layout
    if scale.per_metre * layout.log_height < 2.5:
        return
    for bay, (left, right) in enumerate(stack.bays):
        for row in range(1, stack.on_hand[bay]):
            y = scale.y(layout.sill + row * layout.log_height)
            placed = row < layout.counts[bay]
            if row != layout.counts[bay]:
                sheet.line(
                    [(place.x(left), y), (place.x(right), y)],
                    stroke=sheet.palette.ink if placed else sheet.palette.faint,
                    width=0.8,
                    dashes=None if placed else "3 3",
                )


def _draw_post(view: View, post: Upright, place: Place) -> None:
    sheet, scale = view.sheet, view.scale
    middle, half = place.x((post.left + post.right) / 2), place.post / 2
    upper, lower = scale.clamped(post.top) - 4, scale.clamped(post.bottom)
    ring = _ring(middle - half, middle + half, upper, lower)
    sheet.shape([ring], fill=sheet.palette.face, stroke=sheet.palette.ink, width=1.4)
    if post.verdict is None or post.verdict == "below limit":
        return
    mark, colour = MARKS[post.verdict], sheet.palette.colour(post.verdict)
    fill = sheet.fill(mark.hatch) if mark.hatch else "none"
    sheet.shape([ring], fill=fill, stroke=colour, width=2.2, dashes=mark.dashes)


def _draw_guide(view: View, guide: Upright, place: Place) -> None:
    sheet, scale = view.sheet, view.scale
    upper, lower = scale.clamped(guide.top) - 4, scale.clamped(guide.bottom)
    left = place.x(guide.right) - place.post if guide.left < 0 else place.x(guide.left)
    sheet.rectangle(left, upper, place.post, lower - upper, fill=sheet.palette.ink)


def _number_logs(view: View, stack: StackShape, place: Place) -> None:
    """Number the logs from the sill, in every bay wide enough, else once beside the first bay."""
    scale, layout, size = view.scale, stack.layout, max(view.size - 1, 11)
    step = next((s for s in _STEPS if s * layout.log_height * scale.per_metre >= _NUMBER_STEP), _STEPS[-1])
    least = _LEAST_BAY if stack.rows >= 10 else _LEAST_BAY - 6
    wide = min(right - left for left, right in stack.bays) * place.across >= least
    rated = view.reading.record.rated_level
    marks = [scale.y(rated.value)] if rated and scale.holds(rated.value) else []
    lines = [scale.y(view.reading.level(side)) for side in SIDES if math.isfinite(view.reading.level(side))]
    for bay, (left, right) in enumerate(stack.bays if wide else stack.bays[:1]):
        x = place.x((left + right) / 2) if wide else place.x(left) - place.post - _OVERHANG
        for row in range(1, stack.on_hand[bay] + 1):
            if row not in (1, layout.counts[bay]) and row % step:
                continue
            y = scale.y(layout.sill + (row - 0.5) * layout.log_height)
            if not wide and any(abs(y - mark) < size + 3 for mark in marks):
                continue
            placed = row <= layout.counts[bay]
            hatched = any(
                run.verdict is None or MARKS[run.verdict].hatch
                for run in stack.runs
                if run.first <= row <= run.last and run.left == left
            )
            write = view.sheet.plated if hatched or _crossed(y, lines, size) else view.sheet.text
            write(
                x,
                y if write == view.sheet.plated else y + size * 0.35,
                str(row),
                size=size,
                anchor="middle" if wide else "end",
                fill=None if placed else view.sheet.palette.faint,
            )


def _crossed(y: float, lines: list[float], size: float) -> bool:
    return any(abs(y - line) < size * 0.7 for line in lines)


def _name_bays(view: View, stack: StackShape, place: Place) -> None:
    """Bays above their logs, posts below the sill; only numbers where words have no room."""
    sheet, scale, size = view.sheet, view.scale, view.size - 1
    faint = sheet.palette.faint
    lower = scale.clamped(stack.layout.sill) + size + 5
    upper = scale.clamped(stack.top) - 11
    narrowest = min(right - left for left, right in stack.bays) * place.across
    pitch = narrowest + place.post
    named = pitch > text_width(str(len(stack.bays)), size) + 2
    spelled = text_width("post 00", size) <= pitch
    for number, (left, right) in enumerate(stack.bays, 1):
        words = f"bay {number}" if spelled else str(number)
        if named or number == 1 or number % 5 == 0:
            sheet.text(place.x((left + right) / 2), upper, words, size=size, anchor="middle", fill=faint)
    for number, post in enumerate(stack.posts, 1):
        x = place.x((post.left + post.right) / 2)
        if spelled or post.verdict in ("near limit", "above limit"):
            words = post.name if spelled else str(number)
            bold = post.verdict in ("near limit", "above limit")
            fill = None if bold else faint
            sheet.plated(x, lower - size * 0.35, words, size=size, anchor="middle", fill=fill, bold=bold)


def _mark_levels(view: View, stack: StackShape, place: Place) -> None:
    """Rated level at the left, first-limit level at the right."""
    sheet, scale, reading = view.sheet, view.scale, view.reading
    ink, size = sheet.palette.ink, view.size - 1
    rated, first = reading.record.rated_level, reading.first_limit
    if rated is not None and scale.holds(rated.value):
        tip, y = place.x(0) - place.post - 2, scale.y(rated.value)
        sheet.shape([[(tip - 9, y - 5), (tip, y), (tip - 9, y + 5)]], fill=ink)
        words = bare_elevation(rated.value, reading.system)
        sheet.plated(tip - 12, y, words, size=size, anchor="end", bold=True)
    if first is not None and first.level is not None and not first.without_water:
        if not scale.holds(first.level):
            return
        start, y = place.x(stack.width) + place.post + 2, scale.y(first.level)
        sheet.line([(start, y), (start + 10, y)], stroke=ink, width=1.8, dashes="4 2")
        sheet.plated(start + 13, y, bare_elevation(first.level, reading.system), size=size)


def draw_key(view: View, stack: StackShape, top: float, captions: list[str]) -> float:
    """Write what the hatches mean and which parts have them; return where that ends. [px]."""
    sheet, size, y = view.sheet, view.size, top
    room = view.right - view.left - 26
    for verdict, parts in verdict_texts(view.reading):
        _swatch(sheet, view.left, y, verdict)
        others = verdict == "below limit" and y > top
        words = f"{verdict}: {'all others' if others else parts}"
        bold = SEVERITY.index(verdict) > SEVERITY.index("below limit")
        for row in wrapped(words, room, size, lines=3, bold=bold):
            sheet.text(view.left + 26, y, row, size=size, bold=bold)
            y += size + 4
    if any(run.verdict is None for run in stack.runs):
        ring = _ring(view.left, view.left + 18, y - 10, y + 1)
        sheet.shape([ring], fill="none", stroke=sheet.palette.faint, width=1.2, dashes="3 3")
        sheet.text(view.left + 26, y, "dashed: on hand, not in place", size=size)
        y += size + 4
    for words in [*captions, *_level_words(view)]:
        for row in wrapped(words, room + 26, size - 1, lines=2):
            sheet.text(view.left, y, row, size=size - 1, fill=sheet.palette.faint)
            y += size + 3
    return y


def _level_words(view: View) -> list[str]:
    first = view.reading.first_limit
    shown = first is not None and first.level is not None and not first.without_water
    told = []
    if view.reading.record.rated_level is not None:
        told.append("arrow: rated level")
    if shown:
        told.append("short dashes: first-limit level, for screening")
    return [" · ".join(told)] if told else []


def _swatch(sheet: Sheet, x: float, y: float, verdict: Verdict) -> None:
    sheet.verdict_shape([_ring(x + 1, x + 18, y - 10, y + 1)], verdict)
