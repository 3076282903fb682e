"""What surrounds the views of every barrier's drawing: title, axis, the load in words, notes."""

from __future__ import annotations

import math
from dataclasses import dataclass

from webapp.display import load_kind, show, unit_label
from webapp.drawing.measure import shortened, text_width, wrapped
from webapp.drawing.pressure import load_texts
from webapp.drawing.reading import Reading, check_words, over_top_texts, ratio_text, reverse_text
from webapp.drawing.scale import ticks
from webapp.drawing.view import View, beyond_notes

HEAD = 100.0
TEXT_ROOM = 186.0
LINE = 17
_COMPARED_DIGITS = 5


@dataclass(frozen=True, kw_only=True)
class Format:
    """Sizes of the wide or the narrow drawing. [px]."""

    width: float
    axis: float
    plot: float
    least_plot: float
    section: tuple[float, float]
    margin: float
    pad: tuple[float, float]
    size: float
    narrow: bool = False


def heading(view: View, form: Format) -> None:
    """Title and verdict at the head of the sheet."""
    sheet, reading, size = view.sheet, view.reading, form.size
    check = reading.check
    about = f"{ratio_text(check, reading.index)}, {check_words(reading, check)}" if check is not None else ""
    if reading.assessed is not None and check is None:
        about = "no limit entered"
    if form.narrow:
        title = shortened(reading.title, form.width - 16, size + 3, bold=True)
        sheet.text(8, 22, title, size=size + 3, bold=True)
        width = sheet.verdict_box(8, 34, reading.verdict, size=size + 1, anchor="start")
        room = form.width - width - 26
        rows = wrapped(about, room, size, lines=2)
        for row, words in enumerate(rows):
            sheet.text(width + 18, (52 if len(rows) == 1 else 44) + 15 * row, words, size=size)
        return
    width = sheet.verdict_box(form.width - 12, 8, reading.verdict, size=size + 2, anchor="end")
    end = form.width - 24 - width
    if about:
        sheet.text(end, 28, about, size=size + 1, anchor="end")
    room = end - text_width(about, size + 1) - 40
    sheet.text(12, 28, shortened(reading.title, room, size + 5, bold=True), size=size + 5, bold=True)


def axis(view: View, form: Format, right: float) -> None:
    """Draw grid and elevations from the axis to the right end."""
    sheet, scale, reading = view.sheet, view.scale, view.reading
    most = max(2, int((scale.lower - scale.upper) / 34))
    for z, label in ticks(scale, reading.system, min(most, 9)):
        y = scale.y(z)
        sheet.line([(form.axis, y), (right, y)], stroke=sheet.palette.grid, width=0.8)
        sheet.text(form.axis - 6, y + 4, label, size=form.size - 1, anchor="end", fill=sheet.palette.faint)
    if scale.upper < 1.5 * HEAD:
        unit = f"elevation, {unit_label('elevation', reading.system)} {reading.datum}".strip()
        words = shortened(unit, form.width - 20, form.size - 1)
        y = scale.upper - (48 if form.narrow else 9)
        sheet.text(8, y, words, size=form.size - 1, fill=sheet.palette.faint)


def load_block(view: View) -> None:
    """Force, its place and the moment beside the arrow."""
    reading, scale, texts = view.reading, view.scale, load_texts(view)
    y = scale.upper + 20
    if reading.assessed is not None:
        acts = float(reading.assessed.resultant.line_of_action[reading.index])
        if math.isfinite(acts):
            y = scale.clamped(acts) - 6
    y = max(min(y, scale.lower - 17 * (len(texts) - 1) - 4), scale.upper + 16)
    for row, words in enumerate(texts):
        view.sheet.text(
            view.right - TEXT_ROOM + 14,
            y + 17 * row,
            words,
            size=view.size + 5 if row == 0 else view.size - 1,
            bold=row == 0,
        )


def notes_on(view: View) -> list[str]:
    """What is said below the views: over the top, reverse head, levels beyond the drawing."""
    reading = view.reading
    notes = [*over_top_texts(reading), reverse_text(reading), *beyond_notes(reading, view.scale)]
    return [note[:1].upper() + note[1:] for note in notes if note]


def agreement(reading: Reading) -> list[str]:
    """What the second computation found; no figures of a load that is withheld."""
    if reading.assessed is None:
        return ["second computation disagrees:", "no result is shown"]
    index, system, kind = reading.index, reading.system, load_kind(reading.record.kind, "force")
    first, second = (
        show(abs(float(result.horizontal[index])), kind, system, _COMPARED_DIGITS)
        for result in (reading.assessed.resultant, reading.assessed.recheck)
    )
    return ["second computation agrees:", f"{first} against {second}"]
