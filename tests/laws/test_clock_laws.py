"""What must hold of every clock, whatever the river does."""

from __future__ import annotations

from datetime import timedelta

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.install_time import Pieces, Rates, build_time
from loads.instant import Instant, below_for_good, reached
from loads.moments import utc
from loads.records.gauge import Transfer
from tests.clock_cases import FOOT, HOUR, NOW, clock, hours, series, way

readings = st.lists(st.floats(15.0, 35.0), min_size=2, max_size=12)
stages = st.floats(14.0, 36.0)


def no_later(one: Instant, other: Instant) -> bool:
    """Whether the first is reached no later than the second, states among them."""
    ranks = {"already past": 0, "at": 1, "not reached in this forecast": 2}
    if one.moment is not None and other.moment is not None:
        return one.moment <= other.moment
    if one.moment is None and other.moment is None:
        return ranks[one.state] <= ranks[other.state]
    return (
        one.state == "already past" if one.moment is None else other.state == "not reached in this forecast"
    )


@given(readings, stages, st.floats(0.0, 5.0))
def test_a_higher_river_never_reaches_the_sill_later(feet: list[float], stage: float, more: float) -> None:
    traces = series(feet), series(feet).shifted(more * FOOT, "higher")
    usual, higher = (reached(trace, np.array([stage * FOOT]), NOW)[0] for trace in traces)
    assert no_later(higher, usual)
    likely = clock(feet).timeline("likely").closed_by
    assert no_later(clock(feet).timeline("likely, 1 ft higher").closed_by, likely)


@given(readings, stages, st.floats(0.0, 5.0))
def test_a_higher_sill_is_never_reached_sooner(feet: list[float], stage: float, more: float) -> None:
    lower, upper = reached(series(feet), np.array([stage, stage + more]) * FOOT, NOW)
    assert no_later(lower, upper)


@given(readings, stages)
def test_the_river_stands_at_the_sill_when_it_is_said_to(feet: list[float], stage: float) -> None:
    trace = series(feet)
    (found,) = reached(trace, np.array([stage * FOOT]), NOW)
    seconds = trace.times.astype(np.int64).astype(np.float64)
    if found.moment is None:
        assert (max(feet) < stage) == (found.state == "not reached in this forecast")
        return
    moment = found.moment.timestamp()
    first = trace.values[(seconds >= moment) & (seconds <= moment + 1)]
    before, after = np.interp([moment, moment + 1], seconds, trace.values)
    assert before - 1e-9 <= stage * FOOT <= max([after, *first]) + 1e-9
    assert (trace.values[seconds < moment] < stage * FOOT).all()


@given(readings, stages)
def test_nothing_is_above_after_it_fell_for_good(feet: list[float], stage: float) -> None:
    trace = series(feet)
    found = below_for_good(trace, stage * FOOT, NOW)
    if found.moment is None:
        assert found.state != "at"
        return
    later = [value for time, value in zip(trace.times, trace.values, strict=True) if utc(time) > found.moment]
    assert later
    assert all(value < stage * FOOT for value in later)


@given(st.floats(0.1, 24.0), st.floats(0.0, 24.0))
def test_longer_work_never_starts_later(install: float, more: float) -> None:
    one, other = (clock(install=hours(time)).timeline("likely") for time in (install, install + more))
    assert one.start.moment is not None
    assert other.start.moment is not None
    assert other.start.moment <= one.start.moment
    assert one.start.moment - other.start.moment == pytest.approx(
        timedelta(hours=more), abs=timedelta(milliseconds=1)
    )


pieces = st.builds(
    Pieces,
    logs=st.lists(st.integers(0, 20), min_size=1, max_size=8).map(tuple),
    posts=st.integers(0, 12),
)


@given(pieces, st.integers(1, 6), st.integers(1, 40), st.integers(0, 20))
def test_more_people_never_finish_later(built: Pieces, team: int, people: int, more: int) -> None:
    rates = Rates(per_log=240.0, per_post=700.0, people=team, preparation=600.0)
    few, many = build_time(rates, built, people), build_time(rates, built, people + more)
    if few is None:
        assert people < team
        return
    assert many is not None
    assert many <= few


@given(pieces, st.integers(0, 7), st.integers(1, 9), st.integers(1, 40))
def test_one_log_more_never_takes_less(built: Pieces, bay: int, team: int, people: int) -> None:
    rates = Rates(per_log=240.0, per_post=700.0, people=team)
    logs = list(built.logs)
    logs[bay % len(logs)] += 1
    one, more = (
        build_time(rates, one, people) for one in (built, Pieces(logs=tuple(logs), posts=built.posts))
    )
    if one is None or more is None:
        assert one is more
        return
    assert more >= one


@given(st.lists(st.floats(-3, 3), min_size=2, max_size=8), st.floats(0, 1))
def test_a_table_leads_back_to_the_reading_it_came_from(offsets: list[float], share: float) -> None:
    places = 20.0 + 8.0 * np.arange(len(offsets))
    pairs = [
        [f"{stage!r} ft", f"{offset!r} ft"] for stage, offset in zip(places.tolist(), offsets, strict=True)
    ]
    transfer = Transfer.model_validate({"to": ["C-07"], "table": pairs})
    own = way(transfer=[transfer])
    stage = np.array([places[0] + share * (places[-1] - places[0])]) * FOOT
    np.testing.assert_allclose(own.stage(own.level(stage)), stage, atol=1e-9)


def test_the_law_of_a_longer_drill() -> None:
    assert clock(install=hours(9)).timeline("likely").start.moment == (
        clock(install=hours(7.5)).timeline("likely").start.less(1.5 * HOUR, NOW).moment
    )
