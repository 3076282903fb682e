"""From the record of a wall to its section: dimensions, or the union of parts given by their corners."""

from __future__ import annotations

import numpy as np
from shapely import Polygon, unary_union
from shapely.geometry.polygon import orient

from loads.arrays import FloatArray
from loads.problems import Problem, ScenarioError
from loads.records.panel import ring_values
from loads.records.wall import Wall
from loads.wall.section import Section, SectionPart, gravity_section, slab_section

_SLACK = 1e-9

_NAMES = {
    "gravity": ("height", "top_width", "base_width", "flood_batter"),
    "T": ("height", "top_width", "flood_batter", "stem_width", "base_thickness", "heel", "toe"),
}


def dimensions_of(wall: Wall) -> dict[str, FloatArray]:
    """Dimensions of a wall that is not given by corners, each of shape (1,), by name. [m].

    What was left out is there with the value that it stands for.
    """
    names = _NAMES["gravity" if wall.shape == "gravity" else "T"]
    found = {"base": wall.base.value}
    for name in names:
        entered = getattr(wall, name)
        found[name] = entered.value if entered else 0.0
    if wall.shape != "gravity" and wall.stem_width is None:
        found["stem_width"] = found["top_width"] + found["flood_batter"]
    if wall.key:
        found |= {f"key_{name}": getattr(wall.key, name).value for name in ("depth", "width", "position")}
    return {name: np.array([value]) for name, value in found.items()}


def section_of(wall: Wall) -> Section:
    """Section of a wall, m = 1.

    Raises
    ------
    ScenarioError
        The parts do not join to one outline that stands on its base.
    """
    if wall.shape == "parts":
        return _joined_parts(wall)
    assert wall.unit_weight is not None
    build = gravity_section if wall.shape == "gravity" else slab_section
    return build(dimensions_of(wall), wall.unit_weight.value)


def _refusal(wall: Wall, rule: str) -> ScenarioError:
    return ScenarioError([Problem(path=f"wall[{wall.id}].part", value="", rule=rule)])


def _joined_parts(wall: Wall) -> Section:
    shapes = [Polygon(ring_values(part.points)) for part in wall.part]
    whole = unary_union(shapes)
    total = sum(shape.area for shape in shapes)
    if abs(whole.area - total) > 1e-6 * total:
        raise _refusal(wall, "must not overlap: their weight would count twice")
    if not isinstance(whole, Polygon) or whole.interiors:
        raise _refusal(wall, "must join to one outline without gaps or holes")
    base = wall.base.value
    ring = np.array(orient(whole).exterior.coords[:-1])
    on_base = np.flatnonzero(np.abs(ring[:, 1] - base) <= _SLACK * max(1.0, abs(base)))
    if len(on_base) < 2:
        raise _refusal(wall, "must stand on the base: no two corners of their outline lie on its elevation")
    heel, toe = on_base[np.argmin(ring[on_base, 0])], on_base[np.argmax(ring[on_base, 0])]
    origin = float(ring[heel, 0])
    toe_index = int(toe - heel) % len(ring)
    ring = np.roll(ring, -int(heel), axis=0) - [origin, 0.0]
    if (np.diff(ring[: toe_index + 1, 0]) < -_SLACK).any():
        raise _refusal(wall, "must have an underside that does not double back between heel and toe")
    crest = np.flatnonzero(ring[:, 1] >= ring[:, 1].max() - _SLACK)
    parts = tuple(
        SectionPart(
            name=part.name,
            x=np.array([[across - origin for across, _ in ring_values(part.points)]]),
            z=np.array([[up for _, up in ring_values(part.points)]]),
            unit_weight=part.unit_weight.value,
        )
        for part in wall.part
    )
    return Section(
        parts=parts,
        x=ring[None, :, 0],
        z=ring[None, :, 1],
        toe=toe_index,
        protected_top=int(crest[0]),
        flood_top=int(crest[-1]),
        stem=None,
    )
