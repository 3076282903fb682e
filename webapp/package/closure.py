"""What the package says of a closure besides what it says of every barrier: logs, posts, water, losses."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from loads.assessment import AssessedClosure
from loads.closure.whatif import WhatIf, what_ifs
from webapp.check_groups import check_groups, limits_reached
from webapp.display import System, elevation
from webapp.package.closure_parts import Titled, log_grids, post_grid
from webapp.package.grid import Grid, Heading, words
from webapp.package.states import State
from webapp.package.tables import RESULT_DIGITS, bare, check_cells
from webapp.step_text import show_column, unit_of, with_unit

MOST_LIMITS = 30
"""Limits listed in the order in which rising water reaches them, one for each check of each kind of part."""
CLOSURE_ASSUMPTIONS = (
    "A log is a simple beam from middle to middle of its bearings, under the load on its own height alone.",
    "A post takes half of the logs on either side and the water on its own strip; its foot is at the sill.",
    "A post without a brace is a cantilever from its base plate; a brace is stiff and can push and pull.",
    "Logs lie close on one another; seals, clamps and friction in the guides help no log to bear.",
)
"""What the figures of a closure rest on, besides what those of every barrier do."""


@dataclass(frozen=True, kw_only=True)
class Loss:
    """One part lost: what is assumed, and the checks of what stands beside it."""

    title: str
    words: str
    verdict: str
    grid: Grid | None


@dataclass(frozen=True, kw_only=True)
class ClosureView:
    """Tables of a closure."""

    basis: str
    logs: tuple[Titled, ...]
    posts: Grid
    limits: Grid | None
    needed: Grid
    needed_words: str
    water: Grid
    water_words: str
    losses: tuple[Loss, ...]
    parts_recheck: str


def closure_view(
    barrier: AssessedClosure, many: AssessedClosure, states: Sequence[State], system: System, datum: str
) -> ClosureView:
    """Text of what only closures have.

    Parameters
    ----------
    barrier
        As entered, one state.
    many
        The same in all of `states`.
    states
        The entered levels first.
    system, datum
        Units, and datum of the elevations.
    """
    names = [state.name for state in states]
    return ClosureView(
        basis=barrier.basis.words,
        logs=log_grids(barrier, system, datum),
        posts=post_grid(barrier, system),
        limits=_limits(barrier, system, datum),
        needed=_needed(many, names, system, datum),
        needed_words=_needed_words(barrier, system),
        water=_water(many, names, system),
        water_words=_water_words(barrier, system, datum),
        losses=tuple(_loss(one, system, datum) for one in what_ifs(barrier)),
        parts_recheck=_recheck_words(barrier),
    )


def closure_checks(barrier: AssessedClosure, system: System, datum: str) -> Grid:
    """Most pressing check of each kind of part; parts that carry less are counted."""
    headings = tuple(
        Heading(text=text, words=text not in ("demand", "limit", "ratio"))
        for text in (
            "part and check",
            "demand",
            "limit",
            "ratio",
            "verdict",
            "source of the limit",
            "remarks",
        )
    )
    rows = []
    for group in check_groups(barrier):
        name, *cells = check_cells(group.check, system, datum)
        part = "" if group.check.subject.startswith("closure") else f"{group.parts}: "
        more = f" (and {group.others} more, each with a smaller ratio)" if group.others else ""
        rows.append((f"{part}{name}{more}", *cells))
    return Grid(headings=headings, rows=tuple(rows))


def _limits(barrier: AssessedClosure, system: System, datum: str) -> Grid | None:
    """Limits in the order in which rising water reaches them."""
    reached = limits_reached(barrier, MOST_LIMITS)
    if not reached:
        return None
    level = f"{unit_of('elevation', system)} {datum}"
    rows = []
    for one in reached:
        assert one.first.level is not None
        subject = "closure" if one.first.subject.startswith("closure") else one.parts
        rows.append((bare(one.first.level, system), one.first.check, subject))
    return Grid(headings=(Heading(text="level", unit=level), words("check"), words("part")), rows=tuple(rows))


def _needed(many: AssessedClosure, names: Sequence[str], system: System, datum: str) -> Grid:
    """Logs that every state asks for."""
    needed = many.hydraulics.needed
    level = f"{unit_of('elevation', system)} {datum}"
    headings = (
        words("state"),
        Heading(text="water and allowance", unit=level),
        Heading(text="top asked for", unit=level),
        Heading(text="logs in each bay"),
        Heading(text="their top", unit=level),
        Heading(text="not on hand"),
        words("would pass"),
    )
    rows = tuple(
        (
            name,
            bare(float(needed.water[i]), system),
            bare(float(needed.wanted_top[i]), system),
            str(int(needed.count[i].max())),
            bare(float(needed.top[i].max()), system),
            str(int(needed.short[i].sum())),
            ", ".join(f"{c.name} {elevation(c.level, system)}" for c in needed.stopped_by(i)) or "–",
        )
        for i, name in enumerate(names)
    )
    return Grid(headings=headings, rows=rows)


def _needed_words(barrier: AssessedClosure, system: System) -> str:
    closure = barrier.record
    told = [
        f"{name} {with_unit(value.value, 'length', system)}" if value else f"no {name} entered, taken as nil"
        for name, value in (("allowance", closure.allowance), ("freeboard", closure.limits.freeboard))
    ]
    height = with_unit(closure.log.height.value, "length", system)
    return (
        f"n = ⌈(level + allowance + freeboard − sill)/height of a log⌉; {told[0]}, {told[1]}, height of a "
        f"log {height}."
    )


def _water(many: AssessedClosure, names: Sequence[str], system: System) -> Grid:
    """Water over and through the closure in every state."""
    found, unit = many.hydraulics, unit_of("flow", system)
    through = {name: flow for name, flow in found.inflow.parts.items() if name != "over the logs"}
    headings = (
        words("state"),
        Heading(text="over the logs, least", unit=unit),
        Heading(text="most", unit=unit),
        *(Heading(text=name, unit=unit) for name in through),
    )
    flows = [found.overflow.total_low, found.overflow.total_high, *through.values()]
    columns = [show_column([float(v) for v in flow], "flow", system, RESULT_DIGITS) for flow in flows]
    rows = tuple((name, *(column[i] for column in columns)) for i, name in enumerate(names))
    return Grid(headings=headings, rows=rows)


def _water_words(barrier: AssessedClosure, system: System, datum: str) -> str:
    over = barrier.hydraulics.overflow
    told = f"Water goes over the logs in place from {elevation(over.level, system, datum)} up."
    formulas = over.formulas(0)
    if formulas:
        told += f" At the levels entered by {', '.join(formulas)}; least and most are their spread."
    return told


def _loss(one: WhatIf, system: System, datum: str) -> Loss:
    headings = tuple(
        Heading(text=text, words=text not in ("demand", "limit", "ratio"))
        for text in ("part and check", "demand", "limit", "ratio", "verdict")
    )
    seen: dict[str, tuple[str, ...]] = {}
    for check in one.checks:
        name, *cells = check_cells(check, system, datum)
        seen.setdefault(name, (f"{check.subject}: {name}", *cells[:4]))
    return Loss(
        title=f"{one.name}: {one.part}",
        words=one.words,
        verdict=one.verdict(),
        grid=Grid(headings=headings, rows=tuple(seen.values())) if seen else None,
    )


def _recheck_words(barrier: AssessedClosure) -> str:
    apart = barrier.parts_recheck.difference
    count = len(barrier.demands.log_names) + len(barrier.demands.post_names)
    largest = "nil" if apart == 0 else f"{apart:.1g}"
    return (
        f"Reaction and moment of each of the {count} logs and posts were computed a second time, the loads "
        f"by quadrature and the posts by the work of a unit force; largest relative difference {largest}."
    )
