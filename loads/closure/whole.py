"""Checks of a closure as a whole: force, moment, levels, top of the logs, reverse load."""

from __future__ import annotations

from collections.abc import Iterator

import numpy as np

from loads.barrier import Pressed
from loads.checks import Check, check_of, level_check
from loads.closure.hydraulic_checks import made
from loads.closure.layout import Layout
from loads.panel_checks import load_checks, peak_pressure
from loads.records.closure import Closure
from loads.units import from_si

STACK = "A stack lower than the water is overtopped, not stronger."


def whole_load_checks(closure: Closure, found: Pressed, near: float) -> list[Check]:
    """Force and moment about the sill of the whole closure, and pressure where a limit was entered."""
    pressure = peak_pressure(found.diagram, found.face)
    checks = load_checks(
        f"closure {closure.id}", closure.limits, pressure, found.resultant, near, foot="sill"
    )
    return [check for check in checks if check.kind != "pressure" or check.limit is not None]


def whole_checks(closure: Closure, layout: Layout, found: Pressed, near: float) -> Iterator[Check]:
    """Whole loads, rated level, freeboard, top of the logs in place, reverse load on one-way guides."""
    yield from whole_load_checks(closure, found, near)
    freeboard, rated, top = closure.limits.freeboard, closure.rated_level, layout.lowest_top
    stack = made(
        top,
        "length",
        f"{from_si(top, closure.sill.unit, 'length'):.6g} {closure.sill.unit}",
        "top of the lowest stack of logs in place",
        closure.sill.unit,
    )
    entered = (
        ("rated level", rated, rated.value if rated else np.nan, ()),
        ("freeboard", freeboard, top - freeboard.value if freeboard else np.nan, ()),
        ("top of the logs in place", stack, top, (STACK,)),
    )
    for name, limit, highest, remarks in entered:
        yield level_check(
            subject=f"closure {closure.id}",
            name=name,
            level=found.setting.levels.flood_side,
            bottom=layout.sill,
            limit=limit,
            highest=float(highest),
            near=near,
            remarks=remarks,
            grades_below=limit is not stack,
        )
    if closure.guide.one_way:
        yield _reverse(closure, found, near)


def _reverse(closure: Closure, found: Pressed, near: float) -> Check:
    _, least = found.diagram.extremes(found.face.bottom, found.face.top)
    back = np.maximum(-least - found.diagram.rounding(found.face.bottom), 0.0)
    return check_of(
        subject=f"closure {closure.id}",
        name="pressure toward the flood side",
        kind="pressure",
        demand=back,
        limit=made(0.0, "pressure", "0 Pa", "guides bear from the flood side only, as entered"),
        near=near,
        remarks=("The guides or seals bear one way only: any load the other way is beyond them.",),
        rises_with_water=False,
        grades_below=False,
    )
