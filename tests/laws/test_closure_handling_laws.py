"""What holds for logs as they float, are counted, lifted and carried."""

from __future__ import annotations

import math
from collections.abc import Callable
from fractions import Fraction

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.arrays import FloatArray
from loads.closure.buoyancy import buoyancy, displaced_area, flotation
from loads.closure.handling import guideline_factor, team_limit, weight_per_person
from loads.closure.lifting import lifting_force, seating_force
from loads.closure.lifting_equation import Lift, System, lifting_index, multipliers, recommended_weight
from loads.closure.logs_needed import Bays, Ceiling, LogsNeeded, logs_needed, logs_to_reach, stack_top
from loads.limits_of_use import OutsideFormulaError
from loads.units import to_si

SYSTEMS: tuple[System, ...] = ("metric", "US")


def one(value: float) -> FloatArray:
    return np.array([value])


def upward(level: float, count: int = 4) -> FloatArray:
    height = np.full(count, 0.25)
    bottom = np.array([0.25 * number for number in range(count)])
    area, length = np.full(count, 0.03), np.full(count, 3.0)
    return buoyancy(one(level), bottom, height, area, length=length, unit_weight=one(9810.0))


@given(st.floats(-1, 2), st.floats(0, 1))
def test_buoyancy_is_the_weight_of_the_water_displaced(level: float, more: float) -> None:
    depth = min(max(level, 0.0), 1.0)
    assert upward(level).sum() == pytest.approx(9810.0 * 0.03 / 0.25 * 3 * depth, rel=1e-12, abs=1e-9)
    assert (upward(level) <= upward(level + more)).all()
    assert (upward(-math.inf) == 0).all()


@given(st.lists(st.floats(0, 1000), min_size=1, max_size=8), st.data())
def test_a_stack_rises_from_the_log_where_most_lifts(weights: list[float], data: st.DataObject) -> None:
    lifts = data.draw(st.lists(st.floats(0, 1000), min_size=len(weights), max_size=len(weights)))
    held = data.draw(st.floats(0, 2000))
    found = flotation(np.array([lifts]), np.array(weights), held)
    by_hand = [math.fsum(lifts[j:]) - math.fsum(weights[j:]) for j in range(len(weights))]
    np.testing.assert_allclose(found.from_log[0], by_hand, rtol=1e-12, atol=1e-9)
    assert found.net_uplift.item() == pytest.approx(max(by_hand) - held, abs=1e-9)
    assert found.hold_down_demand.item() == pytest.approx(max(*by_hand, 0.0), abs=1e-9)
    assert by_hand[int(found.rises_from.item())] == pytest.approx(max(by_hand), abs=1e-9)


def test_a_heavy_bottom_log_does_not_hold_down_a_light_one() -> None:
    found = flotation(np.array([[100.0, 100.0]]), np.array([500.0, 60.0]), 0.0)
    assert found.net_uplift.item() == pytest.approx(40)
    assert found.rises_from.item() == 1


@given(st.floats(0, 1e4), st.floats(0, 1e4), st.floats(-1e5, 1e5), st.floats(0, 1))
def test_up_and_down_differ_by_the_weight_in_water(w: float, b: float, reaction: float, mu: float) -> None:
    state = one(w)[:, None], one(b)[:, None], one(reaction)[:, None], mu
    up, down = lifting_force(*state).item(), seating_force(*state).item()
    assert up - down == pytest.approx(2 * (w - b), abs=1e-6)
    assert up + down == pytest.approx(2 * mu * abs(reaction), abs=1e-6)
    assert lifting_force(state[0], state[1], -state[2], mu).item() == up


@given(
    st.integers(0, 40),
    st.integers(1, 5000),
    st.integers(-300_000, 900_000),
    st.sampled_from(["ft", "m", "in"]),
)
def test_a_level_on_a_log_s_top_asks_for_no_more(count: int, height: int, sill: int, unit: str) -> None:
    tall, base = Fraction(height + 99, 1000), Fraction(sill, 1000)
    top, step, foot = (to_si(float(value), unit, "length") for value in (base + count * tall, tall, base))
    assert logs_to_reach(one(top), one(foot), one(step)).tolist() == [[count]]
    over = to_si(float(base + count * tall + Fraction(1, 1000)), unit, "length")
    assert logs_to_reach(one(over), one(foot), one(step)).tolist() == [[count + 1]]


@given(st.floats(-2, 10), st.floats(0.1, 1))
def test_logs_reach_the_level_and_one_fewer_does_not(wanted: float, height: float) -> None:
    count = logs_to_reach(one(wanted), one(0.0), one(height))
    top = stack_top(one(0.0), one(height), count).item()
    assert top >= wanted - 1e-5
    assert count.item() == 0 or top - height < wanted
    assert logs_to_reach(one(-math.inf), one(0.0), one(height)).item() == 0


def asked(target: float, *ceilings: Ceiling) -> LogsNeeded:
    bays = Bays(
        sill=np.array([10.0, 10.4]), log_height=np.array([0.2, 0.2]), on_hand=np.array([8, 8], dtype=np.int64)
    )
    return logs_needed(np.array([target, -math.inf]), bays, allowance=0.3, freeboard=0.5, ceilings=ceilings)


def test_each_bay_is_counted_from_its_own_sill() -> None:
    found = asked(11.0)
    assert found.count.tolist() == [[9, 7], [0, 0]]
    assert found.short.tolist() == [[1, 0], [0, 0]]
    assert found.enough.tolist() == [False, True]
    np.testing.assert_allclose(found.top, [[11.8, 11.8], [10.0, 10.4]])
    np.testing.assert_allclose(found.top_on_hand, [[11.6, 11.8], [10.0, 10.4]])


def test_what_stops_the_water_before_is_named_lowest_first() -> None:
    rated = Ceiling(name="rated level", level=11.2)
    first = Ceiling(name="first-limit level", level=11.1)
    guides = Ceiling(name="top of the guides", level=11.8, of_stack=True)
    found = asked(11.0, rated, first, guides)
    assert [ceiling.name for ceiling in found.stopped_by()] == ["first-limit level", "rated level"]
    assert found.stopped_by(1) == ()
    assert asked(10.9, rated).stopped_by() == (), "a level is not above itself"
    lower = Ceiling(name="top of the guides", level=11.79, of_stack=True)
    assert asked(11.0, lower).stopped_by() == (lower,)


lengths = st.floats(0, 3)


def lift_of(horizontal: float, vertical: float, travel: float, asymmetry: float = 0.0) -> Lift:
    return Lift(
        horizontal=one(horizontal),
        vertical=one(vertical),
        travel=one(travel),
        asymmetry=one(asymmetry),
        frequency_multiplier=one(1.0),
        coupling="poor",
    )


@pytest.mark.parametrize("system", SYSTEMS)
@given(lengths, lengths, lengths, st.floats(0, math.pi))
def test_multipliers_lie_between_zero_and_one(
    system: System, horizontal: float, vertical: float, travel: float, asymmetry: float
) -> None:
    found = multipliers(lift_of(horizontal, vertical, travel, asymmetry), system)
    for one_of in (found.horizontal, found.vertical, found.distance, found.asymmetry, found.coupling):
        assert 0 <= one_of.item() <= 1
    further = multipliers(lift_of(horizontal + 0.1, vertical, travel + 0.1, asymmetry), system)
    assert further.product().item() <= found.product().item() + 1e-15


@pytest.mark.parametrize("system", SYSTEMS)
@pytest.mark.parametrize(
    "lift",
    [lift_of(0.66, 0.7, 0.3), lift_of(0.3, 1.8, 0.3), lift_of(0.3, 0.7, 1.8), lift_of(0.3, 0.7, 0.3, 2.4)],
)
def test_beyond_the_ends_there_is_no_lift(system: System, lift: Lift) -> None:
    assert recommended_weight(lift, system).item() == 0
    assert lifting_index(one(100.0), recommended_weight(lift, system)).item() == math.inf


@pytest.mark.parametrize(("vertical", "fair"), [(29.9, 0.95), (30.0, 1.0), (40.0, 1.0)])
def test_a_fair_hold_counts_as_good_from_knuckle_height(vertical: float, fair: float) -> None:
    lift = lift_of(0.3, to_si(vertical, "in", "length"), 0.3)
    held = Lift(**{**vars(lift), "coupling": "fair"})
    assert multipliers(held, "US").coupling.item() == fair
    assert multipliers(lift, "US").coupling.item() == 0.90


@pytest.mark.parametrize(
    ("quantity", "call"),
    [
        ("gross_area", lambda: displaced_area("solid", 0.0, 0.0)),
        ("material_area", lambda: displaced_area("fills", 0.02, 0.03)),
        ("material_area", lambda: displaced_area("fills", 0.02, 0.0)),
        (
            "height",
            lambda: buoyancy(one(1.0), one(0.0), one(0.0), one(1.0), length=one(1.0), unit_weight=one(1.0)),
        ),
        (
            "length",
            lambda: buoyancy(one(1.0), one(0.0), one(1.0), one(1.0), length=one(-1.0), unit_weight=one(1.0)),
        ),
        ("weight", lambda: flotation(np.zeros((1, 0)), np.zeros(0), 0.0)),
        ("weight", lambda: flotation(np.zeros((1, 1)), one(-1.0), 0.0)),
        ("hold_down", lambda: flotation(np.zeros((1, 1)), one(1.0), -1.0)),
        ("friction_coefficient", lambda: lifting_force(one(1.0), one(1.0), one(1.0), -0.1)),
        ("friction_coefficient", lambda: seating_force(one(1.0), one(1.0), one(1.0), math.nan)),
        ("log_height", lambda: logs_to_reach(one(1.0), one(0.0), one(0.0))),
        ("wanted_top", lambda: logs_to_reach(one(math.nan), one(0.0), one(1.0))),
        ("wanted_top", lambda: logs_to_reach(one(math.inf), one(0.0), one(1.0))),
        ("people", lambda: weight_per_person(one(1.0), 0)),
        ("weight", lambda: weight_per_person(one(-1.0), 1)),
        ("people", lambda: team_limit(np.ones((1, 4)))),
        ("limits", lambda: team_limit(-np.ones((1, 2)))),
        ("twist", lambda: guideline_factor(one(-0.1), one(0.0))),
        ("frequency", lambda: guideline_factor(one(0.0), one(-0.1))),
        ("horizontal", lambda: recommended_weight(lift_of(-0.1, 1.0, 1.0), "US")),
        ("asymmetry", lambda: recommended_weight(lift_of(0.1, 1.0, 1.0, -1.0), "US")),
        ("weight", lambda: lifting_index(one(0.0), one(1.0))),
        ("recommended", lambda: lifting_index(one(1.0), one(-1.0))),
    ],
)
def test_the_impossible_is_refused_by_name(quantity: str, call: Callable[[], object]) -> None:
    with pytest.raises(OutsideFormulaError) as refusal:
        call()
    assert refusal.value.quantity == quantity
