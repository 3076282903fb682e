"""The assessment of a scenario: what loads every barrier, computed twice, against its limits."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.checks import Check, Verdict, worst
from loads.diagram import Diagram
from loads.faces import Resultant, face_of
from loads.first_limit import FirstLimit
from loads.limits_of_use import OutsideFormulaError
from loads.load import Load, Setting, loads_on
from loads.panel_checks import Face, first_limit_of, panel_checks
from loads.problems import Problem, ScenarioError
from loads.recheck import Recheck, recheck
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.remarks import remarks_on
from loads.states import Levels, levels_of
from loads.water import Fluid, fluid_of


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
    """

    record: Panel
    setting: Setting
    first: tuple[float, float]
    second: tuple[float, float]
    difference: float

    def verdict(self, _index: int = 0) -> Verdict:
        """Return "withheld", always."""
        return "withheld"


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
    by_load
        The same of each load alone, by its name.
    recheck
        The second computation.
    checks
        In order of how pressing they are in the first state.
    first_limit
        The first-limit level with the protected side as in the first state; None without a load limit.
    remarks
        On the first state.
    """

    record: Panel
    setting: Setting
    face: Face
    loads: tuple[Load, ...]
    diagram: Diagram
    resultant: Resultant
    by_load: dict[str, Resultant]
    recheck: Recheck
    checks: tuple[Check, ...]
    first_limit: FirstLimit | None
    remarks: tuple[str, ...]

    @property
    def levels(self) -> Levels:
        """The states."""
        return self.setting.levels

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state."""
        return worst([check.verdict(index) for check in self.checks])


Barrier = Assessed | Withheld


@dataclass(frozen=True, kw_only=True)
class Assessment:
    """All barriers of a scenario.

    Attributes
    ----------
    scenario
        What was computed.
    levels
        The states.
    fluids
        Water of each side.
    barriers
        In the scenario's order.
    """

    scenario: Scenario
    levels: Levels
    fluids: dict[str, Fluid]
    barriers: tuple[Barrier, ...]

    def barrier(self, barrier_id: str) -> Barrier:
        """Barrier with an id.

        Raises
        ------
        KeyError
            There is none.
        """
        for barrier in self.barriers:
            if barrier.record.id == barrier_id:
                return barrier
        raise KeyError(barrier_id)


def assess(scenario: Scenario, levels: Levels | None = None) -> Assessment:
    """Compute every barrier of a scenario.

    Parameters
    ----------
    scenario
        Validated scenario.
    levels
        States to compute; the scenario's own levels, one state, when None.

    Returns
    -------
    Assessment
        With a barrier withheld where its two computations disagree in any state.

    Raises
    ------
    ScenarioError
        A formula has no answer for an input; each with its path.
    """
    levels = levels_of(scenario) if levels is None else levels
    fluids = {side: fluid_of(scenario.water, side) for side in ("flood", "protected")}
    barriers: list[Barrier] = []
    problems: list[Problem] = []
    for panel in scenario.panel:
        try:
            barriers.append(_panel(Setting(levels=levels, fluids=fluids, panel=panel), scenario.near_limit))
        except OutsideFormulaError as error:
            path = f"panel[{panel.id}].sediment"
            problems.append(Problem(path=path, value="", rule=f"cannot be computed: {error}"))
    if problems:
        raise ScenarioError(problems)
    return Assessment(scenario=scenario, levels=levels, fluids=fluids, barriers=tuple(barriers))


def _panel(setting: Setting, near: float) -> Barrier:
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
    if not second.agrees.all():
        return _withheld(setting, resultant, second)
    checks = panel_checks(setting, face, diagram, resultant, near)
    order = sorted(checks, key=lambda check: -_pressing(check))
    return Assessed(
        record=setting.panel,
        setting=setting,
        face=face,
        loads=loads,
        diagram=diagram,
        resultant=resultant,
        by_load={load.name: face.resultant(load.diagram) for load in loads},
        recheck=second,
        checks=tuple(order),
        first_limit=first_limit_of(setting, face, near),
        remarks=remarks_on(setting, face),
    )


def _pressing(check: Check) -> float:
    ratio = float(check.ratio[0])
    return -1.0 if np.isnan(ratio) else ratio


def _withheld(setting: Setting, first: Resultant, second: Recheck) -> Withheld:
    index = int(np.argmax(np.where(second.agrees, -1.0, second.difference)))
    return Withheld(
        record=setting.panel,
        setting=setting,
        first=(float(first.horizontal[index]), float(first.moment[index])),
        second=(float(second.horizontal[index]), float(second.moment[index])),
        difference=float(second.difference[index]),
    )
