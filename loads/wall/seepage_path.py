"""The way of water under a wall: where it enters and leaves, and what cutoffs add to it."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray


@dataclass(frozen=True, kw_only=True)
class SeepagePath:
    """How head is lost between the two sides; one for all states.

    Attributes
    ----------
    rule
        "linear", "line of creep" or "none".
    horizontal_share
        What a horizontal length counts for beside a vertical one, on a line of creep. [–]
    flood_ground, protected_ground
        Elevations of the ground. [m]
    cutoffs
        Distance from the heel and depth below the base of each. [m]
    drain
        Distance from the heel, kind ("effectiveness" or "remaining_share") and figure; or None.
    """

    rule: str
    horizontal_share: float
    flood_ground: float
    protected_ground: float
    cutoffs: tuple[tuple[float, float], ...] = ()
    drain: tuple[float, str, float] | None = None

    @property
    def creeps(self) -> bool:
        """True on a line of creep."""
        return self.rule == "line of creep"


def end_heads(
    path: SeepagePath, base: FloatArray, flood_level: FloatArray, protected_level: FloatArray
) -> tuple[FloatArray, FloatArray]:
    """Total head at both ends of the seepage path.

    Parameters
    ----------
    path
        The rule.
    base
        Elevation of the base, shape (n,) or (1,). [m]
    flood_level, protected_level
        Shape (n,); minus infinity where dry. [m]

    Returns
    -------
    tuple of FloatArray
        Flood-side and protected-side head, shape (n,); minus infinity where neither side has water. [m]

    Notes
    -----
    At a dry end water leaves at the ground of a line of creep, at the base's corner by the linear rule: there
    the head is its elevation, but never more than the level of the other side.
    """
    higher = np.maximum(flood_level, protected_level)
    outlets = [base, base]
    if path.creeps:
        outlets = [np.maximum(ground, base) for ground in (path.flood_ground, path.protected_ground)]
    flood = np.minimum(np.maximum(flood_level, outlets[0]), higher)
    protected = np.minimum(np.maximum(protected_level, outlets[1]), higher)
    return np.asarray(flood), np.asarray(protected)


def cutoff_reach(
    corners: tuple[FloatArray, FloatArray], place: float, depth: float, datum: FloatArray
) -> FloatArray:
    """Length of a cutoff below the underside at its place, (m,). [m].

    Parameters
    ----------
    corners
        Underside from heel to toe, x and z, each (m, k). [m]
    place
        Distance from the heel. [m]
    depth
        Of the cutoff's tip below the datum. [m]
    datum
        Elevation of the base, (m,) or (1,). [m]
    """
    x, z = corners
    lowest = np.full(len(x), np.inf)
    for i in range(x.shape[1] - 1):
        run = x[:, i + 1] - x[:, i]
        share = np.divide(place - x[:, i], run, out=np.zeros(len(x)), where=run > 0)
        over = (x[:, i] <= place) & (place <= x[:, i + 1])
        here = np.where(run > 0, z[:, i] + (z[:, i + 1] - z[:, i]) * share, np.minimum(z[:, i], z[:, i + 1]))
        lowest = np.where(over, np.minimum(lowest, here), lowest)
    under = np.where(np.isfinite(lowest), lowest, z[:, -1])
    return np.asarray(np.maximum(under - (datum - depth), 0.0))
