"""Hatches of the drawings as SVG patterns: water, soil, and the verdicts."""

from __future__ import annotations

from webapp.drawing.palette import Palette
from webapp.drawing.svg import Svg, element

_SLANTED = "M-2 2L2 -2M0 8L8 0M6 10L10 6"
_CROSSED = _SLANTED + "M-2 6L2 10M0 0L8 8M6 -2L10 2"


def hatch(name: str, identifier: str, palette: Palette) -> Svg:
    """Pattern of a name under an identifier.

    Parameters
    ----------
    name
        "flood", "protected", "soil", "mud", "near", "above" or "unchecked".
    identifier
        Unique on the page.
    palette
        Colours.
    """
    size, marks = _MARKS[name](palette)
    return element("pattern", *marks, id=identifier, width=size, height=size, patternUnits="userSpaceOnUse")


def _line(data: str, stroke: str, width: float, dashes: str | None = None) -> Svg:
    return element("path", d=data, stroke=stroke, stroke_width=width, fill="none", stroke_dasharray=dashes)


def _dot(x: float, y: float, radius: float, fill: str) -> Svg:
    return element("circle", cx=x, cy=y, r=radius, fill=fill)


_MARKS = {
    "flood": lambda p: (8.0, [_line("M0 6H8", p.flood_hatch, 0.9)]),
    "protected": lambda p: (8.0, [_line("M0 3H4", p.protected_hatch, 1.1)]),
    "soil": lambda p: (9.0, [_dot(2, 2, 0.9, p.soil), _dot(6.5, 6.5, 0.9, p.soil)]),
    "mud": lambda p: (9.0, [_dot(2, 2, 0.8, p.soil), _line("M4 6.5H9", p.soil, 0.9)]),
    "near": lambda p: (8.0, [_line(_SLANTED, p.near, 1.7)]),
    "above": lambda p: (8.0, [_line(_CROSSED, p.above, 1.3)]),
    "unchecked": lambda p: (7.0, [_dot(2, 2, 1.1, p.unchecked)]),
}
