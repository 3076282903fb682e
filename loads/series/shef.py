"""Reader of SHEF messages .A, .B and .E: observed and forecast stage."""

from __future__ import annotations

import re
from collections import Counter
from dataclasses import dataclass

from loads.series.collect import MOST_SERIES, Collector, finished
from loads.series.levels import UnreadableLevelError
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import Series
from loads.series.shef_fields import (
    ZONES,
    Clock,
    Code,
    UnreadableFieldError,
    code_of,
    created_at,
    date_of,
    interval_of,
    value_of,
    zone_of,
)
from loads.series.shef_messages import Message, Splitter
from loads.series.stamps import Stamp, UnreadableTimeError, Zone
from loads.series.text import label, lines_of, zone_argument

_HEAD = re.compile(r"(\S{3,8})\s+(\d{4}|\d{6}|\d{8})(?=[\s/]|$)\s*(.*)", re.ASCII)
_ZONE = re.compile(r"([A-Z]{1,2})(?=[\s/]|$)\s*(.*)", re.ASCII)
_TIME_CODE = re.compile(r"(D[A-Z])([A-Z]?[+-]?\d*)(?=[\s/]|$)\s*(.*)", re.ASCII)
_ELEMENT = re.compile(r"([A-Z]{2}[A-Z0-9]{0,5})(?:\s+(.*))?", re.ASCII)
_STATION = re.compile(r"(\S{3,8})\s+(.*)", re.ASCII)


@dataclass(kw_only=True)
class _Head:
    """What the fields before the values said."""

    station: str
    clock: Clock
    unit: str = "ft"
    issued: int | None = None
    step: int | None = None
    qualifier: str = ""


class _Reader:
    """Messages to series."""

    def __init__(self, zone: Zone | None) -> None:
        self.zone = zone
        self.faults = Faults()
        self.collectors: dict[tuple[object, ...], Collector] = {}
        self.left_out: Counter[str] = Counter()

    def message(self, message: Message) -> None:
        try:
            head, fields = self._head(message.text)
            {"A": self._one, "B": self._many, "E": self._even}[message.form](message, head, fields)
        except (UnreadableFieldError, UnreadableTimeError, UnreadableLevelError) as error:
            self.faults.add(f"line {message.line}", str(error), message.text)

    def _head(self, text: str) -> tuple[_Head, list[str]]:
        match = _HEAD.fullmatch(text)
        if not match:
            raise UnreadableFieldError("does not start with a station and a date such as ZZZX1 20310402")
        station, date, rest = match.groups()
        code = ""
        zone = _ZONE.fullmatch(rest)
        if zone and zone[1] in ZONES:
            code, rest = zone.groups()
        head = _Head(station=station, clock=Clock(date_of(date), zone_of(code, self.zone)))
        fields = [part.strip() for part in rest.strip().removeprefix("/").removesuffix("/").split("/")]
        left = [remaining for part in fields if (remaining := self._codes(part, head)) is not None]
        return head, left

    def _codes(self, part: str, head: _Head) -> str | None:
        """Take the date and time codes off a field; None when nothing else was in it."""
        had_code = False
        while match := _TIME_CODE.fullmatch(part):
            had_code = True
            code, value, part = match.groups()
            if code == "DC":
                head.issued = created_at(value, head.clock.zone)
            elif code == "DU":
                if value not in ("E", "S"):
                    raise UnreadableFieldError("has a DU field other than DUE and DUS")
                head.unit = "m" if value == "S" else "ft"
            elif code == "DI":
                if head.step is not None:
                    raise UnreadableFieldError("gives its step DI more than once")
                head.step = interval_of(value, head.clock.zone)
            elif code == "DQ":
                head.qualifier = value
            elif code != "DV":
                head.clock.set(code, value)
        return None if had_code and not part else part

    def _one(self, message: Message, head: _Head, fields: list[str]) -> None:
        stamp = head.clock.stamp()
        seen: set[str] = set()
        for part in fields:
            match = _ELEMENT.fullmatch(part)
            if not match or match[2] is None:
                raise UnreadableFieldError(f"has the field {label(part)!r}, which is not a code and a value")
            code = code_of(match[1])
            if code.text in seen and code.kind:
                raise UnreadableFieldError(f"gives {code.text} twice at one hour")
            seen.add(code.text)
            self._take(code, head, stamp, match[2], message)

    def _even(self, message: Message, head: _Head, fields: list[str]) -> None:
        stamp = head.clock.stamp()
        if not fields or not (match := _ELEMENT.fullmatch(fields[0])):
            raise UnreadableFieldError("has no parameter code such as HGIFF before its values")
        if head.step is None:
            raise UnreadableFieldError("has no step such as DIH06 between its values")
        code = code_of(match[1])
        values = ([match[2]] if match[2] else []) + fields[1:]
        for index, text in enumerate(values):
            if not text:
                raise UnreadableFieldError(
                    "has an empty field between two values: was a step passed, or a value forgotten? Write M"
                )
            seconds = stamp.seconds + index * head.step
            moment = Stamp(seconds, head.clock.zone.offset_at(seconds), stamp.zone)
            self._take(code, head, moment, text, message)

    def _many(self, message: Message, head: _Head, fields: list[str]) -> None:
        codes = []
        for part in fields:
            if not re.fullmatch(r"[A-Z]{2}[A-Z0-9]{0,5}", part, re.ASCII):
                raise UnreadableFieldError(
                    f"has {label(part)!r} in its header, which is not a parameter code"
                )
            codes.append(code_of(part))
        if not codes:
            raise UnreadableFieldError("has no parameter code such as HG in its header")
        if len({code.text for code in codes}) != len(codes):
            raise UnreadableFieldError("has the same parameter code twice in its header")
        for number, line in message.body:
            for report in line.split(","):
                if report.strip():
                    self._report(number, report.strip(), head, codes, message)

    def _report(self, number: int, report: str, head: _Head, codes: list[Code], message: Message) -> None:
        try:
            match = _matched(_STATION, report, "is not a station and its values")
            own = _Head(station=match[1], clock=Clock((0, 0, 0), head.clock.zone), unit=head.unit)
            own.clock.parts = list(head.clock.parts)
            own.issued, own.qualifier = head.issued, head.qualifier
            values = [
                left for part in match[2].split("/") if (left := self._codes(part.strip(), own)) is not None
            ]
            stamp = own.clock.stamp()
            for code, text in _paired(codes, values):
                self._take(code, own, stamp, text, message)
        except (UnreadableFieldError, UnreadableTimeError, UnreadableLevelError) as error:
            self.faults.add(f"line {number}", str(error), report)

    def _take(self, code: Code, head: _Head, stamp: Stamp, text: str, message: Message) -> None:
        if code.kind is None:
            self.left_out[f"{code.text} ({code.reason})"] += 1
            return
        own = message.line if code.kind == "forecast" and message.form == "E" else 0
        issued = head.issued if code.kind == "forecast" else None
        station = label(head.station)
        key = (station, code.text, issued, head.unit, own)
        if key not in self.collectors:
            if len(self.collectors) >= MOST_SERIES:
                raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
            made = Collector(
                name=f"{station} {code.kind} stage", parameter="gauge height", kind=code.kind, unit=head.unit,
                gauge=station, issued=issued,
            )  # fmt: skip
            if message.revised:
                made.notes.append("The message revises an earlier one.")
            self.collectors[key] = made
        number, qualifier, missing = value_of(text, head.qualifier)
        if missing:
            self.collectors[key].drop(label(missing))
        else:
            self.collectors[key].add(stamp, number, qualifier)


def _matched(pattern: re.Pattern[str], text: str, rule: str) -> re.Match[str]:
    match = pattern.fullmatch(text)
    if not match:
        raise UnreadableFieldError(rule)
    return match


def _paired(codes: list[Code], values: list[str]) -> list[tuple[Code, str]]:
    if len(values) > len(codes):
        raise UnreadableFieldError(f"has {len(values)} values for {len(codes)} parameters")
    return list(zip(codes, values, strict=False))


def read_shef(data: bytes, *, zone: str | None = None) -> list[Series]:
    """Read stage from SHEF text; whatever stands around the messages is passed.

    Parameters
    ----------
    data
        The text, as sent or as pasted.
    zone
        Zone of messages that carry no zone code.

    Returns
    -------
    list of Series
        Observed stage by station; forecast stage by station and message.

    Raises
    ------
    ScenarioError
        A message that cannot be read with certainty, or no stage at all.
    """
    splitter = Splitter()
    for number, line in lines_of(data):
        splitter.line(number, line)
    if splitter.open is not None:
        raise refusal(f"line {splitter.open.line}", "starts a .B message without .END; is the text cut off?")
    if not splitter.messages:
        raise refusal(THE_FILE, "holds no SHEF message .A, .B or .E")
    reader = _Reader(zone_argument(zone))
    for message in splitter.messages:
        reader.message(message)
    reader.faults.raise_any()
    notes = []
    if reader.left_out:
        names = ", ".join(f"{name} {count}" for name, count in reader.left_out.most_common(8))
        notes.append(f"Left out: {names}. Only stage (HG) is read.")
    if splitter.texts:
        notes.append(f"Lines that are not SHEF are left out: {splitter.texts}.")
    return finished(reader.collectors.values(), notes)
