"""Many checks at once: one demand of many like parts as arrays, and all checks of a barrier in order."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from functools import cached_property
from typing import TypeAlias

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.checks import ROUNDING, SEVERITY, Check, Verdict, source_text
from loads.lazy import Built
from loads.quantity import Quantity


@dataclass(frozen=True, kw_only=True)
class CheckTable:
    """One demand on m like parts, such as the bending moment of every log.

    Attributes
    ----------
    subjects
        What is checked, m names.
    name
        Which check.
    kind
        Kind of quantity of demand and limit.
    demand
        Shape (n, m), SI unit of the kind.
    limits
        As entered, one for each part; None where nobody entered one.
    limit_value
        The limits in the same terms as the demand, shape (m,); NaN without one.
    near
        Ratio from which a check is near its limit. [–]
    sources
        Who set each limit and when, m texts.
    remarks
        What whoever reads the ratios must know.
    rises_with_water
        True when the checks have a first-limit level.
    """

    subjects: tuple[str, ...]
    name: str
    kind: str
    demand: FloatArray
    limits: tuple[Quantity | None, ...]
    limit_value: FloatArray
    near: float
    sources: tuple[str, ...]
    remarks: tuple[str, ...] = ()
    rises_with_water: bool = True

    @cached_property
    def ratio(self) -> FloatArray:
        """Demand over limit, shape (n, m); NaN without a limit. [–]."""
        return np.asarray(np.abs(self.demand) / self.limit_value)

    def check(self, column: int) -> Check:
        """Check of one part."""
        return Check(
            subject=self.subjects[column],
            name=self.name,
            kind=self.kind,
            demand=self.demand[:, column],
            limit=self.limits[column],
            limit_value=float(self.limit_value[column]),
            ratio=self.ratio[:, column],
            near=self.near,
            source=self.sources[column],
            remarks=self.remarks,
            rises_with_water=self.rises_with_water,
        )


def table_of(
    *,
    subjects: tuple[str, ...],
    name: str,
    kind: str,
    demand: FloatArray,
    limit: Quantity | None,
    near: float,
    factor: float = 1.0,
    basis: str = "",
    remarks: tuple[str, ...] = (),
) -> CheckTable:
    """Hold one demand on many parts against one limit.

    Parameters
    ----------
    demand
        Signed, shape (n, m), in the SI unit of `kind`.
    limit
        As entered, or None.
    factor
        By which the limit is multiplied, such as the factor of a case's category.
    basis
        Words about that factor, after the limit's own source.
    """
    count = len(subjects)
    value = limit.value * factor if limit else np.nan
    source = source_text(limit) + (f"; {basis}" if basis and limit else "")
    return CheckTable(
        subjects=subjects,
        name=name,
        kind=kind,
        demand=demand,
        limits=(limit,) * count,
        limit_value=np.full(count, value),
        near=near,
        sources=(source,) * count,
        remarks=remarks,
    )


Entries: TypeAlias = Sequence[Check | CheckTable]


def _grades_below(entry: Check | CheckTable) -> bool:
    return entry.grades_below if isinstance(entry, Check) else True


class Checks(Built[Check]):
    """All checks of a barrier, the most pressing of the first state first.

    Examples
    --------
    >>> len(Checks(()))
    0
    """

    def __init__(self, entries: Entries) -> None:
        columns = [entry.ratio if entry.ratio.ndim == 2 else entry.ratio[:, None] for entry in entries]
        ratio: FloatArray = np.concatenate(columns, axis=1) if columns else np.zeros((1, 0))
        counts = [column.shape[1] for column in columns]
        graded = np.repeat([_grades_below(entry) for entry in entries], counts).astype(bool)
        counting = ~np.isnan(ratio[0]) & (graded | ~(ratio[0] <= 1 + ROUNDING))
        order = np.argsort(-np.where(counting, ratio[0], -1.0), kind="stable")
        self._entries = entries
        self._entry = np.repeat(np.arange(len(counts)), counts)[order]
        self._column = np.concatenate([np.arange(count) for count in (*counts, 0)])[order]
        self.ratio: FloatArray = ratio[:, order]
        super().__init__(len(order), self._make)

    def _make(self, index: int) -> Check:
        entry = self._entries[self._entry[index]]
        return entry if isinstance(entry, Check) else entry.check(int(self._column[index]))

    @cached_property
    def limited(self) -> BoolArray:
        """Which checks have a limit, shape (c,)."""
        of_entry = [
            np.array([entry.limit is not None])
            if isinstance(entry, Check)
            else np.array([limit is not None for limit in entry.limits])
            for entry in self._entries
        ]
        return np.array(
            [of_entry[entry][column] for entry, column in zip(self._entry, self._column, strict=True)],
            dtype=bool,
        )

    @cached_property
    def severity(self) -> FloatArray:
        """Place of every check's verdict in `SEVERITY`, shape (n, c)."""
        near = np.array([entry.near for entry in self._entries] or [1.0])[self._entry]
        # so worded that what is no number is never below
        above = ~(self.ratio <= 1 + ROUNDING)
        under = np.where(self.ratio >= near - ROUNDING, 2.0, 1.0)
        under *= np.array([_grades_below(entry) for entry in self._entries], dtype=bool)[self._entry]
        graded = np.where(above, 3.0, under)
        return np.where(self.limited, graded, 0.0)

    @cached_property
    def subjects(self) -> tuple[str, ...]:
        """What each check is about."""
        return tuple(check.subject for check in self)

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state."""
        return SEVERITY[int(self.severity[index].max(initial=0.0))]

    def verdict_of(self, subject: str, index: int = 0) -> Verdict:
        """Most pressing verdict of one subject in one state; "not checked" when it has no check."""
        own = [column for column, name in enumerate(self.subjects) if name == subject]
        return SEVERITY[int(self.severity[index, own].max(initial=0.0))]
