"""One candidate of the options: its table, its record, all its checks. No Streamlit."""

from __future__ import annotations

import copy
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Any

import numpy as np

from loads.barrier import Site
from loads.checks import Check, Verdict, worst
from loads.limits_of_use import OutsideFormulaError
from loads.problems import Problem, ScenarioError
from loads.records.scenario import Scenario
from loads.records.wall import Wall
from loads.scenario_file import Document, scenario_of
from loads.states import levels_of
from loads.wall.criteria import CriteriaSet
from loads.wall.recheck import recheck_wall
from loads.wall.section import area_and_centroid
from loads.wall.section_of_record import section_of
from loads.wall.site_of_record import site_of
from loads.wall.stability import stability
from loads.wall.wall_checks import criteria_of
from loads.wall.wall_result import all_checks, wall_problems
from loads.water import fluid_of
from webapp.options_ranges import value_of

Table = dict[str, Any]
_HELD_ELSEWHERE = (
    *(f"{part}_{what}" for part in ("stem", "heel", "toe") for what in ("shear", "moment")),
    "freeboard",
)


@dataclass(frozen=True, kw_only=True)
class Candidate:
    """One wall with all its checks in the state of the scenario.

    Attributes
    ----------
    record
        What was computed.
    checks
        Every check, the most pressing first; none where the two computations disagree.
    agrees
        Whether both computations give the same.
    material
        Area of the section. [m²]
    criteria
        The set in force; None without one.
    """

    record: Wall
    checks: tuple[Check, ...]
    agrees: bool
    material: float
    criteria: CriteriaSet | None

    @property
    def held(self) -> tuple[Check, ...]:
        """Checks that have a limit."""
        return tuple(check for check in self.checks if check.limit is not None)

    @property
    def verdict(self) -> Verdict:
        """Most pressing verdict."""
        return worst([check.verdict() for check in self.checks]) if self.agrees else "withheld"

    @property
    def within(self) -> bool:
        """Whether there is a limit and none is passed."""
        return self.verdict in ("below limit", "near limit")


def site_in(scenario: Scenario) -> Site:
    """Levels and water that the candidates stand in, one state."""
    fluids = {side: fluid_of(scenario.water, side) for side in ("flood", "protected")}
    return Site(scenario=scenario, levels=levels_of(scenario), fluids=fluids)


def wall_of(document: Document, table: Mapping[str, Any]) -> Wall:
    """Record of a wall's table.

    Raises
    ------
    ScenarioError
        The table is no wall, or names what no table of the program knows.
    """
    kept = {name: document[name] for name in ("format", "title", "datum", "water")}
    record = scenario_of({**kept, "wall": [dict(table)]}).wall[0]
    problems = wall_problems(record)
    if problems:
        raise ScenarioError(problems)
    return record


def candidate_of(record: Wall, site: Site) -> Candidate:
    """Compute one wall in the state of the scenario.

    Raises
    ------
    ScenarioError
        A formula has no answer for an input.
    """
    try:
        return _computed(record, site)
    except OutsideFormulaError as error:
        raise no_answer(record, error) from None


def no_answer(record: Wall, error: OutsideFormulaError) -> ScenarioError:
    """Refusal of a wall for which a formula has no answer."""
    return ScenarioError([Problem(path=f"wall[{record.id}]", value="", rule=f"cannot be computed: {error}")])


def _computed(record: Wall, site: Site) -> Candidate:
    section, place = section_of(record), site_of(record, site.fluids)
    found = stability(section, site.levels, place)
    agrees = bool(recheck_wall(section, site.levels, place, found).agrees.all())
    near = site.scenario.near_limit
    checks = all_checks(record, section, site.levels, place, found=found, near=near) if agrees else []
    return Candidate(
        record=record,
        checks=tuple(sorted(checks, key=lambda check: -_pressing(check))),
        agrees=agrees,
        material=float(sum(area_and_centroid(part.x, part.z)[0].item() for part in section.parts)),
        criteria=criteria_of(record),
    )


def _pressing(check: Check) -> float:
    if check.limit is None:
        return -1.0
    ratio = float(check.ratio[0])
    return ratio if np.isfinite(ratio) else float("inf")


def limits_elsewhere(record: Wall) -> tuple[str, ...]:
    """Limits of a wall that the grid does not hold, in words; they are checked candidate by candidate."""
    names = [name.replace("_", " ") for name in _HELD_ELSEWHERE if getattr(record.limits, name) is not None]
    return (*names, *(("rated level",) if record.rated_level else ()))


def candidate_table(base: Mapping[str, Any], record: Wall, sizes: Mapping[str, str]) -> Table:
    """Table of a wall with dimensions as typed, everything else as in the base.

    Parameters
    ----------
    base, record
        Table and record of the base.
    sizes
        Dimension and its text, such as "8.5 ft".
    """
    table = copy.deepcopy(dict(base))
    if record.shape != "gravity" and "stem_width" not in table:
        table["stem_width"] = value_of(record, "stem_width")
    for name, text in sizes.items():
        if name.startswith("key_"):
            table["key"] = {**table["key"], name.removeprefix("key_"): text}
        else:
            table[name] = text
    if table["shape"] == "L" and "heel" in table and "toe" in table:
        table["shape"] = "T"
    return table
