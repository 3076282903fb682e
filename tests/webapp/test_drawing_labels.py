"""Labels of the drawings keep apart and within their room."""

import re
import xml.etree.ElementTree as ET
from itertools import combinations, pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st
from playwright.sync_api import Browser

from loads.assessment import assess
from loads.scenario_file import read_file, scenario_of
from tests.webapp.drawing_cases import DENSE, ODD, SCENARIOS, SVG, TANNERY_ROW, corners, drawings, paths
from webapp.drawing.column import clear_of
from webapp.drawing.line import line_drawing
from webapp.drawing.measure import shortened, spread, text_width, wrapped
from webapp.drawing.palette import LIGHT

Box = tuple[str, float, float, float, float]


def estimated_boxes(drawing: ET.Element) -> list[Box]:
    """Boxes of the texts for a font whose letters are 0.56 em wide on average."""
    boxes = []
    for node in drawing.iter(f"{SVG}text"):
        size, x, y = (float(node.attrib[name]) for name in ("font-size", "x", "y"))
        width = 0.56 * size * len(node.text or "")
        left = {"start": x, "middle": x - width / 2, "end": x - width}[node.get("text-anchor", "start")]
        boxes.append((node.text or "", left, y - 0.74 * size, left + width, y + 0.04 * size))
    return boxes


def overlaps(boxes: list[Box]) -> list[tuple[str, str]]:
    return [
        (one[0], other[0])
        for one, other in combinations(boxes, 2)
        if min(one[3], other[3]) - max(one[1], other[1]) > 1.5
        and min(one[4], other[4]) - max(one[2], other[2]) > 1.5
    ]


@pytest.mark.parametrize("narrow", [False, True])
@pytest.mark.parametrize("case", DENSE)
def test_labels_keep_apart(case: str, narrow: bool) -> None:
    for drawing in drawings(ODD[case], LIGHT, narrow=narrow)[:8]:
        root = ET.fromstring(drawing)
        boxes = estimated_boxes(root)
        assert overlaps(boxes) == []
        _, _, width, height = map(float, root.attrib["viewBox"].split())
        assert [b[0] for b in boxes if b[1] < 0 or b[3] > width + 1 or b[2] < 0 or b[4] > height] == []


@pytest.mark.browser
@pytest.mark.parametrize(("width", "narrow"), [(1080, False), (360, True)])
def test_labels_keep_apart_in_a_browser(browser: Browser, width: int, narrow: bool) -> None:
    cases = [ODD[case] for case in DENSE] + [assess(scenario_of(read_file(path))) for path in SCENARIOS]
    every = [drawing for case in cases for drawing in drawings(case, LIGHT, narrow=narrow)[:8]]
    page = browser.new_page(viewport={"width": width, "height": 800})
    page.set_content(f"<body style='margin:0'>{''.join(every)}</body>")
    found = page.evaluate(
        """() => [...document.querySelectorAll('svg')].map(svg => [...svg.querySelectorAll('text')].map(t => {
             const b = t.getBBox(), s = +t.getAttribute('font-size'), y = +t.getAttribute('y');
             return [t.textContent, b.x, y - 0.74 * s, b.x + b.width, y + 0.04 * s]}))"""
    )
    page.close()
    assert len(found) == len(every)
    for boxes in found:
        assert overlaps([(b[0], b[1], b[2], b[3], b[4]) for b in boxes]) == []
        assert [b[0] for b in boxes if b[1] < -1 or b[3] > width + 1] == []


@pytest.mark.parametrize("narrow", [False, True])
def test_water_lines_run_through_no_level_mark(narrow: bool) -> None:
    for assessment in (TANNERY_ROW, ODD["forty"]):
        drawing = ET.fromstring(line_drawing(assessment, system="US", palette=LIGHT, narrow=narrow))
        lines = [
            corners(path)[0][1] for path in paths(drawing, stroke=LIGHT.water) if len(corners(path)) == 2
        ]
        left = min(corners(path)[0][0] for path in paths(drawing, stroke=LIGHT.grid))
        marks = [
            node
            for node in estimated_boxes(drawing)
            if re.fullmatch(r"\d+\.\d\d", node[0]) and node[1] > left
        ]
        assert len(marks) >= 5
        assert [node for node in marks for y in lines if node[2] + 1 < y < node[4] - 1] == []


@given(
    st.lists(st.floats(0, 300), min_size=1, max_size=15).map(sorted), st.floats(1, 30), st.floats(100, 300)
)
def test_spread_labels_keep_order_distance_and_column(wanted: list[float], gap: float, high: float) -> None:
    places = spread(wanted, gap, 0.0, high)
    assert len(places) == len(wanted)
    least = min(gap, high / max(len(wanted) - 1, 1))
    assert all(b - a >= least - 1e-6 for a, b in pairwise(places))
    assert places[0] >= -1e-6
    assert places[-1] <= high + 1e-6
    if all(b - a >= gap for a, b in pairwise(wanted)) and wanted[-1] <= high:
        assert places == pytest.approx(wanted)


@given(st.text(max_size=60), st.floats(30, 200))
def test_words_fit_the_room_they_are_given(text: str, width: float) -> None:
    cut = shortened(text, width, 12)
    assert text_width(cut, 12) <= width
    rows = wrapped(text, width, 12, lines=2)
    assert len(rows) <= 2
    assert all(text_width(row, 12) <= width for row in rows)


def test_mark_labels_leave_water_lines_free() -> None:
    assert clear_of(10.0, [], 5.0) == 10.0
    assert clear_of(10.0, [11.0, 18.0], 5.0) == 6.0
    assert clear_of(12.0, [11.0, 18.0], 5.0) == 6.0
