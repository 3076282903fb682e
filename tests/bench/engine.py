"""Ratios of the engine's speed, each pair measured in turn on the same machine: python -m tests.bench.engine.

1. Force and moment of 1000 strips in 1000 states by steps and ramps, against Gauss–Legendre quadrature over
   sorted breakpoints in numpy (budget: at least 60 times), and against a loop over scipy's `quad` (at least
   3000 times).
2. `assess` of a line of 100 barriers with all checks in one state (budget: at most 150 ms).
3. First-limit levels of 100 barriers to 1 mm, against one `assess` without them (at most 10 times).
"""

from __future__ import annotations

import copy
import itertools
import statistics
import sys
import time
from collections.abc import Callable
from typing import Any

import numpy as np
from scipy.integrate import quad

from loads.arrays import FloatArray
from loads.assessment import assess
from loads.panel_checks import first_limit_of
from loads.scenario_file import read_file, scenario_of
from loads.water import water_diagram
from webapp.scenario_files import example_files

STRIPS, STATES, ROUNDS = 1000, 1000, 7
GAMMA = 9806.65
NODES, WEIGHTS = np.polynomial.legendre.leggauss(4)
CHUNK = 1000


def timed(work: Callable[[], Any]) -> float:
    """Seconds of one call."""
    began = time.perf_counter()
    work()
    return time.perf_counter() - began


def by_quadrature(
    edges: FloatArray, flood: FloatArray, protected: FloatArray, states_at_once: int
) -> tuple[FloatArray, FloatArray]:
    """Force and moment of every strip: four points on each piece between sorted levels and edges."""
    low, high = edges[:-1, None], edges[1:, None]
    force, moment = (np.empty((len(flood), len(low))) for _ in range(2))
    for start in range(0, len(flood), states_at_once):
        block = slice(start, start + states_at_once)
        level_f, level_p = flood[block, None, None], protected[block, None, None]
        parts = np.broadcast_arrays(low, np.clip(level_f, low, high), np.clip(level_p, low, high), high)
        cuts = np.sort(np.concatenate(parts, axis=2), axis=2)
        half = (cuts[..., 1:, None] - cuts[..., :-1, None]) / 2
        z = (cuts[..., 1:, None] + cuts[..., :-1, None]) / 2 + half * NODES
        z, weight = (array.reshape(*array.shape[:2], -1) for array in (z, half * WEIGHTS))
        p = GAMMA * (np.maximum(level_f - z, 0) - np.maximum(level_p - z, 0)) * weight
        force[block] = p.sum(axis=2)
        moment[block] = (p * (z - low)).sum(axis=2)
    return force, moment


def by_quad(edges: FloatArray, level_f: float, level_p: float, strips: int) -> None:
    """Force and moment of the first strips of one state by scipy's adaptive quadrature."""
    for a, b in itertools.pairwise(edges):

        def p(z: float) -> float:
            return GAMMA * (max(level_f - z, 0.0) - max(level_p - z, 0.0))

        def pz(z: float, a: float = a) -> float:
            return p(z) * (z - a)

        inside = [level for level in (level_f, level_p) if a < level < b] or None
        quad(p, a, b, points=inside)
        quad(pz, a, b, points=inside)


def strips_bench() -> dict[str, float]:
    """Ratios of the first budget."""
    random = np.random.default_rng(1)
    edges = np.linspace(0.0, 10.0, STRIPS + 1)
    flood, protected = random.uniform(4, 10, STATES), random.uniform(0, 6, STATES)

    def by_brackets() -> tuple[FloatArray, FloatArray]:
        net = water_diagram(flood, GAMMA) + water_diagram(protected, GAMMA).scaled(-1)
        return net.stacked(edges)

    first, second = by_brackets(), by_quadrature(edges, flood, protected, CHUNK)
    for one, other in zip(first, second, strict=True):
        if not np.allclose(one, other, rtol=1e-9, atol=1e-9 * np.abs(other).max()):
            raise AssertionError("the two routes disagree; their speed does not matter")
    plain, blocked, adaptive = [], [], []
    strips = 50
    for _ in range(ROUNDS):
        ours = timed(by_brackets)
        plain.append(timed(lambda: by_quadrature(edges, flood, protected, CHUNK)) / ours)
        blocked.append(timed(lambda: by_quadrature(edges, flood, protected, 1)) / ours)
        slow = timed(lambda: by_quad(edges, flood[0], protected[0], strips)) * STRIPS * STATES / strips
        adaptive.append(slow / ours)
    best = min(timed(by_brackets) for _ in range(ROUNDS))
    return {
        "numpy quadrature, all states at once / brackets": statistics.median(plain),
        "numpy quadrature, one state at a time / brackets": statistics.median(blocked),
        "scipy quad loop / brackets": statistics.median(adaptive),
        "million strip-states a second": STRIPS * STATES / best / 1e6,
    }


def line_of(count: int) -> dict[str, Any]:
    """Document of a line of so many barriers: the example's panels again and again."""
    document = copy.deepcopy(read_file(example_files()[0]))
    panels = document["panel"]
    document["panel"] = [{**copy.deepcopy(panels[i % len(panels)]), "id": f"B{i}"} for i in range(count)]
    return document


def line_bench(count: int = 100) -> dict[str, float]:
    """Figures of the second and third budget."""
    scenario = scenario_of(line_of(count))
    assessment = assess(scenario)
    whole, limits = [], []

    def first_limits() -> None:
        for barrier in assessment.barriers:
            first_limit_of(barrier.setting, barrier.face, scenario.near_limit)  # type: ignore[union-attr]

    for _ in range(ROUNDS):
        whole.append(timed(lambda: assess(scenario)))
        limits.append(timed(first_limits))
    without = [a - b for a, b in zip(whole, limits, strict=True)]
    return {
        f"assess of {count} barriers with first-limit levels, ms": 1e3 * statistics.median(whole),
        f"assess of {count} barriers without them, ms": 1e3 * statistics.median(without),
        "first-limit levels / assess without them": statistics.median(
            [b / c for b, c in zip(limits, without, strict=True)]
        ),
    }


if __name__ == "__main__":
    for name, value in {**strips_bench(), **line_bench()}.items():
        sys.stdout.write(f"{value:10.1f}  {name}\n")
