"""Bytes to lines and to plain JSON, within bounds and without holding a second copy of a large file."""

from __future__ import annotations

import codecs
import io
import json
from collections.abc import Iterator
from typing import Any

from loads.series.refusals import THE_FILE, printable, refusal
from loads.series.stamps import UnreadableTimeError, Zone, zone_named

MOST_BYTES = 50_000_000
MOST_BYTES_JSON = 20_000_000
"""JSON is held whole while it is read, and takes several times its size."""
_LONGEST_LINE = 100_000
_CHUNK = 1 << 20


def check_size(data: bytes, most: int = MOST_BYTES) -> None:
    """Refuse what is too large.

    Raises
    ------
    ScenarioError
        More than `most` bytes.
    """
    if len(data) > most:
        raise refusal(
            THE_FILE,
            f"is {len(data) / 1e6:.1f} MB long, more than {most / 1e6:.0f} MB; cut it to the days needed",
        )


def _encoding(data: bytes) -> str:
    if data.startswith((codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)):
        return "utf-16"
    decoder = codecs.getincrementaldecoder("utf-8-sig")()
    try:
        for start in range(0, len(data), _CHUNK):
            decoder.decode(data[start : start + _CHUNK], final=start + _CHUNK >= len(data))
    except UnicodeDecodeError:
        return "latin-1"
    return "utf-8-sig"


def lines_of(data: bytes) -> Iterator[tuple[int, str]]:
    """Lines with their numbers, without their ends, blank ones left out.

    Raises
    ------
    ScenarioError
        Too large, not text, or a line longer than any table has.
    """
    check_size(data)
    stream = io.TextIOWrapper(io.BytesIO(data), encoding=_encoding(data), errors="strict", newline=None)
    number = 0
    try:
        for line in stream:
            number += 1
            if len(line) > _LONGEST_LINE or "\x00" in line:
                raise refusal(f"line {number}", "is not a line of text that a table of levels would have")
            bare = line.rstrip("\n")
            if bare.strip():
                yield number, bare
    except UnicodeDecodeError:
        raise refusal(THE_FILE, "is not text") from None


def zone_argument(zone: str | None) -> Zone | None:
    """Zone that a person stated beside the file.

    Raises
    ------
    ScenarioError
        It is not a zone.
    """
    if zone is None or not zone.strip():
        return None
    try:
        return zone_named(zone)
    except UnreadableTimeError as error:
        raise refusal("zone", str(error), zone) from None


def _no_number(_: str) -> str:
    return ""


def json_of(data: bytes) -> Any:
    """Plain JSON, its numbers left as the text they are written in.

    Raises
    ------
    ScenarioError
        Too large, nested too deeply, or not JSON.
    """
    check_size(data, MOST_BYTES_JSON)
    try:
        text = data.decode(_encoding(data))
        return json.loads(text, parse_float=str, parse_int=str, parse_constant=_no_number)
    except json.JSONDecodeError as error:
        raise refusal(f"line {error.lineno}", f"is not JSON: {error.msg}") from None
    except RecursionError:
        raise refusal(THE_FILE, "is nested too deeply to be a series") from None
    except ValueError:
        raise refusal(THE_FILE, "is not JSON text") from None


def table(value: object) -> dict[str, Any]:
    """The value if it is a table, else an empty one."""
    return value if isinstance(value, dict) else {}


def rows(value: object) -> list[Any]:
    """The value if it is a list, else an empty one."""
    return value if isinstance(value, list) else []


def scalar(value: object) -> str:
    """The value as text if it is a single one, else nothing."""
    return value if isinstance(value, str) else ""


def within(value: object, *keys: str | int) -> Any:
    """What stands at a path of keys and positions, or None."""
    for key in keys:
        if isinstance(key, str):
            value = table(value).get(key)
        else:
            items = rows(value)
            value = items[key] if len(items) > key else None
    return value


def label(value: object, longest: int = 80) -> str:
    """A name from a file, on one line, shortened, printable characters only."""
    text = " ".join(scalar(value).split())
    return printable(text[:longest])
