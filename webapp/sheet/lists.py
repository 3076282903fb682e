"""What to watch for and what to tick off: lists of a field sheet."""

from __future__ import annotations

from webapp.display import elevation
from webapp.sheet.plan import Plan

LEAVE = (
    "muddy leak",
    "leak growing at a steady river",
    "post leaning",
    "log rising or bowing",
    "crack at a base plate",
)
"""Signs at which people go first and call then."""

CALL = (
    "new clear leak",
    "debris raft",
    "pump falling behind",
    "boat or car near",
)
"""Signs that somebody must hear of."""


def watch_lines(plan: Plan | None) -> tuple[tuple[str, str], ...]:
    """What to do, and at which signs; the level at which the engineer is called comes first."""
    level = plan.call_level if plan else None
    call = CALL if plan is None or level is None else (f"water at {elevation(level, plan.system)}", *CALL)
    return (("LEAVE, then call", " · ".join(LEAVE)), ("CALL", " · ".join(call)))


def tick_items(*, posts: int, braced: bool) -> tuple[str, ...]:
    """Things to tick off, in the order in which they are done."""
    uprights = ("posts plumb, bolts tight",) if posts else ("guides plumb and clean",)
    return (
        "sill and slots clean",
        "parts counted",
        *uprights,
        *(("braces set",) if braced else ()),
        "seals fitted and wet",
        "bottom log seated",
        "logs to the count above",
        "hold-downs clamped",
        "ends and toe bagged",
        "pump on, drains shut",
        "closed, gaps looked at",
        "photo taken",
    )
