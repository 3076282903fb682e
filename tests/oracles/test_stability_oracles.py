"""Stability of a block and of a strip without tension, against statics solved another way."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from scipy.optimize import brentq

from loads.arrays import FloatArray
from loads.wall.base_pressure import base_pressure
from tests.walls import BLOCK, stable


@pytest.mark.parametrize(
    ("width", "normal", "place", "toe", "heel", "reach"),
    [
        (2.5, 120.0, 1.1, 65.28, 30.72, 2.5),
        (2.5, 120.0, 0.7, 114.28571429, 0.0, 2.1),
        (3.0, 200.0, 0.95, 140.35087719, 0.0, 2.85),
    ],
)
def test_strip_without_tension(
    width: float, normal: float, place: float, toe: float, heel: float, reach: float
) -> None:
    found = base_pressure(np.array([normal]), np.array([-normal * place]), np.array([width]))
    assert found.toe.item() == pytest.approx(toe, abs=1e-8)
    assert found.heel.item() == pytest.approx(heel, abs=1e-8)
    assert (found.compressed * width).item() == pytest.approx(reach, abs=1e-12)


@given(st.floats(0.05, 0.95), st.floats(0.5, 20), st.floats(1, 1e4))
def test_strip_against_a_solve_for_the_neutral_axis(share: float, width: float, normal: float) -> None:
    """Pressure grows from a line that balances the moment, found without the closed form."""
    place = share * width
    x = (np.arange(4000) + 0.5) / 4000 * width

    def pressed(turn: float) -> FloatArray:
        return np.asarray(np.maximum(np.cos(turn) + np.sin(turn) * (x / width - 0.5), 0.0))

    def centre(turn: float) -> float:
        return float((pressed(turn) * x).sum() / pressed(turn).sum() - place)

    pressure = pressed(brentq(centre, -2.0, 2.0))
    pressure *= normal / pressure.mean() / width
    found = base_pressure(np.array([normal]), np.array([-normal * place]), np.array([width]))
    assert found.peak.item() == pytest.approx(float(pressure.max()), rel=5e-3)
    assert found.compressed.item() == pytest.approx(float((pressure > 0).mean()), abs=2e-3)


def test_block_in_water() -> None:
    found = stable(BLOCK | {"crack": "not opened"}, 1.8, unit_weight=9806.65)
    assert found.horizontal.item() == pytest.approx(15886.773)
    uplift = next(row for row in found.forces if row.cause == "uplift")
    assert uplift.value.item() == pytest.approx(10591.182)
    assert found.ratios.overturning.item() == pytest.approx(18005.0094)
    assert found.ratios.resisting.item() == pytest.approx(34560.0)
    assert found.ratios.uplift_overturns.item() == pytest.approx(1.9194658127)
    assert found.base.normal.item() == pytest.approx(47008.818)
    assert found.sliding.factor.item() == pytest.approx(1.4794954897)
    assert found.base.from_toe.item() == pytest.approx(0.3521677699)
    assert found.flotation.item() == pytest.approx(5.4384864692)
