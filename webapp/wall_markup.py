"""HTML of one wall: headline, criteria in force, forces, sliding band, states."""

from __future__ import annotations

import math
from collections.abc import Sequence

from loads.assessment import AssessedWall
from loads.wall.criteria import CriteriaSet
from loads.wall.i_wall_result import IWallResult
from loads.wall.sliding import DEFINITION, SlidingBand
from loads.wall.wall_result import WallResult
from webapp.display import System, elevation, show, show_all
from webapp.drawing.reading import pressing
from webapp.drawing.wall_facts import ratio, resultant_words, share
from webapp.markup import escaped, ratio_cell, ratio_words, subheading, table, verdict_mark
from webapp.part_words import check_title
from webapp.text_table import head_on

_NO_CRITERIA = "Criteria in force: none entered; stability is computed and not checked."


def headline(barrier: AssessedWall, system: System) -> str:
    """Verdict, what governs, and the figures that a wall is judged by, in large."""
    check = barrier.checks[0]
    governs = (
        f"{ratio_words(check)}, {escaped(check_title(check, 'wall'))}" if check.limit else "no limit entered"
    )
    figures = [(verdict_mark(barrier.verdict()), governs)]
    found = barrier.found
    figures += _sheet(found, system) if isinstance(found, IWallResult) else _stands(found, system)
    figures.append((show(head_on(barrier), "length", system), "head, flood side, above the ground"))
    cells = "".join(f"<div><b>{figure}</b><span>{words}</span></div>" for figure, words in figures)
    return f'<div class="sh-big">{cells}</div>'


def _stands(found: WallResult, system: System) -> list[tuple[str, str]]:
    base = found.stability.base
    band = found.stability.key_sliding or found.stability.sliding
    where = "on the base" if band.plane == "base" else "through the key"
    place = float(base.from_toe[0])
    figures = [(_span(band), f"sliding factor {where}, low to high friction")]
    if math.isnan(place):
        figures.append(("–", resultant_words(found, 0, system)))
    else:
        width = show(float(found.section.base_width[0]), "length", system)
        figures.append((show(place, "length", system), f"resultant from the toe, base {width}"))
    through = "; the crack runs through" if found.stability.runs_through[0] else ""
    return [*figures, (share(float(base.compressed[0])), f"of the base in compression{through}")]


def _span(band: SlidingBand) -> str:
    low, high = ratio(float(band.low[0])), ratio(float(band.high[0]))
    return low if low == high else f"{low} – {high}"


def _sheet(found: IWallResult, system: System) -> list[tuple[str, str]]:
    depth = found.embedment
    required = float(depth.required[0])
    needed = show(required, "length", system) if depth.found[0] else "none found"
    provided = show(float(depth.provided[0]), "length", system)
    return [
        (needed, f"embedment needed, the sheet has {provided}"),
        (show(float(found.horizontal[0]), "line load", system), "force above the ground"),
        (show(abs(float(found.bending[0])), "moment per length", system), "greatest moment in the sheet"),
    ]


def criteria_note(barrier: AssessedWall) -> str:
    """Which criteria and edition are in force, with what they ask; always shown."""
    return f'<div class="sh-note"><b>{escaped(criteria_text(barrier))}</b></div>'


def criteria_text(barrier: AssessedWall) -> str:
    """Which criteria and edition are in force, with what they ask, as text."""
    found = barrier.found
    if isinstance(found, IWallResult):
        record = found.record
        return (
            f"Criteria in force: {record.method}, passive pressure over {record.passive_factor:g}, embedment "
            f"times {record.embedment_increase:g}; category {record.category}."
        )
    return _NO_CRITERIA if found.criteria is None else criteria_words(found.criteria, found)


def criteria_words(held: CriteriaSet, found: WallResult) -> str:
    """Set, edition, category, and what they ask of it."""
    category = found.record.category
    asked = []
    for name, figures, unit in (
        ("sliding", held.sliding, ""),
        ("base in compression", held.compression, " %"),
        ("flotation", held.flotation, ""),
        ("bearing", held.bearing, ""),
    ):
        if category in figures:
            figure = figures[category]
            within = name == "base in compression" and not figure
            asked.append("resultant within the base" if within else f"{name} at least {figure:g}{unit}")
    what = "; ".join(asked) or "nothing of this category"
    remark = f" {held.remark[:1].upper()}{held.remark[1:]}." if held.remark else ""
    return f"Criteria in force: {held.words}. Category {category}: {what}.{remark}"


def wall_part(barrier: AssessedWall, labels: Sequence[str], system: System) -> str:
    """Sliding band, neighbouring states and forces, each under its heading."""
    return (
        sliding_table(barrier)
        + subheading("If the water stands otherwise")
        + states_table(barrier, labels, system)
        + subheading("Forces per unit of length")
        + forces_table(barrier, system)
        + _action_note(barrier, system)
    )


def _action_note(barrier: AssessedWall, system: System) -> str:
    action = float(barrier.resultant.line_of_action[0])
    words = f"line of action at {elevation(action, system)}" if math.isfinite(action) else "no line of action"
    force = show(float(barrier.resultant.horizontal[0]), "line load", system)
    return f'<div class="sh-note">Horizontal force {force}, {words}.</div>'


def forces_table(barrier: AssessedWall, system: System) -> str:
    """Every force with its arm and moment, and their sums; of an I-wall by cause above the ground."""
    found = barrier.found
    if isinstance(found, IWallResult):
        return _causes(barrier, system)
    rows = [row for row in found.stability.forces if row.value[0] != 0]
    stable = found.stability
    values = show_all([float(row.value[0]) for row in rows], "line load", system)
    arms = show_all([float(row.arm[0]) for row in rows], "length", system)
    moments = show_all([*(float(r.moment[0]) for r in rows), float(stable.moment[0])], _MOMENT, system)
    cells = [
        [escaped(row.name), "across" if row.direction == "horizontal" else "up", value, arm, moment]
        for row, value, arm, moment in zip(rows, values, arms, moments, strict=False)
    ]
    sums = " · ".join(
        show(float(one[0]), "line load", system) for one in (stable.horizontal, stable.vertical)
    )
    cells.append(["sum, across · up", "", sums, "", moments[-1]])
    headings = ("force per length", "direction", "value", "arm", "moment about the toe")
    return table(headings, cells, numeric={2, 3, 4}, total=True)


_MOMENT = "moment per length"


def _causes(barrier: AssessedWall, system: System) -> str:
    parts = [(name, part) for name, part in barrier.by_load.items() if part.horizontal[0] != 0]
    both = [*(part for _, part in parts), barrier.resultant]
    forces = show_all([float(part.horizontal[0]) for part in both], "line load", system)
    moments = show_all([float(part.moment[0]) for part in both], _MOMENT, system)
    names = [*(escaped(name) for name, _ in parts), "net"]
    headings = ("cause, above the ground", "force", "moment about the ground")
    return table(
        headings, [list(r) for r in zip(names, forces, moments, strict=True)], numeric={1, 2}, total=True
    )


def sliding_table(barrier: AssessedWall) -> str:
    """Sliding factors over the friction, with and without uplift, under their definition."""
    found = barrier.found
    if isinstance(found, IWallResult):
        return ""
    key = found.stability.key_sliding
    rows = [
        [
            "on the base" if band.plane == "base" else "through the key",
            *(ratio(float(getattr(band, name)[0])) for name in _BAND),
        ]
        for band in (found.stability.sliding, *([key] if key else []))
    ]
    headings = ("plane", "low friction", "as stated", "high friction", "low, no uplift", "high, no uplift")
    return (
        subheading("Sliding as a band")
        + table(headings, rows, numeric={1, 2, 3, 4, 5})
        + f'<div class="sh-note">{escaped(DEFINITION)}</div>'
    )


_BAND = ("low", "factor", "high", "low_without_uplift", "high_without_uplift")


def states_table(barrier: AssessedWall, labels: Sequence[str], system: System) -> str:
    """What governs in neighbouring states, and the figures of each."""
    found = barrier.found
    own = _OF_SHEET if isinstance(found, IWallResult) else _OF_WALL
    rows = []
    for i, label in enumerate(labels):
        check = pressing(barrier.checks, i)
        rows.append(
            [
                escaped(label),
                elevation(float(barrier.levels.flood_side[i]), system),
                elevation(float(barrier.levels.protected_side[i]), system),
                *_cells(found, i, system),
                escaped(check_title(check, "wall")) if check else "no limit entered",
                ratio_cell(check, i) if check else "",
                verdict_mark(barrier.verdict(i)),
            ]
        )
    headings = ("state", "flood side", "protected side", *own, "governs", "of limit", "verdict")
    count = len(own)
    return table(headings, rows, numeric={1, 2, *range(3, 3 + count), 4 + count})


_OF_WALL = ("sliding factor", "resultant from the toe", "compressed")
_OF_SHEET = ("force", "embedment needed")


def _cells(found: WallResult | IWallResult, i: int, system: System) -> list[str]:
    if isinstance(found, IWallResult):
        return _sheet_cells(found, i, system)
    base = found.stability.base
    band = found.stability.key_sliding or found.stability.sliding
    place = float(base.from_toe[i])
    return [
        ratio(float(band.factor[i])),
        "–" if math.isnan(place) else show(place, "length", system),
        share(float(base.compressed[i])),
    ]


def _sheet_cells(found: IWallResult, i: int, system: System) -> list[str]:
    required = float(found.embedment.required[i])
    return [
        show(float(found.horizontal[i]), "line load", system),
        "–" if math.isnan(required) else show(required, "length", system),
    ]
