"""Formulas of instrument readings, as data: from what an instrument shows to a level."""

from __future__ import annotations

from typing import Final

from loads.method_data import Method, MethodGroup
from loads.reading_chain import MAX_RANGES

READINGS: Final = MethodGroup(
    title="Levels from instrument readings",
    methods=(
        Method(
            name="Level of a staff",
            formula="L = z₀ + h",
            words="z₀ elevation of the staff's zero in the scenario's datum, h what it shows.",
            sources=("InstrumentPractice",),
            limits="still water; waves belong into the low and the high of what was read",
        ),
        Method(
            name="Level over a pressure sensor",
            formula="L = zₛ + p/γ, p = P − P₀ (vented logger, bubbler), p = P − P₀ − p_a (sealed logger)",
            words="zₛ elevation of the sensor, P what it shows, P₀ what it shows in the air, p_a the air "
            "pressure over the water. A sensor without head above it is dry: no level follows.",
            sources=("InstrumentPractice",),
            limits="water of one density; air in the vent is not counted, 0.12 % of the head",
        ),
        Method(
            name="Gas in a bubbler's line",
            formula="p = P − P₀ + (ρ_g − ρ_a)·g·(zᵢ − zₛ), L = zₛ + p/(γ − ρ_a·g)",
            words="Counted when the elevation zᵢ of the instrument is entered; ρ_g gas in the line, ρ_a air "
            "outside.",
            sources=("InstrumentPractice",),
            limits="no loss of pressure along the line",
        ),
        Method(
            name="Manometer",
            formula="p = p_e + Σ γᵢ·Δzᵢ",
            words="Walked from the tap in the water to the far end, whose pressure above the air's is p_e; "
            "Δz up positive, of an inclined tube its length times the sine of its slope.",
            sources=("SignRule",),
            limits="fluids at rest, each of one density; no capillary rise",
        ),
        Method(
            name="Air pressure at another altitude",
            formula="p_a = p_b·(T/T_b)ⁿ, T = T₀ − λ·H, n = g/(R·λ) = 5.256",
            words="From the barometer's geopotential height to the water's; a sea-level pressure is carried "
            "from H = 0. λ 6.5 K/km, R 287.053 J/(kg·K), T₀ 15 °C unless entered.",
            sources=("StandardAtmosphere1976", "AtmospherePractice"),
            limits="still air of one lapse rate, from 5 km below to 10 km above sea level; beyond, no answer",
        ),
        Method(
            name="Density of air",
            formula="ρ = p/(R·T)",
            words="Dry air, R 287.053 J/(kg·K).",
            sources=("StandardAtmosphere1976",),
            limits="air half saturated at 20 °C is 0.4 % lighter",
        ),
        Method(
            name="Range of a level",
            formula="worst: least and greatest of all corners; root-sum-square: √(Σ ΔLᵢ²)",
            words="Every link with a low and a high goes to each of its ends; the second figure adds the "
            "changes that each makes alone. The two are never mixed; a level takes over the first.",
            limits=f"at most {MAX_RANGES} links with a range; links without one count as exact",
        ),
    ),
)
