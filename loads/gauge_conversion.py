"""Readings of a gauge as levels at a barrier and levels as readings; no link is ever assumed."""

from __future__ import annotations

from dataclasses import dataclass, replace
from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.problems import Problem, ScenarioError
from loads.records.gauge import Gauge, Transfer, datum_problem, same_datum
from loads.series.series import Series

SAME_LEVEL: Final = 1e-6
"""Levels closer than this are one and the same: below any survey, above the rounding of units. [m]"""


@dataclass(frozen=True, kw_only=True)
class Conversion:
    """Readings of one gauge as levels at one barrier, and back.

    Attributes
    ----------
    gauge
        Record of the gauge.
    transfer
        Its transfer to the barrier, or None when nobody entered one.
    barrier
        Identifier of the barrier.
    shift
        What is added to an elevation in the gauge's datum. [m]
    missing
        Links without which nothing can be converted, one sentence each.
    """

    gauge: Gauge
    transfer: Transfer | None
    barrier: str
    shift: float
    missing: tuple[str, ...]

    @property
    def base(self) -> float:
        """Elevation of reading zero in the scenario's datum; NaN when the gauge has no zero. [m]."""
        return self.gauge.zero.value + self.shift if self.gauge.zero is not None else float("nan")

    def offset(self, stage: FloatArray) -> FloatArray:
        """Level at the barrier less level at the gauge.

        Parameters
        ----------
        stage
            Readings, shape (n,). [m]

        Returns
        -------
        FloatArray
            Shape (n,); NaN without a transfer, and beyond the ends of a table. [m]
        """
        if self.transfer is None:
            return np.full(len(stage), np.nan)
        if self.transfer.table is not None:
            stages, offsets = table_of(self.transfer)
            return _between_ends(stage, stages, offsets)
        return np.full(len(stage), constant_of(self.transfer))

    def level(self, stage: FloatArray) -> FloatArray:
        """Level at the barrier.

        Parameters
        ----------
        stage
            Readings, shape (n,). [m]

        Returns
        -------
        FloatArray
            Shape (n,); NaN where not known. [m]
        """
        return np.asarray(stage + self.base + self.offset(stage), dtype=np.float64)

    def stage(self, level: FloatArray) -> FloatArray:
        """Reading at which the water at the barrier stands at a level: a sill as a stage.

        Parameters
        ----------
        level
            Elevations at the barrier, shape (k,). [m]

        Returns
        -------
        FloatArray
            Shape (k,); NaN where not known. [m]

        Notes
        -----
        Of a table there is one reading for a level, because levels rise with readings.
        """
        if self.transfer is None:
            return np.full(len(level), np.nan)
        if self.transfer.table is not None:
            stages, offsets = table_of(self.transfer)
            return _between_ends(level - self.base, stages + offsets, stages)
        return np.asarray(level - self.base - constant_of(self.transfer), dtype=np.float64)


def conversion(gauge: Gauge, barrier: str, datum: str) -> Conversion:
    """The way from a gauge to a barrier.

    Parameters
    ----------
    gauge
        Record of the gauge.
    barrier
        Identifier of the barrier.
    datum
        Of the barrier's levels.

    Returns
    -------
    Conversion
        With what is missing.

    Raises
    ------
    ScenarioError
        Gauge and barrier are in different datums and there is no shift between them, or there is a shift
        though they are in the same.
    """
    problem = datum_problem(gauge, datum)
    if problem is not None:
        field, value, rule = problem
        raise ScenarioError([Problem(path=f"gauge[{gauge.id}].{field}", value=value, rule=rule)])
    transfer = gauge.transfer_to(barrier)
    missing = []
    if gauge.zero is None:
        missing.append(f"nobody entered the zero of gauge {gauge.id}")
    if transfer is None:
        missing.append(
            f"nobody entered how the water at {barrier} differs from that at gauge {gauge.id}; it is not "
            "assumed to be level"
        )
    return Conversion(
        gauge=gauge,
        transfer=transfer,
        barrier=barrier,
        shift=gauge.datum_shift.value if gauge.datum_shift is not None else 0.0,
        missing=tuple(missing),
    )


def _between_ends(at: FloatArray, known: FloatArray, values: FloatArray) -> FloatArray:
    within = np.clip(at, known[0], known[-1])
    there = np.abs(at - within) <= SAME_LEVEL
    return np.where(there, np.interp(within, known, values), np.nan)


def constant_of(transfer: Transfer) -> float:
    """Level at the barrier less level at the gauge, of a transfer without a table. [m]."""
    if transfer.offset is not None:
        return transfer.offset.value
    assert transfer.slope is not None
    assert transfer.distance_downstream is not None
    return -transfer.slope * transfer.distance_downstream.value


def table_of(transfer: Transfer) -> tuple[FloatArray, FloatArray]:
    """Readings and differences of a transfer with a table, each of shape (k,). [m]."""
    assert transfer.table is not None
    stages, offsets = zip(*((stage.value, offset.value) for stage, offset in transfer.table), strict=True)
    return np.array(stages), np.array(offsets)


def as_readings(series: Series, gauge: Gauge, datum: str) -> Series:
    """The series as readings above the gauge's zero, whether it holds readings or elevations.

    Parameters
    ----------
    series
        Readings where it names no datum, else elevations in the datum it names.
    gauge
        Whose series it is.
    datum
        Of the scenario.

    Returns
    -------
    Series
        Readings.

    Raises
    ------
    ScenarioError
        Elevations, and the gauge has no zero, or they are in neither the gauge's datum nor the scenario's.
    """
    if series.datum is None:
        return series
    path = f"the series {series.name}"
    if gauge.zero is None:
        rule = f"holds elevations, and nobody entered the zero of gauge {gauge.id}"
        raise ScenarioError([Problem(path=path, value="", rule=rule)])
    if same_datum(series.datum, gauge.datum):
        zero = gauge.zero.value
    elif same_datum(series.datum, datum):
        zero = conversion(gauge, "", datum).base
    else:
        rule = f"is in {series.datum}, which is neither that of gauge {gauge.id}, {gauge.datum}, nor {datum}"
        raise ScenarioError([Problem(path=path, value="", rule=rule)])
    return replace(series.shifted(-zero, series.name), datum=None)
