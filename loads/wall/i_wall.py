"""I-walls: net pressure on a sheet with a gap, the embedment that balances it, shear and moment in it.

One uniform soil on each side. Water loses head along the sheet in a straight line from where it enters the
ground, or from the bottom of the gap, down to the tip and up to where it leaves.
"""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.diagram import Diagram
from loads.records.i_wall import IWall
from loads.records.sediment import Sediment
from loads.sediment import cohesion_pressure, face_coefficient, unit_weights
from loads.states import Levels
from loads.wall.forces import Waters

CANNOT_DECIDE = (
    "This screen balances moments on a stiff sheet in one uniform soil. It cannot decide on layered soils, "
    "on deep rotation of sheet and levee together, on a sheet that bends, on soft ground, or on what becomes "
    "of the ground after a gap has opened. A licensed engineer must."
)
NO_GAP = (
    "No gap on the flood side is counted: that is marked unconservative. Water may part the sheet from the "
    "ground and press in the gap with its full head."
)
SEARCH = 6.0
"""Embedments are sought down to this many times the exposed height below the protected-side ground. [–]"""
_POINTS = 241
_STEPS = 60
_CLOSED = 1e-11
"""Width of a bracket that is left. [m]"""
_RIGHT = np.pi / 2

Term = tuple[FloatArray, FloatArray, FloatArray]


@dataclass(frozen=True, kw_only=True)
class SheetPressure:
    """Pressures on the sheet for one elevation of the tip in each state.

    Attributes
    ----------
    parts
        Diagrams by cause, signed toward the protected side; passive pressure divided by its factor.
    net
        Their sum.
    gradient
        Loss of head per length of path, positive when water moves to the protected side, shape (n,). [–]
    head
        Difference of head, shape (n,). [m]
    """

    parts: dict[str, Diagram]
    net: Diagram
    gradient: FloatArray
    head: FloatArray


def gap_bottom(wall: IWall, tip: FloatArray) -> FloatArray:
    """Elevation of the bottom of the gap, that of the ground without one, shape of `tip`. [m]."""
    ground = np.full_like(tip, wall.ground("flood"))
    if wall.gap == "to tip":
        return tip
    if wall.gap == "to depth":
        assert wall.gap_depth is not None
        return np.maximum(ground - wall.gap_depth.value, tip)
    return ground


def sheet_pressure(wall: IWall, levels: Levels, waters: Waters, tip: FloatArray) -> SheetPressure:
    """Pressures above a tip at elevations (n,).

    Notes
    -----
    i = ΔH/(path on both sides of the sheet). Flood side: γ_w (L − z), less i γ_w per depth below the entry;
    K σ′v with γ′ + i γ_w, none in the gap. Protected side: γ_w (exit − z) plus i γ_w per depth; passive
    (K_p σ′v + 2c′√K_p)/F with γ′ − i γ_w.
    """
    states = levels.states
    ground = {side: np.full(states, wall.ground(side)) for side in ("flood", "protected")}
    entry = np.maximum(gap_bottom(wall, tip), tip)
    higher = np.maximum(levels.flood_side, levels.protected_side)
    surface = {
        side: np.minimum(np.maximum(levels.of(side), ground[side]), higher) for side in ("flood", "protected")
    }
    wet = np.isfinite(higher)
    surface = {side: np.where(wet, level, ground[side] - 1e3) for side, level in surface.items()}
    head = np.where(wet, surface["flood"] - surface["protected"], 0.0)
    path = (np.minimum(entry, surface["flood"]) - tip) + (
        np.minimum(ground["protected"], surface["protected"]) - tip
    )
    gradient = np.divide(head, path, out=np.zeros(states), where=wet & (path > 0))
    top = wall.top.value
    begin = np.minimum(entry, surface["flood"])
    leave = np.minimum(ground["protected"], surface["protected"])
    flood = np.where(wet, waters.flood, 0.0)
    protected = np.where(wet, waters.protected, 0.0)
    nil = np.zeros(states)
    parts = {
        "water, flood side": Diagram.of_terms(
            states, [(surface["flood"], nil, flood), (begin, nil, -flood * gradient)]
        ).below(top),
        "water, protected side": Diagram.of_terms(
            states, [(surface["protected"], nil, protected), (leave, nil, protected * gradient)]
        )
        .below(top)
        .scaled(-1.0),
    }
    for side, sign, name in (("flood", 1.0, "soil"), ("protected", -1.0 / wall.passive_factor, "passive")):
        start = np.minimum(ground[side], entry) if side == "flood" else ground[side]
        seep = (1 - gradient) * flood if side == "flood" else (1 + gradient) * protected
        diagram = _soil(wall.layer(side), ground[side], start, surface[side], seep)
        parts[f"{name}, {side} side"] = diagram.scaled(sign)
    return SheetPressure(parts=parts, net=Diagram.joined(parts.values()), gradient=gradient, head=head)


def _soil(
    layer: Sediment, ground: FloatArray, start: FloatArray, table: FloatArray, lift: FloatArray
) -> Diagram:
    """Effective pressure of one soil below `start`; `lift` is what water takes off its weight, (n,)."""
    coefficient = face_coefficient(layer, _RIGHT)
    taken = cohesion_pressure(layer, coefficient)
    moist, saturated = unit_weights(layer, 0.0)
    load = layer.surcharge.value if layer.surcharge else 0.0
    surface = np.clip(table, -1e6, ground)
    above = np.maximum(ground - start, 0.0)
    dry = np.minimum(above, ground - surface)
    stress = load + moist * dry + (saturated - lift) * (above - dry)
    turn = np.minimum(start, surface)
    terms = _floored(coefficient * stress - taken, coefficient * np.full_like(ground, moist), start, turn)
    stress = stress + moist * (start - turn)
    terms += _endless(coefficient * stress - taken, coefficient * (saturated - lift), turn)
    return Diagram.of_terms(len(ground), terms)


def _floored(start: FloatArray, slope: FloatArray, upper: FloatArray, lower: FloatArray) -> list[Term]:
    """Terms of a straight piece that grows downward, nil where it would be tension."""
    end = start + slope * (upper - lower)
    share = np.divide(start, slope, out=np.zeros_like(start), where=slope != 0)
    zero = np.clip(upper + share, lower, upper)
    head = np.where(start < 0, zero, upper)
    grows = np.where((start > 0) | (end > 0), slope, 0.0)
    return [(head, np.maximum(start, 0.0), grows), (lower, -np.maximum(end, 0.0), -grows)]


def _endless(start: FloatArray, slope: FloatArray, upper: FloatArray) -> list[Term]:
    """Terms of a piece without a lower end, nil where it would be tension."""
    share = np.divide(start, slope, out=np.zeros_like(start), where=slope != 0)
    grows = slope > 0
    begin = np.where(grows & (start < 0), upper + share, upper)
    first = (begin, np.maximum(start, 0.0), np.where(grows | (start > 0), slope, 0.0))
    stop = np.where(~grows & (start > 0) & (slope < 0), upper + share, begin)
    ends = np.where(~grows & (start > 0) & (slope < 0), -slope, 0.0)
    return [first, (stop, np.zeros_like(start), ends)]


@dataclass(frozen=True, kw_only=True)
class Embedment:
    """What depth balances the sheet, for n states.

    Attributes
    ----------
    balanced
        Depth of the tip below the protected-side ground at which moments about it balance; NaN where none was
        found, shape (n,). [m]
    required
        `balanced` times the increase, shape (n,). [m]
    provided
        Of the sheet entered, shape (n,). [m]
    found
        Whether a depth was found, shape (n,).
    pressure
        With the tip at the balanced depth; at the sheet's own tip where none was found.
    """

    balanced: FloatArray
    required: FloatArray
    provided: FloatArray
    found: BoolArray
    pressure: SheetPressure


def embedment(wall: IWall, levels: Levels, waters: Waters) -> Embedment:
    """Depth at which moments about the tip balance, by the method "moments about the tip" [SheetPractice].

    Notes
    -----
    The depth is the least one below which net pressure, passive over its factor, no longer turns the top
    toward the protected side; the fixity below the tip is allowed for by the increase. Sought by a sweep of
    depths and the secant between two of them.
    """
    states = levels.states
    ground = wall.ground("protected")
    exposed = max(wall.top.value - ground, 0.1)
    start = min(ground, wall.ground("flood"))
    depths = np.linspace(0.0, SEARCH * exposed, _POINTS)

    def turning(tip: FloatArray, at: Levels) -> FloatArray:
        return sheet_pressure(wall, at, waters, tip).net.moment(tip[:, None])[:, 0]

    swept = Levels(
        flood_side=np.tile(levels.flood_side, _POINTS), protected_side=np.tile(levels.protected_side, _POINTS)
    )
    values = turning(np.repeat(start - depths, states), swept).reshape(_POINTS, states)
    holds = values <= 0
    drives = (~holds).any(axis=0)
    last = np.where(drives, _POINTS - 1 - np.argmax(~holds[::-1], axis=0), 0)
    found = last < _POINTS - 1
    low = start - depths[np.minimum(last, _POINTS - 2)]
    high = start - depths[np.minimum(last, _POINTS - 2) + 1]
    high = np.where(drives, high, low)
    at = np.minimum(last, _POINTS - 2), np.arange(states)
    ends = values[at], np.where(drives, values[at[0] + 1, at[1]], values[at])
    high = _nil_between(lambda tip: turning(tip, levels), (low, high), ends)
    balanced = np.where(found, ground - high, np.nan)
    tip = np.where(found, high, wall.tip.value)
    return Embedment(
        balanced=balanced,
        required=balanced * wall.embedment_increase,
        provided=np.full(states, ground - wall.tip.value),
        found=found,
        pressure=sheet_pressure(wall, levels, waters, tip),
    )


def _nil_between(
    turning: Callable[[FloatArray], FloatArray],
    bracket: tuple[FloatArray, FloatArray],
    ends: tuple[FloatArray, FloatArray],
) -> FloatArray:
    """Place just beyond which a moment is no longer positive, by the secant kept within its bracket.

    The end whose value stays is given half of it (the rule of Illinois); every fourth step halves, so that
    the bracket always closes.
    """
    low, high = bracket
    at_low, at_high = ends
    for step in range(_STEPS):
        if np.all(np.abs(high - low) <= _CLOSED):
            break
        drop = at_low - at_high
        share = np.divide(at_low, drop, out=np.full_like(low, 0.5), where=drop > 0)
        share = np.full_like(low, 0.5) if step % 4 == 3 else np.clip(share, 0.0, 1.0)
        middle = low + (high - low) * share
        value = turning(middle)
        over = value > 0
        at_high = np.where(over, at_high / 2, value)
        at_low = np.where(over, value, at_low / 2)
        low, high = np.where(over, middle, low), np.where(over, high, middle)
    return high


def sheet_extremes(net: Diagram, top: float, tip: FloatArray) -> tuple[FloatArray, FloatArray]:
    """Greatest magnitudes of shear and moment in the sheet between top and tip, with their signs, (n,).

    Moments are greatest where the shear is nil; they are sought on a fine division of the sheet and refined
    by the parabola through three neighbours.
    """
    share = np.linspace(0.0, 1.0, 801)
    z = top + (tip[:, None] - top) * share
    shear, moment = net.shear(z), net.moment(z)
    rows = np.arange(len(tip))
    peak = np.clip(np.argmax(np.abs(moment), axis=1), 1, len(share) - 2)
    before, here, after = (moment[rows, peak + step] for step in (-1, 0, 1))
    bend = before - 2 * here + after
    shift = np.divide(before - after, 2 * bend, out=np.zeros_like(here), where=bend != 0)
    best = here - (before - after) * np.clip(shift, -1, 1) / 4
    largest = np.argmax(np.abs(shear), axis=1)
    return shear[rows, largest], best
