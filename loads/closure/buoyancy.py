"""Buoyancy of the submerged logs of a stack against their weight and the hold-downs."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal, TypeAlias

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import refuse_unless

Filling: TypeAlias = Literal["solid", "closed", "fills"]
"""Solid; hollow with sealed ends; hollow, and water stands inside as high as outside."""


def displaced_area(filling: Filling, gross_area: float, material_area: float) -> float:
    """Area of a log's section that keeps water out [Archimedes].

    Parameters
    ----------
    filling
        Solid, closed, or one that fills.
    gross_area
        Area within the outline of the section. [m²]
    material_area
        Area of the material itself; the gross area of a solid log. [m²]

    Returns
    -------
    float
        The material of a log that fills, all within the outline otherwise. [m²]

    Raises
    ------
    OutsideFormulaError
        An area that is not above zero, or more material than the outline holds.

    Notes
    -----
    A log that fills does so slowly where its holes are small: until then it floats as a closed one.

    Examples
    --------
    >>> displaced_area("fills", 0.02, 0.004)
    0.004
    """
    refuse_unless(np.asarray(gross_area > 0), "gross_area", "must be above zero")
    fits = 0 < material_area <= gross_area
    refuse_unless(np.asarray(fits), "material_area", "must be above zero and at most the gross area")
    return material_area if filling == "fills" else gross_area


def buoyancy(
    level: FloatArray,
    bottom: FloatArray,
    height: FloatArray,
    area: FloatArray,
    *,
    length: FloatArray,
    unit_weight: FloatArray,
) -> FloatArray:
    """Upward force of the water on each log of a stack [Archimedes].

    Water stands at the level all round each log, under it too: the greatest uplift there can be.

    Parameters
    ----------
    level
        Level of the water, shape (n,); minus infinity where dry. [m]
    bottom, height
        Of each log, shape (k,). [m]
    area
        Section that keeps water out, `displaced_area`, shape (k,). [m²]
    length
        Shape (k,). [m]
    unit_weight
        Of the water, shape (n,). [N/m³]

    Returns
    -------
    FloatArray
        Upward, shape (n, k). [N]

    Raises
    ------
    OutsideFormulaError
        A height that is not above zero, or a negative area, length or unit weight.

    Notes
    -----
    B = γ A L · submerged share of the height. Exact for a log wholly in or out of the water and for a
    rectangle; of a log that fills, the one at the level is taken as if its material were spread over its
    height.

    Examples
    --------
    >>> bottom, height, area = np.array([0.0]), np.array([0.2]), np.array([0.02])
    >>> buoyancy(np.array([0.1, 1.0]), bottom, height, area, length=np.array([3.0]),
    ...          unit_weight=np.full(2, 9810.0))
    array([[294.3],
           [588.6]])
    """
    refuse_unless(height > 0, "height", "must be above zero")
    for quantity, value in (("area", area), ("length", length), ("unit_weight", unit_weight)):
        refuse_unless(value >= 0, quantity, "must not be negative")
    submerged = np.clip((level[:, None] - bottom) / height, 0.0, 1.0)
    return np.asarray(unit_weight[:, None] * area * length * submerged, dtype=np.float64)


@dataclass(frozen=True, kw_only=True)
class Flotation:
    """Whether a stack stays down, in n states.

    Attributes
    ----------
    from_log
        Uplift less weight of each log and all above it, positive when they would rise without a
        hold-down, shape (n, k), from the bottom log up. [N]
    net_uplift
        The greatest of these less the hold-downs, positive when they do not suffice, shape (n,). [N]
    hold_down_demand
        What the hold-downs must carry, not below zero, shape (n,). [N]
    rises_from
        Index of the log from which up the stack is most ready to rise, shape (n,).
    """

    from_log: FloatArray
    net_uplift: FloatArray
    hold_down_demand: FloatArray
    rises_from: np.ndarray[tuple[int, ...], np.dtype[np.intp]]


def flotation(upward: FloatArray, weight: FloatArray, hold_down: float) -> Flotation:
    """Uplift of a stack against its weight and hold-downs [Archimedes].

    A log can rise only together with all logs above it, so every upper part of the stack is looked at: light
    logs may lift heavier ones that lie on them, and heavy logs below hold nothing down. Friction in the
    guides is left out.

    Parameters
    ----------
    upward
        Buoyancy of each log from the bottom up, shape (n, k), at least one. [N]
    weight
        Of each log, shape (k,). [N]
    hold_down
        Force with which the top log is held, zero when it is not. [N]

    Returns
    -------
    Flotation
        For every upper part and for the one most ready to rise.

    Raises
    ------
    OutsideFormulaError
        No log, a negative weight or a negative hold-down.

    Examples
    --------
    >>> found = flotation(np.array([[500.0, 100.0]]), np.array([250.0, 250.0]), 80.0)
    >>> found.from_log, found.net_uplift
    (array([[ 100., -150.]]), array([20.]))
    """
    refuse_unless(np.asarray(weight.size > 0), "weight", "must be given for at least one log")
    refuse_unless(weight >= 0, "weight", "must not be negative")
    refuse_unless(np.asarray(hold_down >= 0), "hold_down", "must not be negative")
    net = upward - weight
    from_log = np.cumsum(net[:, ::-1], axis=1)[:, ::-1]
    worst = from_log.max(axis=1)
    return Flotation(
        from_log=from_log,
        net_uplift=worst - hold_down,
        hold_down_demand=np.maximum(worst, 0.0),
        rises_from=from_log.argmax(axis=1),
    )
