"""What the JSON of a closure holds besides that of every barrier."""

from __future__ import annotations

from typing import Any

from loads.assessment import AssessedClosure
from loads.closure.whatif import WhatIf, what_ifs
from webapp.answer_parts import check_answer, first_limit_answer, number


def closure_answer(barrier: AssessedClosure, index: int) -> dict[str, Any]:
    """Logs, water over and through them, basis, level at which every check is reached, and losses."""
    closure, found = barrier.record, barrier.hydraulics
    over, needed = found.overflow, found.needed
    recheck = barrier.parts_recheck
    return {
        "basis": barrier.basis.words,
        "recheck": {
            "agrees": bool(barrier.recheck.agrees[index]) and recheck.agrees,
            "largest_difference": max(float(barrier.recheck.difference[index]), recheck.difference),
        },
        "logs": {
            "in_place": list(closure.in_place),
            "on_hand": list(closure.on_hand),
            "top": barrier.structure.layout.lowest_top,
            "needed": [int(count) for count in needed.count[index]],
            "needed_top": [float(top) for top in needed.top[index]],
            "short": [int(count) for count in needed.short[index]],
            "wanted_top": number(needed.wanted_top[index]),
            "stopped_by": [{"name": c.name, "level": c.level} for c in needed.stopped_by(index)],
        },
        "overflow": {
            "level": over.level,
            "flow_low": float(over.total_low[index]),
            "flow_high": float(over.total_high[index]),
            "formulas": list(over.formulas(index)),
        },
        "inflow": {
            "parts": {name: float(flow[index]) for name, flow in found.inflow.parts.items()},
            "total": float(found.inflow.total[index]),
        },
        "first_limits": [first_limit_answer(first) for first in barrier.first_limits],
        "what_ifs": [_what_if(one, index) for one in what_ifs(barrier)],
    }


def _what_if(one: WhatIf, index: int) -> dict[str, Any]:
    named: dict[str, dict[str, Any]] = {}
    for check in one.checks:
        named.setdefault(check.name, check_answer(check, index))
    return {
        "name": one.name,
        "part": one.part,
        "words": one.words,
        "stands": one.stands,
        "verdict": one.verdict(index),
        "checks": list(named.values()),
    }
