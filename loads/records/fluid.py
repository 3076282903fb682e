"""What a water is: field types that a scenario's water and a reading's water share."""

from __future__ import annotations

from typing import Annotated, Literal

from pydantic import Field

from loads.quantity import Quantity
from loads.records.base import Measure

FluidKind = Literal["fresh", "sea", "custom"]
UnitWeight = Annotated[
    Quantity,
    Measure(
        kind="unit weight",
        meaning="Unit weight of the water, entered directly",
        least="50 pcf",
        most="120 pcf",
        example="62.4 pcf",
    ),
]
Temperature = Annotated[
    Quantity,
    Measure(
        kind="temperature",
        meaning="Water temperature",
        least="-2 degC",
        most="40 degC",
        example="50 degF",
    ),
]
Salinity = Annotated[float, Field(ge=0, le=42, allow_inf_nan=False)]
SuspendedSediment = Annotated[
    Quantity,
    Measure(
        kind="density",
        meaning="Mass of suspended sediment per volume of mixture",
        least="0 kg/m3",
        most="600 kg/m3",
    ),
]
