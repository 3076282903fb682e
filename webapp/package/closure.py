"""What the package says of a closure besides what it says of every barrier: logs, posts, water, losses."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from loads.assessment import AssessedClosure
from loads.closure.whatif import WhatIf, what_ifs
from loads.part import Part
from webapp.check_groups import PartRatios, check_groups, limits_reached
from webapp.display import System, elevation
from webapp.package.grid import Grid, Heading, words
from webapp.package.states import State
from webapp.package.tables import RESULT_DIGITS, bare, check_cells, ratio_text
from webapp.part_words import bay_groups, numbered, parts_text
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
_POST_FIGURES = (
    ("base_shear", "shear at the base", "force"),
    ("base_moment", "moment at the base", "moment"),
    ("brace_moment", "moment at the brace", "moment"),
    ("brace_force", "force along the brace", "force"),
    ("anchor_tension", "tension of all bolts pulled", "force"),
    ("bolt_tension", "tension of the bolt pulled most", "force"),
    ("bolt_shear", "shear of each bolt", "force"),
    ("contact_pressure", "pressure under the plate", "stress"),
    ("bending_stress", "bending stress", "stress"),
    ("shear_stress", "shear stress", "stress"),
)


@dataclass(frozen=True, kw_only=True)
class Titled:
    """A table with its title."""

    title: str
    grid: Grid


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
        logs=_logs(barrier, system, datum),
        posts=_posts(barrier, system),
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


def _logs(barrier: AssessedClosure, system: System, datum: str) -> tuple[Titled, ...]:
    """Logs of the first bay of every kind."""
    layout = barrier.structure.layout
    kinds = list(zip(layout.clear, layout.counts, strict=True))
    by_name = {part.id: part for part in barrier.parts}
    tables = []
    for bays in bay_groups(kinds):
        bay = bays[0] - 1
        logs = [by_name[f"bay {bays[0]} log {row}"] for row in range(1, layout.counts[bay] + 1)]
        name = numbered("bay", bays)
        title = (
            f"Logs of {name}{', each' if len(bays) > 1 else ''}: span L = "
            f"{with_unit(float(layout.spans[bay]), 'length', system)}, {len(logs)} of "
            f"{barrier.record.on_hand[bay]} in place, top {elevation(float(layout.tops[bay]), system, datum)}"
        )
        if logs:
            tables.append(Titled(title=title, grid=_log_grid(barrier, logs, system, datum)))
        else:
            tables.append(Titled(title=f"{title}: open", grid=Grid(headings=(words("log"),), rows=())))
    return tuple(tables)


def _log_grid(barrier: AssessedClosure, logs: Sequence[Part], system: System, datum: str) -> Grid:
    ratios = PartRatios(barrier)
    columns = [
        ("w", "line load", [float(log.line_load[0]) for log in logs]),
        ("M", "moment", [float(log.moment[0]) for log in logs]),
        ("R", "force", [float(log.reaction[0]) for log in logs]),
        ("bearing", "stress", [_more(log, "bearing_pressure") for log in logs]),
        ("bending", "stress", [_more(log, "bending_stress") for log in logs]),
        ("shear", "stress", [_more(log, "shear_stress") for log in logs]),
        ("deflection", "deflection", [float(log.deflection[0]) for log in logs]),
    ]
    known = [column for column in columns if not all(math.isnan(value) for value in column[2])]
    level = f"{unit_of('elevation', system)} {datum}"
    headings = (
        Heading(text="log"),
        Heading(text="bottom", unit=level),
        Heading(text="top", unit=level),
        *(Heading(text=text, unit=unit_of(kind, system)) for text, kind, _ in known),
        Heading(text="largest ratio"),
        words("verdict"),
    )
    cells = [show_column(values, kind, system, RESULT_DIGITS) for _, kind, values in known]
    rows = tuple(
        (
            log.id.rsplit(" ", 1)[1],
            bare(log.bottom, system),
            bare(log.top, system),
            *(column[place] for column in cells),
            ratio_text(ratios.ratio(log.id, 0), "part"),
            barrier.verdict_of(log.id),
        )
        for place, log in enumerate(logs)
    )
    return Grid(headings=headings, rows=rows)


def _posts(barrier: AssessedClosure, system: System) -> Grid:
    """Posts and guides, those alike in one column, figures in rows."""
    ratios = PartRatios(barrier)
    pieces = {upright.name: upright.pieces for upright in barrier.structure.layout.posts}
    uprights = [part for part in barrier.parts if part.kind != "log"]
    keys = [pieces.get(part.id, (part.kind, part.top, float(part.reaction[0]))) for part in uprights]
    groups = [[uprights[number - 1] for number in numbers] for numbers in bay_groups(keys)]
    firsts = [group[0] for group in groups]
    figures = [
        ("whole load", "force", [float(part.reaction[0]) for part in firsts]),
        ("greatest moment", "moment", [float(part.moment[0]) for part in firsts]),
        ("greatest shear", "force", [float(part.shear[0]) for part in firsts]),
        *((text, kind, [_more(part, name) for part in firsts]) for name, text, kind in _POST_FIGURES),
        ("greatest deflection", "deflection", [float(part.deflection[0]) for part in firsts]),
    ]
    rows = [
        (text, *(with_unit(value, kind, system, RESULT_DIGITS) for value in values))
        for text, kind, values in figures
        if not all(math.isnan(value) for value in values)
    ]
    rows.append(("largest ratio", *(ratio_text(ratios.ratio(part.id, 0), "part") for part in firsts)))
    rows.append(("verdict", *(barrier.verdict_of(part.id) for part in firsts)))
    names = (Heading(text=parts_text(part.id for part in group)) for group in groups)
    return Grid(headings=(words("figure"), *names), rows=tuple(rows))


def _more(part: Part, name: str) -> float:
    return next((float(figure.value[0]) for figure in part.more if figure.name == name), math.nan)


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
