"""Sections of logs and posts, and the limits that somebody entered for them."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, model_validator

from loads.closure.materials import MATERIALS
from loads.quantity import Quantity
from loads.records.base import Measure, Record, nearest_key, problem_error, several_problems

SectionShape = Literal["rectangle", "hollow rectangle", "properties"]

Stress = Annotated[Quantity, Measure(kind="stress", meaning="Highest stress", above="0 psi")]
Modulus = Annotated[
    Quantity,
    Measure(
        kind="stress",
        meaning="Modulus of elasticity",
        above="0 ksi",
        most="1000 GPa",
        example="10100 ksi",
    ),
]
Capacity = Annotated[Quantity, Measure(kind="force", meaning="Highest force", above="0 lb")]
MomentCapacity = Annotated[
    Quantity, Measure(kind="moment", meaning="Highest bending moment", above="0 lb·ft")
]
Sag = Annotated[
    Quantity,
    Measure(kind="length", meaning="Greatest deflection", above="0 ft", most="10 ft", example="0.5 in"),
]


def small_size(meaning: str, example: str) -> Measure:
    """Field type of a dimension of a part."""
    return Measure(kind="length", meaning=meaning, above="0 ft", most="100 ft", example=example)


class Section(Record):
    """Cross-section of a part: its outer sizes, or its properties about the axis it bends about."""

    shape: SectionShape = "rectangle"
    thickness: Annotated[Quantity, small_size("Size along the flow, the depth in bending", "2 in")] | None = (
        None
    )
    wall: Annotated[Quantity, small_size("Thickness of the walls of a hollow section", "0.125 in")] | None = (
        None
    )
    ribs: Annotated[int, Field(ge=0, le=50)] = Field(
        default=0, description="Inner ribs along the flow, as thick as the walls"
    )
    section_modulus: (
        Annotated[Quantity, Measure(kind="section modulus", meaning="Elastic section modulus", above="0 in3")]
        | None
    ) = None
    second_moment: (
        Annotated[
            Quantity, Measure(kind="second moment of area", meaning="Second moment of area", above="0 in4")
        ]
        | None
    ) = None
    shear_area: (
        Annotated[
            Quantity,
            Measure(kind="area", meaning="Area by which a shear force is a shear stress", above="0 in2"),
        ]
        | None
    ) = None

    @model_validator(mode="after")
    def _shape_has_its_sizes(self) -> Section:
        needed = {"rectangle": ("thickness",), "hollow rectangle": ("thickness", "wall")}.get(self.shape, ())
        used = {"properties": ("thickness", "section_modulus", "second_moment", "shear_area")}
        problems = [
            (name, "", f'is missing; shape "{self.shape}" needs it')
            for name in needed
            if getattr(self, name) is None
        ]
        problems += [
            (name, "given", f'is not used by shape "{self.shape}"; leave it out')
            for name in ("wall", "section_modulus", "second_moment", "shear_area")
            if name not in used.get(self.shape, needed) and getattr(self, name) is not None
        ]
        if self.ribs and self.shape != "hollow rectangle":
            problems.append(("ribs", str(self.ribs), f'it is not used by shape "{self.shape}"; leave it out'))
        if self.wall and self.thickness and 2 * self.wall.value >= self.thickness.value:
            problems.append(("wall", f'"{self.wall.text}"', "it must be less than half the thickness"))
        if problems:
            raise several_problems(problems)
        return self


class LogSection(Section):
    """Cross-section of a log."""

    height: (
        Annotated[
            Quantity, small_size("Size along the log's height; the effective height if left out", "9 in")
        ]
        | None
    ) = None


class PostSection(Section):
    """Cross-section of a post."""

    width: (
        Annotated[Quantity, small_size("Size across the flow; the face width if left out", "6 in")] | None
    ) = None


class LogLimits(Record):
    """Limits that a responsible person entered for one log. None is ever assumed."""

    bending_stress: Stress | None = None
    shear_stress: Stress | None = None
    bearing_stress: Stress | None = None
    deflection: Sag | None = None
    span_over_deflection: Annotated[float, Field(gt=1, le=10000, allow_inf_nan=False)] | None = Field(
        default=None, description="Span divided by the greatest deflection allowed, for example 180"
    )
    moment: MomentCapacity | None = None
    shear: Capacity | None = None
    line_load: (
        Annotated[Quantity, Measure(kind="line load", meaning="Highest load along a log", above="0 lb/ft")]
        | None
    ) = None
    reaction: Capacity | None = None


class PostLimits(Record):
    """Limits that a responsible person entered for one post, its brace and its anchors."""

    bending_stress: Stress | None = None
    shear_stress: Stress | None = None
    moment: MomentCapacity | None = None
    shear: Capacity | None = None
    deflection: Sag | None = None
    brace_force: (
        Annotated[Quantity, Measure(kind="force", meaning="Highest force along the brace", above="0 lb")]
        | None
    ) = None
    anchor_tension: (
        Annotated[Quantity, Measure(kind="force", meaning="Highest tension of one bolt", above="0 lb")] | None
    ) = None
    anchor_shear: (
        Annotated[Quantity, Measure(kind="force", meaning="Highest shear of one bolt", above="0 lb")] | None
    ) = None
    contact_pressure: (
        Annotated[
            Quantity, Measure(kind="stress", meaning="Highest pressure under the base plate", above="0 psi")
        ]
        | None
    ) = None


def known_material(name: str) -> str:
    """Check the name of a reference material.

    Raises
    ------
    PydanticCustomError
        It is not in the table.
    """
    if name not in MATERIALS:
        rule = f"is not in the table of materials; {nearest_key(name, list(MATERIALS))}"
        raise problem_error(f"must be a reference material, or left out: it {rule}")
    return name
