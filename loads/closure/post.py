"""What an upright post carries: a cantilever from its base plate, or propped by a brace.

Heights x are counted from the base. With V, M, N and Q the first to fourth integral of the load above x and
H the horizontal force of a brace at x = h:

    shear V(x) − H for x < h,   moment M(x) − H ⟨h − x⟩,
    EI v(x) = EI θ₀ x + x N(0) − Q(0) + Q(x) − H K(x),   K(x) = ∫₀ˣ (x − s) ⟨h − s⟩ ds.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from loads.arrays import FloatArray
from loads.diagram import Diagram

Fixity = Literal["fixed", "pinned"]

_GRID = 24
_STEPS = 3


@dataclass(frozen=True, kw_only=True)
class Prop:
    """A brace as the post feels it.

    Attributes
    ----------
    height
        At which it meets the post, above the base. [m]
    angle
        From the horizontal. [rad]
    fixity
        How the base holds the post against turning.
    """

    height: float
    angle: float
    fixity: Fixity


@dataclass(frozen=True, kw_only=True)
class PostForces:
    """Forces of one post in n states, positive toward the protected side; each of shape (n,).

    Attributes
    ----------
    line_load
        Just above the base. [N/m]
    total
        Whole load on the post. [N]
    base_shear
        What the base takes. [N]
    base_moment
        Bending moment at the base. [N·m]
    brace_moment
        Bending moment at the brace; NaN without one. [N·m]
    moment, moment_height
        Bending moment of greatest magnitude anywhere, and its height above the base. [N·m, m]
    shear
        Shear force of greatest magnitude anywhere. [N]
    top_deflection
        At the top; NaN without a stiffness. [m]
    deflection, deflection_height
        Of greatest magnitude anywhere, and its height. [m]
    brace_force
        Along the brace, compression positive; NaN without one. [N]
    brace_lift
        Vertical part of it, by which the brace lifts the post; zero without one. [N]
    """

    line_load: FloatArray
    total: FloatArray
    base_shear: FloatArray
    base_moment: FloatArray
    brace_moment: FloatArray
    moment: FloatArray
    moment_height: FloatArray
    shear: FloatArray
    top_deflection: FloatArray
    deflection: FloatArray
    deflection_height: FloatArray
    brace_force: FloatArray
    brace_lift: FloatArray


@dataclass(frozen=True)
class _Bent:
    """A post with its brace force found."""

    load: Diagram
    prop: Prop | None
    push: FloatArray
    turn: FloatArray
    stiffness: float
    foot: tuple[FloatArray, FloatArray]

    def shear(self, x: FloatArray) -> FloatArray:
        """Just above x."""
        found = self.load.shear(x)
        return found if self.prop is None else found - self.push * (x < self.prop.height)

    def moment(self, x: FloatArray) -> FloatArray:
        found = self.load.moment(x)
        return found if self.prop is None else found - self.push * np.maximum(self.prop.height - x, 0.0)

    def slope(self, x: FloatArray) -> FloatArray:
        bent = self.foot[0] - self.load.moment_integral(x)
        if self.prop is not None:
            h = self.prop.height
            bent = bent - self.push * (h**2 - np.maximum(h - x, 0.0) ** 2) / 2
        return self.turn + bent / self.stiffness

    def deflection(self, x: FloatArray) -> FloatArray:
        bent = _free_deflection(self.load, x, self.foot)
        if self.prop is not None:
            bent = bent - self.push * _prop_kernel(x, self.prop.height)
        return self.turn * x + bent / self.stiffness


def _at_foot(load: Diagram) -> tuple[FloatArray, FloatArray]:
    """N(0) and Q(0), each (n, 1)."""
    foot = np.zeros(1)
    return load.moment_integral(foot), load.moment_second_integral(foot)


def _free_deflection(load: Diagram, x: FloatArray, foot: tuple[FloatArray, FloatArray]) -> FloatArray:
    """EI times the deflection of a cantilever, x N(0) − Q(0) + Q(x)."""
    return np.asarray(x * foot[0] - foot[1] + load.moment_second_integral(x))


def _free_at_prop(load: Diagram, prop: Prop, foot: tuple[FloatArray, FloatArray]) -> FloatArray:
    return _free_deflection(load, np.array([[prop.height]]), foot)


def _prop_kernel(x: FloatArray, height: float) -> FloatArray:
    below = np.minimum(x, height)
    return np.asarray(height * below**2 / 2 - below**3 / 6 + (x - below) * height**2 / 2)


def prop_force(load: Diagram, prop: Prop) -> FloatArray:
    """Horizontal force of a stiff brace, toward the flood side when positive.

    Parameters
    ----------
    load
        Load along the post, elevations counted from the base. [N/m]
    prop
        The brace.

    Returns
    -------
    FloatArray
        H, shape (n, 1). [N]

    Notes
    -----
    From v(h) = 0 with a fixed base: H = [h N(0) − Q(0) + Q(h)]/(h³/3), whatever the stiffness. With a pinned
    base from moments about it: H = M(0)/h.

    Examples
    --------
    >>> load = Diagram.of_terms(1, [(3.0, 0.0, 9810.0)])
    >>> prop_force(load, Prop(height=3.0, angle=0.0, fixity="fixed")).round(6)
    array([[8829.]])
    """
    if prop.fixity == "pinned":
        return load.moment(np.zeros(1)) / prop.height
    return _free_at_prop(load, prop, _at_foot(load)) / (prop.height**3 / 3)


def post_forces(load: Diagram, *, height: float, stiffness: float, prop: Prop | None) -> PostForces:
    """Forces of a post under any load along it [ElementaryBeamTheory].

    Parameters
    ----------
    load
        Load along the post, elevations counted from the base; none of it above the post's top. [N/m]
    height
        Top of the post above its base. [m]
    stiffness
        EI; NaN when it is not known. [N·m²]
    prop
        Brace, or None for a cantilever.

    Returns
    -------
    PostForces
        Exact but for the place of the greatest deflection, which is found to rounding.

    Notes
    -----
    The brace is taken as stiff and able to push and pull.
    """
    push, turn, at_foot = np.zeros((load.states, 1)), np.zeros((load.states, 1)), _at_foot(load)
    if prop is not None:
        free = _free_at_prop(load, prop, at_foot)
        if prop.fixity == "pinned":
            push = prop_force(load, prop)
            turn = -(free - push * prop.height**3 / 3) / (stiffness * prop.height)
        else:
            push = free / (prop.height**3 / 3)
    bent = _Bent(load, prop, push, turn, stiffness, at_foot)
    foot = np.zeros((1, 1))
    moment, moment_height, shear = _extremes(bent, height)
    sag, sag_height, at_top = _deflections(bent, height)
    missing = np.full(load.states, np.nan)
    total = load.shear(foot)
    return PostForces(
        line_load=load.pressure(foot)[:, 0],
        total=total[:, 0],
        base_shear=(total - push)[:, 0],
        base_moment=bent.moment(foot)[:, 0],
        brace_moment=missing if prop is None else load.moment(np.full((1, 1), prop.height))[:, 0],
        moment=moment,
        moment_height=moment_height,
        shear=shear,
        top_deflection=at_top,
        deflection=sag,
        deflection_height=sag_height,
        brace_force=missing if prop is None else push[:, 0] / np.cos(prop.angle),
        brace_lift=push[:, 0] * (0.0 if prop is None else np.tan(prop.angle)),
    )


def _greatest(value: FloatArray) -> tuple[FloatArray, NDArray[np.intp]]:
    """Entry of greatest magnitude of each row, and its column."""
    column = np.argmax(np.abs(value), axis=1)
    return np.take_along_axis(value, column[:, None], axis=1)[:, 0], column


def _extremes(bent: _Bent, height: float) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Greatest moment, its height, and greatest shear: at ends, knots, brace, and zeros of shear and load."""
    load = bent.load
    fixed = [0.0, height] if bent.prop is None else [0.0, bent.prop.height, height]
    ends = np.concatenate(
        [np.clip(load.knot, 0.0, height), np.broadcast_to(fixed, (load.states, len(fixed)))], axis=1
    )
    ends.sort(axis=1)
    low, high = ends[:, :-1], ends[:, 1:]
    piece = high - low
    at_low, at_high = load.pressure(low), load.pressure(high, at_underside=True)
    start = bent.shear(low)
    with np.errstate(divide="ignore", invalid="ignore", over="ignore"):
        bend = (at_high - at_low) / (2 * piece)
        root = np.sqrt(at_low**2 + 4 * bend * start)
        q = -(at_low + np.where(at_low < 0, -root, root)) / 2
        rises = np.stack([q / bend, -start / q, -at_low / (2 * bend)])
        inside = (rises > 0) & (rises < piece)
    first, second, unloaded = np.where(inside, low + np.where(inside, rises, 0.0), low)
    places = np.concatenate([ends, first, second], axis=1)
    moment, column = _greatest(bent.moment(places))
    height_of = np.take_along_axis(places, column[:, None], axis=1)[:, 0]
    shears = [start, bent.shear(unloaded)]
    if bent.prop is not None:
        at_brace = np.full((1, 1), bent.prop.height)
        shears.append(load.shear(at_brace) - bent.push)
    shear, _ = _greatest(np.concatenate(shears, axis=1))
    return moment, height_of, shear


def _deflections(bent: _Bent, height: float) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Greatest deflection, its height, and that at the top.

    The greatest of a grid, then Newton's steps to where the slope is nil.
    """
    if not np.isfinite(bent.stiffness):
        missing = np.full(bent.load.states, np.nan)
        return missing, missing, missing
    grid = np.linspace(0.0, height, _GRID + 1)[None, :]
    found = bent.deflection(grid)
    sampled, column = _greatest(found)
    place = grid[0, column][:, None]
    least, most = place - height / _GRID, np.minimum(place + height / _GRID, height)
    x = place
    for _ in range(_STEPS):
        curve = bent.moment(x) / bent.stiffness
        step = np.divide(bent.slope(x), curve, out=np.zeros_like(curve), where=curve != 0)
        x = np.clip(x - step, np.maximum(least, 0.0), most)
    refined = bent.deflection(x)[:, 0]
    better = np.abs(refined) >= np.abs(sampled)
    return np.where(better, refined, sampled), np.where(better, x[:, 0], place[:, 0]), found[:, -1]
