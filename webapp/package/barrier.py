"""What the package says of one barrier, as text."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from loads.assessment import Assessed, AssessedClosure, AssessedWall, Assessment, Barrier, Withheld
from loads.recheck import FITTED_TOLERANCE, STRAIGHT_TOLERANCE
from loads.records.closure import Closure
from loads.records.i_wall import IWall
from loads.records.wall import Wall
from loads.wall.recheck import TOLERANCE as WALL_TOLERANCE
from loads.worked_step import Step, Term
from loads.working import working
from webapp.display import PRINT_DIGITS, System, barrier_title, elevation, load_kind
from webapp.package.closure import ClosureView, closure_checks, closure_view
from webapp.package.drawings import Drawing, section_drawing
from webapp.package.grid import Grid, Heading, grid_of, words
from webapp.package.states import State
from webapp.package.tables import RESULT_DIGITS, checks_grid, level_rows, states_grid
from webapp.package.wall import wall_facts
from webapp.step_text import figure, line_text, tiny, unit_of, with_unit

DISAGREEMENT_DIGITS = 10
"""Significant figures of two results that disagree; a difference that counts is then seen."""
_NIL = 1e-9


@dataclass(frozen=True, kw_only=True)
class TermView:
    """One number of a step as text."""

    symbol: str
    meaning: str
    figure: str


@dataclass(frozen=True, kw_only=True)
class StepView:
    """A worked step as text."""

    title: str
    formula: str
    terms: tuple[TermView, ...]
    lines: tuple[tuple[str, str], ...]
    grid: Grid | None
    results: tuple[TermView, ...]


@dataclass(frozen=True, kw_only=True)
class BarrierView:
    """Everything of a barrier whose two computations agree."""

    id: str
    kind: str
    title: str
    verdict: str
    note: str
    facts: tuple[tuple[str, str], ...]
    drawing: Drawing
    remarks: tuple[str, ...]
    checks: Grid
    levels: tuple[tuple[str, str, str], ...]
    states: Grid
    loads: Grid
    steps: tuple[StepView, ...]
    second: Grid
    tolerance: str
    closure: ClosureView | None


@dataclass(frozen=True, kw_only=True)
class WithheldView:
    """A withheld barrier: the word and the two figures that disagree."""

    id: str
    kind: str
    title: str
    verdict: str
    note: str
    drawing: Drawing
    words: str
    second: Grid


def withheld_view(barrier: Withheld, system: System, datum: str) -> WithheldView:
    """Text of a withheld barrier."""
    foot = foot_of(barrier)
    force, moment = (load_kind(barrier.record.kind, kind) for kind in ("force", "moment"))
    names = (("horizontal force H", force), (f"moment about the {foot} M", moment))
    if barrier.subject:
        names = ((f"{barrier.subject}, force", "force"), (f"{barrier.subject}, moment", "moment"))
    rows = tuple(
        _pair(name, kind, both, system, DISAGREEMENT_DIGITS)
        for (name, kind), both in zip(names, zip(barrier.first, barrier.second, strict=True), strict=True)
    )
    return WithheldView(
        id=barrier.record.id,
        kind=barrier.record.kind,
        title=barrier_title(barrier.record.id, barrier.record.name),
        verdict=barrier.verdict(),
        note=barrier.record.note,
        drawing=section_drawing(barrier, system, datum),
        words=f"{barrier.subject or barrier.record.kind}",
        second=Grid(headings=_second_headings(), rows=rows),
    )


def barrier_view(barrier: Assessed, many: Assessment, states: list[State], datum: str) -> BarrierView:
    """Text of a barrier.

    Parameters
    ----------
    barrier
        As entered, one state.
    many
        The same line in all of `states`.
    states
        The entered levels first.
    datum
        Of every elevation.
    """
    system = many.scenario.units
    record = barrier.record
    closure = None
    if isinstance(barrier, AssessedClosure):
        in_all = many.barrier(record.id)
        assert isinstance(in_all, AssessedClosure)
        closure = closure_view(barrier, in_all, states, system, datum)
        checks = closure_checks(barrier, system, datum)
    else:
        checks = checks_grid(barrier, system, datum)
    return BarrierView(
        id=record.id,
        kind=record.kind,
        title=barrier_title(record.id, record.name),
        verdict=barrier.verdict(),
        note=record.note,
        facts=wall_facts(barrier, system, datum)
        if isinstance(barrier, AssessedWall)
        else _facts(barrier, system, datum),
        drawing=section_drawing(barrier, system, datum),
        remarks=barrier.remarks,
        checks=checks,
        levels=level_rows(barrier, system, datum),
        states=states_grid(many, record.id, states, system, datum),
        loads=_by_load(barrier, system),
        steps=tuple(step_view(step, system, datum) for step in working(barrier)),
        second=_second(barrier, system),
        tolerance=tiny(_tolerance(barrier)),
        closure=closure,
    )


def _tolerance(barrier: Assessed) -> float:
    if isinstance(barrier, AssessedWall):
        return WALL_TOLERANCE
    return FITTED_TOLERANCE if fitted(barrier) else STRAIGHT_TOLERANCE


def fitted(barrier: Assessed) -> bool:
    """Whether the second computation of a face is one of a fitted shape."""
    return barrier.setting.panel.shape in ("circle", "arc")


def foot_of(barrier: Barrier) -> str:
    """What moments of a barrier are about."""
    record = barrier.record
    if isinstance(record, IWall):
        return "protected-side ground"
    if isinstance(record, Wall):
        return "toe"
    return "sill" if isinstance(record, Closure) else "bottom edge"


def _facts(barrier: Assessed, system: System, datum: str) -> tuple[tuple[str, str], ...]:
    found = barrier.resultant
    height = float(found.line_of_action[0])
    line = "none, the force is nil" if math.isnan(height) else elevation(height, system, datum)
    shown = (
        ("Horizontal force H, toward the protected side", float(found.horizontal[0]), "force"),
        ("Vertical force V, up", float(found.vertical[0]), "force"),
        ("Total force on the face", float(found.total[0]), "force"),
        (f"Moment M about the {foot_of(barrier)}", float(found.moment[0]), "moment"),
    )
    scale = _scale(barrier)
    return (
        *(
            (name, with_unit(_clean(value, scale), kind, system, RESULT_DIGITS))
            for name, value, kind in shown
        ),
        ("Line of action of H", line),
    )


def _scale(barrier: Assessed) -> float:
    return float(np.abs(barrier.resultant.total[0]) + np.abs(barrier.resultant.moment[0]))


def _clean(value: float, scale: float) -> float:
    """Nil where a value is rounding beside the barrier's own forces."""
    return 0.0 if abs(value) < _NIL * scale else value


def _by_load(barrier: Assessed, system: System) -> Grid:
    force, moment = (load_kind(barrier.record.kind, kind) for kind in ("force", "moment"))
    headings = (
        words("load"),
        Heading(text="H", unit=unit_of(force, system)),
        Heading(text="V", unit=unit_of(force, system)),
        Heading(text="M", unit=unit_of(moment, system)),
    )
    scale = _scale(barrier)
    parts = [*barrier.by_load.items(), ("all together", barrier.resultant)]
    rows = tuple(
        (
            name,
            figure(_clean(float(part.horizontal[0]), scale), force, system, RESULT_DIGITS),
            figure(_clean(float(part.vertical[0]), scale), force, system, RESULT_DIGITS),
            figure(_clean(float(part.moment[0]), scale), moment, system, RESULT_DIGITS),
        )
        for name, part in parts
    )
    return Grid(headings=headings, rows=rows, summed=True)


def _second_headings() -> tuple[Heading, ...]:
    return (
        words("quantity"),
        Heading(text="first computation"),
        Heading(text="second computation"),
        Heading(text="relative difference"),
    )


def _second(barrier: Assessed, system: System) -> Grid:
    first, second, scale = barrier.resultant, barrier.recheck, _scale(barrier)
    force, moment = (load_kind(barrier.record.kind, kind) for kind in ("force", "moment"))
    quantities = (
        ("horizontal force H", force, first.horizontal, second.horizontal),
        ("vertical force V", force, first.vertical, second.vertical),
        (f"moment about the {foot_of(barrier)} M", moment, first.moment, second.moment),
    )
    rows = tuple(
        _pair(name, kind, (_clean(float(one[0]), scale), _clean(float(other[0]), scale)), system)
        for name, kind, one, other in quantities
    )
    return Grid(headings=_second_headings(), rows=rows)


def _pair(
    name: str, kind: str, both: tuple[float, float], system: System, digits: int = PRINT_DIGITS
) -> tuple[str, ...]:
    first, second = both
    larger = max(abs(first), abs(second))
    apart = abs(first - second) / larger if larger else 0.0
    return (name, *(with_unit(value, kind, system, digits) for value in both), tiny(apart))


def step_view(step: Step, system: System, datum: str) -> StepView:
    """Text of a worked step."""
    return StepView(
        title=step.title,
        formula=step.formula,
        terms=tuple(_term(term, system, datum) for term in step.terms),
        lines=tuple((line.label, line_text(line, system)) for line in step.lines),
        grid=grid_of(step.table, system, datum) if step.table and step.table.rows else None,
        results=tuple(_term(term, system, datum) for term in step.results),
    )


def _term(term: Term, system: System, datum: str) -> TermView:
    text = with_unit(term.value, term.kind, system)
    if term.kind == "elevation" and text != "dry":
        text = f"{text} {datum}"
    return TermView(symbol=term.symbol, meaning=term.meaning, figure=text)
