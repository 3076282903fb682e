"""Thrust on circular arcs against tables computed to 30 digits, and against integration round the arc."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest
from scipy.integrate import quad

from tests.agreement import Agree, printed
from tests.oracles.fluids import GRAVITY, WATER, layered, under
from tests.scenes import chain_force

RANDOM = np.random.default_rng(20310403)
ARCS = [tuple(float(part) for part in row) for row in RANDOM.uniform((0.3, -85, 0.1), (20, 60, 1.8), (8, 3))]


def quarter(radius: float, centre: str, sense: int) -> dict[str, Any]:
    size = {"width": "1 m", "height": f"{radius} m", "radius": f"{radius} m", "offset": f"{sense * radius} m"}
    return {"shape": "arc", "centre": centre, **size}


@pytest.mark.parametrize(
    ("centre", "sense", "up"),
    [
        ("protected", 1, "-4735.181477"),
        ("protected", -1, "17329.78102"),
        ("flood", 1, "-17329.78102"),
        ("flood", -1, "4735.181477"),
    ],
)
def test_h14_quarter_circles(agree: Agree, centre: str, sense: int, up: str) -> None:
    found = under(quarter(1.5, centre, sense), 1.5).resultant
    agree(found.horizontal, printed("11032.48125"), what="horizontal part, N")
    agree(found.vertical, printed(up), what="vertical part, N, up")


@pytest.mark.parametrize(
    ("level", "across", "up"),
    [(2.0, "19613.3", "3553.383679"), (2.5, "29419.95", "3553.383679"), (1.4, "9610.517", "2775.1449")],
)
def test_h15_arc_about_its_axis(agree: Agree, level: float, across: str, up: str) -> None:
    arc = {"shape": "arc", "width": "1 m", "height": "2 m", "offset": "0 m", "radius": "2 m"}
    barrier = under(arc | {"centre": "protected"}, level)
    found = barrier.resultant
    agree(found.horizontal, printed(across), what="horizontal part, N")
    agree(found.vertical, printed(up), what="vertical part, N, up")
    about_centre = found.moment - found.horizontal * 1 + found.vertical * math.sqrt(3)
    agree(about_centre, 0.0, abs=1e-6, what="moment about the centre, N·m")
    if level == 2.0:
        agree(found.total, printed("19932.5882"), what="resultant, N")
        angle = math.degrees(math.atan2(found.vertical[0], found.horizontal[0]))
        agree(angle, printed("10.26901184"), what="slope of the resultant, degrees")


@pytest.mark.parametrize(
    ("chords", "up"),
    [
        (1, "11032.481250"),
        (2, "15602.284610"),
        (4, "16887.791169"),
        (8, "17218.642558"),
        (16, "17301.956206"),
        (32, "17322.822304"),
    ],
)
def test_h16_plane_panels_along_an_arc(agree: Agree, chords: int, up: str) -> None:
    angles = np.linspace(math.pi, 1.5 * math.pi, chords + 1)[::-1]
    points = [(1.5 * math.cos(angle), 1.5 + 1.5 * math.sin(angle)) for angle in angles]
    across, vertical, _ = chain_force(points, "1 m", flood_side="1.5 m", unit_weight=WATER)
    agree(across, printed("11032.48125"), what="horizontal part, N")
    agree(vertical, printed(up), what="vertical part, N, up")


def test_h17_three_fluids_on_an_arc(agree: Agree) -> None:
    found = layered(quarter(1.7, "protected", -1), 1.7).resultant
    agree(found.horizontal, printed("13915.63635"), what="horizontal part, N")
    agree(found.vertical, printed("22936.93318"), what="vertical part, N, up")


@pytest.mark.parametrize("arc", ARCS)
@pytest.mark.parametrize("centre", ["flood", "protected"])
def test_arc_by_integration_round_it(agree: Agree, arc: tuple[float, ...], centre: str) -> None:
    radius, start, share = arc
    low, high = math.radians(start), math.radians(start + 25)
    bulge = 1 if centre == "flood" else -1
    height = radius * (math.sin(high) - math.sin(low))
    offset = bulge * radius * (math.cos(high) - math.cos(low))
    size = {"height": f"{height!r} m", "offset": f"{offset!r} m", "radius": f"{radius!r} m"}
    level = share * height
    found = under({"shape": "arc", "width": "2 m", "centre": centre, **size}, level).resultant
    wet = min(high, math.asin(min(1.0, math.sin(low) + level / radius)))

    def pressure(angle: float) -> float:
        return 2 * 1000 * GRAVITY * (level - radius * (math.sin(angle) - math.sin(low))) * radius

    across = quad(lambda a: pressure(a) * math.cos(a), low, wet, epsrel=1e-12)[0]
    up = quad(lambda a: pressure(a) * math.sin(a), low, wet, epsrel=1e-12)[0] * bulge
    agree(found.horizontal, across, rel=1e-9, what="horizontal part, N")
    agree(found.vertical, up, abs=1e-9 * abs(across) + 1e-6, what="vertical part, N")
    moment = -across * radius * math.sin(low) - up * -bulge * radius * math.cos(low)
    agree(found.moment, moment, abs=1e-8 * abs(across) * radius, what="moment, N·m")
