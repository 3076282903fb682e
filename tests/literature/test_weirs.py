"""Flow over crests: the figures of an open library's documentation and of textbooks."""

from __future__ import annotations

import math
from collections.abc import Callable

import numpy as np
import pytest
from scipy.optimize import brentq

from loads.arrays import FloatArray
from loads.closure.overflow import Openings, overflow
from loads.closure.weirs import (
    FRANCIS_COEFFICIENT,
    drowning_factor,
    flow_ackers,
    flow_broad_crest,
    flow_kindsvater_carter,
    flow_kindsvater_carter_contracted,
    flow_rehbock,
    flow_sharp_crest,
)
from loads.density import STANDARD_GRAVITY
from tests.agreement import Agree, printed
from tests.scenes import FOOT

Flow = Callable[[FloatArray, FloatArray, FloatArray], FloatArray]
METRE = np.array([1.0])


def coefficient_of(flow_of_unit_head: float) -> float:
    """Discharge coefficient C_d of a formula Q = C b H^1.5, C in metres and seconds."""
    return flow_of_unit_head / (2 / 3 * math.sqrt(2 * STANDARD_GRAVITY))


@pytest.mark.source("Blevins1984", "published; worked figures of an open library's documentation, g 9.80665")
@pytest.mark.parametrize(
    ("flow", "head", "crest_height", "width", "expected"),
    [
        (flow_ackers, 0.9, 0.6, 5.0, "9.251938159899948"),
        (flow_rehbock, 0.3, 0.4, 2.0, "0.6486856330601333"),
        (flow_kindsvater_carter, 0.3, 0.4, 2.0, "0.641560300081563"),
        (flow_kindsvater_carter_contracted, 0.2, 0.5, 1.0, "0.15545928949179422"),
    ],
    ids=["Ackers", "Rehbock", "Kindsvater and Carter", "Kindsvater and Carter, contracted"],
)
def test_library_figures(
    agree: Agree, flow: Flow, *, head: float, crest_height: float, width: float, expected: str
) -> None:
    found = flow(np.array([[head]]), np.array([crest_height]), np.array([width]))
    agree(found, float(expected), rel=1e-12, what="flow, m³/s")


@pytest.mark.source(
    "Cengel",
    "published; Ex. 13-11, p. 746: water 1.5 m deep, weir 0.6 m high and 5 m wide, C_d = 0.598 + 0.0897 H/P",
)
def test_sharp_crest_with_the_coefficient_of_the_book(agree: Agree) -> None:
    head, coefficient = 1.5 - 0.6, 0.598 + 0.0897 * (1.5 - 0.6) / 0.6
    found = flow_sharp_crest(np.array([[head]]), np.array([5.0]), coefficient)
    agree(found, printed("9.23"), what="flow, m³/s")
    ackers = flow_ackers(np.array([[head]]), np.array([0.6]), np.array([5.0]))
    agree(ackers, printed("9.23"), rel=0.005, why="another formula of equal standing", what="Ackers, m³/s")


@pytest.mark.source(
    "Punmia", "published; Ex. 11.2, p. 539: Q = 2.4 L H^1.5, crest 8 m over the bed and 100 m long, head 2 m"
)
def test_crest_with_the_speed_of_approach_added_once(agree: Agree) -> None:
    coefficient, width = coefficient_of(2.4), np.array([100.0])
    first = flow_sharp_crest(np.array([[2.0]]), width, coefficient)
    speed = first / (100.0 * (8.0 + 2.0))
    second = flow_sharp_crest(2.0 + speed**2 / (2 * STANDARD_GRAVITY), width, coefficient)
    agree(second, printed("690.8"), what="flow, m³/s")


@pytest.mark.source(
    "Daugherty",
    "published; Ex. 12.4, p. 432: 3 ft/s in 1 ft of water, Q = 3.33 b H^1.5, water 4 ft deep after",
)
def test_height_of_a_weir_that_backs_up_a_stream(agree: Agree) -> None:
    flow = 3.0 * 1.0 * FOOT**2

    def excess(head: float) -> float:
        return flow_sharp_crest(np.array([[head]]), METRE).item() - flow

    head = brentq(excess, 0.01, 2.0, xtol=1e-12)
    agree(4.0 - head / FOOT, printed("3.07"), what="height of the weir, ft")


@pytest.mark.source("Francis1855", "published; 3.33 ft^½/s, as used in a textbook example")
def test_coefficient_of_francis(agree: Agree) -> None:
    foot = np.array([FOOT])
    found = flow_sharp_crest(foot[:, None], foot) / FOOT**3
    agree(found, printed("3.33"), what="flow over 1 ft of crest under 1 ft, ft³/s")
    agree(FRANCIS_COEFFICIENT, coefficient_of(3.33 * FOOT**0.5), rel=1e-12, what="discharge coefficient")


@pytest.mark.source(
    "Punmia", "published; Ex. 12.3 and 12.4: broad crest, q = 1.7 H^1.5, 10 m³/s over each metre"
)
def test_head_over_a_broad_crest(agree: Agree) -> None:
    dry = np.array([[0.0]])
    agree(flow_broad_crest(METRE[:, None], dry, METRE), printed("1.7"), what="flow under 1 m, m³/s per metre")

    def excess(head: float) -> float:
        return flow_broad_crest(np.array([[head]]), dry, METRE).item() - 10.0

    head = brentq(excess, 0.1, 10.0, xtol=1e-12)
    agree(head, printed("3.26"), abs=0.01, why="printed from 1.7 in place of 1.705", what="head, m")


@pytest.mark.source(
    "Belanger1828", "published; greatest flow at two thirds of the head, (2/3)^1.5 √g = 1.705"
)
def test_broad_crest_coefficient(agree: Agree) -> None:
    found = flow_broad_crest(METRE[:, None], np.array([[0.0]]), METRE)
    agree(found, printed("1.705"), what="flow under 1 m, m³/s per metre")


@pytest.mark.source(
    "Blevins1984", "published; spread between formulas of equal standing, and to a broad crest"
)
def test_spread_between_formulas(agree: Agree) -> None:
    sharp = flow_sharp_crest(METRE[:, None], METRE)
    broad = flow_broad_crest(METRE[:, None], np.array([[0.0]]), METRE)
    agree((sharp / broad - 1) * 100, printed("8"), what="sharp crest over broad crest, %")


@pytest.mark.source(
    "Villemonte1947", "from memory, to be confirmed; (1 − 0.5^1.5)^0.385 worked by hand: 0.6464^0.385"
)
def test_crest_drowned_to_half_its_head(agree: Agree) -> None:
    found = drowning_factor(np.array([[0.6]]), np.array([[0.3]]))
    agree(found, printed("0.8454"), what="share of the free flow")


LIMITS = [
    ("Rehbock", 0.03, 0.75, 1.0, 0.3, 0.3),
    ("Ackers", 0.02, 4.0, 2.2, 0.15, 0.0),
    ("Kindsvater and Carter, full width", 0.03, 4.0, 2.0, 0.1, 0.15),
    ("Kindsvater and Carter, contracted", 0.03, 4.0, 2.0, 0.1, 0.15),
]


def applies(name: str, *, head: float, crest_height: float, width: float) -> bool:
    crest = Openings(
        crest=np.array([crest_height]),
        width=np.array([width]),
        ground=np.array([0.0]),
        crest_thickness=np.array([np.nan]),
    )
    return name in overflow(crest, np.array([crest_height + head]), np.array([-np.inf])).formulas()


@pytest.mark.source("Blevins1984", "published; limits of use in an open library's documentation")
@pytest.mark.parametrize("limits", LIMITS, ids=[limits[0] for limits in LIMITS])
def test_limits_of_use(limits: tuple[str, float, float, float, float, float]) -> None:
    name, least, most, ratio, height, width = limits
    less, more = 1 - 1e-6, 1 + 1e-6
    wide, high = max(width, 0.1) * more, 10.0
    assert applies(name, head=least * more, crest_height=high, width=wide)
    assert not applies(name, head=least * less, crest_height=high, width=wide)
    assert applies(name, head=most * less, crest_height=high, width=wide)
    assert applies(name, head=most * more, crest_height=high, width=wide) is (name != "Rehbock")
    low = 0.35
    assert applies(name, head=ratio * low * less, crest_height=low, width=wide)
    assert not applies(name, head=ratio * low * more, crest_height=low, width=wide)
    assert applies(name, head=0.05, crest_height=height * more, width=wide)
    assert not applies(name, head=0.05, crest_height=height * less, width=wide)
    assert width == 0 or not applies(name, head=0.05, crest_height=high, width=width * less)
