"""Closed forms of seepage under a floor with a cutoff: creep, key points, exit gradient, heave.

Lengths are along the line of creep or as drawn; heads are above the exit. These are for screening: uniform
ground, steady flow, no layers. Out of range raises `loads.limits_of_use.OutsideFormulaError`.
"""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import refuse_unless

LANE_RATIOS: dict[str, float] = {
    "very fine sand or silt": 8.5,
    "fine sand": 7.0,
    "medium sand": 6.0,
    "coarse sand": 5.0,
    "fine gravel": 4.0,
    "medium gravel": 3.5,
    "coarse gravel including cobbles": 3.0,
    "boulders with some cobbles and gravel": 2.5,
    "soft clay": 3.0,
    "medium clay": 2.0,
    "hard clay": 1.8,
    "very hard clay or hardpan": 1.6,
}
"""Least weighted creep ratio by material [Lane1935]; from memory, to be confirmed. [–]"""


def creep_head(head: FloatArray, passed: FloatArray, whole: FloatArray) -> FloatArray:
    """Head left on a line of creep [Bligh1910].

    Parameters
    ----------
    head
        Head between the two ends, shape (n,). [m]
    passed, whole
        Length passed and whole length, shape (n,). [m]

    Returns
    -------
    FloatArray
        h = H (1 − l/L), shape (n,). [m]

    Examples
    --------
    >>> creep_head(np.array([4.0]), np.array([18.0]), np.array([50.0]))
    array([2.56])
    """
    refuse_unless(whole > 0, "whole", "must be more than nothing")
    return np.asarray(head * (1 - passed / whole))


def weighted_creep_ratio(vertical: FloatArray, horizontal: FloatArray, head: FloatArray) -> FloatArray:
    """Weighted creep ratio [Lane1935].

    Parameters
    ----------
    vertical, horizontal
        Sums of the lengths of contact steeper than 45° and flatter, shape (n,). [m]
    head
        Difference of head, shape (n,). [m]

    Returns
    -------
    FloatArray
        (ΣL_v + ΣL_h/3)/ΔH, shape (n,); infinite without a difference. [–]

    Examples
    --------
    >>> weighted_creep_ratio(np.array([5.0]), np.array([4.5]), np.array([1.2])).round(3)
    array([5.417])
    """
    length = vertical + horizontal / 3
    with np.errstate(over="ignore"):
        return np.asarray(np.divide(length, head, out=np.full_like(head, np.inf), where=head > 0))


def critical_gradient(submerged_unit_weight: FloatArray, water_unit_weight: FloatArray) -> FloatArray:
    """Upward gradient at which soil loses its weight, i_c = γ′/γ_w [Terzaghi1943].

    Parameters
    ----------
    submerged_unit_weight, water_unit_weight
        Shape (n,). [N/m³]

    Examples
    --------
    >>> critical_gradient(np.array([9810.0]), np.array([9810.0]))
    array([1.])
    """
    refuse_unless(water_unit_weight > 0, "water_unit_weight", "must be above zero")
    return np.asarray(submerged_unit_weight / water_unit_weight)


def effective_stress_upward(
    depth: FloatArray,
    submerged_unit_weight: FloatArray,
    gradient: FloatArray,
    water_unit_weight: FloatArray,
) -> FloatArray:
    """Vertical effective stress under level ground with upward seepage, z (γ′ − i γ_w) [Terzaghi1943].

    Parameters
    ----------
    depth
        Below the ground, shape (n,). [m]
    submerged_unit_weight, water_unit_weight
        Shape (n,). [N/m³]
    gradient
        Upward hydraulic gradient, shape (n,). [–]

    Returns
    -------
    FloatArray
        Shape (n,); negative where the soil floats. [Pa]

    Examples
    --------
    >>> effective_stress_upward(np.ones(1), np.array([10e3]), np.array([0.5]), np.array([9.81e3]))
    array([5095.])
    """
    return np.asarray(depth * (submerged_unit_weight - gradient * water_unit_weight))


def heave_factor(
    depth: FloatArray,
    submerged_unit_weight: FloatArray,
    mean_head: FloatArray,
    water_unit_weight: FloatArray,
) -> FloatArray:
    """Factor against heave of the prism beside a cutoff, D γ′/(γ_w h_a) [Terzaghi1943].

    Parameters
    ----------
    depth
        Of the cutoff below the ground where water leaves, shape (n,). [m]
    submerged_unit_weight, water_unit_weight
        Shape (n,). [N/m³]
    mean_head
        Mean head above the exit at the bottom of the prism, shape (n,). [m]

    Examples
    --------
    >>> heave_factor(np.array([20.0]), np.array([49.6]), np.array([0.357 * 25.5]), np.array([62.4])).round(3)
    array([1.746])
    """
    refuse_unless(mean_head > 0, "mean_head", "must be above zero")
    return np.asarray(depth * submerged_unit_weight / (water_unit_weight * mean_head))


def key_point_heads(upstream: FloatArray, downstream: FloatArray, depth: FloatArray) -> FloatArray:
    """Shares of head at a cutoff under a thin level floor on deep uniform ground [Khosla1936].

    Parameters
    ----------
    upstream, downstream
        Length of floor on either side of the cutoff, shape (n,). [m]
    depth
        Of the cutoff below the floor, shape (n,). [m]

    Returns
    -------
    FloatArray
        Shape (n, 3): upstream face at the floor (E), tip (D), downstream face at the floor (C). [–]

    Notes
    -----
    φ = acos((λ₁ + s)/λ)/π with s = −1, 0, +1, λ = (s₁ + s₂)/2, λ₁ = (s₁ − s₂)/2, s_i = √(1 + (b_i/d)²).

    Examples
    --------
    >>> key_point_heads(np.array([10.0]), np.zeros(1), np.array([4.0])).round(4)
    array([[0.5265, 0.3484, 0.    ]])
    """
    refuse_unless(depth > 0, "depth", "must be above zero")
    root_in, root_out = np.sqrt(1 + (upstream / depth) ** 2), np.sqrt(1 + (downstream / depth) ** 2)
    mean, half = ((root_in + root_out) / 2)[:, None], ((root_in - root_out) / 2)[:, None]
    side = np.array([-1.0, 0.0, 1.0])
    return np.asarray(np.arccos(np.clip((half + side) / mean, -1, 1)) / np.pi)


def interference_correction(
    own_depth: FloatArray, other_depth: FloatArray, between: FloatArray, floor: FloatArray
) -> FloatArray:
    """Change of the share of head at a cutoff by another one [Khosla1936].

    Parameters
    ----------
    own_depth, other_depth
        Of the two cutoffs, shape (n,). [m]
    between
        Distance between them, shape (n,). [m]
    floor
        Whole length of the floor, shape (n,). [m]

    Returns
    -------
    FloatArray
        0.19 √(D/b′) (d + D)/b, shape (n,). [–]

    Examples
    --------
    >>> interference_correction(np.array([8.0]), np.array([8.0]), np.array([50.0]), np.array([50.0]))
    array([0.02432])
    """
    return np.asarray(0.19 * np.sqrt(other_depth / between) * (own_depth + other_depth) / floor)


def exit_gradient_floor(head: FloatArray, floor: FloatArray, depth: FloatArray) -> FloatArray:
    """Exit gradient at a cutoff that ends a floor, on deep uniform ground [Khosla1936].

    Parameters
    ----------
    head
        Difference of head, shape (n,). [m]
    floor
        Length of floor upstream of the cutoff, nil for a cutoff alone, shape (n,). [m]
    depth
        Of the cutoff below the ground where water leaves, shape (n,). [m]

    Returns
    -------
    FloatArray
        H/(π d √λ), λ = (1 + √(1 + (b/d)²))/2, shape (n,); infinite without a cutoff. [–]

    Examples
    --------
    >>> exit_gradient_floor(np.array([5.0]), np.array([50.0]), np.array([8.0])).round(4)
    array([0.1039])
    """
    deep = depth > 0
    divisor = np.where(deep, depth, 1.0)
    lam = (1 + np.sqrt(1 + (floor / divisor) ** 2)) / 2
    return np.where(head <= 0, 0.0, np.where(deep, head / (np.pi * divisor * np.sqrt(lam)), np.inf))


def exit_gradient_layer(head: FloatArray, depth: FloatArray, layer: FloatArray) -> FloatArray:
    """Exit gradient at a cutoff alone in a layer of finite depth [Harr1962].

    Parameters
    ----------
    head
        Difference of head, shape (n,). [m]
    depth
        Of the cutoff, above zero and less than the layer's, shape (n,). [m]
    layer
        Depth of the layer to where no water passes, shape (n,). [m]

    Returns
    -------
    FloatArray
        π H/(4 K T m), m = sin(π s/2T), K the complete elliptic integral of modulus m, shape (n,). [–]

    Examples
    --------
    >>> exit_gradient_layer(np.array([3.0]), np.array([4.0]), np.array([8.0])).round(6)
    array([0.224651])
    """
    refuse_unless((depth > 0) & (depth < layer), "depth", "must be above zero and less than the layer's")
    modulus = np.sin(np.pi * depth / (2 * layer))
    return np.asarray(np.pi * head / (4 * _elliptic_k(modulus) * layer * modulus))


def _elliptic_k(modulus: FloatArray) -> FloatArray:
    """Complete elliptic integral of the first kind by the arithmetic-geometric mean."""
    larger, smaller = np.ones_like(modulus), np.sqrt(1 - modulus**2)
    for _ in range(12):
        larger, smaller = (larger + smaller) / 2, np.sqrt(larger * smaller)
    return np.asarray(np.pi / (2 * larger))
