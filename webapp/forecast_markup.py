"""HTML of the forecast page: ages and traps, the clock, the chain, the limits and the plan."""

from __future__ import annotations

from collections.abc import Sequence
from datetime import datetime
from zoneinfo import ZoneInfo

from loads.chain import ChainTerm
from loads.clock import Timeline
from loads.line_barrier import BarrierNews
from loads.line_clock import LineClock
from loads.moments import local_text
from loads.plan import Plan
from webapp.clock_words import (
    TIMES,
    age_words,
    crest_text,
    earlier_text,
    instant_text,
    length,
    plan_lines,
    range_text,
    term_text,
)
from webapp.display import NO_BREAK, System, barrier_title
from webapp.markup import escaped, subheading, table

OFF = "Advice is off. The arithmetic goes on: every time below is only worked out from what was entered."


def status(line: LineClock, zone: ZoneInfo) -> str:
    """How old everything is, whether advice is off, and what is odd about the readings."""
    ages = [words for news in line.gauges for words in age_words(news, zone)]
    content = "".join(f'<div class="sh-note">{escaped(words)}</div>' for words in ages)
    if not line.scenario.zone:
        content += '<div class="sh-note">No local zone has been entered: times are in UTC.</div>'
    if line.off:
        content += f'<div class="sh-off" role="alert"><b>{OFF}</b> {escaped(" ".join(line.off))}</div>'
    traps = [(news.gauge.id, trap) for news in line.gauges for trap in news.traps]
    items = [f"<li><b>{escaped(name)}</b> {escaped(trap)}</li>" for name, trap in traps]
    items += [f"<li>{escaped(sentence)}</li>" for sentence in line.sentences]
    return content + (f'<ul class="sh-traps">{"".join(items)}</ul>' if items else "")


def clock_table(line: LineClock, zone: ZoneInfo, system: System) -> str:
    """When to call, start, have closed, for every closure and trace; on a phone one card for each."""
    closures = [one for one in line.barriers if one.record.kind == "closure"]
    headings = ("closure", "trace", "crest on sill", *(title for _, title in TIMES))
    rows = [
        [
            escaped(barrier_title(one.record.id, one.record.name)) if number == 0 else "",
            escaped(timeline.trace),
            escaped(crest_text(timeline, system)),
            *(_cell(timeline, name, zone) for name, _ in TIMES),
        ]
        for one in closures
        for number, timeline in enumerate(one.clock.timelines)
    ]
    if not rows:
        return "<p>No closure has a gauge with a forecast that leads to it, so there is no clock yet.</p>"
    wide = f'<div class="sh-wide sh-clock-table">{table(headings, rows, numeric={2})}</div>'
    return wide + "".join(_card(one, zone, system) for one in closures)


def _cell(timeline: Timeline, name: str, zone: ZoneInfo) -> str:
    instant = getattr(timeline, name)
    words = instant_text(instant, zone, name)
    if instant is None or instant.moment is None:
        return f"<small>{escaped(words)}</small>"
    clock, abbreviation, day = words.split(" ", 2)
    day = day.replace(" ", NO_BREAK, 3).replace(f",{NO_BREAK}", ", ")
    return f"<b>{escaped(clock)}&nbsp;{escaped(abbreviation)}</b> <small>{escaped(day)}</small>"


def _card(one: BarrierNews, zone: ZoneInfo, system: System) -> str:
    rows = ""
    for timeline in one.clock.timelines:
        times = "".join(
            f"<dt>{title}</dt><dd>{_cell(timeline, name, zone)}</dd>" for name, title in TIMES[:5]
        )
        rows += (
            f'<div class="sh-trace">{escaped(timeline.trace)}, {escaped(crest_text(timeline, system))}</div>'
            f"<dl>{times}</dl>"
        )
    title = escaped(barrier_title(one.record.id, one.record.name))
    return f'<div class="sh-clock sh-narrow"><b>{title}</b>{rows}</div>'


def per_closure(line: LineClock) -> str:
    """What one foot more does, what the logs ask for, and what the times rest on."""
    content = ""
    for one in line.barriers:
        if one.record.kind != "closure":
            continue
        title = escaped(barrier_title(one.record.id, one.record.name))
        install = one.clock.install
        took = "not known" if install.seconds is None else f"{install.seconds / 3600:.3g} h"
        words = [f"one foot more: call-out {earlier_text(one)}", f"time to close {took}"]
        if one.advice is not None:
            words.append(f"logs: {one.advice.kind}, {one.advice.sentence}")
        sentences = [
            *one.clock.sentences,
            *one.sentences,
            *dict.fromkeys(s for timeline in one.clock.timelines for s in timeline.sentences),
        ]
        rest = "".join(f"<li>{escaped(sentence)}</li>" for sentence in sentences)
        content += f'<div class="sh-line"><b>{title}</b>: {escaped("; ".join(words))}</div>'
        content += f"<ul>{rest}</ul>" if rest else ""
    return content


def chains(line: LineClock, system: System, state: str) -> str:
    """Reading + zero + shift + transfer − sill = head, one line for each barrier, with marks."""
    return "".join(_chain(one, system, state) for one in line.barriers)


def _chain(one: BarrierNews, system: System, state: str) -> str:
    title = escaped(barrier_title(one.record.id, one.record.name))
    if one.chain is None:
        return f'<div class="sh-line"><b>{title}</b>: there is neither a reading nor a forecast.</div>'
    index = one.states.index(state) if state in one.states else 0
    terms = "".join(_term(term, index, len(one.states), system) for term in one.chain.terms)
    stage = length(one.clock.sill_stage, system)
    remarks = "".join(f"<li>{escaped(r)}</li>" for r in (*one.chain.missing, *one.chain.remarks))
    return (
        f'<div class="sh-chain"><b>{title}</b><span class="sh-terms">{terms}</span>'
        f"<small>sill at a reading of {escaped(stage)}</small></div>"
        + (f"<ul>{remarks}</ul>" if remarks else "")
    )


def _term(term: ChainTerm, index: int, states: int, system: System) -> str:
    link = term.link
    words = escaped(term_text(term, index, states, system))
    day = f", {link.dated.isoformat()}" if link.dated else ""
    source = f"{link.source}{day}" if link.source else ""
    mark = f'<em class="sh-mark">{escaped(term.mark)}</em>' if term.mark else ""
    about = [text for text in (range_text(term, index, states, system), source) if text]
    return (
        f'<span class="sh-term"><span>{words}</span><small>{escaped("; ".join(about))}</small>{mark}</span>'
    )


def limits_table(line: LineClock, zone: ZoneInfo, system: System) -> str:
    """Which limit level each trace reaches first and when, every limit in its order."""
    rows = [
        [
            escaped(order.trace) if number == 0 else "",
            escaped(one.limit.barrier),
            escaped(one.limit.label),
            escaped(length(one.limit.stage, system)),
            escaped(instant_text(one.instant, zone)),
        ]
        for order in line.orders
        for number, one in enumerate(order.reached)
    ]
    sentences = dict.fromkeys(s for order in line.orders for s in order.sentences)
    rest = "".join(f"<li>{escaped(sentence)}</li>" for sentence in sentences)
    headings = ("trace", "barrier", "level", "as a reading", "reached")
    shown = table(headings, rows, numeric={3}) if rows else "<p>No barrier has a limit level.</p>"
    return shown + (f"<ul>{rest}</ul>" if rest else "")


def first_limits(line: LineClock, zone: ZoneInfo) -> str:
    """One sentence for each trace: which limit of the line is reached first."""
    words = []
    for order in line.orders:
        first = order.first
        told = "no limit level is reached in this forecast"
        if first is not None:
            told = (
                f"{first.limit.barrier} reaches its {first.limit.label} first, "
                f"{instant_text(first.instant, zone)}"
            )
        words.append(f"<li><b>{escaped(order.trace)}</b>: {escaped(told)}</li>")
    return f"<ul>{''.join(words)}</ul>" if words else ""


def plan_part(plan: Plan, trace: str, zone: ZoneInfo) -> str:
    """The plan of the line as sentences."""
    head = "every closure that the water reaches is closed in time" if plan.in_time else "NOT all in time"
    moves = [
        f"crew {crew.crew.id}: called {instant_of(crew.call_out, zone)}, at the latest "
        f"{instant_of(crew.call_out_by, zone)}"
        for crew in plan.crews
        if crew.jobs
    ]
    items = _items([*moves, *(text.strip() for text in plan_lines(plan, zone))])
    return f'<div class="sh-first">{escaped(trace)}: {head}</div>{items}'


def instant_of(moment: datetime | None, zone: ZoneInfo) -> str:
    """A moment of a plan in the local zone."""
    return "–" if moment is None else local_text(moment, zone)


def _items(sentences: Sequence[str]) -> str:
    return "<ul>" + "".join(f"<li>{escaped(one)}</li>" for one in sentences) + "</ul>"


def part(title: str, content: str) -> str:
    """A heading and what stands under it."""
    return subheading(title) + content
