"""Sliding of a wall on a level plane: factors by a stated definition, and their band over the friction."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray

DEFINITION = (
    "factor = (N·tan δ + c·L + P)/T: N compression on the plane with uplift taken off, c adhesion over the "
    "compressed length L, P the share of passive resistance relied on, T all other horizontal force"
)
"""The one definition of the sliding factor used here, printed with every factor."""


def sliding_factor(
    *,
    normal: FloatArray,
    coefficient: FloatArray,
    adhesion: FloatArray,
    length: FloatArray,
    passive: FloatArray,
    driving: FloatArray,
) -> FloatArray:
    """Resistance to sliding over the force that drives it [EM2100].

    Parameters
    ----------
    normal
        Compression on the plane with uplift taken off, shape (n,). [N/m]
    coefficient
        Friction coefficient tan δ, shape (n,) or (1,). [–]
    adhesion
        Shear strength of the plane without compression, shape (n,) or (1,). [Pa]
    length
        Over which the plane is compressed, shape (n,) or (1,). [m]
    passive
        Passive resistance relied on toward the flood side, not negative, shape (n,) or (1,). [N/m]
    driving
        Horizontal force without passive resistance, positive toward the protected side, shape (n,). [N/m]

    Returns
    -------
    FloatArray
        Factor, shape (n,); infinite where nothing drives, nil where nothing presses. [–]

    Notes
    -----
    F = (N tan δ + c L + P) / |T|, eq. 3-1 of the manual with P added. Passive resistance counts only against
    a push toward the protected side.

    Examples
    --------
    >>> nil = np.zeros(1)
    >>> sliding_factor(normal=np.array([47.0]), coefficient=np.array([0.5]), adhesion=nil, length=nil,
    ...     passive=nil, driving=np.array([15.9])).round(3)
    array([1.478])
    """
    resisting = np.maximum(normal, 0.0) * coefficient + adhesion * np.where(normal > 0, length, 0.0)
    resisting = resisting + np.where(driving > 0, passive, 0.0)
    force = np.abs(driving)
    shape = np.broadcast(resisting, force).shape
    with np.errstate(over="ignore"):
        return np.asarray(np.divide(resisting, force, out=np.full(shape, np.inf), where=force > 0))


@dataclass(frozen=True, kw_only=True)
class Friction:
    """Low, stated and high value of friction and adhesion of a plane. [–, Pa]."""

    low: float
    value: float
    high: float
    adhesion_low: float
    adhesion: float
    adhesion_high: float


@dataclass(frozen=True, kw_only=True)
class SlidingBand:
    """Sliding factors over the range of friction, for n states.

    Attributes
    ----------
    plane
        Which plane.
    normal
        Compression with uplift taken off, shape (n,). [N/m]
    driving
        Horizontal force without passive resistance, shape (n,). [N/m]
    passive
        Passive resistance relied on, shape (n,). [N/m]
    factor
        With the stated friction and uplift, shape (n,). [–]
    low, high
        With low and high friction and adhesion, and uplift, shape (n,). [–]
    low_without_uplift, high_without_uplift
        The same as if no water pressed under the base, shape (n,). [–]
    """

    plane: str
    normal: FloatArray
    driving: FloatArray
    passive: FloatArray
    factor: FloatArray
    low: FloatArray
    high: FloatArray
    low_without_uplift: FloatArray
    high_without_uplift: FloatArray


def sliding_band(
    plane: str,
    friction: Friction,
    *,
    normal: FloatArray,
    dry_normal: FloatArray,
    driving: FloatArray,
    passive: FloatArray,
    length: FloatArray,
    width: FloatArray,
) -> SlidingBand:
    """Band of sliding factors; lengths and forces as in `sliding_factor`, `dry_normal` without uplift."""

    def factor(coefficient: float, adhesion: float, force: FloatArray, reach: FloatArray) -> FloatArray:
        return sliding_factor(
            normal=force,
            coefficient=np.array([coefficient]),
            adhesion=np.array([adhesion]),
            length=reach,
            passive=passive,
            driving=driving,
        )

    return SlidingBand(
        plane=plane,
        normal=normal,
        driving=driving,
        passive=passive,
        factor=factor(friction.value, friction.adhesion, normal, length),
        low=factor(friction.low, friction.adhesion_low, normal, length),
        high=factor(friction.high, friction.adhesion_high, normal, length),
        low_without_uplift=factor(friction.low, friction.adhesion_low, dry_normal, width),
        high_without_uplift=factor(friction.high, friction.adhesion_high, dry_normal, width),
    )
