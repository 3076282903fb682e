"""What presses on the underside of a wall, below its section: uplift and the pressure of the ground."""

from __future__ import annotations

from loads.assessment import AssessedWall
from loads.wall.wall_result import WallResult
from webapp.display import in_unit, significant, unit_label
from webapp.drawing.svg import Point
from webapp.drawing.view import View
from webapp.drawing.wall_section import Ground
from webapp.drawing.wall_shape import width_of_base

_HIGH = 46.0
_STEP = 78.0

Edge = tuple[float, float]
"""Distance from the heel and pressure there. [m, Pa]."""


def uplift_edge(found: WallResult, index: int) -> list[Edge]:
    """Uplift along the base from heel to toe, two corners where it jumps. [m, Pa]."""
    lift = found.stability.uplift
    corners: list[Edge] = []
    for i in range(lift.start.shape[1]):
        x0, x1 = float(lift.x[index, i]), float(lift.x[index, i + 1])
        if x1 > x0:
            corners += [(x0, float(lift.start[index, i])), (x1, float(lift.end[index, i]))]
    return corners


def base_edge(found: WallResult, index: int) -> list[Edge]:
    """Pressure between base and ground from heel to toe, none where the base is open. [m, Pa]."""
    base, width = found.stability.base, float(found.section.base_width[0])
    heel, toe = float(base.heel[index]), float(base.toe[index])
    pressed = float(base.compressed[index]) * width
    if pressed <= 0:
        return []
    if heel > 0 and toe > 0:
        return [(0.0, heel), (width, toe)]
    if toe > 0:
        return [(0.0, 0.0), (width - pressed, 0.0), (width, toe)]
    return [(0.0, heel), (pressed, 0.0), (width, 0.0)]


def draw_base(view: View, ground: Ground) -> float:
    """Draw both diagrams one below the other, to one scale of pressure; return where they end. [px]."""
    top = view.scale.lower + 24
    barrier, index = view.reading.barrier, view.reading.index
    if not isinstance(barrier, AssessedWall) or not isinstance(barrier.found, WallResult):
        return top
    unit = unit_label("pressure", view.reading.system)
    edges = [
        (f"uplift, {unit}", uplift_edge(barrier.found, index), "flood"),
        (f"base pressure, {unit}", base_edge(barrier.found, index), ""),
    ]
    most = max([p for _, edge, _ in edges for _, p in edge], default=0.0)
    for words, edge, hatch in edges:
        _diagram(view, ground, top, words=words, edge=edge, factor=_HIGH / most if most else 0.0, hatch=hatch)
        top += _STEP
    return top + 4


def _diagram(
    view: View, ground: Ground, top: float, *, words: str, edge: list[Edge], factor: float, hatch: str
) -> None:
    sheet, palette, size = view.sheet, view.sheet.palette, view.size - 1
    left = ground.x(view, 0.0)
    right = ground.x(view, width_of_base(ground.wall))
    y = top + 20
    sheet.text((left + right) / 2, top + 12, words, size=size, anchor="middle", fill=palette.faint)
    corners: list[Point] = [(ground.x(view, x), y + p * factor) for x, p in edge]
    if corners and factor:
        ring = [(left, y), *corners, (right, y)]
        sheet.shape([ring], fill=palette.load, stroke=palette.ink, width=1.2)
        if hatch:
            sheet.shape([ring], fill=sheet.fill(hatch))
        for x, end, anchor, value in (
            (left - 6, 0, "end", edge[0][1]),
            (right + 6, -1, "start", edge[-1][1]),
        ):
            text = significant(in_unit(value, "pressure", view.reading.system), 3) if value else "0"
            sheet.text(x, max(corners[end][1], y + 4) + 3, text, size=size, anchor=anchor)
    else:
        sheet.text((left + right) / 2, y + 16, "none", size=size, anchor="middle")
    sheet.line([(left, y), (right, y)], stroke=palette.ink, width=2.4)
