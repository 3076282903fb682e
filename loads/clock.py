"""The clock of one barrier: from the water back to the call-out, for every trace of a forecast."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime, timedelta

import numpy as np

from loads.crossing import HIGHER, LimitLevel, LimitReached
from loads.gauge_conversion import Conversion
from loads.install_time import InstallTime
from loads.instant import ENDLESS, Instant, below_for_good, reached, unknown
from loads.moments import utc
from loads.series.series import Series


@dataclass(frozen=True, kw_only=True)
class ClockMarks:
    """Levels at one barrier that the clock watches.

    Attributes
    ----------
    sill
        Elevation of the sill. [m]
    wave_allowance
        How far below the sill still water counts as there. [m]
    add_logs_until
        Level up to which logs can be added, or None when nobody entered one. [m]
    removal_stage
        Gauge reading from which upward nothing is taken out, or None when nobody entered one. [m]
    limits
        Rated level, first-limit level and the like, those without a level among them.
    """

    sill: float
    wave_allowance: float = 0.0
    add_logs_until: float | None = None
    removal_stage: float | None = None
    limits: tuple[LimitLevel, ...] = ()


@dataclass(frozen=True, kw_only=True)
class LeadTimes:
    """What comes before the work.

    Attributes
    ----------
    mobilisation
        From the call to leaving. [s]
    travel
        From leaving to the closure. [s]
    tell_owner_ahead
        How long before the start the owner must be told, or None when there is nobody to tell. [s]
    """

    mobilisation: float = 0.0
    travel: float = 0.0
    tell_owner_ahead: float | None = None


@dataclass(frozen=True, kw_only=True)
class Crest:
    """Highest reading of a trace, and what it is at the barrier.

    Attributes
    ----------
    stage
        Reading of the gauge. [m]
    level
        Elevation at the barrier; NaN when not known. [m]
    head
        Level less sill; negative while below it. [m]
    moment
        First time it is reached, in UTC.
    at_the_end
        True when it is the last value of the trace, which may rise further.
    """

    stage: float
    level: float
    head: float
    moment: datetime
    at_the_end: bool


@dataclass(frozen=True, kw_only=True)
class Timeline:
    """Times of one barrier for one trace.

    Attributes
    ----------
    trace
        Its name: low, likely, high and so on.
    crest
        Highest water.
    water_at_sill
        Still water reaches the sill.
    closed_by
        T2: still water reaches the sill less the wave allowance.
    start
        T1: work starts, with everything on site.
    call_out
        T0: the call.
    tell_owner
        The owner must be told, or None when there is nobody to tell.
    last_logs
        Water reaches the level up to which logs can be added, or None when nobody entered one.
    limits
        When each limit level is reached.
    removal
        Water is below the removal stage and stays there, or None when nobody entered one.
    sentences
        What stands in place of what nobody entered.
    """

    trace: str
    crest: Crest
    water_at_sill: Instant
    closed_by: Instant
    start: Instant
    call_out: Instant
    tell_owner: Instant | None
    last_logs: Instant | None
    limits: tuple[LimitReached, ...]
    removal: Instant | None
    sentences: tuple[str, ...]


@dataclass(frozen=True, kw_only=True)
class Clock:
    """The clock of one barrier.

    Attributes
    ----------
    barrier, gauge
        Identifiers.
    sill_stage
        The sill as a reading of the gauge; NaN when not known. [m]
    install
        Time that closing takes, and where it comes from.
    timelines
        One for each trace.
    sentences
        Links that are missing between gauge and barrier.
    """

    barrier: str
    gauge: str
    sill_stage: float
    install: InstallTime
    timelines: tuple[Timeline, ...]
    sentences: tuple[str, ...]

    def timeline(self, trace: str) -> Timeline:
        """Times for one trace.

        Raises
        ------
        KeyError
            There is no such trace.
        """
        for one in self.timelines:
            if one.trace == trace:
                return one
        raise KeyError(trace)

    def call_out_earlier(self, trace: str = HIGHER, than: str = "likely") -> timedelta | None:
        """How much earlier the call-out is for one trace than for another; None unless both have a moment."""
        one, other = self.timeline(trace).call_out.moment, self.timeline(than).call_out.moment
        return None if one is None or other is None else other - one


def clock_of(
    way: Conversion,
    marks: ClockMarks,
    install: InstallTime,
    lead: LeadTimes,
    traces: Mapping[str, Series],
    now: datetime,
    *,
    longest_gap: float = ENDLESS,
) -> Clock:
    """Work back from the water to the call [ClockPractice].

    Parameters
    ----------
    way
        From the gauge to the barrier.
    marks
        Levels that are watched.
    install
        Time that closing takes.
    lead
        What comes before the work.
    traces
        Readings of the gauge by the name of the trace, as `loads.crossing.traces_of` gives them.
    now
        Which decides what is past, with its zone.
    longest_gap
        Neighbours further apart than this say nothing about what lies between. [s]

    Returns
    -------
    Clock
        Every time in UTC, or the plain state in which there is none.

    Notes
    -----
    T1 = T2 − install; T0 = T1 − travel − mobilisation; owner told by T1 − lead time of the owner.
    """
    sill_stage = float(way.stage(np.array([marks.sill]))[0])
    return Clock(
        barrier=way.barrier,
        gauge=way.gauge.id,
        sill_stage=sill_stage,
        install=install,
        timelines=tuple(
            _timeline(name, way, marks, install, lead, trace, now, longest_gap)
            for name, trace in traces.items()
        ),
        sentences=way.missing,
    )


def _timeline(
    name: str,
    way: Conversion,
    marks: ClockMarks,
    install: InstallTime,
    lead: LeadTimes,
    trace: Series,
    now: datetime,
    longest_gap: float,
) -> Timeline:
    limits = [limit for limit in marks.limits if limit.level is not None]
    adding = [] if marks.add_logs_until is None else [marks.add_logs_until]
    levels = [marks.sill, marks.sill - marks.wave_allowance, *adding]
    stages = np.array([*way.stage(np.array(levels)), *(limit.stage for limit in limits)])
    at_sill, closed_by, *rest = reached(trace, stages, now, longest_gap=longest_gap)
    start = _start(closed_by, install, now)
    removal = None
    if marks.removal_stage is not None:
        removal = below_for_good(trace, marks.removal_stage, now, longest_gap=longest_gap)
    return Timeline(
        trace=name,
        crest=_crest(way, trace, marks.sill),
        water_at_sill=at_sill,
        closed_by=closed_by,
        start=start,
        call_out=start.less(lead.travel + lead.mobilisation, now),
        tell_owner=None if lead.tell_owner_ahead is None else start.less(lead.tell_owner_ahead, now),
        last_logs=rest[0] if adding else None,
        limits=tuple(
            LimitReached(limit=limit, instant=instant)
            for limit, instant in zip(limits, rest[len(adding) :], strict=True)
        ),
        removal=removal,
        sentences=tuple(_sentences(way.barrier, marks, install)),
    )


def _start(closed_by: Instant, install: InstallTime, now: datetime) -> Instant:
    if install.seconds is not None:
        return closed_by.less(install.seconds, now)
    if closed_by.state == "not reached in this forecast":
        return closed_by
    return unknown(install.sentence)


def _crest(way: Conversion, trace: Series, sill: float) -> Crest:
    place = int(np.argmax(trace.values))
    stage = float(trace.values[place])
    level = float(way.level(np.array([stage]))[0])
    return Crest(
        stage=stage,
        level=level,
        head=level - sill,
        moment=utc(trace.times[place]),
        at_the_end=bool(stage == trace.values[-1]),
    )


def _sentences(barrier: str, marks: ClockMarks, install: InstallTime) -> Sequence[str]:
    sentences = [limit.sentence for limit in marks.limits if limit.sentence]
    if marks.add_logs_until is None:
        sentences.append(f"nobody entered up to what level logs can be added at {barrier}")
    if marks.removal_stage is None:
        sentences.append(f"nobody entered a removal stage for {barrier}")
    if install.sentence:
        sentences.append(install.sentence)
    return sentences
