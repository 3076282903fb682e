"""SHEF messages."""

from __future__ import annotations

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.series import Series
from loads.series.shef import read_shef
from tests.series.files import FOOT, SHEF


def read(text: str, zone: str | None = None) -> list[Series]:
    return read_shef(text.encode(), zone=zone)


def test_the_three_forms() -> None:
    first, second, forecast = read_shef(SHEF)
    assert (first.gauge, len(first), second.gauge) == ("ZZZX1", 1, "ZZZX2")
    assert second.values[0] == pytest.approx(17.66 * FOOT)
    assert str(first.times[0]) == "2031-04-02T11:00:00"
    assert first.utc_offsets[0] == -300
    assert forecast.kind == "forecast"
    assert forecast.values == pytest.approx(np.array([22.4, 23.1, 23.9, 24.7, 25.4, 25.9, 26.2, 26.0]) * FOOT)
    assert (str(forecast.times[0]), str(forecast.times[-1])) == ("2031-04-02T12:00:00", "2031-04-04T06:00:00")


def test_continued_commented_and_marked() -> None:
    text = (
        ".E ZZZX1 310402 Z DC3104021410/DH18/HGIFF/DIH6\n:  READY  18Z  00Z\n"
        ".E1 : 22.4 now : / 22.4 / 23.1E/\n.E2 /M/ 24.7\n"
    )
    [series] = read(text)
    assert str(series.issued) == "2031-04-02T14:10:00"
    assert series.values == pytest.approx(np.array([22.4, 23.1, 24.7]) * FOOT)
    assert (series.times[2] - series.times[1]) == np.timedelta64(12, "h")
    assert series.qualifiers == ("E",)


@pytest.mark.parametrize(
    ("head", "when"),
    [
        ("20310402 Z DH1200", "2031-04-02T12:00:00"),
        ("20310402 CS DH06", "2031-04-02T12:00:00"),
        ("20310402 C DH24", "2031-04-03T05:00:00"),
        ("20310115 C DH06", "2031-01-15T12:00:00"),
        ("20310402 E DT203104030730", "2031-04-03T11:30:00"),
        ("20310402 MS DD0306", "2031-04-03T13:00:00"),
        ("20310402 H DH06", "2031-04-02T16:00:00"),
    ],
)
def test_dates_hours_and_zones(head: str, when: str) -> None:
    [series] = read(f".A ZZZX1 {head}/HG 22.10\n")
    assert str(series.times[0]) == when


def test_a_step_over_the_change_of_clocks_is_a_step_of_real_hours() -> None:
    [series] = read(".E ZZZX1 20310309 C DH00/HG/DIH01/1/2/3/4\n")
    assert np.diff(series.times).tolist() == [np.timedelta64(3600, "s")] * 3
    assert series.utc_offsets.tolist() == [-360, -360, -300, -300]


@pytest.mark.parametrize(
    ("text", "rule"),
    [
        (".A ZZZX1 20310402 C DH/HG 22.10", "blank DH field"),
        (".A ZZZX1 20310402 C HG 22.10", "gives no hour"),
        (".A ZZZX1 20310402 C DH06/DH07/HG 22.10", "hour more than once"),
        (".A ZZZX1 20310402 C DH06/HG 22.1/DH07/HG 22.3", "hour more than once"),
        (".A ZZZX1 20310402 C DH06/HG 22.1/HG 22.3", "gives HG twice at one hour"),
        (".A ZZZX1 20310402 C DH060/HG 22.1", "wrong length"),
        (".A ZZZX1 20310402 C DH2515/HG 22.1", "time of day that does not exist"),
        (".A ZZZX1 20310231 C DH06/HG 22.1", "date that does not exist"),
        (".A ZZZX1 0402 C DH06/HG 22.1", "without a year"),
        (".A ZZZX1 990402 C DH06/HG 22.1", "either century"),
        (".A ZZZX1 20310402 DH06/HG 22.1", "state the zone"),
        (".A ZZZX1 20310402 C DRH-3/HG 22.1", "time code DR"),
        (".A ZZZX1 20311102 C DH0130/HG 22.1", "clocks of America/Chicago change"),
        (".A ZZZX1 20310402 C DH06/HG 22,1", "neither a number nor M"),
        (".A ZZZX1 20310402 C DH06/HG", "not a code and a value"),
        (".A ZZZX1 C DH06/HG 22.1", "does not start with a station and a date"),
        (".E ZZZX1 20310402 Z DH12/HGIFF/22.4/23.1", "has no step"),
        (".E ZZZX1 20310402 Z DH12/HGIFF/DIH00/22.4/23.1", "forward step"),
        (".E ZZZX1 20310402 Z DH12/HGIFF/DIM01/22.4/23.1", "forward step"),
        (".E ZZZX1 20310402 C DH06/HGIFF/DID01/22.4/23.1", "steps by days"),
        (".E ZZZX1 20310402 Z DH12/HGIFF/DIH06/22.4//23.9", "empty field between two values"),
        (".E ZZZX1 20310402 Z DH12/HGIFF/DIH06/22.4/\n.E1 //23.9", "empty field between two values"),
        (".E1 22.4/23.1", "continues a .E message that is not there"),
        (".B ZZZ 20310402 C DH06/HG\nZZZX1 22.10\nZZZX2 17.6", "without .END"),
        (".B ZZZ 20310402 C DH06/HG\nZZZX1 22.10/3\n.END", "2 values for 1 parameters"),
        (".B ZZZ 20310402 C DH06/HG/HG\nZZZX1 22.10/3\n.END", "same parameter code twice"),
        (".B ZZZ 20310402 C DH06/HG\n.A ZZZX1 20310402 C DH06/HG 22.1\n.END", "inside a .B message"),
        (".A ZZZX1 20310402 C DH06/HP 422.10", "holds no level"),
        (".A ZZZX1 20310402 C DH06/HG -9999", "holds no level"),
        ("plain words", "holds no SHEF message"),
    ],
)
def test_what_is_refused_and_how(text: str, rule: str) -> None:
    with pytest.raises(ScenarioError, match=rule):
        read(text + "\n")


def test_the_zone_may_be_stated_beside_the_text() -> None:
    [series] = read(".A ZZZX1 20310402 DH06/HG 22.1\n", zone="America/Chicago")
    assert str(series.times[0]) == "2031-04-02T11:00:00"


def test_metric_messages_own_hours_and_other_elements() -> None:
    text = (
        ".B ZZZ 20310402 C DH06/DUS/HG/PP\n: ID  STAGE  RAIN\n"
        "ZZZX1 6.73/0.2 , ZZZX2 DH0545/5.38\nZZZX3 M/0.1\n.END\n"
    )
    first, second = read(text)
    assert (first.values[0], first.unit) == (6.73, "m")
    assert str(second.times[0]) == "2031-04-02T10:45:00"
    assert "PP (not stage) 2" in " ".join(first.notes)
    assert "ZZZX3 observed stage, observed: no data" in " ".join(first.notes)


def test_rejected_values_extremes_and_probabilities_are_not_levels() -> None:
    text = ".A ZZZX1 20310402 Z DH12/HG 22.10/HGIRGX 24.0/HGIFF5 1.0\n.A ZZZX1 20310402 Z DH13/HG 99.0R\n"
    [series] = read(text.replace("HGIFF5", "HGIFFZ5"))
    assert series.values == pytest.approx([22.10 * FOOT])
    notes = " ".join(series.notes)
    assert "marked R" in notes
    assert "an extreme" in notes
    assert "one probability of several" in notes


def test_a_quality_code_for_the_whole_message() -> None:
    first, *others = read(".A ZZZX1 20310402 Z DH12/DQQ/HG 22.10\n.A ZZZX1 20310402 Z DH13/DQB/HG 99.0\n")
    assert (len(first), first.qualifiers, others) == (1, ("Q",), [])


def test_issues_of_a_forecast_stay_apart() -> None:
    text = "".join(
        f".E ZZZX1 20310402 Z DC20310402{hour}00/DH18/HGIFF/DIH06/22.{hour}/23.{hour}\n" for hour in (10, 14)
    )
    first, second = read(text)
    assert (str(first.issued), str(second.issued)) == ("2031-04-02T10:00:00", "2031-04-02T14:00:00")
