"""A floodwall on its base: section, ground on both sides, foundation, and what it is held against."""

from __future__ import annotations

import math
from typing import Annotated, ClassVar, Literal

from pydantic import Field, field_validator, model_validator
from shapely import Polygon
from shapely.validation import explain_validity

from loads.quantity import Quantity
from loads.records.base import Name, Note, Record, several_problems
from loads.records.panel import Elevation, ring_values
from loads.records.sediment import Sediment
from loads.records.wall_ground import ground_problems
from loads.records.wall_parts import (
    Category,
    Cutoff,
    Drain,
    Foundation,
    Key,
    OwnCriteria,
    WallLimits,
    WallPart,
    distance,
    size,
    weight_per_volume,
)

WallShape = Literal["gravity", "T", "L", "parts"]
UpliftRule = Literal["linear", "line of creep", "none"]
CrackRule = Literal["full head", "not opened"]

_NEEDED: dict[str, tuple[str, ...]] = {
    "gravity": ("height", "top_width", "base_width", "unit_weight"),
    "T": ("height", "top_width", "base_thickness", "heel", "toe", "unit_weight"),
    "L": ("height", "top_width", "base_thickness", "unit_weight"),
    "parts": ("part",),
}
_OPTIONAL: dict[str, tuple[str, ...]] = {
    "gravity": ("flood_batter",),
    "T": ("flood_batter", "stem_width", "key"),
    "L": ("flood_batter", "stem_width", "key", "heel", "toe"),
    "parts": (),
}
_GEOMETRY = (
    "height",
    "top_width",
    "base_width",
    "flood_batter",
    "stem_width",
    "base_thickness",
    "heel",
    "toe",
    "key",
    "unit_weight",
    "part",
)
_SLACK = 1e-9

Triple = tuple[str, str, str]


class Wall(Record):
    """One wall section, per unit length of wall."""

    kind: ClassVar[str] = "wall"

    id: Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]
    name: Name = ""
    shape: WallShape
    base: Elevation
    height: Annotated[Quantity, size("Height of the top above the base", "12 ft")] | None = None
    top_width: Annotated[Quantity, size("Width at the top", "1 ft")] | None = None
    base_width: Annotated[Quantity, size("Width of the base", "8 ft")] | None = None
    flood_batter: (
        Annotated[Quantity, distance("How far the flood-side face leans toward the protected side", "1 ft")]
        | None
    ) = None
    stem_width: Annotated[Quantity, size("Width of the stem on the base slab", "1 ft 6 in")] | None = None
    base_thickness: Annotated[Quantity, size("Thickness of the base slab", "2 ft")] | None = None
    heel: (
        Annotated[Quantity, distance("Length of the base slab on the flood side of the stem", "6 ft")] | None
    ) = None
    toe: (
        Annotated[Quantity, distance("Length of the base slab on the protected side of the stem", "3 ft")]
        | None
    ) = None
    key: Key | None = None
    unit_weight: Annotated[Quantity, weight_per_volume("Unit weight of the wall", "150 pcf")] | None = None
    part: Annotated[tuple[WallPart, ...], Field(max_length=50, strict=False)] = ()
    flood_ground: Elevation | None = None
    protected_ground: Elevation | None = None
    sediment: Annotated[tuple[Sediment, ...], Field(max_length=20, strict=False)] = ()
    surcharge_counts_as_weight: bool = Field(
        default=False, description="Whether the load on the ground over the base also counts as weight."
    )
    passive_share: Annotated[float, Field(ge=0, le=1, allow_inf_nan=False)] = 0.0
    foundation: Foundation
    uplift: UpliftRule = "linear"
    horizontal_creep_share: Annotated[float, Field(ge=0.2, le=1, allow_inf_nan=False)] = 1.0
    cutoff: Annotated[tuple[Cutoff, ...], Field(max_length=4, strict=False)] = ()
    drain: Drain | None = None
    crack: CrackRule = "full head"
    category: Category = "usual"
    criteria: Name = ""
    own_criteria: OwnCriteria | None = None
    limits: WallLimits = WallLimits()
    rated_level: Elevation | None = None
    note: Note = ""

    @field_validator("part", "sediment", "cutoff", mode="before")
    @classmethod
    def _lists_become_tuples(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _is_complete(self) -> Wall:
        problems = self._missing_and_unused()
        if not problems:
            problems = self._shape_problems()
        if not problems:
            low, high, width = self.extent()
            if self.shape != "parts":
                low = self.base.value
            problems = ground_problems(
                self.sediment,
                {"flood": self.flood_ground, "protected": self.protected_ground},
                bottom=self.base.value,
                top=high,
            )
            problems += self._below_base_problems(low, width)
        if self.criteria and self.own_criteria is not None:
            problems.append(("criteria", f'"{self.criteria}"', "must be left out beside own_criteria"))
        if problems:
            raise several_problems(problems)
        return self

    def layers(self, side: str) -> tuple[Sediment, ...]:
        """Soil layers of one side, from the top down."""
        return tuple(layer for layer in self.sediment if layer.side == side)

    def ground(self, side: str) -> float:
        """Elevation of the ground on one side; minus infinity where none is said to cover the base. [m]."""
        entered = self.flood_ground if side == "flood" else self.protected_ground
        layers = self.layers(side)
        if layers:
            return layers[0].top.value
        return entered.value if entered else -math.inf

    def extent(self) -> tuple[float, float, float]:
        """Lowest and highest elevation of the section and width of its base. [m]."""
        base = self.base.value
        if self.shape == "parts":
            corners = [corner for part in self.part for corner in ring_values(part.points)]
            on_base = [x for x, z in corners if abs(z - base) <= _SLACK * max(1.0, abs(base))]
            heights = [z for _, z in corners]
            return min(heights), max(heights), max(on_base) - min(on_base)
        assert self.height is not None
        if self.shape == "gravity":
            assert self.base_width is not None
            return base, base + self.height.value, self.base_width.value
        width = _value(self.heel) + _value(self.stem_width or self.top_width) + _value(self.toe)
        return base - (self.key.depth.value if self.key else 0.0), base + self.height.value, width

    def _missing_and_unused(self) -> list[Triple]:
        needed = _NEEDED[self.shape]
        known = needed + _OPTIONAL[self.shape]
        problems = [
            (name, "", f'is missing; shape "{self.shape}" needs it')
            for name in needed
            if not getattr(self, name)
        ]
        problems += [
            (name, "given", f'is not used by shape "{self.shape}"; leave it out')
            for name in _GEOMETRY
            if name not in known and getattr(self, name)
        ]
        if self.shape == "L" and (_value(self.heel) > 0) == (_value(self.toe) > 0):
            problems.append(("heel", "", 'or toe must be given with shape "L", one of them and not both'))
        return problems

    def _shape_problems(self) -> list[Triple]:
        if self.shape == "parts":
            return self._part_problems()
        assert self.height is not None
        assert self.top_width is not None
        batter = _value(self.flood_batter)
        foot = self.base_width or self.stem_width or self.top_width
        if self.top_width.value + batter > foot.value * (1 + _SLACK):
            name = "base_width" if self.shape == "gravity" else "stem_width"
            rule = "must not be less than top_width and flood_batter together: the wall would overhang"
            return [(name, f'"{foot.text}"', rule)]
        if self.base_thickness is not None and self.base_thickness.value >= self.height.value:
            rule = f'must be less than the height, "{self.height.text}"'
            return [("base_thickness", f'"{self.base_thickness.text}"', rule)]
        return []

    def _part_problems(self) -> list[Triple]:
        problems: list[Triple] = []
        for i, part in enumerate(self.part):
            shape = Polygon(ring_values(part.points))
            if shape.convex_hull.area <= 0:
                problems.append((f"part[{i}].points", "", "enclose no area; the corners lie on one line"))
            elif not shape.is_valid:
                reason = explain_validity(shape).lower()
                problems.append((f"part[{i}].points", "", f"do not make a closed outline: {reason} (metres)"))
        corners = [corner for part in self.part for corner in ring_values(part.points)]
        slack = _SLACK * max(1.0, abs(self.base.value))
        if len({x for x, z in corners if abs(z - self.base.value) <= slack}) < 2:
            rule = "must be the elevation of the base's two ends: no two corners of the parts lie on it"
            problems.append(("base", f'"{self.base.text}"', rule))
        return problems

    def _below_base_problems(self, low: float, width: float) -> list[Triple]:
        problems: list[Triple] = []
        depth = self.foundation.depth
        placed: list[tuple[str, Key | Cutoff | Drain]] = [("key", self.key)] if self.key else []
        placed += [(f"cutoff[{i}]", cutoff) for i, cutoff in enumerate(self.cutoff)]
        placed += [("drain", self.drain)] if self.drain else []
        for where, item in placed:
            reach = item.position.value + (item.width.value if isinstance(item, Key) else 0.0)
            if reach > width * (1 + _SLACK):
                rule = f"must lie within the base, which is {width:.4g} m ({width / 0.3048:.4g} ft) wide"
                problems.append((f"{where}.position", f'"{item.position.text}"', rule))
            if depth is not None and not isinstance(item, Drain) and item.depth.value >= depth.value:
                rule = f'must be less than the depth of the foundation, "{depth.text}"'
                problems.append((f"{where}.depth", f'"{item.depth.text}"', rule))
        if (self.key or low < self.base.value - _SLACK) and self.foundation.saturated_unit_weight is None:
            rule = "is missing; a key needs it, for the ground that would slide with the wall"
            problems.append(("foundation.saturated_unit_weight", "", rule))
        return problems


def _value(quantity: Quantity | None) -> float:
    return quantity.value if quantity else 0.0
