"""What a closure's checks, parts, remarks and losses say."""

from __future__ import annotations

import copy
import json
from typing import Any

import numpy as np
import pytest

from loads.assessment import Assessed, assess
from loads.closure.materials import MATERIALS
from loads.closure.post import post_forces
from loads.closure.whatif import what_ifs
from tests.closures import (
    FULL,
    SPARSE,
    check_of,
    closure_of,
    closure_scene,
    closure_under,
    figure_of,
    part_of,
)
from tests.scenes import filed, levels
from webapp.answer import answer
from webapp.text_table import table_text

GAMMA = 9810.0
WATER = {"unit_weight": "9.81 kN/m3"}


def changed(closure: dict[str, Any], **changes: Any) -> dict[str, Any]:
    """Copy with values set by path, for example log__limits__moment."""
    made = copy.deepcopy(closure)
    for path, value in changes.items():
        here = made
        *way, last = path.split("__")
        for key in way:
            here = here.setdefault(key, {})
        if value is None:
            here.pop(last, None)
        else:
            here[last] = value
    return made


def test_sparse_closure_gives_demands_and_no_verdict() -> None:
    barrier = closure_under(SPARSE, flood_side="1 m", **WATER)
    assert barrier.first_limit is None
    assert barrier.first_limits == ()
    verdicts = {check.name: check.verdict() for check in barrier.checks}
    assert set(verdicts.values()) == {"not checked"}
    moment = check_of(barrier.checks, "bending moment")
    assert moment.subject == "logs"
    assert float(moment.demand[0]) == pytest.approx(GAMMA * 0.9 * 0.2 * 2**2 / 8, rel=1e-12)
    assert barrier.verdict_of("bay 1 log 1") == "not checked"
    assert all(check.source == "no limit entered" for check in barrier.checks if check.limit is None)


@pytest.mark.parametrize(
    "closure",
    [
        SPARSE,
        {**SPARSE, "logs_in_place": 0},
        {**SPARSE, "logs_in_place": [0, 3]},
        {**SPARSE, "logs_in_place": [8, 0]},
        {**SPARSE, "bays": 1},
        changed(FULL, logs_in_place=[0, 4, 0]),
        changed(FULL, logs_in_place=0),
        changed(FULL, log__section=None),
        changed(FULL, log__material=None, post__material=None),
        changed(FULL, post__section=None),
        changed(FULL, post__brace__fixity="pinned"),
        changed(FULL, anchor=None),
        changed(FULL, anchor={"bolt_distances": ["50 mm", "300 mm"]}),
        changed(FULL, post=None, anchor=None),
        changed(FULL, log__weight=None, seal=None, handling=None, guide=None),
        changed(FULL, log__fills_with_water=True),
        changed(FULL, log__material="Douglas fir-larch No. 2, 2 to 4 in", log__section={"thickness": "4 in"}),
    ],
)
@pytest.mark.parametrize("flood_side", ["1.2 m", "2.2 m", "7 m"])
@pytest.mark.parametrize("water", [{}, {"protected_side": "2.5 m"}])
def test_whatever_is_left_out_nothing_fails(
    closure: dict[str, Any], flood_side: str, water: dict[str, str]
) -> None:
    document = closure_scene(closure, flood_side=flood_side, **water)
    assessment = assess(filed(document))
    text = json.dumps(answer(assessment, document), allow_nan=False)
    assert table_text(assessment, document)
    (found,) = json.loads(text)["barriers"]
    assert found["kind"] == "closure"
    assert found["recheck"]["agrees"] is True
    assert len(found["parts"]) == sum(found["logs"]["in_place"]) + len(filed(document).closure[0].widths) + 1


def test_parts_of_the_json_are_those_of_the_engine() -> None:
    document = closure_scene(FULL, flood_side="3 m")
    assessment = assess(filed(document))
    (barrier,) = assessment.barriers
    assert isinstance(barrier, Assessed)
    (found,) = answer(assessment, document)["barriers"]
    assert list(found["parts"][0])[:9] == [
        "id", "kind", "bottom", "top", "line_load", "moment", "shear", "reaction", "deflection"
    ]  # fmt: skip
    for part, printed in zip(barrier.parts, found["parts"], strict=True):
        assert printed["id"] == part.id
        assert printed["reaction"] == float(part.reaction[0])
    post = next(part for part in found["parts"] if part["kind"] == "post")
    assert post["brace_force"] > 0
    assert post["bolt_tension"] == pytest.approx(post["anchor_tension"] / 2)
    subjects = {(check["subject"], check["check"]) for check in found["checks"]}
    assert ("bay 1 log 1", "bending stress") in subjects
    assert ("post 2", "brace force") in subjects


def test_no_logs_in_place_is_an_open_opening() -> None:
    barrier = closure_under({**SPARSE, "logs_in_place": 0}, flood_side="0.5 m")
    assert float(barrier.resultant.horizontal[0]) == 0
    assert check_of(barrier.checks, "top of the logs in place").verdict() == "above limit"
    assert barrier.hydraulics.overflow.level == 0.0
    assert float(barrier.hydraulics.overflow.total_low[0]) > 0
    assert any("opening is open" in remark for remark in barrier.remarks)


def test_an_overtopped_stack_is_above_limit_and_not_stronger() -> None:
    over, at = (closure_under(SPARSE, flood_side=level, **WATER) for level in ("1.9 m", "1.6 m"))
    assert check_of(over.checks, "top of the logs in place").verdict() == "above limit"
    assert float(over.hydraulics.overflow.total_high[0]) > float(over.hydraulics.overflow.total_low[0]) > 0
    assert float(over.hydraulics.overflow.total_high[0]) == float(over.hydraulics.inflow.total[0])
    loads = [float(barrier.demands.logs.line_load[0, 7]) for barrier in (at, over)]
    assert loads[1] == pytest.approx(loads[0] + GAMMA * 0.3 * 0.2, rel=1e-12)


def test_unequal_stacks_load_the_post_from_each_side() -> None:
    closure = {**SPARSE, "logs_in_place": [8, 4], "post": {"width": "0.3 m"}}
    barrier = closure_under(closure, flood_side="1.6 m", **WATER)
    post = part_of(barrier, "post 1")
    low = GAMMA * (1.6**2 - 0.8**2) / 2
    high = GAMMA * 0.8**2 / 2
    assert float(post.reaction[0]) == pytest.approx((low + high) * 1.3 + low * 1.0, rel=1e-12)
    assert barrier.setting.panel.shape == "outline"
    assert barrier.structure.layout.lowest_top == pytest.approx(0.8)
    assert barrier.face.top == pytest.approx(1.6)


def test_an_entered_limit_wins_over_the_material() -> None:
    entered = {"value": "50 MPa", "source": "engineer", "date": "2030-03-02"}
    barrier = closure_under(changed(FULL, log__limits__bending_stress=entered), flood_side="3 m")
    check = check_of(barrier.checks, "bending stress", "bay 1 log 1")
    assert check.limit_value == 50e6
    assert check.source.startswith("engineer, 2030-03-02; working stress, usual")
    assert check.remarks == ()


def test_a_limit_of_the_table_carries_its_document_and_its_doubt() -> None:
    check = check_of(closure_under(FULL, flood_side="3 m").checks, "bending stress", "bay 1 log 1")
    assert check.limit_value == pytest.approx(19.5 * 6894757.293168361)
    assert "Aluminum Design Manual" in check.source
    assert "from memory, to be confirmed" in check.source
    assert any("has to be confirmed" in remark for remark in check.remarks)


def test_a_material_without_a_figure_leaves_the_stress_unchecked() -> None:
    barrier = closure_under(changed(FULL, log__material="aluminium 6082-T6"), flood_side="3 m")
    assert check_of(barrier.checks, "deflection, share of span").verdict() != "not checked"
    assert not [c for c in barrier.checks if c.name == "bending stress" and c.subject.startswith("bay")]


def test_every_material_says_where_it_is_from() -> None:
    for name, material in MATERIALS.items():
        assert material.name == name
        for figure in (material.modulus, *material.allowable.values(), *material.nominal.values()):
            assert figure.source
            assert figure.edition
            assert figure.limit().value > 0


def test_factors_of_the_basis() -> None:
    plain = closure_under(FULL, flood_side="3 m")
    unusual = closure_under(FULL, flood_side="3 m", basis={"category": "unusual", "category_factor": 1.33})
    strength = closure_under(
        FULL,
        flood_side="3 m",
        basis={"method": "strength", "load_factor": 1.4, "resistance_factor": 0.9, "category": "extreme"},
    )
    for name in ("line load", "brace force", "bolt tension"):
        was, now, factored = (check_of(one.checks, name) for one in (plain, unusual, strength))
        assert now.limit_value == pytest.approx(1.33 * was.limit_value)
        assert factored.limit_value == pytest.approx(0.9 * was.limit_value)
        assert factored.demand == pytest.approx(1.4 * was.demand)
        assert float(factored.ratio[0]) == pytest.approx(float(was.ratio[0]) * 1.4 / 0.9)
        assert "category factor 1.33" in now.source
        assert "load factor 1.4" in factored.source
    sag = [check_of(one.checks, "deflection, share of span") for one in (plain, strength)]
    assert sag[0].ratio == pytest.approx(sag[1].ratio)
    assert check_of(strength.checks, "bending stress", "bay 1 log 1").limit_value == pytest.approx(
        0.9 * 35 * 6894757.293168361
    )
    first = [one.first_limit for one in (plain, unusual, strength)]
    assert first[0] is not None
    assert first[2] is not None
    assert first[0].level is not None
    assert first[2].level is not None
    assert first[2].level < first[0].level


def test_brace_lifts_its_post_and_the_bolts_take_it() -> None:
    barrier = closure_under(FULL, flood_side="3.5 m")
    post = part_of(barrier, "post 1")
    force, lift = figure_of(post, "brace_force"), figure_of(post, "brace_lift")
    angle = np.radians(50)
    held = float(post.reaction[0]) - figure_of(post, "base_shear")
    assert force == pytest.approx(held / np.cos(angle), rel=1e-12)
    assert lift == pytest.approx(held * np.tan(angle), rel=1e-12)
    weight = 88 * 9.80665
    spare = max(lift - weight, 0.0)
    couple = figure_of(post, "base_moment") / 0.26
    assert figure_of(post, "anchor_tension") == pytest.approx(couple + spare, rel=1e-12)
    assert figure_of(post, "contact_pressure") == pytest.approx(
        (abs(couple) + max(weight - lift, 0.0)) / (0.3 * 0.08), rel=1e-12
    )
    assert figure_of(post, "bolt_shear") == pytest.approx(figure_of(post, "base_shear") / 4, rel=1e-12)


def test_a_stiff_plate_shares_the_moment_by_distance() -> None:
    distances = ["60 mm", "60 mm", "340 mm", "340 mm"]
    closure = changed(
        FULL,
        anchor={"bolt_distances": distances, "shear_bolts": 4},
        post__brace=None,
        post__limits__brace_force=None,
    )
    post = part_of(closure_under(closure, flood_side="3 m"), "post 1")
    moment = figure_of(post, "base_moment")
    pulls = np.array([0.06, 0.06, 0.34, 0.34]) * moment / (2 * 0.06**2 + 2 * 0.34**2)
    assert figure_of(post, "bolt_tension") == pytest.approx(pulls.max(), rel=1e-12)
    assert figure_of(post, "anchor_tension") == pytest.approx(pulls.sum(), rel=1e-12)
    assert pulls @ np.array([0.06, 0.06, 0.34, 0.34]) == pytest.approx(moment, rel=1e-12)


def test_a_moment_toward_the_flood_side_pulls_the_bolts_no_less() -> None:
    """Load above the brace only, as with water held behind up to it: base moment and brace lift add up."""
    closure = changed(FULL, post__brace__height="0.5 m", guide=None)
    forward = closure_under(closure, flood_side="3.4 m", protected_side="1.9 m")
    back = closure_under(closure, flood_side="1.9 m", protected_side="3.4 m")
    for barrier in (forward, back):
        post = part_of(barrier, "post 1")
        couple = abs(figure_of(post, "base_moment")) / 0.26
        spare = max(figure_of(post, "brace_lift") - 88 * 9.80665, 0.0)
        assert figure_of(post, "anchor_tension") == pytest.approx(couple + spare, rel=1e-12)
    assert (
        figure_of(part_of(forward, "post 1"), "base_moment")
        < 0
        < figure_of(part_of(back, "post 1"), "base_moment")
    )
    check = check_of(back.checks, "bolt tension")
    assert float(check.demand[0]) < 0
    assert float(check.ratio[0]) > 0


def test_reverse_load_is_beyond_one_way_guides() -> None:
    forward = closure_under(FULL, flood_side="3 m")
    back = closure_under(FULL, flood_side="2 m", protected_side="2.4 m")
    name = "pressure toward the flood side"
    assert check_of(forward.checks, name).verdict() == "not checked"
    assert check_of(back.checks, name).verdict() == "above limit"
    assert any(remark.startswith("Reverse head") for remark in back.remarks)
    both_ways = closure_under(changed(FULL, guide=None), flood_side="2 m", protected_side="2.4 m")
    assert name not in {check.name for check in both_ways.checks}


def test_water_and_weight_checks() -> None:
    barrier = closure_under(FULL, flood_side="3 m")
    found = barrier.hydraulics
    hold = check_of(barrier.checks, "buoyancy on the hold-downs of a bay")
    assert found.hold_down is not None
    assert float(hold.demand[0]) == float(found.hold_down[0].max())
    assert hold.limit_value == 4000
    section = barrier.structure.log
    gross = 0.11 * 0.24
    assert section.gross_area == pytest.approx(gross)
    unit_weight = barrier.setting.fluids["flood"].unit_weight
    wet = (3 - 1.3) / 0.24
    upward = unit_weight * gross * (3.1 + 2 * 0.07) * wet - 9.80665 * 31 * 8
    assert float(found.hold_down[0, 2]) == pytest.approx(upward, rel=1e-9)
    person = check_of(barrier.checks, "weight per person")
    assert float(person.ratio[0]) == pytest.approx(31 / 2 / 25)
    pump = check_of(barrier.checks, "inflow to be pumped")
    assert float(pump.demand[0]) == pytest.approx(sum(float(flow[0]) for flow in found.inflow.parts.values()))
    assert set(found.inflow.parts) == {"over the logs", "level seals", "end seals", "gaps at the guides"}
    needed = check_of(barrier.checks, "logs needed")
    assert float(needed.demand[0]) == np.ceil((3 + 0.3 + 0.2 - 1.3) / 0.24)
    lift = check_of(barrier.checks, "force to lift the top log")
    assert found.lifting is not None
    assert float(lift.demand[0]) == float(found.lifting.max())


def test_without_a_hold_down_light_logs_are_above_limit() -> None:
    barrier = closure_under(changed(FULL, hold_down=None), flood_side="3 m")
    check = check_of(barrier.checks, "buoyancy on the hold-downs of a bay")
    assert check.verdict() == "above limit"
    assert check.source == "no hold-down entered"
    heavy = closure_under(changed(FULL, hold_down=None, log__weight="90 kg"), flood_side="3 m")
    assert check_of(heavy.checks, "buoyancy on the hold-downs of a bay").verdict() == "not checked"


def test_facts_of_the_build_alone_never_read_below_limit() -> None:
    table = {
        "id": "C",
        "sill": "0 m",
        "bays": 2,
        "bay_width": "2 m",
        "allowance": "0.1 m",
        "guide": {"one_way": True},
        "log": {
            "height": "0.2 m",
            "count": 10,
            "bearing_length": "50 mm",
            "weight": "90 kg",
            "section": {"shape": "rectangle", "thickness": "60 mm"},
        },
    }
    barrier = closure_under(table, flood_side="1 m")
    names = {check.name for check in barrier.checks}
    assert {"logs needed", "buoyancy on the hold-downs of a bay", "pressure toward the flood side"} <= names
    assert barrier.verdict() == "not checked"


def test_what_ifs() -> None:
    closure = changed(FULL, bay_widths=["2.4 m"] * 4, logs_in_place=9)
    barrier = closure_under(closure, flood_side="3 m")
    before = {check.name: check.verdict() for check in barrier.checks}
    losses = what_ifs(barrier)
    assert [loss.name for loss in losses] == ["brace lost", "post lost", "post lost", "post lost"]
    assert [loss.part for loss in losses] == ["brace of post 1", "post 1", "post 2", "post 3"]
    brace = losses[0]
    assert brace.demands is not None
    load = barrier.demands.structure.layout.posts[0]
    width = load.width
    head = 3 - 1.3
    unit_weight = barrier.setting.fluids["flood"].unit_weight
    assert float(brace.demands.posts.base_moment[0, 0]) == pytest.approx(
        width * unit_weight * head**3 / 6, rel=1e-12
    )
    post = losses[2]
    assert post.demands is not None
    span = 2.4 + 0.07
    growth = ((2 * span + 0.11) / span) ** 2
    assert float(post.demands.logs.moment[0, 0] / barrier.demands.logs.moment[0, 0]) == pytest.approx(growth)
    assert {check.subject for check in post.checks if check.subject.startswith("post")} >= {
        "post 1",
        "post 3",
    }
    assert check_of(post.checks, "line load").subject == "bays 2 and 3, log 1"
    assert before == {check.name: check.verdict() for check in barrier.checks}


def test_a_pinned_post_cannot_lose_its_brace() -> None:
    barrier = closure_under(changed(FULL, post__brace__fixity="pinned"), flood_side="3 m")
    loss = what_ifs(barrier)[0]
    assert not loss.stands
    assert loss.verdict() == "above limit"
    assert "cannot stand" in loss.words


def test_parts_short_and_adding_are_remarked_on() -> None:
    closure = {
        **SPARSE,
        "parts_short": ["one seal missing"],
        "adding": {"with_water": True, "up_to": "0.8 m"},
    }
    barrier = closure_under(closure, flood_side="1 m")
    assert "Parts short: one seal missing." in barrier.remarks
    assert "The water stands above the level up to which logs can be added." in barrier.remarks
    late = closure_under({**SPARSE, "adding": {"with_water": False}}, flood_side="1 m")
    assert "Water stands at the sill: no more logs can be added." in late.remarks


def test_checks_are_in_order_and_verdicts_are_the_worst() -> None:
    barrier = closure_of(closure_scene(FULL), levels([2.0, 3.6]))
    ratios = np.nan_to_num(
        [float(check.ratio[0]) for check in barrier.checks if check.grades_below], nan=-1.0
    )
    assert (np.diff(ratios) <= 0).all()
    for index in (0, 1):
        assert barrier.verdict(index) == max(
            (check.verdict(index) for check in barrier.checks),
            key=("not checked", "below limit", "near limit", "above limit").index,
        )
    own = [check.verdict(1) for check in barrier.checks if check.subject == "post 1"]
    assert barrier.verdict_of("post 1", 1) in own
    assert len({id(check) for check in barrier.checks}) == len(barrier.checks)


def test_a_post_without_stiffness_still_has_its_forces() -> None:
    diagram = closure_under(SPARSE).diagram
    found = post_forces(diagram, height=1.6, stiffness=float("nan"), prop=None)
    assert np.isnan(found.deflection[0])
    assert float(found.base_shear[0]) > 0
