"""Laws of I-walls: embedment against closed forms, the gap, and the second computation."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.earth_pressure import active_coefficient_rankine, passive_coefficient_rankine
from loads.states import DRY
from loads.wall.i_wall import CANNOT_DECIDE, NO_GAP
from loads.wall.i_wall_result import IWallResult, assess_i_wall
from tests.i_walls import I_WALL, i_wall_of
from tests.walls import states, waters

CLAYEY = [
    I_WALL["sediment"][0]
    | {"top": "0.5 m", "cohesion": "8 kPa", "moist_unit_weight": "18 kN/m3", "surcharge": "4 kPa"},
    I_WALL["sediment"][1] | {"cohesion": "8 kPa", "moist_unit_weight": "17 kN/m3"},
]
GAPS: list[dict[str, Any]] = [{"gap": "none"}, {"gap": "to depth", "gap_depth": "1 m"}, {"gap": "to tip"}]


def assessed(table: dict[str, Any], flood: Any, protected: Any = DRY) -> IWallResult:
    result = assess_i_wall(i_wall_of(table), states(flood, protected), waters(), 0.9)
    assert not result.withheld
    return result


@given(st.floats(24, 40), st.floats(1, 2), st.floats(1, 4))
def test_dry_sheet_by_its_closed_form(friction: float, factor: float, height: float) -> None:
    """K_p D³/F = K_a (H + D)³, moments about the tip in sand of one weight."""
    soils = [I_WALL["sediment"][0] | {"top": f"{height} m"}, I_WALL["sediment"][1]]
    soils = [soil | {"friction_angle": f"{friction} deg"} for soil in soils]
    table = I_WALL | {"top": f"{height} m", "sediment": soils, "passive_factor": factor}
    found = assessed(table, DRY).embedment
    angle = np.radians([friction])
    ratio = passive_coefficient_rankine(angle) / active_coefficient_rankine(angle) / factor
    expected = height / (ratio ** (1 / 3) - 1)
    if expected < 6 * height:
        assert found.balanced.item() == pytest.approx(expected.item(), rel=1e-9)
        assert found.required.item() == pytest.approx(1.2 * expected.item(), rel=1e-9)
    else:
        assert not found.found.any()


@pytest.mark.parametrize("gap", GAPS)
@pytest.mark.parametrize("soil", [I_WALL["sediment"], CLAYEY])
def test_both_computations_agree_and_moments_balance(gap: dict[str, Any], soil: list[dict[str, Any]]) -> None:
    flood = [0.5, 1, 2, 3.0, -np.inf, 3.5, -1, -3, 2.0, 1]
    protected = [DRY] * 7 + [-2, 1, 2]
    result = assessed(I_WALL | gap | {"sediment": soil}, flood, protected)
    depth = result.embedment
    driven = depth.found & (depth.balanced > 0)
    assert driven.sum() >= 4
    tip = -np.where(driven, depth.balanced, 0.0)
    left = depth.pressure.net.moment(tip[:, None])[:, 0]
    assert np.abs(left[driven]).max() < 1e-3


@pytest.mark.parametrize("soil", [I_WALL["sediment"], CLAYEY])
def test_water_pressure_closes_at_the_tip(soil: list[dict[str, Any]]) -> None:
    """Both faces reach the same pore pressure at the tip, as one water around it must."""
    for gap in GAPS[:2]:
        depth = assessed(I_WALL | gap | {"sediment": soil}, [1.5, 2.5]).embedment
        tip = -depth.balanced[:, None]
        parts = depth.pressure.parts
        both = parts["water, flood side"].pressure(tip) + parts["water, protected side"].pressure(tip)
        assert np.abs(both).max() < 1e-6


def test_clay_needs_a_deeper_sheet_with_a_gap() -> None:
    none, deep, _ = (assessed(I_WALL | gap | {"sediment": CLAYEY}, 2.5) for gap in GAPS)
    assert deep.embedment.balanced.item() > none.embedment.balanced.item()


def test_what_cannot_be_decided_is_said() -> None:
    result = assessed(I_WALL, 2.0)
    assert result.remarks[0] == CANNOT_DECIDE
    assert NO_GAP in result.remarks
    assert NO_GAP not in assessed(I_WALL | GAPS[1], 2.0).remarks


def test_more_water_needs_no_shallower_sheet() -> None:
    found = assessed(I_WALL, np.linspace(0.1, 3, 30)).embedment
    assert (np.diff(found.balanced) > 0).all()
