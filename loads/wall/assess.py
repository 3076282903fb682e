"""Walls as barriers of a line: each per unit of its length, computed twice, against its limits."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property
from typing import Any

import numpy as np

from loads.arrays import FloatArray
from loads.barrier import Assessed, Barrier, Site, Withheld
from loads.check_table import Checks
from loads.closure.face import made_length
from loads.faces import Resultant, face_of
from loads.first_limit import FirstLimit
from loads.load import Setting
from loads.problems import Problem, ScenarioError
from loads.quantity import Quantity
from loads.recheck import Recheck
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.wall import Wall
from loads.wall.i_wall_limit import first_limit_of
from loads.wall.i_wall_result import IWallResult, assess_i_wall, sums_above_ground
from loads.wall.wall_result import WallResult, assess_wall

_NIL = 1e-9


@dataclass(frozen=True, kw_only=True)
class AssessedWall(Assessed):
    """What the loads amount to on a wall, per unit of its length.

    `face` is the upright plane on which `diagram` acts, one metre of it. Forces and moments of `resultant`
    are per length: of a wall on its base all of them, about the toe; of an I-wall those above the
    protected-side ground, about that ground.

    Attributes
    ----------
    found
        Everything computed of it.
    """

    record: Wall | IWall
    found: WallResult | IWallResult

    @cached_property
    def by_load(self) -> dict[str, Resultant]:
        """Force and moment by cause, weights and uplift of a wall on its base among them."""
        if isinstance(self.found, IWallResult):
            parts = self.found.embedment.pressure.parts
            return {name: self.face.resultant(diagram) for name, diagram in parts.items()}
        sums: dict[str, list[FloatArray]] = {}
        for force in self.found.stability.forces:
            row = sums.setdefault(force.name, [np.zeros(self.levels.states) for _ in range(4)])
            if force.direction == "horizontal":
                row[0] = row[0] + force.value
                row[3] = row[3] + force.moment
            else:
                row[1] = row[1] + force.value
            row[2] = row[2] + force.moment
        foot = self.face.bottom
        return {
            name: _resultant(foot, across, up, moment, own)
            for name, (across, up, moment, own) in sums.items()
        }


def head_foot(record: Wall | IWall) -> tuple[Quantity, str]:
    """Elevation from which head on a wall is counted, and what it is.

    The ground on the protected side, else that on the flood side, else the base.
    """
    for side in ("protected", "flood"):
        layers = [layer for layer in record.sediment if layer.side == side]
        entered = layers[0].top if layers else getattr(record, f"{side}_ground", None)
        if entered is not None:
            return entered, f"{side}-side ground"
    assert isinstance(record, Wall)
    return record.base, "base"


def assess_wall_of_line(record: Wall, site: Site) -> Barrier:
    """Assess one wall on its base."""
    found = assess_wall(record, site.levels, site.fluids, site.scenario.near_limit)
    top = float(found.section.top.max())
    setting = Setting(levels=site.levels, fluids=site.fluids, panel=_upright(record, record.base.value, top))
    stable, second = found.stability, found.recheck
    nil = np.zeros(site.levels.states)
    across = sum((row.moment for row in stable.forces if row.direction == "horizontal"), nil)
    recheck = Recheck(**{name: getattr(second, name) for name in Recheck.__dataclass_fields__})
    return _barrier(
        setting,
        found,
        recheck,
        resultant=_resultant(record.base.value, stable.horizontal, stable.vertical, stable.moment, across),
        first_limit=found.first_limit,
    )


def assess_i_wall_of_line(record: IWall, site: Site) -> Barrier:
    """Assess one I-wall."""
    try:
        found = assess_i_wall(record, site.levels, site.fluids, site.scenario.near_limit)
    except ScenarioError as error:
        raise ScenarioError([_in_its_table(problem) for problem in error.problems]) from None
    ground = record.ground("protected")
    setting = Setting(
        levels=site.levels, fluids=site.fluids, panel=_upright(record, ground, record.top.value)
    )
    nil = np.zeros(site.levels.states)
    return _barrier(
        setting,
        found,
        sums_above_ground(found),
        resultant=_resultant(ground, found.horizontal, nil, found.moment, found.moment),
        first_limit=None
        if found.withheld
        else first_limit_of(record, site.levels, site.fluids, site.scenario.near_limit),
    )


def _barrier(
    setting: Setting,
    found: WallResult | IWallResult,
    recheck: Recheck,
    *,
    resultant: Resultant,
    first_limit: FirstLimit | None,
) -> Barrier:
    record = found.record
    if found.withheld or not recheck.agrees.all():
        index = int(np.argmax(np.where(recheck.agrees, -1.0, recheck.difference)))
        return Withheld(
            record=record,
            setting=setting,
            first=(float(resultant.horizontal[index]), float(resultant.moment[index])),
            second=(float(recheck.horizontal[index]), float(recheck.moment[index])),
            difference=float(recheck.difference[index]),
        )
    diagram = found.diagram if isinstance(found, WallResult) else found.embedment.pressure.net
    return AssessedWall(
        record=record,
        setting=setting,
        face=face_of(setting.panel),
        loads=(),
        diagram=diagram,
        resultant=resultant,
        recheck=recheck,
        checks=Checks(found.checks),
        first_limit=first_limit,
        remarks=found.remarks,
        found=found,
    )


def _resultant(
    foot: float, horizontal: FloatArray, vertical: FloatArray, moment: FloatArray, across: FloatArray
) -> Resultant:
    """Forces as a resultant; `across` is the moment of the horizontal ones alone."""
    scale = np.abs(horizontal) + np.abs(across)
    acting = np.abs(horizontal) > _NIL * np.where(scale > 0, scale, 1.0)
    arm = np.divide(across, horizontal, out=np.full_like(horizontal, np.nan), where=acting)
    return Resultant(
        horizontal=horizontal,
        vertical=vertical,
        total=np.hypot(horizontal, vertical),
        moment=moment,
        line_of_action=foot + arm,
    )


def _upright(record: Wall | IWall, bottom: float, top: float) -> Panel:
    """One metre of the upright plane between two elevations."""
    unit = "m"
    shared: dict[str, Any] = {
        "id": record.id,
        "name": record.name,
        "rated_level": record.rated_level,
        "note": record.note,
        "sediment": record.sediment,
    }
    return Panel.model_construct(
        shape="rectangle",
        bottom=made_length(bottom, unit),
        width=made_length(1.0, unit),
        height=made_length(top - bottom, unit),
        **shared,
    )


def _in_its_table(problem: Problem) -> Problem:
    path = problem.path.replace("wall[", "i_wall[", 1) if problem.path.startswith("wall[") else problem.path
    return Problem(path=path, value=problem.value, rule=problem.rule)
