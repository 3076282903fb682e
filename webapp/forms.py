"""Forms: which fields a record has, how they are shown, and how what was typed goes back into a document.

Fields come from the records themselves, so form, file, schema and messages know the same names, meanings and
ranges. No Streamlit.
"""

from __future__ import annotations

import copy
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from datetime import date
from typing import Any, Literal, get_args, get_origin

from pydantic import AfterValidator

from loads.closure.materials import MATERIALS
from loads.quantity import Quantity
from loads.records.base import Measure, Record
from loads.records.basis import Basis
from loads.records.member import LogLimits, PostLimits, known_material
from loads.records.panel import Limits, Panel
from loads.records.per_bay import WholeNumbers
from loads.records.reading import ManometerLeg, Reading
from loads.records.scenario import Scenario, Water
from loads.records.sediment import Sediment
from loads.units import EXAMPLES
from webapp.clock_form import CLOCK_PEDIGREED, CLOCK_RECORDS
from webapp.closure_form import CLOSURE_FORM

SHAPE_FIELDS: dict[str, tuple[str, ...]] = {
    "rectangle": ("width", "height", "tilt"),
    "trapezoid": ("bottom_width", "top_width", "height", "tilt"),
    "circle": ("diameter", "tilt"),
    "outline": ("points", "holes", "tilt"),
    "arc": ("width", "height", "offset", "radius", "centre"),
}
"""Geometry asked for each shape."""

_YIELDING = (
    "saturated_unit_weight",
    "moist_unit_weight",
    "friction_angle",
    "cohesion",
    "wall_friction",
    "surcharge",
)
PRESSURE_FIELDS: dict[str, tuple[str, ...]] = {
    "at rest": (
        "saturated_unit_weight",
        "moist_unit_weight",
        "friction_angle",
        "overconsolidation_ratio",
        "surcharge",
    ),
    "active": _YIELDING,
    "passive": _YIELDING,
    "entered": ("saturated_unit_weight", "moist_unit_weight", "pressure_coefficient", "surcharge"),
    "fluid mud": ("fluid_unit_weight",),
    "equivalent fluid": ("fluid_unit_weight",),
}
"""Fields asked for each way in which a sediment layer presses."""

RECORDS: dict[str, type[Record]] = {
    "scenario": Scenario,
    "basis": Basis,
    "water": Water,
    "panel": Panel,
    "limits": Limits,
    "sediment": Sediment,
    "reading": Reading,
    "reading.leg": ManometerLeg,
    **{part.record_name: part.record for part in CLOSURE_FORM},
    **CLOCK_RECORDS,
}

_LIMITS = (Limits, LogLimits, PostLimits)
_PEDIGREED = {"rated_level", "allowance", "sill", "capacity", "limit", "pump_capacity"}


def has_pedigree(record: str, field: Field) -> bool:
    """Whether a form asks for source and date of a value too: of limits and of what decides."""
    own = issubclass(RECORDS[record], _LIMITS) or field.name in _PEDIGREED
    own = own or (record, field.name) in CLOCK_PEDIGREED
    return own and field.kind == "quantity"


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
        "quantity", "number", "whole", "whole numbers", "list", "lines", "text", "flag", "choice", "points" or
        "holes".
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
    kind, about = _kind(parts)
    meaning = about.meaning if isinstance(about, (Measure, WholeNumbers)) else info.description or ""
    example = (about.example or EXAMPLES[about.kind]) if isinstance(about, Measure) else ""
    if kind == "list":
        meaning, example = f"{meaning}; several, with commas between them", f"{example}, {example}"
    elif kind == "lines":
        meaning = "One to a line"
    choices = tuple(about) if isinstance(about, tuple) else ()
    return Field(name=name, label=label, meaning=meaning, kind=kind, choices=choices, example=example)


def _kind(parts: list[Any]) -> tuple[str, Any]:
    """Kind of a field, and the part of its definition that says more about it."""
    whole = next((part for part in parts if isinstance(part, WholeNumbers)), None)
    if whole is not None:
        return "whole numbers", whole
    measure = next((part for part in parts if isinstance(part, Measure)), None)
    if any(get_origin(part) is tuple for part in parts):
        return ("list", measure) if measure else ("lines", None)
    if measure is not None:
        return "quantity", measure
    for part in parts:
        if get_origin(part) is Literal:
            return "choice", get_args(part)
        if isinstance(part, AfterValidator) and part.func is known_material:
            return "choice", tuple(MATERIALS)
    kinds = {bool: "flag", float: "number", int: "whole"}
    return next((kind for type_, kind in kinds.items() if type_ in parts), "text"), None


def _parts(annotation: Any) -> list[Any]:
    found: list[Any] = []
    for part in (*get_args(annotation), *getattr(annotation, "__metadata__", ())):
        found += [part, *_parts(part)] if not isinstance(part, (str, Measure)) else [part]
    return [part for part in found if part is not Quantity]


def shown(value: object, kind: str = "") -> str:
    """Text of a document's value as it stands in a field of a kind."""
    if value is None:
        return ""
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, Mapping):
        return str(value.get("value", ""))
    if isinstance(value, (list, tuple)):
        if value and isinstance(value[0], (list, tuple)):
            return _ring_text(value)
        return ("\n" if kind == "lines" else ", ").join(shown(item) for item in value)
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
    if text == shown(before, field.kind).strip():
        return before
    read = _READERS.get(field.kind)
    return read(text) if read else text


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


def _whole(text: str) -> int | str:
    return int(text) if text.isdecimal() else text


def _whole_numbers(text: str) -> int | str | list[int | str]:
    parts = [_whole(part.strip()) for part in text.split(",")]
    return parts[0] if len(parts) == 1 else parts


_READERS: dict[str, Callable[[str], object]] = {
    "number": _number,
    "whole": _whole,
    "whole numbers": _whole_numbers,
    "flag": {"yes": True, "no": False}.__getitem__,
    "list": lambda text: [part.strip() for part in text.split(",")],
    "lines": lambda text: [line.strip() for line in text.splitlines() if line.strip()],
    "points": _corners,
    "holes": lambda text: [_corners(part) for part in text.split("\n\n") if part.strip()],
}


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


def table_at(record: Mapping[str, Any], path: tuple[str, ...]) -> dict[str, Any]:
    """Table within a barrier's table, empty when it is not there."""
    here: Any = record
    for name in path:
        here = here.get(name, {})
    return dict(here)


def with_table(
    record: Mapping[str, Any], path: tuple[str, ...], changes: Mapping[str, object | None]
) -> dict[str, Any]:
    """Copy of a barrier's table with changes to a table within it; one that they leave empty goes."""
    if not path:
        return merged(record, changes)
    before = record.get(path[0], {})
    inner = with_table(before, path[1:], changes)
    gone = not inner and (bool(before) or path[0] not in record)
    return merged(record, {path[0]: None if gone else inner})
