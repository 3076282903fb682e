"""Worked steps of sediment: coefficients, effective stress down the side, pressure of fluid layers."""

from __future__ import annotations

import math

import numpy as np

from loads.assessment import Assessed
from loads.load import SIDES, layer_name, tilt_from
from loads.records.sediment import Sediment
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights
from loads.worked_step import Cell, Line, Step, Table, line, term

_UPRIGHT = 1e-12


def soil_steps(barrier: Assessed, index: int) -> list[Step]:
    """Steps of the sediment of both sides; none where there is none."""
    steps: list[Step] = []
    for side in SIDES:
        layers = barrier.setting.panel.layers(side)
        soils = [(number, layer) for number, layer in enumerate(layers, 1) if not layer.is_fluid]
        if soils:
            steps.append(_coefficients(barrier, side, soils))
            steps.append(_stresses(barrier, side, index))
        if len(soils) < len(layers):
            steps.append(_fluid_layers(barrier, side, index))
    return steps


def _coefficients(barrier: Assessed, side: str, soils: list[tuple[int, Sediment]]) -> Step:
    tilt = tilt_from(side, barrier.setting.panel.tilt_angle)
    water = barrier.setting.fluids[side].unit_weight
    lines: list[Line] = []
    for number, layer in soils:
        name = layer_name(layer, number, side)
        assert layer.saturated_unit_weight is not None
        moist, submerged = unit_weights(layer, water)
        lines.append(
            line(
                "γ′ = γ_sat − γ_w = {} − {} = {}",
                (layer.saturated_unit_weight.value, "unit weight"),
                (water, "unit weight"),
                (submerged, "unit weight"),
                label=f"{name}, submerged",
            )
        )
        label = f"{name}, above water"
        lines.append(line("γ = {}", (moist, "unit weight"), label=label))
        lines += _coefficient_lines(layer, name, tilt)
    return Step(
        title=f"Sediment on the {side} side: unit weights and coefficients",
        formula="K is the ratio of the pressure normal to the face to the vertical effective stress σ′v",
        lines=tuple(lines),
    )


def _coefficient_lines(layer: Sediment, name: str, tilt: float) -> list[Line]:
    ratio = face_coefficient(layer, tilt)
    if layer.pressure == "entered":
        return [line("K = {}, as entered", (ratio, "ratio"), label=name)]
    assert layer.friction_angle is not None
    label = f"{name}, {layer.pressure}"
    lines = _at_rest_lines(layer, tilt, ratio, label)
    if layer.pressure != "at rest":
        lines = _wedge_lines(layer, tilt, ratio, label)
    taken = cohesion_pressure(layer, ratio)
    if taken != 0:
        assert layer.cohesion is not None
        cohesion, root = (layer.cohesion.value, "pressure"), (ratio, "ratio")
        words = f"{name}, cohesion {'takes off' if taken > 0 else 'adds'}"
        lines.append(line("2c′√K = 2·{}·√{} = {}", cohesion, root, (abs(taken), "pressure"), label=words))
    return lines


def _at_rest_lines(layer: Sediment, tilt: float, ratio: float, label: str) -> list[Line]:
    if layer.friction_angle is None or layer.pressure != "at rest":
        return []
    friction = (layer.friction_angle.value, "angle")
    normal = 1 - math.sin(friction[0])
    if layer.overconsolidation_ratio is None:
        lines = [line("K₀ = 1 − sin φ′ = 1 − sin {} = {}", friction, (normal, "ratio"), label=label)]
    else:
        past = layer.overconsolidation_ratio
        normal *= past ** math.sin(friction[0])
        pattern = "K₀ = (1 − sin φ′)·OCR^(sin φ′) = (1 − sin {})·{}^(sin {}) = {}"
        lines = [line(pattern, friction, (past, "ratio"), friction, (normal, "ratio"), label=label)]
    if abs(tilt - math.pi / 2) > _UPRIGHT:
        angle = (tilt, "angle")
        pattern = "K = K₀·sin²θ + cos²θ = {}·(sin {})² + (cos {})² = {}"
        lines.append(line(pattern, (normal, "ratio"), angle, angle, (ratio, "ratio"), label=label))
    return lines


def _wedge_lines(layer: Sediment, tilt: float, ratio: float, label: str) -> list[Line]:
    assert layer.friction_angle is not None
    friction = (layer.friction_angle.value, "angle")
    delta = layer.wall_friction.value if layer.wall_friction else 0.0
    batter = math.pi / 2 - tilt
    active = layer.pressure == "active"
    if delta == 0 and abs(batter) < _UPRIGHT:
        top, foot = ("−", "+") if active else ("+", "−")
        words = f"(1 {top} sin φ′)/(1 {foot} sin φ′)"
        pattern = f"K = {words} = (1 {top} sin {{}})/(1 {foot} sin {{}}) = {{}}"
        return [line(pattern, friction, friction, (ratio, "ratio"), label=label)]
    sign = 1 if active else -1
    wall, lean = (delta, "angle"), (batter, "angle")
    less = (friction[0] - sign * batter, "angle")
    more = (friction[0] + delta, "angle")
    thrust = (batter + sign * delta, "angle")
    root = math.sqrt(math.sin(more[0]) * math.sin(friction[0]) / (math.cos(thrust[0]) * math.cos(batter)))
    wedge = (ratio / (math.cos(delta) * math.sin(tilt)), "ratio")
    minus, plus = ("−", "+") if active else ("+", "−")
    coefficient = "K_a" if active else "K_p"
    w, result = (root, "ratio"), (ratio, "ratio")
    slip = (
        f"w = √[sin(φ′ + δ)·sin φ′/(cos(η {plus} δ)·cos η)] = √[sin {{}}·sin {{}}/(cos {{}}·cos {{}})] = {{}}"
    )
    whole = (
        f"{coefficient} = cos²(φ′ {minus} η)/[cos²η·cos(η {plus} δ)·(1 {plus} w)²] "
        f"= (cos {{}})²/[(cos {{}})²·cos {{}}·(1 {plus} {{}})²] = {{}}"
    )
    normal = f"K = {coefficient}·cos δ·sin θ = {{}}·cos {{}}·sin {{}} = {{}}"
    name = f"{label}, batter η = 90° − θ, level ground"
    return [
        line(slip, more, friction, thrust, lean, w, label=name),
        line(whole, less, lean, thrust, w, wedge, label=label),
        line(normal, wedge, wall, (tilt, "angle"), result, label=label),
    ]


def _stresses(barrier: Assessed, side: str, index: int) -> Step:
    ground = barrier.setting.panel.layers(side)[0].surcharge
    headings = (
        ("layer", "text"),
        ("from z", "elevation"),
        ("to z", "elevation"),
        ("γ or γ′", "unit weight"),
        ("σ′v, top", "pressure"),
        ("σ′v, foot", "pressure"),
        ("K", "ratio"),
        ("2c′√K", "pressure"),
        ("p, top", "pressure"),
        ("p, foot", "pressure"),
    )
    return Step(
        title=f"Sediment on the {side} side: effective stress and pressure",
        formula=(
            "σ′v at the foot = σ′v at the top + γ·Δz, from the top down; γ above water, γ′ below; "
            "p = K·σ′v − 2c′√K, not below zero; cohesion of passive soil adds, so its 2c′√K is negative; "
            "the water's pressure is counted apart"
        ),
        terms=(term("q", "surcharge on the ground", ground.value, "pressure"),) if ground else (),
        table=Table(headings=headings, rows=tuple(_stress_rows(barrier, side, index))),
    )


def _feet(barrier: Assessed, side: str) -> list[tuple[str, Sediment, float]]:
    """Layers of one side, each with its short name and the elevation of its foot."""
    layers = barrier.setting.panel.layers(side)
    feet = [layer.top.value for layer in layers[1:]] + [barrier.setting.panel.bottom.value]
    return [
        (layer_name(layer, number, side).removesuffix(f", {side} side"), layer, foot)
        for number, (layer, foot) in enumerate(zip(layers, feet, strict=True), 1)
    ]


def _stress_rows(barrier: Assessed, side: str, index: int) -> list[tuple[Cell, ...]]:
    level = float(barrier.levels.of(side)[index])
    water = barrier.setting.fluids[side].unit_weight
    tilt = tilt_from(side, barrier.setting.panel.tilt_angle)
    ground = barrier.setting.panel.layers(side)[0].surcharge
    stress = ground.value if ground else 0.0
    rows: list[tuple[Cell, ...]] = []
    for name, layer, foot in _feet(barrier, side):
        if layer.is_fluid:
            continue
        ratio = face_coefficient(layer, tilt)
        taken = cohesion_pressure(layer, ratio)
        head = layer.top.value
        table = float(np.clip(level, foot, head))
        moist, submerged = unit_weights(layer, water)
        for weight, upper, lower in ((moist, head, table), (submerged, table, foot)):
            if upper - lower <= 0:
                continue
            below = stress + weight * (upper - lower)
            pressures = (max(ratio * value - taken, 0.0) for value in (stress, below))
            rows.append((name, upper, lower, weight, stress, below, ratio, taken, *pressures))
            stress = below
    return rows


def _fluid_layers(barrier: Assessed, side: str, index: int) -> Step:
    level = float(barrier.levels.of(side)[index])
    water = barrier.setting.fluids[side].unit_weight
    rows: list[tuple[Cell, ...]] = []
    for name, layer, foot in _feet(barrier, side):
        if not layer.is_fluid:
            continue
        assert layer.fluid_unit_weight is not None
        weight, head = layer.fluid_unit_weight.value, layer.top.value
        wet = float(np.clip(level, foot, head)) - foot
        excess = weight * (head - foot) - water * wet
        rows.append((name, layer.pressure, head, foot, weight, head - foot, wet, excess))
    headings = (
        ("layer", "text"),
        ("kind", "text"),
        ("top", "elevation"),
        ("foot", "elevation"),
        ("γ, with its water", "unit weight"),
        ("thickness t", "length"),
        ("of it under water w", "length"),
        ("excess at the foot", "pressure"),
    )
    return Step(
        title=f"Fluid layers on the {side} side: pressure beyond that of the water",
        formula=(
            "excess = γ·t − γ_w·w; the layer's own weight replaces the water's, and below the layer the "
            "excess carries on undiminished"
        ),
        terms=(term("γ_w", f"{side}-side water, unit weight", water, "unit weight"),),
        table=Table(headings=headings, rows=tuple(rows)),
    )
