"""What the chains of all instruments share, and the chain of the vented logger, which needs nothing else."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import TypeAlias

import numpy as np

from loads.arrays import FloatArray
from loads.quantity import Quantity
from loads.reading_chain import Computed, Given, Values
from loads.records.reading import Reading

Links: TypeAlias = list[Given | Computed]

HABIT = "[InstrumentPractice]"
STANDARD = "[StandardAtmosphere1976]"


@dataclass(frozen=True, kw_only=True)
class Series:
    """Many readings of one instrument, each array of shape (n,); None where the entered value serves for all.

    Attributes
    ----------
    shown
        What the instrument shows, in place of the entered `pressure` [Pa] or `staff_reading` [m].
    barometer
        What the barometer shows. [Pa]
    temperature
        Temperature of the water. [K]
    """

    shown: FloatArray | None = None
    barometer: FloatArray | None = None
    temperature: FloatArray | None = None


def entered(
    name: str, symbol: str, meaning: str, quantity: Quantity | None, series: FloatArray | None = None
) -> Given:
    """Link of an entered quantity; a series keeps the entered distance of low and high."""
    assert quantity is not None
    value = np.array([quantity.value]) if series is None else series
    return Given(
        name=name,
        symbol=symbol,
        meaning=meaning,
        kind=quantity.kind,
        value=value,
        low=np.array([quantity.low]) if series is None else value + (quantity.low - quantity.value),
        high=np.array([quantity.high]) if series is None else value + (quantity.high - quantity.value),
        source=quantity.source,
        dated=quantity.dated,
        text=quantity.text if series is None else "",
    )


def assumed(name: str, symbol: str, meaning: str, kind: str, value: float, *, source: str) -> Given:
    """Link of a value that nobody entered."""
    figure = np.array([value])
    return Given(
        name=name,
        symbol=symbol,
        meaning=meaning,
        kind=kind,
        value=figure,
        low=figure,
        high=figure,
        basis="assumed",
        source=source,
    )


def computed(
    name: str, symbol: str, meaning: str, kind: str, *, source: str, formula: Callable[[Values], FloatArray]
) -> Computed:
    """Link that follows from links before it."""
    return Computed(name=name, symbol=symbol, meaning=meaning, kind=kind, formula=formula, source=source)


def shown_links(reading: Reading, series: Series, meaning: str) -> Links:
    """Links of what a pressure instrument shows, in water and out of it."""
    links: Links = [entered("pressure", "P", meaning, reading.pressure, series.shown)]
    if reading.zero_pressure is not None:
        what = "What it shows with no water over it"
        links.append(entered("zero_pressure", "P₀", what, reading.zero_pressure))
    return links


def less_zero(values: Values) -> FloatArray:
    """Take what the instrument shows with no water over it off what it shows."""
    return values["pressure"] - values["zero_pressure"] if "zero_pressure" in values else values["pressure"]


def vented_links(reading: Reading, series: Series) -> Links:
    """Links to the pressure on a sensor whose back the outside air reaches."""
    source = f"p = P − P₀ {HABIT}; air in the vent is not counted, 0.12 % of the head"
    return [
        *shown_links(reading, series, "Pressure above the air's, as shown"),
        computed(
            "water_pressure", "p", "Pressure of the water", "pressure", source=source, formula=less_zero
        ),
    ]
