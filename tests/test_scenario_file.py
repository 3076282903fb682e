"""Scenario files: read, written, read again; and nothing a file can hold ends in anything but an answer."""

from __future__ import annotations

import copy
from collections.abc import Callable
from datetime import UTC, date, datetime
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from loads.assessment import assess
from loads.problems import Problem, ScenarioError
from loads.records.scenario import Scenario, scenario_schema, zone_name
from loads.scenario_file import (
    BARRIER_KEYS,
    MAX_FILE_BYTES,
    Document,
    parse_document,
    read_file,
    scenario_of,
    write_document,
)
from loads.units import units_of
from tests.laws.strategies import scenes

FILES = sorted((Path(__file__).parents[1] / "scenarios").glob("*.toml"))
slow = settings(suppress_health_check=[HealthCheck.too_slow, HealthCheck.filter_too_much])


@pytest.mark.parametrize("path", FILES, ids=lambda path: path.stem)
def test_examples_are_read_written_and_read_again(path: Path) -> None:
    document = read_file(path)
    again = parse_document(write_document(document))
    assert again == document
    assert scenario_of(again) == scenario_of(document)
    assert len(assess(scenario_of(document)).barriers) == sum(
        len(document.get(kind, ())) for kind in BARRIER_KEYS
    )


@slow
@given(scenes())
def test_a_document_written_and_read_is_the_same(document: Document) -> None:
    assert parse_document(write_document(document)) == document


def test_what_was_typed_is_kept() -> None:
    document = read_file(FILES[-1])
    document["water"]["flood_side"] = {
        "value": " 104.60 ft",
        "low": "104 ft",
        "high": "31.9 m",
        "source": "staff",
    }
    level = scenario_of(document).water.flood_side
    assert (level.text, level.low_text, level.high_text) == ("104.60 ft", "104 ft", "31.9 m")
    assert (level.source, level.dated, level.unit) == ("staff", None, "ft")
    assert level.has_range
    assert level.low < level.value < level.high


def test_a_date_may_be_a_date_a_time_or_text() -> None:
    document = read_file(FILES[-1])
    for entered in (date(2031, 4, 2), "2031-04-02", datetime(2031, 4, 2, 6, tzinfo=UTC)):
        document["water"]["flood_side"] = {"value": "104.60 ft", "date": entered}
        assert scenario_of(document).water.flood_side.dated == date(2031, 4, 2)


def test_a_byte_order_mark_and_line_ends_of_another_system_are_read() -> None:
    data = FILES[0].read_bytes()
    assert parse_document(b"\xef\xbb\xbf" + data.replace(b"\n", b"\r\n")) == parse_document(data)


@pytest.mark.parametrize(
    ("data", "words"),
    [
        (b"\xff\xfe\x00", "the file is not UTF-8 text"),
        (b"a = [[1", "the file is not a scenario file (TOML)"),
        (b"\x00", "the file is not a scenario file (TOML)"),
        (b"x = " + b"[" * 200_000, "the file is nested too deeply"),
        (b"x = " + b"1" * 5000, "the file holds a whole number of more than 18 digits"),
        (b"x = [{y = 0x" + b"F" * 5000 + b"}]", "the file holds a whole number of more than 18 digits"),
        (b"x = 2031-13-45", "the file is not a scenario file (TOML)"),
        (b"#" * 10_000_000, "the file is 10 000 000 bytes long; a scenario file may have at most 1 000 000"),
    ],
)
def test_what_is_no_scenario_file_is_told_so(data: bytes, words: str) -> None:
    with pytest.raises(ScenarioError) as refusal:
        parse_document(data)
    assert str(refusal.value).startswith(words)


def test_a_large_file_and_a_missing_one(tmp_path: Path) -> None:
    large = tmp_path / "large.toml"
    large.write_bytes(b"#" * 10_000_000)
    with pytest.raises(ScenarioError, match=r"the file is 10 000 000 bytes long") as refusal:
        read_file(large)
    assert f"{MAX_FILE_BYTES:,}".replace(",", " ") in str(refusal.value)
    with pytest.raises(ScenarioError, match=r"none\.toml cannot be read: No such file"):
        read_file(tmp_path / "none.toml")
    with pytest.raises(ScenarioError, match="cannot be read"):
        read_file(tmp_path)


def test_a_newer_format_is_refused_before_anything_else() -> None:
    with pytest.raises(ScenarioError) as refusal:
        scenario_of({"format": 2, "wave": []})
    assert (
        str(refusal.value)
        == "format is 2; this Sillhead reads formats up to 1; open the file with a newer one"
    )


def test_zone_names() -> None:
    assert zone_name(datetime.fromisoformat("2031-04-02T06:00:00-05:00")) == "UTC−05:00"
    assert zone_name(datetime.fromisoformat("2031-04-02T06:00:00+00:00")) == "UTC"
    assert zone_name(datetime.fromisoformat("2031-04-02T06:00:00+05:30")) == "UTC+05:30"


def test_the_schema_knows_every_field_its_range_and_its_units() -> None:
    schema = scenario_schema()
    panel, water = schema["$defs"]["Panel"]["properties"], schema["$defs"]["Water"]["properties"]
    assert set(schema["properties"]) == set(Scenario.model_fields)
    tilt = str(panel["tilt"])
    assert "between 1 and 179 deg" in tilt
    assert all(symbol in tilt for symbol in units_of("angle"))
    assert "more than 0 ft and not more than 1000 ft" in str(panel["width"])
    assert "not less than" not in str(water["flood_side"])
    assert schema["additionalProperties"] is False


ODD: list[Any] = [
    None,
    True,
    False,
    0,
    -1,
    10**17,
    1e308,
    float("nan"),
    float("inf"),
    "",
    " ",
    "9",
    "9 ft",
    "-9 ft",
    "1e308 ft",
    "1e-308 m",
    "nan ft",
    "9 psf",
    "1 deg",
    "\x00",
    "<b>9 ft</b>",
    "x" * 500,
    [],
    {},
    [[]],
    [{}],
    {"value": "9 ft"},
    {"value": {"value": "9 ft"}},
    {"value": "9 ft", "low": "10 ft"},
    {"value": "9 ft", "date": "2031-02-30"},
    {"value": "9 ft", "source": 7},
    {"values": "9 ft"},
    date(2031, 4, 2),
    datetime(2031, 4, 2),  # noqa: DTZ001 - a time without a zone is what is tried
    "circle",
    "arc",
    "outline",
    "fluid mud",
    "equivalent fluid",
    "passive",
    "sea",
    "custom",
    "protected",
]


def problems_of(call: Callable[[], object]) -> tuple[Problem, ...]:
    """Problems of a call that may be refused, none when it is not; any other exception is a failure."""
    try:
        call()
    except ScenarioError as refusal:
        return refusal.problems
    return ()


def places(value: Any, path: tuple[Any, ...] = ()) -> list[tuple[Any, ...]]:
    found = [path] if path else []
    children = (
        value.items() if isinstance(value, dict) else enumerate(value) if isinstance(value, list) else ()
    )
    for key, child in children:
        found += places(child, (*path, key))
    return found


@st.composite
def spoiled(draw: st.DrawFn) -> Document:
    """Example file in which a few values are replaced, left out, renamed or doubled."""
    document: Any = copy.deepcopy(draw(st.sampled_from([read_file(path) for path in FILES])))
    for _ in range(draw(st.integers(1, 3))):
        *way, last = draw(st.sampled_from(places(document)))
        parent = document
        for step in way:
            parent = parent[step]
        action = draw(st.sampled_from(["replace", "replace", "drop", "rename", "double"]))
        if action == "replace":
            parent[last] = copy.deepcopy(draw(st.sampled_from(ODD)))
        elif action == "drop":
            del parent[last]
        elif action == "rename" and isinstance(parent, dict):
            parent[f"{last}x"] = parent.pop(last)
        elif isinstance(parent, list):
            parent.append(copy.deepcopy(parent[last]))
        if not places(document):
            break
    return dict(document)


@settings(slow, max_examples=4 * slow.max_examples)
@given(spoiled())
def test_a_spoiled_file_is_answered_or_refused(document: Document) -> None:
    problems = problems_of(lambda: assess(scenario_of(document)))
    for sentence in map(str, problems):
        assert sentence == sentence.strip()
        assert "pydantic" not in sentence
        assert "function-" not in sentence
        assert len(sentence) < 700


@slow
@given(st.data())
def test_spoiled_text_is_answered_or_refused(data: st.DataObject) -> None:
    whole = bytearray(data.draw(st.sampled_from([path.read_bytes() for path in FILES])))
    for _ in range(data.draw(st.integers(1, 6))):
        where = data.draw(st.integers(0, len(whole) - 1))
        whole[where : where + data.draw(st.integers(0, 3))] = data.draw(st.binary(max_size=3))
    problems_of(lambda: scenario_of(parse_document(bytes(whole))))
