"""Closing a barrier as a job for crews: how long it takes each of them, and who cannot do it."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from datetime import datetime

from loads.install_time import Pieces, install_time
from loads.instant import Instant
from loads.records.closure_site import Install
from loads.records.crew import BarrierClock, Crew


@dataclass(frozen=True, kw_only=True)
class Job:
    """One closure to close.

    Attributes
    ----------
    barrier, name
        Which one.
    closed_by
        When the water is there.
    seconds
        Time by identifier of a crew; crews that cannot do it are left out. [s]
    why_not
        Reason by identifier of a crew that cannot do it.
    order
        Place in the order pinned by hand, or None. Each crew does pinned jobs first, in their order.
    """

    barrier: str
    name: str
    closed_by: Instant
    seconds: Mapping[str, float]
    why_not: Mapping[str, str]
    order: int | None = None

    def due(self, now: datetime) -> datetime | None:
        """When it must be closed; now when the water is there already; None when nobody can tell or ask."""
        if self.closed_by.state == "already past" and self.closed_by.moment is None:
            return now
        return self.closed_by.due


def job_of(
    barrier: str,
    name: str,
    closed_by: Instant,
    clock: BarrierClock,
    install: Install | None,
    pieces: Pieces,
    crews: Sequence[Crew],
) -> Job:
    """The job of closing one barrier.

    Parameters
    ----------
    barrier, name, closed_by
        As in `Job`.
    clock
        Of the barrier: what it needs, its pinned crew and order, its drills.
    install
        Of the closure, or None.
    pieces
        What is built.
    crews
        Everyone who might do it.
    """
    seconds: dict[str, float] = {}
    why_not: dict[str, str] = {}
    for crew in crews:
        found = install_time(clock, install, pieces, crew.people)
        lacking = [skill for skill in clock.needs if skill not in crew.can]
        if clock.crew and clock.crew != crew.id:
            why_not[crew.id] = f"it is pinned to crew {clock.crew}"
        elif lacking:
            why_not[crew.id] = f"it needs a {' and a '.join(lacking)}"
        elif found.seconds is None:
            why_not[crew.id] = found.sentence
        else:
            seconds[crew.id] = found.seconds
    return Job(
        barrier=barrier,
        name=name,
        closed_by=closed_by,
        seconds=seconds,
        why_not=why_not,
        order=clock.order,
    )
