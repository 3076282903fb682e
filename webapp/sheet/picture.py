"""The stack as a crew builds it: numbered logs between posts, bays that are alike drawn once. Black only."""

from __future__ import annotations

import math
from dataclasses import dataclass

from webapp.drawing.measure import spread
from webapp.drawing.svg import Svg, element
from webapp.part_words import bay_groups, numbered
from webapp.sheet.fit import PICTURE
from webapp.sheet.plan import Plan
from webapp.sheet.words import bare_level, cut

INK, PAPER = "#000", "#fff"
WIDTH, HEIGHT = 240.0, 240.0 * PICTURE[1] / PICTURE[0]
_LEFT, _TOP, _FOOT, _POST, _GAP = 60.0, 8.0, 20.0, 6.0, 12.0
_SIZE = 13.5
_MOST_COLUMNS = 3
_NUMBER_STEP, _JOINT_STEP = 12.0, 2.2
_STEPS = (1, 2, 5, 10, 20, 50, 100)


@dataclass(frozen=True, kw_only=True)
class _Column:
    """Bays that are alike: their numbers, logs to fit and logs on hand, and ends across."""

    bays: tuple[int, ...]
    fit: int
    on_hand: int
    left: float
    right: float


@dataclass(frozen=True, kw_only=True)
class _Scale:
    """From log rows above the sill to the drawing."""

    rows: float

    def y(self, row: float) -> float:
        """Place of the top of so many logs, kept within the drawing."""
        room = HEIGHT - _TOP - _FOOT
        return HEIGHT - _FOOT - room * min(max(row, 0.0), self.rows) / self.rows

    @property
    def step(self) -> float:
        """Height of one log."""
        return (HEIGHT - _TOP - _FOOT) / self.rows


def stack_picture(plan: Plan) -> Svg:
    """Picture of the stack, not to scale across."""
    columns = _columns(plan)
    scale = _Scale(rows=_rows(plan))
    items = [element("rect", x=0, y=0, width=WIDTH, height=HEIGHT, fill=PAPER)]
    for column in columns:
        items += _stack(column, scale)
    items += _levels(plan, scale, columns[-1].right + _POST)
    items += [_number(column, scale, row) for column in columns for row in _numbers(column, scale)]
    title = f"Logs numbered from the sill: {_facts(columns)}"
    return element(
        "svg",
        element("title", title),
        *items,
        xmlns="http://www.w3.org/2000/svg",
        viewBox=f"0 0 {WIDTH:g} {HEIGHT:g}",
        role="img",
        font_family="Liberation Sans, Arial, DejaVu Sans, sans-serif",
        fill=INK,
    )


def _rows(plan: Plan) -> float:
    """Log rows from the sill to the top of the picture: all that are on hand, and a little above."""
    high = max(*plan.closure.on_hand, *plan.fit)
    water = (plan.water - plan.sill) / plan.layout.log_height
    return max(float(high), min(water, high * 1.12))


def _columns(plan: Plan) -> list[_Column]:
    keys = list(zip(plan.fit, plan.closure.on_hand, strict=True))
    groups = bay_groups(keys)[:_MOST_COLUMNS]
    width = (WIDTH - _LEFT - 2) / len(groups)
    return [
        _Column(
            bays=bays,
            fit=keys[bays[0] - 1][0],
            on_hand=keys[bays[0] - 1][1],
            left=_LEFT + place * width + _POST,
            right=_LEFT + (place + 1) * width - _POST - (_GAP if place + 1 < len(groups) else 0),
        )
        for place, bays in enumerate(groups)
    ]


def _facts(columns: list[_Column]) -> str:
    return "; ".join(f"{numbered('bay', c.bays)}, {c.fit} to fit of {c.on_hand} on hand" for c in columns)


def _stack(column: _Column, scale: _Scale) -> list[Svg]:
    high = max(column.fit, column.on_hand)
    left, right, sill = column.left, column.right, scale.y(0)
    posts = [
        element("rect", x=x, y=scale.y(high) - 4, width=_POST, height=sill - scale.y(high) + 4, fill=INK)
        for x in (left - _POST, right)
    ]
    items = [
        _box(left, right, scale.y(column.fit), sill, width=1.6) if column.fit else Svg(""),
        _box(left, right, scale.y(high), scale.y(column.fit), width=0.9, dashes="3 3")
        if high > column.fit
        else Svg(""),
        *posts,
    ]
    items += [_joint(left, right, scale.y(row), there=row < column.fit) for row in _joints(column, scale)]
    words = cut(numbered("bay", column.bays), (right - left + 2 * _POST + _GAP) / _SIZE)
    items.append(_text((left + right) / 2, HEIGHT - 5, words, anchor="middle", bold=True))
    return items


def _joints(column: _Column, scale: _Scale) -> list[int]:
    if scale.step < _JOINT_STEP:
        return []
    return [row for row in range(1, column.on_hand) if row != column.fit]


def _numbers(column: _Column, scale: _Scale) -> list[int]:
    """Rows that are numbered: all where there is room, else every second, fifth and so on, and the top."""
    step = next((step for step in _STEPS if step * scale.step >= _NUMBER_STEP), _STEPS[-1])
    rows = {1, *(row for row in range(1, column.on_hand + 1) if row % step == 0)}
    rows = {row for row in rows if row == 1 or row - 1 >= step}
    if column.fit:
        rows = {row for row in rows if abs(row - column.fit) >= step or row == column.fit} | {column.fit}
    return sorted(rows)


def _number(column: _Column, scale: _Scale, row: int) -> Svg:
    size = min(_SIZE + 2, max(scale.step * 0.9, _SIZE - 1))
    middle = (scale.y(row) + scale.y(row - 1)) / 2
    there = row <= column.fit
    x, text = (column.left + column.right) / 2, str(row)
    plate = element(
        "rect",
        x=x - size * 0.36 * len(text) - 1,
        y=middle - size * 0.37,
        width=size * 0.72 * len(text) + 2,
        height=size * 0.74,
        fill=PAPER,
    )
    label = _text(x, middle + size * 0.36, text, anchor="middle", size=size, bold=there)
    return Svg(plate + label)


def _joint(left: float, right: float, y: float, *, there: bool) -> Svg:
    return element(
        "path",
        d=f"M{left:.2f} {y:.2f}H{right:.2f}",
        stroke=INK,
        stroke_width=1.0 if there else 0.7,
        stroke_dasharray=None if there else "3 3",
        fill="none",
    )


def _box(left: float, right: float, upper: float, lower: float, *, width: float, dashes: str = "") -> Svg:
    return element(
        "rect",
        x=left,
        y=upper,
        width=right - left,
        height=lower - upper,
        fill="none",
        stroke=INK,
        stroke_width=width,
        stroke_dasharray=dashes or None,
    )


def _levels(plan: Plan, scale: _Scale, end: float) -> list[Svg]:
    """Sill, top of the logs and water at the left, with a line across the picture for sill and water."""
    height = plan.layout.log_height
    marks = [("sill", plan.sill, 2.4, ""), ("top", max(plan.tops), 0.0, "")]
    if plan.water > plan.sill and math.isfinite(plan.water):
        marks.append(("water", plan.water, 1.6, "9 3"))
    marks = [mark for mark in marks if mark[0] != "top" or max(plan.fit) > 0]
    marks.sort(key=lambda mark: -mark[1])
    wanted = [scale.y((level - plan.sill) / height) for _, level, _, _ in marks]
    places = spread(wanted, 2 * _SIZE + 3, _SIZE + 2, HEIGHT - _FOOT - _SIZE / 2 + 4)
    items = []
    for (name, level, width, dashes), y, place in zip(marks, wanted, places, strict=True):
        items.append(_text(_LEFT - 5, place - 1, name, anchor="end", bold=name == "water"))
        items.append(_text(_LEFT - 5, place + _SIZE, bare_level(level, plan.system), anchor="end", bold=True))
        if width:
            items.append(
                element(
                    "path",
                    d=f"M{_LEFT - 3:.2f} {y:.2f}H{end:.2f}",
                    stroke=INK,
                    stroke_width=width,
                    stroke_dasharray=dashes or None,
                    fill="none",
                )
            )
    return items


def _text(x: float, y: float, words: str, *, anchor: str, size: float = _SIZE, bold: bool = False) -> Svg:
    return element(
        "text",
        words,
        x=x,
        y=y,
        font_size=size,
        text_anchor=anchor,
        font_weight=700 if bold else None,
    )
