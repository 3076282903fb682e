"""Checks: a demand held against a limit that somebody entered, for n states."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np

from loads.arrays import FloatArray
from loads.quantity import Quantity

Verdict = Literal["below limit", "near limit", "above limit", "not checked", "withheld"]

SEVERITY: tuple[Verdict, ...] = ("not checked", "below limit", "near limit", "above limit", "withheld")
"""Verdicts from the least to the most pressing."""

ROUNDING = 1e-9
"""How far a ratio may stray from rounding alone. [–]"""


@dataclass(frozen=True, kw_only=True)
class Check:
    """One demand and the limit entered for it.

    Attributes
    ----------
    subject
        What is checked, for example "panel P1".
    name
        Which check, for example "moment about the bottom".
    kind
        Kind of quantity of demand and limit.
    demand
        Shape (n,), SI unit of the kind.
    limit
        As entered, or None when nobody entered one.
    limit_value
        The limit in the same terms as the demand; NaN without one.
    ratio
        Demand over limit, shape (n,); NaN without a limit. [–]
    near
        Ratio from which a check is near its limit. [–]
    source
        Who set the limit and when, in words.
    remarks
        What whoever reads the ratio must know.
    rises_with_water
        True when the check has a first-limit level; False for checks of a level itself.
    grades_below
        False for a bound that nobody entered, a fact of the build: passing it counts, staying under it says
        nothing.
    """

    subject: str
    name: str
    kind: str
    demand: FloatArray
    limit: Quantity | None
    limit_value: float
    ratio: FloatArray
    near: float
    source: str
    remarks: tuple[str, ...] = ()
    rises_with_water: bool = True
    grades_below: bool = True

    def verdict(self, index: int = 0) -> Verdict:
        """Verdict of one state."""
        if self.limit is None:
            return "not checked"
        ratio = float(self.ratio[index])
        if not ratio <= 1 + ROUNDING:  # so worded that what is no number is never below
            return "above limit"
        if not self.grades_below:
            return "not checked"
        return "near limit" if ratio >= self.near - ROUNDING else "below limit"


def source_text(limit: Quantity | None) -> str:
    """Who set a limit and when."""
    if limit is None:
        return "no limit entered"
    words = limit.source or "entered without a source"
    return f"{words}, {limit.dated.isoformat()}" if limit.dated else words


def check_of(
    *,
    subject: str,
    name: str,
    kind: str,
    demand: FloatArray,
    limit: Quantity | None,
    near: float,
    remarks: tuple[str, ...] = (),
    rises_with_water: bool = True,
    grades_below: bool = True,
) -> Check:
    """Hold a demand's magnitude against a limit.

    Parameters
    ----------
    demand
        Signed demand, shape (n,), in the SI unit of `kind`.
    limit
        As entered, or None. Of a limit of nothing any demand is beyond.
    grades_below
        As in `Check`.
    """
    value = limit.value if limit else float("nan")
    ratio = np.abs(demand) / value if value != 0 else np.where(demand != 0, np.inf, 0.0)
    return Check(
        subject=subject,
        name=name,
        kind=kind,
        demand=demand,
        limit=limit,
        limit_value=value,
        ratio=ratio,
        near=near,
        source=source_text(limit),
        remarks=remarks,
        rises_with_water=rises_with_water,
        grades_below=grades_below,
    )


def level_check(
    *,
    subject: str,
    name: str,
    level: FloatArray,
    bottom: float,
    limit: Quantity | None,
    highest: float,
    near: float,
    remarks: tuple[str, ...] = (),
    grades_below: bool = True,
) -> Check:
    """Hold a water level against the highest one that somebody allowed; the ratio is that of heads.

    Parameters
    ----------
    level
        Flood-side level, shape (n,). [m]
    bottom
        Elevation from which head is counted. [m]
    limit
        What was entered, or None.
    highest
        Elevation it amounts to; NaN without a limit. [m]
    grades_below
        As in `Check`.
    """
    head = np.maximum(level - bottom, 0.0)
    allowed = highest - bottom
    if limit is None:
        ratio = np.full(len(level), np.nan)
    elif allowed > 0:
        ratio = head / allowed
    else:
        ratio = np.where(level > highest, np.inf, 0.0)
    return Check(
        subject=subject,
        name=name,
        kind="elevation",
        demand=level,
        limit=limit,
        limit_value=highest,
        ratio=ratio,
        near=near,
        source=source_text(limit),
        remarks=remarks,
        rises_with_water=False,
        grades_below=grades_below,
    )


def worst(verdicts: list[Verdict]) -> Verdict:
    """Return the most pressing verdict; "not checked" when there is none."""
    return max(verdicts, key=SEVERITY.index, default="not checked")
