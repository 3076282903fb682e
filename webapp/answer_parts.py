"""Parts, checks and first-limit levels as data, for the JSON of every kind of barrier."""

from __future__ import annotations

import math
from typing import Any

from loads.checks import Check
from loads.first_limit import FirstLimit
from loads.part import Part
from loads.units import SI_UNITS
from webapp.display import PLAIN


def part_answer(part: Part, index: int) -> dict[str, Any]:
    """What one part carries in one state."""
    return {
        "id": part.id,
        "kind": part.kind,
        "bottom": part.bottom,
        "top": part.top,
        **{
            name: number(getattr(part, name)[index])
            for name in ("line_load", "moment", "shear", "reaction", "deflection")
        },
        **{figure.name: number(figure.value[index]) for figure in part.more},
    }


def check_answer(check: Check, index: int) -> dict[str, Any]:
    """One check in one state."""
    kind = "length" if check.kind == "elevation" else check.kind
    return {
        "subject": check.subject,
        "check": check.name,
        "demand": number(check.demand[index]),
        "limit": number(check.limit_value),
        "unit": "" if kind in PLAIN else SI_UNITS[kind],
        "ratio": number(check.ratio[index]),
        "verdict": check.verdict(index),
        "source": check.source,
        "remarks": list(check.remarks),
    }


def first_limit_answer(first: FirstLimit | None) -> dict[str, Any] | None:
    """A first-limit level."""
    if first is None:
        return None
    return {
        "level": first.level,
        "subject": first.subject,
        "check": first.check,
        "without_water": first.without_water,
        "searched_to": first.ceiling,
    }


def number(value: float) -> float | None:
    """The number, None where there is none."""
    found = float(value)
    return found if math.isfinite(found) else None
