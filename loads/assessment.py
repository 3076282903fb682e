"""The assessment of a scenario: what loads every barrier, computed twice, against its limits."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Any

from loads.barrier import Assessed, Barrier, Site, Withheld, pressed, withheld
from loads.check_table import Checks
from loads.closure.assess import AssessedClosure, assess_closure
from loads.limits_of_use import OutsideFormulaError
from loads.panel_checks import first_limit_of, panel_checks
from loads.problems import Problem, ScenarioError
from loads.records.base import Record
from loads.records.closure import Closure
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.records.wall import Wall
from loads.remarks import remarks_on
from loads.states import Levels, levels_of
from loads.wall.assess import AssessedWall, assess_i_wall_of_line, assess_wall_of_line
from loads.water import Fluid, fluid_of

__all__ = [
    "Assessed",
    "AssessedClosure",
    "AssessedWall",
    "Assessment",
    "Barrier",
    "Withheld",
    "assess",
    "assess_panel",
]


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
    site = Site(scenario=scenario, levels=levels, fluids=fluids)
    barriers: list[Barrier] = []
    problems: list[Problem] = []
    for record in scenario.barriers:
        try:
            barriers.append(ROUTES[type(record)](record, site))
        except OutsideFormulaError as error:
            path = f"{record.kind}[{record.id}]" + (".sediment" if getattr(record, "sediment", ()) else "")
            problems.append(Problem(path=path, value="", rule=f"cannot be computed: {error}"))
    if problems:
        raise ScenarioError(problems)
    return Assessment(scenario=scenario, levels=levels, fluids=fluids, barriers=tuple(barriers))


def assess_panel(panel: Panel, site: Site) -> Barrier:
    """Assess one panel of a line."""
    setting = site.setting(panel)
    found = pressed(setting)
    if not found.recheck.agrees.all():
        return withheld(panel, found)
    near = site.scenario.near_limit
    return Assessed(
        record=panel,
        setting=setting,
        face=found.face,
        loads=found.loads,
        diagram=found.diagram,
        resultant=found.resultant,
        recheck=found.recheck,
        checks=Checks(panel_checks(setting, found.face, found.diagram, found.resultant, near)),
        first_limit=first_limit_of(setting, found.face, near),
        remarks=remarks_on(setting, found.face),
    )


ROUTES: dict[type[Record], Callable[[Any, Site], Barrier]] = {
    Panel: assess_panel,
    Closure: assess_closure,
    Wall: assess_wall_of_line,
    IWall: assess_i_wall_of_line,
}
"""How each kind of barrier is assessed. A new kind is one record, one route and one line here."""
