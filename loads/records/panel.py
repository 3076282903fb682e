"""A panel: one plane or curved face between supports, its sediment and the limits entered for it."""

from __future__ import annotations

import math
from itertools import pairwise
from typing import Annotated, ClassVar, Literal

from pydantic import Field, field_validator, model_validator

from loads.arc import ArcShape
from loads.outline import outline_problem
from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, several_problems
from loads.records.sediment import Sediment, order_problems

Shape = Literal["rectangle", "trapezoid", "circle", "outline", "arc"]

_NEEDED: dict[str, tuple[str, ...]] = {
    "rectangle": ("width", "height"),
    "trapezoid": ("bottom_width", "top_width", "height"),
    "circle": ("diameter",),
    "outline": ("points",),
    "arc": ("width", "height", "offset", "radius", "centre"),
}
_GEOMETRY = (
    "width",
    "height",
    "bottom_width",
    "top_width",
    "diameter",
    "points",
    "holes",
    "offset",
    "radius",
    "centre",
)

_across = Measure(kind="length", meaning="Distance across the face", least="-2000 ft", most="2000 ft")
Point = tuple[Annotated[Quantity, _across], Annotated[Quantity, _across]]
Ring = Annotated[tuple[Point, ...], Field(min_length=3, max_length=200, strict=False)]

Elevation = Annotated[
    Quantity,
    Measure(
        kind="length",
        meaning="Elevation above the scenario's datum",
        least="-2000 ft",
        most="30000 ft",
        example="104.6 ft",
    ),
]


def _size(meaning: str, example: str) -> Measure:
    return Measure(kind="length", meaning=meaning, above="0 ft", most="1000 ft", example=example)


class Limits(Record):
    """Limits that a responsible person entered for the whole panel. None is ever assumed."""

    pressure: (
        Annotated[
            Quantity,
            Measure(kind="pressure", meaning="Highest net pressure at any point of the face", above="0 psf"),
        ]
        | None
    ) = None
    force: (
        Annotated[
            Quantity,
            Measure(kind="force", meaning="Highest resultant force on the whole panel", above="0 lb"),
        ]
        | None
    ) = None
    moment: (
        Annotated[
            Quantity, Measure(kind="moment", meaning="Highest moment about the bottom edge", above="0 lb·ft")
        ]
        | None
    ) = None
    freeboard: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="Least height of the top above still water",
                least="0 ft",
                most="100 ft",
                example="1 ft",
            ),
        ]
        | None
    ) = None


class Panel(Record):
    """One face that water and sediment press on."""

    kind: ClassVar[str] = "panel"

    id: Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]
    name: Name = ""
    bottom: Elevation
    shape: Shape = "rectangle"
    width: Annotated[Quantity, _size("Width across the face", "12 ft")] | None = None
    height: (
        Annotated[Quantity, _size("Height along the face, of an arc its vertical height", "6 ft")] | None
    ) = None
    bottom_width: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="Width at the bottom edge",
                least="0 ft",
                most="1000 ft",
                example="8 ft",
            ),
        ]
        | None
    ) = None
    top_width: (
        Annotated[
            Quantity,
            Measure(
                kind="length", meaning="Width at the top edge", least="0 ft", most="1000 ft", example="8 ft"
            ),
        ]
        | None
    ) = None
    diameter: Annotated[Quantity, _size("Diameter of a circular face", "4 ft")] | None = None
    points: Ring | None = None
    holes: Annotated[tuple[Ring, ...], Field(max_length=20, strict=False)] | None = None
    offset: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="How far the top edge of an arc lies toward the protected side",
                least="-1000 ft",
                most="1000 ft",
                example="2 ft",
            ),
        ]
        | None
    ) = None
    radius: Annotated[Quantity, _size("Radius of an arc", "8 ft")] | None = None
    centre: Literal["flood", "protected"] | None = None
    tilt: (
        Annotated[
            Quantity,
            Measure(
                kind="angle",
                meaning="Angle from the protected-side horizontal to the face; 90 deg is vertical, less and "
                "the water bears down on it",
                least="1 deg",
                most="179 deg",
                example="90 deg",
            ),
        ]
        | None
    ) = None
    sediment: Annotated[tuple[Sediment, ...], Field(max_length=20, strict=False)] = ()
    limits: Limits = Limits()
    rated_level: Elevation | None = None
    note: Note = ""

    @field_validator("points", "holes", mode="before")
    @classmethod
    def _lists_become_tuples(cls, value: object) -> object:
        return _tupled(value)

    @model_validator(mode="after")
    def _geometry_is_complete(self) -> Panel:
        problems = self._missing_and_unused()
        if not problems:
            problems = self._shape_problems()
        problems += self.sediment_problems()
        if problems:
            raise several_problems(problems)
        return self

    @property
    def tilt_angle(self) -> float:
        """Angle from the protected-side horizontal to the face. [rad]."""
        return self.tilt.value if self.tilt else math.pi / 2

    def layers(self, side: str) -> tuple[Sediment, ...]:
        """Sediment layers of one side, from the top down."""
        return tuple(layer for layer in self.sediment if layer.side == side)

    def _missing_and_unused(self) -> list[tuple[str, str, str]]:
        needed = _NEEDED[self.shape]
        optional = ("holes",) if self.shape == "outline" else ()
        problems = [
            (name, "", f'is missing; shape "{self.shape}" needs it')
            for name in needed
            if getattr(self, name) is None
        ]
        problems += [
            (name, "given", f'is not used by shape "{self.shape}"; leave it out')
            for name in _GEOMETRY
            if name not in needed + optional and getattr(self, name) is not None
        ]
        if self.shape == "arc" and self.tilt is not None:
            problems.append(("tilt", f'"{self.tilt.text}"', 'is not used by shape "arc"; leave it out'))
        return problems

    def _shape_problems(self) -> list[tuple[str, str, str]]:
        if self.shape == "trapezoid":
            assert self.bottom_width is not None
            assert self.top_width is not None
            if self.bottom_width.value == 0 and self.top_width.value == 0:
                return [("top_width", f'"{self.top_width.text}"', "must not be zero as well as bottom_width")]
        if self.shape == "outline":
            assert self.points is not None
            problem = outline_problem(
                ring_values(self.points), [ring_values(hole) for hole in self.holes or ()]
            )
            return [(problem[0], "", problem[1])] if problem else []
        if self.shape == "arc":
            return self._arc_problems()
        return []

    def _arc_problems(self) -> list[tuple[str, str, str]]:
        assert self.radius is not None
        problem = self.arc_shape().problem()
        return [("radius", f'"{self.radius.text}"', problem)] if problem else []

    def arc_shape(self) -> ArcShape:
        """Geometry of a panel of shape "arc"."""
        assert self.height is not None
        assert self.offset is not None
        assert self.radius is not None
        return ArcShape(
            height=self.height.value,
            offset=self.offset.value,
            radius=self.radius.value,
            bulge=1.0 if self.centre == "flood" else -1.0,
        )

    def sediment_problems(self, foot: str = "bottom of the panel") -> list[tuple[str, str, str]]:
        """Say what is wrong with the layers, (field, value, rule); `foot` names what they lie on."""
        problems: list[tuple[str, str, str]] = []
        for side in ("flood", "protected"):
            indexed = [(i, layer) for i, layer in enumerate(self.sediment) if layer.side == side]
            for i, layer in indexed:
                problems += self._layer_problems(i, layer, foot, first=i == indexed[0][0])
            for (_, upper), (i, lower) in pairwise(indexed):
                problems += order_problems(i, upper, lower)
        return problems

    def _layer_problems(
        self, i: int, layer: Sediment, foot: str, *, first: bool
    ) -> list[tuple[str, str, str]]:
        problems = []
        where = f"sediment[{i}]"
        if layer.top.value <= self.bottom.value:
            rule = f'it must lie above the {foot}, "{self.bottom.text}"'
            problems.append((f"{where}.top", f'"{layer.top.text}"', rule))
        if layer.surcharge is not None and not first:
            rule = "belongs to the uppermost layer of its side only"
            problems.append((f"{where}.surcharge", f'"{layer.surcharge.text}"', rule))
        if self.shape == "arc" and layer.pressure in ("at rest", "active", "passive"):
            rule = (
                "a curved face takes sediment as fluid mud, equivalent fluid or with an entered coefficient: "
                "the coefficients of earth pressure are for plane faces"
            )
            problems.append((f"{where}.pressure", f'"{layer.pressure}"', rule))
        inclined = self.tilt is not None and abs(self.tilt.value - math.pi / 2) > 1e-9
        if inclined and layer.cohesion is not None and layer.cohesion.value > 0:
            rule = "must be zero on an inclined face: the formula with cohesion is for a vertical one"
            problems.append((f"{where}.cohesion", f'"{layer.cohesion.text}"', rule))
        return problems


def _tupled(value: object) -> object:
    return tuple(_tupled(item) for item in value) if isinstance(value, (list, tuple)) else value


def ring_values(ring: tuple[Point, ...]) -> list[tuple[float, float]]:
    """Corner points of an outline as numbers, (across, up the face). [m]."""
    return [(across.value, up.value) for across, up in ring]
