"""One barrier in the drawing of the flood line, with its marks and what is written below it."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property

from webapp.drawing.measure import text_width, wrapped
from webapp.drawing.outlines import front_rings, width_of
from webapp.drawing.reading import (
    Reading,
    bare_elevation,
    check_words,
    head_text,
    over_top_texts,
    ratio_text,
    reverse_text,
)
from webapp.drawing.scale import Scale
from webapp.drawing.sheet import Sheet
from webapp.drawing.stack_shape import StackShape
from webapp.drawing.svg import Point
from webapp.drawing.wall_shape import outline_across

_MARK = 15.0
_LEAST_DRAWN = 9.0
_LEAST_LOG = 3.0
_LEAST_PITCH = 6.0


@dataclass(frozen=True, kw_only=True)
class Column:
    """A barrier's share of a row.

    Attributes
    ----------
    reading
        The barrier.
    rings
        Its outline, (across, elevation). [m]
    left, room
        Place and width of the column. [px]
    drawn
        Width of the barrier itself. [px]
    size
        Size of text. [px]
    """

    reading: Reading
    rings: list[list[Point]]
    left: float
    room: float
    drawn: float
    size: float

    @property
    def middle(self) -> float:
        """Middle of the column. [px]."""
        return self.left + self.room / 2

    def within(self, scale: Scale) -> bool:
        """Whether any of the barrier lies within the elevations shown."""
        return self.reading.drawn_top > scale.low and self.reading.face.bottom < scale.high

    @cached_property
    def lines(self) -> list[tuple[str, bool]]:
        """Lines below the verdict, each with whether it is bold."""
        reading, small = self.reading, self.size - 1
        lines: list[tuple[str, bool]] = []
        check = reading.check
        if check is not None:
            lines.append((ratio_text(check, reading.index), True))
            lines += [
                (row, False) for row in wrapped(check_words(reading, check), self.room - 8, small, lines=2)
            ]
        elif reading.assessed is not None:
            lines.append(("no limit entered", False))
        first = reading.first_limit
        remarks = [head_text(reading), *over_top_texts(reading), reverse_text(reading)]
        if first is not None and first.without_water:
            remarks.append("limit reached without water")
        for order, remark in enumerate(remarks):
            rows = wrapped(remark, self.room - 8, small, lines=2, bold=order > 0)
            lines += [(row, order > 0) for row in rows]
        return lines

    @cached_property
    def name_rows(self) -> list[str]:
        """Name of the barrier in at most two lines."""
        return wrapped(self.reading.record.name, self.room - 8, self.size, lines=2)


def mark_room(readings: list[Reading], size: float) -> float:
    """Room that a level mark and its label need beside a barrier. [px]."""
    labels = []
    for reading in readings:
        labels += [bare_elevation(z, reading.system) for z in _marked(reading) if z is not None]
    return max((text_width(label, size - 1, bold=True) for label in labels), default=0.0) + _MARK + 4


def _marked(reading: Reading) -> tuple[float | None, float | None]:
    rated, first = reading.record.rated_level, reading.first_limit
    shown = first.level if first is not None and not first.without_water else None
    return (rated.value if rated else None), shown


def draw_column(sheet: Sheet, column: Column, scale: Scale) -> None:
    """Draw the ground below a barrier and the barrier itself."""
    if not column.within(scale):
        return
    ground = scale.clamped(column.reading.foot_level)
    if ground < scale.lower:
        for fill in (sheet.palette.ground, sheet.fill("soil")):
            sheet.rectangle(column.left, ground, column.room, scale.lower - ground, fill=fill)
    sheet.line(
        [(column.left, ground), (column.left + column.room, ground)], stroke=sheet.palette.faint, width=0.8
    )
    factor = column.drawn / max(width_of(column.rings), 1e-9)
    factor = max(factor, _LEAST_DRAWN / max(width_of(column.rings), 1e-9))
    rings = [[(column.middle + x * factor, scale.clamped(z)) for x, z in ring] for ring in column.rings]
    stack = column.reading.stack
    if stack is None:
        sheet.verdict_shape(rings, column.reading.verdict)
        return
    if stack.layout.rows:
        sheet.verdict_shape(rings, column.reading.verdict)
    _draw_parts(sheet, column, scale, stack, factor)


def seen_from_front(reading: Reading) -> list[list[Point]]:
    """Outline of a barrier, (across from its middle, elevation), holes after it; a wall in section. [m]."""
    stack = reading.stack
    if reading.wall:
        return [outline_across(reading.wall)]
    if stack is None:
        return front_rings(reading.panel, reading.face)
    return [[(x - stack.width / 2, z) for x, z in stack.outline]]


def _draw_parts(sheet: Sheet, column: Column, scale: Scale, stack: StackShape, factor: float) -> None:
    """Joints of the logs in place, posts and guides, and dashed the logs that are not in place."""
    layout, left = stack.layout, column.middle - stack.width / 2 * factor
    ink, faint = sheet.palette.ink, sheet.palette.faint
    if layout.log_height * scale.per_metre >= _LEAST_LOG:
        for (start, end), count in zip(stack.bays, layout.counts, strict=True):
            for row in range(1, count):
                y = scale.clamped(layout.sill + row * layout.log_height)
                sheet.line([(left + start * factor, y), (left + end * factor, y)], stroke=faint, width=0.7)
    for run in stack.runs:
        if run.verdict is None:
            upper, lower = scale.clamped(run.top), scale.clamped(run.bottom)
            x0, x1 = left + run.left * factor, left + run.right * factor
            ring = [(x0, lower), (x1, lower), (x1, upper), (x0, upper)]
            sheet.shape([ring], fill="none", stroke=faint, width=1.2, dashes="3 3")
    pitch = stack.width / len(stack.bays) * factor
    for upright in (*(stack.posts if pitch >= _LEAST_PITCH else ()), *stack.guides):
        x = left + (upright.left + upright.right) / 2 * factor
        x = min(max(x, left), left + stack.width * factor)
        ends = [(x, scale.clamped(upright.bottom)), (x, scale.clamped(upright.top) - 3)]
        sheet.line(ends, stroke=ink, width=2.2)


def draw_marks(sheet: Sheet, column: Column, scale: Scale, levels: list[float]) -> None:
    """Draw level marks beside a barrier, clear of the water lines."""
    reading, face = column.reading, column.reading.face
    lines = [scale.y(level) for level in levels if math.isfinite(level) and scale.holds(level)]
    if not column.within(scale):
        low, high = (bare_elevation(z, reading.system) for z in (face.bottom, reading.drawn_top))
        words = f"{low} to {high}, beyond the drawing"
        for row, text in enumerate(wrapped(words, column.room - 12, column.size - 1, lines=3)):
            y = scale.upper + 40 + row * 18
            sheet.plated(column.middle, y, text, size=column.size - 1, anchor="middle", bold=True)
        return
    half = column.drawn / 2 + 3
    rated, first = _marked(reading)
    ink = sheet.palette.ink
    if rated is not None:
        tip, y = column.middle - half, scale.clamped(rated)
        sheet.shape([[(tip - 9, y - 5), (tip, y), (tip - 9, y + 5)]], fill=ink)
        _mark_label(sheet, column, scale, z=rated, x=tip - 12, lines=lines)
    if first is not None:
        start, y = column.middle + half, scale.clamped(first)
        inner = start if first <= reading.drawn_top else column.middle - half
        sheet.line([(inner, y), (start + 10, y)], stroke=ink, width=1.8, dashes="4 2")
        _mark_label(sheet, column, scale, z=first, x=start + 12, lines=lines)


def _mark_label(
    sheet: Sheet, column: Column, scale: Scale, *, z: float, x: float, lines: list[float]
) -> None:
    anchor = "end" if x < column.middle else "start"
    size = column.size - 1
    words = bare_elevation(z, column.reading.system)
    if not scale.holds(z):
        words += " ▲" if z > scale.high else " ▼"
    y = clear_of(scale.clamped(z), lines, size / 2 + 3)
    y = min(max(y, scale.upper + size / 2), scale.lower - size / 2)
    sheet.plated(x, y, words, size=size, anchor=anchor, bold=anchor == "end")


def clear_of(place: float, lines: list[float], distance: float) -> float:
    """Nearest place that keeps a distance from every line.

    Examples
    --------
    >>> clear_of(10.0, [12.0], 5.0)
    7.0
    """
    candidates = [place, *(line + sign * distance for line in lines for sign in (-1, 1))]
    clear = [y for y in candidates if all(abs(y - line) >= distance - 1e-9 for line in lines)]
    return min(clear, key=lambda y: abs(y - place), default=place)


def draw_captions(sheet: Sheet, columns: list[Column], top: float) -> float:
    """Write what stands below each barrier of a row; return the height of it all. [px]."""
    if not columns:
        return 20.0
    size = columns[0].size
    names = max(len(column.name_rows) for column in columns)
    step = size + 4
    for column in columns:
        y = top + size
        identifier = wrapped(column.reading.record.id, column.room - 8, size + 2, lines=1, bold=True)
        sheet.text(column.middle, y, identifier[0], size=size + 2, anchor="middle", bold=True)
        for row, name in enumerate(column.name_rows):
            sheet.text(column.middle, y + step * (row + 1), name, size=size, anchor="middle")
        y += step * names + 8
        sheet.verdict_box(column.middle, y, column.reading.verdict, size=size, anchor="middle")
        y += 2 * size + step
        for row, (words, bold) in enumerate(column.lines):
            sheet.text(
                column.middle,
                y + row * step,
                words,
                size=size - (0 if bold else 1),
                anchor="middle",
                bold=bold,
                fill=None if bold else sheet.palette.faint,
            )
    longest = max(len(column.lines) for column in columns)
    return size + step * names + 8 + 2 * size + step * (longest + 1)
