"""Speed of a line of closures: python -m tests.bench.closures.

1. `assess` of 100 closures of 3 bays of 12 logs with every check, one state, without first-limit levels
   (budget: at most 150 ms).
2. First-limit levels of them, to 1 mm, over that (budget: at most 10 times).
3. Level of every single check of every part, over that.
"""

from __future__ import annotations

import copy
import statistics
import sys
import time
from collections.abc import Callable
from typing import Any

from loads.assessment import AssessedClosure, Assessment, assess
from loads.records.scenario import Scenario
from loads.scenario_file import scenario_of
from tests.closures import FULL, closure_scene

ROUNDS = 7


def line_of(count: int) -> Scenario:
    """So many closures, all of whose checks have limits."""
    closure = copy.deepcopy(FULL)
    closure.update({"bay_widths": ["2.4 m"] * 3, "logs_in_place": 12, "height": "3.6 m"})
    closure["log"]["count"] = 12
    closure["post"]["height"] = "3.5 m"
    document = closure_scene(closure, flood_side="3 m")
    document["closure"] = [{**closure, "id": f"C{number}"} for number in range(count)]
    return scenario_of(document)


def timed(work: Callable[[], Any]) -> float:
    """Milliseconds of one call."""
    began = time.perf_counter()
    work()
    return 1e3 * (time.perf_counter() - began)


def searches(assessment: Assessment, which: str) -> None:
    """Look for the first limits of all closures once more."""
    for barrier in assessment.barriers:
        assert isinstance(barrier, AssessedClosure), barrier
        getattr(barrier.search, which)()


def figures(count: int = 100) -> dict[str, float]:
    """Figures of the three budgets."""
    scenario = line_of(count)
    assessment = assess(scenario)
    whole, first, each = [], [], []
    for _ in range(ROUNDS):
        whole.append(timed(lambda: assess(scenario)))
        first.append(timed(lambda: searches(assessment, "first")))
        each.append(timed(lambda: searches(assessment, "each")))
    without = [a - b for a, b in zip(whole, first, strict=True)]
    checks = sum(len(b.checks) for b in assessment.barriers if isinstance(b, AssessedClosure))
    return {
        f"checks of {count} closures": float(checks),
        f"assess of {count} closures with first-limit levels, ms": statistics.median(whole),
        f"assess of {count} closures without them, ms": statistics.median(without),
        "first-limit levels / assess without them": statistics.median(
            [a / b for a, b in zip(first, without, strict=True)]
        ),
        "level of every check / assess without them": statistics.median(
            [a / b for a, b in zip(each, without, strict=True)]
        ),
    }


if __name__ == "__main__":
    for name, value in figures().items():
        sys.stdout.write(f"{value:10.1f}  {name}\n")
