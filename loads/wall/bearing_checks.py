"""Checks of what a wall presses on its ground with."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.checks import Check, check_of
from loads.records.wall import Wall
from loads.states import Levels
from loads.wall.bearing import bearing_resistance_meyerhof
from loads.wall.criteria import CriteriaSet
from loads.wall.ground_stress import effective_stress
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.stability import Stability
from loads.wall.wall_checks import NO_ENTRY, factor_check


def bearing_checks(
    wall: Wall,
    section: Section,
    levels: Levels,
    site: Site,
    *,
    found: Stability,
    criteria: CriteriaSet | None,
    near: float,
) -> list[Check]:
    """Greatest base pressure against the allowable one, and the factor on a computed resistance."""
    subject = f"wall {wall.id}"
    allowable = wall.foundation.allowable_bearing
    peak = found.base.peak if site.opens else np.maximum(found.base.linear_toe, found.base.linear_heel)
    checks = [
        check_of(
            subject=subject,
            name="base pressure",
            kind="pressure",
            demand=peak,
            limit=allowable,
            near=near,
            remarks=("Pressure between base and ground with uplift taken off.",),
        )
    ]
    if wall.foundation.bearing_method is None:
        return checks
    least = criteria.bearing.get(wall.category) if criteria else None
    source = f"{criteria.words}, {wall.category}" if criteria else NO_ENTRY
    factor = bearing_factor(wall, section, levels, site, found)
    words = f"{wall.foundation.bearing_method}, strip of effective width, inclined load, no depth factors."
    checks.append(
        factor_check(
            subject=subject,
            name="bearing resistance",
            factor=factor,
            least=least,
            source=source,
            near=near,
            remarks=(words,),
        )
    )
    return checks


def bearing_factor(wall: Wall, section: Section, levels: Levels, site: Site, found: Stability) -> FloatArray:
    """Ultimate bearing force over the compression on the base, (n,). [–]."""
    below = wall.foundation
    assert below.soil_friction_angle is not None
    normal, width = found.base.normal, section.base_width
    effective = np.where(normal > 0, width - 2 * np.abs(found.base.eccentricity), 0.0)
    effective = np.maximum(effective, 0.0)
    side = "protected"
    overburden = effective_stress(
        site.ground.layers[side],
        level=levels.of(side),
        water_unit_weight=site.waters.of(side),
        z=section.base,
        with_surcharge=False,
    )
    ultimate = bearing_resistance_meyerhof(
        friction_angle=np.array([below.soil_friction_angle.value]),
        cohesion=np.array([below.soil_cohesion.value if below.soil_cohesion else 0.0]),
        unit_weight=np.array([site.ground_unit_weight - site.waters.flood]),
        overburden=np.maximum(overburden, 0.0),
        width=effective,
        inclination=np.arctan2(np.abs(found.horizontal), np.maximum(normal, 1e-9)),
    )
    return np.divide(ultimate * effective, normal, out=np.zeros_like(normal), where=normal > 0)
