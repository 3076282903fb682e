"""Readers of the JSON of the US Geological Survey: WaterML-JSON 1.1 and the OGC API's features."""

from __future__ import annotations

import html
from typing import Any

from loads.series.collect import MOST_SERIES, Collector, finished
from loads.series.levels import (
    INSTANTANEOUS,
    PARAMETERS,
    UnreadableLevelError,
    read_level,
    unit_named,
)
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import Series
from loads.series.stamps import UnreadableTimeError, Zone, offset_name, read_stamp, zone_named
from loads.series.text import json_of, label, rows, scalar, table, within, zone_argument


def read_waterml_json(data: bytes, *, zone: str | None = None) -> list[Series]:
    """Read observed levels from WaterML 1.1 written as JSON.

    Parameters
    ----------
    data
        The file.
    zone
        Zone of stamps that carry no offset.

    Returns
    -------
    list of Series
        One for each site, level parameter and method.

    Raises
    ------
    ScenarioError
        Not of this form, a value or time that cannot be read, or no level at all.
    """
    return waterml_series(json_of(data), zone=zone)


def is_waterml(document: object) -> bool:
    """Tell whether a JSON document is of the form of `read_waterml_json`."""
    return isinstance(within(document, "value", "timeSeries"), list) or isinstance(
        within(document, "timeSeries"), list
    )


def waterml_series(document: object, *, zone: str | None = None) -> list[Series]:
    """`read_waterml_json` of a document that is read already."""
    if not is_waterml(document):
        raise refusal(THE_FILE, "has no list timeSeries")
    inner = within(document, "value") or document
    members = rows(within(inner, "timeSeries"))
    faults, collectors = Faults(), list[Collector]()
    left_out: dict[str, None] = {}
    for number, member in enumerate(members):
        variable = table(within(member, "variable"))
        reason = _not_a_level(variable)
        if reason:
            left_out[reason] = None
            continue
        for block in rows(within(member, "values")):
            if len(collectors) >= MOST_SERIES:
                raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
            collectors.append(
                _waterml_block(member, block, zone_argument(zone), faults, f"timeSeries[{number}]")
            )
    faults.raise_any()
    return finished(collectors, [f"Left out: {reason}." for reason in list(left_out)[:8]])


def _not_a_level(variable: dict[str, Any]) -> str:
    code = scalar(within(variable, "variableCode", 0, "value"))
    name = label(html.unescape(scalar(variable.get("variableName")))) or f"parameter {label(code)}"
    if code not in PARAMETERS:
        return f"{name}, which is not a level read here"
    statistic = scalar(within(variable, "options", "option", 0, "optionCode"))
    if statistic not in INSTANTANEOUS:
        return f"{name} with statistic {label(statistic)}, which holds for a day and not at an instant"
    return ""


def _waterml_block(member: object, block: object, zone: Zone | None, faults: Faults, where: str) -> Collector:
    variable, source = within(member, "variable"), within(member, "sourceInfo")
    parameter = PARAMETERS[scalar(within(variable, "variableCode", 0, "value"))]
    try:
        unit = unit_named(scalar(within(variable, "unit", "unitCode")))
    except UnreadableLevelError as error:
        raise refusal(
            f"{where}.variable.unit", str(error), scalar(within(variable, "unit", "unitCode"))
        ) from None
    if unit != parameter.unit:
        raise refusal(
            f"{where}.variable.unit", f"is not {parameter.unit}, the unit of its parameter code", unit
        )
    gauge = label(within(source, "siteCode", 0, "value"))
    method = label(within(block, "method", 0, "methodDescription"))
    collector = Collector(
        name=f"{gauge} {parameter.name}{f' ({method})' if method else ''}".strip(), parameter=parameter.name,
        kind="observed", unit=unit, gauge=gauge, datum=parameter.datum,
    )  # fmt: skip
    missing = _number(scalar(within(variable, "noDataValue")))
    names = _zone_names(source)
    for number, row in enumerate(rows(within(block, "value"))):
        text = scalar(within(row, "value"))
        codes = ",".join(scalar(code) for code in rows(within(row, "qualifiers")))
        place = f"{where}.value[{number}]"
        try:
            stamp = read_stamp(scalar(within(row, "dateTime")), zone)
            if stamp is not None:
                stamp = stamp._replace(zone=names.get(stamp.offset, stamp.zone))
            if missing is not None and _number(text) == missing:
                collector.drop(f"the file's own mark {label(text)}")
            else:
                collector.add(stamp, text, codes)
        except UnreadableTimeError as error:
            faults.add(f"{place}.dateTime", str(error), scalar(within(row, "dateTime")))
        except UnreadableLevelError as error:
            faults.add(f"{place}.value", str(error), text)
    return collector


def _number(text: str) -> float | None:
    try:
        return read_level(text) if not text.strip().startswith("-9") else float(text)
    except ValueError:
        return None


def _zone_names(source: object) -> dict[int, str]:
    """Names of the site's two zones by their offsets in minutes, as far as the file states them."""
    names = {}
    for which in ("defaultTimeZone", "daylightSavingsTimeZone"):
        stated = within(source, "timeZoneInfo", which)
        name = label(within(stated, "zoneAbbreviation"), 12)
        try:
            minutes = zone_named(scalar(within(stated, "zoneOffset"))).minutes
            agrees = zone_named(name).minutes == minutes
        except UnreadableTimeError:
            continue
        names[minutes] = name if agrees else offset_name(minutes)
    return names


def read_ogc_json(data: bytes, *, zone: str | None = None) -> list[Series]:
    """Read observed levels from the GeoJSON features of the OGC API.

    Parameters
    ----------
    data
        The file.
    zone
        Zone of stamps that carry no offset.

    Returns
    -------
    list of Series
        One for each time series.

    Raises
    ------
    ScenarioError
        Not of this form, a value or time that cannot be read, or no level at all.
    """
    return ogc_series(json_of(data), zone=zone)


def is_ogc(document: object) -> bool:
    """Tell whether a JSON document is of the form of `read_ogc_json`."""
    return isinstance(within(document, "features"), list)


def ogc_series(document: object, *, zone: str | None = None) -> list[Series]:
    """`read_ogc_json` of a document that is read already."""
    if not is_ogc(document):
        raise refusal(THE_FILE, "has no list features")
    faults, collectors = Faults(), dict[tuple[str, ...], Collector]()
    stated = zone_argument(zone)
    others = 0
    for number, feature in enumerate(rows(within(document, "features"))):
        facts = table(within(feature, "properties"))
        if not _is_instant_level(facts):
            others += 1
            continue
        place = f"features[{number}]"
        try:
            collector = _ogc_collector(facts, collectors, place)
            stamp = read_stamp(scalar(facts.get("time")), stated)
            collector.add(stamp, scalar(facts.get("value")), _ogc_qualifier(facts))
        except UnreadableTimeError as error:
            faults.add(f"{place}.time", str(error), scalar(facts.get("time")))
        except UnreadableLevelError as error:
            faults.add(f"{place}.value", str(error), scalar(facts.get("value")))
    faults.raise_any()
    notes = [f"Features that are not levels at an instant are left out: {others}."] if others else []
    if any(table(link).get("rel") == "next" for link in rows(within(document, "links"))):
        notes.append("The file is one page of several; the others are not here.")
    return finished(collectors.values(), notes)


def _is_instant_level(facts: dict[str, Any]) -> bool:
    statistic = scalar(facts.get("statistic_id"))
    return (
        scalar(facts.get("parameter_code")) in PARAMETERS
        and statistic in INSTANTANEOUS
        and "value" in facts
        and not facts.get("time_of_day")
    )


def _ogc_qualifier(facts: dict[str, Any]) -> str:
    given = facts.get("qualifier")
    codes = [scalar(code) for code in given] if isinstance(given, list) else [scalar(given)]
    return ", ".join(code for code in [scalar(facts.get("approval_status")), *codes] if code)


def _ogc_collector(
    facts: dict[str, Any], collectors: dict[tuple[str, ...], Collector], place: str
) -> Collector:
    parameter = PARAMETERS[scalar(facts.get("parameter_code"))]
    gauge = label(facts.get("monitoring_location_id"))
    key = (gauge, scalar(facts.get("time_series_id")), scalar(facts.get("parameter_code")))
    stated = scalar(facts.get("unit_of_measure"))
    try:
        unit = unit_named(stated)
    except UnreadableLevelError as error:
        raise refusal(f"{place}.unit_of_measure", str(error), stated) from None
    if key not in collectors:
        if len(collectors) >= MOST_SERIES:
            raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
        collectors[key] = Collector(
            name=f"{gauge} {parameter.name}".strip(), parameter=parameter.name, kind="observed", unit=unit,
            gauge=gauge, datum=parameter.datum,
        )  # fmt: skip
    if unit != parameter.unit:
        raise refusal(
            f"{place}.unit_of_measure", f"is not {parameter.unit}, the unit of its parameter code", unit
        )
    return collectors[key]
