"""The crack that opens under a base where it would be in tension, with full head in it, found in rounds."""

from __future__ import annotations

import numpy as np
from numpy.typing import NDArray

from loads.arrays import BoolArray, FloatArray
from loads.states import Levels
from loads.wall.base_pressure import base_pressure, open_lengths
from loads.wall.section import Section
from loads.wall.site import Site
from loads.wall.uplift import Cracks, Uplift, end_heads, uplift

SETTLED = 1e-12
"""Change of a crack between two rounds, as a share of the base, at which it has settled. [–]"""
ROUNDS = 400
"""Rounds after which a crack that has not settled is reported as such."""


def uplift_of(section: Section, levels: Levels, site: Site, cracks: Cracks) -> Uplift:
    """Uplift on the underside of sections with given cracks."""
    base = section.base
    heads = end_heads(site.path, base, levels.flood_side, levels.protected_side)
    higher = np.maximum(levels.flood_side, levels.protected_side)
    open_heads = tuple(
        np.asarray(np.minimum(np.maximum(level, base), higher))
        for level in (levels.flood_side, levels.protected_side)
    )
    return uplift(
        site.path,
        section.chain("base"),
        heads=heads,
        open_heads=(open_heads[0], open_heads[1]),
        unit_weight=max(site.waters.flood, site.waters.protected),
        cracks=cracks,
    )


def open_cracks(
    section: Section, levels: Levels, site: Site, vertical: FloatArray, moment: FloatArray
) -> tuple[Cracks, BoolArray]:
    """Open the base where it would be in tension, round by round, until nothing more opens.

    Each round opens at least what the one before opened, so the lengths settle at the least that is in
    balance, or run through.
    """
    states = levels.states
    heel, toe = np.zeros(states), np.zeros(states)
    settled = np.ones(states, dtype=bool)
    if not site.opens or site.path.rule == "none":
        return Cracks(heel=heel, toe=toe), settled
    width = np.broadcast_to(section.base_width, (states,))
    active = np.arange(states)
    for _ in range(ROUNDS):
        part = _rows(section, active)
        state = Levels(flood_side=levels.flood_side[active], protected_side=levels.protected_side[active])
        push = uplift_of(part, state, site, Cracks(heel=heel[active], toe=toe[active])).push
        found = base_pressure(
            -(vertical[active] + push.vertical),
            moment[active] + push.moment_horizontal + push.moment_vertical,
            width[active],
        )
        new_heel, new_toe = open_lengths(found, width[active])
        new_heel = np.maximum(new_heel, heel[active])
        new_toe = np.minimum(np.maximum(new_toe, toe[active]), width[active] - new_heel)
        grown = np.abs(new_heel - heel[active]) + np.abs(new_toe - toe[active])
        heel[active], toe[active] = new_heel, new_toe
        active = active[grown > SETTLED * width[active]]
        if not len(active):
            break
    settled[active] = False
    return Cracks(heel=heel, toe=toe), settled


def _rows(section: Section, rows: NDArray[np.intp]) -> Section:
    """Sections of some states, outline only."""
    if len(section.x) == 1:
        return section
    return Section(
        parts=(),
        x=section.x[rows],
        z=section.z[rows],
        toe=section.toe,
        protected_top=section.protected_top,
        flood_top=section.flood_top,
        stem=None,
    )
