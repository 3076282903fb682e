"""The options page: run in process, and in a real Chromium against the real server."""

from __future__ import annotations

import re
from typing import Any

import pytest
from playwright.sync_api import Page, expect
from streamlit.testing.v1 import AppTest

from loads.scenario_file import scenario_of
from loads.states import levels_of
from loads.wall.wall_result import assess_wall
from loads.water import fluid_of
from tests.webapp.driving import Server, Watch
from tests.webapp.option_cases import BLOCK, ELL, TEE, document_of
from tests.webapp.test_apptest import app, on, run
from tests.webapp.test_pages import MISSING_BELOW_A_PAGE, opened
from webapp.display import significant
from webapp.links import encode_document


def options_page(*walls: dict[str, Any]) -> AppTest:
    return on(app(document_of(*walls)), "options")


def field(test: AppTest, label: str) -> Any:
    """The field with a label."""
    every = [*test.text_input, *test.selectbox, *test.button]
    return next(one for one in every if one.label == label)


def words(test: AppTest) -> str:
    """Everything in the page's blocks as plain text."""
    text = " ".join(re.sub(r"<[^>]+>", " ", block.value) for block in test.markdown[1:])
    text = text.replace("&#58;", ":").replace("&#40;", "(").replace("&#41;", ")")
    return re.sub(r"[\s\u00a0\u202f]+", " ", text)


def small(test: AppTest, *ends: str) -> AppTest:
    """Ranges of a few values, with the block of 8 ft and 4 ft among them when none are given."""
    base_low, base_high, top_low, top_high = ends or ("6 ft", "8 ft", "1 ft", "4 ft")
    for label, text in (
        ("Base width, low", base_low),
        ("Base width, high", base_high),
        ("Base width, count", "3"),
        ("Top width, low", top_low),
        ("Top width, high", top_high),
        ("Top width, count", "4"),
    ):
        field(test, label).set_value(text)
    return run(field(test, "Compute these candidates").click())


def test_a_first_look_shows_a_map_the_criteria_and_the_least_material() -> None:
    test = options_page(BLOCK)
    told = words(test)
    assert "Criteria in force: Basis of design, rev 2 (entered); load category usual" in told
    assert "Least material within every limit entered: base width" in told
    assert "Held for all candidates: base at 90 ft, height 10 ft" in told
    assert not test.error
    assert len(test.get("plotly_chart")) == 1


def test_a_bad_range_is_said_and_stays_typed() -> None:
    test = options_page(BLOCK)
    field(test, "Base width, low").set_value("6")
    test = run(field(test, "Compute these candidates").click())
    assert "needs a unit" in test.error[0].value
    assert field(test, "Base width, low").value == "6"
    assert not test.get("plotly_chart")
    field(test, "Base width, low").set_value("6 ft")
    field(test, "Base width, count").set_value("5000")
    test = run(field(test, "Compute these candidates").click())
    assert "105000 candidates" in test.error[0].value
    assert not test.get("plotly_chart")


def test_a_pick_shows_the_figures_of_the_wall_assessed_by_itself() -> None:
    test = small(options_page(BLOCK))
    field(test, "Pick base width").set_value("8 ft")
    test = run(test)
    field(test, "Pick top width").set_value("4 ft")
    told = words(run(test))
    assert "Picked: base width 8 ft, top width 4 ft" in told
    # 0.5 · 9000/1996.8 = 2.2536 and 1.5/2.2536 = 0.666
    assert "sliding on the base below limit 0.666 2.25 1.5" in told
    assert "In the map: sliding on the base 0.666" in told


def test_a_changed_level_changes_map_and_pick() -> None:
    test = small(options_page(BLOCK))
    field(test, "Flood side").set_value("100 ft")
    told = words(run(test))
    # 62.4 · 10²/2 = 3120 lb needs A ≥ 62.4 ft² and the largest has 60
    assert "No candidate of these ranges is within every limit entered" in told


def test_three_dimensions_and_a_candidate_in_full() -> None:
    test = options_page(TEE)
    field(test, "Third dimension").set_value("key_depth")
    test = run(test)
    for label, text in (
        ("Heel, low", "8 ft"),
        ("Heel, high", "16 ft"),
        ("Heel, count", "3"),
        ("Toe, count", "3"),
        ("Key depth, count", "2"),
    ):
        field(test, label).set_value(text)
    test = run(field(test, "Compute these candidates").click())
    assert not test.error
    assert {"Map at key depth", "Pick key depth"} <= {one.label for one in test.selectbox}
    assert "The map does not hold heel moment, freeboard" in words(test)
    run(field(test, "Write these dimensions into wall W2").click())
    scenario = scenario_of(test.session_state["document"])
    fluids = {side: fluid_of(scenario.water, side) for side in ("flood", "protected")}
    result = assess_wall(scenario.wall[0], levels_of(scenario), fluids, scenario.near_limit)
    told = words(test)
    for check in result.checks:
        if check.limit is not None:
            assert significant(check.ratio.item(), 3) in told, check.name


def test_a_start_goes_into_the_scenario_as_another_wall() -> None:
    test = options_page(BLOCK)
    field(test, "Wall to start from").set_value("\nT")
    test = run(test)
    assert not test.error
    assert "EM 1110-2-2100, 1 December 2005" in words(test)
    field(test, "Criteria set").set_value("none")
    test = run(test)
    assert "No criteria set is in force" in words(test)
    assert "no candidate is within any" in words(test)
    field(test, "Base elevation").set_value("88 ft")
    test = run(test)
    test = run(field(test, "Put this candidate into the scenario").click())
    walls = scenario_of(test.session_state["document"]).wall
    assert [(wall.id, wall.shape, wall.base.text) for wall in walls] == [
        ("W1", "gravity", "90 ft"),
        ("W2", "T", "88 ft"),
    ]
    assert "Wall W2 of the scenario has these dimensions now" in test.success[0].value


def test_a_crack_that_runs_through_shows_no_figure_and_stays_above_limit() -> None:
    slim = {**BLOCK, "top_width": "1 ft", "base_width": "2 ft", "uplift": "linear"}
    slim["foundation"] = {**BLOCK["foundation"], "allowable_bearing": "3000 psf"}
    test = small(options_page(slim), "1 ft", "2 ft", "0.5 ft", "1 ft")
    told = words(test)
    assert not test.error
    assert "No candidate of these ranges is within every limit entered" in told
    assert "base pressure above limit no figure – 3000 psf" in told


def test_candidates_of_two_shapes_stand_side_by_side() -> None:
    test = small(options_page(BLOCK, ELL))
    test = run(field(test, "Put beside the others").click())
    field(test, "Wall to start from").set_value("W3")
    test = run(test)
    test = run(field(test, "Put beside the others").click())
    told = words(test)
    assert "1: W1 2: W3" in told
    assert "shape gravity L" in told
    assert re.search(r"flotation, of limit not checked [\d.]+", told), "only the second asks for flotation"
    assert re.search(r"sliding on the base, of limit [\d.]+ [\d.]+", told)
    assert (
        "criteria in force Basis of design, rev 2 (entered); usual Basis of design (entered); usual" in told
    )
    test = run(field(test, "Clear the table").click())
    assert "Nothing is side by side yet" in words(test)


@pytest.mark.browser
def test_a_grid_is_run_and_a_point_is_picked(server: Server, page: Page, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(page, f"{server.url}/options?s={encode_document(document_of(BLOCK))}")
    expect(page.locator(".js-plotly-plot")).to_be_visible(timeout=20_000)
    for label, text in (
        ("Base width, low", "6 ft"),
        ("Base width, high", "8 ft"),
        ("Base width, count", "3"),
        ("Top width, low", "1 ft"),
        ("Top width, high", "4 ft"),
        ("Top width, count", "4"),
    ):
        page.get_by_label(label, exact=True).fill(text)
    page.get_by_role("button", name="Compute these candidates").click()
    # 0.5 · 150 · 5 · (top + base) ≥ 1.5 · 1996.8 needs 8 ft together: three of four tops of 6 ft, and more
    counted = page.locator(".sh-table tr", has_text="within every limit entered").locator("td").nth(1)
    expect(counted).to_have_text("11", timeout=20_000)
    for label, text in (("Pick base width", "8 ft"), ("Pick top width", "4 ft")):
        box = page.get_by_role("combobox", name=re.compile(label))
        box.fill(text)  # a click would first scroll, which closes the list again
        expect(page.get_by_role("option", name=text, exact=True)).to_be_visible()
        box.press("Enter")
    expect(page.get_by_text("Picked: base width 8 ft, top width 4 ft")).to_be_visible(timeout=20_000)
    row = page.locator(".sh-table tr", has_text="sliding on the base").filter(has_text="below limit")
    assert row.locator("td").nth(2).inner_text() == "0.666"
    expect(page.get_by_text("In the map: sliding on the base 0.666.")).to_be_visible()
    page.get_by_role("button", name="Put beside the others").click()
    beside = page.locator(".sh-table tr", has_text="sliding on the base, of limit")
    expect(beside.locator("td").nth(1)).to_have_text("0.666", timeout=20_000)
    with page.expect_download() as told:
        page.get_by_role("button", name="All candidates as CSV").click()
    rows = told.value.path().read_text(encoding="utf-8").splitlines()
    assert len(rows) == 3 + 12
    assert rows[-1].startswith("8,4,")
    assert "0.6656" in rows[-1]


@pytest.mark.browser
def test_a_phone_shows_the_map_without_scrolling_sideways(server: Server, phone: Page, watch: Watch) -> None:
    watch.expected_errors.append(MISSING_BELOW_A_PAGE)
    opened(phone, f"{server.url}/options?s={encode_document(document_of(BLOCK))}")
    expect(phone.locator(".js-plotly-plot")).to_be_visible(timeout=20_000)
    expect(phone.get_by_text("Criteria in force:")).to_be_visible()
    wide = phone.evaluate(
        "() => [...document.querySelectorAll('[data-testid=stMain], .block-container')]"
        ".map(e => e.scrollWidth - e.clientWidth)"
    )
    assert max(wide) <= 0
