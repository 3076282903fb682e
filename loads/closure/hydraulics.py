"""Water over, through and under the logs of a closure, and the logs by hand: results and their checks."""

from __future__ import annotations

from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.checks import Check, check_of
from loads.closure.buoyancy import Filling, buoyancy, displaced_area, flotation
from loads.closure.demands import Demands
from loads.closure.gap import SHARP_EDGED_ORIFICE, gap_flow
from loads.closure.handling import weight_per_person
from loads.closure.leakage import Inflow, SealRate, end_seal_leakage, inflow, joint_leakage
from loads.closure.lifting import lifting_force
from loads.closure.lifting_equation import APPLIES_TO, Lift, System, recommended_weight
from loads.closure.logs_needed import Bays, Ceiling, LogsNeeded, logs_needed
from loads.closure.overflow import Openings, Overflow, overflow
from loads.load import Setting
from loads.quantity import Quantity
from loads.units import from_si

NO_HOLD_DOWN = "No hold-down was entered: the weight of the logs alone holds them down."
ALL_ROUND = "Water at the level is taken to stand all round the logs; friction in the guides is left out."


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


def hydraulic_checks(found: Hydraulics, demands: Demands, near: float) -> Iterator[Check]:
    """Checks of logs on hand, hold-downs, lifting, weight by hand and pumps, as far as they were entered."""
    closure = demands.structure.closure
    states = len(found.needed.water)
    subject = f"closure {closure.id}"
    if closure.allowance is not None or closure.limits.freeboard is not None:
        yield _on_hand(found, demands, subject)
    if found.hold_down is not None:
        yield _buoyancy_check(found.hold_down, demands, subject, near)
    if found.lifting is not None:
        yield check_of(
            subject=subject,
            name="force to lift the top log",
            kind="force",
            demand=found.lifting.max(axis=1),
            limit=closure.install.lift_capacity if closure.install else None,
            near=near,
            rises_with_water=False,
            remarks=("Suction, ice, silt in the slot and a log that jams are not counted.",),
        )
    if closure.log.weight is not None and closure.handling is not None:
        yield from _handling(demands, states, subject, near)
    if closure.seal is not None:
        yield check_of(
            subject=subject,
            name="inflow to be pumped",
            kind="flow",
            demand=found.inflow.total,
            limit=closure.seal.pump_capacity,
            near=near,
            rises_with_water=False,
            remarks=("Rain and drains that are shut are not counted.",),
        )


def _on_hand(found: Hydraulics, demands: Demands, subject: str) -> Check:
    had = demands.structure.closure.on_hand
    needed = found.needed.count.astype(float)
    worst = np.argmax(needed / np.array(had, dtype=float), axis=1)
    rows = np.arange(len(worst))
    ratio = needed[rows, worst] / np.array(had, dtype=float)[worst]
    count = float(had[int(worst[0])])
    limit = made(count, "number", f"{count:.0f}", "logs on hand, as entered")
    demand = ratio * count
    remarks = () if bool(found.needed.enough[0]) else ("More logs are needed than are on hand.",)
    return check_of(
        subject=subject,
        name="logs needed",
        kind="number",
        demand=demand,
        limit=limit,
        near=1.0,
        remarks=remarks,
        rises_with_water=False,
    )


def _buoyancy_check(hold_down: FloatArray, demands: Demands, subject: str, near: float) -> Check:
    closure = demands.structure.closure
    limit = (
        closure.hold_down.capacity if closure.hold_down else made(0.0, "force", "0 N", "no hold-down entered")
    )
    return check_of(
        subject=subject,
        name="buoyancy on the hold-downs of a bay",
        kind="force",
        demand=hold_down.max(axis=1),
        limit=limit,
        near=near,
        remarks=(ALL_ROUND,) if closure.hold_down else (NO_HOLD_DOWN, ALL_ROUND),
        rises_with_water=False,
    )


def _handling(demands: Demands, states: int, subject: str, near: float) -> Iterator[Check]:
    closure = demands.structure.closure
    handling, weight = closure.handling, closure.log.weight
    assert handling is not None
    assert weight is not None
    share = weight_per_person(np.full(states, weight.value), handling.people_per_log)
    limits: Mapping[str, tuple[Quantity | None, tuple[str, ...]]] = {
        "weight per person": (handling.limit, ()),
        **({"weight per person, lifting equation": _recommended(demands)} if handling.niosh else {}),
    }
    for name, (limit, remarks) in limits.items():
        if limit is not None or handling.niosh is None:
            yield check_of(
                subject=subject,
                name=name,
                kind="weight",
                demand=share,
                limit=limit,
                near=near,
                remarks=remarks,
                rises_with_water=False,
            )


def _recommended(demands: Demands) -> tuple[Quantity, tuple[str, ...]]:
    closure = demands.structure.closure
    assert closure.handling is not None
    niosh = closure.handling.niosh
    assert niosh is not None
    one = np.ones(1)
    lift = Lift(
        horizontal=niosh.horizontal.value * one,
        vertical=niosh.vertical.value * one,
        travel=niosh.travel.value * one,
        asymmetry=(niosh.asymmetry.value if niosh.asymmetry else 0.0) * one,
        frequency_multiplier=niosh.frequency_multiplier * one,
        coupling=niosh.coupling,
    )
    form: System = "US" if niosh.horizontal.unit in ("ft", "in") else "metric"
    value = float(recommended_weight(lift, form)[0])
    unit = "lb" if form == "US" else "kg"
    text = f"{from_si(value, unit, 'weight'):.4g} {unit}"
    limit = made(value, "weight", text, f"revised NIOSH lifting equation, {form} form", unit)
    return limit, (f"The equation is for {APPLIES_TO}.",)


def made(value: float, kind: str, text: str, source: str, unit: str = "") -> Quantity:
    """A limit that follows from other entries rather than being one."""
    return Quantity(text=text, kind=kind, unit=unit, value=value, low=value, high=value, source=source)
