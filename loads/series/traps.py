"""Traps in readings and forecasts: what looks like a number and may not be one.

Each function gives one `Trap`, or None when there is nothing to say.
"""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.series.interpolate import covers, level_at
from loads.series.series import Series
from loads.series.trap import Trap, difference, duration, level, rate

FOOT = 0.3048
CEILING_MARGIN = 0.5 * FOOT
"""Within this of a gauge's ceiling no crest is inferred; common practice, no source. [m]"""
FLAT_FOR = 7200.0
"""Time without a change after which a trace is called flat; common practice, no source. [s]"""
FLAT_WITHIN = 0.011 * FOOT
"""Spread of a flat trace: a reading may still flicker by its last digit, 0.01 ft. [m]"""
RISING_BY = 0.1 * FOOT
"""Rise of a forecast over `FLAT_FOR` that a gauge would show; common practice, no source. [m]"""
HISTORY_SLACK = 0.1
"""Share of its range by which a gauge's history is widened when a slip of unit is looked for."""


@dataclass(frozen=True, kw_only=True)
class GaugeFacts:
    """What is known of a gauge, in the datum of its series; None where nobody entered it.

    Attributes
    ----------
    floor, ceiling
        Lowest and highest trustworthy reading. [m]
    lowest, highest
        Lowest and highest level on record. [m]
    fastest
        Rate of rise or fall that is not believed without a second look. [m/s]
    """

    floor: float | None = None
    ceiling: float | None = None
    lowest: float | None = None
    highest: float | None = None
    fastest: float | None = None


def near_ceiling(reading: float, ceiling: float, margin: float = CEILING_MARGIN) -> Trap | None:
    """Reading so near the highest trustworthy one that the water may stand higher.

    Parameters
    ----------
    reading, ceiling, margin
        [m]
    """
    if reading < ceiling - margin - 1e-9:
        return None
    place = "is above" if reading > ceiling else "is within {margin} of"
    return Trap(
        name="ceiling",
        template=f"The reading {{reading}} {place} the highest level this gauge reads true, {{ceiling}}: "
        "do not infer a crest from it. The water may stand higher than the gauge can say.",
        figures={"reading": level(reading), "ceiling": level(ceiling), "margin": difference(margin)},
    )


def below_floor(reading: float, floor: float) -> Trap | None:
    """Reading below the lowest trustworthy one.

    Parameters
    ----------
    reading, floor
        [m]
    """
    if reading >= floor:
        return None
    return Trap(
        name="floor",
        template="The reading {reading} is below the lowest level this gauge reads true, {floor}: the water "
        "may stand elsewhere.",
        figures={"reading": level(reading), "floor": level(floor)},
    )


def outside_history(reading: float, lowest: float, highest: float) -> Trap | None:
    """Level that the gauge has never shown.

    Parameters
    ----------
    reading, lowest, highest
        [m]
    """
    if lowest <= reading <= highest:
        return None
    side = "below the lowest" if reading < lowest else "above the highest"
    return Trap(
        name="history",
        template=f"The level {{reading}} is {side} on record at this gauge, {{lowest}} to {{highest}}: check "
        "unit, datum and sign before using it.",
        figures={"reading": level(reading), "lowest": level(lowest), "highest": level(highest)},
    )


def wrong_unit(reading: float, lowest: float, highest: float, *, unit: str = "") -> Trap | None:
    """Level outside the gauge's history that would fit if it had been meant in the other unit.

    Parameters
    ----------
    reading
        As it was read. [m]
    lowest, highest
        The gauge's history; it is widened by `HISTORY_SLACK` of its range for the other unit. [m]
    unit
        Unit it was typed in, when known: a level typed in feet is not asked about as metres.
    """
    if lowest <= reading <= highest:
        return None
    slack = HISTORY_SLACK * (highest - lowest)
    slips = {"ft": (1 / FOOT, "feet", "metres"), "m": (FOOT, "metres", "feet")}
    for symbol, (factor, typed, meant) in slips.items():
        other = reading * factor
        if unit in ("", symbol) and lowest - slack <= other <= highest + slack:
            return Trap(
                name="unit",
                template="The level {reading} does not fit this gauge's record, {lowest} to {highest}; as "
                f"{meant} instead of {typed} it would be {{other}}. "
                f"Were {meant} typed into a field of {typed}?",
                figures={
                    "reading": level(reading),
                    "other": level(other),
                    "lowest": level(lowest),
                    "highest": level(highest),
                },
            )
    return None


def flat_while_rising(
    observed: Series,
    forecast: Series,
    *,
    spell: float = FLAT_FOR,
    within: float = FLAT_WITHIN,
    rise: float = RISING_BY,
) -> Trap | None:
    """Trace that stands still to its end while the forecast rises.

    Parameters
    ----------
    observed, forecast
        Of one gauge.
    spell
        How long the trace has stood still. [s]
    within
        Largest spread of a trace that stands still. [m]
    rise
        Least rise of the forecast over as long a time: the same time, or where the forecast starts later, the
        time from its start. [m]
    """
    end = observed.times[-1]
    start = end - np.timedelta64(round(spell), "s")
    if observed.times[0] > start:
        return None
    recent = observed.values[observed.times >= start]
    at_start = level_at(observed, np.array([start]))
    spread = float(np.ptp(np.concatenate([at_start, recent])))
    if spread > within:
        return None
    first = max(start, forecast.times[0])
    window = np.array([first, first + np.timedelta64(round(spell), "s")])
    if not covers(forecast, window).all():
        return None
    risen = float(np.diff(level_at(forecast, window))[0])
    if risen < rise:
        return None
    return Trap(
        name="flat",
        template="The gauge has not moved by more than {spread} for {spell}, while the forecast rises by "
        "{risen} in as long: the gauge may be stuck, iced or at its ceiling. Look at the staff.",
        figures={"spread": difference(spread), "spell": duration(spell), "risen": difference(risen)},
    )


def fast_jump(series: Series, fastest: float) -> Trap | None:
    """Change between neighbours faster than an entered rate.

    Parameters
    ----------
    series
        Values at n times.
    fastest
        Rate of rise or fall that is not believed. [m/s]
    """
    if len(series) < 2:
        return None
    seconds = np.diff(series.times.astype(np.int64)).astype(np.float64)
    change = np.diff(series.values)
    rates = np.abs(change) / seconds
    worst = int(np.argmax(rates))
    if rates[worst] <= fastest:
        return None
    verb = "rises" if change[worst] > 0 else "falls"
    when = str(series.times[worst + 1]).replace("T", " ")
    return Trap(
        name="jump",
        template=f"{{before}} to {{after}}: the level {verb} by {{change}} in {{step}} up to {when} UTC, "
        f"faster than {{fastest}}; steps as fast: {int((rates > fastest).sum())}. Drift wood, a re-based "
        "gauge, a wrong digit?",
        figures={
            "before": level(float(series.values[worst])),
            "after": level(float(series.values[worst + 1])),
            "change": difference(abs(float(change[worst]))),
            "step": duration(float(seconds[worst])),
            "rate": rate(float(rates[worst])),
            "fastest": rate(fastest),
        },
    )


def traps_of(observed: Series, gauge: GaugeFacts, forecast: Series | None = None) -> tuple[Trap, ...]:
    """Every trap of a trace and of its forecast.

    Looked at are the last reading, the steps, the end against the forecast, and the forecast's crest.

    Parameters
    ----------
    observed
        Trace of the gauge.
    gauge
        What is known of it; a fact nobody entered is not looked at.
    forecast
        Its newest likely trace, in the same datum.
    """
    traps = list(_traps_of_level(float(observed.values[-1]), gauge, observed.unit))
    if gauge.fastest is not None:
        traps.append(fast_jump(observed, gauge.fastest))
    if forecast is not None:
        traps.append(flat_while_rising(observed, forecast))
        if gauge.lowest is not None and gauge.highest is not None:
            crest = float(forecast.values.max())
            traps += [outside_history(crest, gauge.lowest, gauge.highest)]
            traps += [wrong_unit(crest, gauge.lowest, gauge.highest, unit=forecast.unit)]
        if gauge.fastest is not None:
            traps.append(fast_jump(forecast, gauge.fastest))
    return tuple(trap for trap in traps if trap is not None)


def _traps_of_level(reading: float, gauge: GaugeFacts, unit: str) -> list[Trap | None]:
    found: list[Trap | None] = []
    if gauge.ceiling is not None:
        found.append(near_ceiling(reading, gauge.ceiling))
    if gauge.floor is not None:
        found.append(below_floor(reading, gauge.floor))
    if gauge.lowest is not None and gauge.highest is not None:
        found.append(outside_history(reading, gauge.lowest, gauge.highest))
        found.append(wrong_unit(reading, gauge.lowest, gauge.highest, unit=unit))
    return found


def traps_of_level(reading: float, gauge: GaugeFacts, *, unit: str = "") -> tuple[Trap, ...]:
    """Every trap of one level as it is typed or read off.

    Parameters
    ----------
    reading
        In the datum of the facts. [m]
    gauge
        What is known of it; a fact nobody entered is not looked at.
    unit
        Unit it was typed in, when known.
    """
    return tuple(trap for trap in _traps_of_level(reading, gauge, unit) if trap is not None)
