"""Posts and logs against beams solved exactly elsewhere, and against an independent solution of any load."""

from __future__ import annotations

import math
from collections.abc import Callable, Sequence
from itertools import pairwise

import numpy as np
import pytest
import sympy
from hypothesis import given, settings
from hypothesis import strategies as st

from loads.closure.logs import simple_beam
from loads.closure.post import Fixity, PostForces, Prop, post_forces
from loads.closure.sections import hollow_rectangle, rectangle
from loads.diagram import Diagram

EI = 5000e3
FOOT_OF_3_M = 29430.0
Terms = Sequence[tuple[float, float, float]]


def solved(terms: Terms, height: float, brace: float | None = None, fixity: Fixity = "fixed") -> PostForces:
    prop = None if brace is None else Prop(height=brace, angle=0.0, fixity=fixity)
    return post_forces(Diagram.of_terms(1, terms), height=height, stiffness=EI, prop=prop)


def test_b1_simple_beam_under_an_even_load() -> None:
    moment, reaction, sag = simple_beam(np.array([[10e3]]), np.array([4.0]), EI)
    assert float(moment[0, 0]) == pytest.approx(20e3, rel=1e-12)
    assert float(reaction[0, 0]) == pytest.approx(20e3, rel=1e-12)
    assert float(sag[0, 0]) == pytest.approx(6.6666666667e-3, rel=1e-10)


# name, terms (knot, step, slope), height, brace, base; base shear, base moment, brace force, greatest moment
# between and its height, greatest deflection and its height; kN, m, mm
CASES = {
    "B1": ([(4.0, 10e3, 0.0)], 4.0, 4.0, "pinned", 20, 0, 20, -20, 2, 6.6666666667, 2),
    "B2": (
        [(4.0, 0.0, 3e3)],
        4.0,
        4.0,
        "pinned",
        16,
        0,
        8,
        -12.31680574,
        1.690598923,
        4.0072299921,
        1.922681511,
    ),
    "B3": (
        [(3.5, 5e3, 15e3 / 3.5)],
        3.5,
        3.5,
        "pinned",
        26.25,
        0,
        17.5,
        -19.32836573,
        1.579957,
        4.8880337792,
        1.709254,
    ),
    "B6": ([(3.0, 0.0, 9810.0)], 3.0, 3.0, "fixed", 35.316, 17.658, 8.829, 17.658, 0, 1.1371532644, 1.658359),
    "B7": (
        [(3.0, FOOT_OF_3_M, -9810.0)],
        3.0,
        3.0,
        "fixed",
        19.86525,
        15.45075,
        24.27975,
        15.45075,
        0,
        1.4532414405,
        1.792613,
    ),
    "B10": (
        [(5.5, 6e3, 0.0)],
        5.5,
        4.0,
        "pinned",
        10.3125,
        0,
        22.6875,
        -8.86230469,
        1.71875,
        2.6645652350,
        1.870945,
    ),
    "B11": ([(3.0, 0.0, 9810.0)], 3.0, 2.0, "pinned", 22.0725, 0, 22.0725, -9.14272886, 0.878680, -0.981, 3),
}


@pytest.mark.parametrize("name", CASES)
def test_propped_posts(name: str) -> None:
    terms, height, brace, fixity, shear, moment, push, greatest, at, sag, sag_at = CASES[name]
    found = solved(terms, height, brace, fixity)  # type: ignore[arg-type]
    assert float(found.base_shear[0]) / 1e3 == pytest.approx(shear, rel=1e-9)
    assert float(found.base_moment[0]) / 1e3 == pytest.approx(moment, rel=1e-9, abs=1e-9)
    assert float(found.brace_force[0]) / 1e3 == pytest.approx(push, rel=1e-9)
    assert float(found.moment[0]) / 1e3 == pytest.approx(greatest, rel=1e-8)
    assert float(found.moment_height[0]) == pytest.approx(at, abs=1e-6)
    assert float(found.deflection[0]) * 1e3 == pytest.approx(sag, rel=1e-9)
    assert float(found.deflection_height[0]) == pytest.approx(sag_at, abs=2e-6)


def test_tops_and_spans_of_braced_posts() -> None:
    pinned = solved([(3.0, 0.0, 9810.0)], 3.0, 2.0, "pinned")
    assert float(pinned.top_deflection[0]) == pytest.approx(-0.981e-3, rel=1e-10)
    assert float(pinned.brace_moment[0]) == pytest.approx(1635.0, rel=1e-12)
    assert float(pinned.shear[0]) == pytest.approx(22072.5, rel=1e-12)
    overhang = solved([(5.5, 6e3, 0.0)], 5.5, 4.0, "pinned")
    assert float(overhang.top_deflection[0]) == pytest.approx(-1.340625e-3, rel=1e-9)
    assert float(overhang.brace_moment[0]) == pytest.approx(6750.0, rel=1e-12)
    assert float(overhang.shear[0]) == pytest.approx(-13687.5, rel=1e-12)
    prop = solved([(3.0, FOOT_OF_3_M, -9810.0)], 3.0, 3.0, "fixed")
    assert float(prop.shear[0]) == pytest.approx(-24279.75, rel=1e-12)
    assert float(prop.top_deflection[0]) == pytest.approx(0.0, abs=1e-15)


@pytest.mark.parametrize(
    ("terms", "height", "shear", "moment", "sag"),
    [
        pytest.param([(3.0, 0.0, 9810.0)], 3.0, 44.145, 44.145, 15.8922, id="B4"),
        pytest.param([(2.8, 0.0, 9810.0)], 3.5, 38.4552, 35.89152, 14.772949632, id="B5"),
        pytest.param(
            [(3.0, 0.0, 9810.0), (2.5 + 1e-5, 7.5e8, 0.0), (2.5 - 1e-5, -7.5e8, 0.0)],
            3.0, 59.145, 81.645, 36.2047, id="B12",
        ),
    ],
)  # fmt: skip
def test_cantilever_posts(terms: Terms, height: float, shear: float, moment: float, sag: float) -> None:
    found = solved(terms, height)
    assert float(found.base_shear[0]) / 1e3 == pytest.approx(shear, rel=1e-9)
    assert float(found.moment[0]) / 1e3 == pytest.approx(moment, rel=1e-9)
    assert float(found.deflection[0]) * 1e3 == pytest.approx(sag, rel=1e-8)
    assert float(found.deflection[0]) == float(found.top_deflection[0])
    assert np.isnan(found.brace_force[0])


NODES, WEIGHTS = np.polynomial.legendre.leggauss(6)


def integral(what: Callable[[float], float], ends: Sequence[float]) -> float:
    """Integral over pieces that a polynomial of low degree fills."""
    total = 0.0
    for low, high in pairwise(ends):
        half = (high - low) / 2
        total += half * sum(w * what(low + half * (1 + n)) for n, w in zip(NODES, WEIGHTS, strict=True))
    return total


def exact(terms: Terms, height: float, brace: float | None, fixity: Fixity) -> dict[str, float]:
    """The same by unit loads, every integral done numerically between the corners of the load."""
    corners = sorted({0.0, height, *([brace] if brace else []), *(k for k, _, _ in terms if 0 < k < height)})

    def load(x: float) -> float:
        return sum(s + g * (k - x) for k, s, g in terms if k > x)

    def bending(at: float, push: float) -> float:
        free = integral(lambda x: load(x) * (x - at), [at, *(c for c in corners if c > at)])
        return free - (push * (brace - at) if brace and at < brace else 0.0)

    def moved(place: float, push: float) -> float:
        """EI times the deflection of a fixed post."""
        ends = sorted({0.0, place, *(c for c in corners if c < place)})
        return integral(lambda x: bending(x, push) * (place - x), ends)

    push = turn = 0.0
    if brace and fixity == "fixed":
        push = moved(brace, 0.0) / (brace**3 / 3)
    elif brace:
        push = bending(0.0, 0.0) / brace
        turn = -moved(brace, push) / brace
    return {
        "base_shear": integral(load, corners) - push,
        "base_moment": bending(0.0, push),
        "top_deflection": (moved(height, push) + turn * height) / EI,
        "push": push,
    }


levels = st.floats(0.2, 3.9)


@st.composite
def any_loads(draw: st.DrawFn) -> Terms:
    """Water on both sides, cut off at a top, and a band of even pressure."""
    top = draw(st.floats(2.0, 4.0))
    flood, protected, band = draw(levels), draw(levels), draw(st.floats(0.1, 1.9))
    water = [(flood, 0.0, 9810.0), (protected, 0.0, -draw(st.floats(8000, 13000)))]
    cut = [(min(k, top), s + g * max(k - top, 0.0), g) for k, s, g in water]
    pressure = draw(st.floats(-5e3, 20e3))
    return [*cut, (band, pressure, 0.0), (band / 2, -pressure, 0.0)]


@settings(max_examples=20)
@given(any_loads(), st.one_of(st.none(), st.floats(0.7, 3.9)), st.sampled_from(["fixed", "pinned"]))
def test_any_load_against_unit_loads(terms: Terms, brace: float | None, fixity: Fixity) -> None:
    found, known = solved(terms, 4.0, brace, fixity), exact(terms, 4.0, brace, fixity)
    scale = sum(abs(s) + abs(g) * 4 for _, s, g in terms) * 4
    assert float(found.base_shear[0]) == pytest.approx(known["base_shear"], rel=1e-9, abs=1e-11 * scale)
    assert float(found.base_moment[0]) == pytest.approx(known["base_moment"], rel=1e-9, abs=1e-10 * scale)
    assert float(found.top_deflection[0]) == pytest.approx(
        known["top_deflection"], rel=1e-8, abs=1e-10 * scale * 64 / EI
    )
    if brace:
        assert float(found.brace_force[0]) == pytest.approx(known["push"], rel=1e-9, abs=1e-11 * scale)


@settings(max_examples=30)
@given(any_loads(), st.one_of(st.none(), st.floats(0.7, 3.9)), st.sampled_from(["fixed", "pinned"]))
def test_extremes_are_no_less_than_any_point(terms: Terms, brace: float | None, fixity: Fixity) -> None:
    found = solved(terms, 4.0, brace, fixity)
    diagram = Diagram.of_terms(1, terms)
    push = float(found.brace_force[0]) if brace else 0.0
    corners = sorted({0.0, 4.0, *([brace] if brace else []), *(k for k, _, _ in terms)})
    x = np.unique(np.concatenate([np.linspace(*ends, 401) for ends in pairwise(corners)]))
    held = np.where(x < (brace or 0.0), push, 0.0)
    shear = np.abs(diagram.shear(x)[0] - held).max()
    moment = np.abs(diagram.moment(x)[0] - push * np.maximum((brace or 0.0) - x, 0.0)).max()
    assert abs(float(found.shear[0])) >= shear * (1 - 1e-9)
    assert abs(float(found.moment[0])) >= moment * (1 - 1e-9)
    assert abs(float(found.moment[0])) <= moment * 1.001 + 1e-6
    assert abs(float(found.deflection[0])) >= abs(float(found.top_deflection[0])) * (1 - 1e-9)


def test_hollow_section_with_a_rib_as_a_section_library_has_it() -> None:
    found = hollow_rectangle(0.05, 0.2, 0.003, ribs=1)
    assert found.area * 1e6 == pytest.approx(1596, rel=1e-12)
    assert found.second_moment * 1e12 == pytest.approx(727488, rel=1e-12)
    assert found.section_modulus * 1e9 == pytest.approx(29099.52, rel=1e-12)


@pytest.mark.parametrize("ribs", [0, 1, 3])
def test_sections_against_integrals(ribs: int) -> None:
    depth, breadth, wall = sympy.Rational(11, 100), sympy.Rational(24, 100), sympy.Rational(4, 1000)
    y = sympy.Symbol("y")
    inner = depth / 2 - wall
    webs = (2 + ribs) * wall
    second = 2 * (
        sympy.integrate(webs * y**2, (y, 0, inner)) + sympy.integrate(breadth * y**2, (y, inner, depth / 2))
    )
    first = sympy.integrate(webs * y, (y, 0, inner)) + sympy.integrate(breadth * y, (y, inner, depth / 2))
    found = hollow_rectangle(float(depth), float(breadth), float(wall), ribs)
    assert found.second_moment == pytest.approx(float(second), rel=1e-12)
    assert found.section_modulus == pytest.approx(float(second / (depth / 2)), rel=1e-12)
    assert found.shear_area == pytest.approx(float(second * webs / first), rel=1e-12)
    assert found.area == pytest.approx(float(2 * (webs * inner + breadth * wall)), rel=1e-12)


def test_full_rectangle() -> None:
    found = rectangle(0.1, 0.2)
    assert found.second_moment == pytest.approx(0.2 * 0.1**3 / 12, rel=1e-14)
    assert 1 / found.shear_area == pytest.approx(1.5 / 0.02, rel=1e-14)
    assert math.isclose(found.section_modulus, found.second_moment / 0.05, rel_tol=1e-14)
