"""Checks of a wall against criteria and entered limits, for n states or n sections."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.checks import Check, check_of, level_check
from loads.quantity import Quantity
from loads.records.wall import Wall
from loads.states import Levels
from loads.wall.criteria import CRITERIA, CriteriaSet, own_set
from loads.wall.members import Member
from loads.wall.section import Section
from loads.wall.seepage import LANE_RATIOS
from loads.wall.sliding import DEFINITION, SlidingBand
from loads.wall.stability import Stability
from loads.wall.underseepage import Underseepage

TEXTBOOK = (
    "The textbook's ratio; it is not the governing criterion, which goes by where the resultant lies. It "
    "changes with how uplift is counted, so both ways are given."
)
FACTOR = "The ratio is the factor asked for over the factor found."
KEY_NOT_COUNTED = "Information only: the key is left out; what the key itself bears is for its designer."
NO_ENTRY = "no limit entered"


def criteria_of(wall: Wall) -> CriteriaSet | None:
    """Criteria in force for a wall; None when none were named or entered.

    Raises
    ------
    KeyError
        No set has that key.
    """
    if wall.own_criteria is not None:
        return own_set(wall.own_criteria, wall.category)
    return CRITERIA[wall.criteria] if wall.criteria else None


def stated(text: str, value: float, kind: str, source: str) -> Quantity:
    """Limit that a document or a method gives, in the form of an entered one."""
    return Quantity(text=text, kind=kind, unit="", value=value, low=value, high=value, source=source)


def factor_check(
    *,
    subject: str,
    name: str,
    factor: FloatArray,
    least: float | None,
    source: str,
    near: float,
    remarks: tuple[str, ...] = (),
) -> Check:
    """Hold a factor against the least one asked for; the ratio is asked for over found."""
    limit = None if least is None else stated(f"{least:g}", least, "ratio", source)
    if least is None:
        ratio = np.full(len(factor), np.nan)
    else:
        with np.errstate(over="ignore"):
            ratio = np.divide(least, factor, out=np.full(len(factor), np.inf), where=factor > 0)
    return Check(
        subject=subject,
        name=name,
        kind="ratio",
        demand=factor,
        limit=limit,
        limit_value=np.nan if least is None else least,
        ratio=ratio,
        near=near,
        source=source if least is not None else NO_ENTRY,
        remarks=(FACTOR, *remarks) if least is not None else remarks,
    )


def stability_checks(
    wall: Wall, found: Stability, criteria: CriteriaSet | None, section: Section, near: float
) -> list[Check]:
    """Sliding, resultant, flotation and the textbook's moment ratios."""
    subject, category = f"wall {wall.id}", wall.category
    source = f"{criteria.words}, {category}" if criteria else NO_ENTRY

    def least(table: str) -> float | None:
        return getattr(criteria, table).get(category) if criteria else None

    checks = [_sliding_check(subject, found.sliding, None, source, near, counted=False)]
    if found.key_sliding is None:
        checks = [_sliding_check(subject, found.sliding, least("sliding"), source, near, counted=True)]
    else:
        checks.append(
            _sliding_check(subject, found.key_sliding, least("sliding"), source, near, counted=True)
        )
    checks.append(_resultant_check(subject, found, section, least("compression"), source, near=near))
    for name, factor, asked, remarks in (
        ("flotation", found.flotation, least("flotation"), ()),
        ("moment ratio, uplift overturning", found.ratios.uplift_overturns, None, (TEXTBOOK,)),
        ("moment ratio, uplift off the weight", found.ratios.uplift_lightens, None, (TEXTBOOK,)),
    ):
        checks.append(
            factor_check(
                subject=subject,
                name=name,
                factor=factor,
                least=asked,
                source=source,
                near=near,
                remarks=remarks,
            )
        )
    return checks


def _sliding_check(
    subject: str, band: SlidingBand, least: float | None, source: str, near: float, *, counted: bool
) -> Check:
    name = "sliding on the base" if band.plane == "base" else "sliding through the key"
    return factor_check(
        subject=subject,
        name=name if counted else f"{name}, key not counted",
        factor=band.factor,
        least=least,
        source=source,
        near=near,
        remarks=(DEFINITION,) if counted else (DEFINITION, KEY_NOT_COUNTED),
    )


def _resultant_check(
    subject: str, found: Stability, section: Section, percent: float | None, source: str, *, near: float
) -> Check:
    """Eccentricity over base width against what the least compressed share allows: e/B = 1/2 − share/3."""
    width = section.base_width
    ratio = np.full(len(found.moment), np.nan)
    demand = np.where(found.base.normal > 0, found.base.eccentricity / width, np.inf)
    limit, allowed = None, np.nan
    if percent is not None:
        allowed = 0.5 - percent / 300
        words = f"{percent:g} % of the base in compression" if percent else "resultant within the base"
        limit = stated(words, allowed, "ratio", source)
        ratio = np.abs(demand) / allowed
    return Check(
        subject=subject,
        name="resultant location",
        kind="ratio",
        demand=demand,
        limit=limit,
        limit_value=allowed,
        ratio=ratio,
        near=near,
        source=source if limit else NO_ENTRY,
        remarks=("Distance of the resultant from the middle of the base over its width, toward the toe.",),
    )


def seepage_checks(wall: Wall, screen: Underseepage, near: float) -> list[Check]:
    """Weighted creep ratio against its material, exit gradient against the critical one."""
    subject = f"wall {wall.id}"
    material = wall.foundation.material
    least = LANE_RATIOS.get(material)
    creep = factor_check(
        subject=subject,
        name="weighted creep ratio",
        factor=screen.creep_ratio,
        least=least,
        source=f"Lane 1935, {material} (from memory, to be confirmed)" if least else NO_ENTRY,
        near=near,
    )
    factor = wall.foundation.exit_gradient_factor
    with np.errstate(invalid="ignore", over="ignore"):
        found = np.divide(
            screen.critical_gradient,
            screen.exit_gradient,
            out=np.full_like(screen.exit_gradient, np.inf),
            where=screen.exit_gradient > 0,
        )
    exits = factor_check(
        subject=subject,
        name="exit gradient",
        factor=found,
        least=factor,
        source="factor entered for the foundation" if factor else NO_ENTRY,
        near=near,
        remarks=("Factor of the critical gradient over the exit gradient, uniform deep ground.",),
    )
    return [creep, exits]


def member_checks(wall: Wall, found: tuple[Member, ...], near: float) -> list[Check]:
    """Shear and moment at the fixed end of stem, heel and toe."""
    checks = []
    for member in found:
        for name, kind, demand in (
            ("shear", "line load", member.root_shear),
            ("moment", "moment per length", member.root_moment),
        ):
            checks.append(
                check_of(
                    subject=f"wall {wall.id}, {member.name}",
                    name=name,
                    kind=kind,
                    demand=demand,
                    limit=getattr(wall.limits, f"{member.name}_{name}"),
                    near=near,
                )
            )
    return checks


def level_checks(wall: Wall, levels: Levels, top: float, near: float) -> list[Check]:
    """Rated level and freeboard."""
    freeboard, rated = wall.limits.freeboard, wall.rated_level
    highest = (
        ("rated level", rated, rated.value if rated else np.nan),
        ("freeboard", freeboard, top - freeboard.value if freeboard else np.nan),
    )
    return [
        level_check(
            subject=f"wall {wall.id}",
            name=name,
            level=levels.flood_side,
            bottom=wall.base.value,
            limit=limit,
            highest=float(value),
            near=near,
        )
        for name, limit, value in highest
    ]
