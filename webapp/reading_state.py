"""How the readings of a session's document are found, added, changed, taken out and used as a level."""

from __future__ import annotations

import copy
from collections.abc import Mapping
from datetime import date, datetime
from typing import Any

from loads.reading import LevelReading, typed_level
from loads.records.scenario import Scenario
from loads.scenario_file import Document, scenario_of
from webapp.display import System, barrier_title
from webapp.reading_levels import NoLevel, level_found
from webapp.state import Session, replace_document

NEW = "\n"
"""Choice of a reading that is not in the document yet; no id is like it."""

_UNITS: Mapping[System, str] = {"US": "ft", "SI": "m"}


def reading_titles(document: Document) -> dict[str, str]:
    """Id and title of every reading in the order of the file, and a last one to add another."""
    titles = {
        str(record["id"]): barrier_title(str(record["id"]), str(record.get("name", "")))
        for record in document.get("reading", ())
    }
    return {**titles, NEW: "Add a reading"}


def place_of(document: Document, chosen: str) -> int:
    """Place of a chosen reading in the file; of a new one that after the last."""
    ids = [str(record["id"]) for record in document.get("reading", ())]
    return len(ids) if chosen == NEW else ids.index(chosen)


def table_at(document: Document, place: int) -> dict[str, Any]:
    """Table of the reading at a place; after the last what a new one begins with."""
    records = document.get("reading", ())
    if place < len(records):
        return {**records[place], "side": records[place].get("side", "flood")}
    taken = {str(record["id"]) for record in records}
    free = next(f"R{n}" for n in range(1, len(taken) + 2) if f"R{n}" not in taken)
    return {"id": free, "kind": "staff", "side": "flood"}


def with_reading(document: Document, place: int, table: Mapping[str, Any] | None) -> Document:
    """Copy of a document with the reading at a place changed, added after the last, or taken out."""
    changed = copy.deepcopy(document)
    records = list(changed.get("reading", ()))
    records[place : place + 1] = [] if table is None else [dict(table)]
    changed.pop("reading", None)
    if records:
        changed["reading"] = records
    return changed


def found_at(scenario: Scenario, place: int) -> LevelReading | NoLevel:
    """Level from the reading at a place."""
    return level_found(scenario, scenario.reading[place])


def side_of(found: LevelReading) -> str:
    """Side that a reading is of, as the file calls it."""
    return f"{found.reading.side}_side"


def level_entry(found: LevelReading, system: System) -> dict[str, object]:
    """Level of a reading as it stands in a document: value, range by the worst corners, source, date."""
    entry: dict[str, object] = dict(typed_level(found, _UNITS[system]))
    if "date" in entry:
        entry["date"] = date.fromisoformat(str(entry["date"]))
    return entry


def is_in_use(document: Document, found: LevelReading, system: System) -> bool:
    """Whether the document's level of that side is the one of this reading."""
    level = document["water"].get(side_of(found))
    entry = level_entry(found, system)
    # a link holds a date as text
    return isinstance(level, Mapping) and {k: str(v) for k, v in level.items()} == {
        k: str(v) for k, v in entry.items()
    }


def with_level_of(document: Document, found: LevelReading, system: System) -> Document:
    """Copy of a document with the level of a reading.

    Its time becomes that of both levels only as far as it makes neither look newer than it is: the earlier of
    the two where the other side has a level, and none where either time is not known.
    """
    changed = copy.deepcopy(document)
    water = changed["water"]
    before = scenario_of(document).water.as_of
    side = side_of(found)
    other = "protected_side" if side == "flood_side" else "flood_side"
    water[side] = level_entry(found, system)
    water.pop("as_of", None)
    moment = _time_of_both(found.reading.as_of, before) if other in water else found.reading.as_of
    if moment is not None:
        water["as_of"] = moment
    return changed


def _time_of_both(one: datetime | None, other: datetime | None) -> datetime | None:
    return None if one is None or other is None else min(one, other)


def use_level(session: Session, place: int) -> None:
    """Take the level of the reading at a place into the session's document, when it gives one."""
    document = session["document"]
    found = found_at(scenario_of(document), place)
    if has_level(found):
        assert isinstance(found, LevelReading)
        replace_document(session, with_level_of(document, found, session["system"]))


def has_level(found: LevelReading | NoLevel) -> bool:
    """Whether there is a level to use: the sensor is not dry and has data."""
    return isinstance(found, LevelReading) and not (found.dry[0] or found.no_data[0])
