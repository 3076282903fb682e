"""From the record of a wall to the numbers of its site."""

from __future__ import annotations

import math

from loads.quantity import Quantity
from loads.records.wall import Wall
from loads.wall.forces import Ground, Waters
from loads.wall.seepage_path import SeepagePath
from loads.wall.site import Site
from loads.wall.sliding import Friction
from loads.water import Fluid


def site_of(wall: Wall, fluids: dict[str, Fluid]) -> Site:
    """Site of a wall with the water of both sides."""
    below = wall.foundation
    weight = below.saturated_unit_weight
    return Site(
        ground=Ground(
            layers={side: wall.layers(side) for side in ("flood", "protected")},
            passive_share=wall.passive_share,
            surcharge_counts_as_weight=wall.surcharge_counts_as_weight,
        ),
        waters=Waters(flood=fluids["flood"].unit_weight, protected=fluids["protected"].unit_weight),
        path=seepage_path(wall),
        opens=wall.crack == "full head",
        base_friction=base_friction(wall),
        ground_friction=ground_friction(wall),
        ground_unit_weight=weight.value if weight else math.nan,
    )


def seepage_path(wall: Wall) -> SeepagePath:
    """Rule of uplift of a wall."""
    drain = wall.drain
    kind = "effectiveness" if drain and drain.effectiveness is not None else "remaining_share"
    return SeepagePath(
        rule=wall.uplift,
        horizontal_share=wall.horizontal_creep_share,
        flood_ground=wall.ground("flood"),
        protected_ground=wall.ground("protected"),
        cutoffs=tuple((cutoff.position.value, cutoff.depth.value) for cutoff in wall.cutoff),
        drain=(drain.position.value, kind, float(getattr(drain, kind))) if drain else None,
    )


def base_friction(wall: Wall) -> Friction:
    """Friction and adhesion between base and ground, with their ranges."""
    below = wall.foundation
    angle, coefficient = below.friction_angle, below.friction_coefficient
    if angle is not None:
        ends = tuple(math.tan(value) for value in (angle.low, angle.value, angle.high))
    else:
        assert coefficient is not None
        low, high = below.friction_coefficient_low, below.friction_coefficient_high
        ends = (low or coefficient, coefficient, high or coefficient)
    return _friction(ends, below.adhesion)


def ground_friction(wall: Wall) -> Friction:
    """Friction and cohesion of the ground itself; those of the base where they were not entered."""
    below = wall.foundation
    angle = below.soil_friction_angle
    if angle is None:
        return base_friction(wall)
    ends = tuple(math.tan(value) for value in (angle.low, angle.value, angle.high))
    return _friction(ends, below.soil_cohesion)


def _friction(ends: tuple[float, ...], adhesion: Quantity | None) -> Friction:
    low, value, high = ends
    return Friction(
        low=low,
        value=value,
        high=high,
        adhesion_low=adhesion.low if adhesion else 0.0,
        adhesion=adhesion.value if adhesion else 0.0,
        adhesion_high=adhesion.high if adhesion else 0.0,
    )
