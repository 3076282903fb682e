"""Ratios of lateral to vertical effective stress: at rest, and active and passive for a smooth face.

Friction angles are effective ones. `ground_slope` is the rise of the ground away from the face. Inputs
without an answer, such as ground steeper than the friction angle, raise
`loads.limits_of_use.OutsideFormulaError`; the ranges of use are the `LimitOfUse` records below, and outside
them the functions still answer. Faces with friction or batter are in `loads.earth_pressure_coulomb`.
"""

from __future__ import annotations

import math
from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import LimitOfUse, refuse_unless

FRICTION_ANGLE: Final = LimitOfUse(
    quantity="friction_angle",
    low=0.0,
    high=math.pi / 4,
    unit="rad",
    note="common practice, no source: soils are rarely found above 45°",
)
OVERCONSOLIDATION_RATIO: Final = LimitOfUse(
    quantity="overconsolidation_ratio",
    low=1.0,
    high=15.0,
    unit="–",
    note="from memory, to be confirmed: unloading only, and never above the passive coefficient",
)

LEVEL_GROUND: Final[FloatArray] = np.zeros(1)
"""Ground that does not slope, shape (1,), read only. [rad]"""
LEVEL_GROUND.setflags(write=False)


def refuse_friction_angle(friction_angle: FloatArray) -> None:
    """Raise `OutsideFormulaError` for a friction angle that no soil has; shape (n,), in rad."""
    holds = (friction_angle >= 0) & (friction_angle < np.pi / 2)
    refuse_unless(holds, "friction_angle", "must be from 0 to below 90°")


def _refuse_steep_ground(friction_angle: FloatArray, ground_slope: FloatArray) -> None:
    holds = np.abs(ground_slope) <= friction_angle
    refuse_unless(holds, "ground_slope", "must not be steeper than friction_angle, up or down")


def at_rest_coefficient_jaky(friction_angle: FloatArray) -> FloatArray:
    """Coefficient of earth pressure at rest of soil never loaded more than now, K₀ [Jaky1944].

    Level ground, no sideways strain.

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]

    Returns
    -------
    FloatArray
        K₀, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A friction angle below 0 or not below 90°.

    Notes
    -----
    K₀ = 1 − sin φ′; `FRICTION_ANGLE`.

    Examples
    --------
    >>> at_rest_coefficient_jaky(np.radians([30.0])).round(6)
    array([0.5])
    """
    refuse_friction_angle(friction_angle)
    return np.asarray(1 - np.sin(friction_angle), dtype=np.float64)


def at_rest_coefficient_overconsolidated(
    friction_angle: FloatArray, overconsolidation_ratio: FloatArray
) -> FloatArray:
    """Coefficient of earth pressure at rest of soil once loaded more than now, K₀ [MayneKulhawy1982].

    Level ground, no sideways strain, first unloading.

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]
    overconsolidation_ratio
        Greatest past vertical effective stress over the present one OCR, shape (n,). [–]

    Returns
    -------
    FloatArray
        K₀, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A friction angle below 0 or not below 90°, or a ratio below 1.

    Notes
    -----
    K₀ = (1 − sin φ′) OCR^(sin φ′); `FRICTION_ANGLE`, `OVERCONSOLIDATION_RATIO`. Equal to
    `at_rest_coefficient_jaky` at a ratio of 1.

    Examples
    --------
    >>> at_rest_coefficient_overconsolidated(np.radians([30.0]), np.array([4.0])).round(6)
    array([1.])
    """
    refuse_friction_angle(friction_angle)
    refuse_unless(overconsolidation_ratio >= 1, "overconsolidation_ratio", "must be 1 or more")
    sine = np.sin(friction_angle)
    return np.asarray((1 - sine) * overconsolidation_ratio**sine, dtype=np.float64)


def active_coefficient_rankine(
    friction_angle: FloatArray, ground_slope: FloatArray = LEVEL_GROUND
) -> FloatArray:
    """Coefficient of pressure of soil yielding outward, K_a [Rankine1857].

    Vertical face, no cohesion; the pressure acts parallel to the ground, level on level ground.

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]
    ground_slope
        Slope of the ground β, shape (n,) or (1,). [rad]

    Returns
    -------
    FloatArray
        K_a, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A friction angle below 0 or not below 90°, or ground steeper than it.

    Notes
    -----
    K_a = cos β (cos β − √(cos²β − cos²φ′)) / (cos β + √(cos²β − cos²φ′)), to be taken with the vertical
    stress γz under the point; `FRICTION_ANGLE`. On level ground (1 − sin φ′) / (1 + sin φ′).

    Examples
    --------
    >>> active_coefficient_rankine(np.radians([30.0])).round(6)
    array([0.333333])
    """
    cosine, root = _rankine_terms(friction_angle, ground_slope)
    return np.asarray(cosine * (cosine - root) / (cosine + root), dtype=np.float64)


def passive_coefficient_rankine(
    friction_angle: FloatArray, ground_slope: FloatArray = LEVEL_GROUND
) -> FloatArray:
    """Coefficient of pressure of soil pushed inward, K_p [Rankine1857].

    Vertical face, no cohesion; the pressure acts parallel to the ground, level on level ground.

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]
    ground_slope
        Slope of the ground β, shape (n,) or (1,). [rad]

    Returns
    -------
    FloatArray
        K_p, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A friction angle below 0 or not below 90°, or ground steeper than it.

    Notes
    -----
    K_p = cos β (cos β + √(cos²β − cos²φ′)) / (cos β − √(cos²β − cos²φ′)); `FRICTION_ANGLE`. On level ground
    (1 + sin φ′) / (1 − sin φ′). Sloping ground *lowers* this K_p whichever way it slopes: the thrust is
    bound to the direction of the ground.

    Examples
    --------
    >>> passive_coefficient_rankine(np.radians([30.0])).round(6)
    array([3.])
    """
    cosine, root = _rankine_terms(friction_angle, ground_slope)
    return np.asarray(cosine * (cosine + root) / (cosine - root), dtype=np.float64)


def _rankine_terms(friction_angle: FloatArray, ground_slope: FloatArray) -> tuple[FloatArray, FloatArray]:
    refuse_friction_angle(friction_angle)
    _refuse_steep_ground(friction_angle, ground_slope)
    cosine = np.cos(ground_slope)
    # rounding may carry the difference below zero where the slope equals the friction angle
    root = np.sqrt(np.maximum(cosine**2 - np.cos(friction_angle) ** 2, 0.0))
    return cosine, root


def tension_depth(cohesion: FloatArray, unit_weight: FloatArray, coefficient: FloatArray) -> FloatArray:
    """Depth to which the active pressure of cohesive soil would be tension, z₀ [Bell1915].

    Level ground without surcharge; the tension is not relied on, and may be open as a crack.

    Parameters
    ----------
    cohesion
        Effective cohesion c′, shape (n,). [Pa]
    unit_weight
        Unit weight γ of the soil above that depth, shape (n,). [N/m³]
    coefficient
        Active coefficient K_a of the soil without cohesion, shape (n,). [–]

    Returns
    -------
    FloatArray
        z₀ below the ground, shape (n,). [m]

    Raises
    ------
    OutsideFormulaError
        A negative cohesion, or a unit weight or coefficient that is not positive.

    Notes
    -----
    z₀ = 2 c′ / (γ √K_a), where γ z K_a = 2 c′ √K_a. Leaving the tension out raises the force, it never
    lowers it.

    Examples
    --------
    >>> tension_depth(np.array([9000.0]), np.array([18000.0]), np.array([1.0]))
    array([1.])
    """
    refuse_unless(cohesion >= 0, "cohesion", "must not be negative")
    refuse_unless(unit_weight > 0, "unit_weight", "must be above zero")
    refuse_unless(coefficient > 0, "coefficient", "must be above zero")
    return np.asarray(2 * cohesion / (unit_weight * np.sqrt(coefficient)), dtype=np.float64)
