"""The drawings stand where the figures say."""

import math
import xml.etree.ElementTree as ET
from itertools import pairwise

import numpy as np
import pytest
from shapely import MultiPolygon, Polygon
from shapely.geometry import box

from loads.assessment import Assessed, assess
from loads.states import Levels
from tests.webapp.drawing_cases import ODD, TANNERY_ROW, axis, corners, drawn, metres, paths, single, texts
from webapp.display import elevation
from webapp.drawing.line import line_drawing
from webapp.drawing.outlines import centre_across, front_rings
from webapp.drawing.palette import LIGHT


@pytest.mark.parametrize(
    "case", ["reverse", "far over the top", "arcs", "layers", "outline with a hole", "tilts"]
)
def test_resultant_and_pressure_stand_where_the_figures_say(case: str) -> None:
    barrier, drawing = single(case)
    (arrow,) = paths(drawing, stroke_width="3.4")
    tail, head = corners(arrow)
    acts = float(barrier.resultant.line_of_action[0])
    assert tail[1] == head[1]
    assert metres(drawing, tail[1]) == pytest.approx(acts, abs=0.01)
    assert math.copysign(1, head[0] - tail[0]) == math.copysign(1, float(barrier.resultant.horizontal[0]))
    (shape,) = paths(drawing, fill=LIGHT.load)
    points = corners(shape)
    base = points[-1][0]
    rows = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, 0)
    assert len(points) == len(rows) + 2
    greatest = max(rows, key=lambda row: abs(row[1]))[1]
    reach = base - points[[p for _, p in rows].index(greatest)][0]
    assert math.copysign(1, reach) == math.copysign(1, greatest)
    for (x, y), (z, p) in zip(points, rows, strict=False):
        assert metres(drawing, y) == pytest.approx(z, abs=0.01)
        assert (base - x) / reach == pytest.approx(p / greatest, abs=0.01)


@pytest.mark.parametrize("case", ["reverse", "negative", "circle", "outline with a hole"])
def test_water_lines_stand_at_their_levels(case: str) -> None:
    barrier, drawing = single(case)
    for side, width in (("flood", "2.2"), ("protected", "1.8")):
        level = float(barrier.levels.of(side)[0])
        if not math.isfinite(level):
            assert not paths(drawing, stroke=LIGHT.water, stroke_width=width)
            continue
        lines = paths(drawing, stroke=LIGHT.water, stroke_width=width)
        assert len(lines) == 2  # in front view and section
        for line in lines:
            assert metres(drawing, corners(line)[0][1]) == pytest.approx(level, abs=0.01)


@pytest.mark.parametrize("number_of_case", range(5))
def test_section_is_as_wide_as_it_is_high(number_of_case: int) -> None:
    barrier = ODD["tilts"].barriers[number_of_case]
    drawing = ET.fromstring(drawn(barrier, ODD["tilts"]))
    (face,) = paths(drawing, stroke_width="6")
    (x0, y0), (x1, y1) = corners(face)
    tilt = barrier.setting.panel.tilt_angle
    assert math.atan2(y0 - y1, x1 - x0) == pytest.approx(tilt, abs=0.002)
    length = math.hypot(x1 - x0, y1 - y0) * -axis(drawing)[1]
    assert length == pytest.approx(12, abs=0.05)


@pytest.mark.parametrize("number_of_case", [0, 1])
def test_arc_in_section_is_a_circle_about_its_centre(number_of_case: int) -> None:
    barrier = ODD["arcs"].barriers[number_of_case]
    drawing = ET.fromstring(drawn(barrier, ODD["arcs"]))
    (face,) = paths(drawing, stroke_width="6")
    points = corners(face)
    per_pixel = -axis(drawing)[1] * 0.3048
    arc_shape = barrier.setting.panel.arc_shape()
    centre = (points[0][0] + arc_shape.centre_x / per_pixel, points[0][1] - arc_shape.centre_z / per_pixel)
    for point in points:
        assert math.dist(point, centre) * per_pixel == pytest.approx(arc_shape.radius, abs=0.01)


@pytest.mark.parametrize("number_of_case", [0, 1])
@pytest.mark.parametrize("levels", [(104.0, 101.0), (100.0, 104.0)])
def test_arrow_in_the_section_of_an_arc_points_through_the_centre(
    number_of_case: int, levels: tuple[float, float]
) -> None:
    flood, protected = (np.array([level * 0.3048]) for level in levels)
    assessment = assess(ODD["arcs"].scenario, Levels(flood_side=flood, protected_side=protected))
    barrier = assessment.barriers[number_of_case]
    assert isinstance(barrier, Assessed)
    drawing = ET.fromstring(drawn(barrier, assessment))
    (face,) = paths(drawing, stroke_width="6")
    every = paths(drawing)
    line = paths(drawing, stroke_width="3", stroke=LIGHT.ink, fill="none")[0]
    foot, per_pixel = corners(face)[0], -axis(drawing)[1] * 0.3048
    shape = barrier.setting.panel.arc_shape()
    centre = (foot[0] + shape.centre_x / per_pixel, foot[1] - shape.centre_z / per_pixel)
    (x0, y0), (x1, y1) = corners(line)
    point = corners(every[every.index(line) + 1])[0]
    aside = (x1 - x0) * (centre[1] - y0) - (y1 - y0) * (centre[0] - x0)
    assert abs(aside) / math.hypot(x1 - x0, y1 - y0) < 0.5
    horizontal, vertical = (float(barrier.resultant.horizontal[0]), float(barrier.resultant.vertical[0]))
    assert (y1 - y0) / (x1 - x0) == pytest.approx(-vertical / horizontal, abs=0.01)
    assert math.copysign(1, x1 - x0) == math.copysign(1, horizontal)
    assert min(math.dist(point, corner) for corner in corners(face)) < 14
    assert abs(math.dist(point, centre) - shape.radius / per_pixel) < 5


def test_line_shows_heights_rated_levels_and_water_true_to_the_axis() -> None:
    assessment = TANNERY_ROW
    drawing = ET.fromstring(line_drawing(assessment, system="US", palette=LIGHT))
    for barrier in assessment.barriers:
        shape = paths(drawing, stroke=LIGHT.colour(barrier.verdict()), stroke_linejoin="round")[0]
        heights = [metres(drawing, y) for _, y in corners(shape)]
        assert isinstance(barrier, Assessed)
        assert min(heights) == pytest.approx(barrier.face.bottom, abs=0.02)
        assert max(heights) == pytest.approx(barrier.face.top, abs=0.02)
    tips = [corners(path)[1] for path in paths(drawing, fill=LIGHT.ink) if len(corners(path)) == 3]
    entered = [barrier.record.rated_level for barrier in assessment.barriers]
    rated = [level.value for level in entered if level]
    assert [metres(drawing, y) for _, y in tips[: len(rated)]] == pytest.approx(rated, abs=0.02)
    water = {
        width: metres(drawing, corners(paths(drawing, stroke=LIGHT.water, stroke_width=width)[0])[0][1])
        for width in ("2.4", "1.8")
    }
    levels = assessment.levels
    assert water["2.4"] == pytest.approx(float(levels.flood_side[0]), abs=0.02)
    assert water["1.8"] == pytest.approx(float(levels.protected_side[0]), abs=0.02)


def test_centre_of_pressure_across_agrees_with_many_small_cells() -> None:
    barrier = ODD["outline with a hole"].barriers[0]
    assert isinstance(barrier, Assessed)
    rings = front_rings(barrier.setting.panel, barrier.face)
    shape = Polygon(rings[0], rings[1:])
    force = moment = 0.0
    edges = np.linspace(barrier.face.bottom, barrier.face.top, 2001)
    for low, high in pairwise(edges):
        cell = shape.intersection(box(-100, low, 100, high))
        parts = cell.geoms if isinstance(cell, MultiPolygon) else [cell]
        for part in parts:
            push = float(barrier.diagram.pressure(np.array([part.centroid.y]))[0, 0]) * part.area
            force += push
            moment += push * part.centroid.x
    found = centre_across(barrier.setting.panel, rings, barrier.diagram, 0)
    assert found == pytest.approx(moment / force, rel=1e-5)
    assert abs(found) > 0.1


def test_reverse_pressure_stands_on_the_protected_side() -> None:
    _, drawing = single("reverse")
    (shape,) = paths(drawing, fill=LIGHT.load)
    points = corners(shape)
    assert max(x for x, _ in points) > points[-1][0]
    assert min(x for x, _ in points) == points[-1][0]
    assert "Protected side 4.00\u00a0ft higher" in texts(drawing)


def test_levels_beyond_the_drawing_are_said_and_do_not_flatten_it() -> None:
    _, drawing = single("far over the top")
    assert any(text.startswith("Flood side water at 154.60") for text in texts(drawing))
    (face,) = paths(drawing, stroke_width="6")
    (_, y0), (_, y1) = corners(face)
    assert y0 - y1 > 200
    line = ET.fromstring(line_drawing(ODD["far over the top"], system="US", palette=LIGHT))
    assert {"beyond", "the drawing", elevation(154.6 * 0.3048, "US")} <= set(texts(line))
    assert "over the top by 50.60\u00a0ft" in texts(line)


def test_outliers_are_named_instead_of_shrinking_the_others() -> None:
    line = ET.fromstring(line_drawing(ODD["outliers"], system="US", palette=LIGHT))
    told = " ".join(texts(line))
    assert "30.00 to 33.00" in told
    assert "150.00 to 153.00" in told
    start, slope = axis(line)
    assert -1 / slope > 15  # pixels to a foot
    assert start > 100
    assert any(text.startswith("180.00") for text in texts(line))
