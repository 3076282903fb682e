"""How long closing one barrier takes: from the pieces or as entered, and as a drill has shown it."""

from __future__ import annotations

import heapq
from collections.abc import Sequence
from dataclasses import dataclass, replace
from datetime import date, timedelta

from loads.moments import duration_text
from loads.quantity import Quantity
from loads.records.closure_site import Install
from loads.records.crew import BarrierClock, Drill


@dataclass(frozen=True, kw_only=True)
class Pieces:
    """What is built.

    Attributes
    ----------
    logs
        Logs to place in each bay.
    posts
        Posts to set.
    """

    logs: tuple[int, ...]
    posts: int


@dataclass(frozen=True, kw_only=True)
class Rates:
    """What building takes, as planned or as drilled.

    Attributes
    ----------
    per_log, per_post
        Time for one piece by one team, or None when nobody entered it. [s]
    whole
        Time for everything, from the first post to the last log, or None. It goes before the times for
        pieces. [s]
    people
        People of one team; 0 when nobody entered it, and the whole crew then is one team.
    preparation
        Before the first post. [s]
    """

    per_log: float | None = None
    per_post: float | None = None
    whole: float | None = None
    people: int = 0
    preparation: float = 0.0


@dataclass(frozen=True, kw_only=True)
class InstallTime:
    """Time that closing takes, and where it comes from.

    Attributes
    ----------
    seconds
        Time used, or None when it cannot be told. [s]
    planned
        Time without any drill, or None when it cannot be told. [s]
    drilled
        Day of the drill that is used, or None.
    sentence
        What the drill changed, or why no time can be told; empty when there is nothing to say.
    """

    seconds: float | None
    planned: float | None
    drilled: date | None
    sentence: str

    @property
    def change(self) -> float | None:
        """Time used less time planned, or None. [s]."""
        if self.seconds is None or self.planned is None:
            return None
        return self.seconds - self.planned


def planned_rates(clock: BarrierClock, install: Install | None) -> Rates:
    """Times as they were entered, without any drill."""
    people = clock.install_people or (install.people if install else None) or 0
    return Rates(
        per_log=_seconds(install.minutes_per_log if install else None),
        per_post=_seconds(install.minutes_per_post if install else None),
        whole=_seconds(clock.install_time),
        people=people,
        preparation=_seconds(clock.preparation) or 0.0,
    )


def _seconds(entered: Quantity | None) -> float | None:
    return entered.value if entered is not None else None


def build_time(rates: Rates, pieces: Pieces, people: int | None = None) -> float | None:
    """Time from arrival to the last log [ClockPractice].

    Parameters
    ----------
    rates
        As planned or as drilled.
    pieces
        What is built.
    people
        People at work; None for just one team.

    Returns
    -------
    float or None
        None when there are too few people for one team, or nobody entered the times. [s]

    Notes
    -----
    preparation + whole; or preparation + ⌈posts / teams⌉·per_post + the longest that any team places logs,
    where bays are handed out in order to the team that is free first. Teams = ⌊people / people of a team⌋,
    and never more than there are bays. A time entered for the whole is not divided among teams.
    """
    teams = 1 if people is None or not rates.people else people // rates.people
    if teams < 1:
        return None
    if rates.whole is not None:
        return rates.preparation + rates.whole
    bays = max(len(pieces.logs), 1)
    teams = min(teams, bays)
    if (rates.per_log is None and any(pieces.logs)) or (rates.per_post is None and pieces.posts):
        return None
    posts = -(-pieces.posts // teams) * (rates.per_post or 0.0)
    return rates.preparation + posts + _longest(pieces.logs, teams) * (rates.per_log or 0.0)


def _longest(logs: Sequence[int], teams: int) -> int:
    busy = [0] * teams
    for count in logs:
        heapq.heapreplace(busy, busy[0] + count)
    return max(busy)


def drilled_rates(rates: Rates, drill: Drill, pieces: Pieces) -> Rates:
    """Rates as a drill has shown them.

    Parameters
    ----------
    rates
        As planned.
    drill
        What was measured.
    pieces
        What is built now.

    Returns
    -------
    Rates
        Times measured for pieces replace the planned ones. A time measured for the whole with its logs or
        posts scales the planned times of the pieces by measured over planned for what was built in the
        drill; without its pieces, or without planned times for them, it replaces the whole.
    """
    if drill.install_time is None:
        return replace(
            rates,
            whole=None,
            per_log=drill.minutes_per_log.value if drill.minutes_per_log else rates.per_log,
            per_post=drill.minutes_per_post.value if drill.minutes_per_post else rates.per_post,
            people=drill.people or rates.people,
        )
    measured = drill.install_time.value
    people = drill.people or rates.people
    if drill.logs is not None or drill.posts is not None:
        built = Pieces(logs=_spread(drill.logs or 0, max(len(pieces.logs), 1)), posts=drill.posts or 0)
        by_piece = replace(rates, whole=None, preparation=0.0)
        expected = build_time(by_piece, built, drill.people)
        if expected:
            factor = measured / expected
            return replace(
                by_piece,
                per_log=None if rates.per_log is None else rates.per_log * factor,
                per_post=None if rates.per_post is None else rates.per_post * factor,
                preparation=rates.preparation,
            )
    return replace(rates, whole=measured, people=people)


def _spread(logs: int, bays: int) -> tuple[int, ...]:
    each, rest = divmod(logs, bays)
    return tuple(each + (bay < rest) for bay in range(bays))


def install_time(
    clock: BarrierClock, install: Install | None, pieces: Pieces, people: int | None = None
) -> InstallTime:
    """Time that closing a barrier takes; the newest drill goes before the plan, and the change is said.

    Parameters
    ----------
    clock
        Of the barrier, with its drills.
    install
        Of the closure, or None.
    pieces
        What is built.
    people
        People at work; None for just one team.
    """
    rates = planned_rates(clock, install)
    planned, drill = build_time(rates, pieces, people), clock.newest_drill
    if drill is None:
        sentence = "" if planned is not None else _why_none(rates, people)
        return InstallTime(seconds=planned, planned=planned, drilled=None, sentence=sentence)
    shown = drilled_rates(rates, drill, pieces)
    used = build_time(shown, pieces, people)
    if used is None:
        sentence = _why_none(shown, people)
    else:
        sentence = f"the drill of {drill.date} {_changed(used, planned)}"
    return InstallTime(seconds=used, planned=planned, drilled=drill.date, sentence=sentence)


def _changed(used: float, planned: float | None) -> str:
    if planned is None:
        return "gives the time; nobody entered a planned one"
    change = timedelta(seconds=used - planned)
    if abs(change) < timedelta(seconds=30):
        return "took as long as planned"
    return f"makes it {duration_text(change)} {'longer' if change > timedelta(0) else 'shorter'} than planned"


def _why_none(rates: Rates, people: int | None) -> str:
    if people is not None and rates.people > people:
        return f"it takes {rates.people} people, and here are {people}"
    return "nobody entered how long closing takes"
