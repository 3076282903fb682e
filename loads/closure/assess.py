"""A closure assessed: its face pressed, every part loaded, everything computed twice and checked."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

from loads.barrier import Assessed, Barrier, Pressed, Site, Withheld, pressed, withheld
from loads.check_table import Checks
from loads.closure.demands import Demands, Structure, demands_on, structure_of
from loads.closure.face import face_panel
from loads.closure.hydraulic_checks import hydraulic_checks
from loads.closure.hydraulics import Hydraulics, hydraulics_of
from loads.closure.limits import LimitSearch
from loads.closure.parts import parts_of
from loads.closure.recheck_parts import PartsRecheck, recheck_parts
from loads.closure.remarks import closure_remarks
from loads.closure.tables import part_tables
from loads.closure.whole import whole_checks
from loads.first_limit import FirstLimit
from loads.records.basis import Basis
from loads.records.closure import Closure
from loads.remarks import remarks_on


@dataclass(frozen=True, kw_only=True)
class AssessedClosure(Assessed):
    """What the loads amount to on a closure.

    Attributes
    ----------
    demands
        Forces of every log and post as arrays.
    hydraulics
        Water over and through the logs, buoyancy, lifting, logs needed.
    parts_recheck
        The second computation of logs and posts.
    search
        Ratios of all load checks against the level.
    basis
        Design basis of the scenario.
    """

    record: Closure
    demands: Demands
    hydraulics: Hydraulics
    parts_recheck: PartsRecheck
    search: LimitSearch
    basis: Basis

    @property
    def structure(self) -> Structure:
        """How the closure bears."""
        return self.demands.structure

    @cached_property
    def first_limits(self) -> tuple[FirstLimit, ...]:
        """Level at which each load check reaches its limit, lowest first, parts that are alike once."""
        return self.search.each()


def assess_closure(closure: Closure, site: Site) -> Barrier:
    """Assess one closure of a line."""
    structure = structure_of(closure)
    setting = site.setting(face_panel(closure, structure.layout))
    found = pressed(setting)
    if not found.recheck.agrees.all():
        return withheld(closure, found)
    demands = demands_on(structure, found.diagram)
    second = recheck_parts(setting, demands, found.diagram.rounding(found.face.bottom))
    if not second.agrees:
        return _withheld_part(closure, found, second)
    near, basis = site.scenario.near_limit, site.scenario.basis
    search = LimitSearch(structure, found, basis, near)
    first = search.first()
    hydraulics = hydraulics_of(setting, demands, first.level if first else None)
    checks = Checks(
        [
            *whole_checks(closure, structure.layout, found, near),
            *hydraulic_checks(hydraulics, demands, near),
            *part_tables(demands, basis, near),
        ]
    )
    return AssessedClosure(
        record=closure,
        setting=setting,
        face=found.face,
        loads=found.loads,
        diagram=found.diagram,
        resultant=found.resultant,
        recheck=found.recheck,
        checks=checks,
        first_limit=first,
        remarks=remarks_on(setting, found.face) + closure_remarks(setting, demands, hydraulics),
        parts=parts_of(demands, found.diagram),
        demands=demands,
        hydraulics=hydraulics,
        parts_recheck=second,
        search=search,
        basis=basis,
    )


def _withheld_part(closure: Closure, found: Pressed, second: PartsRecheck) -> Withheld:
    return Withheld(
        record=closure,
        setting=found.setting,
        first=second.first,
        second=second.second,
        difference=second.difference,
        subject=second.subject,
    )
