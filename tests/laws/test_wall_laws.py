"""Laws of walls: balance in still water, mirror image, more water, cracks, and grids."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from loads.records.wall import Wall
from loads.wall.base_pressure import base_pressure, open_lengths
from loads.wall.cracking import uplift_of
from loads.wall.forces import water_forces
from loads.wall.options import option_grid
from loads.wall.section import area_and_centroid
from loads.wall.section_of_record import section_of
from loads.wall.site_of_record import site_of
from loads.wall.stability import stability
from loads.wall.uplift import Cracks
from tests.walls import BLOCK, SOIL, TEE, assessed_wall, stable, states, wall_of, waters

KEY = {"depth": "0.6 m", "width": "0.4 m", "position": "0.3 m"}
RULES = ("linear", "line of creep")


@given(st.sampled_from(RULES), st.floats(4.01, 20), st.booleans(), st.booleans())
def test_submerged_wall_weighs_less_by_the_water_it_displaces(
    rule: str, level: float, keyed: bool, drained: bool
) -> None:
    table = TEE | {"uplift": rule, "protected_ground": "1 m"}
    if keyed:
        table |= {"key": KEY}
    if drained:
        table |= {"drain": {"position": "2 m", "effectiveness": 0.5}}
    found = stable(table, level, level)
    area = sum(float(area_and_centroid(part.x, part.z)[0][0]) for part in section_of(wall_of(table)).parts)
    assert found.horizontal.item() == pytest.approx(0, abs=1e-6)
    assert found.vertical.item() == pytest.approx(-area * (24e3 - 9810), rel=1e-9)


def mirrored(x: float, width: float) -> str:
    return f"{width - x:.12g} m"


POINTS = [(0.0, 0.0), (3.7, 0.0), (3.7, 0.5), (2.6, 0.5), (2.4, 4.0), (1.9, 4.0), (1.6, 0.5), (0.0, 0.5)]
SIDES = {"flood": "protected", "protected": "flood"}


@given(st.sampled_from(RULES), st.floats(-1, 5), st.floats(-1, 5))
def test_mirror_image(rule: str, left: float, right: float) -> None:
    soil = [{**layer, "pressure": "at rest"} for layer in SOIL]
    soil = [{key: value for key, value in layer.items() if key != "cohesion"} for layer in soil]
    tables = []
    for turned in (False, True):
        points = [[mirrored(x, 3.7) if turned else f"{x:.12g} m", f"{z:.12g} m"] for x, z in POINTS]
        layers = [{**layer, "side": SIDES[layer["side"]]} if turned else layer for layer in soil]
        place = 3.7 - 1.2 if turned else 1.2
        tables.append(
            {
                "shape": "parts",
                "part": [{"name": "wall", "unit_weight": "24 kN/m3", "points": points}],
                "sediment": layers,
                "uplift": rule,
                "cutoff": [{"position": f"{place} m", "depth": "1 m"}],
            }
        )
    one, other = stable(tables[0], left, right), stable(tables[1], right, left)
    scale = 1e6
    assert one.horizontal.item() == pytest.approx(-other.horizontal.item(), abs=1e-9 * scale)
    assert one.vertical.item() == pytest.approx(other.vertical.item(), abs=1e-9 * scale)
    assert one.moment.item() == pytest.approx(
        -other.moment.item() + other.vertical.item() * 3.7, abs=1e-8 * scale
    )
    assert one.base.compressed.item() == pytest.approx(other.base.compressed.item(), abs=1e-8)
    assert one.sliding.factor.item() == pytest.approx(other.sliding.factor.item(), rel=1e-7)
    assert one.flotation.item() == pytest.approx(other.flotation.item(), rel=1e-7)
    assert one.ratios.uplift_overturns.item() == pytest.approx(other.ratios.uplift_overturns.item(), rel=1e-6)


@given(
    st.sampled_from(["full head", "not opened"]),
    st.sampled_from(RULES),
    st.floats(-1, 1.5),
    st.floats(0, 0.4),
    st.floats(0.2, 2),
)
def test_more_water_never_raises_a_factor(
    crack: str, rule: str, protected: float, batter: float, top: float
) -> None:
    width = f"{top + batter + 0.8} m"
    table = {"shape": "gravity", "height": "3 m", "top_width": f"{top} m", "base_width": width}
    table |= {"flood_batter": f"{batter} m", "unit_weight": "24 kN/m3", "crack": crack, "uplift": rule}
    levels = np.linspace(max(protected, 0), 3, 61)
    found = stable(table, levels, protected)
    forward = found.horizontal > 0
    for factor in (found.sliding.factor, found.sliding.low_without_uplift, found.flotation):
        values = np.where(np.isfinite(factor), factor, 1e12)[forward]
        assert (np.diff(values) <= 1e-9 * values[:-1]).all()


@given(st.sampled_from(RULES), st.floats(0.5, 2.0), st.floats(1.0, 3.0), st.booleans(), st.booleans())
def test_the_crack_is_in_balance_and_the_least_that_is(
    rule: str, width: float, level: float, cut: bool, drained: bool
) -> None:
    table = BLOCK | {"top_width": f"{width} m", "base_width": f"{width} m", "height": "3 m", "uplift": rule}
    if cut:
        table |= {"cutoff": [{"position": f"{width / 2} m", "depth": "1 m"}]}
    if drained:
        table |= {"drain": {"position": f"{width / 4} m", "effectiveness": 0.6}}
    wall = wall_of(table)
    section, site, state = section_of(wall), site_of(wall, waters()), states(level)
    found = stability(section, state, site)
    assert found.settled.all()
    vertical = found.vertical - found.uplift.push.vertical
    moment = found.moment - found.uplift.push.moment_vertical - found.uplift.push.moment_horizontal
    length = np.zeros(1)
    for _ in range(4000):
        push = uplift_of(section, state, site, Cracks(heel=length, toe=np.zeros(1))).push
        base = base_pressure(-(vertical + push.vertical), moment + push.moment_vertical, section.base_width)
        grown = np.maximum(open_lengths(base, section.base_width)[0], length)
        if grown - length < 1e-13:
            break
        length = grown
    assert found.cracks.heel.item() == pytest.approx(length.item(), abs=1e-6)


def test_a_crack_that_runs_through_is_said() -> None:
    result = assessed_wall(BLOCK | {"top_width": "0.5 m", "base_width": "0.5 m"}, 2.0)
    assert result.stability.runs_through.all()
    assert result.stability.base.compressed.item() == 0
    assert any("runs through" in remark for remark in result.remarks)


DRAINS = [
    None,
    {"position": "1.7 m", "effectiveness": 0.4},
    {"position": "2.5 m", "remaining_share": 0.3},
]


CUTOFFS = [
    [],
    [("0 m", "2 m")],
    [("1.5 m", "1 m"), ("3.7 m", "1.5 m")],
    [("0.3 m", "2 m")],
]
PLACES = st.sampled_from([0.0, 0.3, 0.5, 0.7, 1.9, 3.3, 3.7])


@given(
    rule=st.sampled_from(RULES),
    key=st.sampled_from([0.0, 0.3, 3.3]),
    cutoffs=st.lists(st.tuples(PLACES, st.floats(0.2, 3)), max_size=3),
    drain=PLACES,
    levels=st.tuples(st.floats(-1, 5), st.floats(-1, 5)),
    top=st.floats(0.6, 2.5),
)
def test_both_computations_agree_wherever_things_lie(
    rule: str,
    key: float,
    cutoffs: list[tuple[float, float]],
    drain: float,
    levels: tuple[float, float],
    top: float,
) -> None:
    table = TEE | {"uplift": rule, "key": KEY | {"position": f"{key} m"}, "protected_ground": f"{top:.6f} m"}
    table |= {"cutoff": [{"position": f"{place} m", "depth": f"{depth:.6f} m"} for place, depth in cutoffs]}
    table |= {"drain": {"position": f"{drain} m", "effectiveness": 0.4}}
    assert assessed_wall(table, *levels).recheck.difference.max() < 1e-11


@pytest.mark.parametrize("rule", ["linear", "line of creep", "none"])
@pytest.mark.parametrize(
    "drain",
    [None, {"position": "1.7 m", "effectiveness": 0.4}, {"position": "2.5 m", "remaining_share": 0.3}],
)
@pytest.mark.parametrize("cutoffs", CUTOFFS)
@pytest.mark.parametrize("keyed", [True, False])
def test_both_computations_agree(rule: str, drain: Any, cutoffs: list[tuple[str, str]], keyed: bool) -> None:
    table = TEE | {"uplift": rule, "sediment": SOIL, "passive_share": 0.5, "surcharge_counts_as_weight": True}
    table |= {"cutoff": [{"position": place, "depth": depth} for place, depth in cutoffs]}
    table |= {"drain": drain} if drain else {}
    table |= {"key": KEY} if keyed else {}
    flood = [-5, 0, 0.3, 1, 2, 3, 3.9, 4.5, 5, -np.inf, 1, 2.2]
    protected = [-np.inf] * 6 + [0.2, 3, 5, -np.inf, 3, 1.5]
    result = assessed_wall(table, flood, protected)
    assert result.recheck.difference.max() < 1e-12
    assert result.checks


@pytest.mark.parametrize("place", ["0 m", "0.2 m", "0.4 m"])
def test_a_cutoff_under_a_key_is_not_counted_twice(place: str) -> None:
    """The way down and up is that of the deeper one, wherever along the key's bottom the cutoff hangs."""
    key = {"depth": "0.6 m", "width": "0.4 m", "position": "0 m"}
    table = TEE | {"key": key, "uplift": "line of creep", "cutoff": [{"position": place, "depth": "2 m"}]}
    result = assessed_wall(table | {"crack": "not opened"}, 2.0)
    assert result.seepage.vertical.item() == pytest.approx(2 * 2.0)
    width = 3.7
    lift = result.stability.uplift
    resistance = 2 * 2.0 + width
    assert lift.start[0, -1] == pytest.approx(9810 * 2.0 * (width - lift.x[0, -2]) / resistance)


def test_a_spoiled_force_is_caught(monkeypatch: pytest.MonkeyPatch) -> None:
    def spoiled(*args: Any) -> Any:
        return water_forces(*args)[1:]

    monkeypatch.setattr("loads.wall.stability.water_forces", spoiled)
    with pytest.raises(AssertionError):
        assessed_wall(TEE, 3.0)


LIMITS: dict[str, Any] = {
    "criteria": "EM 1110-2-2100 normal ordinary",
    "sediment": SOIL,
    "key": KEY,
    "foundation": {
        "friction_angle": "30 deg",
        "saturated_unit_weight": "20 kN/m3",
        "soil_friction_angle": "32 deg",
        "allowable_bearing": "150 kPa",
        "bearing_method": "Meyerhof",
        "material": "coarse sand",
        "exit_gradient_factor": 3.0,
    },
}


@pytest.mark.parametrize("rule", RULES)
def test_grid_equals_one_by_one(rule: str) -> None:
    table = TEE | LIMITS | {"uplift": rule}
    ranges = {
        "heel": np.array([1.0, 2.0, 3.5]),
        "toe": np.array([0.3, 1.0]),
        "key_depth": np.array([0.3, 0.9]),
    }
    grid = option_grid(wall_of(table), states(3.2), waters(), ranges)
    assert grid.possible.all()
    for candidate in range(12):
        size = grid.dimensions(candidate)
        one = table | {"heel": f"{size['heel']!r} m", "toe": f"{size['toe']!r} m"}
        one |= {"key": KEY | {"depth": f"{size['key_depth']!r} m"}}
        found = {check.name: check for check in assessed_wall(one, 3.2).checks if check.limit is not None}
        for name, ratio in zip(grid.checks, grid.ratios[candidate], strict=True):
            assert ratio == pytest.approx(found[name].ratio.item(), rel=1e-9), name
        governing = max(found.values(), key=lambda check: check.ratio.item())
        assert grid.checks[int(grid.governing[candidate])] == governing.name


def test_least_material_is_within_every_limit() -> None:
    table = BLOCK | {"height": "3 m", "criteria": "EM 1110-2-2100 normal ordinary"}
    ranges = {"top_width": np.linspace(0.3, 2, 35), "base_width": np.linspace(0.5, 5, 46)}
    shares: list[float] = []
    grid = option_grid(wall_of(table), states(2.5), waters(), ranges, progress=shares.append)
    assert shares[-1] == 1
    assert grid.least is not None
    assert grid.worst[grid.least] <= 1
    others = grid.material[grid.within]
    assert grid.material[grid.least] == others.min()
    possible = grid.dimensions(0)["top_width"] <= grid.dimensions(0)["base_width"]
    assert grid.possible[0] == possible
    headings, columns = grid.columns()
    assert len(headings) == len(columns)
    assert {len(column) for column in columns} == {35 * 46}


def test_a_record_survives_its_dump() -> None:
    wall = wall_of(TEE | LIMITS)
    assert isinstance(wall, Wall)
    assert wall.ground("flood") == 2.0
