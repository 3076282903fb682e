"""Where the section of a barrier goes: its elevation axis, its margins, its width."""

from __future__ import annotations

from dataclasses import dataclass

from webapp.drawing.cut import margin_of
from webapp.drawing.frame import Format
from webapp.drawing.outlines import reach_across
from webapp.drawing.reading import Reading
from webapp.drawing.scale import Scale
from webapp.drawing.sheet import Sheet
from webapp.drawing.stack_cut import stack_reach
from webapp.drawing.view import SIDES, View

_LEVEL_REACH = 0.55
_LEAST_ACROSS = 40.0
_LEAST_WATER = 30.0


def scale_of(reading: Reading, form: Format, upper: float, across: float) -> Scale:
    """Elevation axis: the face and the levels near it, at a scale that is the same up and across.

    Parameters
    ----------
    reading, form
        What is drawn, and how large.
    upper
        Upper end of the axis. [px]
    across
        Room for the face in section. [px]
    """
    face = reading.face
    least, most = reach_across(face)
    body = max(reading.drawn_top - face.bottom, 0.35 * (most - least))
    levels = [reading.level(side) for side in SIDES]
    levels += [layer.top.value for side in SIDES for layer in reading.panel.layers(side)]
    if reading.stack:
        rated, first = reading.record.rated_level, reading.first_limit
        levels += [rated.value] if rated else []
        levels += [first.level] if first is not None and first.level is not None else []
    reach = _LEVEL_REACH * body
    near = [z for z in levels if face.bottom - reach <= z <= reading.drawn_top + reach]
    low, high = min([face.bottom, *near]), max([reading.drawn_top, *near])
    low, high = low - 0.1 * body, high + 0.06 * body
    per_metre = min(form.plot / (high - low), across / max(most - least, 1e-9))
    lacking = max(form.least_plot / per_metre - (high - low), 0.0)
    low, high = low - lacking / 2, high + lacking / 2
    return Scale(low=low, high=high, lower=upper + (high - low) * per_metre, upper=upper)


@dataclass(frozen=True, kw_only=True)
class Section:
    """The section view, the margins for its labels, and the water on the flood side. [px]."""

    view: View
    margins: tuple[float, float]
    pad: float


def lay_out_section(sheet: Sheet, reading: Reading, form: Format, upper: float) -> Section:
    """Lay out the section, whose labels, water and face share a given width."""
    flood, protected = (margin_of(reading, side, form.margin, form.size) for side in SIDES)
    left, right = form.section
    room = right - left - (flood + protected)
    scale = scale_of(reading, form, upper, max(room - 2 * form.pad[0], _LEAST_ACROSS))
    least, most = reach_across(reading.face)
    pad = min(max((room - (most - least) * scale.per_metre) / 2, form.pad[0]), form.pad[1])
    width = (flood + protected) + 2 * pad + (most - least) * scale.per_metre
    start = left + max((right - left - width) / 2, 0.0)
    view = View(sheet=sheet, reading=reading, scale=scale, left=start, right=start + width, size=form.size)
    if reading.stack:
        pad = max(2 * pad - stack_reach(view), _LEAST_WATER)
    return Section(view=view, margins=(flood, protected), pad=pad)
