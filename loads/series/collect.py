"""From rows to series: counting what is no data, sorting, and never keeping a value that is in doubt."""

from __future__ import annotations

from array import array
from collections import Counter
from collections.abc import Iterable, Sequence

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.series.levels import HIGHEST, LOWEST, read_level
from loads.series.refusals import THE_FILE, refusal, shown
from loads.series.series import Kind, Series
from loads.series.stamps import Stamp
from loads.units import to_si

_MOST_REASONS = 12
_MOST_QUALIFIERS = 40
MOST_SERIES = 500
"""Series in one file."""
NO_TIME = "no time"


class Collector:
    """Rows of one series as they are read, packed."""

    def __init__(
        self, *, name: str, parameter: str, kind: Kind, unit: str, gauge: str = "", datum: str | None = None,
        issued: int | None = None, zone: str = "",
    ) -> None:  # fmt: skip
        self.name, self.parameter, self.kind, self.unit = name, parameter, kind, unit
        self.gauge, self.datum, self.issued, self.zone = gauge, datum, issued, zone
        self.notes: list[str] = []
        self.dropped: Counter[str] = Counter()
        self._seconds, self._offsets, self._values = array("q"), array("h"), array("d")
        self._qualifiers: dict[str, None] = {}
        self._zones: dict[str, None] = {}

    def drop(self, reason: str) -> None:
        """Count one value that is no data."""
        self.dropped[reason if reason in self.dropped or len(self.dropped) < _MOST_REASONS else "others"] += 1

    def add(self, stamp: Stamp | None, text: str, qualifier: str = "") -> None:
        """Take one row.

        Raises
        ------
        UnreadableLevelError
            The value is neither a number nor a mark for no data.
        """
        value = read_level(text)
        if value is None:
            self.drop(f"{shown(text.strip())}" if text.strip() else "empty")
        elif stamp is None:
            self.drop(NO_TIME)
        else:
            self._seconds.append(stamp.seconds)
            self._offsets.append(stamp.offset)
            self._values.append(value)
            self._zones[stamp.zone] = None
            if qualifier and len(self._qualifiers) < _MOST_QUALIFIERS:
                self._qualifiers[qualifier[:40]] = None

    def series(self) -> Series | None:
        """The series, or None when no value is left; what was left out is then in `dropped`."""
        if not self._seconds:
            return None
        seconds = np.frombuffer(self._seconds, dtype=np.int64)
        offsets = np.frombuffer(self._offsets, dtype=np.int16)
        raw = np.frombuffer(self._values, dtype=np.float64)
        metres = np.asarray(to_si(raw, self.unit, "length"), dtype=np.float64)
        credible = (metres > LOWEST) & (metres < HIGHEST)
        if not credible.all():
            self.dropped["outside −1000 m to 10 000 m"] += int((~credible).sum())
            seconds, offsets, metres = seconds[credible], offsets[credible], metres[credible]
        if len(seconds) > 1 and (np.diff(seconds) <= 0).any():
            order = np.argsort(seconds, kind="stable")
            if (np.diff(seconds) < 0).any():
                self.notes.append("The rows were not in order of time and have been sorted.")
            seconds, offsets, metres = seconds[order], offsets[order], metres[order]
            keep = self._single(seconds, metres)
            seconds, offsets, metres = seconds[keep], offsets[keep], metres[keep]
        if not len(seconds):
            return None
        issued = None if self.issued is None else np.datetime64(self.issued, "s")
        return Series(
            name=self.name, parameter=self.parameter, kind=self.kind, times=seconds.astype("datetime64[s]"),
            utc_offsets=offsets.copy(), zone=self.zone or "/".join(self._zones), values=metres,
            unit=self.unit, issued=issued, gauge=self.gauge, datum=self.datum,
            qualifiers=tuple(self._qualifiers), notes=(*self.notes, *told(self.dropped)),
        )  # fmt: skip

    def _single(self, seconds: np.ndarray[tuple[int], np.dtype[np.int64]], metres: FloatArray) -> BoolArray:
        """Which of the sorted rows to keep: one of equal ones, none of those that contradict."""
        starts = np.flatnonzero(np.concatenate([[True], np.diff(seconds) > 0]))
        agrees = np.minimum.reduceat(metres, starts) == np.maximum.reduceat(metres, starts)
        keep = np.zeros(len(seconds), dtype=np.bool_)
        keep[starts[agrees]] = True
        repeated = int((np.diff(np.append(starts, len(seconds)))[agrees] - 1).sum())
        if repeated:
            self.notes.append(f"Rows given more than once with the same value: {repeated}, kept once.")
        if not agrees.all():
            count = int((~agrees).sum())
            self.notes.append(f"Times with two different values: {count}; all of their values are left out.")
            self.dropped["two values at one time"] += count
        return keep


def told(dropped: Counter[str]) -> list[str]:
    """One sentence on what was left out, or none."""
    total = sum(dropped.values())
    if not total:
        return []
    reasons = ", ".join(f"{reason} {count}" for reason, count in dropped.most_common())
    return [f"Left out as no data: {total} ({reasons})."]


def finished(collectors: Iterable[Collector], notes: Sequence[str] = ()) -> list[Series]:
    """Series of a whole file, each with the file's own notes.

    Raises
    ------
    ScenarioError
        There is no level in the file at all; the problem says what was found instead.
    """
    found: list[Series] = []
    empty: list[str] = []
    dropped: Counter[str] = Counter()
    for collector in collectors:
        series = collector.series()
        if series is None:
            dropped.update(collector.dropped)
            why = " ".join(told(collector.dropped)) or "no rows."
            empty.append(f"{collector.name}, {collector.kind}: no data. {why}")
        else:
            found.append(series)
    if not found:
        reasons = " ".join([*told(dropped), *notes])
        raise refusal(THE_FILE, f"holds no level. {reasons}".rstrip())
    return [series.with_notes(*notes, *empty[:_MOST_REASONS]) for series in found]
