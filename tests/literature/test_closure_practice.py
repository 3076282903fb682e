"""Closures worked by hand: a bay of stop logs, a removable wall, a log at the foot of two metres of water."""

from __future__ import annotations

from typing import Any

import numpy as np
import pytest

from loads.assessment import AssessedClosure
from loads.part import Part
from tests.agreement import Agree, printed
from tests.closures import closure_under, part_of
from tests.scenes import FOOT, POUND

HAND = "common practice, no source; worked by hand from γh, γh²/2 and γh³/6"
MILL: dict[str, Any] = {
    "id": "C-07",
    "sill": "437.40 ft",
    "bays": 3,
    "bay_width": "8 ft",
    "rated_level": {"value": "443.40 ft", "source": "engineer of record", "date": "2030-03-02"},
    "log": {"height": "0.50 ft", "count": 14},
    "post": {},
}


def most_loaded(barrier: AssessedClosure, kind: str) -> Part:
    return max((part for part in barrier.parts if part.kind == kind), key=lambda part: part.reaction[0])


@pytest.mark.source("HeadTable", HAND + "; 6 ft on a sill, posts at 8 ft, 62.4 lb/ft³, logs of 0.50 ft")
def test_stop_log_closure_at_the_rated_level(agree: Agree) -> None:
    barrier = closure_under(MILL, flood_side="443.40 ft")
    post, log = part_of(barrier, "post 1"), part_of(barrier, "bay 1 log 1")
    per_foot = barrier.resultant.horizontal / (3 * 8) / POUND
    agree(
        barrier.diagram.pressure(np.array([barrier.face.bottom])) / POUND * FOOT**2,
        printed("374"),
        what="pressure at the sill, lb/ft²",
    )
    agree(per_foot, printed("1123"), what="force, lb/ft")
    agree(barrier.resultant.moment / (3 * 8) / POUND / FOOT, printed("2246"), what="moment, lb·ft/ft")
    agree(post.reaction / POUND, printed("8986"), what="force on a post, lb")
    agree(post.moment / POUND / FOOT, printed("17971"), what="moment at the foot of a post, lb·ft")
    agree(
        (barrier.resultant.line_of_action - barrier.face.bottom) / FOOT,
        printed("2.0"),
        what="resultant above the sill, ft",
    )
    agree(log.line_load / POUND * FOOT, printed("179"), what="line load of the bottom log, lb/ft")
    agree(log.moment / POUND / FOOT, printed("1435"), what="moment of the bottom log, lb·ft")
    agree(log.reaction / POUND, printed("718"), what="end reaction of the bottom log, lb")


@pytest.mark.source("HeadTable", HAND + "; the same closure, log by log")
def test_logs_add_up_and_log_middles_do_not(agree: Agree) -> None:
    barrier = closure_under(MILL, flood_side="443.40 ft")
    logs = [part for part in barrier.parts if part.kind == "log"][:12]
    load = np.array([log.line_load[0] for log in logs])
    middle = np.array([(log.bottom + log.top) / 2 - logs[0].bottom for log in logs])
    agree(load.sum() / POUND * FOOT, printed("1123.2"), what="sum over the 12 wet logs, lb/ft")
    agree(load @ middle / POUND, printed("2254.2"), what="moment with every load at mid-log, lb·ft/ft")
    exact = barrier.resultant.moment[0] / (3 * 8 * FOOT)
    agree(exact / POUND, printed("2246.4"), what="exact moment, lb·ft/ft")


@pytest.mark.source("LogCount", HAND + "; level 438.30 ft, 1.0 ft uncertainty and 1.0 ft freeboard")
def test_logs_needed(agree: Agree) -> None:
    closure = {**MILL, "allowance": "1.0 ft", "limits": {"freeboard": "1.0 ft"}}
    needed = closure_under(closure, flood_side="438.30 ft").hydraulics.needed
    agree(needed.count[0, 0], printed("6"), what="logs")
    agree(needed.top[0, 0] / FOOT, printed("440.40"), what="top of the logs, ft")


@pytest.mark.source("HeadTable", HAND + "; 2.25 m of water, bays of 1.95 m, logs of 150 mm, 9.81 kN/m³")
def test_removable_wall(agree: Agree) -> None:
    wall = {
        "id": "W",
        "sill": "0 m",
        "bays": 4,
        "bay_width": "1.95 m",
        "log": {"height": "150 mm", "count": 15},
    }
    barrier = closure_under(wall, flood_side="2.25 m", unit_weight="9.81 kN/m3")
    post, log = part_of(barrier, "post 2"), part_of(barrier, "bay 2 log 1")
    agree(barrier.diagram.pressure(np.array([0.0])) / 1e3, printed("22.1"), what="base pressure, kPa")
    agree(post.shear / 1e3, printed("48.4"), what="shear of a post, kN")
    agree(post.moment / 1e3, printed("36.3"), what="moment of a post, kN·m")
    agree(log.line_load / 1e3, printed("3.20"), what="line load of the bottom log, kN/m")
    agree(log.moment / 1e3, printed("1.52"), what="moment of the bottom log, kN·m")
    agree(log.reaction / 1e3, printed("3.12"), what="end reaction of the bottom log, kN")


@pytest.mark.source(
    "ElementaryBeamTheory", HAND + "; a log of 3.0 m and 150 mm at the foot of 2.00 m of water, 9.81 kN/m³"
)
def test_log_at_the_foot(agree: Agree) -> None:
    closure = {
        "id": "L",
        "sill": "0 m",
        "bays": 1,
        "bay_width": "3 m",
        "log": {"height": "150 mm", "count": 14},
    }
    log = part_of(closure_under(closure, flood_side="2 m", unit_weight="9.81 kN/m3"), "bay 1 log 1")
    agree(log.line_load / 1e3, printed("2.8326"), what="line load, kN/m")
    agree(log.moment / 1e3, printed("3.1867"), what="moment, kN·m")
    agree(log.reaction / 1e3, printed("4.2490"), what="end reaction, kN")


@pytest.mark.source(
    "Dighe", "published; Ex. 1.27, p. 38: 9 ft of water on 10 ft, carried by two equal members"
)
def test_two_members_share_the_load(agree: Agree) -> None:
    closure = {
        "id": "D",
        "sill": "0 ft",
        "bays": 1,
        "bay_width": "10 ft",
        "log": {"height": "1 ft", "count": 9},
    }
    barrier = closure_under(closure, flood_side="9 ft")
    for guide in ("left guide", "right guide"):
        agree(part_of(barrier, guide).reaction / POUND, printed("12636"), what=f"load on the {guide}, lb")
