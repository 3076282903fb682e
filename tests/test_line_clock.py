"""The clock of a whole line: stored series, several gauges, walls and panels, limits, and what is missing."""

from __future__ import annotations

import copy
from datetime import UTC, datetime
from typing import Any

import numpy as np
import pytest

from loads.instant import Instant
from loads.line_barrier import BarrierNews
from loads.line_clock import LineClock, line_clock
from loads.line_series import MOST_KEPT, forecast_in, observed_in, stored_forecast, stored_observation
from loads.problems import ScenarioError
from loads.records.series import DataAge, StoredForecast, StoredObservation
from loads.scenario_file import Document, read_file, scenario_of
from loads.series.series import Issue
from tests.clock_cases import FOOT, NOW, rules, series
from tests.lines import SCENARIOS

LANDING = next(path for path in SCENARIOS if path.stem == "mill-landing")
POINTS = [["2031-04-02T12:00:00Z", "22.4 ft"], ["2031-04-02T18:00:00Z", "23.1 ft"]]


@pytest.fixture
def document() -> Document:
    return copy.deepcopy(read_file(LANDING))


def told(document: Document, **more: Any) -> LineClock:
    return line_clock(scenario_of(document), more.pop("now", NOW), **more)


def barrier(line: LineClock, name: str) -> BarrierNews:
    return next(one for one in line.barriers if one.record.id == name)


def problems(document: Document) -> list[str]:
    with pytest.raises(ScenarioError) as refusal:
        scenario_of(document)
    return [str(problem) for problem in refusal.value.problems]


def test_stored_series_come_back_as_they_were_read(document: Document) -> None:
    issue = Issue(likely=series())
    document["forecast"] = [stored_forecast(issue, "G1", "pasted", NOW)]
    document["observed"] = [stored_observation(series([21.0, 21.4]), "G1", "pasted")]
    scenario = scenario_of(document)
    kept = forecast_in(scenario, scenario.gauge[0]).newest
    assert kept.issued == np.datetime64("2031-04-02T14:10:00")
    assert np.array_equal(kept.likely.times, issue.likely.times)
    np.testing.assert_allclose(kept.likely.values, issue.likely.values, rtol=0, atol=1e-9)
    observed = observed_in(scenario, scenario.gauge[0])
    assert observed is not None
    np.testing.assert_allclose(observed.values, np.array([21.0, 21.4]) * FOOT, rtol=0, atol=1e-9)


def test_of_a_long_record_the_newest_readings_are_kept() -> None:
    long = series(np.linspace(10, 20, MOST_KEPT + 100).tolist(), hours=0.25)
    kept = stored_observation(long, "G1", "logger")["points"]
    assert len(kept) == MOST_KEPT
    assert kept[-1][1] == "20 ft"


def test_elevations_in_the_gauges_datum_become_readings(document: Document) -> None:
    likely = document["forecast"][1]
    likely["datum"] = "NAVD88"
    likely["likely"] = [[time, f"{float(level[:-3]) + 412.7:.2f} ft"] for time, level in likely["likely"]]
    street = barrier(told(document), "C-07").clock.timeline("likely")
    assert street.crest.stage / FOOT == pytest.approx(26.2)
    assert street.closed_by.moment == datetime(2031, 4, 3, 11, 8, 34, tzinfo=UTC)


def test_the_likely_crest_raised_by_a_foot_is_the_trace_one_foot_higher(document: Document) -> None:
    higher = barrier(told(document), "C-07").clock.timeline("likely, 1 ft higher")
    moved = barrier(told(document, raised=FOOT), "C-07").clock.timeline("likely")
    assert moved.call_out == higher.call_out
    assert moved.crest.head == pytest.approx(higher.crest.head)


def test_a_barrier_of_two_gauges_is_told_by_both_and_planned_by_the_first_water(document: Document) -> None:
    creek = copy.deepcopy(document["gauge"][0])
    creek |= {
        "id": "G2",
        "name": "Mill Creek",
        "number": "",
        "transfer": [{"to": ["C-07"], "offset": "1 ft"}],
    }
    document["gauge"].append(creek)
    document["forecast"].append({**document["forecast"][1], "gauge": "G2"})
    line = told(document)
    both = [one.clock.timeline("likely").closed_by for one in line.barriers if one.record.id == "C-07"]
    assert len(both) == 2
    moments = [one.moment for one in both]
    assert None not in moments
    (job,) = [job for crew in line.plan("likely").crews for job in crew.jobs if job.barrier == "C-07"]
    assert job.due == min(moment for moment in moments if moment is not None)


def test_a_panel_has_levels_but_no_call_out_and_no_job(document: Document) -> None:
    document["panel"] = [{"id": "P-1", "bottom": "437.4 ft", "width": "6 ft", "height": "5 ft"}]
    document["gauge"][0]["transfer"][0]["to"].append("P-1")
    line = told(document)
    panel = barrier(line, "P-1")
    likely = panel.clock.timeline("likely")
    assert likely.closed_by == barrier(line, "C-07").clock.timeline("likely").closed_by
    assert (likely.call_out.state, likely.start.state) == ("not known", "not known")
    assert panel.advice is None
    assert "P-1" not in {job.barrier for crew in line.plan("likely").crews for job in crew.jobs}


def test_limits_of_the_line_are_told_in_the_order_of_the_water(document: Document) -> None:
    document["closure"][2]["rated_level"] = "437.2 ft"
    document["closure"][0]["logs_in_place"] = 1
    order = next(one for one in told(document).orders if one.trace == "likely")
    first = [(one.limit.barrier, one.limit.label) for one in order.reached[:2]]
    assert first == [("C-09", "rated level"), ("C-07", "top of the logs in place")]
    assert order.first is not None
    assert order.first.instant.state == "at"
    assert "no rated level has been entered for C-08" in order.sentences


def test_a_closure_that_no_gauge_leads_to_is_named(document: Document) -> None:
    document["gauge"][0]["transfer"].pop()
    line = told(document)
    assert line.sentences == ("no gauge leads to C-09, so nothing is told of it",)


def test_a_gauge_without_a_forecast_gives_a_chain_and_no_times(document: Document) -> None:
    del document["forecast"]
    line = told(document)
    street = barrier(line, "C-07")
    assert street.states == ("last reading",)
    assert street.chain is not None
    assert street.chain.head[0] / FOOT == pytest.approx(22.10 + 412.70 - 0.60 - 437.40)
    assert street.clock.timelines == ()
    assert line.off == ("gauge G1 has no forecast",)
    assert line.plan("likely").not_known


def test_what_logs_ask_for_follows_the_allowances(document: Document) -> None:
    # 438.30 + 1.0 + 1.0 = 440.30 ft; six logs of 0.5 ft stand to 440.40 ft, five to 439.90 ft
    def advice(logs: int, reading: str = "22.10 ft") -> str:
        document["closure"][0]["logs_in_place"] = logs
        document["observed"][0]["points"][-1][1] = reading
        found = barrier(told(document), "C-07").advice
        assert found is not None
        return found.kind

    assert advice(6) == "no more logs for this forecast"
    assert advice(5) == "add logs"
    # 439.9 ft at the closure is 27.80 ft at the gauge
    assert advice(5, "27.85 ft") == "back up, withdraw or decide"


def test_times_across_a_gap_longer_than_entered_are_not_known(document: Document) -> None:
    document["data_age"]["longest_gap"] = "5 h"
    found: Instant = barrier(told(document), "C-07").clock.timeline("likely").closed_by
    assert (found.state, found.moment) == ("not known", None)


def test_ages_are_those_that_were_entered(document: Document) -> None:
    now = datetime(2031, 4, 2, 20, 11, tzinfo=UTC)
    age = told(document, now=now).gauges[0].forecast_age
    assert age is not None
    assert (age.label, age.advice) == ("amber", True)
    document["data_age"]["forecast_stale"] = "6 h"
    age = told(document, now=now).gauges[0].forecast_age
    assert age is not None
    assert (age.label, age.advice) == ("stale", False)
    document["data_age"]["forecast_amber"] = "7 h"
    with pytest.raises(ScenarioError, match="stale not below amber"):
        told(document, now=now)


def test_a_forecast_alone_is_looked_at_for_traps(document: Document) -> None:
    del document["observed"]
    document["forecast"][1]["likely"][-1][1] = "36 ft"
    names = {trap.name for trap in told(document).gauges[0].traps}
    assert names == {"history", "jump"}


def test_a_scenario_as_a_whole_is_checked(document: Document) -> None:
    document["forecast"][0]["gauge"] = "G7"
    document["forecast"].append({**document["forecast"][1]})
    document["observed"].append(document["observed"][0])
    document["closure"][0]["clock"]["crew"] = "B"
    document["gauge"][0]["transfer"][1]["to"] = ["C-10"]
    assert problems(document) == [
        'gauge[G1].transfer[1].to is "C-10"; no barrier has that id; did you mean "C-09"?',
        'closure[C-07].clock.crew is "B"; no crew has that id',
        'forecast[0].gauge is "G7"; no gauge has that id; did you mean "G1"?',
        'observed is "G1"; 2 lists of readings are of this gauge; one is enough',
        "forecast.issued is 2031-04-02 09:10:00-05:00; 2 forecasts for gauge G1 have it",
    ]


def test_issues_without_their_time_cannot_be_told_apart(document: Document) -> None:
    del document["forecast"][1]["issued"]
    assert problems(document) == [
        "forecast.issued is missing; the 2 issues for gauge G1 are told apart by it"
    ]


@pytest.mark.parametrize(
    ("changes", "rule"),
    [
        ({"low": POINTS}, "high  is missing; low and high go together"),
        ({"minus": "1 ft"}, "plus  is missing; minus and plus go together"),
        ({"likely": POINTS[::-1]}, "likely[1] 2031-04-02T12:00:00+00:00 it must be later"),
        ({"low": POINTS[:1], "high": POINTS}, "low given it must have the times of the likely trace"),
        (
            {"low": [[time, "23 ft"] for time, _ in POINTS], "high": POINTS},
            'likely[0] "22.4 ft" it must lie between low and high of its time',
        ),
        ({"low": POINTS, "high": POINTS, "minus": "1 ft", "plus": "1 ft"}, 'minus "1 ft" would not be used'),
        ({"likely": []}, "likely  has no reading; it needs at least one"),
        ({"issued": "2031-04-02T09:10:00"}, "issued needs a time zone"),
        ({"likely": [["2031-04-02T12:00:00Z", "22.4"]]}, "likely.0.1 it needs a unit"),
    ],
    ids=[
        "half a range",
        "half a band",
        "backward",
        "other times",
        "out of order",
        "both",
        "empty",
        "zone",
        "unit",
    ],
)
def test_a_stored_forecast_is_whole(changes: dict[str, Any], rule: str) -> None:
    given = {"gauge": "G1", "likely": POINTS, **changes}
    assert any(found.startswith(rule) for found in rules(StoredForecast, given))


def test_entered_and_banded_ranges_are_kept(document: Document) -> None:
    low = [[time, f"{float(level[:-3]) - 1:.1f} ft"] for time, level in document["forecast"][1]["likely"]]
    high = [[time, f"{float(level[:-3]) + 2:.1f} ft"] for time, level in document["forecast"][1]["likely"]]
    banded = told(document).gauges[0].traces
    assert (banded["likely"].values - banded["low"].values)[-1] / FOOT == pytest.approx(0.8)
    for name in ("minus", "plus"):
        del document["forecast"][1][name]
    document["forecast"][1] |= {"low": low, "high": high}
    entered = told(document).gauges[0].traces
    assert (entered["high"].values - entered["likely"].values)[-1] / FOOT == pytest.approx(2)
    scenario = scenario_of(document)
    again = stored_forecast(forecast_in(scenario, scenario.gauge[0]).newest, "G1", "again")
    assert [level for _, level in again["low"]] == [f"{float(level[:-3]):g} ft" for _, level in low]


def test_readings_in_order_and_ages_above_nothing() -> None:
    assert rules(StoredObservation, {"gauge": "G1", "points": POINTS[::-1]})
    assert rules(DataAge, {"forecast_stale": "0 h"})
