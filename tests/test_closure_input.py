"""Everything that can be wrong with a closure has its sentence."""

from __future__ import annotations

import copy
from typing import Any

import pytest

from loads.problems import ScenarioError
from loads.scenario_file import scenario_of
from tests.closures import FULL, SPARSE, closure_scene, closure_under

LOG = SPARSE["log"]
POST = FULL["post"]


def problems(closure: dict[str, Any], **more: Any) -> list[str]:
    with pytest.raises(ScenarioError) as refusal:
        scenario_of(closure_scene(closure, **more))
    return [str(problem) for problem in refusal.value.problems]


def without(closure: dict[str, Any], *keys: str) -> dict[str, Any]:
    return {key: value for key, value in closure.items() if key not in keys}


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        ({"bays": 0}, "closure[C1].bays is 0; it must be at least 1"),
        ({"bays": 2.5}, "closure[C1].bays is 2.5; it must be a whole number"),
        (
            {"bay_widths": ["2 m"]},
            'closure[C1].bay_width is "2 m"; it is not used beside bay_widths; leave one of them out',
        ),
        (
            {"height": "0.1 m"},
            'closure[C1].log.height is "0.2 m"; it must not be taller than the opening, "0.1 m"',
        ),
        (
            {"height": "1.5 m"},
            'closure[C1].height is "1.5 m"; the 8 logs in place would stand above the top of the opening',
        ),
        (
            {"logs_in_place": 9},
            "closure[C1].logs_in_place is 9; it must not be more than the 8 on hand (bay 1)",
        ),
        (
            {"logs_in_place": [8, 9]},
            "closure[C1].logs_in_place is 9; it must not be more than the 8 on hand (bay 2)",
        ),
        (
            {"logs_in_place": [8, 8, 8]},
            "closure[C1].logs_in_place is a list of 3; it must have one number for each of 2 bays",
        ),
        (
            {"logs_in_place": -1},
            "closure[C1].logs_in_place is -1; it must be between 0 and 200",
        ),
        (
            {"logs_in_place": True},
            "closure[C1].logs_in_place is True; it must be a whole number, or a list with one for each bay",
        ),
        ({"anchor": {"shear_bolts": 2}}, "closure[C1].post is missing; anchors hold a post"),
        (
            {"post": {}, "anchor": {"tension_bolts": 2}},
            (
                "closure[C1].anchor.lever_arm is missing; bolts that are pulled need it, or the distances of "
                "all bolts"
            ),
        ),
        (
            {"post": {}, "anchor": {"lever_arm": "9 in"}},
            (
                "closure[C1].anchor.tension_bolts is missing; a lever arm says nothing without the number of "
                "bolts"
            ),
        ),
        (
            {"post": {}, "anchor": {"bolt_distances": ["4 in", "12 in"], "lever_arm": "9 in"}},
            (
                "closure[C1].anchor.lever_arm is given; it is not used beside bolt_distances; leave one of "
                "them out"
            ),
        ),
        (
            {"post": {}, "anchor": {"plate_width": "10 in"}},
            "closure[C1].anchor.contact_length is missing; the area of contact is width times length",
        ),
        (
            {"post": {"height": "2 m", "brace": {"height": "2.1 m", "angle": "45 deg"}}},
            'closure[C1].post.brace.height is "2.1 m"; it must not be above the top of the post, "2 m"',
        ),
        (
            {"post": {"brace": {"height": "1.7 m", "angle": "45 deg"}}},
            (
                'closure[C1].post.brace.height is "1.7 m"; it must not be above the top of the post, '
                "which ends with "
                "the logs on hand"
            ),
        ),
        (
            {"post": {"height": "1.5 m"}},
            'closure[C1].post.height is "1.5 m"; the 8 logs in place would stand above the top of the post',
        ),
        (
            {"post": {"limits": {"brace_force": "2 kip"}}},
            (
                'closure[C1].post.limits.brace_force is "2 kip"; there is no brace; enter one or leave the '
                "limit out"
            ),
        ),
        (
            {"post": {"section": {"thickness": "6 in"}}},
            "closure[C1].post.section.width is missing; enter it here or as the post's width",
        ),
        (
            {
                "sediment": [
                    {"side": "flood", "top": "-1 m", "pressure": "fluid mud", "fluid_unit_weight": "80 pcf"}
                ]
            },
            'closure[C1].sediment[0].top is "-1 m"; it must lie above the sill of the closure, "0 m"',
        ),
        (
            {"seal": {"rate": "1 gpm/ft", "at_head": "3 ft"}},
            (
                "closure[C1].seal.exponent is missing; a rate of leakage needs the power of the head by "
                "which it grows: "
                "0.5 for an opening, 1 for a slow seep"
            ),
        ),
        (
            {"adding": {"with_water": False, "up_to": "1 m"}},
            (
                'closure[C1].adding.up_to is "1 m"; it is not used while logs cannot be added with water '
                "at the sill; "
                "leave it out"
            ),
        ),
        ({"bay": 3}, 'closure[C1].bay is not a known key; did you mean "bays"?'),
    ],
)
def test_closure(change: dict[str, Any], sentence: str) -> None:
    assert problems({**SPARSE, **change}) == [sentence]


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        ({"height": "9"}, 'closure[C1].log.height is "9"; it needs a unit, for example "9 in"'),
        ({"count": 0}, "closure[C1].log.count is 0; it must be between 1 and 200"),
        (
            {"count": "14"},
            'closure[C1].log.count is "14"; it must be a whole number, or a list with one for each bay',
        ),
        (
            {"material": "aluminium 6061"},
            (
                'closure[C1].log.material is "aluminium 6061"; it must be a reference material, or left '
                "out: it is "
                'not in the table of materials; did you mean "aluminium 6061-T6"?'
            ),
        ),
        (
            {"section": {"thickness": "2 in", "wall": "0.1 in"}},
            'closure[C1].log.section.wall is given; it is not used by shape "rectangle"; leave it out',
        ),
        (
            {"section": {"shape": "hollow rectangle", "thickness": "2 in"}},
            'closure[C1].log.section.wall is missing; shape "hollow rectangle" needs it',
        ),
        (
            {"section": {"shape": "hollow rectangle", "thickness": "2 in", "wall": "1 in"}},
            'closure[C1].log.section.wall is "1 in"; it must be less than half the thickness',
        ),
        (
            {"section": {"shape": "hollow rectangle", "thickness": "20 in", "wall": "1 in", "ribs": 6}},
            'closure[C1].log.section.wall is "1 in"; it leaves no hollow within the height of the log',
        ),
        (
            {"section": {"shape": "properties", "section_modulus": "12 in2"}},
            (
                'closure[C1].log.section.section_modulus is "12 in2"; in2 is a unit of area, and this is '
                "a section "
                'modulus; write it with one of in3, mm3, cm3, m3, for example "12 in3"'
            ),
        ),
        (
            {"weight": "3 kPa"},
            (
                'closure[C1].log.weight is "3 kPa"; kPa is a unit of pressure, and this is a weight; '
                "write it with "
                'one of lb, lbf, kip, kg, N, kN, for example "3 lb"'
            ),
        ),
        (
            {"limits": {"span_over_deflection": 0.5}},
            "closure[C1].log.limits.span_over_deflection is 0.5; it must be more than 1",
        ),
        (
            {"limits": {"bending_stress": 12}},
            'closure[C1].log.limits.bending_stress is 12; it needs a unit, in quotes, for example "12 ksi"',
        ),
    ],
)
def test_log(change: dict[str, Any], sentence: str) -> None:
    assert problems({**SPARSE, "log": {**LOG, **change}}) == [sentence]


def test_a_closure_needs_its_bays() -> None:
    assert problems(without(SPARSE, "bays", "bay_width")) == [
        "closure[C1].bays is missing; a closure needs bays and bay_width, or bay_widths",
        "closure[C1].bay_width is missing; a closure needs bays and bay_width, or bay_widths",
    ]
    widths = {**without(SPARSE, "bay_width"), "bay_widths": ["2 m", "3 m", "2 m"]}
    assert problems(widths) == [
        "closure[C1].bays is 2; bay_widths names 3; they must agree, or leave bays out"
    ]


def test_all_problems_come_at_once() -> None:
    closure = copy.deepcopy(FULL)
    closure["log"]["height"] = "9"
    closure["post"]["brace"]["angle"] = "100 deg"
    closure["seal"]["rate"] = "1 gpm"
    assert len(problems(closure)) == 3


@pytest.mark.parametrize(
    ("basis", "sentence"),
    [
        (
            {"method": "strength", "load_factor": 1.4},
            'basis.resistance_factor is missing; method "strength" needs it',
        ),
        (
            {"load_factor": 1.4},
            'basis.load_factor is given; it is not used by method "working stress"; leave it out',
        ),
        ({"category_factor": 0}, "basis.category_factor is 0; it must be more than 0"),
    ],
)
def test_basis(basis: dict[str, Any], sentence: str) -> None:
    assert problems(SPARSE, basis=basis) == [sentence]


def test_ids_are_shared_with_panels() -> None:
    document = closure_scene(SPARSE)
    document["panel"] = [{"id": "C1", "bottom": "0 m", "width": "1 m", "height": "1 m"}]
    with pytest.raises(ScenarioError) as refusal:
        scenario_of(document)
    assert [str(problem) for problem in refusal.value.problems] == [
        'id is "C1"; it is used 2 times; every barrier needs an id of its own'
    ]


def test_a_rated_level_without_a_date_is_accepted_and_remarked_on() -> None:
    barrier = closure_under({**SPARSE, "rated_level": "1.5 m"})
    assert "The rated level has no date or no author: ask who set it and when." in barrier.remarks
    dated = {"value": "1.5 m", "source": "engineer", "date": "2030-03-02"}
    assert not any("no date" in remark for remark in closure_under({**SPARSE, "rated_level": dated}).remarks)
