"""Section through a wall in its ground: soil and water on both sides, the wall, what stands in the ground."""

from __future__ import annotations

import math
from dataclasses import dataclass

from loads.assessment import AssessedWall
from loads.records.i_wall import IWall
from loads.records.wall import Wall
from loads.wall.i_wall_result import IWallResult
from webapp.display import elevation
from webapp.drawing.frame import Format
from webapp.drawing.measure import spread
from webapp.drawing.reading import bare_elevation
from webapp.drawing.svg import Point
from webapp.drawing.view import SIDES, View, arrow
from webapp.drawing.wall_shape import gap_of, ground_of, outline_of, parting, width_of_base

_GAP = 15.0
_LEADER = 12.0
_THIRD = 5.0


@dataclass(frozen=True, kw_only=True)
class Ground:
    """Where the section lies on the sheet.

    Attributes
    ----------
    wall
        Its record.
    origin
        Place of the heel. [px]
    edges
        Ends of what is drawn beside the wall. [px]
    """

    wall: Wall | IWall
    origin: float
    edges: tuple[float, float]

    @classmethod
    def of(cls, view: View, wall: Wall | IWall, form: Format) -> Ground:
        """Lay out the section in the middle of its view."""
        width = width_of_base(wall) * view.scale.per_metre
        edges = view.left + form.margin, view.right - form.margin
        pad = min(max((edges[1] - edges[0] - width) / 2, form.pad[0]), 1.6 * form.pad[1])
        middle = (edges[0] + edges[1]) / 2
        origin = middle - width / 2
        return cls(wall=wall, origin=origin, edges=(origin - pad, origin + width + pad))

    def x(self, view: View, across: float) -> float:
        """Place of a distance from the heel. [px]."""
        return self.origin + across * view.scale.per_metre


def draw_wall_section(view: View, ground: Ground) -> None:
    """Draw soil, water, wall, gap, cutoffs, drain and labels."""
    view.heading("Section, per unit of length")
    for side in SIDES:
        _soil(view, ground, side)
        _water(view, ground, side)
    _below(view, ground)
    _wall(view, ground)
    for side in SIDES:
        _labels(view, ground, side)


def _extent(view: View, ground: Ground, side: str) -> tuple[float, float]:
    middle = ground.x(view, parting(ground.wall))
    return (ground.edges[0], middle) if side == "flood" else (middle, ground.edges[1])


def _band(view: View, extent: tuple[float, float], low: float, high: float) -> list[Point]:
    upper, lower = view.scale.y(min(high, view.scale.high)), view.scale.y(max(low, view.scale.low))
    if upper >= lower:
        return []
    left, right = extent
    return [(left, lower), (right, lower), (right, upper), (left, upper)]


def _soil(view: View, ground: Ground, side: str) -> None:
    sheet, wall = view.sheet, ground.wall
    extent, top = _extent(view, ground, side), ground_of(wall, side)
    layers = [layer for layer in wall.sediment if layer.side == side]
    tops = [layer.top.value for layer in layers] or [top]
    base = wall.base.value if isinstance(wall, Wall) else view.scale.low
    bounds = [*tops[1:], min(base, tops[-1])]
    for number, (high, low) in enumerate(zip(tops, bounds, strict=True)):
        ring = _band(view, extent, low, high)
        fluid = bool(layers) and layers[number].is_fluid
        if ring:
            sheet.shape([ring], fill=sheet.palette.ground)
            sheet.shape([ring], fill=sheet.fill("mud" if fluid or number % 2 else "soil"))
            sheet.line([ring[3], ring[2]], stroke=sheet.palette.soil, width=1.4)
    ring = _band(view, extent, view.scale.low, bounds[-1])
    if ring:
        sheet.shape([ring], fill=sheet.palette.ground)
        sheet.shape([ring], fill=sheet.fill("soil"))
        sheet.line([ring[3], ring[2]], stroke=sheet.palette.faint, width=0.9)


def _water(view: View, ground: Ground, side: str) -> None:
    sheet, level = view.sheet, view.reading.level(side)
    extent, foot = _extent(view, ground, side), ground_of(ground.wall, side)
    ring = _band(view, extent, foot, level)
    for fill in (getattr(sheet.palette, f"{side}_tint"), sheet.fill(side)) if ring else ():
        sheet.shape([ring], fill=fill)
    if view.scale.holds(level):
        view.water_line(side, *extent)
        away = 1 if side == "flood" else -1
        x, y = extent[0 if side == "flood" else 1] + 12 * away, view.scale.y(level)
        corners = [(x - 5, y - 9), (x + 5, y - 9), (x, y - 1)]
        sheet.shape([corners], fill=sheet.palette.ground, stroke=sheet.palette.water, width=1.2)


def _below(view: View, ground: Ground) -> None:
    """Gap of an I-wall, cutoffs and drain of a wall on its base."""
    sheet, wall = view.sheet, ground.wall
    gap = gap_of(wall)
    if gap:
        x = ground.x(view, 0.0)
        ring = _band(view, (x - 6, x), *gap)
        for fill in (sheet.palette.flood_tint, sheet.fill("flood")) if ring else ():
            sheet.shape([ring], fill=fill, stroke=sheet.palette.water, width=0.8)
    if not isinstance(wall, Wall):
        return
    y = view.scale.y(wall.base.value)
    for cut in wall.cutoff:
        x, deep = ground.x(view, cut.position.value), wall.base.value - cut.depth.value
        end = view.scale.clamped(deep)
        sheet.line([(x, y), (x, end)], stroke=sheet.palette.ink, width=3)
        if not view.scale.holds(deep):
            sheet.shape([[(x - 5, end - 7), (x + 5, end - 7), (x, end)]], fill=sheet.palette.ink)


def _wall(view: View, ground: Ground) -> None:
    sheet, wall, ink = view.sheet, ground.wall, view.sheet.palette.ink
    ring = [(ground.x(view, x), view.scale.y(z)) for x, z in outline_of(wall)]
    withheld = view.reading.assessed is None
    sheet.shape([ring], fill=sheet.palette.face, stroke=ink, width=2.2, dashes="8 5" if withheld else None)
    if isinstance(wall, IWall):
        _tips(view, ground, wall)
        return
    y = view.scale.y(wall.base.value)
    if wall.drain:
        x = ground.x(view, wall.drain.position.value)
        sheet.add("circle", cx=x, cy=y - 6, r=5, fill=sheet.palette.face, stroke=ink, stroke_width=1.6)
    for third in (1, 2):
        x = ground.x(view, width_of_base(wall) * third / 3)
        sheet.line([(x, y - _THIRD), (x, y + _THIRD)], stroke=ink, width=1.4)
    _resultant(view, ground)


def _tips(view: View, ground: Ground, wall: IWall) -> None:
    """Depths at which the sheet balances and at which its tip is asked for."""
    barrier = view.reading.barrier
    if not isinstance(barrier, AssessedWall) or not isinstance(barrier.found, IWallResult):
        return
    depth, index = barrier.found.embedment, view.reading.index
    x = ground.x(view, width_of_base(wall))
    for words, name in (("balanced", "balanced"), ("needed", "required")):
        z = wall.ground("protected") - float(getattr(depth, name)[index])
        if math.isfinite(z) and view.scale.holds(z):
            y = view.scale.y(z)
            sheet = view.sheet
            sheet.line([(x - 14, y), (x + 10, y)], stroke=sheet.palette.ink, width=1.4, dashes="4 2")
            lift = -6 if name == "balanced" else 8
            sheet.plated(x + 12, y + lift, words, size=view.size - 1)


def _resultant(view: View, ground: Ground) -> None:
    """Draw the resultant on its own line until it meets the base."""
    barrier = view.reading.barrier
    if not isinstance(barrier, AssessedWall) or isinstance(barrier.found, IWallResult):
        return
    found, index = barrier.found, view.reading.index
    place, normal = (float(getattr(found.stability.base, n)[index]) for n in ("from_toe", "normal"))
    across = float(found.stability.horizontal[index])
    width = width_of_base(ground.wall)
    if not math.isfinite(place) or not -0.3 * width <= place <= 1.3 * width:
        return
    force = math.hypot(across, normal)
    length = min(0.5 * (view.scale.lower - view.scale.upper), 110.0)
    head = (ground.x(view, width - place), view.scale.y(found.record.base.value))
    tail = (head[0] - across / force * length, head[1] - normal / force * length)
    arrow(view.sheet, tail, head, width=3, size=13, stroke=view.sheet.palette.ink)


def _labels(view: View, ground: Ground, side: str) -> None:
    sheet, scale, size, reading = view.sheet, view.scale, view.size, view.reading
    flood = side == "flood"
    away, anchor = (-1, "end") if flood else (1, "start")
    edge = ground.edges[0 if flood else 1]
    sheet.text(edge, scale.upper - 9, f"{side} side", size=size, anchor=anchor)
    level, system, wall = reading.level(side), reading.system, ground.wall
    names = [(level if math.isfinite(level) else ground_of(wall, side), elevation(level, system), True)]
    if math.isfinite(wall.ground(side)):
        names.append((wall.ground(side), f"ground {bare_elevation(wall.ground(side), system)}", False))
    if not flood:
        heights = [z for _, z in outline_of(wall)]
        names.append((max(heights), f"top {bare_elevation(max(heights), system)}", False))
        foot = (wall.tip.value, "tip") if isinstance(wall, IWall) else (wall.base.value, "base")
        names.append((foot[0], f"{foot[1]} {bare_elevation(foot[0], system)}", False))
    names.sort(key=lambda name: (-name[0], not name[2]))
    wanted = [scale.clamped(z) for z, _, _ in names]
    places = spread(wanted, _GAP, scale.upper + 6, scale.lower - 4)
    for y, place, (_, words, water) in zip(places, wanted, names, strict=True):
        if words != "dry":
            stroke = sheet.palette.water if water else sheet.palette.faint
            sheet.line([(edge, place), (edge + away * (_LEADER - 2), y)], stroke=stroke)
        sheet.text(
            edge + away * _LEADER,
            y + size * 0.35,
            words,
            size=size if water else size - 1,
            anchor=anchor,
            bold=water,
            fill=sheet.palette.water_ink if water else None,
        )
