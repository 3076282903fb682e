"""The head that drives water through a closure at each elevation, and the flow through open gaps.

Only flow toward the protected side is counted: where that side is as high or higher there is none.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import refuse_unless

SHARP_EDGED_ORIFICE: Final = 0.61
"""Discharge coefficient of sharp edges; from memory, to be confirmed [OrificeCoefficient]. [–]"""


def head_across(flood_side: FloatArray, protected_side: FloatArray, elevation: FloatArray) -> FloatArray:
    """Head that drives water through an opening at an elevation, toward the protected side.

    Parameters
    ----------
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]
    elevation
        Shape (k,). [m]

    Returns
    -------
    FloatArray
        Δh, not below zero, shape (n, k). [m]

    Notes
    -----
    Δh = level − elevation where the opening discharges freely, the difference of levels where water on the
    protected side covers it [Torricelli].

    Examples
    --------
    >>> levels = np.array([3.0]), np.array([1.0])
    >>> head_across(*levels, np.array([0.0, 2.0, 4.0]))
    array([[2., 1., 0.]])
    """
    behind = np.maximum(protected_side[:, None], elevation)
    return np.asarray(np.maximum(flood_side[:, None] - behind, 0.0), dtype=np.float64)


def head_integral(
    flood_side: FloatArray,
    protected_side: FloatArray,
    bottom: FloatArray,
    top: FloatArray,
    exponent: float,
) -> FloatArray:
    """Integral of a power of the driving head over the height of an upright line.

    Parameters
    ----------
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]
    bottom, top
        Ends of the line, shape (k,). [m]
    exponent
        Power m, not below zero. [–]

    Returns
    -------
    FloatArray
        ∫ Δh^m dz, shape (n, k). [m^(m+1)]

    Raises
    ------
    OutsideFormulaError
        A top below its bottom, or a negative exponent.

    Notes
    -----
    Exact. With the drowned part ending at c, which is P held between bottom and top:
    (F − P)^m (c − bottom) + [(F − c)^(m+1) − ⟨F − top⟩^(m+1)] / (m + 1), F and P the levels, as the head is
    F − P all over the drowned part and falls as 1 to 1 with the elevation above it.

    Examples
    --------
    >>> dry = np.array([-np.inf])
    >>> head_integral(np.array([2.0]), dry, np.array([0.0]), np.array([1.0]), 1.0)
    array([[1.5]])
    """
    refuse_unless(top >= bottom, "top", "must not be below bottom")
    refuse_unless(np.asarray(exponent >= 0), "exponent", "must not be negative")
    F, P, m = flood_side[:, None], protected_side[:, None], exponent
    c = np.clip(P, bottom, top)
    covered = np.maximum(F - np.maximum(P, bottom), 0.0)
    drowned = np.where(covered > 0, covered**m, 0.0) * (c - bottom)
    free = np.maximum(F - c, 0.0) ** (m + 1) - np.maximum(F - top, 0.0) ** (m + 1)
    return np.asarray(drowned + free / (m + 1), dtype=np.float64)


def gap_flow(
    flood_side: FloatArray,
    protected_side: FloatArray,
    bottom: FloatArray,
    top: FloatArray,
    *,
    width: FloatArray,
    discharge_coefficient: float,
) -> FloatArray:
    """Flow through open gaps, as an orifice in every layer of their height [Torricelli].

    Parameters
    ----------
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]
    bottom, top, width
        Of each rectangular gap, shape (k,). [m]
    discharge_coefficient
        C_d; `SHARP_EDGED_ORIFICE` for sharp edges. [–]

    Returns
    -------
    FloatArray
        Q, shape (n, k). [m³/s]

    Raises
    ------
    OutsideFormulaError
        A negative width, a top below its bottom, or a coefficient outside 0 to 1.

    Notes
    -----
    Q = C_d b √(2g) ∫ √Δh dz, `head_integral` with m = 1/2: exact also where the flood level stands in the
    gap, and where the protected side covers part of it or all.

    Examples
    --------
    >>> dry, one = np.array([-np.inf]), np.array([1.0])
    >>> found = gap_flow(np.array([2.0]), dry, 0 * one, 0.1 * one, width=0.5 * one,
    ...                  discharge_coefficient=0.61)
    >>> found.round(4)
    array([[0.1886]])
    """
    refuse_unless(width >= 0, "width", "must not be negative")
    fits = 0 < discharge_coefficient <= 1
    refuse_unless(np.asarray(fits), "discharge_coefficient", "must be above 0 and at most 1")
    integral = head_integral(flood_side, protected_side, bottom, top, 0.5)
    factor = discharge_coefficient * (2 * STANDARD_GRAVITY) ** 0.5
    return np.asarray(factor * width * integral, dtype=np.float64)
