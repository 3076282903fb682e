"""Worked steps of an I-wall in one state."""

from __future__ import annotations

import numpy as np

from loads.wall.i_wall import gap_bottom
from loads.wall.i_wall_result import IWallResult
from loads.worked_step import Line, Step, Table, column_sum, line, term

Row = tuple[str, float, float]


def i_wall_working(result: IWallResult, index: int = 0) -> tuple[Step, ...]:
    """Worked steps of one state, from the pressures to the ratios."""
    steps = [
        _pressures(result, index),
        _above_ground(result, index),
        _embedment(result, index),
        _seepage(result, index),
        _checks(result, index),
    ]
    return tuple(step for step in steps if step.lines or step.table or step.results)


def tip_of(result: IWallResult, index: int) -> float:
    """Elevation of the balanced tip, that of the sheet where none balances. [m]."""
    balanced = float(result.embedment.balanced[index])
    return result.record.tip.value if np.isnan(balanced) else result.record.ground("protected") - balanced


def _pressures(result: IWallResult, index: int) -> Step:
    pressure = result.embedment.pressure
    net = pressure.net.rows(tip_of(result, index), result.record.top.value, index)
    return Step(
        title="Net pressure on the sheet down to the balanced tip",
        formula="p = flood side − protected side, water losing i per length along the sheet; soil presses "
        "with its effective weight, passive pressure over its factor",
        terms=(
            term("ΔH", "difference of head", float(pressure.head[index]), "length"),
            term("i", "loss of head per length of path", float(pressure.gradient[index]), "ratio"),
            term("F_p", "factor on passive pressure", result.record.passive_factor, "ratio"),
        ),
        table=Table(
            headings=(("elevation", "elevation"), ("net pressure", "pressure")), rows=tuple(reversed(net))
        ),
    )


def _sums(result: IWallResult, index: int, place: float) -> list[Row]:
    """Force of each cause above an elevation and its moment about it."""
    at = np.array([place])
    rows = []
    for name, diagram in result.embedment.pressure.parts.items():
        one = diagram.take(index)
        force, moment = float(one.shear(at)[0, 0]), float(one.moment(at)[0, 0])
        if force != 0:
            rows.append((name, force, moment))
    return rows


def _table(rows: list[Row]) -> Table:
    return Table(
        headings=(("cause", "text"), ("force", "line load"), ("moment", "moment per length")),
        rows=tuple(rows),
        total=("sum", column_sum(list(rows), 1), column_sum(list(rows), 2)),
    )


def _above_ground(result: IWallResult, index: int) -> Step:
    ground = result.record.ground("protected")
    rows = _sums(result, index, ground)
    if not rows:
        return Step(title="Force above the protected-side ground", formula="none")
    return Step(
        title="Force above the protected-side ground and its moment about that ground",
        formula="sums of everything above it, by cause",
        terms=(term("z_g", "protected-side ground", ground, "elevation"),),
        table=_table(rows),
    )


def _embedment(result: IWallResult, index: int) -> Step:
    depth, record = result.embedment, result.record
    if not depth.found[index]:
        return Step(
            title="Embedment",
            formula="no depth in the range searched balances the moments about the tip",
            results=(term("D", "depth of the sheet entered", float(depth.provided[index]), "length"),),
        )
    balanced, required = float(depth.balanced[index]), float(depth.required[index])
    return Step(
        title=f"Embedment by the method: {record.method}",
        formula="D₀ is the depth of the tip at which the moments about it sum to nil; D = D₀ times the "
        "increase",
        table=_table(_sums(result, index, tip_of(result, index))),
        lines=(
            line(
                "D = {}·{} = {}",
                (balanced, "length"),
                (record.embedment_increase, "ratio"),
                (required, "length"),
            ),
        ),
        results=(
            term("D", "depth required below the protected-side ground", required, "length"),
            term("", "depth of the sheet entered", float(depth.provided[index]), "length"),
            term("V", "greatest shear in the sheet", float(result.shear[index]), "line load"),
            term("M", "greatest moment in the sheet", float(result.bending[index]), "moment per length"),
        ),
    )


def _seepage(result: IWallResult, index: int) -> Step:
    head = float(result.embedment.pressure.head[index])
    if head <= 0:
        return Step(title="Underseepage screen", formula="no difference of head")
    record = result.record
    entry = np.maximum(gap_bottom(record, np.array([record.tip.value])), record.tip.value)[0]
    lines: list[Line] = [
        line(
            "i_e = ΔH/(π·D) = {}/(π·{}) = {}",
            (head, "length"),
            (float(result.embedment.provided[index]), "length"),
            (float(result.exit_gradient[index]), "ratio"),
            label="exit gradient",
        ),
        line(
            "F = i_c/i_e = (γ′/γ_w)/i_e = {}/{} = {}",
            (float(result.critical_gradient[index]), "ratio"),
            (float(result.exit_gradient[index]), "ratio"),
            (float(result.critical_gradient[index] / result.exit_gradient[index]), "ratio"),
            label="factor on the critical gradient",
        ),
        line(
            "C = ΣL_v/ΔH = ({} + {})/{} = {}",
            (float(entry) - record.tip.value, "length"),
            (float(result.embedment.provided[index]), "length"),
            (head, "length"),
            (float(result.creep_ratio[index]), "ratio"),
            label="weighted creep ratio",
        ),
    ]
    return Step(title="Underseepage screen", formula="uniform deep ground", lines=tuple(lines))


def _checks(result: IWallResult, index: int) -> Step:
    rows = tuple(
        (f"{check.subject}: {check.name}", float(check.ratio[index]), check.verdict(index), check.source)
        for check in result.checks
        if check.limit is not None
    )
    headings = (("check", "text"), ("ratio", "ratio"), ("verdict", "text"), ("limit from", "text"))
    return Step(
        title="Ratios to the limits",
        formula="demand over limit, or factor asked for over factor found",
        table=Table(headings=headings, rows=rows) if rows else None,
    )
