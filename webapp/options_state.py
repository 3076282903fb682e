"""Options of a wall: the base, the ranges, the grid of candidates, one candidate in full. No Streamlit."""

from __future__ import annotations

import copy
import json
from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Any

import numpy as np

from loads.arrays import FloatArray
from loads.assessment import Assessment
from loads.checks import Check, Verdict, worst
from loads.problems import Problem, ScenarioError
from loads.records.wall import Wall
from loads.scenario_file import Document, scenario_of
from loads.wall.criteria import CriteriaSet
from loads.wall.options import OptionGrid, option_grid
from loads.wall.recheck import recheck_wall
from loads.wall.section import area_and_centroid
from loads.wall.section_of_record import section_of
from loads.wall.site_of_record import site_of
from loads.wall.stability import stability
from loads.wall.wall_checks import criteria_of
from loads.wall.wall_result import all_checks
from webapp.options_ranges import Range, value_of
from webapp.state import Session

WITHIN, IMPOSSIBLE, UNHELD = -1, -2, -3
"""Standing of a candidate: within every limit of the grid, no section, no limit to hold it against."""
MOST_CONFIRMED = 150
"""How many candidates are checked one by one to find the least material within every limit."""
_SAME = 1e-9
_HELD_ELSEWHERE = (
    *(f"{part}_{what}" for part in ("stem", "heel", "toe") for what in ("shear", "moment")),
    "freeboard",
)

Table = dict[str, Any]


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


def wall_of(document: Document, table: Mapping[str, Any]) -> Wall:
    """Record of a wall's table in the scenario's water.

    Raises
    ------
    ScenarioError
        The table is no wall.
    """
    kept = {name: document[name] for name in ("format", "title", "datum", "water")}
    return scenario_of({**kept, "wall": [dict(table)]}).wall[0]


def candidate_of(record: Wall, site: Assessment) -> Candidate:
    """Compute one wall in the first state of an assessment.

    Raises
    ------
    ScenarioError
        A name that no table knows.
    """
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


def grid_of(
    session: Session,
    record: Wall,
    site: Assessment,
    ranges: Sequence[Range],
    progress: Callable[[float], None] | None = None,
) -> OptionGrid:
    """Grid of candidates; kept in the session until anything that it follows from changes.

    Raises
    ------
    ScenarioError
        As `option_grid`.
    """
    typed = [(one.name, one.texts) for one in ranges]
    water = {side: fluid.unit_weight for side, fluid in site.fluids.items()}
    levels = [site.levels.of(side).tolist() for side in ("flood", "protected")]
    mark = json.dumps([record.model_dump(mode="json"), typed, water, levels, site.scenario.near_limit])
    if session.get("options mark") != mark:
        values = {one.name: one.values for one in ranges}
        session["options grid"] = option_grid(
            record,
            site.levels,
            site.fluids,
            values,
            near_limit=site.scenario.near_limit,
            progress=progress,
        )
        session["options mark"] = mark
    grid: OptionGrid = session["options grid"]
    return grid


def standing(grid: OptionGrid) -> np.ndarray[tuple[int, ...], np.dtype[np.intp]]:
    """Where every candidate stands, (n,): WITHIN, IMPOSSIBLE, UNHELD, or the index of what governs.

    A check that gives no figure counts as passed: nothing says that its limit is kept.
    """
    if not grid.checks:
        return np.where(grid.possible, UNHELD, IMPOSSIBLE)
    blank = np.isnan(grid.ratios)
    governs = np.where(blank.any(axis=1), blank.argmax(axis=1), grid.governing)
    found = np.where(grid.within & ~blank.any(axis=1), WITHIN, governs)
    return np.asarray(np.where(grid.possible, found, IMPOSSIBLE))


def number_of(grid: OptionGrid, places: Sequence[int]) -> int:
    """Number of a candidate from its place along each axis."""
    return int(np.ravel_multi_index(tuple(places), grid.shape))


def places_of(grid: OptionGrid, number: int) -> tuple[int, ...]:
    """Place of a candidate along each axis."""
    return tuple(int(place) for place in np.unravel_index(number, grid.shape))


def sizes_of(ranges: Sequence[Range], places: Sequence[int]) -> dict[str, str]:
    """Dimensions of a candidate as typed."""
    return {one.name: one.texts[place] for one, place in zip(ranges, places, strict=True)}


@dataclass(frozen=True, kw_only=True)
class Least:
    """Least material among the candidates within every limit.

    Attributes
    ----------
    number
        Its candidate; None when none was found.
    tried
        How many were checked one by one.
    left
        How many within the limits of the grid were not looked at.
    """

    number: int | None
    tried: int
    left: int


def least_of(
    grid: OptionGrid, site: Assessment, made: Callable[[int], Wall], most: int = MOST_CONFIRMED
) -> Least:
    """Go through the candidates within the grid's limits, least material first, until one keeps them all."""
    numbers: FloatArray = np.flatnonzero(standing(grid) == WITHIN)
    order = numbers[np.argsort(grid.material[numbers], kind="stable")]
    for tried, number in enumerate(order[:most], 1):
        candidate = candidate_of(made(int(number)), site)
        if candidate.within and matches(grid, int(number), candidate):
            return Least(number=int(number), tried=tried, left=len(order) - tried)
    return Least(number=None, tried=min(most, len(order)), left=max(len(order) - most, 0))


def matches(grid: OptionGrid, number: int, candidate: Candidate) -> bool:
    """Whether the grid and the candidate computed by itself give the same ratios and material."""
    single = {check.name: float(check.ratio[0]) for check in candidate.held}
    ours = [(float(grid.material[number]), candidate.material)]
    ours += [
        (float(ratio), single.get(name, float("nan")))
        for name, ratio in zip(grid.checks, grid.ratios[number], strict=True)
    ]
    return all(
        one == other or (np.isnan(one) and np.isnan(other)) or abs(one - other) <= _SAME * abs(other)
        for one, other in ours
    )


def problem_words(error: ScenarioError) -> tuple[Problem, ...]:
    """Problems of an error, each once."""
    return tuple(dict.fromkeys(error.problems))
