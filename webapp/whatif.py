"""Neighbouring states of the one on the page: low, high, one more foot, a range of levels."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.quantity import Quantity
from loads.records.scenario import Scenario
from loads.states import DRY, Levels
from webapp.display import System, elevation

ONE_MORE: dict[System, tuple[float, str]] = {"US": (0.3048, "one more foot"), "SI": (0.3, "0.3 m more")}
"""The step that people ask about in each system: metres and words."""


@dataclass(frozen=True, kw_only=True)
class Neighbours:
    """States to compute together, the present one first.

    Attributes
    ----------
    labels
        What each state is.
    levels
        Their levels.
    """

    labels: tuple[str, ...]
    levels: Levels


def neighbours(scenario: Scenario, system: System) -> Neighbours:
    """Present state, one more foot, and the low and high ends of stated ranges."""
    flood, protected = scenario.water.flood_side, scenario.water.protected_side
    behind = protected.value if protected else DRY
    more, words = ONE_MORE[system]
    states = [
        ("as entered", flood.value, behind),
        (f"{words} on the flood side", flood.value + more, behind),
        *_ends("flood side", flood, system, lambda value: (value, behind)),
    ]
    if protected:
        states += _ends("protected side", protected, system, lambda value: (flood.value, value))
    labels, front, back = zip(*states, strict=True)
    return Neighbours(labels=labels, levels=Levels(flood_side=np.array(front), protected_side=np.array(back)))


def _ends(side: str, level: Quantity, system: System, place: object) -> list[tuple[str, float, float]]:
    assert callable(place)
    ends = (("low", level.low, level.low_text), ("high", level.high, level.high_text))
    return [
        (f"{side} {end}, {elevation(value, system)}", *place(value)) for end, value, typed in ends if typed
    ]
