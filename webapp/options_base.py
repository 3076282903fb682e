"""What options start from: a wall of the scenario, or a start in the site's levels; and the way back."""

from __future__ import annotations

import copy
import math
from collections.abc import Mapping
from typing import Any

from loads.problems import Problem
from loads.quantity import read_quantity
from loads.scenario_file import Document
from loads.units import from_si
from webapp.barrier_state import barrier_titles
from webapp.display import System, barrier_title
from webapp.state import Session, replace_document, typed_level

_START = "\n"
STARTS = {f"{_START}T": "A T-wall to start from", f"{_START}gravity": "A gravity wall to start from"}
"""Walls that are not in the scenario; no id is like theirs."""
START_FIELDS = ("base", "height", "unit_weight", "friction_angle", "flood_ground", "protected_ground")
"""What is typed for a start; the friction angle is that of the base on the ground."""
MOST_BESIDE = 4
_SHAPES = ("gravity", "T", "L")
_SIZES: dict[System, dict[str, dict[str, str]]] = {
    "US": {
        "T": {
            "height": "12 ft",
            "top_width": "1 ft",
            "stem_width": "1.5 ft",
            "base_thickness": "2 ft",
            "heel": "13 ft",
            "toe": "3 ft",
            "unit_weight": "150 pcf",
        },
        "gravity": {
            "height": "12 ft",
            "top_width": "2 ft",
            "base_width": "9 ft",
            "unit_weight": "145 pcf",
        },
    },
    "SI": {
        "T": {
            "height": "3.6 m",
            "top_width": "0.3 m",
            "stem_width": "0.45 m",
            "base_thickness": "0.6 m",
            "heel": "4 m",
            "toe": "0.9 m",
            "unit_weight": "23.5 kN/m3",
        },
        "gravity": {
            "height": "3.6 m",
            "top_width": "0.6 m",
            "base_width": "2.7 m",
            "unit_weight": "23 kN/m3",
        },
    },
}
_BELOW: Mapping[System, tuple[str, float]] = {"US": ("ft", 9.0), "SI": ("m", 2.7)}


def base_titles(document: Document) -> dict[str, str]:
    """Walls that options can start from, those of the scenario first."""
    walls = {
        str(record["id"]): barrier_title(str(record["id"]), str(record.get("name", "")))
        for record in document.get("wall", ())
        if record.get("shape") in _SHAPES
    }
    return {**walls, **STARTS}


def start_table(document: Document, chosen: str, system: System) -> dict[str, Any]:
    """Table of a start: its base below the flood-side level, its other figures only to begin with."""
    unit, below = _BELOW[system]
    level = read_quantity(typed_level(document, "flood_side"), "length")[0]
    base = math.floor(from_si(level, unit, "length") - below)
    shape = chosen.removeprefix(_START)
    taken = set(barrier_titles(document))
    return {
        "id": next(f"W{n}" for n in range(1, len(taken) + 2) if f"W{n}" not in taken),
        "name": "from options",
        "shape": shape,
        "base": f"{base} {unit}",
        **_SIZES[system][shape],
        "criteria": "EM 1110-2-2100 normal ordinary",
        "category": "usual",
        "foundation": {"friction_angle": "28 deg"},
    }


def with_typed(table: Mapping[str, Any], typed: Mapping[str, str]) -> dict[str, Any]:
    """Start with what was typed over it; an empty field takes the value out."""
    changed = copy.deepcopy(dict(table))
    for name, text in typed.items():
        where = changed["foundation"] if name == "friction_angle" else changed
        where.pop(name, None)
        if text.strip():
            where[name] = text.strip()
    return changed


def base_table(document: Document, chosen: str) -> dict[str, Any]:
    """Table of a wall of the scenario."""
    return next(copy.deepcopy(dict(one)) for one in document["wall"] if str(one["id"]) == chosen)


def put_into(session: Session, table: Mapping[str, Any]) -> tuple[Problem, ...]:
    """Write a candidate over the wall of its id in the document, or add it where there is none."""
    document = copy.deepcopy(session["document"])
    walls = list(document.get("wall", ()))
    ids = [str(one["id"]) for one in walls]
    if table["id"] in ids:
        walls[ids.index(str(table["id"]))] = dict(table)
    else:
        walls.append(dict(table))
    document["wall"] = walls
    return replace_document(session, document)


def as_another(document: Document, table: Mapping[str, Any]) -> dict[str, Any]:
    """Candidate under an id that is free."""
    taken = set(barrier_titles(document))
    stem = str(table["id"])[:18]
    free = next(f"{stem}-{n}" for n in range(2, len(taken) + 3) if f"{stem}-{n}" not in taken)
    return {**copy.deepcopy(dict(table)), "id": free}


def put_beside(session: Session, table: Mapping[str, Any]) -> None:
    """Keep a candidate for the table side by side, the last four of them, none twice."""
    kept = [one for one in session.get("options beside", ()) if one != table]
    session["options beside"] = [*kept, dict(table)][-MOST_BESIDE:]
