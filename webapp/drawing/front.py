"""Front view of a barrier, seen level from the protected side."""

from __future__ import annotations

import math

from webapp.drawing.outlines import centre_across, front_rings, width_of
from webapp.drawing.view import View


def draw_front(view: View) -> list[str]:
    """Draw the true outline with the water lines across it and the centre of pressure; return captions."""
    sheet, reading, scale = view.sheet, view.reading, view.scale
    view.heading("Front")
    rings = front_rings(reading.panel, reading.face)
    width = width_of(rings)
    room = view.right - view.left - 20
    across = min(scale.per_metre, room / width)
    middle = (view.left + view.right) / 2
    placed = [[(middle + x * across, scale.y(z)) for x, z in ring] for ring in rings]
    sheet.verdict_shape(placed, reading.verdict)
    half = max(width * across / 2 + 10, 30)
    for side in ("protected", "flood"):
        view.water_line(side, middle - half, middle + half)
    captions = [f"{reading.show(width, 'length')} wide"]
    if across < scale.per_metre * (1 - 1e-9):
        captions.append("width not to scale")
    if reading.assessed is not None:
        acts = float(reading.assessed.resultant.line_of_action[reading.index])
        if math.isfinite(acts) and reading.face.bottom <= acts <= reading.face.top:
            x = centre_across(reading.panel, rings, reading.assessed.diagram, reading.index)
            view.cross(middle + x * across, scale.y(acts))
            captions.append("cross: centre of pressure")
    return captions
