"""Worked steps of an arc: horizontal part on the projection, vertical part as the weight of a prism."""

from __future__ import annotations

import math

import numpy as np

from loads.assessment import Assessed
from loads.disc import between_chord_and_arc
from loads.faces import ArcFace
from loads.worked_step import Cell, Step, Table, column_sum, line, term
from loads.working_face import straight_pieces


def arc_steps(barrier: Assessed, face: ArcFace, index: int) -> list[Step]:
    """Steps of one state of a curved face."""
    projection = _projection(barrier, face, index)
    return [
        _centre(face),
        projection,
        _prism(barrier, face, index),
        _resultant(barrier, face, projection, index),
    ]


def _centre(face: ArcFace) -> Step:
    arc = face.shape
    chord, reach = arc.chord, math.sqrt(max(arc.radius**2 - arc.chord**2 / 4, 0.0))
    height, offset = (arc.height, "length"), (arc.offset, "length")
    sign_x, sign_z = ("−", "+") if arc.bulge > 0 else ("+", "−")
    half_chord = (chord, "length")
    lines = [
        line("c = √(h² + e²) = √({}² + {}²) = {}", height, (abs(arc.offset), "length"), half_chord),
        line("q = √(R² − c²/4) = √({}² − {}²/4) = {}", (arc.radius, "length"), half_chord, (reach, "length")),
        line(
            f"x_c = e/2 {sign_x} q·h/c = {{}}/2 {sign_x} {{}}·{{}}/{{}} = {{}}",
            offset,
            (reach, "length"),
            height,
            half_chord,
            (arc.centre_x, "length"),
        ),
        line(
            f"ζ_c = h/2 {sign_z} q·e/c = {{}}/2 {sign_z} {{}}·({{}})/{{}} = {{}}",
            height,
            (reach, "length"),
            offset,
            half_chord,
            (arc.centre_z, "length"),
        ),
    ]
    side = "flood" if arc.bulge > 0 else "protected"
    return Step(
        title="Centre of the arc",
        formula=f"from the bottom edge: x_c toward the protected side, ζ_c up; centre on the {side} side",
        terms=(
            term("h", "height from edge to edge", arc.height, "length"),
            term("e", "offset of the top edge toward the protected side", arc.offset, "length"),
            term("R", "radius", arc.radius, "length"),
            term("b", "width", face.width, "length"),
        ),
        lines=tuple(lines),
    )


def _projection(barrier: Assessed, face: ArcFace, index: int) -> Step:
    rows: list[tuple[Cell, ...]] = []
    for low, high, p_low, p_high in straight_pieces(barrier, [], index):
        reach, foot = high - low, low - face.bottom
        force = reach * (p_low + p_high) / 2 * face.width
        middle = (p_low + p_high) / 2 * (2 * foot + reach) / 2
        moment = reach / 6 * face.width * (p_low * foot + 4 * middle + p_high * (foot + reach))
        rows.append((foot, foot + reach, p_low, p_high, force, moment))
    rows.reverse()
    headings = (
        ("η₁, lower end", "length"),
        ("η₂, upper end", "length"),
        ("p₁ at η₁", "pressure"),
        ("p₂ at η₂", "pressure"),
        ("force ΔH", "force"),
        ("moment ΔT", "moment"),
    )
    return Step(
        title="Horizontal part, on the vertical projection",
        formula=(
            "η = z − z₀; ΔH = b·(η₂ − η₁)·(p₁ + p₂)/2; ΔT = b·(η₂ − η₁)/6·(p₁η₁ + 4·pₘηₘ + p₂η₂), "
            "m the middle; ΔT serves the line of action only"
        ),
        table=Table(
            headings=headings,
            rows=tuple(rows),
            total=("sum", "", "", "", column_sum(rows, 4), column_sum(rows, 5)),
        ),
    )


def _prism(barrier: Assessed, face: ArcFace, index: int) -> Step:
    arc = face.shape
    rows: list[tuple[Cell, ...]] = []
    for load in barrier.loads:
        cut = load.diagram.take(index).below(face.top)
        for k in range(cut.knot.shape[1]):
            step, slope = float(cut.step[0, k]), float(cut.slope[0, k])
            height = float(np.clip(cut.knot[0, k] - face.bottom, 0.0, arc.height))
            if (step == 0 and slope == 0) or height == 0:
                continue
            run = arc.x_at(height)
            chord = math.hypot(height, run)
            half_angle = math.asin(min(1.0, chord / (2 * arc.radius)))
            segment = arc.radius**2 * float(between_chord_and_arc(np.array([half_angle]))[0])
            area = height * run / 2 + arc.bulge * segment
            force = -face.width * (step * run + slope * area)
            rows.append((load.name, height, step, slope, run, chord, half_angle, segment, area, force))
    headings = (
        ("load", "text"),
        ("sets in at η", "length"),
        ("step s", "pressure"),
        ("ramp g", "unit weight"),
        ("x at η", "length"),
        ("chord k", "length"),
        ("α, rad", "ratio"),
        ("segment", "area"),
        ("prism a", "area"),
        ("vertical ΔV", "force"),
    )
    sign = "+" if arc.bulge > 0 else "−"
    total = ("sum", "", "", "", "", "", "", "", "", column_sum(rows, 9))
    return Step(
        title="Vertical part, the weight of the real or imaginary fluid above the arc",
        formula=(
            f"η = z − z₀, at most h; x = x_c {sign} √[R² − (η − ζ_c)²]; chord k = √(η² + x²); "
            "α = arcsin[k/(2R)] in radians; segment of chord and arc R²·(α − sin α·cos α); prism between "
            f"the arc and the vertical through the bottom edge a = η·x/2 {sign} segment; ΔV = −b·(s·x + g·a)"
        ),
        table=Table(headings=headings, rows=tuple(rows), total=total),
    )


def _resultant(barrier: Assessed, face: ArcFace, projection: Step, index: int) -> Step:
    found, arc = barrier.resultant, face.shape
    horizontal, vertical, moment, total, height = (
        float(values[index])
        for values in (found.horizontal, found.vertical, found.moment, found.total, found.line_of_action)
    )
    H, V, M = (horizontal, "force"), (vertical, "force"), (moment, "moment")
    centre = ((arc.centre_z, "length"), (arc.centre_x, "length"))
    sides = ((abs(horizontal), "force"), (abs(vertical), "force"))
    lines = [
        line("M = H·ζ_c − V·x_c = {}·({}) − ({})·({}) = {}", H, centre[0], V, centre[1], M),
        line("F = √(H² + V²) = √({}² + {}²) = {}", *sides, (abs(total), "force")),
    ]
    results = [
        term("H", "horizontal force, toward the protected side", *H),
        term("V", "vertical force, up", *V),
        term("F", "total force, with the sign of H", total, "force"),
        term("M", "moment about the bottom edge", *M),
    ]
    if not math.isnan(height):
        assert projection.table is not None
        turn = (float(projection.table.total[5]), "moment")
        z = (height, "elevation")
        lines.append(line("z_F = z₀ + ΣΔT/H = {} + {}/{} = {}", (face.bottom, "elevation"), turn, H, z))
        results.append(term("z_F", "line of action of H", *z))
    return Step(
        title="Force and moment",
        formula="H = ΣΔH, V = ΣΔV; every pressure points through the centre, so H and V act there",
        lines=tuple(lines),
        results=tuple(results),
    )
