"""What the three views of a barrier share."""

from __future__ import annotations

import math
from dataclasses import dataclass

from webapp.drawing.reading import Reading
from webapp.drawing.scale import Scale
from webapp.drawing.sheet import Sheet
from webapp.drawing.svg import Point

SIDES = ("flood", "protected")
_LINES = {"flood": (2.2, None), "protected": (1.8, "8 4")}
BEYOND = "beyond the drawing"


@dataclass(frozen=True, kw_only=True)
class View:
    """One view: the sheet, the barrier, the shared elevation axis, and the view's share of the width.

    Attributes
    ----------
    sheet, reading, scale
        What is drawn on, what is drawn, and elevation against y.
    left, right
        Ends of the view. [px]
    size
        Size of text. [px]
    """

    sheet: Sheet
    reading: Reading
    scale: Scale
    left: float
    right: float
    size: float

    def heading(self, words: str, rise: float = 30) -> None:
        """Write the name of the view above it."""
        self.sheet.text(self.left, self.scale.upper - rise, words, size=self.size + 1, bold=True)

    def water_line(self, side: str, start: float, end: float) -> None:
        """Draw the water level of one side, if the drawing reaches it."""
        level = self.reading.level(side)
        if self.scale.holds(level):
            width, dashes = _LINES[side]
            y = self.scale.y(level)
            points = [(start, y), (end, y)]
            self.sheet.line(points, stroke=self.sheet.palette.water, width=width, dashes=dashes)

    def cross(self, x: float, y: float) -> None:
        """Draw a cross in a ring: the centre of pressure."""
        ink, reach = self.sheet.palette.ink, 8.0
        self.sheet.add("circle", cx=x, cy=y, r=reach + 2, fill=self.sheet.palette.face)
        self.sheet.add("circle", cx=x, cy=y, r=5, fill="none", stroke=ink, stroke_width=1.4)
        for dx, dy in ((reach, 0.0), (0.0, reach)):
            self.sheet.line([(x - dx, y - dy), (x + dx, y + dy)], stroke=ink, width=1.4)


def arrow(sheet: Sheet, tail: Point, head: Point, *, width: float, size: float, stroke: str) -> None:
    """Draw an arrow whose point lies at `head`."""
    dx, dy = head[0] - tail[0], head[1] - tail[1]
    length = math.hypot(dx, dy)
    if length < 1e-9:
        return
    dx, dy = dx / length, dy / length
    base = (head[0] - dx * size, head[1] - dy * size)
    half = size * 0.42
    sheet.line([tail, base], stroke=stroke, width=width)
    sheet.shape(
        [[head, (base[0] - dy * half, base[1] + dx * half), (base[0] + dy * half, base[1] - dx * half)]],
        fill=stroke,
    )


def beyond_notes(reading: Reading, scale: Scale) -> list[str]:
    """What is said of levels that the drawing does not reach."""
    return [
        f"{side} side water at {reading.elevation(reading.level(side))}, {BEYOND}"
        for side in SIDES
        if math.isfinite(reading.level(side)) and not scale.holds(reading.level(side))
    ]
