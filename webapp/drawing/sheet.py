"""The sheet a drawing is made on: texts, lines and shapes in order, and the hatches they use."""

from __future__ import annotations

import hashlib
from collections.abc import Iterable, Sequence

from loads.checks import Verdict
from webapp.drawing.hatches import hatch
from webapp.drawing.measure import text_width
from webapp.drawing.palette import MARKS, Palette
from webapp.drawing.svg import Point, Svg, element, path_data

FONT = "system-ui, 'Segoe UI', Roboto, 'Helvetica Neue', Arial, sans-serif"


class Sheet:
    """Collects the elements of one drawing.

    Parameters
    ----------
    palette
        Colours.
    title
        What is drawn.
    facts
        What the drawing says, as sentences.
    kind
        Tells drawings of the same facts apart.
    """

    def __init__(self, palette: Palette, title: str, facts: Sequence[str], kind: str) -> None:
        self.palette = palette
        self._title = title
        self._facts = facts
        told = "\n".join([kind, palette.name, title, *facts])
        self._prefix = "d" + hashlib.blake2b(told.encode("utf-8", "replace"), digest_size=6).hexdigest()
        self._items: list[Svg] = []
        self._hatches: dict[str, Svg] = {}

    def add(self, name: str, *children: str, **attributes: float | str | None) -> None:
        """Put one element on top of what is there."""
        self._items.append(element(name, *children, **attributes))

    def fill(self, name: str) -> str:
        """Reference to a hatch, which becomes part of the drawing."""
        identifier = f"{self._prefix}-{name}"
        if name not in self._hatches:
            self._hatches[name] = hatch(name, identifier, self.palette)
        return f"url(#{identifier})"

    def text(
        self,
        x: float,
        y: float,
        words: str,
        *,
        size: float = 12,
        anchor: str = "start",
        fill: str | None = None,
        bold: bool = False,
    ) -> None:
        """Line of text with its baseline at y."""
        self.add(
            "text",
            words,
            x=x,
            y=y,
            font_size=size,
            text_anchor=None if anchor == "start" else anchor,
            font_weight=650 if bold else None,
            fill=fill or self.palette.ink,
        )

    def plated(
        self,
        x: float,
        y: float,
        words: str,
        *,
        size: float,
        anchor: str = "start",
        fill: str | None = None,
        bold: bool = False,
    ) -> None:
        """Line of text centred on y, on a plate of ground so that hatch and lines do not run through it."""
        width = text_width(words, size, bold=bold)
        left = {"start": x, "middle": x - width / 2, "end": x - width}[anchor]
        height = size + 2
        self.rectangle(left - 2, y - height / 2, width + 4, height, fill=self.palette.ground, opacity=0.88)
        self.text(x, y + size * 0.35, words, size=size, anchor=anchor, fill=fill, bold=bold)

    def line(
        self, points: Iterable[Point], *, stroke: str, width: float = 1, dashes: str | None = None
    ) -> None:
        """Open line through points."""
        data = path_data([points], closed=False)
        self.add("path", d=data, stroke=stroke, stroke_width=width, stroke_dasharray=dashes, fill="none")

    def shape(
        self,
        rings: Iterable[Iterable[Point]],
        *,
        fill: str,
        stroke: str | None = None,
        width: float = 1,
        dashes: str | None = None,
    ) -> None:
        """Closed shape, its later rings being holes."""
        self.add(
            "path",
            d=path_data(rings),
            fill=fill,
            fill_rule="evenodd",
            stroke=stroke,
            stroke_width=width if stroke else None,
            stroke_dasharray=dashes,
            stroke_linejoin="round" if stroke else None,
        )

    def rectangle(
        self, x: float, y: float, width: float, height: float, *, fill: str, opacity: float | None = None
    ) -> None:
        """Rectangle without an outline."""
        self.add("rect", x=x, y=y, width=width, height=height, fill=fill, fill_opacity=opacity)

    def verdict_shape(self, rings: Sequence[Sequence[Point]], verdict: Verdict) -> None:
        """Shape of a barrier with the hatch and the outline of its verdict."""
        mark, colour = MARKS[verdict], self.palette.colour(verdict)
        self.shape(rings, fill=self.palette.face)
        self.shape(
            rings,
            fill=self.fill(mark.hatch) if mark.hatch else "none",
            stroke=colour,
            width=mark.width,
            dashes=mark.dashes,
        )

    def verdict_box(self, x: float, y: float, verdict: Verdict, *, size: float, anchor: str) -> float:
        """Box with the sign and the word of a verdict; return its width. [px]."""
        mark, colour, palette = MARKS[verdict], self.palette.colour(verdict), self.palette
        height = size * 2
        width = text_width(verdict, size, bold=True) + height + size * 0.9
        left = x - width / 2 if anchor == "middle" else x - width if anchor == "end" else x
        self.add(
            "rect",
            x=left,
            y=y,
            width=width,
            height=height,
            rx=4,
            fill=palette.face,
            stroke=colour,
            stroke_width=2.6 if mark.dashes else 2,
            stroke_dasharray=mark.dashes,
        )
        self._sign(left + size * 0.5, y + size * 0.4, size * 1.2, verdict)
        self.text(left + height + size * 0.2, y + size * 1.36, verdict, size=size, bold=True)
        return width

    def _sign(self, x: float, y: float, size: float, verdict: Verdict) -> None:
        mark, colour = MARKS[verdict], self.palette.colour(verdict)
        filled = self.fill(mark.hatch) if mark.hatch else "none"
        if not mark.sign:
            middle = size / 2
            self.add(
                "circle", cx=x + middle, cy=y + middle, r=middle, fill=filled, stroke=colour, stroke_width=2
            )
            return
        corners = [(x + across * size, y + down * size) for across, down in mark.sign]
        self.shape([corners], fill=filled, stroke=colour, width=2)

    def svg(self, width: float, height: float) -> str:
        """Finished drawing."""
        title, facts = f"{self._prefix}-title", f"{self._prefix}-facts"
        head = [element("title", self._title, id=title), element("desc", " ".join(self._facts), id=facts)]
        if self._hatches:
            head.append(element("defs", *self._hatches.values()))
        ground = element("rect", width=width, height=height, fill=self.palette.ground)
        return element(
            "svg",
            *head,
            ground,
            *self._items,
            xmlns="http://www.w3.org/2000/svg",
            viewBox=f"0 0 {width:g} {height:g}",
            role="img",
            aria_labelledby=f"{title} {facts}",
            font_family=FONT,
            style="display:block;width:100%;height:auto;font-variant-numeric:tabular-nums",
        )
