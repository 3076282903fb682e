"""Between the values of a series: the level at an instant, and the first instant a level is reached.

Straight lines between neighbours. Nothing is said before the first value or after the last, nor, where a
longest gap is stated, inside a longer one.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.problems import SillheadError
from loads.series.series import Series, TimeArray


class OutsideSeriesError(SillheadError):
    """A level was asked for at an instant of which the series says nothing."""


@dataclass(frozen=True, kw_only=True)
class Reached:
    """First instants at which k levels are reached.

    Attributes
    ----------
    times
        In UTC, shape (k,), whole seconds, never late; NaT where the series does not get there.
    already
        True where the first value of the series is at or above the level, so that the instant is the start of
        the series and the water may have come earlier, shape (k,).
    """

    times: TimeArray
    already: BoolArray


def _seconds(times: TimeArray) -> FloatArray:
    return times.astype("datetime64[s]").astype(np.int64).astype(np.float64)


def covers(series: Series, at: TimeArray, *, longest_gap: float = np.inf) -> BoolArray:
    """Tell at which instants the series gives a level.

    Parameters
    ----------
    series
        Levels at n times.
    at
        Instants in UTC, shape (m,).
    longest_gap
        Two neighbours further apart than this say nothing about what lies between. [s]

    Returns
    -------
    BoolArray
        Shape (m,).
    """
    known, asked = _seconds(series.times), _seconds(at)
    inside = ~np.isnat(at) & (asked >= known[0]) & (asked <= known[-1])
    after = np.clip(np.searchsorted(known, asked, side="left"), 0, len(known) - 1)
    before = np.maximum(after - 1, 0)
    exact = known[after] == asked
    return np.asarray(inside & (exact | (known[after] - known[before] <= longest_gap)), dtype=np.bool_)


def level_at(series: Series, at: TimeArray, *, longest_gap: float = np.inf) -> FloatArray:
    """Level at instants, by a straight line between the neighbours.

    Parameters
    ----------
    series
        Levels at n times.
    at
        Instants in UTC, shape (m,).
    longest_gap
        As in `covers`. [s]

    Returns
    -------
    FloatArray
        Shape (m,). [m]

    Raises
    ------
    OutsideSeriesError
        The series says nothing about one of the instants.
    """
    if not covers(series, at, longest_gap=longest_gap).all():
        first, last = (str(time).replace("T", " ") for time in (series.times[0], series.times[-1]))
        raise OutsideSeriesError(f"{series.name} gives levels from {first} to {last} UTC, without its gaps")
    origin = _seconds(series.times[:1])
    return np.asarray(
        np.interp(_seconds(at) - origin, _seconds(series.times) - origin, series.values), dtype=np.float64
    )


def first_reached(series: Series, levels: FloatArray) -> Reached:
    """First instant at which the series is at or above each level.

    Parameters
    ----------
    series
        Values at n times.
    levels
        Shape (k,). [m]

    Returns
    -------
    Reached
        Shape (k,).

    Notes
    -----
    On the first pair of neighbours with y₀ < level ≤ y₁ the instant is t₀ + (t₁ − t₀)·(level − y₀)/(y₁ − y₀),
    rounded down to a whole second. Gaps are bridged.
    """
    highest = np.maximum.accumulate(series.values)
    index = np.searchsorted(highest, levels, side="left")
    reached = (index < len(highest)) & ~np.isnan(levels)
    already = reached & (index == 0)
    after = np.where(reached, index, 0)
    before = np.maximum(after - 1, 0)
    times = series.times.astype(np.int64)
    rise = series.values[after] - series.values[before]
    share = np.where(rise > 0, (levels - series.values[before]) / np.where(rise > 0, rise, 1.0), 0.0)
    moments = times[before] + np.floor((times[after] - times[before]) * np.clip(share, 0.0, 1.0) + 1e-6)
    found = np.where(reached, moments, 0.0).astype(np.int64).astype("datetime64[s]")
    found[~reached] = np.datetime64("NaT", "s")
    return Reached(times=found, already=np.asarray(already, dtype=np.bool_))
