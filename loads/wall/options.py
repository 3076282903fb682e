"""Options: every combination of a few dimensions of a wall, all stability checks in one vectorised pass."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.checks import ROUNDING, Check
from loads.problems import Problem, ScenarioError
from loads.records.wall import Wall
from loads.states import Levels
from loads.wall.bearing_checks import bearing_checks
from loads.wall.section import Section, area_and_centroid, gravity_section, slab_section
from loads.wall.section_of_record import dimensions_of
from loads.wall.site_of_record import site_of
from loads.wall.stability import stability
from loads.wall.underseepage import underseepage
from loads.wall.wall_checks import criteria_of, seepage_checks, stability_checks
from loads.wall.wall_result import wall_problems
from loads.water import Fluid

BLOCK = 4096
"""Candidates taken at a time: their arrays stay in a core's cache, and progress can be shown."""
MOST = 1_000_000
"""Most candidates of one grid."""
_SLACK = 1e-9


@dataclass(frozen=True, kw_only=True)
class OptionGrid:
    """All candidates of a grid.

    Attributes
    ----------
    names
        Dimensions that vary, in the order of the grid's axes.
    values
        Their values, one array an axis. [m]
    shape
        Candidates along each axis; candidate k is element k of the grid in C order.
    possible
        Whether the dimensions make a section, shape (n,).
    checks
        Names of the checks that have a limit, in a fixed order.
    ratios
        Demand over limit, shape (n, c); NaN where the section is not possible. [–]
    worst
        Largest ratio, shape (n,). [–]
    governing
        Index into `checks` of the largest ratio, shape (n,); −1 where there is none.
    material
        Area of the section, shape (n,). [m²]
    within
        Whether the section is possible and no ratio is above 1, shape (n,).
    """

    names: tuple[str, ...]
    values: tuple[FloatArray, ...]
    shape: tuple[int, ...]
    possible: BoolArray
    checks: tuple[str, ...]
    ratios: FloatArray
    worst: FloatArray
    governing: np.ndarray[tuple[int, ...], np.dtype[np.intp]]
    material: FloatArray
    within: BoolArray

    @property
    def least(self) -> int | None:
        """Candidate of least material among those within every limit; None when there is none."""
        if not self.within.any():
            return None
        return int(np.argmin(np.where(self.within, self.material, np.inf)))

    def dimensions(self, candidate: int) -> dict[str, float]:
        """Dimensions of a candidate by name. [m]."""
        place = np.unravel_index(candidate, self.shape)
        return {
            name: float(axis[index]) for name, axis, index in zip(self.names, self.values, place, strict=True)
        }

    def columns(self) -> tuple[tuple[str, ...], list[FloatArray]]:
        """Headings and columns of the whole grid as a table, in SI, for export."""
        mesh = np.meshgrid(*self.values, indexing="ij")
        headings = (*self.names, "material", *(f"ratio, {name}" for name in self.checks), "worst ratio")
        columns = [axis.ravel() for axis in mesh] + [self.material]
        columns += [self.ratios[:, c] for c in range(len(self.checks))] + [self.worst]
        return headings, columns


def option_grid(
    record: Wall,
    levels: Levels,
    fluids: dict[str, Fluid],
    ranges: Mapping[str, FloatArray],
    *,
    near_limit: float = 0.9,
    progress: Callable[[float], None] | None = None,
) -> OptionGrid:
    """Check every combination of some dimensions of a wall in one state.

    Parameters
    ----------
    record
        A wall of shape "gravity", "T" or "L" that gives everything which does not vary.
    levels
        One state.
    fluids
        Water of "flood" and "protected".
    ranges
        Values of each dimension that varies, by the names of `dimensions_of`. [m]
    near_limit
        As in `assess_wall`. [–]
    progress
        Called with the share done, after each block.

    Raises
    ------
    ScenarioError
        A dimension that this shape does not have, no values, too many candidates, or a wall by corners.

    Notes
    -----
    Sliding, resultant, flotation, base pressure, bearing resistance and the seepage screen, as far as limits
    for them are in force. Strength of stem and slab is not part of it.
    """
    fixed = _checked(record, ranges)
    shape = tuple(len(values) for values in ranges.values())
    mesh = np.meshgrid(*ranges.values(), indexing="ij")
    flat = {name: axis.ravel() for name, axis in zip(ranges, mesh, strict=True)}
    total = int(np.prod(shape))
    blocks = []
    for start in range(0, total, BLOCK):
        part = {name: axis[start : start + BLOCK] for name, axis in flat.items()}
        blocks.append(_block(record, levels, fluids, fixed | part, near_limit))
        if progress is not None:
            progress(min(start + BLOCK, total) / total)
    possible, material, ratios = (np.concatenate([block[i] for block in blocks]) for i in range(3))
    # a check without a figure anywhere has no limit; one that lacks it for a single candidate is not kept
    limited = ~np.isnan(ratios[possible.astype(bool)]).all(axis=0)
    blank = np.where(np.isnan(ratios), np.where(limited, np.inf, -np.inf), ratios)
    has = bool(ratios.shape[1])
    worst = blank.max(axis=1) if has else np.full(total, np.nan)
    worst = np.where(possible, worst, np.nan)
    governing = np.where(possible, blank.argmax(axis=1) if has else -1, -1)
    return OptionGrid(
        names=tuple(ranges),
        values=tuple(np.asarray(values, float) for values in ranges.values()),
        shape=shape,
        possible=possible.astype(bool),
        checks=blocks[0][3],
        ratios=np.where(possible[:, None], ratios, np.nan),
        worst=worst,
        governing=governing,
        material=np.where(possible, material, np.nan),
        within=np.asarray(possible & (worst <= 1 + ROUNDING)),
    )


def _checked(record: Wall, ranges: Mapping[str, FloatArray]) -> dict[str, FloatArray]:
    where = f"wall[{record.id}]"
    problems = wall_problems(record)
    if record.shape == "parts":
        rule = 'is a section by corners; options are for the shapes "gravity", "T" and "L"'
        raise ScenarioError([Problem(path=where, value="", rule=rule), *problems])
    fixed = dimensions_of(record)
    known = "known are " + ", ".join(fixed)
    for name, values in ranges.items():
        if name not in fixed:
            problems.append(Problem(path=where, value=f'"{name}"', rule=f"it has no such dimension; {known}"))
        elif not len(values) or not np.isfinite(values).all():
            problems.append(Problem(path=where, value=name, rule="it needs one or more values"))
    total = np.prod([float(len(values)) for values in ranges.values()])
    if total > MOST:
        rule = f"it may have at most {MOST} candidates; take fewer values"
        problems.append(Problem(path=where, value=f"a grid of {total:.0f}", rule=rule))
    if problems:
        raise ScenarioError(problems)
    return fixed


def _block(
    record: Wall,
    levels: Levels,
    fluids: dict[str, Fluid],
    dimensions: dict[str, FloatArray],
    near: float,
) -> tuple[BoolArray, FloatArray, FloatArray, tuple[str, ...]]:
    """Possible, material, ratios and names of checks of some candidates."""
    assert record.unit_weight is not None
    build = gravity_section if record.shape == "gravity" else slab_section
    count = max(len(values) for values in dimensions.values())
    possible = possible_sections(record, dimensions, count)
    section = build(dimensions, record.unit_weight.value)
    states = Levels(
        flood_side=np.full(count, levels.flood_side[0]),
        protected_side=np.full(count, levels.protected_side[0]),
    )
    checks = [check for check in _checks(record, section, states, fluids, near) if check.limit is not None]
    material = sum((area_and_centroid(part.x, part.z)[0] for part in section.parts), np.zeros(count))
    ratios = np.column_stack([check.ratio for check in checks]) if checks else np.zeros((count, 0))
    return possible, material, ratios, tuple(check.name for check in checks)


def _checks(
    record: Wall, section: Section, states: Levels, fluids: dict[str, Fluid], near: float
) -> list[Check]:
    site = site_of(record, fluids)
    criteria = criteria_of(record)
    found = stability(section, states, site)
    screen = underseepage(
        section,
        states,
        site.path,
        ground_unit_weight=site.ground_unit_weight,
        water_unit_weight=site.waters.flood,
    )
    return [
        *stability_checks(record, found, criteria, section, near),
        *bearing_checks(record, section, states, site, found=found, criteria=criteria, near=near),
        *seepage_checks(record, screen, near),
    ]


def possible_sections(record: Wall, d: Mapping[str, FloatArray], count: int) -> BoolArray:
    """Whether dimensions make a section that the record of a wall would take, (n,)."""
    holds = np.ones(count, dtype=bool)
    slack = 1 + _SLACK
    for name in ("height", "top_width"):
        holds &= d[name] > 0
    holds &= d["flood_batter"] >= 0
    foot = d["base_width"] if record.shape == "gravity" else d["stem_width"]
    holds &= (foot > 0) & (d["top_width"] + d["flood_batter"] <= foot * slack)
    width = foot
    if record.shape != "gravity":
        holds &= (d["base_thickness"] > 0) & (d["base_thickness"] < d["height"])
        holds &= (d["heel"] >= 0) & (d["toe"] >= 0)
        width = d["heel"] + d["stem_width"] + d["toe"]
    if "key_depth" in d:
        holds &= (d["key_depth"] > 0) & (d["key_width"] > 0) & (d["key_position"] >= 0)
        holds &= d["key_position"] + d["key_width"] <= width * slack
        if record.foundation.depth is not None:
            holds &= d["key_depth"] < record.foundation.depth.value
    places = [cutoff.position.value for cutoff in record.cutoff]
    places += [record.drain.position.value] if record.drain else []
    for place in places:
        holds &= place <= width * slack
    tops = [layer.top.value for layer in record.sediment]
    grounds = [ground for ground in map(record.ground, ("flood", "protected")) if np.isfinite(ground)]
    if tops:
        holds &= d["base"] < min(tops)
    if grounds:
        holds &= d["base"] + d["height"] >= max(grounds) - _SLACK
    return holds
