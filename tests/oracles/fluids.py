"""Water and layered fluids at standard gravity, as the tables have them."""

from __future__ import annotations

from typing import Any

from loads.assessment import Assessed
from tests.scenes import panel_under

WATER = "9.80665 kN/m3"
GRAVITY = 9.80665


def under(
    panel: dict[str, Any], level: float, protected: float | None = None, weight: str = WATER
) -> Assessed:
    water = {} if protected is None else {"protected_side": f"{protected!r} m"}
    return panel_under(panel, flood_side=f"{level!r} m", unit_weight=weight, **water)


def mud(top: float, density: float) -> dict[str, Any]:
    weight = f"{density * GRAVITY!r} N/m3"
    return {"side": "flood", "top": f"{top!r} m", "pressure": "fluid mud", "fluid_unit_weight": weight}


def layered(panel: dict[str, Any], surface: float) -> Assessed:
    """0.3 m of 850 over 0.9 m of 1000 over 0.5 m of 1350 kg/m³, measured down from the surface."""
    layers = [mud(surface - 0.3, 1000), mud(surface - 1.2, 1350)]
    return under({**panel, "sediment": layers}, surface, weight=f"{850 * GRAVITY!r} N/m3")
