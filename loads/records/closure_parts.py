"""Logs, removable posts with their braces, and anchors of a closure."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import AfterValidator, Field, field_validator, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Record, several_problems
from loads.records.member import (
    LogLimits,
    LogSection,
    Modulus,
    PostLimits,
    PostSection,
    known_material,
    small_size,
)
from loads.records.per_bay import WholeNumbers

Material = Annotated[Name, AfterValidator(known_material)]
Weight = Annotated[Quantity, Measure(kind="weight", meaning="Weight of one piece", above="0 lb")]
Whole = int | tuple[int, ...]


class Log(Record):
    """The logs of a closure, all alike."""

    height: Annotated[
        Quantity,
        Measure(
            kind="length",
            meaning="Effective height of one log, as stacked under its seals",
            above="0 ft",
            most="20 ft",
            example="9 in",
        ),
    ]
    count: Annotated[Whole, WholeNumbers(meaning="Logs on hand for each bay", least=1, most=200)]
    bearing_length: (
        Annotated[Quantity, small_size("Length over which a log bears at each end", "3 in")] | None
    ) = None
    weight: Weight | None = None
    material: Material | None = None
    modulus: Modulus | None = None
    section: LogSection | None = None
    fills_with_water: bool = False
    limits: LogLimits = LogLimits()

    @model_validator(mode="after")
    def _walls_fit(self) -> Log:
        section = self.section
        if section and section.wall:
            height = section.height or self.height
            if (2 + section.ribs) * section.wall.value >= height.value:
                rule = "it leaves no hollow within the height of the log"
                raise several_problems([("section.wall", f'"{section.wall.text}"', rule)])
        return self


class Brace(Record):
    """A brace that props a post from the protected side."""

    height: Annotated[Quantity, small_size("Height above the sill at which it meets the post", "4 ft")]
    angle: Annotated[
        Quantity,
        Measure(
            kind="angle",
            meaning="Angle of the brace from the horizontal",
            least="0 deg",
            most="85 deg",
            example="45 deg",
        ),
    ]
    fixity: Literal["fixed", "pinned"] = Field(
        default="fixed", description="How the base plate of a braced post holds it against turning"
    )


class Post(Record):
    """The removable posts between the bays, all alike."""

    section: PostSection | None = None
    material: Material | None = None
    modulus: Modulus | None = None
    width: Annotated[Quantity, small_size("Width of the post's face", "6 in")] | None = None
    height: Annotated[Quantity, small_size("Height of the post above the sill", "7 ft")] | None = None
    weight: Weight | None = None
    brace: Brace | None = None
    limits: PostLimits = PostLimits()

    @model_validator(mode="after")
    def _parts_fit(self) -> Post:
        problems = []
        section = self.section
        if self.brace and self.height and self.brace.height.value > self.height.value:
            rule = f'it must not be above the top of the post, "{self.height.text}"'
            problems.append(("brace.height", f'"{self.brace.height.text}"', rule))
        if self.limits.brace_force and not self.brace:
            rule = "there is no brace; enter one or leave the limit out"
            problems.append(("limits.brace_force", f'"{self.limits.brace_force.text}"', rule))
        if section and section.shape != "properties":
            width = section.width or self.width
            if width is None:
                problems.append(("section.width", "", "is missing; enter it here or as the post's width"))
            elif section.wall and (2 + section.ribs) * section.wall.value >= width.value:
                rule = "it leaves no hollow within the width of the post"
                problems.append(("section.wall", f'"{section.wall.text}"', rule))
        if problems:
            raise several_problems(problems)
        return self


class Anchor(Record):
    """Bolts that hold a post's base plate down, and the plate."""

    tension_bolts: Annotated[int, Field(ge=1, le=100)] | None = Field(
        default=None, description="Bolts on the side that is pulled"
    )
    shear_bolts: Annotated[int, Field(ge=1, le=100)] | None = Field(
        default=None, description="Bolts that share the shear"
    )
    lever_arm: (
        Annotated[Quantity, small_size("From the bolts pulled to the centre of compression", "10 in")] | None
    ) = None
    bolt_distances: (
        Annotated[
            tuple[
                Annotated[Quantity, small_size("Distance of a bolt from the edge in compression", "8 in")],
                ...,
            ],
            Field(min_length=1, max_length=50, strict=False),
        ]
        | None
    ) = None
    plate_width: Annotated[Quantity, small_size("Width of the base plate", "12 in")] | None = None
    contact_length: (
        Annotated[Quantity, small_size("Length of plate that bears on the concrete", "3 in")] | None
    ) = None

    @field_validator("bolt_distances", mode="before")
    @classmethod
    def _list_becomes_tuple(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _bolts_have_an_arm(self) -> Anchor:
        problems = []
        if self.tension_bolts is not None and self.lever_arm is None and self.bolt_distances is None:
            rule = "is missing; bolts that are pulled need it, or the distances of all bolts"
            problems.append(("lever_arm", "", rule))
        if self.lever_arm is not None and self.tension_bolts is None and self.bolt_distances is None:
            rule = "is missing; a lever arm says nothing without the number of bolts"
            problems.append(("tension_bolts", "", rule))
        if self.bolt_distances is not None:
            problems += [
                (name, "given", "is not used beside bolt_distances; leave one of them out")
                for name in ("lever_arm", "tension_bolts")
                if getattr(self, name) is not None
            ]
        if (self.plate_width is None) != (self.contact_length is None):
            name = "plate_width" if self.plate_width is None else "contact_length"
            problems.append((name, "", "is missing; the area of contact is width times length"))
        if problems:
            raise several_problems(problems)
        return self
