"""Everything that holds or moves a wall, for n states or n sections at once: one pass, no loop over them."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.states import Levels
from loads.wall.base_pressure import BasePressure, base_pressure
from loads.wall.cracking import open_cracks, uplift_of
from loads.wall.forces import (
    Force,
    SoilPush,
    push_rows,
    soil_forces,
    soil_pushes,
    soil_weight_forces,
    water_forces,
    weight_forces,
)
from loads.wall.key_sliding import key_sliding
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.sliding import SlidingBand, sliding_band
from loads.wall.uplift import Cracks, Uplift


@dataclass(frozen=True, kw_only=True)
class MomentRatios:
    """Textbook ratios of moments about the end toward which the wall is pushed, shape (n,).

    Attributes
    ----------
    resisting, overturning
        Sums of moments with uplift among the overturning ones, shape (n,). [N·m/m]
    uplift_overturns
        Their ratio, shape (n,). [–]
    uplift_lightens
        Ratio with the moment of uplift taken off the resisting ones, shape (n,). [–]
    """

    resisting: FloatArray
    overturning: FloatArray
    uplift_overturns: FloatArray
    uplift_lightens: FloatArray


@dataclass(frozen=True, kw_only=True)
class Stability:
    """A wall's stability for n states.

    Attributes
    ----------
    forces
        Every force, uplift included.
    soil
        Lateral pressure of soil as diagrams.
    uplift
        Pressure on the underside.
    horizontal, vertical
        Sums of the forces, shape (n,). [N/m]
    moment
        Sum of the moments about the toe, shape (n,). [N·m/m]
    base
        What the base passes on.
    cracks
        Open lengths of the base.
    settled
        Whether the crack settled, shape (n,).
    runs_through
        Whether the crack runs through the base, shape (n,).
    sliding
        On the base, a key not counted.
    key_sliding
        On the level plane at the key's bottom with the ground above it; None without a key.
    ratios
        Textbook ratios of moments.
    flotation
        Weight over uplift less water on top; infinite where nothing lifts, shape (n,). [–]
    """

    forces: tuple[Force, ...]
    soil: tuple[SoilPush, ...]
    uplift: Uplift
    horizontal: FloatArray
    vertical: FloatArray
    moment: FloatArray
    base: BasePressure
    cracks: Cracks
    settled: BoolArray
    runs_through: BoolArray
    sliding: SlidingBand
    key_sliding: SlidingBand | None
    ratios: MomentRatios
    flotation: FloatArray


def stability(section: Section, levels: Levels, site: Site) -> Stability:
    """Compute one wall in n states, or n walls in one state each.

    Parameters
    ----------
    section
        m sections, m = n or 1.
    levels
        n states.
    site
        The rest.
    """
    soil = tuple(soil_pushes(site.ground, levels, site.waters, float(section.lowest.min())))
    fixed = [
        *weight_forces(section, levels.states),
        *water_forces(section, levels, site.waters),
        *soil_forces(soil, section.base),
        *soil_weight_forces(section, site.ground, levels, site.waters),
    ]
    nil = np.zeros(levels.states)
    vertical = sum((row.value for row in fixed if row.direction == "vertical"), nil)
    moment = sum((row.moment for row in fixed), nil)
    cracks, settled = open_cracks(section, levels, site, vertical, moment)
    lift = uplift_of(section, levels, site, cracks)
    forces = (*fixed, *push_rows("uplift", "uplift", lift.push))
    horizontal = sum((row.value for row in forces if row.direction == "horizontal"), nil)
    vertical = vertical + lift.push.vertical
    moment = moment + lift.push.moment_horizontal + lift.push.moment_vertical
    base = base_pressure(-vertical, moment, section.base_width)
    width = np.broadcast_to(section.base_width, nil.shape)
    bonded = base.compressed * width if site.opens else width
    return Stability(
        forces=forces,
        soil=soil,
        uplift=lift,
        horizontal=horizontal,
        vertical=vertical,
        moment=moment,
        base=base,
        cracks=cracks,
        settled=settled,
        runs_through=base.compressed <= 0,
        sliding=_base_sliding(
            section, site, soil, lift, horizontal=horizontal, vertical=vertical, bonded=bonded
        ),
        key_sliding=key_sliding(
            section, levels, site, soil=soil, forces=forces, bonded=bonded, cracks=cracks
        ),
        ratios=moment_ratios(forces, horizontal, width),
        flotation=_flotation(forces),
    )


def _base_sliding(
    section: Section,
    site: Site,
    soil: Sequence[SoilPush],
    lift: Uplift,
    *,
    horizontal: FloatArray,
    vertical: FloatArray,
    bonded: FloatArray,
) -> SlidingBand:
    """Sliding on the base; water on the faces of a key presses below that plane and is left out."""
    nil = np.zeros_like(vertical)
    resisting = soil_forces([push for push in soil if push.passive], section.base)
    passive = nil - sum((row.value for row in resisting), nil)
    return sliding_band(
        "base",
        site.base_friction,
        normal=-vertical,
        dry_normal=lift.push.vertical - vertical,
        driving=horizontal - lift.push.horizontal + passive,
        passive=passive,
        length=bonded,
        width=np.broadcast_to(section.base_width, nil.shape),
    )


def moment_ratios(forces: Sequence[Force], horizontal: FloatArray, width: FloatArray) -> MomentRatios:
    """Textbook ratios of moments about the toe, or the heel where the wall is pushed to the flood side.

    Parameters
    ----------
    forces
        Every force, its moment about the toe; each resists or overturns as a whole.
    horizontal
        Sum of the horizontal forces, shape (n,). [N/m]
    width
        Of the base, shape (n,). [m]
    """
    resisting, overturning, lifting = (np.zeros_like(horizontal) for _ in range(3))
    reverse = horizontal < 0
    for row in forces:
        shift = np.where(row.direction == "vertical", row.value * width, 0.0)
        moment = np.where(reverse, shift - row.moment, row.moment)
        overturning += np.maximum(moment, 0.0)
        resisting += np.maximum(-moment, 0.0)
        if row.cause == "uplift":
            lifting += np.maximum(moment, 0.0)
    bare = overturning - lifting
    return MomentRatios(
        resisting=resisting,
        overturning=overturning,
        uplift_overturns=_over(resisting, overturning),
        uplift_lightens=_over(resisting - lifting, bare),
    )


def _over(top: FloatArray, bottom: FloatArray) -> FloatArray:
    with np.errstate(over="ignore"):
        return np.divide(top, bottom, out=np.full_like(top, np.inf), where=bottom > 0)


def _flotation(forces: tuple[Force, ...]) -> FloatArray:
    """Flotation factor, eq. 3-2 of [EM2100]: (W + S)/(U − W_G), W_G water above the wall's faces."""
    upward = [row for row in forces if row.direction == "vertical"]
    nil = np.zeros_like(upward[0].value)
    weight = -sum((row.value for row in upward if row.cause in ("weight", "soil weight")), nil)
    lifting = sum((row.value for row in upward if row.cause in ("uplift", "water")), nil)
    return _over(weight, lifting)
