"""Manual handling: the revised NIOSH lifting equation and British guidance."""

from __future__ import annotations

import numpy as np
import pytest

from loads.closure.handling import guideline_factor, team_limit
from loads.closure.lifting_equation import (
    Lift,
    System,
    lifting_index,
    multipliers,
    recommended_weight,
)
from tests.agreement import Agree, printed
from tests.scenes import POUND

INCH, GRAVITY = 0.0254, 9.80665
BY_TABLES = "printed from table multipliers of two figures; the equation is not rounded here"


def lift(*, horizontal: float, vertical: float, travel: float, coupling: str = "good") -> Lift:
    """Lift straight ahead and seldom; lengths in inches."""
    return Lift(
        horizontal=np.array([horizontal * INCH]),
        vertical=np.array([vertical * INCH]),
        travel=np.array([travel * INCH]),
        asymmetry=np.array([0.0]),
        frequency_multiplier=np.array([1.0]),
        coupling="fair" if coupling == "fair" else "good",
    )


PLACE = "published; load constant and HM, VM, DM as in a reference handbook, sec. 46.2.1"


@pytest.mark.source("NIOSH94110", PLACE)
def test_load_constant_is_what_the_best_lift_may_weigh(agree: Agree) -> None:
    best = recommended_weight(lift(horizontal=10, vertical=30, travel=10), "US")
    agree(best / POUND, printed("51"), what="RWL, US form, lb")
    metric = Lift(
        horizontal=np.array([0.25]),
        vertical=np.array([0.75]),
        travel=np.array([0.25]),
        asymmetry=np.array([0.0]),
        frequency_multiplier=np.array([1.0]),
        coupling="good",
    )
    agree(recommended_weight(metric, "metric") / GRAVITY, printed("23"), what="RWL, metric form, kg")


EXAMPLE = "from memory, to be confirmed; Example 1, punch press: H 23 in, D 48 in, fair hold, 44 lb"


@pytest.mark.source("NIOSH94110", EXAMPLE)
@pytest.mark.parametrize(
    ("where", "vertical", "table_vertical", "unrounded", "in_print"),
    [("origin", 15, "0.89", "16.03", "16.3"), ("destination", 63, "0.75", "14.31", "14.5")],
)
def test_punch_press(
    agree: Agree, where: str, *, vertical: float, table_vertical: str, unrounded: str, in_print: str
) -> None:
    case = lift(horizontal=23, vertical=vertical, travel=48, coupling="fair")
    found = recommended_weight(case, "US") / POUND
    agree(found, printed(in_print), rel=0.02, why=BY_TABLES, what=f"RWL at the {where}, lb")
    agree(found, printed(unrounded), what=f"RWL at the {where}, worked by hand without rounding, lb")
    parts = multipliers(case, "US")
    agree(parts.horizontal, printed("0.44"), abs=0.006, why="the table has 0.44 for 0.4348", what="HM")
    agree(parts.vertical, printed(table_vertical), what=f"VM at the {where}")
    agree(parts.distance, printed("0.86"), what="DM")


@pytest.mark.source("NIOSH94110", EXAMPLE)
def test_lifting_index_of_the_punch_press(agree: Agree) -> None:
    limit = recommended_weight(lift(horizontal=23, vertical=15, travel=48, coupling="fair"), "US")
    agree(lifting_index(np.array([44 * POUND]), limit), printed("2.7"), what="LI at the origin")


@pytest.mark.source("NIOSH94110", f"{PLACE}; the two forms side by side, each at its own reference lengths")
@pytest.mark.parametrize("height", [0.2, 0.75, 1.2, 1.7])
@pytest.mark.parametrize("reach", [0.26, 0.4, 0.6])
@pytest.mark.parametrize("travel", [0.3, 1.0, 1.7])
def test_the_two_forms_agree_as_far_as_they_are_published(
    agree: Agree, height: float, reach: float, travel: float
) -> None:
    def of(system: System) -> float:
        case = lift(horizontal=reach / INCH, vertical=height / INCH, travel=travel / INCH)
        return recommended_weight(case, system).item()

    share = of("metric") / of("US")
    agree(share, 1.0, rel=0.04, why="51 lb is 23.13 kg, 25 cm is 9.84 in", what="metric over US form")


@pytest.mark.source(
    "NIOSH94110",
    f"{PLACE}; worked by hand at H 50 cm, V 125 cm, D 90 cm and H 20 in, V 50 in, D 36 in; AM is "
    "from memory, to be confirmed",
)
@pytest.mark.parametrize(
    ("system", "unit", "lengths", "vertical", "distance"),
    [("metric", 0.01, (50, 125, 90), "0.85", "0.87"), ("US", INCH, (20, 50, 36), "0.85", "0.87")],
)
def test_multipliers_worked_by_hand(
    agree: Agree, system: System, *, unit: float, lengths: tuple[int, int, int], vertical: str, distance: str
) -> None:
    H, V, D = (np.array([length * unit]) for length in lengths)
    turned = Lift(
        horizontal=H,
        vertical=V,
        travel=D,
        asymmetry=np.radians([30.0]),
        frequency_multiplier=np.array([0.94]),
        coupling="poor",
    )
    found = multipliers(turned, system)
    agree(found.horizontal, 0.5, rel=1e-12, what=f"HM, {system}")
    agree(found.vertical, float(vertical), rel=1e-12, what=f"VM, {system}")
    agree(found.distance, float(distance), rel=1e-12, what=f"DM, {system}")
    agree(found.asymmetry, 0.904, rel=1e-12, what=f"AM, {system}")
    share = 0.5 * 0.85 * 0.87 * 0.904 * 0.94 * 0.90
    agree(found.product(), share, rel=1e-12, what=f"product with FM 0.94 and CM 0.90, {system}")


@pytest.mark.source("INDG143", "published; twist and frequency, as seen in the guide's text")
@pytest.mark.parametrize(
    ("twist", "per_minute", "left"),
    [
        (0, 0.4, "1.00"),
        (0, 0.5, "1.00"),
        (46, 0, "0.90"),
        (91, 0, "0.80"),
        (0, 1, "0.70"),
        (0, 2, "0.70"),
        (0, 5, "0.50"),
        (0, 8, "0.50"),
        (0, 12.5, "0.20"),
    ],
)
def test_reductions_of_the_guideline_weight(agree: Agree, twist: float, per_minute: float, left: str) -> None:
    found = guideline_factor(np.radians([twist]), np.array([per_minute / 60]))
    agree(found, printed(left), what=f"share left at {twist}°, {per_minute} lifts a minute")


@pytest.mark.source("HSEL23", "from memory, to be confirmed; two people two thirds, three half of the sum")
@pytest.mark.parametrize(("people", "share"), [(1, 1), (2, 2 / 3), (3, 1 / 2)])
def test_people_lifting_together(agree: Agree, people: int, share: float) -> None:
    found = team_limit(np.full((1, people), 250.0))
    agree(found, share * people * 250.0, rel=1e-12, what=f"limit of {people}, N")
