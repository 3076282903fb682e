"""Checks of logs on hand, hold-downs, lifting, weight by hand and pumps, as far as they were entered."""

from __future__ import annotations

from collections.abc import Iterator, Mapping

import numpy as np

from loads.arrays import FloatArray
from loads.checks import Check, check_of
from loads.closure.demands import Demands
from loads.closure.handling import weight_per_person
from loads.closure.hydraulics import Hydraulics
from loads.closure.lifting_equation import APPLIES_TO, Lift, System, recommended_weight
from loads.quantity import Quantity
from loads.units import from_si

NO_HOLD_DOWN = "No hold-down was entered: the weight of the logs alone holds them down."
ALL_ROUND = "Water at the level is taken to stand all round the logs; friction in the guides is left out."


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
        grades_below=False,
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
        grades_below=closure.hold_down is not None,
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
