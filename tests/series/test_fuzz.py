"""Whatever a file holds, a reader gives series of numbers that stand in the file, or a problem in words."""

from __future__ import annotations

import json
import re
from collections.abc import Callable

import numpy as np
import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from loads.problems import ScenarioError
from loads.series.csv_table import read_csv
from loads.series.nws_json import read_nws_json, read_tide_json
from loads.series.rdb import read_rdb
from loads.series.read import read_series
from loads.series.series import Series
from loads.series.shef import read_shef
from loads.series.usgs_json import read_ogc_json, read_waterml_json
from loads.series.waterml2 import read_waterml2
from loads.units import to_si
from tests.series import files

Reader = Callable[[bytes], list[Series]]
WATERML_JSON = files.waterml_json(
    [
        files.stamped("22.10", "2031-04-02T06:00:00.000-05:00"),
        files.stamped("-999999", "2031-04-02T06:15:00.000-05:00"),
    ]
)
NWS = json.dumps(files.NWS).encode()
READERS: dict[str, tuple[Reader, bytes]] = {
    "csv": (read_csv, files.CSV),
    "csv, long": (
        read_csv,
        b"site_no;issued;time;tz;low_ft;high_ft\n1;2031-04-02 05:00;2031-04-02 06:00;CDT;22.10;23.5\n",
    ),
    "csv, zone and unit beside": (
        lambda data: read_csv(data, zone="CDT", unit="ft"),
        b"2031-04-02 06:00,22.1\n",
    ),
    "rdb": (read_rdb, files.RDB),
    "waterml 2": (read_waterml2, files.WATERML2),
    "waterml json": (read_waterml_json, WATERML_JSON),
    "ogc": (read_ogc_json, files.OGC),
    "nws": (read_nws_json, NWS),
    "tide": (lambda data: read_tide_json(data, zone="UTC", unit="m"), files.TIDE),
    "shef": (read_shef, files.SHEF),
}
NUMBER = re.compile(r"[+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d{1,2})?", re.ASCII)
THOROUGH = settings(max_examples=150, suppress_health_check=[HealthCheck.too_slow], deadline=None)


def numbers_in(data: bytes) -> set[float]:
    """Every number that can be read off the text, with and without a trailing exponent."""
    texts = [data.decode("latin-1")]
    if data[:2] in (b"\xff\xfe", b"\xfe\xff"):
        texts.append(data.decode("utf-16", errors="replace"))
    found: set[float] = set()
    for text in texts:
        for plain in (
            text,
            re.sub(r"<!--.*?-->", "", text, flags=re.DOTALL),
            text.replace("\xe2\x88\x92", "-"),
        ):
            for match in NUMBER.findall(plain):
                found.add(float(match))
                found.add(float(re.split("[eE]", match)[0]))
                found.add(float(match.lstrip("+-") or 0))
    return found


def check(reader: Reader, data: bytes) -> bool:
    """Read; True when there are series. Anything but series or `ScenarioError` fails."""
    refusal: ScenarioError | None = None
    try:
        found = reader(data)
    except ScenarioError as error:
        refusal = error
    if refusal is not None:
        assert refusal.problems
        assert all(one.path and one.rule and str(one).isprintable() for one in refusal.problems)
        return False
    assert found
    allowed = numbers_in(data)
    for series in found:
        assert np.isfinite(series.values).all()
        assert all(text.isprintable() for text in (series.name, series.gauge, series.zone, *series.notes))
        assert (np.diff(series.times.astype(np.int64)) > 0).all()
        readable = np.array(sorted(float(to_si(value, series.unit, "length")) for value in allowed))
        nearest = np.abs(series.values[:, None] - readable[None, :]).min(axis=1)
        assert (nearest <= 1e-12 * np.maximum(1.0, np.abs(series.values))).all()
        assert not np.isin(
            series.values, [float(to_si(-(10.0**n - 1), series.unit, "length")) for n in range(3, 8)]
        ).any()
    return True


@pytest.mark.parametrize("name", READERS)
def test_the_files_themselves_are_read(name: str) -> None:
    reader, data = READERS[name]
    assert check(reader, data)


@pytest.mark.parametrize("name", READERS)
@THOROUGH
@given(data=st.data())
def test_mutated_files(name: str, data: st.DataObject) -> None:
    reader, original = READERS[name]
    broken = bytearray(original)
    for _ in range(data.draw(st.integers(1, 4))):
        at = data.draw(st.integers(0, max(0, len(broken) - 1)))
        length = data.draw(st.integers(0, 12))
        new = data.draw(
            st.sampled_from(
                [b"", b"\n", b"\t", b"/", b",", b"-", b"9", b'"', b"-999", b"1e9", b"NaN", b"\xff", b"\x00"]
            )
            | st.binary(max_size=6)
            | st.just(bytes(broken[at : at + 20]))
        )
        broken[at : at + length] = new
    check(reader, bytes(broken))
    check(read_series, bytes(broken))


@pytest.mark.parametrize("name", READERS)
def test_files_cut_off_anywhere(name: str) -> None:
    reader, original = READERS[name]
    for end in range(len(original)):
        check(reader, original[:end])


@THOROUGH
@given(st.binary(max_size=300))
def test_any_bytes(data: bytes) -> None:
    check(read_series, data)
    for reader, _ in READERS.values():
        check(reader, data)


WORDS = st.sampled_from(
    [
        "time", "date", "stage", "[ft]", "level:m", "tz", "CDT", "Z", "2031-04-02", "06:00",
        "06:00Z", "22.10", "-999", "Ice", "22,1", "1e5", ".5", "+3", "NaN", "P", "#", "agency_cd",
        "datetime", ".A", ".E", ".B", ".END", "ZZZX1", "20310402", "C", "DH06", "DH", "DIH06",
        "HG", "HGIFF", "/", "//", "M", ":", "5s", "15s", "1_00065",
    ]
)  # fmt: skip
LINES = st.lists(
    st.tuples(st.lists(WORDS, max_size=8), st.sampled_from([" ", ",", ";", "\t", "/"])), max_size=8
)


@THOROUGH
@given(LINES)
def test_lines_of_likely_words(lines: list[tuple[list[str], str]]) -> None:
    data = "\n".join(mark.join(words) for words, mark in lines).encode()
    check(read_series, data)
    check(lambda one: read_series(one, zone="America/Chicago", unit="ft"), data)


def leaves(value: object, path: tuple[str | int, ...] = ()) -> list[tuple[str | int, ...]]:
    """Paths of everything inside a JSON document."""
    children: list[tuple[str | int, object]] = []
    if isinstance(value, dict):
        children = list(value.items())
    elif isinstance(value, list):
        children = list(enumerate(value))
    return [path] * bool(path) + [leaf for key, child in children for leaf in leaves(child, (*path, key))]


ODD = st.none() | st.booleans() | st.integers(-(10**30), 10**30) | st.floats() | st.text(max_size=8)
ODD_TREES = st.recursive(
    ODD, lambda inner: st.lists(inner, max_size=3) | st.dictionaries(st.text(max_size=5), inner), max_leaves=6
)


@pytest.mark.parametrize("name", ["waterml json", "ogc", "nws", "tide"])
@THOROUGH
@given(data=st.data())
def test_json_with_one_thing_exchanged(name: str, data: st.DataObject) -> None:
    reader, original = READERS[name]
    document = json.loads(original)
    *parents, last = data.draw(st.sampled_from(leaves(document)))
    place = document
    for key in parents:
        place = place[key]
    place[last] = data.draw(ODD_TREES)
    text = json.dumps(document, ensure_ascii=data.draw(st.booleans())).encode("utf-8", "surrogatepass")
    check(reader, text)
    check(read_series, text)
