"""Shear and moment in stem, heel and toe, from the pressure diagrams."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.diagram import Diagram
from loads.load import SIDES, TOWARD
from loads.states import Levels
from loads.wall.ground_stress import effective_stress
from loads.wall.section import Section, Stem
from loads.wall.site import Site
from loads.wall.stability import Stability
from loads.water import water_diagram

Term = tuple[FloatArray, FloatArray, FloatArray]


@dataclass(frozen=True, kw_only=True)
class Member:
    """One cantilever of a wall.

    Attributes
    ----------
    name
        "stem", "heel" or "toe".
    diagram
        Load per length against the place: elevation of the stem, distance from the heel of the toe, that
        distance with a minus sign of the heel. Positive toward the protected side, of slabs upward. [Pa, m]
    root
        Place of the fixed end, shape (n,). [m]
    tip
        Place of the free end, shape (n,). [m]
    root_shear, root_moment
        At the fixed end, shape (n,). [N/m, N·m/m]
    """

    name: str
    diagram: Diagram
    root: FloatArray
    tip: FloatArray
    root_shear: FloatArray
    root_moment: FloatArray

    def shear(self, place: FloatArray) -> FloatArray:
        """Shear of everything beyond places (m,) or (n, m), shape (n, m). [N/m]."""
        return self.diagram.shear(place)

    def moment(self, place: FloatArray) -> FloatArray:
        """Moment of everything beyond places (m,) or (n, m), shape (n, m). [N·m/m]."""
        return self.diagram.moment(place)


def _member(name: str, diagram: Diagram, root: FloatArray, tip: FloatArray, holds: BoolArray) -> Member:
    states = diagram.states
    place = np.broadcast_to(root, (states,))
    blank = np.where(holds, 1.0, np.nan)
    return Member(
        name=name,
        diagram=diagram,
        root=place,
        tip=np.broadcast_to(tip, (states,)),
        root_shear=diagram.shear(place[:, None])[:, 0] * blank,
        root_moment=diagram.moment(place[:, None])[:, 0] * blank,
    )


def members(section: Section, levels: Levels, site: Site, found: Stability) -> tuple[Member, ...]:
    """Members of a wall that has a stem; none of a section given by its corners.

    Notes
    -----
    Stem: horizontal pressure of water and soil on both sides, passive resistance left out; weight, and water
    on battered faces, do not bend it here. Heel and toe: weight of the slab and of a key, soil
    and water above, uplift and base pressure below. Where the crack runs through there is no base pressure to
    go by and the figures of the slabs are NaN.
    """
    stem = section.stem
    if stem is None:
        return ()
    every = np.ones(levels.states, dtype=bool)
    upright = stem_diagram(section, levels, site, found)
    result = [_member("stem", upright, stem.foot, stem.top, every)]
    if not np.any(stem.slab > 0):
        return tuple(result)
    width = section.base_width
    loads = _slab_loads(section, stem, levels, site, found)
    holds = ~found.runs_through
    if np.any(stem.flood_x > 0):
        heel = _between(loads["heel"], levels.states, mirrored=True)
        result.append(_member("heel", heel, -stem.flood_x, np.zeros(1), holds))
    if np.any(width > stem.protected_x):
        toe = _between(loads["toe"], levels.states, mirrored=False)
        result.append(_member("toe", toe, stem.protected_x, width, holds))
    return tuple(result)


def stem_diagram(section: Section, levels: Levels, site: Site, found: Stability) -> Diagram:
    """Net horizontal pressure of water and soil, without passive resistance, below the wall's top."""
    top = float(section.top.max())
    diagrams = [water_diagram(levels.of(side), site.waters.of(side)).scaled(TOWARD[side]) for side in SIDES]
    diagrams += [push.diagram for push in found.soil if not push.passive]
    return Diagram.joined(diagrams).below(top)


Piece = tuple[FloatArray, FloatArray, FloatArray, FloatArray]
"""Two places along the base and the upward load at each, arrays (n,) or (1,)."""


def _slab_loads(
    section: Section, stem: Stem, levels: Levels, site: Site, found: Stability
) -> dict[str, list[Piece]]:
    width = section.base_width
    nil = np.zeros(1)
    below = [*_uplift_pieces(found), _base_piece(site, found, width)]
    below += [
        (part.x.min(axis=1), part.x.max(axis=1), *(2 * [_hanging(part.z, part.unit_weight)]))
        for part in section.parts
        if part.name == "key"
    ]
    slab = next(part for part in section.parts if part.name == "base slab")
    dead = -slab.unit_weight * stem.slab
    spans = {"heel": ("flood", nil, stem.flood_x), "toe": ("protected", stem.protected_x, width)}
    loads: dict[str, list[Piece]] = {}
    for name, (side, start, stop) in spans.items():
        level = levels.of(side)
        depth = np.maximum(np.where(np.isfinite(level), level, stem.foot) - stem.foot, 0.0)
        soil = effective_stress(
            site.ground.layers[side],
            level=level,
            water_unit_weight=site.waters.of(side),
            z=stem.foot,
            with_surcharge=site.ground.surcharge_counts_as_weight,
        )
        above = dead - site.waters.of(side) * depth - soil
        loads[name] = [*below, (start, stop, above, above)]
    return loads


def _hanging(z: FloatArray, unit_weight: float) -> FloatArray:
    return np.asarray(-unit_weight * (z.max(axis=1) - z.min(axis=1)))


def _uplift_pieces(found: Stability) -> list[Piece]:
    lift = found.uplift
    return [
        (lift.x[:, i], lift.x[:, i + 1], lift.start[:, i], lift.end[:, i]) for i in range(lift.start.shape[1])
    ]


def _base_piece(site: Site, found: Stability, width: FloatArray) -> Piece:
    base = found.base
    if not site.opens:
        return np.zeros(1), width, base.linear_heel, base.linear_toe
    reach = base.compressed * width
    to_heel = base.heel > base.toe
    whole = base.compressed >= 1
    start = np.where(whole | to_heel, 0.0, width - reach)
    stop = np.where(whole | ~to_heel, width, reach)
    return start, stop, base.heel, base.toe


def _between(pieces: Iterable[Piece], states: int, *, mirrored: bool) -> Diagram:
    """Sum of straight pieces of load as a diagram counted from the free end."""
    terms: list[Term] = []
    for start, stop, at_start, at_stop in pieces:
        near, far, p_near, p_far = start, stop, at_start, at_stop
        if mirrored:
            near, far, p_near, p_far = -stop, -start, at_stop, at_start
        reach = far - near
        apart = np.broadcast_arrays(p_near - p_far, reach)
        slope = np.divide(apart[0], apart[1], out=np.zeros(apart[0].shape), where=apart[1] > 0)
        terms += [(far, p_far, slope), (near, -p_near, -slope)]
    return Diagram.of_terms(states, [tuple(np.asarray(entry) for entry in term) for term in terms])
