"""Worked steps of plane faces: slices of straight outlines, segments of a disc."""

from __future__ import annotations

import math
from itertools import pairwise

import numpy as np

from loads.assessment import Assessed
from loads.diagram import Diagram
from loads.disc import segment_moments
from loads.faces import CircleFace, StripFace
from loads.worked_step import Cell, Line, Step, Table, column_sum, line, term

_NIL = 1e-12

Piece = tuple[float, float, float, float]
"""Low end, high end [m], pressure at the low end, pressure at the high end [Pa]."""


def pressure_at(diagram: Diagram, z: float, *, under: bool) -> float:
    """Pressure of the first state at an elevation, of the piece below it when `under`. [Pa]."""
    return float(diagram.pressure(np.array([z]), at_underside=under)[0, 0])


def straight_pieces(barrier: Assessed, edges: list[float], index: int) -> list[Piece]:
    """Pieces of the face, from the bottom up, within which pressure and width are straight.

    Parameters
    ----------
    edges
        Elevations at which the width bends. [m]
    """
    bottom, top = barrier.face.bottom, barrier.face.top
    corners = barrier.diagram.rows(bottom, top, index)
    cuts: list[float] = []
    for z in sorted({z for z, _ in corners} | {z for z in edges if bottom < z < top}):
        if not cuts or z - cuts[-1] > 1e-9:
            cuts.append(z)
    net = barrier.diagram.take(index)
    pieces = [
        (low, high, pressure_at(net, low, under=False), pressure_at(net, high, under=True))
        for low, high in pairwise(cuts)
    ]
    return [piece for piece in pieces if piece[2] != 0 or piece[3] != 0]


def slices(barrier: Assessed, face: StripFace, index: int) -> Step:
    """Force and moment of each slice of a face with a straight outline."""
    sine = math.sin(face.tilt)
    edges = [face.bottom + float(s) * sine for s in face.strip_table[:, :2].ravel()]
    rows = [_slice(face, piece) for piece in reversed(straight_pieces(barrier, edges, index))]
    headings = (
        ("s₁, lower end", "length"),
        ("s₂, upper end", "length"),
        ("p₁ at s₁", "pressure"),
        ("p₂ at s₂", "pressure"),
        ("width b₁", "length"),
        ("width b₂", "length"),
        ("force ΔN", "force"),
        ("moment ΔM", "moment"),
    )
    sums = ("sum", "", "", "", "", "", column_sum(rows, 6), column_sum(rows, 7))
    upright = abs(face.tilt - math.pi / 2) < 1e-12
    along = "s = z − z₀, up the face" if upright else "s = (z − z₀)/sin θ, up the face"
    return Step(
        title="Slices of the face",
        formula=(
            f"{along}; Δs = s₂ − s₁; ΔN = Δs/6·(p₁b₁ + 4·pₘbₘ + p₂b₂); "
            "ΔM = Δs/6·(p₁b₁s₁ + 4·pₘbₘsₘ + p₂b₂s₂); m the middle, its values the means of both ends; "
            "exact for straight p and b"
        ),
        lines=tuple(_slice_lines(rows)),
        table=Table(headings=headings, rows=tuple(rows), total=sums),
    )


def _slice(face: StripFace, piece: Piece) -> tuple[Cell, ...]:
    low, high, p_low, p_high = piece
    sine = math.sin(face.tilt)
    s_low, s_high = (low - face.bottom) / sine, (high - face.bottom) / sine
    b_low, b_high = _width(face, s_low, s_high)
    points = (
        (p_low, b_low, s_low, 1),
        ((p_low + p_high) / 2, (b_low + b_high) / 2, (s_low + s_high) / 2, 4),
        (p_high, b_high, s_high, 1),
    )
    sixth = (s_high - s_low) / 6
    force = sixth * sum(weight * p * b for p, b, _, weight in points)
    moment = sixth * sum(weight * p * b * s for p, b, s, weight in points)
    return (s_low, s_high, p_low, p_high, b_low, b_high, force, moment)


def _slice_lines(rows: list[tuple[Cell, ...]]) -> list[Line]:
    """Lowest slice with its numbers."""
    if not rows:
        return []
    s_low, s_high, p_low, p_high, b_low, b_high, force, moment = (float(cell) for cell in rows[-1])
    p, b, s = (p_low + p_high) / 2, (b_low + b_high) / 2, (s_low + s_high) / 2
    reach = (s_high - s_low, "length")

    def ends(*, arms: bool) -> list[tuple[float, str]]:
        points = ((p_low, b_low, s_low), (p, b, s), (p_high, b_high, s_high))
        kinds = ("pressure", "length", "length")
        return [pair for point in points for pair in list(zip(point, kinds, strict=True))[: 3 if arms else 2]]

    name = "lowest slice"
    return [
        line(
            "ΔN = {}/6·({}·{} + 4·{}·{} + {}·{}) = {}", reach, *ends(arms=False), (force, "force"), label=name
        ),
        line(
            "ΔM = {}/6·({}·{}·{} + 4·{}·{}·{} + {}·{}·{}) = {}",
            reach,
            *ends(arms=True),
            (moment, "moment"),
            label=name,
        ),
    ]


def _width(face: StripFace, s_low: float, s_high: float) -> tuple[float, float]:
    middle = (s_low + s_high) / 2
    for low, high, at_low, at_high in face.strip_table:
        if low <= middle <= high:
            change = (at_high - at_low) / (high - low)
            return float(at_low + change * (s_low - low)), float(at_low + change * (s_high - low))
    raise ValueError("a slice lies outside the face")


def segments(barrier: Assessed, face: CircleFace, index: int) -> list[Step]:
    """Properties of the disc below each start of pressure, and the force and moment of each term."""
    sine = math.sin(face.tilt)
    shapes: dict[float, tuple[float, float, float]] = {}
    rows: list[tuple[Cell, ...]] = []
    for load in barrier.loads:
        cut = load.diagram.take(index).below(face.top)
        height = np.clip((cut.knot - face.bottom) / sine, 0.0, face.length)
        area, first, second = segment_moments(height, face.radius)
        for k in range(cut.knot.shape[1]):
            step, ramp = float(cut.step[0, k]), float(cut.slope[0, k]) * sine
            h, a, q, i = (float(x[0, k]) for x in (height, area, first, second))
            if h > 0 and (step != 0 or ramp != 0):
                shapes[h] = (a, q, i)
                force, moment = step * a + ramp * (h * a - q), step * q + ramp * (h * q - i)
                rows.append((load.name, h, step, ramp, a, q, i, force, moment))
    headings = (
        ("load", "text"),
        ("sets in at h", "length"),
        ("step s", "pressure"),
        ("ramp g·sin θ", "unit weight"),
        ("A below h", "area"),
        ("Q below h", "first moment of area"),
        ("I below h", "second moment of area"),
        ("force ΔN", "force"),
        ("moment ΔM", "moment"),
    )
    total = ("sum", "", "", "", "", "", "", column_sum(rows, 7), column_sum(rows, 8))
    return [
        _disc(face, shapes),
        Step(
            title="Force and moment of each load on the disc",
            formula=(
                "a load that sets in at h with a step s and grows by g·sin θ down the face: "
                "ΔN = s·A + g·sin θ·(h·A − Q); ΔM = s·Q + g·sin θ·(h·Q − I)"
            ),
            table=Table(headings=headings, rows=tuple(rows), total=total),
        ),
    ]


def _disc(face: CircleFace, shapes: dict[float, tuple[float, float, float]]) -> Step:
    lines = [each for height, values in shapes.items() for each in _disc_lines(face.radius, height, *values)]
    return Step(
        title="The disc below each height at which a load sets in",
        formula=(
            "h up the face from the lowest point, at most 2r; u = r − h; w = √[h·(2r − h)]; "
            "β = arccos(u/r) in radians; area A = r²β − u·w; about the lowest point the first moment "
            "Q = r·A − ⅔w³ and the second I = [r⁴β + u·w·(r² − 2u²)]/4 − (4/3)·r·w³ + r²·A"
        ),
        terms=(term("r", "radius of the disc", face.radius, "length"),),
        lines=tuple(lines),
    )


def _disc_lines(radius: float, height: float, a: float, q: float, i: float) -> list[Line]:
    r, h, u = (radius, "length"), (height, "length"), (radius - height, "length")
    square = height * (2 * radius - height)
    w = (math.sqrt(square) if square > _NIL * radius**2 else 0.0, "length")
    angle = (math.atan2(w[0], u[0]), "ratio")
    area = (a, "area")
    return [
        line("u = {} − {} = {}", r, h, u),
        line("w = √({}·(2·{} − {})) = {}", h, r, h, w),
        line("β = arccos({}/{}) = {}", u, r, angle),
        line("A = {}²·{} − ({})·{} = {}", r, angle, u, w, area),
        line("Q = {}·{} − 2/3·{}³ = {}", r, area, w, (q, "first moment of area")),
        line(
            "I = ({}⁴·{} + ({})·{}·({}² − 2·({})²))/4 − 4/3·{}·{}³ + {}²·{} = {}",
            *(r, angle, u, w, r, u, r, w, r, area),
            (i, "second moment of area"),
        ),
    ]
