"""What the form of a reading asks, instrument by instrument, and how what was typed becomes its table."""

from __future__ import annotations

from collections.abc import Mapping
from typing import Any

from loads.records.reading import FIELDS_NEEDED, FIELDS_OF_KIND
from webapp import forms

HEAD_FIELDS = ("id", "name", "side", "as_of")
WATER_FIELDS = ("fluid", "temperature", "salinity", "suspended_sediment", "unit_weight")
BAND = ("value", "low", "high", "source", "date")
"""What is asked of every measured value."""

FLUID_WAYS: dict[str, tuple[str, ...]] = {
    "the water": ("water",),
    "specific gravity": ("specific_gravity",),
    "density": ("density",),
    "unit weight": ("unit_weight",),
}
"""Ways to say what fluid fills a leg."""
RISE_WAYS: dict[str, tuple[str, ...]] = {
    "rise": ("rise",),
    "length and inclination": ("length", "inclination"),
}
"""Ways to say how far a leg rises."""


def needed_fields(kind: str) -> tuple[str, ...]:
    """Fields that an instrument cannot do without; the legs of a manometer stand apart."""
    return tuple(name for name in FIELDS_NEEDED[kind] if name != "leg")


def optional_fields(kind: str) -> tuple[str, ...]:
    """Fields that may stay empty, those of the water apart."""
    apart = (*FIELDS_NEEDED[kind], *WATER_FIELDS)
    return tuple(name for name in FIELDS_OF_KIND[kind] if name not in apart)


def water_fields(kind: str) -> tuple[str, ...]:
    """Fields of the water at the instrument."""
    return tuple(name for name in FIELDS_OF_KIND[kind] if name in WATER_FIELDS)


def band_shown(value: object) -> dict[str, str]:
    """Value, low, high, source and date of a document's value as they stand in their fields."""
    table = value if isinstance(value, Mapping) else {} if value is None else {"value": value}
    return {part: str(table.get(part, "")) for part in BAND}


def band_typed(typed: Mapping[str, str]) -> object | None:
    """Value for the document from what stands in the five fields; None when all are empty."""
    text = {part: typed[part].strip() for part in BAND}
    if not any(text.values()):
        return None
    known = {"value": text["value"], **{end: text[end] for end in ("low", "high") if text[end]}}
    return forms.with_pedigree(known, text["source"], text["date"])


def way_of(leg: Mapping[str, Any], ways: Mapping[str, tuple[str, ...]]) -> str:
    """Way in which a leg's table says its fluid or its rise, the first when it says nothing."""
    said = (way for way, names in ways.items() if any(leg.get(name, False) is not False for name in names))
    return next(said, next(iter(ways)))


def reading_table(
    before: Mapping[str, Any], kind: str, changes: Mapping[str, object | None], legs: list[dict[str, Any]]
) -> dict[str, Any]:
    """Table of a reading from what its form holds, without the fields of other kinds."""
    kept = forms.without_other(before, FIELDS_OF_KIND, kind)
    changed = forms.merged(kept, {**changes, "kind": kind})
    changed.pop("leg", None)
    if kind == "manometer" and legs:
        changed["leg"] = legs
    return changed
