"""What a field sheet tells a crew to build, and the same closure computed as it will then stand."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property
from typing import Literal

import numpy as np

from loads.assessment import Assessed, AssessedClosure, Assessment, Withheld, assess
from loads.closure.layout import Layout
from loads.closure.logs_needed import SAME_LEVEL, LogsNeeded
from loads.problems import SillheadError
from loads.records.closure import Closure
from loads.states import Levels
from loads.units import to_si
from webapp.display import System

Stamp = Literal["actual", "exercise", "draft"]
STAMPS: tuple[Stamp, ...] = ("actual", "exercise", "draft")
"""What a sheet may be stamped; there is no sheet without one of them."""

CALL_BELOW: dict[System, tuple[str, float]] = {
    "US": ("1 ft", to_si(1.0, "ft", "length")),
    "SI": ("0.3 m", to_si(0.3, "m", "length")),
}
"""How far below the rated level the engineer is called, in words and in metres."""


class SheetError(SillheadError):
    """A field sheet that cannot be made; the message is for the person who asked for it."""


@dataclass(frozen=True, kw_only=True)
class Plan:
    """One closure as the sheet has it built.

    Attributes
    ----------
    found
        The closure as entered, at the levels now.
    built
        The same with the logs to fit in place, where these are more: now, then at the rated level when
        there is one.
    fit
        Logs that are to stand in each bay now.
    system
        Units.
    """

    found: AssessedClosure
    built: AssessedClosure
    fit: tuple[int, ...]
    system: System

    @property
    def closure(self) -> Closure:
        """The record as entered."""
        return self.found.record

    @property
    def layout(self) -> Layout:
        """Layout of the closure as built."""
        return self.built.structure.layout

    @property
    def needed(self) -> LogsNeeded:
        """Logs that the level asks for."""
        return self.found.hydraulics.needed

    @property
    def water(self) -> float:
        """Flood-side level now. [m]."""
        return float(self.found.levels.flood_side[0])

    @property
    def protected(self) -> float:
        """Protected-side level now. [m]."""
        return float(self.found.levels.protected_side[0])

    @property
    def sill(self) -> float:
        """Elevation of the sill. [m]."""
        return self.closure.sill.value

    @property
    def tops(self) -> tuple[float, ...]:
        """Top of the logs to fit in each bay. [m]."""
        return tuple(self.top_of(count) for count in self.fit)

    @cached_property
    def short(self) -> tuple[int, ...]:
        """Logs of each bay that are asked for and will not stand."""
        return tuple(int(n) - fit for n, fit in zip(self.needed.count[0], self.fit, strict=True))

    @property
    def call_level(self) -> float | None:
        """Level at which the engineer is called; None without a rated level. [m]."""
        rated = self.closure.rated_level
        return None if rated is None else rated.value - CALL_BELOW[self.system][1]

    @property
    def call_reached(self) -> bool:
        """Whether the water stands at the level at which the engineer is called."""
        return self.call_level is not None and self.water >= self.call_level - SAME_LEVEL

    @property
    def adding_is_over(self) -> bool:
        """Whether the water is past the level up to which logs can be added; False where none was entered."""
        adding = self.closure.adding
        if adding is None:
            return False
        if not adding.with_water:
            return self.water > self.sill + SAME_LEVEL
        return adding.up_to is not None and self.water > adding.up_to.value + SAME_LEVEL

    @property
    def stuck(self) -> bool:
        """Whether logs are asked for above those that stand, and none can be added any more."""
        entered = self.closure.logs_in_place is not None
        more = any(fit > placed for fit, placed in zip(self.fit, self.closure.in_place, strict=True))
        return entered and more and self.adding_is_over

    def top_of(self, count: int) -> float:
        """Top of so many logs. [m]."""
        return self.sill + count * self.layout.log_height


def plan_for(assessment: Assessment, closure_id: str) -> Plan | Withheld:
    """Plan of one closure.

    Parameters
    ----------
    assessment
        Its first state is now.
    closure_id
        Of a closure.

    Returns
    -------
    Plan or Withheld
        Withheld where two computations of the closure disagree, as entered or as it will be built.

    Raises
    ------
    SheetError
        There is no such barrier, or it is none of logs.
    """
    found = _found(assessment, closure_id)
    if isinstance(found, Withheld):
        return found
    fit = logs_to_fit(found)
    standing = tuple(max(pair) for pair in zip(fit, found.record.in_place, strict=True))
    now = float(found.levels.flood_side[0])
    rated = found.record.rated_level
    levels = np.array([now] if rated is None else [now, rated.value])
    as_built = found.record.model_copy(update={"logs_in_place": standing})
    alone = {"panel": (), "wall": (), "i_wall": (), "closure": (as_built,)}
    one = assessment.scenario.model_copy(update=alone)
    behind = np.full(len(levels), float(found.levels.protected_side[0]))
    built = assess(one, Levels(flood_side=levels, protected_side=behind)).barrier(closure_id)
    if isinstance(built, Withheld):
        return built
    assert isinstance(built, AssessedClosure)
    return Plan(found=found, built=built, fit=fit, system=assessment.scenario.units)


def _found(assessment: Assessment, closure_id: str) -> AssessedClosure | Withheld:
    closures = [closure.id for closure in assessment.scenario.closure]
    there = f"closures here: {', '.join(closures)}" if closures else "there is no closure in this scenario"
    try:
        found = assessment.barrier(closure_id)
    except KeyError:
        raise SheetError(f'there is no barrier "{closure_id}" in this scenario; {there}') from None
    if isinstance(found, AssessedClosure) or (
        isinstance(found, Withheld) and isinstance(found.record, Closure)
    ):
        return found
    assert isinstance(found, Assessed | Withheld)
    raise SheetError(f'"{closure_id}" is a {found.record.kind}; field sheets are for closures; {there}')


def logs_to_fit(found: AssessedClosure) -> tuple[int, ...]:
    """Logs to stand in each bay now: those asked for, as far as they are on hand and within the opening."""
    closure = found.record
    room = _room(closure)
    asked = found.hydraulics.needed.count[0].tolist()
    return tuple(min(need, had, room) for need, had in zip(asked, closure.on_hand, strict=True))


def _room(closure: Closure) -> int:
    """Logs that the opening and the posts take in height."""
    heights = [closure.height.value] if closure.height else []
    if closure.post is not None and closure.post.height is not None:
        heights.append(closure.post.height.value)
    if not heights:
        return max(closure.on_hand)
    return math.floor((min(heights) + SAME_LEVEL) / closure.log.height.value)
