"""What holds for every pressure diagram: its integrals, its strips, its corners."""

from __future__ import annotations

import itertools

import numpy as np
from hypothesis import given
from hypothesis import strategies as st
from numpy.testing import assert_allclose

from loads.arrays import FloatArray
from loads.diagram import Diagram

BOTTOM, TOP = 0.0, 4.0
_NODES, _WEIGHTS = np.polynomial.legendre.leggauss(6)
elevations = st.integers(-20, 60).map(lambda tenths: tenths / 10)


@st.composite
def diagrams(draw: st.DrawFn, states: int = 2) -> Diagram:
    count = draw(st.integers(0, 5))
    terms = []
    for _ in range(count):
        knots = np.array([draw(elevations) for _ in range(states)])
        step, slope = draw(st.sampled_from([0.0, 300.0, -700.0])), draw(st.floats(-2e4, 2e4))
        terms.append((knots, step, slope))
    return Diagram.of_terms(states, terms)


def integral(diagram: Diagram, state: int, low: float, power: int) -> float:
    """∫ p(z) (z − low)ⁿ dz from `low` to above everything, piece by piece with no closed form."""
    one = diagram.take(state)
    marks = np.unique([low, *(knot for knot in one.knot[0] if knot > low)])
    total = 0.0
    for start, end in itertools.pairwise(marks):
        z = (start + end) / 2 + (end - start) / 2 * _NODES
        total += float((end - start) / 2 * _WEIGHTS @ (one.pressure(z)[0] * (z - low) ** power))
    return total


@given(diagrams(), elevations)
def test_shear_moment_and_their_integral_are_integrals_of_pressure(diagram: Diagram, z: float) -> None:
    at = np.array([z])
    for state in range(diagram.states):
        for power, found in ((0, diagram.shear), (1, diagram.moment)):
            assert_allclose(found(at)[state, 0], integral(diagram, state, z, power), rtol=1e-9, atol=1e-6)
        twice = integral(diagram, state, z, 2) / 2
        assert_allclose(diagram.moment_integral(at)[state, 0], twice, rtol=1e-9, atol=1e-6)


@given(diagrams(), st.lists(elevations, min_size=2, max_size=7, unique=True))
def test_stacked_strips_are_the_strips(diagram: Diagram, edges: list[float]) -> None:
    sorted_edges = np.array(sorted(edges))
    force, moment = diagram.stacked(sorted_edges)
    zeroth, first, second = diagram.strips(sorted_edges[:-1], sorted_edges[1:])
    assert_allclose(force, zeroth, rtol=1e-9, atol=1e-6)
    assert_allclose(moment, first, rtol=1e-9, atol=1e-6)
    for state in range(diagram.states):
        for strip, (low, high) in enumerate(itertools.pairwise(sorted_edges)):
            cut = diagram.below(high)
            assert_allclose(second[state, strip], integral(cut, state, low, 2), rtol=1e-9, atol=1e-6)


def test_states_in_blocks_are_the_states_at_once() -> None:
    levels = np.linspace(0, 5, 9000)
    edges = np.array([0.0, 0.5, 1.7, 4.0])
    many = Diagram.of_terms(len(levels), [(levels, 0.0, 9810.0), (levels / 2, 250.0, 0.0)])
    force, moment = many.stacked(edges)
    zeroth, first, _ = many.strips(edges[:-1], edges[1:])
    assert_allclose(force, zeroth, rtol=1e-12, atol=1e-9)
    assert_allclose(moment, first, rtol=1e-11, atol=1e-9)


def between(rows: list[tuple[float, float]], z: FloatArray) -> FloatArray:
    heights, pressures = np.array(rows).T
    return np.asarray(np.interp(z, heights, pressures))


@given(diagrams(states=1), st.lists(st.floats(0.011, 3.989), min_size=1, max_size=5))
def test_rows_joined_by_straight_lines_are_the_diagram(diagram: Diagram, shares: list[float]) -> None:
    z = np.array([round(share, 3) + 0.0004 for share in shares])
    rows = diagram.rows(BOTTOM, TOP)
    assert rows[0][0] == BOTTOM
    assert rows[-1][0] == TOP
    assert_allclose(between(rows, z), diagram.pressure(z)[0], rtol=1e-6, atol=1e-3)


@given(diagrams())
def test_extremes_are_the_greatest_and_least_of_the_corners(diagram: Diagram) -> None:
    greatest, least = diagram.extremes(BOTTOM, TOP)
    for state in range(diagram.states):
        pressures = [pressure for _, pressure in diagram.rows(BOTTOM, TOP, state)]
        assert_allclose([greatest[state], least[state]], [max(pressures), min(pressures)], atol=1e-9)


@given(diagrams(), elevations, st.floats(-3, 3))
def test_a_diagram_cut_turned_or_raised_is_itself(diagram: Diagram, z: float, factor: float) -> None:
    at = np.array([z - 0.013])
    assert_allclose(diagram.below(z).pressure(at), diagram.pressure(at), rtol=1e-9, atol=1e-6)
    assert not diagram.below(z).pressure(np.array([z + 0.013])).any()
    assert_allclose(diagram.scaled(factor).shear(at), factor * diagram.shear(at), rtol=1e-12)
    assert_allclose(diagram.raised(2.0).pressure(at + 2), diagram.pressure(at), rtol=1e-6, atol=1e-6)


@given(diagrams(), diagrams(), elevations)
def test_the_sum_of_two_diagrams_is_both(one: Diagram, other: Diagram, z: float) -> None:
    at = np.array([z])
    for name in ("pressure", "shear", "moment", "moment_integral"):
        apart = getattr(one, name)(at) + getattr(other, name)(at)
        assert_allclose(getattr(one + other, name)(at), apart, rtol=1e-9, atol=1e-6)
