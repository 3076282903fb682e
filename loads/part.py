"""What one part of a barrier carries: a log, a post, a guide."""

from __future__ import annotations

from dataclasses import dataclass

from loads.arrays import FloatArray


@dataclass(frozen=True, kw_only=True)
class Figure:
    """One more figure of a part.

    Attributes
    ----------
    name
        Key by which it is printed, for example "base_moment".
    meaning
        In words.
    kind
        Kind of quantity.
    value
        Shape (n,), SI unit of the kind; NaN where it cannot be computed.
    """

    name: str
    meaning: str
    kind: str
    value: FloatArray


@dataclass(frozen=True, kw_only=True)
class Part:
    """One part of a barrier in n states, everything positive toward the protected side.

    Attributes
    ----------
    id
        For example "bay 1 log 1".
    kind
        "log", "post" or "guide".
    bottom, top
        Elevations of its ends. [m]
    line_load
        Of a log along its span; of a post or guide at its foot, shape (n,). [N/m]
    moment
        Bending moment of greatest magnitude, shape (n,). [N·m]
    shear
        Shear force of greatest magnitude, shape (n,). [N]
    reaction
        Of a log at each end; of a post or guide the whole force that it takes, shape (n,). [N]
    deflection
        Of greatest magnitude, shape (n,); NaN where the stiffness was not entered. [m]
    more
        Whatever else is known of it.
    """

    id: str
    kind: str
    bottom: float
    top: float
    line_load: FloatArray
    moment: FloatArray
    shear: FloatArray
    reaction: FloatArray
    deflection: FloatArray
    more: tuple[Figure, ...] = ()
