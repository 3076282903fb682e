"""Sediment against a face: soil layers with their water counted apart, fluid mud, and equivalent fluid."""

from __future__ import annotations

import math
from collections.abc import Sequence

import numpy as np

from loads.arrays import FloatArray
from loads.diagram import Diagram
from loads.earth_pressure import at_rest_coefficient_jaky, at_rest_coefficient_overconsolidated
from loads.earth_pressure_coulomb import active_coefficient_coulomb, passive_coefficient_coulomb
from loads.records.sediment import Sediment

Term = tuple[FloatArray, FloatArray, FloatArray]


def face_coefficient(layer: Sediment, tilt: float) -> float:
    """Ratio of the pressure normal to a plane face to the vertical effective stress of a soil layer.

    Parameters
    ----------
    layer
        A layer of pressure "at rest", "active", "passive" or "entered".
    tilt
        Angle between the level ground on the layer's side and the face, measured through the air above the
        ground on the other side of the face; 90° is vertical, less and the soil lies over the face. [rad]

    Returns
    -------
    float
        Coefficient. [–]

    Raises
    ------
    OutsideFormulaError
        The coefficient has no value for these angles.

    Notes
    -----
    At rest, from undisturbed level ground with principal stresses σ′v and K₀σ′v [Jaky1944]: K₀ sin²θ + cos²θ.
    Active and passive by Coulomb's wedge [Coulomb1776] with the thrust along the face turned into normal
    pressure: K cos δ sin θ; on a vertical smooth face this is Rankine's coefficient [Rankine1857]. The part
    along the face, friction, is left out of the load.
    """
    if layer.pressure == "entered":
        assert layer.pressure_coefficient is not None
        return layer.pressure_coefficient
    assert layer.friction_angle is not None
    friction = np.array([layer.friction_angle.value])
    sine, cosine = math.sin(tilt), math.cos(tilt)
    if layer.pressure == "at rest":
        if layer.overconsolidation_ratio is None:
            at_rest = at_rest_coefficient_jaky(friction)
        else:
            ratio = np.array([layer.overconsolidation_ratio])
            at_rest = at_rest_coefficient_overconsolidated(friction, ratio)
        return float(at_rest[0]) * sine**2 + cosine**2
    wall = np.array([layer.wall_friction.value if layer.wall_friction else 0.0])
    batter = np.array([math.pi / 2 - tilt])
    coulomb = active_coefficient_coulomb if layer.pressure == "active" else passive_coefficient_coulomb
    level_ground = np.zeros(1)
    return float(coulomb(friction, wall, level_ground, batter)[0]) * math.cos(wall[0]) * sine


def cohesion_pressure(layer: Sediment, coefficient: float) -> float:
    """Pressure that cohesion takes off (active) or adds (passive, negative here), 2c′√K. [Pa]."""
    cohesion = layer.cohesion.value if layer.cohesion else 0.0
    sign = {"active": 1.0, "passive": -1.0}.get(layer.pressure, 0.0)
    return sign * 2 * cohesion * math.sqrt(coefficient)


def unit_weights(layer: Sediment, water_unit_weight: float) -> tuple[float, float]:
    """Weight per volume above water, and submerged, of a soil layer. [N/m³]."""
    assert layer.saturated_unit_weight is not None
    saturated = layer.saturated_unit_weight.value
    moist = layer.moist_unit_weight.value if layer.moist_unit_weight else saturated
    return moist, saturated - water_unit_weight


def sediment_diagrams(
    layers: Sequence[Sediment],
    *,
    level: FloatArray,
    water_unit_weight: float,
    bottom: float,
    tilt: float,
) -> list[Diagram]:
    """Pressure of each layer on a face, on top of the water of that side.

    Parameters
    ----------
    layers
        Layers of one side from the top down; each reaches to the next one's top, the last to `bottom`.
    level
        Water level of that side, anywhere above or in the layers, shape (n,). [m]
    water_unit_weight
        Weight per volume of that side's water. [N/m³]
    bottom
        Elevation of the face's bottom edge. [m]
    tilt
        As in `face_coefficient`. [rad]

    Returns
    -------
    list of Diagram
        One for each layer. A soil layer's is effective pressure K σ′v − 2c′√K, not below zero; a fluid
        layer's is its pressure less that of the water which it replaces.

    Notes
    -----
    Pore water stands at the side's level. A fluid layer's excess pressure carries on undiminished below it,
    and effective stress starts from nothing there.
    """
    bottoms = [layer.top.value for layer in layers[1:]] + [bottom] * bool(layers)
    diagrams = []
    stress = np.full(len(level), layers[0].surcharge.value if layers and layers[0].surcharge else 0.0)
    for layer, foot in zip(layers, bottoms, strict=True):
        if layer.is_fluid:
            diagrams.append(_fluid_diagram(layer, foot, level, water_unit_weight))
            continue
        coefficient = face_coefficient(layer, tilt)
        terms: list[Term] = []
        head = layer.top.value
        table = np.clip(level, foot, head)
        for weight, upper, lower in zip(
            unit_weights(layer, water_unit_weight),
            (np.full(len(level), head), table),
            (table, np.full(len(level), foot)),
            strict=True,
        ):
            terms += _floored_piece(
                coefficient * stress - cohesion_pressure(layer, coefficient),
                coefficient * weight,
                upper,
                lower,
            )
            stress = stress + weight * (upper - lower)
        diagrams.append(Diagram.of_terms(len(level), terms))
    return diagrams


def _floored_piece(start: FloatArray, slope: float, upper: FloatArray, lower: FloatArray) -> list[Term]:
    """Terms of a straight piece of pressure between two elevations, nil where it would be tension."""
    end = start + slope * (upper - lower)
    grade = np.divide(start, slope, out=np.zeros_like(start), where=np.full_like(start, slope) != 0)
    zero = np.clip(upper + grade, lower, upper)
    head = np.where(start < 0, zero, upper)
    foot = np.where(end < 0, zero, lower)
    grows = np.where((start > 0) | (end > 0), slope, 0.0)
    return [(head, np.maximum(start, 0.0), grows), (foot, -np.maximum(end, 0.0), -grows)]


def _fluid_diagram(layer: Sediment, foot: float, level: FloatArray, water_unit_weight: float) -> Diagram:
    assert layer.fluid_unit_weight is not None
    weight, head = layer.fluid_unit_weight.value, layer.top.value
    replaced = np.clip(level, foot, head)
    return Diagram.of_terms(
        len(level),
        [
            (head, 0.0, weight),
            (foot, 0.0, -weight),
            (replaced, 0.0, -water_unit_weight),
            (foot, 0.0, water_unit_weight),
        ],
    )
