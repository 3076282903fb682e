"""Readings and forecasts of a gauge as a scenario keeps them, and how old they may become."""

from __future__ import annotations

from collections import Counter
from collections.abc import Collection, Sequence
from itertools import pairwise
from typing import Annotated, Any

from pydantic import Field, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, several_problems
from loads.records.gauge import Id, Triple, nearest_id
from loads.records.moment import Moment

MOST_POINTS = 2000

_level = Measure(
    kind="length",
    meaning="Reading of the gauge, or an elevation where a datum is named",
    least="-2000 ft",
    most="30000 ft",
    example="23.1 ft",
)
Point = Annotated[tuple[Moment, Annotated[Quantity, _level]], Field(strict=False)]
Points = Annotated[tuple[Point, ...], Field(max_length=MOST_POINTS, strict=False)]


def _band(meaning: str) -> Measure:
    return Measure(kind="length", meaning=meaning, least="0 ft", most="100 ft", example="0.8 ft")


def _age(meaning: str, example: str) -> Measure:
    return Measure(kind="duration", meaning=meaning, above="0 s", most="8000 h", example=example)


_observation_amber = _age("Age of the last reading from which a newer one is asked for", "1 h")
_observation_stale = _age("Age of the last reading from which it is stale", "3 h")
_forecast_amber = _age("Age of a forecast from which a newer one is asked for", "6 h")
_forecast_stale = _age("Age of a forecast from which it is stale and advice goes off", "24 h")
_longest_gap = _age("Longest time between neighbours of a series that a line is drawn across", "12 h")


class StoredObservation(Record):
    """What one gauge showed."""

    gauge: Id
    points: Points
    datum: Name = ""
    source: Note = ""

    @model_validator(mode="after")
    def _times_rise(self) -> StoredObservation:
        problems = _time_problems("points", self.points)
        if problems:
            raise several_problems(problems)
        return self


class StoredForecast(Record):
    """One issue of a forecast for one gauge; its range as two traces or as a band, or none."""

    gauge: Id
    issued: Moment | None = None
    likely: Points
    low: Points | None = None
    high: Points | None = None
    minus: Annotated[Quantity, _band("How far the range reaches below the likely trace")] | None = None
    plus: Annotated[Quantity, _band("How far the range reaches above the likely trace")] | None = None
    datum: Name = ""
    source: Note = ""

    @model_validator(mode="after")
    def _one_range_that_encloses(self) -> StoredForecast:
        problems = _time_problems("likely", self.likely) + self._form_problems()
        if not problems and self.low is not None and self.high is not None:
            problems = _range_problems(self.likely, self.low, self.high)
        if problems:
            raise several_problems(problems)
        return self

    def _form_problems(self) -> list[Triple]:
        problems: list[Triple] = []
        for one, other in (("low", "high"), ("high", "low"), ("minus", "plus"), ("plus", "minus")):
            if getattr(self, one) is not None and getattr(self, other) is None:
                problems.append((other, "", f"is missing; {one} and {other} go together"))
        if self.low is not None and self.minus is not None:
            rule = "would not be used, because low and high are given; leave one of the two out"
            problems.append(("minus", f'"{self.minus.text}"', rule))
        return problems


def _time_problems(field: str, points: Sequence[tuple[Any, Quantity]]) -> list[Triple]:
    if not points:
        return [(field, "", "has no reading; it needs at least one")]
    return [
        (f"{field}[{i}]", later.isoformat(), "it must be later than the time before it")
        for i, ((earlier, _), (later, _)) in enumerate(pairwise(points), 1)
        if later <= earlier
    ]


def _range_problems(
    likely: Sequence[tuple[Any, Quantity]],
    low: Sequence[tuple[Any, Quantity]],
    high: Sequence[tuple[Any, Quantity]],
) -> list[Triple]:
    times = [time for time, _ in likely]
    for name, trace in (("low", low), ("high", high)):
        if [time for time, _ in trace] != times:
            return [(name, "given", "it must have the times of the likely trace")]
    return [
        (f"likely[{i}]", f'"{middle[1].text}"', "it must lie between low and high of its time")
        for i, (least, middle, most) in enumerate(zip(low, likely, high, strict=True))
        if not least[1].value <= middle[1].value <= most[1].value
    ]


class DataAge(Record):
    """Ages beyond which data count as old and as stale, and the longest gap that a line is drawn across."""

    observation_amber: Annotated[Quantity, _observation_amber] | None = None
    observation_stale: Annotated[Quantity, _observation_stale] | None = None
    forecast_amber: Annotated[Quantity, _forecast_amber] | None = None
    forecast_stale: Annotated[Quantity, _forecast_stale] | None = None
    longest_gap: Annotated[Quantity, _longest_gap] | None = None


def series_problems(
    gauges: Collection[str], forecasts: Sequence[StoredForecast], observations: Sequence[StoredObservation]
) -> list[Triple]:
    """What is wrong with the series of a scenario as a whole.

    Parameters
    ----------
    gauges
        Ids of every gauge.
    forecasts, observations
        Of the scenario.

    Returns
    -------
    list of (path, value, rule)
        For `loads.records.base.several_problems`.
    """
    named = [("forecast", one) for one in forecasts] + [("observed", one) for one in observations]
    problems: list[Triple] = []
    counts = {"forecast": 0, "observed": 0}
    for table, one in named:
        if one.gauge not in gauges:
            where = f"{table}[{counts[table]}].gauge"
            problems.append((where, f'"{one.gauge}"', f"no gauge has that id{nearest_id(one.gauge, gauges)}"))
        counts[table] += 1
    for gauge, count in Counter(one.gauge for one in observations).items():
        if count > 1:
            rule = f"{count} lists of readings are of this gauge; one is enough"
            problems.append(("observed", f'"{gauge}"', rule))
    issues = Counter((one.gauge, one.issued) for one in forecasts)
    several = Counter(one.gauge for one in forecasts)
    for (gauge, issued), count in issues.items():
        if issued is None and several[gauge] > 1:
            rule = f"is missing; the {several[gauge]} issues for gauge {gauge} are told apart by it"
            problems.append(("forecast.issued", "", rule))
        elif count > 1:
            rule = f"{count} forecasts for gauge {gauge} have it"
            problems.append(("forecast.issued", str(issued), rule))
    return problems
