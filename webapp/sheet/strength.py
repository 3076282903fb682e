"""Rated level, loads and first-limit level of a field sheet, for the engineer on the telephone."""

from __future__ import annotations

import math
from collections import defaultdict
from dataclasses import dataclass

import numpy as np

from loads.assessment import AssessedClosure
from loads.checks import Verdict
from loads.part import Part
from webapp.display import elevation, significant
from webapp.part_words import first_words, parts_text
from webapp.sheet.plan import Plan
from webapp.sheet.words import above_sill, cut, sentence, source_words, span_text, value_text

_RATED_EMS, _PARTS_EMS = 44.0, 20.0
_MOST_CHECKS = 2
PRESSING: tuple[Verdict, ...] = ("above limit", "near limit")
"""Verdicts whose checks are named."""
_SAID_ELSEWHERE = (
    "Parts short",
    "Water stands at the sill: no more logs",
    "The water stands above the level up to which logs",
    "The level with its allowance",
    "The guides or seals bear one way only",
    "No logs are in place",
)


@dataclass(frozen=True, kw_only=True)
class LoadRow:
    """Loads at one level: along the closure, on the post that takes most, and the verdict."""

    level: str
    cells: tuple[str, str, str, Verdict]


@dataclass(frozen=True, kw_only=True)
class LoadTable:
    """Headings and rows of the loads."""

    headings: tuple[str, str, str, str, str]
    rows: tuple[LoadRow, ...]


def rated_lines(plan: Plan) -> list[str]:
    """Rated level with its head, name and day; and what is missing of these."""
    rated = plan.closure.rated_level
    if rated is None:
        return ["Rated level: none entered. Only an engineer sets it; this program does not."]
    head = rated.value - plan.sill
    place = above_sill(head, plan.system) + ("" if head > 0 else ", check the datum")
    level = elevation(rated.value, plan.system)
    return [f"Rated level {level}, {place}; {source_words(rated, _RATED_EMS)}."]


def first_limit_line(plan: Plan) -> str:
    """First-limit level with part and check, and that it is a screening figure."""
    first = plan.built.first_limit
    if first is None:
        return "First-limit level: none computed, no load limit was entered."
    if first.level is None:
        ceiling = elevation(first.ceiling, plan.system)
        return f"First-limit level: no load limit is reached up to {ceiling} (computed, for screening)."
    what = first_words(first, "closure")
    if first.without_water:
        return f"First limit: {what} is above its limit with no water on the sill (computed, for screening)."
    level = elevation(first.level, plan.system)
    return f"First-limit level {level} ({what}): computed, for screening, no rated level."


def load_table(plan: Plan) -> LoadTable:
    """Loads now and at the rated level."""
    built, per = plan.built, "foot" if plan.system == "US" else "metre"
    posts = [part for part in built.parts if part.kind == "post"]
    shown = posts or [part for part in built.parts if part.kind == "guide"]
    names = ("now", "rated level") if len(built.levels.flood_side) > 1 else ("now",)
    rows = tuple(_row(plan, shown, name, index) for index, name in enumerate(names))
    foot = ("post load", "moment at base") if posts else ("guide load", "moment at base")
    return LoadTable(headings=("water at", f"per {per}", *foot, "verdict"), rows=rows)


def _row(plan: Plan, uprights: list[Part], name: str, index: int) -> LoadRow:
    built, system = plan.built, plan.system
    loads = np.array([part.reaction[index] for part in uprights])
    moments = np.array([_base_moment(part, index) for part in uprights])
    return LoadRow(
        level=f"{elevation(float(built.levels.flood_side[index]), system)} {name}",
        cells=(
            value_text(_along(built, index), "line load", system),
            value_text(_greatest(loads), "force", system),
            value_text(_greatest(moments), "moment", system),
            built.verdict(index),
        ),
    )


def _along(built: AssessedClosure, index: int) -> float:
    """Load along the closure where its stack is highest. [N/m]."""
    layout = built.structure.layout
    return float(built.diagram.below(layout.highest_top).shear(np.array([layout.sill]))[index, 0])


def _base_moment(part: Part, index: int) -> float:
    found = [figure.value[index] for figure in part.more if figure.name == "base_moment"]
    return float(found[0]) if found else math.nan


def _greatest(values: np.ndarray) -> float:
    known = values[np.isfinite(values)]
    return float(known[np.argmax(np.abs(known))]) if len(known) else math.nan


def load_notes(plan: Plan) -> list[str]:
    """With how many logs the loads were computed, and which checks are most pressing."""
    layout = plan.layout
    what = "the post that takes most" if len(layout.counts) > 1 else "each guide"
    over = elevation(layout.lowest_top, plan.system)
    notes = [
        f"Of {what}, with {span_text(layout.counts)} logs in each bay; above {over} water goes over them.",
        pressing_text(plan),
    ]
    if len(plan.built.levels.flood_side) > 1 and plan.built.verdict(1) in PRESSING:
        notes.append(pressing_text(plan, 1))
    return [" ".join(notes)]


def pressing_text(plan: Plan, index: int = 0) -> str:
    """Checks with the verdict of the closure in a state when it is pressing, else the largest ratio."""
    checks, when = plan.built.checks, ("Now", "At the rated level")[index]
    verdict = plan.built.verdict(index)
    if verdict in PRESSING:
        names: dict[str, list[str]] = defaultdict(list)
        for check in checks:
            if check.verdict(index) == verdict:
                names[check.name].append(check.subject)
        texts = [_check_text(name, subjects) for name, subjects in list(names.items())[:_MOST_CHECKS]]
        texts += [f"{len(names) - _MOST_CHECKS} more"] if len(names) > _MOST_CHECKS else []
        return sentence(f"{when} {verdict}: {', '.join(texts)}")
    lead = next((check for check in checks if check.verdict() != "not checked"), None)
    if lead is None:
        return f"{when} not checked: no limit was entered."
    ratio = significant(float(lead.ratio[0]), 3)
    return sentence(f"{when} {ratio} of the limit: {_check_text(lead.name, [lead.subject])}")


def _check_text(name: str, subjects: list[str]) -> str:
    parts = [subject for subject in subjects if not subject.startswith("closure ")]
    return f"{name} of {cut(parts_text(parts), _PARTS_EMS)}" if parts else name


def remark_texts(plan: Plan) -> list[str]:
    """Remarks that no other line of the sheet makes."""
    return [text for text in plan.built.remarks if not text.startswith(_SAID_ELSEWHERE)]
