"""Files as services and loggers really write them, carried by packages of others.

Put the source packages of dataretrieval 1.4.0, hydrofunctions 0.2.4 and tappy 1.2.3 and the wheel of
gensor 0.4.1 into one folder and name it in SILLHEAD_REAL_DATA; nothing of them is kept here.
"""

from __future__ import annotations

import ast
import copy
import hashlib
import json
import os
import tarfile
import zipfile
from collections.abc import Callable
from pathlib import Path
from typing import Any

import numpy as np
import pytest

from loads.problems import ScenarioError
from loads.series.interpolate import first_reached
from loads.series.read import read_series
from tests.series.files import FOOT
from tests.series.test_fuzz import check

SHA256 = {
    "dataretrieval-1.4.0.tar.gz": "77789b41e6dfacc6725cb84a687a6a60acc83ab406874126130d2741d486344b",
    "hydrofunctions-0.2.4.tar.gz": "4cfd7ef59d62206d71c36309020a201e3a37d0604e9f41a991880310be4cc0d6",
    "tappy-1.2.3.tar.gz": "bee470d257a3665cc1bc3132a2739abc456eaa7b134921ab41096f95f56d21f1",
    "gensor-0.4.1-py3-none-any.whl": "65594a3c8e847fbed681e701f7ebbb5b470e64a84c04ae7962a1c54ecc6d68eb",
}
Member = Callable[[str, str], bytes]


@pytest.fixture
def member() -> Member:
    """Read one file out of one package."""

    def read(package: str, path: str) -> bytes:
        folder = os.environ.get("SILLHEAD_REAL_DATA")
        if not folder:
            pytest.skip("SILLHEAD_REAL_DATA names no folder with packages of real files")
        archive = Path(folder) / package
        if not archive.is_file():
            pytest.skip(f"{package} is not in the folder of SILLHEAD_REAL_DATA")
        assert hashlib.sha256(archive.read_bytes()).hexdigest() == SHA256[package]
        if package.endswith(".whl"):
            with zipfile.ZipFile(archive) as wheel:
                return wheel.read(path)
        with tarfile.open(archive) as source:
            inner = source.extractfile(f"{package.removesuffix('.tar.gz')}/{path}")
            assert inner is not None
            return inner.read()

    return read


def fixture_of(member: Member, module: str, name: str) -> dict[str, Any]:
    """One literal of a module of fixtures."""
    text = member("hydrofunctions-0.2.4.tar.gz", f"tests/{module}.py").decode()
    for node in ast.parse(text).body:
        if (
            isinstance(node, ast.Assign)
            and isinstance(node.targets[0], ast.Name)
            and node.targets[0].id == name
        ):
            value = ast.literal_eval(node.value)
            assert isinstance(value, dict)
            return value
    raise AssertionError(name)


def as_stage(document: dict[str, Any]) -> bytes:
    """The same stamps, marks and qualifiers, under the code and unit of a gauge height."""
    changed = copy.deepcopy(document)
    for series in changed["value"]["timeSeries"]:
        series["variable"]["variableCode"][0]["value"] = "00065"
        series["variable"]["unit"]["unitCode"] = "ft"
    return json.dumps(changed).encode()


def test_instantaneous_values_of_two_sites(member: Member) -> None:
    found = read_series(member("dataretrieval-1.4.0.tar.gz", "tests/data/waterservices_iv.txt"))
    assert [(s.gauge, len(s), s.zone) for s in found] == [("01491000", 5, "EST"), ("01645000", 5, "EST")]
    assert found[0].values == pytest.approx(np.array([6.48, 6.48, 6.46, 6.45, 6.43]) * FOOT)
    assert str(found[0].times[0]) == "2019-02-14T05:00:00"
    assert any("Streamflow" in note for note in found[0].notes)


def test_tables_that_are_no_series_are_told_apart(member: Member) -> None:
    for name in ("peaks", "stats", "site"):
        with pytest.raises(ScenarioError, match="has no column datetime"):
            read_series(member("dataretrieval-1.4.0.tar.gz", f"tests/data/waterservices_{name}.txt"))


def test_features_of_the_ogc_api(member: Member) -> None:
    known = json.loads(member("dataretrieval-1.4.0.tar.gz", "tests/data/waterdata_ogc_fixtures.json"))
    [series] = read_series(json.dumps(known["continuous"]).encode())
    assert series.values == pytest.approx([0.39 * FOOT] * 2)
    assert str(series.times[-1]) == "2025-09-22T16:15:00"
    [latest] = read_series(json.dumps(known["latest-continuous"]).encode())
    assert latest.values == pytest.approx([1.59 * FOOT])
    for name in set(known) - {"continuous", "latest-continuous"}:
        with pytest.raises(ScenarioError, match="holds no level"):
            read_series(json.dumps(known[name]).encode())


def test_stage_and_elevation_differ_by_the_zero_of_the_gauge(member: Member) -> None:
    found = read_series(json.dumps(fixture_of(member, "fixtures_tzfail", "tzfail")).encode())
    pair = {series.datum: series for series in found if series.gauge == "02489500"}
    stage, elevation = pair[None], pair["NAVD88"]
    assert len(stage) == len(elevation) == 240
    assert np.array_equal(stage.times, elevation.times)
    assert elevation.values - stage.values == pytest.approx(54.64 * FOOT, abs=1e-9)
    assert (stage.values.min(), stage.values.max()) == pytest.approx((19.86 * FOOT, 20.37 * FOOT))


def test_ice_is_no_data(member: Member) -> None:
    [series] = read_series(as_stage(fixture_of(member, "fixtures_data", "mult_flags")))
    assert len(series) == 438 - 39
    assert series.values.min() > 0
    assert any("39" in note for note in series.notes)
    assert "P,e" in series.qualifiers
    assert "P,Ice" not in series.qualifiers


@pytest.mark.parametrize(
    ("name", "count", "offsets"), [("startDST", 284, [-300, -240]), ("endDST", 292, [-240, -300])]
)
def test_days_of_23_and_25_hours(member: Member, name: str, count: int, offsets: list[int]) -> None:
    [series] = read_series(as_stage(fixture_of(member, "fixtures_data", name)))
    assert len(series) == count
    assert list(dict.fromkeys(series.utc_offsets.tolist())) == offsets
    assert set(np.diff(series.times).tolist()) == {np.timedelta64(900, "s").astype(object)}


def test_daily_levels_have_no_time_of_day(member: Member) -> None:
    with pytest.raises(ScenarioError, match="holds for a day"):
        read_series(json.dumps(fixture_of(member, "fixtures_data", "daily_lake_level")).encode())


def test_a_year_of_tides(member: Member) -> None:
    data = member("tappy-1.2.3.tar.gz", "tests/8720218_wl.csv")
    with pytest.raises(ScenarioError, match="state the zone"):
        read_series(data)
    [series] = read_series(data, zone="UTC")
    assert len(series) == 8784
    assert (series.values.min(), series.values.max()) == (-1.487, 1.653)
    assert str(series.times[series.values.argmin()]) == "2017-05-25T19:00:00"
    assert str(series.times[series.values.argmax()]) == "2017-09-11T07:00:00"
    assert str(first_reached(series, np.array([1.653])).times[0]) == "2017-09-11T07:00:00"


def test_logger_files_with_instrument_headers(member: Member) -> None:
    """Pressure heads are refused as levels; headed as centimetres, the figures are those of the file."""
    names = {
        "barometer": "Barodiver_220427183008_BY222.csv",
        "one": "PB01A_moni_AV319_220427183019_AV319.csv",
        "two": "PB02A_plain.csv",
    }
    raw = {
        key: member("gensor-0.4.1-py3-none-any.whl", f"gensor/testdata/{name}") for key, name in names.items()
    }
    for data in raw.values():
        with pytest.raises(ScenarioError, match="no column that is plainly a level"):
            read_series(data, zone="+02:00")
    series = {
        key: read_series(data.replace(b"Pressure[cmH2O]", b"Level[cm]"), zone="+02:00")[0]
        for key, data in raw.items()
    }
    assert [len(series[key]) for key in names] == [15226, 15222, 14003]
    air = series["barometer"]
    assert str(air.times[0]) == "2020-07-04T04:00:00"
    assert (air.values.min(), air.values.max()) == pytest.approx((9.927, 10.63))
    assert air.values.mean() == pytest.approx(10.342132027, abs=5e-10)
    for key, first, highest, when, mean in (
        ("one", 2.10175, 3.09758, "2021-07-15T05:00:00", 2.298007477),
        ("two", 2.99658, 3.82000, "2021-07-16T03:00:00", 3.076177785),
    ):
        logger = series[key]
        assert np.isin(logger.times, air.times).all()
        head = logger.values - air.values[np.searchsorted(air.times, logger.times)]
        assert head[0] == pytest.approx(first, abs=1e-9)
        assert head.max() == pytest.approx(highest, abs=1e-9)
        assert str(logger.times[head.argmax()]) == when
        assert head.mean() == pytest.approx(mean, abs=5e-10)


@pytest.mark.parametrize(
    ("package", "path", "length"),
    [
        ("dataretrieval-1.4.0.tar.gz", "tests/data/waterservices_iv.txt", 10_000),
        ("dataretrieval-1.4.0.tar.gz", "tests/data/waterservices_peaks.txt", 10_000),
        ("dataretrieval-1.4.0.tar.gz", "tests/data/waterdata_ogc_fixtures.json", 40_000),
        ("tappy-1.2.3.tar.gz", "tests/8720218.csv", 4_000),
        ("gensor-0.4.1-py3-none-any.whl", "gensor/testdata/PB01A_moni_AV319_220427183019_AV319.csv", 4_000),
    ],
)
def test_broken_copies_give_series_or_words(member: Member, package: str, path: str, length: int) -> None:
    original = member(package, path)[:length].replace(b"Pressure[cmH2O]", b"Level[cm]")
    random = np.random.default_rng(len(original))
    for _ in range(150):
        broken = bytearray(original)
        for at in random.integers(0, len(broken), size=3):
            broken[at : at + int(random.integers(0, 8))] = (
                random.integers(0, 256, size=4).astype(np.uint8).tobytes()
            )
        check(lambda data: read_series(data, zone="UTC"), bytes(broken))
