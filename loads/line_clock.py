"""The clock of a whole line: from a scenario and now to every barrier's chain, times, limits and the plan."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import UTC, datetime

import numpy as np

from loads.assessment import assess
from loads.crossing import LimitLevel, LimitOrder, limit_orders
from loads.gauge_conversion import conversion
from loads.instant import ENDLESS, Instant, in_order, unknown
from loads.line_barrier import BarrierNews, barrier_news, pieces_of
from loads.line_watch import GaugeNews, limits_of, news_of
from loads.plan import Plan
from loads.plan_jobs import job_of
from loads.planner import plan_line
from loads.problems import Problem, ScenarioError
from loads.records.crew import BarrierClock
from loads.records.scenario import Scenario
from loads.series.series import Series


@dataclass(frozen=True, kw_only=True, eq=False)
class LineClock:
    """The clock of a line at one instant.

    Attributes
    ----------
    scenario, now
        What it was told from.
    raised
        How much higher than forecast every trace is taken, a what-if. [m]
    gauges
        What is known at each.
    barriers
        Each barrier by each gauge that leads to it, in the order of the scenario.
    orders
        Limits of the line in the order in which each trace reaches them.
    sentences
        Barriers of which nothing can be told.
    """

    scenario: Scenario
    now: datetime
    raised: float
    gauges: tuple[GaugeNews, ...]
    barriers: tuple[BarrierNews, ...]
    orders: tuple[LimitOrder, ...]
    sentences: tuple[str, ...]

    @property
    def traces(self) -> tuple[str, ...]:
        """Names of the traces of all gauges: low, likely, high and one higher."""
        return tuple(dict.fromkeys(name for news in self.gauges for name in news.traces))

    @property
    def off(self) -> tuple[str, ...]:
        """Why advice is off, one sentence for each gauge without it."""
        return tuple(news.off for news in self.gauges if news.off)

    def plan(self, trace: str) -> Plan:
        """Order and start of every closure for one trace; nobody starts before now."""
        jobs = [
            job_of(
                record.id,
                record.name,
                _closed_by(found, trace),
                record.clock or BarrierClock(),
                record.install,
                pieces_of(record),
                self.scenario.crew,
            )
            for record in self.scenario.closure
            if (found := [one for one in self.barriers if one.record.id == record.id])
        ]
        return plan_line(self.scenario.crew, jobs, self.now)


def line_clock(scenario: Scenario, now: datetime, raised: float = 0.0) -> LineClock:
    """Tell the clock of a line.

    Parameters
    ----------
    scenario
        With at least one gauge.
    now
        With its zone.
    raised
        How much higher than forecast every trace is taken, a what-if. [m]

    Returns
    -------
    LineClock
        Everything in UTC and SI; nothing is guessed for what nobody entered.

    Raises
    ------
    ScenarioError
        The scenario has no gauge, or its series cannot be told as readings.
    """
    if not scenario.gauge:
        rule = "is missing; the clock is told from a gauge and its forecast, under [[gauge]] and [[forecast]]"
        raise ScenarioError([Problem(path="gauge", value="", rule=rule)])
    instant = np.datetime64(now.astimezone(UTC).replace(tzinfo=None), "s")
    gauges = tuple(news_of(scenario, gauge, instant, raised) for gauge in scenario.gauge)
    gap = scenario.data_age.longest_gap
    longest_gap = ENDLESS if gap is None else gap.value
    told: list[BarrierNews] = []
    untold: list[str] = []
    limits: list[LimitLevel] = []
    for barrier in assess(scenario).barriers:
        leading = [news for news in gauges if news.gauge.transfer_to(barrier.record.id) is not None]
        if not leading:
            untold.append(f"no gauge leads to {barrier.record.id}, so nothing is told of it")
        for news in leading:
            way = conversion(news.gauge, barrier.record.id, scenario.datum)
            told.append(barrier_news(scenario, barrier, news, way, now, longest_gap))
            limits += limits_of(barrier, way)
    return LineClock(
        scenario=scenario,
        now=now,
        raised=raised,
        gauges=gauges,
        barriers=tuple(told),
        orders=limit_orders(limits, _by_trace(gauges), now, longest_gap=longest_gap),
        sentences=tuple(untold),
    )


def _by_trace(gauges: Sequence[GaugeNews]) -> dict[str, dict[str, Series]]:
    found: dict[str, dict[str, Series]] = {}
    for news in gauges:
        for name, trace in news.traces.items():
            found.setdefault(name, {})[news.gauge.id] = trace
    return found


def _closed_by(found: Sequence[BarrierNews], trace: str) -> Instant:
    """The first of the times that several gauges tell for one closure."""
    told = [
        timeline.closed_by for one in found for timeline in one.clock.timelines if timeline.trace == trace
    ]
    if not told:
        return unknown(f"there is no {trace} trace for it")
    return told[in_order(told)[0]]
