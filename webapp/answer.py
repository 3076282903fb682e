"""The answer as data: the JSON of a check, and a scenario text with levels overridden."""

from __future__ import annotations

import copy
from collections.abc import Mapping
from typing import Any

from loads import __version__
from loads.assessment import Assessed, AssessedClosure, AssessedWall, Assessment, Barrier, Withheld, assess
from loads.cautions import CAUTIONS
from loads.document import input_digest
from loads.faces import Resultant
from loads.records.base import read_date
from loads.scenario_file import Document, parse_document, scenario_of
from loads.states import Levels
from loads.units import SI_UNITS
from loads.working import Step, Term, working
from webapp.answer_closure import closure_answer
from webapp.answer_parts import check_answer, first_limit_answer, number, part_answer
from webapp.answer_wall import wall_about, wall_answer
from webapp.reading_levels import readings_answer

SCHEMA = "sillhead/1"


def with_levels(document: Document, overrides: Mapping[str, str]) -> Document:
    """Copy of a document with typed levels in place of its own.

    Parameters
    ----------
    document
        As read.
    overrides
        "flood_side" and "protected_side" with what was typed; "dry" empties the protected side.
    """
    changed = copy.deepcopy(document)
    water = changed.get("water")
    if not isinstance(water, dict):
        return changed
    for side, text in overrides.items():
        if side == "protected_side" and text.strip().lower() == "dry":
            water.pop(side, None)
        else:
            water[side] = text
        water.pop("as_of", None)
    return changed


def check_json(text: str, overrides: Mapping[str, str]) -> dict[str, Any]:
    """Answer to a scenario text.

    Parameters
    ----------
    text
        TOML.
    overrides
        As in `with_levels`.

    Raises
    ------
    ScenarioError
        With every problem.
    """
    document = with_levels(parse_document(text.encode()), overrides)
    return answer(assess(scenario_of(document)), document)


def answer(assessment: Assessment, document: Mapping[str, object], index: int = 0) -> dict[str, Any]:
    """JSON of one state of an assessment, SI base units, keys that are never renamed.

    Parameters
    ----------
    assessment
        What was computed.
    document
        The document it was computed from, for its digest.
    index
        Which state.
    """
    return {
        "schema": SCHEMA,
        "version": __version__,
        "input_digest": input_digest(document),
        "title": assessment.scenario.title,
        "datum": assessment.scenario.datum,
        "fluids": {
            side: {"unit_weight": fluid.unit_weight, "basis": fluid.basis}
            for side, fluid in assessment.fluids.items()
        },
        "barriers": [_barrier(barrier, index) for barrier in assessment.barriers],
        **readings_answer(assessment.scenario),
        "cautions": list(CAUTIONS),
    }


def _barrier(barrier: Barrier, index: int) -> dict[str, Any]:
    head = {
        "id": barrier.record.id,
        "kind": barrier.record.kind,
        "name": barrier.record.name,
        "verdict": barrier.verdict(index),
        "levels": _levels(barrier.setting.levels, index),
        "rated_level": _rated_level(barrier),
    }
    if not isinstance(barrier, Assessed):
        return {**head, **_withheld(barrier)}
    more: dict[str, Any] = {}
    if isinstance(barrier, AssessedClosure):
        more = closure_answer(barrier, index)
    elif isinstance(barrier, AssessedWall):
        more = wall_answer(barrier, index)
    return {**head, **_results(barrier, index), **more}


def _withheld(barrier: Withheld) -> dict[str, Any]:
    return {
        "load": None,
        "recheck": {
            "agrees": False,
            "largest_difference": barrier.difference,
            "subject": barrier.subject,
            "first": {"horizontal": barrier.first[0], "moment": barrier.first[1]},
            "second": {"horizontal": barrier.second[0], "moment": barrier.second[1]},
        },
        "diagram": [],
        "parts": [],
        "checks": [],
        "first_limit": None,
        "working": [],
        "remarks": [],
    }


def _results(barrier: Assessed, index: int) -> dict[str, Any]:
    rows = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    return {
        "load": _load(barrier, index),
        "diagram": [{"z": z, "pressure": pressure} for z, pressure in rows],
        "recheck": {
            "agrees": bool(barrier.recheck.agrees[index]),
            "largest_difference": float(barrier.recheck.difference[index]),
        },
        "parts": [part_answer(part, index) for part in barrier.parts],
        "checks": [check_answer(check, index) for check in barrier.checks],
        "first_limit": first_limit_answer(barrier.first_limit),
        "working": [_step(step) for step in working(barrier, index)],
        "remarks": list(barrier.remarks),
    }


def _load(barrier: Assessed, index: int) -> dict[str, Any]:
    return {
        **_resultant(barrier.resultant, index),
        "about": wall_about(barrier)
        if isinstance(barrier, AssessedWall)
        else {"x": 0.0, "z": barrier.face.bottom},
        "line_of_action": number(barrier.resultant.line_of_action[index]),
        "by_load": {
            name: {"horizontal": float(part.horizontal[index]), "moment": float(part.moment[index])}
            for name, part in barrier.by_load.items()
        },
    }


def _levels(levels: Levels, index: int) -> dict[str, float | None]:
    return {f"{side}_side": number(levels.of(side)[index]) for side in ("flood", "protected")}


def _rated_level(barrier: Barrier) -> dict[str, Any] | None:
    rated = barrier.record.rated_level
    if rated is None:
        return None
    day = read_date(rated.dated)
    return {"level": rated.value, "source": rated.source, "date": day.isoformat() if day else None}


def _resultant(found: Resultant, index: int) -> dict[str, float]:
    return {
        "horizontal": float(found.horizontal[index]),
        "vertical": float(found.vertical[index]),
        "normal": float(found.total[index]),
        "moment": float(found.moment[index]),
    }


def _step(step: Step) -> dict[str, Any]:
    return {
        "title": step.title,
        "formula": step.formula,
        "terms": [_term(term) for term in step.terms],
        "results": [_term(term) for term in step.results],
    }


def _term(term: Term) -> dict[str, Any]:
    kind = "length" if term.kind == "elevation" else term.kind
    return {
        "symbol": term.symbol,
        "meaning": term.meaning,
        "value": number(term.value),
        "unit": SI_UNITS.get(kind, ""),
    }
