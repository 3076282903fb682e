"""What the forms of the clock ask: gauges, ways to the barriers, crews and timed drills."""

from __future__ import annotations

import copy
from collections.abc import Mapping
from typing import Any

from loads.records.base import Record
from loads.records.crew import Crew, Drill
from loads.records.gauge import Gauge, Transfer
from loads.scenario_file import Document

CLOCK_RECORDS: dict[str, type[Record]] = {
    "gauge": Gauge,
    "gauge.transfer": Transfer,
    "crew": Crew,
    "clock.drill": Drill,
}
"""Records by the name under which forms know them."""
CLOCK_PEDIGREED = frozenset(
    {
        ("gauge", "zero"),
        ("gauge", "datum_shift"),
        ("gauge", "highest_true_reading"),
        ("gauge.transfer", "offset"),
    }
)
"""Fields whose source and date are asked too."""
CLOCK_FIELDS: dict[str, tuple[str, ...]] = {
    "gauge": (
        "id",
        "name",
        "number",
        "datum",
        "zero",
        "datum_shift",
        "highest_true_reading",
        "lowest_true_reading",
        "lowest_on_record",
        "highest_on_record",
        "fastest_change",
        "note",
    ),
    "gauge.transfer": (
        "to",
        "offset",
        "slope",
        "distance_downstream",
        "uncertainty",
        "lowest_stage",
        "highest_stage",
        "source",
        "date",
    ),
    "crew": ("id", "name", "people", "can", "available_from", "mobilisation", "travel", "move", "note"),
    "clock.drill": (
        "date",
        "people",
        "install_time",
        "posts",
        "logs",
        "minutes_per_post",
        "minutes_per_log",
        "note",
    ),
}
"""Fields asked of each; a transfer by a table of readings is entered in the scenario's text."""

Path = tuple[str | int, ...]
"""Keys and positions that lead to a list of tables of a document."""


def tables_at(document: Mapping[str, Any], path: Path) -> list[dict[str, Any]]:
    """Tables of a list of a document, none where the list is not there."""
    here: Any = document
    for key in path:
        here = here[key] if isinstance(key, int) else here.get(key, {} if key == "clock" else [])
    return list(here)


def with_table_at(document: Document, path: Path, number: int, table: dict[str, Any] | None) -> Document:
    """Copy of a document with one table of a list changed, added at the end, or taken out."""
    changed = copy.deepcopy(document)
    here: Any = changed
    for key in path[:-1]:
        here = here[key] if isinstance(key, int) else here.setdefault(key, {})
    last = str(path[-1])
    tables = list(here.get(last, []))
    tables[number : number + 1] = [] if table is None else [table]
    here.pop(last, None)
    if tables:
        here[last] = tables
    return changed
