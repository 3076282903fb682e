"""Inputs as they were entered, each with its range, source and date; and what was taken where nothing was."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass
from datetime import date, datetime

from loads.quantity import Quantity
from loads.records.base import Record
from loads.records.scenario import Scenario, zone_name
from webapp.display import barrier_title, show

NO_SOURCE = "no source stated"
_ON_COVER = ("format", "title", "location", "purpose", "author", "revision", "status")
_HELD_APART = ("water", "panel", "closure", "wall", "i_wall")


@dataclass(frozen=True, kw_only=True)
class Entry:
    """One value as typed."""

    label: str
    text: str
    span: str = ""
    source: str = ""
    dated: str = ""


@dataclass(frozen=True, kw_only=True)
class EntryGroup:
    """Values of one thing."""

    title: str
    entries: tuple[Entry, ...]


def entry_groups(scenario: Scenario) -> list[EntryGroup]:
    """Everything typed in a scenario, the general values first, then the water, then each barrier.

    Parameters
    ----------
    scenario
        Validated scenario; what the cover carries is left to the cover.
    """
    general = [entry for entry in _entries(scenario, "") if entry.label not in _ON_COVER]
    groups = [("General", general), ("Water", list(_entries(scenario.water, "")))]
    groups += [
        (
            f"{record.kind.capitalize()} {barrier_title(record.id, record.name)}",
            list(_barrier_entries(record)),
        )
        for record in scenario.barriers
    ]
    return [EntryGroup(title=title, entries=tuple(entries)) for title, entries in groups]


def _barrier_entries(record: Record) -> Iterator[Entry]:
    for entry in _entries(record, ""):
        if entry.label not in ("id", "name"):
            yield entry


def _entries(record: Record, prefix: str) -> Iterator[Entry]:
    for name in type(record).model_fields:
        if name not in record.model_fields_set or (isinstance(record, Scenario) and name in _HELD_APART):
            continue
        value = getattr(record, name)
        label = f"{prefix}{name.replace('_', ' ')}"
        if isinstance(value, Record):
            yield from _entries(value, f"{label}: ")
        elif isinstance(value, tuple) and value and isinstance(value[0], Record):
            for number, part in enumerate(value, 1):
                yield from _entries(part, f"{label} {number}: ")
        elif isinstance(value, tuple):
            yield from _rings(label, value)
        else:
            yield _entry(label, value)


def _entry(label: str, value: object) -> Entry:
    if isinstance(value, Quantity):
        span = f"{value.low_text or '–'} to {value.high_text or '–'}" if value.has_range else ""
        dated = value.dated.isoformat() if value.dated else ""
        return Entry(label=label, text=value.text, span=span, source=value.source or NO_SOURCE, dated=dated)
    if isinstance(value, datetime):
        return Entry(label=label, text=f"{value:%Y-%m-%d %H:%M} {zone_name(value)}")
    if isinstance(value, date):
        return Entry(label=label, text=value.isoformat())
    if isinstance(value, float):
        return Entry(label=label, text=f"{value:g}", source=NO_SOURCE)
    return Entry(label=label, text=str(value))


def _rings(label: str, value: tuple[object, ...]) -> Iterator[Entry]:
    """Corners of an outline, or of each hole in it."""
    first = value[0] if value else ()
    if isinstance(first, tuple) and first and isinstance(first[0], Quantity):
        pairs = [point for point in value if isinstance(point, tuple)]
        text = "; ".join(f"({across.text}, {up.text})" for across, up in pairs)
        yield Entry(label=f"{label} (across, up the face)", text=text, source=NO_SOURCE)
        return
    for number, ring in enumerate(value, 1):
        if isinstance(ring, tuple):
            yield from _rings(f"{label} {number}", ring)


def taken(scenario: Scenario) -> list[str]:
    """What was taken where nothing was entered, in sentences."""
    water = scenario.water
    said = []
    if water.protected_side is None:
        said.append("No protected-side level entered: that side is taken as dry.")
    if "near_limit" not in scenario.model_fields_set:
        said.append(f"A ratio from {scenario.near_limit:g} up to 1 is called near limit.")
    if "fluid" not in water.model_fields_set and water.unit_weight is None:
        said.append("No fluid entered for the flood side: fresh water.")
    own = ("fluid", "temperature", "salinity", "suspended_sediment", "unit_weight")
    if all(getattr(water, f"protected_{name}") is None for name in own):
        said.append("No water described for the protected side: as on the flood side.")
    flat = [panel.id for panel in scenario.panel if panel.tilt is None and panel.shape != "arc"]
    if flat:
        said.append(f"No tilt entered, taken as vertical: {_listed(flat)}.")
    plain = [panel.id for panel in scenario.panel if "shape" not in panel.model_fields_set]
    if plain:
        said.append(f"No shape entered, taken as a rectangle: {_listed(plain)}.")
    return said + list(_soil_taken(scenario))


def _soil_taken(scenario: Scenario) -> Iterator[str]:
    system = scenario.units
    for panel in scenario.panel:
        for number, layer in enumerate(panel.sediment, 1):
            where = f"Panel {panel.id}, sediment {number}"
            if layer.is_fluid:
                continue
            if layer.moist_unit_weight is None and layer.saturated_unit_weight is not None:
                weight = show(layer.saturated_unit_weight.value, "unit weight", system, 4)
                yield f"{where}: no moist unit weight entered, above water the saturated one, {weight}."
            if layer.pressure in ("active", "passive") and layer.wall_friction is None:
                yield f"{where}: no wall friction entered, taken as none."
            if layer.pressure in ("active", "passive") and layer.cohesion is None:
                yield f"{where}: no cohesion entered, taken as none."


def _listed(ids: list[str]) -> str:
    return ", ".join(ids)
