"""Parts of a circle to full accuracy, however thin: a disc's segment, the area from chord to arc."""

from __future__ import annotations

import numpy as np
from numpy.polynomial.polynomial import polyval

from loads.arrays import FloatArray

_THIN = 0.1
_TERMS = 18
_BINOMIAL = np.cumprod([1.0, *[(k - 1.5) / k for k in range(1, _TERMS)]])
"""Coefficients of √(1 − s) in powers of s: below `_THIN` the first one left out is less than 1e-19."""


def segment(chord: FloatArray, radius: float) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Area of a disc below a level chord, and its first and second moment about the disc's middle.

    Parameters
    ----------
    chord
        Height of the chord above the middle, within ±radius, any shape. [m]
    radius
        Radius of the disc. [m]

    Returns
    -------
    tuple of FloatArray
        A [m²], ∫t dA [m³] and ∫t² dA [m⁴], t measured up from the middle.

    Examples
    --------
    >>> [part.round(6) for part in segment(np.array([0.0]), 1.0)]
    [array([1.570796]), array([-0.666667]), array([0.392699])]
    """
    half = np.sqrt(np.maximum((radius + chord) * (radius - chord), 0.0))
    angle = np.arctan2(half, -chord)
    area = radius**2 * angle + chord * half
    second = (radius**4 * angle - chord * half * (radius**2 - 2 * chord**2)) / 4
    return area, -2 / 3 * half**3, second


def segment_moments(height: FloatArray, radius: float) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Area of a disc below a level chord, and its first and second moment about the disc's lowest point.

    Parameters
    ----------
    height
        Height of the chord above the lowest point, from 0 to the diameter, any shape. [m]
    radius
        Radius of the disc. [m]

    Returns
    -------
    tuple of FloatArray
        A [m²], ∫y dA [m³] and ∫y² dA [m⁴], y measured up from the lowest point.

    Notes
    -----
    Up to a tenth of the diameter the width 2√(2ry)·√(1 − y/2r) is integrated as a power series, because the
    closed form there is a difference of nearly equal numbers.

    Examples
    --------
    >>> [part.round(6) for part in segment_moments(np.array([2.0]), 1.0)]
    [array([3.141593]), array([3.141593]), array([3.926991])]
    """
    share = height / (2 * radius)
    lead = 2 * np.sqrt(2 * radius * height) * height
    thin = [
        lead * height**order * polyval(share, _BINOMIAL / (np.arange(_TERMS) + order + 1.5))
        for order in range(3)
    ]
    area, middle, second = segment(height - radius, radius)
    whole = (area, middle + radius * area, second + 2 * radius * middle + radius**2 * area)
    first, *rest = (
        np.where(share < _THIN, series, closed) for series, closed in zip(thin, whole, strict=True)
    )
    return first, rest[0], rest[1]


def between_chord_and_arc(half_angle: FloatArray) -> FloatArray:
    """Area between a chord and its arc of radius one, a − sin a·cos a for half the angle a that it spans.

    Parameters
    ----------
    half_angle
        From 0 to π/2, any shape. [rad]

    Returns
    -------
    FloatArray
        Area over radius squared, same shape. [–]

    Examples
    --------
    >>> between_chord_and_arc(np.array([np.pi / 2])).round(6)
    array([1.570796])
    """
    angle = 2 * half_angle
    square = angle**2
    series = (
        angle * square / 6 * (1 - square / 20 * (1 - square / 42 * (1 - square / 72 * (1 - square / 110))))
    )
    return np.where(angle < _THIN, series, angle - np.sin(angle)) / 2
