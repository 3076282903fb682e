"""Crews, drills and the clock of a barrier as typed: what is read, and what is refused."""

from __future__ import annotations

import tomllib
from datetime import UTC, date, datetime
from typing import Any

import pytest

from loads.records.base import Record
from loads.records.crew import BarrierClock, Crew, Drill, crew_problems
from loads.records.gauge import Gauge
from loads.records.moment import ZoneName
from tests.clock_cases import rules

TOML = """
[[crew]]
id = "A"
name = "Depot crew"
people = 6
can = ["lift"]
available_from = 2031-04-02T14:00:00-05:00
mobilisation = "30 min"
travel = "1 h"
move = "20 min"

[clock]
install_time = "7.5 h"
install_people = 6
preparation = "40 min"
wave_allowance = "0.5 ft"
removal_stage = "24.0 ft"
owner = "Alder Ferry Railway"
tell_owner_ahead = "6 h"
needs = ["lift"]
order = 1
crew = "A"

[[clock.drill]]
date = 2028-05-04
minutes_per_log = "4 min"

[[clock.drill]]
date = 2030-05-04
people = 6
install_time = "8.5 h"
"""


def test_a_file_is_read_as_typed() -> None:
    document = tomllib.loads(TOML)
    crew = Crew.model_validate(document["crew"][0])
    assert crew.available_from == datetime(2031, 4, 2, 19, 0, tzinfo=UTC)
    assert crew.travel is not None
    assert (crew.travel.text, crew.travel.value) == ("1 h", 3600)
    clock = BarrierClock.model_validate(document["clock"])
    assert clock.newest_drill is not None
    assert clock.newest_drill.date == date(2030, 5, 4)
    assert BarrierClock().newest_drill is None
    assert crew_problems([crew], {"closure[C7]": clock}) == []


def test_twins_and_unknown_crews_are_named() -> None:
    crew = Crew.model_validate(tomllib.loads(TOML)["crew"][0])
    clocks = {"closure[C7]": BarrierClock(crew="AA"), "closure[C8]": BarrierClock()}
    assert crew_problems([crew, crew], clocks) == [
        ("crew[A].id", '"A"', "2 crews have it; each needs its own"),
        ("closure[C7].clock.crew", '"AA"', 'no crew has that id; did you mean "A"?'),
    ]


@pytest.mark.parametrize("record", [Gauge, Crew, BarrierClock])
def test_the_schema_names_every_field(record: type[Record]) -> None:
    assert set(record.model_json_schema()["properties"]) == set(record.model_fields)


class Zoned(Record):
    zone: ZoneName


def test_a_zone_is_one_of_the_tz_database() -> None:
    assert Zoned(zone="America/Chicago").zone == "America/Chicago"
    for wrong in ("Alder/Ferry", "../etc/passwd", ""):
        assert rules(Zoned, {"zone": wrong})[0].startswith("zone is no time zone known here")
    assert rules(Zoned, {"zone": 5})[0] == "zone Input should be a valid string"


CREW = {"id": "A", "people": 4, "available_from": "2031-04-02T14:00:00-05:00"}


@pytest.mark.parametrize(
    ("record", "given", "sentence"),
    [
        (Crew, {**CREW, "available_from": "2031-04-02T14:00:00"}, "available_from needs a time zone"),
        (Crew, {**CREW, "available_from": "tomorrow"}, "available_from is no date and time"),
        (Crew, {**CREW, "people": 0}, "people Input should be greater than or equal to 1"),
        (Crew, {**CREW, "people": True}, "people Input should be a valid integer"),
        (Crew, {**CREW, "travel": 45}, "travel needs a unit"),
        (Crew, {**CREW, "travel": "-5 min"}, "travel it must be"),
        (Crew, {**CREW, "can": ["fly"]}, "can.0 Input should be 'lift'"),
        (Drill, {"date": "2030-05-04"}, " needs either install_time, or"),
        (
            Drill,
            {"date": "2030-05-04", "install_time": "8 h", "minutes_per_log": "4 min"},
            " needs either install_time, or",
        ),
        (Drill, {"date": "2030-05-04", "minutes_per_log": "4 min", "logs": 9}, " has posts or logs"),
        (Drill, {"date": "2030-02-30", "install_time": "8 h"}, "date has a date that is no calendar day"),
        (BarrierClock, {"owner": "Alder Ferry Railway"}, "tell_owner_ahead  is missing; how long before"),
        (BarrierClock, {"install_people": 4}, "install_people given it goes with install_time"),
        (BarrierClock, {"install_time": "0 h"}, "install_time it must be more than"),
        (BarrierClock, {"order": 0}, "order Input should be greater than or equal to 1"),
    ],
)
def test_a_crew_or_clock_refused(record: type[Any], given: dict[str, Any], sentence: str) -> None:
    found = rules(record, given)
    assert any(rule.startswith(sentence) for rule in found), found
