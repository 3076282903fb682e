"""Levels as files write them: a number, a mark for no data, or a refusal; units and parameters."""

from __future__ import annotations

import re
from dataclasses import dataclass

from loads.units import kinds_of, units_of

_NUMBER = re.compile(r"[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d{1,2})?", re.ASCII)
_PLACEHOLDER = re.compile(r"-9{3,}(?:\.[09]*)?", re.ASCII)
_SEPARATED = re.compile(
    r"[+-]?\d+(?:[ ,.'’\u00a0\u202f]\d{3})*,\d+|[+-]?\d{1,3}(?:[ ,'’\u00a0\u202f]\d{3})+(?:\.\d*)?"
)
_MARKS = (
    "-", "--", "---", "*", "**", "***", "+", "m", "mm", "na", "n/a", "nan", "nil", "null", "none",
    "missing", "nodata", "ice", "eqp", "bkw", "dis", "dry", "fld", "mnt", "rat", "ssn", "zfl", "pmp",
    "tst", "inf", "-inf", "infinity", "-infinity", "fcst_not_current", "obs_not_current", "no_forecast",
    "out_of_service", "no data", "not available", "not current", "",
)  # fmt: skip
_NO_DATA = frozenset(_MARKS)
_WITH_DATUM = re.compile(r"(\S+) (?:above )?([A-Z][A-Z0-9]{2,11}(?:[ -]?\d{2,4})?)", re.ASCII)
LOWEST, HIGHEST = -1000.0, 10_000.0
"""No still water stands outside these elevations. [m]"""

_UNITS = {
    "ft": "ft", "feet": "ft", "foot": "ft", "[ft_i]": "ft", "ft_i": "ft", "in": "in", "inch": "in",
    "inches": "in", "[in_i]": "in", "m": "m", "meter": "m", "meters": "m", "metre": "m", "metres": "m",
    "masd": "m", "maod": "m",
    "cm": "cm", "centimeter": "cm", "centimeters": "cm", "centimetre": "cm", "centimetres": "cm",
    "mm": "mm", "millimeter": "mm", "millimeters": "mm", "millimetre": "mm", "millimetres": "mm",
}  # fmt: skip
UNIT_EXAMPLES = "ft, in, m, cm or mm"


class UnreadableLevelError(ValueError):
    """The text is neither a level nor a mark for no data; the message is the rule."""


@dataclass(frozen=True, kw_only=True)
class Parameter:
    """A water level by its code in the lists of the US Geological Survey."""

    name: str
    unit: str
    datum: str | None = None


PARAMETERS = {
    "00065": Parameter(name="gauge height", unit="ft"),
    "62614": Parameter(name="lake or reservoir elevation", unit="ft", datum="NGVD29"),
    "62615": Parameter(name="lake or reservoir elevation", unit="ft", datum="NAVD88"),
    "62619": Parameter(name="tidal water elevation", unit="ft", datum="NGVD29"),
    "62620": Parameter(name="tidal water elevation", unit="ft", datum="NAVD88"),
    "63158": Parameter(name="stream water elevation", unit="ft", datum="NGVD29"),
    "63160": Parameter(name="stream water elevation", unit="ft", datum="NAVD88"),
}
"""Codes whose values are levels; every other code is left out."""
INSTANTANEOUS = ("", "00000", "00011")
"""Statistic codes of values that hold at one instant."""


def is_no_data(text: str) -> bool:
    """Tell whether a text stands for no data: a placeholder such as −999, a mark such as Ice, nothing."""
    plain = text.strip().replace("−", "-")
    return plain.casefold() in _NO_DATA or _PLACEHOLDER.fullmatch(plain) is not None


def read_level(text: str) -> float | None:
    """Number of one cell, in the unit of its file; None where it stands for no data.

    Raises
    ------
    UnreadableLevelError
        A decimal comma, a thousands separator, or no number at all.

    Examples
    --------
    >>> read_level("22.10")
    22.1
    >>> read_level("-999999") is None
    True
    """
    plain = text.strip().replace("−", "-")
    if _NUMBER.fullmatch(plain):
        return None if _PLACEHOLDER.fullmatch(plain) else float(plain)
    if plain.casefold() in _NO_DATA:
        return None
    if _SEPARATED.fullmatch(plain):
        raise UnreadableLevelError(
            "has a decimal comma or a thousands separator; write it with a decimal point only, as 22.10"
        )
    raise UnreadableLevelError("is not a number, nor a mark for no data that is known here")


def unit_named(text: str) -> str:
    """Symbol of a unit of length as files write it.

    Raises
    ------
    UnreadableLevelError
        Not a length, or not known.

    Examples
    --------
    >>> unit_named("feet")
    'ft'
    """
    plain = text.strip()
    symbol = _UNITS.get(plain.casefold())
    if symbol in units_of("length"):
        return str(symbol)
    kinds = kinds_of(plain)
    if kinds:
        raise UnreadableLevelError(f"is a unit of {kinds[0]}; a level is in {UNIT_EXAMPLES}")
    raise UnreadableLevelError(f"is not a unit of length known here; a level is in {UNIT_EXAMPLES}")


def unit_and_datum(text: str) -> tuple[str, str | None]:
    """Symbol of a unit and name of a datum behind it, None for a reading above the gauge's own zero.

    Raises
    ------
    UnreadableLevelError
        Not a length, or words behind it that are not plainly the name of a datum.

    Examples
    --------
    >>> unit_and_datum("ft above NAVD88")
    ('ft', 'NAVD88')
    >>> unit_and_datum("mASD")
    ('m', None)
    """
    plain = " ".join(text.split())
    if plain.casefold() == "maod":
        return "m", "AOD"
    match = _WITH_DATUM.fullmatch(plain)
    if match and is_unit(match[1]):
        return unit_named(match[1]), match[2]
    return unit_named(plain), None


def is_unit(text: str) -> bool:
    """Tell whether a text is a unit of length."""
    return text.strip().casefold() in _UNITS
