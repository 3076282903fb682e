"""Series as records; issues of a forecast with their ranges."""

from __future__ import annotations

import dataclasses

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.issues import forecast_of
from loads.series.read import read_series
from loads.series.series import Forecast, Issue, Series
from tests.series.files import FOOT, SHEF, trace


def issue(hour: int, *feet: float) -> Issue:
    likely = trace("2031-04-02T18:00", 360, feet, kind="forecast", issued=f"2031-04-02T{hour:02d}:00")
    return Issue.banded(likely, minus=0.5 * FOOT, plus=1.0 * FOOT)


def test_bands_lie_around_the_likely_trace() -> None:
    made = issue(6, 23.0, 25.0)
    assert made.low is not None
    assert made.high is not None
    assert made.low.values == pytest.approx(np.array([22.5, 24.5]) * FOOT)
    assert made.high.values == pytest.approx(np.array([24.0, 26.0]) * FOOT)
    assert made.basis == "plus and minus bands as entered"
    with pytest.raises(ScenarioError, match=r"plus is .*zero or more"):
        Issue.banded(made.likely, minus=0.0, plus=-0.1)
    with pytest.raises(ScenarioError, match=r"minus is .*zero or more"):
        Issue.banded(made.likely, minus=float("nan"), plus=0.1)


def test_entered_ranges_must_be_in_order_at_every_time() -> None:
    likely, low = trace("2031-04-02T18:00", 60, [23, 25]), trace("2031-04-02T18:00", 60, [22, 25])
    made = Issue.entered(likely, low, trace("2031-04-02T18:00", 60, [23, 26]))
    assert made.basis == "low and high as entered"
    with pytest.raises(ScenarioError, match="out of order at 2031-04-02 19:00:00 UTC"):
        Issue.entered(likely, low, trace("2031-04-02T18:00", 60, [24, 24.9]))
    with pytest.raises(ScenarioError, match=r"forecast\.high must have the times"):
        Issue.entered(likely, low, trace("2031-04-02T18:00", 61, [24, 26]))


def test_issues_are_kept_in_order_of_issue() -> None:
    forecast = Forecast()
    for hour in (12, 6, 9):
        forecast = forecast.with_issue(issue(hour, 23.0, float(hour)))
    assert [str(one.issued)[11:13] for one in forecast.issues] == ["06", "09", "12"]
    assert forecast.newest.likely.values[-1] == pytest.approx(12 * FOOT)
    assert len(forecast.past) == 2


def test_an_issue_that_does_not_belong_is_refused() -> None:
    forecast = Forecast().with_issue(issue(6, 23.0))
    with pytest.raises(ScenarioError, match="here already"):
        forecast.with_issue(issue(6, 24.0))
    unstamped = Issue(likely=trace("2031-04-02T18:00", 60, [23.0], kind="forecast"))
    with pytest.raises(ScenarioError, match="only with their times of issue"):
        forecast.with_issue(unstamped)
    assert Forecast().with_issue(unstamped).newest is unstamped
    other = dataclasses.replace(issue(9, 23.0).likely, datum="NAVD88")
    with pytest.raises(ScenarioError, match=r"forecast\.datum is \"NAVD88\""):
        forecast.with_issue(Issue(likely=other))


TABLE = (
    "issued,time,low_ft,likely_ft,high_ft\n2031-04-02 20:00Z,2031-04-03 12:00Z,24.9,25.6,26.6\n"
    "2031-04-02 14:00Z,2031-04-03 12:00Z,24.5,25.4,27.0\n"
)


def test_issues_from_a_table_and_from_messages() -> None:
    forecast = forecast_of(read_series(TABLE.encode()))
    assert [str(one.issued) for one in forecast.issues] == ["2031-04-02T14:00:00", "2031-04-02T20:00:00"]
    newest = forecast.newest
    assert newest.low is not None
    assert newest.high is not None
    assert [float(s.values[0]) for s in (newest.low, newest.likely, newest.high)] == pytest.approx(
        [24.9 * FOOT, 25.6 * FOOT, 26.6 * FOOT]
    )
    only = forecast_of(read_series(SHEF))
    assert (len(only.issues), only.newest.low, only.newest.basis) == (1, None, "")
    assert forecast_of(read_series(SHEF)[:2]).issues == ()


def test_issues_that_are_not_whole_are_refused() -> None:
    with pytest.raises(ScenarioError, match="without its low trace"):
        forecast_of(read_series(TABLE.replace("low_ft", "flow_cfs").encode()))
    with pytest.raises(ScenarioError, match="two likely traces of one issue"):
        forecast_of([*read_series(SHEF), *read_series(SHEF)])
    with pytest.raises(ScenarioError, match="out of order"):
        forecast_of(read_series(TABLE.replace("24.9", "25.9").encode()))


@pytest.mark.parametrize(
    "change",
    [
        {"values": np.array([1.0, np.nan])},
        {"values": np.array([1.0, np.inf])},
        {"values": np.array([1.0])},
        {"values": np.array([]), "times": np.array([], dtype="datetime64[s]"), "utc_offsets": np.array([])},
        {"times": np.array(["2031-04-02", "2031-04-02"], dtype="datetime64[s]")},
        {"times": np.array(["2031-04-02", "NaT"], dtype="datetime64[s]")},
        {"times": np.array(["2031-04-02", "2031-04-03"], dtype="datetime64[D]")},
    ],
)
def test_no_series_holds_anything_but_finite_levels_at_rising_times(change: dict[str, object]) -> None:
    good = trace("2031-04-02T00:00", 60, [1.0, 2.0])
    with pytest.raises(ValueError, match=r"series has at least|finite|times"):
        dataclasses.replace(good, **change)  # type: ignore[arg-type]


def test_a_series_cannot_be_changed() -> None:
    series: Series = trace("2031-04-02T00:00", 60, [1.0, 2.0])
    with pytest.raises(ValueError, match="read-only"):
        series.values[0] = 5.0
