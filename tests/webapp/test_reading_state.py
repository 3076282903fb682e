"""Readings in a session's document, in the JSON of a check, and on their page run in process."""

from __future__ import annotations

import copy
from datetime import date, datetime
from pathlib import Path
from typing import Any

import pytest
from streamlit.testing.v1 import AppTest

from loads.problems import ScenarioError
from loads.reading import LevelReading
from loads.scenario_file import Document, parse_document, read_file, scenario_of, write_document
from tests.lines import SCENARIOS
from tests.webapp.test_apptest import app, figure, messages, on, run, show_in, words
from webapp import reading_form, reading_state, state
from webapp.answer import check_json
from webapp.display import NO_BREAK
from webapp.links import decode_document, encode_document
from webapp.reading_levels import NoLevel, level_found
from webapp.scenario_files import example_files

FOOT = 0.3048
MORNING = datetime.fromisoformat("2031-04-02T06:10:00-05:00")
DRY_LOGGER = {
    "id": "DRY",
    "kind": "vented logger",
    "sensor_elevation": "645 ft",
    "pressure": "0.01 psi",
    "zero_pressure": "0.02 psi",
}
TOO_MANY_RANGES = {
    "id": "MANY",
    "kind": "manometer",
    "sensor_elevation": "633 ft",
    "leg": [
        {"specific_gravity": 1.0, "rise": {"value": f"{n} in", "low": "0 in", "high": "20 in"}}
        for n in range(1, 12)
    ],
}


@pytest.fixture
def house() -> Document:
    return read_file(next(path for path in SCENARIOS if path.stem == "reading-house"))


@pytest.fixture
def session(house: Document) -> dict[Any, Any]:
    session: dict[Any, Any] = {}
    state.begin(session, None)
    state.open_document(session, house)
    state.settle(session)
    return session


def found_in(document: Document, chosen: str) -> LevelReading:
    found = reading_state.found_at(scenario_of(document), reading_state.place_of(document, chosen))
    assert isinstance(found, LevelReading)
    return found


def with_one(document: Document, table: dict[str, Any]) -> Document:
    return reading_state.with_reading(document, len(document.get("reading", ())), table)


def reading_json(document: Document) -> dict[str, Any]:
    answer = check_json(write_document(document).decode(), {})
    return {item["id"]: item for item in answer["readings"]}


def test_the_level_of_a_reading_goes_into_the_document_with_range_source_and_date(
    session: dict[Any, Any],
) -> None:
    reading_state.use_level(session, 0)
    # 630.00 + 11.35, 629.97 + 11.30 and 630.03 + 11.40
    assert session["document"]["water"]["flood_side"] == {
        "value": "641.35 ft",
        "low": "641.27 ft",
        "high": "641.43 ft",
        "source": "staff: Painted staff at the landing",
        "date": date(2031, 4, 2),
    }
    assert session["document"]["water"]["as_of"] == MORNING
    state.begin(session, None)
    assert session[state.LEVEL_FIELDS["flood_side"]] == "641.35 ft"


def test_in_metres_it_is_written_to_the_millimetre(session: dict[Any, Any]) -> None:
    session["system"] = "SI"
    reading_state.use_level(session, 0)
    # 641.35 ft, 641.27 ft and 641.43 ft are 195.48348, 195.459096 and 195.507864 m; the range outward
    level = session["document"]["water"]["flood_side"]
    assert (level["value"], level["low"], level["high"]) == ("195.483 m", "195.459 m", "195.508 m")


def test_a_reading_of_the_protected_side_leaves_the_flood_side(session: dict[Any, Any]) -> None:
    before = session["document"]["water"]["flood_side"]
    table = {**session["document"]["reading"][0], "side": "protected", "staff_reading": "3 ft"}
    session["document"] = reading_state.with_reading(session["document"], 0, table)
    reading_state.use_level(session, 0)
    assert session["document"]["water"]["flood_side"] == before
    assert session["document"]["water"]["protected_side"]["value"] == "633.00 ft"


@pytest.mark.parametrize(
    ("other_level", "before", "expected"),
    [
        (None, None, MORNING),
        (None, "2031-04-01T20:00:00-05:00", MORNING),
        ("632 ft", "2031-04-02T05:00:00-05:00", datetime.fromisoformat("2031-04-02T05:00:00-05:00")),
        ("632 ft", "2031-04-02T13:00:00+01:00", MORNING),
        ("632 ft", None, None),
    ],
    ids=["dry", "dry, old time", "other is older", "other is newer", "other has no time"],
)
def test_no_level_looks_newer_than_it_is(
    house: Document, other_level: str | None, before: str | None, expected: datetime | None
) -> None:
    water = house["water"]
    water |= {"protected_side": other_level} if other_level else {}
    water |= {"as_of": before} if before else {}
    changed = reading_state.with_level_of(house, found_in(house, "STAFF"), "US")
    assert changed["water"].get("as_of") == expected


def test_use_is_seen_until_the_level_changes(session: dict[Any, Any]) -> None:
    found = found_in(session["document"], "VENTED")
    assert not reading_state.is_in_use(session["document"], found, "US")
    reading_state.use_level(session, 1)
    assert reading_state.is_in_use(session["document"], found, "US")
    sent = decode_document(encode_document(session["document"]))
    assert reading_state.is_in_use(sent, found, "US"), "and by whoever opens the link"
    state.move_level(session, "flood_side", 1)
    state.begin(session, None)
    state.move_level(session, "flood_side", 1)
    assert not reading_state.is_in_use(session["document"], found, "US")


@pytest.mark.parametrize("table", [DRY_LOGGER, TOO_MANY_RANGES], ids=["dry", "no level"])
def test_without_a_level_there_is_nothing_to_use(session: dict[Any, Any], table: dict[str, Any]) -> None:
    session["document"] = with_one(session["document"], table)
    before = copy.deepcopy(session["document"])
    reading_state.use_level(session, 4)
    assert session["document"] == before


def test_readings_are_added_changed_and_taken_out(house: Document) -> None:
    more = with_one(house, {**DRY_LOGGER})
    assert list(reading_state.reading_titles(more))[-2:] == ["DRY", reading_state.NEW]
    for _ in range(5):
        more = reading_state.with_reading(more, 0, None)
    assert "reading" not in more
    assert scenario_of(more).reading == ()
    assert reading_state.table_at(more, 0) == {"id": "R1", "kind": "staff", "side": "flood"}


def test_ids_are_unique_among_readings_and_apart_from_barriers(house: Document) -> None:
    house["reading"][0]["id"] = "D1"
    assert scenario_of(house).reading[0].id == "D1"
    house["reading"][1]["id"] = "D1"
    with pytest.raises(ScenarioError) as caught:
        scenario_of(house)
    assert str(caught.value.problems[0]) == (
        'id is "D1"; it is used 2 times; every reading needs an id of its own'
    )


def test_a_problem_is_named_by_the_id_of_its_reading(house: Document) -> None:
    house["reading"][2]["barometer"] = "978.6"
    house["reading"][3]["leg"][1]["rize"] = "1 in"
    with pytest.raises(ScenarioError) as caught:
        scenario_of(house)
    told = [str(problem) for problem in caught.value.problems]
    assert any(text.startswith('reading[SEALED].barometer is "978.6"; it needs a unit') for text in told)
    assert 'reading[UTUBE].leg[1].rize is not a known key; did you mean "rise"?' in told


def test_five_fields_make_one_value() -> None:
    nothing = dict.fromkeys(reading_form.BAND, "")
    assert reading_form.band_typed(nothing) is None
    assert reading_form.band_typed({**nothing, "value": " 4.62 ft "}) == "4.62 ft"
    assert reading_form.band_typed({**nothing, "low": "4.5 ft"}) == {"value": "", "low": "4.5 ft"}
    whole = {"value": "4.62 ft", "low": "4.5 ft", "high": "5 ft", "source": "me", "date": date(2031, 4, 2)}
    assert reading_form.band_typed(reading_form.band_shown(whole)) == whole


def test_the_json_holds_each_reading_with_its_chain(house: Document) -> None:
    found = reading_json(house)
    staff = found["STAFF"]
    assert staff["level"] == pytest.approx(641.35 * FOOT, abs=1e-9)
    assert (staff["low"], staff["high"]) == pytest.approx((641.27 * FOOT, 641.43 * FOOT), abs=1e-9)
    # the two changes of 0.03 and 0.05 ft combine to 0.0583095 ft
    assert staff["root_sum_square"]["high"] == pytest.approx((641.35 + 0.0583095) * FOOT, abs=1e-7)
    assert staff["head"] == pytest.approx(11.35 * FOOT, abs=1e-9)
    assert (staff["kind"], staff["side"], staff["as_of"]) == ("staff", "flood", MORNING.isoformat())
    assert [(link["name"], link["unit"], link["basis"]) for link in staff["links"]] == [
        ("zero_elevation", "m", "entered"),
        ("staff_reading", "m", "entered"),
        ("level", "m", "computed"),
    ]
    assert staff["links"][0]["date"] == "2030-09-12"
    # 8 11/16 in of mercury less 18 in of water; water at 50 degF weighs 999.70 kg/m³
    head = 13560 / 999.70 * 8.6875 / 12 - 1.5
    assert found["UTUBE"]["level"] == pytest.approx((633 + head) * FOOT, abs=2e-4)


def test_the_json_of_a_dry_sensor_holds_no_level(house: Document) -> None:
    dry = reading_json(with_one(house, DRY_LOGGER))["DRY"]
    assert dry["dry"] is True
    assert (dry["level"], dry["low"], dry["high"]) == (None, None, None)
    assert dry["links"][-1]["name"] == "level"
    assert dry["links"][-1]["value"] is None
    assert "The sensor is dry" in dry["remarks"][0]


def test_the_json_says_why_a_reading_gives_no_level(house: Document) -> None:
    many = reading_json(with_one(house, TOO_MANY_RANGES))["MANY"]
    assert (many["level"], many["links"], many["dry"]) == (None, [], False)
    (remark,) = many["remarks"]
    assert remark.startswith("No level follows from this reading: low and high may be entered for at most 10")


def test_a_scenario_without_readings_has_no_such_key() -> None:
    assert "readings" not in check_json(example_files()[0].read_text("utf-8"), {})


def test_water_of_the_scenario_counts_where_the_reading_says_nothing(house: Document) -> None:
    house["water"] |= {"unit_weight": "64 pcf"}
    del house["water"]["temperature"]
    # the logger shows 4.398 psi: 4.398 · 144/64 = 9.8955 ft over 631.20 ft
    vented = reading_json(house)["VENTED"]
    assert vented["level"] == pytest.approx((631.20 + 9.8955) * FOOT, abs=1e-5)


def readings_page(document: Document, chosen: str = "") -> AppTest:
    test = on(app(document), "readings")
    return run(test.selectbox(key="reading").set_value(chosen)) if chosen else test


def key(test: AppTest, place: int, field: str) -> str:
    return f"field {test.session_state['revision']}.reading.{place}.{field}"


def press(test: AppTest, label: str) -> AppTest:
    return run(next(button for button in test.button if button.label == label).click())


@pytest.mark.parametrize("chosen", ["STAFF", "VENTED", "SEALED", "UTUBE"])
def test_a_form_taken_as_it_stands_changes_nothing(house: Document, chosen: str) -> None:
    test = press(readings_page(house, chosen), "Take this reading")
    assert messages(test) == []
    place = reading_state.place_of(house, chosen)
    house["reading"][place]["side"] = "flood"
    sent = decode_document(encode_document(house))
    assert decode_document(encode_document(test.session_state["document"])) == sent
    assert test.selectbox(key="reading").value == chosen


def test_a_staff_is_entered_its_chain_shown_and_its_level_used() -> None:
    test = readings_page(read_file(example_files()[0]))
    for field, text in (
        ("zero_elevation.value", "98.20 ft"),
        ("staff_reading.value", "4.62"),
        ("staff_reading.low", "4.52 ft"),
        ("staff_reading.high", "4.72 ft"),
    ):
        test.text_input(key=key(test, 0, field)).set_value(text)
    press(test, "Take this reading")
    (message,) = messages(test)
    assert 'reading[R1].staff_reading is "4.62"; it needs a unit' in message
    assert test.text_input(key=key(test, 0, "staff_reading.low")).value == "4.52 ft", "nothing typed is lost"
    test.text_input(key=key(test, 0, "staff_reading.value")).set_value("4.62 ft")
    press(test, "Take this reading")
    assert messages(test) == []
    assert test.selectbox(key="reading").value == "R1"
    # 98.20 + 4.62, and 0.10 ft either way
    for text in ("102.82", "102.72", "102.92"):
        assert f"{text}{NO_BREAK}ft" in words(test)
    press(test, "Use this as the flood-side level")
    assert test.text_input(key=state.LEVEL_FIELDS["flood_side"]).value == "102.82 ft"
    assert "This is the flood-side level now" in words(test)
    on(test, "flood_line")
    # 62.4 · 4.62²/2 · 12 = 7991 lb
    assert figure(test, "P1", "lb") == 7990


def test_another_kind_drops_the_fields_of_the_first(house: Document) -> None:
    test = readings_page(house, "VENTED")
    run(test.selectbox(key=key(test, 1, "kind")).set_value("staff"))
    test.text_input(key=key(test, 1, "zero_elevation.value")).set_value("630 ft")
    test.text_input(key=key(test, 1, "staff_reading.value")).set_value("11 ft")
    press(test, "Take this reading")
    assert messages(test) == []
    assert set(test.session_state["document"]["reading"][1]) == {
        *("id", "name", "kind", "side", "as_of", "zero_elevation", "staff_reading")
    }


def test_a_leg_more_and_its_fluid_given_another_way(house: Document) -> None:
    test = readings_page(house, "UTUBE")
    test.number_input(key=key(test, 3, "legs")).set_value(3)
    run(test)
    run(test.selectbox(key=key(test, 3, "leg.2.fluid")).set_value("density"))
    run(test.selectbox(key=key(test, 3, "leg.2.rise")).set_value("length and inclination"))
    for field, text in (("density", "850 kg/m3"), ("length", "10 in"), ("inclination", "30 deg")):
        test.text_input(key=key(test, 3, f"leg.2.{field}.value")).set_value(text)
    press(test, "Take this reading")
    assert messages(test) == []
    legs = test.session_state["document"]["reading"][3]["leg"]
    assert legs[:2] == house["reading"][3]["leg"]
    assert legs[2] == {"density": "850 kg/m3", "length": "10 in", "inclination": "30 deg"}
    # 5 in of oil of 850 kg/m³ more than the water and the mercury hold up
    head = (13560 * 8.6875 / 12 + 850 * 5 / 12) / 999.70 - 1.5
    found = found_in(test.session_state["document"], "UTUBE")
    assert found.level[0] == pytest.approx((633 + head) * FOOT, abs=2e-4)


def test_a_dry_sensor_is_shown_as_dry_and_cannot_be_used(house: Document) -> None:
    test = readings_page(with_one(house, DRY_LOGGER), "DRY")
    assert "sensor dry" in words(test)
    assert "The sensor is dry" in words(test)
    assert f"645.00{NO_BREAK}ft" in words(test), "the sensor's elevation, and no level"
    use = next(button for button in test.button if button.label.startswith("Use this"))
    assert use.disabled


def test_a_reading_without_a_level_says_why(house: Document) -> None:
    test = readings_page(with_one(house, TOO_MANY_RANGES), "MANY")
    assert "No level follows from this reading" in words(test)
    assert not [button for button in test.button if button.label.startswith("Use this")]


def test_the_page_shows_every_link_in_both_unit_systems(house: Document) -> None:
    scenario = scenario_of(house)
    for reading in scenario.reading:
        found = level_found(scenario, reading)
        assert not isinstance(found, NoLevel)
        test = readings_page(house, reading.id)
        for system, unit in (("US", "ft"), ("SI", "m")):
            show_in(test, system)  # type: ignore[arg-type]
            text = words(test)
            level = f"{found.level[0] / FOOT:.2f}" if unit == "ft" else f"{found.level[0]:.3f}"
            assert f"<b>{level}{NO_BREAK}{unit}</b>" in text
            for link in found.links:
                assert text.count(f"<td>{link.meaning.replace(chr(39), '&#39;')}</td>") == 1, link.name
            for words_of_method in (found.worst.method, found.quadrature.method):
                assert words_of_method in text


def test_a_level_without_any_low_and_high_has_no_range(house: Document) -> None:
    for name in ("zero_elevation", "staff_reading"):
        house["reading"][0][name] = house["reading"][0][name]["value"]
    text = words(readings_page(house, "STAFF"))
    assert text.count("<b>not known</b>") == 2, "by either way of combining"
    assert "No low and high was entered for any link" in text
    changed = reading_state.with_level_of(house, found_in(house, "STAFF"), "US")
    assert set(changed["water"]["flood_side"]) == {"value", "source", "date"}


def test_markup_in_a_reading_is_shown_as_text(house: Document) -> None:
    house["reading"][0]["zero_elevation"] |= {"source": "<b>x</b> *y*"}
    house["datum"] = "<i>z</i>"
    text = words(readings_page(house, "STAFF"))
    assert "<b>x" not in text
    assert "*y*" not in text
    assert "<i>z" not in text


def test_a_reading_survives_the_file(tmp_path: Path, house: Document) -> None:
    saved = tmp_path / "saved.toml"
    saved.write_bytes(write_document(house))
    assert read_file(saved) == parse_document(saved.read_bytes()) == house
