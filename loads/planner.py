"""The plan of the line: which crew closes what and when, who is late, and what would put it right."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import replace
from datetime import UTC, datetime, timedelta

from loads.moments import duration_text
from loads.plan import CrewPlan, Plan, PlannedJob, whole_minutes
from loads.plan_jobs import Job
from loads.plan_search import UNPINNED, Problem, best_plan, plan_cost
from loads.quantity import Quantity
from loads.records.crew import Crew

MOST_MORE_CREWS = 3
_TRIALS_OF_A_CURE = 8_000


def plan_line(crews: Sequence[Crew], jobs: Sequence[Job], now: datetime) -> Plan:
    """Plan the line [ClockPractice].

    Parameters
    ----------
    crews
        Everyone who can be called.
    jobs
        Every closure.
    now
        Nobody starts before, with its zone.

    Returns
    -------
    Plan
        Fewest closures late, then the least sum of lateness, then the largest smallest margin.

    Notes
    -----
    Work starts as soon as the crew is there. Moving from job to job takes the crew's own fixed time.
    """
    asked = [job for job in jobs if job.due(now) is not None]
    others = [job for job in jobs if job.due(now) is None]
    can = [job for job in asked if job.seconds]
    impossible = tuple((job.barrier, _why(job)) for job in asked if not job.seconds)
    problem, origin = _problem(crews, can, now)
    order, soonest = _orders(problem)
    planned = tuple(_crew_plan(crews[k], problem, origin, k, own, can) for k, own in enumerate(order))
    late = sorted((job for crew in planned for job in crew.jobs if job.late), key=lambda job: job.margin)
    plan = Plan(
        crews=planned,
        late=tuple(late),
        impossible=impossible,
        not_asked_for=tuple(job.barrier for job in others if job.closed_by.state != "not known"),
        not_known=tuple(
            (job.barrier, job.closed_by.reason) for job in others if job.closed_by.state == "not known"
        ),
        cures=(),
        earlier=None,
        more_crews=None,
    )
    return _with_cures(plan, crews, problem, can, soonest, now) if late else plan


def _orders(problem: Problem) -> tuple[list[list[int]], list[list[int]]]:
    """The better of two searches, and the one of least lateness."""
    order = best_plan(problem)
    if not plan_cost(problem, order)[0]:
        return order, order
    soonest = best_plan(problem, "least lateness", _TRIALS_OF_A_CURE)
    return min(order, soonest, key=lambda plan: plan_cost(problem, plan)), soonest


def _why(job: Job) -> str:
    return "; ".join(dict.fromkeys(job.why_not.values())) or "there is no crew"


def _span(entered: Quantity | None) -> float:
    return entered.value if entered is not None else 0.0


def _before_work(crew: Crew) -> float:
    return _span(crew.mobilisation) + _span(crew.travel)


def _problem(crews: Sequence[Crew], jobs: Sequence[Job], now: datetime) -> tuple[Problem, datetime]:
    origin = now.astimezone(UTC).replace(microsecond=0)

    def since(moment: datetime) -> float:
        return (moment - origin).total_seconds()

    problem = Problem(
        ready=tuple(
            math.ceil(max(since(crew.available_from), since(now)) + _before_work(crew)) for crew in crews
        ),
        move=tuple(math.ceil(_span(crew.move)) for crew in crews),
        duration=tuple(
            tuple(math.ceil(job.seconds[crew.id]) if crew.id in job.seconds else None for crew in crews)
            for job in jobs
        ),
        due=tuple(math.floor(since(due)) for job in jobs if (due := job.due(now)) is not None),
        pin=tuple(UNPINNED if job.order is None else job.order for job in jobs),
    )
    return problem, origin


def _crew_plan(
    crew: Crew, problem: Problem, origin: datetime, column: int, order: Sequence[int], jobs: Sequence[Job]
) -> CrewPlan:
    def at(seconds: float) -> datetime:
        return origin + timedelta(seconds=seconds)

    planned: list[PlannedJob] = []
    latest = _latest_starts(problem, column, order)
    time = problem.ready[column]
    for place, (job, start_by) in enumerate(zip(order, latest, strict=True)):
        leave = time - (_span(crew.travel) if place == 0 else 0.0)
        start = time + (problem.move[column] if place else 0)
        time = start + (problem.duration[job][column] or 0)
        planned.append(
            PlannedJob(
                barrier=jobs[job].barrier,
                name=jobs[job].name,
                crew=crew.id,
                leave=at(leave),
                start=at(start),
                finish=at(time),
                due=at(problem.due[job]),
                start_by=at(start_by),
                margin=timedelta(seconds=problem.due[job] - time),
            )
        )
    before = _before_work(crew)
    return CrewPlan(
        crew=crew,
        call_out=at(problem.ready[column] - before) if planned else None,
        call_out_by=at(latest[0] - before) if planned else None,
        jobs=tuple(planned),
    )


def _latest_starts(problem: Problem, column: int, order: Sequence[int]) -> list[int]:
    found: list[int] = []
    following: int | None = None
    for job in reversed(order):
        end = (
            problem.due[job] if following is None else min(problem.due[job], following - problem.move[column])
        )
        following = end - (problem.duration[job][column] or 0)
        found.append(following)
    return found[::-1]


def _with_cures(
    plan: Plan,
    crews: Sequence[Crew],
    problem: Problem,
    jobs: Sequence[Job],
    soonest: Sequence[Sequence[int]],
    now: datetime,
) -> Plan:
    earlier = whole_minutes(timedelta(seconds=plan_cost(problem, soonest)[2]))
    column = _most_useful(problem, plan, jobs)
    more = _more_crews(problem, column)
    first = min(max(crew.available_from, now) for crew in crews)
    past = "; for some that is before now" if first - earlier < now else ""
    start = f"every crew starting {duration_text(earlier)} earlier would close all of these in time{past}"
    kind = crews[column]
    like = f"like {kind.id} ({kind.people} people{', with ' + ', '.join(kind.can) if kind.can else ''})"
    if more is None:
        help_ = f"not even {MOST_MORE_CREWS} more crews {like} would close all of these in time"
    else:
        help_ = f"{more} more {'crew' if more == 1 else 'crews'} {like} would close all of these in time"
    return replace(plan, cures=(start, help_), earlier=earlier, more_crews=more)


def _most_useful(problem: Problem, plan: Plan, jobs: Sequence[Job]) -> int:
    """The crew of which one more would help most: it can do most of the late jobs, and soonest."""
    barriers = {job.barrier for job in plan.late}
    late = [index for index, job in enumerate(jobs) if job.barrier in barriers]

    def rank(column: int) -> tuple[int, int, int]:
        times = [time for index in late if (time := problem.duration[index][column]) is not None]
        return -len(times), problem.ready[column] * len(times) + sum(times), column

    return min(range(len(problem.ready)), key=rank)


def _more_crews(problem: Problem, column: int) -> int | None:
    for more in range(1, MOST_MORE_CREWS + 1):
        wider = replace(
            problem,
            ready=problem.ready + (problem.ready[column],) * more,
            move=problem.move + (problem.move[column],) * more,
            duration=tuple((*row, *[row[column]] * more) for row in problem.duration),
        )
        if plan_cost(wider, best_plan(wider, trials=_TRIALS_OF_A_CURE))[0] == 0:
            return more
    return None
