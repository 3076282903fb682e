"""What an I-wall amounts to: net pressure, embedment, sheet, exit gradient, checks; sums computed twice."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.checks import Check, Verdict, check_of, level_check, worst
from loads.problems import Problem, ScenarioError
from loads.recheck import Recheck
from loads.records.i_wall import IWall
from loads.states import Levels
from loads.wall.forces import Waters
from loads.wall.i_wall import CANNOT_DECIDE, NO_GAP, SEARCH, Embedment, embedment, gap_bottom, sheet_extremes
from loads.wall.recheck_sheet import sheet_sums
from loads.wall.seepage import LANE_RATIOS, critical_gradient, weighted_creep_ratio
from loads.wall.underseepage import sheet_exit_gradient
from loads.wall.wall_checks import factor_check, stated
from loads.water import Fluid

_TOLERANCE = 1e-9


@dataclass(frozen=True, kw_only=True)
class IWallResult:
    """An I-wall per unit length in n states.

    Attributes
    ----------
    record
        What was computed.
    levels, fluids
        The states and the water of "flood" and "protected".
    embedment
        The balanced depth, with the pressures at it.
    horizontal, moment
        Net force above the protected-side ground and its moment about that ground, shape (n,). [N/m, N·m/m]
    shear, bending
        Greatest magnitudes in the sheet down to the balanced depth, shape (n,). [N/m, N·m/m]
    exit_gradient, critical_gradient
        Shape (n,). [–]
    creep_ratio
        Weighted creep ratio of the sheet entered, shape (n,). [–]
    agrees
        Whether the second computation of force and moment above the tip agrees, shape (n,).
    checks
        In order of how pressing they are in the first state; none where the computations disagree.
    remarks
        On the first state, with what the screen cannot decide.
    """

    record: IWall
    levels: Levels
    fluids: dict[str, Fluid]
    embedment: Embedment
    horizontal: FloatArray
    moment: FloatArray
    shear: FloatArray
    bending: FloatArray
    exit_gradient: FloatArray
    critical_gradient: FloatArray
    creep_ratio: FloatArray
    agrees: BoolArray
    checks: tuple[Check, ...]
    remarks: tuple[str, ...]

    @property
    def withheld(self) -> bool:
        """True when the two computations disagree in any state."""
        return not bool(self.agrees.all())

    def verdict(self, index: int = 0) -> Verdict:
        """Most pressing verdict of one state."""
        return "withheld" if self.withheld else worst([check.verdict(index) for check in self.checks])


def assess_i_wall(record: IWall, levels: Levels, fluids: dict[str, Fluid], near_limit: float) -> IWallResult:
    """Compute an I-wall in n states; parameters as of `loads.wall.wall_result.assess_wall`.

    Raises
    ------
    ScenarioError
        A material that no table knows.
    OutsideFormulaError
        A formula has no answer for an input.
    """
    if record.material and record.material not in LANE_RATIOS:
        rule = "it is not known here; known are " + "; ".join(f'"{key}"' for key in LANE_RATIOS)
        path = f"wall[{record.id}].material"
        raise ScenarioError([Problem(path=path, value=f'"{record.material}"', rule=rule)])
    waters = Waters(flood=fluids["flood"].unit_weight, protected=fluids["protected"].unit_weight)
    depth = embedment(record, levels, waters)
    ground, top = record.ground("protected"), record.top.value
    tip = np.where(depth.found, ground - depth.balanced, record.tip.value)
    net = depth.pressure.net
    shear, bending = sheet_extremes(net, top, tip)
    place = np.full((levels.states, 1), ground)
    soil = record.layer("protected")
    assert soil.saturated_unit_weight is not None
    submerged = np.array([soil.saturated_unit_weight.value - waters.protected])
    driven = np.maximum(depth.pressure.head, 0.0)
    entry = np.maximum(gap_bottom(record, np.full(levels.states, record.tip.value)), record.tip.value)
    values: dict[str, Any] = {
        "embedment": depth,
        "horizontal": net.shear(place)[:, 0],
        "moment": net.moment(place)[:, 0],
        "shear": shear,
        "bending": bending,
        "exit_gradient": sheet_exit_gradient(driven, depth.provided),
        "critical_gradient": np.broadcast_to(
            critical_gradient(submerged, np.array([waters.protected])), (levels.states,)
        ),
        "creep_ratio": weighted_creep_ratio(
            entry - record.tip.value + depth.provided, np.zeros(levels.states), driven
        ),
        "agrees": _agrees(record, levels, waters, depth, tip),
    }
    checks = _checks(record, levels, values, near_limit) if values["agrees"].all() else []
    return IWallResult(
        record=record,
        levels=levels,
        fluids=fluids,
        checks=tuple(sorted(checks, key=lambda check: -_pressing(check))),
        remarks=_remarks(record, levels, depth),
        **values,
    )


def sums_above_ground(found: IWallResult) -> Recheck:
    """Second computation of force above the protected-side ground and of its moment about that ground."""
    record, states = found.record, found.levels.states
    waters = Waters(flood=found.fluids["flood"].unit_weight, protected=found.fluids["protected"].unit_weight)
    ground = np.full(states, record.ground("protected"))
    force, moment, gross = sheet_sums(record, found.levels, waters, ground, found.embedment.pressure.gradient)
    reach = record.top.value - ground
    scale = np.where(gross > 0, gross, 1.0)
    apart = np.maximum(np.abs(found.horizontal - force), np.abs(found.moment - moment) / reach) / scale
    return Recheck(
        horizontal=force,
        vertical=np.zeros(states),
        moment=moment,
        difference=apart,
        agrees=found.agrees & (apart <= _TOLERANCE),
    )


def _pressing(check: Check) -> float:
    return float(check.ratio[0]) if check.limit is not None else -1.0


def _agrees(record: IWall, levels: Levels, waters: Waters, depth: Embedment, tip: FloatArray) -> BoolArray:
    """Force above the tip and moment about it against quadrature from the definitions."""
    force, moment, gross = sheet_sums(record, levels, waters, tip, depth.pressure.gradient)
    net = depth.pressure.net
    reach = record.top.value - tip
    first = net.shear(tip[:, None])[:, 0], net.moment(tip[:, None])[:, 0]
    scale = np.where(gross > 0, gross, 1.0)
    apart = np.maximum(np.abs(first[0] - force), np.abs(first[1] - moment) / reach) / scale
    return np.asarray(apart <= _TOLERANCE)


def _checks(record: IWall, levels: Levels, values: dict[str, Any], near: float) -> list[Check]:
    subject, limits = f"wall {record.id}", record.limits
    depth = values["embedment"]
    ground = record.ground("protected")
    provided = float(depth.provided[0])
    required = np.where(depth.found, depth.required, np.inf)
    source = f"sheet entered; {record.method}, passive over {record.passive_factor:g}"
    sheet = stated(f"tip at {record.tip.text}", provided, "length", source)
    checks = [
        check_of(
            subject=subject,
            name="embedment",
            kind="length",
            demand=required,
            limit=sheet,
            near=near,
            remarks=(f"Balanced depth times {record.embedment_increase:g}, against the depth of the sheet.",),
        ),
        check_of(
            subject=subject,
            name="exposed height",
            kind="length",
            demand=np.full(levels.states, record.top.value - ground),
            limit=limits.exposed_height,
            near=near,
            rises_with_water=False,
        ),
    ]
    for name, kind, figure, limit in (
        ("shear in the sheet", "line load", values["shear"], limits.sheet_shear),
        ("moment in the sheet", "moment per length", values["bending"], limits.sheet_moment),
    ):
        demand = np.where(depth.found, figure, np.inf)
        checks.append(check_of(subject=subject, name=name, kind=kind, demand=demand, limit=limit, near=near))
    return [*checks, *_seepage_checks(record, values, near), *_level_checks(record, levels, near)]


def _seepage_checks(record: IWall, values: dict[str, Any], near: float) -> list[Check]:
    gradient, critical, creep = (
        np.asarray(values[name]) for name in ("exit_gradient", "critical_gradient", "creep_ratio")
    )
    asked = record.exit_gradient_factor
    with np.errstate(over="ignore"):
        factor = np.divide(critical, gradient, out=np.full_like(gradient, np.inf), where=gradient > 0)
    least = LANE_RATIOS.get(record.material)
    return [
        factor_check(
            subject=f"wall {record.id}",
            name=name,
            factor=found,
            least=wanted,
            source=source,
            near=near,
        )
        for name, found, wanted, source in (
            ("exit gradient", factor, asked, "factor entered for the wall"),
            (
                "weighted creep ratio",
                creep,
                least,
                f"Lane 1935, {record.material} (from memory, to be confirmed)",
            ),
        )
    ]


def _level_checks(record: IWall, levels: Levels, near: float) -> list[Check]:
    freeboard, rated = record.limits.freeboard, record.rated_level
    return [
        level_check(
            subject=f"wall {record.id}",
            name=name,
            level=levels.flood_side,
            bottom=record.ground("protected"),
            limit=limit,
            highest=highest,
            near=near,
        )
        for name, limit, highest in (
            ("rated level", rated, rated.value if rated else np.nan),
            ("freeboard", freeboard, record.top.value - freeboard.value if freeboard else np.nan),
        )
    ]


def _remarks(record: IWall, levels: Levels, depth: Embedment) -> tuple[str, ...]:
    remarks = [CANNOT_DECIDE]
    if record.gap == "none":
        remarks.append(NO_GAP)
    else:
        where = f"to {record.gap_depth.text} below the ground" if record.gap_depth else "to the tip"
        remarks.append(f"A gap full of water is counted {where}; no soil presses in it.")
    if not depth.found[0]:
        remarks.append(f"No depth down to {SEARCH:g} times the exposed height balances the moments.")
    if levels.flood_side[0] > record.top.value:
        remarks.append("Water stands over the top: falling water, scour and debris are not counted.")
    if levels.protected_side[0] > levels.flood_side[0]:
        remarks.append("Reverse head: the embedment is sought for a push toward the protected side only.")
    passive = record.layer("protected")
    if passive.wall_friction is not None:
        remarks.append("Passive pressure with wall friction by a plane wedge overstates the resistance.")
    remarks.append(f"Passive pressure is divided by {record.passive_factor:g}, as entered.")
    return tuple(remarks)
