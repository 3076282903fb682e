"""Section through a barrier, flood side on the left, with water and sediment on both sides."""

from __future__ import annotations

import math
from dataclasses import dataclass

from loads.faces import ArcFace
from webapp.display import elevation
from webapp.drawing.measure import shortened, spread, text_width
from webapp.drawing.outlines import reach_across, section_line
from webapp.drawing.reading import Reading, bare_elevation
from webapp.drawing.stack_cut import draw_stack_cut
from webapp.drawing.svg import Point
from webapp.drawing.view import SIDES, View, arrow

_FACE_WIDTH = 6.0
_LEADER = 12.0
_GAP = 15.0


@dataclass(frozen=True, kw_only=True)
class Label:
    """What is written in the margin at an elevation."""

    z: float
    words: str
    water: bool = False


def labels_of(reading: Reading, side: str, room: float, size: float) -> list[Label]:
    """Labels of one side: its water, its sediment, and on the protected side top and bottom of the face.

    Parameters
    ----------
    reading
        The barrier.
    side
        "flood" or "protected".
    room, size
        Width that a label may take, and size of text. [px]
    """
    system, face = reading.system, reading.face
    level = reading.level(side)
    words = elevation(level, system)
    labels = [Label(z=level if math.isfinite(level) else face.bottom, words=words, water=True)]
    for number, layer in enumerate(reading.panel.layers(side), 1):
        height = bare_elevation(layer.top.value, system)
        left = room - text_width(f" {height}", size - 1)
        name = shortened(layer.name or f"sediment {number}", left, size - 1)
        labels.append(Label(z=layer.top.value, words=f"{name} {height}"))
    if side == "protected":
        labels += [Label(z=top, words=f"{name} {bare_elevation(top, system)}") for name, top in reading.tops]
        labels.append(Label(z=face.bottom, words=f"{reading.foot} {bare_elevation(face.bottom, system)}"))
    return sorted(labels, key=lambda label: (-label.z, not label.water))


def margin_of(reading: Reading, side: str, most: float, size: float) -> float:
    """Room that the labels of one side need, at most so much. [px]."""
    widths = [
        text_width(label.words, size if label.water else size - 1, bold=label.water)
        for label in labels_of(reading, side, most - _LEADER - 4, size)
    ]
    return min(max([*widths, text_width(f"{side} side", size)]) + _LEADER + 4, most)


def draw_section(view: View, margins: tuple[float, float], pad: float) -> None:
    """Draw face, water, sediment and levels, as wide as they are high."""
    sheet, scale, face = view.sheet, view.scale, view.reading.face
    view.heading("Section")
    least, _ = reach_across(face)
    edges = (view.left + margins[0], view.right - margins[1])
    origin = edges[0] + pad - least * scale.per_metre
    for side, edge in zip(SIDES, edges, strict=True):
        _draw_side(view, side, edge, origin)
    ground = scale.y(face.bottom)
    sheet.line([(edges[0], ground), (edges[1], ground)], stroke=sheet.palette.ink, width=1.2)
    for x in range(int(edges[0]) + 6, int(edges[1]) - 2, 14):
        sheet.line([(x, ground + 1), (x - 5, ground + 7)], stroke=sheet.palette.faint, width=0.9)
    if view.reading.stack:
        draw_stack_cut(view, view.reading.stack, origin, edges[1])
    else:
        points = _placed(view, section_line(face, face.bottom, face.top), origin)
        withheld = view.reading.assessed is None
        sheet.line(points, stroke=sheet.palette.ink, width=_FACE_WIDTH, dashes="8 5" if withheld else None)
    _draw_resultant(view, origin)
    for side, edge, room in zip(SIDES, edges, margins, strict=True):
        _write_labels(view, side, edge, room)


def _placed(view: View, points: list[Point], origin: float) -> list[Point]:
    return [(origin + x * view.scale.per_metre, view.scale.y(z)) for x, z in points]


def _body(view: View, span: tuple[float, float], edge: float, origin: float) -> list[Point]:
    """Outline of what lies between two elevations from the face to the edge of the view."""
    face, scale = view.reading.face, view.scale
    low = max(span[0], face.bottom)
    high = min(span[1], scale.high)
    if high <= low:
        return []
    wall = section_line(face, min(low, face.top), min(high, face.top))
    points = _placed(view, wall, origin)
    if high > face.top:
        points.append((points[-1][0], scale.y(high)))
    return [(edge, scale.y(low)), *points, (edge, scale.y(high))]


def _draw_side(view: View, side: str, edge: float, origin: float) -> None:
    """Water, then the sediment in it, then the water level across both."""
    sheet, face, level = view.sheet, view.reading.face, view.reading.level(side)
    tint = getattr(sheet.palette, f"{side}_tint")
    water = _body(view, (face.bottom, level), edge, origin)
    for fill in (tint, sheet.fill(side)) if water else ():
        sheet.shape([water], fill=fill)
    layers = view.reading.panel.layers(side)
    feet = [layer.top.value for layer in layers[1:]] + [face.bottom]
    for number, (layer, foot) in enumerate(zip(layers, feet, strict=False)):
        body = _body(view, (foot, layer.top.value), edge, origin)
        if body:
            sheet.shape([body], fill=sheet.palette.ground)
            wet = _body(view, (foot, min(layer.top.value, level)), edge, origin)
            if wet:
                sheet.shape([wet], fill=tint)
            sheet.shape([body], fill=sheet.fill("mud" if layer.is_fluid or number % 2 else "soil"))
            sheet.line([body[-1], body[-2]], stroke=sheet.palette.soil, width=1.4)
    away = 1 if side == "flood" else -1
    view.water_line(side, edge, water[-2][0] if water else edge + 24 * away)
    if view.scale.holds(level):
        x, y = edge + 12 * away, view.scale.y(level)
        corners = [(x - 5, y - 9), (x + 5, y - 9), (x, y - 1)]
        sheet.shape([corners], fill=sheet.palette.ground, stroke=sheet.palette.water, width=1.2)


def _draw_resultant(view: View, origin: float) -> None:
    """Draw the resultant in its own direction at the centre of pressure."""
    assessed, index = view.reading.assessed, view.reading.index
    if assessed is None:
        return
    horizontal = float(assessed.resultant.horizontal[index])
    vertical = float(assessed.resultant.vertical[index])
    force = math.hypot(horizontal, vertical)
    face = view.reading.face
    acts = float(assessed.resultant.line_of_action[index])
    if isinstance(face, ArcFace) and force:
        sign = math.copysign(1.0, horizontal) * -face.shape.bulge
        acts = face.bottom + face.shape.centre_z - sign * face.shape.radius * vertical / force
        x = face.shape.centre_x - sign * face.shape.radius * horizontal / force
    elif math.isfinite(acts):
        x = face.x_at(acts)
    if not force or not face.bottom <= acts <= face.top:
        return
    head = _placed(view, [(x, acts)], origin)[0]
    across, up = horizontal / force, vertical / force
    gap, length = _FACE_WIDTH / 2 + 1, 46.0
    point = (head[0] - across * gap, head[1] + up * gap)
    tail = (point[0] - across * length, point[1] + up * length)
    arrow(view.sheet, tail, point, width=3, size=13, stroke=view.sheet.palette.ink)


def _write_labels(view: View, side: str, edge: float, room: float) -> None:
    sheet, scale, size = view.sheet, view.scale, view.size
    flood = side == "flood"
    away = -1 if flood else 1
    anchor = "end" if flood else "start"
    sheet.text(edge, scale.upper - 9, f"{side} side", size=size, anchor=anchor)
    labels = labels_of(view.reading, side, room - _LEADER - 4, size)
    wanted = [scale.clamped(label.z) for label in labels]
    places = spread(wanted, _GAP, scale.upper + 6, scale.lower - 4)
    for y, place, label in zip(places, wanted, labels, strict=True):
        if label.words != "dry" and not scale.holds(label.z):
            up = math.copysign(1.0, label.z - scale.high)
            x = edge + away * _LEADER / 2
            corners = [(x - 4, y + 4 * up), (x + 4, y + 4 * up), (x, y - 5 * up)]
            sheet.shape([corners], fill=sheet.palette.water)
        elif label.words != "dry":
            stroke = sheet.palette.water if label.water else sheet.palette.faint
            sheet.line([(edge, place), (edge + away * (_LEADER - 2), y)], stroke=stroke)
        sheet.text(
            edge + away * _LEADER,
            y + size * 0.35,
            label.words,
            size=size if label.water else size - 1,
            anchor=anchor,
            bold=label.water,
            fill=sheet.palette.water_ink if label.water else None,
        )
