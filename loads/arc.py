"""Geometry of a circular arc between a bottom and a top edge."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.disc import between_chord_and_arc

_SLACK = 1e-9


def _both(metres: float) -> str:
    return f"{metres / 0.3048:.4g} ft ({metres:.4g} m)"


@dataclass(frozen=True, kw_only=True)
class ArcShape:
    """A circular arc that rises from its bottom edge to its top edge without turning back.

    Attributes
    ----------
    height
        Vertical distance from bottom edge to top edge. [m]
    offset
        How far the top edge lies toward the protected side. [m]
    radius
        Radius. [m]
    bulge
        +1 when the centre lies on the flood side, −1 when on the protected side: the arc stands at
        x = centre_x + bulge·√(radius² − (z − centre_z)²). [–]
    """

    height: float
    offset: float
    radius: float
    bulge: float

    @property
    def chord(self) -> float:
        """Straight distance from edge to edge. [m]."""
        return math.hypot(self.height, self.offset)

    @property
    def _reach(self) -> float:
        return math.sqrt(max(self.radius**2 - self.chord**2 / 4, 0.0))

    @property
    def centre_x(self) -> float:
        """Position of the centre from the bottom edge, positive toward the protected side. [m]."""
        return self.offset / 2 - self.bulge * self._reach * self.height / self.chord

    @property
    def centre_z(self) -> float:
        """Height of the centre above the bottom edge. [m]."""
        return self.height / 2 + self.bulge * self._reach * self.offset / self.chord

    def problem(self) -> str:
        """Say why no such arc can stand, in words that follow the value of the radius; empty when it can."""
        if self.radius < self.chord / 2 * (1 - 1e-12):
            return (
                "an arc of this radius cannot span from the bottom edge to the top edge: they are "
                f"{_both(self.chord)} apart, so the radius must be at least {_both(self.chord / 2)}"
            )
        slack = _SLACK * self.radius
        if min(-self.bulge * self.centre_x, self.bulge * (self.offset - self.centre_x)) < -slack:
            return (
                f"with its centre {_both(self.centre_z)} above the bottom edge the arc would run above its "
                "own top edge or below its own bottom edge; take a larger radius or a smaller offset"
            )
        return ""

    def x_at(self, height: float) -> float:
        """Position of the arc at a height above the bottom edge. [m]."""
        rise = height - self.centre_z
        return self.centre_x + self.bulge * math.sqrt(max(self.radius**2 - rise**2, 0.0))

    def run_and_prism(self, height: FloatArray) -> tuple[FloatArray, FloatArray]:
        """Position of the arc at a height, and the area between it and the vertical through its bottom edge.

        Parameters
        ----------
        height
            Above the bottom edge, from 0 to the arc's height, any shape. [m]

        Returns
        -------
        tuple of FloatArray
            x [m] and ∫x dy from the bottom edge up [m²], positive toward the protected side.

        Notes
        -----
        x = ±y (2 y_c − y) / (√(R² − (y − y_c)²) + |x_c|); the area is that of the triangle under the chord
        and of the segment between chord and arc. Neither loses digits on a nearly flat arc or near its bottom
        edge.
        """
        foot = max(-self.bulge * self.centre_x, 0.0)
        reach = np.sqrt(np.maximum(self.radius**2 - (height - self.centre_z) ** 2, 0.0)) + foot
        rising = height * (2 * self.centre_z - height)
        run = self.bulge * np.where(reach > 0, rising / np.where(reach > 0, reach, 1.0), 0.0)
        chord = np.hypot(height, run)
        aside = np.abs(self.centre_x * height - self.centre_z * run) / np.where(chord > 0, chord, 1.0)
        half_angle = np.arctan2(chord / 2, aside)
        segment = self.radius**2 * np.where(chord > 0, between_chord_and_arc(half_angle), 0.0)
        return run, height * run / 2 + self.bulge * segment
