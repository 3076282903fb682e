"""Closures against other computations: numerical integration, and an open library of weir formulas."""

from __future__ import annotations

import math
from collections.abc import Callable
from itertools import pairwise

import fluids.open_flow as library
import numpy as np
import pytest
from scipy.integrate import quad

from loads.arrays import FloatArray
from loads.closure.gap import gap_flow, head_integral
from loads.closure.leakage import SealRate, end_seal_leakage
from loads.closure.weirs import (
    flow_ackers,
    flow_broad_crest,
    flow_kindsvater_carter,
    flow_kindsvater_carter_contracted,
    flow_rehbock,
)
from loads.density import STANDARD_GRAVITY

DRY = -math.inf
Case = tuple[float, float, float, float]
CASES: list[Case] = [
    (2.0, DRY, 0.0, 1.5),
    (2.0, -1.0, 0.0, 1.5),
    (2.0, 0.7, 0.0, 1.5),
    (2.0, 1.8, 0.0, 1.5),
    (1.0, DRY, 0.0, 1.5),
    (1.0, 0.4, 0.0, 1.5),
    (1.0, 1.0, 0.0, 1.5),
    (0.6, 1.0, 0.0, 1.5),
    (5.0, 3.2, 3.199, 3.201),
    (103.2, 101.7, 98.2, 103.0),
]


def integral_by_quad(flood: float, protected: float, bottom: float, top: float, exponent: float) -> float:
    """Add up the head's power from the pressures on the two sides, knowing nothing of the closed form."""

    def integrand(z: float) -> float:
        head = max(flood - z, 0.0) - max(protected - z, 0.0)
        return float(head**exponent) if head > 0 else 0.0

    marks = sorted({bottom, top, *(level for level in (flood, protected) if bottom < level < top)})
    return math.fsum(quad(integrand, a, b, epsabs=1e-13, epsrel=1e-12)[0] for a, b in pairwise(marks))


def one(value: float) -> FloatArray:
    return np.array([value])


def arrays(case: Case) -> tuple[FloatArray, FloatArray, FloatArray, FloatArray]:
    flood, protected, bottom, top = case
    return one(flood), one(protected), one(bottom), one(top)


@pytest.mark.parametrize("case", CASES)
@pytest.mark.parametrize("exponent", [0.0, 0.5, 0.73, 1.0, 2.4])
def test_integral_of_the_head(case: Case, exponent: float) -> None:
    found = head_integral(*arrays(case), exponent)
    assert found.item() == pytest.approx(integral_by_quad(*case, exponent), rel=1e-9, abs=1e-12)


@pytest.mark.parametrize("case", CASES)
def test_gap(case: Case) -> None:
    found = gap_flow(*arrays(case), width=one(0.02), discharge_coefficient=0.61)
    expected = 0.61 * 0.02 * math.sqrt(2 * STANDARD_GRAVITY) * integral_by_quad(*case, 0.5)
    assert found.item() == pytest.approx(expected, rel=1e-9, abs=1e-13)


@pytest.mark.parametrize("case", CASES)
def test_end_seal(case: Case) -> None:
    seal = SealRate(rate=3e-6, stated_head=1.5, exponent=0.8)
    found = end_seal_leakage(*arrays(case), seal)
    expected = 3e-6 / 1.5**0.8 * integral_by_quad(*case, 0.8)
    assert found.item() == pytest.approx(expected, rel=1e-9, abs=1e-18)


@pytest.mark.parametrize(
    ("ours", "theirs"),
    [
        (flow_rehbock, library.Q_weir_rectangular_full_Rehbock),
        (flow_ackers, library.Q_weir_rectangular_full_Ackers),
        (flow_kindsvater_carter, library.Q_weir_rectangular_full_Kindsvater_Carter),
        (flow_kindsvater_carter_contracted, library.Q_weir_rectangular_Kindsvater_Carter),
    ],
)
def test_weir_formulas(
    ours: Callable[[FloatArray, FloatArray, FloatArray], FloatArray],
    theirs: Callable[[float, float, float], float],
) -> None:
    head, height = np.linspace(0.03, 1.2, 14), np.array([0.2, 0.5, 2.0])
    found = ours(head[:, None], height, np.array([3.0]))
    expected = [[theirs(float(h), float(p), 3.0) for p in height] for h in head]
    np.testing.assert_allclose(found, expected, rtol=1e-12)


@pytest.mark.parametrize("tail", [0.0, 0.3, 0.66, 0.7, 0.95])
def test_broad_crest_is_the_greatest_flow_that_the_energy_allows(tail: float) -> None:
    depth = np.linspace(tail, 1.0, 200_001)
    expected = (depth * np.sqrt(2 * STANDARD_GRAVITY * (1.0 - depth))).max()
    found = flow_broad_crest(one(1.0)[:, None], one(tail)[:, None], one(1.0))
    assert found.item() == pytest.approx(expected, rel=1e-9)
