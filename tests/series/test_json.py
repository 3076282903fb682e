"""JSON of gauges: WaterML-JSON, OGC features, forecasts."""

from __future__ import annotations

import copy
import json
from typing import Any

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.read import read_series
from tests.series.files import NWS, ogc_json, stamped, waterml_json


def nws(**changes: Any) -> bytes:
    document = copy.deepcopy(NWS)
    for path, value in changes.items():
        *parents, last = path.split("__")
        place = document
        for key in parents:
            place = place[key]
        place[last] = value
    return json.dumps(document).encode()


def test_the_mark_that_the_file_states_is_no_data() -> None:
    values = [
        stamped("22.10", "2031-04-02T06:00:00.000-05:00"),
        stamped("-123.5", "2031-04-02T06:15:00.000-05:00", "P", "Ice"),
    ]
    [series] = read_series(waterml_json(values, noDataValue=-123.5))
    assert len(series) == 1
    assert series.notes == ("Left out as no data: 1 (the file's own mark -123.5 1).",)
    assert (series.zone, series.qualifiers) == ("CDT", ("P",))


def test_zone_names_follow_the_offsets_across_a_change_of_clocks() -> None:
    values = [stamped("1", "2031-11-02T01:30:00.000-05:00"), stamped("2", "2031-11-02T01:30:00.000-06:00")]
    [series] = read_series(waterml_json(values))
    assert series.times[1] - series.times[0] == np.timedelta64(3600, "s")
    assert series.zone == "CDT/CST"


@pytest.mark.parametrize(
    ("data", "rule"),
    [
        (waterml_json([stamped("22.1", "2031-04-02T06:00:00.000")]), "state the zone"),
        (waterml_json([stamped("22.1", "2031-04-02T06:00:00Z")], unit={"unitCode": "m"}), "is not ft"),
        (waterml_json([stamped("22.1", "2031-04-02T06:00:00Z")], unit={}), "not a unit of length"),
        (waterml_json([stamped("x", "2031-04-02T06:00:00Z")]), r"timeSeries\[0\].value\[0\].value"),
        (waterml_json([stamped("-999999", "2031-04-02T06:00:00Z")]), "holds no level"),
        (waterml_json([]), "holds no level"),
        (
            waterml_json([stamped("1", "2031-04-02T06:00:00Z")], variableCode=[{"value": "72019"}]),
            "not a level read here",
        ),
        (ogc_json({"time": "2031-04-02", "value": "22.1"}), r"features\[0\].time.*no time of day"),
        (ogc_json({"time": "2031-04-02T06:00:00", "value": "22.1"}), "state the zone"),
        (ogc_json({"time": "2031-04-02T06:00:00Z", "value": "22.1", "unit_of_measure": "m"}), "is not ft"),
        (ogc_json({"time": "2031-04-02T06:00:00Z", "value": None}), "holds no level"),
        (
            ogc_json({"time": "2031-04-02T06:00:00Z", "value": "1", "statistic_id": "00003"}),
            "not levels at an instant",
        ),
    ],
)
def test_what_is_refused_and_how(data: bytes, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read_series(data)


def test_one_page_of_several_is_told() -> None:
    fact = {"time": "2031-04-02T06:00:00Z", "value": "22.1"}
    [series] = read_series(ogc_json(fact, links=[{"rel": "next", "href": "x"}]))
    assert series.notes == ("The file is one page of several; the others are not here.",)


def test_observed_and_forecast_of_one_gauge() -> None:
    observed, forecast = read_series(nws())
    assert (observed.kind, len(observed), str(observed.times[0])) == ("observed", 1, "2031-04-02T11:00:00")
    assert (forecast.kind, len(forecast), str(forecast.issued)) == ("forecast", 2, "2031-04-02T14:10:00")
    assert forecast.values == pytest.approx([23.1 * 0.3048, 23.9 * 0.3048])
    assert forecast.zone == "CST6CDT"
    assert forecast.datum is None
    assert "412.70" in forecast.notes[-1] or "412.7" in forecast.notes[-1]


def test_a_forecast_that_is_not_current_is_no_forecast() -> None:
    status = {
        "primary": -999,
        "primaryUnit": "ft",
        "floodCategory": "fcst_not_current",
        "validTime": "0001-01-01T00:00:00Z",
    }
    [observed] = read_series(nws(status__forecast=status))
    assert observed.kind == "observed"
    assert any("fcst_not_current" in note for note in observed.notes)
    [observed] = read_series(nws(status__forecast={**status, "floodCategory": ""}, forecast={}))
    assert any("-999 in its place" in note for note in observed.notes)
    both = {"observed": {**status, "floodCategory": "obs_not_current"}, "forecast": status}
    with pytest.raises(ScenarioError, match="holds no level"):
        read_series(nws(status=both))


def test_traces_with_placeholders_units_and_names() -> None:
    rows = [
        {"validTime": "2031-04-02T18:00:00Z", "primary": -999},
        {"validTime": "0001-01-01T00:00:00Z", "primary": 3.0},
        {"validTime": "2031-04-03T00:00:00Z", "primary": 23.9, "secondary": 77},
    ]
    block = {"issuedTime": "0001-01-01T00:00:00Z", "primaryName": "Stage", "primaryUnits": "ft", "data": rows}
    document = {"observed": {**block, "primaryName": "Flow", "primaryUnits": "kcfs"}, "forecast": block}
    [forecast] = read_series(json.dumps(document).encode())
    assert (len(forecast), forecast.issued) == (1, None)
    assert 'Left out as no data: 2 ("-999" 1, no time 1).' in forecast.notes
    assert "The observed trace of Flow is left out: only stage is read." in forecast.notes
    del block["primaryUnits"]
    with pytest.raises(ScenarioError, match=r"forecast\.primaryUnits is missing"):
        read_series(json.dumps({"forecast": block}).encode())
