"""When something happens: a moment, or one of three plain states in which no moment can be told."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime, timedelta
from typing import Literal

import numpy as np

from loads.arrays import FloatArray
from loads.moments import utc
from loads.series.interpolate import first_reached
from loads.series.series import Series

State = Literal["at", "already past", "not reached in this forecast", "not known"]

ENDLESS = float("inf")
_ROUNDING = 1e-9


@dataclass(frozen=True, kw_only=True)
class Instant:
    """When something happens.

    Attributes
    ----------
    state
        "at" with a moment still to come; "already past", with the moment where it can be told; "not reached
        in this forecast"; "not known", with the reason.
    moment
        In UTC, or None.
    reason
        Why no moment is told; empty when one is.
    earliest
        Of state "not known" the moment from which it may happen, in UTC, or None.
    """

    state: State
    moment: datetime | None = None
    reason: str = ""
    earliest: datetime | None = None

    @property
    def due(self) -> datetime | None:
        """Moment to plan for: the moment, else the earliest at which it may be; None where there is none."""
        return self.moment if self.moment is not None else self.earliest

    def less(self, seconds: float, now: datetime) -> Instant:
        """The instant so long before this one.

        Parameters
        ----------
        seconds
            How long before. [s]
        now
            Which decides what is past.
        """
        before = timedelta(seconds=seconds)
        if self.moment is not None:
            return instant_at(self.moment - before, now)
        earliest = None if self.earliest is None else self.earliest - before
        return Instant(state=self.state, reason=self.reason, earliest=earliest)


def instant_at(moment: datetime, now: datetime) -> Instant:
    """Instant of a known moment: still to come, or past."""
    return Instant(state="at" if moment >= now else "already past", moment=moment)


def unknown(reason: str, earliest: datetime | None = None) -> Instant:
    """Instant of which no moment can be told."""
    return Instant(state="not known", reason=reason, earliest=earliest)


def reached(
    series: Series, stages: FloatArray, now: datetime, *, longest_gap: float = ENDLESS
) -> tuple[Instant, ...]:
    """When a series first reaches each of k stages, going up.

    Parameters
    ----------
    series
        Readings of the gauge.
    stages
        Shape (k,); NaN for a stage that is not known. [m]
    now
        Which decides what is past.
    longest_gap
        Neighbours further apart than this say nothing about what lies between. [s]

    Returns
    -------
    tuple of Instant
        One for each stage.
    """
    stages = _snapped(stages, series.values)
    found = first_reached(series, stages)
    index = np.searchsorted(np.maximum.accumulate(series.values), stages, side="left")
    return tuple(
        _reached_one(series, float(stage), found.times[k], int(index[k]), now, longest_gap)
        for k, stage in enumerate(stages)
    )


def _snapped(stages: FloatArray, values: FloatArray) -> FloatArray:
    """Stages that differ from a value of the series by rounding only become that value."""
    near = values[np.abs(values[None, :] - stages[:, None]).argmin(axis=1)]
    return np.where(np.abs(near - stages) <= _ROUNDING, near, stages)


def _reached_one(
    series: Series, stage: float, time: np.datetime64, index: int, now: datetime, longest_gap: float
) -> Instant:
    if np.isnan(stage):
        return unknown("the level cannot be told as a reading of the gauge")
    if index >= len(series):
        return Instant(state="not reached in this forecast", reason="the series stays below it")
    if index == 0:
        begins = utc(series.times[0])
        if begins <= now:
            return Instant(state="already past", reason="the series begins at or above it")
        return unknown("the series begins later than now, and at or above it", now)
    last_below = utc(series.times[index - 1])
    if (utc(series.times[index]) - last_below).total_seconds() > longest_gap:
        return unknown("it is reached where the series has a gap", last_below)
    return instant_at(utc(time), now)


def below_for_good(series: Series, stage: float, now: datetime, *, longest_gap: float = ENDLESS) -> Instant:
    """When a series falls below a stage and stays below it to its end.

    Parameters
    ----------
    series
        Readings of the gauge.
    stage
        Stage to fall below. [m]
    now
        Which decides what is past.
    longest_gap
        As in `reached`. [s]

    Returns
    -------
    Instant
        Not known while the series ends rising, since a second rise is then under way.

    Notes
    -----
    On the last pair of neighbours with y₀ ≥ stage > y₁ the instant is t₀ + (t₁ − t₀)·(y₀ − stage)/(y₀ − y₁),
    rounded up to a whole second.
    """
    values = series.values
    stage = float(_snapped(np.array([stage]), values)[0])
    above = np.flatnonzero(values >= stage)
    if len(above) and above[-1] == len(values) - 1:
        return Instant(state="not reached in this forecast", reason="the series ends at or above it")
    turns = np.flatnonzero(np.diff(values))
    if len(turns) and values[turns[-1] + 1] > values[turns[-1]]:
        return unknown("the series ends rising, and a second rise cannot be ruled out")
    if not len(above):
        return Instant(state="already past", reason="the series stays below it throughout")
    last = int(above[-1])
    first, second = utc(series.times[last]), utc(series.times[last + 1])
    step = (second - first).total_seconds()
    if step > longest_gap:
        return unknown("it is passed where the series has a gap", None)
    share = float((values[last] - stage) / (values[last] - values[last + 1]))
    return instant_at(first + timedelta(seconds=float(np.ceil(step * share - 1e-6))), now)


def in_order(instants: Sequence[Instant]) -> list[int]:
    """Places of instants from the first to the last: past ones, then by moment, then what is not reached."""
    ranks = {"already past": 0, "at": 1, "not known": 1, "not reached in this forecast": 2}

    def key(place: int) -> tuple[int, float]:
        one = instants[place]
        timeless = -ENDLESS if one.state == "already past" else ENDLESS
        return (ranks[one.state], timeless if one.due is None else one.due.timestamp())

    return sorted(range(len(instants)), key=key)
