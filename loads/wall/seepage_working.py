"""Worked step of the underseepage screen of a wall."""

from __future__ import annotations

import numpy as np

from loads.wall.underseepage import Underseepage
from loads.worked_step import Line, Step, line


def seepage_step(screen: Underseepage, index: int) -> Step:
    """Worked step of one state, without lines where there is no difference of head."""
    head = float(screen.head[index])
    if head <= 0:
        return Step(title="Underseepage screen", formula="no difference of head")
    lines = [
        line(
            "(ΣL_v + ΣL_h/3)/ΔH = ({} + {}/3)/{} = {}",
            (float(screen.vertical[index]), "length"),
            (float(screen.horizontal[index]), "length"),
            (head, "length"),
            (float(screen.creep_ratio[index]), "ratio"),
            label="weighted creep ratio",
        )
    ]
    if screen.exit_depth[index] > 0:
        lines += _exit(
            head, *(float(v[index]) for v in (screen.floor, screen.exit_depth, screen.exit_gradient))
        )
    return Step(title="Underseepage screen", formula="uniform deep ground", lines=tuple(lines))


def _exit(head: float, floor: float, depth: float, gradient: float) -> list[Line]:
    lam = (1 + np.sqrt(1 + (floor / depth) ** 2)) / 2
    return [
        line(
            "λ = (1 + √(1 + (b/d)²))/2 = (1 + √(1 + ({}/{})²))/2 = {}",
            (floor, "length"),
            (depth, "length"),
            (lam, "ratio"),
            label="exit gradient",
        ),
        line(
            "i = ΔH/(π·d·√λ) = {}/(π·{}·√{}) = {}",
            (head, "length"),
            (depth, "length"),
            (lam, "ratio"),
            (gradient, "ratio"),
            label="exit gradient",
        ),
    ]
