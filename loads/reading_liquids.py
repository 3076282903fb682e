"""The links of the liquids: the unit weight of the water that is read, and the legs of a manometer."""

from __future__ import annotations

from typing import Final

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
from loads.manometer import Leg, pressure_change, rise_along
from loads.reading_chain import Given, Values
from loads.reading_links import Links, Series, assumed, computed, entered
from loads.records.reading import ManometerLeg, Reading
from loads.water import Fluid

REFERENCE_DENSITY: Final = 1000.0
"""Density that a specific gravity is a multiple of. [kg/m³]"""

_MILD_TEMPERATURE = 288.15
_OCEAN_SALINITY = 35.0
_WEIGHT = "Unit weight of the water"


def water_links(reading: Reading, series: Series, fluid: Fluid | None) -> Links:
    """Links to the unit weight of the water.

    Parameters
    ----------
    reading
        What is said of the water in the reading; when nothing is said, the fluid counts.
    series
        May hold the temperature of the water.
    fluid
        Water of the scenario on the reading's side, None when there is no scenario.
    """
    if reading.unit_weight is not None:
        return [entered("unit_weight", "γ", _WEIGHT, reading.unit_weight)]
    described = (reading.temperature, reading.salinity, reading.suspended_sediment, series.temperature)
    if reading.fluid is None and fluid is not None and series.temperature is None:
        return [assumed("unit_weight", "γ", _WEIGHT, "unit weight", fluid.unit_weight, source=fluid.basis)]
    if all(value is None for value in described):
        return [_conventional("unit_weight", "γ", _WEIGHT, reading.fluid == "sea")]
    links = _clear_density(reading, series)
    if reading.suspended_sediment is not None:
        mud = "Suspended sediment, dry mass per volume"
        links += [
            entered("suspended_sediment", "C", mud, reading.suspended_sediment),
            computed(
                "muddy_density",
                "ρ",
                "Density of the water with its sediment",
                "density",
                source="ρ_w + C (1 − ρ_w/ρ_s), grains 2650 kg/m³ [SuspensionBalance]",
                formula=lambda v: muddy_water_density(v["density"], v["suspended_sediment"]),
            ),
        ]
    last = "density" if reading.suspended_sediment is None else "muddy_density"
    source = "γ = ρ g, g 9.80665 m/s² [CGPM1901]; where the water stands g may differ by 0.27 %"
    links.append(
        computed(
            "unit_weight",
            "γ",
            _WEIGHT,
            "unit weight",
            source=source,
            formula=lambda v: v[last] * STANDARD_GRAVITY,
        )
    )
    return links


def _conventional(name: str, symbol: str, meaning: str, is_sea: bool) -> Given:
    if is_sea:
        basis = "no temperature entered; sea water by convention, 64.0 pcf [FEMAP55]"
        return assumed(name, symbol, meaning, "unit weight", CONVENTIONAL_SEA_UNIT_WEIGHT, source=basis)
    basis = "no temperature entered; fresh water by convention, 62.4 pcf [FreshUnitWeight]"
    return assumed(name, symbol, meaning, "unit weight", CONVENTIONAL_FRESH_UNIT_WEIGHT, source=basis)


def _clear_density(reading: Reading, series: Series) -> Links:
    meaning = "Density of the water without sediment"
    if reading.fluid != "sea" and reading.temperature is None and series.temperature is None:
        density = CONVENTIONAL_FRESH_UNIT_WEIGHT / STANDARD_GRAVITY
        basis = "no temperature entered; fresh water by convention, 62.4 pcf [FreshUnitWeight]"
        return [assumed("density", "ρ_w", meaning, "density", density, source=basis)]
    links: Links = [_temperature(reading, series)]
    if reading.fluid != "sea":
        source = "equation for fresh water [Kell1975]"
        links.append(
            computed(
                "density",
                "ρ_w",
                meaning,
                "density",
                source=source,
                formula=lambda v: fresh_water_density(v["temperature"]),
            )
        )
        return links
    source = "equation for sea water [MilleroPoisson1981]"
    links += [
        _salinity(reading.salinity),
        computed(
            "density",
            "ρ_w",
            meaning,
            "density",
            source=source,
            formula=lambda v: sea_water_density(v["temperature"], v["salinity"]),
        ),
    ]
    return links


def _salinity(entered_value: float | None) -> Given:
    meaning = "Practical salinity"
    if entered_value is None:
        return assumed("salinity", "S", meaning, "number", _OCEAN_SALINITY, source="not entered; open ocean")
    figure = np.array([entered_value])
    return Given(
        name="salinity",
        symbol="S",
        meaning=meaning,
        kind="number",
        value=figure,
        low=figure,
        high=figure,
        text=f"{entered_value:g}",
    )


def _temperature(reading: Reading, series: Series) -> Given:
    meaning = "Temperature of the water"
    if reading.temperature is not None:
        return entered("temperature", "T", meaning, reading.temperature, series.temperature)
    if series.temperature is None:
        basis = "not entered; 15 degC"
        return assumed("temperature", "T", meaning, "temperature", _MILD_TEMPERATURE, source=basis)
    return Given(
        name="temperature",
        symbol="T",
        meaning=meaning,
        kind="temperature",
        value=series.temperature,
        low=series.temperature,
        high=series.temperature,
        source="series",
    )


def manometer_links(reading: Reading) -> Links:
    """Links from the open end of a manometer to the pressure of the water at its tap.

    The links of the water's unit weight stand before these.
    """
    assert reading.leg is not None
    links: Links = []
    legs = list(enumerate(reading.leg, 1))
    for number, leg in legs:
        links += _leg_links(number, leg)
    opening = "Pressure at the far end, above the air's"
    links.append(
        entered("end_pressure", "p_e", opening, reading.end_pressure)
        if reading.end_pressure is not None
        else assumed("end_pressure", "p_e", opening, "pressure", 0.0, source="not entered; open to the air")
    )

    def at_tap(values: Values) -> FloatArray:
        return values["end_pressure"] - pressure_change([_leg(values, n, leg) for n, leg in legs]).total

    source = "p = p_e − Σ Δpᵢ [SignRule]"
    links.append(
        computed(
            "water_pressure",
            "p",
            "Pressure of the water at the tap",
            "pressure",
            source=source,
            formula=at_tap,
        )
    )
    return links


def _leg_name(number: int, leg: ManometerLeg) -> str:
    return f"leg {number}" + (f", {leg.name}" if leg.name else "")


def _leg(values: Values, number: int, leg: ManometerLeg) -> Leg:
    weight = "unit_weight" if leg.water else f"leg_{number}_unit_weight"
    return Leg(name=_leg_name(number, leg), unit_weight=values[weight], rise=values[f"leg_{number}_rise"])


def _leg_links(number: int, leg: ManometerLeg) -> Links:
    name, mark = _leg_name(number, leg), str(number).translate(str.maketrans("0123456789", "₀₁₂₃₄₅₆₇₈₉"))
    links = _leg_weight(number, leg, name, mark)
    rise = f"Rise of {name}, up positive"
    if leg.rise is not None:
        links.append(entered(f"leg_{number}_rise", f"Δz{mark}", rise, leg.rise))
    else:
        along, slope = f"leg_{number}_length", f"leg_{number}_inclination"
        links += [
            entered(along, f"L{mark}", f"Length along {name}, up positive", leg.length),
            entered(slope, f"θ{mark}", f"Angle of {name} above the horizontal", leg.inclination),
            computed(
                f"leg_{number}_rise",
                f"Δz{mark}",
                rise,
                "length",
                source="Δz = L sin θ",
                formula=lambda v: rise_along(v[along], v[slope]),
            ),
        ]
    links.append(
        computed(
            f"leg_{number}_change",
            f"Δp{mark}",
            f"Change of pressure along {name}",
            "pressure",
            source="Δp = −γ Δz [SignRule]",
            formula=lambda v: pressure_change([_leg(v, number, leg)]).total,
        )
    )
    return links


def _leg_weight(number: int, leg: ManometerLeg, name: str, mark: str) -> Links:
    weight, meaning = f"leg_{number}_unit_weight", f"Unit weight of {name}"
    if leg.water:
        return []
    if leg.unit_weight is not None:
        return [entered(weight, f"γ{mark}", meaning, leg.unit_weight)]
    density = f"leg_{number}_density"
    if leg.density is not None:
        links: Links = [entered(density, f"ρ{mark}", f"Density of {name}", leg.density)]
    else:
        assert leg.specific_gravity is not None
        figure = np.array([leg.specific_gravity * REFERENCE_DENSITY])
        links = [
            Given(
                name=density,
                symbol=f"ρ{mark}",
                meaning=f"Density of {name}",
                kind="density",
                value=figure,
                low=figure,
                high=figure,
                source="specific gravity times 1000 kg/m³",
                text=f"specific gravity {leg.specific_gravity:g}",
            )
        ]
    source = "γ = ρ g, g 9.80665 m/s² [CGPM1901]"
    links.append(
        computed(
            weight,
            f"γ{mark}",
            meaning,
            "unit weight",
            source=source,
            formula=lambda v: v[density] * STANDARD_GRAVITY,
        )
    )
    return links
