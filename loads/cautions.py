"""The cautions that stand beside every result, and what the figures leave out."""

from __future__ import annotations

HEADLINE = (
    "These figures help planning. They do not say that a barrier is strong. Local codes, the O&M manual and "
    "a licensed engineer decide."
)
"""The one sentence that every page, sheet and file carries."""

CAUTIONS = (
    HEADLINE,
    (
        "A screening and planning tool: it compares loads with limits that somebody entered. A limit nobody "
        "entered is not checked."
    ),
    (
        "The capacity of logs, posts, anchors, seals, concrete and ground is for a licensed engineer and the "
        "closure supplier's manual. The rated level is the engineer's and is entered; the first-limit level "
        "is computed and is no leave to let the water rise to it."
    ),
    (
        "Counted: still water, and sediment as entered. Not counted unless entered as a load: flowing water, "
        "waves, wind, debris, ice, vessels, vehicles, earthquake, scour, and water falling over the top."
    ),
    (
        "The foundation is taken as sound, the parts as complete and placed as designed, the levels as "
        "measured at the barrier and in the scenario's datum."
    ),
    (
        "Never stand in line with a loaded panel, never go near a loaded wall alone. Muddy leakage, a leak "
        "that grows while the river stands still, a leaning post or a rising log: leave and call. A falling "
        "crest does not end the hazard."
    ),
    (
        "For forecasts the national service decides, for roads and evacuation the police and the emergency "
        "operations centre, for lifting and work near water the rules in force there."
    ),
)
"""Every caution, the headline first."""

NOT_COUNTED = (
    "flow, waves, wind, debris, ice and impact",
    "earthquake and liquefaction",
    "scour, seepage and failure of the ground",
    "uneven bearing, missing or damaged parts",
    "friction of soil along the face",
)
"""What a panel's figures leave out, for the assumptions of a report."""

ASSUMPTIONS = (
    "Levels are still-water levels at the barrier, in the scenario's datum.",
    (
        "Water presses at right angles to the face, with a unit weight that is the same at every depth on "
        "its side."
    ),
    "Pore water in sediment stands at the water level of its side.",
    "Above water soil has its moist unit weight, below water its saturated one less that of the water.",
    "Pressure of soil is not taken below zero: where cohesion would pull, nothing acts.",
    (
        "Fluid mud and equivalent fluid contain their water; their excess over water carries on undiminished "
        "below them."
    ),
    "Water over the top presses on the face up to its top only.",
    "The face is stiff and thin; its own weight is not counted.",
)
"""What the figures rest on, for reports and the page of methods."""
