"""The large figures at the head of a field sheet, and the blanks for times under them."""

from __future__ import annotations

import datetime as dt
import math
from dataclasses import dataclass

from loads.records.scenario import Scenario
from webapp.display import age_text, elevation, moment_text
from webapp.sheet.plan import CALL_BELOW, Plan
from webapp.sheet.words import above_sill, plural, source_words, span_text

TIMES = ("Owner told at", "Call out by", "Start by", "Closed by", "Staff reads")
"""What is written in by hand: times that nobody computes here yet, and the reading at the closure."""


@dataclass(frozen=True, kw_only=True)
class Box:
    """One large figure: what it is, the figure, and lines under it; `alarm` is printed white on black."""

    label: str
    figure: str
    lines: tuple[str, ...]
    alarm: str = ""


def boxes(plan: Plan, scenario: Scenario, now: dt.datetime | None) -> tuple[Box, ...]:
    """Logs to fit, water and head, and the level at which the engineer is called."""
    return (_fit_box(plan), _water_box(plan, scenario, now), _call_box(plan))


def _fit_box(plan: Plan) -> Box:
    tops = sorted(set(plan.tops))
    shown = [elevation(top, plan.system) for top in tops[:: max(len(tops) - 1, 1)]]
    lines = [f"logs in each bay, {plural(len(plan.fit), 'bay')}"]
    if max(plan.fit) > 0:
        lines.append(f"top {' to '.join(shown)}")
        if len(tops) == 1:
            lines.append(above_sill(tops[0] - plan.sill, plan.system))
    else:
        lines.append("the level asks for no log yet")
    alarm = ""
    if max(plan.short) > 0:
        alarm = f"{span_text(short for short in plan.short if short)} too few in {_short_bays(plan)}"
    if plan.stuck:
        alarm = f"{span_text(plan.closure.in_place)} stand, none can be added"
    figure = f"{span_text(plan.fit)} of {span_text(plan.closure.on_hand)}"
    return Box(label="Fit now", figure=figure, lines=tuple(lines), alarm=alarm)


def _short_bays(plan: Plan) -> str:
    short = sum(1 for count in plan.short if count)
    return "each bay" if short == len(plan.short) else plural(short, "bay")


def _water_box(plan: Plan, scenario: Scenario, now: dt.datetime | None) -> Box:
    above = plan.water - plan.sill
    lines = [above_sill(above, plan.system), *_age_lines(scenario.water.as_of, now)]
    alarm = ""
    if math.isfinite(plan.protected) and plan.protected > max(plan.water, plan.sill):
        alarm = "higher on the protected side"
    elif plan.water > plan.layout.lowest_top:
        alarm = "over the top of the logs"
    return Box(label="Water now", figure=elevation(plan.water, plan.system), lines=tuple(lines), alarm=alarm)


def _age_lines(as_of: dt.datetime | None, now: dt.datetime | None) -> list[str]:
    if as_of is None:
        return ["no time entered"]
    if now is not None and now < as_of:
        return [moment_text(as_of), "later than the time of printing"]
    age = [] if now is None else [f"{age_text(as_of, now)} when printed"]
    return [moment_text(as_of), *age]


def _call_box(plan: Plan) -> Box:
    rated, call = plan.closure.rated_level, plan.call_level
    if rated is None or call is None:
        return Box(
            label="Call engineer at",
            figure="not set",
            lines=("No rated level entered: ask the engineer for it before water is on the sill.",),
        )
    below = CALL_BELOW[plan.system][0]
    lines = (
        above_sill(call - plan.sill, plan.system),
        f"{below} below rated level {elevation(rated.value, plan.system)}",
        source_words(rated, 26),
    )
    alarm = "reached: call now" if plan.call_reached else ""
    return Box(label="Call engineer at", figure=elevation(call, plan.system), lines=lines, alarm=alarm)
