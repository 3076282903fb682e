"""One wall drawn to scale: section with soil and water, what presses below its base, and net pressure."""

from __future__ import annotations

import math
from dataclasses import replace

from loads.assessment import AssessedWall
from loads.records.i_wall import IWall
from loads.records.wall import Wall
from loads.wall.i_wall_result import IWallResult
from loads.wall.i_wall_working import tip_of
from webapp.drawing.frame import HEAD, LINE, Format, agreement, axis, heading, notes_on
from webapp.drawing.measure import wrapped
from webapp.drawing.pressure import draw_pressure
from webapp.drawing.reading import Reading
from webapp.drawing.scale import Scale
from webapp.drawing.sheet import Sheet
from webapp.drawing.view import SIDES, View
from webapp.drawing.wall_base import draw_base
from webapp.drawing.wall_facts import wall_texts
from webapp.drawing.wall_section import Ground, draw_wall_section
from webapp.drawing.wall_shape import outline_of, width_of_base

WIDE = Format(
    width=1080, axis=56, plot=330, least_plot=170, section=(130, 566), margin=112, pad=(40, 90), size=13
)
NARROW = Format(
    width=360,
    axis=40,
    plot=230,
    least_plot=130,
    section=(44, 356),
    margin=92,
    pad=(16, 40),
    size=12,
    narrow=True,
)
_PRESSURE = (570.0, 772.0)
_TEXT = 796.0
_REACH = 0.55
_CUTOFF_SHOWN = 0.4


def wall_drawing(sheet: Sheet, reading: Reading, wall: Wall | IWall, *, narrow: bool) -> str:
    """SVG of a wall.

    Parameters
    ----------
    sheet
        Empty sheet.
    reading, wall
        The wall in one state, and its record.
    narrow
        True for a telephone: one view below another, 360 px wide.
    """
    form = NARROW if narrow else WIDE
    scale = _scale(reading, wall, form, HEAD + (34 if narrow else 0))
    view = View(
        sheet=sheet,
        reading=reading,
        scale=scale,
        left=form.section[0],
        right=form.section[1],
        size=form.size,
    )
    heading(view, form)
    axis(view, form, form.section[1] if narrow else _PRESSURE[1])
    ground = Ground.of(view, wall, form)
    draw_wall_section(view, ground)
    below = draw_base(view, ground)
    return _narrow(view, form, below) if narrow else _wide(view, form, below)


def _scale(reading: Reading, wall: Wall | IWall, form: Format, upper: float) -> Scale:
    """Elevations from below the section to the water near it, as many pixels to a metre up as across."""
    heights = [z for _, z in outline_of(wall)]
    low, high = min(heights), max(heights)
    body = high - low
    cutoffs = wall.cutoff if isinstance(wall, Wall) else ()
    deep = [wall.base.value - cut.depth.value for cut in cutoffs] if isinstance(wall, Wall) else []
    low = min([low, *(max(z, low - _CUTOFF_SHOWN * body) for z in deep)])
    near = [reading.level(side) for side in SIDES]
    near += [layer.top.value for layer in wall.sediment]
    high = max([high, *(z for z in near if math.isfinite(z) and z <= high + _REACH * body)])
    low, high = low - 0.06 * body, high + 0.06 * body
    room = form.section[1] - form.section[0] - 2 * (form.margin + form.pad[0])
    per_metre = min(form.plot / (high - low), max(room, 60.0) / width_of_base(wall))
    lacking = max(form.least_plot / per_metre - (high - low), 0.0)
    return Scale(
        low=low - lacking / 2,
        high=high + lacking / 2,
        upper=upper,
        lower=upper + (high - low + lacking) * per_metre,
    )


def _span(view: View) -> tuple[float, float] | None:
    """Elevations of the net pressure: an I-wall's down to the balanced tip."""
    barrier = view.reading.barrier
    if not isinstance(barrier, AssessedWall) or not isinstance(barrier.found, IWallResult):
        return None
    return tip_of(barrier.found, view.reading.index), barrier.found.record.top.value


def _wide(view: View, form: Format, below: float) -> str:
    sheet, scale = view.sheet, view.scale
    pressure = replace(view, left=_PRESSURE[0], right=_PRESSURE[1])
    draw_pressure(pressure, 0, 30, _span(view))
    y = scale.upper + 8
    for row, words in enumerate(wall_texts(view.reading)):
        for text in wrapped(words, form.width - _TEXT - 12, form.size, lines=3, bold=row < 2):
            sheet.text(_TEXT, y, text, size=form.size, bold=row < 2)
            y += LINE
        y += 5
    y = max(y, scale.lower - LINE)
    for words in agreement(view.reading):
        sheet.text(_TEXT, y, words, size=form.size - 1, fill=sheet.palette.faint)
        y += LINE
    below = _notes(view, form, below, form.section[1] - form.section[0])
    return sheet.svg(form.width, math.ceil(max(y, below)))


def _narrow(view: View, form: Format, below: float) -> str:
    sheet, scale = view.sheet, view.scale
    upper = below + 44
    moved = replace(scale, upper=upper, lower=upper + scale.lower - scale.upper)
    pressure = replace(view, scale=moved, left=form.axis + 4, right=form.width - 8)
    axis(pressure, form, form.width - 6)
    draw_pressure(pressure, 0, 12, _span(view))
    y = moved.lower + 26
    for row, words in enumerate(wall_texts(view.reading)):
        for text in wrapped(words, form.width - 16, form.size, lines=3, bold=row < 2):
            sheet.text(8, y, text, size=form.size + 1, bold=row < 2)
            y += LINE
    for words in agreement(view.reading):
        sheet.text(8, y, words, size=form.size - 1, fill=sheet.palette.faint)
        y += LINE
    return sheet.svg(form.width, math.ceil(_notes(view, form, y + 4, form.width - 16)))


def _notes(view: View, form: Format, y: float, width: float) -> float:
    left = 8 if form.narrow else form.section[0]
    for note in notes_on(view):
        for words in wrapped(note, width, form.size, lines=3, bold=True):
            view.sheet.text(left, y, words, size=form.size, bold=True)
            y += LINE
    return y
