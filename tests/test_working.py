"""The worked steps: they add up to the engine's results, and the printed figures redo them."""

from __future__ import annotations

import math
from collections.abc import Callable, Iterator, Sequence

import numpy as np
import pytest

from loads.assessment import Assessed, AssessedWall, assess
from loads.faces import ArcFace
from loads.scenario_file import scenario_of
from loads.worked_step import Line, Step, Table
from loads.working import working
from tests.hand_calculation import calculator, number_of, redo, rounding
from tests.lines import documents
from webapp.display import System
from webapp.step_text import figure, in_working_unit, line_text, table_cells

DOCUMENTS = documents()
REFERENCE = 1e-9


def barriers(name: str) -> Iterator[tuple[Assessed, System]]:
    assessment = assess(scenario_of(DOCUMENTS[name]))
    for barrier in assessment.barriers:
        assert isinstance(barrier, Assessed), barrier.record.name
        yield barrier, assessment.scenario.units


def steps_with(barrier: Assessed, start: str) -> list[Step]:
    return [step for step in working(barrier) if step.title.startswith(start)]


def total(step: Step, column: int) -> float:
    assert step.table is not None
    return float(step.table.total[column])


@pytest.mark.parametrize("name", DOCUMENTS)
def test_slices_segments_and_prisms_add_up_to_the_resultant(name: str) -> None:
    for barrier, _ in barriers(name):
        if isinstance(barrier, AssessedWall):
            continue
        found = barrier.resultant
        normal, moment = float(found.total[0]), float(found.moment[0])
        scale = float(barrier.diagram.gross(barrier.face.bottom)[0]) * barrier.face.area
        if isinstance(barrier.face, ArcFace):
            horizontal = total(steps_with(barrier, "Horizontal part")[0], 4)
            vertical = total(steps_with(barrier, "Vertical part")[0], 9)
            assert horizontal == pytest.approx(float(found.horizontal[0]), rel=REFERENCE, abs=1e-12 * scale)
            assert vertical == pytest.approx(float(found.vertical[0]), rel=REFERENCE, abs=1e-12 * scale)
            continue
        (step,) = steps_with(barrier, "Slices") or steps_with(barrier, "Force and moment of each load")
        assert step.table is not None
        columns = len(step.table.headings)
        assert total(step, columns - 2) == pytest.approx(normal, rel=REFERENCE, abs=1e-12 * scale)
        reach = barrier.face.top - barrier.face.bottom
        assert total(step, columns - 1) == pytest.approx(moment, rel=REFERENCE, abs=1e-12 * scale * reach)


@pytest.mark.parametrize("name", DOCUMENTS)
def test_tables_of_forces_of_walls_add_up_to_the_resultant(name: str) -> None:
    for barrier, _ in barriers(name):
        if not isinstance(barrier, AssessedWall):
            continue
        (step,) = steps_with(barrier, "Force above") or steps_with(barrier, "Forces per unit length")
        assert step.table is not None
        horizontal = sum(
            float(row[-2 if barrier.record.shape == "I" else 2])
            for row in step.table.rows
            if barrier.record.shape == "I" or row[1] == "horizontal"
        )
        found = barrier.resultant
        last = len(step.table.headings) - 1
        assert horizontal == pytest.approx(float(found.horizontal[0]), rel=REFERENCE)
        assert total(step, last) == pytest.approx(float(found.moment[0]), rel=REFERENCE)


def redone(line: Line, system: System) -> tuple[float, float] | None:
    """How far a printed result is from the same worked out by hand, and how far rounding allows."""
    if len(line.values) < 2:
        return None
    texts = [figure(value, kind, system) for value, kind in line.values]
    expression = line_text(line, system).rsplit(" = ", 1)[0].rsplit(" = ", 1)[-1]
    position = 0
    for text in texts[:-1]:
        place = expression.index(text, position)
        expression = f"{expression[:place]}#{expression[place + len(text) :]}"
        position = place + 1
    figures = [number_of(text) for text in texts]
    errors = [
        rounding(number, in_working_unit(value, kind, system), kind)
        for number, (value, kind) in zip(figures, line.values, strict=True)
    ]
    found, tolerance = redo(calculator(expression, system), figures[:-1], errors[:-1])
    return abs(found - figures[-1]), tolerance + errors[-1]


@pytest.mark.parametrize("name", DOCUMENTS)
def test_every_substituted_line_is_redone_from_its_printed_figures(name: str) -> None:
    count = 0
    for barrier, system in barriers(name):
        for step in working(barrier):
            for line in step.lines:
                outcome = redone(line, system)
                if outcome is not None:
                    count += 1
                    difference, tolerance = outcome
                    text = line_text(line, system)
                    assert difference <= tolerance, f"{barrier.record.id}: {text}: {difference} > {tolerance}"
    assert count > 5


def test_a_wrong_figure_does_not_pass_the_hand_calculation() -> None:
    values = ((62.4 * 157.087, "unit weight"), (2.0, "elevation"), (0.5, "elevation"))
    right = 62.4 * 157.087 * 1.5
    line = Line(pattern="p = γ·(L − z₀) = {}·({} − {}) = {}", values=(*values, (right, "pressure")))
    wrong = Line(pattern=line.pattern, values=(*values, (right * 1.00002, "pressure")))
    good, bad = redone(line, "SI"), redone(wrong, "SI")
    assert good is not None
    assert bad is not None
    assert good[0] <= good[1]
    assert bad[0] > bad[1]


class Printed:
    """A table as printed: figures and rounding errors, cell by cell; a row of sums is the last."""

    def __init__(self, table: Table, system: System) -> None:
        self.cells = table_cells(table, system)
        self.rows = range(len(table.rows))
        exact = [*table.rows, *([table.total] if table.total else [])]
        columns = []
        for i, (_, kind) in enumerate(table.headings):
            numbers = [
                None if isinstance(row[i], str) else in_working_unit(float(row[i]), kind, system)
                for row in exact
            ]
            shared = [number for number in numbers if number is not None]
            columns.append(
                [
                    None if number is None else rounding(number_of(cells[i]), number, kind, shared)
                    for cells, number in zip(self.cells, numbers, strict=True)
                ]
            )
        self.errors = list(zip(*columns, strict=True))

    def figure(self, row: int, column: int) -> tuple[float, float]:
        error = self.errors[row][column]
        assert error is not None
        return number_of(self.cells[row][column]), error

    def check(self, row: int, inputs: Sequence[int], result: int, formula: Callable[..., float]) -> None:
        figures, errors = zip(*(self.figure(row, i) for i in inputs), strict=True)
        found, tolerance = redo(formula, figures, errors)
        printed, error = self.figure(row, result)
        difference = abs(found - printed)
        assert difference <= tolerance + error, f"{self.cells[row]}: {difference} > {tolerance + error}"

    def check_sum(self, column: int) -> None:
        parts = [self.figure(row, column) for row in self.rows]
        total, error = self.figure(len(self.rows), column)
        allowed = error + sum(part[1] for part in parts) + 1e-9 * abs(total)
        assert abs(sum(part[0] for part in parts) - total) <= allowed


def slice_force(*figures: float) -> float:
    s1, s2, p1, p2, b1, b2 = figures
    return (s2 - s1) / 6 * (p1 * b1 + 4 * (p1 + p2) / 2 * (b1 + b2) / 2 + p2 * b2)


def slice_moment(*figures: float) -> float:
    s1, s2, p1, p2, b1, b2 = figures
    middle = (p1 + p2) / 2 * (b1 + b2) / 2 * (s1 + s2) / 2
    return (s2 - s1) / 6 * (p1 * b1 * s1 + 4 * middle + p2 * b2 * s2)


@pytest.mark.parametrize("name", DOCUMENTS)
def test_printed_slices_redo_their_forces_and_moments(name: str) -> None:
    for barrier, system in barriers(name):
        for step in steps_with(barrier, "Slices"):
            assert step.table is not None
            printed = Printed(step.table, system)
            for row in printed.rows:
                printed.check(row, range(6), 6, slice_force)
                printed.check(row, range(6), 7, slice_moment)
            printed.check_sum(6)
            printed.check_sum(7)


@pytest.mark.parametrize("name", DOCUMENTS)
def test_printed_discs_redo_their_forces_and_moments(name: str) -> None:
    for barrier, system in barriers(name):
        for step in steps_with(barrier, "Force and moment of each load"):
            assert step.table is not None
            printed = Printed(step.table, system)
            for row in printed.rows:
                printed.check(row, (1, 2, 3, 4, 5), 7, lambda h, s, g, a, q: s * a + g * (h * a - q))
                printed.check(row, (1, 2, 3, 5, 6), 8, lambda h, s, g, q, i: s * q + g * (h * q - i))
            printed.check_sum(7)
            printed.check_sum(8)


@pytest.mark.parametrize("name", DOCUMENTS)
def test_printed_arcs_redo_their_parts(name: str) -> None:
    for barrier, system in barriers(name):
        if isinstance(barrier.face, ArcFace):
            check_projection(barrier, barrier.face, system)
            check_prism(barrier, barrier.face, system)


def check_projection(barrier: Assessed, face: ArcFace, system: System) -> None:
    width = in_working_unit(face.width, "length", system)
    printed = Printed(_table(steps_with(barrier, "Horizontal part")[0]), system)
    for row in printed.rows:
        printed.check(row, range(4), 4, lambda a, b, p, q: width * (b - a) * (p + q) / 2)
        printed.check(row, range(4), 5, lambda a, b, p, q: slice_moment(a, b, p, q, width, width))
    printed.check_sum(4)
    printed.check_sum(5)


def check_prism(barrier: Assessed, face: ArcFace, system: System) -> None:
    arc = face.shape
    b, r, x_c, z_c = (
        in_working_unit(value, "length", system)
        for value in (face.width, arc.radius, arc.centre_x, arc.centre_z)
    )
    sign = arc.bulge
    printed = Printed(_table(steps_with(barrier, "Vertical part")[0]), system)
    for row in printed.rows:
        printed.check(row, (1,), 4, lambda y: x_c + sign * math.sqrt(r**2 - (y - z_c) ** 2))
        printed.check(row, (1, 4), 5, math.hypot)
        printed.check(row, (5,), 6, lambda k: math.asin(k / 2 / r))
        printed.check(row, (6,), 7, lambda a: r**2 * (a - math.sin(a) * math.cos(a)))
        printed.check(row, (1, 4, 7), 8, lambda y, x, area: y * x / 2 + sign * area)
        printed.check(row, (2, 3, 4, 8), 9, lambda s, g, x, a: -b * (s * x + g * a))
    printed.check_sum(9)


def _table(step: Step) -> Table:
    assert step.table is not None
    return step.table


@pytest.mark.parametrize("name", DOCUMENTS)
def test_printed_soil_rows_and_corners_redo_their_pressures(name: str) -> None:
    for barrier, system in barriers(name):
        for step in working(barrier):
            if step.title.endswith("effective stress and pressure"):
                check_soil(_table(step), system)
            if step.title.startswith("Pressure at each corner"):
                check_corners(_table(step), system)
            if step.title.startswith("Fluid layers"):
                check_fluid_layers(step, system)


def check_soil(table: Table, system: System) -> None:
    printed = Printed(table, system)
    for row in printed.rows:
        printed.check(row, (1, 2, 3, 4), 5, lambda top, foot, g, v: v + g * (top - foot))
        for stress, result in ((4, 8), (5, 9)):
            printed.check(row, (stress, 6, 7), result, lambda v, k, c: max(k * v - c, 0.0))


def check_corners(table: Table, system: System) -> None:
    printed = Printed(table, system)
    loads = [i for i, (_, kind) in enumerate(table.headings) if kind == "pressure"]
    for row in printed.rows:
        if loads[:-1]:
            printed.check(row, loads[:-1], loads[-1], lambda *parts: sum(parts))


def check_fluid_layers(step: Step, system: System) -> None:
    water = in_working_unit(step.terms[0].value, "unit weight", system)
    printed = Printed(_table(step), system)
    for row in printed.rows:
        printed.check(row, (4, 5, 6), 7, lambda g, t, w: g * t - water * w)


def test_soil_presses_at_the_bottom_edge_as_the_engine_says() -> None:
    count = 0
    for name in DOCUMENTS:
        for barrier, _ in barriers(name):
            for side, sign in (("flood", 1), ("protected", -1)):
                for step in steps_with(barrier, f"Sediment on the {side} side: effective"):
                    load = [each for each in barrier.loads if each.name.endswith(f", {side} side")][-1]
                    pressure = load.diagram.pressure(np.array([barrier.face.bottom]))[0, 0]
                    foot = sign * float(_table(step).rows[-1][9])
                    assert foot == pytest.approx(pressure, rel=1e-9, abs=1e-9)
                    count += 1
    assert count > 20
