"""What is known at each gauge and watched at each barrier of a line, before any time is told."""

from __future__ import annotations

from dataclasses import dataclass, replace

import numpy as np

from loads.assessment import Assessed, Barrier
from loads.clock import ClockMarks
from loads.crossing import LimitLevel, traces_of
from loads.gauge_conversion import Conversion
from loads.line_series import forecast_in, observed_in, thresholds_of
from loads.quantity import Quantity
from loads.records.closure import Closure
from loads.records.gauge import Gauge
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.records.wall import Wall
from loads.series.ages import Age, age_of
from loads.series.series import Forecast, Issue, Series
from loads.series.trap import Trap
from loads.series.traps import GaugeFacts, fast_jump, traps_of, traps_of_level
from loads.wall.assess import head_foot

HOUR = 3600.0


@dataclass(frozen=True, kw_only=True, eq=False)
class GaugeNews:
    """What is known at one gauge at one instant.

    Attributes
    ----------
    gauge
        Its record.
    observed
        What it showed, as readings, or None.
    forecast
        Every issue, as readings; without issues when there is none.
    traces
        Readings by the name of the trace, moved by the what-if; empty without a forecast.
    observed_age, forecast_age
        How old they are, or None where there is none.
    traps
        What is odd about them, nothing hidden.
    """

    gauge: Gauge
    observed: Series | None
    forecast: Forecast
    traces: dict[str, Series]
    observed_age: Age | None
    forecast_age: Age | None
    traps: tuple[Trap, ...]

    @property
    def off(self) -> str:
        """Why no advice is given from this gauge; empty when it may be."""
        if self.forecast_age is None:
            return f"gauge {self.gauge.id} has no forecast"
        return "" if self.forecast_age.advice else self.forecast_age.sentence


def news_of(scenario: Scenario, gauge: Gauge, now: np.datetime64, raised: float) -> GaugeNews:
    """What is known at a gauge.

    Parameters
    ----------
    scenario
        Which keeps its series.
    gauge
        Its record.
    now
        Instant in UTC.
    raised
        How much higher than forecast every trace is taken, a what-if. [m]

    Raises
    ------
    ScenarioError
        Series that cannot be told as readings, or ages of data out of order.
    """
    observed, forecast = observed_in(scenario, gauge), forecast_in(scenario, gauge)
    newest = forecast.newest if forecast.issues else None
    thresholds = thresholds_of(scenario.data_age)
    return GaugeNews(
        gauge=gauge,
        observed=observed,
        forecast=forecast,
        traces=traces_of(_moved(newest, raised), observed=observed) if newest else {},
        observed_age=None if observed is None else age_of(observed, now, thresholds),
        forecast_age=None if newest is None else age_of(newest.likely, now, thresholds),
        traps=_traps(gauge, observed, newest),
    )


def _moved(issue: Issue, raised: float) -> Issue:
    if raised == 0:
        return issue
    moved = {
        name: trace.shifted(raised, trace.name)
        for name in ("likely", "low", "high")
        if (trace := getattr(issue, name)) is not None
    }
    return replace(issue, **moved)


def _traps(gauge: Gauge, observed: Series | None, newest: Issue | None) -> tuple[Trap, ...]:
    def value(name: str) -> float | None:
        entered = getattr(gauge, name)
        return None if entered is None else float(entered.value)

    change = value("fastest_change")
    facts = GaugeFacts(
        floor=value("lowest_true_reading"),
        ceiling=value("highest_true_reading"),
        lowest=value("lowest_on_record"),
        highest=value("highest_on_record"),
        fastest=None if change is None else change / HOUR,
    )
    likely = newest.likely if newest is not None else None
    if observed is not None:
        return traps_of(observed, facts, likely)
    if likely is None:
        return ()
    jump = None if facts.fastest is None else fast_jump(likely, facts.fastest)
    crest = replace(facts, floor=None, ceiling=None)
    found = traps_of_level(float(likely.values.max()), crest, unit=likely.unit)
    return found if jump is None else (*found, jump)


def foot_of(record: Panel | Closure | Wall | IWall) -> Quantity:
    """The sill, bottom or ground from which water stands against a barrier."""
    if isinstance(record, Wall | IWall):
        return head_foot(record)[0]
    return record.sill if isinstance(record, Closure) else record.bottom


def limits_of(barrier: Barrier, way: Conversion) -> tuple[LimitLevel, ...]:
    """Levels of a barrier that must not pass unnoticed: rated, first limit, top of the lowest stack."""
    record = barrier.record
    name, rated = record.id, record.rated_level
    level, note = _first_limit(barrier)
    found = [
        LimitLevel(barrier=name, label="rated level", level=None if rated is None else rated.value, way=way),
        LimitLevel(barrier=name, label="first-limit level", level=level, way=way, note=note),
    ]
    if isinstance(record, Closure):
        top = record.sill.value + min(record.in_place) * record.log.height.value
        found.append(LimitLevel(barrier=name, label="top of the logs in place", level=top, way=way))
    return tuple(found)


def _first_limit(barrier: Barrier) -> tuple[float | None, str]:
    name = barrier.record.id
    if not isinstance(barrier, Assessed):
        return None, f"the two computations for {name} disagree, so no first-limit level is told"
    first = barrier.first_limit
    if first is None:
        return None, f"no load limit has been entered for {name}, so there is no first-limit level"
    if first.without_water:
        return None, f"a limit of {name} is reached without any water on the flood side: {first.check}"
    if first.level is None:
        return None, f"no entered load limit of {name} is reached up to the highest level searched"
    return first.level, ""


def marks_of(barrier: Barrier, way: Conversion) -> ClockMarks:
    """Levels at a barrier that its clock watches."""
    record = barrier.record
    limits = limits_of(barrier, way)
    if not isinstance(record, Closure):
        return ClockMarks(sill=foot_of(record).value, limits=limits)
    clock, adding = record.clock, record.adding
    allowance = clock.wave_allowance if clock else None
    removal = clock.removal_stage if clock else None
    until: float | None = None
    if adding is not None and adding.up_to is not None:
        until = adding.up_to.value
    elif adding is not None and not adding.with_water:
        until = record.sill.value
    return ClockMarks(
        sill=record.sill.value,
        wave_allowance=0.0 if allowance is None else allowance.value,
        add_logs_until=until,
        removal_stage=None if removal is None else removal.value,
        limits=limits,
    )
