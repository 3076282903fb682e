"""Sliding through a key: on the level plane at its bottom, the ground above it moving with the wall."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from loads.arrays import FloatArray
from loads.load import SIDES, TOWARD
from loads.states import Levels
from loads.wall.cracking import uplift_of
from loads.wall.forces import Force, SoilPush
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.sliding import SlidingBand, sliding_band
from loads.wall.uplift import Cracks


def key_sliding(
    section: Section,
    levels: Levels,
    site: Site,
    *,
    soil: Sequence[SoilPush],
    forces: Sequence[Force],
    bonded: FloatArray,
    cracks: Cracks,
) -> SlidingBand | None:
    """Sliding on the level plane at the lowest point, with the ground between it and the base.

    The block from heel to toe has upright ends on which water and soil press as on the wall above; uplift
    acts on the plane by the same rule, with the same crack.
    """
    depth = section.base - section.lowest
    if not np.any(depth > 0):
        return None
    width = np.broadcast_to(section.base_width, (levels.states,))
    low, high = section.lowest, section.base
    corners = (np.stack([np.zeros_like(low), section.base_width], axis=1), np.stack([low, low], axis=1))
    flat = Section(parts=(), x=corners[0], z=corners[1], toe=1, protected_top=1, flood_top=1, stem=None)
    plane = uplift_of(flat, levels, site, cracks, section.base)
    below_x, below_z = section.chain("base")
    drop = high[:, None] - (below_z[:, 1:] + below_z[:, :-1]) / 2
    hanging = -(drop * np.diff(below_x, axis=1)).sum(axis=1)
    block = site.ground_unit_weight * (depth * width + hanging)
    vertical = sum(
        (row.value for row in forces if row.direction == "vertical" and row.cause != "uplift"),
        np.zeros(levels.states),
    )
    fixed = vertical - block
    driving, passive = _pushes_to(section, levels, site, soil, low)
    normal = -(fixed + plane.push.vertical)
    return sliding_band(
        "key",
        site.ground_friction,
        normal=normal,
        dry_normal=-fixed,
        driving=driving,
        passive=passive,
        length=bonded,
        width=width,
    )


def _pushes_to(
    section: Section, levels: Levels, site: Site, soil: Sequence[SoilPush], low: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Horizontal force of water and soil down to an elevation, and the passive resistance in it."""
    driving, passive = np.zeros(levels.states), np.zeros(levels.states)
    for side in SIDES:
        level = levels.of(side)
        wet = np.isfinite(level)
        depth = np.maximum(np.where(wet, level, low) - low, 0.0)
        over = np.maximum(np.where(wet, level, low) - section.top, 0.0)
        driving = driving + TOWARD[side] * site.waters.of(side) * (depth**2 - over**2) / 2
    for push in soil:
        value = push.diagram.shear(low[:, None])[:, 0]
        if push.passive:
            passive = passive - value
        else:
            driving = driving + value
    return driving, passive
