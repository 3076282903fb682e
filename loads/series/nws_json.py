"""Readers of JSON with forecasts: gauges of the US National Weather Service, and tide stations of NOAA."""

from __future__ import annotations

from typing import Any

from loads.series.collect import Collector, finished
from loads.series.levels import UnreadableLevelError, is_no_data, unit_named
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import KINDS, Kind, Series
from loads.series.stamps import UnreadableTimeError, Zone, read_stamp, zone_named
from loads.series.text import json_of, label, rows, scalar, table, within, zone_argument

_NOT_CURRENT = ("fcst_not_current", "obs_not_current", "no_forecast", "out_of_service")


def read_nws_json(data: bytes, *, zone: str | None = None) -> list[Series]:
    """Read the observed and forecast stage of one gauge: its status, its traces, or both.

    Parameters
    ----------
    data
        The file.
    zone
        Zone of stamps that carry no offset.

    Returns
    -------
    list of Series
        Observed, forecast, or both.

    Raises
    ------
    ScenarioError
        Not of this form, no unit, a value or time that cannot be read, or no level at all.
    """
    return nws_series(json_of(data), zone=zone)


def is_nws(document: object) -> bool:
    """Tell whether a JSON document is of the form of `read_nws_json`."""
    traces = any(isinstance(within(document, kind, "data"), list) for kind in KINDS)
    return traces or isinstance(within(document, "status"), dict)


def nws_series(document: object, *, zone: str | None = None) -> list[Series]:
    """`read_nws_json` of a document that is read already."""
    if not is_nws(document):
        raise refusal(THE_FILE, "has neither a status nor a list observed.data or forecast.data")
    faults, stated = Faults(), zone_argument(zone)
    collectors, notes = list[Collector](), list[str]()
    for kind in KINDS:
        status = within(document, "status", kind)
        category = scalar(within(status, "floodCategory")).strip().casefold()
        if category in _NOT_CURRENT:
            notes.append(f"No {kind} level: the file says {category}.")
        elif isinstance(within(document, kind, "data"), list):
            collectors += _trace(document, kind, stated, faults, notes)
        elif isinstance(status, dict):
            collectors += _status(document, kind, stated, faults, notes)
    faults.raise_any()
    zero = scalar(within(document, "datum", "elevation"))
    if zero and not is_no_data(zero):
        notes.append(f"The file gives the gauge's zero as {label(zero, 20)}, without the name of its datum.")
    return finished(collectors, notes)


def _local(document: object, block: object) -> str:
    name = scalar(within(block, "timeZone")) or scalar(within(document, "timeZone"))
    try:
        return zone_named(name).name
    except UnreadableTimeError:
        return ""


def _unit(document: object, kind: str, stated: str) -> str:
    for text in (stated, scalar(within(document, "flood", "stageUnits"))):
        if text:
            try:
                return unit_named(text)
            except UnreadableLevelError as error:
                raise refusal(f"{kind}.primaryUnits", str(error), text) from None
    raise refusal(f"{kind}.primaryUnits", "is missing; without its unit a level is not read")


def _started(document: object, kind: Kind, unit: str, block: object) -> Collector:
    gauge = label(within(document, "lid")) or label(within(document, "usgsId"))
    return Collector(
        name=f"{gauge} {kind} stage".strip(), parameter="gauge height", kind=kind, unit=unit, gauge=gauge,
        zone=_local(document, block),
    )  # fmt: skip


def _trace(
    document: object, kind: Kind, zone: Zone | None, faults: Faults, notes: list[str]
) -> list[Collector]:
    block = within(document, kind)
    name = scalar(within(block, "primaryName"))
    if name and name.strip().casefold() != "stage":
        notes.append(f"The {kind} trace of {label(name)} is left out: only stage is read.")
        return []
    unit_text = scalar(within(block, "primaryUnits")) or scalar(
        within(document, "status", kind, "primaryUnit")
    )
    collector = _started(document, kind, _unit(document, kind, unit_text), block)
    if kind == "forecast":
        collector.issued = _issued(block, zone)
    for number, row in enumerate(rows(within(block, "data"))):
        _take(collector, row, zone, faults, f"{kind}.data[{number}]")
    return [collector]


def _issued(block: object, zone: Zone | None) -> int | None:
    text = scalar(within(block, "issuedTime"))
    try:
        stamp = read_stamp(text, zone)
    except UnreadableTimeError as error:
        raise refusal("forecast.issuedTime", str(error), text) from None
    return None if stamp is None else stamp.seconds


def _status(
    document: object, kind: Kind, zone: Zone | None, faults: Faults, notes: list[str]
) -> list[Collector]:
    status = table(within(document, "status", kind))
    if is_no_data(scalar(status.get("primary"))):
        notes.append(
            f"No {kind} level: the file has {label(status.get('primary')) or 'nothing'} in its place."
        )
        return []
    collector = _started(document, kind, _unit(document, kind, scalar(status.get("primaryUnit"))), None)
    collector.notes.append(f"Only the {kind} status is given: one value.")
    _take(collector, status, zone, faults, f"status.{kind}")
    return [collector]


def _take(collector: Collector, row: object, zone: Zone | None, faults: Faults, place: str) -> None:
    facts = table(row)
    try:
        stamp = read_stamp(scalar(facts.get("validTime")), zone)
        collector.add(stamp, scalar(facts.get("primary")))
    except UnreadableTimeError as error:
        faults.add(f"{place}.validTime", str(error), scalar(facts.get("validTime")))
    except UnreadableLevelError as error:
        faults.add(f"{place}.primary", str(error), scalar(facts.get("primary")))


def is_tide(document: object) -> bool:
    """Tell whether a JSON document is of the form of `read_tide_json`."""
    return any(isinstance(within(document, key), list) for key in ("data", "predictions")) or isinstance(
        within(document, "error", "message"), str
    )


def read_tide_json(data: bytes, *, zone: str | None = None, unit: str | None = None) -> list[Series]:
    """Read water levels or tide predictions as NOAA serves them for one station.

    Parameters
    ----------
    data
        The file; it states neither zone nor unit nor datum.
    zone, unit
        Of the request that the file answers.

    Returns
    -------
    list of Series
        Observed levels, predictions, or both.

    Raises
    ------
    ScenarioError
        Not of this form, no zone or unit stated, a value or time that cannot be read, or no level at all.
    """
    return tide_series(json_of(data), zone=zone, unit=unit)


def tide_series(document: object, *, zone: str | None = None, unit: str | None = None) -> list[Series]:
    """`read_tide_json` of a document that is read already."""
    if not is_tide(document):
        raise refusal(THE_FILE, "has neither a list data nor a list predictions")
    message = scalar(within(document, "error", "message"))
    if message:
        raise refusal(THE_FILE, f"holds no levels but an error: {label(message)}")
    if not unit:
        raise refusal("unit", "is not in this file; state ft or m, as it was asked for")
    try:
        symbol = unit_named(unit)
    except UnreadableLevelError as error:
        raise refusal("unit", str(error), unit) from None
    faults, stated = Faults(), zone_argument(zone)
    gauge = label(within(document, "metadata", "id"))
    collectors = list[Collector]()
    kinds: tuple[tuple[str, Kind], ...] = (("data", "observed"), ("predictions", "forecast"))
    for key, kind in kinds:
        if not isinstance(within(document, key), list):
            continue
        collector = Collector(
            name=f"{gauge} {kind} level".strip(), parameter="water level", kind=kind, unit=symbol, gauge=gauge
        )
        for number, row in enumerate(rows(within(document, key))):
            _take_tide(collector, table(row), stated, faults, f"{key}[{number}]")
        collectors.append(collector)
    faults.raise_any()
    return finished(collectors, ["The file does not say above which datum its levels are."])


def _take_tide(
    collector: Collector, row: dict[str, Any], zone: Zone | None, faults: Faults, place: str
) -> None:
    try:
        collector.add(read_stamp(scalar(row.get("t")), zone), scalar(row.get("v")), scalar(row.get("q")))
    except UnreadableTimeError as error:
        faults.add(f"{place}.t", str(error), scalar(row.get("t")))
    except UnreadableLevelError as error:
        faults.add(f"{place}.v", str(error), scalar(row.get("v")))
