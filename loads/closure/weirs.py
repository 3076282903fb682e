"""Published formulas for the flow over a crest.

A head is the level over the crest, a crest height the crest over the ground on the flood side. Every formula
gives no flow where there is no head.
"""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import refuse_unless

FRANCIS_COEFFICIENT: Final = 3.33 * 0.3048**0.5 / (2 / 3 * (2 * STANDARD_GRAVITY) ** 0.5)
"""Discharge coefficient of a sharp crest, 3.33 ft^½/s of [Francis1855] as 2/3·C_d·√(2g): 0.623. [–]"""

_ROOT_G: Final = STANDARD_GRAVITY**0.5
_TWO_THIRDS_ROOT_TWO: Final = 2 / 3 * 2**0.5


def _no_flow_without_head(head: FloatArray, flow: FloatArray) -> FloatArray:
    return np.asarray(np.where(head > 0, flow, 0.0), dtype=np.float64)


def _over_crest_height(head: FloatArray, crest_height: FloatArray) -> FloatArray:
    refuse_unless(crest_height > 0, "crest_height", "must be above zero")
    return np.asarray(np.maximum(head, 0.0) / crest_height, dtype=np.float64)


def flow_rehbock(head: FloatArray, crest_height: FloatArray, width: FloatArray) -> FloatArray:
    """Flow over a sharp crest as wide as its approach [Rehbock1929].

    Free overfall, air under the nappe.

    Parameters
    ----------
    head
        Head over the crest h, shape (n, k) for k crests. [m]
    crest_height
        Crest over the ground P, shape (k,). [m]
    width
        Width b, shape (k,). [m]

    Returns
    -------
    FloatArray
        Flow Q, shape (n, k). [m³/s]

    Raises
    ------
    OutsideFormulaError
        A crest height that is not above zero.

    Notes
    -----
    Q = 2/3 √2 (0.602 + 0.0832 h/P) b √g (h + 0.00125 m)^1.5 as quoted by [Blevins1984]; for
    0.03 m < h < 0.75 m, b > 0.3 m, P > 0.3 m, h/P < 1.

    Examples
    --------
    >>> flow_rehbock(np.array([[0.3]]), np.array([0.4]), np.array([2.0])).round(6)
    array([[0.648686]])
    """
    ratio, h = _over_crest_height(head, crest_height), np.maximum(head, 0.0)
    flow = _TWO_THIRDS_ROOT_TWO * (0.602 + 0.0832 * ratio) * width * _ROOT_G * (h + 0.00125) ** 1.5
    return _no_flow_without_head(head, flow)


def flow_ackers(head: FloatArray, crest_height: FloatArray, width: FloatArray) -> FloatArray:
    """Flow over a sharp crest as wide as its approach [Ackers1978].

    Parameters, shapes, units and refusals as in `flow_rehbock`.

    Notes
    -----
    Q = 0.564 (1 + 0.150 h/P) b √g (h + 0.001 m)^1.5 as quoted by [Blevins1984]; for h > 0.02 m, P > 0.15 m,
    h/P ≤ 2.2.

    Examples
    --------
    >>> flow_ackers(np.array([[0.9]]), np.array([0.6]), np.array([5.0])).round(5)
    array([[9.25194]])
    """
    ratio, h = _over_crest_height(head, crest_height), np.maximum(head, 0.0)
    flow = 0.564 * (1 + 0.150 * ratio) * width * _ROOT_G * (h + 0.001) ** 1.5
    return _no_flow_without_head(head, flow)


def flow_kindsvater_carter(head: FloatArray, crest_height: FloatArray, width: FloatArray) -> FloatArray:
    """Flow over a sharp crest as wide as its approach [KindsvaterCarter1957].

    Parameters, shapes, units and refusals as in `flow_rehbock`.

    Notes
    -----
    Q = 2/3 √2 (0.602 + 0.075 h/P) (b − 0.001 m) √g (h + 0.001 m)^1.5; for h > 0.03 m, b > 0.15 m, P > 0.1 m,
    h/P < 2. From memory, to be confirmed, and so computed by an open library of the formula.

    Examples
    --------
    >>> flow_kindsvater_carter(np.array([[0.3]]), np.array([0.4]), np.array([2.0])).round(5)
    array([[0.64156]])
    """
    ratio, h = _over_crest_height(head, crest_height), np.maximum(head, 0.0)
    b = np.maximum(width - 0.001, 0.0)
    flow = _TWO_THIRDS_ROOT_TWO * (0.602 + 0.075 * ratio) * b * _ROOT_G * (h + 0.001) ** 1.5
    return _no_flow_without_head(head, flow)


def flow_kindsvater_carter_contracted(
    head: FloatArray, crest_height: FloatArray, width: FloatArray
) -> FloatArray:
    """Flow over a sharp crest much narrower than its approach [KindsvaterCarter1957].

    Parameters, shapes, units and refusals as in `flow_rehbock`.

    Notes
    -----
    Q = 0.554 (1 − 0.0035 h/P) (b + 0.0025 m) √g (h + 0.0001 m)^1.5 as quoted by [Blevins1984]; for
    h > 0.03 m, b > 0.15 m, P > 0.1 m, h/P < 2, and a width of at most a fifth of the approach. The
    authors add 0.001 m to the head (from memory, to be confirmed), which is 0.7 % more at a head of 0.2 m.

    Examples
    --------
    >>> flow_kindsvater_carter_contracted(np.array([[0.2]]), np.array([0.5]), np.array([1.0])).round(6)
    array([[0.155459]])
    """
    ratio, h = _over_crest_height(head, crest_height), np.maximum(head, 0.0)
    flow = 0.554 * (1 - 0.0035 * ratio) * (width + 0.0025) * _ROOT_G * (h + 0.0001) ** 1.5
    return _no_flow_without_head(head, flow)


def flow_sharp_crest(
    head: FloatArray, width: FloatArray, discharge_coefficient: float = FRANCIS_COEFFICIENT
) -> FloatArray:
    """Flow over a sharp crest with a coefficient that does not depend on the head [Francis1855].

    Parameters
    ----------
    head
        Head over the crest h, shape (n, k). [m]
    width
        Width b, shape (k,). [m]
    discharge_coefficient
        C_d. [–]

    Returns
    -------
    FloatArray
        Flow Q, shape (n, k). [m³/s]

    Raises
    ------
    OutsideFormulaError
        A coefficient that is not above zero.

    Notes
    -----
    Q = 2/3 C_d √(2g) b h^1.5.

    Examples
    --------
    >>> flow_sharp_crest(np.array([[1.0]]), np.array([1.0])).round(3)
    array([[1.838]])
    """
    refuse_unless(np.asarray(discharge_coefficient > 0), "discharge_coefficient", "must be above zero")
    factor = 2 / 3 * discharge_coefficient * (2 * STANDARD_GRAVITY) ** 0.5
    return np.asarray(factor * width * np.maximum(head, 0.0) ** 1.5, dtype=np.float64)


def flow_broad_crest(head: FloatArray, tail_head: FloatArray, width: FloatArray) -> FloatArray:
    """Flow over a broad crest, free or drowned, without losses [Belanger1828].

    The depth on the crest is critical, or the level behind where that is higher.

    Parameters
    ----------
    head
        Head over the crest on the flood side H, shape (n, k). [m]
    tail_head
        Head over the crest on the protected side, not below zero, shape (n, k). [m]
    width
        Width b, shape (k,). [m]

    Returns
    -------
    FloatArray
        Flow Q, shape (n, k); none where the protected side is as high. [m³/s]

    Notes
    -----
    Q = b d √(2g (H − d)) with d = 2/3 H, or the tail head where that is more. Free: Q = (2/3)^1.5 √g b H^1.5,
    which is 1.705 b H^1.5 in metres and seconds. Level water ahead of the crest: H is the energy head.

    Examples
    --------
    >>> flow_broad_crest(np.array([[1.0, 1.0]]), np.array([[0.0, 1.0]]), np.array([1.0, 1.0])).round(3)
    array([[1.705, 0.   ]])
    """
    H = np.maximum(head, 0.0)
    depth = np.maximum(2 / 3 * H, tail_head)
    speed = np.sqrt(2 * STANDARD_GRAVITY * np.maximum(H - depth, 0.0))
    return _no_flow_without_head(head, width * depth * speed)


def drowning_factor(head: FloatArray, tail_head: FloatArray) -> FloatArray:
    """Share of the free flow over a sharp crest left when water stands above it behind [Villemonte1947].

    From memory, to be confirmed.

    Parameters
    ----------
    head, tail_head
        Heads over the crest on the flood and the protected side, shape (n, k). [m]

    Returns
    -------
    FloatArray
        Share of the free flow, 1 where the tail head is not above zero, shape (n, k). [–]

    Notes
    -----
    Q/Q_free = (1 − (h_tail/h)^1.5)^0.385.

    Examples
    --------
    >>> drowning_factor(np.array([[1.0, 1.0]]), np.array([[0.0, 0.5]])).round(3)
    array([[1.   , 0.845]])
    """
    h, tail = np.maximum(head, 0.0), np.maximum(tail_head, 0.0)
    drowned = np.where(h > 0, np.minimum(tail, h) / np.where(h > 0, h, 1.0), tail > 0)
    return np.asarray((1 - drowned**1.5) ** 0.385, dtype=np.float64)
