"""Levels between the values of a series, and when a level is first reached."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.series.interpolate import OutsideSeriesError, covers, first_reached, level_at
from loads.series.read import read_series
from tests.series.files import FOOT, SHEF, trace

FORECAST = read_series(SHEF)[-1]


def at(*times: str) -> np.ndarray[tuple[int], np.dtype[np.datetime64]]:
    return np.array(times, dtype="datetime64[s]")


def test_stage_25_30_is_reached_at_11_09_utc() -> None:
    """Stages 24.7 at 06:00 and 25.4 at 12:00: 06:00 + 6 h · 0.6/0.7."""
    reached = first_reached(FORECAST, np.array([25.30, 24.30]) * FOOT)
    exact = np.datetime64("2031-04-03T06:00:00", "s") + np.timedelta64(int(6 * 3600 * 0.6 / 0.7), "s")
    assert reached.times[0] == exact
    assert str(reached.times[0])[:16] == "2031-04-03T11:08"  # 11:08:34, that is 11:09
    assert str(reached.times[1]) == "2031-04-03T03:00:00"
    assert not reached.already.any()


def test_reached_from_the_start_never_and_at_the_crest() -> None:
    reached = first_reached(FORECAST, np.array([20.0, 22.4, 26.2, 26.21, np.nan]) * FOOT)
    assert reached.already.tolist() == [True, True, False, False, False]
    assert [str(time) for time in reached.times[:3]] == ["2031-04-02T12:00:00"] * 2 + ["2031-04-04T00:00:00"]
    assert np.isnat(reached.times[3:]).all()


def test_the_first_of_two_crossings_counts() -> None:
    reached = first_reached(trace("2031-04-02T00:00", 60, [10, 12, 9, 14]), np.array([11.0]) * FOOT)
    assert str(reached.times[0]) == "2031-04-02T00:30:00"


def test_level_between_values_and_none_outside() -> None:
    levels = level_at(FORECAST, at("2031-04-02T12:00:00", "2031-04-02T15:00:00", "2031-04-04T06:00:00"))
    assert levels == pytest.approx(np.array([22.4, 22.75, 26.0]) * FOOT)
    outside = at("2031-04-02T11:59:59", "2031-04-04T06:00:01", "NaT", "2031-04-03T00:00:00")
    assert covers(FORECAST, outside).tolist() == [False, False, False, True]
    for time in outside[:3]:
        with pytest.raises(OutsideSeriesError, match="gives levels from 2031-04-02 12:00:00"):
            level_at(FORECAST, np.array([time]))


def test_nothing_is_said_inside_a_long_gap() -> None:
    asked = at("2031-04-02T12:00:00", "2031-04-02T13:00:00", "2031-04-02T18:00:00")
    assert covers(FORECAST, asked, longest_gap=3600).tolist() == [True, False, True]
    with pytest.raises(OutsideSeriesError):
        level_at(FORECAST, asked, longest_gap=3600)


@given(
    st.lists(st.floats(-50, 50).map(lambda value: round(value, 2)), min_size=1, max_size=30),
    st.floats(-60, 60).map(lambda value: round(value, 3)),
)
def test_before_the_first_crossing_the_level_is_lower_and_after_it_is_there(
    feet: list[float], level: float
) -> None:
    series = trace("2031-04-02T00:00", 60, feet)
    reached = first_reached(series, np.array([level]) * FOOT)
    if np.isnat(reached.times[0]):
        assert (series.values < level * FOOT).all()
        return
    before = np.arange(series.times[0], reached.times[0], np.timedelta64(600, "s"))
    if len(before):
        assert (level_at(series, before) <= level * FOOT + 1e-9).all()
    steepest = float(np.abs(np.diff(series.values)).max(initial=0.0)) / 3600
    assert level_at(series, reached.times)[0] >= level * FOOT - steepest - 1e-9
