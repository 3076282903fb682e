"""The clock in words and rows, the same for the terminal and the page."""

from __future__ import annotations

import math
from collections.abc import Mapping
from datetime import timedelta
from zoneinfo import ZoneInfo

import numpy as np

from loads import __version__
from loads.cautions import HEADLINE
from loads.chain import ChainTerm
from loads.clock import Timeline
from loads.document import check_code, input_digest
from loads.instant import Instant
from loads.line_barrier import BarrierNews
from loads.line_clock import LineClock
from loads.line_watch import GaugeNews
from loads.moments import duration_text, local_text, utc
from loads.plan import Plan
from webapp.answer_clock import PLANNED, zone_of
from webapp.display import NO_BREAK, System, fixed, in_unit, unit_label
from webapp.text_table import aligned, plain

TIMES = (
    ("call_out", "call out"),
    ("tell_owner", "tell owner by"),
    ("start", "start"),
    ("closed_by", "closed by"),
    ("last_logs", "last logs"),
    ("removal", "removal from"),
)
"""Times of a timeline and what a column of them is called."""
_NO_TIME = {"last_logs": "none entered", "removal": "none entered", "tell_owner": "nobody to tell"}


def length(value: float, system: System) -> str:
    """A level or a difference of levels, two decimals in feet and three in metres, or "not known"."""
    if not math.isfinite(value):
        return "not known"
    decimals = 2 if system == "US" else 3
    return f"{fixed(in_unit(value, 'length', system), decimals)}{NO_BREAK}{unit_label('length', system)}"


def instant_text(instant: Instant | None, zone: ZoneInfo, name: str = "") -> str:
    """When something happens, in the local zone, or the plain state without a time."""
    if instant is None:
        return _NO_TIME.get(name, "–")
    if instant.moment is None:
        earliest = instant.earliest
        return instant.state if earliest is None else f"from {local_text(earliest, zone)}, not known when"
    told = local_text(instant.moment, zone)
    return f"{told}, past" if instant.state == "already past" else told


def term_text(term: ChainTerm, index: int, states: int, system: System) -> str:
    """One term of a chain in one state, with its name."""
    values = np.broadcast_to(np.asarray(term.link.value, dtype=np.float64), (states,))
    return f"{term.sign} {term.link.name} {length(float(values[index]), system)}".strip()


def range_text(term: ChainTerm, index: int, states: int, system: System) -> str:
    """Range of one term in one state; empty where none was stated."""
    low, high = (
        float(np.broadcast_to(np.asarray(end, dtype=np.float64), (states,))[index])
        for end in (term.link.low, term.link.high)
    )
    return f"{length(low, system)} to {length(high, system)}" if low < high else ""


def chain_text(one: BarrierNews, system: System, state: str = "crest, likely") -> str:
    """The whole chain of a barrier on one line, for one state."""
    if one.chain is None:
        return "there is neither a reading nor a forecast at its gauge"
    index = one.states.index(state) if state in one.states else 0
    terms = [term_text(term, index, len(one.states), system) for term in one.chain.terms]
    head = range_text(one.chain.terms[-1], index, len(one.states), system)
    return " ".join(terms) + (f" ({head})" if head else "")


def earlier_text(one: BarrierNews) -> str:
    """What one foot more does to the call-out, or why it cannot be told."""
    if len(one.clock.timelines) < 2:
        return "not known"
    earlier = one.clock.call_out_earlier()
    if earlier is None:
        return "not known: one of the two call-outs has no time"
    return f"{duration_text(earlier)} {'earlier' if earlier >= timedelta(0) else 'later'}"


def age_words(news: GaugeNews, zone: ZoneInfo) -> list[str]:
    """Age of what is known at a gauge, one sentence for each series."""
    name = f"{news.gauge.name or news.gauge.id}"
    words = []
    if news.observed is None:
        words.append(f"{name}: no reading is kept here.")
    elif news.observed_age is not None:
        told = local_text(utc(news.observed.times[-1]), zone)
        label = news.observed_age.label
        words.append(f"{name}: last reading {told}, {label}. {news.observed_age.sentence}".strip())
    if news.forecast_age is None:
        words.append(f"{name}: no forecast is kept here.")
    else:
        issued = news.forecast.newest.issued
        told = "at a time not stated" if issued is None else local_text(utc(issued), zone)
        words.append(
            f"{name}: forecast issued {told}, {news.forecast_age.label}. {news.forecast_age.sentence}".strip()
        )
    return words


def crest_text(timeline: Timeline, system: System) -> str:
    """Crest of a trace at a barrier as a head, said to be the end of the series where it is."""
    head = timeline.crest.head
    words = length(head, system)
    if math.isfinite(head) and head < 0:
        words = f"{length(-head, system)} below"
    return f"{words}, at the end" if timeline.crest.at_the_end else words


def clock_text(line: LineClock, document: Mapping[str, object]) -> str:
    """Return what `sillhead clock` prints."""
    zone, system = zone_of(line.scenario), line.scenario.units
    code = check_code(input_digest(document))
    no_zone = "" if line.scenario.zone else "   (no local zone entered)"
    lines = [
        f"{line.scenario.title}   [{line.scenario.status}]   {code}",
        f"now {local_text(line.now, zone)}{no_zone}",
        *(sentence for news in line.gauges for sentence in age_words(news, zone)),
        *(f"{news.gauge.id}: {trap}" for news in line.gauges for trap in news.traps),
    ]
    if line.off:
        lines.append("ADVICE IS OFF; the arithmetic goes on. " + " ".join(line.off))
    for one in line.barriers:
        lines += ["", *_barrier_lines(one, zone, system, off=bool(one.news.off))]
    lines += ["", *line.sentences]
    for name in PLANNED:
        if name in line.traces and line.scenario.crew:
            lines += [f"plan, {name}:", *plan_lines(line.plan(name), zone), ""]
    lines += [*limit_lines(line, zone), f"Sillhead {__version__}. {HEADLINE}"]
    return plain("\n".join(lines))


def _barrier_lines(one: BarrierNews, zone: ZoneInfo, system: System, *, off: bool) -> list[str]:
    title = f"{one.record.id} {one.record.name}".strip()
    lines = [
        f"{title}, by gauge {one.clock.gauge}: sill at a reading of {length(one.clock.sill_stage, system)}",
        f"  {chain_text(one, system)}",
    ]
    if one.chain is not None:
        lines += [f"  {term.link.name}: {term.mark}" for term in one.chain.terms if term.mark]
        lines += [f"  {remark}" for remark in one.chain.remarks]
    rows = [("", "trace", "crest on sill", *(title for _, title in TIMES))]
    rows += [
        (
            "",
            timeline.trace,
            crest_text(timeline, system),
            *(instant_text(getattr(timeline, name), zone, name) for name, _ in TIMES),
        )
        for timeline in one.clock.timelines
    ]
    lines += aligned(rows, frozenset())
    if one.record.kind == "closure":
        lines.append(f"  one foot more: call-out {earlier_text(one)}")
    if one.advice is not None:
        lines.append(f"  logs: {one.advice.kind}" + ("" if off else f"; {one.advice.sentence}"))
    sentences = dict.fromkeys(s for timeline in one.clock.timelines for s in timeline.sentences)
    return [*lines, *(f"  {s}" for s in (*one.clock.sentences, *one.sentences, *sentences))]


def plan_lines(plan: Plan, zone: ZoneInfo) -> list[str]:
    """A plan of the line, a line for each job and each sentence about it."""
    lines = [
        f"  crew {crew.crew.id}: {job.barrier} from {local_text(job.start, zone)} to "
        f"{local_text(job.finish, zone)}, water {local_text(job.due, zone)}"
        + (", LATE" if job.late else f", {duration_text(job.margin)} to spare")
        for crew in plan.crews
        for job in crew.jobs
    ]
    lines += [f"  {barrier} is not reached in this forecast" for barrier in plan.not_asked_for]
    return [*lines, *(f"  {sentence}" for sentence in plan.sentences)]


def limit_lines(line: LineClock, zone: ZoneInfo) -> list[str]:
    """Which limit of the line each trace reaches first, and when."""
    lines = []
    for order in line.orders:
        first = order.first
        words = "no limit level is reached"
        if first is not None:
            words = f"{first.limit.barrier} {first.limit.label} {instant_text(first.instant, zone)}"
        lines.append(f"first limit, {order.trace}: {words}")
    return lines
