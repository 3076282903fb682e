"""Closures for the tests of field sheets: one that can be worked by hand, and what strains a page."""

from __future__ import annotations

import copy
from typing import Any

from loads.scenario_file import Document

LONG = (
    "Roadway between the lower yard and the upper yard, with the ramp to the mill race and the gate of "
    "the works beside it all"
)[:120]

PLAIN: Document = {
    "format": 1,
    "title": "Trial of the lower street",
    "location": "Lower street at the race",
    "datum": "trial datum",
    "units": "US",
    "water": {
        "flood_side": {"value": "438.30 ft", "source": "staff at the race", "date": "2031-04-02"},
        "as_of": "2031-04-02T06:00:00-05:00",
    },
    "closure": [
        {
            "id": "K-1",
            "name": "Lower street",
            "sill": "437.40 ft",
            "bays": 3,
            "bay_width": "8 ft",
            "height": "7 ft",
            "rated_level": {"value": "443.40 ft", "source": "engineer of record", "date": "2030-03-02"},
            "allowance": "1.0 ft",
            "note": "Store 2, key at the gate",
            "parts_short": ["one clamp away for repair"],
            "limits": {"freeboard": "1.0 ft"},
            "log": {"height": "0.50 ft", "count": 14, "weight": "62 lb", "limits": {"moment": "1300 lb·ft"}},
            "post": {"brace": {"height": "4 ft", "angle": "45 deg"}},
            "anchor": {"tension_bolts": 2, "lever_arm": "9 in", "shear_bolts": 4},
            "adding": {"with_water": True, "side": "protected", "up_to": "439.90 ft"},
            "install": {"people": 4, "lift": "forklift", "minutes_per_log": "3 min"},
            "handling": {"people_per_log": 2, "limit": "51 lb"},
        }
    ],
}


def changed(closure: dict[str, Any] | None = None, **scenario: Any) -> Document:
    """The plain closure with some fields changed; a field that becomes None is left out."""
    document = copy.deepcopy(PLAIN)
    document.update(scenario)
    for key, value in (closure or {}).items():
        document["closure"][0][key] = value
        if value is None:
            del document["closure"][0][key]
    return document


def _crowded(word: str) -> Document:
    """Sixty bays of thirty logs, and every text as long as a file may have it."""
    long = (word * 300)[:300]
    short, source = long[:120].strip(), {"source": long, "date": "2030-03-02"}
    return changed(
        {
            "id": long[:24].strip(),
            "name": short,
            "bays": 60,
            "height": None,
            "note": long,
            "rated_level": {"value": "443.40 ft", **source},
            "parts_short": [long] * 50,
            "log": {"height": "3 in", "count": [30 - bay % 9 for bay in range(60)]},
            "logs_in_place": [20 - bay % 7 for bay in range(60)],
            "install": {
                "lift": long,
                "people": 1000,
                "minutes_per_log": "3 min",
                "minutes_per_post": "9 min",
            },
            "guide": {"one_way": True},
            "allowance": "7 ft",
        },
        title=short,
        location=short,
        datum=short,
        revision=short,
        water={"flood_side": {"value": "442.6 ft", "low": "440 ft", "high": "443 ft", **source}},
    )


CROWDED = {
    "long words": _crowded(f"{LONG} "),
    "wide letters": _crowded("W"),
    "wide letters in words": _crowded("WWWW WWWWWWW "),
    "cyrillic": _crowded("Щитовой затвор "),
}
"""Closures that strain a page."""

BARE = changed(
    dict.fromkeys(
        (
            *("height", "rated_level", "allowance", "note", "parts_short", "limits", "anchor", "adding"),
            *("install", "handling", "post", "name"),
        )
    )
    | {"bays": 1, "log": {"height": "0.50 ft", "count": 3}},
    location="",
)
"""As little as a closure needs."""
