"""Still water: what fluid stands on each side, and its pressure."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Any

import numpy as np

from loads.arrays import FloatArray
from loads.density import (
    CONVENTIONAL_FRESH_UNIT_WEIGHT,
    CONVENTIONAL_SEA_UNIT_WEIGHT,
    STANDARD_GRAVITY,
    fresh_water_density,
    muddy_water_density,
    sea_water_density,
)
from loads.diagram import Diagram
from loads.quantity import Quantity
from loads.records.scenario import Water

_OCEAN_SALINITY = 35.0
_MILD_TEMPERATURE = 288.15


@dataclass(frozen=True, kw_only=True)
class Fluid:
    """The water of one side.

    Attributes
    ----------
    unit_weight
        Weight per volume γ. [N/m³]
    basis
        Where the figure comes from, in words for the report.
    """

    unit_weight: float
    basis: str


def fluid_of(water: Water, side: str) -> Fluid:
    """Water of one side, "flood" or "protected".

    What is not stated for the protected side is as on the flood side; with a fluid of its own, only what is
    stated for that side counts.
    """
    flood = _stated(water, "")
    if side == "flood":
        return _fluid(flood)
    own = _stated(water, "protected_")
    if all(value is None for value in own.values()):
        return _fluid(flood)
    if own["fluid"] is not None or own["unit_weight"] is not None:
        return _fluid(own)
    del flood["unit_weight"]
    return _fluid({**own, **{name: value for name, value in flood.items() if own[name] is None}})


def _stated(water: Water, prefix: str) -> dict[str, Any]:
    names = ("fluid", "temperature", "salinity", "suspended_sediment", "unit_weight")
    return {name: getattr(water, prefix + name) for name in names}


def _fluid(stated: dict[str, Any]) -> Fluid:
    unit_weight: Quantity | None = stated["unit_weight"]
    if unit_weight is not None:
        return Fluid(unit_weight=unit_weight.value, basis=f"entered, {unit_weight.text}")
    density, basis = _clear_density(stated["fluid"], stated["temperature"], stated["salinity"])
    suspended: Quantity | None = stated["suspended_sediment"]
    if suspended is not None:
        density = float(muddy_water_density(np.array([density]), np.array([suspended.value]))[0])
        basis += f", {suspended.text} of suspended sediment, grains 2650 kg/m³ [SuspensionBalance]"
    return Fluid(unit_weight=density * STANDARD_GRAVITY, basis=basis)


def _clear_density(kind: str, temperature: Quantity | None, salinity: float | None) -> tuple[float, str]:
    if kind == "sea":
        if temperature is None and salinity is None:
            return (
                CONVENTIONAL_SEA_UNIT_WEIGHT / STANDARD_GRAVITY,
                "sea water by convention, 64.0 pcf [FEMAP55]",
            )
        kelvin = temperature.value if temperature else _MILD_TEMPERATURE
        practical = _OCEAN_SALINITY if salinity is None else salinity
        density = float(sea_water_density(np.array([kelvin]), np.array([practical]))[0])
        warmth = temperature.text if temperature else "15 degC assumed"
        amount = f"{practical:g}" + (" assumed" if salinity is None else "")
        return density, f"sea water at {warmth}, salinity {amount} [MilleroPoisson1981]"
    if temperature is None:
        return (
            CONVENTIONAL_FRESH_UNIT_WEIGHT / STANDARD_GRAVITY,
            "fresh water by convention, 62.4 pcf [FreshUnitWeight]",
        )
    density = float(fresh_water_density(np.array([temperature.value]))[0])
    return density, f"fresh water at {temperature.text} [Kell1975]"


def water_diagram(level: FloatArray, unit_weight: float) -> Diagram:
    """Pressure of still water below its level.

    Parameters
    ----------
    level
        Still-water elevation, shape (n,); minus infinity where dry. [m]
    unit_weight
        Weight per volume γ. [N/m³]

    Returns
    -------
    Diagram
        One ramp, p = γ⟨level − z⟩.

    Examples
    --------
    >>> water_diagram(np.array([2.0]), 9810.0).shear(np.array([0.0]))
    array([[19620.]])
    """
    wet = np.isfinite(level)
    return Diagram.of_terms(len(level), [(np.where(wet, level, 0.0), 0.0, np.where(wet, unit_weight, 0.0))])
