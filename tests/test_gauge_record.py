"""Gauges and transfers as typed: what is read, and the sentence for everything that is refused."""

from __future__ import annotations

import copy
from typing import Any

import numpy as np
import pytest

from loads.gauge_conversion import as_readings, conversion
from loads.problems import ScenarioError
from loads.records.gauge import Gauge, Transfer, gauge_problems
from tests.clock_cases import DATUM, FOOT, GAUGE, gauge, gauge_of, rules, series

TOML = """
[[gauge]]
id = "G1"
name = "Mill Landing"
number = "09999999"
zero = { value = "412.70 ft", source = "levelling", date = 2029-10-11 }
datum = "NGVD29"
datum_shift = { value = "0.34 ft", low = "0.2 ft", high = "0.5 ft", source = "grid", date = 2030-01-15 }
lowest_true_reading = "2 ft"
highest_true_reading = "31.0 ft"
lowest_on_record = "4.1 ft"
highest_on_record = "28.6 ft"

  [[gauge.transfer]]
  to = ["C-07", "C-08"]
  offset = { value = "-0.60 ft", source = "marks of 2028", date = 2028-05-01 }
  lowest_stage = "20 ft"
  highest_stage = "32 ft"

  [[gauge.transfer]]
  to = ["C-09"]
  slope = 0.0002
  distance_downstream = "3200 ft"
  uncertainty = "0.2 ft"
  source = "profile of 2028"
  date = 2028-05-01

  [[gauge.transfer]]
  to = ["C-10"]
  table = [["20 ft", "-0.4 ft"], ["32 ft", "-1.0 ft"]]
  source = "profiles of three floods"
"""


def test_a_file_is_read_as_typed() -> None:
    read = gauge_of(TOML)
    assert read.zero is not None
    assert read.zero.text == "412.70 ft"
    assert read.zero.dated is not None
    assert read.zero.dated.isoformat() == "2029-10-11"
    assert [transfer.to for transfer in read.transfer] == [("C-07", "C-08"), ("C-09",), ("C-10",)]
    assert read.transfer_to("C-08") is read.transfer[0]
    assert read.transfer_to("C-11") is None
    assert gauge_problems([read], {"C-07", "C-08", "C-09", "C-10"}, DATUM) == []


def test_the_three_kinds_of_transfer() -> None:
    read = gauge_of(TOML)
    stage = np.array([26.0]) * FOOT
    for barrier, feet in [("C-07", -0.60), ("C-09", -0.0002 * 3200), ("C-10", -0.7)]:
        way = conversion(read, barrier, DATUM)
        assert way.level(stage)[0] / FOOT == pytest.approx(26.0 + 412.70 + 0.34 + feet, abs=1e-9)


@pytest.mark.parametrize(
    ("change", "sentence"),
    [
        ({"datum": ""}, "datum  is missing; the gauge's zero is an elevation in some datum, and it is not"),
        ({"datum_shift": "3.4 ft"}, 'datum_shift "3.4 ft" needs its source'),
        ({"zero": "412.70"}, "zero "),
        ({"zero": 412.7}, "zero needs a unit"),
        (
            {"highest_true_reading": "1 ft", "lowest_true_reading": "2 ft"},
            'lowest_true_reading "2 ft" it must be',
        ),
        ({"highest_on_record": "1 m", "lowest_on_record": "1 m"}, 'lowest_on_record "1 m" it must be below'),
        ({"zeros": "1 ft"}, "zeros Extra inputs are not permitted"),
        ({"transfer": [*GAUGE["transfer"], *GAUGE["transfer"]]}, 'transfer  leads to "C-07" 2 times'),
    ],
)
def test_a_gauge_refused(change: dict[str, Any], sentence: str) -> None:
    found = rules(Gauge, {**copy.deepcopy(GAUGE), **change})
    assert any(rule.startswith(sentence) for rule in found), found


@pytest.mark.parametrize(
    ("given", "sentence"),
    [
        ({}, "  needs exactly one of an offset, a slope with a distance_downstream, and a table"),
        ({"offset": "1 ft", "table": [["1 ft", "1 ft"], ["2 ft", "1 ft"]]}, "  needs exactly one of"),
        ({"offset": "1 ft", "slope": 0.1, "distance_downstream": "1 ft"}, "  needs exactly one of"),
        ({"slope": 0.001}, "distance_downstream  is missing; a slope and a distance_downstream go together"),
        ({"distance_downstream": "1 ft"}, "slope  is missing"),
        ({"slope": 0.2, "distance_downstream": "1 ft"}, "slope Input should be less than or equal to 0.1"),
        ({"slope": float("nan"), "distance_downstream": "1 ft"}, "slope Input should be a finite number"),
        ({"slope": True, "distance_downstream": "1 ft"}, "slope Input should be a valid number"),
        ({"table": [["1 ft", "1 ft"]]}, "table Tuple should have at least 2 items"),
        (
            {"table": [["2 ft", "0 ft"], ["2 ft", "1 ft"]]},
            'table[1] "2 ft" it must be above the reading before',
        ),
        (
            {"table": [["2 ft", "0 ft"], ["3 ft", "-1 ft"]]},
            'table[1] "-1 ft" the level at the barrier must rise',
        ),
        ({"offset": "1 ft", "uncertainty": "1 ft"}, "uncertainty given belongs to the offset itself"),
        ({"offset": "1 ft", "source": "a survey"}, "source given belongs to the offset itself"),
        (
            {"offset": "1 ft", "lowest_stage": "3 ft", "highest_stage": "2 ft"},
            'lowest_stage "3 ft" it must be',
        ),
    ],
)
def test_a_transfer_refused(given: dict[str, Any], sentence: str) -> None:
    found = rules(Transfer, {"to": ["C-07"], **given})
    assert any(rule.startswith(sentence) for rule in found), found


def test_an_ngvd29_sill_on_a_navd88_gauge_is_refused_and_asked_for() -> None:
    expected = (
        "gauge[G1].datum_shift is missing; the gauge is in NAVD88 and the barriers are in NGVD29, and the "
        "shift from one to the other is not guessed; enter it with its source"
    )
    with pytest.raises(ScenarioError) as refusal:
        conversion(gauge(), "C-07", "NGVD29")
    assert [str(problem) for problem in refusal.value.problems] == [expected]
    ((path, value, rule),) = gauge_problems([gauge()], {"C-07"}, "NGVD29")
    assert (path, value) == ("gauge[G1].datum_shift", "")
    assert rule in expected
    shift = {"value": "-3.4 ft", "source": "county grid"}
    assert conversion(gauge(datum_shift=shift), "C-07", "NGVD29").base / FOOT == pytest.approx(412.70 - 3.4)


def test_a_shift_within_one_datum_is_refused() -> None:
    shifted = gauge(datum_shift={"value": "3.4 ft", "source": "county grid"})
    ((path, value, rule),) = gauge_problems([shifted], {"C-07"}, "navd 88")
    assert (path, value) == ("gauge[G1].datum_shift", '"3.4 ft"')
    assert rule.startswith("it is not used, because gauge and barriers are both in")


def test_unknown_barriers_and_twins_are_named() -> None:
    found = gauge_problems([gauge(), gauge()], {"C-7"}, DATUM)
    assert found[0] == ("gauge[G1].id", '"G1"', "2 gauges have it; each needs its own")
    where = ("gauge[G1].transfer[0].to", '"C-07"', 'no barrier has that id; did you mean "C-7"?')
    assert found[1:] == [where, where]


def test_elevations_become_readings_in_a_known_datum_only() -> None:
    elevations = series([435.10, 438.10], datum="NAVD88")
    found = as_readings(elevations, gauge(), DATUM)
    np.testing.assert_allclose(found.values / FOOT, [22.40, 25.40], atol=1e-9)
    assert found.datum is None
    shifted = gauge(datum="NGVD29", datum_shift={"value": "3.40 ft", "source": "county grid"})
    np.testing.assert_allclose(as_readings(elevations, shifted, DATUM).values / FOOT, [19.0, 22.0], atol=1e-9)
    with pytest.raises(ScenarioError, match="neither that of gauge G1"):
        as_readings(series([435.0], datum="IGLD85"), gauge(), DATUM)
    with pytest.raises(ScenarioError, match="nobody entered the zero"):
        as_readings(elevations, gauge(zero=None), DATUM)
    readings = series([22.4])
    assert as_readings(readings, gauge(zero=None), DATUM) is readings
