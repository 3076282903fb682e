"""The flood line drawn to elevation: every barrier as it stands, the water across it, and its verdict."""

from __future__ import annotations

import math
from dataclasses import dataclass

from loads.assessment import Assessment
from loads.records.scenario import zone_name
from webapp.display import System, elevation, unit_label
from webapp.drawing.column import (
    Column,
    draw_captions,
    draw_column,
    draw_marks,
    mark_room,
    seen_from_front,
)
from webapp.drawing.facts import line_facts
from webapp.drawing.line_range import shown_range
from webapp.drawing.measure import shortened, spread, text_width
from webapp.drawing.outlines import width_of
from webapp.drawing.palette import Palette
from webapp.drawing.reading import Reading
from webapp.drawing.scale import Scale, ticks
from webapp.drawing.sheet import Sheet


@dataclass(frozen=True, kw_only=True)
class Format:
    """Sizes of the wide or the narrow drawing. [px]."""

    width: float
    left: float
    right: float
    row: int
    plot: float
    size: float
    head: float


WIDE = Format(width=1080, left=64, right=112, row=6, plot=270, size=13, head=26)
NARROW = Format(width=360, left=42, right=6, row=2, plot=190, size=12, head=58)
_ROW_GAP = 26
_LABEL_GAP = 72.0
_LEAST_DRAWN = 22.0
_LEAST_SHARE = 0.42
_LEAST_STACK_SHARE = 0.75
_LINES: dict[str, tuple[float, str | None]] = {"protected": (1.8, "8 4"), "flood": (2.4, None)}


def line_drawing(
    assessment: Assessment, *, index: int = 0, system: System, palette: Palette, narrow: bool = False
) -> str:
    """SVG of all barriers of a flood line in one state.

    Parameters
    ----------
    assessment
        All barriers; those withheld show the word and no number.
    index
        The state.
    system
        Units shown.
    palette
        Colours.
    narrow
        True for a telephone: two barriers to a row, 360 px wide.

    Returns
    -------
    str
        One line of SVG. In Markdown, put it through `webapp.drawing.svg.on_page`.
    """
    form = NARROW if narrow else WIDE
    scenario = assessment.scenario
    facts = line_facts(assessment, index=index, system=system)
    kind = f"line {'narrow' if narrow else 'wide'} {index}"
    sheet = Sheet(palette, f"Flood line: {scenario.title}", facts, kind)
    readings = [Reading(barrier, index, system, scenario.datum) for barrier in assessment.barriers]
    levels = [float(assessment.levels.of(side)[index]) for side in _LINES]
    low, high = shown_range(readings, levels)
    top = 6.0
    for columns in _rows(readings, form) or [[]]:
        upper = top + form.head
        scale = Scale(low=low, high=high, lower=upper + form.plot, upper=upper)
        row = Row(sheet=sheet, form=form, scale=scale, assessment=assessment, index=index, system=system)
        _draw_row(row, columns)
        top = scale.lower + draw_captions(sheet, columns, scale.lower + 10) + _ROW_GAP
    top = _legend(sheet, form, top, _as_of(assessment, index))
    return sheet.svg(form.width, math.ceil(top))


def _rows(readings: list[Reading], form: Format) -> list[list[Column]]:
    """Barriers in rows of about the same number."""
    if not readings:
        return []
    rings = [seen_from_front(reading) for reading in readings]
    widest = max(map(width_of, rings))
    each = math.ceil(len(readings) / math.ceil(len(readings) / form.row))
    room = (form.width - form.left - form.right) / each
    drawn = max(min(room * 0.5, room - 2 * mark_room(readings, form.size)), _LEAST_DRAWN)
    stacks = form is WIDE and any(reading.stack for reading in readings)
    least = _LEAST_STACK_SHARE if stacks else _LEAST_SHARE
    columns = [
        Column(
            reading=reading,
            rings=outline,
            left=form.left + position % each * room,
            room=room,
            drawn=drawn * max(width_of(outline) / widest, least),
            size=form.size,
        )
        for position, (reading, outline) in enumerate(zip(readings, rings, strict=True))
    ]
    return [columns[start : start + each] for start in range(0, len(columns), each)]


@dataclass(frozen=True, kw_only=True)
class Row:
    """One row of barriers and what it is drawn on."""

    sheet: Sheet
    form: Format
    scale: Scale
    assessment: Assessment
    index: int
    system: System

    @property
    def right(self) -> float:
        """Right end of the plot. [px]."""
        return self.form.width - self.form.right

    def level(self, side: str) -> float:
        """Level of one side, −inf when dry. [m]."""
        return float(self.assessment.levels.of(side)[self.index])

    def level_words(self, side: str) -> str:
        """Level of one side, without its datum, which stands at the axis."""
        return elevation(self.level(side), self.system)

    def notes(self, side: str) -> list[str]:
        """What is said of a level that the drawing does not reach."""
        level = self.level(side)
        beyond = math.isfinite(level) and not self.scale.holds(level)
        return ["beyond", "the drawing"] if beyond else []


def _draw_row(row: Row, columns: list[Column]) -> None:
    sheet, scale, left = row.sheet, row.scale, row.form.left
    for side in _LINES:
        if row.level(side) > scale.low:
            y = scale.clamped(row.level(side))
            for fill in (getattr(sheet.palette, f"{side}_tint"), sheet.fill(side)):
                sheet.rectangle(left, y, row.right - left, scale.lower - y, fill=fill)
    _axis(row)
    for column in columns:
        draw_column(sheet, column, scale)
    for side, (width, dashes) in _LINES.items():
        if scale.holds(row.level(side)):
            y = scale.y(row.level(side))
            points = [(left, y), (row.right, y)]
            sheet.line(points, stroke=sheet.palette.water, width=width, dashes=dashes)
    for column in columns:
        draw_marks(sheet, column, scale, [row.level(side) for side in _LINES])
    if row.form is NARROW:
        _level_key(row)
    else:
        _level_labels(row)


def _axis(row: Row) -> None:
    sheet, scale, form, faint = row.sheet, row.scale, row.form, row.sheet.palette.faint
    for z, label in ticks(scale, row.system, 7):
        y = scale.y(z)
        sheet.line([(form.left, y), (row.right, y)], stroke=sheet.palette.grid)
        sheet.text(form.left - 7, y + 4, label, size=form.size - 1, anchor="end", fill=faint)
    unit = f"elevation, {unit_label('elevation', row.system)} {row.assessment.scenario.datum}"
    words = shortened(unit, form.width - 12, form.size - 1)
    sheet.text(6, scale.upper - 9, words, size=form.size - 1, fill=faint)


def _level_labels(row: Row) -> None:
    """Levels in the margin at the right, each led to its line."""
    sheet, scale, palette = row.sheet, row.scale, row.sheet.palette
    blocks = []
    for side in _LINES:
        level = row.level(side)
        place = scale.clamped(level) if math.isfinite(level) else scale.lower
        blocks.append((place, side, [f"{side} side", row.level_words(side), *row.notes(side)]))
    blocks.sort()
    places = spread([block[0] for block in blocks], _LABEL_GAP, scale.upper + 12, scale.lower - 44)
    for y, (place, side, words) in zip(places, blocks, strict=True):
        if scale.holds(row.level(side)):
            sheet.line([(row.right, place), (row.right + 12, y)], stroke=palette.water, width=1.2)
        for number, text in enumerate(words):
            large = number == 1
            sheet.text(
                row.right + 16,
                y + 4 + 17 * number,
                text,
                size=15 if large else 12,
                bold=large,
                fill=palette.water_ink,
            )


def _level_key(row: Row) -> None:
    """Levels in two lines above a row, each with a sample of its line."""
    sheet = row.sheet
    for number, (side, (width, dashes)) in enumerate(reversed(_LINES.items())):
        y = row.scale.upper - 43 + 16 * number
        if math.isfinite(row.level(side)):
            points = [(6.0, y - 4), (34.0, y - 4)]
            sheet.line(points, stroke=sheet.palette.water, width=width, dashes=dashes)
        words = f"{side} side {row.level_words(side)}"
        if row.notes(side):
            words = f"{words}, {' '.join(row.notes(side))}"
        sheet.text(40, y, words, size=13, bold=True, fill=sheet.palette.water_ink)


def _as_of(assessment: Assessment, index: int) -> str:
    """Time of the levels, while they are those that were entered."""
    water = assessment.scenario.water
    if water.as_of is None or float(assessment.levels.flood_side[index]) != water.flood_side.value:
        return ""
    return f"levels as of {water.as_of:%Y-%m-%d %H:%M} {zone_name(water.as_of)}"


def _legend(sheet: Sheet, form: Format, top: float, as_of: str) -> float:
    """Write what the signs mean; return where the drawing ends. [px]."""
    entries = (
        ("rated", "rated level: an engineer's, dated"),
        ("first", "first-limit level: computed, for screening"),
        ("soil", "below a barrier's bottom; widths only indicative"),
    )
    start, size, faint = 8.0 if form is NARROW else form.left, form.size - 1, sheet.palette.faint
    x, y = start, top
    for sign, words in entries:
        _sign(sheet, sign, x, y)
        sheet.text(x + 24, y, words, size=size, fill=faint)
        x, y = (start, y + 16) if form is NARROW else (x + 40 + text_width(words, size), y)
    if as_of:
        y += 0 if form is NARROW else 18
        sheet.text(start, y, as_of, size=size, fill=faint)
    return y + 12


def _sign(sheet: Sheet, sign: str, x: float, y: float) -> None:
    ink = sheet.palette.ink
    if sign == "rated":
        sheet.shape([[(x + 6, y - 9), (x + 16, y - 4), (x + 6, y + 1)]], fill=ink)
    elif sign == "first":
        sheet.line([(x, y - 4), (x + 18, y - 4)], stroke=ink, width=1.8, dashes="4 2")
    else:
        sheet.rectangle(x, y - 10, 18, 12, fill=sheet.fill("soil"))
