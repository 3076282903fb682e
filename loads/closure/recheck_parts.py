"""The second computation of logs and posts: every load again, point by point, from its own definition.

Logs are integrated by Gauss–Legendre quadrature over their height; posts by what a unit force at each point
does to the base, the brace and the top (unit-load method), with no steps, ramps or closed forms.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.closure.demands import Demands
from loads.closure.layout import Upright
from loads.closure.post import Prop
from loads.load import Setting
from loads.recheck import STRAIGHT_TOLERANCE, breaks_between, pressure_at, quadrature_points


@dataclass(frozen=True, kw_only=True)
class PartsRecheck:
    """How far the two computations of the parts are apart.

    Attributes
    ----------
    difference
        Largest relative difference in any state. [–]
    agrees
        Whether all parts agree in all states.
    subject
        Part that differs most.
    first, second
        Its force and moment by each computation. [N, N·m]
    """

    difference: float
    agrees: bool
    subject: str
    first: tuple[float, float]
    second: tuple[float, float]


@dataclass(frozen=True)
class _Compared:
    """Figures of some parts by both computations: columns of (n, c) with what counts as rounding."""

    names: tuple[str, ...]
    first: FloatArray
    second: FloatArray
    rounding: FloatArray

    def apart(self) -> FloatArray:
        gap = np.abs(self.first - self.second)
        larger = np.maximum(np.abs(self.first), np.abs(self.second))
        counted = ~(gap <= self.rounding)
        return np.where(counted, gap / np.where(counted, larger, 1.0), 0.0)


def recheck_parts(setting: Setting, demands: Demands, rounding: FloatArray) -> PartsRecheck:
    """Compute reactions and moments of all logs and posts a second time and compare.

    Parameters
    ----------
    setting
        What loads the closure.
    demands
        First computation, of all its parts.
    rounding
        Pressure that is only rounding of the numbers that went in, shape (n,). [Pa]
    """
    layout = demands.structure.layout
    if layout.rows == 0:
        return PartsRecheck(difference=0.0, agrees=True, subject="", first=(0.0, 0.0), second=(0.0, 0.0))
    extra = [layout.sill + demands.structure.prop.height] if demands.structure.prop else []
    corners = np.unique([*layout.edges, *(z for z in extra if z < layout.highest_top)])
    z, weight = quadrature_points(breaks_between(setting, layout.sill, layout.highest_top, corners))
    push = pressure_at(setting, z) * weight
    force, moment = _logs(demands, z, push, rounding)
    pairs = [(force, moment)]
    uprights = [layout.posts[column] for column in demands.post_columns]
    if uprights:
        pairs.append(_posts(demands, uprights, z, push, rounding))
    forces, moments = ([pair[side] for pair in pairs] for side in (0, 1))
    return _judged(_joined(forces), _joined(moments))


def _joined(groups: list[_Compared]) -> _Compared:
    return _Compared(
        names=tuple(name for group in groups for name in group.names),
        first=np.concatenate([group.first for group in groups], axis=1),
        second=np.concatenate([group.second for group in groups], axis=1),
        rounding=np.concatenate([group.rounding for group in groups], axis=1),
    )


def _judged(forces: _Compared, moments: _Compared) -> PartsRecheck:
    apart = np.maximum(forces.apart(), moments.apart())
    apart = np.where(np.isnan(apart), np.inf, apart)
    state, column = np.unravel_index(int(np.argmax(apart)), apart.shape)
    return PartsRecheck(
        difference=float(apart[state, column]),
        agrees=bool(apart[state, column] <= STRAIGHT_TOLERANCE),
        subject=forces.names[column],
        first=(float(forces.first[state, column]), float(moments.first[state, column])),
        second=(float(forces.second[state, column]), float(moments.second[state, column])),
    )


def _logs(
    demands: Demands, z: FloatArray, push: FloatArray, rounding: FloatArray
) -> tuple[_Compared, _Compared]:
    """End reaction and mid-span moment of every log."""
    layout = demands.structure.layout
    row = np.clip(((z - layout.sill) / layout.log_height).astype(np.intp), 0, layout.rows - 1)
    within = row[:, :, None] == np.arange(layout.rows)
    by_row = np.einsum("np,npr->nr", push, within)
    load = by_row[:, layout.row_of]
    span = layout.spans[layout.bay_of]
    reaction = load * span / 2
    moment = reaction * span / 2 - load * (span / 2) * (span / 4)
    slack = rounding[:, None] * layout.log_height * span
    return (
        _Compared(demands.log_names, demands.logs.reaction, reaction, slack),
        _Compared(demands.log_names, demands.logs.moment, moment, slack * span),
    )


def _posts(
    demands: Demands, uprights: list[Upright], z: FloatArray, push: FloatArray, rounding: FloatArray
) -> tuple[_Compared, _Compared]:
    """Base shear and base moment of every post; a wrong brace force shows in both."""
    layout, prop = demands.structure.layout, demands.structure.prop
    height = z - layout.sill
    shears, moments, slacks = [], [], []
    for upright in uprights:
        widths = np.zeros_like(z)
        for top, width in upright.pieces:
            widths += np.where(z < top, width, 0.0)
        along = push * widths
        total, about = along.sum(axis=1), (along * height).sum(axis=1)
        held, arm = (0.0, 0.0) if prop is None else (_prop(prop, along, height), prop.height)
        shears.append(total - held)
        moments.append(about - held * arm)
        area = upright.width * (layout.highest_top - layout.sill)
        gross = np.abs(along).sum(axis=1)
        slacks.append(rounding * area + STRAIGHT_TOLERANCE * gross * (prop is not None))
    slack = np.column_stack(slacks)
    reach = layout.highest_top - layout.sill
    names = demands.post_names
    return (
        _Compared(names, demands.posts.base_shear, np.column_stack(shears), slack),
        _Compared(names, demands.posts.base_moment, np.column_stack(moments), slack * reach),
    )


def _prop(prop: Prop, along: FloatArray, height: FloatArray) -> FloatArray:
    """Brace force: what every bit of load moves the point of the brace, over what a unit force there does."""
    h = prop.height
    if prop.fixity == "pinned":
        return np.asarray((along * height).sum(axis=1) / h)
    below, above = height**2 * (3 * h - height) / 6, h**2 * (3 * height - h) / 6
    moved = along * np.where(height < h, below, above)
    return np.asarray(moved.sum(axis=1) / (h**3 / 3))
