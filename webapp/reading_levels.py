"""Levels from the readings of a scenario, each with its chain, or the reason why there is none."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

from loads.limits_of_use import OutsideFormulaError
from loads.reading import LevelReading, level_of
from loads.reading_chain import Link
from loads.records.reading import Reading
from loads.records.scenario import Scenario
from loads.units import SI_UNITS
from loads.water import fluid_of
from webapp.answer_parts import number


@dataclass(frozen=True, kw_only=True)
class NoLevel:
    """A reading from which no level follows, and the reason in plain words."""

    reading: Reading
    reason: str


def level_found(scenario: Scenario, reading: Reading) -> LevelReading | NoLevel:
    """Level from one reading, in the scenario's water of its side unless the reading says more of it."""
    try:
        return level_of(reading, fluid=fluid_of(scenario.water, reading.side))
    except OutsideFormulaError as error:
        words = f"{error.quantity.replace('_', ' ')} {error.rule}"
        return NoLevel(reading=reading, reason=f"No level follows from this reading: {words}.")


def figures_of(found: LevelReading, link: Link) -> tuple[float, float, float]:
    """Value, low and high of a link, in SI; a level is not a number where the sensor is dry."""
    if link.name == "level":
        return float(found.level[0]), float(found.worst.low[0]), float(found.worst.high[0])
    return float(link.value[0]), float(link.low[0]), float(link.high[0])


def readings_answer(scenario: Scenario) -> dict[str, Any]:
    """JSON of the readings of a scenario under the key "readings"; nothing when it has none."""
    if not scenario.reading:
        return {}
    return {"readings": [_answer(scenario, reading) for reading in scenario.reading]}


def _answer(scenario: Scenario, reading: Reading) -> dict[str, Any]:
    found = level_found(scenario, reading)
    head: dict[str, Any] = {
        "id": reading.id,
        "kind": reading.kind,
        "name": reading.name,
        "side": reading.side,
        "as_of": reading.as_of.isoformat() if reading.as_of else None,
    }
    return {**head, **(_no_level(found) if isinstance(found, NoLevel) else _level(found))}


def _no_level(found: NoLevel) -> dict[str, Any]:
    nothing = dict.fromkeys(("level", "low", "high", "root_sum_square", "head"))
    return {**nothing, "dry": False, "links": [], "remarks": [found.reason]}


def _level(found: LevelReading) -> dict[str, Any]:
    return {
        "level": number(found.level[0]),
        "low": number(found.worst.low[0]),
        "high": number(found.worst.high[0]),
        "root_sum_square": {
            "low": number(found.quadrature.low[0]),
            "high": number(found.quadrature.high[0]),
        },
        "head": number(found.head[0]),
        "dry": bool(found.dry[0]),
        "links": [_link(found, link) for link in found.links],
        "remarks": list(found.remarks),
    }


def _link(found: LevelReading, link: Link) -> Mapping[str, Any]:
    value, low, high = figures_of(found, link)
    return {
        "name": link.name,
        "symbol": link.symbol,
        "meaning": link.meaning,
        "value": number(value),
        "low": number(low),
        "high": number(high),
        "unit": SI_UNITS.get(link.kind, ""),
        "basis": link.basis,
        "entered": link.text or None,
        "source": link.source,
        "date": link.dated.isoformat() if link.dated else None,
    }
