"""A reading: what an instrument showed, and everything that leads from it to a level."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field, field_validator, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, several_problems
from loads.records.fluid import FluidKind, Salinity, SuspendedSediment, Temperature, UnitWeight
from loads.records.moment import Moment
from loads.records.panel import Elevation

ReadingKind = Literal["staff", "manometer", "bubbler", "vented logger", "sealed logger"]

_WATER = ("fluid", "temperature", "salinity", "suspended_sediment", "unit_weight")
FIELDS_NEEDED: dict[str, tuple[str, ...]] = {
    "staff": ("zero_elevation", "staff_reading"),
    "manometer": ("sensor_elevation", "leg"),
    "bubbler": ("sensor_elevation", "pressure"),
    "vented logger": ("sensor_elevation", "pressure"),
    "sealed logger": ("sensor_elevation", "pressure", "barometer"),
}
"""Fields that each kind of instrument cannot do without."""
_OPTIONAL: dict[str, tuple[str, ...]] = {
    "staff": (),
    "manometer": ("end_pressure", *_WATER),
    "bubbler": (
        "zero_pressure",
        "instrument_elevation",
        "barometer",
        "gas_temperature",
        "gas_density",
        "air_density",
        *_WATER,
    ),
    "vented logger": ("zero_pressure", *_WATER),
    "sealed logger": (
        "zero_pressure",
        "barometer_shows",
        "barometer_altitude",
        "site_altitude",
        "sea_level_temperature",
        "air_temperature",
        *_WATER,
    ),
}
_SPECIFIC = tuple(
    dict.fromkeys(name for table in (FIELDS_NEEDED, _OPTIONAL) for names in table.values() for name in names)
)
FIELDS_OF_KIND: dict[str, tuple[str, ...]] = {
    kind: needed + _OPTIONAL[kind] for kind, needed in FIELDS_NEEDED.items()
}
"""Fields that each kind of instrument uses, those it needs first."""
_GAS_COLUMN = ("barometer", "gas_temperature", "gas_density", "air_density")

Pressure = Annotated[
    Quantity,
    Measure(
        kind="pressure",
        meaning="Pressure that the instrument shows, above the air's; of a sealed logger the absolute one",
        least="-20 kPa",
        most="2000 kPa",
        example="12.5 kPa",
    ),
]
AirPressure = Annotated[
    Quantity,
    Measure(
        kind="pressure",
        meaning="Air pressure that the barometer shows",
        least="20 kPa",
        most="120 kPa",
        example="1013.2 hPa",
    ),
]
Altitude = Annotated[
    Quantity,
    Measure(
        kind="length",
        meaning="Altitude above sea level, below 10 km",
        least="-1000 m",
        most="10000 m",
        example="820 ft",
    ),
]
AirTemperature = Annotated[
    Quantity,
    Measure(
        kind="temperature",
        meaning="Temperature of the air",
        least="-60 degC",
        most="60 degC",
        example="59 degF",
    ),
]
GasDensity = Annotated[
    Quantity,
    Measure(
        kind="density", meaning="Density of a gas", least="0 kg/m3", most="20 kg/m3", example="1.2 kg/m3"
    ),
]
SmallPressure = Annotated[
    Quantity,
    Measure(
        kind="pressure",
        meaning="What the instrument shows with no water over it, to be taken off every reading",
        least="-100 kPa",
        most="100 kPa",
        example="0.2 kPa",
    ),
]
_LENGTH = Measure(
    kind="length", meaning="Length along the chain, up positive", least="-100 m", most="100 m", example="9 in"
)


class ManometerLeg(Record):
    """One stretch of one fluid, walked from the tap in the water toward the open end."""

    name: Name = ""
    water: bool = Field(default=False, description="True when the leg holds the water of the reading.")
    density: (
        Annotated[
            Quantity,
            Measure(kind="density", meaning="Density of the fluid", least="0 kg/m3", most="25000 kg/m3"),
        ]
        | None
    ) = None
    unit_weight: (
        Annotated[
            Quantity,
            Measure(kind="unit weight", meaning="Unit weight of the fluid", least="0 pcf", most="1600 pcf"),
        ]
        | None
    ) = None
    specific_gravity: Annotated[float, Field(ge=0, le=25, allow_inf_nan=False)] | None = None
    rise: Annotated[Quantity, _LENGTH] | None = None
    length: Annotated[Quantity, _LENGTH] | None = None
    inclination: (
        Annotated[
            Quantity,
            Measure(
                kind="angle",
                meaning="Angle of an inclined tube above the horizontal",
                least="0 deg",
                most="90 deg",
                example="25 deg",
            ),
        ]
        | None
    ) = None

    @model_validator(mode="after")
    def _one_fluid_and_one_rise(self) -> ManometerLeg:
        problems = []
        entered = (self.density, self.unit_weight, self.specific_gravity)
        if self.water + sum(value is not None for value in entered) != 1:
            rule = "needs exactly one of water = true, density, unit_weight and specific_gravity"
            problems.append(("", "", rule))
        along = (self.length is not None, self.inclination is not None)
        if (self.rise is not None) + all(along) != 1 or any(along) != all(along):
            problems.append(("", "", "needs either a rise, or a length and an inclination"))
        if problems:
            raise several_problems(problems)
        return self


class Reading(Record):
    """One instrument's reading, and what it takes to make a level of it."""

    id: Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]
    name: Name = ""
    kind: ReadingKind = Field(description="What kind of instrument it is.")
    side: Literal["flood", "protected"] = "flood"
    as_of: Moment | None = Field(
        default=None, description="When it was read, with its zone, for example 2031-04-02T06:00:00-05:00."
    )
    zero_elevation: Elevation | None = None
    staff_reading: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="What the staff shows at the water's surface",
                least="-100 ft",
                most="1000 ft",
                example="4.62 ft",
            ),
        ]
        | None
    ) = None
    sensor_elevation: Elevation | None = None
    pressure: Pressure | None = None
    zero_pressure: SmallPressure | None = None
    end_pressure: Pressure | None = None
    leg: Annotated[tuple[ManometerLeg, ...], Field(max_length=12)] | None = None
    instrument_elevation: Elevation | None = None
    gas_temperature: AirTemperature | None = None
    gas_density: GasDensity | None = None
    air_density: GasDensity | None = None
    barometer: AirPressure | None = None
    barometer_shows: Literal["station pressure", "sea-level pressure"] | None = None
    barometer_altitude: Altitude | None = None
    site_altitude: Altitude | None = None
    sea_level_temperature: AirTemperature | None = None
    air_temperature: AirTemperature | None = None
    fluid: FluidKind | None = None
    temperature: Temperature | None = None
    salinity: Salinity | None = None
    suspended_sediment: SuspendedSediment | None = None
    unit_weight: UnitWeight | None = None
    note: Note = ""

    @field_validator("leg", mode="before")
    @classmethod
    def _list_becomes_tuple(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _fields_fit_the_kind(self) -> Reading:
        problems = self._missing_and_unused()
        if not problems:
            problems = self._water_problems()
            if self.kind == "sealed logger":
                problems += self._barometer_problems()
            if self.kind == "bubbler":
                problems += self._gas_problems()
        if problems:
            raise several_problems(problems)
        return self

    def _missing_and_unused(self) -> list[tuple[str, str, str]]:
        needed = FIELDS_NEEDED[self.kind]
        problems = [
            (name, "", f'is missing; kind "{self.kind}" needs it')
            for name in needed
            if getattr(self, name) in (None, ())
        ]
        problems += [
            (name, "given", f'is not used by kind "{self.kind}"; leave it out')
            for name in _SPECIFIC
            if name not in FIELDS_OF_KIND[self.kind] and getattr(self, name) is not None
        ]
        return problems

    def _water_problems(self) -> list[tuple[str, str, str]]:
        problems = []
        if self.fluid == "custom" and self.unit_weight is None:
            rule = 'is missing; fluid "custom" needs it, for example "64 pcf"'
            problems.append(("unit_weight", "", rule))
        described = [name for name in _WATER[1:4] if getattr(self, name) is not None]
        if self.unit_weight is not None or self.fluid == "custom":
            rule = "would not be used, because a unit weight is entered directly; leave one of them out"
            problems += [(name, "given", rule) for name in described]
        elif described and self.fluid is None:
            problems.append(("fluid", "", 'is missing; say "fresh" or "sea" of the water described here'))
        elif self.salinity is not None and self.fluid == "fresh":
            problems.append(("salinity", "given", 'is for fluid "sea"; leave it out or say "sea"'))
        return problems

    def _barometer_problems(self) -> list[tuple[str, str, str]]:
        problems = []
        if self.pressure is not None and self.pressure.low <= 0:
            rule = "must be above zero: a sealed logger shows the absolute pressure, that of the air included"
            problems.append(("pressure", f'"{self.pressure.text}"', rule))
        at_sea_level = self.barometer_shows == "sea-level pressure"
        if at_sea_level and self.barometer_altitude is not None:
            rule = "is not used with a sea-level pressure; leave it out"
            problems.append(("barometer_altitude", "given", rule))
        if self.site_altitude is None and (at_sea_level or self.barometer_altitude is not None):
            rule = "is missing; without it the air pressure cannot be carried to the water"
            problems.append(("site_altitude", "", rule))
        if self.sea_level_temperature is not None and self.air_temperature is not None:
            rule = "stands beside a sea_level_temperature; leave one of them out"
            problems.append(("air_temperature", "given", rule))
        if not at_sea_level and self.barometer_altitude is None:
            rule = "is not used unless the air pressure is carried from one altitude to another; leave it out"
            problems += [
                (name, "given", rule)
                for name in ("sea_level_temperature", "air_temperature")
                if getattr(self, name) is not None
            ]
        return problems

    def _gas_problems(self) -> list[tuple[str, str, str]]:
        if self.instrument_elevation is None:
            rule = "is not used unless the gas column is counted; leave it out or enter instrument_elevation"
            return [(name, "given", rule) for name in _GAS_COLUMN if getattr(self, name) is not None]
        if self.gas_density is None or self.air_density is None:
            return []
        rule = "is not used when both gas_density and air_density are entered; leave it out"
        return [(name, "given", rule) for name in _GAS_COLUMN[:2] if getattr(self, name) is not None]
