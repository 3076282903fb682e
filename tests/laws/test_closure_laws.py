"""Laws of a closure: what its parts carry adds up, and its first limits are where `assess` finds them."""

from __future__ import annotations

import copy
from typing import Any

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from loads.assessment import AssessedClosure
from loads.checks import Check
from loads.states import DRY
from tests.closures import FULL, SPARSE, check_of, closure_of, closure_scene, closure_under, part_of
from tests.scenes import levels

MILLIMETRE = 0.001
SILT = {
    "side": "flood",
    "top": "1.9 m",
    "saturated_unit_weight": "18 kN/m3",
    "friction_angle": "27 deg",
    "pressure": "at rest",
}
few = settings(max_examples=15)


@st.composite
def closures(draw: st.DrawFn) -> dict[str, Any]:
    """A closure of any layout, with logs in place at random, with and without posts of a width."""
    made = copy.deepcopy(FULL)
    bays = draw(st.integers(1, 4))
    made["bay_widths"] = [f"{draw(st.floats(0.8, 4)):.3f} m" for _ in range(bays)]
    made["logs_in_place"] = [draw(st.integers(1, 10)) for _ in range(bays)]
    made["log"]["bearing_length"] = f"{draw(st.integers(10, 120))} mm"
    made["post"]["width"] = f"{draw(st.integers(20, 400))} mm"
    if draw(st.booleans()):
        del made["post"]["brace"], made["post"]["limits"]["brace_force"]
    if draw(st.booleans()):
        made["sediment"] = [SILT]
    return made


waters = st.tuples(st.floats(1.0, 5.0), st.one_of(st.just(DRY), st.floats(1.0, 5.0)))


def in_water(closure: dict[str, Any], water: tuple[float, float]) -> AssessedClosure:
    return closure_of(closure_scene(closure), levels([water[0]], [water[1]]))


@few
@given(closures(), waters)
def test_logs_and_strips_take_the_whole_force(closure: dict[str, Any], water: tuple[float, float]) -> None:
    barrier = in_water(closure, water)
    layout = barrier.structure.layout
    logs = sum(2 * float(part.reaction[0]) for part in barrier.parts if part.kind == "log")
    net = barrier.diagram
    strips = sum(
        layout.strip * float(net.strips(np.array([layout.sill]), np.array([max(pair)]))[0][0, 0])
        for pair in zip(layout.tops[:-1], layout.tops[1:], strict=True)
    )
    whole, scale = (
        float(barrier.resultant.horizontal[0]),
        float(net.gross(layout.sill)[0]) * barrier.face.area,
    )
    assert logs + strips == pytest.approx(whole, rel=1e-12, abs=1e-13 * scale)


@few
@given(closures(), waters)
def test_posts_and_guides_take_the_whole_force(closure: dict[str, Any], water: tuple[float, float]) -> None:
    barrier = in_water(closure, water)
    taken = sum(float(part.reaction[0]) for part in barrier.parts if part.kind != "log")
    whole = float(barrier.resultant.horizontal[0])
    scale = float(barrier.diagram.gross(barrier.structure.layout.sill)[0]) * barrier.face.area
    assert taken == pytest.approx(whole, rel=1e-12, abs=1e-13 * scale)


@few
@given(closures(), waters)
def test_cantilevers_and_guides_hold_the_whole_moment(
    closure: dict[str, Any], water: tuple[float, float]
) -> None:
    closure["post"].pop("brace", None)
    closure["post"]["limits"].pop("brace_force", None)
    barrier = in_water(closure, water)
    layout = barrier.structure.layout
    posts = float(barrier.demands.posts.base_moment[0].sum())
    tops = layout.tops[[0, -1]]
    guides = barrier.diagram.strips(np.full(2, layout.sill), tops)[1][0] @ (layout.spans[[0, -1]] / 2)
    whole = float(barrier.resultant.moment[0])
    scale = float(barrier.diagram.gross(layout.sill)[0]) * barrier.face.area * barrier.face.length
    assert posts + float(guides) == pytest.approx(whole, rel=1e-12, abs=1e-13 * scale)


@few
@given(st.floats(1.4, 2.2), st.integers(6, 10))
def test_a_dry_top_log_taken_out_changes_no_load(level: float, count: int) -> None:
    fewer, more = (
        in_water({**FULL, "logs_in_place": [number] * 3}, (level, DRY)) for number in (count - 1, count)
    )
    top = 1.3 + (count - 1) * 0.24
    if level > top:
        return
    for part in fewer.parts:
        same = part_of(more, part.id)
        for name in ("line_load", "moment", "reaction"):
            assert getattr(part, name) == pytest.approx(getattr(same, name), rel=1e-12, abs=1e-9, nan_ok=True)
    assert fewer.resultant.moment == pytest.approx(more.resultant.moment, rel=1e-12)


@few
@given(closures(), st.one_of(st.just(DRY), st.floats(1.0, 5.0)))
def test_more_water_never_presses_less_on_a_log(closure: dict[str, Any], behind: float) -> None:
    closure.pop("sediment", None)
    rising = np.linspace(1.0, 5.5, 40)
    barrier = closure_of(closure_scene(closure), levels(list(rising), [behind] * len(rising)))
    load = barrier.demands.logs.line_load
    assert (np.diff(load, axis=0) >= -1e-9 * np.abs(load).max()).all()


@few
@given(closures(), st.floats(1.4, 5.0))
def test_sides_swapped_turn_every_load_round(closure: dict[str, Any], level: float) -> None:
    closure.pop("sediment", None)
    one, other = (in_water(closure, water) for water in ((level, DRY), (DRY, level)))
    for name in ("line_load", "moment", "reaction", "deflection"):
        here, there = (getattr(barrier.demands.logs, name) for barrier in (one, other))
        assert here == pytest.approx(-there, rel=1e-12)
    assert one.demands.posts.base_moment == pytest.approx(-other.demands.posts.base_moment, rel=1e-12)


def pushes(check: Check) -> float:
    """Ratio in the first state, with the sign of the demand."""
    return float(check.demand[0] / check.limit_value)


def reached(barrier: AssessedClosure) -> bool:
    """Whether any load check with a limit is at or over it, toward the protected side."""
    return any(
        pushes(check) >= 1
        for check in barrier.checks
        if check.rises_with_water and check.limit is not None and check.kind != "elevation"
    )


@settings(max_examples=6)
@given(closures(), st.one_of(st.just(DRY), st.floats(1.0, 2.5)))
def test_first_limit_is_where_assess_finds_it(closure: dict[str, Any], behind: float) -> None:
    barrier = in_water(closure, (1.2, behind))
    first = barrier.first_limit
    assert first is not None
    if first.level is None:
        assert not reached(in_water(closure, (first.ceiling - 1e-3, behind)))
        return
    if first.without_water:
        assert reached(in_water(closure, (1.3, behind)))
        return
    low, high = 1.3, first.ceiling
    while high - low > MILLIMETRE / 10:
        middle = (low + high) / 2
        low, high = (low, middle) if reached(in_water(closure, (middle, behind))) else (middle, high)
    assert first.level == pytest.approx((low + high) / 2, abs=MILLIMETRE)
    named = in_water(closure, (first.level + MILLIMETRE, behind))
    assert pushes(check_of(named.checks, first.check, first.subject)) >= 1


@settings(max_examples=6)
@given(closures(), st.one_of(st.just(DRY), st.floats(1.0, 2.5)))
def test_every_check_reaches_its_limit_at_its_own_level(closure: dict[str, Any], behind: float) -> None:
    barrier = in_water(closure, (1.2, behind))
    first, each = barrier.first_limit, barrier.first_limits
    assert first is not None
    if first.level is None:
        assert each == ()
        return
    assert each[0].level == pytest.approx(first.level, abs=MILLIMETRE)
    assert [one.level for one in each] == sorted(one.level for one in each if one.level is not None)
    for one in each[:: max(1, len(each) // 4)]:
        assert one.level is not None
        if one.without_water:
            continue
        below, above = (
            pushes(check_of(in_water(closure, (one.level + shift, behind)).checks, one.check, one.subject))
            for shift in (-MILLIMETRE, MILLIMETRE)
        )
        assert below < 1 <= above


@pytest.mark.parametrize("fixity", ["fixed", "pinned"])
@pytest.mark.parametrize("name", ["bending moment", "shear", "deflection", "brace force", "bolt tension"])
def test_a_braced_post_reaches_its_limit_whichever_way_it_bends(fixity: str, name: str) -> None:
    """Limit set from the demand at one level; the post's own moment or deflection may be negative there."""
    level = 3.3
    closure = copy.deepcopy(FULL)
    post = closure["post"]
    post["brace"]["fixity"] = fixity
    closure["limits"], closure["log"]["limits"], post["limits"] = {}, {}, {}
    del closure["log"]["material"], post["material"]
    post["modulus"] = "29000 ksi"
    (check,) = [
        check
        for check in in_water(closure, (level, DRY)).checks
        if check.name == name and check.subject.startswith("post")
    ]
    demand = abs(float(check.demand[0]))
    fields = {
        "bending moment": ("moment", "N·m"),
        "shear": ("shear", "N"),
        "deflection": ("deflection", "m"),
        "brace force": ("brace_force", "N"),
        "bolt tension": ("anchor_tension", "N"),
    }
    field, unit = fields[name]
    post["limits"] = {field: f"{demand!r} {unit}"}
    first = in_water(closure, (1.2, DRY)).first_limit
    assert first is not None
    assert first.level is not None
    assert first.check == name
    if (name, fixity) == ("deflection", "fixed"):  # the top swings back before it swings forward
        assert first.level < level
        ratios = [
            check_of(in_water(closure, (first.level + shift, DRY)).checks, name).ratio[0]
            for shift in (-MILLIMETRE, MILLIMETRE)
        ]
        assert ratios[0] < 1 <= ratios[1]
    else:
        assert first.level == pytest.approx(level, abs=MILLIMETRE)


def test_a_limit_set_from_a_level_gives_that_level_back() -> None:
    demand = part_of(closure_under(SPARSE, flood_side="1.234 m"), "bay 1 log 1").moment[0]
    limits = {"moment": f"{float(demand)!r} N·m"}
    barrier = closure_under({**SPARSE, "log": {**SPARSE["log"], "limits": limits}}, flood_side="0.5 m")
    assert barrier.first_limit is not None
    assert barrier.first_limit.level == pytest.approx(1.234, abs=MILLIMETRE)
    assert (barrier.first_limit.subject, barrier.first_limit.check) == ("bay 1 log 1", "bending moment")


def test_many_states_are_each_as_if_alone() -> None:
    water = [(1.1, DRY), (2.0, 1.5), (3.0, DRY), (1.4, 2.9), (4.4, 3.9)]
    together = closure_of(closure_scene(FULL), levels([f for f, _ in water], [p for _, p in water]))
    for index, one in enumerate(water):
        alone = in_water(FULL, one)
        assert together.verdict(index) == alone.verdict()
        for part, same in zip(together.parts, alone.parts, strict=True):
            assert part.reaction[index] == pytest.approx(same.reaction[0], rel=1e-12, abs=1e-9)
            assert part.moment[index] == pytest.approx(same.moment[0], rel=1e-9, abs=1e-6, nan_ok=True)
        ours = {(c.subject, c.name): float(c.ratio[index]) for c in together.checks}
        theirs = {(c.subject, c.name): float(c.ratio[0]) for c in alone.checks}
        assert ours == pytest.approx(theirs, rel=1e-9, abs=1e-9, nan_ok=True)
