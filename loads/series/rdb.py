"""Reader of RDB, the tab-delimited tables of the US Geological Survey."""

from __future__ import annotations

import re
from dataclasses import dataclass

from loads.series.collect import MOST_SERIES, Collector, finished
from loads.series.levels import (
    INSTANTANEOUS,
    PARAMETERS,
    Parameter,
    UnreadableLevelError,
    unit_named,
)
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import Series
from loads.series.stamps import UnreadableTimeError, Zone, read_stamp, zone_named
from loads.series.text import label, lines_of, zone_argument

_WIDTH = re.compile(r"\d+[snd]", re.ASCII)
_COLUMN = re.compile(r"(\d+)_(\d{5})(?:_(\d{5}))?", re.ASCII)


def is_widths(line: str) -> bool:
    """Tell whether a line is the row of widths and types below the header, such as 5s, 15s, 20d."""
    cells = line.split("\t")
    return len(cells) > 1 and all(_WIDTH.fullmatch(cell.strip()) for cell in cells)


@dataclass(frozen=True, kw_only=True)
class _Value:
    """One column of levels."""

    index: int
    qualifier: int | None
    identifier: str
    parameter: Parameter
    many: bool


@dataclass(frozen=True, kw_only=True)
class _Table:
    """Where things stand in the rows below one header."""

    width: int
    time: int
    zone: int | None
    site: int | None
    values: tuple[_Value, ...]
    left_out: tuple[str, ...]


def _table_of(cells: list[str], number: int) -> _Table:
    at = {cell: index for index, cell in enumerate(cells)}
    if len(at) != len(cells):
        raise refusal(f"line {number}", "has two columns of the same name")
    if "datetime" not in at:
        raise refusal(
            f"line {number}",
            "has no column datetime: this table is not a series of readings; annual peaks, ratings, "
            "statistics and sites are other tables",
        )
    found = [(cell, match) for cell in cells if (match := _COLUMN.fullmatch(cell))]
    usable = [(c, m) for c, m in found if m[2] in PARAMETERS and (m[3] or "") in INSTANTANEOUS]
    codes = [match[2] for _, match in usable]
    values = tuple(
        _Value(
            index=at[cell],
            qualifier=at.get(f"{cell}_cd"),
            identifier=match[1],
            parameter=PARAMETERS[match[2]],
            many=codes.count(match[2]) > 1,
        )
        for cell, match in usable
    )
    left_out = tuple(cell for cell, match in found if (cell, match) not in usable)
    return _Table(
        width=len(cells), time=at["datetime"], zone=at.get("tz_cd"), site=at.get("site_no"), values=values,
        left_out=left_out,
    )  # fmt: skip


class _Reader:
    """The state of a reading."""

    def __init__(self, zone: Zone | None, unit: str | None) -> None:
        self.zone, self.unit = zone, unit
        self.faults = Faults()
        self.collectors: dict[tuple[str, str, str], Collector] = {}
        self.left_out: dict[str, None] = {}
        self.rows = 0

    def header(self, cells: list[str], number: int) -> _Table:
        made = _table_of(cells, number)
        self.left_out.update(dict.fromkeys(made.left_out))
        for value in made.values:
            if self.unit and self.unit != value.parameter.unit:
                rule = f"is not the unit of {value.parameter.name} here, which is {value.parameter.unit}"
                raise refusal("unit", rule, self.unit)
        return made

    def row(self, made: _Table, line: str, number: int) -> None:
        self.rows += 1
        cells = line.split("\t")
        if len(cells) != made.width:
            rule = f"has {len(cells)} columns where the header has {made.width}; is the file cut off?"
            self.faults.add(f"line {number}", rule)
            return
        try:
            zone = (
                zone_named(cells[made.zone])
                if made.zone is not None and cells[made.zone].strip()
                else self.zone
            )
            stamp = read_stamp(cells[made.time], zone)
        except UnreadableTimeError as error:
            self.faults.add(f"line {number}", str(error), cells[made.time].strip())
            return
        for value in made.values:
            qualifier = cells[value.qualifier].strip() if value.qualifier is not None else ""
            try:
                self.collector(made, value, cells).add(stamp, cells[value.index], qualifier)
            except UnreadableLevelError as error:
                self.faults.add(f"line {number}", str(error), cells[value.index].strip())

    def collector(self, made: _Table, value: _Value, cells: list[str]) -> Collector:
        site = cells[made.site] if made.site is not None else ""
        key = (site, value.identifier, value.parameter.name + (value.parameter.datum or ""))
        known = self.collectors.get(key)
        if known is None:
            if len(self.collectors) >= MOST_SERIES:
                raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
            gauge = label(site)
            which = f" ({value.identifier})" if value.many else ""
            known = self.collectors[key] = Collector(
                name=f"{gauge} {value.parameter.name}{which}".strip(), parameter=value.parameter.name,
                kind="observed", unit=value.parameter.unit, gauge=gauge, datum=value.parameter.datum,
            )  # fmt: skip
        return known


def read_rdb(data: bytes, *, zone: str | None = None, unit: str | None = None) -> list[Series]:
    """Read observed levels from RDB.

    Parameters
    ----------
    data
        The file; several tables one below the other are read.
    zone
        Zone of tables without a column ``tz_cd``.
    unit
        When given, it must be the unit that the parameter code stands for.

    Returns
    -------
    list of Series
        One for each site and column of levels.

    Raises
    ------
    ScenarioError
        Not such a table, a broken row, a time without zone, or no level at all.
    """
    reader = _Reader(zone_argument(zone), _unit_argument(unit))
    made: _Table | None = None
    header: list[str] | None = None
    for number, line in lines_of(data):
        if line.startswith("#"):
            made = None
        elif header is not None:
            if not is_widths(line):
                raise refusal(
                    f"line {number}", "is not the row of column widths that stands below an RDB header"
                )
            made, header = reader.header(header, number - 1), None
        elif made is None or line.startswith("agency_cd\t"):
            header = [cell.strip() for cell in line.split("\t")]
        else:
            reader.row(made, line, number)
    reader.faults.raise_any()
    if header is not None or (made is None and not reader.rows):
        raise refusal(THE_FILE, "holds no RDB table with rows")
    return finished(reader.collectors.values(), _notes(reader))


def _unit_argument(unit: str | None) -> str | None:
    if unit is None or not unit.strip():
        return None
    try:
        return unit_named(unit)
    except UnreadableLevelError as error:
        raise refusal("unit", str(error), unit) from None


def _notes(reader: _Reader) -> list[str]:
    if not reader.left_out:
        return []
    names = ", ".join(list(reader.left_out)[:8])
    return [f"Columns that are not levels at an instant are left out: {label(names)}."]
