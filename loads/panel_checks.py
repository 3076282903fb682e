"""Checks of a panel, and the level at which the first of its load limits is reached."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.checks import Check, check_of, level_check
from loads.diagram import Diagram
from loads.faces import ArcFace, CircleFace, Resultant, StripFace
from loads.first_limit import FirstLimit, first_of
from loads.load import Setting, loads_on
from loads.records.panel import Limits
from loads.states import DRY, rising

Face = StripFace | CircleFace | ArcFace

SEARCH_ABOVE_TOP = 3.0
"""How far above a barrier's top a first-limit level is looked for. [m]"""


def peak_pressure(diagram: Diagram, face: Face) -> FloatArray:
    """Net pressure of greatest magnitude on a face, with its sign, shape (n,). [Pa]."""
    greatest, least = diagram.extremes(face.bottom, face.top)
    return np.where(greatest >= -least, greatest, least)


def load_checks(
    subject: str,
    limits: Limits,
    pressure: FloatArray,
    resultant: Resultant,
    near: float,
    foot: str = "bottom",
) -> list[Check]:
    """Checks of what presses on a whole face: pressure at a point, total force and moment, signed."""
    reverse = ("The load pushes toward the flood side; the limit was entered without a direction.",)
    entered = (
        ("pressure at a point", "pressure", pressure, limits.pressure),
        ("total force", "force", resultant.total, limits.force),
        (f"moment about the {foot}", "moment", resultant.moment, limits.moment),
    )
    return [
        check_of(
            subject=subject,
            name=name,
            kind=kind,
            demand=demand,
            limit=limit,
            near=near,
            remarks=reverse if demand[0] < 0 and limit is not None else (),
        )
        for name, kind, demand, limit in entered
    ]


def panel_checks(
    setting: Setting, face: Face, diagram: Diagram, resultant: Resultant, near: float
) -> list[Check]:
    """Checks of a panel: pressure at a point, total force, moment, rated level and freeboard."""
    panel = setting.panel
    subject = f"panel {panel.id}"
    checks = load_checks(subject, panel.limits, peak_pressure(diagram, face), resultant, near)
    level = setting.levels.flood_side
    freeboard = panel.limits.freeboard
    for name, limit, highest in (
        (
            "rated level",
            panel.rated_level,
            panel.rated_level.value if panel.rated_level else np.nan,
        ),
        ("freeboard", freeboard, face.top - freeboard.value if freeboard else np.nan),
    ):
        checks.append(
            level_check(
                subject=subject,
                name=name,
                level=level,
                bottom=face.bottom,
                limit=limit,
                highest=float(highest),
                near=near,
            )
        )
    return checks


def first_limit_of(setting: Setting, face: Face, near: float) -> FirstLimit | None:
    """First-limit level of a panel: its load limits only, not levels that were themselves entered.

    The flood side rises from the bottom of the panel to `SEARCH_ABOVE_TOP` above its top; loads count as they
    push toward the protected side.
    """
    limits = setting.panel.limits
    if limits.pressure is None and limits.force is None and limits.moment is None:
        return None

    def checks_at(flood_side: FloatArray) -> list[Check]:
        diagram = risen(setting, flood_side)
        greatest, _ = diagram.extremes(face.bottom, face.top)
        subject = f"panel {setting.panel.id}"
        found = load_checks(subject, limits, greatest, face.resultant(diagram), near)
        return [check for check in found if check.limit is not None]

    def ratios(flood_side: FloatArray) -> FloatArray:
        return np.column_stack([check.demand / check.limit_value for check in checks_at(flood_side)])

    names = [(check.subject, check.name) for check in checks_at(np.array([face.bottom]))]
    return first_of(names, ratios, low=face.bottom, high=ceiling_of(setting, face))


def ceiling_of(setting: Setting, face: Face) -> float:
    """Highest level searched for a first limit. [m]."""
    return max(face.top, float(setting.levels.flood_side.max())) + SEARCH_ABOVE_TOP


def risen(setting: Setting, flood_side: FloatArray) -> Diagram:
    """Net pressure with other flood-side levels and the protected side as in the first state."""
    protected = float(setting.levels.protected_side[0])
    levels = rising(flood_side, protected if np.isfinite(protected) else DRY)
    swept = Setting(levels=levels, fluids=setting.fluids, panel=setting.panel)
    return Diagram.joined(load.diagram for load in loads_on(swept))
