"""Remarks on a reading: what is odd about it, in plain words, one sentence each."""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.atmosphere import SEA_LEVEL_PRESSURE, geopotential_height, sea_level_pressure
from loads.density import FRESH_WATER_TEMPERATURE, SUSPENDED_SEDIMENT
from loads.limits_of_use import outside
from loads.reading_chain import Outcome
from loads.records.reading import Reading

PLAUSIBLE_HEAD: Final = 15.0
"""Head above a sensor above which unit or kind of instrument is more likely wrong; common practice. [m]"""

_NEAR_ONE_ATMOSPHERE = (80000.0, 110000.0)
_LESS_THAN_ANY_AIR = 60000.0
_HIGH_COUNTRY = 3500.0


def remarks_on_reading(
    reading: Reading, outcome: Outcome, dry: BoolArray, may_be_dry: BoolArray
) -> tuple[str, ...]:
    """Remarks on the outcome of a chain and on what went into it."""
    remarks = _dry_remarks(outcome, dry, may_be_dry)
    if reading.kind == "sealed logger":
        remarks += _air_remarks(reading, outcome)
    remarks += _instrument_remarks(reading, outcome) + _water_remarks(outcome)
    if not any(link.basis == "entered" and np.any(link.low < link.high) for link in outcome.links):
        remarks.append("No low and high was entered for any link: how far the level may be off is not known.")
    return tuple(remarks)


def is_likely_sea_level_pressure(station: FloatArray, height: FloatArray) -> BoolArray:
    """Whether a pressure given as station pressure looks like one already reduced to sea level.

    Carried down to sea level once more it would be higher than on any ordinary day, `SEA_LEVEL_PRESSURE`. An
    average day's sea-level pressure is caught from about 400 m up; lower down the two are too close to tell.

    Parameters
    ----------
    station
        Pressure given as station pressure, shape (n,). [Pa]
    height
        Geopotential height of the station, shape (n,). [m]

    Returns
    -------
    BoolArray
        True where it looks like a sea-level pressure, shape (n,).

    Examples
    --------
    >>> is_likely_sea_level_pressure(np.array([101325.0, 83427.0]), np.array([1609.344, 1609.344]))
    array([ True, False])
    """
    return np.asarray(sea_level_pressure(station, height) > SEA_LEVEL_PRESSURE.high, dtype=np.bool_)


def _dry_remarks(outcome: Outcome, dry: BoolArray, may_be_dry: BoolArray) -> list[str]:
    remarks = []
    if dry.any():
        remarks.append(
            f"The sensor is dry{_how_many(dry)}: no head of water is left above it. That is not a level; the "
            "water stands somewhere at or below the sensor."
        )
    if may_be_dry.any():
        remarks.append(
            f"Within the ranges entered the sensor may be dry{_how_many(may_be_dry)}: the low end of the "
            "level is not known."
        )
    no_data = ~np.isfinite(outcome.link("level").value)
    if no_data.any():
        remarks.append(f"No data{_how_many(no_data)}: no level is given there.")
    return remarks


def _how_many(where: BoolArray) -> str:
    return f" in {where.sum()} of {len(where)} readings" if len(where) > 1 else ""


def _air_remarks(reading: Reading, outcome: Outcome) -> list[str]:
    remark = _air_remark(reading, _numbers(outcome.link("barometer").value))
    return [remark] if remark else []


def _air_remark(reading: Reading, barometer: FloatArray) -> str:
    if reading.barometer_shows == "sea-level pressure":
        if outside(barometer, SEA_LEVEL_PRESSURE).any():
            return (
                "The sea-level pressure is outside 900 to 1060 hPa: it may be a station pressure, not "
                "reduced to sea level."
            )
        return ""
    altitude = reading.barometer_altitude or reading.site_altitude
    if altitude is None:
        return (
            "No altitude of the barometer was entered: whether its pressure is the station's, or one reduced "
            "to sea level as weather services publish it, cannot be told. A reduced one would put the level "
            "about 12 cm too low for every 100 m of altitude."
        )
    height = np.full(len(barometer), geopotential_height(np.array([altitude.value])).item())
    if is_likely_sea_level_pressure(barometer, height).any():
        return (
            f"At {altitude.text} the barometer's pressure looks like one reduced to sea level, and it is "
            "used as station pressure: say which it is, or the level is too low by the difference."
        )
    if (sea_level_pressure(barometer, height) < SEA_LEVEL_PRESSURE.low).any():
        return f"At {altitude.text} the barometer's pressure is lower than on any ordinary day: check both."
    return ""


def _instrument_remarks(reading: Reading, outcome: Outcome) -> list[str]:
    remarks = []
    if reading.kind in ("vented logger", "bubbler"):
        shown = _numbers(outcome.link("pressure").value)
        low, high = _NEAR_ONE_ATMOSPHERE
        if ((shown > low) & (shown < high)).any():
            remarks.append(
                "The instrument shows about one atmosphere: make sure that it shows the pressure above the "
                "air's, not the absolute one."
            )
    if (
        reading.kind == "sealed logger"
        and (_numbers(outcome.link("pressure").value) < _LESS_THAN_ANY_AIR).any()
    ):
        site = reading.site_altitude
        if site is None or site.value < _HIGH_COUNTRY:
            remarks.append(
                "The sealed logger shows less than the air alone would: make sure that it shows the absolute "
                "pressure."
            )
    if reading.kind != "staff" and (_numbers(outcome.link("head").value) > PLAUSIBLE_HEAD).any():
        remarks.append("The head is more than 15 m (49 ft) above the sensor: check the unit.")
    return remarks


def _water_remarks(outcome: Outcome) -> list[str]:
    remarks = []
    names = {link.name: link for link in outcome.links}
    if "salinity" not in names and "temperature" in names:
        temperature = _numbers(names["temperature"].value)
        if outside(temperature, FRESH_WATER_TEMPERATURE).any():
            remarks.append(
                "The water's temperature is outside the formula's range: fresh water would be ice."
            )
    if "suspended_sediment" in names:
        concentration = _numbers(names["suspended_sediment"].value)
        if outside(concentration, SUSPENDED_SEDIMENT).any():
            remarks.append(
                "The water carries more sediment than the formula is meant for: it may stand as mud and not "
                "press as a liquid."
            )
    return remarks


def _numbers(values: FloatArray) -> FloatArray:
    return values[np.isfinite(values)]
