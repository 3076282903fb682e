"""Verdicts of checks: a bound that nobody entered is passed or says nothing."""

import numpy as np

from loads.check_table import Checks
from loads.checks import Check, check_of, level_check
from loads.quantity import Quantity


def built(level: float, *, grades_below: bool) -> Check:
    top = Quantity(text="3 m", kind="length", unit="m", value=3.0, low=3.0, high=3.0)
    return level_check(
        subject="closure C",
        name="top of the logs in place",
        level=np.array([level]),
        bottom=0.0,
        limit=top,
        highest=3.0,
        near=0.9,
        grades_below=grades_below,
    )


def test_staying_under_a_bound_nobody_entered_is_not_below_a_limit() -> None:
    under = built(1.0, grades_below=False)
    assert under.verdict() == "not checked"
    assert Checks((under,)).verdict() == "not checked"
    assert built(2.9, grades_below=False).verdict() == "not checked"
    assert built(1.0, grades_below=True).verdict() == "below limit"


def test_passing_it_counts() -> None:
    over = built(3.2, grades_below=False)
    assert over.verdict() == "above limit"
    assert Checks((over,)).verdict() == "above limit"


def test_it_does_not_stand_before_a_demand_until_it_is_passed() -> None:
    free = check_of(
        subject="closure C", name="force", kind="force", demand=np.array([5.0]), limit=None, near=0.9
    )
    under, over = built(1.0, grades_below=False), built(3.2, grades_below=False)
    assert [check.name for check in Checks((free, under))] == ["force", "top of the logs in place"]
    assert [check.name for check in Checks((free, over))] == ["top of the logs in place", "force"]
