"""Files of every format that is read, made for the tests; every gauge in them is invented."""

from __future__ import annotations

import json
from collections.abc import Iterable
from typing import Any

import numpy as np

from loads.problems import ScenarioError
from loads.series.series import Kind, Series

FOOT = 0.3048

RDB = b"""# Provisional data, subject to revision
#
agency_cd\tsite_no\tdatetime\ttz_cd\t99901_00065\t99901_00065_cd
5s\t15s\t20d\t6s\t14n\t10s
USGS\t09999999\t2031-04-02 06:00\tCDT\t22.10\tP
USGS\t09999999\t2031-04-02 06:15\tCDT\t22.13\tP
"""

SHEF = b"""RIVER FORECAST
.A ZZZX1 20310402 C DH0600/HG 22.10
.B ZZZ 20310402 C DH06/HG
ZZZX1 22.10
ZZZX2 17.66
.END
.E ZZZX1 20310402 Z DH12/HGIFF/DIH06/22.4/23.1/23.9/24.7/25.4/25.9/26.2/26.0
"""

NWS: dict[str, Any] = {
    "lid": "ZZZX1",
    "usgsId": "09999999",
    "timeZone": "CST6CDT",
    "datum": {"elevation": 412.70},
    "pedts": {"observed": "HGIRG", "forecast": "HGIFF"},
    "status": {
        "observed": {
            "primary": 22.10,
            "primaryUnit": "ft",
            "floodCategory": "minor",
            "validTime": "2031-04-02T11:00:00Z",
        },
        "forecast": {
            "primary": 26.2,
            "primaryUnit": "ft",
            "floodCategory": "moderate",
            "validTime": "2031-04-04T00:00:00Z",
        },
    },
    "flood": {"stageUnits": "ft", "categories": {"action": {"stage": 20}}},
    "forecast": {
        "issuedTime": "2031-04-02T14:10:00Z",
        "data": [
            {"validTime": "2031-04-02T18:00:00Z", "primary": 23.1},
            {"validTime": "2031-04-03T00:00:00Z", "primary": 23.9},
        ],
    },
}

_NAMESPACES = (
    'xmlns:wml2="http://www.opengis.net/waterml/2.0" xmlns:gml="http://www.opengis.net/gml/3.2" '
    'xmlns:om="http://www.opengis.net/om/2.0" xmlns:xlink="http://www.w3.org/1999/xlink" '
    'xmlns:xsi="http://www.w3.org/2001/XMLSchema-instance"'
)


def waterml2(
    points: Iterable[tuple[str, str]],
    *,
    uom: str = '<wml2:uom code="[ft_i]"/>',
    observed: str = '<om:observedProperty xlink:title="Gage height" xlink:href="urn:x#00065"/>',
    process: str = "",
    before: str = "",
) -> bytes:
    """Make a WaterML 2.0 document of pairs of time and value; a value of None text is written as nil."""
    rows = "".join(
        f"<wml2:point><wml2:MeasurementTVP><wml2:time>{time}</wml2:time>"
        + (f"<wml2:value>{value}</wml2:value>" if value else '<wml2:value xsi:nil="true"/>')
        + "</wml2:MeasurementTVP></wml2:point>"
        for time, value in points
    )
    return f"""<?xml version="1.0" encoding="UTF-8"?>{before}
<wml2:Collection {_NAMESPACES}><wml2:observationMember><om:OM_Observation>
<om:resultTime><gml:TimeInstant><gml:timePosition>2031-04-02T14:10:00Z</gml:timePosition></gml:TimeInstant>
</om:resultTime>{process}{observed}
<om:featureOfInterest xlink:href="http://example.org/sites/09999999"/>
<om:result><wml2:MeasurementTimeseries gml:id="ts1"><wml2:defaultPointMetadata>
<wml2:DefaultTVPMeasurementMetadata>{uom}<wml2:interpolationType
 xlink:href="http://www.opengis.net/def/waterml/2.0/interpolationType/Continuous"/>
</wml2:DefaultTVPMeasurementMetadata></wml2:defaultPointMetadata>{rows}</wml2:MeasurementTimeseries>
</om:result></om:OM_Observation></wml2:observationMember></wml2:Collection>""".encode()


WATERML2 = waterml2([("2031-04-02T06:00:00-05:00", "22.10"), ("2031-04-02T06:15:00-05:00", "22.13")])


def waterml_json(values: list[dict[str, Any]], **variable: Any) -> bytes:
    """Make a WaterML-JSON document of one gauge height series."""
    facts = {
        "variableCode": [{"value": "00065"}],
        "variableName": "Gage height, ft",
        "unit": {"unitCode": "ft"},
        "options": {"option": [{"name": "Statistic", "optionCode": "00000"}]},
        "noDataValue": -999999.0,
        **variable,
    }
    source = {
        "siteName": "EXAMPLE CREEK",
        "siteCode": [{"value": "09999999"}],
        "timeZoneInfo": {
            "defaultTimeZone": {"zoneOffset": "-06:00", "zoneAbbreviation": "CST"},
            "daylightSavingsTimeZone": {"zoneOffset": "-05:00", "zoneAbbreviation": "CDT"},
        },
    }
    member = {"sourceInfo": source, "variable": facts, "values": [{"value": values, "method": []}]}
    return json.dumps({"name": "ns1:timeSeriesResponseType", "value": {"timeSeries": [member]}}).encode()


def stamped(value: str, time: str, *qualifiers: str) -> dict[str, Any]:
    """One value of a WaterML-JSON series."""
    return {"value": value, "qualifiers": list(qualifiers or ("P",)), "dateTime": time}


def ogc_json(*facts: dict[str, Any], **more: Any) -> bytes:
    """Make GeoJSON of features of one time series of gauge heights."""
    usual = {
        "approval_status": "Provisional",
        "monitoring_location_id": "USGS-09999999",
        "parameter_code": "00065",
        "qualifier": None,
        "statistic_id": "00011",
        "time_series_id": "t1",
        "unit_of_measure": "ft",
    }
    features = [{"type": "Feature", "geometry": None, "properties": {**usual, **one}} for one in facts]
    return json.dumps({"type": "FeatureCollection", "features": features, **more}).encode()


OGC = ogc_json(
    {"time": "2031-04-02T11:00:00+00:00", "value": "22.10"},
    {"time": "2031-04-02T11:15:00+00:00", "value": "22.13"},
)
CSV = b"time,stage [ft]\n2031-04-02 06:00-05:00,22.10\n2031-04-02 06:15-05:00,22.13\n"
TIDE = json.dumps(
    {
        "metadata": {"id": "9990000"},
        "data": [{"t": "2031-04-02 11:00", "v": "22.10"}, {"t": "2031-04-02 11:15", "v": "22.13"}],
    }
).encode()


def problem(error: ScenarioError) -> str:
    """What a person reads."""
    return str(error)


def trace(
    start: str,
    step_minutes: float,
    feet: Iterable[float],
    *,
    kind: Kind = "observed",
    issued: str | None = None,
    name: str = "trace",
) -> Series:
    """A series of readings in feet at even steps from a UTC instant."""
    values = np.array(list(feet), dtype=np.float64) * FOOT
    first = np.datetime64(start, "s").astype(np.int64)
    times = (first + np.arange(len(values)) * round(60 * step_minutes)).astype("datetime64[s]")
    return Series(
        name=name,
        parameter="gauge height",
        kind=kind,
        times=times,
        utc_offsets=np.zeros(len(values), dtype=np.int16),
        zone="UTC",
        values=values,
        unit="ft",
        issued=None if issued is None else np.datetime64(issued, "s"),
        gauge="ZZZX1",
    )
