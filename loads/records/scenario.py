"""The scenario: datum, water and everything that stands on the flood line."""

from __future__ import annotations

import re
from datetime import datetime
from typing import Annotated, Any, Literal

from pydantic import Field, field_validator, model_validator

from loads.records.base import Name, Note, Record, several_problems
from loads.records.basis import Basis
from loads.records.closure import Closure
from loads.records.crew import Crew, crew_problems
from loads.records.fluid import FluidKind, Salinity, SuspendedSediment, Temperature, UnitWeight
from loads.records.gauge import Gauge, gauge_problems
from loads.records.i_wall import IWall
from loads.records.moment import Moment, ZoneName
from loads.records.panel import Elevation, Panel
from loads.records.reading import Reading
from loads.records.series import DataAge, StoredForecast, StoredObservation, series_problems
from loads.records.wall import Wall

FORMAT = 1
"""Version of the scenario format that this program writes; it reads every version up to it."""


class Water(Record):
    """Still-water levels on both sides and what the water is."""

    flood_side: Elevation
    protected_side: Elevation | None = None
    as_of: Moment | None = None
    fluid: FluidKind = "fresh"
    temperature: Temperature | None = None
    salinity: Salinity | None = None
    suspended_sediment: SuspendedSediment | None = None
    unit_weight: UnitWeight | None = None
    protected_fluid: FluidKind | None = None
    protected_temperature: Temperature | None = None
    protected_salinity: Salinity | None = None
    protected_suspended_sediment: SuspendedSediment | None = None
    protected_unit_weight: UnitWeight | None = None

    @model_validator(mode="after")
    def _custom_has_a_weight(self) -> Water:
        problems = []
        for prefix, fluid in (("", self.fluid), ("protected_", self.protected_fluid)):
            weight = getattr(self, f"{prefix}unit_weight")
            if fluid == "custom" and weight is None:
                problems.append(
                    (f"{prefix}unit_weight", "", 'is missing; fluid "custom" needs it, for example "64 pcf"')
                )
            for name in ("temperature", "salinity", "suspended_sediment"):
                given = getattr(self, f"{prefix}{name}") is not None
                if given and (weight is not None or fluid == "custom"):
                    rule = (
                        "would not be used, because a unit weight is entered directly; leave one of them out"
                    )
                    problems.append((f"{prefix}{name}", "given", rule))
            if getattr(self, f"{prefix}salinity") is not None and (fluid or self.fluid) == "fresh":
                problems.append(
                    (f"{prefix}salinity", "given", 'is for fluid "sea"; leave it out or say "sea"')
                )
        described = ("temperature", "salinity", "suspended_sediment")
        own = any(getattr(self, f"protected_{name}") is not None for name in described)
        if self.fluid == "custom" and self.protected_fluid is None and own:
            rule = 'is missing; with fluid "custom" on the flood side say what the water here is'
            problems.append(("protected_fluid", "", rule))
        if problems:
            raise several_problems(problems)
        return self


class Scenario(Record):
    """One flood line with the water on both sides of it."""

    format: Annotated[int, Field(ge=1, le=FORMAT)]
    title: Annotated[Name, Field(min_length=1)]
    location: Name = ""
    purpose: Note = ""
    author: Name = ""
    revision: Name = ""
    status: Literal["draft", "screening", "for review"] = "screening"
    datum: Annotated[Name, Field(min_length=1)]
    units: Literal["US", "SI"] = "US"
    zone: ZoneName | None = None
    near_limit: Annotated[float, Field(ge=0.5, lt=1, allow_inf_nan=False)] = 0.9
    basis: Basis = Basis()
    water: Water
    panel: Annotated[tuple[Panel, ...], Field(max_length=500)] = ()
    closure: Annotated[tuple[Closure, ...], Field(max_length=500)] = ()
    wall: Annotated[tuple[Wall, ...], Field(max_length=500)] = ()
    i_wall: Annotated[tuple[IWall, ...], Field(max_length=500)] = ()
    reading: Annotated[tuple[Reading, ...], Field(max_length=200)] = ()
    gauge: Annotated[tuple[Gauge, ...], Field(max_length=50)] = ()
    crew: Annotated[tuple[Crew, ...], Field(max_length=100)] = ()
    forecast: Annotated[tuple[StoredForecast, ...], Field(max_length=100)] = ()
    observed: Annotated[tuple[StoredObservation, ...], Field(max_length=50)] = ()
    data_age: DataAge = DataAge()

    @field_validator(
        "panel",
        "closure",
        "wall",
        "i_wall",
        "reading",
        "gauge",
        "crew",
        "forecast",
        "observed",
        mode="before",
    )
    @classmethod
    def _list_becomes_tuple(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _clock_fits_the_line(self) -> Scenario:
        clocks = {f"closure[{one.id}]": one.clock for one in self.closure if one.clock is not None}
        gauges = [gauge.id for gauge in self.gauge]
        problems = [
            *gauge_problems(self.gauge, [barrier.id for barrier in self.barriers], self.datum),
            *crew_problems(self.crew, clocks),
            *series_problems(gauges, self.forecast, self.observed),
        ]
        if problems:
            raise several_problems(problems)
        return self

    @property
    def barriers(self) -> tuple[Panel | Closure | Wall | IWall, ...]:
        """Everything that stands on the line, kind by kind, in the order of the file."""
        return (*self.panel, *self.closure, *self.wall, *self.i_wall)


def scenario_schema() -> dict[str, Any]:
    """JSON schema of the scenario format."""
    schema = Scenario.model_json_schema()
    schema["$schema"] = "https://json-schema.org/draft/2020-12/schema"
    schema["title"] = "Sillhead scenario, format 1"
    return schema


def zone_name(moment: datetime) -> str:
    """Offset of a time as people write it, for example UTC−05:00."""
    offset = moment.strftime("%z")
    return "UTC" if re.fullmatch(r"[+-]0000", offset) else f"UTC{offset[:3]}:{offset[3:]}".replace("-", "−")
