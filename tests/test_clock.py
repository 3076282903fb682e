"""The clock: every time it tells, and the plain state where it tells none."""

from __future__ import annotations

from datetime import UTC, datetime, timedelta
from zoneinfo import ZoneInfo

import numpy as np
import pytest

from loads.clock import LeadTimes
from loads.crossing import HIGHER, anchored, limit_orders, traces_of, with_crest
from loads.install_time import InstallTime
from loads.instant import Instant, below_for_good, in_order, instant_at, reached, unknown
from loads.log_advice import log_advice
from loads.moments import duration_text, local_text
from loads.series.series import Issue
from tests.clock_cases import CENTRAL, FOOT, HOUR, NOW, clock, limit, series, way


def utc(text: str) -> datetime:
    return datetime.fromisoformat(text).replace(tzinfo=UTC)


def feet(*levels: float) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    return np.array(levels) * FOOT


def test_every_time_of_a_whole_closure() -> None:
    """Straight lines between readings: 24.7 at 06:00, 25.4 at 12:00, 25.9 at 18:00, 26.2 at 00:00."""
    found = clock(
        wave_allowance=0.5 * FOOT,
        add_logs_until=437.80 * FOOT,
        removal_stage=26.1 * FOOT,
        limits=(limit("rated level", 443.40), limit("first-limit level", 438.00)),
        lead=LeadTimes(mobilisation=0.5 * HOUR, travel=HOUR, tell_owner_ahead=3 * HOUR),
    )
    likely = found.timeline("likely")
    assert found.sill_stage / FOOT == pytest.approx(25.30)
    assert likely.water_at_sill.moment == utc("2031-04-03T11:08:34")
    assert likely.closed_by.moment == utc("2031-04-03T06:51:25")
    assert likely.start.moment == utc("2031-04-02T23:21:25")
    assert likely.call_out.moment == utc("2031-04-02T21:51:25")
    assert likely.tell_owner is not None
    assert likely.tell_owner.moment == utc("2031-04-02T20:21:25")
    assert likely.last_logs is not None
    assert likely.last_logs.moment == utc("2031-04-03T15:36:00")
    rated, first = likely.limits
    assert (rated.limit.label, rated.instant.state) == ("rated level", "not reached in this forecast")
    assert first.instant.moment == utc("2031-04-03T18:00:00")
    assert likely.removal is not None
    assert likely.removal.moment == utc("2031-04-04T03:00:00")
    assert likely.crest.moment == utc("2031-04-04T00:00:00")
    assert not likely.crest.at_the_end
    assert likely.sentences == ()


@pytest.mark.parametrize("crest", [25.30, 25.3 + 1e-13, 25.3 - 1e-13])
def test_a_crest_just_at_the_sill_reaches_it_whatever_the_rounding(crest: float) -> None:
    found = clock([24.3, crest, 24.0]).timeline("likely").closed_by
    assert (found.state, found.moment) == ("at", utc("2031-04-02T18:00:00"))


def test_past_and_not_reached_are_states_and_never_times() -> None:
    low = clock(sill=445.0).timeline("likely")
    for instant in (low.water_at_sill, low.closed_by, low.start, low.call_out):
        assert (instant.state, instant.moment) == ("not reached in this forecast", None)
    flooded = clock(sill=430.0).timeline("likely")
    for instant in (flooded.water_at_sill, flooded.closed_by, flooded.start, flooded.call_out):
        assert (instant.state, instant.moment) == ("already past", None)
    late = clock(now=utc("2031-04-03T04:00:00")).timeline("likely")
    assert (late.start.state, late.start.moment) == ("already past", utc("2031-04-03T03:38:34"))
    assert late.call_out.state == "already past"
    assert late.closed_by.state == "at"


def test_a_series_that_begins_later_than_now_and_high_tells_no_time() -> None:
    found = clock(sill=430.0, now=utc("2031-04-02T06:00:00")).timeline("likely")
    assert (found.closed_by.state, found.closed_by.moment) == ("not known", None)
    assert found.closed_by.due == utc("2031-04-02T06:00:00")
    assert found.closed_by.reason == "the series begins later than now, and at or above it"


def test_the_last_observed_value_stands_in_front_of_the_forecast() -> None:
    observed = series([21.0, 21.4], start="2031-04-02T00:00", hours=6.0)
    traces = traces_of(Issue(likely=series()), observed=observed)
    (found,) = reached(traces["likely"], feet(22.0), utc("2031-04-02T08:00:00"))
    assert found.moment == utc("2031-04-02T09:36:00")
    assert traces[HIGHER].values[0] == pytest.approx(21.4 * FOOT)
    assert traces[HIGHER].values[1] == pytest.approx(23.4 * FOOT)
    ahead = series([21.0], start="2031-04-05T00:00")
    assert anchored(traces["likely"], ahead) is traces["likely"]


def test_a_gap_where_the_sill_is_reached_is_not_known() -> None:
    trace = series([24.0, 24.7, 25.9], times=["2031-04-03T00:00", "2031-04-03T06:00", "2031-04-04T00:00"])
    assert clock(trace=trace).timeline("likely").closed_by.state == "at"
    found = clock(trace=trace, longest_gap=12 * HOUR).timeline("likely")
    assert (found.closed_by.state, found.closed_by.moment) == ("not known", None)
    assert found.closed_by.earliest == utc("2031-04-03T06:00:00")
    assert found.start.earliest == utc("2031-04-02T22:30:00")
    assert found.call_out.earliest == utc("2031-04-02T21:00:00")


def test_missing_links_leave_every_time_unknown() -> None:
    found = clock(own_way=way(zero=None))
    assert np.isnan(found.sill_stage)
    assert found.sentences == ("nobody entered the zero of gauge G1",)
    likely = found.timeline("likely")
    assert {likely.closed_by.state, likely.start.state, likely.call_out.state} == {"not known"}
    assert np.isnan(likely.crest.head)
    assert found.call_out_earlier() is None
    with pytest.raises(KeyError):
        found.timeline("lowest")


def test_no_install_time_leaves_the_start_unknown_but_not_the_water() -> None:
    nothing = InstallTime(
        seconds=None, planned=None, drilled=None, sentence="nobody entered how long closing takes"
    )
    found = clock(install=nothing).timeline("likely")
    assert found.closed_by.state == "at"
    assert (found.start.state, found.start.reason) == ("not known", nothing.sentence)
    assert nothing.sentence in found.sentences
    dry = clock(install=nothing, sill=445.0).timeline("likely")
    assert dry.start.state == "not reached in this forecast"


def test_a_missing_limit_is_a_sentence_and_no_time() -> None:
    found = clock(
        limits=(
            limit("rated level", None),
            limit("first-limit level", None, note="C-07 has no limit entered"),
        )
    ).timeline("likely")
    assert found.limits == ()
    assert found.sentences[:2] == ("no rated level has been entered for C-07", "C-07 has no limit entered")
    assert (found.last_logs, found.removal) == (None, None)
    assert np.isnan(limit("rated level", None).stage)
    assert len(found.sentences) == 4


@pytest.mark.parametrize(
    ("readings", "state", "moment"),
    [
        ([26.0, 27.0, 25.0, 23.0], "at", "2031-04-03T03:00:00"),
        ([26.0, 27.0, 23.0, 25.0, 23.0], "at", "2031-04-03T09:00:00"),
        ([26.0, 27.0, 23.0, 23.5], "not known", None),
        ([26.0, 27.0, 23.0, 23.0], "at", "2031-04-02T22:30:00"),
        ([26.0, 27.0, 25.0], "not reached in this forecast", None),
        ([23.0, 22.0, 21.0], "already past", None),
        ([22.0, 23.0], "not known", None),
        ([24.0, 23.0], "already past", "2031-04-02T12:00:00"),
    ],
    ids=[
        "falls",
        "second rise",
        "ends rising",
        "flat end",
        "above at the end",
        "below",
        "below rising",
        "on it",
    ],
)
def test_removal_waits_for_the_last_fall(readings: list[float], state: str, moment: str | None) -> None:
    found = below_for_good(series(readings), 24.0 * FOOT, NOW)
    assert found.state == state
    assert found.moment == (utc(moment) if moment else None)


def test_removal_in_a_gap_is_not_known() -> None:
    found = below_for_good(series([26.0, 23.0, 22.0]), 24.0 * FOOT, NOW, longest_gap=HOUR)
    assert (found.state, found.reason) == ("not known", "it is passed where the series has a gap")


@pytest.mark.parametrize(
    ("crossing", "shown", "start_shown"),
    [
        ("2031-03-09T10:00", "05:00 CDT Sun 9 Mar 2031", "20:30 CST Sat 8 Mar 2031"),
        ("2031-11-02T10:00", "04:00 CST Sun 2 Nov 2031", "21:30 CDT Sat 1 Nov 2031"),
    ],
    ids=["an hour lost", "an hour twice"],
)
def test_work_takes_as_long_on_the_night_the_clocks_change(
    crossing: str, shown: str, start_shown: str
) -> None:
    """Clocks show 8 h 30 min from 20:30 to 05:00 in spring, 6 h 30 min from 21:30 to 04:00 in autumn."""
    at = np.datetime64(crossing, "s")
    trace = series([24.3, 26.3], times=[str(at - 86400), str(at + 86400)])
    found = clock(trace=trace, now=utc("2031-03-01T00:00:00")).timeline("likely")
    assert found.closed_by.moment is not None
    assert found.start.moment is not None
    assert found.closed_by.moment - found.start.moment == timedelta(hours=7.5)
    assert local_text(found.closed_by.moment, CENTRAL) == shown
    assert local_text(found.start.moment, CENTRAL) == start_shown


def test_both_passes_of_the_hour_told_twice_have_their_own_names() -> None:
    texts = [local_text(utc(f"2031-11-02T{hour:02d}:30:00"), CENTRAL) for hour in (6, 7)]
    assert texts == ["01:30 CDT Sun 2 Nov 2031", "01:30 CST Sun 2 Nov 2031"]
    assert local_text(NOW, ZoneInfo("Asia/Kolkata")) == "19:40 IST Wed 2 Apr 2031"


def test_low_likely_and_high_stand_beside_one_foot_more() -> None:
    issue = Issue.banded(series(), minus=0.2, plus=0.6)
    traces = traces_of(issue)
    assert list(traces) == ["low", "likely", "high", HIGHER]
    now = utc("2031-04-02T12:00:00")
    moments = [reached(trace, feet(25.3), now)[0].due for trace in traces.values()]
    likely = moments[1]
    assert likely == utc("2031-04-03T11:08:34")
    assert all(moment is not None for moment in moments)
    assert moments[0] is not None
    assert moments[2] is not None
    assert moments[2] < likely < moments[0]


def test_the_crest_can_be_moved() -> None:
    moved = with_crest(series(), 27.2 * FOOT)
    assert moved.values.max() / FOOT == pytest.approx(27.2)
    assert reached(moved, feet(25.3), NOW) == reached(series().shifted(FOOT, ""), feet(25.3), NOW)


def test_which_limit_is_reached_first() -> None:
    limits = [
        limit("rated level", 443.40),
        limit("first-limit level", 437.80),
        limit("freeboard", 437.40),
        limit("act one foot below", 430.0),
        limit("engineer's level", None),
    ]
    (likely, higher) = limit_orders(
        limits, {"likely": {"G1": series()}, HIGHER: {"G1": series().shifted(FOOT, "")}}, NOW
    )
    names = ["act one foot below", "freeboard", "first-limit level", "rated level"]
    assert [one.limit.label for one in likely.reached] == names
    assert likely.first is not None
    assert (likely.first.instant.state, likely.first.instant.moment) == ("already past", None)
    assert likely.reached[1].instant.moment == utc("2031-04-03T11:08:34")
    assert higher.reached[1].instant.moment == utc("2031-04-03T03:00:00")
    assert likely.sentences == ("no engineer's level has been entered for C-07",)
    assert limit_orders(limits[:1], {"likely": {"G1": series()}}, NOW)[0].first is None
    (other,) = limit_orders(limits[:1], {"likely": {"G2": series()}}, NOW)
    assert other.reached == ()
    assert other.sentences == ("there is no series of gauge G1, so nothing is told for C-07, rated level",)
    (dark,) = limit_orders([limit("rated level", 443.4, zero=None)], {"likely": {"G1": series()}}, NOW)
    assert [one.instant.state for one in dark.not_known] == ["not known"]


def test_instants_in_order() -> None:
    instants = [
        Instant(state="not reached in this forecast"),
        unknown("no table"),
        instant_at(utc("2031-04-03T00:00:00"), NOW),
        unknown("gap", utc("2031-04-02T20:00:00")),
        Instant(state="already past"),
    ]
    assert in_order(instants) == [4, 3, 2, 1, 0]


@pytest.mark.parametrize(
    ("level", "until", "off", "kind"),
    [
        (437.0, 439.9, "", "add logs"),
        (439.9, 439.9, "", "back up, withdraw or decide"),
        (440.1, 439.9, "", "back up, withdraw or decide"),
        (437.0, None, "", "not known"),
        (float("nan"), 439.9, "", "not known"),
        (440.1, 439.9, "the forecast is 25 h old", "advice is off"),
    ],
)
def test_above_the_last_chance_to_add_the_advice_changes(
    level: float, until: float | None, off: str, kind: str
) -> None:
    found = log_advice(level=level, wanted_top=441.3, top=440.4, add_logs_until=until, off=off)
    assert found.kind == kind
    if off:
        assert found.sentence == off


def test_enough_logs_ask_for_nothing() -> None:
    found = log_advice(level=440.1, wanted_top=440.3, top=440.4, add_logs_until=439.9)
    assert found.kind == "no more logs for this forecast"


def test_durations_in_words() -> None:
    spans = [
        timedelta(0),
        timedelta(minutes=59, seconds=31),
        timedelta(hours=25),
        timedelta(hours=-2, minutes=1),
    ]
    assert [duration_text(span) for span in spans] == ["0 min", "1 h", "25 h", "1 h 59 min"]
