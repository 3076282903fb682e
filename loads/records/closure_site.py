"""What surrounds the logs of a closure: guides, hold-downs, seals, adding, building and lifting them."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Note, Record, several_problems
from loads.records.closure_parts import Weight
from loads.records.member import small_size
from loads.records.panel import Elevation

Minutes = Annotated[
    Quantity,
    Measure(kind="duration", meaning="Time for one piece", least="0 s", most="100 h", example="3 min"),
]
Multiplier = Annotated[float, Field(gt=0, le=1, allow_inf_nan=False)]


class Guide(Record):
    """Guides and seals along the posts and abutments."""

    one_way: bool = Field(
        default=False, description="True when guides or seals bear water from the flood side only"
    )
    friction: Annotated[float, Field(ge=0, le=2, allow_inf_nan=False)] | None = Field(
        default=None, description="Friction of a log in its slots, force along over force across"
    )


class HoldDown(Record):
    """Clamps that hold the stack down."""

    capacity: Annotated[
        Quantity, Measure(kind="force", meaning="Holding force for each bay", above="0 lb", example="500 lb")
    ]


class Seal(Record):
    """Seal lines between logs, at the sill and at the ends, and the pump behind them."""

    rate: (
        Annotated[
            Quantity,
            Measure(kind="flow per length", meaning="Leakage for each length of seal line", least="0 gpm/ft"),
        ]
        | None
    ) = None
    at_head: (
        Annotated[Quantity, small_size("Head at which that leakage was measured or stated", "3 ft")] | None
    ) = None
    exponent: Annotated[float, Field(ge=0, le=5, allow_inf_nan=False)] | None = Field(
        default=None,
        description="Power of the head by which the leakage grows, 0.5 for an opening, 1 for a slow seep",
    )
    gap_width: Annotated[Quantity, small_size("Open gap along the height of each guide", "0.1 in")] | None = (
        None
    )
    pump_capacity: (
        Annotated[Quantity, Measure(kind="flow", meaning="Pump behind the closure", above="0 gpm")] | None
    ) = None

    @model_validator(mode="after")
    def _rate_has_a_head(self) -> Seal:
        rules = {
            "at_head": "is missing; a rate of leakage needs the head it was stated for",
            "exponent": "is missing; a rate of leakage needs the power of the head by which it grows: 0.5 "
            "for an opening, 1 for a slow seep",
        }
        problems = [
            (name, "", rule)
            for name, rule in rules.items()
            if self.rate is not None and getattr(self, name) is None
        ]
        if problems:
            raise several_problems(problems)
        return self


class Adding(Record):
    """Whether logs can be added once water stands at the sill."""

    with_water: bool
    side: Literal["flood", "protected", "either"] = "protected"
    up_to: Elevation | None = None

    @model_validator(mode="after")
    def _level_only_with_water(self) -> Adding:
        if self.up_to is not None and not self.with_water:
            rule = "is not used while logs cannot be added with water at the sill; leave it out"
            raise several_problems([("up_to", f'"{self.up_to.text}"', f"it {rule}")])
        return self


class Install(Record):
    """What building takes."""

    minutes_per_log: Minutes | None = None
    minutes_per_post: Minutes | None = None
    people: Annotated[int, Field(ge=1, le=1000)] | None = None
    lift: Note = ""
    lift_capacity: (
        Annotated[Quantity, Measure(kind="weight", meaning="Load the lift may carry", above="0 lb")] | None
    ) = None


class Niosh(Record):
    """Conditions of a lift, for the revised NIOSH lifting equation."""

    horizontal: Annotated[Quantity, small_size("Hands in front of the ankles", "12 in")]
    vertical: Annotated[
        Quantity,
        Measure(kind="length", meaning="Hands above the floor", least="0 ft", most="10 ft", example="30 in"),
    ]
    travel: Annotated[
        Quantity,
        Measure(
            kind="length", meaning="How far the load is lifted", least="0 ft", most="10 ft", example="20 in"
        ),
    ]
    asymmetry: (
        Annotated[
            Quantity,
            Measure(kind="angle", meaning="Twist of the body", least="0 deg", most="180 deg"),
        ]
        | None
    ) = None
    frequency_multiplier: Multiplier
    coupling: Literal["good", "fair", "poor"]


class Handling(Record):
    """Lifting a log by hand."""

    people_per_log: Annotated[int, Field(ge=1, le=20)] = 2
    limit: Weight | None = None
    niosh: Niosh | None = None
