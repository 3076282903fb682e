"""The exported JSON schema lists every field of the format, and the example files fit it."""

from __future__ import annotations

import re
from collections.abc import Iterator, Mapping
from typing import Any

from loads.records.base import Record
from loads.records.scenario import Scenario, scenario_schema
from loads.scenario_file import read_file
from tests.lines import SCENARIOS


def records(record: type[Record], seen: dict[str, type[Record]]) -> dict[str, type[Record]]:
    """Every record of the format by its name."""
    seen[record.__name__] = record
    for field in record.model_fields.values():
        for inner in nested(field.annotation):
            if inner.__name__ not in seen:
                records(inner, seen)
    return seen


def nested(annotation: object) -> Iterator[type[Record]]:
    if isinstance(annotation, type) and issubclass(annotation, Record):
        yield annotation
    for argument in getattr(annotation, "__args__", ()):
        yield from nested(argument)


def resolved(schema: Mapping[str, Any], within: Mapping[str, Any]) -> Iterator[Mapping[str, Any]]:
    """Every alternative that a schema allows, references followed."""
    if "$ref" in schema:
        yield from resolved(within["$defs"][schema["$ref"].rsplit("/", 1)[1]], within)
    elif "anyOf" in schema:
        for alternative in schema["anyOf"]:
            yield from resolved(alternative, within)
    else:
        yield schema


def misfits(value: object, schema: Mapping[str, Any], within: Mapping[str, Any], path: str) -> list[str]:
    """Places where a value is of no type, or has no key, that its schema allows."""
    types = {dict: "object", list: "array", tuple: "array", str: "string", bool: "boolean", int: "integer"}
    own = types.get(type(value), "number" if isinstance(value, float) else "string")
    allowed = [
        s
        for s in resolved(schema, within)
        if s.get("type", own) == own or (own == "integer" and s["type"] == "number")
    ]
    if not allowed:
        return [f"{path}: no {own}"]
    if isinstance(value, dict):
        properties = allowed[0]["properties"]
        unknown = [f"{path}.{key}: unknown" for key in value if key not in properties]
        missing = [f"{path}.{key}: missing" for key in allowed[0].get("required", []) if key not in value]
        deeper = [
            problem
            for key, part in value.items()
            if key in properties
            for problem in misfits(part, properties[key], within, f"{path}.{key}")
        ]
        return unknown + missing + deeper
    if isinstance(value, list):
        items = allowed[0].get("items")
        rows = allowed[0].get("prefixItems", [items] * len(value))
        return [
            problem
            for i, (part, inner) in enumerate(zip(value, rows, strict=True))
            for problem in misfits(part, inner, within, f"{path}[{i}]")
        ]
    if isinstance(value, str):
        patterns = [s["pattern"] for s in allowed if "pattern" in s]
        fits = any(re.search(pattern, value) for pattern in patterns) or len(patterns) < len(allowed)
        return [] if fits else [f"{path}: {value!r} does not fit"]
    return []


def test_the_schema_lists_every_field_and_every_example_fits_it() -> None:
    schema = scenario_schema()
    assert schema["$schema"] == "https://json-schema.org/draft/2020-12/schema"
    parts = {"Scenario": schema, **schema["$defs"]}
    for name, record in records(Scenario, {}).items():
        assert set(parts[name]["properties"]) == set(record.model_fields)
        assert parts[name]["additionalProperties"] is False
    for path in SCENARIOS:
        assert misfits(read_file(path), schema, schema, path.stem) == []


def test_the_schema_can_say_no() -> None:
    schema = scenario_schema()
    document = read_file(next(path for path in SCENARIOS if path.stem == "tannery-row"))
    document["panel"][0]["height"] = 6
    document["panel"][1]["heigth"] = "6 ft"
    document["water"]["flood_side"] = {"low": "3"}
    del document["panel"][2]["bottom"]
    assert misfits(document, schema, schema, "it") == [
        "it.water.flood_side.value: missing",
        "it.water.flood_side.low: '3' does not fit",
        "it.panel[0].height: no integer",
        "it.panel[1].heigth: unknown",
        "it.panel[2].bottom: missing",
    ]
