"""Parts of a wall record: shape parts and key, cutoffs, drain, foundation, criteria of its own, limits."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, field_validator, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, several_problems
from loads.records.panel import Elevation, Point

Coefficient = Annotated[float, Field(gt=0, le=2, allow_inf_nan=False)]
Factor = Annotated[float, Field(gt=0, le=10, allow_inf_nan=False)]
Percentage = Annotated[float, Field(ge=0, le=100, allow_inf_nan=False)]
Share = Annotated[float, Field(ge=0, le=1, allow_inf_nan=False)]
Category = Literal["usual", "unusual", "extreme"]


def size(meaning: str, example: str) -> Measure:
    """Field type of a length that is more than nothing."""
    return Measure(kind="length", meaning=meaning, above="0 ft", most="1000 ft", example=example)


def distance(meaning: str, example: str) -> Measure:
    """Field type of a length that may be nothing."""
    return Measure(kind="length", meaning=meaning, least="0 ft", most="1000 ft", example=example)


def weight_per_volume(meaning: str, example: str) -> Measure:
    """Field type of a unit weight."""
    return Measure(kind="unit weight", meaning=meaning, above="0 pcf", most="500 pcf", example=example)


def friction(meaning: str) -> Measure:
    """Field type of a friction angle."""
    return Measure(kind="angle", meaning=meaning, least="0 deg", most="45 deg")


def strength(meaning: str) -> Measure:
    """Field type of a cohesion or adhesion."""
    return Measure(kind="pressure", meaning=meaning, least="0 psf", most="1000 ksf", example="100 psf")


class WallPart(Record):
    """One part of a section given by its corners."""

    name: Annotated[Name, Field(min_length=1)]
    unit_weight: Annotated[Quantity, weight_per_volume("Unit weight of the part", "150 pcf")]
    points: Annotated[tuple[Point, ...], Field(min_length=3, max_length=200, strict=False)] = Field(
        description="Corners (distance toward the protected side, elevation)."
    )

    @field_validator("points", mode="before")
    @classmethod
    def _lists_become_tuples(cls, value: object) -> object:
        if not isinstance(value, (list, tuple)):
            return value
        return tuple(tuple(item) if isinstance(item, list) else item for item in value)


class Key(Record):
    """Downstand below the base that takes the plane of sliding deeper."""

    depth: Annotated[Quantity, size("Depth of the key below the base", "2 ft")]
    width: Annotated[Quantity, size("Width of the key", "1 ft 6 in")]
    position: Annotated[Quantity, distance("Distance from the heel to the key's flood-side face", "0 ft")]


class Cutoff(Record):
    """Thin watertight wall below the base, such as sheet piling."""

    depth: Annotated[Quantity, size("Depth of the cutoff below the base", "10 ft")]
    position: Annotated[Quantity, distance("Distance from the heel to the cutoff", "0 ft")]


class Drain(Record):
    """Drain under the base: what head is left there."""

    position: Annotated[Quantity, distance("Distance from the heel to the drain", "4 ft")]
    effectiveness: Share | None = Field(
        default=None, description="Share of the head above the exit that the drain takes away where it lies."
    )
    remaining_share: Share | None = Field(
        default=None, description="Share of the whole head difference that is left at the drain."
    )

    @model_validator(mode="after")
    def _one_of_both(self) -> Drain:
        if (self.effectiveness is None) == (self.remaining_share is None):
            rule = "must be given, or remaining_share, and not both"
            raise several_problems([("effectiveness", "", rule)])
        return self


class Foundation(Record):
    """Ground under the base."""

    friction_angle: Annotated[Quantity, friction("Friction angle between base and ground")] | None = None
    friction_coefficient: Coefficient | None = None
    friction_coefficient_low: Coefficient | None = None
    friction_coefficient_high: Coefficient | None = None
    adhesion: Annotated[Quantity, strength("Adhesion between base and ground")] | None = None
    soil_friction_angle: (
        Annotated[Quantity, friction("Effective angle of internal friction of the ground")] | None
    ) = None
    soil_cohesion: Annotated[Quantity, strength("Effective cohesion of the ground")] | None = None
    saturated_unit_weight: (
        Annotated[Quantity, weight_per_volume("Unit weight of the ground, saturated", "120 pcf")] | None
    ) = None
    allowable_bearing: (
        Annotated[
            Quantity,
            Measure(kind="pressure", meaning="Allowable bearing pressure", above="0 psf", example="3000 psf"),
        ]
        | None
    ) = None
    bearing_method: Literal["Meyerhof"] | None = None
    depth: Annotated[Quantity, size("Depth from the base to where this ground ends", "30 ft")] | None = None
    material: Name = Field(default="", description="Material of the creep table that the seepage meets.")
    base_material: Name = Field(default="", description="Material of the friction table under the base.")
    exit_gradient_factor: Factor | None = Field(
        default=None, description="Least factor of the critical gradient over the exit gradient."
    )

    @model_validator(mode="after")
    def _has_resistance(self) -> Foundation:
        problems = self._friction_problems()
        needed = ("soil_friction_angle", "saturated_unit_weight")
        if self.bearing_method:
            problems += [
                (name, "", f'is missing; bearing_method "{self.bearing_method}" needs it')
                for name in needed
                if getattr(self, name) is None
            ]
        if self.exit_gradient_factor is not None and self.saturated_unit_weight is None:
            problems.append(("saturated_unit_weight", "", "is missing; exit_gradient_factor needs it"))
        if problems:
            raise several_problems(problems)
        return self

    def _friction_problems(self) -> list[tuple[str, str, str]]:
        angle, coefficient = self.friction_angle, self.friction_coefficient
        if angle is not None and coefficient is not None:
            return [("friction_coefficient", f"{coefficient}", "must be left out beside friction_angle")]
        if angle is None and coefficient is None:
            return [("friction_angle", "", "is missing; give it, or friction_coefficient")]
        if angle is not None and angle.low <= 0 and not (self.adhesion and self.adhesion.low > 0):
            rule = "must be more than 0 deg, or adhesion must be: nothing else holds the base"
            return [("friction_angle", f'"{angle.text}"', rule)]
        low, high = self.friction_coefficient_low, self.friction_coefficient_high
        if coefficient is None and (low is not None or high is not None):
            rule = "belongs to friction_coefficient; a friction_angle carries its own low and high"
            name = "friction_coefficient_low" if low is not None else "friction_coefficient_high"
            return [(name, f"{low if low is not None else high}", rule)]
        if coefficient is not None and not (low or coefficient) <= coefficient <= (high or coefficient):
            return [("friction_coefficient", f"{coefficient}", "must lie between its low and its high")]
        return []


class OwnCriteria(Record):
    """Criteria entered in the scenario, of one load category."""

    document: Annotated[Name, Field(min_length=1)]
    edition: Name = ""
    table: Name = ""
    status: Note = "entered"
    sliding: Factor | None = None
    compression: Percentage | None = Field(
        default=None, description="Least share of the base in compression, in per cent; 0: resultant in it."
    )
    flotation: Factor | None = None
    bearing: Factor | None = None


class WallLimits(Record):
    """Limits that a responsible person entered, per unit length of wall. None is ever assumed."""

    stem_shear: (
        Annotated[Quantity, Measure(kind="line load", meaning="Highest shear in the stem", above="0 lb/ft")]
        | None
    ) = None
    stem_moment: (
        Annotated[
            Quantity,
            Measure(kind="moment per length", meaning="Highest moment in the stem", above="0 lb·ft/ft"),
        ]
        | None
    ) = None
    heel_shear: (
        Annotated[Quantity, Measure(kind="line load", meaning="Highest shear in the heel", above="0 lb/ft")]
        | None
    ) = None
    heel_moment: (
        Annotated[
            Quantity,
            Measure(kind="moment per length", meaning="Highest moment in the heel", above="0 lb·ft/ft"),
        ]
        | None
    ) = None
    toe_shear: (
        Annotated[Quantity, Measure(kind="line load", meaning="Highest shear in the toe", above="0 lb/ft")]
        | None
    ) = None
    toe_moment: (
        Annotated[
            Quantity,
            Measure(kind="moment per length", meaning="Highest moment in the toe", above="0 lb·ft/ft"),
        ]
        | None
    ) = None
    freeboard: (
        Annotated[Quantity, distance("Least height of the wall top above still water", "3 ft")] | None
    ) = None


class SheetLimits(Record):
    """Limits entered for an I-wall, per unit length of wall. None is ever assumed."""

    sheet_shear: (
        Annotated[Quantity, Measure(kind="line load", meaning="Highest shear in the sheet", above="0 lb/ft")]
        | None
    ) = None
    sheet_moment: (
        Annotated[
            Quantity,
            Measure(kind="moment per length", meaning="Highest moment in the sheet", above="0 lb·ft/ft"),
        ]
        | None
    ) = None
    exposed_height: (
        Annotated[Quantity, size("Greatest height of the top above the protected-side ground", "4 ft")] | None
    ) = None
    freeboard: (
        Annotated[Quantity, distance("Least height of the wall top above still water", "3 ft")] | None
    ) = None


__all__ = [
    "Category",
    "Cutoff",
    "Drain",
    "Elevation",
    "Factor",
    "Foundation",
    "Key",
    "OwnCriteria",
    "SheetLimits",
    "WallLimits",
    "WallPart",
]
