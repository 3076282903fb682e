"""Closures in the calculation package: tables of logs, posts, logs needed and losses against hand figures."""

from __future__ import annotations

import pytest

from loads.assessment import AssessedClosure, assess
from loads.cautions import HEADLINE
from loads.load import sediment_loads
from loads.scenario_file import Document, scenario_of
from loads.working import working
from tests.webapp.sheet_cases import CROWDED, changed
from tests.webapp.test_package import FORBIDDEN, Package
from tests.webapp.test_sheet import heavier
from webapp.package import package_job
from webapp.package.closure import CLOSURE_ASSUMPTIONS, closure_checks, closure_view
from webapp.package.grid import Grid
from webapp.package.states import levels_of_states, package_states
from webapp.step_text import line_text

LEVEL = "443.40 ft"
HEAD = 6.0
PRESSED: Document = changed({"post": {}, "anchor": None}, water={"flood_side": LEVEL})
"""Six feet of water on twelve of fourteen logs, spans of 8 ft, posts without braces."""


@pytest.fixture(scope="module")
def package(pango: None) -> Package:
    return Package(PRESSED)


def found_in(document: Document) -> tuple[AssessedClosure, Grid]:
    scenario = scenario_of(document)
    barrier = assess(scenario).barrier(document["closure"][0]["id"])
    assert isinstance(barrier, AssessedClosure)
    return barrier, closure_checks(barrier, scenario.units, scenario.datum)


def test_logs_carry_what_a_pocket_calculator_gives(package: Package) -> None:
    """w = 62.4·0.5·(depth of the log's middle), M = w·8²/8, R = w·8/2; the bottom one 179, 1 435, 718."""
    for row in range(12):
        load = 62.4 * 0.5 * (HEAD - 0.5 * row - 0.25)
        bottom = 437.40 + 0.5 * row
        ratio = load * 8 / 1300
        verdict = "above limit" if ratio > 1 else "near limit" if ratio >= 0.9 else "below limit"
        shown = (
            f"{row + 1} {bottom:.2f} {bottom + 0.5:.2f} {load:.1f} {load * 8:.0f} {load * 4:.1f} "
            f"{ratio:#.3g} {verdict}"
        )
        assert package.says(shown), shown
    assert package.says("13 443.40 443.90 0.0 0 0.0 0 below limit")
    assert package.says("Logs of bays 1–3, each: span L = 8 ft, 14 of 14 in place, top 444.40 ft trial datum")


def test_posts_carry_what_a_pocket_calculator_gives(package: Package) -> None:
    """½·62.4·6²·8 = 8 986 lb and 62.4·6³/6·8 = 17 971 lb·ft at the base of each post, half on a guide."""
    assert package.says("figure posts 1, 2 left guide; right guide")
    assert package.says("whole load 8 986 lb 4 493 lb")
    assert package.says("moment at the base 17 971 lb·ft –")
    assert package.says("shear at the base 8 986 lb –")


def test_logs_needed_and_losses_are_there(package: Package) -> None:
    """443.40 + 2 ft asks for 8.0/0.5 = 16 logs, 2 more than there are in each of three bays."""
    assert package.says(
        "as entered 444.40 445.40 16 445.40 6 first-limit level 442.86 ft, rated level 443.40 ft"
    )
    assert package.says("What if a part is lost")
    assert package.says("post lost: post 1: above limit")
    assert package.says("Water goes over the logs in place from 444.40 ft trial datum up.")
    assert all(package.says(sentence) for sentence in CLOSURE_ASSUMPTIONS)
    assert package.says(HEADLINE)
    assert not FORBIDDEN.search(" ".join(package.pages))


def test_worked_steps_of_log_and_post_are_printed_with_their_numbers(package: Package) -> None:
    barrier, _ = found_in(PRESSED)
    steps = working(barrier)
    assert any(step.title.startswith("Log that carries most") for step in steps)
    assert any(step.title.startswith("Post that carries most") for step in steps)
    for step in steps:
        assert package.says(step.title)
        for line in step.lines:
            assert package.says(line_text(line, "US").replace("_", ""))


def test_every_check_of_every_part_is_in_one_row_of_its_kind(package: Package) -> None:
    barrier, grid = found_in(PRESSED)
    rows = {row[0] for row in grid.rows}
    assert "log 1 of bays 1–3: bending moment (and 39 more, each with a smaller ratio)" in rows
    assert len(rows) == len(grid.rows)
    assert len(barrier.checks) == 3 * 14 + len(rows) - 1
    for row in grid.rows:
        assert package.says(row[0])


def test_sixty_bays_take_no_more_tables_than_there_are_kinds_of_bays() -> None:
    document = CROWDED["long words"]
    scenario = scenario_of(document)
    states = package_states(scenario)
    barrier, grid = found_in(document)
    many = assess(scenario, levels_of_states(states)).barrier(barrier.record.id)
    assert isinstance(many, AssessedClosure)
    view = closure_view(barrier, many, states, scenario.units, scenario.datum)
    assert len(view.logs) == len(set(barrier.record.in_place))
    assert len(grid.rows) < 40
    assert [row[0] for row in view.needed.rows] == [state.name for state in states]


def test_a_withheld_closure_has_both_figures_and_no_table(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("loads.load.LOADS", (heavier, sediment_loads))
    html = package_job(PRESSED).html
    assert "The two computations of this closure disagree" in html
    assert "moment about the sill M" in html
    assert "Posts and guides" not in html
    assert "not on hand" not in html
