"""Random scenarios of one panel: every shape, any tilt, sediment on either side, water anywhere."""

from __future__ import annotations

import math
from typing import Any

from hypothesis import strategies as st

from loads.faces import face_of
from loads.scenario_file import Document
from tests.scenes import filed, scene

Table = dict[str, Any]

SOILS = ("at rest", "active", "passive", "entered")
SHAPES = ("rectangle", "trapezoid", "circle", "outline", "arc")
_UNITS = {"m": 1.0, "ft": 0.3048, "in": 0.0254, "cm": 0.01}


def text(value: float, unit: str = "m") -> str:
    """Write a value so that nothing of it is lost."""
    return f"{value!r} {unit}"


@st.composite
def lengths(draw: st.DrawFn, low: float, high: float) -> str:
    """Length between two numbers of metres, in any unit, as people type them."""
    unit = draw(st.sampled_from(sorted(_UNITS)))
    steps = 1000 if unit in ("m", "ft") else 10
    least, most = math.ceil(low / _UNITS[unit] * steps), math.floor(high / _UNITS[unit] * steps)
    return text(draw(st.integers(least, max(least, most))) / steps, unit)


def tilts() -> st.SearchStrategy[float]:
    """Tilt in degrees: upright, nearly level, anything."""
    return st.one_of(
        st.just(90.0), st.sampled_from([1.0, 2.5, 30.0, 89.999, 135.0, 179.0]), st.floats(1, 179)
    )


@st.composite
def shapes(draw: st.DrawFn, shape: str) -> Table:
    """Shape and size of a face, with its tilt where it is plane."""
    table: Table = {"shape": shape}
    if shape == "rectangle":
        table |= {"width": draw(lengths(0.1, 20)), "height": draw(lengths(0.1, 8))}
    elif shape == "trapezoid":
        ends = [draw(lengths(0.1, 20)), draw(st.one_of(st.just("0 ft"), lengths(0.1, 20)))]
        bottom, top = draw(st.permutations(ends))
        table |= {"bottom_width": bottom, "top_width": top, "height": draw(lengths(0.1, 8))}
    elif shape == "circle":
        table |= {"diameter": draw(lengths(0.1, 6))}
    elif shape == "outline":
        table |= draw(outlines())
    else:
        return table | draw(arcs())
    return table | {"tilt": text(draw(tilts()), "deg")}


@st.composite
def outlines(draw: st.DrawFn) -> Table:
    """Polygon: corners at angles round a middle, its lowest corner at zero; sometimes with a hole."""
    count = draw(st.integers(3, 7))
    radii = draw(st.lists(st.integers(500, 3000), min_size=count, max_size=count))
    turn = draw(st.floats(0, 6))
    spokes = [(r / 1000, turn + 2 * math.pi * i / count) for i, r in enumerate(radii)]
    corners = [(round(r * math.cos(a), 3), round(r * math.sin(a), 3)) for r, a in spokes]
    lowest = min(up for _, up in corners)
    raised = [(across, round(up - lowest, 3)) for across, up in corners]
    table: Table = {"points": [[text(across), text(up)] for across, up in raised]}
    if count > 3 and draw(st.booleans()):
        size = 0.1
        hole = [(-size, -size), (size, -size), (size, size), (-size, size)]
        table["holes"] = [[[text(across), text(up - lowest)] for across, up in hole]]
    return table


@st.composite
def arcs(draw: st.DrawFn) -> Table:
    """Arc that can stand: a radius, and the angles of its two edges seen from the centre."""
    radius = draw(st.floats(0.2, 100))
    rises = st.one_of(st.sampled_from([-1.0, 0.0, 1.0]), st.floats(-1, 1))
    foot, head = sorted((draw(rises), draw(rises)))
    if (head - foot) * radius < 0.05:
        foot, head = -0.5, 0.5
    centre = draw(st.sampled_from(["flood", "protected"]))
    bulge = 1 if centre == "flood" else -1
    across = math.sqrt(1 - head**2) - math.sqrt(1 - foot**2)
    return {
        "width": draw(lengths(0.1, 20)),
        "height": text((head - foot) * radius),
        "offset": text(bulge * across * radius),
        "radius": text(radius * (1 + 1e-12)),
        "centre": centre,
    }


def reach_of(panel: Table) -> tuple[float, float]:
    """Elevations of the bottom and the top of a panel."""
    face = face_of(filed(scene(panel)).panel[0])
    return face.bottom, face.top


@st.composite
def heights(draw: st.DrawFn, bottom: float, top: float, marks: tuple[float, ...] = ()) -> float:
    """Elevation anywhere about a face: below, at an edge or a mark, a hair above the bottom, over the top."""
    reach = top - bottom
    return draw(
        st.one_of(
            st.sampled_from([bottom, top, *marks]),
            st.sampled_from([1e-6, 1e-4, 1e-2]).map(lambda share: bottom + share * reach),
            st.floats(-0.3, 1.6).map(lambda share: bottom + share * reach),
        )
    )


@st.composite
def soils(draw: st.DrawFn, *, upright: bool, curved: bool, kinds: tuple[str, ...]) -> Table:
    """Soil layer without its place."""
    allowed = ("entered",) if curved else kinds
    kind = draw(st.sampled_from(allowed))
    saturated = draw(st.one_of(st.floats(11, 22), st.floats(8, 11)))
    layer: Table = {"pressure": kind, "saturated_unit_weight": text(saturated, "kN/m3")}
    if draw(st.booleans()):
        layer["moist_unit_weight"] = text(saturated * draw(st.floats(0.6, 1)), "kN/m3")
    if kind == "entered":
        return layer | {"pressure_coefficient": draw(st.floats(0.05, 5))}
    friction = draw(st.one_of(st.sampled_from([0.0, 30.0, 45.0]), st.floats(5, 45)))
    layer["friction_angle"] = text(friction, "deg")
    if kind in ("active", "passive") and upright:
        layer["cohesion"] = text(draw(st.one_of(st.sampled_from([0.0, 1e-6]), st.floats(0, 30))), "kPa")
    elif kind == "active" and friction > 0:
        layer["wall_friction"] = text(friction * draw(st.floats(0, 0.66)), "deg")
    return layer


@st.composite
def deposits(draw: st.DrawFn, panel: Table, side: str, kinds: tuple[str, ...] = SOILS) -> list[Table]:
    """Layers of one side from the top down: mud over soil, or equivalent fluid."""
    bottom, top = reach_of(panel)
    shares = draw(st.lists(st.integers(1, 130), max_size=3, unique=True))
    tops = [bottom + share / 100 * (top - bottom) for share in sorted(shares, reverse=True)]
    upright, curved = panel.get("tilt", "90.0 deg") == "90.0 deg", panel["shape"] == "arc"
    equivalent = draw(st.integers(0, 5)) == 0
    muds = draw(st.integers(0, len(tops))) if draw(st.booleans()) else 0
    weights = sorted(draw(st.lists(st.floats(10, 18), min_size=len(tops), max_size=len(tops))))
    layers: list[Table] = []
    for number, (elevation, weight) in enumerate(zip(tops, weights, strict=True)):
        place = {"side": side, "top": text(elevation)}
        if equivalent or number < muds:
            fluid = {"pressure": "equivalent fluid" if equivalent else "fluid mud"}
            layers.append(place | fluid | {"fluid_unit_weight": text(weight, "kN/m3")})
            continue
        soil = draw(soils(upright=upright, curved=curved, kinds=kinds))
        if number == 0 and draw(st.booleans()):
            soil["surcharge"] = text(draw(st.floats(0, 40)), "kPa")
        layers.append(place | soil)
    return layers


@st.composite
def panels(
    draw: st.DrawFn, shape: str | None = None, *, sediment: bool = True, kinds: tuple[str, ...] = SOILS
) -> Table:
    """Panel at any elevation."""
    chosen = draw(st.sampled_from(SHAPES)) if shape is None else shape
    panel: Table = {"bottom": draw(lengths(-20, 2500)), **draw(shapes(chosen))}
    if sediment:
        layers = [layer for side in ("flood", "protected") for layer in draw(deposits(panel, side, kinds))]
        if layers:
            panel["sediment"] = layers
    return panel


@st.composite
def scenes(
    draw: st.DrawFn, shape: str | None = None, *, sediment: bool = True, kinds: tuple[str, ...] = SOILS
) -> Document:
    """One panel with water on both sides, of one kind or two."""
    panel = draw(panels(shape, sediment=sediment, kinds=kinds))
    bottom, top = reach_of(panel)
    marks = tuple(float(layer["top"].split()[0]) for layer in panel.get("sediment", []))
    flood = draw(heights(bottom, top, marks))
    water: Table = {"unit_weight": text(draw(st.floats(9.7, 10.4)), "kN/m3")}
    if draw(st.booleans()):
        water["protected_side"] = text(draw(heights(bottom, top, (*marks, flood))))
    if draw(st.booleans()):
        water["protected_unit_weight"] = text(draw(st.floats(9.7, 10.4)), "kN/m3")
    return scene(panel, flood_side=text(flood), **water)
