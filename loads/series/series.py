"""A stage or level series, and the issues of a forecast with their low, likely and high trace."""

from __future__ import annotations

from dataclasses import dataclass, field, replace
from typing import Literal, TypeAlias

import numpy as np
from numpy.typing import NDArray

from loads.arrays import FloatArray
from loads.series.refusals import refusal

TimeArray: TypeAlias = NDArray[np.datetime64]
OffsetArray: TypeAlias = NDArray[np.int16]
Kind = Literal["observed", "forecast"]
KINDS: tuple[Kind, ...] = ("observed", "forecast")


@dataclass(frozen=True, kw_only=True, eq=False)
class Series:
    """Levels of one gauge at rising times.

    Attributes
    ----------
    name
        What the series is called on pages.
    parameter
        What was measured or forecast, for example ``gauge height``.
    kind
        "observed" or "forecast".
    times
        Instants in UTC, to the second, strictly rising, shape (n,).
    utc_offsets
        Local time less UTC at each instant, as the file stated it, shape (n,). [min]
    zone
        Name of the local zone; names joined by ``/`` where it changes.
    values
        Reading above the gauge's zero, or elevation where `datum` is given, shape (n,); always finite. [m]
    unit
        Unit the file stated, a symbol of `loads.units`.
    issued
        Instant of issue in UTC, or None when the file does not say.
    gauge
        Identifier of the gauge, empty when the file gives none.
    datum
        Name of the vertical datum of `values`, or None for readings above the gauge's own zero.
    qualifiers
        Codes that the file puts beside its values, each once.
    notes
        What was left out or taken for granted, one sentence each.
    """

    name: str
    parameter: str
    kind: Kind
    times: TimeArray
    utc_offsets: OffsetArray
    zone: str
    values: FloatArray
    unit: str
    issued: np.datetime64 | None = None
    gauge: str = ""
    datum: str | None = None
    qualifiers: tuple[str, ...] = ()
    notes: tuple[str, ...] = ()

    def __post_init__(self) -> None:
        count = len(self.values)
        if count == 0 or len(self.times) != count or len(self.utc_offsets) != count:
            raise ValueError("a series has at least one value, and a time and an offset for each")
        if self.times.dtype != np.dtype("datetime64[s]") or np.isnat(self.times).any():
            raise ValueError("times are datetime64[s]")
        if not np.isfinite(self.values).all():
            raise ValueError("values are finite; no data is left out")
        if (np.diff(self.times.astype(np.int64)) <= 0).any():
            raise ValueError("times rise")
        for array in (self.times, self.utc_offsets, self.values):
            array.setflags(write=False)

    def __len__(self) -> int:
        """Number of values."""
        return len(self.values)

    def with_notes(self, *notes: str) -> Series:
        """The same series with more notes."""
        return replace(self, notes=(*self.notes, *notes))

    def shifted(self, metres: float, name: str) -> Series:
        """The same trace, so many metres higher."""
        return replace(self, values=self.values + metres, name=name)


@dataclass(frozen=True, kw_only=True, eq=False)
class Issue:
    """One issue of a forecast: its likely trace, and a low and a high one where known.

    Attributes
    ----------
    likely, low, high
        Traces; `low` and `high` are both None when no range was given.
    basis
        Where the range comes from, in words; empty without one.
    """

    likely: Series
    low: Series | None = None
    high: Series | None = None
    basis: str = ""

    @property
    def issued(self) -> np.datetime64 | None:
        """Instant of issue, or None when not stated."""
        return self.likely.issued

    @classmethod
    def entered(cls, likely: Series, low: Series, high: Series) -> Issue:
        """An issue whose range was given as two traces of its own.

        Raises
        ------
        ScenarioError
            The traces have other times, or low, likely and high are not in this order somewhere.
        """
        for name, trace in (("low", low), ("high", high)):
            if not np.array_equal(trace.times, likely.times):
                raise refusal(f"forecast.{name}", "must have the times of the likely trace")
        wrong = (low.values > likely.values) | (likely.values > high.values)
        if wrong.any():
            when = str(likely.times[int(np.argmax(wrong))]).replace("T", " ")
            raise refusal("forecast", f"has low, likely and high out of order at {when} UTC")
        return cls(likely=likely, low=low, high=high, basis="low and high as entered")

    @classmethod
    def banded(cls, likely: Series, *, minus: float, plus: float) -> Issue:
        """An issue whose range is a band around the likely trace.

        Parameters
        ----------
        likely
            The trace.
        minus, plus
            How far the range reaches below and above it. [m]

        Raises
        ------
        ScenarioError
            A band is negative or not a number.
        """
        for name, band in (("minus", minus), ("plus", plus)):
            if not (np.isfinite(band) and band >= 0):
                raise refusal(f"forecast.{name}", "must be zero or more", str(band))
        return cls(
            likely=likely,
            low=likely.shifted(-minus, f"{likely.name}, low"),
            high=likely.shifted(plus, f"{likely.name}, high"),
            basis="plus and minus bands as entered",
        )


@dataclass(frozen=True, kw_only=True, eq=False)
class Forecast:
    """Issues of one forecast in the order in which they were issued."""

    issues: tuple[Issue, ...] = field(default=())

    @property
    def newest(self) -> Issue:
        """The issue that counts."""
        return self.issues[-1]

    @property
    def past(self) -> tuple[Issue, ...]:
        """Earlier issues, oldest first."""
        return self.issues[:-1]

    def with_issue(self, issue: Issue) -> Forecast:
        """The forecast with one more issue in its place.

        Raises
        ------
        ScenarioError
            Its time of issue is missing while there are others, is there already, or the gauge, datum or
            parameter is another.
        """
        if self.issues:
            self._must_belong(issue)
        known = [*self.issues, issue]
        known.sort(key=lambda one: 0 if one.issued is None else int(one.issued.astype(np.int64)))
        return Forecast(issues=tuple(known))

    def _must_belong(self, issue: Issue) -> None:
        first = self.issues[0].likely
        if issue.issued is None or first.issued is None:
            raise refusal(
                "forecast.issued", "is missing; several issues are kept only with their times of issue"
            )
        if any(issue.issued == one.issued for one in self.issues):
            when = str(issue.issued).replace("T", " ")
            raise refusal("forecast.issued", "is the time of an issue that is here already", f"{when} UTC")
        for what in ("gauge", "datum", "parameter"):
            ours, theirs = getattr(first, what), getattr(issue.likely, what)
            if ours != theirs:
                raise refusal(f"forecast.{what}", f"is not that of the other issues, {ours}", str(theirs))
