"""Checks, rated and first-limit level, and states of one barrier as tables of the package."""

from __future__ import annotations

import math

import numpy as np

from loads.arrays import FloatArray
from loads.assessment import Assessed, Assessment, Withheld
from loads.checks import Check
from webapp.display import NO_BREAK, System, elevation, load_kind, pedigree, significant
from webapp.package.grid import Grid, Heading, words
from webapp.package.states import State
from webapp.part_words import check_title
from webapp.step_text import figure, percent, unit_of, with_unit

RESULT_DIGITS = 4
"""Significant figures of results."""
_NIL = 1e-9


def checks_grid(barrier: Assessed, system: System, datum: str) -> Grid:
    """Demand, limit, ratio and verdict of every check."""
    headings = tuple(
        Heading(text=text, words=text not in ("demand", "limit", "ratio"))
        for text in ("check", "demand", "limit", "ratio", "verdict", "source of the limit", "remarks")
    )
    kind = barrier.record.kind
    rows = tuple(check_cells(check, system, datum, kind) for check in barrier.checks)
    return Grid(headings=headings, rows=rows)


def check_cells(check: Check, system: System, datum: str, kind: str = "") -> tuple[str, ...]:
    """Name, with its part where a kind is given, demand, limit, ratio, verdict, source and remarks."""
    demand = float(check.demand[0])
    if check.kind == "elevation":
        shown = f"water at {elevation(demand, system, datum)}"
        limit = elevation(check.limit_value, system, datum)
        if check.name == "freeboard" and check.limit is not None:
            limit = f"{check.limit.text} to the top: {limit}"
    else:
        own = "deflection" if "deflection" in check.name else check.kind
        shown = with_unit(demand, own, system, RESULT_DIGITS)
        limit = with_unit(check.limit_value, own, system, RESULT_DIGITS)
    return (
        check_title(check, kind) if kind else check.name,
        shown,
        limit if check.limit is not None else "none entered",
        ratio_of(check, 0),
        check.verdict(),
        check.source if check.limit is not None else "–",
        " ".join(check.remarks) or "–",
    )


def ratio_of(check: Check, index: int) -> str:
    """Ratio of a check in one state."""
    ratio = float(check.ratio[index])
    if math.isinf(ratio) and check.kind != "elevation" and check.limit_value != 0:
        return "beyond any limit"
    return ratio_text(ratio, check.kind)


def ratio_text(ratio: float, kind: str = "elevation") -> str:
    """Ratio with three figures, with more where it would read as one and is not; a dash without a limit."""
    if math.isinf(ratio):
        return "limit below the bottom edge" if kind == "elevation" else "none allowed"
    if not math.isfinite(ratio):
        return "–"
    digits = 3
    while digits < 7 and abs(float(f"{ratio:.{digits - 1}f}") - 1) < 1e-12 and abs(ratio - 1) > _NIL:
        digits += 1
    return significant(ratio, digits)


def level_rows(barrier: Assessed, system: System, datum: str) -> tuple[tuple[str, str, str], ...]:
    """Rated level and first-limit level side by side, each with the words that say which is which."""
    rated = barrier.record.rated_level
    rated_row = (
        "Rated level",
        elevation(rated.value, system, datum) if rated else "none entered",
        f"the highest water an engineer has put their name to; entered: {pedigree(rated)}"
        if rated
        else "the highest water an engineer has put their name to; it is entered, never computed",
    )
    return (rated_row, ("First-limit level", *_first_limit(barrier, system, datum)))


def _first_limit(barrier: Assessed, system: System, datum: str) -> tuple[str, str]:
    first = barrier.first_limit
    if first is None:
        return "not computed", "no limit on pressure, force or moment was entered"
    meaning = "computed; a screening figure and no leave to let the water rise to it"
    if first.level is None:
        searched = elevation(first.ceiling, system, datum)
        return "none found", f"no entered load limit is reached up to {searched}; {meaning}"
    if first.without_water:
        words = "is reached with no water above the bottom edge on the flood side"
        return elevation(first.level, system, datum), f"{first.check} {words}; {meaning}"
    protected = elevation(float(barrier.levels.protected_side[0]), system, datum)
    reached = f"{first.check} reaches its limit there first, protected side as entered ({protected})"
    return elevation(first.level, system, datum), f"{reached}; {meaning}"


def states_grid(many: Assessment, barrier_id: str, states: list[State], system: System, datum: str) -> Grid:
    """Force, moment and verdict in every state."""
    barrier = many.barrier(barrier_id)
    kinds = [load_kind(barrier.record.kind, kind) for kind in ("force", "moment")]
    level = f"{unit_of('elevation', system)} {datum}"
    headings = (
        words("state"),
        Heading(text="flood side", unit=level),
        Heading(text="protected side", unit=level),
        Heading(text="H", unit=unit_of(kinds[0], system)),
        Heading(text="change of H"),
        Heading(text="M", unit=unit_of(kinds[1], system)),
        Heading(text="change of M"),
        Heading(text="largest ratio"),
        words("verdict"),
    )
    rows = []
    for i, state in enumerate(states):
        sides = (bare(state.flood_side, system), bare(state.protected_side, system))
        if isinstance(barrier, Withheld):
            rows.append((state.name, *sides, *("–",) * 5, barrier.verdict()))
            continue
        force, moment = barrier.resultant.horizontal, barrier.resultant.moment
        column = largest_ratio(barrier, i)
        rows.append(
            (
                state.name,
                *sides,
                figure(float(force[i]), kinds[0], system, RESULT_DIGITS),
                _change(force, i),
                figure(float(moment[i]), kinds[1], system, RESULT_DIGITS),
                _change(moment, i),
                "–" if column is None else ratio_of(barrier.checks[column], i),
                barrier.verdict(i),
            )
        )
    return Grid(headings=headings, rows=tuple(rows))


def largest_ratio(barrier: Assessed, index: int) -> int | None:
    """Which check has the largest ratio in a state; None when nothing is checked."""
    ratios = np.where(barrier.checks.severity[index] > 0, barrier.checks.ratio[index], np.nan)
    return None if np.isnan(ratios).all() else int(np.nanargmax(ratios))


def bare(level: float, system: System) -> str:
    """Elevation without its unit, which stands in the heading."""
    return elevation(level, system).partition(NO_BREAK)[0]


def _change(values: FloatArray, i: int) -> str:
    if i == 0 or values[0] == 0:
        return "–"
    return percent(float((values[i] - values[0]) / abs(values[0])))
