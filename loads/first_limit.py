"""The first-limit level: how high the flood side may rise until a demand first reaches its entered limit."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from loads.arrays import BoolArray, FloatArray

RESOLUTION = 0.001
"""Accuracy of a first-limit level. [m]"""
_POINTS, _INNER_POINTS = 33, 9
_FEW = 4
"""Up to so many checks a wider sweep is quicker than more of them."""


@dataclass(frozen=True, kw_only=True)
class FirstLimit:
    """Where the first limit is reached as the flood side rises, the other side as it stands.

    Attributes
    ----------
    level
        Flood-side elevation, or None when no limit is reached up to `ceiling`. [m]
    subject, check
        Which check is reached first; empty without a level.
    without_water
        True when the limit is reached with no water above the bottom on the flood side.
    ceiling
        Highest level searched. [m]
    """

    level: float | None
    subject: str
    check: str
    without_water: bool
    ceiling: float


def first_of(
    names: Sequence[tuple[str, str]], ratios: Callable[[FloatArray], FloatArray], *, low: float, high: float
) -> FirstLimit:
    """First-limit level of several checks: where the largest ratio of all reaches 1.

    Parameters
    ----------
    names
        Subject and name of each check, c of them.
    ratios
        As for `crossing_levels`.
    low, high
        Range of levels searched. [m]
    """

    def largest(levels: FloatArray) -> FloatArray:
        return np.asarray(np.fmax.reduce(ratios(levels), axis=1)[:, None])

    level, reached, at_low = crossing_levels(largest, low=low, high=high)
    if not reached[0]:
        return FirstLimit(level=None, subject="", check="", without_water=False, ceiling=high)
    subject, check = names[int(np.nanargmax(ratios(level)[0]))]
    return FirstLimit(
        level=float(level[0]), subject=subject, check=check, without_water=bool(at_low[0]), ceiling=high
    )


def each_of(
    names: Sequence[tuple[str, str]], ratios: Callable[[FloatArray], FloatArray], *, low: float, high: float
) -> tuple[FirstLimit, ...]:
    """Level at which each check reaches its limit, the lowest first; those that reach none are left out."""
    level, reached, at_low = crossing_levels(ratios, low=low, high=high)
    order = [int(column) for column in np.argsort(level, kind="stable") if reached[column]]
    return tuple(
        FirstLimit(
            level=float(level[column]),
            subject=names[column][0],
            check=names[column][1],
            without_water=bool(at_low[column]),
            ceiling=high,
        )
        for column in order
    )


def crossing_levels(
    ratios: Callable[[FloatArray], FloatArray], *, low: float, high: float
) -> tuple[FloatArray, BoolArray, BoolArray]:
    """Lowest level at which each ratio reaches 1, going up, by sweeps of many states at once.

    Parameters
    ----------
    ratios
        Takes flood-side levels (n,) and returns demand over limit (n, c), signed: positive toward the
        protected side.
    low, high
        Range of levels searched. [m]

    Returns
    -------
    tuple
        Levels (c,), NaN where 1 is not reached; whether it is reached, (c,); whether it is reached at `low`
        already, (c,).

    Notes
    -----
    Each sweep cuts the brackets that are left into equal parts, brackets that several checks share once; the
    last one is interpolated. Accuracy `RESOLUTION`.
    """
    first = ratios(np.linspace(low, high, _POINTS))
    at_low = first[0] >= 1
    reached = np.asarray((first >= 1).any(axis=0))
    level = np.where(at_low, low, np.nan)
    columns = np.flatnonzero(reached & ~at_low)
    if len(columns):
        width = (high - low) / (_POINTS - 1)
        index = np.argmax(first[:, columns] >= 1, axis=0)
        level[columns] = _narrowed(ratios, columns, low + (index - 1) * width, width)
    return level, reached, at_low


def _narrowed(
    ratios: Callable[[FloatArray], FloatArray], columns: NDArray[np.intp], start: FloatArray, width: float
) -> FloatArray:
    """Level within a bracket of one width at which each of the columns reaches 1."""
    points = _POINTS if len(columns) <= _FEW else _INNER_POINTS
    each = np.arange(len(columns))
    while True:
        starts, own = np.unique(start, return_inverse=True)
        inner = starts[:, None] + width * np.linspace(0, 1, points)[None, :]
        values = ratios(inner.ravel())[:, columns].reshape(len(starts), points, len(columns))
        mine = values[own, :, each]
        index = np.maximum(np.argmax(mine >= 1, axis=1), 1)
        width /= points - 1
        start = start + (index - 1) * width
        if width <= RESOLUTION / 4:
            break
    below, above = mine[each, index - 1], mine[each, index]
    with np.errstate(invalid="ignore", divide="ignore"):
        share = np.clip((1 - below) / (above - below), 0, 1)
    return np.asarray(start + width * np.where(np.isfinite(share), share, 1.0))
