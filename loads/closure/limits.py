"""The level at which the first load limit of a closure is reached, over all checks of all its parts."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.barrier import Pressed
from loads.check_table import CheckTable
from loads.checks import Check
from loads.closure.demands import Structure, distinct_demands_on
from loads.closure.tables import part_tables
from loads.closure.whole import whole_load_checks
from loads.diagram import Diagram
from loads.first_limit import FirstLimit, each_of, first_of
from loads.panel_checks import ceiling_of, risen
from loads.records.basis import Basis

Name = tuple[str, str]


@dataclass(frozen=True)
class LimitSearch:
    """Ratios of all load checks of a closure against the flood-side level, the rest as in the first state.

    Parts that are alike are looked at once, under the name of the first of them; loads count as they push
    toward the protected side.
    """

    structure: Structure
    found: Pressed
    basis: Basis
    near: float

    def _checks(self, diagram: Diagram) -> list[Check | CheckTable]:
        closure, structure = self.structure.closure, self.structure
        post = closure.post
        held = post is not None and (
            post.material is not None or any(value is not None for _, value in post.limits)
        )
        sag = post is not None and post.limits.deflection is not None
        demands = distinct_demands_on(structure, diagram, posts=held, sag=sag)
        pressed = Pressed(
            setting=self.found.setting,
            face=self.found.face,
            loads=(),
            diagram=diagram,
            resultant=self.found.face.resultant(diagram),
            recheck=self.found.recheck,
        )
        found: list[Check | CheckTable] = [*whole_load_checks(closure, pressed, self.near)]
        found += part_tables(demands, self.basis, self.near)
        return [check for check in found if not np.isnan(check.limit_value).all()]

    def _ratios(self, names: list[Name]) -> Callable[[FloatArray], FloatArray]:
        """Signed ratios (n, c) at flood-side levels; the first call fills in what each check is."""

        def ratios(flood_side: FloatArray) -> FloatArray:
            checks = self._checks(risen(self.found.setting, flood_side))
            if not names:
                names.extend((subject, check.name) for check in checks for subject in _subjects(check))
            if not checks:
                return np.full((len(flood_side), 1), np.nan)
            return np.column_stack([check.demand / check.limit_value for check in checks])

        return ratios

    def first(self) -> FirstLimit | None:
        """First-limit level of the closure; None without a load limit."""
        names: list[Name] = []
        low, high = self.structure.layout.sill, self._ceiling()
        found = first_of(names, self._ratios(names), low=low, high=high)
        return found if names else None

    def each(self) -> tuple[FirstLimit, ...]:
        """Level at which each check reaches its limit, lowest first."""
        names: list[Name] = []
        return each_of(names, self._ratios(names), low=self.structure.layout.sill, high=self._ceiling())

    def _ceiling(self) -> float:
        return ceiling_of(self.found.setting, self.found.face)


def _subjects(check: Check | CheckTable) -> tuple[str, ...]:
    return (check.subject,) if isinstance(check, Check) else check.subjects
