"""An I-wall: a sheet that stands by its embedment alone."""

from __future__ import annotations

from typing import Annotated, ClassVar, Literal

from pydantic import Field, field_validator, model_validator

from loads.quantity import Quantity
from loads.records.base import Name, Note, Record, several_problems
from loads.records.panel import Elevation
from loads.records.sediment import Sediment
from loads.records.wall_ground import ground_problems
from loads.records.wall_parts import Category, Factor, SheetLimits, distance

GapRule = Literal["none", "to depth", "to tip"]


class IWall(Record):
    """One I-wall section, per unit length of wall."""

    kind: ClassVar[str] = "wall"

    id: Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]
    name: Name = ""
    shape: Literal["I"] = "I"
    top: Elevation
    tip: Elevation
    sediment: Annotated[tuple[Sediment, ...], Field(max_length=4, strict=False)]
    gap: GapRule
    gap_depth: (
        Annotated[Quantity, distance("Depth of the gap below the flood-side ground", "6 ft")] | None
    ) = None
    passive_factor: Annotated[float, Field(ge=1, le=5, allow_inf_nan=False)]
    embedment_increase: Annotated[float, Field(ge=1, le=2, allow_inf_nan=False)] = 1.2
    method: Literal["moments about the tip"] = "moments about the tip"
    exit_gradient_factor: Factor | None = None
    material: Name = Field(default="", description="Material of the creep table that the seepage meets.")
    category: Category = "usual"
    limits: SheetLimits = SheetLimits()
    rated_level: Elevation | None = None
    note: Note = ""

    @field_validator("sediment", mode="before")
    @classmethod
    def _list_becomes_tuple(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _is_complete(self) -> IWall:
        problems: list[tuple[str, str, str]] = []
        if self.tip.value >= self.top.value:
            problems.append(("tip", f'"{self.tip.text}"', f'must lie below the top, "{self.top.text}"'))
        problems += self._soil_problems()
        if (self.gap == "to depth") != (self.gap_depth is not None):
            rule = (
                'is missing; gap "to depth" needs it'
                if self.gap == "to depth"
                else (f'is not used by gap "{self.gap}"; leave it out')
            )
            problems.append(("gap_depth", "" if self.gap_depth is None else "given", rule))
        if problems:
            raise several_problems(problems)
        return self

    def layer(self, side: str) -> Sediment:
        """Soil of one side."""
        return next(layer for layer in self.sediment if layer.side == side)

    def ground(self, side: str) -> float:
        """Elevation of the ground of one side. [m]."""
        return self.layer(side).top.value

    def _soil_problems(self) -> list[tuple[str, str, str]]:
        problems = ground_problems(
            self.sediment, {"flood": None, "protected": None}, bottom=self.tip.value, top=self.top.value
        )
        for side, kinds in (("flood", ("active", "at rest")), ("protected", ("passive",))):
            own = [(i, layer) for i, layer in enumerate(self.sediment) if layer.side == side]
            if not own:
                problems.append(("sediment", "", f"has no layer on the {side} side; an I-wall stands in it"))
            for i, layer in own[:1]:
                if layer.pressure not in kinds:
                    rule = f"must be {' or '.join(kinds)} on the {side} side of an I-wall"
                    problems.append((f"sediment[{i}].pressure", f'"{layer.pressure}"', rule))
            for i, layer in own[1:]:
                rule = (
                    "is a second layer of its side: what an I-wall does in layered soil is not computed "
                    "here, a licensed engineer must"
                )
                problems.append((f"sediment[{i}].top", f'"{layer.top.text}"', rule))
        return problems
