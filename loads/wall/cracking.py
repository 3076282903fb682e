"""The crack that opens under a base where it would be in tension, with full head in it, found in rounds."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from loads.arrays import BoolArray, FloatArray
from loads.states import Levels
from loads.wall.base_pressure import base_pressure, open_lengths
from loads.wall.section import Section
from loads.wall.seepage_path import end_heads
from loads.wall.site import Site
from loads.wall.uplift import Cracks, Uplift, uplift

SETTLED = 1e-12
"""Change of a crack between two rounds, as a share of the base, at which it has settled. [–]"""
ROUNDS = 400
"""Rounds after which a crack that has not settled is reported as such."""


def uplift_of(
    section: Section, levels: Levels, site: Site, cracks: Cracks, datum: FloatArray | None = None
) -> Uplift:
    """Uplift on the underside of sections with given cracks; cutoffs count from `datum`, else the base."""
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
        datum=base if datum is None else datum,
    )


def open_cracks(
    section: Section, levels: Levels, site: Site, vertical: FloatArray, moment: FloatArray
) -> tuple[Cracks, BoolArray]:
    """Open the base where it would be in tension, round by round, until nothing more opens.

    Each round opens at least what the one before opened, so the lengths settle at the least that is in
    balance, or run through.

    Parameters
    ----------
    section, levels, site
        As of `loads.wall.stability.stability`.
    vertical, moment
        Sums of all forces but uplift, about the toe, shape (n,). [N/m, N·m/m]

    Returns
    -------
    tuple of Cracks and BoolArray
        Open lengths, and whether they settled.

    Notes
    -----
    With F(c) the length that would open under full head in a crack c, c = F(c) is sought from below by the
    secant through two rounds; once a round goes too far, between the two sides by false position (Illinois
    rule). The end at which the base first opens stays the one that opens.
    """
    states = levels.states
    width = np.broadcast_to(section.base_width, (states,))
    search = _Search.of(states)
    settled = np.ones(states, dtype=bool)
    if not site.opens or site.path.rule == "none":
        return search.cracks(np.arange(states)), settled
    active = np.arange(states)
    for _ in range(ROUNDS):
        part = _rows(section, active)
        state = Levels(flood_side=levels.flood_side[active], protected_side=levels.protected_side[active])
        push = uplift_of(part, state, site, search.cracks(active)).push
        found = base_pressure(
            -(vertical[active] + push.vertical),
            moment[active] + push.moment_horizontal + push.moment_vertical,
            width[active],
        )
        active = active[search.step(active, open_lengths(found, width[active]), width[active])]
        if not len(active):
            break
    settled[active] = False
    return search.cracks(np.arange(states)), settled


@dataclass
class _Search:
    """Where the search for the open length stands: present length, and what opens beyond it at both sides."""

    length: FloatArray
    at_heel: BoolArray
    low: FloatArray
    low_gap: FloatArray
    high: FloatArray
    high_gap: FloatArray
    was_high: BoolArray

    @classmethod
    def of(cls, states: int) -> _Search:
        """Nothing is open yet."""
        unknown = np.full(states, np.nan)
        return cls(
            length=np.zeros(states),
            at_heel=np.ones(states, dtype=bool),
            low=unknown.copy(),
            low_gap=unknown.copy(),
            high=unknown.copy(),
            high_gap=unknown.copy(),
            was_high=np.zeros(states, dtype=bool),
        )

    def cracks(self, rows: NDArray[np.intp]) -> Cracks:
        """Open lengths of some rows."""
        length, at_heel = self.length[rows], self.at_heel[rows]
        return Cracks(heel=np.where(at_heel, length, 0.0), toe=np.where(at_heel, 0.0, length))

    def step(
        self, rows: NDArray[np.intp], opened: tuple[FloatArray, FloatArray], width: FloatArray
    ) -> BoolArray:
        """Take in what opens with the present cracks; say which rows still move."""
        first = np.isnan(self.low[rows])
        self.at_heel[rows] = np.where(first, opened[0] >= opened[1], self.at_heel[rows])
        length = self.length[rows]
        gap = np.where(self.at_heel[rows], opened[0], opened[1]) - length
        before, before_gap = self.low[rows], self.low_gap[rows]
        bounded, over = ~np.isnan(self.high[rows]), gap < 0
        halve_high = bounded & ~over & ~self.was_high[rows]
        halve_low = over & self.was_high[rows]
        self.low[rows] = np.where(over, before, length)
        self.low_gap[rows] = np.where(over, before_gap * np.where(halve_low, 0.5, 1.0), gap)
        self.high[rows] = np.where(over, length, self.high[rows])
        self.high_gap[rows] = np.where(over, gap, self.high_gap[rows] * np.where(halve_high, 0.5, 1.0))
        self.was_high[rows] = over
        low, low_gap, high, high_gap = (
            values[rows] for values in (self.low, self.low_gap, self.high, self.high_gap)
        )
        bounded |= over
        fall = before_gap - low_gap
        run = np.where(bounded, high - low, low - before)
        fall = np.where(bounded, low_gap - high_gap, fall)
        plain = np.isnan(run) | ~(fall > 0)
        stride = np.divide(low_gap * run, fall, out=low_gap.copy(), where=~plain)
        stride = np.where(bounded, np.clip(stride, 0.0, run), np.maximum(stride, low_gap))
        self.length[rows] = np.minimum(low + stride, width)
        near = SETTLED * width
        still = (np.abs(gap) > near) & ~(bounded & (run <= near))
        return np.asarray(still & (np.abs(self.length[rows] - length) > 0))


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
