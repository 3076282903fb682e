"""Verdicts, levels as limits, which water stands where, and what is remarked on."""

from __future__ import annotations

from dataclasses import replace
from typing import Any

import numpy as np
import pytest

from loads.assessment import Assessed, assess
from loads.checks import Check, Verdict, worst
from loads.faces import CircleFace, StripFace
from loads.water import fluid_of
from tests.scenes import assessed, filed, levels, panel_under, scene

PLATE: dict[str, Any] = {"width": "1 m", "height": "2 m"}
GAMMA = 9810.0
WATER = {"unit_weight": "9.81 kN/m3"}


def check(barrier: Assessed, name: str) -> Check:
    (found,) = [one for one in barrier.checks if one.name == name]
    return found


@pytest.mark.parametrize(
    ("limit", "verdict"),
    [
        ("19.62 kN", "near limit"),
        ("19.61 kN", "above limit"),
        ("21.8 kN", "near limit"),
        ("21.81 kN", "below limit"),
        (None, "not checked"),
    ],
)
def test_verdict_of_a_force(limit: str | None, verdict: Verdict) -> None:
    limits = {} if limit is None else {"limits": {"force": {"value": limit, "source": "engineer"}}}
    barrier = panel_under({**PLATE, **limits}, flood_side="2 m", **WATER)
    assert check(barrier, "total force").verdict() == verdict
    assert barrier.verdict() == verdict
    assert check(barrier, "total force").source == ("engineer" if limit else "no limit entered")


def test_a_ratio_that_is_no_number_is_never_below() -> None:
    barrier = panel_under({**PLATE, "limits": {"force": "90 kN"}}, flood_side="2 m")
    force = check(barrier, "total force")
    assert force.verdict() == "below limit"
    assert replace(force, ratio=np.array([np.nan])).verdict() == "above limit"
    assert worst([]) == "not checked"
    assert worst(["below limit", "withheld", "not checked"]) == "withheld"


@pytest.mark.parametrize(
    ("level", "rated", "freeboard"),
    [
        (0.5, "below limit", "below limit"),
        (1.36, "near limit", "below limit"),
        (1.5, "near limit", "near limit"),
        (1.51, "above limit", "near limit"),
        (1.61, "above limit", "above limit"),
        (-3.0, "below limit", "below limit"),
    ],
)
def test_levels_as_limits(level: float, rated: Verdict, freeboard: Verdict) -> None:
    panel = {**PLATE, "rated_level": "1.5 m", "limits": {"freeboard": "0.4 m"}}
    barrier = panel_under(panel, flood_side=f"{level} m")
    assert check(barrier, "rated level").verdict() == rated
    assert check(barrier, "freeboard").verdict() == freeboard


def test_a_rated_level_below_the_bottom_is_above_limit_once_water_passes_it() -> None:
    panel = {**PLATE, "rated_level": {"value": "-0.5 m", "source": "engineer", "date": "2030-03-02"}}
    dry, wet = (panel_under(panel, flood_side=level) for level in ("-1 m", "-0.4 m"))
    assert check(dry, "rated level").verdict() == "below limit"
    assert check(wet, "rated level").verdict() == "above limit"
    assert check(wet, "rated level").source == "engineer, 2030-03-02"
    assert any("below the bottom" in remark for remark in wet.remarks)


def test_many_states_have_a_verdict_each() -> None:
    document = scene({**PLATE, "limits": {"moment": "13.08 kN·m"}}, **WATER)
    barrier = assessed(document, levels([0.5, 1.95, 2.2]))
    assert [barrier.verdict(i) for i in range(3)] == ["below limit", "near limit", "above limit"]


def test_a_load_toward_the_flood_side_is_said() -> None:
    panel = {**PLATE, "limits": {"force": "90 kN"}}
    reverse = panel_under(panel, flood_side="0.5 m", protected_side="1.5 m")
    assert "pushes toward the flood side" in check(reverse, "total force").remarks[0]
    assert any(remark.startswith("Reverse head") for remark in reverse.remarks)
    assert check(reverse, "pressure at a point").demand[0] < 0


def test_a_dry_barrier_has_no_load() -> None:
    barrier = panel_under(PLATE, flood_side="-1 m")
    found = barrier.resultant
    assert (found.horizontal[0], found.vertical[0], found.moment[0]) == (0, 0, 0)
    assert np.isnan(found.line_of_action[0])
    assert not np.signbit([found.horizontal[0], found.vertical[0], found.moment[0]]).any()


@pytest.mark.parametrize(
    ("water", "flood", "protected"),
    [
        ({}, "fresh water by convention", "fresh water by convention"),
        ({"fluid": "sea"}, "sea water by convention", "sea water by convention"),
        ({"fluid": "sea", "protected_fluid": "fresh"}, "sea water by", "fresh water by convention"),
        (
            {"fluid": "sea", "salinity": 31.0},
            "sea water at 15 degC assumed, salinity 31 [",
            "sea water at 15",
        ),
        (
            {"fluid": "sea", "temperature": "9 degC"},
            "sea water at 9 degC, salinity 35 assumed",
            "sea water at 9",
        ),
        ({"temperature": "50 degF"}, "fresh water at 50 degF", "fresh water at 50 degF"),
        (
            {"temperature": "50 degF", "protected_temperature": "40 degF"},
            "fresh water at 50",
            "fresh water at 40",
        ),
        (
            {"suspended_sediment": "20 kg/m3"},
            "fresh water by convention, 62.4 pcf",
            "fresh water by convention",
        ),
        ({"unit_weight": "63 pcf"}, "entered, 63 pcf", "entered, 63 pcf"),
        ({"unit_weight": "63 pcf", "protected_unit_weight": "64 pcf"}, "entered, 63", "entered, 64 pcf"),
        (
            {"unit_weight": "63 pcf", "protected_temperature": "40 degF"},
            "entered, 63",
            "fresh water at 40 degF",
        ),
        ({"protected_unit_weight": "64 pcf"}, "fresh water by convention", "entered, 64 pcf"),
        (
            {"protected_suspended_sediment": "9 kg/m3"},
            "fresh water by convention",
            "fresh water by convention",
        ),
    ],
)
def test_which_water_stands_on_each_side(water: dict[str, Any], flood: str, protected: str) -> None:
    record = filed(scene(PLATE, **water)).water
    assert fluid_of(record, "flood").basis.startswith(flood)
    assert fluid_of(record, "protected").basis.startswith(protected)


def test_suspended_sediment_makes_the_water_heavier() -> None:
    clear = filed(scene(PLATE)).water
    muddy = filed(scene(PLATE, suspended_sediment="20 kg/m3")).water
    one, other = fluid_of(clear, "flood"), fluid_of(muddy, "flood")
    assert other.unit_weight - one.unit_weight == pytest.approx(20 * (1 - 999.55 / 2650) * 9.80665, rel=1e-4)
    assert "20 kg/m3 of suspended sediment" in other.basis


@pytest.mark.parametrize("shape", [{"width": "1 m", "height": "2 m"}, {"shape": "circle", "diameter": "2 m"}])
def test_where_a_leaning_face_stands(shape: dict[str, Any]) -> None:
    face = panel_under({**shape, "tilt": "60 deg"}).face
    assert isinstance(face, StripFace | CircleFace)
    assert face.x_at(face.top) == pytest.approx(1.0)
    assert face.top == pytest.approx(3**0.5)
    assert panel_under(shape).face.x_at(1.0) == 0.0


@pytest.mark.parametrize(
    ("change", "words"),
    [
        ({"pressure": "active"}, "active pressure holds only where the face can give way"),
        ({"pressure": "passive"}, "passive pressure needs movement"),
        ({"pressure": "passive", "wall_friction": "20 deg"}, "wall friction outside the formula's range"),
        ({"overconsolidation_ratio": 18.0}, "overconsolidation ratio outside"),
        ({}, "no moist unit weight entered"),
        ({"saturated_unit_weight": "60 pcf"}, "not heavier than its water"),
    ],
)
def test_remarks_on_sediment(change: dict[str, Any], words: str) -> None:
    soil = {"side": "flood", "top": "1 m", "saturated_unit_weight": "19 kN/m3", "pressure": "at rest"}
    layer = {**soil, "friction_angle": "30 deg", **change}
    barrier = panel_under({**PLATE, "sediment": [layer]}, flood_side="1.5 m")
    assert any(words in remark for remark in barrier.remarks)


def test_other_remarks() -> None:
    over = panel_under({**PLATE, "rated_level": "1 m"}, flood_side="2.5 m", suspended_sediment="500 kg/m3")
    for words in ("stands over the top", "may be mud", "no date or no author"):
        assert any(words in remark for remark in over.remarks), words


def test_soil_lighter_than_water_is_never_a_pull() -> None:
    peat = {"side": "flood", "top": "2 m", "saturated_unit_weight": "9 kN/m3", "pressure": "entered"}
    layer = {**peat, "pressure_coefficient": 0.5, "surcharge": "0.5 kPa"}
    barrier = panel_under({**PLATE, "sediment": [layer]}, flood_side="2 m", **WATER)
    soil = next(load for load in barrier.loads if load.name.startswith("sediment"))
    # σ′v = 500 − 810 z from the ground down, nil from z = 0.617 m on
    assert soil.diagram.shear(np.array([0.0]))[0, 0] == pytest.approx(0.5 * 500**2 / 810 / 2, rel=1e-12)
    assert soil.diagram.pressure(np.array([0.5]))[0, 0] == pytest.approx(0, abs=1e-9)


def test_a_foot_and_twelve_inches_are_one_height() -> None:
    corners = [["0 ft", "0 ft"], ["4 ft", "0 in"], ["4 ft", "12 in"], ["2 ft", "2 ft"], ["0 ft", "1 ft"]]
    panel = {"shape": "outline", "bottom": "100 ft", "points": corners}
    barrier = panel_under(panel, flood_side="102 ft", unit_weight="62.4 pcf")
    expected = 62.4 * (4 * 1 * 1.5 + 0.5 * 4 * 1 * (1 - 1 / 3))
    assert barrier.resultant.horizontal[0] / (0.45359237 * 9.80665) == pytest.approx(expected, rel=1e-12)


def test_water_exactly_at_the_bottom_of_every_shape_is_no_load() -> None:
    arc = {
        "shape": "arc",
        "width": "1 m",
        "height": "2.2 m",
        "offset": "0 m",
        "radius": "1.1 m",
        "centre": "flood",
    }
    for shape in (PLATE, {"shape": "circle", "diameter": "2 m"}, arc):
        barrier = panel_under({**shape, "bottom": "6.355 m"}, flood_side="6.355 m")
        assert barrier.resultant.total[0] == 0
        assert barrier.resultant.moment[0] == 0


def test_barriers_are_found_by_their_id() -> None:
    assessment = assess(filed(scene(PLATE, {**PLATE, "id": "Q7"})))
    assert assessment.barrier("Q7").record.id == "Q7"
    with pytest.raises(KeyError):
        assessment.barrier("Q8")
