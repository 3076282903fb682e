"""Moments in UTC and how they are told: nearest minute, local zone with its name, durations in words."""

from __future__ import annotations

from datetime import UTC, datetime, timedelta
from zoneinfo import ZoneInfo

import numpy as np

from loads.problems import Problem, ScenarioError

_DAYS = ("Mon", "Tue", "Wed", "Thu", "Fri", "Sat", "Sun")
_MONTHS = ("Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec")


def utc(moment: np.datetime64) -> datetime:
    """A time of a series as a moment in UTC.

    Examples
    --------
    >>> utc(np.datetime64("2031-04-03T11:08:34", "s")).isoformat()
    '2031-04-03T11:08:34+00:00'
    """
    return datetime.fromtimestamp(int(moment.astype("datetime64[s]").astype(np.int64)), UTC)


def to_minute(moment: datetime) -> datetime:
    """The nearest whole minute, half a minute up.

    Examples
    --------
    >>> to_minute(datetime(2031, 4, 3, 11, 8, 34, tzinfo=UTC)).isoformat()
    '2031-04-03T11:09:00+00:00'
    """
    return (moment + timedelta(seconds=30)).replace(second=0, microsecond=0)


def zone_abbreviation(moment: datetime, zone: ZoneInfo) -> str:
    """What the zone is called at that moment, its offset where it has no letters of its own.

    Examples
    --------
    >>> zone_abbreviation(datetime(2031, 4, 3, tzinfo=UTC), ZoneInfo("America/Chicago"))
    'CDT'
    >>> zone_abbreviation(datetime(2031, 4, 3, tzinfo=UTC), ZoneInfo("America/Sao_Paulo"))
    'UTC−03:00'
    """
    local = moment.astimezone(zone)
    name = local.tzname() or ""
    if name.isalpha():
        return name
    offset = local.strftime("%z")
    return f"UTC{offset[:3]}:{offset[3:5]}".replace("-", "−")


def local_text(moment: datetime, zone: ZoneInfo) -> str:
    """A moment to the minute in a zone, with the zone's name, weekday and date.

    Examples
    --------
    >>> local_text(datetime(2031, 4, 3, 11, 8, 34, tzinfo=UTC), ZoneInfo("America/Chicago"))
    '06:09 CDT Thu 3 Apr 2031'
    """
    local = to_minute(moment.astimezone(UTC)).astimezone(zone)
    day = f"{_DAYS[local.weekday()]} {local.day} {_MONTHS[local.month - 1]} {local.year}"
    return f"{local:%H:%M} {zone_abbreviation(moment, zone)} {day}"


def duration_text(span: timedelta) -> str:
    """Length of a time in hours and minutes, to the nearest minute, without its sign.

    Examples
    --------
    >>> duration_text(timedelta(hours=8, minutes=8, seconds=34))
    '8 h 9 min'
    >>> duration_text(timedelta(minutes=-45))
    '45 min'
    """
    minutes = round(abs(span).total_seconds() / 60)
    hours, rest = divmod(minutes, 60)
    if not hours:
        return f"{rest} min"
    return f"{hours} h {rest} min" if rest else f"{hours} h"


def now_of(typed: str | None, path: str) -> datetime:
    """A time to tell from, as typed, or this machine's when nothing is typed.

    Raises
    ------
    ScenarioError
        It is no date and time, or has no zone.

    Examples
    --------
    >>> now_of("2031-04-02T09:10:00-05:00", "now").isoformat()
    '2031-04-02T14:10:00+00:00'
    """
    if typed is None or not typed.strip():
        return datetime.now(UTC)
    example = "2031-04-02T06:00:00-05:00"
    try:
        moment = datetime.fromisoformat(typed.strip())
        if moment.utcoffset() is not None:
            return moment.astimezone(UTC)
        rule = f"it needs a time zone, for example {example}"
    except (ValueError, OverflowError):
        rule = f"it must be a date and time with a zone, for example {example}"
    raise ScenarioError([Problem(path=path, value=f'"{typed.strip()[:40]}"', rule=rule)])
