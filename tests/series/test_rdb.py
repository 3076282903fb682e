"""RDB, the tables of the US Geological Survey."""

from __future__ import annotations

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.rdb import read_rdb
from tests.series.files import RDB

HEAD = "agency_cd\tsite_no\tdatetime\ttz_cd\t99901_00065\t99901_00065_cd\n5s\t15s\t20d\t6s\t14n\t10s\n"


def row(time: str, value: str, zone: str = "CDT", code: str = "P") -> str:
    return f"USGS\t09999999\t{time}\t{zone}\t{value}\t{code}\n"


def test_what_the_file_says_is_kept() -> None:
    [series] = read_rdb(RDB)
    assert (series.gauge, series.parameter, series.zone) == ("09999999", "gauge height", "CDT")
    assert (series.qualifiers, series.datum, series.issued) == (("P",), None, None)
    assert series.utc_offsets.tolist() == [-300, -300]


def test_marks_in_the_value_are_no_data() -> None:
    text = HEAD + row("2031-01-02 06:00", "22.10", code="P:e") + row("2031-01-02 06:15", "Ice", code="P")
    text += (
        row("2031-01-02 06:30", "Eqp") + row("2031-01-02 06:45", "***") + row("2031-01-02 07:00", "-999999")
    )
    [series] = read_rdb((text + row("2031-01-02 07:15", "")).encode())
    assert len(series) == 1
    assert series.qualifiers == ("P:e",)
    assert series.notes == ('Left out as no data: 5 ("Ice" 1, "Eqp" 1, "***" 1, "-999999" 1, empty 1).',)


def test_the_hour_that_comes_twice_is_two_hours() -> None:
    text = HEAD + row("2031-11-02 01:30", "1.00", "CDT") + row("2031-11-02 01:30", "2.00", "CST")
    [series] = read_rdb(text.encode())
    assert series.times[1] - series.times[0] == np.timedelta64(3600, "s")


def test_several_tables_sites_and_sensors() -> None:
    second = (
        "#\nagency_cd\tsite_no\tdatetime\ttz_cd\t1_00065\t1_00065_cd\t2_00065\t2_00065_cd\t3_63160\t3_63160_cd\t4_00060\t"
        "4_00060_cd\t5_00065_00003\t5_00065_00003_cd\n" + "\t".join(["5s"] * 14) + "\n"
        "USGS\t09999998\t2031-04-02 06:00\tEST\t1.0\tA\t2.0\tA\t400.5\tA\t9000\tA\t1.5\tA\n"
    )
    found = {series.name: series for series in read_rdb(RDB + second.encode())}
    assert sorted(found) == [
        "09999998 gauge height (1)",
        "09999998 gauge height (2)",
        "09999998 stream water elevation",
        "09999999 gauge height",
    ]
    assert found["09999998 stream water elevation"].datum == "NAVD88"
    assert "4_00060, 5_00065_00003" in found["09999999 gauge height"].notes[-1]


@pytest.mark.parametrize(
    ("text", "rule"),
    [
        (HEAD + row("2031-04-02 06:00", "22.10", "XYZ"), "can be told from others"),
        (HEAD + row("2031-04-02 06:00", "22.10", ""), "state the zone"),
        (HEAD + row("2031-04-02", "22.10"), "no time of day"),
        (HEAD + row("2031-04-02 06:00", "22,10"), "decimal comma"),
        (
            HEAD + "USGS\t09999999\t2031-04-02 06:15\tCDT\t22.1",
            "has 5 columns where the header has 6; is the file cut",
        ),
        (HEAD.replace("5s\t15s", "5s\tx"), "row of column widths"),
        (HEAD.replace("datetime", "peak_dt"), "annual peaks"),
        (HEAD.replace("00065", "00060") + row("2031-04-02 06:00", "900"), "holds no level"),
        (HEAD, "holds no level"),
        ("# nothing\n", "no RDB table"),
        ("", "no RDB table"),
    ],
)
def test_what_is_refused_and_how(text: str, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read_rdb(text.encode())


def test_a_stated_unit_must_be_that_of_the_code() -> None:
    assert len(read_rdb(RDB, unit="ft")) == 1
    with pytest.raises(ScenarioError, match="is not the unit of gauge height"):
        read_rdb(RDB, unit="m")
