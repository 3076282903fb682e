"""How many logs a level asks for, their top, whether they are on hand, and what stops the water before."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np
from numpy.typing import NDArray

from loads.arrays import BoolArray, FloatArray
from loads.limits_of_use import refuse_unless

SAME_LEVEL: Final = 1e-6
"""Elevations closer than this are one and the same: below any survey, above the rounding of units. [m]"""


@dataclass(frozen=True, kw_only=True)
class Bays:
    """The k bays of a closure.

    Attributes
    ----------
    sill
        Elevation on which the bottom log stands, shape (k,). [m]
    log_height
        Effective stacked height of a log, shape (k,). [m]
    on_hand
        Whole logs ready for the bay, shape (k,).
    """

    sill: FloatArray
    log_height: FloatArray
    on_hand: NDArray[np.int64]


@dataclass(frozen=True, kw_only=True)
class Ceiling:
    """A level that the water, or the stack, may not pass.

    Attributes
    ----------
    name
        For example "rated level", "first-limit level of bay 1 log 1", "top of the guides".
    level
        Its elevation. [m]
    of_stack
        True when it bounds the top of the logs, false when it bounds the water.
    """

    name: str
    level: float
    of_stack: bool = False


@dataclass(frozen=True, kw_only=True)
class LogsNeeded:
    """Logs for n target levels in k bays.

    Attributes
    ----------
    water
        Target level and allowance, shape (n,). [m]
    wanted_top
        The same and the freeboard, shape (n,). [m]
    count
        Logs needed in each bay, shape (n, k).
    top
        Top of so many logs, shape (n, k). [m]
    short
        Logs that are not on hand, shape (n, k).
    top_on_hand
        Top that the logs on hand reach of what is needed, shape (n, k). [m]
    ceilings
        As given.
    """

    water: FloatArray
    wanted_top: FloatArray
    count: NDArray[np.int64]
    top: FloatArray
    short: NDArray[np.int64]
    top_on_hand: FloatArray
    ceilings: tuple[Ceiling, ...]

    @property
    def enough(self) -> BoolArray:
        """Whether every bay has its logs on hand, shape (n,)."""
        return np.asarray((self.short == 0).all(axis=1), dtype=np.bool_)

    def stopped_by(self, index: int = 0) -> tuple[Ceiling, ...]:
        """Ceilings that the water or the stack of one state would pass, the lowest first."""
        highest = float(self.top[index].max())
        passed = [
            ceiling
            for ceiling in self.ceilings
            if (highest if ceiling.of_stack else float(self.water[index])) > ceiling.level + SAME_LEVEL
        ]
        return tuple(sorted(passed, key=lambda ceiling: ceiling.level))


def stack_top(sill: FloatArray, log_height: FloatArray, count: NDArray[np.int64]) -> FloatArray:
    """Top of so many logs [LogCount].

    Parameters
    ----------
    sill, log_height
        Shape (k,). [m]
    count
        Logs in place, shape (k,) or (n, k).

    Returns
    -------
    FloatArray
        Elevation, shape of `count`; the sill where there is no log. [m]

    Examples
    --------
    >>> stack_top(np.array([10.0]), np.array([0.25]), np.array([4]))
    array([11.])
    """
    return np.asarray(sill + count * log_height, dtype=np.float64)


def logs_to_reach(wanted_top: FloatArray, sill: FloatArray, log_height: FloatArray) -> NDArray[np.int64]:
    """Fewest whole logs whose top is not below a level [LogCount].

    Parameters
    ----------
    wanted_top
        Shape (n,); minus infinity where nothing is wanted. [m]
    sill, log_height
        Shape (k,). [m]

    Returns
    -------
    NDArray of int64
        Shape (n, k); none where the level is not above the sill.

    Raises
    ------
    OutsideFormulaError
        A log height that is not above zero, or a level that is not a number or without end.

    Notes
    -----
    ⌈(level − sill) / height⌉, a top within `SAME_LEVEL` of the level counting as reaching it: six logs of
    0.50 ft reach 3.00 ft, though the quotient of the metres need not be exactly six.

    Examples
    --------
    >>> logs_to_reach(np.array([2.9, 3.0, 3.1]), np.array([0.0]), np.array([0.5])).tolist()
    [[6], [6], [7]]
    """
    refuse_unless(log_height > 0, "log_height", "must be above zero")
    refuse_unless(wanted_top < np.inf, "wanted_top", "must be a level")
    rise = np.maximum(wanted_top[:, None] - sill - SAME_LEVEL, 0.0)
    return np.asarray(np.ceil(rise / log_height), dtype=np.int64)


def logs_needed(
    target_level: FloatArray,
    bays: Bays,
    *,
    allowance: float,
    freeboard: float,
    ceilings: Sequence[Ceiling] = (),
) -> LogsNeeded:
    """Logs for a target level with an allowance for what is not known, and the owner's freeboard [LogCount].

    Parameters
    ----------
    target_level
        Level of the water to be held, shape (n,); minus infinity where dry. [m]
    bays
        The k bays.
    allowance
        What the water may come higher than the target. [m]
    freeboard
        What the logs must stand above the water. [m]
    ceilings
        Rated level, limits, guides. The water with its allowance is held against those of the water; the
        freeboard is not water and does not count there.

    Returns
    -------
    LogsNeeded
        For every target and bay.

    Raises
    ------
    OutsideFormulaError
        A negative allowance, freeboard or count, a log height that is not above zero, or no bay.

    Examples
    --------
    >>> bays = Bays(sill=np.array([0.0]), log_height=np.array([0.5]), on_hand=np.array([4]))
    >>> found = logs_needed(np.array([1.9]), bays, allowance=0.5, freeboard=0.5)
    >>> found.count.tolist(), found.top.tolist(), found.short.tolist()
    ([[6]], [[3.0]], [[2]])
    """
    refuse_unless(np.asarray(allowance >= 0), "allowance", "must not be negative")
    refuse_unless(np.asarray(freeboard >= 0), "freeboard", "must not be negative")
    refuse_unless(np.asarray(bays.sill.size > 0), "bays", "must be at least one")
    refuse_unless(bays.on_hand >= 0, "on_hand", "must not be negative")
    water = target_level + allowance
    count = logs_to_reach(water + freeboard, bays.sill, bays.log_height)
    there = np.minimum(count, bays.on_hand)
    return LogsNeeded(
        water=water,
        wanted_top=water + freeboard,
        count=count,
        top=stack_top(bays.sill, bays.log_height, count),
        short=count - there,
        top_on_hand=stack_top(bays.sill, bays.log_height, there),
        ceilings=tuple(ceilings),
    )
