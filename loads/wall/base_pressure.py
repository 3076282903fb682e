"""The resultant on a base without tension: where it acts, how much of the base it presses, how hard."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray


@dataclass(frozen=True, kw_only=True)
class BasePressure:
    """What the base passes to the ground, for n states.

    Attributes
    ----------
    normal
        Compression between base and ground, uplift taken off, shape (n,). [N/m]
    from_toe
        Distance of the resultant from the toe; NaN where nothing presses, shape (n,). [m]
    eccentricity
        Distance of the resultant from the middle, positive toward the toe, shape (n,). [m]
    compressed
        Share of the base in compression, shape (n,). [–]
    linear_toe, linear_heel
        Pressures at the two ends of a straight line over the whole base, tension negative, shape (n,). [Pa]
    toe, heel
        Pressures at the two ends without tension, shape (n,). [Pa]
    peak
        Greatest pressure without tension; infinite where the resultant leaves the base, shape (n,). [Pa]
    """

    normal: FloatArray
    from_toe: FloatArray
    eccentricity: FloatArray
    compressed: FloatArray
    linear_toe: FloatArray
    linear_heel: FloatArray
    toe: FloatArray
    heel: FloatArray
    peak: FloatArray


def base_pressure(normal: FloatArray, moment: FloatArray, width: FloatArray) -> BasePressure:
    """Pressure under a rectangular strip that bears no tension.

    Parameters
    ----------
    normal
        Downward force on the base less uplift, shape (n,). [N/m]
    moment
        Of all forces about the toe, positive when it turns the top toward the protected side, shape (n,).
        [N·m/m]
    width
        Of the base, shape (n,) or (1,). [m]

    Returns
    -------
    BasePressure

    Notes
    -----
    x = −M/N from the toe, e = B/2 − x. Straight line: q = N/B·(1 ± 6e/B). Without tension, where |e| > B/6:
    compressed length 3·min(x, B − x), q = 2N over it. Where N ≤ 0 or the resultant leaves the base nothing
    is compressed.

    Examples
    --------
    >>> found = base_pressure(np.array([120e3]), np.array([-120e3 * 0.7]), np.array([2.5]))
    >>> found.peak.round(1), found.compressed.round(4)
    (array([114285.7]), array([0.84]))
    """
    presses = normal > 0
    divisor = np.where(presses, normal, 1.0)
    place = np.where(presses, -moment / divisor, np.nan)
    eccentricity = width / 2 - place
    near = np.minimum(place, width - place)
    compressed = np.where(presses, np.clip(3 * near / width, 0.0, 1.0), 0.0)
    mean, tilt = normal / width, 6 * np.where(presses, eccentricity, 0.0) / width
    whole = compressed >= 1
    stands = compressed > 0
    length = np.where(stands, compressed, 1.0) * width
    triangle = np.where(stands, 2 * np.where(presses, normal, 0.0) / length, np.inf)
    to_toe = place < width / 2
    ends = [
        np.where(whole, mean * (1 + sign * tilt), np.where(stands & side, triangle, 0.0))
        for sign, side in ((1, to_toe), (-1, ~to_toe))
    ]
    peak = np.where(presses, np.where(whole, mean * (1 + np.abs(tilt)), triangle), 0.0)
    return BasePressure(
        normal=normal,
        from_toe=place,
        eccentricity=eccentricity,
        compressed=compressed,
        linear_toe=mean * (1 + tilt),
        linear_heel=mean * (1 - tilt),
        toe=ends[0],
        heel=ends[1],
        peak=peak,
    )


def open_lengths(found: BasePressure, width: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Lengths of the base out of compression at the heel and at the toe, each (n,). [m]."""
    gap = (1 - found.compressed) * width
    nothing = np.zeros_like(gap)
    at_heel = ~(found.from_toe > width / 2)
    return np.where(at_heel, gap, nothing), np.where(at_heel, nothing, gap)


def toe_stresses(
    pressure: FloatArray, slope: FloatArray, outside: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Greatest principal stress and shear stress at the toe of a gravity wall.

    Parameters
    ----------
    pressure
        Normal pressure on the base at the toe, shape (n,). [Pa]
    slope
        Angle between the protected-side face and the vertical, shape (n,). [rad]
    outside
        Pressure of water on that face at the toe, shape (n,). [Pa]

    Returns
    -------
    tuple of FloatArray
        p sec²φ − p′ tan²φ and (p − p′) tan φ, each (n,). [Pa]

    Examples
    --------
    >>> toe_stresses(np.array([100.0]), np.arctan([0.5]), np.zeros(1))
    (array([125.]), array([50.]))
    """
    tangent = np.tan(slope)
    return pressure * (1 + tangent**2) - outside * tangent**2, (pressure - outside) * tangent
