"""Thrust on faces of every shape against tables computed to 30 digits, and against other quadrature."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

import mpmath
import numpy as np
import pytest
from scipy.integrate import dblquad

from loads.diagram import Diagram
from tests.agreement import Agree, printed
from tests.oracles.fluids import GRAVITY, layered, mud, under
from tests.scenes import arm


def test_h1_partly_wet_rectangle(agree: Agree) -> None:
    found = under({"width": "2 m", "height": "1.5 m"}, 1.2).resultant
    agree(found.horizontal, printed("14121.576"), what="force, N")
    agree(1.2 - found.line_of_action, printed("0.8"), rel=1e-9, why="exact", what="depth, m")
    agree(found.moment, printed("5648.6304"), what="moment about the bottom, N·m")


def test_h2_submerged_rectangle(agree: Agree) -> None:
    found = under({"bottom": "-1.8 m", "width": "2 m", "height": "1 m"}, 0.0).resultant
    agree(found.horizontal, printed("25497.29"), what="force, N")
    agree(-found.line_of_action, printed("1.364102564"), what="depth, m")


@pytest.mark.parametrize(
    ("tilt", "row"),
    [
        (30, ("29419.95", "1.166666667", "1.083333333", "14709.975", "25478.42408")),
        (45, ("35513.02115", "1.195262146", "1.345177969", "25111.49807", "25111.49807")),
        (60, ("40188.39908", "1.211324865", "1.549038106", "34804.17454", "20094.19954")),
    ],
)
def test_h3_inclined(agree: Agree, tilt: float, row: tuple[str, ...]) -> None:
    force, along, depth, across, down = row
    bottom = -0.5 - 2 * math.sin(math.radians(tilt))
    face = {"bottom": f"{bottom!r} m", "width": "1.5 m", "height": "2 m", "tilt": f"{tilt} deg"}
    found = under(face, 0.0).resultant
    agree(found.total, printed(force), what="force, N")
    agree(2 - arm(found), printed(along), what="centre of pressure from the upper edge, m")
    agree(-found.line_of_action, printed(depth), what="depth, m")
    agree(found.horizontal, printed(across), what="horizontal part, N")
    agree(-found.vertical, printed(down), what="vertical part, N")


def test_h4_inclined_and_partly_wet(agree: Agree) -> None:
    face = {"bottom": "-1.6 m", "width": "1 m", "height": "2.5 m", "tilt": "60 deg"}
    found = under(face, 0.0).resultant
    agree(found.total, printed("14494.39236"), what="force, N")
    agree(arm(found), printed("0.6158402871"), what="arm from the toe, m")
    agree(found.horizontal, printed("12552.512"), what="horizontal part, N")
    agree(-found.vertical, printed("7247.196182"), what="vertical part, N")


@pytest.mark.parametrize(
    ("middle", "force", "depth"),
    [(1.5, "16636.58978", "1.56"), (0.2, "2754.418962", "0.4781362136")],
)
def test_h5_h6_disc(agree: Agree, middle: float, force: str, depth: str) -> None:
    disc = {"shape": "circle", "bottom": f"{-middle - 0.6!r} m", "diameter": "1.2 m"}
    found = under(disc, 0.0).resultant
    agree(found.horizontal, printed(force), what="force, N")
    agree(-found.line_of_action, printed(depth), what="depth, m")


def ring(radius: float, middle: tuple[float, float], start: float, end: float) -> list[list[str]]:
    angles = np.radians(np.linspace(start, end, 199))
    across, up = middle
    return [
        [f"{across + radius * math.cos(a)!r} m", f"{max(up + radius * math.sin(a), 0.0)!r} m"] for a in angles
    ]


FACETED = "the curve is drawn with 199 corners"


def test_h7_semicircle(agree: Agree) -> None:
    corners = ring(0.8, (0, 0.8), 180, 360)
    found = under({"shape": "outline", "bottom": "-1.1 m", "points": corners}, 0.0).resultant
    agree(found.horizontal, printed("6304.952495"), rel=1e-4, why=FACETED, what="force, N")
    agree(-found.line_of_action, printed("0.709455288"), rel=1e-4, why=FACETED, what="depth, m")


@pytest.mark.parametrize(
    ("level", "force", "below_top"),
    [(0.4, "25595.3565", "0.8563218391"), (-0.5, "6755.692222", "1.145161290")],
)
def test_h8_trapezoid(agree: Agree, level: float, force: str, below_top: str) -> None:
    face = {"shape": "trapezoid", "bottom": "-1.5 m", "bottom_width": "1.2 m", "top_width": "2 m"}
    found = under({**face, "height": "1.5 m"}, level).resultant
    agree(found.horizontal, printed(force), what="force, N")
    agree(-found.line_of_action, printed(below_top), what="centre of pressure below the upper edge, m")


Ring = Sequence[tuple[float, float]]
SEVEN = [(0, 0), (2, 0.2), (2.6, 1), (2.2, 1.9), (1.1, 2.3), (0.3, 1.8), (-0.4, 0.9)]
TRAPEZOID = [(0.4, 0), (1.6, 0), (2, 1.5), (0, 1.5)]
U = [(0, 0), (3, 0), (3, 2), (2, 2), (2, 1), (1, 1), (1, 2), (0, 2)]
PLATE = [(0, 0), (2, 0), (2, 1.5), (0, 1.5)]
SQUARE = [(0.75, 0.5), (1.25, 0.5), (1.25, 1), (0.75, 1)]


def outline(points: Ring, *holes: Ring) -> dict[str, Any]:
    rings = [[[f"{x} m", f"{y} m"] for x, y in ring] for ring in (points, *holes)]
    return {"shape": "outline", "points": rings[0], **({"holes": rings[1:]} if holes else {})}


@pytest.mark.parametrize(
    ("panel", "level", "force", "height"),
    [
        (outline(SEVEN), 1.4, "20342.805797", "0.5629819581"),
        (outline(SEVEN), 3.0, "90011.971467", "0.9070480462"),
        (outline(PLATE, SQUARE), 0.9, "7551.1205", "0.2826839827"),
        (outline(PLATE, SQUARE), 2.0, "33710.359375", "0.5878787879"),
    ],
)
def test_h9_h10_outlines(agree: Agree, panel: dict[str, Any], level: float, force: str, height: str) -> None:
    found = under(panel, level).resultant
    agree(found.horizontal, printed(force), what="force, N")
    agree(found.line_of_action, printed(height), what="height of the centre of pressure, m")


@pytest.mark.parametrize(
    ("level", "force", "height"),
    [(0.9, "7643.377817", "0.2859695786"), (2.0, "34368.02347", "0.5903703895")],
)
def test_h10_round_hole(agree: Agree, level: float, force: str, height: str) -> None:
    panel = outline(PLATE) | {"holes": [ring(0.25, (1, 0.75), 0, 360 * 198 / 199)]}
    found = under(panel, level).resultant
    agree(found.horizontal, printed(force), rel=1e-4, why=FACETED, what="force, N")
    agree(found.line_of_action, printed(height), rel=1e-4, why=FACETED, what="height of the centre, m")


def test_h11_both_sides(agree: Agree) -> None:
    barrier = under({"width": "1 m", "height": "2 m"}, 1.8, 0.6)
    found = barrier.resultant
    agree(found.horizontal, printed("14121.576"), what="net force, N")
    agree(barrier.by_load["water, flood side"].horizontal, printed("15886.773"), what="flood side, N")
    agree(-barrier.by_load["water, protected side"].horizontal, printed("1765.197"), what="protected side, N")
    agree(found.moment, printed("9179.0244"), what="moment, N·m")
    agree(found.line_of_action, printed("0.65"), rel=1e-9, why="exact", what="arm, m")
    inclined = under({"width": "1 m", "height": "2.5 m", "tilt": "60 deg"}, 1.8, 0.6).resultant
    agree(inclined.total, printed("16306.19141"), what="inclined: net force, N")
    agree(inclined.moment, printed("12238.6992"), what="inclined: moment about the toe, N·m")
    agree(arm(inclined), printed("0.7505553499"), what="inclined: arm along the face, m")


def test_h12_two_waters(agree: Agree) -> None:
    wall = {"width": "1 m", "height": "1.8 m", "sediment": [mud(1.0, 1025)]}
    found = under(wall, 1.8).resultant
    agree(found.horizontal, printed("16009.35612"), what="force, N")
    agree(1.8 - found.line_of_action, printed("1.202041858"), what="depth, m")
    agree(found.moment, printed("9572.924842"), what="moment, N·m")


def test_h13_three_fluids(agree: Agree) -> None:
    upright = layered({"width": "1 m", "height": "1.7 m"}, 1.7)
    agree(upright.resultant.horizontal, printed("13915.63635"), what="force, N")
    agree(1.7 - upright.resultant.line_of_action, printed("1.156025370"), what="depth, m")
    agree(upright.diagram.pressure(np.array([0.0])), printed("17946.1695"), what="pressure at the bed, Pa")
    agree(upright.resultant.moment, printed("7569.753135"), what="moment, N·m")
    length = 1.7 / math.sin(math.radians(60))
    leaning = layered({"width": "1 m", "height": f"{length!r} m", "tilt": "60 deg"}, 1.7).resultant
    agree(leaning.total, printed("16068.39279"), what="at 60°: force, N")
    agree(length - arm(leaning), printed("1.334863117"), what="at 60°: distance from the surface, m")
    agree(leaning.horizontal, printed("13915.63635"), what="at 60°: horizontal part, N")
    agree(-leaning.vertical, printed("8034.196393"), what="at 60°: vertical part, N")
    disc = layered({"shape": "circle", "bottom": "-1.5 m", "diameter": "1.2 m"}, 0.0).resultant
    agree(disc.horizontal, printed("9576.211296"), what="disc: force, N")
    agree(-disc.line_of_action, printed("1.008855178"), what="disc: depth, m")


CIRCLE = {"shape": "circle", "diameter": "1.2 m"}


@pytest.mark.parametrize(
    ("panel", "cut", "row"),
    [
        (outline(SEVEN), 9.0, ("4.735", "1.0615276311", "1.4179166168")),
        (outline(SEVEN), 1.4, ("3.3272222222", "0.7765403239", "0.4430031012")),
        (outline(TRAPEZOID), 9.0, ("2.4", "0.8125", "0.440625")),
        (outline(TRAPEZOID), 1.0, ("1.4666666667", "0.5303030303", "0.1208754209")),
        (outline(U), 9.0, ("5", "0.9", "1.6166666667")),
        (outline(PLATE, SQUARE), 9.0, ("2.75", "0.75", "0.5572916667")),
        (outline(PLATE, SQUARE), 0.9, ("1.6", "0.41875", "0.1047708333")),
        (CIRCLE, 9.0, ("1.1309733553", "0.6", "0.1017876020")),
    ],
)
def test_areas_and_their_moments(
    agree: Agree, panel: dict[str, Any], cut: float, row: tuple[str, ...]
) -> None:
    area, height, second = row
    face = under(panel, -1.0).face
    even = Diagram.of_terms(1, [(cut, 1.0, 0.0)])
    growing = Diagram.of_terms(1, [(cut, 0.0, 1.0)])
    size = face.resultant(even)
    about_bottom = cut * size.moment - face.resultant(growing).moment
    agree(size.total, printed(area), rel=1e-9, why="exact", what="area, m²")
    agree(size.moment / size.total, printed(height), rel=1e-9, why="exact", what="height of the centroid, m")
    inertia = about_bottom - size.moment**2 / size.total
    agree(inertia, printed(second), rel=1e-8, why="printed to ten digits", what="second moment of area, m⁴")


RANDOM = np.random.default_rng(20310402)
DISCS = [tuple(float(part) for part in row) for row in RANDOM.uniform((0.4, 20, 0.1), (5, 160, 2.0), (6, 3))]


@pytest.mark.parametrize(("diameter", "tilt", "share"), DISCS)
def test_leaning_disc_by_double_integration(agree: Agree, diameter: float, tilt: float, share: float) -> None:
    sine = math.sin(math.radians(tilt))
    level = share * diameter * sine
    disc = {"shape": "circle", "diameter": f"{diameter!r} m", "tilt": f"{tilt!r} deg"}
    found = under(disc, level).resultant
    wet = min(diameter, level / sine)

    def half(s: float) -> float:
        return math.sqrt(max(s * (diameter - s), 0.0))

    def total(power: int) -> float:
        value = dblquad(
            lambda _, s: 1000 * GRAVITY * (level - s * sine) * s**power, 0, wet, lambda s: -half(s), half
        )[0]
        return float(value)

    agree(found.total, total(0), rel=1e-7, what="force, N")
    agree(found.moment, total(1), rel=1e-7, what="moment, N·m")


def segment_load(level: float, power: int) -> mpmath.mpf:
    """∫ (level − y) yⁿ b dy over the wetted part of a disc of 3 m, for unit weight one."""
    with mpmath.workdps(30):
        return mpmath.quad(
            lambda y: (level - y) * y**power * 2 * mpmath.sqrt(y * (3 - y)), [0, mpmath.mpf(level) / 2, level]
        )


@pytest.mark.parametrize("share", [0.001, 0.03, 0.099, 0.101, 0.6, 1.0])
def test_wetted_segment_of_a_disc_to_thirty_digits(agree: Agree, share: float) -> None:
    found = under({"shape": "circle", "diameter": "3 m"}, share * 3).resultant
    force, moment = (float(9806.65 * segment_load(share * 3, power)) for power in (0, 1))
    agree(found.total, force, rel=1e-12, what="force, N")
    agree(found.moment, moment, rel=1e-12, what="moment, N·m")
