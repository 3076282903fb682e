"""The assessment of a scenario: what the loads amount to on every barrier, checked twice, against its limits."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.checks import Check, Verdict, check_of, level_check, worst
from loads.diagram import Diagram
from loads.faces import ArcFace, CircleFace, Resultant, StripFace, face_of
from loads.first_limit import FirstLimit, crossing_levels
from loads.limits_of_use import OutsideFormulaError
from loads.load import Load, Setting, loads_on
from loads.problems import Problem, ScenarioError
from loads.recheck import Recheck, recheck
from loads.records.panel import Panel
from loads.records.scenario import Scenario
from loads.remarks import remarks_on
from loads.states import DRY, Levels, levels_of, rising
from loads.water import Fluid, fluid_of

Face = StripFace | CircleFace | ArcFace

SEARCH_ABOVE_TOP = 3.0
"""How far above a barrier's top a first-limit level is looked for. [m]"""


@dataclass(frozen=True, kw_only=True)
class Withheld:
    """A barrier whose two computations disagree: no result is given, only the two figures.

    Attributes
    ----------
    setting
        What loads it.
    first, second
        Horizontal force and moment of the first and of the second computation in the state that differs
        most. [N, N·m]
    difference
        Largest relative difference. [–]
    """

    setting: Setting
    first: tuple[float, float]
    second: tuple[float, float]
    difference: float

    @property
    def panel(self) -> Panel:
        """The record."""
        return self.setting.panel

    def verdict(self, _index: int = 0) -> Verdict:
        """Return "withheld", always."""
        return "withheld"


@dataclass(frozen=True, kw_only=True)
class Assessed:
    """What the loads amount to on one barrier, for n states.

    Attributes
    ----------
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
    def panel(self) -> Panel:
        """The record."""
        return self.setting.panel

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
            if barrier.panel.id == barrier_id:
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
        setting=setting,
        first=(float(first.horizontal[index]), float(first.moment[index])),
        second=(float(second.horizontal[index]), float(second.moment[index])),
        difference=float(second.difference[index]),
    )


def peak_pressure(diagram: Diagram, face: Face) -> FloatArray:
    """Net pressure of greatest magnitude on a face, with its sign, shape (n,). [Pa]."""
    greatest, least = diagram.extremes(face.bottom, face.top)
    return np.where(greatest >= -least, greatest, least)


def load_checks(panel: Panel, pressure: FloatArray, resultant: Resultant, near: float) -> list[Check]:
    """Checks of what presses on a panel: pressure at a point, total force and moment, each with its sign."""
    limits = panel.limits
    reverse = ("The load pushes toward the flood side; the limit was entered without a direction.",)
    entered = (
        ("pressure at a point", "pressure", pressure, limits.pressure),
        ("total force", "force", resultant.total, limits.force),
        ("moment about the bottom", "moment", resultant.moment, limits.moment),
    )
    return [
        check_of(
            subject=f"panel {panel.id}",
            name=name,
            kind=kind,
            demand=demand,
            limit=limit,
            near=near,
            remarks=reverse if demand[0] < 0 and limit is not None else (),
        )
        for name, kind, demand, limit in entered
    ]


def panel_checks(
    setting: Setting, face: Face, diagram: Diagram, resultant: Resultant, near: float
) -> list[Check]:
    """Checks of a panel: pressure at a point, total force, moment, rated level and freeboard."""
    panel = setting.panel
    checks = load_checks(panel, peak_pressure(diagram, face), resultant, near)
    level = setting.levels.flood_side
    freeboard = panel.limits.freeboard
    for name, limit, highest in (
        (
            "rated level",
            panel.rated_level,
            panel.rated_level.value if panel.rated_level else np.nan,
        ),
        ("freeboard", freeboard, face.top - freeboard.value if freeboard else np.nan),
    ):
        checks.append(
            level_check(
                subject=f"panel {panel.id}",
                name=name,
                level=level,
                bottom=face.bottom,
                limit=limit,
                highest=float(highest),
                near=near,
            )
        )
    return checks


def first_limit_of(setting: Setting, face: Face, near: float) -> FirstLimit | None:
    """First-limit level of a panel: its load limits only, not levels that were themselves entered.

    The flood side rises from the bottom of the panel to `SEARCH_ABOVE_TOP` above its top; loads count as they
    push toward the protected side.
    """
    protected = float(setting.levels.protected_side[0])
    limits = setting.panel.limits
    if limits.pressure is None and limits.force is None and limits.moment is None:
        return None
    ceiling = max(face.top, float(setting.levels.flood_side.max())) + SEARCH_ABOVE_TOP

    def checks_at(flood_side: FloatArray) -> list[Check]:
        levels = rising(flood_side, protected if np.isfinite(protected) else DRY)
        swept = Setting(levels=levels, fluids=setting.fluids, panel=setting.panel)
        diagram = Diagram.joined(load.diagram for load in loads_on(swept))
        greatest, _ = diagram.extremes(face.bottom, face.top)
        found = load_checks(setting.panel, greatest, face.resultant(diagram), near)
        return [check for check in found if check.limit is not None]

    def ratios(flood_side: FloatArray) -> FloatArray:
        return np.column_stack([check.demand / check.limit_value for check in checks_at(flood_side)])

    names = [(check.subject, check.name) for check in checks_at(np.array([face.bottom]))]
    level, reached, at_low = crossing_levels(ratios, low=face.bottom, high=ceiling)
    if not reached.any():
        return FirstLimit(level=None, subject="", check="", without_water=False, ceiling=ceiling)
    first = int(np.nanargmin(level))
    return FirstLimit(
        level=float(level[first]),
        subject=names[first][0],
        check=names[first][1],
        without_water=bool(at_low[first]),
        ceiling=ceiling,
    )
