"""A chain of fluids at rest: going down adds the weight of the fluid, going up takes it off.

One rule serves every manometer: U-tube, differential, inverted and inclined. The chain is walked from its
start to its end, one leg for each stretch of one fluid; a leg that returns to its own level in the same
fluid may be left out.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import refuse_unless


@dataclass(frozen=True, kw_only=True)
class Leg:
    """One stretch of one fluid.

    Attributes
    ----------
    name
        What it is, for the report.
    unit_weight
        Weight per volume γ, shape (n,). [N/m³]
    rise
        Change of elevation along the walk, up positive, shape (n,). [m]
    """

    name: str
    unit_weight: FloatArray
    rise: FloatArray


@dataclass(frozen=True, kw_only=True)
class PressureChange:
    """Pressure at the end of a chain less that at its start.

    Attributes
    ----------
    by_leg
        What each of the k legs adds, shape (n, k). [Pa]
    total
        Sum of the legs, shape (n,). [Pa]
    rise
        Elevation of the end above the start, shape (n,). [m]
    """

    by_leg: FloatArray
    total: FloatArray
    rise: FloatArray


def pressure_change(legs: Sequence[Leg]) -> PressureChange:
    """Pressure at the end of a chain of fluids less that at its start [SignRule].

    Parameters
    ----------
    legs
        The k legs in the order of the walk. Their order does not matter to the sum.

    Returns
    -------
    PressureChange
        Each leg's share, the total, and how far the end lies above the start.

    Raises
    ------
    OutsideFormulaError
        A negative unit weight, a rise that is not a finite number, or no leg.

    Notes
    -----
    p_end − p_start = −Σ γᵢ Δzᵢ, Δz up positive; fluids at rest and of constant unit weight.

    Examples
    --------
    >>> mercury, water = np.array([133416.0]), np.array([9810.0])
    >>> down = Leg(name="water", unit_weight=water, rise=np.array([-0.5]))
    >>> up = Leg(name="mercury", unit_weight=mercury, rise=np.array([0.25]))
    >>> pressure_change([down, up]).by_leg
    array([[  4905., -33354.]])
    """
    refuse_unless(np.asarray(len(legs) > 0), "legs", "must hold at least one leg")
    for leg in legs:
        refuse_unless(leg.unit_weight >= 0, "unit_weight", f"of {leg.name} must not be negative")
        refuse_unless(np.isfinite(leg.rise), "rise", f"of {leg.name} must be a finite number")
    shares = np.broadcast_arrays(*(-leg.unit_weight * leg.rise for leg in legs))
    rises = np.broadcast_arrays(*(leg.rise for leg in legs))
    by_leg = np.stack(shares, axis=-1)
    return PressureChange(
        by_leg=by_leg, total=by_leg.sum(axis=-1), rise=np.stack(rises, axis=-1).sum(axis=-1)
    )


def rise_along(length: FloatArray, inclination: FloatArray) -> FloatArray:
    """Change of elevation of a length read along an inclined tube.

    Parameters
    ----------
    length
        Length along the tube L, shape (n,). [m]
    inclination
        Angle of the tube above the horizontal θ, shape (n,). [rad]

    Returns
    -------
    FloatArray
        Rise Δz, shape (n,). [m]

    Notes
    -----
    Δz = L sin θ.

    Examples
    --------
    >>> rise_along(np.array([0.18]), np.radians([30.0])).round(3)
    array([0.09])
    """
    return np.asarray(length * np.sin(inclination), dtype=np.float64)
