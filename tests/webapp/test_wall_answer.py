"""Walls in the JSON and in the text table, against figures worked out by hand."""

import json
from typing import Any

import numpy as np
import pytest

from loads.assessment import AssessedWall, Withheld, assess
from loads.problems import ScenarioError
from loads.scenario_file import scenario_of
from loads.states import Levels
from loads.units import to_si
from loads.wall import stability, wall_result
from tests.webapp.wall_cases import block, i_wall, line, t_wall
from webapp.answer import answer
from webapp.text_table import table_text

ROUNDED = 1e-9


def told(*walls: dict[str, Any], flood: str, **water: str) -> list[dict[str, Any]]:
    document = line(*walls, flood=flood, **water)
    text = json.dumps(answer(assess(scenario_of(document)), document), allow_nan=False)
    return list(json.loads(text)["barriers"])


def plf(value: float) -> float:
    return to_si(value, "lb/ft", "line load")


def per_foot(value: float) -> float:
    return to_si(value, "lb·ft/ft", "moment per length")


def test_a_block_in_eight_feet_of_water_by_hand() -> None:
    (wall,) = told(block(), flood="8 ft")
    weight, push, lift = 150 * 60.0, 62.4 * 8**2 / 2, 62.4 * 8 * 6 / 2
    moment = push * 8 / 3 + lift * 4 - weight * 3
    assert (wall["kind"], wall["shape"], wall["per_length"]) == ("wall", "gravity", True)
    load = wall["load"]
    assert load["horizontal"] == pytest.approx(plf(push), rel=ROUNDED)
    assert load["vertical"] == pytest.approx(plf(lift - weight), rel=ROUNDED)
    assert load["moment"] == pytest.approx(per_foot(moment), rel=ROUNDED)
    assert load["line_of_action"] == pytest.approx(8 / 3 * 0.3048, rel=ROUNDED)
    assert load["about"] == pytest.approx({"x": 6 * 0.3048, "z": 0.0})
    assert load["by_load"]["uplift"]["moment"] == pytest.approx(per_foot(lift * 4), rel=ROUNDED)
    rows = {(row["name"], row["direction"]): row for row in wall["forces"] if row["value"]}
    water = rows["water, flood side", "horizontal"]
    assert water["value"] == pytest.approx(plf(push), rel=ROUNDED)
    assert water["arm"] == pytest.approx(8 / 3 * 0.3048, rel=ROUNDED)
    assert sum(row["moment"] for row in wall["forces"]) == pytest.approx(per_foot(moment), rel=ROUNDED)
    normal = weight - lift
    place = -moment / normal
    base = wall["base"]
    assert base["from_toe"] == pytest.approx(place * 0.3048, rel=ROUNDED)
    assert base["compressed"] == 1.0
    tilt = 6 * (3 - place) / 6
    for end, sign in (("toe", 1), ("heel", -1)):
        pressure = to_si(normal / 6 * (1 + sign * tilt), "psf", "pressure")
        assert base[end] == pytest.approx(pressure, rel=ROUNDED)
    (band,) = wall["sliding"]
    wanted = {
        "factor": 0.5 * normal,
        "low": 0.45 * normal,
        "high": 0.55 * normal,
        "low_without_uplift": 0.45 * weight,
        "high_without_uplift": 0.55 * weight,
    }
    assert {name: band[name] for name in wanted} == pytest.approx(
        {name: resisting / push for name, resisting in wanted.items()}, rel=ROUNDED
    )
    assert wall["flotation"] == pytest.approx(weight / lift, rel=ROUNDED)
    checks = {check["check"]: check for check in wall["checks"]}
    assert checks["sliding on the base"]["ratio"] == pytest.approx(1.5 * push / (0.5 * normal), rel=ROUNDED)
    assert wall["criteria"]["edition"] == "rev 2"
    assert wall["recheck"]["agrees"] is True


def test_the_first_limit_of_the_block_is_where_the_resultant_leaves_the_middle_third() -> None:
    (wall,) = told(block(), flood="4 ft")
    first = wall["first_limit"]
    assert first["check"] == "resultant location"
    # 27000 − 748.8·h − 10.4·h³ = 2·(9000 − 187.2·h), h in feet
    (head,) = [float(root.real) for root in np.roots([10.4, 0, 374.4, -9000]) if abs(root.imag) < 1e-9]
    assert first["level"] == pytest.approx(head * 0.3048, abs=0.0005)


def test_an_i_wall_tells_force_about_the_ground_and_its_embedment() -> None:
    (wall,) = told(i_wall(), flood="100 ft")
    assert (wall["kind"], wall["shape"]) == ("wall", "I")
    assert wall["load"]["horizontal"] == pytest.approx(plf(62.4 * 2**2 / 2), rel=ROUNDED)
    assert wall["load"]["moment"] == pytest.approx(per_foot(62.4 * 2**3 / 6), rel=ROUNDED)
    assert wall["load"]["about"] == pytest.approx({"x": 0.0, "z": 98 * 0.3048})
    sheet = wall["i_wall"]
    assert sheet["embedment_provided"] == pytest.approx(20 * 0.3048, rel=ROUNDED)
    assert sheet["embedment_required"] == pytest.approx(1.2 * sheet["embedment_balanced"], rel=ROUNDED)
    (embedment,) = [check for check in wall["checks"] if check["check"] == "embedment"]
    assert embedment["demand"] == pytest.approx(sheet["embedment_required"], rel=ROUNDED)


@pytest.mark.parametrize("flood", ["60 ft", "96 ft", "100 ft", "104 ft", "107 ft"])
def test_no_figure_of_any_wall_is_outside_json(flood: str) -> None:
    for behind in ({}, {"protected_side": "101 ft"}):
        walls = told(
            block(base="92 ft"), t_wall(), i_wall(), i_wall(id="I2", tip="96 ft"), flood=flood, **behind
        )
        assert {wall["recheck"]["agrees"] for wall in walls} == {True}


def test_the_first_limit_of_an_i_wall_is_where_its_sheet_becomes_too_short() -> None:
    short = i_wall(tip="90 ft")
    (wall,) = told(short, flood="100 ft")
    first = wall["first_limit"]
    assert first["check"] == "embedment"
    (at,) = told(short, flood=f"{first['level'] / 0.3048:.6f} ft")
    (ratio,) = [check["ratio"] for check in at["checks"] if check["check"] == "embedment"]
    assert ratio == pytest.approx(1.0, abs=2e-3)


def test_the_text_table_shows_a_wall_per_length_with_head_above_the_ground() -> None:
    document = line(t_wall(), flood="100 ft")
    text = table_text(assess(scenario_of(document)), document)
    (row,) = [row for row in text.splitlines() if row.startswith("T1 ")]
    assert "4.00 ft" in row
    assert "lb/ft" in row
    assert "lb·ft/ft" in row
    assert "walls: per unit of length" in text


def test_a_wall_whose_computations_disagree_is_withheld(monkeypatch: pytest.MonkeyPatch) -> None:
    whole = stability.stability

    def broken(*given: Any, **named: Any) -> Any:
        found = whole(*given, **named)
        found.horizontal[:] *= 1.001
        return found

    monkeypatch.setattr(wall_result, "stability", broken)
    document = line(block(), flood="8 ft")
    assessment = assess(scenario_of(document))
    (barrier,) = assessment.barriers
    assert isinstance(barrier, Withheld)
    (wall,) = answer(assessment, document)["barriers"]
    assert wall["verdict"] == "withheld"
    assert wall["load"] is None
    assert wall["recheck"]["first"]["horizontal"] == pytest.approx(
        1.001 * wall["recheck"]["second"]["horizontal"], rel=ROUNDED
    )
    assert "withheld" in table_text(assessment, document)


def test_a_material_that_no_table_knows_is_told_by_the_table_of_the_file() -> None:
    with pytest.raises(ScenarioError) as caught:
        assess(scenario_of(line(i_wall(material="green cheese"), flood="100 ft")))
    assert [problem.path for problem in caught.value.problems] == ["i_wall[I1].material"]


def test_many_states_are_the_states_one_by_one() -> None:
    document = line(t_wall(), i_wall(), flood="100 ft")
    scenario = scenario_of(document)
    flood = np.array([97.0, 100.0, 103.0]) * 0.3048
    levels = Levels(flood_side=flood, protected_side=np.full(3, -np.inf))
    many = assess(scenario, levels)
    for i, level in enumerate(levels.flood_side):
        alone = Levels(flood_side=np.array([level]), protected_side=np.array([-np.inf]))
        one = assess(scenario, alone)
        for single, among in zip(one.barriers, many.barriers, strict=True):
            assert isinstance(single, AssessedWall)
            assert isinstance(among, AssessedWall)
            assert single.verdict() == among.verdict(i)
            assert single.resultant.moment[0] == pytest.approx(among.resultant.moment[i], rel=1e-8)
