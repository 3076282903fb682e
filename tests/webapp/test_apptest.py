"""Every page run in process, with every example, in both unit systems; what a level typed does to them."""

from __future__ import annotations

import html
import re
from pathlib import Path
from typing import Protocol

import pytest
from streamlit.testing.v1 import AppTest

from loads.scenario_file import BARRIER_KEYS, Document, parse_document, read_file
from tests.hand_calculation import number_of
from tests.lines import SCENARIOS
from tests.webapp.driving import ROOT
from webapp import state
from webapp.display import NO_BREAK, System
from webapp.links import decode_document, encode_document
from webapp.scenario_files import example_files

MAIN = ROOT / "webapp" / "main.py"
PAGES = ("flood_line", "barrier", "forecast", "inputs", "sheets", "method")
US_UNITS = re.compile(rf"[\d.]{NO_BREAK}(ft|lb|kip|psf|pcf|kip·ft|lb·ft)\b")
SI_UNITS = re.compile(rf"[\d.]{NO_BREAK}(m|kN|kPa|kN·m)\b")


class Runnable(Protocol):
    """The app, or an element of it."""

    def run(self) -> AppTest: ...


def app(document: Document) -> AppTest:
    """The app opened by the frozen link of a document."""
    test = AppTest.from_file(MAIN, default_timeout=30)
    test.query_params["s"] = encode_document(document)
    return run(test)


def run(what: Runnable) -> AppTest:
    """Run the app, or an element of it with what was just put into it."""
    test = what.run()
    assert not test.exception
    return test


def on(test: AppTest, page: str) -> AppTest:
    return run(test.switch_page(f"views/{page}.py"))


def words(test: AppTest) -> str:
    return "\n".join(item.value for item in test.markdown)


def messages(test: AppTest) -> list[str]:
    return [html.unescape(item.value) for item in test.error]


def show_in(test: AppTest, system: System) -> AppTest:
    return run(test.segmented_control(key="system").set_value(system))


def typed(test: AppTest, side: str, text: str) -> AppTest:
    return run(test.text_input(key=state.LEVEL_FIELDS[side]).set_value(text))


def figure(test: AppTest, barrier: str, unit: str) -> float:
    """First figure in a unit, in a barrier's row of the flood line."""
    row = next(row for row in words(test).split("<tr>") if f">{barrier}<" in row or f">{barrier} " in row)
    found = re.search(rf"(−?[\d.\u202f]+){NO_BREAK}{re.escape(unit)}<", row)
    assert found is not None, row
    return number_of(found[1])


@pytest.mark.parametrize("path", SCENARIOS, ids=lambda path: path.stem)
def test_every_page_runs_in_both_unit_systems(path: Path) -> None:
    document = read_file(path)
    test = app(document)
    for system, shown, other in (("US", US_UNITS, SI_UNITS), ("SI", SI_UNITS, US_UNITS)):
        for page in PAGES:
            on(test, page)
            if page in ("flood_line", "barrier"):
                show_in(test, system)  # type: ignore[arg-type]
                text = words(test)
                assert shown.search(text)
                assert not other.search(text), other.search(text)
            assert messages(test) == []
            if page != "method":
                assert str(document["title"]) in words(test)
    assert decode_document(test.query_params["s"]) == decode_document(encode_document(document))


@pytest.mark.parametrize("path", SCENARIOS, ids=lambda path: path.stem)
def test_every_barrier_has_its_page(path: Path) -> None:
    document = read_file(path)
    test = on(app(document), "barrier")
    for barrier in (item for kind in BARRIER_KEYS for item in document.get(kind, ())):
        run(test.selectbox(key="barrier").set_value(barrier["id"]))
        assert messages(test) == []
        assert "line of action" in words(test)
        run(test.toggle(key="read off").set_value(True))
        assert len(test.get("plotly_chart")) == 1
        run(test.toggle(key="read off").set_value(False))


def test_a_level_typed_changes_force_verdict_and_address() -> None:
    test = app(read_file(example_files()[0]))
    assert figure(test, "P1", "kip") == 15.3
    typed(test, "flood_side", "103.2 ft")
    # 62.4 · 5²/2 · 12 = 9360 lb
    assert figure(test, "P1", "lb") == 9360
    document = decode_document(test.query_params["s"])
    water = document["water"]
    assert isinstance(water, dict)
    assert water["flood_side"] == "103.2 ft"
    assert "as_of" not in water
    on(test, "barrier")
    assert f"9\u202f360{NO_BREAK}lb" in words(test)


@pytest.mark.parametrize("text", ["104.60 ft", "103.2 ft", "105.2"], ids=["as opened", "typed", "refused"])
def test_the_levels_stand_in_their_fields_on_every_page(text: str) -> None:
    test = app(read_file(example_files()[0]))
    if text != "104.60 ft":
        typed(test, "flood_side", text)
    for page in ("barrier", "inputs", "flood_line", "sheets", "barrier", "method", "inputs"):
        on(test, page)
        if page not in ("sheets", "method"):
            fields = [test.text_input(key=key).value for key in state.LEVEL_FIELDS.values()]
            assert fields == [text, "97.00 ft"], page
            assert len(messages(test)) == (text == "105.2")


def test_a_button_moves_the_level() -> None:
    test = app(read_file(example_files()[0]))
    run(test.button(key="Lower flood_side").click())
    assert test.text_input(key=state.LEVEL_FIELDS["flood_side"]).value == "104.10 ft"
    # 62.4 · 5.9²/2 · 12 = 13 033 lb
    assert figure(test, "P1", "kip") == 13.0


def test_a_refused_level_stays_in_its_field_with_the_reason() -> None:
    test = app(read_file(example_files()[0]))
    before = test.query_params["s"]
    typed(test, "flood_side", "105.2")
    assert test.text_input(key=state.LEVEL_FIELDS["flood_side"]).value == "105.2"
    (message,) = messages(test)
    assert 'needs a unit, for example "105.2 ft"' in message
    assert figure(test, "P1", "kip") == 15.3
    assert test.query_params["s"] == before
    typed(test, "flood_side", "105.2 ft")
    assert messages(test) == []


def test_the_other_units_leave_what_was_typed() -> None:
    test = app(read_file(example_files()[0]))
    show_in(test, "SI")
    # 15 275.52 lb · 4.4482216 N/lb
    assert figure(test, "P1", "kN") == 67.9
    assert test.text_input(key=state.LEVEL_FIELDS["flood_side"]).value == "104.60 ft"


def test_a_first_visit_shows_the_first_example() -> None:
    test = run(AppTest.from_file(MAIN, default_timeout=30))
    assert figure(test, "P1", "kip") == 15.3
    assert decode_document(test.query_params["s"]) == decode_document(
        encode_document(read_file(example_files()[0]))
    )


def test_the_text_of_the_scenario_is_the_whole_of_it() -> None:
    document = read_file(example_files()[1])
    test = on(app(document), "inputs")
    (area,) = [area for area in test.text_area if area.label.startswith("Scenario file")]
    assert parse_document(str(area.value).encode()) == decode_document(encode_document(document))


def test_a_page_that_fails_says_so_and_shows_no_half_result(monkeypatch: pytest.MonkeyPatch) -> None:
    test = app(read_file(example_files()[0]))

    def broken(*_: object) -> str:
        raise ZeroDivisionError

    monkeypatch.setattr("webapp.markup.line_table", broken)
    test.run()
    (message,) = messages(test)
    assert "could not be computed" in message
    assert "ZeroDivision" not in message + words(test)
