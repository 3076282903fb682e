"""What is computed of one barrier, whatever stands there: its face pressed by the loads, twice."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from loads.check_table import Checks
from loads.checks import Verdict
from loads.diagram import Diagram
from loads.faces import Resultant, face_of
from loads.first_limit import FirstLimit
from loads.load import Load, Setting, loads_on
from loads.panel_checks import Face
from loads.part import Part
from loads.recheck import Recheck, recheck
from loads.records.closure import Closure
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.records.wall import Wall
from loads.states import Levels
from loads.water import Fluid


@dataclass(frozen=True, kw_only=True)
class Site:
    """What every barrier of a line shares: the scenario, the states, the water of each side."""

    scenario: Scenario
    levels: Levels
    fluids: dict[str, Fluid]

    def setting(self, panel: Panel) -> Setting:
        """Everything that loads one face."""
        return Setting(levels=self.levels, fluids=self.fluids, panel=panel)


@dataclass(frozen=True, kw_only=True)
class Pressed:
    """A face, what presses on it, and the second computation of that.

    Attributes
    ----------
    setting
        What loads it.
    face
        What the loads act on.
    loads
        Every load by its cause.
    diagram
        Net pressure, their sum.
    resultant
        Force and moment of the net pressure.
    recheck
        The second computation.
    """

    setting: Setting
    face: Face
    loads: tuple[Load, ...]
    diagram: Diagram
    resultant: Resultant
    recheck: Recheck


def pressed(setting: Setting) -> Pressed:
    """Press on the face of a setting and compute force and moment twice."""
    face = face_of(setting.panel)
    loads = tuple(loads_on(setting))
    diagram = Diagram.joined(load.diagram for load in loads)
    resultant = face.resultant(diagram)
    second = recheck(
        setting,
        horizontal=resultant.horizontal,
        vertical=resultant.vertical,
        moment=resultant.moment,
        rounding_force=diagram.rounding(face.bottom) * face.area,
        reach=face.length,
    )
    return Pressed(
        setting=setting, face=face, loads=loads, diagram=diagram, resultant=resultant, recheck=second
    )


@dataclass(frozen=True, kw_only=True)
class Withheld:
    """A barrier whose two computations disagree: no result is given, only the two figures.

    Attributes
    ----------
    record
        What stands on the line.
    setting
        What loads it.
    first, second
        Horizontal force and moment of the first and of the second computation in the state that differs
        most. [N, N·m]
    difference
        Largest relative difference. [–]
    subject
        Part whose figures these are; empty when they are the whole barrier's.
    """

    record: Panel | Closure | Wall | IWall
    setting: Setting
    first: tuple[float, float]
    second: tuple[float, float]
    difference: float
    subject: str = ""

    def verdict(self, _index: int = 0) -> Verdict:
        """Return "withheld", always."""
        return "withheld"


def withheld(record: Panel | Closure, found: Pressed) -> Withheld:
    """Withhold a barrier whose resultant does not come out the same twice."""
    first, second = found.resultant, found.recheck
    index = int(np.argmax(np.where(second.agrees, -1.0, second.difference)))
    return Withheld(
        record=record,
        setting=found.setting,
        first=(float(first.horizontal[index]), float(first.moment[index])),
        second=(float(second.horizontal[index]), float(second.moment[index])),
        difference=float(second.difference[index]),
    )


@dataclass(frozen=True, kw_only=True)
class Assessed:
    """What the loads amount to on one barrier, for n states.

    Attributes
    ----------
    record
        What stands on the line.
    setting
        What loads it.
    face
        What they act on.
    loads
        Every load by its cause.
    diagram
        Net pressure, their sum.
    resultant
        Force and moment of the net pressure.
    recheck
        The second computation.
    checks
        In order of how pressing they are in the first state.
    first_limit
        The first-limit level with the protected side as in the first state; None without a load limit.
    remarks
        On the first state.
    parts
        What each part carries; a panel has none.
    """

    record: Panel | Closure | Wall | IWall
    setting: Setting
    face: Face
    loads: tuple[Load, ...]
    diagram: Diagram
    resultant: Resultant
    recheck: Recheck
    checks: Checks
    first_limit: FirstLimit | None
    remarks: tuple[str, ...]
    parts: Sequence[Part] = ()

    @property
    def levels(self) -> Levels:
        """The states."""
        return self.setting.levels

    @cached_property
    def by_load(self) -> dict[str, Resultant]:
        """Force and moment of each load alone, by its name."""
        return {load.name: self.face.resultant(load.diagram) for load in self.loads}

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state."""
        return self.checks.verdict(index)

    def verdict_of(self, part: str, index: int = 0) -> Verdict:
        """Most pressing verdict of one part in one state."""
        return self.checks.verdict_of(part, index)


Barrier = Assessed | Withheld
