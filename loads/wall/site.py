"""What a wall stands on and in, as numbers."""

from __future__ import annotations

from dataclasses import dataclass

from loads.wall.forces import Ground, Waters
from loads.wall.seepage_path import SeepagePath
from loads.wall.sliding import Friction


@dataclass(frozen=True, kw_only=True)
class Site:
    """What a wall stands on and in; the same for all states.

    Attributes
    ----------
    ground
        Soil on both sides.
    waters
        Water of both sides.
    path
        Rule of uplift.
    opens
        Whether the base opens where it would be in tension, with full head in the crack.
    base_friction, ground_friction
        Of the base on the ground, and of the ground on itself.
    ground_unit_weight
        Saturated weight per volume of the ground under the base; NaN when not known. [N/m³]
    """

    ground: Ground
    waters: Waters
    path: SeepagePath
    opens: bool
    base_friction: Friction
    ground_friction: Friction
    ground_unit_weight: float
