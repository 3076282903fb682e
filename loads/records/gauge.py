"""A river gauge, and how its reading is carried to the barriers."""

from __future__ import annotations

import datetime as dt
import difflib
import re
from collections import Counter
from collections.abc import Collection, Sequence
from itertools import pairwise
from typing import Annotated

from pydantic import BeforeValidator, Field, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, read_date, several_problems
from loads.records.panel import Elevation

Triple = tuple[str, str, str]
_LEAST_RISE = 1e-6
Id = Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]


def _stage(meaning: str, example: str) -> Measure:
    return Measure(kind="length", meaning=meaning, least="-2000 ft", most="30000 ft", example=example)


def _difference(meaning: str, example: str) -> Measure:
    return Measure(kind="length", meaning=meaning, least="-1000 ft", most="1000 ft", example=example)


_table_stage = _stage("Reading of the gauge", "20 ft")
_table_offset = _difference("Level at the barrier less level at the gauge", "-0.6 ft")
Pair = Annotated[
    tuple[Annotated[Quantity, _table_stage], Annotated[Quantity, _table_offset]], Field(strict=False)
]


class Transfer(Record):
    """Water-surface difference from the gauge to one barrier or several."""

    to: Annotated[tuple[Id, ...], Field(min_length=1, max_length=500, strict=False)]
    offset: (
        Annotated[Quantity, _difference("Level at the barrier less level at the gauge", "-0.60 ft")] | None
    ) = None
    slope: (
        Annotated[
            float,
            Field(
                ge=-0.1,
                le=0.1,
                allow_inf_nan=False,
                description="Fall of the water surface per length downstream; 0.0001 is 0.53 ft in a mile.",
            ),
        ]
        | None
    ) = None
    distance_downstream: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="How far downstream of the gauge the barrier lies; negative when upstream",
                least="-2000000 ft",
                most="2000000 ft",
                example="3200 ft",
            ),
        ]
        | None
    ) = None
    table: Annotated[tuple[Pair, ...], Field(min_length=2, max_length=200, strict=False)] | None = None
    uncertainty: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="By how much the difference may be off, either way",
                least="0 ft",
                most="100 ft",
                example="0.3 ft",
            ),
        ]
        | None
    ) = None
    lowest_stage: Annotated[Quantity, _stage("Lowest reading for which this holds", "20 ft")] | None = None
    highest_stage: Annotated[Quantity, _stage("Highest reading for which this holds", "32 ft")] | None = None
    source: Note = ""
    date: Annotated[dt.date | None, BeforeValidator(read_date)] = None

    @model_validator(mode="after")
    def _one_way_that_rises(self) -> Transfer:
        problems = self._form_problems() + self._pedigree_problems()
        if self.lowest_stage and self.highest_stage and self.lowest_stage.value >= self.highest_stage.value:
            rule = f'it must be below highest_stage, "{self.highest_stage.text}"'
            problems.append(("lowest_stage", f'"{self.lowest_stage.text}"', rule))
        for i, (lower, upper) in enumerate(pairwise(self.table or ()), 1):
            problems += _rising_problems(i, lower, upper)
        if problems:
            raise several_problems(problems)
        return self

    def _form_problems(self) -> list[Triple]:
        sloped = (self.slope is not None, self.distance_downstream is not None)
        if any(sloped) and not all(sloped):
            name = "distance_downstream" if sloped[0] else "slope"
            return [(name, "", "is missing; a slope and a distance_downstream go together")]
        if (self.offset is not None) + all(sloped) + (self.table is not None) == 1:
            return []
        return [("", "", "needs exactly one of an offset, a slope with a distance_downstream, and a table")]

    def _pedigree_problems(self) -> list[Triple]:
        if self.offset is None:
            return []
        rule = "belongs to the offset itself; write offset = { value = …, low = …, high = …, source = … }"
        return [(name, "given", rule) for name in ("uncertainty", "source", "date") if getattr(self, name)]


def _rising_problems(i: int, lower: Pair, upper: Pair) -> list[Triple]:
    if upper[0].value <= lower[0].value:
        rule = f'it must be above the reading before it, "{lower[0].text}"'
        return [(f"table[{i}]", f'"{upper[0].text}"', rule)]
    if upper[0].value + upper[1].value - lower[0].value - lower[1].value < _LEAST_RISE:
        rule = "the level at the barrier must rise with the reading, and here it does not"
        return [(f"table[{i}]", f'"{upper[1].text}"', rule)]
    return []


class Gauge(Record):
    """One river gauge: where its zero lies, what it can be trusted for, and where its reading leads."""

    id: Id
    name: Name = ""
    number: Name = ""
    zero: Elevation | None = None
    datum: Name = ""
    datum_shift: (
        Annotated[
            Quantity,
            _difference("What is added to an elevation in the gauge's datum for the scenario's", "3.4 ft"),
        ]
        | None
    ) = None
    lowest_true_reading: Annotated[Quantity, _stage("Lowest reading to trust", "2 ft")] | None = None
    highest_true_reading: Annotated[Quantity, _stage("Highest reading to trust", "31 ft")] | None = None
    lowest_on_record: Annotated[Quantity, _stage("Lowest reading in its history", "4 ft")] | None = None
    highest_on_record: Annotated[Quantity, _stage("Highest reading in its history", "28 ft")] | None = None
    fastest_change: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="Change of the reading in one hour that is not believed without a second look",
                above="0 ft",
                most="100 ft",
                example="1.5 ft",
            ),
        ]
        | None
    ) = None
    transfer: Annotated[tuple[Transfer, ...], Field(max_length=500, strict=False)] = ()
    note: Note = ""

    @model_validator(mode="after")
    def _whole(self) -> Gauge:
        problems: list[Triple] = []
        if self.zero is not None and not self.datum.strip():
            rule = "is missing; the gauge's zero is an elevation in some datum, and it is not assumed"
            problems.append(("datum", "", rule))
        if self.datum_shift is not None and not self.datum_shift.source.strip():
            rule = 'needs its source, for example { value = "3.4 ft", source = "levelling of 2029" }'
            problems.append(("datum_shift", f'"{self.datum_shift.text}"', rule))
        for low, high in (
            ("lowest_true_reading", "highest_true_reading"),
            ("lowest_on_record", "highest_on_record"),
        ):
            lower, upper = getattr(self, low), getattr(self, high)
            if lower is not None and upper is not None and lower.value >= upper.value:
                problems.append((low, f'"{lower.text}"', f'it must be below {high}, "{upper.text}"'))
        counts = Counter(barrier for transfer in self.transfer for barrier in set(transfer.to))
        problems += [
            (
                "transfer",
                "",
                f'leads to "{barrier}" {count} times; one way from a gauge to a barrier is enough',
            )
            for barrier, count in counts.items()
            if count > 1
        ]
        if problems:
            raise several_problems(problems)
        return self

    def transfer_to(self, barrier: str) -> Transfer | None:
        """The transfer that leads to a barrier, or None when nobody entered one."""
        return next((transfer for transfer in self.transfer if barrier in transfer.to), None)


def same_datum(one: str, other: str) -> bool:
    """Whether two names are of one datum: equal but for capitals, blanks, hyphens and points.

    Examples
    --------
    >>> same_datum("NAVD88", "navd 88")
    True
    """
    plain, also = (re.sub(r"[\s.\-]", "", name).casefold() for name in (one, other))
    return plain == also


def datum_problem(gauge: Gauge, datum: str) -> Triple | None:
    """What is wrong between the datum of a gauge and that of the scenario: (field, value, rule), or None."""
    if gauge.zero is None:
        return None
    same = same_datum(gauge.datum, datum)
    if same and gauge.datum_shift is not None:
        rule = f"it is not used, because gauge and barriers are both in {datum}; leave it out"
        return ("datum_shift", f'"{gauge.datum_shift.text}"', rule)
    if not same and gauge.datum_shift is None:
        rule = (
            f"is missing; the gauge is in {gauge.datum} and the barriers are in {datum}, and the shift from "
            "one to the other is not guessed; enter it with its source"
        )
        return ("datum_shift", "", rule)
    return None


def gauge_problems(gauges: Sequence[Gauge], barriers: Collection[str], datum: str) -> list[Triple]:
    """What is wrong with the gauges of a scenario as a whole.

    Parameters
    ----------
    gauges
        Of the scenario.
    barriers
        Ids of every barrier on the line.
    datum
        Of every level in the scenario.

    Returns
    -------
    list of (path, value, rule)
        For `loads.records.base.several_problems`.
    """
    problems: list[Triple] = []
    for name, count in Counter(gauge.id for gauge in gauges).items():
        if count > 1:
            problems.append((f"gauge[{name}].id", f'"{name}"', f"{count} gauges have it; each needs its own"))
    for gauge in gauges:
        found = datum_problem(gauge, datum)
        if found is not None:
            problems.append((f"gauge[{gauge.id}].{found[0]}", *found[1:]))
        for i, transfer in enumerate(gauge.transfer):
            for barrier in transfer.to:
                if barrier not in barriers:
                    where = f"gauge[{gauge.id}].transfer[{i}].to"
                    rule = f"no barrier has that id{nearest_id(barrier, barriers)}"
                    problems.append((where, f'"{barrier}"', rule))
    return problems


def nearest_id(name: str, known: Collection[str]) -> str:
    """End of the sentence about an unknown id: the nearest known one, or nothing."""
    near = difflib.get_close_matches(name, sorted(known), n=1, cutoff=0.5)
    return f'; did you mean "{near[0]}"?' if near else ""
