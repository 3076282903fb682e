"""Many checks of a closure in few rows: parts that are alike together, the most pressing of each kind."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from loads.assessment import Assessed, AssessedClosure
from loads.checks import Check
from loads.first_limit import FirstLimit
from webapp.part_words import class_of, parts_text

_ALIKE = 1e-9
_SAME_LEVEL = 5e-4
"""Levels closer than half of what they are found to are one. [m]"""


@dataclass(frozen=True, kw_only=True)
class Group:
    """Checks of one name on parts of one kind.

    Attributes
    ----------
    parts
        The parts whose check is the most pressing, in words.
    check
        The check of the first of them.
    others
        How many more parts have this check, none of them pressed harder.
    """

    parts: str
    check: Check
    others: int


def check_groups(barrier: Assessed) -> list[Group]:
    """Most pressing check of every name and kind of part, in order of how pressing they are."""
    found: dict[tuple[str, str], list[Check]] = {}
    for check in barrier.checks:
        found.setdefault((class_of(check.subject), check.name), []).append(check)
    groups = []
    for checks in found.values():
        first = checks[0]
        alike = [check for check in checks if _alike(check, first)]
        groups.append(
            Group(
                parts=parts_text(check.subject for check in alike),
                check=first,
                others=len(checks) - len(alike),
            )
        )
    return groups


def _alike(check: Check, first: Check) -> bool:
    """Whether two checks have the same ratio in every state computed."""
    if check is first:
        return True
    return bool(np.allclose(check.ratio, first.ratio, rtol=_ALIKE, atol=0.0))


@dataclass(frozen=True, kw_only=True)
class Reached:
    """A limit that is reached at a level, with the parts that reach it there together.

    Attributes
    ----------
    parts
        In words.
    first
        Level and check of the first of them.
    check
        That check in the states computed.
    """

    parts: str
    first: FirstLimit
    check: Check


def limits_reached(barrier: Assessed, most: int) -> list[Reached]:
    """Limits in the order in which rising water reaches them, one row for each check of each kind of part."""
    checks = {(check.subject, check.name): check for check in barrier.checks}
    rows: dict[tuple[str, str], list[FirstLimit]] = {}
    for first in _first_limits(barrier):
        if first.level is not None:
            rows.setdefault((class_of(first.subject), first.check), []).append(first)
    found = []
    for firsts in list(rows.values())[:most]:
        lead, level = firsts[0], firsts[0].level
        if level is None or (lead.subject, lead.check) not in checks:
            continue
        together = [
            subject
            for one in firsts
            if one.level is not None and one.level - level <= _SAME_LEVEL
            for subject in _alike_subjects(barrier, one, {other.subject for other in firsts})
        ]
        found.append(Reached(parts=parts_text(together), first=lead, check=checks[lead.subject, lead.check]))
    return found


def _first_limits(barrier: Assessed) -> Sequence[FirstLimit]:
    if isinstance(barrier, AssessedClosure):
        return barrier.first_limits
    return (barrier.first_limit,) if barrier.first_limit else ()


def _alike_subjects(barrier: Assessed, first: FirstLimit, own_level: set[str]) -> list[str]:
    """Part of a first limit, and those that carry the same, since of like parts only one is searched."""
    lead = next(c for c in barrier.checks if (c.subject, c.name) == (first.subject, first.check))
    same = [
        check.subject
        for check in barrier.checks
        if check.name == first.check
        and check.subject not in own_level
        and class_of(check.subject) == class_of(first.subject)
        and _alike(check, lead)
    ]
    return [first.subject, *same]


class PartRatios:
    """Most pressing ratio of every part in every state."""

    def __init__(self, barrier: Assessed) -> None:
        self._checks = barrier.checks

    @cached_property
    def _columns(self) -> dict[str, list[int]]:
        found: dict[str, list[int]] = {}
        for column, subject in enumerate(self._checks.subjects):
            found.setdefault(subject, []).append(column)
        return found

    def ratio(self, part: str, index: int) -> float:
        """Largest ratio of a part in a state; NaN when nothing of it has a limit."""
        own = self._checks.ratio[index, self._columns.get(part, [])]
        own = own[~np.isnan(own)]
        return float(own.max()) if own.size else float("nan")
