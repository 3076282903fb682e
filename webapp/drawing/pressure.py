"""Net pressure against elevation, drawn on the side that it comes from, with its resultant."""

from __future__ import annotations

import math

import numpy as np

from loads.assessment import Assessed
from webapp.display import in_unit, significant, unit_label
from webapp.drawing.measure import spread, text_width
from webapp.drawing.reading import direction, inclined
from webapp.drawing.svg import Point
from webapp.drawing.view import BEYOND, View, arrow

Row = tuple[float, float]

_ARROWS = 8
_LEAST_ARROW = 14.0
_WORTH_A_NUMBER = 1e-6
_GAP = 14.0
_MOST_MOVED = 30.0
_TAIL = 26.0
_LEAST_TAIL = 40.0
_ASIDE = 6.0
_WITHIN = 0.88
_LEAST_WIDTH = 30.0


def value_room(view: View) -> float:
    """Room for a pressure value beside the diagram. [px]."""
    return text_width("00000", view.size) + 8


def draw_pressure(view: View, room: float, rise: float, span: Row | None = None) -> None:
    """Draw the diagram within the view's width less `room` at the right, which is for text.

    Parameters
    ----------
    view
        Where.
    room
        For text. [px]
    rise
        Of the heading above the diagram. [px]
    span
        Elevations between which it is drawn, those of the face when None. [m]

    Notes
    -----
    A pressure toward the protected side stands on the left of the face, one toward the flood side on its
    right.
    """
    view.heading(f"Net pressure, {unit_label('pressure', view.reading.system)}", rise)
    assessed = view.reading.assessed
    if assessed is None:
        view.sheet.verdict_box(
            view.left, view.scale.upper + 20, "withheld", size=view.size + 2, anchor="start"
        )
        return
    face = view.reading.face
    low, high = span or (face.bottom, face.top)
    rows = assessed.diagram.rows(low, high, view.reading.index)
    base, factor = _horizontal_scale(view, rows, room)
    _draw_diagram(view, rows, base, factor)
    _draw_arrows(view, assessed, (low, high), base, factor)
    _write_values(view, rows, base, factor)
    _draw_resultant(view, assessed, base, factor)


def _horizontal_scale(view: View, rows: list[Row], room: float) -> tuple[float, float]:
    """Place of the face and pixels to a pascal."""
    pushing, pulling = max(0.0, *(p for _, p in rows)), max(0.0, *(-p for _, p in rows))
    margin = value_room(view)
    left = view.left + (max(margin, _TAIL) if pushing or not pulling else 4)
    right = view.right - room - (max(margin, _TAIL) if pulling else 4)
    total = pushing + pulling
    if total <= 0:
        return right, 0.0
    factor = max(right - left, _LEAST_WIDTH) / total
    return left + pushing * factor, factor


def _draw_diagram(view: View, rows: list[Row], base: float, factor: float) -> None:
    scale, palette = view.scale, view.sheet.palette
    corners = [(base - p * factor, scale.y(z)) for z, p in rows]
    face = [(base, scale.y(rows[-1][0])), (base, scale.y(rows[0][0]))]
    if factor:
        view.sheet.shape([[*corners, *face]], fill=palette.load, stroke=palette.ink, width=1.4)
    view.sheet.line(face, stroke=palette.ink, width=3)


def _draw_arrows(view: View, assessed: Assessed, span: Row, base: float, factor: float) -> None:
    """Arrows of the pressure, pointing the way it pushes."""
    scale, index = view.scale, view.reading.index
    height = span[1] - span[0]
    count = min(_ARROWS, int(height * scale.per_metre / 16))
    diagram = assessed.diagram.take(index)
    for step in range(count):
        z = span[0] + height * (step + 0.5) / count
        reach = float(diagram.pressure(np.array([z]))[0, 0]) * factor
        if abs(reach) >= _LEAST_ARROW:
            y, sign = scale.y(z), math.copysign(1.0, reach)
            tail, head = (base - reach, y), (base - 2.5 * sign, y)
            arrow(view.sheet, tail, head, width=0.9, size=7, stroke=view.sheet.palette.faint)


def _write_values(view: View, rows: list[Row], base: float, factor: float) -> None:
    """Write the pressure at every knot at which there is one and room for it, the largest first."""
    greatest = max(abs(p) for _, p in rows)
    for sign in (1.0, -1.0):
        own = [
            (view.scale.y(z) + _aside(rows, number, sign), p)
            for number, (z, p) in enumerate(rows)
            if p * sign > _WORTH_A_NUMBER * greatest
        ]
        own = _kept(sorted(set(own)))
        low, high = view.scale.upper - 4, view.scale.lower - 2
        places = spread([y for y, _ in own], _GAP, low, high)
        for place, (_, p) in zip(places, own, strict=True):
            view.sheet.text(
                base - p * factor - sign * 5,
                place + view.size * 0.33,
                significant(in_unit(abs(p), "pressure", view.reading.system), 3),
                size=view.size - 1,
                anchor="end" if sign > 0 else "start",
            )


def _aside(rows: list[Row], number: int, sign: float) -> float:
    """How far a value moves off its corner, so that the side of the diagram does not run through it. [px]."""
    own = rows[number][1] * sign
    below = rows[number - 1][1] * sign if number else own
    above = rows[number + 1][1] * sign if number + 1 < len(rows) else own
    slack = 1e-9 * abs(own)
    if below > own + slack:
        return -_ASIDE
    return _ASIDE if above > own + slack else 0.0


def _kept(values: list[tuple[float, float]]) -> list[tuple[float, float]]:
    """Values that can be written near their knots; the smaller ones give way."""
    kept: list[tuple[float, float]] = []
    for value in sorted(values, key=lambda value: -abs(value[1])):
        tried = sorted([*kept, value])
        places = spread([y for y, _ in tried], _GAP, -math.inf, math.inf)
        if all(abs(place - y) <= _MOST_MOVED for place, (y, _) in zip(places, tried, strict=True)):
            kept = tried
    return kept


def _draw_resultant(view: View, assessed: Assessed, base: float, factor: float) -> None:
    index, scale = view.reading.index, view.scale
    horizontal = float(assessed.resultant.horizontal[index])
    acts = float(assessed.resultant.line_of_action[index])
    if not math.isfinite(acts) or not scale.holds(acts):
        return
    sign = math.copysign(1.0, horizontal)
    local = float(assessed.diagram.take(index).pressure(np.array([acts]))[0, 0]) * sign * factor
    y = scale.y(acts)
    tail: Point = (base - sign * max(local * _WITHIN, _LEAST_TAIL), y)
    arrow(view.sheet, tail, (base - sign * 2, y), width=3.4, size=15, stroke=view.sheet.palette.ink)


def load_texts(view: View) -> list[str]:
    """Force, where it acts, and moment, in words; the force first."""
    reading = view.reading
    if reading.assessed is None:
        return ["withheld", "the two computations", "of its load disagree"]
    resultant, index = reading.assessed.resultant, reading.index
    horizontal, vertical = float(resultant.horizontal[index]), float(resultant.vertical[index])
    moment, acts = float(resultant.moment[index]), float(resultant.line_of_action[index])
    if math.isnan(acts):
        texts = ["no net force" if not inclined(1.0, vertical) else "no horizontal force"]
    else:
        rise = acts - reading.face.bottom
        texts = [
            reading.show(abs(horizontal), "force"),
            f"toward {direction(horizontal)}",
            f"acts at {reading.length(acts)}",
            f"{reading.length(abs(rise))} {'above' if rise >= 0 else 'below'} {reading.foot}",
        ]
        if not view.scale.holds(acts):
            texts.append(BEYOND)
        if inclined(horizontal, vertical):
            texts.insert(1, "horizontal part,")
    if inclined(horizontal, vertical):
        way = "up" if vertical > 0 else "down"
        texts.append(f"{reading.show(abs(vertical), 'force')} vertical, {way}")
        texts.append(f"{reading.show(math.hypot(horizontal, vertical), 'force')} in all")
    if moment:
        texts += [f"moment {reading.show(abs(moment), 'moment')}", f"(top to {direction(moment)})"]
    return texts
