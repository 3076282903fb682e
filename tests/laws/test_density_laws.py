"""What holds for every density of water, and what is refused."""

from __future__ import annotations

from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.arrays import FloatArray
from loads.density import (
    FRESH_WATER_TEMPERATURE,
    SEA_WATER_SALINITY,
    SEA_WATER_TEMPERATURE,
    SUSPENDED_SEDIMENT,
    fresh_water_density,
    muddy_water_density,
    sea_water_density,
)
from loads.limits_of_use import OutsideFormulaError, outside

temperatures = st.floats(273.15, 313.15)


def one(value: float) -> FloatArray:
    return np.array([value])


@given(temperatures, st.floats(0, 41), st.floats(0.01, 1))
def test_more_salt_is_denser(temperature: float, salinity: float, more: float) -> None:
    T = one(temperature)
    assert (sea_water_density(T, one(salinity)) < sea_water_density(T, one(salinity + more))).all()


@given(st.floats(277.5, 372), st.floats(0.01, 1))
def test_fresh_water_is_lighter_when_warmer_above_its_densest(temperature: float, warmer: float) -> None:
    assert (fresh_water_density(one(temperature)) > fresh_water_density(one(temperature + warmer))).all()


def test_fresh_water_is_densest_near_four_degrees() -> None:
    temperature = np.linspace(273.15, 283.15, 1001)
    assert abs(temperature[np.argmax(fresh_water_density(temperature))] - 277.13) < 0.02


@given(st.floats(990, 1030), st.floats(0, 2650), st.floats(2600, 2800))
def test_a_mixture_lies_between_its_parts(water: float, concentration: float, grain: float) -> None:
    concentration = min(concentration, grain)
    found = muddy_water_density(one(water), one(concentration), grain).item()
    assert water * (1 - 1e-12) <= found <= grain * (1 + 1e-12)


@given(st.floats(990, 1030), st.floats(0, 1000), st.floats(2600, 2800))
def test_a_mixture_weighs_what_its_parts_weigh(water: float, concentration: float, grain: float) -> None:
    grains_volume = concentration / grain
    expected = concentration + water * (1 - grains_volume)
    np.testing.assert_allclose(
        muddy_water_density(one(water), one(concentration), grain), expected, rtol=1e-12
    )


def test_many_states_are_each_their_own() -> None:
    T, S = np.array([274.0, 288.0, 300.0]), np.array([0.0, 20.0, 35.0])
    np.testing.assert_array_equal(
        sea_water_density(T, S), [sea_water_density(T[[i]], S[[i]])[0] for i in range(3)]
    )


@pytest.mark.parametrize(
    ("quantity", "call"),
    [
        ("temperature", lambda: fresh_water_density(one(0.0))),
        ("temperature", lambda: fresh_water_density(one(np.nan))),
        ("temperature", lambda: sea_water_density(one(-3.0), one(35.0))),
        ("practical_salinity", lambda: sea_water_density(one(288.0), one(-0.1))),
        ("practical_salinity", lambda: sea_water_density(one(288.0), one(np.nan))),
        ("water_density", lambda: muddy_water_density(one(0.0), one(1.0))),
        ("concentration", lambda: muddy_water_density(one(1000.0), one(-1.0))),
        ("concentration", lambda: muddy_water_density(one(1000.0), one(2651.0))),
        ("grain_density", lambda: muddy_water_density(one(1000.0), one(1.0), 0.0)),
    ],
)
def test_the_impossible_is_refused_by_name(quantity: str, call: Callable[[], FloatArray]) -> None:
    with pytest.raises(OutsideFormulaError) as refusal:
        call()
    assert refusal.value.quantity == quantity


def test_outside_the_limit_of_use_still_answers_and_is_told() -> None:
    T = np.array([272.15, 273.15, 313.15, 314.15])
    assert outside(T, FRESH_WATER_TEMPERATURE).tolist() == [True, False, False, False]
    assert outside(T, SEA_WATER_TEMPERATURE).tolist() == [False, False, False, True]
    assert outside(np.array([42.0, 42.1]), SEA_WATER_SALINITY).tolist() == [False, True]
    assert outside(np.array([400.0, 401.0]), SUSPENDED_SEDIMENT).tolist() == [False, True]
    assert np.isfinite(fresh_water_density(T)).all()
