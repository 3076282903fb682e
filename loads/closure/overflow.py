"""Where water goes over a stack of logs or through an opening left by logs not in place, and how much of it.

Published formulas for the same crest differ by several percent, a sharp crest from a broad one by eight; the
lowest and the highest of those that apply are given, never one figure alone.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.closure.crest_formulas import SHARP_CREST_FORMULAS, SharpCrestFormula
from loads.closure.weirs import drowning_factor, flow_broad_crest, flow_sharp_crest
from loads.limits_of_use import LimitOfUse, outside, refuse_unless

SPRINGS_CLEAR: Final = LimitOfUse(
    quantity="head_over_crest_thickness",
    low=0.0,
    high=2.0,
    unit="–",
    note="from memory, to be confirmed: above it the water springs clear of the crest and a broad crest no "
    "longer applies; below a quarter of it a sharp crest does not",
)
CLINGING_NAPPE: Final = LimitOfUse(
    quantity="head",
    low=0.03,
    high=np.inf,
    unit="m",
    note="below it the water clings to the log and no formula is exact",
)
FORMULAS: Final = (*(formula.name for formula in SHARP_CREST_FORMULAS), "sharp crest", "broad crest")
"""Names of the formulas, in the order of the last axis of `Overflow.applies`."""

_SHARP_FROM: Final = SPRINGS_CLEAR.high / 4


@dataclass(frozen=True, kw_only=True)
class Openings:
    """The k places where water can go over.

    Attributes
    ----------
    crest
        Top of the logs in place, or the sill where there is none, shape (k,). [m]
    width
        Clear width, shape (k,). [m]
    ground
        Elevation of the ground, or the sill, on the flood side in front of it, shape (k,). [m]
    crest_thickness
        Log from face to face, shape (k,); NaN where it was not entered, and then both kinds of crest
        are taken to be possible. [m]
    """

    crest: FloatArray
    width: FloatArray
    ground: FloatArray
    crest_thickness: FloatArray


@dataclass(frozen=True, kw_only=True)
class Overflow:
    """Water over k crests in n states.

    Attributes
    ----------
    level
        Level at which water begins to go over, the lowest crest. [m]
    head
        Head over each crest, shape (n, k). [m]
    low, high
        Least and greatest flow of the formulas that apply, shape (n, k). [m³/s]
    applies
        Which of `FORMULAS` apply, shape (n, k, 6).
    """

    level: float
    head: FloatArray
    low: FloatArray
    high: FloatArray
    applies: BoolArray

    @property
    def total_low(self) -> FloatArray:
        """Least flow over all crests, shape (n,). [m³/s]."""
        return np.asarray(self.low.sum(axis=1), dtype=np.float64)

    @property
    def total_high(self) -> FloatArray:
        """Greatest flow over all crests, shape (n,). [m³/s]."""
        return np.asarray(self.high.sum(axis=1), dtype=np.float64)

    def formulas(self, index: int = 0) -> tuple[str, ...]:
        """Names of the formulas that apply at some crest in one state."""
        return tuple(
            name for name, used in zip(FORMULAS, self.applies[index].any(axis=0), strict=True) if used
        )

    def remarks(self, index: int = 0) -> tuple[str, ...]:
        """What whoever reads the flow in one state must know."""
        head = self.head[index]
        flowing = head > 0
        if not flowing.any():
            return ()
        words = ["still water in front of a level crest, air under the falling water"]
        if (flowing & outside(head, CLINGING_NAPPE)).any():
            words.append(f"a head is below {CLINGING_NAPPE.low:.2f} m: {CLINGING_NAPPE.note}")
        named = self.applies[index, :, : len(SHARP_CREST_FORMULAS)].any(axis=1)
        if (flowing & ~named).any():
            words.append(
                "outside the limits of use of every formula with a crest height; general ones are used"
            )
        return tuple(words)


def overflow(openings: Openings, flood_side: FloatArray, protected_side: FloatArray) -> Overflow:
    """Flow over every crest, as the range between formulas of equal standing.

    Rehbock, Ackers, Kindsvater and Carter where they are published for the crest and the head; a sharp crest
    with Francis' coefficient [Francis1855] and a broad crest [Belanger1828] as far as the thickness allows.

    Parameters
    ----------
    openings
        The k crests.
    flood_side, protected_side
        Levels, shape (n,); minus infinity where dry. [m]

    Returns
    -------
    Overflow
        Flow toward the protected side; none where that side is as high or higher.

    Raises
    ------
    OutsideFormulaError
        A negative width, a ground above its crest, or a thickness that is not above zero.

    Notes
    -----
    Water above a crest on the protected side drowns a sharp crest by [Villemonte1947], from memory, to be
    confirmed. Outside its heads a formula only bounds the range: past the last of them the highest flow is
    not below what it gives there, before the first the least flow not above. So more head never gives less,
    and water behind never more.
    The level is taken as measured ahead of the crest in an approach as wide as the opening: where it was
    taken in water at rest, formulas with h/P lie on the high side.

    Examples
    --------
    >>> one = np.ones(1)
    >>> bay = Openings(crest=one, width=3 * one, ground=0 * one, crest_thickness=np.nan * one)
    >>> found = overflow(bay, np.array([0.9, 1.2]), np.array([-np.inf, -np.inf]))
    >>> found.low.round(3).tolist(), found.high.round(3).tolist()
    ([[0.0], [0.457]], [[0.0], [0.495]])
    """
    _refuse_impossible(openings)
    head = np.maximum(flood_side[:, None] - openings.crest, 0.0)
    tail = np.maximum(protected_side[:, None] - openings.crest, 0.0)
    low, high, applies = [], [], []
    for formula in _formulas_at(openings):
        first, last, exists = formula.first, formula.last, formula.last >= formula.first
        begun, ended = exists & (head >= first), head > last
        low.append(np.where(exists & ~ended, formula.flow(np.maximum(head, first), tail), np.inf))
        high.append(np.where(begun, formula.flow(np.minimum(head, last), tail), 0.0))
        applies.append(begun & ~ended & (head > 0))
    return Overflow(
        level=float(openings.crest.min()),
        head=head,
        low=np.min(low, axis=0),
        high=np.max(high, axis=0),
        applies=np.stack(applies, axis=-1),
    )


@dataclass(frozen=True, kw_only=True)
class _FormulaHere:
    """A formula at the k crests: flow from both heads, and the heads from and to which it applies, (k,)."""

    flow: Callable[[FloatArray, FloatArray], FloatArray]
    first: FloatArray
    last: FloatArray


def _formulas_at(openings: Openings) -> list[_FormulaHere]:
    """Every formula of `FORMULAS` at the crests, in that order."""
    width, thickness = openings.width, openings.crest_thickness
    crest_height = openings.crest - openings.ground
    sharp_from = np.where(np.isnan(thickness), 0.0, _SHARP_FROM * thickness)
    broad_to = np.where(np.isnan(thickness), np.inf, SPRINGS_CLEAR.high * thickness)

    def of_sharp(formula: SharpCrestFormula) -> _FormulaHere:
        last = formula.greatest_head(crest_height, width)
        height = np.where(last > 0, crest_height, 1.0)
        return _FormulaHere(
            flow=lambda h, tail: formula.flow(h, height, width) * drowning_factor(h, tail),
            first=np.maximum(sharp_from, formula.head.low),
            last=last,
        )

    sharp = _FormulaHere(
        flow=lambda h, tail: flow_sharp_crest(h, width) * drowning_factor(h, tail),
        first=sharp_from,
        last=np.full_like(width, np.inf),
    )
    broad = _FormulaHere(
        flow=lambda h, tail: flow_broad_crest(h, tail, width), first=np.zeros_like(width), last=broad_to
    )
    return [*(of_sharp(formula) for formula in SHARP_CREST_FORMULAS), sharp, broad]


def _refuse_impossible(openings: Openings) -> None:
    refuse_unless(openings.width >= 0, "width", "must not be negative")
    refuse_unless(openings.crest >= openings.ground, "ground", "must not be above the crest")
    thickness = openings.crest_thickness
    refuse_unless(np.isnan(thickness) | (thickness > 0), "crest_thickness", "must be above zero")
