"""Any series file that is read here, recognised by its content."""

from __future__ import annotations

from collections.abc import Callable
from itertools import islice, pairwise

from loads.series.csv_table import read_csv
from loads.series.nws_json import is_nws, is_tide, nws_series, tide_series
from loads.series.rdb import is_widths, read_rdb
from loads.series.refusals import THE_FILE, refusal
from loads.series.series import Kind, Series
from loads.series.shef import read_shef
from loads.series.shef_messages import is_shef
from loads.series.text import check_size, json_of, lines_of
from loads.series.usgs_json import is_ogc, is_waterml, ogc_series, waterml_series
from loads.series.waterml2 import read_waterml2

_LOOKED_AT = 300
_BOMS = (b"\xef\xbb\xbf", b"\xff\xfe", b"\xfe\xff")


def _start(data: bytes) -> bytes:
    head = data[:4096]
    for bom in _BOMS:
        head = head.removeprefix(bom)
    return head.replace(b"\x00", b"").lstrip()


def format_of(data: bytes) -> str:
    """Name of the format that a file looks like; the forms of JSON are told apart on reading."""
    head = _start(data)
    if head[:1] == b"<":
        return "WaterML 2.0"
    if head[:1] in (b"{", b"["):
        return "JSON"
    lines = [line for _, line in islice(lines_of(data), _LOOKED_AT)]
    if any(is_shef(line) for line in lines):
        return "SHEF"
    tables = [line for line in lines if not line.startswith("#")]
    commented = len(lines) == _LOOKED_AT and len(tables) < 2
    if commented or any("\t" in one and is_widths(two) for one, two in pairwise(tables)):
        return "RDB"
    return "CSV"


def _json_series(data: bytes, zone: str | None, unit: str | None) -> list[Series]:
    document = json_of(data)
    if is_ogc(document):
        return ogc_series(document, zone=zone)
    if is_waterml(document):
        return waterml_series(document, zone=zone)
    if is_nws(document):
        return nws_series(document, zone=zone)
    if is_tide(document):
        return tide_series(document, zone=zone, unit=unit)
    raise refusal(THE_FILE, "is JSON of none of the forms that are read here")


def read_series(
    data: bytes, *, zone: str | None = None, unit: str | None = None, kind: Kind | None = None
) -> list[Series]:
    """Read stage or level series from a file or from what was pasted.

    Parameters
    ----------
    data
        The bytes, at most 50 MB (JSON 20 MB).
    zone
        Zone of times that carry none: an offset, an abbreviation, or a name of the tz database.
    unit
        Unit of levels that carry none.
    kind
        "observed" or "forecast", for tables that do not tell.

    Returns
    -------
    list of Series
        At least one, each with at least one level.

    Raises
    ------
    ScenarioError
        Not recognised, or not readable with certainty; every problem names its line or element.
    """
    check_size(data)
    if not data.strip():
        raise refusal(THE_FILE, "is empty")
    readers: dict[str, Callable[[], list[Series]]] = {
        "WaterML 2.0": lambda: read_waterml2(data, zone=zone, unit=unit),
        "JSON": lambda: _json_series(data, zone, unit),
        "SHEF": lambda: read_shef(data, zone=zone),
        "RDB": lambda: read_rdb(data, zone=zone, unit=unit),
        "CSV": lambda: read_csv(data, zone=zone, unit=unit, kind=kind),
    }
    return readers[format_of(data)]()
