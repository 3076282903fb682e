"""Leakage through seal lines, summed over the heads that act along them, and all inflow against the pumps."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.closure.gap import head_across, head_integral
from loads.limits_of_use import LimitOfUse, OutsideFormulaError, refuse_unless

SEAL_EXPONENT: Final = LimitOfUse(
    quantity="exponent",
    low=0.5,
    high=1.0,
    unit="–",
    note="half for an opening, one for a slow seep; a seal that gives way as the head grows, more",
)


@dataclass(frozen=True, kw_only=True)
class SealRate:
    """What a metre of seal lets through, and how that depends on the head.

    Attributes
    ----------
    rate
        Flow through a metre of seal at the stated head. [m²/s]
    stated_head
        Head at which the rate was stated. [m]
    exponent
        Power of the head with which the rate grows; it must be entered, as none is right for every seal.
        [–]
    """

    rate: float
    stated_head: float
    exponent: float | None

    def power(self) -> float:
        """Return the exponent after a check of the whole rate.

        Raises
        ------
        OutsideFormulaError
            No exponent, a negative one or a negative rate, or a stated head that is not above zero.
        """
        refuse_unless(np.asarray(self.rate >= 0), "rate", "must not be negative")
        refuse_unless(np.asarray(self.stated_head > 0), "stated_head", "must be above zero")
        if self.exponent is None:
            raise OutsideFormulaError("exponent", "must be entered: no growth with the head suits every seal")
        refuse_unless(np.asarray(self.exponent >= 0), "exponent", "must not be negative")
        return self.exponent


def joint_leakage(
    flood_side: FloatArray,
    protected_side: FloatArray,
    elevation: FloatArray,
    length: FloatArray,
    seal: SealRate,
) -> FloatArray:
    """Leakage through level seal lines, each under its own head: sill seal and log joints [SealRate].

    Parameters
    ----------
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]
    elevation, length
        Of each line, shape (k,). [m]
    seal
        Rate of a metre and its dependence on the head.

    Returns
    -------
    FloatArray
        Shape (n, k). [m³/s]

    Raises
    ------
    OutsideFormulaError
        No exponent, or a negative length, rate or exponent.

    Notes
    -----
    q = rate (Δh / stated head)^m · length; none where Δh is zero.

    Examples
    --------
    >>> seal = SealRate(rate=1e-5, stated_head=1.0, exponent=0.5)
    >>> joint_leakage(np.array([4.0]), np.array([-np.inf]), np.array([0.0]), np.array([3.0]), seal)
    array([[6.e-05]])
    """
    m = seal.power()
    refuse_unless(length >= 0, "length", "must not be negative")
    head = head_across(flood_side, protected_side, elevation)
    rate = seal.rate * np.where(head > 0, (head / seal.stated_head) ** m, 0.0)
    return np.asarray(rate * length, dtype=np.float64)


def end_seal_leakage(
    flood_side: FloatArray,
    protected_side: FloatArray,
    bottom: FloatArray,
    top: FloatArray,
    seal: SealRate,
) -> FloatArray:
    """Leakage through upright seal lines: the ends of the logs in their guides [SealRate].

    Parameters
    ----------
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]
    bottom, top
        Ends of each line, shape (k,). [m]
    seal
        Rate of a metre and its dependence on the head.

    Returns
    -------
    FloatArray
        Shape (n, k). [m³/s]

    Raises
    ------
    OutsideFormulaError
        No exponent, a negative rate or exponent, or a top below its bottom.

    Notes
    -----
    ∫ rate (Δh / stated head)^m dz in closed form, `head_integral`.

    Examples
    --------
    >>> seal = SealRate(rate=1e-5, stated_head=1.0, exponent=1.0)
    >>> end_seal_leakage(np.array([2.0]), np.array([-np.inf]), np.array([0.0]), np.array([2.0]), seal)
    array([[2.e-05]])
    """
    m = seal.power()
    integral = head_integral(flood_side, protected_side, bottom, top, m)
    return np.asarray(seal.rate / seal.stated_head**m * integral, dtype=np.float64)


@dataclass(frozen=True, kw_only=True)
class Inflow:
    """All water that reaches the protected side, against what the pumps take.

    Attributes
    ----------
    parts
        Flow of each cause, shape (n,). [m³/s]
    total
        Their sum, shape (n,). [m³/s]
    ratio
        Total over the pump capacity, shape (n,); NaN when none was entered. [–]
    """

    parts: Mapping[str, FloatArray]
    total: FloatArray
    ratio: FloatArray


def inflow(parts: Mapping[str, FloatArray], pump_capacity: float | None) -> Inflow:
    """Sum what comes in and hold it against the pumps.

    Parameters
    ----------
    parts
        Flow of each cause, shape (n,): leakage, overflow, rain. At least one. [m³/s]
    pump_capacity
        As entered, or None. [m³/s]

    Returns
    -------
    Inflow
        The sum and its ratio to the capacity.

    Raises
    ------
    OutsideFormulaError
        No part, or a capacity that is not above zero.

    Examples
    --------
    >>> inflow({"sill seal": np.array([0.002]), "rain": np.array([0.004])}, 0.012).ratio.round(3)
    array([0.5])
    """
    refuse_unless(np.asarray(len(parts) > 0), "parts", "must name at least one flow")
    total = np.sum([np.asarray(flow, dtype=np.float64) for flow in parts.values()], axis=0)
    if pump_capacity is None:
        return Inflow(parts=parts, total=total, ratio=np.full_like(total, np.nan))
    refuse_unless(np.asarray(pump_capacity > 0), "pump_capacity", "must be above zero")
    return Inflow(parts=parts, total=total, ratio=total / pump_capacity)
