"""How values are written for people: units of each system, significant figures, the same in every output."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from typing import Literal

from loads.quantity import Quantity
from loads.records.scenario import Scenario, zone_name
from loads.units import from_si, to_si

System = Literal["US", "SI"]

NO_BREAK = "\u00a0"
THOUSANDS = "\u202f"
MINUS = "\u2212"
PAGE_DIGITS = 3
"""Significant figures on pages."""
PRINT_DIGITS = 6
"""Significant figures in working that a reviewer follows by hand."""


@dataclass(frozen=True, kw_only=True)
class Choice:
    """Unit in which a kind is shown, and the larger unit taken from a certain size on."""

    unit: str
    label: str
    kind: str
    larger: str = ""
    larger_label: str = ""
    from_size: float = math.inf


PLAIN = ("ratio", "number")
"""Kinds that have no unit."""
_POWERS = {"area": (2, "²"), "first moment of area": (3, "³"), "second moment of area": (4, "⁴")}


def _choice(kind: str, unit: str, label: str = "", larger: str = "", size: float = math.inf) -> Choice:
    return Choice(
        unit=unit, label=label or unit, kind=kind, larger=larger, larger_label=larger, from_size=size
    )


CHOICES: dict[System, dict[str, Choice]] = {
    "US": {
        "length": _choice("length", "ft"),
        "elevation": _choice("length", "ft"),
        "pressure": _choice("pressure", "psf"),
        "unit weight": _choice("unit weight", "pcf"),
        "force": _choice("force", "lb", larger="kip", size=10_000.0),
        "line load": _choice("line load", "lb/ft"),
        "moment": _choice("moment", "lb·ft", larger="kip·ft", size=10_000.0),
        "moment per length": _choice("moment per length", "lb·ft/ft"),
        "angle": _choice("angle", "deg", "°"),
        "temperature": _choice("temperature", "degF", "°F"),
        "density": _choice("density", "kg/m3", "kg/m³"),
        "speed": _choice("speed", "ft/s"),
        "stress": _choice("stress", "psi", larger="ksi", size=10_000.0),
        "deflection": _choice("length", "in"),
        "section modulus": _choice("section modulus", "in3", "in³"),
        "section second moment": _choice("second moment of area", "in4", "in⁴"),
        "section area": _choice("area", "in2", "in²"),
        "part length": _choice("length", "in"),
        "part force": _choice("force", "lb"),
        "part line load": _choice("line load", "lb/in"),
        "part moment": _choice("moment", "lb·in"),
        "weight": _choice("weight", "lb", larger="kip", size=10_000.0),
        "duration": _choice("duration", "min", larger="h", size=120.0),
        "flow": _choice("flow", "gpm", "gal/min", larger="cfs", size=4_500.0),
        "flow per length": _choice("flow per length", "gpm/ft", "gal/min/ft"),
    },
    "SI": {
        "length": _choice("length", "m"),
        "elevation": _choice("length", "m"),
        "pressure": _choice("pressure", "kPa"),
        "unit weight": _choice("unit weight", "kN/m3", "kN/m³"),
        "force": _choice("force", "kN"),
        "line load": _choice("line load", "kN/m"),
        "moment": _choice("moment", "kN·m"),
        "moment per length": _choice("moment per length", "kN·m/m"),
        "angle": _choice("angle", "deg", "°"),
        "temperature": _choice("temperature", "degC", "°C"),
        "density": _choice("density", "kg/m3", "kg/m³"),
        "speed": _choice("speed", "m/s"),
        "stress": _choice("stress", "MPa"),
        "deflection": _choice("length", "mm"),
        "section modulus": _choice("section modulus", "mm3", "mm³"),
        "section second moment": _choice("second moment of area", "mm4", "mm⁴"),
        "section area": _choice("area", "mm2", "mm²"),
        "part length": _choice("length", "mm"),
        "part force": _choice("force", "N"),
        "part line load": _choice("line load", "N/mm"),
        "part moment": _choice("moment", "N·mm"),
        "weight": _choice("weight", "kg"),
        "duration": _choice("duration", "min", larger="h", size=120.0),
        "flow": _choice("flow", "L/s"),
        "flow per length": _choice("flow per length", "L/h/m"),
    },
}


def significant(value: float, digits: int) -> str:
    """Write a number with so many significant figures, never in powers of ten, thousands set apart.

    Examples
    --------
    >>> significant(1268.4, 3).replace(THOUSANDS, " ")
    '1 270'
    >>> significant(0.04567, 3)
    '0.0457'
    """
    if not math.isfinite(value):
        return "–"
    if value == 0 or abs(value) < 1e-12:
        return "0"
    decimals = digits - 1 - math.floor(math.log10(abs(value)))
    rounded = round(value, decimals)
    if rounded != 0:
        decimals = digits - 1 - math.floor(math.log10(abs(rounded)))
    return fixed(rounded, max(decimals, 0))


def fixed(value: float, decimals: int) -> str:
    """Write a number with so many decimals, thousands set apart, a true minus sign."""
    text = f"{abs(value):,.{decimals}f}".replace(",", THOUSANDS)
    negative = value < 0 and float(f"{abs(value):.{decimals}f}") != 0
    return MINUS + text if negative else text


def in_unit(value: float, kind: str, system: System) -> float:
    """Return the number in the unit in which its kind is shown, never the larger one."""
    choice = CHOICES[system][kind]
    return from_si(value, choice.unit, choice.kind)


def unit_label(kind: str, system: System) -> str:
    """Label of the unit in which a kind is shown."""
    return CHOICES[system][kind].label


def show(value: float, kind: str, system: System, digits: int = PAGE_DIGITS) -> str:
    """Value with its unit.

    Parameters
    ----------
    value
        In the SI base unit of the kind.
    kind
        A kind of `CHOICES`; "elevation" has fixed decimals, "ratio" no unit.
    system
        "US" or "SI".
    digits
        Significant figures.

    Examples
    --------
    >>> show(67948.9, "force", "US").replace(NO_BREAK, " ")
    '15.3 kip'
    """
    if kind in PLAIN:
        return significant(value, digits)
    if kind == "elevation":
        return elevation(value, system)
    if kind in _POWERS:
        return _power(value, kind, system, digits)
    choice = CHOICES[system][kind]
    number, label = from_si(value, choice.unit, choice.kind), choice.label
    if choice.larger and abs(number) >= choice.from_size:
        number, label = from_si(value, choice.larger, choice.kind), choice.larger_label
    joint = "" if label == "°" else NO_BREAK
    return f"{significant(number, digits)}{joint}{label}"


def _power(value: float, kind: str, system: System, digits: int) -> str:
    """Area and moments of area: powers of the unit of length."""
    power, mark = _POWERS[kind]
    choice = CHOICES[system]["length"]
    number = value / from_si_factor(choice) ** power
    return f"{significant(number, digits)}{NO_BREAK}{choice.label}{mark}"


def from_si_factor(choice: Choice) -> float:
    """SI value of one unit of a choice."""
    return to_si(1.0, choice.unit, choice.kind)


def show_all(values: Sequence[float], kind: str, system: System, digits: int = PAGE_DIGITS) -> list[str]:
    """Values of a column, all in the same unit: the larger one when any of them calls for it."""
    if kind not in CHOICES[system] or kind == "elevation":
        return [show(value, kind, system, digits) for value in values]
    choice = CHOICES[system][kind]
    sizes = [abs(from_si(value, choice.unit, choice.kind)) for value in values if math.isfinite(value)]
    unit, label = choice.unit, choice.label
    if choice.larger and sizes and max(sizes) >= choice.from_size:
        unit, label = choice.larger, choice.larger_label
    joint = "" if label == "°" else NO_BREAK
    return [f"{significant(from_si(value, unit, choice.kind), digits)}{joint}{label}" for value in values]


def elevation(value: float, system: System, datum: str = "") -> str:
    """Elevation, two decimals in feet and three in metres, with its datum when given; "dry" without water."""
    if not math.isfinite(value):
        return "dry"
    decimals = 2 if system == "US" else 3
    text = (
        f"{fixed(in_unit(value, 'elevation', system), decimals)}{NO_BREAK}{unit_label('elevation', system)}"
    )
    return f"{text} {datum}" if datum else text


def as_entered(quantity: Quantity) -> str:
    """Value as typed, with its range when one was stated."""
    if quantity.has_range:
        return f"{quantity.text} ({quantity.low_text or '–'} to {quantity.high_text or '–'})"
    return quantity.text


def pedigree(quantity: Quantity) -> str:
    """Source and date of a value, in words."""
    words = quantity.source or "no source stated"
    return f"{words}, {quantity.dated.isoformat()}" if quantity.dated else words


def moment_text(moment: datetime) -> str:
    """Day, time and zone of a moment, for example ``2 Apr 2031 06:00 UTC−05:00``."""
    return f"{moment.day} {moment:%b %Y %H:%M} {zone_name(moment)}"


def age_text(moment: datetime, now: datetime) -> str:
    """How old a figure is, in words."""
    minutes = round((now - moment).total_seconds() / 60)
    if minutes < 0:
        return "later than this machine's clock"
    if minutes < 120:
        return f"{minutes} min old"
    return f"{minutes // 60} h old" if minutes < 60 * 48 else f"{minutes // 1440} days old"


def barrier_title(barrier_id: str, name: str) -> str:
    """Id and name of a barrier as headings show it."""
    return f"{barrier_id} · {name}" if name else barrier_id


def foot_of(kind: str) -> str:
    """What the bottom of a kind of barrier is called.

    Examples
    --------
    >>> foot_of("closure"), foot_of("panel"), foot_of("wall")
    ('sill', 'bottom', 'toe')
    """
    return {"closure": "sill", "wall": "toe"}.get(kind, "bottom")


def load_kind(barrier: str, kind: str) -> str:
    """Kind in which force and moment of a kind of barrier are shown: those of a wall are per length.

    Examples
    --------
    >>> load_kind("wall", "force"), load_kind("closure", "moment")
    ('line load', 'moment')
    """
    per_length = {"force": "line load", "moment": "moment per length"}
    return per_length.get(kind, kind) if barrier == "wall" else kind


def system_of(scenario: Scenario) -> System:
    """Unit system in which a scenario asks to be shown."""
    return scenario.units
