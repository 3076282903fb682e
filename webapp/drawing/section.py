"""One barrier drawn to scale: front view, section and net pressure on one elevation axis."""

from __future__ import annotations

import math
from dataclasses import replace

from loads.assessment import Barrier
from webapp.display import System
from webapp.drawing.closure import closure_drawing
from webapp.drawing.cut import draw_section
from webapp.drawing.facts import facts
from webapp.drawing.frame import HEAD, LINE, TEXT_ROOM, Format, agreement, axis, heading, load_block, notes_on
from webapp.drawing.front import draw_front
from webapp.drawing.measure import wrapped
from webapp.drawing.palette import Palette
from webapp.drawing.pressure import draw_pressure, load_texts
from webapp.drawing.reading import Reading
from webapp.drawing.section_layout import lay_out_section
from webapp.drawing.sheet import Sheet
from webapp.drawing.wall import wall_drawing

WIDE = Format(
    width=1080, axis=56, plot=330, least_plot=170, section=(252, 700), margin=150, pad=(44, 100), size=13
)
NARROW = Format(
    width=360,
    axis=40,
    plot=230,
    least_plot=130,
    section=(44, 360),
    margin=124,
    pad=(18, 60),
    size=12,
    narrow=True,
)
_FRONT = (70.0, 236.0)


def barrier_drawing(
    barrier: Barrier, *, index: int = 0, system: System, palette: Palette, datum: str, narrow: bool = False
) -> str:
    """SVG of one barrier in one state.

    Parameters
    ----------
    barrier
        Assessed, or withheld: then geometry and water are drawn, and the word instead of the load.
    index
        The state.
    system
        Units shown.
    palette
        Colours.
    datum
        Of the elevations.
    narrow
        True for a telephone: section above pressure, no front view, 360 px wide.

    Returns
    -------
    str
        One line of SVG. In Markdown, put it through `webapp.drawing.svg.on_page`.
    """
    reading = Reading(barrier, index, system, datum)
    said = facts(barrier, index=index, system=system, datum=datum)
    kind = f"barrier {'narrow' if narrow else 'wide'} {index}"
    sheet = Sheet(palette, f"{reading.title} in section and net pressure", said, kind)
    if reading.wall:
        return wall_drawing(sheet, reading, reading.wall, narrow=narrow)
    if reading.stack:
        return closure_drawing(sheet, reading, reading.stack, narrow=narrow)
    return _narrow(sheet, reading) if narrow else _wide(sheet, reading)


def _wide(sheet: Sheet, reading: Reading) -> str:
    form = WIDE
    section = lay_out_section(sheet, reading, form, HEAD)
    view, scale = section.view, section.view.scale
    heading(view, form)
    axis(view, form, form.width - 12)
    captions = draw_front(replace(view, left=_FRONT[0], right=_FRONT[1]))
    draw_section(view, section.margins, section.pad)
    pressure = replace(view, left=form.section[1] + 26, right=form.width - 12)
    draw_pressure(pressure, TEXT_ROOM, 30)
    load_block(pressure)
    y = scale.lower + 24
    for row, words in enumerate(captions):
        sheet.text(_FRONT[0] + 10, y + LINE * row, words, size=form.size - 1, fill=sheet.palette.faint)
    notes = [
        row
        for note in notes_on(view)
        for row in wrapped(note, form.section[1] - form.section[0], form.size, lines=2, bold=True)
    ]
    for row, words in enumerate(notes):
        sheet.text(form.section[0], y + LINE * row, words, size=form.size, bold=True)
    for row, words in enumerate(agreement(reading)):
        sheet.text(pressure.left, y + LINE * row, words, size=form.size - 1, fill=sheet.palette.faint)
    rows = max(len(captions), len(notes), 2)
    return sheet.svg(form.width, math.ceil(y + LINE * rows))


def _narrow(sheet: Sheet, reading: Reading) -> str:
    form = NARROW
    section = lay_out_section(sheet, reading, form, HEAD + 34)
    view, scale = section.view, section.view.scale
    heading(view, form)
    axis(view, form, form.width - 6)
    draw_section(view, section.margins, section.pad)
    upper = scale.lower + 48
    below = replace(scale, lower=upper + scale.lower - scale.upper, upper=upper)
    pressure = replace(view, scale=below, left=form.axis + 4, right=form.width - 8)
    axis(pressure, form, form.width - 6)
    draw_pressure(pressure, 0, 12)
    y = below.lower + 28
    for row, words in enumerate(load_texts(pressure)):
        sheet.text(form.axis, y, words, size=form.size + (7 if row == 0 else 1), bold=row == 0)
        y += 19
    for words in notes_on(view):
        for text in wrapped(words, form.width - form.axis - 8, form.size, lines=3, bold=True):
            sheet.text(form.axis, y, text, size=form.size, bold=True)
            y += LINE
    for words in agreement(reading):
        sheet.text(form.axis, y, words, size=form.size - 1, fill=sheet.palette.faint)
        y += LINE
    return sheet.svg(form.width, math.ceil(y))
