"""Options without a page: ranges, candidates, the map, the least material, and the way into a document."""

from __future__ import annotations

import csv
import io
from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.scenario_file import parse_document, scenario_of, write_document
from loads.wall.wall_result import assess_wall
from tests.webapp.option_cases import BLOCK, ELL, TEE, document_of, every, options_of
from webapp import options_base, options_figures, options_markup
from webapp.display import System
from webapp.options_candidate import candidate_of, candidate_table, site_in, wall_of
from webapp.options_ranges import MOST_CANDIDATES, dimension_names, range_of, ranges_of, start_of
from webapp.options_state import IMPOSSIBLE, UNHELD, WITHIN, grid_of, least_of, matches, standing

WIDTHS = [("base_width", "2 ft", "8 ft", "7"), ("top_width", "1 ft", "5 ft", "5")]
TEES = [("heel", "4 ft", "16 ft", "5"), ("toe", "1 ft", "5 ft", "3"), ("key_depth", "1 ft", "3 ft", "2")]
CASES: list[tuple[dict[str, Any], list[tuple[str, str, str, str]], str]] = [
    (BLOCK, WIDTHS, "98 ft"),
    (TEE, TEES, "101 ft"),
    (ELL, [("toe", "0 ft", "4 ft", "3"), ("base_thickness", "1 ft", "3 ft", "3")], "100 ft"),
    (ELL, [("top_width", "0.2 m", "0.8 m", "3"), ("heel", "1 m", "4 m", "4")], "100 ft"),
]


@pytest.mark.parametrize(
    ("typed", "texts", "unit"),
    [
        (("6 ft", "8 ft", "3"), ("6 ft", "7 ft", "8 ft"), "ft"),
        (("6 ft 6 in", "8 ft", "2"), ("6.5 ft", "8 ft"), "ft"),
        (("0 m", "100 cm", "3"), ("0 m", "0.5 m", "1 m"), "m"),
        (("1 m", "2 m", "4"), ("1 m", "1.333333 m", "1.666667 m", "2 m"), "m"),
    ],
)
def test_a_range_is_read_as_typed(typed: tuple[str, str, str], texts: tuple[str, ...], unit: str) -> None:
    found = range_of("heel", *typed)
    assert found.texts == texts
    assert found.unit == unit
    factor = {"ft": 0.3048, "m": 1.0}[unit]
    assert found.values == pytest.approx([float(text.split()[0]) * factor for text in texts], rel=1e-12)


@pytest.mark.parametrize(
    ("typed", "says"),
    [
        (("6", "8 ft", "3"), 'Heel, low is "6"; it needs a unit'),
        (("6 ft", "8 psf", "3"), "Heel, high"),
        (("8 ft", "6 ft", "3"), "more than the low one"),
        (("6 ft", "6 ft", "3"), "more than the low one"),
        (("-1 ft", "6 ft", "3"), "neither may be negative"),
        (("6 ft", "8 ft", "1"), "whole number from 2"),
        (("6 ft", "8 ft", "2.5"), "whole number from 2"),
        (("6 ft", "8 ft", ""), "whole number from 2"),
    ],
)
def test_a_bad_range_says_what_is_wrong(typed: tuple[str, str, str], says: str) -> None:
    with pytest.raises(ScenarioError) as caught:
        ranges_of([("heel", *typed)])
    assert says in str(caught.value)


def test_more_candidates_than_a_map_takes_are_refused_before_they_are_made() -> None:
    whole = ranges_of([("heel", "1 ft", "9 ft", "250"), ("toe", "1 ft", "9 ft", "400")])
    assert len(whole[0].texts) * len(whole[1].texts) == MOST_CANDIDATES
    with pytest.raises(ScenarioError) as caught:
        ranges_of([("heel", "1 ft", "9 ft", "251"), ("toe", "1 ft", "9 ft", "400")])
    assert "100400 candidates" in str(caught.value)
    assert "at most 100000" in str(caught.value)


@pytest.mark.parametrize(("table", "typed", "flood_side"), CASES)
def test_a_candidate_is_the_wall_assessed_by_itself(
    table: dict[str, Any], typed: list[tuple[str, str, str, str]], flood_side: str
) -> None:
    options, site = options_of(table, typed, flood_side)
    assert every(options)
    for number in every(options)[::5]:
        record = options.record_of(number)
        result = assess_wall(record, site.levels, site.fluids, site.scenario.near_limit)
        single = {check.name: check.ratio.item() for check in result.checks if check.limit is not None}
        for name, ratio in zip(options.grid.checks, options.grid.ratios[number], strict=True):
            assert ratio == pytest.approx(single[name], rel=1e-9), name
        candidate = candidate_of(record, site)
        assert {(c.subject, c.name): c.verdict() for c in candidate.checks} == {
            (c.subject, c.name): c.verdict() for c in result.checks
        }
        assert candidate.verdict == result.verdict()
        assert matches(options.grid, number, candidate)


def test_sliding_of_a_block_is_the_figure_by_hand() -> None:
    options, site = options_of(BLOCK, WIDTHS)
    # 150 · 10 · (4 + 8)/2 = 9000 lb and 62.4 · 8²/2 = 1996.8 lb: 0.5 · 9000/1996.8 = 2.2536, asked 1.5
    number = int(np.ravel_multi_index((6, 3), options.grid.shape))
    assert options.table_of(number)["base_width"] == "8 ft"
    assert options.table_of(number)["top_width"] == "4 ft"
    assert options.grid.ratios[number] == pytest.approx([1.5 / 2.25361], rel=1e-5)
    assert candidate_of(options.record_of(number), site).material == pytest.approx(60 * 0.3048**2)


def test_the_least_of_a_block_is_the_figure_by_hand() -> None:
    options, site = options_of(BLOCK, WIDTHS)
    # 0.5 · 150 · A ≥ 1.5 · 1996.8 needs A ≥ 39.94 ft², so top and base together 8 ft or more
    least = least_of(options.grid, site, options.record_of)
    assert least.number is not None
    sizes = options.grid.dimensions(least.number)
    assert sum(sizes.values()) / 0.3048 == pytest.approx(8.0)
    total = np.array([sum(options.grid.dimensions(n).values()) for n in every(options)]) / 0.3048
    assert ((standing(options.grid)[every(options)] == WITHIN) == (total > 7.99)).all()


def test_the_least_keeps_the_limits_that_the_map_does_not_hold() -> None:
    options, site = options_of(TEE, TEES, "101 ft")
    assert options.within == "within every limit that the map holds"
    inside = [n for n in every(options) if standing(options.grid)[n] == WITHIN]
    kept = [n for n in inside if candidate_of(options.record_of(n), site).within]
    assert 0 < len(kept) < len(inside)
    least = least_of(options.grid, site, options.record_of)
    assert least.number is not None
    assert options.grid.material[least.number] == options.grid.material[kept].min()
    assert options.grid.material[least.number] > options.grid.material[inside].min()
    short = least_of(options.grid, site, options.record_of, most=1)
    assert short.number is None
    assert short.left == len(inside) - 1
    words = options_markup.least_words(options.grid, short, options.ranges, "US")
    assert f"{len(inside) - 1} more were not looked at" in words


def test_a_check_without_a_figure_is_not_within() -> None:
    options, _ = options_of(TEE, TEES, "101 ft")
    number = int(np.flatnonzero(standing(options.grid) == WITHIN)[0])
    ratios = options.grid.ratios.copy()
    ratios[number, 2] = np.nan
    assert standing(replace(options.grid, ratios=ratios))[number] == 2


def test_what_makes_no_section_and_what_has_no_limit_is_said() -> None:
    options, _ = options_of(BLOCK, WIDTHS)
    where = standing(options.grid).reshape(options.grid.shape)
    assert where[0, 4] == IMPOSSIBLE  # 5 ft on a base of 2 ft
    with pytest.raises(ScenarioError, match="overhang"):
        options.record_of(4)
    free = {name: value for name, value in BLOCK.items() if name != "own_criteria"}
    unheld, site = options_of(free, WIDTHS)
    assert set(standing(unheld.grid)) == {IMPOSSIBLE, UNHELD}
    least = least_of(unheld.grid, site, unheld.record_of)
    assert least.number is None
    assert "holds no limit" in options_markup.least_words(unheld.grid, least, unheld.ranges, "US")
    assert "not checked" in options_markup.criteria_line(unheld.record, None)


def test_a_grid_and_a_candidate_that_differ_do_not_match() -> None:
    options, site = options_of(BLOCK, WIDTHS)
    number = every(options)[3]
    candidate = candidate_of(options.record_of(number), site)
    assert matches(options.grid, number, candidate)
    assert not matches(replace(options.grid, ratios=options.grid.ratios * 1.001), number, candidate)
    assert not matches(replace(options.grid, material=options.grid.material * 1.001), number, candidate)


def test_a_grid_is_kept_until_the_water_the_wall_or_the_ranges_change() -> None:
    document = document_of(BLOCK)
    site, record, ranges = site_in(scenario_of(document)), wall_of(document, BLOCK), ranges_of(WIDTHS)
    session: dict[Any, Any] = {}
    shares: list[float] = []
    first = grid_of(session, record, site, ranges, shares.append)
    assert shares == [1.0]
    assert grid_of(session, record, site, ranges) is first
    higher = site_in(scenario_of(document_of(BLOCK, flood_side="99 ft")))
    second = grid_of(session, record, higher, ranges)
    assert (second.worst[second.possible] > first.worst[first.possible]).all()
    heavier = wall_of(document, {**BLOCK, "unit_weight": "160 pcf"})
    assert grid_of(session, heavier, higher, ranges) is not second
    assert grid_of(session, heavier, higher, ranges[::-1]).names == ("top_width", "base_width")


def test_the_map_shows_every_candidate_by_a_symbol_of_its_own() -> None:
    options, _ = options_of(TEE, TEES, "101 ft")
    at, marks = [1], {"picked": 3}
    figure = options_figures.map_figure(options.grid, options.ranges, at, marks, options.within)
    points = [trace for trace in figure["data"] if "hovertemplate" in trace and trace["name"] != "picked"]
    assert sum(len(trace["x"]) for trace in points) == 5 * 3
    assert len({trace["marker"]["symbol"] for trace in points}) == len(points) >= 2
    where = standing(options.grid).reshape(options.grid.shape)[:, :, 1]
    inside = next(trace for trace in points if trace["name"] == options.within)
    heels, toes = ([float(text.split()[0]) for text in one.texts] for one in options.ranges[:2])
    assert set(zip(inside["x"], inside["y"], strict=True)) == {
        (heels[i], toes[j]) for i, j in np.argwhere(where == WITHIN)
    }
    assert figure["data"][-1]["name"] == "picked", "number 3 lies at the second key depth"
    other = options_figures.map_figure(options.grid, options.ranges, [0], marks, options.within)
    assert other["data"][-1]["name"] != "picked"
    counts = options_figures.counts(options.grid, options.within)
    assert sum(number for _, number in counts) == 30
    assert f"{counts[0][1]} {options.within}" in options_figures.map_text(
        options.grid, options.ranges, options.within
    )


def test_a_long_axis_is_thinned_and_it_is_said() -> None:
    options, _ = options_of(BLOCK, [("base_width", "6 ft", "8 ft", "100"), WIDTHS[1]])
    assert options_figures.thinned(options.ranges)
    figure = options_figures.map_figure(options.grid, options.ranges, [], {}, options.within)
    assert sum(len(trace["x"]) for trace in figure["data"]) == 34 * 5
    assert not options_figures.thinned(options_of(BLOCK, WIDTHS)[0].ranges)


def test_the_csv_holds_every_candidate_with_its_figures() -> None:
    options, _ = options_of(BLOCK, WIDTHS)
    criteria = "Basis of design, rev 2 (entered)"
    data = options_markup.grid_csv(
        options.grid, options.ranges, candidate_of(*_first(options)).criteria, options.within
    ).decode()
    lines = data.splitlines()
    assert lines[0] == f"# criteria in force: {criteria}"
    rows = list(csv.DictReader(io.StringIO("\n".join(lines[2:]))))
    assert len(rows) == 35
    last = rows[-2]
    assert (last["base_width [ft]"], last["top_width [ft]"]) == ("8", "4")
    assert float(last["sliding on the base [ratio]"]) == pytest.approx(1.5 / 2.25361, rel=1e-5)
    assert float(last["section area [m2]"]) == pytest.approx(60 * 0.3048**2)
    assert last["standing"] == "within every limit entered"
    assert rows[4]["standing"] == "no section"
    assert rows[4]["largest ratio"] == ""


def _first(options: Any) -> tuple[Any, Any]:
    return options.record_of(every(options)[0]), site_in(scenario_of(options.document))


def test_a_candidate_writes_its_typed_dimensions_into_the_document() -> None:
    document = document_of(TEE, ELL)
    session: dict[Any, Any] = {"document": document, "revision": 1}
    record = wall_of(document, TEE)
    table = candidate_table(TEE, record, {"heel": "8.25 ft", "key_depth": "2.5 ft"})
    assert options_base.put_into(session, table) == ()
    written = parse_document(write_document(session["document"]))["wall"]
    assert [one["id"] for one in written] == ["W2", "W3"]
    assert written[0] == {
        **TEE,
        "stem_width": "1 ft",
        "heel": "8.25 ft",
        "key": {**TEE["key"], "depth": "2.5 ft"},
    }
    assert document["wall"][0] == TEE, "the document before stays as it was"
    another = options_base.as_another(session["document"], table)
    assert options_base.put_into(session, another) == ()
    assert [one["id"] for one in session["document"]["wall"]] == ["W2", "W3", "W2-2"]


def test_an_l_wall_with_both_slabs_is_written_as_a_t_wall() -> None:
    record = wall_of(document_of(ELL), ELL)
    assert candidate_table(ELL, record, {"toe": "2 ft"})["shape"] == "T"
    assert candidate_table(ELL, record, {"heel": "5 ft"})["shape"] == "L"


def test_what_is_no_wall_changes_nothing() -> None:
    document = document_of(BLOCK)
    session: dict[Any, Any] = {"document": document, "revision": 1}
    problems = options_base.put_into(session, {**BLOCK, "top_width": "9 ft"})
    assert "overhang" in str(problems[0])
    assert session["document"] is document


@pytest.mark.parametrize("system", ["US", "SI"])
@pytest.mark.parametrize("start", list(options_base.STARTS))
def test_a_start_stands_in_the_water_of_the_site(start: str, system: System) -> None:
    document = document_of(BLOCK, flood_side="104.6 ft")
    table = options_base.start_table(document, start, system)
    assert table["id"] == "W2", "W1 is taken"
    record, site = wall_of(document, table), site_in(scenario_of(document))
    assert record.base.value < site.levels.flood_side[0] < record.extent()[1]
    typed = [(name, *start_of(record, name, system)) for name in dimension_names(record)[:2]]
    grid = grid_of({}, record, site, ranges_of(typed))
    assert grid.possible.any()
    changed = options_base.with_typed(table, {"base": " 30 m ", "friction_angle": "25 deg", "criteria": ""})
    assert changed["base"] == "30 m"
    assert changed["foundation"] == {"friction_angle": "25 deg"}
    assert "criteria" not in changed
    assert table["foundation"] == {"friction_angle": "28 deg"}


def test_walls_by_corners_are_not_offered_to_start_from() -> None:
    parts = {**BLOCK, "id": "W9", "shape": "parts"}
    titles = options_base.base_titles({"wall": [BLOCK, parts]})
    assert "W1" in titles
    assert "W9" not in titles
    assert len(titles) == 3


def test_side_by_side_keeps_the_last_four_and_none_twice() -> None:
    session: dict[Any, Any] = {}
    tables = [{**BLOCK, "base_width": f"{width} ft"} for width in (6, 7, 8, 9, 10)]
    for table in (*tables, tables[2]):
        options_base.put_beside(session, table)
    kept = [one["base_width"] for one in session["options beside"]]
    assert kept == ["7 ft", "9 ft", "10 ft", "8 ft"]
