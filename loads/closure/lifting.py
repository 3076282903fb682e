"""Force to lift a log out of its guides, or to seat it in them, with water against it."""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import LimitOfUse, refuse_unless

SLOT_FRICTION: Final = LimitOfUse(
    quantity="friction_coefficient",
    low=0.1,
    high=1.0,
    unit="–",
    note="from memory, to be confirmed: wet metal on metal to dry rubber; grit and silt in a slot add to it",
)


def lifting_force(
    weight: FloatArray, upward: FloatArray, end_reactions: FloatArray, friction_coefficient: float
) -> FloatArray:
    """Pull that starts a log upward in its guides under head [SlotFriction].

    Parameters
    ----------
    weight
        Of the log and of whatever comes up with it, silt too, shape (n, k). [N]
    upward
        Its buoyancy, shape (n, k). Less of it is the careful side. [N]
    end_reactions
        Sum of what its two ends press on the guides, shape (n, k); its sign is of no account. [N]
    friction_coefficient
        Of the ends in the guides, entered. [–]

    Returns
    -------
    FloatArray
        F, shape (n, k); below zero when the log rises by itself. [N]

    Raises
    ------
    OutsideFormulaError
        A negative friction coefficient.

    Notes
    -----
    F = W − B + μ |R|. Suction, ice, silt in the slot and a log that jams are not in it.

    Examples
    --------
    >>> lifting_force(np.array([[900.0]]), np.array([[400.0]]), np.array([[8000.0]]), 0.4)
    array([[3700.]])
    """
    _refuse_negative(friction_coefficient)
    return np.asarray(weight - upward + friction_coefficient * np.abs(end_reactions), dtype=np.float64)


def seating_force(
    weight: FloatArray, upward: FloatArray, end_reactions: FloatArray, friction_coefficient: float
) -> FloatArray:
    """Push that a log needs to go down its guides under head [SlotFriction].

    Parameters, shapes, units and refusals as in `lifting_force`; more buoyancy is the careful side here.

    Notes
    -----
    F = B + μ |R| − W; below zero when the log goes down by its own weight.

    Examples
    --------
    >>> seating_force(np.array([[900.0]]), np.array([[400.0]]), np.array([[8000.0]]), 0.4)
    array([[2700.]])
    """
    _refuse_negative(friction_coefficient)
    return np.asarray(upward - weight + friction_coefficient * np.abs(end_reactions), dtype=np.float64)


def _refuse_negative(friction_coefficient: float) -> None:
    refuse_unless(np.asarray(friction_coefficient >= 0), "friction_coefficient", "must not be negative")
