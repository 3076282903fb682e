"""WaterML 2.0, by hand and against an independent reader."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.waterml2 import read_waterml2
from tests.series.files import WATERML2, waterml2

TWO = [("2031-04-02T06:00:00-05:00", "22.10"), ("2031-04-02T06:15:00-05:00", "22.13")]


def test_what_the_file_says_is_kept() -> None:
    [series] = read_waterml2(WATERML2)
    assert (series.gauge, series.parameter, series.unit) == ("09999999", "gauge height", "ft")
    assert (series.zone, series.kind, series.issued) == ("UTC-05:00", "observed", None)


def test_a_forecast_has_its_time_of_issue() -> None:
    process = '<wml2:processType xlink:href="http://www.opengis.net/def/waterml/2.0/processType/Simulation"/>'
    [series] = read_waterml2(waterml2(TWO, process=process))
    assert (series.kind, str(series.issued)) == ("forecast", "2031-04-02T14:10:00")


def test_nil_and_placeholders_are_no_data() -> None:
    [series] = read_waterml2(
        waterml2([*TWO, ("2031-04-02T06:30:00-05:00", ""), ("2031-04-02T07:00:00-05:00", "-9999")])
    )
    assert len(series) == 2
    assert series.notes[0] == 'Left out as no data: 2 (empty 1, "-9999" 1).'


def test_zone_and_unit_are_asked_for() -> None:
    bare = [("2031-04-02T06:00:00", "22.10")]
    with pytest.raises(ScenarioError, match="state the zone"):
        read_waterml2(waterml2(bare))
    [series] = read_waterml2(waterml2(bare), zone="CDT")
    assert str(series.times[0]) == "2031-04-02T11:00:00"
    with pytest.raises(ScenarioError, match="uom is missing"):
        read_waterml2(waterml2(TWO, uom="", observed=""))
    [series] = read_waterml2(waterml2(TWO, uom="", observed=""), unit="m")
    assert series.values[0] == 22.10
    assert "does not name what was observed" in series.notes[0]
    with pytest.raises(ScenarioError, match="is not that of the file, ft"):
        read_waterml2(WATERML2, unit="m")


@pytest.mark.parametrize(
    ("data", "rule"),
    [
        (waterml2(TWO, before='<!DOCTYPE x [<!ENTITY a "1">]>'), "document type"),
        (waterml2(TWO, before='<!DOCTYPE x SYSTEM "http://example.org/x.dtd">'), "document type"),
        (waterml2([("2031-04-02T06:00:00-05:00", "&a;")]), "not well-formed|undefined entity"),
        (waterml2([("2031-04-02T06:00:00-05:00", "22<b/>.10")]), "has an element inside it"),
        (waterml2([("2031-04-02T06:00:00-05:00", "22.10</wml2:value><wml2:value>2")]), "is given twice"),
        (waterml2([("2031-04-02T06:00:00-05:00", "22,10")]), "decimal comma"),
        (waterml2([("2031-04-02T06:00:00-05:00", "1" * 20_000)]), "longer text"),
        (waterml2(TWO, uom='<wml2:uom code="[ft_us]"/>'), "not a unit of length known here"),
        (waterml2(TWO, uom='<wml2:uom code="m3/s"/>', observed=""), "a level is in ft, in, m"),
        (waterml2(TWO, uom='<wml2:uom code="m"/>'), "is not ft, the unit of its parameter code"),
        (waterml2(TWO, observed='<om:observedProperty xlink:href="urn:x#00060"/>'), "not a level read here"),
        (WATERML2[:-200], "not well-formed"),
        (WATERML2[:900], "not well-formed"),
        (b"<a>" * 100 + b"</a>" * 100, "nested too deeply"),
        (WATERML2.replace(b"UTF-8", b"no-such"), "encoding|not well-formed"),
        (
            WATERML2.replace(b"interpolationType/Continuous", b"interpolationType/AverageSucc"),
            "interval of time",
        ),
    ],
)
def test_what_is_refused_and_how(data: bytes, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read_waterml2(data)


def test_a_comment_inside_a_value_changes_nothing() -> None:
    [series] = read_waterml2(waterml2([("2031-04-02T06:00:00-05:00", "22<!-- x -->.10")]))
    assert series.values[0] == pytest.approx(22.10 * 0.3048)


def test_agrees_with_an_independent_reader(tmp_path: Path) -> None:
    waterml = pytest.importorskip("owslib.swe.observation.waterml2", reason="OWSLib is not installed")
    etree = pytest.importorskip("owslib.etree", reason="OWSLib is not installed").etree
    points = [
        (f"2031-04-{d:02d}T{h:02d}:00:00-05:00", f"{20 + d / 7 + h / 24:.2f}")
        for d in range(1, 9)
        for h in range(24)
    ]
    data = waterml2(points)
    [series] = read_waterml2(data)
    element = etree.fromstring(data).find(".//{http://www.opengis.net/waterml/2.0}MeasurementTimeseries")
    theirs = waterml.MeasurementTimeseries(element)
    pairs = [(point.datetime, float(point.value)) for point in theirs]
    assert theirs.defaultTVPMetadata.uom == "[ft_i]"
    assert len(pairs) == len(series) == 192
    assert series.values == pytest.approx([value * 0.3048 for _, value in pairs], rel=1e-15)
    stamps = [np.datetime64(int(when.timestamp()), "s") for when, _ in pairs]
    assert np.array_equal(series.times, np.array(stamps))
