"""Seepage under a floor with a cutoff: closed forms against a numerical solution of the flow."""

from __future__ import annotations

import math
from itertools import pairwise

import numpy as np
import pytest
import scipy.sparse as sp
from scipy.sparse.linalg import spsolve
from scipy.special import ellipk

from loads.arrays import FloatArray
from loads.wall.seepage import exit_gradient_floor, exit_gradient_layer, key_point_heads

NUMERICAL = 2e-3
"""The grid of this test is coarse, to be quick; four times as many cells come within 5e-4."""


def graded(
    start: float, stop: float, *, fine_start: bool, fine_stop: bool, ratio: float = 1.35
) -> FloatArray:
    """Divide a span, finely at the ends where the flow is singular."""
    if fine_start and fine_stop:
        middle = (start + stop) / 2
        low = graded(start, middle, fine_start=True, fine_stop=False, ratio=ratio)
        high = graded(middle, stop, fine_start=False, fine_stop=True, ratio=ratio)
        return np.concatenate([low, high[1:]])
    steps, reached = [1e-3], 1e-3
    while reached < stop - start:
        steps.append(steps[-1] * ratio)
        reached += steps[-1]
    places = np.concatenate([[0.0], np.cumsum(steps)]) * (stop - start) / reached
    return start + places if fine_start else (stop - places)[::-1]


def grid(
    upstream: float, downstream: float, depth: float, reach: float, layer: float
) -> tuple[FloatArray, FloatArray]:
    """Lines of a grid around a floor with a cutoff at x = 0, depth counted down."""
    ends = sorted({-upstream, 0.0, downstream})
    spans = [graded(ends[0] - reach, ends[0], fine_start=False, fine_stop=True)]
    spans += [graded(a, b, fine_start=True, fine_stop=True)[1:] for a, b in pairwise(ends)]
    spans.append(graded(ends[-1], ends[-1] + reach, fine_start=True, fine_stop=False)[1:])
    below = graded(depth, layer, fine_start=True, fine_stop=False)[1:]
    return np.concatenate(spans), np.concatenate([graded(0, depth, fine_start=True, fine_stop=True), below])


def solved(
    upstream: float, downstream: float, depth: float, *, reach: float = 500.0, layer: float = 500.0
) -> dict[str, float]:
    """Head shares at key points, discharge, exit gradient times depth over head, by finite volumes."""
    x, y = grid(upstream, downstream, depth, reach, layer)
    dx, dy = np.diff(x), np.diff(y)
    xc, yc = (x[:-1] + x[1:]) / 2, (y[:-1] + y[1:]) / 2
    cell = np.arange(len(dx) * len(dy)).reshape(len(dy), len(dx))
    across = dy[:, None] / np.diff(xc)[None, :]
    wall = int(np.argmin(np.abs(x))) - 1
    across[yc < depth, wall] = 0.0
    down = dx[None, :] / np.diff(yc)[:, None]
    rows = np.concatenate([cell[:, :-1].ravel(), cell[:-1].ravel()])
    columns = np.concatenate([cell[:, 1:].ravel(), cell[1:].ravel()])
    flow = np.concatenate([across.ravel(), down.ravel()])
    links = sp.coo_matrix((flow, (rows, columns)), shape=(cell.size, cell.size))
    links = (links + links.T).tocsr()
    inlet, outlet = xc < -upstream, xc > downstream
    open_bed = dx / (dy[0] / 2)
    diagonal = np.asarray(links.sum(axis=1)).ravel()
    known = np.zeros(cell.size)
    diagonal[cell[0, inlet]] += open_bed[inlet]
    known[cell[0, inlet]] += open_bed[inlet]
    diagonal[cell[0, outlet]] += open_bed[outlet]
    head = spsolve((sp.diags(diagonal) - links).tocsc(), known).reshape(cell.shape)
    tip = int(np.argmin(np.abs(y - depth))) - 1
    return {
        "E": float(head[0, wall]),
        "D": float(head[tip : tip + 2, wall : wall + 2].mean()),
        "C": float(head[0, wall + 1]),
        "discharge": float((open_bed[inlet] * (1 - head[0, inlet])).sum()),
        "exit": float(head[0, wall + 1] / (dy[0] / 2) * depth),
    }


@pytest.mark.parametrize(
    ("upstream", "downstream", "depth"),
    [(0.0, 0.0, 4.0), (10.0, 0.0, 4.0), (0.0, 10.0, 4.0), (4.0, 6.0, 4.0), (6.0, 0.0, 3.0)],
)
def test_key_points_of_a_cutoff(upstream: float, downstream: float, depth: float) -> None:
    found = key_point_heads(np.array([upstream]), np.array([downstream]), np.array([depth]))[0]
    numerical = solved(upstream, downstream, depth)
    for share, point in zip(found, "EDC", strict=True):
        assert share == pytest.approx(numerical[point], abs=NUMERICAL), point


@pytest.mark.parametrize(("floor", "depth"), [(0.0, 4.0), (10.0, 4.0), (6.0, 3.0)])
def test_exit_gradient_at_the_end_of_a_floor(floor: float, depth: float) -> None:
    found = exit_gradient_floor(np.array([3.0]), np.array([floor]), np.array([depth]))
    numerical = solved(floor, 0.0, depth)["exit"] * 3.0 / depth
    assert found.item() == pytest.approx(numerical, rel=NUMERICAL)


@pytest.mark.parametrize(
    ("floor", "depth", "expected"), [(0, 4, 0.2387324146), (10, 4, 0.1756957639), (6, 3, 0.2502397556)]
)
def test_exit_gradient_of_a_finite_element_solution(floor: float, depth: float, expected: float) -> None:
    """Finite elements give 0.238743, 0.175700 and 0.250248."""
    found = exit_gradient_floor(np.array([3.0]), np.array([float(floor)]), np.array([float(depth)]))
    assert found.item() == pytest.approx(expected, rel=1e-9)


@pytest.mark.parametrize(("depth", "layer"), [(4.0, 8.0), (3.0, 9.0), (2.0, 6.0)])
def test_exit_gradient_in_a_layer(depth: float, layer: float) -> None:
    found = exit_gradient_layer(np.array([1.0]), np.array([depth]), np.array([layer])).item() * depth
    modulus = math.sin(math.pi * depth / (2 * layer))
    assert found == pytest.approx(math.pi * depth / (4 * ellipk(modulus**2) * layer * modulus), rel=1e-12)
    numerical = solved(0.0, 0.0, depth, reach=60.0, layer=layer)
    assert found == pytest.approx(numerical["exit"], rel=NUMERICAL)
