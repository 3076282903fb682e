"""What is odd about a wall and its state, in plain words, one sentence each."""

from __future__ import annotations

import numpy as np

from loads.load import SIDES, layer_name
from loads.records.wall import Wall
from loads.states import Levels
from loads.wall.criteria import CriteriaSet
from loads.wall.friction_table import BASE_FRICTION
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.stability import Stability


def wall_remarks(
    wall: Wall,
    section: Section,
    levels: Levels,
    site: Site,
    *,
    found: Stability,
    criteria: CriteriaSet | None,
    index: int = 0,
) -> tuple[str, ...]:
    """Remarks on one state of a wall."""
    remarks = [
        f"Criteria in force: {criteria.words}, category {wall.category}."
        if criteria
        else "No criteria are named for this wall: its stability factors are not checked.",
        *([f"Of these criteria: {criteria.remark}."] if criteria and criteria.remark else []),
        *_state_remarks(section, levels, site, found, index),
        *_rule_remarks(wall, site),
        *_soil_remarks(wall, section),
    ]
    return tuple(remarks)


def _state_remarks(section: Section, levels: Levels, site: Site, found: Stability, index: int) -> list[str]:
    top = float(section.top[0])
    remarks = [
        f"Water on the {side} side stands over the top: falling water, scour and debris are not counted."
        for side in SIDES
        if levels.of(side)[index] > top
    ]
    if levels.protected_side[index] > levels.flood_side[index]:
        remarks.append(
            "Reverse head: water is higher on the protected side; moment ratios are about the heel."
        )
    if found.runs_through[index]:
        remarks.append(
            "The resultant leaves the base, or nothing presses on it: the crack runs "
            "through. Base pressures and "
            "the bending of the slabs have no meaning here."
        )
    elif found.cracks.heel[index] > 0 or found.cracks.toe[index] > 0:
        share = 100 * float(found.base.compressed[index])
        end = "heel" if found.cracks.heel[index] > 0 else "toe"
        remarks.append(
            f"The base opens from the {end}: {share:.0f} % of it is compressed, full head in the crack."
        )
    if not found.settled[index]:
        remarks.append(
            "The crack under the base did not settle: its length and what follows from it are not final."
        )
    if not site.opens and min(found.base.linear_heel[index], found.base.linear_toe[index]) < 0:
        remarks.append(
            "Base pressures are taken in a straight line with tension at one end, which ground cannot give."
        )
    if found.horizontal[index] < 0:
        remarks.append("The wall is pushed toward the flood side; passive resistance is not counted.")
    return remarks


def _rule_remarks(wall: Wall, site: Site) -> list[str]:
    remarks = []
    if wall.uplift == "none":
        remarks.append("No uplift is counted: that is unconservative unless the base is shown to be dry.")
    if wall.uplift == "linear" and wall.cutoff:
        remarks.append("A cutoff takes no head by the linear rule of uplift; the line of creep counts it.")
    if wall.uplift == "line of creep" and wall.ground("protected") > wall.base.value:
        remarks.append(
            "On the line of creep water leaves at the protected-side ground; pore water of that ground "
            "is not "
            "counted as resisting unless the protected-side level says so."
        )
    if wall.drain is not None:
        remarks.append(
            "The drain is counted as entered: whether it stays open in a flood is for the O&M manual."
        )
    if site.ground.passive_share > 0:
        remarks.append(
            f"{100 * site.ground.passive_share:.0f} % of the passive resistance is "
            "relied on: it needs movement "
            "and can be scoured away."
        )
    if site.waters.flood != site.waters.protected and wall.uplift != "none":
        remarks.append("Uplift takes the heavier of the two waters.")
    material, value = wall.foundation.base_material, site.base_friction.value
    if material in BASE_FRICTION:
        low, high = BASE_FRICTION[material]
        if not low <= value <= high:
            remarks.append(
                f"Base friction {value:.2f} lies outside {low:.2f} to {high:.2f} of "
                f"NAVFAC DM-7.02 for {material}."
            )
    return remarks


def _soil_remarks(wall: Wall, section: Section) -> list[str]:
    remarks = []
    for side in SIDES:
        x, _ = section.chain(side)
        end = x[:, -1] if side == "flood" else x[:, 0]
        over = (x < end[:, None] - 1e-9) if side == "flood" else (x > end[:, None] + 1e-9)
        if np.any(over) and wall.layers(side):
            remarks.append(
                f"The {side}-side face overhangs the base: soil under it is taken off the soil above it."
            )
        for number, layer in enumerate(wall.layers(side), 1):
            name = layer_name(layer, number, side)
            if layer.moist_unit_weight is None and not layer.is_fluid:
                remarks.append(
                    f"{name}: no moist unit weight entered, the saturated one is used above water."
                )
            if layer.pressure == "passive" and side == "flood":
                remarks.append(f"{name}: passive pressure on the flood side is counted as a full push.")
            if layer.surcharge and not wall.surcharge_counts_as_weight:
                remarks.append(
                    f"{name}: its surcharge presses sideways and does not count as weight on the base."
                )
    return remarks
