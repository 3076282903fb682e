"""From what an instrument shows to a level, every link shown: staff, manometer, bubbler, pressure loggers."""

from __future__ import annotations

import math
from dataclasses import dataclass, replace
from decimal import ROUND_CEILING, ROUND_FLOOR, ROUND_HALF_EVEN, Decimal

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import refuse_unless
from loads.reading_air import bubbler_links, sealed_links
from loads.reading_chain import Link, Spread, Values, follow
from loads.reading_links import HABIT, Links, Series, computed, entered, vented_links
from loads.reading_liquids import manometer_links, water_links
from loads.reading_remarks import remarks_on_reading
from loads.records.reading import Reading
from loads.units import from_si
from loads.water import Fluid

_LEVEL = "Elevation of the water"
_HEAD = "Head of water above the sensor"
_SERIES = {
    "staff": ("shown",),
    "manometer": ("temperature",),
    "bubbler": ("shown", "barometer", "temperature"),
    "vented logger": ("shown", "temperature"),
    "sealed logger": ("shown", "barometer", "temperature"),
}
_UNUSED = {
    "barometer": "would not be used, because no barometer is entered in the reading",
    "temperature": 'would not be used, because the reading does not say what its water is: "fresh" or "sea"',
}


@dataclass(frozen=True, kw_only=True)
class LevelReading:
    """Levels from n readings of one instrument.

    Attributes
    ----------
    reading
        The record.
    links
        Every link of the chain in order, the level last.
    head
        Head of water above the sensor, of a staff what it shows, shape (n,). Below zero it is arithmetic
        only. [m]
    level
        Elevation of the water, shape (n,); not a number where the sensor is dry or there is no data. [m]
    dry
        True where the head is not above zero: there the sensor is out of the water and its reading says
        nothing of the level. Never of a staff. Shape (n,).
    may_be_dry
        True where the sensor is not dry by the values and may be by their worst corner, shape (n,).
    no_data
        True where a given value is not a finite number, shape (n,).
    worst, quadrature
        Range of the level by the worst of all corners, and by the root-sum-square of the one-at-a-time
        changes; an end that would lie below the sensor is not a number.
    remarks
        What is odd, in plain words.
    """

    reading: Reading
    links: tuple[Link, ...]
    head: FloatArray
    level: FloatArray
    dry: BoolArray
    may_be_dry: BoolArray
    no_data: BoolArray
    worst: Spread
    quadrature: Spread
    remarks: tuple[str, ...]


def level_of(reading: Reading, series: Series | None = None, fluid: Fluid | None = None) -> LevelReading:
    """Level from one instrument [InstrumentPractice].

    Parameters
    ----------
    reading
        What the instrument shows and everything else that is entered, as one record.
    series
        Many readings of it; the entered low and high then count as distances from each reading.
    fluid
        The scenario's water on that side, used when the reading says nothing of its water.

    Returns
    -------
    LevelReading
        With n of the series, or 1.

    Raises
    ------
    OutsideFormulaError
        A given value for which there is no answer, for example an altitude above 10 km; too many ranges; a
        series that the kind of instrument has no use for, or of unequal lengths.

    Notes
    -----
    level = z + h. Of a staff z is the elevation of its zero and h what it shows. Of every other instrument
    z is the sensor's elevation and h = p/γ, p the pressure above the air's. Standard gravity, water of one
    density over the depth, still water.
    """
    series = series or Series()
    outcome = follow(_chain(reading, series, fluid), _states(reading, series))
    head = outcome.link("staff_reading" if reading.kind == "staff" else "head")
    level = outcome.link("level")
    no_data = ~np.isfinite(level.value)
    has_sensor = ~no_data & (reading.kind != "staff")
    dry = has_sensor & ~(head.value > 0)
    may_be_dry = has_sensor & ~dry & ~(head.low > 0)
    found = LevelReading(
        reading=reading,
        links=outcome.links,
        head=head.value,
        level=np.where(dry, np.nan, level.value),
        dry=dry,
        may_be_dry=may_be_dry,
        no_data=no_data,
        worst=_above_sensor(outcome.worst, dry, may_be_dry),
        quadrature=_above_sensor(outcome.quadrature, dry, may_be_dry),
        remarks=(),
    )
    return replace(found, remarks=remarks_on_reading(reading, outcome, dry, may_be_dry))


def typed_level(found: LevelReading, unit: str = "ft", index: int = 0) -> dict[str, str]:
    """One level with its worst-case range and its source, as a person would type it into a scenario.

    Parameters
    ----------
    found
        Levels from a reading.
    unit
        "ft", to hundredths, or "m", to millimetres; low and high are rounded outward.
    index
        Which of the n readings.

    Returns
    -------
    dict of str to str
        Keys value and source; low and high where both ends are known; date where the reading has one.

    Raises
    ------
    OutsideFormulaError
        The sensor is dry or there is no data: there is no level to use.
    """
    level = float(found.level[index])
    refuse_unless(np.asarray(math.isfinite(level)), "level", "is not known: the sensor is dry or has no data")
    who = found.reading.name or found.reading.id
    typed = {"value": _typed(level, unit, ROUND_HALF_EVEN), "source": f"{found.reading.kind}: {who}"}
    low, high = float(found.worst.low[index]), float(found.worst.high[index])
    if math.isfinite(low) and math.isfinite(high) and low < high:
        typed |= {"low": _typed(low, unit, ROUND_FLOOR), "high": _typed(high, unit, ROUND_CEILING)}
    if found.reading.as_of is not None:
        typed["date"] = found.reading.as_of.date().isoformat()
    return typed


def _typed(level: float, unit: str, rounding: str) -> str:
    step = Decimal("0.001") if unit == "m" else Decimal("0.01")
    exact = Decimal(f"{from_si(level, unit, 'length'):.8f}")  # so that 102.84000000000002 is not rounded up
    return f"{exact.quantize(step, rounding=rounding)} {unit}"


def _chain(reading: Reading, series: Series, fluid: Fluid | None) -> Links:
    if reading.kind == "staff":
        return [
            entered("zero_elevation", "z₀", "Elevation of the staff's zero", reading.zero_elevation),
            entered("staff_reading", "h", "What the staff shows", reading.staff_reading, series.shown),
            computed("level", "L", _LEVEL, "length", source=f"L = z₀ + h {HABIT}", formula=_staff_level),
        ]
    water = water_links(reading, series, fluid)
    links: Links
    if reading.kind == "manometer":
        links = [*water, *manometer_links(reading)]
    else:
        make = {"bubbler": bubbler_links, "vented logger": vented_links, "sealed logger": sealed_links}
        links = [*make[reading.kind](reading, series), *water]
    if reading.instrument_elevation is None:
        links.append(entered("sensor_elevation", "zₛ", "Elevation of the sensor", reading.sensor_elevation))
        head = computed("head", "h", _HEAD, "length", source=f"h = p/γ {HABIT}", formula=_head)
    else:
        head = computed(
            "head", "h", _HEAD, "length", source=f"h = p/(γ − ρ_a g) {HABIT}", formula=_head_under_air
        )
    level = computed("level", "L", _LEVEL, "length", source=f"L = zₛ + h {HABIT}", formula=_level)
    return [*links, head, level]


def _staff_level(values: Values) -> FloatArray:
    return np.asarray(values["zero_elevation"] + values["staff_reading"], dtype=np.float64)


def _head(values: Values) -> FloatArray:
    return np.asarray(values["water_pressure"] / values["unit_weight"], dtype=np.float64)


def _head_under_air(values: Values) -> FloatArray:
    weight = values["unit_weight"] - values["air_density"] * STANDARD_GRAVITY
    return np.asarray(values["water_pressure"] / weight, dtype=np.float64)


def _level(values: Values) -> FloatArray:
    return np.asarray(values["sensor_elevation"] + values["head"], dtype=np.float64)


def _states(reading: Reading, series: Series) -> int:
    given = {name: value for name, value in vars(series).items() if value is not None}
    used = _SERIES[reading.kind]
    for name in given:
        refuse_unless(np.asarray(name in used), name, f'is not used by kind "{reading.kind}"')
    for name, field in (("barometer", reading.barometer), ("temperature", reading.fluid)):
        refuse_unless(np.asarray(name not in given or field is not None), name, _UNUSED[name])
    lengths = {len(value) for value in given.values()}
    refuse_unless(np.asarray(len(lengths) <= 1), "series", "must have as many values in each of its columns")
    return lengths.pop() if lengths else 1


def _above_sensor(spread: Spread, dry: BoolArray, may_be_dry: BoolArray) -> Spread:
    low = np.where(dry | may_be_dry, np.nan, spread.low)
    return Spread(method=spread.method, low=low, high=np.where(dry, np.nan, spread.high))
