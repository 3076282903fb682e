"""Remarks on a closure, in plain words, one sentence each."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from loads.closure.demands import Demands
from loads.closure.hydraulics import Hydraulics
from loads.load import Setting
from loads.units import from_si


def closure_remarks(setting: Setting, demands: Demands, found: Hydraulics) -> tuple[str, ...]:
    """Remarks on the first state, besides those on its levels and sediment."""
    closure = demands.structure.closure
    return (
        *(f"Parts short: {words}." for words in closure.parts_short),
        *_build(setting, demands),
        *_overflow(found),
        *_levels(setting, demands, found),
        *_missing(demands),
    )


def _build(setting: Setting, demands: Demands) -> Iterator[str]:
    layout, closure = demands.structure.layout, demands.structure.closure
    if layout.rows == 0:
        yield "No logs are in place: the opening is open, and nothing presses on the closure."
    elif len(set(layout.counts)) > 1:
        yield "The bays hold different numbers of logs; the lowest stack counts for levels."
    post, bearing = closure.post, layout.bearing
    if post and post.width and 2 * bearing > post.width.value:
        yield "The logs of two bays would overlap within a post: check bearing length and width of the post."
    if len(layout.clear) > 1 and post is None:
        yield "No post was entered: the posts are taken as cantilevers that no limit is known for."
    adding = closure.adding
    level = float(setting.levels.flood_side[0])
    if adding is not None and level > layout.sill:
        if not adding.with_water:
            yield "Water stands at the sill: no more logs can be added."
        elif adding.up_to is not None and level > adding.up_to.value:
            yield "The water stands above the level up to which logs can be added."


def _overflow(found: Hydraulics) -> Iterator[str]:
    if not found.overtopped[0] or float(found.overflow.total_high[0]) <= 0:
        return
    low, high = float(found.overflow.total_low[0]), float(found.overflow.total_high[0])
    named = ", ".join(found.overflow.formulas())
    feet = from_si(np.array([low, high]), "cfs", "flow")
    yield (
        f"Water goes over the logs in place: {low:.3g} to {high:.3g} m³/s ({feet[0]:.3g} to {feet[1]:.3g} "
        f"ft³/s) by the formulas that apply: {named}."
    )
    yield from (f"Flow over the logs: {words}." for words in found.overflow.remarks())


def _levels(setting: Setting, demands: Demands, found: Hydraulics) -> Iterator[str]:
    closure = demands.structure.closure
    if closure.allowance is None and closure.limits.freeboard is None:
        return
    if float(setting.levels.flood_side[0]) <= demands.structure.layout.sill:
        return
    for ceiling in found.needed.stopped_by():
        yield f"The level with its allowance, or the logs for it, would pass the {ceiling.name}."


def _missing(demands: Demands) -> Iterator[str]:
    closure = demands.structure.closure
    if closure.guide.one_way:
        yield "The guides or seals bear one way only: let water fall evenly, and mind water held behind."
    if closure.post is not None and closure.post.brace is None and len(closure.widths) > 1:
        yield "The posts are taken as cantilevers held by their base plates alone."
