"""The order of work in plain whole numbers: earliest due first, then improved, exact where it is small.

All times are whole seconds from one origin, so that costs compare exactly and the same input gives the same
plan on every machine. The search is bounded by a count of trials, not by a clock.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass, field
from itertools import pairwise
from math import comb, factorial
from typing import Final, Literal, TypeAlias

Cost: TypeAlias = tuple[int, int, int, int]
"""Of a crew or of a plan: how many late, sum of lateness, largest lateness (signed), sum of finishes."""

Objective = Literal["fewest late", "least lateness"]

MAX_TRIALS: Final = 40_000
MOST_EXACT: Final = 45_000
_NONE: Final = -(10**15)
UNPINNED: Final = 10**9


@dataclass(frozen=True, kw_only=True)
class Problem:
    """What is planned.

    Attributes
    ----------
    ready
        When each of m crews can start its first job. [s]
    move
        From one job to the next, by crew. [s]
    duration
        Of each of n jobs by crew; None where the crew cannot do it. [s]
    due
        Of each job. [s]
    pin
        Place of each job in the order pinned by hand, or `UNPINNED`. A crew does pinned jobs first, in order.
    """

    ready: tuple[int, ...]
    move: tuple[int, ...]
    duration: tuple[tuple[int | None, ...], ...]
    due: tuple[int, ...]
    pin: tuple[int, ...]

    def cost(self, crew: int, jobs: Sequence[int]) -> Cost:
        """Cost of one crew's jobs in their order."""
        late, total, worst, finishes = 0, 0, _NONE, 0
        time, move = self.ready[crew] - self.move[crew], self.move[crew]
        duration, due = self.duration, self.due
        for job in jobs:
            time += move + (duration[job][crew] or 0)
            over = time - due[job]
            finishes += time
            if over > worst:  # noqa: PLR1730 - the innermost line of the search
                worst = over
            if over > 0:
                late += 1
                total += over
        return late, total, worst, finishes

    def doable(self) -> list[int]:
        """Jobs that some crew can do."""
        return [job for job, row in enumerate(self.duration) if any(time is not None for time in row)]


def ranked(cost: Cost, objective: Objective) -> Cost:
    """Cost in the order in which the objective compares."""
    late, total, worst, finishes = cost
    if objective == "fewest late":
        return cost
    return max(worst, 0), late, total, finishes


def joined(costs: Sequence[Cost]) -> Cost:
    """Cost of a plan from those of its crews."""
    late, total, worst, finishes = 0, 0, _NONE, 0
    for cost in costs:
        late += cost[0]
        total += cost[1]
        worst = max(worst, cost[2])
        finishes += cost[3]
    return late, total, worst, finishes


def earliest_due_first(problem: Problem) -> list[list[int]]:
    """Every job in order of its due time to the crew that finishes it first.

    Returns
    -------
    list of list of int
        Jobs of each crew in order.
    """
    plan: list[list[int]] = [[] for _ in problem.ready]
    free = [ready - move for ready, move in zip(problem.ready, problem.move, strict=True)]
    for job in sorted(problem.doable(), key=lambda job: (problem.pin[job], problem.due[job], job)):
        finish, crew = min(
            (free[crew] + problem.move[crew] + time, crew)
            for crew, time in enumerate(problem.duration[job])
            if time is not None
        )
        plan[crew].append(job)
        free[crew] = finish
    return plan


def best_plan(
    problem: Problem, objective: Objective = "fewest late", trials: int = MAX_TRIALS
) -> list[list[int]]:
    """The best plan found, and the best there is where the problem is small.

    Parameters
    ----------
    problem
        What is planned.
    objective
        "fewest late" compares how many are late, then the sum of lateness, then the smallest margin, then
        how early all is done; "least lateness" compares the largest lateness first.
    trials
        Most trials of the improvement.

    Returns
    -------
    list of list of int
        Jobs of each crew in order; never worse than `earliest_due_first`.

    Notes
    -----
    Exact, by depth-first search with bounds, while n!·C(n+m−1, m−1) ≤ `MOST_EXACT`: seven jobs and two
    crews. Beyond that, moves of one job and swaps of two from the worst job on, about `trials` trials at
    most.
    """
    climb = _Climb(problem=problem, objective=objective, plan=earliest_due_first(problem), trials=trials)
    climb.run()
    jobs, crews = len(problem.doable()), len(problem.ready)
    if jobs and factorial(jobs) * comb(jobs + crews - 1, crews - 1) <= MOST_EXACT:
        return _exact(problem, objective, climb.plan)
    return climb.plan


def plan_cost(problem: Problem, plan: Sequence[Sequence[int]]) -> Cost:
    """Cost of a plan."""
    return joined([problem.cost(crew, jobs) for crew, jobs in enumerate(plan) if jobs])


def in_pinned_order(problem: Problem, jobs: Sequence[int]) -> bool:
    """Whether a crew's jobs keep to the order pinned by hand."""
    return all(problem.pin[one] <= problem.pin[other] for one, other in pairwise(jobs))


@dataclass
class _Climb:
    problem: Problem
    objective: Objective
    plan: list[list[int]]
    trials: int
    costs: list[Cost] = field(default_factory=list)
    pinned: bool = False

    def run(self) -> None:
        self.costs = [self.problem.cost(crew, jobs) for crew, jobs in enumerate(self.plan)]
        self.pinned = any(pin != UNPINNED for pin in self.problem.pin)
        while self.trials > 0 and self._improved():
            pass

    def _improved(self) -> bool:
        for crew, place in self._worst_first():
            row = self.problem.duration[self.plan[crew][place]]
            for target, time in enumerate(row):
                if self.trials <= 0:
                    return False
                if time is not None and (
                    self._moved(crew, place, target) or self._swapped(crew, place, target)
                ):
                    return True
        return False

    def _worst_first(self) -> list[tuple[int, int]]:
        places = []
        for crew, jobs in enumerate(self.plan):
            time = self.problem.ready[crew] - self.problem.move[crew]
            for place, job in enumerate(jobs):
                time += self.problem.move[crew] + (self.problem.duration[job][crew] or 0)
                places.append((self.problem.due[job] - time, crew, place))
        return [(crew, place) for _, crew, place in sorted(places)]

    def _others(self, crew: int, target: int) -> Cost:
        return joined([cost for one, cost in enumerate(self.costs) if one not in (crew, target)])

    def _ranked(self, *costs: Cost) -> Cost:
        return ranked(joined(costs), self.objective)

    def _allowed(self, jobs: Sequence[int]) -> bool:
        self.trials -= 1
        return not self.pinned or in_pinned_order(self.problem, jobs)

    def _moved(self, crew: int, place: int, target: int) -> bool:
        job, others = self.plan[crew][place], self._others(crew, target)
        rest = self.plan[crew][:place] + self.plan[crew][place + 1 :]
        same = target == crew
        into = rest if same else self.plan[target]
        left = (0, 0, _NONE, 0) if same else self.problem.cost(crew, rest)
        now = self._ranked(*self.costs)
        for position in range(len(into) + 1):
            jobs = [*into[:position], job, *into[position:]]
            if not self._allowed(jobs):
                continue
            cost = self.problem.cost(target, jobs)
            if self._ranked(others, left, cost) < now:
                self.plan[crew], self.costs[crew] = rest, left
                self.plan[target], self.costs[target] = jobs, cost
                return True
        return False

    def _swapped(self, crew: int, place: int, target: int) -> bool:
        if target == crew:
            return False
        job, others = self.plan[crew][place], self._others(crew, target)
        now = self._ranked(*self.costs)
        for position, other in enumerate(self.plan[target]):
            if self.problem.duration[other][crew] is None:
                continue
            ours, theirs = list(self.plan[crew]), list(self.plan[target])
            ours[place], theirs[position] = other, job
            if not (self._allowed(ours) and in_pinned_order(self.problem, theirs)):
                continue
            our_cost, their_cost = self.problem.cost(crew, ours), self.problem.cost(target, theirs)
            if self._ranked(others, our_cost, their_cost) < now:
                self.plan[crew], self.costs[crew] = ours, our_cost
                self.plan[target], self.costs[target] = theirs, their_cost
                return True
        return False


def _exact(problem: Problem, objective: Objective, known: list[list[int]]) -> list[list[int]]:
    best_cost, best = ranked(plan_cost(problem, known), objective), known
    plan: list[list[int]] = [[] for _ in problem.ready]

    def go(crew: int, done: Cost, left: frozenset[int]) -> None:
        nonlocal best_cost, best
        own = problem.cost(crew, plan[crew])
        so_far = ranked(joined([done, own]), objective)
        if so_far >= best_cost:
            return
        if not left:
            best_cost, best = so_far, [list(jobs) for jobs in plan]
            return
        for job in sorted(left):
            if problem.duration[job][crew] is None:
                continue
            if plan[crew] and problem.pin[plan[crew][-1]] > problem.pin[job]:
                continue
            plan[crew].append(job)
            go(crew, done, left - {job})
            plan[crew].pop()
        if crew + 1 < len(plan):
            go(crew + 1, joined([done, own]), left)

    go(0, joined([]), frozenset(problem.doable()))
    return best
