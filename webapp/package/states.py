"""The states of a package: the levels entered, the ends of their ranges, and a little more water."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.records.scenario import Scenario
from loads.states import DRY, Levels
from loads.units import to_si
from webapp.display import System

STEP_TEXTS: dict[System, str] = {"US": "1 ft", "SI": "0.3 m"}
"""How much more water the sensitivity row takes."""
_STEPS = {"US": to_si(1.0, "ft", "length"), "SI": to_si(0.3, "m", "length")}


@dataclass(frozen=True, kw_only=True)
class State:
    """One pair of levels.

    Attributes
    ----------
    name
        What it stands for.
    flood_side, protected_side
        Elevations; `DRY` without water. [m]
    """

    name: str
    flood_side: float
    protected_side: float


def package_states(scenario: Scenario) -> list[State]:
    """States of a package, the entered levels first.

    Examples
    --------
    >>> from loads.scenario_file import scenario_of
    >>> water = {"flood_side": {"value": "9 ft", "low": "8 ft", "high": "11 ft"}}
    >>> panel = {"id": "A", "bottom": "4 ft", "width": "3 ft", "height": "6 ft"}
    >>> scenario = scenario_of({"format": 1, "title": "T", "datum": "D", "water": water, "panel": [panel]})
    >>> [state.name for state in package_states(scenario)]
    ['as entered', 'flood side low', 'flood side high', 'flood side 1 ft higher']
    """
    flood, protected = scenario.water.flood_side, scenario.water.protected_side
    low_side = DRY if protected is None else protected.value
    states = [State(name="as entered", flood_side=flood.value, protected_side=low_side)]
    for end, text, value in (("low", flood.low_text, flood.low), ("high", flood.high_text, flood.high)):
        if text:
            states.append(State(name=f"flood side {end}", flood_side=value, protected_side=low_side))
    if protected is not None:
        ends = (("low", protected.low_text, protected.low), ("high", protected.high_text, protected.high))
        for end, text, value in ends:
            if text:
                states.append(
                    State(name=f"protected side {end}", flood_side=flood.value, protected_side=value)
                )
    more = State(
        name=f"flood side {STEP_TEXTS[scenario.units]} higher",
        flood_side=flood.value + _STEPS[scenario.units],
        protected_side=low_side,
    )
    return [*states, more]


def levels_of_states(states: list[State]) -> Levels:
    """States as the engine takes them."""
    return Levels(
        flood_side=np.array([state.flood_side for state in states]),
        protected_side=np.array([state.protected_side for state in states]),
    )
