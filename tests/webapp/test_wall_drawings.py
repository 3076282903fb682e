"""Drawings of walls: what they say, where the base diagrams end, and that they are drawn in any state."""

import re

import numpy as np
import pytest

from loads.assessment import AssessedWall, Barrier, Withheld
from loads.wall.wall_result import WallResult
from tests.webapp.wall_cases import assessed, block, i_wall, sand, t_wall
from webapp.drawing.facts import facts
from webapp.drawing.line import line_drawing
from webapp.drawing.palette import LIGHT
from webapp.drawing.section import barrier_drawing
from webapp.drawing.wall_base import base_edge, uplift_edge
from webapp.drawing.wall_shape import outline_of

WALLS = {
    "block": block(),
    "T": t_wall(),
    "T with key, cutoff and drain": t_wall(
        key={"depth": "2 ft", "width": "1 ft 6 in", "position": "0 ft"},
        cutoff=[{"position": "0 ft", "depth": "40 ft"}],
        drain={"position": "4 ft", "effectiveness": 0.5},
        uplift="line of creep",
        foundation=t_wall()["foundation"] | {"saturated_unit_weight": "122 pcf"},
    ),
    "I": i_wall(),
    "I, gap to the tip": i_wall(gap="to tip", gap_depth=None),
    "I, no gap": i_wall(gap="none", gap_depth=None),
}
LEVELS = ("60 ft", "93 ft", "100 ft", "104 ft", "107 ft")


def only(*walls: dict[str, object], flood: str, **water: str) -> Barrier:
    trimmed = [{key: value for key, value in wall.items() if value is not None} for wall in walls]
    (barrier,) = assessed(*trimmed, flood=flood, **water).barriers
    return barrier


def drawn(barrier: Barrier, *, narrow: bool = False) -> str:
    return barrier_drawing(barrier, system="US", palette=LIGHT, datum="NAVD88", narrow=narrow)


def found_of(barrier: Barrier) -> WallResult:
    assert isinstance(barrier, AssessedWall)
    assert isinstance(barrier.found, WallResult)
    return barrier.found


@pytest.mark.parametrize("narrow", [False, True])
@pytest.mark.parametrize("flood", LEVELS)
@pytest.mark.parametrize("name", WALLS)
def test_walls_are_drawn_within_their_sheet(name: str, flood: str, *, narrow: bool) -> None:
    svg = drawn(only(WALLS[name], flood=flood), narrow=narrow)
    box = re.search(r'viewBox="0 0 ([\d.]+) ([\d.]+)"', svg)
    assert box is not None
    width, height = float(box[1]), float(box[2])
    for x, y in re.findall(r'<text x="(-?[\d.]+)" y="(-?[\d.]+)"', svg):
        assert 0 <= float(x) <= width
        assert 0 <= float(y) <= height + 1
    for data in re.findall(r' d="([^"]+)"', svg):
        if "pattern" not in data:
            for x, _ in re.findall(r"(-?[\d.]+) (-?[\d.]+)", data):
                assert -20 <= float(x) <= width + 1


def test_facts_of_the_block_are_those_of_the_hand() -> None:
    told = " ".join(facts(only(block(), flood="8 ft"), system="US", datum="NAVD88"))
    told = re.sub(r"[\u00a0\u202f]", " ", told)
    for words in (
        "Block: near limit",
        "Resultant 2.09 ft from the toe of 6.00 ft.",
        "100 % of the base in compression.",
        "Sliding factor on the base 1.88, 1.69 to 2.07 over the friction.",
        "Without uplift 2.03 to 2.48.",
        "Base pressure 2 390 psf at the toe, 113 psf at the heel.",
        "Horizontal force 2 000 lb/ft toward the protected side.",
        "Compression on the base 7 500 lb/ft.",
        "Uplift 1 500 lb/ft.",
        "Criteria in force: Basis of design, rev 2",
    ):
        assert words in told, told


def test_base_and_uplift_diagrams_carry_the_forces() -> None:
    for flood in ("8 ft", "9 ft", "9.6 ft"):
        found = found_of(only(block(), flood=flood))
        for edge, force in (
            (base_edge(found, 0), float(found.stability.base.normal[0])),
            (uplift_edge(found, 0), float(found.stability.uplift.push.vertical[0])),
        ):
            x, p = np.array(edge).T
            assert float(np.trapezoid(p, x)) == pytest.approx(force, rel=1e-9)


def test_a_wall_with_a_cracked_base_is_drawn_open_at_its_heel() -> None:
    found = found_of(only(block(), flood="9.6 ft"))
    first, second, last = base_edge(found, 0)
    assert first == (0.0, 0.0)
    assert second[1] == 0.0
    assert second[0] == pytest.approx(float(found.stability.cracks.heel[0]), rel=1e-6)
    assert last[1] > 0


def test_the_flood_line_draws_walls_as_their_outlines() -> None:
    assessment = assessed(block(base="92 ft"), t_wall(), i_wall(), flood="100 ft")
    for narrow in (False, True):
        svg = line_drawing(assessment, system="US", palette=LIGHT, narrow=narrow)
        for identifier in ("B1", "T1", "I1"):
            assert f">{identifier}</text>" in svg
    barrier = assessment.barrier("T1")
    assert isinstance(barrier, AssessedWall)
    ring = outline_of(barrier.record)
    assert max(z for _, z in ring) == pytest.approx(104 * 0.3048)
    assert max(x for x, _ in ring) == pytest.approx(11.5 * 0.3048)


def test_a_withheld_wall_shows_its_section_and_no_figure() -> None:
    barrier = only(t_wall(), flood="100 ft")
    withheld = Withheld(
        record=barrier.record,
        setting=barrier.setting,
        first=(13578.2, 1.0),
        second=(13579.9, 1.0),
        difference=1e-4,
    )
    for narrow in (False, True):
        svg = drawn(withheld, narrow=narrow)
        assert "withheld" in svg
        assert "lb/ft" not in svg
        assert "resultant" not in svg
        assert "100.00" in svg


def test_ground_of_two_layers_is_drawn_with_both() -> None:
    layers = [sand("flood", "at rest", "96 ft"), sand("flood", "at rest", "94 ft")]
    svg = drawn(only(t_wall(sediment=layers), flood="100 ft"))
    assert "-mud)" in svg
    assert "-soil)" in svg
