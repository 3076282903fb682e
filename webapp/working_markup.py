"""HTML of worked steps: formula, substituted lines, tables, results, as a reviewer follows them."""

from __future__ import annotations

from collections.abc import Sequence

from loads.worked_step import Step, Table, Term
from webapp.display import System
from webapp.markup import escaped, subheading, table
from webapp.step_text import line_text, table_cells, unit_of, with_unit


def worked_steps(steps: Sequence[Step], system: System) -> str:
    """Worked steps with numbers, each under its number and title."""
    return "".join(_step(number, step, system) for number, step in enumerate(steps, 1))


def _step(number: int, step: Step, system: System) -> str:
    parts = [subheading(f"{number} {step.title}", small=True), f"<div>{escaped(step.formula)}</div>"]
    if step.terms:
        parts.append(_terms(step.terms, system))
    for line in step.lines:
        label = f"{line.label}: " if line.label else ""
        parts.append(f'<div class="sh-line">{escaped(label + line_text(line, system))}</div>')
    if step.table:
        parts.append(_table(step.table, system))
    if step.results:
        parts.append(_terms(step.results, system))
    return "".join(parts)


def _terms(terms: Sequence[Term], system: System) -> str:
    rows = [
        [escaped(term.symbol), escaped(term.meaning), escaped(with_unit(term.value, term.kind, system))]
        for term in terms
    ]
    return table(("symbol", "what", "value"), rows, numeric={2})


def _table(given: Table, system: System) -> str:
    headings = [
        escaped(f"{text}, {unit_of(kind, system)}" if unit_of(kind, system) else text)
        for text, kind in given.headings
    ]
    rows = [[escaped(cell) for cell in cells] for cells in table_cells(given, system)]
    numeric = {i for i, (_, kind) in enumerate(given.headings) if kind != "text"}
    return table(headings, rows, numeric=numeric, total=bool(given.total))
