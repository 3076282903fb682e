"""A sediment layer on one side of a barrier."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Record, several_problems

PressureKind = Literal["at rest", "active", "passive", "entered", "fluid mud", "equivalent fluid"]
SOIL_KINDS = ("at rest", "active", "passive", "entered")
FLUID_KINDS = ("fluid mud", "equivalent fluid")

_SOIL_FIELDS = (
    "saturated_unit_weight",
    "moist_unit_weight",
    "friction_angle",
    "cohesion",
    "wall_friction",
    "overconsolidation_ratio",
    "pressure_coefficient",
    "surcharge",
)


class Sediment(Record):
    """One layer, listed from the top down; it reaches down to the next layer or to the barrier's bottom."""

    side: Literal["flood", "protected"] = Field(description="Side of the barrier on which the layer lies.")
    top: Annotated[
        Quantity,
        Measure(
            kind="length",
            meaning="Elevation of the top of the layer",
            least="-2000 ft",
            most="30000 ft",
            example="99.5 ft",
        ),
    ]
    pressure: PressureKind = Field(description="How the layer presses on the face.")
    name: Name = ""
    saturated_unit_weight: (
        Annotated[
            Quantity,
            Measure(
                kind="unit weight",
                meaning="Unit weight of soil and pore water, below water",
                above="0 pcf",
                most="200 pcf",
            ),
        ]
        | None
    ) = None
    moist_unit_weight: (
        Annotated[
            Quantity,
            Measure(
                kind="unit weight",
                meaning="Unit weight above water; the saturated one is taken when absent",
                above="0 pcf",
                most="200 pcf",
                example="100 pcf",
            ),
        ]
        | None
    ) = None
    friction_angle: (
        Annotated[
            Quantity,
            Measure(
                kind="angle", meaning="Effective angle of internal friction φ′", least="0 deg", most="45 deg"
            ),
        ]
        | None
    ) = None
    cohesion: (
        Annotated[
            Quantity,
            Measure(
                kind="pressure",
                meaning="Effective cohesion c′",
                least="0 psf",
                most="10 ksf",
                example="50 psf",
            ),
        ]
        | None
    ) = None
    wall_friction: (
        Annotated[
            Quantity,
            Measure(
                kind="angle",
                meaning="Friction angle between soil and face δ; above zero it selects Coulomb's coefficient",
                least="0 deg",
                most="35 deg",
                example="15 deg",
            ),
        ]
        | None
    ) = None
    overconsolidation_ratio: Annotated[float, Field(ge=1, le=20, allow_inf_nan=False)] | None = None
    pressure_coefficient: Annotated[float, Field(gt=0, le=15, allow_inf_nan=False)] | None = None
    surcharge: (
        Annotated[
            Quantity,
            Measure(
                kind="pressure",
                meaning="Load on the ground, on top of the uppermost layer of a side",
                least="0 psf",
                most="20 ksf",
                example="250 psf",
            ),
        ]
        | None
    ) = None
    fluid_unit_weight: (
        Annotated[
            Quantity,
            Measure(
                kind="unit weight",
                meaning="Unit weight of fluid mud, or equivalent fluid that already contains the water",
                above="0 pcf",
                most="200 pcf",
                example="85 pcf",
            ),
        ]
        | None
    ) = None

    @property
    def is_fluid(self) -> bool:
        """True when the layer presses as a heavier fluid, its water included."""
        return self.pressure in FLUID_KINDS

    @model_validator(mode="after")
    def _fields_fit_the_kind(self) -> Sediment:
        problems = self._fluid_problems() if self.is_fluid else self._soil_problems()
        if problems:
            raise several_problems(problems)
        return self

    def _fluid_problems(self) -> list[tuple[str, str, str]]:
        problems = []
        if self.fluid_unit_weight is None:
            problems.append(
                (
                    "fluid_unit_weight",
                    "",
                    f'is missing; pressure "{self.pressure}" needs it, for example "85 pcf"',
                )
            )
        for name in _SOIL_FIELDS:
            if getattr(self, name) is not None:
                rule = (
                    f'must be left out with pressure "{self.pressure}": its fluid weight already contains '
                    "the water, and water must not be counted twice"
                )
                problems.append((name, "given", rule))
        return problems

    def _soil_problems(self) -> list[tuple[str, str, str]]:
        needed = {
            "at rest": ("saturated_unit_weight", "friction_angle"),
            "active": ("saturated_unit_weight", "friction_angle"),
            "passive": ("saturated_unit_weight", "friction_angle"),
            "entered": ("saturated_unit_weight", "pressure_coefficient"),
        }[self.pressure]
        problems = [
            (name, "", f'is missing; pressure "{self.pressure}" needs it')
            for name in needed
            if getattr(self, name) is None
        ]
        if self.fluid_unit_weight is not None:
            rule = (
                f'must be left out with pressure "{self.pressure}": the layer is soil with its water counted '
                "apart, and water must not be counted twice"
            )
            problems.append(("fluid_unit_weight", "given", rule))
        unused = {
            "at rest": ("wall_friction", "pressure_coefficient", "cohesion"),
            "active": ("overconsolidation_ratio", "pressure_coefficient"),
            "passive": ("overconsolidation_ratio", "pressure_coefficient"),
            "entered": ("friction_angle", "wall_friction", "overconsolidation_ratio", "cohesion"),
        }[self.pressure]
        for name in unused:
            value = getattr(self, name)
            if value is not None and not (isinstance(value, Quantity) and value.value == 0):
                problems.append((name, "given", f'is not used by pressure "{self.pressure}"; leave it out'))
        problems += self._unit_weight_problems() + self._coulomb_problems()
        return problems

    def _unit_weight_problems(self) -> list[tuple[str, str, str]]:
        saturated, moist = self.saturated_unit_weight, self.moist_unit_weight
        if saturated is None or moist is None or moist.value <= saturated.value:
            return []
        return [("moist_unit_weight", f'"{moist.text}"', "must not be more than the saturated unit weight")]

    def _coulomb_problems(self) -> list[tuple[str, str, str]]:
        friction, wall = self.friction_angle, self.wall_friction
        if wall is None or wall.value == 0:
            return []
        problems = []
        if friction is not None and wall.value > friction.value:
            problems.append(("wall_friction", f'"{wall.text}"', "must not be more than the friction angle"))
        if self.cohesion is not None and self.cohesion.value > 0:
            rule = "must be zero with wall friction: Coulomb's coefficient is for soil without cohesion"
            problems.append(("cohesion", f'"{self.cohesion.text}"', rule))
        return problems


def order_problems(i: int, upper: Sediment, lower: Sediment) -> list[tuple[str, str, str]]:
    """What is wrong with a layer, the one at `i` of its panel, below another of the same side."""
    where = f"sediment[{i}]"
    if lower.top.value >= upper.top.value:
        rule = f'it must lie below the top of the layer above it on that side, "{upper.top.text}"'
        return [(f"{where}.top", f'"{lower.top.text}"', rule)]
    kinds = {upper.pressure, lower.pressure}
    if "equivalent fluid" in kinds and len(kinds) > 1:
        rule = (
            "an equivalent fluid already contains the water and says nothing of the soil's weight; a side "
            "is either all equivalent fluid or none of it"
        )
        return [(f"{where}.pressure", f'"{lower.pressure}"', rule)]
    if lower.pressure == "fluid mud" and upper.pressure != "fluid mud":
        return [(f"{where}.pressure", '"fluid mud"', "fluid mud must lie above every soil layer of its side")]
    above, below = upper.fluid_unit_weight, lower.fluid_unit_weight
    if lower.pressure == "fluid mud" and above and below and below.value < above.value:
        rule = "must not be lighter than the fluid mud above it"
        return [(f"{where}.fluid_unit_weight", f'"{below.text}"', rule)]
    return []
