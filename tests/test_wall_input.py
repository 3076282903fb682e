"""What can be wrong with a wall has its sentence."""

from __future__ import annotations

from typing import Any

import pytest
from pydantic import ValidationError

from loads.problems import ScenarioError
from loads.records.wall import Wall
from tests.i_walls import I_WALL, i_wall_of
from tests.walls import BLOCK, SOIL, TEE, assessed_wall, wall_of


def rules(error: ValidationError) -> list[str]:
    found = []
    for item in error.errors(include_url=False):
        if item["type"] == "rules":
            found += [f"{path}: {rule}" for path, _, rule in item["ctx"]["problems"]]
        else:
            found.append(".".join(map(str, item["loc"])) + f": {item['msg']}")
    return found


def corners(*points: tuple[float, float]) -> dict[str, Any]:
    part = {"name": "wall", "unit_weight": "24 kN/m3", "points": [[f"{x} m", f"{z} m"] for x, z in points]}
    return {"shape": "parts", "part": [part]}


KEY = {"depth": "3 m", "width": "0.4 m", "position": "0 m"}
SHALLOW = {"friction_angle": "30 deg", "saturated_unit_weight": "20 kN/m3", "depth": "2 m"}
UNWEIGHED = {"friction_angle": "30 deg"}


@pytest.mark.parametrize(
    ("table", "sentence"),
    [
        (
            corners((0, 0), (2, 2), (2, 0), (0, 2)),
            "part[0].points: do not make a closed outline: self-intersection",
        ),
        (corners((0, 0), (1, 0), (2, 0)), "part[0].points: enclose no area; the corners lie on one line"),
        (corners((0, 1), (1, 1), (1, 2)), "base: must be the elevation of the base's two ends"),
        (
            TEE | {"key": KEY, "foundation": SHALLOW},
            'key.depth: must be less than the depth of the foundation, "2 m"',
        ),
        (
            TEE | {"drain": {"position": "4 m", "effectiveness": 0.5}},
            "drain.position: must lie within the base, which is 3.7 m",
        ),
        (
            TEE | {"cutoff": [{"position": "9 m", "depth": "1 m"}]},
            "cutoff[0].position: must lie within the base",
        ),
        (TEE | {"protected_ground": "4.5 m"}, "protected_ground: must not lie above the top of the wall"),
        (
            TEE | {"sediment": [SOIL[0] | {"top": "4.1 m"}]},
            "sediment[0].top: must not lie above the top of the wall",
        ),
        (
            TEE | {"flood_batter": "1 m"},
            "stem_width: must not be less than top_width and flood_batter together",
        ),
        (TEE | {"toe": None}, 'toe: is missing; shape "T" needs it'),
        (TEE | {"base_width": "3 m"}, 'base_width: is not used by shape "T"; leave it out'),
        (TEE | {"shape": "L"}, 'heel: or toe must be given with shape "L", one of them and not both'),
        (
            TEE | {"key": KEY, "foundation": UNWEIGHED},
            "foundation.saturated_unit_weight: is missing; a key needs it",
        ),
    ],
)
def test_geometry(table: dict[str, Any], sentence: str) -> None:
    with pytest.raises(ValidationError) as refusal:
        wall_of(table)
    found = rules(refusal.value)
    assert any(rule.startswith(sentence) for rule in found), found


@pytest.mark.parametrize(
    ("foundation", "sentence"),
    [
        ({"friction_angle": "0 deg"}, "friction_angle: must be more than 0 deg, or adhesion must be"),
        ({}, "friction_angle: is missing; give it, or friction_coefficient"),
        ({"friction_angle": "30 deg", "friction_coefficient": 0.5}, "friction_coefficient: must be left out"),
        (
            {"friction_coefficient": 0.5, "friction_coefficient_low": 0.6},
            "friction_coefficient: must lie between its low and its high",
        ),
        ({"friction_angle": "30 deg", "bearing_method": "Meyerhof"}, "soil_friction_angle: is missing"),
    ],
)
def test_foundation(foundation: dict[str, Any], sentence: str) -> None:
    with pytest.raises(ValidationError) as refusal:
        wall_of(BLOCK | {"foundation": foundation})
    found = rules(refusal.value)
    assert any(rule.startswith(sentence) for rule in found), found


def test_adhesion_alone_holds() -> None:
    wall = wall_of(BLOCK | {"foundation": {"friction_angle": "0 deg", "adhesion": "20 kPa"}})
    assert isinstance(wall, Wall)


def test_names_that_no_table_knows() -> None:
    below = {"friction_coefficient": 0.5, "material": "clay?"}
    table = BLOCK | {"criteria": "some manual", "foundation": below}
    with pytest.raises(ScenarioError) as refusal:
        assessed_wall(table, 1.0)
    paths = [problem.path for problem in refusal.value.problems]
    assert paths == ["wall[W1].criteria", "wall[W1].foundation.material"]
    assert "EM 1110-2-2100 normal ordinary" in str(refusal.value)


def test_parts_that_do_not_join() -> None:
    one = corners((0, 0), (1, 0), (1, 2), (0, 2))["part"][0]
    apart = corners((3, 0), (4, 0), (4, 2), (3, 2))["part"][0]
    over = corners((0.5, 0), (1.5, 0), (1.5, 2), (0.5, 2))["part"][0]
    for other, words in ((apart, "must join to one outline"), (over, "must not overlap")):
        with pytest.raises(ScenarioError, match=words):
            assessed_wall({"shape": "parts", "part": [one, other]}, 1.0)


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        ({"tip": "4 m"}, 'tip: must lie below the top, "3 m"'),
        ({"gap": "to depth"}, 'gap_depth: is missing; gap "to depth" needs it'),
        ({"gap_depth": "1 m"}, 'gap_depth: is not used by gap "none"; leave it out'),
        ({"sediment": I_WALL["sediment"][:1]}, "sediment: has no layer on the protected side"),
        (
            {"sediment": [*I_WALL["sediment"], {**I_WALL["sediment"][1], "top": "-1 m"}]},
            "sediment[2].top: is a second layer of its side",
        ),
        (
            {"sediment": [I_WALL["sediment"][0], {**I_WALL["sediment"][1], "pressure": "at rest"}]},
            "sediment[1].pressure: must be passive on the protected side of an I-wall",
        ),
    ],
)
def test_i_wall(change: dict[str, Any], sentence: str) -> None:
    with pytest.raises(ValidationError) as refusal:
        i_wall_of(I_WALL | change)
    found = rules(refusal.value)
    assert any(rule.startswith(sentence) for rule in found), found
