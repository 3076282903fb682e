"""Douglas: a trapezoidal door, and the hinges of a mitre gate."""

from __future__ import annotations

import math

import pytest

from tests.agreement import Agree, printed
from tests.scenes import panel_under


@pytest.mark.source(
    "Douglas", "published; Ex. 3.1, p. 65: trapezoid 2.7 m over 1.2 m, 1.5 m high, its top hinge 1.1 m deep"
)
def test_moment_of_a_trapezoid_about_its_upper_edge(agree: Agree) -> None:
    door = {"shape": "trapezoid", "bottom_width": "1.2 m", "top_width": "2.7 m", "height": "1.5 m"}
    found = panel_under(door, flood_side="2.6 m", unit_weight="9.81 kN/m3").resultant
    agree((found.horizontal * 1.5 - found.moment) / 1e3, printed("38"), what="moment about the hinge, kN·m")


@pytest.mark.source(
    "Douglas",
    "published; Ex. 3.2, p. 67: mitre gate leaf of 1.8 m, water 5 m and 1.5 m, leaves "
    "at 20°, hinges 0.6 m above "
    "the sill and 4.8 m apart; geometry inferred from the companion notebook's constants",
)
def test_hinges_of_a_mitre_gate(agree: Agree) -> None:
    leaf = {"width": "1.8 m", "height": "5 m"}
    water = {"flood_side": "5 m", "protected_side": "1.5 m", "unit_weight": "9.81 kN/m3"}
    found = panel_under(leaf, **water).resultant
    reaction = found.horizontal / (2 * math.sin(math.radians(20))) / 1e3
    upper = (found.line_of_action - 0.6) / 4.8 * reaction
    why = "printed from the height of the resultant above the lower hinge rounded to 1.18 m"
    agree(upper, printed("72.2"), abs=0.15, why=why, what="upper hinge, kN")
    agree(reaction - upper, printed("221.45"), abs=0.15, why=why, what="lower hinge, kN")
