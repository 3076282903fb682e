"""The same two readings, 22.10 and 22.13 ft at 11:00 and 11:15 UTC, come out of every format the same."""

from __future__ import annotations

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.read import format_of, read_series
from tests.series import files

TIMES = np.array(["2031-04-02T11:00:00", "2031-04-02T11:15:00"], dtype="datetime64[s]")
SHEF_TWO = b".A ZZZX1 20310402 C DH0600/HG 22.10\n.A ZZZX1 20310402 CD DH0615/HGIRG 22.13\n"


@pytest.mark.parametrize(
    ("data", "form"),
    [
        (files.CSV, "CSV"),
        (files.CSV.replace(b",", b";"), "CSV"),
        (files.CSV.replace(b",", b"\t"), "CSV"),
        (files.CSV.replace(b"\n", b"\r\n"), "CSV"),
        (files.CSV.replace(b"\n", b"\r\r\n"), "CSV"),
        (b"\xef\xbb\xbf" + files.CSV, "CSV"),
        (files.CSV.decode().encode("utf-16"), "CSV"),
        (files.CSV.replace(b"22.1", b"\t22.1").replace(b"stage", b"Wasserst\xe4nde level"), "CSV"),
        (files.RDB, "RDB"),
        (files.RDB.replace(b"\n", b"\r\n"), "RDB"),
        (files.WATERML2, "WATERML2"),
        (files.OGC, "JSON"),
        (b".E ZZZX1 20310402 C DH0600/HGIRG/DIN15/22.10/22.13\n", "SHEF"),
        (
            files.waterml_json(
                [
                    files.stamped("22.10", "2031-04-02T06:00:00.000-05:00"),
                    files.stamped("22.13", "2031-04-02T06:15:00.000-05:00"),
                ]
            ),
            "JSON",
        ),
    ],
)
def test_two_readings(data: bytes, form: str) -> None:
    [series] = read_series(data)
    assert format_of(data).replace("WaterML 2.0", "WATERML2") == form
    assert np.array_equal(series.times, TIMES)
    assert series.values == pytest.approx([22.10 * 0.3048, 22.13 * 0.3048], rel=1e-15)
    assert (series.unit, series.kind, series.datum) == ("ft", "observed", None)


def test_tide_stations_state_neither_zone_nor_unit() -> None:
    with pytest.raises(ScenarioError, match="unit is not in this file"):
        read_series(files.TIDE, zone="UTC")
    with pytest.raises(ScenarioError, match="has times without a zone"):
        read_series(files.TIDE, unit="ft")
    [series] = read_series(files.TIDE, zone="UTC", unit="ft")
    assert np.array_equal(series.times, TIMES)
    assert "datum" in series.notes[-1]
    with pytest.raises(ScenarioError, match="an error: No data was found"):
        read_series(b'{"error": {"message": "No data was found"}}', zone="UTC", unit="ft")


@pytest.mark.parametrize(
    ("data", "rule"),
    [
        (b"", "is empty"),
        (b"  \n", "is empty"),
        (b"<html><body>404</body></html>", "no element MeasurementTimeseries"),
        (b"<!DOCTYPE html><html></html>", "document type"),
        (b"{}", "none of the forms"),
        (b"[1, 2]", "none of the forms"),
        (b'{"a": ', "is not JSON"),
        (b"[" * 100_000, "nested too deeply"),
        (b"\x89PNG\r\n\x1a\n\x00\x00\x00", "is not a line of text"),
        (b"hello there", "has no row of headings"),
    ],
)
def test_what_is_no_series(data: bytes, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read_series(data)


def test_what_is_too_large_is_not_begun() -> None:
    with pytest.raises(ScenarioError, match="more than 50 MB"):
        read_series(b"a" * 50_000_001)
    with pytest.raises(ScenarioError, match="more than 20 MB"):
        read_series(b"[" + b" " * 20_000_001 + b"]")
