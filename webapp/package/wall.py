"""What the package states of a wall at its head: criteria in force, resultant, sliding band, embedment."""

from __future__ import annotations

import math

from loads.assessment import AssessedWall
from loads.wall.i_wall_result import IWallResult
from loads.wall.sliding import SlidingBand
from loads.wall.wall_result import WallResult
from webapp.display import System, elevation
from webapp.drawing.wall_facts import compression_words, ratio
from webapp.step_text import with_unit
from webapp.wall_markup import criteria_text

_DIGITS = 4

Fact = tuple[str, str]


def wall_facts(barrier: AssessedWall, system: System, datum: str) -> tuple[Fact, ...]:
    """Names and figures, all per unit of length."""
    found, result = barrier.found, barrier.resultant
    height = float(result.line_of_action[0])
    line = "none, the force is nil" if math.isnan(height) else elevation(height, system, datum)

    def shown(value: float, kind: str) -> str:
        return with_unit(value, kind, system, _DIGITS)

    head = [
        ("In force", criteria_text(barrier)),
        ("Horizontal force H, toward the protected side", shown(float(result.horizontal[0]), "line load")),
    ]
    if isinstance(found, IWallResult):
        depth = found.embedment
        return (
            *head,
            ("Moment M about the protected-side ground", shown(float(result.moment[0]), "moment per length")),
            ("Line of action of H", line),
            ("Embedment needed", _depth(float(depth.required[0]), shown(float(depth.required[0]), "length"))),
            ("Embedment of the sheet entered", shown(float(depth.provided[0]), "length")),
            ("Greatest shear in the sheet", shown(float(found.shear[0]), "line load")),
            ("Greatest moment in the sheet", shown(float(found.bending[0]), "moment per length")),
        )
    base = found.stability.base
    place = float(base.from_toe[0])
    return (
        *head,
        ("Vertical force V, up", shown(float(result.vertical[0]), "line load")),
        ("Moment M about the toe", shown(float(result.moment[0]), "moment per length")),
        ("Line of action of H", line),
        ("Resultant on the base, from the toe", _depth(place, shown(place, "length"))),
        ("Base", compression_words(found, 0)),
        ("Base pressure at the toe", shown(float(base.toe[0]), "pressure")),
        ("Base pressure at the heel", shown(float(base.heel[0]), "pressure")),
        *_sliding(found),
    )


def _depth(value: float, words: str) -> str:
    return "none found" if math.isnan(value) else words


def _sliding(found: WallResult) -> list[Fact]:
    key = found.stability.key_sliding
    return [_band(band) for band in (found.stability.sliding, *([key] if key else []))]


def _band(band: SlidingBand) -> Fact:
    where = "on the base" if band.plane == "base" else "through the key"
    low, stated, high, low_dry, high_dry = (
        ratio(float(getattr(band, name)[0]))
        for name in ("low", "factor", "high", "low_without_uplift", "high_without_uplift")
    )
    return (
        f"Sliding factor {where}",
        f"{stated}; {low} to {high} over the friction; without uplift {low_dry} to {high_dry}",
    )
