"""Active and passive coefficients of a plane wedge behind a face with friction and batter.

`ground_slope` is the rise of the ground away from the face. `batter` is the lean of the face from the
vertical, positive where the fill lies over the face. `wall_friction` is the angle between the thrust and the
normal of the face, positive where the soil moves down along the face in the active case and up along it in
the passive case. The thrust is K γ H²/2 for a height H; it points below the horizontal by batter +
wall_friction (active) or batter − wall_friction (passive): its horizontal part is the cosine of that angle.
Where no plane wedge is in equilibrium the functions raise `loads.limits_of_use.OutsideFormulaError`.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.earth_pressure import LEVEL_GROUND, refuse_friction_angle
from loads.limits_of_use import LimitOfUse, refuse_unless

ACTIVE_WALL_FRICTION_SHARE: Final = LimitOfUse(
    quantity="wall_friction",
    low=0.0,
    high=1.0,
    unit="friction angles",
    note="common practice, no source: a face cannot be rougher than the soil slides on itself",
)
PASSIVE_WALL_FRICTION_SHARE: Final = LimitOfUse(
    quantity="wall_friction",
    low=0.0,
    high=1 / 3,
    unit="friction angles",
    note="common practice, no source: above it a plane wedge overstates passive resistance",
)

VERTICAL_FACE: Final[FloatArray] = np.zeros(1)
"""Face without batter, shape (1,), read only. [rad]"""
VERTICAL_FACE.setflags(write=False)


def active_coefficient_coulomb(
    friction_angle: FloatArray,
    wall_friction: FloatArray,
    ground_slope: FloatArray = LEVEL_GROUND,
    batter: FloatArray = VERTICAL_FACE,
) -> FloatArray:
    """Coefficient of the thrust of soil yielding outward behind a rough face, K_a [Coulomb1776].

    Greatest thrust of a plane wedge, no cohesion; in the form of [MullerBreslau1906].

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]
    wall_friction
        Angle δ between the thrust and the normal of the face, shape (n,) or (1,). [rad]
    ground_slope
        Slope of the ground β, shape (n,) or (1,). [rad]
    batter
        Lean of the face η from the vertical, shape (n,) or (1,). [rad]

    Returns
    -------
    FloatArray
        K_a, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        Ground steeper than the friction angle, or a face so rough or leaning that no wedge pushes on it.

    Notes
    -----
    K_a = cos²(φ′ − η) / (cos²η cos(η + δ) (1 + √(sin(φ′ + δ) sin(φ′ − β) / (cos(η + δ) cos(η − β))))²);
    `loads.earth_pressure.FRICTION_ANGLE`, `ACTIVE_WALL_FRICTION_SHARE`.

    Examples
    --------
    >>> active_coefficient_coulomb(np.radians([30.0]), np.radians([20.0])).round(6)
    array([0.297314])
    """
    refuse_friction_angle(friction_angle)
    refuse_unless(ground_slope <= friction_angle, "ground_slope", "must not be steeper than friction_angle")
    refuse_unless(friction_angle - batter < np.pi / 2, "batter", "leaves no wedge: the fill stands by itself")
    _refuse_geometry(friction_angle, wall_friction, ground_slope, batter, batter + wall_friction)
    phi, delta, beta, eta = friction_angle, wall_friction, ground_slope, batter
    root = np.sqrt(np.sin(phi + delta) * np.sin(phi - beta) / (np.cos(eta + delta) * np.cos(eta - beta)))
    return np.asarray(
        np.cos(phi - eta) ** 2 / (np.cos(eta) ** 2 * np.cos(eta + delta) * (1 + root) ** 2), dtype=np.float64
    )


def passive_coefficient_coulomb(
    friction_angle: FloatArray,
    wall_friction: FloatArray,
    ground_slope: FloatArray = LEVEL_GROUND,
    batter: FloatArray = VERTICAL_FACE,
) -> FloatArray:
    """Coefficient of the thrust of soil pushed inward by a rough face, K_p [Coulomb1776].

    Least resistance of a plane wedge, no cohesion; in the form of [MullerBreslau1906]. The real surface of
    sliding is curved, so that a plane wedge *overstates* the resistance, badly so once the wall friction
    passes about a third of the friction angle [PlaneWedgePractice].

    Parameters
    ----------
    friction_angle
        Effective angle of internal friction φ′, shape (n,). [rad]
    wall_friction
        Angle δ between the thrust and the normal of the face, shape (n,) or (1,). [rad]
    ground_slope
        Slope of the ground β, shape (n,) or (1,). [rad]
    batter
        Lean of the face η from the vertical, shape (n,) or (1,). [rad]

    Returns
    -------
    FloatArray
        K_p, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        Ground falling away more steeply than the friction angle, or a face so rough or leaning that no plane
        wedge gives way.

    Notes
    -----
    K_p = cos²(φ′ + η) / (cos²η cos(η − δ) (1 − √(sin(φ′ + δ) sin(φ′ + β) / (cos(η − δ) cos(η − β))))²);
    `loads.earth_pressure.FRICTION_ANGLE`, `PASSIVE_WALL_FRICTION_SHARE`.

    Examples
    --------
    >>> passive_coefficient_coulomb(np.radians([30.0]), np.radians([10.0])).round(6)
    array([4.1433])
    """
    refuse_friction_angle(friction_angle)
    refuse_unless(
        -ground_slope <= friction_angle, "ground_slope", "must not fall steeper than friction_angle"
    )
    refuse_unless(friction_angle + batter < np.pi / 2, "batter", "leaves no wedge to push")
    _refuse_geometry(friction_angle, wall_friction, ground_slope, batter, batter - wall_friction)
    phi, delta, beta, eta = friction_angle, wall_friction, ground_slope, batter
    root = np.sqrt(np.sin(phi + delta) * np.sin(phi + beta) / (np.cos(eta - delta) * np.cos(eta - beta)))
    refuse_unless(
        root < 1, "wall_friction", "is so high for this face and ground that no plane wedge gives way"
    )
    return np.asarray(
        np.cos(phi + eta) ** 2 / (np.cos(eta) ** 2 * np.cos(eta - delta) * (1 - root) ** 2), dtype=np.float64
    )


def _refuse_geometry(
    friction_angle: FloatArray,
    wall_friction: FloatArray,
    ground_slope: FloatArray,
    batter: FloatArray,
    thrust_below_horizontal: FloatArray,
) -> None:
    right = np.pi / 2
    refuse_unless(np.abs(batter) < right, "batter", "must be between −90° and 90°")
    refuse_unless(
        np.abs(batter - ground_slope) < right, "batter", "must keep the face out of the ground line"
    )
    refuse_unless(-wall_friction <= friction_angle, "wall_friction", "must not be below minus friction_angle")
    refuse_unless(
        np.abs(thrust_below_horizontal) < right, "wall_friction", "must keep the thrust across the face"
    )
