"""Every barrier's limit levels across the series: which is reached first, and when."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import datetime

import numpy as np

from loads.gauge_conversion import Conversion
from loads.instant import ENDLESS, Instant, in_order, reached
from loads.series.series import Issue, Series
from loads.units import to_si

FOOT = to_si(1.0, "ft", "length")
HIGHER = "likely, 1 ft higher"


@dataclass(frozen=True, kw_only=True)
class LimitLevel:
    """One level of one barrier that the water must not pass unnoticed.

    Attributes
    ----------
    barrier
        Identifier.
    label
        For example "rated level" or "first-limit level".
    level
        Elevation, or None when nobody entered or could compute one. [m]
    way
        From the gauge to the barrier.
    note
        Why there is no level; a general sentence when empty.
    """

    barrier: str
    label: str
    level: float | None
    way: Conversion
    note: str = ""

    @property
    def stage(self) -> float:
        """The level as a reading of its gauge; NaN when not known. [m]."""
        if self.level is None:
            return float("nan")
        return float(self.way.stage(np.array([self.level]))[0])

    @property
    def sentence(self) -> str:
        """What stands in place of a missing level; empty when there is one."""
        if self.level is not None:
            return ""
        return self.note or f"no {self.label} has been entered for {self.barrier}"


@dataclass(frozen=True, kw_only=True)
class LimitReached:
    """When one limit level is reached."""

    limit: LimitLevel
    instant: Instant


@dataclass(frozen=True, kw_only=True)
class LimitOrder:
    """Limits of the whole line in the order in which one trace reaches them.

    Attributes
    ----------
    trace
        Name of the trace: low, likely, high and so on.
    reached
        Every limit that has a level, the first one first.
    sentences
        For every limit that has none.
    """

    trace: str
    reached: tuple[LimitReached, ...]
    sentences: tuple[str, ...]

    @property
    def first(self) -> LimitReached | None:
        """The limit reached first, or None when the trace reaches none.

        A limit of which the time is not known takes part with the earliest time at which it may be reached;
        where there is no such time either, `not_known` has it.
        """
        if not self.reached or self.reached[0].instant.state == "not reached in this forecast":
            return None
        return self.reached[0]

    @property
    def not_known(self) -> tuple[LimitReached, ...]:
        """Limits that may be reached at a time that cannot be told."""
        return tuple(one for one in self.reached if one.instant.state == "not known")


def traces_of(issue: Issue, *, observed: Series | None = None, higher: float = FOOT) -> dict[str, Series]:
    """The traces that every time is told for: low, likely and high where there are, and likely but higher.

    Parameters
    ----------
    issue
        One issue of a forecast.
    observed
        What the gauge showed; its last value before the forecast begins is put in front of each trace.
    higher
        How much higher the last trace is than the likely one. [m]

    Returns
    -------
    dict of str to Series
        By name, in this order.
    """
    traces = {
        name: trace
        for name, trace in (("low", issue.low), ("likely", issue.likely), ("high", issue.high))
        if trace is not None
    }
    raised = HIGHER if higher == FOOT else "likely, higher"
    traces[raised] = issue.likely.shifted(higher, f"{issue.likely.name}, higher")
    return {name: anchored(trace, observed) for name, trace in traces.items()}


def anchored(trace: Series, observed: Series | None) -> Series:
    """The trace with the last observed value before it in front, so that a rise between the two is seen."""
    if observed is None:
        return trace
    before = np.flatnonzero(observed.times < trace.times[0])
    if not len(before):
        return trace
    last = before[-1:]
    return replace(
        trace,
        times=np.concatenate([observed.times[last], trace.times]),
        utc_offsets=np.concatenate([observed.utc_offsets[last], trace.utc_offsets]),
        values=np.concatenate([observed.values[last], trace.values]),
    )


def with_crest(trace: Series, crest: float) -> Series:
    """The trace moved up or down as a whole until its highest reading is the one asked for: a what-if.

    Parameters
    ----------
    trace
        Readings of a forecast, without an observed one in front.
    crest
        Highest reading wanted. [m]
    """
    return trace.shifted(crest - float(trace.values.max()), f"{trace.name}, crest moved")


def limit_orders(
    limits: Sequence[LimitLevel],
    traces: Mapping[str, Mapping[str, Series]],
    now: datetime,
    *,
    longest_gap: float = ENDLESS,
) -> tuple[LimitOrder, ...]:
    """Order in which each trace reaches the limits of the line.

    Parameters
    ----------
    limits
        Of all barriers.
    traces
        Name of the trace, then identifier of the gauge, to the readings of that gauge.
    now
        Which decides what is past.
    longest_gap
        Neighbours further apart than this say nothing about what lies between. [s]

    Returns
    -------
    tuple of LimitOrder
        One for each trace. A limit whose gauge has no series in the trace has a sentence.
    """
    return tuple(_order(name, limits, by_gauge, now, longest_gap) for name, by_gauge in traces.items())


def _order(
    name: str,
    limits: Sequence[LimitLevel],
    by_gauge: Mapping[str, Series],
    now: datetime,
    longest_gap: float,
) -> LimitOrder:
    sentences = [limit.sentence for limit in limits if limit.sentence]
    there = [limit for limit in limits if limit.level is not None]
    found: list[LimitReached] = []
    for gauge in dict.fromkeys(limit.way.gauge.id for limit in there):
        own = [limit for limit in there if limit.way.gauge.id == gauge]
        if gauge not in by_gauge:
            sentences += [
                f"there is no series of gauge {gauge}, so nothing is told for {limit.barrier}, {limit.label}"
                for limit in own
            ]
            continue
        stages = np.array([limit.stage for limit in own])
        instants = reached(by_gauge[gauge], stages, now, longest_gap=longest_gap)
        found += [
            LimitReached(limit=limit, instant=instant) for limit, instant in zip(own, instants, strict=True)
        ]
    order = in_order([one.instant for one in found])
    return LimitOrder(trace=name, reached=tuple(found[place] for place in order), sentences=tuple(sentences))
