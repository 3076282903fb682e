"""Bearing resistance of a strip under an inclined and eccentric load."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import refuse_unless


def bearing_factors_meyerhof(friction_angle: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Bearing capacity factors of a strip [Meyerhof1963].

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]

    Returns
    -------
    tuple of FloatArray
        N_c, N_q and N_γ, each (n,). [–]

    Notes
    -----
    N_q = e^(π tan φ′) tan²(45° + φ′/2), N_c = (N_q − 1) cot φ′ (2 + π at φ′ = 0), N_γ = (N_q − 1) tan 1.4φ′.

    Examples
    --------
    >>> [factor.round(2).item() for factor in bearing_factors_meyerhof(np.radians([30.0]))]
    [30.14, 18.4, 15.67]
    """
    refuse_unless(
        (friction_angle >= 0) & (friction_angle < np.pi / 3), "friction_angle", "must be from 0 to below 60°"
    )
    tangent = np.tan(friction_angle)
    depth_factor = np.exp(np.pi * tangent) * np.tan(np.pi / 4 + friction_angle / 2) ** 2
    divisor = np.where(tangent > 0, tangent, 1.0)
    cohesion_factor = np.where(tangent > 0, (depth_factor - 1) / divisor, 2 + np.pi)
    weight_factor = (depth_factor - 1) * np.tan(1.4 * friction_angle)
    return cohesion_factor, np.asarray(depth_factor), np.asarray(weight_factor)


def bearing_resistance_meyerhof(
    *,
    friction_angle: FloatArray,
    cohesion: FloatArray,
    unit_weight: FloatArray,
    overburden: FloatArray,
    width: FloatArray,
    inclination: FloatArray,
) -> FloatArray:
    """Ultimate bearing pressure of a strip on its effective width [Meyerhof1963].

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,) or (1,). [rad]
    cohesion
        Effective cohesion c′, shape (n,) or (1,). [Pa]
    unit_weight
        Effective weight per volume of the ground below the base, shape (n,) or (1,). [N/m³]
    overburden
        Effective stress beside the base at its elevation, shape (n,) or (1,). [Pa]
    width
        Effective width B′ = B − 2|e|, shape (n,). [m]
    inclination
        Angle between the resultant and the vertical, shape (n,). [rad]

    Returns
    -------
    FloatArray
        Shape (n,). [Pa]

    Notes
    -----
    q = c′ N_c i_c + q₀ N_q i_c + ½ γ′ B′ N_γ i_γ, i_c = (1 − α/90°)², i_γ = (1 − α/φ′)², not below nil.
    Depth factors are left out.

    Examples
    --------
    >>> nil = np.zeros(1)
    >>> bearing_resistance_meyerhof(friction_angle=nil, cohesion=np.array([10e3]), unit_weight=nil,
    ...     overburden=nil, width=np.ones(1), inclination=nil).round(0)
    array([51416.])
    """
    cohesion_factor, depth_factor, weight_factor = bearing_factors_meyerhof(friction_angle)
    lean = np.maximum(1 - inclination / (np.pi / 2), 0.0) ** 2
    divisor = np.where(friction_angle > 0, friction_angle, 1.0)
    lean_weight = np.where(friction_angle > 0, np.maximum(1 - inclination / divisor, 0.0) ** 2, 0.0)
    surface = (cohesion * cohesion_factor + overburden * depth_factor) * lean
    return np.asarray(surface + unit_weight * width / 2 * weight_factor * lean_weight)
