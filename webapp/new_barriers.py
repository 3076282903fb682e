"""What a barrier begins with when somebody adds one."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from loads.scenario_file import BARRIER_KEYS
from webapp.forms import shown


def _free_id(document: Mapping[str, Any]) -> str:
    taken = {record["id"] for kind in BARRIER_KEYS for record in document.get(kind, ())}
    return next(f"N{n}" for n in range(1, len(taken) + 2) if f"N{n}" not in taken)


def _last_foot(document: Mapping[str, Any]) -> str:
    records = [record for kind in BARRIER_KEYS for record in document.get(kind, ())]
    return shown(records[-1].get("bottom") or records[-1].get("sill"))


def new_panel(document: Mapping[str, Any]) -> dict[str, Any]:
    """Panel of plain size: an unused id, at the foot of the last barrier, in the file's unit."""
    size = ("10 ft", "5 ft") if document.get("units", "US") == "US" else ("3 m", "1.5 m")
    begun = {"id": _free_id(document), "bottom": _last_foot(document)}
    return {**begun, "shape": "rectangle", "width": size[0], "height": size[1]}


def new_closure(document: Mapping[str, Any]) -> dict[str, Any]:
    """Closure of one bay of plain logs: an unused id, at the foot of the last barrier, in the file's unit."""
    size = ("8 ft", "9 in") if document.get("units", "US") == "US" else ("2.5 m", "200 mm")
    begun = {"id": _free_id(document), "sill": _last_foot(document)}
    return {**begun, "bays": 1, "bay_width": size[0], "log": {"height": size[1], "count": 8}}
