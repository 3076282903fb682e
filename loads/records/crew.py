"""Crews with what they can do, and what the clock of one barrier needs beyond its geometry."""

from __future__ import annotations

import datetime as dt
from collections import Counter
from collections.abc import Mapping, Sequence
from typing import Annotated, Literal

from pydantic import BeforeValidator, Field, model_validator

from loads.quantity import Quantity
from loads.records.base import (
    Measure,
    Name,
    Note,
    Record,
    problem_error,
    read_date,
    several_problems,
)
from loads.records.gauge import Id, Triple, nearest_id
from loads.records.moment import Moment

Skill = Literal["lift"]
People = Annotated[int, Field(ge=1, le=500, description="Number of people.")]
Pieces = Annotated[int, Field(ge=0, le=20_000, description="Number of pieces.")]


def _span(meaning: str, example: str) -> Measure:
    return Measure(kind="duration", meaning=meaning, least="0 min", most="400 h", example=example)


class Crew(Record):
    """People and plant that go from closure to closure together."""

    id: Id
    name: Name = ""
    people: People
    can: Annotated[tuple[Skill, ...], Field(max_length=8, strict=False)] = ()
    available_from: Moment
    mobilisation: Annotated[Quantity, _span("From the call to leaving", "30 min")] | None = None
    travel: Annotated[Quantity, _span("From leaving to the first closure", "45 min")] | None = None
    move: Annotated[Quantity, _span("From one closure to the next", "20 min")] | None = None
    note: Note = ""


class Drill(Record):
    """A trial erection that was timed: as a whole with what was built, or for each piece."""

    date: Annotated[dt.date, BeforeValidator(read_date)]
    people: People | None = None
    install_time: (
        Annotated[
            Quantity,
            Measure(
                kind="duration",
                meaning="From the first post to the last log",
                above="0 min",
                most="400 h",
                example="8.5 h",
            ),
        ]
        | None
    ) = None
    posts: Pieces | None = None
    logs: Pieces | None = None
    minutes_per_post: Annotated[Quantity, _span("Measured for one post", "12 min")] | None = None
    minutes_per_log: Annotated[Quantity, _span("Measured for one log", "4 min")] | None = None
    note: Note = ""

    @model_validator(mode="after")
    def _one_kind_of_measurement(self) -> Drill:
        by_piece = self.minutes_per_log is not None or self.minutes_per_post is not None
        if by_piece == (self.install_time is not None):
            raise problem_error(
                "needs either install_time, or minutes_per_log or minutes_per_post or both of these"
            )
        if by_piece and (self.posts is not None or self.logs is not None):
            raise problem_error("has posts or logs, which go with install_time; leave them out")
        return self


class BarrierClock(Record):
    """What the clock of one barrier needs beyond its geometry."""

    install_time: (
        Annotated[
            Quantity,
            Measure(
                kind="duration", meaning="Time to close it", above="0 min", most="400 h", example="7.5 h"
            ),
        ]
        | None
    ) = None
    install_people: People | None = None
    preparation: (
        Annotated[Quantity, _span("Covers off, cleaning, staging, before the first post", "40 min")] | None
    ) = None
    wave_allowance: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="How far below the sill still water counts as at the sill, for waves and run-up",
                least="0 ft",
                most="50 ft",
                example="0.5 ft",
            ),
        ]
        | None
    ) = None
    removal_stage: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="Gauge reading from which upward nothing is taken out",
                least="-2000 ft",
                most="30000 ft",
                example="24.0 ft",
            ),
        ]
        | None
    ) = None
    owner: Name = ""
    tell_owner_ahead: (
        Annotated[Quantity, _span("How long before the start the owner must be told", "6 h")] | None
    ) = None
    needs: Annotated[tuple[Skill, ...], Field(max_length=8, strict=False)] = ()
    order: Annotated[int, Field(ge=1, le=999, description="Place in the order, pinned by hand.")] | None = (
        None
    )
    crew: Name = ""
    drill: Annotated[tuple[Drill, ...], Field(max_length=50, strict=False)] = ()

    @model_validator(mode="after")
    def _fields_go_together(self) -> BarrierClock:
        problems = []
        if self.owner and self.tell_owner_ahead is None:
            rule = f'is missing; how long before the start must "{self.owner}" be told?'
            problems.append(("tell_owner_ahead", "", rule))
        if self.install_people is not None and self.install_time is None:
            problems.append(("install_people", "given", "it goes with install_time; leave it out"))
        if problems:
            raise several_problems(problems)
        return self

    @property
    def newest_drill(self) -> Drill | None:
        """The drill of the latest day, or None."""
        return max(self.drill, key=lambda drill: drill.date, default=None)


def crew_problems(crews: Sequence[Crew], clocks: Mapping[str, BarrierClock]) -> list[Triple]:
    """What is wrong with the crews of a scenario as a whole.

    Parameters
    ----------
    crews
        Of the scenario.
    clocks
        By the path of their barrier, for example ``closure[C7]``.

    Returns
    -------
    list of (path, value, rule)
        For `loads.records.base.several_problems`.
    """
    counts = Counter(crew.id for crew in crews)
    problems = [
        (f"crew[{name}].id", f'"{name}"', f"{count} crews have it; each needs its own")
        for name, count in counts.items()
        if count > 1
    ]
    return problems + [
        (
            f"{path}.clock.crew",
            f'"{clock.crew}"',
            f"no crew has that id{nearest_id(clock.crew, counts)}",
        )
        for path, clock in clocks.items()
        if clock.crew and clock.crew not in counts
    ]
