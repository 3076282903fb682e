"""Published ranges of the formulas as data, and the refusal of what a formula cannot answer.

Two things are kept apart. Outside its *limit of use* a formula still answers, and whoever asked adds a
remark; `outside` says for which states. An input for which the formula has *no* answer at all (ground steeper
than the soil can stand) raises `OutsideFormulaError`, which names the quantity.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.problems import SillheadError


class OutsideFormulaError(SillheadError, ValueError):
    """An input for which a formula has no answer.

    Attributes
    ----------
    quantity
        Name of the quantity to correct, as the public functions spell it.
    rule
        What must hold.
    """

    def __init__(self, quantity: str, rule: str) -> None:
        self.quantity = quantity
        self.rule = rule
        super().__init__(f"{quantity} {rule}")


@dataclass(frozen=True, kw_only=True)
class LimitOfUse:
    """Range within which a formula is published, ends included.

    Attributes
    ----------
    quantity
        Name of the quantity, as the public functions spell it.
    low, high
        Ends of the range, in `unit`.
    unit
        SI base unit, "rad", or "–" for a pure number.
    note
        Whose range it is, and what to expect outside it.
    """

    quantity: str
    low: float
    high: float
    unit: str
    note: str


def outside(value: FloatArray, limit: LimitOfUse) -> BoolArray:
    """Whether each value lies outside the limit of use; a value that is not a number does.

    Parameters
    ----------
    value
        The limit's quantity, shape (n,). [unit of the limit]
    limit
        The range.

    Returns
    -------
    BoolArray
        True where a remark is due, shape (n,).

    Examples
    --------
    >>> limit = LimitOfUse(quantity="salinity", low=0.0, high=42.0, unit="–", note="example")
    >>> outside(np.array([0.0, 35.0, 42.5]), limit)
    array([False, False,  True])
    """
    return np.asarray(~((value >= limit.low) & (value <= limit.high)), dtype=np.bool_)


def refuse_unless(holds: BoolArray, quantity: str, rule: str) -> None:
    """Raise `OutsideFormulaError` unless the condition holds in every state.

    Parameters
    ----------
    holds
        The condition, shape (n,). Word it so that it is false for a value that is not a number.
    quantity
        Name of the quantity to correct.
    rule
        What must hold, to follow the name in a sentence.

    Raises
    ------
    OutsideFormulaError
        Where the condition fails in any state.
    """
    if not bool(np.all(holds)):
        raise OutsideFormulaError(quantity, rule)
