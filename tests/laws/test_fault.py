"""A fault in one load must make the two computations disagree, and then nothing is shown."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

import loads.barrier
import loads.load
import loads.sediment
from loads.arrays import FloatArray
from loads.assessment import Assessed, Withheld, assess
from loads.diagram import Diagram
from loads.faces import Resultant, StripFace
from loads.load import Load
from loads.records.sediment import Sediment
from loads.scenario_file import Document
from loads.sediment import face_coefficient, sediment_diagrams
from loads.states import Levels
from loads.water import water_diagram
from tests.scenes import filed, scene

SOIL = {
    "side": "flood",
    "top": "1.4 m",
    "saturated_unit_weight": "19 kN/m3",
    "friction_angle": "28 deg",
    "pressure": "at rest",
}
COHESIVE = {**SOIL, "side": "protected", "pressure": "active", "cohesion": "3 kPa"}
MUD = {"side": "flood", "top": "1.9 m", "pressure": "fluid mud", "fluid_unit_weight": "12 kN/m3"}
SHAPES: dict[str, dict[str, Any]] = {
    "rectangle": {"width": "2 m", "height": "3 m"},
    "trapezoid": {"shape": "trapezoid", "bottom_width": "1 m", "top_width": "2 m", "height": "3 m"},
    "circle": {"shape": "circle", "diameter": "3 m"},
    "outline": {"shape": "outline", "points": [["0 m", "0 m"], ["3 m", "0.4 m"], ["1 m", "3 m"]]},
    "arc": {
        "shape": "arc",
        "width": "2 m",
        "height": "3 m",
        "offset": "0.3 m",
        "radius": "4 m",
        "centre": "flood",
    },
}


def document(shape: str, *sediment: dict[str, Any]) -> Document:
    panel = {**SHAPES[shape], **({"sediment": list(sediment)} if sediment else {})}
    return scene(panel, flood_side="2.5 m", protected_side="0.8 m", unit_weight="9.81 kN/m3")


def verdict_of(made: Document) -> Assessed | Withheld:
    (barrier,) = assess(filed(made)).barriers
    return barrier


def assert_trips(made: Document, put_in: Callable[[], None]) -> None:
    sound = verdict_of(made)
    assert isinstance(sound, Assessed)
    put_in()
    faulty = verdict_of(made)
    assert isinstance(faulty, Withheld)
    assert faulty.verdict() == "withheld"
    assert faulty.difference > 1e-9
    assert faulty.second[0] == pytest.approx(float(sound.resultant.horizontal[0]), rel=1e-9)
    assert faulty.first != faulty.second


@pytest.mark.parametrize("shape", sorted(SHAPES))
@pytest.mark.parametrize(
    "change",
    [
        pytest.param(lambda level, weight: water_diagram(level, weight * (1 + 3e-6)), id="unit weight"),
        pytest.param(lambda level, weight: water_diagram(level + 1e-5, weight), id="level"),
        pytest.param(lambda level, weight: water_diagram(level, weight).scaled(-1), id="sign"),
        pytest.param(lambda level, weight: water_diagram(level, 0 * weight), id="left out"),
    ],
)
def test_fault_in_the_water(
    monkeypatch: pytest.MonkeyPatch, shape: str, change: Callable[[FloatArray, float], Diagram]
) -> None:
    assert_trips(document(shape), lambda: monkeypatch.setattr(loads.load, "water_diagram", change))


def test_a_millionth_of_the_unit_weight_on_a_straight_face(monkeypatch: pytest.MonkeyPatch) -> None:
    def heavier(level: FloatArray, weight: float) -> Diagram:
        return water_diagram(level, weight * (1 + 1e-6))

    assert_trips(document("rectangle"), lambda: monkeypatch.setattr(loads.load, "water_diagram", heavier))


def one_layer_less(*arguments: Any, **named: Any) -> list[Diagram]:
    diagrams = sediment_diagrams(*arguments, **named)
    return [diagrams[0].scaled(0), *diagrams[1:]] if diagrams else []


def wrong_sign_of_a_fluid(*arguments: Any, **named: Any) -> list[Diagram]:
    diagrams = sediment_diagrams(*arguments, **named)
    return [diagrams[0].scaled(-1), *diagrams[1:]] if diagrams else []


def water_counted_twice(*arguments: Any, **named: Any) -> list[Diagram]:
    return sediment_diagrams(*arguments, **{**named, "water_unit_weight": 0.0})


def level_of_the_other_side(*arguments: Any, **named: Any) -> list[Diagram]:
    return sediment_diagrams(*arguments, **{**named, "level": named["level"] - 1.7})


@pytest.mark.parametrize("sediment", [(SOIL,), (MUD, SOIL), (MUD,), (COHESIVE,)], ids=str)
@pytest.mark.parametrize(
    "change", [one_layer_less, wrong_sign_of_a_fluid, water_counted_twice, level_of_the_other_side]
)
def test_fault_in_the_sediment(
    monkeypatch: pytest.MonkeyPatch, sediment: tuple[dict[str, Any], ...], change: Callable[..., Any]
) -> None:
    if change is level_of_the_other_side and sediment == (COHESIVE,):
        sediment = ({**COHESIVE, "top": "2 m", "cohesion": "1 kPa"},)
    made = document("rectangle", *sediment)
    assert_trips(made, lambda: monkeypatch.setattr(loads.load, "sediment_diagrams", change))


def test_fault_in_the_coefficient_of_earth_pressure(monkeypatch: pytest.MonkeyPatch) -> None:
    def larger(layer: Sediment, tilt: float) -> float:
        return face_coefficient(layer, tilt) * (1 + 1e-6)

    made = document("rectangle", SOIL)
    assert_trips(made, lambda: monkeypatch.setattr(loads.sediment, "face_coefficient", larger))


def test_fault_in_the_floor_at_zero(monkeypatch: pytest.MonkeyPatch) -> None:
    def with_tension(start: FloatArray, slope: float, upper: FloatArray, lower: FloatArray) -> Any:
        end = start + slope * (upper - lower)
        return [(upper, start, np.full_like(start, slope)), (lower, -end, np.full_like(start, -slope))]

    made = document("rectangle", COHESIVE)
    assert_trips(made, lambda: monkeypatch.setattr(loads.sediment, "_floored_piece", with_tension))


def test_fault_in_the_sum_of_the_loads(monkeypatch: pytest.MonkeyPatch) -> None:
    def all_but_one(setting: loads.load.Setting) -> list[Load]:
        return loads.load.loads_on(setting)[:-1]

    made = document("rectangle", MUD, SOIL)
    assert_trips(made, lambda: monkeypatch.setattr(loads.barrier, "loads_on", all_but_one))


@pytest.mark.parametrize("part", ["horizontal", "vertical", "moment"])
def test_fault_in_the_resultant(monkeypatch: pytest.MonkeyPatch, part: str) -> None:
    sound = StripFace.resultant

    def bent(face: StripFace, diagram: Diagram) -> Resultant:
        found = sound(face, diagram)
        return Resultant(**{**vars(found), part: getattr(found, part) * (1 + 1e-6)})

    made = document("rectangle")
    made["panel"][0]["tilt"] = "60 deg"
    assert isinstance(verdict_of(made), Assessed)
    monkeypatch.setattr(StripFace, "resultant", bent)
    assert isinstance(verdict_of(made), Withheld)


def test_no_number_at_all_is_withheld(monkeypatch: pytest.MonkeyPatch) -> None:
    def nothing(level: FloatArray, weight: float) -> Diagram:
        return water_diagram(level, weight * np.nan)

    made = document("rectangle")
    assert isinstance(verdict_of(made), Assessed)
    monkeypatch.setattr(loads.load, "water_diagram", nothing)
    assert isinstance(verdict_of(made), Withheld)


def test_one_bad_state_of_many_withholds_the_barrier(monkeypatch: pytest.MonkeyPatch) -> None:
    def bad_once(level: FloatArray, weight: float) -> Diagram:
        return water_diagram(np.where(level == 2.0, level + 1e-4, level), weight)

    scenario = filed(document("rectangle"))
    levels = Levels(flood_side=np.array([1.0, 2.0, 2.5]), protected_side=np.full(3, -np.inf))
    assert isinstance(assess(scenario, levels).barriers[0], Assessed)
    monkeypatch.setattr(loads.load, "water_diagram", bad_once)
    (barrier,) = assess(scenario, levels).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.second[0] == pytest.approx(9810 * 2.0**2 / 2 * 2, rel=1e-12)
