"""Water over, through and under the logs of a closure, and the logs by hand: results and their checks."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.closure.buoyancy import Filling, buoyancy, displaced_area, flotation
from loads.closure.demands import Demands
from loads.closure.gap import SHARP_EDGED_ORIFICE, gap_flow
from loads.closure.leakage import Inflow, SealRate, end_seal_leakage, inflow, joint_leakage
from loads.closure.lifting import lifting_force
from loads.closure.logs_needed import Bays, Ceiling, LogsNeeded, logs_needed
from loads.closure.overflow import Openings, Overflow, overflow
from loads.load import Setting


@dataclass(frozen=True, kw_only=True)
class Hydraulics:
    """What the water does besides pressing.

    Attributes
    ----------
    setting
        Levels and fluids.
    demands
        Forces of the parts.
    inflow
        All water that reaches the protected side, against the pumps.
    needed
        Logs for the flood-side level with the allowance and the freeboard entered.
    hold_down
        What the hold-downs of each bay must carry, shape (n, b); None without weight or section. [N]
    lifting
        Force to lift the top log of each bay that has one, shape (n, b); None without weight or friction.
        [N]
    """

    setting: Setting
    demands: Demands
    inflow: Inflow
    needed: LogsNeeded
    hold_down: FloatArray | None
    lifting: FloatArray | None

    @cached_property
    def overflow(self) -> Overflow:
        """Water over each bay's logs in place."""
        return _overflow(self.setting, self.demands)

    @property
    def overtopped(self) -> BoolArray:
        """Whether water goes over, shape (n,)."""
        return self.setting.levels.flood_side > self.demands.structure.layout.lowest_top


def hydraulics_of(setting: Setting, demands: Demands, first_limit: float | None) -> Hydraulics:
    """Everything of `Hydraulics` for one closure."""
    upward = _upward(setting, demands)
    return Hydraulics(
        setting=setting,
        demands=demands,
        inflow=_inflow(setting, demands),
        needed=_needed(setting, demands, first_limit),
        hold_down=_hold_down(demands, upward),
        lifting=_lifting(demands, upward),
    )


def _overflow(setting: Setting, demands: Demands) -> Overflow:
    layout, section = demands.structure.layout, demands.structure.closure.log.section
    bays = len(layout.clear)
    thickness = section.thickness.value if section and section.thickness else np.nan
    openings = Openings(
        crest=layout.tops,
        width=np.array(layout.clear),
        ground=np.full(bays, layout.sill),
        crest_thickness=np.full(bays, thickness),
    )
    return overflow(openings, setting.levels.flood_side, setting.levels.protected_side)


def _inflow(setting: Setting, demands: Demands) -> Inflow:
    layout, seal = demands.structure.layout, demands.structure.closure.seal
    levels = setting.levels.flood_side, setting.levels.protected_side
    over = np.zeros(setting.levels.states)
    if (setting.levels.flood_side > layout.lowest_top).any():
        over = _overflow(setting, demands).total_high
    parts: dict[str, FloatArray] = {"over the logs": over}
    if seal is None:
        return inflow(parts, None)
    clear, tops = np.array(layout.clear), layout.tops
    bottoms = np.full(len(clear), layout.sill)
    if seal.rate is not None:
        assert seal.at_head is not None
        rate = SealRate(rate=seal.rate.value, stated_head=seal.at_head.value, exponent=seal.exponent)
        bay, row = layout.bay_of, layout.row_of
        joints = joint_leakage(*levels, layout.edges[row], clear[bay], rate)
        parts["level seals"] = joints.sum(axis=1)
        parts["end seals"] = 2 * end_seal_leakage(*levels, bottoms, tops, rate).sum(axis=1)
    if seal.gap_width is not None:
        width = np.full(len(clear), 2 * seal.gap_width.value)
        gaps = gap_flow(*levels, bottoms, tops, width=width, discharge_coefficient=SHARP_EDGED_ORIFICE)
        parts["gaps at the guides"] = gaps.sum(axis=1)
    return inflow(parts, seal.pump_capacity.value if seal.pump_capacity else None)


def _needed(setting: Setting, demands: Demands, first_limit: float | None) -> LogsNeeded:
    closure, layout = demands.structure.closure, demands.structure.layout
    bays = len(layout.clear)
    stops = [("rated level", closure.rated_level.value if closure.rated_level else None, False)]
    stops.append(("first-limit level", first_limit, False))
    opening = closure.sill.value + closure.height.value if closure.height else None
    stops.append(("top of the opening", opening, True))
    return logs_needed(
        setting.levels.flood_side,
        Bays(
            sill=np.full(bays, layout.sill),
            log_height=np.full(bays, layout.log_height),
            on_hand=np.array(closure.on_hand, dtype=np.int64),
        ),
        allowance=closure.allowance.value if closure.allowance else 0.0,
        freeboard=closure.limits.freeboard.value if closure.limits.freeboard else 0.0,
        ceilings=[
            Ceiling(name=name, level=level, of_stack=of_stack)
            for name, level, of_stack in stops
            if level is not None
        ],
    )


def _upward(setting: Setting, demands: Demands) -> FloatArray | None:
    """Buoyancy of every log; None when its section is not known. [N]."""
    structure = demands.structure
    section, log, layout = structure.log, structure.closure.log, structure.layout
    if not np.isfinite(section.gross_area) or (log.fills_with_water and not np.isfinite(section.area)):
        return None
    hollow = log.section is not None and log.section.shape == "hollow rectangle"
    kind: Filling = "fills" if log.fills_with_water else "closed" if hollow else "solid"
    material = section.area if np.isfinite(section.area) else section.gross_area
    flood, protected = setting.levels.flood_side, setting.levels.protected_side
    weights = [setting.fluids[side].unit_weight for side in ("flood", "protected")]
    bay = layout.bay_of
    return buoyancy(
        np.maximum(flood, protected),
        layout.edges[layout.row_of],
        np.full(len(bay), layout.log_height),
        np.full(len(bay), displaced_area(kind, section.gross_area, material)),
        length=np.array(layout.clear)[bay] + 2 * layout.bearing,
        unit_weight=np.where(protected > flood, weights[1], weights[0]),
    )


def _hold_down(demands: Demands, upward: FloatArray | None) -> FloatArray | None:
    log, layout = demands.structure.closure.log, demands.structure.layout
    if upward is None or log.weight is None or layout.rows == 0:
        return None
    found: dict[tuple[float, int], FloatArray] = {}
    kinds = list(zip(layout.clear, layout.counts, strict=True))
    for bay, kind in enumerate(kinds):
        if kind in found:
            continue
        own = upward[:, layout.bay_of == bay]
        weight = np.full(kind[1], log.weight.value)
        found[kind] = flotation(own, weight, 0.0).hold_down_demand if kind[1] else np.zeros(len(upward))
    return np.column_stack([found[kind] for kind in kinds])


def _lifting(demands: Demands, upward: FloatArray | None) -> FloatArray | None:
    closure, layout = demands.structure.closure, demands.structure.layout
    weight, friction = closure.log.weight, closure.guide.friction
    if upward is None or weight is None or friction is None or layout.rows == 0:
        return None
    last = np.cumsum([count for count in layout.counts if count]) - 1
    ends = 2 * demands.logs.reaction[:, last]
    return lifting_force(np.full_like(ends, weight.value), upward[:, last], ends, friction)
