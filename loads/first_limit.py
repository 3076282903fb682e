"""The first-limit level: how high the flood side may rise until a demand first reaches its entered limit."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray

RESOLUTION = 0.001
"""Accuracy of a first-limit level. [m]"""
_POINTS = 33


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
    Each sweep cuts every check's bracket into 32; the last bracket is interpolated. Accuracy `RESOLUTION`.
    """
    first = ratios(np.linspace(low, high, _POINTS))
    count = first.shape[1]
    at_low = first[0] >= 1
    reached = np.asarray((first >= 1).any(axis=0))
    index = np.maximum(np.argmax(first >= 1, axis=0), 1)
    width = (high - low) / (_POINTS - 1)
    start = low + (index - 1) * width
    columns = np.arange(count)
    below, above = first[index - 1, columns], first[index, columns]
    while width > RESOLUTION / 4 and reached.any():
        inner = start[:, None] + width * np.linspace(0, 1, _POINTS)[None, :]
        values = ratios(inner.ravel())
        own = values.reshape(count, _POINTS, count)[columns, :, columns]
        index = np.maximum(np.argmax(own >= 1, axis=1), 1)
        width = width / (_POINTS - 1)
        start = start + (index - 1) * width
        below, above = own[columns, index - 1], own[columns, index]
    with np.errstate(invalid="ignore", divide="ignore"):
        share = np.clip((1 - below) / (above - below), 0, 1)
    level = np.where(at_low, low, start + width * np.where(np.isfinite(share), share, 1.0))
    return np.where(reached, level, np.nan), reached, at_low
