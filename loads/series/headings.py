"""Headings of a table of levels: which column is the time, which are levels, in which unit and zone."""

from __future__ import annotations

import re
from dataclasses import dataclass, field

from loads.series.levels import UnreadableLevelError, is_unit, unit_and_datum, unit_named
from loads.series.refusals import printable, refusal
from loads.series.series import Kind
from loads.series.stamps import UnreadableTimeError, Zone, zone_named

_ROLES = {
    "time": ("time", "datetime", "date/time", "date time", "timestamp", "time stamp", "valid time",
             "validtime", "date and time", "dt", "t", "date"),
    "zone": ("tz", "tz cd", "zone", "timezone", "time zone", "utc offset", "offset"),
    "gauge": ("site no", "gauge", "gage", "station", "station id", "site", "monitoring location id", "lid",
              "gauge id", "gage id", "location"),
    "unit": ("unit", "units", "unit of measure"),
    "parameter": ("parameter", "parameter code", "parm cd"),
    "statistic": ("statistic id", "statistic"),
    "member": ("time series id",),
    "issued": ("issued", "issue time", "issued time", "issuedtime", "issued at", "issue"),
    "qualifier": ("qualifier", "qualifiers", "flag", "flags", "quality", "approval status", "status",
                  "remark"),
}  # fmt: skip
_LEVEL = re.compile(
    r"\b(stages?|levels?|gage height|gauge height|height|elevation|wse|wl|value|primary|h|hg\w*|low|likely|"
    r"high|water surface|forecast|fcst|observed|obs)\b"
)
_NOT_LEVEL = re.compile(
    r"\b(sigma|std|error|uncertainty|flags?|qual\w*|cd|inferred|tol|limit\w*|accuracy|flow|discharge|temp\w*|rain\w*|"
    r"precip\w*|snow|wind|pressure|conductivity|turbidity|battery|speed|velocity|depth|below|wave|count|id|x|y|lat\w*|"
    r"lon\w*|last modified|salinity|humidity|sea level pressure|minus|plus|"
    r"crest|flood|action|minor|moderate|major|warning|threshold|alarm|datum|zero|change|rise|rate|sill|bank|ground)\b|limittol"
)
_FORECAST = re.compile(r"\b(forecast|fcst|predicted|predictions?|low|likely|high)\b")
_HINT = re.compile(r"(.*?)\s*(?:[\[(]([^\])]*)[\])]|[:;,]\s*(.+))\s*")
_TAIL = re.compile(r"(.+)[\s_](\S+)")


@dataclass(frozen=True, kw_only=True)
class Heading:
    """One column: its words, and the unit or zone written with them."""

    text: str
    words: str
    hint: str


@dataclass(kw_only=True)
class Columns:
    """Positions of the columns by their role."""

    width: int
    time: int = 0
    clock: int | None = None
    zone_of_heading: Zone | None = None
    others: dict[str, int] = field(default_factory=dict)
    levels: tuple[LevelColumn, ...] = ()
    notes: list[str] = field(default_factory=list)


@dataclass(frozen=True, kw_only=True)
class LevelColumn:
    """One column of levels; its unit is empty when another column gives it."""

    index: int
    name: str
    kind: Kind
    unit: str
    datum: str | None = None


def _words(text: str) -> str:
    return " ".join(re.sub(r"[_\s-]+", " ", text.casefold()).split())


def heading(text: str) -> Heading:
    """Words and hint of one heading, such as ``stage [ft]``, ``stage_ft``, ``level:m`` or ``time (UTC)``.

    Examples
    --------
    >>> heading("Gauge height [ft]").hint
    'ft'
    >>> heading("datetime_utc").words
    'datetime'
    """
    plain = printable(" ".join(text.strip().split())[:200])
    match = _HINT.fullmatch(plain)
    if match:
        return Heading(text=plain, words=_words(match[1]), hint=(match[2] or match[3] or "").strip())
    tail = _TAIL.fullmatch(plain)
    if tail and (is_unit(tail[2]) or _is_zone(tail[2])):
        return Heading(text=plain, words=_words(tail[1]), hint=tail[2])
    return Heading(text=plain, words=_words(plain), hint="")


def _is_zone(text: str) -> bool:
    try:
        zone_named(text)
    except UnreadableTimeError:
        return False
    return True


def is_header(cells: list[str]) -> bool:
    """Tell whether a row is the row of headings: one of its cells is a time, another is not empty."""
    filled = [cell for cell in cells if cell.strip()]
    return len(filled) > 1 and any(heading(cell).words in _ROLES["time"] for cell in filled)


def columns_of(cells: list[str], *, number: int, unit: str | None, kind: Kind | None) -> Columns:
    """Find the roles of the columns.

    Parameters
    ----------
    cells
        Row of headings.
    number
        Its line in the file.
    unit
        Unit that a person stated, for headings without one.
    kind
        Kind that a person stated, for headings that do not tell.

    Raises
    ------
    ScenarioError
        No time, no level, no unit, or a stated unit that is not that of the heading.
    """
    where = f"line {number}"
    headings = [heading(cell) for cell in cells]
    found = Columns(width=len(cells))
    times = [index for index, one in enumerate(headings) if one.words in _ROLES["time"]]
    _set_times(found, headings, times, where)
    for role, known in _ROLES.items():
        for index, one in enumerate(headings):
            if role != "time" and one.words in known and role not in found.others:
                found.others[role] = index
    taken = {found.time, found.clock, *found.others.values()}
    free = [(index, one) for index, one in enumerate(headings) if index not in taken and one.words]
    levels = [(i, one) for i, one in free if _LEVEL.search(one.words) and not _NOT_LEVEL.search(one.words)]
    if not levels:
        levels = [
            (i, one)
            for i, one in free
            if is_unit(one.hint.split(" ")[0]) and not _NOT_LEVEL.search(one.words)
        ]
    if not levels:
        levels = [(i, one) for i, one in free if not _NOT_LEVEL.search(one.words)]
        levels = levels if len(levels) == 1 else []
    if not levels:
        names = ", ".join(one.text for _, one in free) or "none but the time"
        raise refusal(
            where, f"has no column that is plainly a level, such as stage [ft]; its columns are {names[:160]}"
        )
    found.levels = tuple(
        _level(index, one, found, where=where, unit=unit, kind=kind) for index, one in levels
    )
    _tell(found, headings)
    return found


def _set_times(found: Columns, headings: list[Heading], times: list[int], where: str) -> None:
    dates = [index for index in times if headings[index].words == "date"]
    clocks = [index for index in times if headings[index].words in ("time", "t")]
    if len(times) == 2 and dates and clocks:
        found.time, found.clock = dates[0], clocks[0]
    elif len(times) == 1:
        found.time = times[0]
    else:
        names = ", ".join(headings[index].text for index in times)
        raise refusal(where, f"has several columns of time ({names[:80]}); keep the one that counts")
    for index in times:
        if headings[index].hint:
            try:
                found.zone_of_heading = zone_named(headings[index].hint)
            except UnreadableTimeError:
                continue


def _level(
    index: int, one: Heading, found: Columns, *, where: str, unit: str | None, kind: Kind | None
) -> LevelColumn:
    stated = one.hint
    column = f"{where}, column {one.text}"
    if not stated:
        if not unit and "unit" not in found.others:
            raise refusal(
                column, "gives no unit; write it in the heading, for example stage [ft], or state it"
            )
        stated = "" if "unit" in found.others else str(unit)
    try:
        symbol, datum = unit_and_datum(stated) if stated else ("", None)
        asked = unit_named(unit) if unit else symbol
    except UnreadableLevelError as error:
        raise refusal(column, f"has a unit that {error}", stated or unit) from None
    if symbol and symbol != asked:
        raise refusal(column, f"is headed {symbol}, but {asked} was stated; one of the two is wrong")
    forecast = "issued" in found.others or _FORECAST.search(one.words) is not None
    told: Kind = kind or ("forecast" if forecast else "observed")
    return LevelColumn(index=index, name=one.words, kind=told, unit=symbol, datum=datum)


def _tell(found: Columns, headings: list[Heading]) -> None:
    time = headings[found.time].text
    names = ", ".join(headings[column.index].text for column in found.levels)
    found.notes.append(f"Column {time} is read as time, {names} as level."[:200])
    kinds = {column.kind for column in found.levels}
    if kinds == {"observed"}:
        found.notes.append("Nothing says forecast, so the levels are taken as observed.")
    bare = [column.name for column in found.levels if not column.datum]
    if any(re.search(r"\b(elevation|wse)\b", name) for name in bare):
        found.notes.append(
            "An elevation is given without its datum; write it in the heading, as [ft NAVD88]."
        )
    used = {found.time, found.clock, *found.others.values(), *(column.index for column in found.levels)}
    rest = [one.text for index, one in enumerate(headings) if index not in used and one.text]
    if rest:
        found.notes.append(f"Columns left out: {', '.join(rest)}."[:200])
