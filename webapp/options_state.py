"""Options of a wall: the grid of candidates, where each stands, the least material. No Streamlit."""

from __future__ import annotations

import json
from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np

from loads.barrier import Site
from loads.limits_of_use import OutsideFormulaError
from loads.records.wall import Wall
from loads.scenario_file import Document
from loads.wall.options import OptionGrid, option_grid
from webapp.options_candidate import (
    Candidate,
    Table,
    candidate_of,
    candidate_table,
    limits_elsewhere,
    no_answer,
    wall_of,
)
from webapp.options_ranges import Range
from webapp.state import Session

WITHIN, IMPOSSIBLE, UNHELD = -1, -2, -3
"""Standing of a candidate: within every limit of the grid, no section, no limit to hold it against."""
MOST_CONFIRMED = 150
"""How many candidates are checked one by one to find the least material within every limit."""
_SAME = 1e-9


def grid_of(
    session: Session,
    record: Wall,
    site: Site,
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
        near = site.scenario.near_limit
        try:
            grid = option_grid(record, site.levels, site.fluids, values, near_limit=near, progress=progress)
        except OutsideFormulaError as error:
            raise no_answer(record, error) from None
        session["options grid"] = grid
        session["options mark"] = mark
    kept: OptionGrid = session["options grid"]
    return kept


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
class Options:
    """A grid of candidates with what it was made from.

    Attributes
    ----------
    document
        Of the scenario.
    base, record
        Table and record of the wall that gives everything that does not vary.
    ranges
        Of the dimensions that vary.
    grid
        Their candidates.
    """

    document: Document
    base: Table
    record: Wall
    ranges: Sequence[Range]
    grid: OptionGrid

    def table_of(self, number: int) -> Table:
        """Table of a candidate, as the scenario would hold it."""
        sizes = sizes_of(self.ranges, places_of(self.grid, number))
        return candidate_table(self.base, self.record, sizes)

    def record_of(self, number: int) -> Wall:
        """Record of a candidate.

        Raises
        ------
        ScenarioError
            Its dimensions make no section.
        """
        return wall_of(self.document, self.table_of(number))

    @property
    def within(self) -> str:
        """What a candidate that keeps the limits of the grid is called."""
        if limits_elsewhere(self.record):
            return "within every limit that the map holds"
        return "within every limit entered"


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


def least_of(grid: OptionGrid, site: Site, made: Callable[[int], Wall], most: int = MOST_CONFIRMED) -> Least:
    """Go through the candidates within the grid's limits, least material first, until one keeps them all."""
    numbers = np.flatnonzero(standing(grid) == WITHIN)
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
