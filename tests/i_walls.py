"""I-walls for tests, from tables as a file would hold them."""

from __future__ import annotations

from typing import Any

from loads.records.i_wall import IWall

I_WALL: dict[str, Any] = {
    "top": "3 m",
    "tip": "-6 m",
    "gap": "none",
    "passive_factor": 1.5,
    "sediment": [
        {
            "side": "flood",
            "top": "0 m",
            "pressure": "active",
            "saturated_unit_weight": "20 kN/m3",
            "friction_angle": "30 deg",
        },
        {
            "side": "protected",
            "top": "0 m",
            "pressure": "passive",
            "saturated_unit_weight": "20 kN/m3",
            "friction_angle": "30 deg",
        },
    ],
}


def i_wall_of(table: dict[str, Any]) -> IWall:
    """Validated record."""
    return IWall.model_validate({"id": "I1", **table})
