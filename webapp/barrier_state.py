"""How the barriers of a session's document are found, added, changed and taken out."""

from __future__ import annotations

import copy
from typing import Any

from loads.problems import ScenarioError
from loads.scenario_file import BARRIER_KEYS, Document, scenario_of
from webapp.display import barrier_title
from webapp.state import Session, replace_document

Place = tuple[str, int]
"""Where a barrier stands in a document: its table, such as "closure", and its number there from 0."""


def barrier_titles(document: Document) -> dict[str, str]:
    """Id and title of every barrier, kind by kind, in the order of the file."""
    return {
        str(record["id"]): barrier_title(str(record["id"]), str(record.get("name", "")))
        for kind in BARRIER_KEYS
        for record in document.get(kind, ())
    }


def place_of(document: Document, barrier_id: str) -> Place:
    """Place of the barrier with an id.

    Raises
    ------
    KeyError
        There is none.
    """
    for kind in BARRIER_KEYS:
        for number, record in enumerate(document.get(kind, ())):
            if str(record["id"]) == barrier_id:
                return kind, number
    raise KeyError(barrier_id)


def record_at(document: Document, place: Place) -> dict[str, Any]:
    """Table of the barrier at a place."""
    record: dict[str, Any] = document[place[0]][place[1]]
    return record


def with_barrier(document: Document, place: Place, record: dict[str, Any]) -> Document:
    """Copy of a document with one barrier changed."""
    changed = copy.deepcopy(document)
    changed[place[0]][place[1]] = record
    return changed


def with_layer(document: Document, place: Place, number: int, layer: dict[str, Any] | None) -> Document:
    """Copy of a document with one sediment layer of a barrier changed, added at the end, or taken out."""
    changed = copy.deepcopy(document)
    record = record_at(changed, place)
    layers = list(record.get("sediment", []))
    layers[number : number + 1] = [] if layer is None else [layer]
    record.pop("sediment", None)
    if layers:
        record["sediment"] = layers
    return changed


def add_barrier(session: Session, kind: str, record: dict[str, Any]) -> None:
    """Add a barrier of a kind at the end and choose it."""
    changed = copy.deepcopy(session["document"])
    changed.setdefault(kind, []).append(record)
    if not replace_document(session, changed):
        session["barrier"] = record["id"]


def copy_barrier(session: Session, place: Place) -> None:
    """Add a copy of a barrier under an id that is free, and choose it."""
    document = session["document"]
    taken = set(barrier_titles(document))
    record = record_at(document, place)
    stem = str(record["id"])[:18]
    free = next(f"{stem}-{n}" for n in range(2, len(taken) + 3) if f"{stem}-{n}" not in taken)
    add_barrier(session, place[0], {**copy.deepcopy(record), "id": free})


def _moved_logs(document: Document, place: Place, step: int) -> int | list[int]:
    """Logs in place after one more, or one less, in every bay as far as there are any."""
    record = record_at(document, place)
    on_hand, placed = record["log"]["count"], record.get("logs_in_place", record["log"]["count"])
    if isinstance(on_hand, int) and isinstance(placed, int):
        return min(max(placed + step, 0), on_hand)
    bays = len(on_hand if isinstance(on_hand, list) else placed)
    had, stand = (value if isinstance(value, list) else [value] * bays for value in (on_hand, placed))
    return [min(max(now + step, 0), most) for now, most in zip(stand, had, strict=True)]


def can_move_logs(document: Document, place: Place, step: int) -> bool:
    """Whether a step changes the logs of a closure and leaves a scenario."""
    record = record_at(document, place)
    moved = _moved_logs(document, place, step)
    if moved == record.get("logs_in_place", record["log"]["count"]):
        return False
    try:
        scenario_of(with_barrier(document, place, {**record, "logs_in_place": moved}))
    except ScenarioError:
        return False
    return True


def move_logs(session: Session, place: Place, step: int) -> None:
    """Take a log out of every bay of a closure, or put one in."""
    document = session["document"]
    if can_move_logs(document, place, step):
        moved = {**record_at(document, place), "logs_in_place": _moved_logs(document, place, step)}
        replace_document(session, with_barrier(document, place, moved))


def remove_barrier(session: Session, place: Place) -> None:
    """Take a barrier out."""
    changed = copy.deepcopy(session["document"])
    kind, number = place
    del changed[kind][number]
    if not changed[kind]:
        del changed[kind]
    replace_document(session, changed)
