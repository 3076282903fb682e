"""The states a line is computed for: still-water levels on both sides, many at once."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.records.scenario import Scenario

DRY = -np.inf
"""Level of a side with no water on it."""


@dataclass(frozen=True, kw_only=True)
class Levels:
    """Still-water elevations of n states.

    Attributes
    ----------
    flood_side, protected_side
        Shape (n,); `DRY` where there is no water. [m]
    """

    flood_side: FloatArray
    protected_side: FloatArray

    @property
    def states(self) -> int:
        """Number of states n."""
        return len(self.flood_side)

    def of(self, side: str) -> FloatArray:
        """Levels of one side, "flood" or "protected", shape (n,). [m]."""
        return self.flood_side if side == "flood" else self.protected_side


def levels_of(scenario: Scenario) -> Levels:
    """Levels entered in the scenario, as one state."""
    protected = scenario.water.protected_side
    return Levels(
        flood_side=np.array([scenario.water.flood_side.value]),
        protected_side=np.array([protected.value if protected else DRY]),
    )


def rising(flood_side: FloatArray, protected_side: float) -> Levels:
    """States with the given flood-side levels and one level on the protected side."""
    return Levels(flood_side=flood_side, protected_side=np.full(len(flood_side), protected_side))
