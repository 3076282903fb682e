"""The elevation axis that all views of a drawing share."""

from __future__ import annotations

import math
from dataclasses import dataclass

from loads.units import to_si
from webapp.display import CHOICES, System, fixed, in_unit


@dataclass(frozen=True, kw_only=True)
class Scale:
    """Elevation against height on the sheet.

    Attributes
    ----------
    low, high
        Elevations at the lower and the upper end. [m]
    lower, upper
        Where these are on the sheet, y running down. [px]
    """

    low: float
    high: float
    lower: float
    upper: float

    @property
    def per_metre(self) -> float:
        """Pixels to a metre."""
        return (self.lower - self.upper) / (self.high - self.low)

    def y(self, z: float) -> float:
        """Place of an elevation, also beyond the ends. [px]."""
        return self.lower - (z - self.low) * self.per_metre

    def clamped(self, z: float) -> float:
        """Place of an elevation, or the nearest end. [px]."""
        return self.y(min(max(z, self.low), self.high))

    def holds(self, z: float) -> bool:
        """Whether an elevation lies within the ends."""
        return self.low <= z <= self.high


def ticks(scale: Scale, system: System, most: int) -> list[tuple[float, str]]:
    """Elevations of an axis, round in the unit shown, 1, 2 or 5 of a power of ten apart, with labels.

    Parameters
    ----------
    scale
        The axis.
    system
        "US" or "SI".
    most
        Not more than about so many.
    """
    low, high = (in_unit(z, "elevation", system) for z in (scale.low, scale.high))
    rough = (high - low) / most
    power = 10.0 ** math.floor(math.log10(rough))
    step = next(power * factor for factor in (1, 2, 5, 10) if power * factor >= rough * (1 - 1e-9))
    decimals = max(0, -math.floor(math.log10(step) + 1e-9))
    unit = CHOICES[system]["elevation"].unit
    return [
        (to_si(count * step, unit, "length"), fixed(count * step, decimals))
        for count in range(math.ceil(low / step - 1e-9), math.floor(high / step + 1e-9) + 1)
    ]
