"""Scenarios that are drawn in tests, and what is read off a drawing as a person would read it."""

import re
import xml.etree.ElementTree as ET
from dataclasses import replace
from typing import Any

from loads.assessment import Assessed, Assessment, Barrier, assess
from loads.scenario_file import read_file, scenario_of
from tests.webapp.driving import ROOT
from webapp.drawing.line import line_drawing
from webapp.drawing.palette import DARK, LIGHT, PRINT, Palette
from webapp.drawing.section import barrier_drawing

SVG = "{http://www.w3.org/2000/svg}"
PALETTES = (LIGHT, DARK, PRINT)
SCENARIOS = sorted((ROOT / "scenarios").glob("*.toml"))
LIMITS = {"force": {"value": "9 kip", "source": "engineer of record"}, "moment": "16 kip·ft"}


def panel(identifier: str, bottom: float, height: float, width: float = 10, **more: Any) -> dict[str, Any]:
    size = {"bottom": f"{bottom} ft", "width": f"{width} ft", "height": f"{height} ft"}
    return {"id": identifier, "name": f"Panel {identifier}", **size, **more}


def assessment_of(
    *panels: dict[str, Any], flood: str = "104.6 ft", protected: str | None = None, units: str = "US"
) -> Assessment:
    water = {"flood_side": flood} | ({"protected_side": protected} if protected else {})
    document = {"format": 1, "title": "Trial", "datum": "NAVD88", "units": units, "water": water}
    return assess(scenario_of({**document, "panel": list(panels)}))


def arc(identifier: str, centre: str, offset: str) -> dict[str, Any]:
    size = {"shape": "arc", "width": "9 ft", "height": "8 ft", "offset": offset, "radius": "10 ft"}
    return {"id": identifier, "bottom": "98 ft", "centre": centre, **size}


LAYERS = [
    {
        "side": "flood",
        "name": f"layer number {i}",
        "top": f"{106 - i * 0.4:.2f} ft",
        "saturated_unit_weight": f"{110 + i} pcf",
        "friction_angle": f"{24 + i % 5} deg",
        "pressure": "at rest",
    }
    for i in range(18)
]
L_OUTLINE = {
    "id": "L",
    "bottom": "99 ft",
    "shape": "outline",
    "points": [[f"{x} ft", f"{y} ft"] for x, y in ((0, 0), (8, 0), (8, 2), (2, 2), (2, 7), (0, 7))],
    "holes": [[[f"{x} ft", f"{y} ft"] for x, y in ((4, 0.5), (7, 0.5), (7, 1.5), (4, 1.5))]],
}
MANY = [
    panel(
        f"C{i}",
        round(98 + (i * 37 % 23) / 7, 2),
        round(4 + (i * 13 % 5) * 0.8, 2),
        3 + i % 9 * 4,
        rated_level=f"{102 + i % 5 * 0.6:.2f} ft",
        limits={"force": f"{3 + i % 7 * 3} kip"},
    )
    for i in range(40)
]
LONG = "Gate beside the old customs house and the weighbridge of the lower yard, second from the left"
ODD = {
    "dry": assessment_of(panel("D1", 98, 6, limits=LIMITS), flood="90 ft"),
    "reverse": assessment_of(panel("R1", 98, 6, limits=LIMITS), flood="99 ft", protected="103 ft"),
    "both over the top": assessment_of(panel("O1", 98, 6), flood="105 ft", protected="106 ft"),
    "far over the top": assessment_of(
        panel("H1", 98, 6, limits=LIMITS), panel("H2", 99, 5), flood="154.6 ft"
    ),
    "equal": assessment_of(panel("E1", 98, 6, limits=LIMITS), flood="103 ft", protected="103 ft"),
    "negative": assessment_of(panel("N1", -12, 6), panel("N2", -10, 5), flood="-7.2 ft", protected="-5.1 ft"),
    "arcs": assessment_of(
        arc("A1", "flood", "-1 ft"), arc("A2", "protected", "2 ft"), flood="104 ft", protected="101 ft"
    ),
    "circle": assessment_of({"id": "K1", "bottom": "99 ft", "shape": "circle", "diameter": "4 ft"}),
    "outline with a hole": assessment_of(L_OUTLINE, protected="100.5 ft"),
    "tilts": assessment_of(
        *(panel(f"T{tilt}", 98, 12, tilt=f"{tilt} deg", limits=LIMITS) for tilt in (2, 30, 90, 150, 178))
    ),
    "triangle": assessment_of(
        {
            "id": "V",
            "bottom": "98 ft",
            "shape": "trapezoid",
            "bottom_width": "0 ft",
            "top_width": "6 ft",
            "height": "5 ft",
        }
    ),
    "layers": assessment_of(panel("S1", 98, 9, sediment=LAYERS), protected="97 ft"),
    "forty": assessment_of(*MANY, protected="97 ft"),
    "outliers": assessment_of(
        panel("F1", 30, 3), panel("F2", 98, 6, rated_level="180 ft"), panel("F3", 150, 3), panel("F4", 99, 6)
    ),
    "long names": assessment_of(
        panel("A rather long identifier", 98, 6) | {"name": LONG, "limits": LIMITS},
        panel("B", 98, 6) | {"name": "Word" * 28},
    ),
}


ODD["none"] = replace(ODD["dry"], barriers=())


def drawings(assessment: Assessment, palette: Palette, *, narrow: bool, index: int = 0) -> list[str]:
    """Every drawing of an assessment."""
    scenario = assessment.scenario
    line = line_drawing(assessment, index=index, system=scenario.units, palette=palette, narrow=narrow)
    return [
        line,
        *(drawn(barrier, assessment, palette, narrow=narrow, index=index) for barrier in assessment.barriers),
    ]


def drawn(
    barrier: Barrier,
    assessment: Assessment,
    palette: Palette = LIGHT,
    *,
    narrow: bool = False,
    index: int = 0,
) -> str:
    scenario = assessment.scenario
    return barrier_drawing(
        barrier, index=index, system=scenario.units, palette=palette, datum=scenario.datum, narrow=narrow
    )


def single(case: str) -> tuple[Assessed, ET.Element]:
    """First barrier of an odd case and its wide drawing."""
    barrier = ODD[case].barriers[0]
    assert isinstance(barrier, Assessed)
    return barrier, ET.fromstring(drawn(barrier, ODD[case]))


def texts(drawing: ET.Element) -> list[str]:
    return [node.text or "" for node in drawing.iter(f"{SVG}text")]


def corners(path: ET.Element) -> list[tuple[float, float]]:
    """Corners of the first ring of a path."""
    numbers = [float(text) for text in re.findall(r"-?[\d.]+", path.attrib["d"].split("Z", maxsplit=1)[0])]
    return list(zip(numbers[::2], numbers[1::2], strict=True))


def paths(drawing: ET.Element, **attributes: str) -> list[ET.Element]:
    wanted = {name.replace("_", "-"): value for name, value in attributes.items()}
    return [node for node in drawing.iter(f"{SVG}path") if wanted.items() <= node.attrib.items()]


def axis(drawing: ET.Element) -> tuple[float, float]:
    """Feet at y = 0 and feet to a pixel, read off the axis labels as a person would."""
    marks = [
        (float(node.attrib["y"]) - 4, float((node.text or "").replace("−", "-")))
        for node in drawing.iter(f"{SVG}text")
        if node.get("text-anchor") == "end" and node.get("fill") == LIGHT.faint
    ]
    (y1, z1), (y2, z2) = marks[0], marks[-1]
    slope = (z2 - z1) / (y2 - y1)
    return z1 - slope * y1, slope


def feet(drawing: ET.Element, y: float) -> float:
    start, slope = axis(drawing)
    return start + slope * y


def metres(drawing: ET.Element, y: float) -> float:
    return feet(drawing, y) * 0.3048


TANNERY_ROW = assess(scenario_of(read_file(ROOT / "scenarios" / "tannery-row.toml")))
DENSE = (
    "forty",
    "layers",
    "outliers",
    "tilts",
    "far over the top",
    "negative",
    "arcs",
    "reverse",
    "long names",
)
