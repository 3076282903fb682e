"""A value as a person typed it, with its unit and pedigree, and the SI number behind it."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from datetime import date
from fractions import Fraction

from loads.units import EXAMPLES, kinds_of, to_si, units_of

_NUMBER = r"[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d{1,3})?"
_SIMPLE = re.compile(rf"({_NUMBER})\s*([^\d\s.,+-].*)?", re.ASCII | re.DOTALL)
_WHOLE_AND_FRACTION = r"(?:(\d+)\s+)?(\d+)/(\d+)|(\d+(?:\.\d*)?|\.\d+)"
_FEET_INCHES = re.compile(
    rf"([+-]?)(\d+)\s*(?:ft|')(?:\s*|-|\s+-\s+)(?:{_WHOLE_AND_FRACTION})\s*(?:in|\"|'')", re.ASCII
)
_INCH_FRACTION = re.compile(r"([+-]?)(?:(\d+)\s+)?(\d+)/(\d+)\s*(?:in|\")", re.ASCII)
_CONTROL = re.compile(r"[\x00-\x1f\x7f]")
_TYPED_LIMIT = 60


class UnreadableQuantityError(ValueError):
    """The text is not one number and one unit of the expected kind; the message says what is accepted."""


@dataclass(frozen=True, kw_only=True)
class Quantity:
    """One entered value.

    Attributes
    ----------
    text
        As typed: digits and unit.
    kind
        Kind of quantity, a key of `loads.units.EXAMPLES`.
    unit
        Symbol of the unit typed.
    value
        In the SI base unit of the kind.
    low, high
        Ends of the stated range in SI, both equal to `value` when none was stated.
    source
        Where the value comes from, empty when not stated.
    dated
        Day of the source, or None when not stated.
    """

    text: str
    kind: str
    unit: str
    value: float
    low: float
    high: float
    source: str = ""
    dated: date | None = None
    low_text: str = ""
    high_text: str = ""

    @property
    def has_range(self) -> bool:
        """True when a low or a high value was stated."""
        return bool(self.low_text or self.high_text)


def _clean(text: str) -> str:
    plain = text.strip().replace("−", "-").replace("′", "'").replace("″", '"')
    return re.sub("(?<=[a-z])[²³⁴]", lambda power: str("²³⁴".index(power[0]) + 2), plain)


def _canonical_unit(symbol: str) -> str:
    return re.sub(r"\s*[·*]\s*", "·", re.sub(r"\s*/\s*", "/", symbol.strip()))


def _feet_and_inches(text: str) -> float | None:
    """Metres of ``6 ft 6 in``, ``6'-6"``, ``1/2 in`` and the like; None when the text is not of that form."""
    match = _FEET_INCHES.fullmatch(text)
    if match:
        sign, feet, whole, top, bottom, decimal = match.groups()
        if bottom is not None and int(top) >= int(bottom):
            return None
        inches = float(decimal) if decimal else float(int(whole or 0) + Fraction(int(top), int(bottom)))
        if inches >= 12:
            return None
        total = 12 * int(feet) + inches
    else:
        match = _INCH_FRACTION.fullmatch(text)
        if not match or int(match[4]) == 0:
            return None
        sign = match[1]
        total = float(int(match[2] or 0) + Fraction(int(match[3]), int(match[4])))
    return to_si(-total if sign == "-" else total, "in", "length")


def with_unit_of(example: str, number: str) -> str:
    """Write the person's own number with the unit of an example."""
    return f"{number} {example.split(' ', 1)[1]}"


def read_quantity(text: str, kind: str, example: str = "") -> tuple[float, str]:
    """Read one number and one unit.

    Parameters
    ----------
    text
        For example ``12.5 ft``, ``6 ft 6 in``, ``400 psf``. A bare number, a decimal comma, a thousands
        separator and a unit of another kind are refused.
    kind
        Expected kind of quantity.
    example
        What a message shows; a general example of the kind when empty.

    Returns
    -------
    tuple of float and str
        Value in the SI base unit, and the unit's symbol.

    Raises
    ------
    UnreadableQuantityError
        With a message that gives an example of what is accepted.

    Examples
    --------
    >>> read_quantity("12.5 ft", "length")
    (3.81, 'ft')
    >>> read_quantity("400 mm", "length")
    (0.4, 'mm')
    """
    example = example or EXAMPLES[kind]
    if len(text) > _TYPED_LIMIT or _CONTROL.search(text):
        raise UnreadableQuantityError(f'it must be one number and one unit, for example "{example}"')
    cleaned = _clean(text)
    if kind == "length":
        metres = _feet_and_inches(cleaned)
        if metres is not None:
            return metres, "in" if _INCH_FRACTION.fullmatch(cleaned) else "ft"
    match = _SIMPLE.fullmatch(cleaned)
    if not match:
        raise UnreadableQuantityError(
            f'it must be one number with a decimal point and one unit, for example "{example}"'
        )
    number, unit_text = match.groups()
    if not unit_text:
        raise UnreadableQuantityError(f'it needs a unit, for example "{with_unit_of(example, number)}"')
    unit = _canonical_unit(unit_text)
    if kind == "length":
        unit = {"'": "ft", '"': "in"}.get(unit, unit)
    if unit not in units_of(kind):
        raise UnreadableQuantityError(_wrong_unit(unit, kind, number, example))
    value = to_si(float(number), unit, kind)
    if not math.isfinite(value):
        raise UnreadableQuantityError(f'it is too large a number; write for example "{example}"')
    return value, unit


def _wrong_unit(unit: str, kind: str, number: str, example: str) -> str:
    if re.search(r"\d", unit.rstrip("234")):
        also = "; feet and inches as 6 ft 6 in, the inches below 12" if kind == "length" else ""
        return f'it must be one number and one unit, for example "{example}"{also}'
    accepted = ", ".join(units_of(kind))
    others = kinds_of(unit)
    if others:
        reason = f"{unit} is a unit of {others[0]}, and this is a {kind}"
    else:
        reason = f'the unit "{unit[:20]}" is not known here'
    return f'{reason}; write it with one of {accepted}, for example "{with_unit_of(example, number)}"'
