"""Series between a scenario and the clock: as records keep them, and as the engine reads them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from datetime import UTC, datetime, timedelta, timezone
from typing import Any

import numpy as np

from loads.gauge_conversion import as_readings
from loads.quantity import Quantity
from loads.records.gauge import Gauge
from loads.records.scenario import Scenario
from loads.records.series import DataAge, StoredForecast
from loads.series.ages import DEFAULT, Thresholds
from loads.series.series import Forecast, Issue, Kind, Series
from loads.units import from_si

MOST_KEPT = 500
"""Newest readings that a scenario keeps of what is read from a file."""
_DECIMALS = {"ft": 3, "in": 2, "m": 4, "cm": 2, "mm": 1}


def forecast_in(scenario: Scenario, gauge: Gauge) -> Forecast:
    """Every issue that a scenario keeps for a gauge, as readings above its zero.

    Raises
    ------
    ScenarioError
        An issue holds elevations that cannot be told as readings.
    """
    forecast = Forecast()
    for stored in scenario.forecast:
        if stored.gauge == gauge.id:
            forecast = forecast.with_issue(_issue(stored, gauge, scenario.datum))
    return forecast


def observed_in(scenario: Scenario, gauge: Gauge) -> Series | None:
    """What a gauge showed, as readings above its zero, or None when a scenario keeps nothing of it.

    Raises
    ------
    ScenarioError
        It holds elevations that cannot be told as readings.
    """
    for stored in scenario.observed:
        if stored.gauge == gauge.id:
            found = _series("observed", gauge, stored.points, stored.datum, stored.source)
            return as_readings(found, gauge, scenario.datum)
    return None


def _issue(stored: StoredForecast, gauge: Gauge, datum: str) -> Issue:
    def trace(points: Sequence[tuple[datetime, Quantity]], name: str) -> Series:
        found = _series("forecast", gauge, points, stored.datum, name)
        if stored.issued is not None:
            found = replace(found, issued=_instant(stored.issued))
        return as_readings(found, gauge, datum)

    likely = trace(stored.likely, "likely")
    if stored.low is not None and stored.high is not None:
        return Issue.entered(likely, trace(stored.low, "low"), trace(stored.high, "high"))
    if stored.minus is not None and stored.plus is not None:
        return Issue.banded(likely, minus=stored.minus.value, plus=stored.plus.value)
    return Issue(likely=likely)


def _instant(moment: datetime) -> np.datetime64:
    return np.datetime64(moment.astimezone(UTC).replace(tzinfo=None), "s")


def _series(
    kind: Kind, gauge: Gauge, points: Sequence[tuple[datetime, Quantity]], datum: str, name: str
) -> Series:
    offsets = [moment.utcoffset() or timedelta(0) for moment, _ in points]
    return Series(
        name=name or kind,
        parameter="gauge height",
        kind=kind,
        times=np.array([_instant(moment) for moment, _ in points], dtype="datetime64[s]"),
        utc_offsets=np.array([round(offset / timedelta(minutes=1)) for offset in offsets], dtype=np.int16),
        zone="as entered",
        values=np.array([level.value for _, level in points]),
        unit=points[0][1].unit,
        gauge=gauge.id,
        datum=datum or None,
    )


def thresholds_of(data_age: DataAge) -> Thresholds:
    """Ages at which labels change: as entered, else by common practice.

    Raises
    ------
    ScenarioError
        An age of amber data is above that of stale data.
    """
    entered = {
        name: quantity.value
        for name in ("observation_amber", "observation_stale", "forecast_amber", "forecast_stale")
        if (quantity := getattr(data_age, name)) is not None
    }
    return replace(DEFAULT, **entered)


def stored_observation(series: Series, gauge: str, source: str) -> dict[str, Any]:
    """Table of a document for an observed series; of a long one its newest readings."""
    return _plain({"gauge": gauge, "source": source, "datum": series.datum, "points": _points(series)})


def stored_forecast(issue: Issue, gauge: str, source: str, issued: datetime | None = None) -> dict[str, Any]:
    """Table of a document for one issue of a forecast.

    Parameters
    ----------
    issue
        As it was read.
    gauge
        Identifier of the gauge in the scenario.
    source
        Where it comes from.
    issued
        Time of issue where the series itself says none.
    """
    known = issue.issued
    when = issued.isoformat() if known is None and issued is not None else None
    return _plain(
        {
            "gauge": gauge,
            "issued": f"{known}Z" if known is not None else when,
            "source": source,
            "datum": issue.likely.datum,
            "likely": _points(issue.likely),
            "low": _points(issue.low) if issue.low is not None else None,
            "high": _points(issue.high) if issue.high is not None else None,
        }
    )


def _plain(table: dict[str, Any]) -> dict[str, Any]:
    return {name: value for name, value in table.items() if value not in (None, "")}


def _points(series: Series) -> list[list[str]]:
    decimals = _DECIMALS.get(series.unit, 4)
    return [
        [
            _local(time, int(offset)),
            f"{round(from_si(float(value), series.unit, 'length'), decimals):g} {series.unit}",
        ]
        for time, offset, value in zip(
            series.times[-MOST_KEPT:],
            series.utc_offsets[-MOST_KEPT:],
            series.values[-MOST_KEPT:],
            strict=True,
        )
    ]


def _local(time: np.datetime64, offset: int) -> str:
    moment = datetime.fromtimestamp(int(time.astype(np.int64)), UTC)
    return moment.astimezone(timezone(timedelta(minutes=offset))).isoformat()
