"""One barrier of a line as one gauge tells of it: its chain, its times and what its logs ask for."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from datetime import date, datetime

import numpy as np

from loads.assessment import Barrier
from loads.chain import GaugeChain, GaugeReading, chain_of
from loads.clock import Clock, LeadTimes, Timeline, clock_of
from loads.gauge_conversion import Conversion
from loads.install_time import InstallTime, Pieces, install_time
from loads.instant import unknown
from loads.line_watch import GaugeNews, foot_of, marks_of
from loads.log_advice import LogAdvice, log_advice
from loads.moments import utc
from loads.records.closure import Closure
from loads.records.crew import BarrierClock, Crew
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.records.series import StoredForecast
from loads.records.wall import Wall

LAST_READING = "last reading"
"""Name of the state of a chain that is no forecast."""
_STANDS = "it stands; nothing is built there"


@dataclass(frozen=True, kw_only=True, eq=False)
class BarrierNews:
    """One barrier as one gauge tells of it.

    Attributes
    ----------
    record
        The barrier.
    news
        Its gauge.
    states
        What each state of the chain is: the last reading where there is one, then the crest of each trace.
    chain
        From reading to head, one state for each of them.
    clock
        Its times; without timelines where the gauge has no forecast.
    advice
        What its logs ask for, or None for a barrier without logs.
    sentences
        What was not entered and what the times rest on.
    """

    record: Panel | Closure | Wall | IWall
    news: GaugeNews
    states: tuple[str, ...]
    chain: GaugeChain | None
    clock: Clock
    advice: LogAdvice | None
    sentences: tuple[str, ...]


def pieces_of(closure: Closure) -> Pieces:
    """What building a closure means: every log on hand, and the posts between its bays."""
    return Pieces(logs=closure.on_hand, posts=closure.bay_count - 1 if closure.post is not None else 0)


def barrier_news(
    scenario: Scenario,
    barrier: Barrier,
    news: GaugeNews,
    way: Conversion,
    now: datetime,
    longest_gap: float,
) -> BarrierNews:
    """Tell of one barrier by one gauge.

    Parameters
    ----------
    scenario
        Which it belongs to.
    barrier
        As it was assessed, for its limits.
    news
        What is known at the gauge.
    way
        From the gauge to the barrier.
    now
        With its zone.
    longest_gap
        Neighbours of a series further apart than this say nothing about what lies between. [s]
    """
    record = barrier.record
    states, chain = _chain(scenario, record, news, way)
    marks = marks_of(barrier, way)
    if isinstance(record, Closure):
        install, lead, sentences = _before_the_water(record, scenario.crew)
    else:
        install = InstallTime(seconds=None, planned=None, drilled=None, sentence=_STANDS)
        lead, sentences = None, (_STANDS,)
    clock = clock_of(way, marks, install, lead or LeadTimes(), news.traces, now, longest_gap=longest_gap)
    if lead is None:
        told = tuple(limit.sentence for limit in marks.limits if limit.sentence)
        timelines = tuple(
            _without_call_out(one, sentences[-1], None if isinstance(record, Closure) else told)
            for one in clock.timelines
        )
        clock = replace(clock, timelines=timelines)
    return BarrierNews(
        record=record,
        news=news,
        states=states,
        chain=chain,
        clock=clock,
        advice=_advice(record, news, chain, states) if isinstance(record, Closure) else None,
        sentences=(*_of_allowances(record), *sentences),
    )


def _without_call_out(timeline: Timeline, why: str, sentences: tuple[str, ...] | None) -> Timeline:
    """A call-out without known times before it is not known, unless the water never comes."""
    call_out = timeline.call_out
    if call_out.state != "not reached in this forecast":
        call_out = unknown(why)
    return replace(
        timeline, call_out=call_out, sentences=timeline.sentences if sentences is None else sentences
    )


def _chain(
    scenario: Scenario, record: Panel | Closure | Wall | IWall, news: GaugeNews, way: Conversion
) -> tuple[tuple[str, ...], GaugeChain | None]:
    stages: dict[str, float] = {}
    if news.observed is not None:
        stages[LAST_READING] = float(news.observed.values[-1])
    stages |= {f"crest, {name}": float(trace.values.max()) for name, trace in news.traces.items()}
    if not stages:
        return (), None
    reading = GaugeReading.of(np.array(list(stages.values())), *_pedigree(scenario, news))
    return tuple(stages), chain_of(way, reading, foot_of(record), scenario.datum)


def _pedigree(scenario: Scenario, news: GaugeNews) -> tuple[str, date | None]:
    """Who told the readings, and the day of the newest."""
    own = [one.source for one in scenario.observed if one.gauge == news.gauge.id]
    issues = [one for one in scenario.forecast if one.gauge == news.gauge.id]
    own += [one.source for one in issues if _issued(one) == max(map(_issued, issues))]
    days = [utc(news.observed.times[-1]).date()] if news.observed is not None else []
    if news.forecast.issues and (issued := news.forecast.newest.issued) is not None:
        days.append(utc(issued).date())
    sources = dict.fromkeys(source for source in own if source)
    return "; ".join(sources), max(days, default=None)


def _issued(stored: StoredForecast) -> float:
    return -math.inf if stored.issued is None else stored.issued.timestamp()


def _before_the_water(
    closure: Closure, crews: Sequence[Crew]
) -> tuple[InstallTime, LeadTimes | None, tuple[str, ...]]:
    """Time of closing, times before it or None, and what they rest on, the reason for None last."""
    clock = closure.clock or BarrierClock()
    fit = [
        crew
        for crew in crews
        if (not clock.crew or crew.id == clock.crew) and all(skill in crew.can for skill in clock.needs)
    ]
    pinned = fit[0].people if clock.crew and fit else None
    install = install_time(clock, closure.install, pieces_of(closure), pinned)
    ahead = None if clock.tell_owner_ahead is None else clock.tell_owner_ahead.value
    sentences = (
        [f"the time to close {closure.id} counts every log on hand"] if clock.install_time is None else []
    )
    if not fit:
        why = f"no crew that can close {closure.id} has been entered, so no call-out can be told"
        return install, None, (*sentences, why)
    for crew in fit:
        for name in ("mobilisation", "travel"):
            if getattr(crew, name) is None:
                why = f"nobody entered the {name} of crew {crew.id}, so no call-out can be told"
                return install, None, (*sentences, why)
    before = {crew.id: _value(crew.mobilisation) + _value(crew.travel) for crew in fit}
    slowest = max(fit, key=lambda crew: before[crew.id])
    if len(set(before.values())) > 1:
        sentences.append(f"mobilisation and travel are those of crew {slowest.id}, the longest")
    lead = LeadTimes(
        mobilisation=_value(slowest.mobilisation), travel=_value(slowest.travel), tell_owner_ahead=ahead
    )
    return install, lead, tuple(sentences)


def _of_allowances(record: Panel | Closure | Wall | IWall) -> tuple[str, ...]:
    """What the advice about logs leaves out because nobody entered it."""
    if not isinstance(record, Closure):
        return ()
    absent = [
        word
        for word, entered in (("allowance", record.allowance), ("freeboard", record.limits.freeboard))
        if entered is None
    ]
    if not absent:
        return ()
    return (f"no {' and no '.join(absent)} has been entered for {record.id}: none is counted for its logs",)


def _value(entered: object) -> float:
    return float(getattr(entered, "value", 0.0))


def _advice(
    closure: Closure, news: GaugeNews, chain: GaugeChain | None, states: tuple[str, ...]
) -> LogAdvice:
    adding = closure.adding
    until = None
    if adding is not None:
        until = adding.up_to.value if adding.up_to is not None else None
        if not adding.with_water:
            until = closure.sill.value
    levels = {} if chain is None else dict(zip(states, chain.level, strict=True))
    allowances = _value(closure.allowance) + _value(closure.limits.freeboard)
    return log_advice(
        level=float(levels.get(LAST_READING, np.nan)),
        wanted_top=float(levels.get("crest, likely", np.nan)) + allowances,
        top=closure.sill.value + min(closure.in_place) * closure.log.height.value,
        add_logs_until=until,
        off=news.off,
    )
