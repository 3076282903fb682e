"""Where, what water, what to build, what to take down: sentences of a field sheet."""

from __future__ import annotations

import math
from collections.abc import Iterator

from loads.quantity import Quantity
from loads.records.closure import Closure
from loads.records.closure_parts import Anchor
from loads.records.scenario import Scenario
from webapp.display import elevation, show
from webapp.part_words import bay_groups, numbered
from webapp.sheet.plan import Plan
from webapp.sheet.words import (
    bare_level,
    cut,
    day_text,
    listed,
    plural,
    range_text,
    sentence,
    span_text,
)

BLANK = "_" * 10
TIME_BLANK = "___ : ___"
_WHERE_EMS, _NOTE_EMS, _SOURCE_EMS, _DATUM_EMS, _LIFT_EMS, _SHORT_EMS = 40.0, 66.0, 21.0, 26.0, 22.0, 76.0
_MOST_GROUPS = 3
_MORE = "more in the scenario file"


def where_lines(scenario: Scenario, closure: Closure) -> list[str]:
    """Place and what was noted of it."""
    place = cut(scenario.location, _WHERE_EMS) or f"Place {BLANK}{BLANK}"
    if not closure.note:
        return [sentence(place), f"Store, key {BLANK}{BLANK}  Way in if the road floods {BLANK}"]
    return [f"{sentence(place)} {cut(closure.note, _NOTE_EMS)}"]


def water_lines(plan: Plan, scenario: Scenario) -> list[str]:
    """Each side's level with its range, source and day; then from level to head."""
    water, system = scenario.water, plan.system
    if water.protected_side is None or not math.isfinite(plan.protected):
        behind = "Protected side dry."
    else:
        behind = sentence(_side("Protected side", plan.protected, water.protected_side, plan))
    head = plan.water - plan.sill
    chain = (
        f"Water {bare_level(plan.water, system)} − sill {bare_level(plan.sill, system)} = "
        f"{elevation(abs(head), system)} {'above' if head >= 0 else 'below'} it, datum "
        f"{cut(scenario.datum, _DATUM_EMS)}"
    )
    flood = _side("Flood side", plan.water, water.flood_side, plan)
    return [sentence(flood), f"{behind} {sentence(chain)}"]


def _side(words: str, level: float, entered: Quantity, plan: Plan) -> str:
    source = cut(entered.source, _SOURCE_EMS) if entered.source else "no source"
    day = f", {day_text(entered.dated)}" if entered.dated else ""
    return f"{words} {elevation(level, plan.system)}{range_text(entered, plan.system)}, {source}{day}"


def build_lines(plan: Plan) -> list[tuple[str, bool]]:
    """What goes in, one action to a sentence; what must not be overlooked is marked."""
    lines = [(asked_text(plan), False), *((text, True) for text in stop_texts(plan))]
    lines += [(text, False) for text in _counts(plan)]
    lines.append((uprights_text(plan.closure), False))
    lines.append((weight_text(plan.closure, plan), False))
    lines += [(text, False) for text in _people(plan.closure)]
    lines += adding_lines(plan)
    return [(text, strong) for text, strong in lines if text]


def asked_text(plan: Plan) -> str:
    """How the top that is asked for comes about."""
    closure, system = plan.closure, plan.system
    allowance, freeboard = closure.allowance, closure.limits.freeboard
    if allowance is None and freeboard is None:
        return "Top asked for: the water level itself. No allowance and no freeboard were entered."
    told = [bare_level(plan.water, system)]
    told.append(f"allowance {bare_level(allowance.value, system)}" if allowance else "no allowance entered")
    told.append(f"freeboard {bare_level(freeboard.value, system)}" if freeboard else "no freeboard entered")
    wanted = elevation(float(plan.needed.wanted_top[0]), system)
    return f"Top asked for: {' + '.join(told)} = {wanted}."


def stop_texts(plan: Plan) -> Iterator[str]:
    """What the level asked for would pass, and the logs that are not there for it."""
    for ceiling in plan.needed.stopped_by(0):
        what = "The logs asked for" if ceiling.of_stack else "Water and allowance"
        level = elevation(ceiling.level, plan.system)
        yield f"{what} would pass the {ceiling.name} {level}: ask the engineer first."
    if max(plan.short) > 0:
        needed = span_text(int(count) for count in plan.needed.count[0])
        yield f"{needed} logs in each bay are asked for; they are not on hand or have no room."


def _counts(plan: Plan) -> Iterator[str]:
    """Logs bay by bay where the bays differ, and those that stand already."""
    closure = plan.closure
    keys = list(zip(plan.fit, closure.on_hand, strict=True))
    groups = bay_groups(keys)
    if len(groups) > 1:
        told = [
            f"{numbered('bay', bays)}: {keys[bays[0] - 1][0]} of {keys[bays[0] - 1][1]}"
            for bays in groups[:_MOST_GROUPS]
        ]
        left = len(groups) - len(told)
        yield sentence(cut("; ".join([*told, *([f"{left} other counts"] if left else [])]), 60.0))
    if closure.logs_in_place is not None:
        yield f"In place as entered: {span_text(closure.in_place)} in each bay."


def uprights_text(closure: Closure) -> str:
    """Posts, braces and bolts."""
    posts = closure.bay_count - 1
    if posts == 0:
        return "No posts: one bay between its guides."
    told = [plural(posts, "post")]
    told.append(plural(posts, "brace") if closure.post and closure.post.brace else "no braces entered")
    told.append(_bolts(closure.anchor, posts))
    return f"{', '.join(told)}. Torque {BLANK}"


def _bolts(anchor: Anchor | None, posts: int) -> str:
    if anchor is None:
        return "bolts not entered"
    if anchor.bolt_distances is not None:
        each = len(anchor.bolt_distances)
        return f"{plural(each * posts, 'bolt')} ({each} at each post)"
    told = [
        f"{count} {words}"
        for count, words in ((anchor.tension_bolts, "in tension"), (anchor.shear_bolts, "in shear"))
        if count is not None
    ]
    return f"bolts of each post: {' and '.join(told)}" if told else "bolts not entered"


def weight_text(closure: Closure, plan: Plan) -> str:
    """Weight of a log, and of each person's share."""
    weight, handling = closure.log.weight, closure.handling
    if weight is None:
        return f"Weight of a log: not entered. Weigh one: {BLANK}"
    text = f"Log {weight.text}"
    if handling is None:
        return f"{text}. People for each log: {BLANK}"
    if handling.people_per_log == 1:
        text += ", one person"
    else:
        share = show(weight.value / handling.people_per_log, "weight", plan.system)
        text += f", {handling.people_per_log} people, {share} each"
    if handling.limit is not None:
        text += f" (limit {handling.limit.text})"
    return f"{text}."


def _people(closure: Closure) -> Iterator[str]:
    install = closure.install
    if install is None:
        return
    told = [f"Crew {install.people}"] if install.people is not None else []
    if install.lift:
        told.append(f"lift: {cut(install.lift, _LIFT_EMS)}")
    for minutes, piece in ((install.minutes_per_log, "log"), (install.minutes_per_post, "post")):
        if minutes is not None:
            told.append(f"{minutes.text} a {piece}")
    if told:
        text = ", ".join(told)
        yield f"{text[:1].upper()}{text[1:]}."


def adding_lines(plan: Plan) -> list[tuple[str, bool]]:
    """Whether logs can be added with water at the sill, from where, up to what level."""
    adding, system = plan.closure.adding, plan.system
    if adding is None:
        return [("Adding logs with water at the sill: not entered. Do not count on it.", True)]
    if not adding.with_water:
        sill = elevation(plan.sill, system)
        text = f"Logs CANNOT be added with water at the sill, last chance {sill}."
    else:
        side = "either side" if adding.side == "either" else f"the {adding.side} side"
        if adding.up_to is None:
            return [(f"Logs CAN be added from {side}; up to what level was not entered.", True)]
        last = elevation(adding.up_to.value, system)
        text = f"Logs CAN be added from {side}, last chance {last}."
    return [(f"{text} Water is past it." if plan.adding_is_over else text, True)]


def removal_lines(closure: Closure) -> list[str]:
    """When and in what order the logs come out."""
    one_way = " The guides or seals bear one way only." if closure.guide.one_way else ""
    when = f"Not before the river is at {BLANK} and falling."
    return [f"{when} Top log first. Look for mud, water behind.{one_way}"]


def short_text(closure: Closure) -> str:
    """Parts that are short or damaged."""
    if not closure.parts_short:
        return f"None entered. Counted by {BLANK} at {TIME_BLANK}"
    return sentence(listed(closure.parts_short, _SHORT_EMS, _MORE))
