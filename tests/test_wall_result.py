"""Walls from record to result: members, checks, first-limit level, remarks and worked steps."""

from __future__ import annotations

import numpy as np
import pytest

from loads.states import DRY
from loads.wall.criteria import CRITERIA
from loads.wall.wall_working import wall_working
from tests.walls import BLOCK, SOIL, TEE, assessed_wall, stable

PLAIN = TEE | {"flood_batter": "0 m", "stem_width": "0.4 m"}
HELD = PLAIN | {
    "criteria": "EM 1110-2-2100 normal ordinary",
    "sediment": SOIL,
    "foundation": {
        "friction_angle": {"value": "30 deg", "low": "26 deg", "high": "33 deg"},
        "saturated_unit_weight": "20 kN/m3",
        "allowable_bearing": {"value": "150 kPa", "source": "trial report"},
        "material": "medium clay",
        "exit_gradient_factor": 3.0,
    },
    "limits": {"stem_moment": "60 kN·m/m", "freeboard": "0.5 m"},
}


def test_stem_bends_as_a_cantilever_under_a_triangle() -> None:
    result = assessed_wall(PLAIN, [1.5, 2.5, 3.5])
    stem = next(member for member in result.members if member.name == "stem")
    head = np.array([1.0, 2.0, 3.0])
    assert stem.root_shear == pytest.approx(9810 * head**2 / 2)
    assert stem.root_moment == pytest.approx(9810 * head**3 / 6)
    assert stem.moment(np.array([1.5]))[2, 0] == pytest.approx(9810 * 2**3 / 6)


def test_slabs_and_stem_balance_what_presses_under_the_stem() -> None:
    result = assessed_wall(PLAIN, 2.5)
    base, width = result.stability.base, 3.4
    assert base.compressed.item() == 1

    def upward(x: float) -> float:
        share = x / width
        under = base.linear_heel.item() * (1 - share) + base.linear_toe.item() * share
        return under + 9810 * 2.5 * (1 - share)

    heel, toe = (next(m for m in result.members if m.name == name) for name in ("heel", "toe"))
    under_stem = 0.4 * (upward(2.0) + upward(2.4)) / 2
    stem_weight = 24e3 * 0.4 * 4.0
    assert (heel.root_shear + toe.root_shear).item() + under_stem == pytest.approx(stem_weight)
    x = np.linspace(2.4, width, 20001)
    load = np.array([upward(place) for place in x]) - 24e3 * 0.5
    assert toe.root_shear.item() == pytest.approx(np.trapezoid(load, x))
    assert toe.root_moment.item() == pytest.approx(np.trapezoid(load * (x - 2.4), x))
    x = np.linspace(0, 2.0, 20001)
    load = np.array([upward(place) for place in x]) - 24e3 * 0.5 - 9810 * 2.0
    assert heel.root_moment.item() == pytest.approx(np.trapezoid(load * (2.0 - x), x))


def test_band_runs_from_low_friction_with_uplift_to_high_without() -> None:
    band = assessed_wall(HELD, 2.5).stability.sliding
    assert band.low.item() < band.factor.item() < band.high.item()
    assert band.high.item() < band.high_without_uplift.item()
    assert band.low.item() < band.low_without_uplift.item()


def test_checks_carry_limit_source_and_remarks() -> None:
    result = assessed_wall(HELD, 2.5)
    found = {check.name: check for check in result.checks}
    sliding = found["sliding on the base"]
    assert sliding.limit_value == 1.5
    assert sliding.ratio.item() == pytest.approx(1.5 / sliding.demand.item())
    assert "to be confirmed" in sliding.source
    assert "factor = (N·tan δ" in sliding.remarks[1]
    assert found["resultant location"].limit_value == pytest.approx(1 / 6)
    assert found["base pressure"].source == "trial report"
    for name in ("moment ratio, uplift overturning", "moment ratio, uplift off the weight"):
        assert found[name].verdict() == "not checked"
        assert "not the governing criterion" in found[name].remarks[0]
    assert result.remarks[0].startswith("Criteria in force: EM 1110-2-2100, 1 December 2005")


def test_without_criteria_nothing_is_assumed() -> None:
    result = assessed_wall(BLOCK, 1.0)
    assert result.verdict() == "not checked"
    assert result.first_limit is None
    assert result.remarks[0].startswith("No criteria are named")


def test_own_criteria() -> None:
    own = {"document": "Basis of design", "edition": "rev 2", "sliding": 1.4, "compression": 75.0}
    result = assessed_wall(BLOCK | {"own_criteria": own}, 1.2)
    found = {check.name: check for check in result.checks}
    assert found["sliding on the base"].limit_value == 1.4
    assert found["resultant location"].limit_value == pytest.approx(0.25)
    assert found["flotation"].verdict() == "not checked"
    assert "Basis of design, rev 2 (entered)" in found["sliding on the base"].source


def test_first_limit_is_where_the_first_ratio_reaches_one() -> None:
    result = assessed_wall(HELD, 1.0)
    first = result.first_limit
    assert first is not None
    assert first.level is not None
    below, above = (assessed_wall(HELD, first.level + step) for step in (-0.01, 0.01))

    def largest(checks: object) -> float:
        held = [check for check in checks if check.limit is not None and check.rises_with_water]  # type: ignore[attr-defined]
        return max(float(check.ratio[0]) for check in held)

    assert largest(below.checks) < 1 < largest(above.checks)
    at = next(check for check in above.checks if (check.subject, check.name) == (first.subject, first.check))
    assert at.ratio.item() > 1


def test_many_states_equal_one_at_a_time() -> None:
    levels = [0.5, 1.7, 2.9, 3.6]
    many = assessed_wall(HELD, levels, 0.4)
    for index, level in enumerate(levels):
        one = assessed_wall(HELD, level, 0.4)
        found = {(check.subject, check.name): check for check in many.checks}
        for check in one.checks:
            ratio = found[check.subject, check.name].ratio[index]
            assert ratio == pytest.approx(check.ratio.item(), rel=1e-9, nan_ok=True), check.name


@pytest.mark.parametrize("table", [HELD, BLOCK, HELD | {"uplift": "line of creep"}])
@pytest.mark.parametrize("level", [DRY, 1.0, 2.5, 3.9])
def test_working_has_a_place_for_every_number_and_adds_up(table: dict[str, object], level: float) -> None:
    result = assessed_wall(table, level)
    steps = wall_working(result)
    assert steps[0].title.startswith("Forces")
    for step in steps:
        for line in step.lines:
            assert line.pattern.count("{}") == len(line.values), line.pattern
        if step.table:
            assert {len(row) for row in step.table.rows} <= {len(step.table.headings)}
    sums = {term.symbol: term.value for term in steps[0].results}
    assert sums["ΣH"] == pytest.approx(result.stability.horizontal.item())
    assert sums["ΣV"] == pytest.approx(result.stability.vertical.item())
    assert sums["ΣM"] == pytest.approx(result.stability.moment.item())


def test_passive_resistance_counts_only_as_relied_on() -> None:
    soil = [SOIL[2]]
    none, half = (stable(PLAIN | {"sediment": soil, "passive_share": share}, 3.0) for share in (0.0, 0.5))
    assert none.sliding.passive.item() == 0
    assert half.sliding.passive.item() > 0
    assert half.sliding.factor.item() > none.sliding.factor.item()
    assert none.sliding.driving.item() == pytest.approx(9810 * 3**2 / 2)


def test_surcharge_counts_as_weight_only_when_said() -> None:
    soil = [SOIL[0]]
    light, heavy = (
        stable(PLAIN | {"sediment": soil, "surcharge_counts_as_weight": said}, 1.0) for said in (False, True)
    )
    assert (light.vertical - heavy.vertical).item() == pytest.approx(5e3 * 2.0)
    assert light.horizontal.item() == pytest.approx(heavy.horizontal.item())


def test_soil_over_the_heel_is_saturated_soil_less_its_water() -> None:
    soil = [SOIL[0] | {"top": "2 m"}]
    found = stable(PLAIN | {"sediment": soil, "uplift": "none"}, 2.0)
    over = sum(
        row.value
        for row in found.forces
        if row.cause in ("water", "soil weight") and row.direction == "vertical"
    )
    assert over == pytest.approx(-20e3 * 2.0 * 1.5)


def test_every_set_says_where_it_stands() -> None:
    for key, item in CRITERIA.items():
        assert item.key == key
        assert item.document in item.words
        assert item.status == "from memory, to be confirmed"
