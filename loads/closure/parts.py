"""Logs, posts and guides of a closure as parts, one record each."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.closure.demands import Demands, guide_forces
from loads.closure.layout import Upright
from loads.diagram import Diagram
from loads.lazy import Built
from loads.part import Figure, Part

_POST_FIGURES = (
    ("base_shear", "shear at the base", "force"),
    ("base_moment", "moment at the base", "moment"),
    ("brace_moment", "moment at the brace", "moment"),
    ("moment_height", "height of the greatest moment above the sill", "length"),
    ("top_deflection", "deflection at the top", "length"),
    ("deflection_height", "height of the greatest deflection above the sill", "length"),
    ("brace_force", "force along the brace", "force"),
    ("brace_lift", "vertical part of the brace force", "force"),
)
_ANCHOR_FIGURES = (
    ("tension", "anchor_tension", "tension of all bolts that are pulled", "force"),
    ("bolt_tension", "bolt_tension", "tension of the bolt pulled most", "force"),
    ("bolt_shear", "bolt_shear", "shear of each bolt", "force"),
    ("contact_pressure", "contact_pressure", "pressure under the base plate", "stress"),
)


def parts_of(demands: Demands, diagram: Diagram) -> Built[Part]:
    """Every log from the left bay and the sill up, every post, and both guides."""
    layout = demands.structure.layout
    logs, posts = len(layout.bay_of), len(layout.posts)

    def build(index: int) -> Part:
        if index < logs:
            return _log(demands, index)
        if index < logs + posts:
            return _post(demands, index - logs)
        return _guide(demands, layout.guides[index - logs - posts], diagram)

    return Built(logs + posts + len(layout.guides), build)


def _log(demands: Demands, column: int) -> Part:
    layout, forces, section = demands.structure.layout, demands.logs, demands.structure.log
    row = int(layout.row_of[column])
    moment, reaction = forces.moment[:, column], forces.reaction[:, column]
    more = (
        ("bearing_pressure", "pressure at each bearing", "stress", forces.bearing_pressure[:, column]),
        ("bending_stress", "bending stress", "stress", moment / section.section_modulus),
        ("shear_stress", "shear stress", "stress", reaction / section.shear_area),
    )
    return Part(
        id=demands.log_names[column],
        kind="log",
        bottom=float(layout.edges[row]),
        top=float(layout.edges[row + 1]),
        line_load=forces.line_load[:, column],
        moment=moment,
        shear=reaction,
        reaction=reaction,
        deflection=forces.deflection[:, column],
        more=_known(more),
    )


def _post(demands: Demands, column: int) -> Part:
    structure, forces, section = demands.structure, demands.posts, demands.structure.post
    moment, shear = forces.moment[:, column], forces.shear[:, column]
    more = [(name, words, kind, getattr(forces, name)[:, column]) for name, words, kind in _POST_FIGURES]
    more += [
        ("bending_stress", "bending stress", "stress", moment / section.section_modulus),
        ("shear_stress", "shear stress", "stress", shear / section.shear_area),
    ]
    more += [
        (name, words, kind, getattr(demands.anchors, field)[:, column])
        for field, name, words, kind in _ANCHOR_FIGURES
    ]
    return Part(
        id=demands.post_names[column],
        kind="post",
        bottom=structure.layout.sill,
        top=structure.layout.sill + structure.closure.post_height,
        line_load=forces.line_load[:, column],
        moment=moment,
        shear=shear,
        reaction=forces.total[:, column],
        deflection=forces.deflection[:, column],
        more=_known(more),
    )


def _guide(demands: Demands, guide: Upright, diagram: Diagram) -> Part:
    layout = demands.structure.layout
    force, load = guide_forces(diagram, guide, layout.sill)
    missing = np.full(diagram.states, np.nan)
    return Part(
        id=guide.name,
        kind="guide",
        bottom=layout.sill,
        top=guide.top if guide.pieces else layout.sill,
        line_load=load,
        moment=missing,
        shear=missing,
        reaction=force,
        deflection=missing,
    )


def _known(
    more: list[tuple[str, str, str, FloatArray]] | tuple[tuple[str, str, str, FloatArray], ...],
) -> tuple[Figure, ...]:
    return tuple(
        Figure(name=name, meaning=words, kind=kind, value=value)
        for name, words, kind, value in more
        if not np.isnan(value).all()
    )
