"""How long closing takes: from pieces and people, as entered, and as a drill has shown."""

from __future__ import annotations

from datetime import timedelta

import pytest

from loads.install_time import Pieces, install_time
from loads.records.closure_site import Install
from loads.records.crew import BarrierClock
from tests.clock_cases import HOUR, clock, hours

INSTALL = Install.model_validate({"minutes_per_log": "4 min", "minutes_per_post": "12 min", "people": 4})
PIECES = Pieces(logs=(6, 6, 6, 6), posts=5)


@pytest.mark.parametrize(
    ("people", "minutes"),
    [(None, 156), (4, 156), (7, 156), (8, 84), (12, 72), (16, 48), (400, 48), (3, None)],
)
def test_time_from_pieces_and_people(people: int | None, minutes: int | None) -> None:
    """5 posts at 12 min and 24 logs at 4 min by one team of 4; two teams set 3 posts and 12 logs each."""
    found = install_time(BarrierClock(), INSTALL, PIECES, people)
    assert found.seconds == (None if minutes is None else 60 * minutes)
    if minutes is None:
        assert found.sentence == "it takes 4 people, and here are 3"


def barrier_clock(**given: object) -> BarrierClock:
    return BarrierClock.model_validate(given)


@pytest.mark.parametrize(
    ("drill", "minutes", "sentence"),
    [
        ({"minutes_per_log": "6 min"}, 204, "the drill of 2030-05-04 makes it 48 min longer than planned"),
        ({"minutes_per_post": "6 min"}, 126, "the drill of 2030-05-04 makes it 30 min shorter than planned"),
        ({"install_time": "156 min"}, 156, "the drill of 2030-05-04 took as long as planned"),
        ({"install_time": "4 h"}, 240, "the drill of 2030-05-04 makes it 1 h 24 min longer than planned"),
        (
            {"install_time": "3 h", "logs": 12, "posts": 1},
            468,
            "the drill of 2030-05-04 makes it 5 h 12 min longer than planned",
        ),
    ],
)
def test_a_drill_goes_before_the_plan_and_says_what_it_changes(
    drill: dict[str, object], minutes: int, sentence: str
) -> None:
    """The last: 12 logs and a post are planned at 60 min and took 180, so everything takes thrice as long."""
    older = {"date": "2028-05-04", "minutes_per_log": "99 min"}
    found = install_time(barrier_clock(drill=[{"date": "2030-05-04", **drill}, older]), INSTALL, PIECES)
    assert found.seconds == pytest.approx(60 * minutes)
    assert found.planned == 60 * 156
    assert found.change == pytest.approx(60 * (minutes - 156))
    assert found.sentence == sentence


def test_a_slower_drill_moves_the_call_out_and_says_so() -> None:
    own = barrier_clock(install_time="7.5 h", drill=[{"date": "2030-05-04", "install_time": "9 h"}])
    planned, drilled = clock(install=hours(7.5)), clock(install=install_time(own, None, PIECES))
    before, after = planned.timeline("likely").call_out.moment, drilled.timeline("likely").call_out.moment
    assert before is not None
    assert after is not None
    assert before - after == timedelta(hours=1.5)
    assert (
        "the drill of 2030-05-04 makes it 1 h 30 min longer than planned"
        in drilled.timeline("likely").sentences
    )


def test_times_entered_for_the_whole() -> None:
    whole = barrier_clock(install_time="7.5 h", install_people=6, preparation="30 min")
    assert install_time(whole, INSTALL, PIECES).seconds == 8 * HOUR
    assert install_time(whole, INSTALL, PIECES, 12).seconds == 8 * HOUR
    assert install_time(whole, INSTALL, PIECES, 5).sentence == "it takes 6 people, and here are 5"
    nothing = install_time(BarrierClock(), None, PIECES)
    assert (nothing.seconds, nothing.change) == (None, None)
    assert nothing.sentence == "nobody entered how long closing takes"
    drilled = barrier_clock(drill=[{"date": "2030-05-04", "install_time": "9 h", "logs": 24}])
    found = install_time(drilled, None, PIECES)
    assert (found.seconds, found.planned) == (9 * HOUR, None)
    assert found.sentence == "the drill of 2030-05-04 gives the time; nobody entered a planned one"
    half = barrier_clock(drill=[{"date": "2030-05-04", "minutes_per_log": "4 min"}])
    assert install_time(half, None, PIECES).seconds is None
