"""The answer as a table of text, for a terminal."""

from __future__ import annotations

import math
import unicodedata
from collections.abc import Mapping, Sequence

from loads import __version__
from loads.assessment import Assessed, AssessedWall, Assessment, Barrier
from loads.cautions import HEADLINE
from loads.document import check_code, input_digest
from loads.wall.assess import head_foot
from webapp.display import NO_BREAK, THOUSANDS, System, elevation, load_kind, show, significant
from webapp.part_words import check_title

_HEADINGS = (
    "id",
    "name",
    "verdict",
    "of limit",
    "check",
    "head",
    "force",
    "moment",
    "acts at",
    "rated",
    "first limit",
)
_RIGHT = frozenset({3, 5, 6, 7, 8, 9, 10})
_LEGEND = (
    "force: horizontal, positive toward the protected side; moment: about the bottom edge or the sill; first "
    "limit: computed, a screening figure"
)
_WALL_LEGEND = (
    "walls: per unit of length; moment about the toe, of an I-wall about the protected-side ground; head "
    "above the ground"
)


def table_text(assessment: Assessment, document: Mapping[str, object]) -> str:
    """Return what `sillhead check` prints: levels, a row for each barrier, remarks and the caution."""
    scenario, system = assessment.scenario, assessment.scenario.units
    flood, protected = (float(assessment.levels.of(side)[0]) for side in ("flood", "protected"))
    behind = elevation(protected, system, scenario.datum if math.isfinite(protected) else "")
    time = f"as of {scenario.water.as_of.isoformat()}" if scenario.water.as_of else "no time stated"
    code = check_code(input_digest(document))
    lines = [
        f"{scenario.title}   [{scenario.status}]   {code}",
        f"flood side {elevation(flood, system, scenario.datum)}   protected side {behind}   {time}",
        "",
        *aligned([_HEADINGS, *(_row(barrier, system) for barrier in assessment.barriers)], _RIGHT),
        "",
        *_remarks(assessment.barriers),
        _LEGEND,
        *([_WALL_LEGEND] if scenario.wall or scenario.i_wall else []),
        f"Sillhead {__version__}. {HEADLINE}",
    ]
    return plain("\n".join(lines))


def _row(barrier: Barrier, system: System) -> tuple[str, ...]:
    panel = barrier.record
    rated = elevation(panel.rated_level.value, system) if panel.rated_level else "none entered"
    if not isinstance(barrier, Assessed):
        return (panel.id, panel.name, "withheld", "", "", "", "", "", "", rated, "")
    worst = barrier.checks[0]
    part = "" if worst.subject.startswith(panel.kind) else f"{worst.subject}, "
    title = check_title(worst, panel.kind) if panel.kind == "wall" else f"{part}{worst.name}"
    checked = worst.limit is not None
    action = float(barrier.resultant.line_of_action[0])
    kind = panel.kind
    return (
        panel.id,
        panel.name,
        barrier.verdict(),
        significant(float(worst.ratio[0]), 3) if checked else "",
        title if checked else "no limit entered",
        show(head_on(barrier), "length", system),
        show(float(barrier.resultant.horizontal[0]), load_kind(kind, "force"), system),
        show(float(barrier.resultant.moment[0]), load_kind(kind, "moment"), system),
        elevation(action, system) if math.isfinite(action) else "–",
        rated,
        first_limit_text(barrier, system),
    )


def head_on(barrier: Assessed) -> float:
    """Head of the flood side on the bottom, or on the ground at a wall; nil below it. [m]."""
    foot = head_foot(barrier.record)[0].value if isinstance(barrier, AssessedWall) else barrier.face.bottom
    return max(float(barrier.levels.flood_side[0]) - foot, 0.0)


def first_limit_text(barrier: Assessed, system: System) -> str:
    """First-limit level in words: the level, or why there is none."""
    first = barrier.first_limit
    if first is None:
        return "no limit entered"
    if first.level is None:
        return f"none up to {elevation(first.ceiling, system)}"
    if first.without_water:
        return "reached without water"
    return elevation(first.level, system)


def _remarks(barriers: Sequence[Barrier]) -> list[str]:
    lines = []
    for barrier in barriers:
        if isinstance(barrier, Assessed):
            lines += [f"{barrier.record.id}: {remark}" for remark in barrier.remarks]
        else:
            lines.append(
                f"{barrier.record.id}: {disagreement_text(barrier.first, barrier.second, barrier.subject)}"
            )
    return [*lines, ""] if lines else []


def disagreement_text(first: tuple[float, float], second: tuple[float, float], subject: str = "") -> str:
    """Sentence about two computations that disagree; `subject` is the part whose figures they are."""
    about = f" about {subject}" if subject else ""
    return (
        f"withheld: the two computations disagree{about} (force {first[0]:.9g} against {second[0]:.9g} N, "
        f"moment {first[1]:.9g} against {second[1]:.9g} N·m). Do not use this barrier's figures; report it."
    )


def aligned(rows: Sequence[tuple[str, ...]], right: frozenset[int]) -> list[str]:
    """Rows as lines with their columns one under the other, those of `right` ending together."""
    widths = [max(_width(row[i]) for row in rows) for i in range(len(rows[0]))]
    return [
        "  ".join(_padded(cell, widths[i], right=i in right) for i, cell in enumerate(row)).rstrip()
        for row in rows
    ]


def _padded(cell: str, width: int, *, right: bool) -> str:
    gap = " " * (width - _width(cell))
    return gap + cell if right else cell + gap


def _width(text: str) -> int:
    """Columns that a text takes in a terminal."""
    wide = sum(unicodedata.east_asian_width(c) in "WF" for c in text)
    return len(text) + wide - sum(bool(unicodedata.combining(c)) for c in text)


def plain(text: str) -> str:
    """Text for a terminal: plain blanks only."""
    return text.replace(NO_BREAK, " ").replace(THOUSANDS, " ")
