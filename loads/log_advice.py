"""What the logs of a closure ask for now: nothing, more of them, or a decision."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Literal

AdviceKind = Literal[
    "advice is off",
    "not known",
    "no more logs for this forecast",
    "add logs",
    "back up, withdraw or decide",
]


@dataclass(frozen=True, kw_only=True)
class LogAdvice:
    """Advice about the logs of one closure, and why."""

    kind: AdviceKind
    sentence: str


def log_advice(
    *, level: float, wanted_top: float, top: float, add_logs_until: float | None, off: str = ""
) -> LogAdvice:
    """What to do about the logs, at one level of the water.

    Parameters
    ----------
    level
        Water at the closure now. [m]
    wanted_top
        Crest with what it may come higher and the owner's freeboard. [m]
    top
        Top of the logs in place. [m]
    add_logs_until
        Level from which upward no log can be added, or None when nobody entered one. [m]
    off
        Why there is no advice, for example a stale forecast; empty when there is.

    Returns
    -------
    LogAdvice
        A screening figure of what was entered: it says nothing about strength.

    Examples
    --------
    >>> log_advice(level=1.0, wanted_top=3.0, top=2.0, add_logs_until=1.5).kind
    'add logs'
    >>> log_advice(level=1.5, wanted_top=3.0, top=2.0, add_logs_until=1.5).kind
    'back up, withdraw or decide'
    """
    if off:
        return LogAdvice(kind="advice is off", sentence=off)
    if math.isnan(level) or math.isnan(wanted_top):
        return LogAdvice(kind="not known", sentence="the level at this closure is not known")
    if wanted_top <= top:
        return LogAdvice(
            kind="no more logs for this forecast",
            sentence="the logs in place stand as high as this forecast and its allowances ask for",
        )
    if add_logs_until is None:
        return LogAdvice(kind="not known", sentence="nobody entered up to what level logs can be added")
    if level < add_logs_until:
        return LogAdvice(
            kind="add logs", sentence="logs can still be added until the water reaches that level"
        )
    return LogAdvice(
        kind="back up, withdraw or decide",
        sentence="the water has reached the level from which no log can be added; the one in charge decides",
    )
