"""One closure drawn to scale: front view with every log, section and net pressure."""

from __future__ import annotations

import math
from dataclasses import replace

from webapp.drawing.cut import draw_section
from webapp.drawing.frame import HEAD, LINE, TEXT_ROOM, Format, agreement, axis, heading, load_block, notes_on
from webapp.drawing.measure import wrapped
from webapp.drawing.pressure import draw_pressure, load_texts
from webapp.drawing.reading import Reading
from webapp.drawing.scale import Scale
from webapp.drawing.section_layout import lay_out_section
from webapp.drawing.sheet import Sheet
from webapp.drawing.stack_front import draw_key, draw_stack
from webapp.drawing.stack_shape import StackShape
from webapp.drawing.view import View

BESIDE = Format(
    width=1080, axis=56, plot=330, least_plot=200, section=(396, 748), margin=118, pad=(40, 110), size=13
)
BELOW = replace(BESIDE, section=(64, 560), margin=150, pad=(44, 110))
NARROW = Format(
    width=360,
    axis=40,
    plot=250,
    least_plot=150,
    section=(44, 360),
    margin=124,
    pad=(18, 60),
    size=12,
    narrow=True,
)
_FRONT = (62.0, 388.0)
_MOST_BESIDE = 7
_LOG = 14.5
_MOST_PLOT = 470.0
_ROW_GAP = 52
_NO_LOGS = "No logs in place: nothing is pressed."


def closure_drawing(sheet: Sheet, reading: Reading, stack: StackShape, *, narrow: bool) -> str:
    """SVG of a closure; the front view stands above the others where these would squeeze it.

    Parameters
    ----------
    sheet
        Empty sheet.
    reading, stack
        The closure, and where its parts are.
    narrow
        True for a telephone: one view below another, 360 px wide.
    """
    if narrow:
        return _column(sheet, reading, stack)
    if len(stack.bays) > _MOST_BESIDE:
        return _two_rows(sheet, reading, stack)
    form = _taller(BESIDE, stack)
    section = lay_out_section(sheet, reading, form, HEAD)
    view = section.view
    heading(view, form)
    axis(view, form, form.width - 12)
    front = replace(view, left=_FRONT[0], right=_FRONT[1])
    front.heading("Front, from the protected side")
    captions = draw_stack(front, stack)
    draw_section(view, section.margins, section.pad)
    end = _pressure(replace(view, left=form.section[1] + 20, right=form.width - 12))
    key = draw_key(front, stack, view.scale.lower + 34, captions)
    below = replace(view, left=form.section[0], right=form.section[1])
    return sheet.svg(form.width, math.ceil(max(end, key, _notes(below, view.scale.lower + 34))))


def _taller(form: Format, stack: StackShape) -> Format:
    """Room enough to number every log, up to a height that still fits a screen."""
    return replace(form, plot=min(max(form.plot, stack.rows * _LOG * 1.25), _MOST_PLOT))


def _pressure(view: View) -> float:
    """Net pressure with its load in words; return where it ends. [px]."""
    stack = view.reading.stack
    if stack is not None and not stack.layout.rows:
        view.heading("Net pressure")
        view.sheet.text(view.left, view.scale.upper + 20, _NO_LOGS, size=view.size)
        return view.scale.upper + 20
    draw_pressure(view, TEXT_ROOM, 30)
    load_block(view)
    y = view.scale.lower + 34
    for words in agreement(view.reading):
        view.sheet.text(view.left, y, words, size=view.size - 1, fill=view.sheet.palette.faint)
        y += LINE
    return y


def _notes(view: View, top: float) -> float:
    y = top
    for note in notes_on(view):
        for words in wrapped(note, view.right - view.left, view.size, lines=3, bold=True):
            view.sheet.text(view.left, y, words, size=view.size, bold=True)
            y += LINE
    return y


def _moved(scale: Scale, upper: float) -> Scale:
    return replace(scale, lower=upper + scale.lower - scale.upper, upper=upper)


def _two_rows(sheet: Sheet, reading: Reading, stack: StackShape) -> str:
    form = _taller(BELOW, stack)
    section = lay_out_section(sheet, reading, form, HEAD)
    first = section.view
    heading(first, form)
    axis(first, form, form.width - 12)
    front = replace(first, left=form.axis + 6, right=form.width - 12)
    front.heading("Front, from the protected side")
    captions = draw_stack(front, stack)
    y = draw_key(front, stack, first.scale.lower + 34, captions)
    view = replace(first, scale=_moved(first.scale, y + _ROW_GAP))
    axis(view, form, form.width - 12)
    draw_section(view, section.margins, section.pad)
    end = _pressure(replace(view, left=form.section[1] + 60, right=form.width - 12))
    return sheet.svg(form.width, math.ceil(max(end, _notes(view, view.scale.lower + 34))))


def _column(sheet: Sheet, reading: Reading, stack: StackShape) -> str:
    form = _taller(NARROW, stack)
    section = lay_out_section(sheet, reading, form, HEAD + 34)
    first = section.view
    heading(first, form)
    axis(first, form, form.width - 6)
    front = replace(first, left=form.axis + 4, right=form.width - 8)
    front.heading("Front, from the protected side", 26)
    captions = draw_stack(front, stack)
    y = draw_key(replace(front, left=8), stack, first.scale.lower + 36, captions)
    view = replace(first, scale=_moved(first.scale, y + _ROW_GAP))
    axis(view, form, form.width - 6)
    draw_section(view, section.margins, section.pad)
    y = _notes(replace(view, left=form.axis, right=form.width - 8), view.scale.lower + 34)
    if not stack.layout.rows:
        sheet.text(form.axis, y + 8, _NO_LOGS, size=form.size, bold=True)
        return sheet.svg(form.width, math.ceil(y + 24))
    pressure = replace(
        view, scale=_moved(first.scale, y + _ROW_GAP - 14), left=form.axis + 4, right=form.width - 8
    )
    axis(pressure, form, form.width - 6)
    draw_pressure(pressure, 0, 12)
    y = pressure.scale.lower + 28
    for row, words in enumerate(load_texts(pressure)):
        sheet.text(form.axis, y, words, size=form.size + (7 if row == 0 else 1), bold=row == 0)
        y += 19
    for words in agreement(reading):
        sheet.text(form.axis, y, words, size=form.size - 1, fill=sheet.palette.faint)
        y += LINE
    return sheet.svg(form.width, math.ceil(y))
