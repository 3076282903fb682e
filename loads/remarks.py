"""Remarks: what is odd about the inputs of a barrier, in plain words, one sentence each."""

from __future__ import annotations

import math

import numpy as np

from loads.density import SUSPENDED_SEDIMENT
from loads.earth_pressure import OVERCONSOLIDATION_RATIO
from loads.earth_pressure_coulomb import ACTIVE_WALL_FRICTION_SHARE, PASSIVE_WALL_FRICTION_SHARE
from loads.faces import ArcFace, CircleFace, StripFace
from loads.limits_of_use import outside
from loads.load import SIDES, Setting, layer_name

PLAUSIBLE_HEAD = 15.0
"""Head above which a level is more likely a wrong datum than a flood; common practice, no source. [m]"""


def remarks_on(setting: Setting, face: StripFace | CircleFace | ArcFace, index: int = 0) -> tuple[str, ...]:
    """Remarks on one state of a barrier."""
    return tuple(
        _level_remarks(setting, face, index)
        + _sediment_remarks(setting)
        + _rated_level_remarks(setting)
        + _density_remarks(setting)
    )


def _level_remarks(setting: Setting, face: StripFace | CircleFace | ArcFace, index: int) -> list[str]:
    remarks = []
    for side in SIDES:
        level = float(setting.levels.of(side)[index])
        if level > face.top:
            remarks.append(
                f"Water on the {side} side stands over the top: the pressure diagram is cut off at the top, "
                "and falling water, scour and debris are not counted."
            )
        if level - face.bottom > PLAUSIBLE_HEAD:
            remarks.append(
                f"The {side}-side level is more than 15 m (49 ft) above the bottom: check the datum and the "
                "unit."
            )
    if setting.levels.protected_side[index] > setting.levels.flood_side[index]:
        remarks.append(
            "Reverse head: water is higher on the protected side. Many closures seal and bear one way only."
        )
    return remarks


def _sediment_remarks(setting: Setting) -> list[str]:
    remarks = []
    for side in SIDES:
        for number, layer in enumerate(setting.panel.layers(side), 1):
            name = layer_name(layer, number, side)
            if layer.moist_unit_weight is None and not layer.is_fluid:
                remarks.append(
                    f"{name}: no moist unit weight entered, the saturated one is used above water."
                )
            if layer.pressure == "passive":
                remarks.append(
                    f"{name}: passive pressure needs movement to build up and can be scoured away; how much "
                    "of it may be relied on is for the engineer."
                )
            if layer.pressure == "active":
                remarks.append(
                    f"{name}: active pressure holds only where the face can give way; a stiff face takes at "
                    "rest."
                )
            if layer.friction_angle and layer.wall_friction and layer.friction_angle.value > 0:
                share = np.array([layer.wall_friction.value / layer.friction_angle.value])
                limit = (
                    PASSIVE_WALL_FRICTION_SHARE if layer.pressure == "passive" else ACTIVE_WALL_FRICTION_SHARE
                )
                if outside(share, limit)[0]:
                    remarks.append(f"{name}: wall friction outside the formula's range: {limit.note}.")
            ratio = layer.overconsolidation_ratio
            if ratio is not None and outside(np.array([ratio]), OVERCONSOLIDATION_RATIO)[0]:
                remarks.append(f"{name}: overconsolidation ratio outside the formula's published range.")
    if setting.panel.sediment and abs(setting.panel.tilt_angle - math.pi / 2) > 1e-9:
        remarks.append(
            "Soil on an inclined face: the pressure normal to the face is counted, the friction along it is "
            "not."
        )
    return remarks


def _rated_level_remarks(setting: Setting) -> list[str]:
    rated = setting.panel.rated_level
    if rated is None:
        return []
    remarks = []
    if rated.dated is None or not rated.source:
        remarks.append("The rated level has no date or no author: ask who set it and when.")
    if rated.value < setting.panel.bottom.value:
        remarks.append("The rated level lies below the bottom: check the datum.")
    return remarks


def _density_remarks(setting: Setting) -> list[str]:
    weights = {side: setting.fluids[side].unit_weight for side in SIDES}
    remarks = [
        f"The {side}-side water is heavier than the formula for suspended sediment is meant for: it may be "
        "mud."
        for side, weight in weights.items()
        if weight > (1000 + 0.63 * SUSPENDED_SEDIMENT.high) * 9.80665
    ]
    for layer in setting.panel.sediment:
        weight = layer.saturated_unit_weight
        if weight is not None and weight.value <= weights[layer.side]:
            remarks.append("A saturated soil is not heavier than its water: check the unit weights.")
    return remarks
