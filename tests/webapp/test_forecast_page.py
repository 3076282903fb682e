"""The forecast page in process: the clock it shows, the what-if, stale data, and series that are pasted."""

from __future__ import annotations

import copy
import html
import re
from datetime import datetime
from typing import Any

import pytest
from streamlit.testing.v1 import AppTest

from loads.line_clock import line_clock
from loads.moments import local_text
from loads.scenario_file import Document, read_file, scenario_of
from tests.lines import SCENARIOS
from tests.scenes import FOOT
from tests.webapp.test_apptest import app, messages, on, run, words
from webapp.answer_clock import zone_of
from webapp.forecast_markup import OFF
from webapp.forecast_parts import MOVED, NOW
from webapp.forecast_state import MOST_ISSUES, Pasted, Taken, take_series, with_series, without_forecasts

LANDING = next(path for path in SCENARIOS if path.stem == "mill-landing")
ISSUED = "2031-04-02T09:10:00-05:00"
NEWER = """time [CDT],stage forecast [ft]
2031-04-02 19:00,24.0
2031-04-03 07:00,26.0
2031-04-03 19:00,27.0
2031-04-04 07:00,26.5
"""
LATER = "2031-04-02T15:00:00-05:00"


@pytest.fixture
def document() -> Document:
    return read_file(LANDING)


def opened(document: Document, now: str = ISSUED) -> AppTest:
    test = on(app(document), "forecast")
    return told_for(test, now)


def told_for(test: AppTest, now: str) -> AppTest:
    return run(test.text_input(key=NOW).set_value(now))


def call_out(test: AppTest, closure: str, trace: str) -> str:
    """Call-out in the row of a trace of a closure, as the page shows it."""
    table = words(test).split(f">{closure} ")[1]
    row = next(row for row in table.split("<tr>") if f"<td>{trace}</td>" in row)
    cell = row.split("</td>")[3]
    return " ".join(html.unescape(re.sub(r"<[^>]+>", "", cell)).replace("\u00a0", " ").split())


def expected(document: Document, now: str, trace: str, raised: float = 0.0) -> str:
    scenario = scenario_of(document)
    line = line_clock(scenario, datetime.fromisoformat(now), raised)
    street = next(one for one in line.barriers if one.record.id == "C-07")
    moment = street.clock.timeline(trace).call_out.moment
    assert moment is not None
    return local_text(moment, zone_of(scenario))


def test_the_page_shows_the_clock_that_is_told(document: Document) -> None:
    test = opened(document)
    assert call_out(test, "C-07", "likely") == "21:09 CDT Wed 2 Apr 2031"
    assert call_out(test, "C-07", "high") == expected(document, ISSUED, "high")
    assert OFF not in words(test)
    assert "reading 26.20" in html.unescape(words(test))
    assert [item.proto.spec for item in test.get("plotly_chart")]


def test_a_crest_a_foot_higher_moves_the_call_out_as_the_engine_says(document: Document) -> None:
    test = opened(document)
    before = test.session_state["document"]
    test = run(test.number_input(key=f"{MOVED} ft").set_value(1.0))
    assert call_out(test, "C-07", "likely") == "13:00 CDT Wed 2 Apr 2031"
    assert call_out(test, "C-07", "likely") == expected(document, ISSUED, "likely", FOOT)
    assert any("what-if" in item.value for item in test.warning)
    assert test.session_state["document"] == before, "a what-if changes nothing that is kept"


def test_a_stale_forecast_turns_the_advice_off_and_leaves_the_times(document: Document) -> None:
    test = opened(document)
    assert "logs&#58; no more logs" in words(test)
    test = told_for(test, "2031-04-03T10:15:00-05:00")
    assert OFF in words(test)
    assert "logs&#58; advice is off" in words(test)
    assert call_out(test, "C-07", "likely").startswith("21:09 CDT Wed 2 Apr 2031")


def test_a_time_without_a_zone_is_refused(document: Document) -> None:
    test = opened(document, "2031-04-02T09:10")
    assert any("it needs a time zone" in message for message in messages(test))


def test_a_plan_without_a_gauge_is_told_what_it_needs() -> None:
    tannery = next(path for path in SCENARIOS if path.stem == "tannery-row")
    test = on(app(read_file(tannery)), "forecast")
    assert any("no gauge yet" in item.value for item in test.info)


def test_a_pasted_forecast_becomes_the_newest_and_is_kept_in_the_plan(document: Document) -> None:
    test = opened(document, LATER)
    test.text_area(key="series text").set_value(NEWER)
    test.text_input(key="series issued").set_value("2031-04-02T14:50:00-05:00")
    test = run(test.button(key="FormSubmitter:series-Take this series").click())
    assert messages(test) == []
    kept = test.session_state["document"]["forecast"]
    assert len(kept) == 3
    assert kept[-1]["likely"][0] == ["2031-04-02T19:00:00-05:00", "24 ft"]
    # 24.0 ft at 19:00 and 26.0 at 07:00: 25.30 ft after 12 h · 1.3/2 = 7 h 48 min, less 9 h
    assert call_out(test, "C-07", "likely").startswith("17:48 CDT Wed 2 Apr 2031")


def test_a_paste_without_a_zone_asks_for_it_and_changes_nothing(document: Document) -> None:
    test = opened(document, LATER)
    before = test.session_state["document"]
    test.text_area(key="series text").set_value(NEWER.replace(" [CDT]", ""))
    test = run(test.button(key="FormSubmitter:series-Take this series").click())
    assert any("zone" in message for message in messages(test))
    assert test.session_state["document"] == before
    test.text_input(key="series zone").set_value("America/Chicago")
    test.text_input(key="series issued").set_value("2031-04-02T14:50:00-05:00")
    test = run(test.button(key="FormSubmitter:series-Take this series").click())
    assert messages(test) == []
    assert call_out(test, "C-07", "likely").startswith("17:48 CDT Wed 2 Apr 2031")


def session(document: Document) -> dict[Any, Any]:
    return {"document": document}


def taken(document: Document, data: str, **more: Any) -> tuple[dict[Any, Any], Taken]:
    held = session(copy.deepcopy(document))
    found = take_series(held, Pasted(data=data.encode(), gauge="G1", source="pasted", **more))
    return held, found


def test_shef_for_a_station_of_another_name_is_taken_with_a_note(document: Document) -> None:
    text = ".E ZZZX1 20310402 Z DH12/DC203104021410/HGIFF/DIH06/22.4/23.1/23.9/24.7/25.4/25.9/26.2/26.0"
    del document["forecast"]
    held, found = taken(document, text)
    assert found.problems == ()
    assert any("ZZZX1" in note for note in found.notes)
    (kept,) = held["document"]["forecast"]
    assert kept["issued"] == "2031-04-02T14:10:00Z"
    assert expected(held["document"], ISSUED, "likely") == "21:09 CDT Wed 2 Apr 2031"


def test_observed_readings_replace_those_that_were_kept(document: Document) -> None:
    text = "time [UTC],observed stage [m]\n2031-04-02T13:00Z,6.80\n2031-04-02T14:00Z,6.90\n"
    held, found = taken(document, text)
    assert found.problems == ()
    (kept,) = held["document"]["observed"]
    assert [level for _, level in kept["points"]] == ["6.8 m", "6.9 m"]


def test_an_issue_of_the_same_time_replaces_the_one_that_was_kept(document: Document) -> None:
    held, _ = taken(document, NEWER, issued="2031-04-02T14:10:00Z")
    assert len(held["document"]["forecast"]) == 2
    for hour in range(MOST_ISSUES + 2):
        held, found = taken(held["document"], NEWER, issued=f"2031-04-03T{hour:02d}:00:00Z")
        assert found.problems == ()
    kept = held["document"]["forecast"]
    assert len(kept) == MOST_ISSUES
    assert kept[-1]["issued"] == "2031-04-03T13:00:00+00:00"
    without_forecasts(held, "G1")
    assert "forecast" not in held["document"]


@pytest.mark.parametrize(
    ("data", "more", "rule"),
    [
        ("", {}, "is empty"),
        ("Dear all, the river rises.", {}, "has no row of headings"),
        (NEWER, {"issued": "2031-04-02T14:50"}, "it needs a time zone"),
        (NEWER, {}, "told apart by it"),
        (NEWER, {"zone": "PST"}, "is not that of the heading"),
        (NEWER.replace("[ft]", "[ft above NGVD29]"), {"issued": LATER}, "neither that of gauge G1"),
        (NEWER.replace("27.0", "27,0"), {}, "is that a decimal comma?"),
    ],
    ids=["empty", "no table", "issued without zone", "no issue time", "other zone", "other datum", "comma"],
)
def test_what_cannot_be_read_with_certainty_changes_nothing(
    document: Document, data: str, more: dict[str, str], rule: str
) -> None:
    held, found = taken(document, data, **more)
    assert any(rule in str(problem) for problem in found.problems), found.problems
    assert held["document"] == document


def test_several_gauges_in_one_text_need_one_of_this_name(document: Document) -> None:
    text = (
        "gauge,time [UTC],stage observed [ft]\nA,2031-04-02 13:00,22.0\nB,2031-04-02 13:00,9.0\n"
        "A,2031-04-02 14:00,22.4\nB,2031-04-02 14:00,9.1\n"
    )
    _, found = taken(document, text)
    assert any("holds several gauges" in str(problem) for problem in found.problems)
    changed, _ = with_series(
        document, Pasted(data=text.replace("A,", "09999999,").encode(), gauge="G1", source="s")
    )
    assert [level for _, level in changed["observed"][0]["points"]] == ["22 ft", "22.4 ft"]


def press(test: AppTest, form: str, label: str = "Take these values") -> AppTest:
    (button,) = [
        one for one in test.button if one.key and one.key.startswith(f"FormSubmitter:{form}-{label}")
    ]
    return run(button.click())


def test_a_gauge_and_its_way_to_a_barrier_are_entered_in_forms() -> None:
    tannery = next(path for path in SCENARIOS if path.stem == "tannery-row")
    test = on(app(read_file(tannery)), "forecast")
    revision = test.session_state["revision"]
    for name, value in (("id", "G1"), ("datum", "NAVD88"), ("zero", "80 ft")):
        test.text_input(key=f"field {revision}.gauge.0.{name}").set_value(value)
    test.text_input(key=f"field {revision}.gauge.0.zero source").set_value("levelling")
    test = press(test, f"form {revision}.gauge.0")
    assert messages(test) == []
    (gauge,) = test.session_state["document"]["gauge"]
    assert gauge == {"id": "G1", "datum": "NAVD88", "zero": {"value": "80 ft", "source": "levelling"}}
    revision = test.session_state["revision"]
    test.text_area(key=f"field {revision}.gauge.0.transfer.0.to").set_value("P1\nP2")
    test.text_input(key=f"field {revision}.gauge.0.transfer.0.offset").set_value("-0.5 ft")
    test = press(test, f"form {revision}.gauge.0.transfer.0")
    assert messages(test) == []
    (way,) = test.session_state["document"]["gauge"][0]["transfer"]
    assert way == {"to": ["P1", "P2"], "offset": "-0.5 ft"}


def test_a_drill_entered_on_the_page_moves_the_call_out(document: Document) -> None:
    test = opened(document)
    revision = test.session_state["revision"]
    place = f"{revision}.closure.0.clock.drill.0"
    test.text_input(key=f"field {place}.date").set_value("2031-03-01")
    test.text_input(key=f"field {place}.install_time").set_value("8.5 h")
    test = press(test, f"form {place}")
    assert messages(test) == []
    assert call_out(test, "C-07", "likely") == "20:09 CDT Wed 2 Apr 2031"
    assert "the drill of 2031-03-01 makes it 1 h longer than planned" in html.unescape(words(test))


def test_a_crew_that_is_not_whole_is_refused_beside_its_form(document: Document) -> None:
    test = opened(document)
    before, revision = test.session_state["document"], test.session_state["revision"]
    test.text_input(key=f"field {revision}.crew.0.people").set_value("eight")
    test = press(test, f"form {revision}.crew.0")
    assert any("it must be a whole number" in message for message in messages(test))
    assert test.session_state["document"] == before
