"""Worked steps of one barrier in one state: formulas with numbers, as a reviewer follows them by hand.

The slices and terms here add up to the resultant by a third route; a test holds them together.
"""

from __future__ import annotations

import math

from loads.assessment import Assessed, AssessedClosure, AssessedWall
from loads.checks import Check
from loads.closure.working import closure_steps
from loads.faces import ArcFace, CircleFace, StripFace
from loads.load import SIDES
from loads.wall.i_wall_result import IWallResult
from loads.wall.i_wall_working import i_wall_working
from loads.wall.wall_working import wall_working
from loads.worked_step import Line, Step, Table, Term, line, term
from loads.working_arc import arc_steps
from loads.working_face import pressure_at, segments, slices
from loads.working_soil import soil_steps

__all__ = ["Line", "Step", "Table", "Term", "working"]


def working(barrier: Assessed, index: int = 0) -> tuple[Step, ...]:
    """Worked steps of one state.

    Parameters
    ----------
    barrier
        An assessed barrier.
    index
        Which state.

    Returns
    -------
    tuple of Step
        Heads, sediment, pressures, slices or segments, resultant, ratios to the limits entered.
    """
    if isinstance(barrier, AssessedWall):
        found = barrier.found
        if isinstance(found, IWallResult):
            return i_wall_working(found, index)
        return wall_working(found, index)
    face = barrier.face
    steps = [_heads(barrier, index), *soil_steps(barrier, index), _pressures(barrier, index)]
    if isinstance(face, StripFace):
        steps += [slices(barrier, face, index), _resultant(barrier, face, index)]
    elif isinstance(face, CircleFace):
        steps += [*segments(barrier, face, index), _resultant(barrier, face, index)]
    else:
        steps += arc_steps(barrier, face, index)
    if isinstance(barrier, AssessedClosure):
        steps += closure_steps(barrier, index)
    ratios = _ratios(barrier, index)
    return (*steps, ratios) if ratios.lines else tuple(steps)


def _heads(barrier: Assessed, index: int) -> Step:
    face = barrier.face
    terms = [
        term("z₀", "bottom edge", face.bottom, "elevation"),
        term("z₁", "top edge", face.top, "elevation"),
    ]
    lines, results = [], []
    if not isinstance(face, ArcFace) and abs(face.tilt - math.pi / 2) > 1e-12:
        terms += [
            term("ℓ", "height along the face", face.length, "length"),
            term("θ", "tilt, from the protected-side horizontal to the face", face.tilt, "angle"),
        ]
        lines.append(_top_line(face))
    for side, mark in zip(SIDES, ("f", "p"), strict=True):
        level = float(barrier.levels.of(side)[index])
        weight = barrier.setting.fluids[side].unit_weight
        terms.append(term(f"L_{mark}", f"{side}-side level", level, "elevation"))
        terms.append(term(f"γ_{mark}", f"{side}-side water, unit weight", weight, "unit weight"))
        head = max(level - face.bottom, 0.0)
        if head > 0:
            lines.append(
                line(
                    f"h_{mark} = L_{mark} − z₀ = {{}} − {{}} = {{}}",
                    (level, "elevation"),
                    (face.bottom, "elevation"),
                    (head, "length"),
                )
            )
        results.append(term(f"h_{mark}", f"head on the bottom edge, {side} side", head, "length"))
    formula = "h = L − z₀; nil where the level is below the bottom edge or the side is dry"
    return Step(
        title="Heads", formula=formula, terms=tuple(terms), lines=tuple(lines), results=tuple(results)
    )


def _top_line(face: StripFace | CircleFace) -> Line:
    return line(
        "z₁ = z₀ + ℓ·sin θ = {} + {}·sin {} = {}",
        (face.bottom, "elevation"),
        (face.length, "length"),
        (face.tilt, "angle"),
        (face.top, "elevation"),
    )


def _pressures(barrier: Assessed, index: int) -> Step:
    corners = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    singles = [(load.name, load.diagram.take(index)) for load in barrier.loads]
    acting = [
        (name, single)
        for name, single in singles
        if any(
            abs(pressure_at(single, z, under=_is_under(corners, i))) > 0 for i, (z, _) in enumerate(corners)
        )
    ]
    jumps = len({z for z, _ in corners}) < len(corners)
    rows = []
    for i, (z, net) in reversed(list(enumerate(corners))):
        under = _is_under(corners, i)
        words = (_which_row(corners, i),) if jumps else ()
        rows.append((z, *words, *(pressure_at(single, z, under=under) for _, single in acting), net))
    headings = (
        ("elevation z", "elevation"),
        *((("at a jump", "text"),) if jumps else ()),
        *((name, "pressure") for name, _ in acting),
        ("net pressure p", "pressure"),
    )
    return Step(
        title="Pressure at each corner of the diagram",
        formula="p = Σ of the loads, positive toward the protected side; water ±γ·(L − z)",
        lines=tuple(_water_lines(barrier, index)),
        table=Table(headings=headings, rows=tuple(rows)),
        results=(term("p_max", "net pressure of greatest magnitude", _peak(corners), "pressure"),),
    )


def _peak(corners: list[tuple[float, float]]) -> float:
    return max((p for _, p in corners), key=lambda p: (abs(p), p))


def _which_row(corners: list[tuple[float, float]], i: int) -> str:
    if i > 0 and corners[i - 1][0] == corners[i][0]:
        return "above it"
    return "below it" if i + 1 < len(corners) and corners[i + 1][0] == corners[i][0] else ""


def _water_lines(barrier: Assessed, index: int) -> list[Line]:
    bottom = barrier.face.bottom
    lines = []
    for side, sign, mark in zip(SIDES, ("", "−"), ("f", "p"), strict=True):
        level = float(barrier.levels.of(side)[index])
        weight = barrier.setting.fluids[side].unit_weight
        if level > bottom:
            push = weight * (level - bottom) * (-1 if sign else 1)
            lines.append(
                line(
                    f"p = {sign}γ_{mark}·(L_{mark} − z₀) = {sign}{{}}·({{}} − {{}}) = {{}}",
                    (weight, "unit weight"),
                    (level, "elevation"),
                    (bottom, "elevation"),
                    (push, "pressure"),
                    label=f"water, {side} side, at the bottom edge",
                )
            )
    return lines


def _is_under(corners: list[tuple[float, float]], i: int) -> bool:
    """Tell whether a corner ends the piece below it."""
    return i > 0 and corners[i][0] > corners[i - 1][0]


def _resultant(barrier: Assessed, face: StripFace | CircleFace, index: int) -> Step:
    found = barrier.resultant
    normal, moment = float(found.total[index]), float(found.moment[index])
    horizontal, vertical = float(found.horizontal[index]), float(found.vertical[index])
    tilt = (face.tilt, "angle")
    lines = [
        line("H = N·sin θ = {}·sin {} = {}", (normal, "force"), tilt, (horizontal, "force")),
        line("V = −N·cos θ = −({})·cos {} = {}", (normal, "force"), tilt, (vertical, "force")),
    ]
    results = [
        term("N", "force normal to the face", normal, "force"),
        term("H", "horizontal force, toward the protected side", horizontal, "force"),
        term("V", "vertical force, up", vertical, "force"),
        term("M", "moment about the bottom edge", moment, "moment"),
    ]
    height = float(found.line_of_action[index])
    if not math.isnan(height):
        lines.append(
            line(
                "z_F = z₀ + (M/N)·sin θ = {} + ({}/{})·sin {} = {}",
                (face.bottom, "elevation"),
                (moment, "moment"),
                (normal, "force"),
                tilt,
                (height, "elevation"),
            )
        )
        results.append(term("z_F", "line of action of H", height, "elevation"))
    if abs(face.tilt - math.pi / 2) < 1e-12:
        lines = [_upright_line(face.bottom, horizontal, moment, height)] if not math.isnan(height) else []
        formula = "vertical face: N = ΣΔN = H, V = 0, M = ΣΔM, z_F = z₀ + M/H"
    else:
        formula = "N = ΣΔN, M = ΣΔM, H = N·sin θ, V = −N·cos θ, z_F = z₀ + (M/N)·sin θ"
    return Step(title="Force and moment", formula=formula, lines=tuple(lines), results=tuple(results))


def _upright_line(bottom: float, horizontal: float, moment: float, height: float) -> Line:
    return line(
        "z_F = z₀ + M/H = {} + {}/{} = {}",
        (bottom, "elevation"),
        (moment, "moment"),
        (horizontal, "force"),
        (height, "elevation"),
    )


def _ratios(barrier: Assessed, index: int) -> Step:
    lines = []
    named: set[str] = set()
    for check in barrier.checks:
        stands = check.limit_value > (barrier.face.bottom if check.kind == "elevation" else 0.0)
        if check.limit is not None and stands and check.name not in named:
            lines.append(_ratio_line(barrier, check, index))
            named.add(check.name)
    return Step(
        title="Ratios to the limits entered",
        formula="ratio = |demand|/limit; of a level: head on the bottom edge over the head at the limit",
        lines=tuple(lines),
    )


def _ratio_line(barrier: Assessed, check: Check, index: int) -> Line:
    ratio, demand = float(check.ratio[index]), float(check.demand[index])
    if check.kind != "elevation":
        values = ((abs(demand), check.kind), (check.limit_value, check.kind), (ratio, "ratio"))
        part = not check.subject.startswith(barrier.record.kind)
        return line(
            "ratio = {}/{} = {}", *values, label=f"{check.subject}, {check.name}" if part else check.name
        )
    bottom = barrier.face.bottom
    return line(
        "ratio = (L_f − z₀)/(z_limit − z₀) = ({} − {})/({} − {}) = {}",
        (max(demand, bottom), "elevation"),
        (bottom, "elevation"),
        (check.limit_value, "elevation"),
        (bottom, "elevation"),
        (ratio, "ratio"),
        label=_level_words(check),
    )


def _level_words(check: Check) -> str:
    if check.name != "freeboard":
        return check.name
    assert check.limit is not None
    return f"freeboard, limit level the top less the {check.limit.text} entered"
