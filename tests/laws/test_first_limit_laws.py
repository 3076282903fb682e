"""The first-limit level against `assess` itself, a millimetre below and above it."""

from __future__ import annotations

from typing import Any

import numpy as np
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st

from loads.assessment import Assessed, assess
from loads.problems import ScenarioError
from loads.scenario_file import Document
from loads.states import DRY, Levels
from tests.laws.strategies import panels, reach_of, scenes, text
from tests.scenes import assessed, filed, scene

MILLIMETRE = 0.001
UNITS = {"pressure": "Pa", "force": "N", "moment": "N·m"}
slow = settings(suppress_health_check=[HealthCheck.too_slow, HealthCheck.filter_too_much])


def at_level(document: Document, level: float) -> Assessed:
    """Assess the document with another flood-side level."""
    scenario = filed(document)
    protected = scenario.water.protected_side
    other = np.array([protected.value if protected else DRY])
    (barrier,) = assess(scenario, Levels(flood_side=np.array([level]), protected_side=other)).barriers
    assert isinstance(barrier, Assessed), barrier
    return barrier


def push(document: Document, level: float, kind: str) -> float:
    """Demand toward the protected side at a level; pressure is sought point by point."""
    barrier = at_level(document, level)
    if kind == "pressure":
        face = barrier.face
        low, high = face.bottom, face.top
        z = np.array([*np.linspace(low, high, 50), *barrier.diagram.knot[0]])
        # a face ends with the pressure just inside its edge
        inner, above = z[(z > low) & (z <= high)], z[(z >= low) & (z < high)]
        under, over = barrier.diagram.pressure(inner, at_underside=True), barrier.diagram.pressure(above)
        return float(max(over.max(), under.max()))
    found = barrier.resultant.total if kind == "force" else barrier.resultant.moment
    return float(found[0])


def with_limit(document: Document, kind: str, value: float) -> Document:
    (panel,) = document["panel"]
    return {**document, "panel": [{**panel, "limits": {kind: text(value, UNITS[kind])}}]}


@slow
@given(panels(sediment=False), st.sampled_from(sorted(UNITS)), st.data())
def test_a_limit_set_from_a_level_gives_that_level_back(panel: Any, kind: str, data: st.DataObject) -> None:
    bottom, top = reach_of(panel)
    assume(panel["shape"] != "arc")
    level = bottom + data.draw(st.floats(0.1, 1.8)) * (top - bottom)
    assume(level < top + 2.9)
    document = scene(panel, flood_side=text(level))
    limited = with_limit(document, kind, push(document, level, kind))
    found = assessed(limited).first_limit
    assert found is not None
    assert found.level is not None
    assert abs(found.level - level) <= MILLIMETRE
    assert not found.without_water
    assert found.subject == "panel P1"


@slow
@given(scenes(), st.sampled_from(sorted(UNITS)), st.floats(0.01, 1.4))
def test_the_limit_is_reached_within_a_millimetre(document: Document, kind: str, share: float) -> None:
    (panel,) = document["panel"]
    bottom, top = reach_of(panel)
    try:
        # a little less, so that no demand that water leaves as it is lies at its limit but for rounding
        limit = 0.9999 * push(document, bottom + share * (top - bottom), kind)
    except ScenarioError:
        assume(False)
    assume(limit > 1)
    limited = with_limit(document, kind, limit)
    found = assessed(limited).first_limit
    assert found is not None
    if found.level is None:
        assert push(limited, found.ceiling, kind) < limit * (1 + 1e-9)
    elif found.without_water:
        assert found.level == bottom
        assert push(limited, bottom, kind) >= limit * (1 - 1e-9)
    else:
        assert push(limited, found.level - MILLIMETRE, kind) < limit
        assert push(limited, found.level + MILLIMETRE, kind) >= limit * (1 - 1e-6)


def test_a_greater_pull_elsewhere_does_not_hide_the_push() -> None:
    passive = {
        "side": "protected",
        "top": "1 m",
        "saturated_unit_weight": "20 kN/m3",
        "friction_angle": "30 deg",
        "pressure": "passive",
    }
    panel = {"width": "1 m", "height": "3 m", "sediment": [passive], "limits": {"pressure": "14.715 kPa"}}
    barrier = assessed(scene(panel, flood_side="2.9 m", unit_weight="9.81 kN/m3"))
    assert float(barrier.diagram.pressure(np.array([0.0]))[0, 0]) < -14_715
    found = barrier.first_limit
    assert found is not None
    assert found.level is not None
    assert abs(found.level - 2.5) <= MILLIMETRE


def test_several_limits_name_the_one_reached_first() -> None:
    limits = {"force": "19.62 kN", "moment": "1.635 kN·m", "pressure": "40 kPa"}
    panel = {"width": "1 m", "height": "3 m", "limits": limits}
    found = assessed(scene(panel, flood_side="0.2 m", unit_weight="9.81 kN/m3")).first_limit
    assert found is not None
    assert found.level is not None
    assert abs(found.level - 1.0) <= MILLIMETRE
    assert found.check == "moment about the bottom"


def test_no_limit_within_reach_and_no_limit_at_all() -> None:
    panel: dict[str, Any] = {"width": "1 m", "height": "1 m"}
    assert assessed(scene(panel)).first_limit is None
    found = assessed(scene(panel | {"limits": {"force": "900 kN"}})).first_limit
    assert found is not None
    assert found.level is None
    assert found.ceiling == 4.0


def test_soil_alone_may_reach_the_limit_without_water() -> None:
    soil = {"side": "flood", "top": "2 m", "saturated_unit_weight": "20 kN/m3", "pressure_coefficient": 0.5}
    panel = {"width": "1 m", "height": "2 m", "sediment": [{**soil, "pressure": "entered"}]}
    found = assessed(scene(panel | {"limits": {"force": "15 kN"}}, flood_side="-1 m")).first_limit
    assert found is not None
    assert found.without_water
    assert found.level == 0.0
