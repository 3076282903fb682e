"""Closures for tests, and their parts and checks by name."""

from __future__ import annotations

from typing import Any

from loads.assessment import AssessedClosure, assess
from loads.check_table import Checks
from loads.checks import Check
from loads.part import Part
from loads.scenario_file import Document
from loads.states import Levels
from tests.scenes import filed

SPARSE: dict[str, Any] = {
    "id": "C1",
    "sill": "0 m",
    "bays": 2,
    "bay_width": "2 m",
    "log": {"height": "0.2 m", "count": 8},
}
FULL: dict[str, Any] = {
    "id": "C2",
    "sill": "1.3 m",
    "bay_widths": ["2.4 m", "2.4 m", "3.1 m"],
    "logs_in_place": [9, 9, 8],
    "height": "2.6 m",
    "rated_level": {"value": "3.3 m", "source": "engineer", "date": "2030-03-02"},
    "allowance": "0.3 m",
    "limits": {"force": "160 kN", "moment": "150 kN·m", "freeboard": "0.2 m"},
    "log": {
        "height": "240 mm",
        "count": 10,
        "bearing_length": "70 mm",
        "weight": "31 kg",
        "material": "aluminium 6061-T6",
        "section": {"shape": "hollow rectangle", "thickness": "110 mm", "wall": "4 mm", "ribs": 2},
        "limits": {
            "span_over_deflection": 150.0,
            "shear_stress": "60 MPa",
            "bearing_stress": "3 MPa",
            "line_load": "9 kN/m",
            "reaction": "11 kN",
            "moment": "7 kN·m",
        },
    },
    "post": {
        "width": "180 mm",
        "height": "2.5 m",
        "weight": "88 kg",
        "material": "steel A36",
        "section": {
            "shape": "properties",
            "section_modulus": "300 cm3",
            "second_moment": "2600 cm4",
            "shear_area": "14 cm2",
        },
        "brace": {"height": "1.4 m", "angle": "50 deg", "fixity": "fixed"},
        "limits": {
            "brace_force": "60 kN",
            "anchor_tension": "30 kN",
            "anchor_shear": "20 kN",
            "contact_pressure": "9 MPa",
            "deflection": "20 mm",
        },
    },
    "anchor": {
        "tension_bolts": 2,
        "shear_bolts": 4,
        "lever_arm": "260 mm",
        "plate_width": "300 mm",
        "contact_length": "80 mm",
    },
    "guide": {"one_way": True, "friction": 0.4},
    "hold_down": {"capacity": "4 kN"},
    "seal": {
        "rate": "8 L/h/m",
        "at_head": "1 m",
        "exponent": 0.7,
        "gap_width": "1 mm",
        "pump_capacity": "40 L/s",
    },
    "handling": {"people_per_log": 2, "limit": "25 kg"},
    "install": {"lift_capacity": "500 kg", "people": 4},
}


def closure_scene(closure: dict[str, Any], flood_side: str = "1 m", **more: Any) -> Document:
    """Document of one closure; `basis` and `near_limit` among `more` are the scenario's."""
    document: Document = {"format": 1, "title": "Trial", "datum": "trial datum", "closure": [closure]}
    for name in ("basis", "near_limit"):
        if name in more:
            document[name] = more.pop(name)
    return {**document, "water": {"flood_side": flood_side, **more}}


def closure_of(document: Document, levels: Levels | None = None) -> AssessedClosure:
    """Only closure of a document, on which both computations must agree."""
    (barrier,) = assess(filed(document), levels).barriers
    assert isinstance(barrier, AssessedClosure), barrier
    return barrier


def closure_under(closure: dict[str, Any], **more: Any) -> AssessedClosure:
    """One closure in water."""
    return closure_of(closure_scene(closure, **more))


def part_of(barrier: AssessedClosure, name: str) -> Part:
    """Part with a name."""
    (found,) = [part for part in barrier.parts if part.id == name]
    return found


def figure_of(part: Part, name: str) -> float:
    """One more figure of a part in the first state."""
    (found,) = [figure for figure in part.more if figure.name == name]
    return float(found.value[0])


def check_of(checks: Checks, name: str, subject: str = "") -> Check:
    """Check with a name, of one subject when given, else the most pressing."""
    return next(check for check in checks if check.name == name and subject in ("", check.subject))
