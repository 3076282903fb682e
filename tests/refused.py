"""A panel that is right but for what a test changes, and the problems that come of it."""

from __future__ import annotations

from typing import Any

import pytest

from loads.problems import ScenarioError
from loads.scenario_file import Document, scenario_of
from tests.scenes import scene

Table = dict[str, Any]
PLATE: Table = {"width": "12 ft", "height": "6 ft"}
SOIL: Table = {
    "side": "flood",
    "top": "2 ft",
    "saturated_unit_weight": "110 pcf",
    "friction_angle": "28 deg",
    "pressure": "at rest",
}
FLUID: Table = {"side": "flood", "top": "3 ft", "pressure": "fluid mud", "fluid_unit_weight": "80 pcf"}


def problems(document: Document) -> list[str]:
    with pytest.raises(ScenarioError) as refusal:
        scenario_of(document)
    return [str(problem) for problem in refusal.value.problems]


def of_panel(panel: Table, *layers: Table, **water: Any) -> list[str]:
    given = {**panel, "sediment": list(layers)} if layers else panel
    return problems(scene(given, **{"flood_side": "5 ft", **water}))
