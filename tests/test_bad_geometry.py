"""Arcs that cannot stand and outlines that enclose nothing, each with its sentence."""

from __future__ import annotations

from typing import Any

import pytest

from tests.refused import SOIL, Table, of_panel

ARC: Table = {
    "shape": "arc",
    "width": "5 ft",
    "height": "6 ft",
    "offset": "1 ft",
    "radius": "8 ft",
    "centre": "flood",
}


def test_arcs_that_cannot_stand() -> None:
    (short,) = of_panel({**ARC, "radius": "2 ft"})
    assert short == (
        'panel[P1].radius is "2 ft"; an arc of this radius cannot span from the bottom edge to the top edge: '
        "they are 6.083 ft (1.854 m) apart, so the radius must be at least 3.041 ft (0.927 m)"
    )
    (bent,) = of_panel({**ARC, "offset": "6.1 ft", "radius": "4.5 ft"})
    assert "would run above its own top edge or below its own bottom edge" in bent
    (tilted,) = of_panel({**ARC, "tilt": "80 deg"})
    assert tilted == 'panel[P1].tilt is "80 deg"; it is not used by shape "arc"; leave it out'
    (soil,) = of_panel(ARC, SOIL)
    assert (
        "a curved face takes sediment as fluid mud, equivalent fluid or with an entered coefficient" in soil
    )


def corners(*points: tuple[float, float]) -> list[list[str]]:
    return [[f"{across} ft", f"{up} ft"] for across, up in points]


@pytest.mark.parametrize(
    ("points", "holes", "words"),
    [
        (((0, 0), (2, 2), (2, 0), (0, 2)), (), "panel[P1].points do not make an outline: self-intersection"),
        (((0, 0), (1, 0), (2, 0)), (), "panel[P1].points"),
        (((0, 1), (1, 1), (1, 2)), (), "panel[P1].points must have their lowest corner at 0 up the face"),
        (((0, -1), (1, 1), (1, 2)), (), "panel[P1].points must have their lowest corner at 0 up the face"),
        (
            ((0, 0), (4, 0), (4, 4)),
            (((9, 9), (9.5, 9), (9.5, 9.5)),),
            "panel[P1].holes[0] must be a closed shape",
        ),
        (((0, 0), (4, 0), (4, 4)), (((3, 1), (3, 1), (3, 1)),), "panel[P1].holes[0] must be a closed shape"),
        (
            ((0, 0), (4, 0), (4, 4), (0, 4)),
            (((1, 1), (3, 1), (3, 3), (1, 3)), ((2, 2), (3.5, 2), (3.5, 3.5))),
            "panel[P1].holes do not fit the outline",
        ),
        (((0, 0), (1, 0)), (), "panel[P1].points is a list; it needs at least 3"),
    ],
)
def test_outlines(points: Any, holes: Any, words: str) -> None:
    panel = {"shape": "outline", "points": corners(*points), "holes": [corners(*hole) for hole in holes]}
    (found,) = of_panel(panel)
    assert found.startswith(words)


def test_trapezoid_without_width() -> None:
    (found,) = of_panel({"shape": "trapezoid", "bottom_width": "0 ft", "top_width": "0 ft", "height": "1 ft"})
    assert found.endswith("must not be zero as well as bottom_width")
