"""Figures and texts as a field sheet writes them."""

from __future__ import annotations

import datetime as dt
import math
from collections.abc import Iterable, Sequence

from loads.quantity import Quantity
from loads.units import from_si
from webapp.display import NO_BREAK, System, elevation, show
from webapp.drawing.measure import shortened, text_width

ELLIPSIS = "…"
_EXACT_INCHES = 0.06


def length_text(value: float, system: System) -> str:
    """Length, not below zero, in feet with decimals and with inches, or in metres.

    Examples
    --------
    >>> length_text(1.9812, "US").replace(NO_BREAK, " ")
    '6.50 ft (6 ft 6 in)'
    >>> length_text(1.95072, "US").replace(NO_BREAK, " ")
    '6.40 ft (about 6 ft 5 in)'
    >>> length_text(1.95072, "SI").replace(NO_BREAK, " ")
    '1.951 m'
    """
    plain = elevation(value, system)
    if system == "SI":
        return plain
    inches = from_si(value, "in", "length")
    whole = round(inches)
    about = "" if abs(inches - whole) < _EXACT_INCHES else f"about{NO_BREAK}"
    return f"{plain} ({about}{whole // 12}{NO_BREAK}ft{NO_BREAK}{whole % 12}{NO_BREAK}in)"


def cut(text: str, ems: float) -> str:
    """Text cut to a width, in widths of the letter m, with an ellipsis where something is missing.

    Examples
    --------
    >>> cut("Tannery Row", 20.0), cut("Tannery Row", 5.0)
    ('Tannery Row', 'Tanner…')
    """
    return shortened(text, ems, 1.0)


def sentence(text: str) -> str:
    """Text with a full stop, unless it ends with one or was cut short.

    Examples
    --------
    >>> sentence("one clamp"), sentence("one cl…")
    ('one clamp.', 'one cl…')
    """
    return text if text.endswith((".", ELLIPSIS)) else f"{text}."


def above_sill(value: float, system: System) -> str:
    """Height above the sill in words.

    Examples
    --------
    >>> above_sill(-0.3048, "US").replace(NO_BREAK, " ")
    '1.00 ft (1 ft 0 in) below sill'
    """
    return f"{length_text(abs(value), system)} {'above' if value >= 0 else 'below'} sill"


def listed(texts: Sequence[str], ems: float, more: str) -> str:
    """Texts one after the other as far as there is room, then how many more there are.

    Examples
    --------
    >>> listed(["one clamp", "a bolt", "two seals"], 12.0, "more in the scenario file")
    'one clamp; a bolt; and 1 more in the scenario file'
    """
    shown: list[str] = []
    room = ems
    for number, text in enumerate(text.rstrip(".") for text in texts):
        width = text_width(text, 1.0)
        if width > room:
            if not shown:
                shown.append(cut(text, room))
                number += 1  # noqa: PLW2901  the first one is shown, as far as it goes
            left = len(texts) - number
            return "; ".join([*shown, f"and {left} {more}"] if left else shown)
        shown.append(text)
        room -= width
    return "; ".join(shown)


def span_text(values: Iterable[int]) -> str:
    """One number where all are the same, else the least and the most.

    Examples
    --------
    >>> span_text([8, 8]), span_text([8, 6, 7])
    ('8', '6–8')
    """
    found = sorted(set(values))
    return str(found[0]) if len(found) == 1 else f"{found[0]}–{found[-1]}"


def plural(count: int, word: str) -> str:
    """Count with its word.

    Examples
    --------
    >>> [text.replace(NO_BREAK, " ") for text in (plural(1, "post"), plural(4, "brace"))]
    ['1 post', '4 braces']
    """
    return f"{count}{NO_BREAK}{word}{'' if count == 1 else 's'}"


def source_words(quantity: Quantity, ems: float) -> str:
    """Who a value comes from and of what day; both are named when missing."""
    who = cut(quantity.source, ems) if quantity.source else "no name entered"
    return f"{who}, {day_text(quantity.dated)}" if quantity.dated else f"{who}, no date entered"


def day_text(day: dt.date) -> str:
    """Day as people read it, for example 2 Mar 2030."""
    return f"{day.day} {day:%b %Y}"


def range_text(quantity: Quantity, system: System) -> str:
    """Range of a level, where one was entered."""
    if not quantity.has_range:
        return ""
    low, high = (bare_level(value, system) for value in (quantity.low, quantity.high))
    return f" ({low} to {high})"


def bare_level(value: float, system: System) -> str:
    """Elevation without its unit."""
    return elevation(value, system).partition(NO_BREAK)[0]


def value_text(value: float, kind: str, system: System) -> str:
    """Value with its unit, a dash where there is none."""
    return show(value, kind, system) if math.isfinite(value) else "–"
