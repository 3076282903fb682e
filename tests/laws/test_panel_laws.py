"""What holds for every panel, whatever its shape, its sediment and the water on it."""

from __future__ import annotations

import math
from collections.abc import Callable
from itertools import pairwise
from typing import Any

import numpy as np
import shapely
from hypothesis import HealthCheck, assume, given, settings
from hypothesis import strategies as st
from numpy.testing import assert_allclose
from scipy.integrate import quad

from loads.assessment import Assessed, Assessment, assess
from loads.diagram import Diagram
from loads.faces import ArcFace, CircleFace, Resultant
from loads.problems import ScenarioError
from loads.recheck import pressure_at
from loads.records.panel import ring_values
from loads.scenario_file import Document
from loads.states import DRY, Levels
from tests.laws.mirror import mirrored
from tests.laws.strategies import lengths, panels, reach_of, scenes, text
from tests.scenes import assessed, filed, scene

AT_REST = ("at rest",)
slow = settings(suppress_health_check=[HealthCheck.too_slow, HealthCheck.filter_too_much])
thorough = settings(slow, max_examples=3 * slow.max_examples)
brief = settings(slow, max_examples=slow.max_examples // 2)


def computed(document: Document, levels: Levels | None = None) -> Assessment:
    """Assess, unless a coefficient of earth pressure has no answer for the angles drawn."""
    try:
        return assess(filed(document), levels)
    except ScenarioError as refusal:
        assume("cannot be computed" not in str(refusal))
        raise


def barrier_of(document: Document, levels: Levels | None = None) -> Assessed:
    (barrier,) = computed(document, levels).barriers
    assert isinstance(barrier, Assessed), barrier
    return barrier


def force_scale(barrier: Assessed) -> Any:
    return barrier.diagram.gross(barrier.face.bottom) * barrier.face.area + 1e-9


def assert_same(one: Resultant, other: Resultant, scale: Any, reach: float, sign: float = 1) -> None:
    for name, turn, size in (
        ("horizontal", sign, scale),
        ("vertical", 1, scale),
        ("total", sign, scale),
        ("moment", sign, scale * reach),
    ):
        apart = np.abs(getattr(one, name) - turn * getattr(other, name))
        assert (apart <= 1e-9 * size).all(), (name, getattr(one, name), getattr(other, name))


@thorough
@given(scenes())
def test_both_computations_agree(document: Document) -> None:
    barrier = barrier_of(document)
    assert barrier.recheck.agrees.all()
    assert np.isfinite(barrier.resultant.moment).all()


@slow
@given(scenes(), st.lists(st.floats(-0.2, 1.5), min_size=1, max_size=6))
def test_pressure_is_that_of_the_definitions(document: Document, shares: list[float]) -> None:
    barrier = barrier_of(document)
    bottom, top = barrier.face.bottom, barrier.face.top
    z = np.array([[bottom + min(max(share, 1e-3), 0.999) * (top - bottom) for share in shares]])
    knots = barrier.diagram.knot[0]
    assume((np.abs(z[0][:, None] - knots) > 1e-9 * (abs(bottom) + 1)).all())
    scale = barrier.diagram.gross(bottom)[0] + 1e-3
    assert_allclose(
        barrier.diagram.pressure(z), pressure_at(barrier.setting, z), atol=1e-9 * scale, rtol=1e-9
    )


def width_of(barrier: Assessed) -> Callable[[float], float]:
    """Width against distance along the face, from the entered record alone."""
    panel = barrier.setting.panel
    if panel.shape == "rectangle":
        assert panel.width is not None
        width = panel.width.value
        return lambda _: width
    if panel.shape == "trapezoid":
        assert panel.bottom_width is not None
        assert panel.top_width is not None
        assert panel.height is not None
        low, high, height = panel.bottom_width.value, panel.top_width.value, panel.height.value
        return lambda s: low + (high - low) * s / height
    if panel.shape == "circle":
        assert panel.diameter is not None
        size = panel.diameter.value
        return lambda s: 2 * math.sqrt(max(s * (size - s), 0.0))
    assert panel.points is not None
    outline = shapely.Polygon(ring_values(panel.points), [ring_values(ring) for ring in panel.holes or ()])
    return lambda s: float(outline.intersection(shapely.LineString([(-99, s), (99, s)])).length)


@brief
@given(st.sampled_from(["rectangle", "trapezoid", "circle", "outline"]).flatmap(scenes))
def test_force_and_moment_are_integrals_of_pressure(document: Document) -> None:
    barrier = barrier_of(document)
    face, diagram, width = barrier.face, barrier.diagram, width_of(barrier)
    assert not isinstance(face, ArcFace)
    sine = math.sin(face.tilt)
    corners = [] if isinstance(face, CircleFace) else list(face.strip_table[:, :2].ravel())
    starts = list((diagram.knot[0] - face.bottom) / sine)
    marks = sorted({0.0, face.length, *(s for s in (*starts, *corners) if 0 < s < face.length)})

    def load(s: float) -> float:
        return float(diagram.pressure(np.array([face.bottom + s * sine]))[0, 0]) * width(s)

    pieces = [(low, high) for low, high in pairwise(marks) if high - low > 1e-9]
    force = sum(quad(load, low, high, epsrel=1e-7, epsabs=0.1)[0] for low, high in pieces)
    moment = sum(quad(lambda s: load(s) * s, low, high, epsrel=1e-7, epsabs=0.1)[0] for low, high in pieces)
    slack = 1e-6 * float(force_scale(barrier)[0]) + 1
    assert abs(force - float(barrier.resultant.total[0])) <= slack
    assert abs(moment - float(barrier.resultant.moment[0])) <= slack * max(face.length, 1)


@slow
@given(scenes())
def test_swapping_the_sides_flips_signs_and_nothing_else(document: Document) -> None:
    one, other = barrier_of(document), barrier_of(mirrored(document))
    assert_same(one.resultant, other.resultant, force_scale(one), one.face.length + 1, sign=-1)
    if abs(one.resultant.horizontal[0]) > 1e-3 * force_scale(one)[0]:
        assert_allclose(one.resultant.line_of_action, other.resultant.line_of_action, rtol=1e-9, atol=1e-6)


def rising_levels(document: Document, lift: float) -> Levels:
    record = filed(document).water
    protected = record.protected_side.value if record.protected_side else DRY
    level = record.flood_side.value
    return Levels(flood_side=np.array([level, level + lift]), protected_side=np.full(2, protected))


@slow
@given(scenes(sediment=False), st.floats(1e-4, 3))
def test_more_water_never_pushes_less(document: Document, lift: float) -> None:
    barrier = barrier_of(document, rising_levels(document, lift))
    slack = 1e-9 * force_scale(barrier)[1]
    assert barrier.resultant.horizontal[1] >= barrier.resultant.horizontal[0] - slack
    if not isinstance(barrier.face, ArcFace):
        reach = barrier.face.length
        assert barrier.resultant.moment[1] >= barrier.resultant.moment[0] - slack * reach


@slow
@given(st.data(), st.floats(1e-4, 3))
def test_more_water_never_pushes_less_with_sediment_at_rest(data: st.DataObject, lift: float) -> None:
    document = data.draw(scenes("rectangle", kinds=AT_REST))
    barrier = barrier_of(document, rising_levels(document, lift))
    slack = 1e-9 * force_scale(barrier)[1]
    assert barrier.resultant.horizontal[1] >= barrier.resultant.horizontal[0] - slack


@slow
@given(scenes())
def test_sum_of_the_loads_is_the_load_of_the_sum(document: Document) -> None:
    barrier = barrier_of(document)
    for name in ("horizontal", "vertical", "moment"):
        parts = sum(getattr(part, name) for part in barrier.by_load.values())
        scale = force_scale(barrier) * (barrier.face.length + 1)
        assert (np.abs(parts - getattr(barrier.resultant, name)) <= 1e-9 * scale).all()


@slow
@given(panels(sediment=False), st.floats(-0.5, 2))
def test_equal_levels_of_one_water_give_nothing(panel: dict[str, Any], share: float) -> None:
    bottom, top = reach_of(panel)
    level = text(bottom + share * (top - bottom))
    barrier = barrier_of(scene(panel, flood_side=level, protected_side=level))
    for name in ("horizontal", "vertical", "total", "moment"):
        assert getattr(barrier.resultant, name)[0] == 0
    assert np.isnan(barrier.resultant.line_of_action[0])


@slow
@given(scenes("rectangle"), st.floats(0.05, 0.95))
def test_splitting_a_panel_in_two_changes_nothing(document: Document, share: float) -> None:
    (panel,) = document["panel"]
    whole = barrier_of(document)
    height = filed(document).panel[0].height
    assert height is not None
    tilt = whole.setting.panel.tilt_angle
    cut = whole.face.bottom + share * height.value * math.sin(tilt)
    lower = {**panel, "height": text(share * height.value)}
    upper = {**panel, "id": "P2", "bottom": text(cut), "height": text((1 - share) * height.value)}
    upper["sediment"] = [
        layer for layer in panel.get("sediment", []) if float(layer["top"].split()[0]) > cut + 1e-9
    ]
    parts = computed({**document, "panel": [lower, upper]}).barriers
    below, above = parts
    assert isinstance(below, Assessed)
    assert isinstance(above, Assessed)
    scale = float(force_scale(whole)[0]) + 1e-3
    assert_allclose(
        below.resultant.total + above.resultant.total, whole.resultant.total, atol=1e-8 * scale, rtol=1e-9
    )
    moment = below.resultant.moment + above.resultant.moment + above.resultant.total * share * height.value
    assert_allclose(moment, whole.resultant.moment, atol=1e-8 * scale * (height.value + 1), rtol=1e-9)


@slow
@given(scenes(), st.lists(st.floats(-0.3, 1.6), min_size=2, max_size=5))
def test_many_states_are_each_their_own(document: Document, shares: list[float]) -> None:
    single = barrier_of(document)
    bottom, top = single.face.bottom, single.face.top
    flood = np.array([bottom + share * (top - bottom) for share in shares])
    protected = np.where(np.arange(len(flood)) % 2 == 0, flood[::-1], DRY)
    together = barrier_of(document, Levels(flood_side=flood, protected_side=protected))
    for i in range(len(flood)):
        one = barrier_of(document, Levels(flood_side=flood[[i]], protected_side=protected[[i]]))
        for name in ("horizontal", "vertical", "total", "moment", "line_of_action"):
            assert_allclose(
                getattr(together.resultant, name)[i], getattr(one.resultant, name)[0], rtol=1e-12, atol=1e-9
            )
        assert_allclose(together.recheck.horizontal[i], one.recheck.horizontal[0], rtol=1e-12, atol=1e-9)


@slow
@given(scenes("arc"))
def test_resultant_on_an_arc_passes_through_its_centre(document: Document) -> None:
    barrier = barrier_of(document)
    assert isinstance(barrier.face, ArcFace)
    arc, second = barrier.face.shape, barrier.recheck
    about_centre = second.moment - second.horizontal * arc.centre_z + second.vertical * arc.centre_x
    scale = force_scale(barrier) * (arc.radius + arc.height)
    assert (np.abs(about_centre) <= 1e-9 * scale).all()


@slow
@given(panels(sediment=False), st.floats(0.01, 5))
def test_centre_of_pressure_lies_below_the_centroid(panel: dict[str, Any], over: float) -> None:
    assume(panel["shape"] != "arc")
    bottom, top = reach_of(panel)
    under = barrier_of(scene(panel, flood_side=text(top + over)))
    even = Diagram.of_terms(1, [(top + 1, 1.0, 0.0)])
    centroid = under.face.resultant(even).line_of_action[0]
    slack = 1e-9 * (top - bottom + abs(bottom))
    assert bottom < under.resultant.line_of_action[0] <= centroid + slack < top + slack


@slow
@given(lengths(0.2, 3), st.floats(0.05, 1.5), st.floats(5, 175))
def test_circle_is_the_limit_of_inscribed_outlines(diameter: str, share: float, tilt: float) -> None:
    disc = {"shape": "circle", "diameter": diameter, "tilt": text(tilt, "deg")}
    bottom, top = reach_of(disc)
    level = text(bottom + share * (top - bottom))
    exact = assessed(scene(disc, flood_side=level)).resultant
    radius = (top - bottom) / math.sin(math.radians(tilt)) / 2
    errors = []
    for sides in (32, 64):
        angles = 2 * math.pi * np.arange(sides) / sides - math.pi / 2
        around = zip(np.cos(angles), np.sin(angles), strict=True)
        corners = [[text(radius * float(x)), text(radius * float(1 + y))] for x, y in around]
        corners[0][1] = "0 m"
        outline = {"shape": "outline", "points": corners, "tilt": text(tilt, "deg")}
        found = assessed(scene(outline, flood_side=level)).resultant
        errors.append(1 - found.total[0] / exact.total[0])
        assert 0 < errors[-1] < 20 / sides**2 / min(share, 1.0)
    assert errors[1] < 0.5 * errors[0]
