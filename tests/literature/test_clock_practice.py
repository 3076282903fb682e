"""The worked example of a closure's clock: gauge to sill, water back to call-out, and one foot more."""

from __future__ import annotations

from datetime import datetime, timedelta

import numpy as np
import pytest

from loads.chain import GaugeReading, chain_of
from loads.crossing import HIGHER
from loads.instant import Instant
from loads.moments import duration_text, local_text
from tests.agreement import Agree, printed
from tests.clock_cases import CENTRAL, DATUM, FOOT, clock, quantity, way

PLACE = (
    "common practice, no source; worked by hand: gauge zero 412.70 ft, water 0.60 ft lower at the closure, "
    "sill 437.40 ft, 7.5 h to install, 1.5 h to travel and call out, forecast every 6 h in feet"
)


def minutes_of_day(instant: Instant) -> float:
    """Minutes since local midnight, unrounded."""
    assert instant.state == "at"
    assert instant.moment is not None
    local = instant.moment.astimezone(CENTRAL)
    return local.hour * 60 + local.minute + local.second / 60


@pytest.mark.source("ClockPractice", PLACE)
def test_sill_as_a_stage(agree: Agree) -> None:
    stage = way().stage(np.array([437.40 * FOOT]))
    agree(stage / FOOT, printed("25.30"), what="sill as a reading of the gauge, ft")


@pytest.mark.source("ClockPractice", PLACE)
def test_crest_at_the_closure(agree: Agree) -> None:
    reading = GaugeReading.of(np.array([26.20, 27.20]) * FOOT)
    chain = chain_of(way(), reading, quantity("437.40 ft"), DATUM)
    agree(chain.level[0] / FOOT, printed("438.30"), what="crest at the closure, ft")
    agree(chain.head[0] / FOOT, printed("0.90"), what="head, ft")
    agree(chain.head[1] / FOOT, printed("1.90"), what="head with one foot more, ft")
    crest = clock().timeline("likely").crest
    agree(crest.head / FOOT, printed("0.90"), what="head of the clock's crest, ft")
    agree(clock().timeline(HIGHER).crest.head / FOOT, printed("1.90"), what="the same with one foot more, ft")


@pytest.mark.source("ClockPractice", PLACE)
@pytest.mark.parametrize(
    ("trace", "closed_by", "start", "call_out"),
    [
        ("likely", "06:09 CDT Thu 3 Apr 2031", "22:39 CDT Wed 2 Apr 2031", "21:09 CDT Wed 2 Apr 2031"),
        (HIGHER, "22:00 CDT Wed 2 Apr 2031", "14:30 CDT Wed 2 Apr 2031", "13:00 CDT Wed 2 Apr 2031"),
    ],
    ids=["as forecast", "one foot more"],
)
def test_three_times(agree: Agree, trace: str, closed_by: str, start: str, call_out: str) -> None:
    found = clock().timeline(trace)
    pairs = [("T2", found.closed_by, closed_by), ("T1", found.start, start), ("T0", found.call_out, call_out)]
    for what, instant, expected in pairs:
        clock_time = datetime.strptime(expected[:5], "%H:%M")  # noqa: DTZ007 - a time of day
        agree(
            minutes_of_day(instant),
            float(clock_time.hour * 60 + clock_time.minute),
            abs=0.5,
            what=f"{what}, minutes after local midnight",
            why="printed to the minute",
        )
        assert instant.moment is not None
        assert local_text(instant.moment, CENTRAL) == expected


@pytest.mark.source("ClockPractice", PLACE)
def test_one_foot_moves_the_call_out(agree: Agree) -> None:
    earlier = clock().call_out_earlier()
    assert earlier is not None
    agree(
        earlier / timedelta(minutes=1), 489.0, abs=0.5, what="call-out earlier, min", why="printed 8 h 9 min"
    )
    assert duration_text(earlier) == "8 h 9 min"
