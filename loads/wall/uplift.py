"""Uplift: total head along the underside of a wall by a rule, with cutoffs, a drain and open cracks."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.wall.pressing import Push, push_on_edges
from loads.wall.seepage_path import SeepagePath, cutoff_reach


@dataclass(frozen=True, kw_only=True)
class Cracks:
    """Open lengths of the base from its two ends, each (n,). [m]."""

    heel: FloatArray
    toe: FloatArray


@dataclass(frozen=True, kw_only=True)
class Uplift:
    """Pressure of water on the underside, at stations from heel to toe.

    Attributes
    ----------
    x, z
        Stations along the underside, shape (n, q). [m]
    start, end
        Pressure at the two ends of each run between stations, shape (n, q − 1). [Pa]
    head_in, head_out
        Total head at the flood-side and the protected-side end, as an elevation, shape (n,). [m]
    push
        Sum of all runs.
    """

    x: FloatArray
    z: FloatArray
    start: FloatArray
    end: FloatArray
    head_in: FloatArray
    head_out: FloatArray
    push: Push


def uplift(
    path: SeepagePath,
    corners: tuple[FloatArray, FloatArray],
    *,
    heads: tuple[FloatArray, FloatArray],
    open_heads: tuple[FloatArray, FloatArray],
    unit_weight: float,
    cracks: Cracks,
    datum: FloatArray,
) -> Uplift:
    """Pressure on the underside and its sum, moments about the toe.

    Parameters
    ----------
    path
        The rule, its cutoffs and its drain.
    corners
        Underside from heel to toe, x and z, each (m, k), m = n or 1. [m]
    heads
        Total heads at both ends, from `end_heads`, each (n,). [m]
    open_heads
        Total heads in cracks from the heel and from the toe, each (n,). [m]
    unit_weight
        Weight per volume of the water. [N/m³]
    cracks
        Open lengths. A crack that reaches a cutoff or drain puts it out of use.
    datum
        Elevation from which the depths of cutoffs count, (m,) or (1,). [m]

    Notes
    -----
    p = γ (h − z), not below zero. h falls in a straight line with the resistance R passed since the end, or
    since the tip of the crack: R is the horizontal distance by the linear rule; on a line of creep the
    vertical lengths and the horizontal ones times their share, buried faces and both faces of cutoffs
    included.
    """
    x, z = corners
    states = len(heads[0])
    base, tail = z[:, :1], x[:, -1:]
    floor = float(z.min()) - 1.0
    open_in, open_out = (np.where(np.isfinite(head), head, floor) for head in open_heads)
    head_in, head_out = (np.where(np.isfinite(head), head, floor) for head in heads)
    along = np.concatenate([np.zeros((len(x), 1)), np.cumsum(_lengths(x, z), axis=1)], axis=1)
    marks = [cracks.heel[:, None], tail - cracks.toe[:, None]]
    marks += [np.full((states, 1), place) for place, _ in path.cutoffs]
    if path.drain:
        marks.append(np.full((states, 1), path.drain[0]))
    places = [_along_at(x, along, mark) for mark in marks]
    stations = np.sort(
        np.concatenate([np.broadcast_to(along, (states, along.shape[1])), *places], axis=1), axis=1
    )
    at_x, at_z, resistance = _positions(path, x, z, along, stations)
    middle = (stations[:, 1:] + stations[:, :-1]) / 2
    reaches = [cutoff_reach(corners, place, depth, datum) for place, depth in path.cutoffs]
    cutoffs = list(zip(places[2:], reaches, strict=False))
    passed, total = _resistances(path, base[:, 0], resistance, middle, cutoffs)
    ends = _Ends(tip_in=places[0], tip_out=places[1], middle=middle, total=total, cracks=cracks)
    drain = places[-1] if path.drain else None
    head = _heads(path, passed, ends, heads=(head_in, head_out), open_heads=(open_in, open_out), drain=drain)
    lifted = unit_weight * (head - np.stack([at_z[:, :-1], at_z[:, 1:]]))
    if path.rule == "none":
        lifted = np.zeros_like(lifted)
    push = push_on_edges(at_x, at_z, lifted[0], lifted[1], (x[:, -1], z[:, -1]))
    return Uplift(
        x=at_x,
        z=at_z,
        start=np.maximum(lifted[0], 0.0),
        end=np.maximum(lifted[1], 0.0),
        head_in=heads[0],
        head_out=heads[1],
        push=push,
    )


@dataclass(frozen=True, kw_only=True)
class _Ends:
    tip_in: FloatArray
    tip_out: FloatArray
    middle: FloatArray
    total: FloatArray
    cracks: Cracks


def _resistances(
    path: SeepagePath,
    base: FloatArray,
    resistance: FloatArray,
    middle: FloatArray,
    cutoffs: list[tuple[FloatArray, FloatArray]],
) -> tuple[FloatArray, FloatArray]:
    """Resistance passed at both ends of each run, (2, n, q − 1), and that of the whole path, (n,)."""
    passed = np.stack([resistance[:, :-1], resistance[:, 1:]])
    total = resistance[:, -1]
    if path.creeps:
        buried_in = np.maximum(path.flood_ground - base, 0.0)
        total = total + buried_in + np.maximum(path.protected_ground - base, 0.0)
        passed = passed + buried_in[:, None]
        for place, reach in cutoffs:
            passed = passed + 2 * reach[:, None] * (middle > place)
            total = total + 2 * reach
    return passed, total


def _lengths(x: FloatArray, z: FloatArray) -> FloatArray:
    return np.asarray(np.hypot(np.diff(x, axis=1), np.diff(z, axis=1)))


def _along_at(x: FloatArray, along: FloatArray, mark: FloatArray) -> FloatArray:
    """Path length at which the underside first reaches a distance from the heel."""
    place = np.broadcast_to(along[:, :1], mark.shape)
    for i in range(x.shape[1] - 1):
        run = (x[:, i + 1] - x[:, i])[:, None]
        length = (along[:, i + 1] - along[:, i])[:, None]
        share = np.clip(np.divide(mark - x[:, i : i + 1], run, out=np.zeros(mark.shape), where=run > 0), 0, 1)
        upright = np.where(mark > x[:, i : i + 1], 1.0, 0.0)
        place = place + np.where(run > 0, share, upright) * length
    return np.asarray(place)


def _positions(
    path: SeepagePath, x: FloatArray, z: FloatArray, along: FloatArray, stations: FloatArray
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Corners' x, z and resistance, without cutoffs, at stations."""
    weight_x = path.horizontal_share if path.creeps else 1.0
    weight_z = 1.0 if path.creeps else 0.0
    at_x = np.broadcast_to(x[:, :1], stations.shape)
    at_z = np.broadcast_to(z[:, :1], stations.shape)
    resistance = np.zeros(stations.shape)
    for i in range(x.shape[1] - 1):
        length = (along[:, i + 1] - along[:, i])[:, None]
        share = np.divide(
            stations - along[:, i : i + 1], length, out=np.zeros(stations.shape), where=length > 0
        )
        share = np.clip(share, 0, 1)
        across, up = (x[:, i + 1] - x[:, i])[:, None], (z[:, i + 1] - z[:, i])[:, None]
        at_x = at_x + across * share
        at_z = at_z + up * share
        resistance = resistance + (weight_x * across + weight_z * np.abs(up)) * share
    return at_x, at_z, resistance


def _heads(
    path: SeepagePath,
    passed: FloatArray,
    ends: _Ends,
    *,
    heads: tuple[FloatArray, FloatArray],
    open_heads: tuple[FloatArray, FloatArray],
    drain: FloatArray | None,
) -> FloatArray:
    """Total head at both ends of each run, shape (2, n, q − 1)."""
    open_in, open_out = ends.cracks.heel > 0, ends.cracks.toe > 0
    before, after = ends.middle < ends.tip_in, ends.middle > ends.tip_out
    head_in = np.where(open_in, open_heads[0], heads[0])[:, None]
    head_out = np.where(open_out, open_heads[1], heads[1])[:, None]
    low = np.where(before, passed[1], -np.inf).max(axis=1, initial=0.0)[:, None]
    high = np.where(after, passed[0], np.inf).min(axis=1, initial=np.inf)[:, None]
    first = np.where(open_in[:, None], low, 0.0)
    last = np.where(open_out[:, None], np.minimum(high, ends.total[:, None]), ends.total[:, None])
    head = _falling(passed, first, last, head_in, head_out)
    if path.drain is not None and drain is not None:
        at = np.where(ends.middle < drain, passed[1], 0.0).max(axis=1, initial=0.0)[:, None]
        _, kind, figure = path.drain
        undrained = _falling(at, first, last, head_in, head_out)
        kept = (
            head_out + (1 - figure) * (undrained - head_out)
            if kind == "effectiveness"
            else head_out + figure * (head_in - head_out)
        )
        upper = _falling(passed, first, at, head_in, kept)
        lower = _falling(passed, at, last, kept, head_out)
        works = (drain > ends.tip_in) & (drain < ends.tip_out)
        head = np.where(works, np.where(ends.middle < drain, upper, lower), head)
    return np.where(before, head_in, np.where(after, head_out, head))


def _falling(
    passed: FloatArray, first: FloatArray, last: FloatArray, head_in: FloatArray, head_out: FloatArray
) -> FloatArray:
    """Head in a straight line of resistance between two points."""
    reach = last - first
    share = np.divide(passed - first, reach, out=np.zeros(np.broadcast(passed, reach).shape), where=reach > 0)
    return np.asarray(head_in - (head_in - head_out) * np.clip(share, 0, 1))
