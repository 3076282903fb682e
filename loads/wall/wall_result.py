"""What a wall amounts to: forces, stability, seepage, members, checks; computed twice."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.checks import Check, Verdict, worst
from loads.diagram import Diagram
from loads.first_limit import FirstLimit, crossing_levels
from loads.problems import Problem, ScenarioError
from loads.records.wall import Wall
from loads.states import DRY, Levels, rising
from loads.wall.bearing_checks import bearing_checks
from loads.wall.criteria import CRITERIA, CriteriaSet
from loads.wall.friction_table import BASE_FRICTION
from loads.wall.members import Member, members, stem_diagram
from loads.wall.recheck import WallRecheck, recheck_wall
from loads.wall.section import Section
from loads.wall.section_of_record import section_of
from loads.wall.seepage import LANE_RATIOS
from loads.wall.site import Site
from loads.wall.site_of_record import site_of
from loads.wall.stability import Stability, stability
from loads.wall.underseepage import Underseepage, underseepage
from loads.wall.wall_checks import (
    criteria_of,
    level_checks,
    member_checks,
    seepage_checks,
    stability_checks,
)
from loads.wall.wall_remarks import wall_remarks
from loads.water import Fluid

SEARCH_ABOVE_TOP = 3.0
"""How far above the top a first-limit level is looked for. [m]"""


@dataclass(frozen=True, kw_only=True)
class WallResult:
    """A wall per unit length in n states.

    Attributes
    ----------
    record
        What was computed.
    levels, fluids
        The states and the water of "flood" and "protected".
    section, site
        The record as numbers.
    criteria
        The set in force; None without one.
    stability
        Forces, their sums, base pressure, cracks, sliding, ratios, flotation.
    diagram
        Net horizontal pressure of water and soil on the upright planes of the wall, passive resistance left
        out. [Pa]
    seepage
        The underseepage screen.
    members
        Stem, heel and toe.
    recheck
        The second computation.
    checks
        In order of how pressing they are in the first state; none where the computations disagree.
    first_limit
        The first-limit level with the protected side as in the first state; None without criteria or limits.
    remarks
        On the first state.
    """

    record: Wall
    levels: Levels
    fluids: dict[str, Fluid]
    section: Section
    site: Site
    criteria: CriteriaSet | None
    stability: Stability
    diagram: Diagram
    seepage: Underseepage
    members: tuple[Member, ...]
    recheck: WallRecheck
    checks: tuple[Check, ...]
    first_limit: FirstLimit | None
    remarks: tuple[str, ...]

    @property
    def withheld(self) -> bool:
        """True when the two computations disagree in any state."""
        return not bool(self.recheck.agrees.all())

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state."""
        return "withheld" if self.withheld else worst([check.verdict(index) for check in self.checks])


def assess_wall(record: Wall, levels: Levels, fluids: dict[str, Fluid], near_limit: float) -> WallResult:
    """Compute a wall in n states.

    Parameters
    ----------
    record
        Validated record.
    levels
        The states.
    fluids
        Water of "flood" and "protected".
    near_limit
        Ratio from which a check is near its limit. [–]

    Raises
    ------
    ScenarioError
        A name that no table knows, or parts that do not join to one section.
    OutsideFormulaError
        A formula has no answer for an input.
    """
    problems = wall_problems(record)
    if problems:
        raise ScenarioError(problems)
    section, site = section_of(record), site_of(record, fluids)
    found = stability(section, levels, site)
    second = recheck_wall(section, levels, site, found)
    criteria = criteria_of(record)
    agreed = bool(second.agrees.all())
    checks = all_checks(record, section, levels, site, found=found, near=near_limit) if agreed else []
    return WallResult(
        record=record,
        levels=levels,
        fluids=fluids,
        section=section,
        site=site,
        criteria=criteria,
        stability=found,
        diagram=stem_diagram(section, levels, site, found),
        seepage=_screen(section, levels, site),
        members=members(section, levels, site, found),
        recheck=second,
        checks=tuple(sorted(checks, key=lambda check: -_pressing(check))),
        first_limit=_first_limit(record, section, levels, site, near_limit) if agreed else None,
        remarks=wall_remarks(record, section, levels, site, found=found, criteria=criteria),
    )


def wall_problems(record: Wall) -> list[Problem]:
    """Names in a record that no table of the program knows."""
    named = (
        ("criteria", record.criteria, CRITERIA),
        ("foundation.material", record.foundation.material, LANE_RATIOS),
        ("foundation.base_material", record.foundation.base_material, BASE_FRICTION),
    )
    return [
        Problem(
            path=f"wall[{record.id}].{field}",
            value=f'"{name}"',
            rule="it is not known here; known are " + "; ".join(f'"{key}"' for key in table),
        )
        for field, name, table in named
        if name and name not in table
    ]


def all_checks(
    record: Wall, section: Section, levels: Levels, site: Site, *, found: Stability, near: float
) -> list[Check]:
    """Every check of a wall."""
    criteria = criteria_of(record)
    return [
        *stability_checks(record, found, criteria, section, near),
        *bearing_checks(record, section, levels, site, found=found, criteria=criteria, near=near),
        *seepage_checks(record, _screen(section, levels, site), near),
        *member_checks(record, members(section, levels, site, found), near),
        *level_checks(record, levels, float(section.top.max()), near),
    ]


def _screen(section: Section, levels: Levels, site: Site) -> Underseepage:
    return underseepage(
        section,
        levels,
        site.path,
        ground_unit_weight=site.ground_unit_weight,
        water_unit_weight=site.waters.flood,
    )


def _pressing(check: Check) -> float:
    ratio = float(check.ratio[0])
    return ratio if ratio == ratio and check.limit is not None else -1.0  # noqa: PLR0124 - not a number


def _first_limit(
    record: Wall, section: Section, levels: Levels, site: Site, near: float
) -> FirstLimit | None:
    """Lowest flood-side level at which a limit is reached by a wall pushed toward the protected side."""
    protected = float(levels.protected_side[0])
    low = float(section.base[0])
    ceiling = max(float(section.top[0]), float(levels.flood_side.max())) + SEARCH_ABOVE_TOP

    def at(flood_side: FloatArray) -> tuple[list[Check], BoolArray]:
        states = rising(flood_side, protected if np.isfinite(protected) else DRY)
        found = stability(section, states, site)
        checks = all_checks(record, section, states, site, found=found, near=near)
        held = [check for check in checks if check.limit is not None and check.rises_with_water]
        return held, found.horizontal >= 0

    def ratios(flood_side: FloatArray) -> FloatArray:
        held, forward = at(flood_side)
        columns = [
            np.where(forward, np.nan_to_num(check.ratio, nan=np.inf, posinf=np.inf), 0.0)
            if check.name != "flotation"
            else check.ratio
            for check in held
        ]
        return np.column_stack(columns)

    names = [(check.subject, check.name) for check in at(np.array([low]))[0]]
    if not names:
        return None
    level, reached, at_low = crossing_levels(ratios, low=low, high=ceiling)
    if not reached.any():
        return FirstLimit(level=None, subject="", check="", without_water=False, ceiling=ceiling)
    first = int(np.nanargmin(level))
    return FirstLimit(
        level=float(level[first]),
        subject=names[first][0],
        check=names[first][1],
        without_water=bool(at_low[first]),
        ceiling=ceiling,
    )
