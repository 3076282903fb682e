"""A moment: date and time with its zone, from a TOML date-time or ISO text."""

from __future__ import annotations

from datetime import datetime
from typing import Annotated
from zoneinfo import ZoneInfo

from pydantic import BeforeValidator

from loads.records.base import problem_error

_EXAMPLE = "2031-04-02T06:00:00-05:00"


def read_moment(value: object) -> object:
    """Moment with its zone; what is no date-time or text is left to the type to refuse.

    Raises
    ------
    PydanticCustomError
        No date and time, or no zone.
    """
    if isinstance(value, str):
        try:
            value = datetime.fromisoformat(value)
        except ValueError:
            raise problem_error(f"is no date and time; write for example {_EXAMPLE}") from None
    if isinstance(value, datetime) and value.utcoffset() is None:
        raise problem_error(f"needs a time zone, for example {_EXAMPLE}")
    return value


def read_zone(value: object) -> object:
    """Name of a zone of the tz database; what is no text is left to the type to refuse.

    Raises
    ------
    PydanticCustomError
        No such zone.
    """
    if isinstance(value, str):
        try:
            ZoneInfo(value)
        except (ValueError, OSError, KeyError):
            raise problem_error(
                "is no time zone known here; write its name, for example America/Chicago"
            ) from None
    return value


Moment = Annotated[datetime, BeforeValidator(read_moment)]
ZoneName = Annotated[str, BeforeValidator(read_zone)]
