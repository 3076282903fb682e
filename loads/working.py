"""Worked steps of one barrier in one state: formulas with numbers, as a reviewer follows them by hand.

The slices and terms here add up to the resultant by a third route; a test holds them together.
"""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from loads.assessment import Assessed
from loads.diagram import Diagram
from loads.faces import ArcFace, CircleFace, StripFace
from loads.load import SIDES, layer_name, tilt_from
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights

Cell = float | str


@dataclass(frozen=True, kw_only=True)
class Term:
    """One number of a step: symbol, what it is, value in SI and kind of quantity."""

    symbol: str
    meaning: str
    value: float
    kind: str


@dataclass(frozen=True, kw_only=True)
class Table:
    """Rows of a step. Headings with the kind of their column ("text" for words), rows, and a row of sums."""

    headings: tuple[tuple[str, str], ...]
    rows: tuple[tuple[Cell, ...], ...]
    total: tuple[Cell, ...] = ()


@dataclass(frozen=True, kw_only=True)
class Step:
    """One step: title, formula in words and symbols, the numbers that go in, and what comes out."""

    title: str
    formula: str
    terms: tuple[Term, ...] = ()
    table: Table | None = None
    results: tuple[Term, ...] = ()


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
        Heads, pressures, slices or segments, resultant.
    """
    face = barrier.face
    steps = [_heads(barrier, index), *_soil(barrier), _pressures(barrier, index)]
    if isinstance(face, StripFace):
        steps.append(_slices(barrier, face, index))
    elif isinstance(face, CircleFace):
        steps.append(_segments(barrier, face, index))
    else:
        steps += [_projection(barrier, face, index), _prism(barrier, face, index)]
    steps.append(_resultant(barrier, index))
    return tuple(steps)


def _term(symbol: str, meaning: str, value: float, kind: str) -> Term:
    return Term(symbol=symbol, meaning=meaning, value=float(value), kind=kind)


def _heads(barrier: Assessed, index: int) -> Step:
    face = barrier.face
    terms = [
        _term("z₀", "bottom", face.bottom, "elevation"),
        _term("z₁", "top", face.top, "elevation"),
    ]
    results = []
    for side, mark in zip(SIDES, ("f", "p"), strict=True):
        level = float(barrier.levels.of(side)[index])
        terms.append(_term(f"L{mark}", f"{side}-side level", level, "elevation"))
        terms.append(
            _term(f"γ{mark}", f"{side}-side water", barrier.setting.fluids[side].unit_weight, "unit weight")
        )
        head = max(level - face.bottom, 0.0)
        results.append(_term(f"h{mark}", f"head on the bottom, {side} side", head, "length"))
    return Step(title="Heads", formula="h = L − z₀, nil when dry", terms=tuple(terms), results=tuple(results))


def _soil(barrier: Assessed) -> list[Step]:
    panel = barrier.panel
    rows: list[tuple[Cell, ...]] = []
    for side in SIDES:
        weight = barrier.setting.fluids[side].unit_weight
        for number, layer in enumerate(panel.layers(side), 1):
            name = layer_name(layer, number, side)
            if layer.is_fluid:
                assert layer.fluid_unit_weight is not None
                heavy = layer.fluid_unit_weight.value
                rows.append((name, layer.pressure, layer.top.value, heavy, heavy - weight, "1", 0.0))
                continue
            moist, submerged = unit_weights(layer, weight)
            ratio = face_coefficient(layer, tilt_from(side, panel.tilt_angle))
            taken_off = cohesion_pressure(layer, ratio)
            rows.append((name, layer.pressure, layer.top.value, moist, submerged, ratio, taken_off))
    if not rows:
        return []
    headings = (
        ("layer", "text"),
        ("pressure", "text"),
        ("top", "elevation"),
        ("γ above water", "unit weight"),
        ("γ′ = γ_sat − γ_w", "unit weight"),
        ("K", "ratio"),
        ("2c′√K", "pressure"),
    )
    formula = (
        "at rest K₀ = (1 − sin φ′)·OCR^(sin φ′), on a tilted face K₀·sin²θ + cos²θ; active and passive by Coulomb's "
        "wedge, K·cos δ·sin θ, on a vertical smooth face Rankine's (1 ∓ sin φ′)/(1 ± sin φ′); a fluid layer "
        "presses with its own γ in place of the water's"
    )
    return [Step(title="Sediment", formula=formula, table=Table(headings=headings, rows=tuple(rows)))]


def _pressures(barrier: Assessed, index: int) -> Step:
    corners = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    singles = [load.diagram.take(index) for load in barrier.loads]
    acting = [
        (load.name, single)
        for load, single in zip(barrier.loads, singles, strict=True)
        if any(abs(_at(single, z, under=_is_upper(corners, i))) > 0 for i, (z, _) in enumerate(corners))
    ]
    rows = tuple(
        (z, *(_at(single, z, under=_is_upper(corners, i)) for _, single in acting), net)
        for i, (z, net) in reversed(list(enumerate(corners)))
    )
    headings = (
        ("elevation", "elevation"),
        *((name, "pressure") for name, _ in acting),
        ("net pressure p", "pressure"),
    )
    return Step(
        title="Pressure at each corner of the diagram",
        formula="p = Σ of all loads, positive toward the protected side; water γ·(L − z), soil K·σ′v − 2c′√K",
        table=Table(headings=headings, rows=rows),
    )


def _is_upper(corners: list[tuple[float, float]], i: int) -> bool:
    """True for a corner that ends a piece from below: the top, and the lower row of a jump."""
    return i > 0 and (i == len(corners) - 1 or corners[i][0] > corners[i - 1][0])


def _at(diagram: Diagram, z: float, *, under: bool) -> float:
    return float(diagram.pressure(np.array([z]), at_underside=under)[0, 0])


def _pieces(barrier: Assessed, edges: list[float], index: int) -> list[tuple[float, float, float, float]]:
    """Pieces within which pressure and width are straight: (low, high, pressure at low, pressure at high)."""
    corners = barrier.diagram.rows(barrier.face.bottom, barrier.face.top, index)
    cuts = sorted({z for z, _ in corners} | {z for z in edges if barrier.face.bottom < z < barrier.face.top})
    net = barrier.diagram.take(index)
    pieces = [
        (low, high, _at(net, low, under=False), _at(net, high, under=True))
        for low, high in zip(cuts[:-1], cuts[1:], strict=True)
    ]
    return [piece for piece in pieces if piece[1] - piece[0] > 1e-9 and (piece[2] != 0 or piece[3] != 0)]


def _slices(barrier: Assessed, face: StripFace, index: int) -> Step:
    sine = math.sin(face.tilt)
    edges = [face.bottom + float(s) * sine for s in face.strip_table[:, :2].ravel()]
    rows: list[tuple[Cell, ...]] = []
    for low, high, p_low, p_high in _pieces(barrier, edges, index):
        s_low, s_high = (low - face.bottom) / sine, (high - face.bottom) / sine
        b_low, b_high = _width(face, s_low, s_high)
        ends = (
            (p_low, b_low, s_low, 1),
            ((p_low + p_high) / 2, (b_low + b_high) / 2, (s_low + s_high) / 2, 4),
        )
        points = (*ends, (p_high, b_high, s_high, 1))
        sixth = (s_high - s_low) / 6
        force = sixth * sum(weight * p * b for p, b, _, weight in points)
        moment = sixth * sum(weight * p * b * s for p, b, s, weight in points)
        rows.append((s_low, s_high, p_low, p_high, b_low, b_high, force, moment))
    rows.reverse()
    headings = (
        ("from s", "length"),
        ("to s", "length"),
        ("p lower end", "pressure"),
        ("p upper end", "pressure"),
        ("width lower", "length"),
        ("width upper", "length"),
        ("force ΔN", "force"),
        ("moment ΔM", "moment"),
    )
    total = ("sum", "", "", "", "", "", _sum(rows, 6), _sum(rows, 7))
    return Step(
        title="Slices of the face",
        formula=(
            "s along the face from its bottom edge; ΔN = Δs/6·(p₁b₁ + 4·pₘbₘ + p₂b₂), "
            "ΔM = Δs/6·(p₁b₁s₁ + 4·pₘbₘsₘ + p₂b₂s₂), m the middle: exact for straight p and b"
        ),
        table=Table(headings=headings, rows=tuple(rows), total=total),
    )


def _sum(rows: list[tuple[Cell, ...]], column: int) -> float:
    return float(sum(float(row[column]) for row in rows))


def _width(face: StripFace, s_low: float, s_high: float) -> tuple[float, float]:
    middle = (s_low + s_high) / 2
    for low, high, at_low, at_high in face.strip_table:
        if low <= middle <= high:
            change = (at_high - at_low) / (high - low)
            return float(at_low + change * (s_low - low)), float(at_low + change * (s_high - low))
    raise ValueError("a slice lies outside the face")


def _segments(barrier: Assessed, face: CircleFace, index: int) -> Step:
    sine = math.sin(face.tilt)
    rows: list[tuple[Cell, ...]] = []
    for load in barrier.loads:
        cut = load.diagram.take(index).below(face.top)
        start = (cut.knot - face.bottom) / sine - face.radius
        chord = np.clip(start, -face.radius, face.radius)
        area, first, second = face.segment(chord)
        for k in range(cut.knot.shape[1]):
            step, ramp = float(cut.step[0, k]), float(cut.slope[0, k]) * sine
            u, a, q, i = (float(x[0, k]) for x in (chord, area, first, second))
            if a <= 0 or (step == 0 and ramp == 0):
                continue
            force = step * a + ramp * (u * a - q)
            moment = step * (q + face.radius * a) + ramp * (u * q - i + face.radius * (u * a - q))
            rows.append((load.name, u, step, ramp, a, q, i, force, moment))
    headings = (
        ("load", "text"),
        ("start u", "length"),
        ("step s", "pressure"),
        ("ramp g·sin θ", "unit weight"),
        ("A below u", "area"),
        ("Q below u", "first moment of area"),
        ("I below u", "second moment of area"),
        ("force ΔN", "force"),
        ("moment ΔM", "moment"),
    )
    total = ("sum", "", "", "", "", "", "", _sum(rows, 7), _sum(rows, 8))
    return Step(
        title="Segments of the disc",
        formula=(
            "u along the face from the middle of the disc, r its radius; c = √(r² − u²), β = arcsin(u/r) + π/2, "
            "A = r²β + uc, Q = −⅔c³, I = ¼[r⁴β − uc(r² − 2u²)]; "
            "ΔN = sA + g·sin θ·(uA − Q), ΔM = s(Q + rA) + g·sin θ·[uQ − I + r(uA − Q)]"
        ),
        terms=(_term("r", "radius", face.radius, "length"),),
        table=Table(headings=headings, rows=tuple(rows), total=total),
    )


def _projection(barrier: Assessed, face: ArcFace, index: int) -> Step:
    rows: list[tuple[Cell, ...]] = []
    for low, high, p_low, p_high in _pieces(barrier, [], index):
        force = (high - low) * (p_low + p_high) / 2 * face.width
        rows.append((low, high, p_low, p_high, force))
    rows.reverse()
    headings = (
        ("from z", "elevation"),
        ("to z", "elevation"),
        ("p lower end", "pressure"),
        ("p upper end", "pressure"),
        ("force ΔF", "force"),
    )
    return Step(
        title="Horizontal part, on the vertical projection",
        formula="ΔF = Δz·(p₁ + p₂)/2·b",
        terms=(_term("b", "width", face.width, "length"),),
        table=Table(headings=headings, rows=tuple(rows), total=("sum", "", "", "", _sum(rows, 4))),
    )


def _prism(barrier: Assessed, face: ArcFace, index: int) -> Step:
    arc = face.shape
    cut = barrier.diagram.take(index).below(face.top)
    centre = face.bottom + arc.centre_z

    def across(height: float) -> float:
        return arc.bulge * math.sqrt(max(arc.radius**2 - height**2, 0.0))

    def sector(height: float) -> float:
        share = max(-1.0, min(1.0, height / arc.radius))
        return (
            arc.radius**2 * math.asin(share) - height * math.sqrt(max(arc.radius**2 - height**2, 0.0))
        ) / 2

    rows: list[tuple[Cell, ...]] = []
    foot = -arc.centre_z
    for k in range(cut.knot.shape[1]):
        step, slope = float(cut.step[0, k]), float(cut.slope[0, k])
        rise = float(np.clip(cut.knot[0, k], face.bottom, face.top)) - centre
        if (step == 0 and slope == 0) or rise <= foot:
            continue
        run = across(rise) - across(foot)
        area = rise * run + arc.bulge * (sector(rise) - sector(foot))
        rows.append((rise + centre, step, slope, run, area, -face.width * (step * run + slope * area)))
    headings = (
        ("start z", "elevation"),
        ("step s", "pressure"),
        ("ramp g", "unit weight"),
        ("run x", "length"),
        ("prism a", "area"),
        ("vertical ΔV", "force"),
    )
    return Step(
        title="Vertical part, the weight of the real or imaginary fluid above the arc",
        formula=(
            "ζ = z − z_c; x(ζ) = ±√(R² − ζ²); run x = x(ζ) − x(ζ₀); prism a = ζ·run ± [S(ζ) − S(ζ₀)], "
            "S = ½[R² arcsin(ζ/R) − ζ√(R² − ζ²)]; ΔV = −b·(s·x + g·a); + for a centre on the flood side"
        ),
        terms=(
            _term("R", "radius", arc.radius, "length"),
            _term("x_c", "centre from the bottom edge, toward the protected side", arc.centre_x, "length"),
            _term("z_c − z₀", "centre above the bottom edge", arc.centre_z, "length"),
        ),
        table=Table(headings=headings, rows=tuple(rows), total=("sum", "", "", "", "", _sum(rows, 5))),
    )


def _resultant(barrier: Assessed, index: int) -> Step:
    face, found = barrier.face, barrier.resultant
    results = [
        _term("H", "horizontal force, toward the protected side", found.horizontal[index], "force"),
        _term("V", "vertical force, up", found.vertical[index], "force"),
        _term("M", "moment about the bottom edge", found.moment[index], "moment"),
    ]
    if not math.isnan(float(found.line_of_action[index])):
        results.append(_term("z_F", "line of action of H", found.line_of_action[index], "elevation"))
    if isinstance(face, ArcFace):
        formula = "H = ΣΔF, V = ΣΔV, both through the centre: M = H·(z_c − z₀) − V·x_c"
        return Step(title="Force and moment", formula=formula, results=tuple(results))
    return Step(
        title="Force and moment",
        formula="H = N·sin θ, V = −N·cos θ, M = ΣΔM, z_F = z₀ + M·sin θ / N",
        terms=(
            _term("θ", "tilt", face.tilt, "angle"),
            _term("N", "normal force", found.total[index], "force"),
        ),
        results=tuple(results),
    )
