"""Forms: which fields a record has, how they are shown, and how what was typed goes back into a document.

Fields come from the records themselves, so form, file, schema and messages know the same names, meanings and
ranges. No Streamlit.
"""

from __future__ import annotations

import copy
from collections.abc import Iterable, Mapping
from dataclasses import dataclass
from datetime import date
from typing import Any, Literal, get_args, get_origin

from loads.quantity import Quantity
from loads.records.base import Measure, Record
from loads.records.panel import Limits, Panel
from loads.records.scenario import Scenario, Water
from loads.records.sediment import Sediment
from loads.units import EXAMPLES

PEDIGREED = ("rated_level", "pressure", "force", "moment", "freeboard")
"""Limits and rated level: their form asks for source and date too."""

SHAPE_FIELDS: dict[str, tuple[str, ...]] = {
    "rectangle": ("width", "height", "tilt"),
    "trapezoid": ("bottom_width", "top_width", "height", "tilt"),
    "circle": ("diameter", "tilt"),
    "outline": ("points", "holes", "tilt"),
    "arc": ("width", "height", "offset", "radius", "centre"),
}
"""Geometry asked for each shape."""

PRESSURE_FIELDS: dict[str, tuple[str, ...]] = {
    "at rest": (
        "saturated_unit_weight",
        "moist_unit_weight",
        "friction_angle",
        "overconsolidation_ratio",
        "surcharge",
    ),
    "active": (
        "saturated_unit_weight",
        "moist_unit_weight",
        "friction_angle",
        "cohesion",
        "wall_friction",
        "surcharge",
    ),
    "passive": (
        "saturated_unit_weight",
        "moist_unit_weight",
        "friction_angle",
        "cohesion",
        "wall_friction",
        "surcharge",
    ),
    "entered": ("saturated_unit_weight", "moist_unit_weight", "pressure_coefficient", "surcharge"),
    "fluid mud": ("fluid_unit_weight",),
    "equivalent fluid": ("fluid_unit_weight",),
}
"""Fields asked for each way in which a sediment layer presses."""

RECORDS: dict[str, type[Record]] = {
    "scenario": Scenario,
    "water": Water,
    "panel": Panel,
    "limits": Limits,
    "sediment": Sediment,
}


@dataclass(frozen=True, kw_only=True)
class Field:
    """One field of a form.

    Attributes
    ----------
    name
        Key in the file.
    label
        The key in words.
    meaning
        What it is and its range.
    kind
        "quantity", "number", "text", "choice", "outline" or "holes".
    choices
        What may be chosen, for a choice.
    example
        What an empty field shows.
    """

    name: str
    label: str
    meaning: str
    kind: str
    choices: tuple[str, ...] = ()
    example: str = ""


def field_of(record: str, name: str) -> Field:
    """Field of a record, from the record's own definition."""
    info = RECORDS[record].model_fields[name]
    label = name.replace("_", " ")
    label = label[0].upper() + label[1:]
    if name in ("points", "holes"):
        words = (
            "One corner a line: across, up the face, each with its unit. A blank line begins another hole."
        )
        return Field(name=name, label=label, meaning=words, kind=name, example="0 ft, 0 ft")
    parts = [info.annotation, *info.metadata, *_parts(info.annotation)]
    for part in parts:
        if isinstance(part, Measure):
            example = part.example or EXAMPLES[part.kind]
            return Field(name=name, label=label, meaning=part.meaning, kind="quantity", example=example)
        if get_origin(part) is Literal:
            return Field(
                name=name, label=label, meaning=info.description or "", kind="choice", choices=get_args(part)
            )
    kind = "number" if float in parts else "text"
    return Field(name=name, label=label, meaning=info.description or "", kind=kind)


def _parts(annotation: Any) -> list[Any]:
    found: list[Any] = []
    for part in (*get_args(annotation), *getattr(annotation, "__metadata__", ())):
        found += [part, *_parts(part)] if not isinstance(part, (str, Measure)) else [part]
    return [part for part in found if part is not Quantity]


def shown(value: object) -> str:
    """Text of a document's value as it stands in a field."""
    if value is None:
        return ""
    if isinstance(value, Mapping):
        return str(value.get("value", ""))
    if isinstance(value, (list, tuple)):
        return _ring_text(value)
    return str(value)


def _ring_text(value: Iterable[Any]) -> str:
    rows = list(value)
    if rows and rows[0] and isinstance(rows[0][0], (list, tuple)):
        return "\n\n".join(_ring_text(ring) for ring in rows)
    return "\n".join(", ".join(str(part) for part in corner) for corner in rows)


def pedigree_shown(value: object) -> tuple[str, str]:
    """Source and date of a document's value as they stand in their fields."""
    if not isinstance(value, Mapping):
        return "", ""
    return str(value.get("source", "")), str(value.get("date", ""))


def typed_value(field: Field, typed: str, before: object) -> object | None:
    """Value for the document from what stands in a field; None when the field is empty.

    A value that was not changed keeps its range, source and date; a changed one drops them, since they
    belonged to the old value.
    """
    text = typed.strip()
    if not text:
        return None
    if text == shown(before).strip():
        return before
    if field.kind == "number":
        return _number(text)
    if field.kind == "points":
        return _corners(text)
    if field.kind == "holes":
        return [_corners(part) for part in text.split("\n\n") if part.strip()]
    return text


def with_pedigree(value: object | None, source: str, day: str) -> object | None:
    """Value with the source and date typed beside it."""
    if value is None:
        return None
    known = dict(value) if isinstance(value, Mapping) else {"value": value}
    for key, text in (("source", source.strip()), ("date", day.strip())):
        known.pop(key, None)
        if text:
            known[key] = _day(text) if key == "date" else text
    return known if len(known) > 1 else known["value"]


def _day(text: str) -> date | str:
    try:
        return date.fromisoformat(text)
    except ValueError:
        return text


def _number(text: str) -> float | int | str:
    try:
        number = float(text)
    except ValueError:
        return text
    return int(number) if number.is_integer() and "." not in text and "e" not in text.lower() else number


def _corners(text: str) -> list[list[str]]:
    return [[part.strip() for part in line.split(",")] for line in text.splitlines() if line.strip()]


def merged(table: Mapping[str, Any], changes: Mapping[str, object | None]) -> dict[str, Any]:
    """Copy of a table of a document with changed values, empty ones taken out."""
    result = copy.deepcopy(dict(table))
    for name, value in changes.items():
        if value is None:
            result.pop(name, None)
        else:
            result[name] = value
    return result


def without_other(
    table: Mapping[str, Any], groups: Mapping[str, tuple[str, ...]], chosen: str
) -> dict[str, Any]:
    """Copy of a table without the fields that belong to choices other than the one made."""
    keep = set(groups[chosen])
    others = {name for names in groups.values() for name in names} - keep
    return {name: value for name, value in table.items() if name not in others}


def new_panel(document: Mapping[str, Any]) -> dict[str, Any]:
    """Panel to begin with: an unused id, at the bottom of the last one, of plain size in the file's unit."""
    panels = document["panel"]
    taken = {panel["id"] for panel in panels}
    number = next(n for n in range(1, len(panels) + 2) if f"N{n}" not in taken)
    size = ("10 ft", "5 ft") if document.get("units", "US") == "US" else ("3 m", "1.5 m")
    bottom = shown(panels[-1]["bottom"])
    return {"id": f"N{number}", "bottom": bottom, "shape": "rectangle", "width": size[0], "height": size[1]}
