"""A plan of the line as data: for the table, the sentences and the bar chart of crews against time."""

from __future__ import annotations

import math
from dataclasses import dataclass
from datetime import datetime, timedelta

from loads.moments import duration_text
from loads.records.crew import Crew


@dataclass(frozen=True, kw_only=True)
class PlannedJob:
    """One bar of the chart.

    Attributes
    ----------
    barrier, name, crew
        What, and by whom.
    leave
        The crew sets out for it, in UTC.
    start, finish
        Of the work, in UTC.
    due
        Water is there, in UTC.
    start_by
        Latest start at which this and what the crew does after it are closed in time, in UTC.
    margin
        Due less finish; negative when late.
    """

    barrier: str
    name: str
    crew: str
    leave: datetime
    start: datetime
    finish: datetime
    due: datetime
    start_by: datetime
    margin: timedelta

    @property
    def late(self) -> bool:
        """Whether the water is there before it is closed."""
        return self.margin < timedelta(0)


@dataclass(frozen=True, kw_only=True)
class CrewPlan:
    """What one crew does.

    Attributes
    ----------
    crew
        Who.
    call_out
        Call that this plan counts on, in UTC, or None when the crew has nothing to do.
    call_out_by
        Latest call at which all its jobs are closed in time, in UTC, or None likewise.
    jobs
        In order.
    """

    crew: Crew
    call_out: datetime | None
    call_out_by: datetime | None
    jobs: tuple[PlannedJob, ...]


@dataclass(frozen=True, kw_only=True)
class Plan:
    """Order and start time of every closure.

    Attributes
    ----------
    crews
        What each crew does.
    late
        Jobs that this plan closes after the water is there, the latest one first.
    impossible
        Barrier and reason, for jobs that no crew can do.
    not_asked_for
        Barriers that this forecast does not reach.
    not_known
        Barrier and reason, where nobody can tell when the water is there; they are in no crew's plan.
    cures
        What would close all in time, one sentence each; empty when all are.
    earlier
        By how much all crews would have to start earlier, or None when all are in time.
    more_crews
        How many more crews would do, or None when none are needed or not even three would do.
    """

    crews: tuple[CrewPlan, ...]
    late: tuple[PlannedJob, ...]
    impossible: tuple[tuple[str, str], ...]
    not_asked_for: tuple[str, ...]
    not_known: tuple[tuple[str, str], ...]
    cures: tuple[str, ...]
    earlier: timedelta | None
    more_crews: int | None

    @property
    def in_time(self) -> bool:
        """Whether every closure is closed before the water is there, or is not reached."""
        return not self.late and not self.impossible and not self.not_known

    @property
    def sentences(self) -> tuple[str, ...]:
        """Closures not closed in time, by how much, and what would put it right."""
        late = [
            f"{job.barrier} is closed {duration_text(whole_minutes(-job.margin))} after the water is there"
            for job in self.late
        ]
        never = [f"{barrier} cannot be closed by any crew: {reason}" for barrier, reason in self.impossible]
        dark = [
            f"nobody can tell when {barrier} must be closed: {reason}" for barrier, reason in self.not_known
        ]
        return (*never, *dark, *late, *self.cures)


def whole_minutes(span: timedelta) -> timedelta:
    """A length of time, rounded up to whole minutes.

    Examples
    --------
    >>> whole_minutes(timedelta(minutes=4, seconds=1))
    datetime.timedelta(seconds=300)
    """
    return timedelta(minutes=math.ceil(span / timedelta(minutes=1)))
