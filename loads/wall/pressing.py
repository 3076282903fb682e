"""Pressure that grows in a straight line along straight edges: force and moment without a mesh."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray


@dataclass(frozen=True, kw_only=True)
class Push:
    """What presses on a run of edges, for n states.

    Attributes
    ----------
    horizontal, vertical
        Force parts, toward the protected side and up, shape (n,). [N/m]
    moment_horizontal, moment_vertical
        Their moments about the pivot, turning the top toward the protected side, shape (n,). [N·m/m]
    """

    horizontal: FloatArray
    vertical: FloatArray
    moment_horizontal: FloatArray
    moment_vertical: FloatArray


def wet_integrals(start: FloatArray, end: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Zeroth and first integral over 0 ≤ t ≤ 1 of a straight line, where it is above zero.

    Parameters
    ----------
    start, end
        Values at t = 0 and t = 1, any equal shapes.

    Returns
    -------
    tuple of FloatArray
        ∫⟨p⟩ dt and ∫⟨p⟩ t dt.

    Examples
    --------
    >>> wet_integrals(np.array([-1.0]), np.array([1.0]))
    (array([0.25]), array([0.20833333]))
    """
    span = start - end
    zero = np.divide(start, span, out=np.zeros_like(span), where=span != 0)
    begin = np.where(start >= 0, 0.0, zero)
    stop = np.where(end >= 0, 1.0, zero)
    first, last = np.maximum(start, 0.0), np.maximum(end, 0.0)
    length = np.where((start > 0) | (end > 0), stop - begin, 0.0)
    zeroth = length * (first + last) / 2
    return zeroth, zeroth * begin + length**2 * (first + 2 * last) / 6


def push_on_edges(
    x: FloatArray, z: FloatArray, start: FloatArray, end: FloatArray, pivot: tuple[FloatArray, FloatArray]
) -> Push:
    """Force and moment of pressure normal to edges, from outside.

    Parameters
    ----------
    x, z
        Corners along an outline that runs anticlockwise, shape (m, k), m = n or 1. [m]
    start, end
        Pressure at the two ends of each edge, shape (n, k − 1); nothing where it would be tension. [Pa]
    pivot
        Point (x, z) for moments, each (m,). [m]

    Returns
    -------
    Push
        Sums over the edges.

    Notes
    -----
    With an edge (Δx, Δz) the force is (−Δz, Δx)·∫p dt.
    """
    across, up = np.diff(x, axis=1), np.diff(z, axis=1)
    zeroth, first = wet_integrals(start, end)
    arm_x, arm_z = x[:, :-1] - pivot[0][:, None], z[:, :-1] - pivot[1][:, None]
    return Push(
        horizontal=-(up * zeroth).sum(axis=1),
        vertical=(across * zeroth).sum(axis=1),
        moment_horizontal=-(up * (arm_z * zeroth + up * first)).sum(axis=1),
        moment_vertical=-(across * (arm_x * zeroth + across * first)).sum(axis=1),
    )


def still_water_push(
    x: FloatArray,
    z: FloatArray,
    *,
    level: FloatArray,
    unit_weight: float,
    pivot: tuple[FloatArray, FloatArray],
) -> Push:
    """Force and moment of still water on edges; parameters as in `push_on_edges`, level (n,). [m]."""
    floor = z.min() - 1.0
    depth = np.where(np.isfinite(level), level, floor)[:, None] - z
    pressure = unit_weight * depth
    return push_on_edges(x, z, pressure[:, :-1], pressure[:, 1:], pivot)
