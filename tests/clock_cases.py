"""An invented closure on an invented river, with its gauge and its forecast, for the tests of the clock."""

from __future__ import annotations

import tomllib
from collections.abc import Sequence
from datetime import UTC, datetime
from typing import Any
from zoneinfo import ZoneInfo

import numpy as np
import pytest
from pydantic import ValidationError

from loads.clock import Clock, ClockMarks, LeadTimes, clock_of
from loads.crossing import LimitLevel, traces_of
from loads.gauge_conversion import Conversion, conversion
from loads.install_time import InstallTime
from loads.quantity import Quantity, read_quantity
from loads.records.gauge import Gauge
from loads.series.series import Issue, Series

FOOT = 0.3048
HOUR = 3600.0
CENTRAL = ZoneInfo("America/Chicago")
NOW = datetime(2031, 4, 2, 14, 10, tzinfo=UTC)
DATUM = "NAVD88"
STAGES = (22.4, 23.1, 23.9, 24.7, 25.4, 25.9, 26.2, 26.0)
"""Readings in feet at every sixth hour from 12 o'clock UTC on 2 April 2031."""

GAUGE: dict[str, Any] = {
    "id": "G1",
    "name": "Mill Landing",
    "number": "09999999",
    "zero": {"value": "412.70 ft", "source": "levelling", "date": "2029-10-11"},
    "datum": DATUM,
    "highest_true_reading": "31.0 ft",
    "transfer": [
        {
            "to": ["C-07"],
            "offset": {"value": "-0.60 ft", "source": "marks of 2028", "date": "2028-05-01"},
            "lowest_stage": "20 ft",
            "highest_stage": "32 ft",
        }
    ],
}


def gauge(**changes: Any) -> Gauge:
    """The gauge, with changes."""
    return Gauge.model_validate({**GAUGE, **changes})


def gauge_of(toml: str) -> Gauge:
    """The first gauge of a piece of a file."""
    return Gauge.model_validate(tomllib.loads(toml)["gauge"][0])


def way(**changes: Any) -> Conversion:
    """From the gauge to the closure."""
    return conversion(gauge(**changes), "C-07", DATUM)


def quantity(text: str, kind: str = "length") -> Quantity:
    """A value as entered."""
    value, unit = read_quantity(text, kind)
    return Quantity(text=text, kind=kind, unit=unit, value=value, low=value, high=value)


def series(
    feet: Sequence[float] = STAGES,
    *,
    start: str = "2031-04-02T12:00",
    hours: float = 6.0,
    times: Sequence[str] = (),
    datum: str | None = None,
) -> Series:
    """Readings at even steps, or at the times given."""
    steps = np.arange(len(feet)) * round(hours * HOUR)
    at = np.datetime64(start, "s") + steps.astype("timedelta64[s]")
    if times:
        at = np.array(times, dtype="datetime64[s]")
    return Series(
        name="forecast",
        parameter="gauge height",
        kind="forecast",
        times=at,
        utc_offsets=np.zeros(len(feet), dtype=np.int16),
        zone="UTC",
        values=np.asarray(feet, dtype=np.float64) * FOOT,
        unit="ft",
        datum=datum,
    )


def hours(count: float) -> InstallTime:
    """An installation that takes so long, as planned."""
    return InstallTime(seconds=count * HOUR, planned=count * HOUR, drilled=None, sentence="")


def limit(label: str, feet: float | None, note: str = "", **changes: Any) -> LimitLevel:
    """A limit level of the closure."""
    level = None if feet is None else feet * FOOT
    return LimitLevel(barrier="C-07", label=label, level=level, way=way(**changes), note=note)


def clock(
    feet: Sequence[float] = STAGES,
    *,
    install: InstallTime | None = None,
    now: datetime = NOW,
    lead: LeadTimes | None = None,
    sill: float = 437.40,
    own_way: Conversion | None = None,
    longest_gap: float = float("inf"),
    trace: Series | None = None,
    **marks: Any,
) -> Clock:
    """Clock of the closure."""
    return clock_of(
        own_way or way(),
        ClockMarks(sill=sill * FOOT, **marks),
        install or hours(7.5),
        lead or LeadTimes(mobilisation=0.5 * HOUR, travel=1.0 * HOUR),
        traces_of(Issue(likely=trace or series(feet))),
        now,
        longest_gap=longest_gap,
    )


def rules(record: type[Any], given: dict[str, Any]) -> list[str]:
    """Every rule that is broken, with its field."""
    with pytest.raises(ValidationError) as refusal:
        record.model_validate(given)
    found = []
    for item in refusal.value.errors():
        if item["type"] == "rules":
            found += [f"{path} {value} {rule}" for path, value, rule in item["ctx"]["problems"]]
        else:
            rule = item["ctx"]["rule"] if item["type"] == "rule" else item["msg"]
            found.append(f"{'.'.join(str(part) for part in item['loc'])} {rule}")
    return found
