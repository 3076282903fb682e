"""What holds for every earth pressure coefficient, and what is refused."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from loads.arrays import FloatArray
from loads.earth_pressure import (
    FRICTION_ANGLE,
    active_coefficient_rankine,
    at_rest_coefficient_jaky,
    at_rest_coefficient_overconsolidated,
    passive_coefficient_rankine,
    tension_depth,
)
from loads.earth_pressure_coulomb import (
    PASSIVE_WALL_FRICTION_SHARE,
    active_coefficient_coulomb,
    passive_coefficient_coulomb,
)
from loads.limits_of_use import OutsideFormulaError, outside

SMOOTH = np.zeros(1)
friction_angles = st.floats(0.05, np.pi / 4)


def one(value: float) -> FloatArray:
    return np.array([value])


@given(friction_angles)
def test_active_is_below_rest_is_below_passive(friction_angle: float) -> None:
    phi = one(friction_angle)
    rest = at_rest_coefficient_jaky(phi)
    assert (active_coefficient_rankine(phi) < rest).all()
    assert (rest < passive_coefficient_rankine(phi)).all()


@given(friction_angles, st.floats(-1, 1))
def test_rankine_active_times_passive_is_the_squared_cosine_of_the_slope(
    friction_angle: float, share: float
) -> None:
    phi, beta = one(friction_angle), one(share * friction_angle)
    product = active_coefficient_rankine(phi, beta) * passive_coefficient_rankine(phi, beta)
    np.testing.assert_allclose(product, np.cos(beta) ** 2, rtol=1e-9)


@given(friction_angles)
def test_coulomb_with_a_smooth_vertical_face_is_rankine(friction_angle: float) -> None:
    phi = one(friction_angle)
    np.testing.assert_allclose(
        active_coefficient_coulomb(phi, SMOOTH), active_coefficient_rankine(phi), rtol=1e-12
    )
    np.testing.assert_allclose(
        passive_coefficient_coulomb(phi, SMOOTH), passive_coefficient_rankine(phi), rtol=1e-9
    )


@given(friction_angles, st.floats(0, 1))
def test_coulomb_bound_to_the_ground_is_rankine_active(friction_angle: float, share: float) -> None:
    phi, beta = one(friction_angle), one(share * friction_angle)
    np.testing.assert_allclose(
        active_coefficient_coulomb(phi, beta, beta), active_coefficient_rankine(phi, beta), rtol=1e-7
    )


@given(friction_angles, st.floats(-0.9, 0.9), st.floats(-0.9, 0.9), st.floats(-0.3, 0.3))
def test_steeper_ground_never_pushes_less(
    friction_angle: float, share: float, other: float, batter: float
) -> None:
    phi, delta, eta = one(friction_angle), one(friction_angle / 2), one(batter)
    assume(friction_angle - batter < 1.5)
    low, high = sorted((share * friction_angle, other * friction_angle))
    lower, upper = (active_coefficient_coulomb(phi, delta, one(slope), eta) for slope in (low, high))
    assert (lower <= upper * (1 + 1e-12)).all()


@given(friction_angles, st.floats(1, 15), st.floats(1, 15))
def test_more_overconsolidation_never_lowers_the_pressure_at_rest(
    friction_angle: float, ratio: float, other: float
) -> None:
    phi = one(friction_angle)
    low, high = sorted((ratio, other))
    lower = at_rest_coefficient_overconsolidated(phi, one(low))
    assert (lower <= at_rest_coefficient_overconsolidated(phi, one(high))).all()


@given(friction_angles, st.floats(0, 5e4), st.floats(1e4, 2.5e4))
def test_active_pressure_vanishes_at_the_depth_of_tension(
    friction_angle: float, cohesion: float, unit_weight: float
) -> None:
    K = active_coefficient_rankine(one(friction_angle))
    depth = tension_depth(one(cohesion), one(unit_weight), K)
    np.testing.assert_allclose(unit_weight * depth * K, 2 * cohesion * np.sqrt(K), rtol=1e-12, atol=1e-12)


def test_many_states_are_each_their_own() -> None:
    phi, delta, beta, eta = np.radians(np.array([[25.0, 30, 35], [0, 10, 15], [-5, 0, 10], [-5, 0, 5]]))
    for coefficient in (active_coefficient_coulomb, passive_coefficient_coulomb):
        together = coefficient(phi, delta, beta, eta)
        apart = [coefficient(phi[[i]], delta[[i]], beta[[i]], eta[[i]])[0] for i in range(3)]
        np.testing.assert_array_equal(together, apart)


def test_ground_at_the_friction_angle_still_has_an_answer() -> None:
    phi = np.radians([30.0])
    np.testing.assert_allclose(active_coefficient_rankine(phi, phi), np.cos(phi), rtol=1e-12)
    np.testing.assert_allclose(passive_coefficient_rankine(phi, -phi), np.cos(phi), rtol=1e-12)


FLAT, STEEP, TOO_STEEP = np.radians([30.0]), np.radians([40.0]), np.radians([95.0])
NO_NUMBER = one(np.nan)


@pytest.mark.parametrize(
    ("quantity", "call"),
    [
        ("friction_angle", lambda: at_rest_coefficient_jaky(-FLAT)),
        ("friction_angle", lambda: at_rest_coefficient_jaky(TOO_STEEP)),
        ("friction_angle", lambda: at_rest_coefficient_jaky(NO_NUMBER)),
        ("friction_angle", lambda: passive_coefficient_rankine(one(np.inf))),
        ("overconsolidation_ratio", lambda: at_rest_coefficient_overconsolidated(FLAT, one(0.9))),
        ("ground_slope", lambda: active_coefficient_rankine(FLAT, STEEP)),
        ("ground_slope", lambda: passive_coefficient_rankine(FLAT, -STEEP)),
        ("ground_slope", lambda: active_coefficient_coulomb(FLAT, SMOOTH, STEEP)),
        ("ground_slope", lambda: passive_coefficient_coulomb(FLAT, SMOOTH, -STEEP)),
        ("ground_slope", lambda: active_coefficient_coulomb(FLAT, SMOOTH, NO_NUMBER)),
        ("batter", lambda: active_coefficient_coulomb(FLAT, SMOOTH, SMOOTH, np.radians([-60.0]))),
        ("batter", lambda: passive_coefficient_coulomb(FLAT, SMOOTH, SMOOTH, np.radians([60.0]))),
        ("batter", lambda: active_coefficient_coulomb(FLAT, SMOOTH, SMOOTH, TOO_STEEP)),
        ("batter", lambda: active_coefficient_coulomb(FLAT, SMOOTH, -FLAT, np.radians([70.0]))),
        ("wall_friction", lambda: active_coefficient_coulomb(FLAT, -STEEP)),
        ("wall_friction", lambda: active_coefficient_coulomb(FLAT, TOO_STEEP)),
        ("wall_friction", lambda: active_coefficient_coulomb(FLAT, NO_NUMBER)),
        ("wall_friction", lambda: passive_coefficient_coulomb(STEEP, STEEP, STEEP)),
        ("cohesion", lambda: tension_depth(one(-1.0), one(1.0), one(1.0))),
        ("unit_weight", lambda: tension_depth(one(1.0), one(0.0), one(1.0))),
        ("coefficient", lambda: tension_depth(one(1.0), one(1.0), one(0.0))),
    ],
)
def test_the_impossible_is_refused_by_name(quantity: str, call: Callable[[], FloatArray]) -> None:
    with pytest.raises(OutsideFormulaError) as refusal:
        call()
    assert refusal.value.quantity == quantity
    assert str(refusal.value).startswith(quantity)
    assert refusal.value.rule


def test_outside_the_limit_of_use_still_answers_and_is_told() -> None:
    phi = np.radians([44.0, 46.0])
    assert outside(phi, FRICTION_ANGLE).tolist() == [False, True]
    assert np.isfinite(passive_coefficient_rankine(phi)).all()
    share = np.array([0.0, 1 / 3, 0.4, np.nan])
    assert outside(share, PASSIVE_WALL_FRICTION_SHARE).tolist() == [False, False, True, True]
