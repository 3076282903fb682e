"""A closure whose parts do not come out the same twice is withheld."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace
from typing import Any

import numpy as np
import pytest

import loads.barrier
import loads.closure.demands
import loads.closure.logs
import loads.closure.post
from loads.assessment import AssessedClosure, Withheld, assess
from loads.closure.layout import Layout
from loads.closure.logs import simple_beam
from loads.closure.post import PostForces, post_forces
from loads.diagram import Diagram
from loads.faces import StripFace, face_of
from tests.closures import FULL, closure_scene
from tests.scenes import filed

DOCUMENT = closure_scene(FULL, flood_side="3.1 m", protected_side="1.9 m")


def assert_withheld(subject: str) -> None:
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.verdict() == "withheld"
    assert barrier.subject == subject
    assert barrier.first != barrier.second
    assert barrier.difference > 1e-9


def test_the_sound_closure_is_shown() -> None:
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, AssessedClosure)
    assert barrier.parts_recheck.agrees
    assert barrier.parts_recheck.difference < 1e-12


@pytest.mark.parametrize("which", [0, 1])
def test_fault_in_a_log(monkeypatch: pytest.MonkeyPatch, which: int) -> None:
    def bent(*arguments: Any) -> tuple[Any, ...]:
        found = list(simple_beam(*arguments))
        found[which] = found[which] * np.where(np.arange(found[which].shape[1]) == 11, 1 + 1e-6, 1.0)
        return tuple(found)

    monkeypatch.setattr(loads.closure.logs, "simple_beam", bent)
    assert_withheld("bay 2 log 3")


def test_fault_in_the_load_of_a_log(monkeypatch: pytest.MonkeyPatch) -> None:
    sound = Diagram.strips

    def bent(diagram: Diagram, low: Any, high: Any) -> Any:
        zeroth, first, second = sound(diagram, low, high)
        return (zeroth * (1 + 1e-6) if len(low) == 9 else zeroth), first, second

    monkeypatch.setattr(Diagram, "strips", bent)
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.subject.startswith("bay")


def changed(**factors: float) -> Callable[..., PostForces]:
    def bent(*arguments: Any, **named: Any) -> PostForces:
        found = post_forces(*arguments, **named)
        return replace(found, **{name: getattr(found, name) * factor for name, factor in factors.items()})

    return bent


@pytest.mark.parametrize(
    "factors", [{"base_shear": 1 + 1e-6}, {"base_moment": 1 + 1e-6}, {"base_moment": -1}]
)
def test_fault_in_a_post(monkeypatch: pytest.MonkeyPatch, factors: dict[str, float]) -> None:
    monkeypatch.setattr(loads.closure.demands, "post_forces", changed(**factors))
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.subject in ("post 1", "post 2")


def test_fault_in_the_brace(monkeypatch: pytest.MonkeyPatch) -> None:
    sound = loads.closure.post._free_at_prop

    def bent(*arguments: Any) -> Any:
        return sound(*arguments) * (1 + 1e-5)

    monkeypatch.setattr(loads.closure.post, "_free_at_prop", bent)
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.subject.startswith("post")


def test_fault_in_the_width_of_the_whole(monkeypatch: pytest.MonkeyPatch) -> None:
    def narrower(panel: Any) -> Any:
        face = face_of(panel)
        assert isinstance(face, StripFace)
        table = face.strip_table.copy()
        table[:, 2:] *= 1 - 1e-6
        return replace(face, strip_table=table)

    monkeypatch.setattr(loads.barrier, "face_of", narrower)
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)
    assert barrier.subject == ""


def test_no_number_at_all_is_withheld(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(
        loads.closure.demands, "post_forces", changed(base_shear=float("nan"), base_moment=float("nan"))
    )
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, Withheld)


def test_layout_takes_all_the_water() -> None:
    (barrier,) = assess(filed(DOCUMENT)).barriers
    assert isinstance(barrier, AssessedClosure)
    layout: Layout = barrier.structure.layout
    assert layout.loaded_width == pytest.approx(2.4 + 2.4 + 3.1 + 3 * 0.07 + 2 * 0.11, rel=1e-12)
    assert layout.opening == pytest.approx(2.4 + 2.4 + 3.1 + 2 * 0.18, rel=1e-12)
