"""Tables with commas, semicolons and tabs."""

from __future__ import annotations

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.csv_table import read_csv
from loads.series.series import Series


def one(text: str, zone: str | None = None, unit: str | None = None) -> Series:
    [series] = read_csv(text.encode(), zone=zone, unit=unit)
    return series


@pytest.mark.parametrize(
    "text",
    [
        "time,stage_ft,tz\n2031-04-02 06:00,22.1,CDT\n",
        "time (CDT),stage, ft\n2031-04-02 06:00,22.1\n".replace("stage, ft", "stage ft"),
        "Datetime:UTC-05:00,gage height [feet]\n2031-04-02 06:00,22.1\n",
        "Date;Time [CDT];Level (ft)\n2031/04/02;6:00;22.1\n",
        "# made for a test\n\nstage ft\ttimestamp\n22.1\t2031-04-02T06:00:00.000-0500\n",
        "timestamp,stage [ft],temperature [degC]\n2031-04-02T11:00Z,22.1,9\n",
        "time,unit,value\n2031-04-02T11:00Z,ft,22.1\n",
    ],
)
def test_zone_and_unit_may_stand_in_headings_columns_or_times(text: str) -> None:
    series = one(text)
    assert str(series.times[0]) == "2031-04-02T11:00:00"
    assert series.values[0] == pytest.approx(22.1 * 0.3048, rel=1e-15)
    assert any("is read as time" in note for note in series.notes)


@pytest.mark.parametrize(
    ("text", "zone", "unit", "rule"),
    [
        ("time,stage [ft]\n2031-04-02 06:00,22.1\n", None, None, "state the zone"),
        ("time (local),stage [ft]\n2031-04-02 06:00,22.1\n", None, None, "state the zone"),
        ("time,stage [ft]\n2031-04-02 06:00,22.1\n", "BST", None, "can be told from others"),
        ("time,stage [ft]\n2031-04-02 06:00,22.1\n", "../../etc/passwd", None, "can be told from others"),
        ("time (UTC),stage [ft]\n2031-04-02 06:00,22.1\n", "CDT", None, "one of the two is wrong"),
        ("time,stage\n2031-04-02 06:00Z,22.1\n", None, None, "gives no unit"),
        ("time,stage [ft]\n2031-04-02 06:00Z,22.1\n", None, "m", "one of the two is wrong"),
        ("time,stage [psf]\n2031-04-02 06:00Z,22.1\n", None, None, "unit of pressure"),
        ("time,stage [cubits]\n2031-04-02 06:00Z,22.1\n", None, None, "not a unit of length"),
        ("time;stage [m]\n2031-04-02 06:00Z;3,41\n", None, None, "has a decimal comma"),
        ("time,stage [m]\n2031-04-02 06:00Z,3,41\n", None, None, "is that a decimal comma"),
        ('time,stage [m]\n2031-04-02 06:00Z,"3,41"\n', None, None, "has a decimal comma"),
        ("time;stage [mm]\n2031-04-02 06:00Z;3 412\n", None, None, "thousands separator"),
        ("time,stage [ft]\n04/02/2031 06:00Z,22.1\n", None, None, "which is the day"),
        ("time,stage [ft]\n02.04.2031 06:00Z,22.1\n", None, None, "which is the day"),
        ("time,stage [ft]\n2031-04-02 6:00 PM,22.1\n", None, None, "clock of twelve hours"),
        ("time,stage [ft]\n2031-04-02,22.1\n", None, None, "no time of day"),
        ("time,stage [ft]\n2031-02-30 06:00Z,22.1\n", None, None, "date that does not exist"),
        ("time,stage [ft]\n2031-04-02 25:00Z,22.1\n", None, None, "time of day that does not exist"),
        ("time,stage [ft]\n2031-04-02 06:00Z,22.1x\n", None, None, "is not a number"),
        ("time,stage [ft]\n2031-04-02 06:00Z,٢٢\n", None, None, "is not a number"),
        ("time,stage [ft],flag\n2031-04-02 06:00Z,22.1\n", None, None, "has 2 cells"),
        ("time,flow [cfs]\n2031-04-02 06:00Z,22.1\n", None, None, "no column that is plainly a level"),
        ("time,depth to water [ft]\n2031-04-02 06:00Z,22.1\n", None, None, "no column that is plainly"),
        ("time,precipitation [in]\n2031-04-02 06:00Z,0.1\n", None, None, "no column that is plainly"),
        ("time,stage [ft]\n2031-04-02 06:00Z,-999\n", None, None, "holds no level"),
    ],
)
def test_what_is_refused_and_how(text: str, zone: str | None, unit: str | None, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read_csv(text.encode(), zone=zone, unit=unit)


@pytest.mark.parametrize(
    ("heading", "unit", "datum", "told"),
    [
        ("elevation [ft NAVD88]", "ft", "NAVD88", False),
        ("level (m above NHN)", "m", "NHN", False),
        ("level [mAOD]", "m", "AOD", False),
        ("stage [mASD]", "m", None, False),
        ("elevation [ft]", "ft", None, True),
    ],
)
def test_a_datum_stands_behind_the_unit(heading: str, unit: str, datum: str | None, told: bool) -> None:
    series = one(f"time,{heading}\n2031-04-02 06:00Z,22.1\n")
    assert (series.unit, series.datum) == (unit, datum)
    assert any("without its datum" in note for note in series.notes) is told


def test_thresholds_and_rates_beside_a_stage_are_not_stages() -> None:
    series = one(
        "time,stage [ft],flood stage [ft],stage change [ft],sigma [ft]\n2031-04-02 06:00Z,22.1,26,0.1,0.2\n"
    )
    assert series.name == "stage"
    assert "flood stage [ft], stage change [ft]" in " ".join(series.notes)


def test_pressure_is_no_level() -> None:
    with pytest.raises(ScenarioError, match="no column that is plainly a level"):
        read_csv(b"Date/time,Pressure[cmH2O],Temperature[C]\n2031/07/04 06:00:00,1242.6,12.1\n", zone="UTC")


@pytest.mark.parametrize(
    "mark", ["-999", "-9999", "-999999", "-9999999", "−999", "-999.0", "Ice", "Eqp", "MM", "***", "", "NaN"]
)
def test_placeholders_are_no_data(mark: str) -> None:
    series = one(
        f"time,stage [ft]\n2031-04-02 06:00Z,22.1\n2031-04-02 07:00Z,{mark}\n2031-04-02 08:00Z,22.3\n"
    )
    assert len(series) == 2
    assert series.values.min() > 6.7
    assert any("Left out as no data: 1" in note for note in series.notes)


def test_year_one_is_no_time() -> None:
    series = one("time,stage [ft]\n0001-01-01T00:00:00Z,3.0\n2031-04-02 06:00Z,22.1\n")
    assert len(series) == 1
    assert series.notes[0] == "Left out as no data: 1 (no time 1)."


def test_rows_out_of_order_repeated_or_in_contradiction() -> None:
    series = one(
        "time,stage [ft]\n2031-04-02 08:00Z,3\n2031-04-02 06:00Z,1\n2031-04-02 06:00Z,1.0\n"
        "2031-04-02 07:00Z,2\n2031-04-02 07:00Z,9\n"
    )
    assert series.values == pytest.approx([0.3048, 3 * 0.3048])
    notes = " ".join(series.notes)
    assert "have been sorted" in notes
    assert "same value: 1" in notes
    assert "two different values: 1" in notes


def test_low_likely_high_and_issues_come_apart() -> None:
    rows = [
        "2031-04-02 14:00Z,2031-04-03 06:00Z,24.0,24.7,26.0",
        "2031-04-02 14:00Z,2031-04-03 12:00Z,24.5,25.4,27.0",
        "2031-04-02 20:00Z,2031-04-03 12:00Z,24.9,25.6,26.6",
    ]
    found = read_csv(("issued,time,low_ft,likely_ft,high_ft\n" + "\n".join(rows) + "\n").encode())
    assert {(s.name, str(s.issued), len(s)) for s in found} == {
        (name, f"2031-04-02T{hour}:00:00", count)
        for name in ("low", "likely", "high")
        for hour, count in ((14, 2), (20, 1))
    }
    assert {s.kind for s in found} == {"forecast"}


def test_rows_of_other_parameters_are_left_out_of_a_long_table() -> None:
    head = "monitoring_location_id,parameter_code,statistic_id,time,value,unit_of_measure,approval_status\n"
    rows = [
        "USGS-09999999,00065,00011,2031-04-02T11:00:00+00:00,22.1,ft,Provisional",
        "USGS-09999999,00060,00011,2031-04-02T11:00:00+00:00,9999,ft^3/s,Provisional",
        "USGS-09999999,62615,00003,2031-04-02,400.1,ft,Approved",
    ]
    series = one(head + "\n".join(rows) + "\n")
    assert (series.gauge, len(series), series.qualifiers) == ("USGS-09999999", 1, ("Provisional",))
    assert "left out: 2" in " ".join(series.notes)


def test_pasted_without_headings() -> None:
    series = one("2031-04-02 06:00\t22.1\n2031-04-02 07:00\t22.3\n", zone="America/Chicago", unit="ft")
    assert str(series.times[0]) == "2031-04-02T11:00:00"
    with pytest.raises(ScenarioError, match="gives no unit"):
        read_csv(b"2031-04-02 06:00Z\t22.1\n")


def test_days_on_which_clocks_change() -> None:
    spring = "time,stage [ft]\n" + "".join(
        f"2031-03-{9 if h < 24 else 10:02d} {h % 24:02d}:00,{h}\n" for h in range(25) if h != 2
    )
    series = one(spring, zone="America/Chicago")
    assert (series.times[-1] - series.times[0]) == np.timedelta64(23, "h")
    assert len(series) == 24
    assert sorted(set(series.utc_offsets.tolist())) == [-360, -300]
    for when, day in (("02:30", "2031-03-09"), ("01:30", "2031-11-02")):
        with pytest.raises(ScenarioError, match="in which the clocks of America/Chicago change"):
            read_csv(f"time,stage [ft]\n{day} {when},22.1\n".encode(), zone="America/Chicago")
    autumn = (
        "time,tz,stage [ft]\n2031-11-02 00:00,CDT,1\n2031-11-02 01:30,CDT,2\n"
        "2031-11-02 01:30,CST,3\n2031-11-03 00:00,CST,4\n"
    )
    series = one(autumn)
    assert (series.times[-1] - series.times[0]) == np.timedelta64(25, "h")
    assert series.values == pytest.approx(np.array([1, 2, 3, 4]) * 0.3048)
    assert series.zone == "CDT/CST"


def test_many_broken_rows_are_told_together_and_then_it_stops() -> None:
    rows = "".join(f"2031-04-02 06:{m:02d}Z,bad{m}\n" for m in range(60))
    with pytest.raises(ScenarioError) as error:
        read_csv(("time,stage [ft]\n" + rows).encode())
    assert [problem.path for problem in error.value.problems] == [f"line {n}" for n in range(2, 12)]
