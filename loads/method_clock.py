"""Formulas of the clock, as data: from a gauge's reading to a head, and from the water back to the call."""

from __future__ import annotations

from typing import Final

from loads.method_data import Method, MethodGroup

_PRACTICE: Final = ("ClockPractice",)

CLOCK: Final = MethodGroup(
    title="From a forecast to the call",
    methods=(
        Method(
            name="Head from a reading",
            formula="h = s + z_G + Δd + Δs − z_s",
            words="s reading of the gauge, z_G its zero, Δd shift from its datum to the barriers', Δs level "
            "at the barrier less level at the gauge, z_s sill. A link nobody entered leaves the "
            "head not known.",
            sources=_PRACTICE,
            limits="the transfer as entered; off the ends of a table there is no level",
        ),
        Method(
            name="Difference by slope",
            formula="Δs = −i·x",
            words="i fall of the water surface per length, x distance downstream of the gauge.",
            sources=_PRACTICE,
            limits="the slope as entered, the same at every stage",
        ),
        Method(
            name="Time at which a level is reached",
            formula="t = t₁ + (t₂ − t₁)·(s − s₁)/(s₂ − s₁)",
            words="Straight line between the neighbours of the series that enclose the stage s, at the first "
            "rise through it; the level as a stage by the chain read backward.",
            sources=_PRACTICE,
            limits="never beyond the ends of the series, and not across a gap longer than entered",
        ),
        Method(
            name="Closed by, start, call-out",
            formula="T2 at the sill less the wave allowance; T1 = T2 − install; "
            "T0 = T1 − travel − mobilisation",
            words="For the low, likely and high trace and for the likely one raised by a foot; the owner "
            "must be told before T1 by the time entered.",
            sources=_PRACTICE,
            limits="work takes as long by night as by day, as entered or as drilled",
        ),
        Method(
            name="Removal",
            formula="last time the series falls below the removal stage",
            words="Not known while the series ends rising, since a second rise is then under way.",
            sources=_PRACTICE,
            limits="the end of the series",
        ),
        Method(
            name="Time to install",
            formula="preparation + ⌈posts/teams⌉·t_post + longest share of the bays·t_log",
            words="Teams are the people there over the people of a team; bays go in order to the team "
            "that is free first. A time entered for the whole goes before, and a drill before both.",
            sources=_PRACTICE,
            limits="not divided further than one team to a bay",
        ),
        Method(
            name="Plan of the line",
            formula="fewest late, then least sum of lateness, then largest least margin",
            words="Earliest due first, then improved by moving and swapping jobs among the crews that can do "
            "them; what is pinned by hand stays.",
            sources=_PRACTICE,
            limits="one fixed time to move between jobs; the best order found, not proven the best there is",
        ),
    ),
)
