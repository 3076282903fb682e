"""How old data are, and what may be done with them: stale data turn advice off, never arithmetic."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

import numpy as np

from loads.series.refusals import refusal
from loads.series.series import Series
from loads.series.trap import Trap, duration

HOUR = 3600.0
Freshness = Literal["current", "amber", "stale", "unknown", "ahead"]


@dataclass(frozen=True, kw_only=True)
class Thresholds:
    """Ages in seconds beyond which a label changes; common practice, no source, and to be edited."""

    observation_amber: float = 1 * HOUR
    observation_stale: float = 3 * HOUR
    forecast_amber: float = 6 * HOUR
    forecast_stale: float = 24 * HOUR

    def __post_init__(self) -> None:
        for kind in ("observation", "forecast"):
            amber, stale = getattr(self, f"{kind}_amber"), getattr(self, f"{kind}_stale")
            if not 0 < amber <= stale < np.inf:
                raise refusal(f"thresholds.{kind}", "must have amber above 0 and stale not below amber")

    def of(self, series: Series) -> tuple[float, float]:
        """Ages in seconds beyond which a series is amber and stale."""
        if series.kind == "forecast":
            return self.forecast_amber, self.forecast_stale
        return self.observation_amber, self.observation_stale


@dataclass(frozen=True, kw_only=True)
class Age:
    """Age of a series at one instant.

    Attributes
    ----------
    label
        "current", "amber" or "stale"; "unknown" when a forecast has no time of issue; "ahead" when the data
        are stamped later than now.
    seconds
        Age, negative when ahead; None when unknown. [s]
    advice
        True when recommendations may be shown. Computation never depends on it.
    """

    label: Freshness
    seconds: float | None
    advice: bool
    trap: Trap | None

    @property
    def sentence(self) -> str:
        """What to tell, empty for current data."""
        return "" if self.trap is None else str(self.trap)


DEFAULT = Thresholds()
CLOCK_SLACK = 300.0
"""Clocks of two machines may differ by this much before data count as ahead. [s]"""
_WHAT = {"observed": "last reading", "forecast": "forecast"}


def age_of(series: Series, now: np.datetime64, thresholds: Thresholds = DEFAULT) -> Age:
    """Age of a series: of an observation since its last reading, of a forecast since its issue.

    Parameters
    ----------
    series
        The newest one of its kind.
    now
        Instant in UTC.
    thresholds
        Where the labels change; an age equal to a threshold has not passed it.

    Returns
    -------
    Age
        With advice off when stale, unknown or ahead.
    """
    from_when = series.times[-1] if series.kind == "observed" else series.issued
    if from_when is None:
        text = (
            "The forecast does not say when it was issued, so its age is unknown: no advice is given from it."
        )
        return Age(label="unknown", seconds=None, advice=False, trap=_trap("unknown", text))
    seconds = float((now.astype("datetime64[s]") - from_when).astype(np.int64))
    amber, stale = thresholds.of(series)
    what = _WHAT[series.kind]
    if seconds < -CLOCK_SLACK:
        text = f"The {what} is stamped {{ahead}} later than now: check the zone and the clock. Advice is off."
        return Age(label="ahead", seconds=seconds, advice=False, trap=_trap("ahead", text, ahead=-seconds))
    if seconds > stale:
        text = f"The {what} is {{age}} old, more than {{limit}}: advice is off, arithmetic goes on."
        return Age(
            label="stale", seconds=seconds, advice=False, trap=_trap("stale", text, age=seconds, limit=stale)
        )
    if seconds > amber:
        text = f"The {what} is {{age}} old, more than {{limit}}: look for a newer one."
        return Age(
            label="amber", seconds=seconds, advice=True, trap=_trap("amber", text, age=seconds, limit=amber)
        )
    return Age(label="current", seconds=seconds, advice=True, trap=None)


def _trap(name: str, template: str, **seconds: float) -> Trap:
    return Trap(
        name=f"age, {name}",
        template=template,
        figures={key: duration(value) for key, value in seconds.items()},
    )
