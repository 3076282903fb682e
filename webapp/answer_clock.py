"""The clock of a line as JSON: SI base units, times in UTC and as the local zone tells them."""

from __future__ import annotations

from collections.abc import Mapping
from datetime import UTC, date, datetime, timedelta
from typing import Any
from zoneinfo import ZoneInfo

import numpy as np

from loads import __version__
from loads.cautions import CAUTIONS
from loads.chain import ChainTerm
from loads.clock import Timeline
from loads.crossing import HIGHER, LimitOrder, LimitReached
from loads.document import input_digest
from loads.instant import Instant
from loads.line_barrier import BarrierNews
from loads.line_clock import LineClock
from loads.line_watch import GaugeNews
from loads.moments import local_text, utc
from loads.plan import Plan
from loads.records.scenario import Scenario
from loads.series.ages import Age
from loads.series.series import Issue, Series
from webapp.answer_parts import number

SCHEMA = "sillhead clock 1"
"""Name and version of this JSON; keys are never renamed."""
PLANNED = ("likely", HIGHER)
"""Traces for which the line is planned."""


def zone_of(scenario: Scenario) -> ZoneInfo:
    """Local zone of a scenario; UTC where none was entered."""
    return ZoneInfo(scenario.zone or "UTC")


def clock_answer(line: LineClock, document: Mapping[str, object]) -> dict[str, Any]:
    """JSON of the clock of a line.

    Parameters
    ----------
    line
        What was told.
    document
        The document it was told from, for its digest.
    """
    zone = zone_of(line.scenario)
    return {
        "schema": SCHEMA,
        "version": __version__,
        "input_digest": input_digest(document),
        "title": line.scenario.title,
        "datum": line.scenario.datum,
        "zone": zone.key,
        "now": _moment(line.now, zone),
        "raised": line.raised,
        "advice_off": list(line.off),
        "gauges": [_gauge(news, zone) for news in line.gauges],
        "barriers": [_barrier(one, zone) for one in line.barriers],
        "limit_orders": [_order(order, zone) for order in line.orders],
        "plans": [{"trace": name, **_plan(line.plan(name), zone)} for name in PLANNED if name in line.traces],
        "sentences": list(line.sentences),
        "cautions": list(CAUTIONS),
    }


def _moment(moment: datetime | None, zone: ZoneInfo) -> dict[str, str] | None:
    if moment is None:
        return None
    known = moment.astimezone(UTC)
    return {"utc": known.isoformat(timespec="seconds"), "local": local_text(known, zone)}


def _instant(instant: Instant | None, zone: ZoneInfo) -> dict[str, Any] | None:
    if instant is None:
        return None
    return {
        "state": instant.state,
        "time": _moment(instant.moment, zone),
        "earliest": _moment(instant.earliest, zone),
        "reason": instant.reason,
    }


def _day(day: date | None) -> str | None:
    return day.isoformat() if day else None


def _gauge(news: GaugeNews, zone: ZoneInfo) -> dict[str, Any]:
    gauge, observed = news.gauge, news.observed
    return {
        "id": gauge.id,
        "name": gauge.name,
        "number": gauge.number,
        "observed": None
        if observed is None
        else {
            "stage": float(observed.values[-1]),
            "time": _moment(utc(observed.times[-1]), zone),
            "age": _age(news.observed_age),
        },
        "forecasts": [_issue(issue, zone) for issue in news.forecast.issues],
        "forecast_age": _age(news.forecast_age),
        "traps": [{"name": trap.name, "sentence": str(trap)} for trap in news.traps],
    }


def _age(age: Age | None) -> dict[str, Any] | None:
    if age is None:
        return None
    return {"label": age.label, "seconds": age.seconds, "advice": age.advice, "sentence": age.sentence}


def _issue(issue: Issue, zone: ZoneInfo) -> dict[str, Any]:
    traces = {"low": issue.low, "likely": issue.likely, "high": issue.high}
    return {
        "issued": None if issue.issued is None else _moment(utc(issue.issued), zone),
        "basis": issue.basis,
        "traces": {name: _trace(series) for name, series in traces.items() if series is not None},
    }


def _trace(series: Series) -> list[dict[str, Any]]:
    times = [utc(time).isoformat(timespec="seconds") for time in series.times]
    return [{"utc": time, "stage": float(stage)} for time, stage in zip(times, series.values, strict=True)]


def _barrier(one: BarrierNews, zone: ZoneInfo) -> dict[str, Any]:
    clock, install = one.clock, one.clock.install
    has_both = {"likely", HIGHER} <= {timeline.trace for timeline in clock.timelines}
    earlier = clock.call_out_earlier() if has_both else None
    return {
        "id": one.record.id,
        "kind": one.record.kind,
        "name": one.record.name,
        "gauge": clock.gauge,
        "sill_stage": number(clock.sill_stage),
        "chain": _chain(one),
        "install": {
            "seconds": install.seconds,
            "planned": install.planned,
            "drilled": _day(install.drilled),
            "sentence": install.sentence,
        },
        "timelines": [_timeline(timeline, zone) for timeline in clock.timelines],
        "one_foot_more_call_out_earlier": None if earlier is None else earlier / timedelta(seconds=1),
        "advice": None if one.advice is None else {"kind": one.advice.kind, "sentence": one.advice.sentence},
        "sentences": [*clock.sentences, *one.sentences],
    }


def _chain(one: BarrierNews) -> dict[str, Any] | None:
    chain = one.chain
    if chain is None:
        return None
    return {
        "states": list(one.states),
        "terms": [_term(term, len(one.states)) for term in chain.terms],
        "level": [number(level) for level in chain.level],
        "missing": list(chain.missing),
        "remarks": list(chain.remarks),
    }


def _term(term: ChainTerm, states: int) -> dict[str, Any]:
    link = term.link

    def each(values: object) -> list[float | None]:
        return [number(value) for value in np.broadcast_to(np.asarray(values, dtype=np.float64), (states,))]

    return {
        "name": link.name,
        "sign": term.sign,
        "symbol": link.symbol,
        "meaning": link.meaning,
        "value": each(link.value),
        "low": each(link.low),
        "high": each(link.high),
        "source": link.source,
        "date": _day(link.dated),
        "mark": term.mark,
    }


def _timeline(timeline: Timeline, zone: ZoneInfo) -> dict[str, Any]:
    crest = timeline.crest
    return {
        "trace": timeline.trace,
        "crest": {
            "stage": crest.stage,
            "level": number(crest.level),
            "head": number(crest.head),
            "time": _moment(crest.moment, zone),
            "at_the_end": crest.at_the_end,
        },
        **{
            name: _instant(getattr(timeline, name), zone)
            for name in (
                "water_at_sill",
                "closed_by",
                "start",
                "call_out",
                "tell_owner",
                "last_logs",
                "removal",
            )
        },
        "limits": [_limit(one, zone) for one in timeline.limits],
        "sentences": list(timeline.sentences),
    }


def _limit(one: LimitReached, zone: ZoneInfo) -> dict[str, Any]:
    limit = one.limit
    return {
        "barrier": limit.barrier,
        "label": limit.label,
        "level": limit.level,
        "stage": number(limit.stage),
        "reached": _instant(one.instant, zone),
    }


def _order(order: LimitOrder, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "trace": order.trace,
        "reached": [_limit(one, zone) for one in order.reached],
        "sentences": list(order.sentences),
    }


def _plan(plan: Plan, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "in_time": plan.in_time,
        "crews": [
            {
                "id": crew.crew.id,
                "call_out": _moment(crew.call_out, zone),
                "call_out_by": _moment(crew.call_out_by, zone),
                "jobs": [
                    {
                        "barrier": job.barrier,
                        **{
                            name: _moment(getattr(job, name), zone)
                            for name in ("leave", "start", "finish", "due", "start_by")
                        },
                        "margin": job.margin / timedelta(seconds=1),
                        "late": job.late,
                    }
                    for job in crew.jobs
                ],
            }
            for crew in plan.crews
        ],
        "not_asked_for": list(plan.not_asked_for),
        "sentences": list(plan.sentences),
    }
