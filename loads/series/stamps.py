"""Times as files write them: a date, a time of day and a zone, or a refusal. A zone is never assumed."""

from __future__ import annotations

import re
from dataclasses import dataclass
from datetime import UTC, date, datetime, timedelta
from functools import cache, lru_cache
from typing import NamedTuple
from zoneinfo import ZoneInfo, available_timezones

_EPOCH = datetime(1970, 1, 1, tzinfo=UTC).replace(tzinfo=None)
_EPOCH_DAY = date(1970, 1, 1).toordinal()
EARLIEST_YEAR, LATEST_YEAR = 1800, 2200
"""Years that a reading may carry; earlier ones, such as year 0001, stand for no time at all."""

_HOURS = {
    "UTC": 0, "GMT": 0, "Z": 0, "NST": -3.5, "NDT": -2.5, "AST": -4, "ADT": -3, "EST": -5, "EDT": -4,
    "CST": -6, "CDT": -5, "MST": -7, "MDT": -6, "PST": -8, "PDT": -7, "AKST": -9, "AKDT": -8, "HST": -10,
    "CHST": 10, "WET": 0, "WEST": 1, "CET": 1, "CEST": 2, "EET": 2, "EEST": 3,
}  # fmt: skip
ASK_FOR_ZONE = (
    "has times without a zone; state the zone, for example -05:00, CDT or America/Chicago: it is not assumed"
)
ZONE_EXAMPLES = (
    "write an offset such as -05:00, an abbreviation such as CDT or a name such as America/Chicago"
)
_OFFSET = re.compile(r"(?:UTC|GMT)?\s*([+-])(\d{1,2})(?::?(\d{2}))?", re.ASCII | re.IGNORECASE)
_STAMP = re.compile(
    r"(\d{4})([-/])(\d{1,2})\2(\d{1,2})"
    r"(?:[T ]\s*(\d{1,2}):(\d{2})(?::(\d{2})(?:[.,]\d{1,9})?)?)?"
    r"\s*([A-Za-z]{1,5}|(?:UTC|GMT)?[+-]\d{2}(?::?\d{2})?)?",
    re.ASCII,
)
_YEAR_LAST = re.compile(r"\d{1,2}[./-]\d{1,2}[./-]\d{2,4}\b.*", re.ASCII | re.DOTALL)


class UnreadableTimeError(ValueError):
    """The text is not a time that can be placed; the message is the rule."""


@dataclass(frozen=True)
class Zone:
    """A fixed offset, or the rules of a region."""

    name: str
    minutes: int = 0
    region: ZoneInfo | None = None

    def offset(self, local: int) -> int:
        """Minutes by which local time is ahead of UTC at a local clock time.

        Parameters
        ----------
        local
            Seconds from 1970-01-01 00:00 as a clock there shows them. [s]

        Raises
        ------
        UnreadableTimeError
            The clock shows this time twice or never, on the day it is changed.
        """
        if self.region is None:
            return self.minutes
        clock = (_EPOCH + timedelta(seconds=local)).replace(tzinfo=self.region)
        first, second = clock.utcoffset(), clock.replace(fold=1).utcoffset()
        if first is None or first != second:
            raise UnreadableTimeError(
                f"falls in the hour in which the clocks of {self.name} change; write it with its offset"
            )
        return round(first.total_seconds() / 60)

    def offset_at(self, seconds: int) -> int:
        """Minutes by which local time is ahead of UTC at an instant, in seconds from 1970-01-01 UTC."""
        if self.region is None:
            return self.minutes
        ahead = (_EPOCH + timedelta(seconds=seconds)).replace(tzinfo=UTC).astimezone(self.region).utcoffset()
        return 0 if ahead is None else round(ahead.total_seconds() / 60)


class Stamp(NamedTuple):
    """An instant in seconds from 1970-01-01 00:00 UTC, its offset in minutes, and the zone's name."""

    seconds: int
    offset: int
    zone: str


@cache
def _regions() -> dict[str, str]:
    return {name.casefold(): name for name in available_timezones()}


def offset_name(minutes: int) -> str:
    """Name of a fixed offset.

    Examples
    --------
    >>> offset_name(-330)
    'UTC-05:30'
    """
    if minutes == 0:
        return "UTC"
    hours, rest = divmod(abs(minutes), 60)
    return f"UTC{'+' if minutes > 0 else '-'}{hours:02d}:{rest:02d}"


@lru_cache(maxsize=256)
def zone_named(text: str) -> Zone:
    """Zone of an offset, an abbreviation of the closed list, or a name of the tz database.

    Raises
    ------
    UnreadableTimeError
        None of these, or an abbreviation that several regions use.

    Examples
    --------
    >>> zone_named("CDT").minutes
    -300
    >>> zone_named("+02:00").name
    'UTC+02:00'
    """
    plain = text.strip().replace("−", "-")
    known = _HOURS.get(plain.upper())
    if known is not None:
        return Zone(name="UTC" if plain.upper() == "Z" else plain.upper(), minutes=round(60 * known))
    match = _OFFSET.fullmatch(plain)
    if match:
        minutes = 60 * int(match[2]) + int(match[3] or 0)
        if minutes > 14 * 60 or int(match[3] or 0) > 59:
            raise UnreadableTimeError(f"is not an offset from UTC; {ZONE_EXAMPLES}")
        signed = -minutes if match[1] == "-" else minutes
        return Zone(name=offset_name(signed), minutes=signed)
    name = _regions().get(plain.casefold())
    if name is None or len(plain) < 4:
        raise UnreadableTimeError(f"is not a zone that can be told from others; {ZONE_EXAMPLES}")
    return Zone(name=name, region=ZoneInfo(name))


@lru_cache(maxsize=4096)
def _day(year: int, month: int, day: int) -> int:
    return date(year, month, day).toordinal() - _EPOCH_DAY


def local_seconds(date_parts: tuple[int, int, int], hour: int, minute: int, second: int = 0) -> int:
    """Seconds from 1970-01-01 00:00 to a clock time; 24:00 is the end of the day.

    Raises
    ------
    UnreadableTimeError
        There is no such date or time of day.
    """
    year, month, day = date_parts
    if hour > 24 or minute > 59 or second > 59 or (hour == 24 and (minute or second)):
        raise UnreadableTimeError("has a time of day that does not exist")
    if not EARLIEST_YEAR <= year <= LATEST_YEAR:
        raise UnreadableTimeError(f"has a year outside {EARLIEST_YEAR} to {LATEST_YEAR}")
    try:
        days = _day(year, month, day)
    except ValueError:
        raise UnreadableTimeError("has a date that does not exist") from None
    return 86400 * days + 3600 * hour + 60 * minute + second


def placed(local: int, zone: Zone) -> Stamp:
    """Instant of a local clock time."""
    offset = zone.offset(local)
    return Stamp(local - 60 * offset, offset, zone.name)


def read_stamp(text: str, zone: Zone | None) -> Stamp | None:
    """Read one time.

    Parameters
    ----------
    text
        Year first, ``2031-04-02 06:15`` or ``2031-04-02T06:15:00-05:00``.
    zone
        Zone of times that carry none of their own.

    Returns
    -------
    Stamp or None
        None when the text stands for no time: empty, or a year before 1800 such as 0001.

    Raises
    ------
    UnreadableTimeError
        Another order than year, month, day; no time of day; no zone; a date or time that does not exist.
    """
    plain = text.strip()
    if not plain:
        return None
    match = _STAMP.fullmatch(plain)
    if not match:
        rule = "is not a time; write it as 2031-04-02 06:15"
        if _YEAR_LAST.fullmatch(plain):
            rule = "does not say which is the day and which the month; write the year first, 2031-04-02 06:15"
        raise UnreadableTimeError(rule)
    year, _, month, day, hour, minute, second, suffix = match.groups()
    if int(year) < EARLIEST_YEAR:
        return None
    if hour is None:
        raise UnreadableTimeError(
            "has no time of day, so it is a daily value and cannot be placed on the clock"
        )
    if suffix and suffix.upper() in ("AM", "PM"):
        raise UnreadableTimeError("has a clock of twelve hours; write 18:00 rather than 6:00 PM")
    if suffix:
        zone = zone_named(suffix)
    if zone is None:
        raise UnreadableTimeError(ASK_FOR_ZONE)
    day_of = (int(year), int(month), int(day))
    return placed(local_seconds(day_of, int(hour), int(minute), int(second or 0)), zone)
