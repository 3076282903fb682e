"""A scenario seen from the other side."""

from __future__ import annotations

from typing import Any

from loads.scenario_file import Document
from tests.laws.strategies import text

OTHER = {"flood": "protected", "protected": "flood"}
FAR_BELOW = "-600 m"


def mirrored(document: Document) -> Document:
    """Swap levels, fluids and sediment, and turn the face round."""
    (panel,) = document["panel"]
    turned: dict[str, Any] = dict(panel)
    if "tilt" in panel:
        turned["tilt"] = text(180 - float(panel["tilt"].removesuffix(" deg")), "deg")
    if panel["shape"] == "arc":
        offset = panel["offset"]
        turned["offset"] = offset.removeprefix("-") if offset.startswith("-") else f"-{offset}"
        turned["centre"] = OTHER[panel["centre"]]
    if "sediment" in panel:
        turned["sediment"] = [{**layer, "side": OTHER[layer["side"]]} for layer in panel["sediment"]]
    water = document["water"]
    swapped = {
        "flood_side": water.get("protected_side", FAR_BELOW),
        "protected_side": water["flood_side"],
        "unit_weight": water.get("protected_unit_weight", water["unit_weight"]),
        "protected_unit_weight": water["unit_weight"],
    }
    return {**document, "water": swapped, "panel": [turned]}
