"""The plan of the line against every possible order, against earliest-due-first, and in its own words."""

from __future__ import annotations

import random
from collections.abc import Iterator
from datetime import UTC, datetime, timedelta
from itertools import pairwise, permutations, product
from typing import Any

import pytest

from loads.install_time import Pieces
from loads.instant import Instant, instant_at, unknown
from loads.plan import Plan
from loads.plan_jobs import Job, job_of
from loads.plan_search import (
    UNPINNED,
    Objective,
    Problem,
    best_plan,
    earliest_due_first,
    in_pinned_order,
    plan_cost,
    ranked,
)
from loads.planner import plan_line
from loads.records.crew import BarrierClock, Crew

NOW = datetime(2031, 4, 2, 14, 0, tzinfo=UTC)
OBJECTIVES: tuple[Objective, ...] = ("fewest late", "least lateness")


def instance(seed: int, jobs: int, crews: int, *, slack: float = 1.0, pins: bool = False) -> Problem:
    """A line at random: some jobs need a crew that others are not, some crews are slower."""
    at = random.Random(seed)
    duration = []
    for _ in range(jobs):
        base, special = at.randrange(600, 15_000), at.random() < 0.3
        row = [int(base * at.choice([1.0, 1.0, 0.6])) for _ in range(crews)]
        duration.append(tuple(None if special and crew % 3 else time for crew, time in enumerate(row)))
    span = 2500.0 * jobs * slack * 3 / crews
    return Problem(
        ready=tuple(at.randrange(0, 9000) for _ in range(crews)),
        move=tuple(at.randrange(0, 1800) for _ in range(crews)),
        duration=tuple(duration),
        due=tuple(at.randrange(4000, int(span) + 6000) for _ in range(jobs)),
        pin=tuple(at.choice([1, 2, UNPINNED, UNPINNED]) if pins else UNPINNED for _ in range(jobs)),
    )


def lateness(problem: Problem, plan: list[list[int]]) -> list[int]:
    """Finish less due of every job, worked out from the times one by one."""
    found = []
    for crew, jobs in enumerate(plan):
        clock = problem.ready[crew]
        for place, job in enumerate(jobs):
            clock += problem.move[crew] if place else 0
            time = problem.duration[job][crew]
            assert time is not None
            clock += time
            found.append(clock - problem.due[job])
    return found


def every_plan(problem: Problem) -> Iterator[list[list[int]]]:
    """Every way to hand every job to a crew, in every order."""
    jobs, crews = range(len(problem.due)), range(len(problem.ready))
    for hands in product(crews, repeat=len(problem.due)):
        if any(problem.duration[job][crew] is None for job, crew in enumerate(hands)):
            continue
        own = [[job for job in jobs if hands[job] == crew] for crew in crews]
        for orders in product(*(permutations(part) for part in own)):
            yield [list(order) for order in orders]


def fewest_late(problem: Problem, plan: list[list[int]]) -> tuple[int, int, int]:
    late = lateness(problem, plan)
    return sum(one > 0 for one in late), sum(one for one in late if one > 0), max(late)


@pytest.mark.parametrize("seed", range(24))
def test_small_lines_are_planned_as_well_as_can_be(seed: int) -> None:
    problem = instance(seed, 2 + seed % 4, 1 + seed % 2, slack=0.35 + 0.1 * (seed % 5), pins=seed % 3 == 0)
    allowed = [plan for plan in every_plan(problem) if all(in_pinned_order(problem, jobs) for jobs in plan)]
    found = best_plan(problem)
    assert found in allowed
    assert fewest_late(problem, found) == min(fewest_late(problem, plan) for plan in allowed)
    least = best_plan(problem, "least lateness")
    best = min(max(0, *lateness(problem, plan)) for plan in allowed)
    assert max(0, *lateness(problem, least)) == best


@pytest.mark.parametrize(("seed", "jobs"), [(1, 6), (2, 6), (3, 7)])
def test_seven_closures_and_two_crews_are_planned_as_well_as_can_be(seed: int, jobs: int) -> None:
    problem = instance(seed, jobs, 2, slack=0.4)
    best = min(fewest_late(problem, plan) for plan in every_plan(problem))
    assert fewest_late(problem, best_plan(problem)) == best
    assert fewest_late(problem, best_plan(problem)) <= fewest_late(problem, earliest_due_first(problem))


@pytest.mark.parametrize("slack", [0.2, 0.6, 1.0, 2.0])
@pytest.mark.parametrize(("jobs", "crews"), [(30, 4), (60, 7)])
@pytest.mark.parametrize("pins", [False, True])
def test_large_lines_are_never_worse_than_earliest_due_first(
    jobs: int, crews: int, slack: float, *, pins: bool
) -> None:
    for objective in OBJECTIVES:
        problem = instance(jobs + crews, jobs, crews, slack=slack, pins=pins)
        first, found = earliest_due_first(problem), best_plan(problem, objective, trials=4000)
        assert sorted(job for own in found for job in own) == problem.doable()
        assert all(in_pinned_order(problem, own) for own in found)
        costs = [ranked(plan_cost(problem, plan), objective) for plan in (found, first)]
        assert costs[0] <= costs[1]
        late = lateness(problem, found)
        assert plan_cost(problem, found)[:3] == (
            sum(one > 0 for one in late),
            sum(one for one in late if one > 0),
            max(late),
        )
        assert best_plan(problem, objective, trials=4000) == found


def test_improvement_finds_what_earliest_due_first_misses() -> None:
    """The first job alone takes 10 h and is lost anyway; put first, it makes two more late."""
    problem = Problem(
        ready=(0,), move=(0,), duration=((36_000,), (60,), (60,)), due=(10, 3600, 3700), pin=(UNPINNED,) * 3
    )
    assert earliest_due_first(problem) == [[0, 1, 2]]
    assert plan_cost(problem, earliest_due_first(problem))[0] == 3
    assert plan_cost(problem, best_plan(problem))[0] == 1


def crew(name: str, people: int = 4, *, start: str = "2031-04-02T14:00:00+00:00", **given: Any) -> Crew:
    return Crew.model_validate({"id": name, "people": people, "available_from": start, **given})


def at(hours: float) -> Instant:
    return instant_at(NOW + timedelta(hours=hours), NOW)


def job(name: str, closed_by: Instant, crews: list[Crew], hours: float = 2.0, **clock: Any) -> Job:
    own = BarrierClock.model_validate({"install_time": f"{hours} h", **clock})
    return job_of(name, "", closed_by, own, None, Pieces(logs=(), posts=0), crews)


def starts(plan: Plan) -> dict[str, tuple[str, datetime]]:
    return {one.barrier: (own.crew.id, one.start) for own in plan.crews for one in own.jobs}


def test_start_times_calls_and_margins_of_one_crew() -> None:
    """Called at 14:00, there at 15:30; C2 until 17:30, 15 min on the way, C1 from 17:45 to 19:45."""
    crews = [crew("A", mobilisation="30 min", travel="1 h", move="15 min")]
    plan = plan_line(crews, [job("C1", at(7), crews), job("C2", at(4), crews)], NOW)
    (own,) = plan.crews
    assert own.call_out == NOW
    assert own.call_out_by == NOW + timedelta(minutes=30)
    assert [one.barrier for one in own.jobs] == ["C2", "C1"]
    first, second = own.jobs
    assert first.leave == NOW + timedelta(minutes=30)
    assert (first.start, first.finish) == (NOW + timedelta(hours=1.5), NOW + timedelta(hours=3.5))
    assert second.leave == NOW + timedelta(hours=3.5)
    assert (second.start, second.finish) == (NOW + timedelta(hours=3.75), NOW + timedelta(hours=5.75))
    assert (first.start_by, second.start_by) == (NOW + timedelta(hours=2), NOW + timedelta(hours=5))
    assert (first.margin, second.margin) == (timedelta(minutes=30), timedelta(hours=1.25))
    assert plan.in_time
    assert plan.sentences == ()


def test_the_latest_start_leaves_time_for_what_follows() -> None:
    """Both due in 9 h, 2 h each and 15 min between: the second must start by 7 h, the first by 4 h 45 min."""
    crews = [crew("A", move="15 min")]
    first, second = plan_line(crews, [job("C1", at(9), crews), job("C2", at(9), crews)], NOW).crews[0].jobs
    assert (first.start_by, second.start_by) == (NOW + timedelta(hours=4.75), NOW + timedelta(hours=7))


def test_what_needs_a_lift_goes_to_a_crew_with_a_lift() -> None:
    crews = [crew("A"), crew("B", can=["lift"], start="2031-04-02T16:00:00+00:00")]
    plan = plan_line(crews, [job("C1", at(9), crews, needs=["lift"]), job("C2", at(9), crews)], NOW)
    assert starts(plan) == {"C1": ("B", NOW + timedelta(hours=2)), "C2": ("A", NOW)}
    alone = plan_line(crews[:1], [job("C1", at(9), crews[:1], needs=["lift"])], NOW)
    assert alone.impossible == (("C1", "it needs a lift"),)
    assert alone.sentences == ("C1 cannot be closed by any crew: it needs a lift",)
    assert not alone.in_time


def test_a_small_crew_does_no_job_for_more_people() -> None:
    crews = [crew("A", 3), crew("B", 8)]
    plan = plan_line(crews, [job("C1", at(9), crews, install_people=6)], NOW)
    assert starts(plan)["C1"][0] == "B"
    alone = plan_line(crews[:1], [job("C1", at(9), crews[:1], install_people=6)], NOW)
    assert alone.impossible == (("C1", "it takes 6 people, and here are 3"),)
    assert plan_line([], [job("C1", at(9), [])], NOW).impossible == (("C1", "there is no crew"),)


def test_order_and_crew_pinned_by_hand_are_kept() -> None:
    crews = [crew("A"), crew("B")]
    jobs = [
        job("C1", at(3), crews, crew="A"),
        job("C2", at(30), crews, crew="A", order=1),
        job("C3", at(20), crews, crew="A", order=2),
    ]
    plan = plan_line(crews, jobs, NOW)
    assert [one.barrier for one in plan.crews[0].jobs] == ["C2", "C3", "C1"]
    assert plan.crews[1].jobs == ()
    assert (plan.crews[1].call_out, plan.crews[1].call_out_by) == (None, None)
    assert [one.barrier for one in plan.late] == ["C1"]
    stray = plan_line(crews, [job("C1", at(3), crews, crew="Z")], NOW)
    assert stray.impossible == (("C1", "it is pinned to crew Z"),)


def test_who_is_late_by_how_much_and_what_would_put_it_right() -> None:
    """Two jobs of 2 h due in 3 h: one crew is done after 4 h, an hour late; two crews are in time."""
    crews = [crew("A", start="2031-04-02T12:00:00+00:00")]
    plan = plan_line(crews, [job("C1", at(3), crews), job("C2", at(3), crews)], NOW)
    assert [one.margin for one in plan.late] == [timedelta(hours=-1)]
    assert plan.earlier == timedelta(hours=1)
    assert plan.more_crews == 1
    assert plan.sentences == (
        f"{plan.late[0].barrier} is closed 1 h after the water is there",
        "every crew starting 1 h earlier would close all of these in time; for some that is before now",
        "1 more crew like A (4 people) would close all of these in time",
    )
    assert plan.late[0].late
    assert plan.late[0].start_by == NOW + timedelta(hours=1)


def test_starting_earlier_by_what_it_says_does_close_all() -> None:
    crews = [crew("A", start="2031-04-02T20:00:00+00:00"), crew("B", start="2031-04-02T19:00:00+00:00")]
    jobs = [job(f"C{k}", at(8 + k), crews, hours=2.0 + k / 3) for k in range(5)]
    plan = plan_line(crews, jobs, NOW)
    assert plan.late
    assert plan.earlier is not None
    for less, in_time in [(timedelta(0), True), (timedelta(minutes=2), False)]:
        sooner = [
            one.model_copy(update={"available_from": one.available_from - plan.earlier + less})
            for one in crews
        ]
        assert plan_line(sooner, jobs, NOW).in_time is in_time
    assert plan.more_crews is not None
    more = [*crews, *(crews[1].model_copy(update={"id": f"B{k}"}) for k in range(plan.more_crews))]
    again = [job(f"C{k}", at(8 + k), more, hours=2.0 + k / 3) for k in range(5)]
    assert plan_line(more, again, NOW).in_time


def test_no_number_of_crews_helps_against_the_past() -> None:
    crews = [crew("A", can=["lift"])]
    late = Instant(state="already past", reason="the series begins at or above it")
    plan = plan_line(crews, [job("C1", late, crews)], NOW)
    assert plan.late[0].due == NOW
    assert plan.late[0].margin == timedelta(hours=-2)
    assert plan.more_crews is None
    assert (
        plan.cures[1] == "not even 3 more crews like A (4 people, with lift) would close all of these in time"
    )


def test_what_the_water_does_not_reach_is_not_planned_and_what_nobody_knows_is_named() -> None:
    crews = [crew("A")]
    jobs = [
        job("C1", Instant(state="not reached in this forecast"), crews),
        job("C2", unknown("the level cannot be told as a reading of the gauge"), crews),
        job("C3", unknown("it is reached where the series has a gap", NOW + timedelta(hours=6)), crews),
    ]
    plan = plan_line(crews, jobs, NOW)
    assert plan.not_asked_for == ("C1",)
    assert plan.not_known == (("C2", "the level cannot be told as a reading of the gauge"),)
    assert list(starts(plan)) == ["C3"]
    assert not plan.in_time
    assert plan.sentences[0].startswith("nobody can tell when C2 must be closed: ")


def test_two_hundred_closures_and_twenty_crews() -> None:
    at_random = random.Random(7)
    crews = [
        crew(f"K{k}", 2 + k % 6, can=["lift"] if k % 3 == 0 else [], travel="40 min", move="15 min")
        for k in range(20)
    ]
    jobs = [
        job(
            f"C{k}",
            at(at_random.uniform(4, 30)),
            crews,
            hours=at_random.uniform(0.5, 4),
            needs=["lift"] if k % 4 == 0 else [],
            install_people=2 + k % 3,
        )
        for k in range(200)
    ]
    plan = plan_line(crews, jobs, NOW)
    done = [one for own in plan.crews for one in own.jobs]
    assert sorted(one.barrier for one in done) == sorted(one.barrier for one in jobs)
    lifts = {own.crew.id for own in plan.crews if own.crew.can}
    assert {one.crew for one in done if int(one.barrier[1:]) % 4 == 0} <= lifts
    for own in plan.crews:
        for one, other in pairwise(own.jobs):
            assert other.start == one.finish + timedelta(minutes=15)
