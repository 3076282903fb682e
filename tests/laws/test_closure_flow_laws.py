"""What holds for all water that comes over and through a closure."""

from __future__ import annotations

import math
from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.arrays import FloatArray
from loads.closure.gap import gap_flow, head_across, head_integral
from loads.closure.leakage import SealRate, end_seal_leakage, inflow, joint_leakage
from loads.closure.overflow import FORMULAS, Openings, overflow
from loads.closure.weirs import (
    drowning_factor,
    flow_ackers,
    flow_kindsvater_carter_contracted,
    flow_rehbock,
    flow_sharp_crest,
)
from loads.limits_of_use import OutsideFormulaError

levels = st.one_of(st.floats(-2, 8), st.just(-math.inf))
heights = st.floats(0, 5)
exponents = st.one_of(st.just(0.0), st.floats(0.25, 3))


def one(value: float) -> FloatArray:
    return np.array([value])


def bay(
    crest: float = 1.0, *, width: float = 3.0, ground: float = 0.0, thickness: float = math.nan
) -> Openings:
    return Openings(crest=one(crest), width=one(width), ground=one(ground), crest_thickness=one(thickness))


def gap(flood: float, protected: float, bottom: float, tall: float) -> float:
    ends = one(bottom), one(bottom + tall)
    return gap_flow(one(flood), one(protected), *ends, width=one(0.02), discharge_coefficient=0.61).item()


def ends(flood: float, protected: float, bottom: float, tall: float, exponent: float) -> float:
    seal = SealRate(rate=1e-5, stated_head=1.0, exponent=exponent)
    return end_seal_leakage(one(flood), one(protected), one(bottom), one(bottom + tall), seal).item()


@given(
    flood=levels,
    more=st.floats(0, 2),
    protected=levels,
    bottom=heights,
    tall=heights,
    exponent=exponents,
)
def test_more_head_never_leaks_less(
    *, flood: float, more: float, protected: float, bottom: float, tall: float, exponent: float
) -> None:
    slack = 1 + 1e-12
    assert gap(flood, protected, bottom, tall) <= gap(flood + more, protected, bottom, tall) * slack
    higher = ends(flood + more, protected, bottom, tall, exponent)
    assert ends(flood, protected, bottom, tall, exponent) <= higher * slack + 1e-18
    # and water behind only slows it
    assert gap(flood, protected + more, bottom, tall) <= gap(flood, protected, bottom, tall) * slack + 1e-15


@given(levels, levels, heights, heights, exponents)
def test_equal_levels_and_a_higher_protected_side_give_nothing(
    first: float, second: float, bottom: float, tall: float, exponent: float
) -> None:
    low, high = sorted([first, second])
    assert gap(low, high, bottom, tall) == 0
    assert ends(low, high, bottom, tall, exponent) == 0
    seal = SealRate(rate=1e-5, stated_head=1.0, exponent=exponent)
    assert joint_leakage(one(low), one(high), one(bottom), one(3.0), seal).item() == 0
    over = overflow(bay(bottom, ground=-1.0), one(low), one(high))
    assert over.total_low.item() == over.total_high.item() == 0


@given(heights, st.floats(0.01, 5), st.floats(0.01, 3), st.floats(0.01, 3), st.floats(0.1, 20))
def test_under_tailwater_only_the_difference_of_levels_counts(
    bottom: float, tall: float, over: float, difference: float, deeper: float
) -> None:
    tail = bottom + tall + over
    shallow = gap(tail + difference, tail, bottom, tall)
    deep = gap(tail + deeper + difference, tail + deeper, bottom, tall)
    assert deep == pytest.approx(shallow, rel=1e-9)
    expected = 0.61 * 0.02 * tall * math.sqrt(2 * 9.80665 * difference)
    assert shallow == pytest.approx(expected, rel=1e-9)


@given(
    flood=levels,
    protected=levels,
    bottom=heights,
    tall=heights,
    share=st.floats(0, 1),
    exponent=exponents,
)
def test_a_line_in_two_pieces_leaks_as_a_whole(
    *, flood: float, protected: float, bottom: float, tall: float, share: float, exponent: float
) -> None:
    edges = np.array([bottom, bottom + share * tall, bottom + tall])
    pieces = head_integral(one(flood), one(protected), edges[:-1], np.maximum.accumulate(edges)[1:], exponent)
    whole = head_integral(one(flood), one(protected), edges[:1], edges[2:], exponent)
    assert pieces.sum() == pytest.approx(whole.item(), rel=1e-10, abs=1e-12)


@given(levels, levels, heights, exponents)
def test_a_short_end_seal_leaks_as_a_level_one_of_its_length(
    flood: float, protected: float, z: float, exponent: float
) -> None:
    seal = SealRate(rate=1e-5, stated_head=2.0, exponent=exponent)
    head = head_across(one(flood), one(protected), one(z)).item()
    if 0 < head < 1e-3:
        return
    upright = end_seal_leakage(one(flood), one(protected), one(z), one(z + 1e-6), seal).item()
    level = joint_leakage(one(flood), one(protected), one(z), one(1e-6), seal).item()
    assert upright == pytest.approx(level, rel=1e-2, abs=1e-20)


@given(st.floats(0.1, 5), st.floats(0.2, 3))
def test_at_its_stated_head_a_seal_leaks_its_stated_rate(head: float, exponent: float) -> None:
    seal = SealRate(rate=2e-6, stated_head=head, exponent=exponent)
    found = joint_leakage(one(head), one(-math.inf), one(0.0), one(4.0), seal)
    assert found.item() == pytest.approx(8e-6, rel=1e-12)


thicknesses = st.one_of(st.just(math.nan), st.floats(0.005, 0.5))


@given(
    height=st.floats(0, 3),
    deepest=st.sampled_from([0.05, 0.5, 4.0]),
    behind=st.one_of(st.just(-math.inf), st.floats(-0.5, 2)),
    thickness=thicknesses,
    width=st.floats(0.05, 12),
)
def test_more_water_never_sends_less_over(
    *, height: float, deepest: float, behind: float, thickness: float, width: float
) -> None:
    flood = height + np.linspace(-0.1, 1.0, 151) * deepest
    found = overflow(bay(height, width=width, thickness=thickness), flood, np.full(151, height + behind))
    assert (found.low <= found.high).all()
    for flow in (found.total_low, found.total_high):
        assert (np.diff(flow) >= -1e-12 * flow[1:]).all()
    driving = found.head[:, 0] - max(behind, 0.0)
    assert (found.total_low[driving > 1e-6] > 0).all()
    assert (found.total_high[driving <= 0] == 0).all()


@given(st.floats(0.02, 3), thicknesses, st.floats(0, 2))
def test_water_behind_the_crest_only_slows_it(head: float, thickness: float, ground: float) -> None:
    opening = bay(2.0, ground=ground, thickness=thickness)
    found = overflow(opening, np.full(51, 2.0 + head), 2.0 + head * np.linspace(-0.1, 1.1, 51))
    for flow in (found.total_low, found.total_high):
        assert (np.diff(flow) <= 1e-12 * flow[:-1]).all()
    assert drowning_factor(one(head), one(0.0)).item() == 1


def test_each_crest_stands_for_itself() -> None:
    both = Openings(
        crest=np.array([1.0, 1.5]),
        width=np.array([3.0, 2.0]),
        ground=np.array([0.0, 0.2]),
        crest_thickness=np.array([np.nan, 0.1]),
    )
    flood, behind = np.array([0.5, 1.2, 2.0]), np.array([-np.inf, 1.1, 1.3])
    found = overflow(both, flood, behind)
    assert found.level == 1.0
    for k, (crest, width, ground, thickness) in enumerate([(1.0, 3.0, 0.0, np.nan), (1.5, 2.0, 0.2, 0.1)]):
        alone = overflow(bay(crest, width=width, ground=ground, thickness=thickness), flood, behind)
        np.testing.assert_array_equal(alone.low[:, 0], found.low[:, k])
        np.testing.assert_array_equal(alone.high[:, 0], found.high[:, k])
    np.testing.assert_allclose(found.total_low, found.low.sum(axis=1))


def test_formulas_apply_only_where_they_are_published() -> None:
    found = overflow(bay(), np.array([1.0, 1.01, 1.5, 1.8, 2.5, 3.5]), np.full(6, -np.inf))
    named = {name: [name in found.formulas(i) for i in range(6)] for name in FORMULAS}
    assert named["Rehbock"] == [False, False, True, False, False, False]
    assert named["Ackers"] == [False, False, True, True, True, False]
    assert named["Kindsvater and Carter, full width"] == [False, False, True, True, True, False]
    assert named["sharp crest"] == named["broad crest"] == [False, True, True, True, True, True]
    assert found.remarks(0) == ()
    assert any("clings" in remark for remark in found.remarks(1))
    assert any("outside the limits of use" in remark for remark in found.remarks(5))
    assert len(found.remarks(2)) == 1


def test_the_range_is_that_of_the_formulas() -> None:
    found = overflow(bay(), one(1.5), one(-math.inf))
    head, crest, width = one(0.5)[:, None], one(1.0), one(3.0)
    assert found.high.item() >= flow_rehbock(head, crest, width).item() > found.low.item()
    thick = overflow(bay(thickness=1.2), one(1.5), one(-math.inf))
    assert thick.formulas() == ("broad crest",)
    thin = overflow(bay(thickness=0.1), one(1.5), one(-math.inf))
    assert "broad crest" not in thin.formulas()
    assert thin.low.item() == flow_kindsvater_carter_contracted(head, crest, width).item()


def test_outside_its_heads_a_formula_only_bounds_the_range() -> None:
    width, crest = one(3.0), one(0.5)
    past = overflow(bay(0.5), one(0.5 + 1.15), one(-math.inf))
    last = flow_ackers(one(2.2 * 0.5)[:, None], crest, width).item()
    assert past.high.item() == pytest.approx(last, rel=1e-12)
    assert "Ackers" not in past.formulas()
    before = overflow(bay(0.5, thickness=0.01), one(0.5 + 0.0299), one(-math.inf))
    first = flow_kindsvater_carter_contracted(one(0.03)[:, None], crest, width).item()
    assert before.low.item() == pytest.approx(first, rel=1e-12)
    assert first < flow_sharp_crest(one(0.0299)[:, None], width).item()


def test_inflow_is_the_sum_of_its_parts() -> None:
    parts = {"sill seal": np.array([0.01, 0.02]), "rain": np.array([0.03, 0.0])}
    found = inflow(parts, 0.08)
    np.testing.assert_allclose(found.total, [0.04, 0.02])
    np.testing.assert_allclose(found.ratio, [0.5, 0.25])
    assert np.isnan(inflow(parts, None).ratio).all()


SEAL = SealRate(rate=1e-5, stated_head=1.0, exponent=0.5)


def rated(**changed: float | None) -> FloatArray:
    values: dict[str, float | None] = {"rate": 1e-5, "stated_head": 1.0, "exponent": 0.5, **changed}
    seal = SealRate(**values)  # type: ignore[arg-type]
    return joint_leakage(one(1.0), one(0.0), one(0.0), one(1.0), seal)


def open_gap(*, top: float = 1.0, width: float = 0.1, coefficient: float = 0.6) -> FloatArray:
    level = one(2.0), one(0.0)
    return gap_flow(*level, one(0.0), one(top), width=one(width), discharge_coefficient=coefficient)


@pytest.mark.parametrize(
    ("quantity", "call"),
    [
        ("exponent", lambda: rated(exponent=None)),
        ("exponent", lambda: rated(exponent=-0.5)),
        ("rate", lambda: rated(rate=-1.0)),
        ("rate", lambda: rated(rate=math.nan)),
        ("stated_head", lambda: rated(stated_head=0.0)),
        ("length", lambda: joint_leakage(one(1.0), one(0.0), one(0.0), one(-1.0), SEAL)),
        ("top", lambda: open_gap(top=-1.0)),
        ("width", lambda: open_gap(width=-0.1)),
        ("discharge_coefficient", lambda: open_gap(coefficient=0.0)),
        ("discharge_coefficient", lambda: open_gap(coefficient=1.1)),
        ("exponent", lambda: head_integral(one(1.0), one(0.0), one(0.0), one(1.0), -1.0)),
        ("pump_capacity", lambda: inflow({"rain": one(1.0)}, 0.0)),
        ("parts", lambda: inflow({}, 1.0)),
        ("width", lambda: overflow(bay(width=-1.0), one(1.0), one(0.0))),
        ("ground", lambda: overflow(bay(ground=1.1), one(1.0), one(0.0))),
        ("crest_thickness", lambda: overflow(bay(thickness=0.0), one(1.0), one(0.0))),
        ("crest_height", lambda: flow_rehbock(one(1.0), one(0.0), one(1.0))),
        ("discharge_coefficient", lambda: flow_sharp_crest(one(1.0), one(1.0), 0.0)),
    ],
)
def test_the_impossible_is_refused_by_name(quantity: str, call: Callable[[], object]) -> None:
    with pytest.raises(OutsideFormulaError) as refusal:
        call()
    assert refusal.value.quantity == quantity
