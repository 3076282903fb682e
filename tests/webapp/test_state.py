"""Session logic over a plain mapping."""

from typing import Any

import pytest

from loads.problems import ScenarioError
from loads.scenario_file import parse_document, read_file
from webapp import barrier_state, forms, state
from webapp.closure_form import CLOSURE_FORM
from webapp.links import encode_document
from webapp.new_barriers import new_closure, new_panel
from webapp.scenario_files import example_files


@pytest.fixture
def session() -> dict[Any, Any]:
    session: dict[Any, Any] = {}
    state.begin(session, None)
    return session


def test_a_first_visit_shows_the_first_example(session: dict[Any, Any]) -> None:
    assert session["document"] == read_file(example_files()[0])
    assert session[state.LEVEL_FIELDS["flood_side"]] == "104.60 ft"
    assert session["system"] == "US"


def test_a_level_typed_goes_into_the_document_as_typed(session: dict[Any, Any]) -> None:
    session[state.LEVEL_FIELDS["flood_side"]] = "105 ft 6 in"
    state.change_level(session, "flood_side")
    assert session["document"]["water"]["flood_side"] == "105 ft 6 in"
    assert "as_of" not in session["document"]["water"], "the time belonged to the old level"


def test_a_refused_level_stays_in_its_field_and_changes_nothing(session: dict[Any, Any]) -> None:
    before = session["document"]
    session[state.LEVEL_FIELDS["flood_side"]] = "105.2"
    state.change_level(session, "flood_side")
    assert session["document"] == before
    assert session[state.LEVEL_FIELDS["flood_side"]] == "105.2"
    assert session["level problems"]["flood_side"] == (
        'water.flood_side is "105.2"; it needs a unit, for example "105.2 ft"'
    )
    session[state.LEVEL_FIELDS["flood_side"]] = "105.2 ft"
    state.change_level(session, "flood_side")
    assert session["level problems"] == {}


def test_the_protected_side_can_be_dried_and_wetted(session: dict[Any, Any]) -> None:
    field = state.LEVEL_FIELDS["protected_side"]
    session[field] = "dry"
    state.change_level(session, "protected_side")
    assert "protected_side" not in session["document"]["water"]
    session[field] = "99 ft"
    state.change_level(session, "protected_side")
    assert session["document"]["water"]["protected_side"] == "99 ft"


@pytest.mark.parametrize(("system", "typed"), [("US", "105.10 ft"), ("SI", "31.982 m")])
def test_a_button_moves_a_level_by_a_step_of_the_unit_shown(
    session: dict[Any, Any], system: str, typed: str
) -> None:
    session["system"] = system
    state.move_level(session, "flood_side", +1)
    assert session["document"]["water"]["flood_side"] == typed


def test_a_button_does_not_move_what_was_typed_and_refused(session: dict[Any, Any]) -> None:
    session[state.LEVEL_FIELDS["flood_side"]] = "a lot"
    state.move_level(session, "flood_side", +1)
    assert session[state.LEVEL_FIELDS["flood_side"]] == "a lot"


def test_a_link_in_the_address_replaces_the_document(session: dict[Any, Any]) -> None:
    other = read_file(example_files()[1])
    state.begin(session, encode_document(other))
    assert session["document"]["title"] == other["title"]
    assert session["system"] == other["units"]


def test_the_sessions_own_address_changes_nothing(session: dict[Any, Any]) -> None:
    session["address"] = state.packed(session)
    session[state.LEVEL_FIELDS["flood_side"]] = "105 ft"
    state.change_level(session, "flood_side")
    state.begin(session, session["address"])
    assert session["document"]["water"]["flood_side"] == "105 ft"


@pytest.mark.parametrize(
    ("address", "words"),
    [("1.abc", "damaged"), ("9.AAAA", "newer Sillhead"), ("1." + "A" * 60_001, "60,000 are read")],
)
def test_a_bad_link_is_refused_in_words_and_the_session_stays(
    session: dict[Any, Any], address: str, words: str
) -> None:
    before = session["document"]
    state.begin(session, address)
    assert session["document"] is before
    assert words in session["link problem"]


def test_a_link_to_something_that_is_no_scenario_is_refused(session: dict[Any, Any]) -> None:
    state.begin(session, encode_document({"format": 2, "title": "later"}))
    assert "this Sillhead reads formats up to 1" in session["link problem"]


def test_opening_a_broken_file_gives_every_problem_and_changes_nothing(session: dict[Any, Any]) -> None:
    before = session["document"]
    problems = state.open_text(session, b'format = 1\ntitle = "x"\n[[panel]]\nid = "P"\nheight = "-6 ft"\n')
    assert session["document"] is before
    paths = {problem.path for problem in problems}
    assert {"datum", "water", "panel[P].bottom", "panel[P].height"} <= paths


def test_open_document_refuses_what_is_no_scenario(session: dict[Any, Any]) -> None:
    with pytest.raises(ScenarioError):
        state.open_document(session, {"format": 1})


def test_panels_and_layers_are_added_copied_and_removed(session: dict[Any, Any]) -> None:
    barrier_state.add_barrier(session, "panel", new_panel(session["document"]))
    barrier_state.copy_barrier(session, ("panel", 2))
    ids = [panel["id"] for panel in session["document"]["panel"]]
    assert ids == ["P1", "P2", "P3", "P4", "N1", "P3-2"]
    assert session["barrier"] == "P3-2"
    barrier_state.remove_barrier(session, ("panel", 4))
    assert [panel["id"] for panel in session["document"]["panel"]] == ["P1", "P2", "P3", "P4", "P3-2"]
    fewer = barrier_state.with_layer(session["document"], ("panel", 2), 0, None)
    assert "sediment" not in fewer["panel"][2]
    assert "sediment" in session["document"]["panel"][2], "the document itself is not touched"


def test_text_of_the_document_reads_back_as_the_same_document(session: dict[Any, Any]) -> None:
    text = state.as_text(session["document"])
    assert parse_document(text.encode()) == session["document"]
    assert state.take_text(session, text) == ()
    assert state.take_text(session, "title = ") != ()


@pytest.mark.parametrize("path", example_files(), ids=lambda path: path.stem)
def test_an_untouched_form_changes_nothing(path: Any) -> None:
    document = read_file(path)
    for panel in document.get("panel", []):
        shape = panel.get("shape", "rectangle")
        for name in ("id", "name", "bottom", *forms.SHAPE_FIELDS[shape]):
            before = panel.get(name)
            assert forms.typed_value(forms.field_of("panel", name), forms.shown(before), before) == before
        for layer in panel.get("sediment", []):
            for name in forms.PRESSURE_FIELDS[layer["pressure"]]:
                before = layer.get(name)
                assert (
                    forms.typed_value(forms.field_of("sediment", name), forms.shown(before), before) == before
                )


@pytest.mark.parametrize("path", example_files(), ids=lambda path: path.stem)
def test_an_untouched_form_of_a_closure_changes_nothing(path: Any) -> None:
    for closure in read_file(path).get("closure", []):
        changed = closure
        for part in CLOSURE_FORM:
            table = forms.table_at(closure, part.path)
            kept = {}
            for name in part.asked:
                field = forms.field_of(part.record_name, name)
                value = forms.typed_value(field, forms.shown(table.get(name), field.kind), table.get(name))
                if forms.has_pedigree(part.record_name, field):
                    value = forms.with_pedigree(value, *forms.pedigree_shown(table.get(name)))
                kept[name] = value
            changed = forms.with_table(changed, part.path, kept)
        assert changed == closure


def test_the_form_of_a_closure_asks_every_field_of_its_record() -> None:
    asked = {(part.record, name) for part in CLOSURE_FORM for name in part.asked}
    tables = {
        (part.record, name)
        for part in CLOSURE_FORM
        for name, info in part.record.model_fields.items()
        if any(other.path == (*part.path, name) for other in CLOSURE_FORM)
    }
    for part in CLOSURE_FORM:
        missing = {name for name in part.record.model_fields if (part.record, name) not in asked | tables}
        assert missing <= {"sediment", "drill"}, (part.record, missing)


def test_fields_of_a_closure_are_read_as_the_file_has_them() -> None:
    def read(record: str, name: str, text: str) -> object:
        return forms.typed_value(forms.field_of(record, name), text, None)

    assert read("closure", "logs_in_place", "9, 9, 10") == [9, 9, 10]
    assert read("closure", "logs_in_place", "9") == 9
    assert read("closure", "logs_in_place", "nine") == "nine", "the record says what is wrong with it"
    assert read("closure", "bay_widths", "8 ft, 7 ft 6 in") == ["8 ft", "7 ft 6 in"]
    assert read("closure", "parts_short", "one clamp, bent\n\ntwo seals") == ["one clamp, bent", "two seals"]
    assert read("closure.guide", "one_way", "yes") is True
    assert read("closure.log", "fills_with_water", "no") is False
    assert read("closure.anchor", "tension_bolts", "2") == 2
    assert "aluminium 6061-T6" in forms.field_of("closure.log", "material").choices


def test_a_table_that_is_emptied_goes_and_one_that_was_empty_stays() -> None:
    closure = {"id": "C", "post": {"brace": {"height": "4 ft"}}, "guide": {}}
    assert forms.with_table(closure, ("post", "brace"), {"height": None}) == {"id": "C", "guide": {}}
    assert forms.with_table(closure, ("guide",), {"friction": None}) == closure
    assert forms.with_table(closure, ("seal",), {"rate": None}) == closure
    assert forms.with_table(closure, ("log", "section"), {"thickness": "3 in"})["log"] == {
        "section": {"thickness": "3 in"}
    }


def test_a_closure_begun_is_a_scenario_and_its_logs_move_within_those_on_hand(
    session: dict[Any, Any],
) -> None:
    barrier_state.add_barrier(session, "closure", new_closure(session["document"]))
    place = barrier_state.place_of(session["document"], session["barrier"])
    assert place == ("closure", 0)
    assert not barrier_state.can_move_logs(session["document"], place, +1), "all eight are in place"
    for _ in range(9):
        barrier_state.move_logs(session, place, -1)
    assert session["document"]["closure"][0]["logs_in_place"] == 0
    assert not barrier_state.can_move_logs(session["document"], place, -1)
    session["document"]["closure"][0] |= {"bays": 2, "logs_in_place": [7, 8]}
    barrier_state.move_logs(session, place, +1)
    assert session["document"]["closure"][0]["logs_in_place"] == [8, 8]
    barrier_state.remove_barrier(session, place)
    assert "closure" not in session["document"]


def test_a_changed_value_drops_the_pedigree_of_the_old_one() -> None:
    before = {"value": "98.20 ft", "source": "survey", "low": "98 ft"}
    field = forms.field_of("panel", "bottom")
    assert forms.typed_value(field, "98.20 ft", before) == before
    assert forms.typed_value(field, "98.40 ft", before) == "98.40 ft"
    assert forms.typed_value(field, "  ", before) is None


def test_outlines_are_typed_a_corner_a_line() -> None:
    points = forms.field_of("panel", "points")
    holes = forms.field_of("panel", "holes")
    assert forms.typed_value(points, "0 ft, 0 ft\n4 ft, 0 ft\n2 ft, 3 ft", None) == [
        ["0 ft", "0 ft"],
        ["4 ft", "0 ft"],
        ["2 ft", "3 ft"],
    ]
    typed = forms.typed_value(holes, "0 m, 0 m\n1 m, 0 m\n0 m, 1 m\n\n2 m, 0 m\n3 m, 0 m\n2 m, 1 m", None)
    assert isinstance(typed, list)
    assert len(typed) == 2
    assert forms.shown(typed).count("\n\n") == 1


def test_source_and_date_are_kept_with_a_limit() -> None:
    limit = forms.with_pedigree("12 kip", "engineer of record", "2030-03-02")
    assert isinstance(limit, dict)
    assert str(limit["date"]) == "2030-03-02"
    assert forms.with_pedigree("12 kip", "", "") == "12 kip"
    assert forms.with_pedigree(None, "somebody", "") is None
    assert forms.with_pedigree("12 kip", "", "next week") == {"value": "12 kip", "date": "next week"}


def test_numbers_without_a_unit_are_numbers_in_the_document() -> None:
    field = forms.field_of("sediment", "pressure_coefficient")
    assert field.kind == "number"
    assert forms.typed_value(field, "0.45", None) == 0.45
    assert forms.typed_value(field, "2", None) == 2
    assert forms.typed_value(field, "two", None) == "two"


def test_fields_of_another_shape_go_when_the_shape_changes() -> None:
    panel = {"id": "P", "width": "3 ft", "height": "2 ft", "tilt": "80 deg", "shape": "rectangle"}
    assert forms.without_other(panel, forms.SHAPE_FIELDS, "circle") == {
        "id": "P",
        "tilt": "80 deg",
        "shape": "rectangle",
    }
