"""Gere: a post that holds a force near its top, in wood and as an aluminium tube."""

from __future__ import annotations

import math

import pytest

from loads.closure.post import post_forces
from loads.diagram import Diagram
from tests.agreement import Agree, printed

EX_5_6 = "published; Ex. 5.6, p. 326: 12 kN at 2.5 m, allowable stress 15 MPa and 50 MPa"


def narrow(force: float, height: float) -> Diagram:
    """A force as an even load on the last millimetre below and above its height."""
    half = 1e-3
    return Diagram.of_terms(
        1, [(height + half, force / (2 * half), 0.0), (height - half, -force / (2 * half), 0.0)]
    )


@pytest.mark.source("Gere", EX_5_6)
def test_post_of_wood_and_of_aluminium(agree: Agree) -> None:
    found = post_forces(narrow(12e3, 2.5), height=2.6, stiffness=float("nan"), prop=None)
    moment = float(found.moment[0])
    agree((32 * moment / (math.pi * 15e6)) ** (1 / 3), printed("0.273"), what="diameter of wood, m")
    agree((moment / 50e6 / 0.06712) ** (1 / 3), printed("0.208"), what="outer diameter of the tube, m")
