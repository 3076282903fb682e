"""The table of heads and the worked example of a stop-log bay that people check by hand."""

from __future__ import annotations

import numpy as np
import pytest

from tests.agreement import Agree, printed
from tests.scenes import FOOT, POUND, panel_under

PLACE = (
    "common practice, no source; worked by hand from γh, γh²/2 and γh³/6 with 62.4 lb/ft³, "
    "the metric columns with 9.81 kN/m³"
)
ROWS = [
    ("1", "62", "31", "10", "0.305", "2.99", "0.46", "0.05"),
    ("2", "125", "125", "83", "0.610", "5.98", "1.82", "0.37"),
    ("3", "187", "281", "281", "0.914", "8.97", "4.10", "1.25"),
    ("4", "250", "499", "666", "1.219", "11.96", "7.29", "2.96"),
    ("5", "312", "780", "1300", "1.524", "14.95", "11.39", "5.79"),
    ("6", "374", "1123", "2246", "1.829", "17.94", "16.40", "10.00"),
    ("8", "499", "1997", "5325", "2.438", "23.92", "29.16", "23.70"),
    ("10", "624", "3120", "10400", "3.048", "29.90", "45.57", "46.30"),
    ("12", "749", "4493", "17971", "3.658", "35.88", "65.62", "80.00"),
    ("16", "998", "7987", "42598", "4.877", "47.84", "116.66", "189.64"),
    ("23.5", "1466", "17230", "134970", "7.163", "70.27", "251.65", "600.85"),
]


@pytest.mark.source("HeadTable", PLACE)
@pytest.mark.parametrize("row", ROWS, ids=[f"{row[0]} ft" for row in ROWS])
def test_head(agree: Agree, row: tuple[str, ...]) -> None:
    feet, psf, pounds, foot_pounds, metres, kpa, kilonewtons, moment = row
    face, level = {"width": "1 ft", "height": f"{feet} ft"}, f"{feet} ft"
    foot = np.array([0.0])
    customary = panel_under(face, flood_side=level)
    pressure = customary.diagram.pressure(foot)
    agree(pressure / POUND * FOOT**2, printed(psf), what="pressure at the foot, lb/ft²")
    agree(customary.resultant.horizontal / POUND, printed(pounds), what="force, lb/ft")
    agree(customary.resultant.moment / POUND / FOOT, printed(foot_pounds), what="moment, lb·ft/ft")
    metric = panel_under(face, flood_side=level, unit_weight="9.81 kN/m3")
    agree(metric.face.top, printed(metres), what="head, m")
    agree(metric.diagram.pressure(foot) / 1e3, printed(kpa), what="pressure at the foot, kPa")
    agree(metric.resultant.horizontal / FOOT / 1e3, printed(kilonewtons), what="force, kN/m")
    agree(metric.resultant.moment / FOOT / 1e3, printed(moment), what="moment, kN·m/m")


@pytest.mark.source(
    "HeadTable", PLACE + "; whole openings, 44 ft by 16 ft and 31.5 ft by 23.5 ft full of water"
)
@pytest.mark.parametrize(("width", "height", "kips"), [("44", "16", "351"), ("31.5", "23.5", "543")])
def test_whole_opening(agree: Agree, width: str, height: str, kips: str) -> None:
    opening = {"width": f"{width} ft", "height": f"{height} ft"}
    force = panel_under(opening, flood_side=f"{height} ft").resultant.horizontal
    agree(force / POUND / 1e3, printed(kips), what="force, kip")


@pytest.mark.source(
    "HeadTable", "common practice, no source; worked by hand: 2.25 m of water, bays of 1.95 m, 9.81 kN/m³"
)
def test_bay_of_a_removable_wall(agree: Agree) -> None:
    bay = {"width": "1.95 m", "height": "2.25 m"}
    barrier = panel_under(bay, flood_side="2.25 m", unit_weight="9.81 kN/m3")
    agree(barrier.diagram.pressure(np.array([0.0])) / 1e3, printed("22.1"), what="pressure at the foot, kPa")
    agree(barrier.resultant.horizontal / 1e3, printed("48.4"), what="force on a post, kN")
    agree(barrier.resultant.moment / 1e3, printed("36.3"), what="moment at a post's foot, kN·m")
    force, _ = barrier.diagram.stacked(np.array([0.0, 0.15]))
    agree(force / 1e3, printed("3.20"), what="line load of the bottom log of 150 mm, kN/m")


@pytest.mark.source("HeadTable", PLACE + "; 6 ft on a sill, posts at 8 ft, logs of 0.50 ft")
def test_stop_log_bay(agree: Agree) -> None:
    bay = {"bottom": "437.40 ft", "width": "8 ft", "height": "7 ft"}
    barrier = panel_under(bay, flood_side="443.40 ft")
    agree(barrier.resultant.horizontal / POUND, printed("8986"), what="force on a post, lb")
    agree(barrier.resultant.moment / POUND / FOOT, printed("17971"), what="moment at a post's foot, lb·ft")
    rise = barrier.resultant.line_of_action - barrier.face.bottom
    agree(rise / FOOT, printed("2.0"), what="height of the resultant, ft")
    edges = barrier.face.bottom + np.linspace(0.0, 6 * FOOT, 13)
    logs, _ = barrier.diagram.stacked(edges)
    agree(logs[0, 0] / POUND * FOOT, printed("179"), what="line load of the bottom log, lb/ft")
    middles = (edges[:-1] + edges[1:]) / 2 - barrier.face.bottom
    agree(logs.sum() / POUND * FOOT, printed("1123.2"), what="sum over the 12 logs, lb/ft")
    at_middles = float(logs[0] @ middles)
    agree(at_middles / POUND, printed("2254.2"), what="moment with every log's load at its middle, lb·ft/ft")
    excess = at_middles / (float(barrier.resultant.moment[0]) / (8 * FOOT)) - 1
    agree(excess * 100, printed("0.35"), what="by which that is more than the exact moment, %")
