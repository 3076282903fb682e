"""Fields of SHEF: zones, dates, time codes, parameter codes and values."""

from __future__ import annotations

import re
from dataclasses import dataclass

from loads.series.levels import is_no_data
from loads.series.series import Kind
from loads.series.stamps import (
    ASK_FOR_ZONE,
    Stamp,
    Zone,
    local_seconds,
    placed,
    zone_named,
)

ZONES = {
    "Z": "UTC", "E": "America/New_York", "ES": "EST", "ED": "EDT", "C": "America/Chicago", "CS": "CST",
    "CD": "CDT", "M": "America/Denver", "MS": "MST", "MD": "MDT", "P": "America/Los_Angeles",
    "PS": "PST", "PD": "PDT",
    "L": "America/Anchorage", "LS": "AKST", "LD": "AKDT", "H": "Pacific/Honolulu", "HS": "HST", "AS": "AST",
    "AD": "ADT", "N": "America/St_Johns", "NS": "NST", "ND": "NDT",
}  # fmt: skip
"""Zone codes; A, Y, B and J stand for several offsets, or for zones no longer kept, and are asked about."""
_FIRST_PART = {"DT": 0, "DY": 0, "DM": 1, "DD": 2, "DH": 3}
_REJECTED = ("B", "R", "X")
_VALUE = re.compile(r"([+-]?(?:\d+(?:\.\d*)?|\.\d+))\s*([A-Za-z]?)", re.ASCII)
_CENTURY_TURN = 80


class UnreadableFieldError(ValueError):
    """A field that cannot be read; the message is the rule."""


@dataclass(frozen=True, kw_only=True)
class Code:
    """A parameter code taken apart: which physical element, and whether it is a trace of stage read here."""

    text: str
    kind: Kind | None
    reason: str = ""


def code_of(text: str) -> Code:
    """Take a parameter code apart: HG, HGIRG, HGIFF.

    Examples
    --------
    >>> code_of("HGIFF").kind
    'forecast'
    >>> code_of("HGIFFX").reason
    'an extreme, not a trace'
    """
    element, duration, kind_code = text[:2], text[2:3], text[3:4]
    extreme, probability = text[5:6], text[6:7]
    reason = ""
    if element != "HG":
        reason = "not stage"
    elif duration not in ("", "I", "Z"):
        reason = "not at an instant"
    elif extreme not in ("", "Z"):
        reason = "an extreme, not a trace"
    elif probability not in ("", "Z"):
        reason = "one probability of several"
    elif kind_code not in ("", "R", "Z", "F"):
        reason = "neither observed nor forecast"
    kind: Kind = "forecast" if kind_code == "F" else "observed"
    return Code(text=text, kind=None if reason else kind, reason=reason)


def zone_of(code: str, stated: Zone | None) -> Zone:
    """Zone of a message."""
    if not code:
        if stated is None:
            raise UnreadableFieldError(ASK_FOR_ZONE)
        return stated
    return zone_named(ZONES[code])


def date_of(text: str) -> tuple[int, int, int]:
    """Year, month and day of the field behind the station."""
    if len(text) == 4:
        raise UnreadableFieldError("gives a date without a year; write it as 20310402")
    year = int(text[:-4])
    if len(text) == 6:
        if year >= _CENTURY_TURN:
            raise UnreadableFieldError("gives a year of two digits that may be of either century; write four")
        year += 2000
    return year, int(text[-4:-2]), int(text[-2:])


class Clock:
    """Date, hour and minute of a message, as its time codes set them."""

    def __init__(self, date: tuple[int, int, int], zone: Zone) -> None:
        self.parts = [*date, -1, 0]
        self.zone = zone
        self.codes = 0

    def set(self, code: str, digits: str) -> None:
        """Apply one time code: DH, DD, DM, DY or DT."""
        if code not in _FIRST_PART:
            raise UnreadableFieldError(
                f"has the time code {code}, which is not read; give DH with hour and minute"
            )
        self.codes += 1
        if self.codes > 1:
            raise UnreadableFieldError(
                "gives its hour more than once, so it is unclear which counts; write one line each"
            )
        if not digits:
            raise UnreadableFieldError(
                f"has a blank {code} field, so its hour is unknown; write for example DH0600"
            )
        first, size = _FIRST_PART[code], 4 if code == "DT" else 2
        pairs = [digits[:size], *(digits[at : at + 2] for at in range(size, len(digits), 2))]
        if not digits.isascii() or not digits.isdigit() or len(pairs[-1]) != 2 or first + len(pairs) > 5:
            raise UnreadableFieldError(f"has a {code} field of a wrong length; write for example DH0600")
        values = [int(pair) for pair in pairs]
        if code == "DY":
            values[0] += 2000
        self.parts[first : first + len(values)] = values

    def stamp(self) -> Stamp:
        """The instant."""
        year, month, day, hour, minute = self.parts
        if hour < 0:
            raise UnreadableFieldError("gives no hour; write for example DH0600")
        return placed(local_seconds((year, month, day), hour, minute), self.zone)


def created_at(digits: str, zone: Zone) -> int | None:
    """Seconds of the instant of creation behind DC, or None when it gives no year."""
    if not digits.isascii() or not digits.isdigit() or len(digits) not in (8, 10, 12):
        raise UnreadableFieldError("has a DC field of a wrong length; write for example DC203104021410")
    if len(digits) == 8:
        return None
    year = int(digits[:-8]) + (2000 if len(digits) == 10 else 0)
    month, day, hour, minute = (int(digits[at : at + 2]) for at in range(len(digits) - 8, len(digits), 2))
    return placed(local_seconds((year, month, day), hour, minute), zone).seconds


def interval_of(digits: str, zone: Zone) -> int:
    """Seconds of a DI field: N minutes, H hours, D days."""
    match = re.fullmatch(r"([SNHD])\+?(\d{1,2})", digits, re.ASCII)
    if not match or int(match[2]) == 0:
        raise UnreadableFieldError(
            "has a DI field that is not a forward step in minutes, hours or days, such as DIH06"
        )
    if match[1] == "D" and zone.region is not None:
        raise UnreadableFieldError(
            "steps by days in a zone whose clocks change; give the step in hours or the zone as Z"
        )
    return int(match[2]) * {"S": 1, "N": 60, "H": 3600, "D": 86400}[match[1]]


def value_of(text: str, usual: str = "") -> tuple[str, str, str]:
    """Number, qualifier (or the usual one) and reason why it is no data; the number is empty in that case."""
    plain = re.sub(r'"[^"]*"', "", text).strip()
    match = _VALUE.fullmatch(plain)
    if not match:
        if is_no_data(plain):
            return "", "", plain or "empty"
        raise UnreadableFieldError("has a value that is neither a number nor M for missing")
    qualifier = match[2].upper() or usual
    if qualifier in _REJECTED:
        return "", qualifier, f"marked {qualifier} (bad or rejected)"
    return match[1], qualifier, ""
