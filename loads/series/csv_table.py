"""Reader of tables of levels with commas, semicolons or tabs between the cells, read as a stream."""

from __future__ import annotations

import csv
from itertools import chain, islice

from loads.series.collect import MOST_SERIES, Collector, finished
from loads.series.headings import Columns, LevelColumn, columns_of, is_header
from loads.series.levels import (
    INSTANTANEOUS,
    PARAMETERS,
    UnreadableLevelError,
    read_level,
    unit_named,
)
from loads.series.refusals import THE_FILE, Faults, refusal
from loads.series.series import Kind, Series
from loads.series.stamps import Stamp, UnreadableTimeError, Zone, read_stamp, zone_named
from loads.series.text import label, lines_of, zone_argument

_DELIMITERS = {",": "commas", ";": "semicolons", "\t": "tabs"}
_LOOKED_AT = 200
_NO_ZONE = Zone(name="")


def _cells(line: str, delimiter: str) -> list[str]:
    try:
        return next(csv.reader([line], delimiter=delimiter, strict=True), [])
    except csv.Error:
        return []


def _header(head: list[tuple[int, str]]) -> tuple[int, str, list[str]] | None:
    """Position among the first lines, delimiter and cells of the row of headings."""
    for position, (_, line) in enumerate(head):
        if line.startswith("#"):
            continue
        found = [(len(cells), d, cells) for d in _DELIMITERS if is_header(cells := _cells(line, d))]
        if found:
            _, delimiter, cells = max(found, key=lambda one: one[0])
            return position, delimiter, cells
    return None


def _bare(head: list[tuple[int, str]]) -> str | None:
    """Delimiter of a table of time and level without headings."""
    line = next((line for _, line in head if not line.startswith("#")), "")
    for delimiter in _DELIMITERS:
        cells = _cells(line, delimiter)
        if len(cells) == 2 and cells[0].strip():
            try:
                stamp, level = read_stamp(cells[0], _NO_ZONE), read_level(cells[1])
            except (UnreadableTimeError, UnreadableLevelError):
                continue
            if stamp is not None and level is not None:
                return delimiter
    return None


def read_csv(
    data: bytes, *, zone: str | None = None, unit: str | None = None, kind: Kind | None = None
) -> list[Series]:
    """Read levels from a table.

    Parameters
    ----------
    data
        The file, or what was pasted. Lines before the row of headings and lines that start with # are passed.
    zone
        Zone of times that carry no offset and have no column or heading for it.
    unit
        Unit of columns whose heading gives none.
    kind
        Kind of columns whose heading does not tell.

    Returns
    -------
    list of Series
        One for each column of levels, gauge and time of issue.

    Raises
    ------
    ScenarioError
        No row of headings, no zone, no unit, a decimal comma, a broken row, or no level at all.
    """
    stream = lines_of(data)
    head = list(islice(stream, _LOOKED_AT))
    found = _header(head)
    if found is not None:
        position, delimiter, cells = found
        columns = columns_of(cells, number=head[position][0], unit=unit, kind=kind)
        body = chain(head[position + 1 :], stream)
        header: list[str] | None = cells
    else:
        bare = _bare(head)
        if bare is None:
            raise refusal(THE_FILE, "has no row of headings with a time and a level, such as time,stage [ft]")
        delimiter, header, body = bare, None, chain(head, stream)
        columns = columns_of(["time", f"level [{unit}]" if unit else "level"], number=1, unit=unit, kind=kind)
        columns.notes = ["There are no headings: the first column is read as time, the second as level."]
    reader = _Reader(columns, _DELIMITERS[delimiter], _zone(columns, zone), unit)
    for number, line in body:
        if not line.startswith("#"):
            reader.row(number, line, delimiter, header)
    return reader.finished()


def _zone(columns: Columns, zone: str | None) -> Zone | None:
    stated, headed = zone_argument(zone), columns.zone_of_heading
    if stated and headed and (stated.minutes, stated.region) != (headed.minutes, headed.region):
        raise refusal(
            "zone", f"is not that of the heading, {headed.name}; one of the two is wrong", stated.name
        )
    return headed or stated


class _Reader:
    """The state of a reading."""

    def __init__(self, columns: Columns, delimiter: str, zone: Zone | None, unit: str | None) -> None:
        self.columns, self.delimiter, self.zone = columns, delimiter, zone
        self.unit = unit_named(unit) if unit else ""
        self.faults = Faults()
        self.collectors: dict[tuple[str, ...], Collector] = {}
        self.texts = self.others = 0

    def row(self, number: int, line: str, delimiter: str, header: list[str] | None) -> None:
        cells = line.split(delimiter) if '"' not in line else _cells(line, delimiter)
        width = self.columns.width
        if len(cells) != width:
            while len(cells) > width and not cells[-1].strip():
                cells.pop()
        if len(cells) != width:
            self._odd(number, cells, width)
            return
        if header is not None and cells == header:
            return
        if not self._is_level(cells):
            self.others += 1
            return
        place = f"line {number}"
        try:
            stamp = self._stamp(cells)
        except UnreadableTimeError as error:
            self.faults.add(place, str(error), cells[self.columns.time].strip())
            return
        for column in self.columns.levels:
            try:
                self._collector(column, cells, place).add(
                    stamp, cells[column.index], self._cell(cells, "qualifier")
                )
            except UnreadableLevelError as error:
                self.faults.add(place, str(error), cells[column.index].strip())

    def _odd(self, number: int, cells: list[str], width: int) -> None:
        if sum(1 for cell in cells if cell.strip()) <= 1 and not any(c.isdigit() for c in "".join(cells)):
            self.texts += 1
            return
        comma = (
            "; is that a decimal comma? Write 22.10"
            if self.delimiter == "commas" and len(cells) > width
            else ""
        )
        rule = f"has {len(cells)} cells between {self.delimiter} where the headings have {width}{comma}"
        self.faults.add(f"line {number}", rule)

    def _cell(self, cells: list[str], role: str) -> str:
        index = self.columns.others.get(role)
        return cells[index].strip() if index is not None else ""

    def _is_level(self, cells: list[str]) -> bool:
        parameter = self._cell(cells, "parameter")
        if parameter.isdigit() and parameter not in PARAMETERS:
            return False
        statistic = self._cell(cells, "statistic")
        return not statistic.isdigit() or statistic in INSTANTANEOUS

    def _stamp(self, cells: list[str]) -> Stamp | None:
        text = cells[self.columns.time].strip()
        if self.columns.clock is not None:
            text = f"{text} {cells[self.columns.clock].strip()}"
        zone = self._cell(cells, "zone")
        return read_stamp(text, zone_named(zone) if zone else self.zone)

    def _collector(self, column: LevelColumn, cells: list[str], place: str) -> Collector:
        key = (
            str(column.index),
            *(self._cell(cells, role) for role in ("gauge", "member", "parameter", "unit", "issued")),
            self._cell(cells, "zone") if "issued" in self.columns.others else "",
        )
        known = self.collectors.get(key)
        if known is None:
            if len(self.collectors) >= MOST_SERIES:
                raise refusal(THE_FILE, f"holds more than {MOST_SERIES} series")
            known = self.collectors[key] = self._new(column, cells, place)
        return known

    def _new(self, column: LevelColumn, cells: list[str], place: str) -> Collector:
        gauge = label(self._cell(cells, "gauge"))
        parameter = PARAMETERS.get(self._cell(cells, "parameter"))
        unit = column.unit or self._row_unit(cells, place)
        if parameter and parameter.unit != unit:
            raise refusal(place, f"is not in {parameter.unit}, the unit of its parameter code", unit)
        return Collector(
            name=f"{gauge} {column.name}".strip(), parameter=parameter.name if parameter else "water level",
            kind=column.kind, unit=unit, gauge=gauge, datum=parameter.datum if parameter else column.datum,
            issued=self._issued(cells, place),
        )  # fmt: skip

    def _row_unit(self, cells: list[str], place: str) -> str:
        stated = self._cell(cells, "unit")
        try:
            unit = unit_named(stated)
        except UnreadableLevelError as error:
            raise refusal(place, f"has a unit that {error}", stated) from None
        if self.unit and unit != self.unit:
            raise refusal(place, f"is in {unit}, but {self.unit} was stated; one of the two is wrong")
        return unit

    def _issued(self, cells: list[str], place: str) -> int | None:
        text, zone = self._cell(cells, "issued"), self._cell(cells, "zone")
        try:
            stamp = read_stamp(text, zone_named(zone) if zone else self.zone)
        except UnreadableTimeError as error:
            raise refusal(place, f"has a time of issue that {error}", text) from None
        return None if stamp is None else stamp.seconds

    def finished(self) -> list[Series]:
        self.faults.raise_any()
        notes = [*self.columns.notes, f"The cells stand between {self.delimiter}."]
        if self.others:
            notes.append(f"Rows that are not levels at an instant are left out: {self.others}.")
        if self.texts:
            notes.append(f"Lines of text between or below the rows are left out: {self.texts}.")
        return finished(self.collectors.values(), notes)
