"""Underseepage screen of a wall: weighted creep and exit gradient, for n states or n sections."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.states import Levels
from loads.wall.section import Section
from loads.wall.seepage import (
    critical_gradient,
    exit_gradient_floor,
    exit_gradient_layer,
    weighted_creep_ratio,
)
from loads.wall.seepage_path import SeepagePath, cutoff_reach, end_heads


@dataclass(frozen=True, kw_only=True)
class Underseepage:
    """What the screen finds, for n states.

    Attributes
    ----------
    head
        Difference of head over the path, shape (n,). [m]
    vertical, horizontal
        Lengths of contact, shape (n,). [m]
    creep_ratio
        Weighted creep ratio, shape (n,). [–]
    floor
        Length of floor upstream of where water leaves, shape (n,). [m]
    exit_depth
        Depth of wall or cutoff below the ground where water leaves, shape (n,). [m]
    exit_gradient
        Shape (n,); infinite where nothing reaches below that ground. [–]
    critical_gradient
        NaN when the ground's weight is not known, shape (n,). [–]
    """

    head: FloatArray
    vertical: FloatArray
    horizontal: FloatArray
    creep_ratio: FloatArray
    floor: FloatArray
    exit_depth: FloatArray
    exit_gradient: FloatArray
    critical_gradient: FloatArray


def underseepage(
    section: Section,
    levels: Levels,
    path: SeepagePath,
    *,
    ground_unit_weight: float,
    water_unit_weight: float,
) -> Underseepage:
    """Screen a wall on its base.

    Parameters
    ----------
    section
        m sections, m = n or 1.
    levels
        n states.
    path
        Grounds and cutoffs; its rule of uplift and its drain do not matter here.
    ground_unit_weight
        Saturated weight per volume of the ground where water leaves; NaN when not known. [N/m³]
    water_unit_weight
        Weight per volume of water. [N/m³]

    Notes
    -----
    The exit gradient is that of a floor of the base's width ended by an upright face as deep as the embedment
    on the side where water leaves, a cutoff or key at that end included [Khosla1936]; a cutoff elsewhere
    lowers it, which is left out. Cracks are not counted.
    """
    creeping = SeepagePath(
        rule="line of creep",
        horizontal_share=path.horizontal_share,
        flood_ground=path.flood_ground,
        protected_ground=path.protected_ground,
    )
    base = section.base
    head_in, head_out = end_heads(creeping, base, levels.flood_side, levels.protected_side)
    wet = np.isfinite(head_in) & np.isfinite(head_out)
    head = np.abs(np.where(wet, head_in, 0.0) - np.where(wet, head_out, 0.0))
    x, z = section.chain("base")
    run, drop = np.abs(np.diff(x, axis=1)), np.abs(np.diff(z, axis=1))
    steep = drop > run
    length = np.hypot(run, drop)
    states = levels.states
    buried = [np.maximum(ground - base, 0.0) for ground in (path.flood_ground, path.protected_ground)]
    reaches = [cutoff_reach((x, z), place, depth, base) for place, depth in path.cutoffs]
    cutoffs = 2 * sum(reaches, np.zeros(len(x)))
    vertical = np.where(steep, length, 0.0).sum(axis=1) + buried[0] + buried[1] + cutoffs
    horizontal = np.where(steep, 0.0, length).sum(axis=1)
    reverse = levels.protected_side > levels.flood_side
    depth = np.where(reverse, _end_depth(section, path, "flood"), _end_depth(section, path, "protected"))
    floor = np.broadcast_to(section.base_width, (states,))
    water = np.array([water_unit_weight])
    critical = critical_gradient(ground_unit_weight - water, water)
    return Underseepage(
        head=head,
        vertical=np.broadcast_to(vertical, (states,)),
        horizontal=np.broadcast_to(horizontal, (states,)),
        creep_ratio=weighted_creep_ratio(vertical, horizontal, head),
        floor=floor,
        exit_depth=depth,
        exit_gradient=exit_gradient_floor(head, floor, depth),
        critical_gradient=np.full(states, critical.item()),
    )


def _end_depth(section: Section, path: SeepagePath, side: str) -> FloatArray:
    """Depth of the end of the base on one side below that side's ground, (m,). [m]."""
    ground = path.flood_ground if side == "flood" else path.protected_ground
    end = section.x[:, 0] if side == "flood" else section.x[:, section.toe]
    x, z = section.chain("base")
    near = 1e-6 * section.base_width
    below = np.zeros(len(x))
    for i in range(x.shape[1]):
        below = np.maximum(below, np.where(np.abs(x[:, i] - end) <= near, section.base - z[:, i], 0.0))
    for place, depth in path.cutoffs:
        below = np.maximum(below, np.where(np.abs(place - end) <= near, depth, 0.0))
    return np.asarray(np.maximum(ground - section.base, 0.0) + below)


def sheet_exit_gradient(
    head: FloatArray, embedment: FloatArray, layer: FloatArray | None = None
) -> FloatArray:
    """Exit gradient at a sheet alone: on deep ground, or in a layer of finite depth when given, (n,). [–]."""
    if layer is None:
        return exit_gradient_floor(head, np.zeros_like(head), embedment)
    return exit_gradient_layer(head, embedment, layer)
