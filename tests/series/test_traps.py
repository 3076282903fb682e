"""Traps in readings and forecasts, and the age of data."""

from __future__ import annotations

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.ages import Thresholds, age_of
from loads.series.interpolate import level_at
from loads.series.read import read_series
from loads.series.traps import (
    GaugeFacts,
    below_floor,
    fast_jump,
    flat_while_rising,
    near_ceiling,
    outside_history,
    traps_of,
    traps_of_level,
    wrong_unit,
)
from tests.series.files import FOOT, SHEF, trace

RISING = trace("2031-04-02T00:00", 360, [20, 22, 24, 26, 27], kind="forecast", issued="2031-04-02T00:00")


def minutes(count: float) -> np.timedelta64:
    return np.timedelta64(round(60 * count), "s")


@pytest.mark.parametrize(
    ("feet", "spoken"),
    [
        (37.9, None),
        (37.99, None),
        (38.0, "is within"),
        (38.4, "is within"),
        (38.5, "is within"),
        (38.6, "is above"),
    ],
)
def test_near_the_ceiling_no_crest_is_inferred(feet: float, spoken: str | None) -> None:
    trap = near_ceiling(feet * FOOT, 38.5 * FOOT)
    if spoken is None:
        assert trap is None
        return
    assert trap is not None
    assert "do not infer a crest" in str(trap)
    assert spoken in str(trap)
    assert f"{feet:.2f} ft" in str(trap)
    assert trap.figures["ceiling"].value == 38.5 * FOOT


def test_a_flat_trace_while_the_forecast_rises() -> None:
    flat = trace("2031-04-02T03:00", 15, [21.0] * 13)
    trap = flat_while_rising(flat, RISING)
    assert trap is not None
    assert trap.figures["risen"].value == pytest.approx(2 / 3 * FOOT)
    assert trap.figures["spell"].value == 7200
    assert "2 h" in str(trap)


@pytest.mark.parametrize(
    "observed",
    [
        trace("2031-04-02T04:15", 15, [21.0] * 8),  # less than two hours
        trace("2031-04-02T03:00", 15, [21.0 + 0.01 * i for i in range(13)]),  # moving
        trace("2031-04-02T03:00", 60, [21.0, 21.2, 21.0, 21.0]),  # moved within the two hours
    ],
)
def test_no_caution_where_the_trace_moves_or_is_short(observed: object) -> None:
    assert flat_while_rising(observed, RISING) is None  # type: ignore[arg-type]


def test_no_caution_where_the_forecast_is_flat_or_elsewhere() -> None:
    flat = trace("2031-04-02T03:00", 15, [21.0] * 13)
    assert (
        flat_while_rising(flat, trace("2031-04-02T00:00", 360, [21.0, 21.0, 21.05], kind="forecast")) is None
    )
    falling = trace("2031-04-02T00:00", 360, [23.0, 21.0, 20.0], kind="forecast")
    assert flat_while_rising(flat, falling) is None
    over = trace("2031-04-01T00:00", 360, [20.0, 22.0, 24.0], kind="forecast")
    assert flat_while_rising(flat, over) is None


def test_a_flicker_of_the_last_digit_is_still_flat_and_a_later_forecast_counts() -> None:
    flicker = trace("2031-04-02T03:00", 15, [21.0, 21.01] * 6 + [21.0])
    later = trace("2031-04-02T09:00", 60, [21, 22, 23, 24], kind="forecast")
    assert flat_while_rising(flicker, RISING) is not None
    assert flat_while_rising(flicker, later) is not None


def test_metres_typed_into_a_field_of_feet() -> None:
    history = GaugeFacts(lowest=10 * FOOT, highest=45 * FOOT)
    names = {trap.name: trap for trap in traps_of_level(3.0 * FOOT, history, unit="ft")}
    assert set(names) == {"history", "unit"}
    assert names["unit"].figures["other"].value == pytest.approx(3.0)
    assert "Were metres typed into a field of feet?" in str(names["unit"])
    assert "3.00 ft" in str(names["history"])


def test_feet_typed_into_a_field_of_metres() -> None:
    trap = wrong_unit(22.1, 10 * FOOT, 45 * FOOT, unit="m")
    assert trap is not None
    assert trap.figures["other"].value == pytest.approx(22.1 * FOOT)
    assert "Were feet typed into a field of metres?" in str(trap)
    assert wrong_unit(22.1, 10 * FOOT, 45 * FOOT, unit="ft") is None
    assert wrong_unit(22.1 * FOOT, 10 * FOOT, 45 * FOOT) is None
    assert wrong_unit(500.0, 10 * FOOT, 45 * FOOT) is None


def test_outside_the_history_and_below_the_floor() -> None:
    assert outside_history(12 * FOOT, 10 * FOOT, 45 * FOOT) is None
    low, high = outside_history(-3.0, 3.0, 13.0), outside_history(14.0, 3.0, 13.0)
    assert low is not None
    assert high is not None
    assert "below the lowest" in str(low)
    assert "above the highest" in str(high)
    assert below_floor(1.0, 1.0) is None
    assert below_floor(0.9, 1.0) is not None


def test_a_jump_faster_than_the_entered_rate() -> None:
    rebased = trace("2031-04-02T00:00", 60, [13.0, 13.5, 17.25, 17.5])
    fastest = 1.0 * FOOT / 3600
    trap = fast_jump(rebased, fastest)
    assert trap is not None
    assert trap.figures["change"].value == pytest.approx(3.75 * FOOT)
    assert trap.figures["rate"].value == pytest.approx(3.75 * FOOT / 3600)
    assert "rises by 1.14 m (3.75 ft) in 1 h up to 2031-04-02 02:00:00 UTC" in str(trap)
    assert "steps as fast: 1" in str(trap)
    assert fast_jump(rebased, 3.76 * FOOT / 3600) is None
    assert fast_jump(trace("2031-04-02T00:00", 60, [13.0]), fastest) is None
    fall = fast_jump(trace("2031-04-02T00:00", 60, [13.0, 9.0]), fastest)
    assert fall is not None
    assert "falls by" in str(fall)


def test_all_traps_of_a_trace_and_only_of_facts_entered() -> None:
    stuck = trace("2031-04-02T03:00", 15, [30.0] * 13)
    facts = GaugeFacts(floor=0.0, ceiling=30.4 * FOOT, lowest=5 * FOOT, highest=26.5 * FOOT, fastest=1e-6)
    assert [trap.name for trap in traps_of(stuck, facts, RISING)] == [
        "ceiling",
        "history",
        "flat",
        "history",
        "jump",
    ]
    assert traps_of(stuck, GaugeFacts()) == ()


@pytest.mark.parametrize(
    ("kind", "age", "label", "advice"),
    [
        ("observed", 60, "current", True),
        ("observed", 61, "amber", True),
        ("observed", 180, "amber", True),
        ("observed", 181, "stale", False),
        ("observed", -4, "current", True),
        ("observed", -6, "ahead", False),
        ("forecast", 6 * 60, "current", True),
        ("forecast", 6 * 60 + 1, "amber", True),
        ("forecast", 24 * 60, "amber", True),
        ("forecast", 24 * 60 + 1, "stale", False),
    ],
)
def test_ages(kind: str, age: float, label: str, advice: bool) -> None:
    start = np.datetime64("2031-04-02T00:00", "s")
    series = trace("2031-04-02T00:00", 60, [20.0]) if kind == "observed" else RISING
    found = age_of(series, start + minutes(age))
    assert (found.label, found.advice, found.seconds) == (label, advice, age * 60)
    assert bool(found.sentence) == (label != "current")


def test_a_forecast_25_hours_old_turns_advice_off_and_leaves_arithmetic_on() -> None:
    now = RISING.times[0] + minutes(25 * 60)
    age = age_of(RISING, now)
    assert (age.label, age.advice) == ("stale", False)
    assert "The forecast is 25 h old, more than 24 h: advice is off" in age.sentence
    assert level_at(RISING, np.array([RISING.times[1]]))[0] == pytest.approx(22 * FOOT)


def test_thresholds_are_edited_and_held_to_order() -> None:
    patient = Thresholds(forecast_amber=30 * 3600, forecast_stale=48 * 3600)
    assert age_of(RISING, RISING.times[0] + minutes(25 * 60), patient).label == "current"
    for amber, stale in ((0.0, 1.0), (2.0, 1.0), (float("nan"), 1.0)):
        with pytest.raises(ScenarioError, match=r"thresholds\.observation"):
            Thresholds(observation_amber=amber, observation_stale=stale)


def test_a_forecast_without_time_of_issue_gives_no_advice() -> None:
    forecast = read_series(SHEF)[-1]
    age = age_of(forecast, forecast.times[0])
    assert (age.label, age.seconds, age.advice) == ("unknown", None, False)
