"""HTML of a closure: which part reaches its limit first, logs and posts, water over and through them."""

from __future__ import annotations

import math
from collections.abc import Sequence

from loads.assessment import Assessed, AssessedClosure
from loads.checks import Verdict
from loads.part import Part
from webapp.check_groups import PartRatios, check_groups
from webapp.display import NO_BREAK, System, elevation, show, show_all, significant
from webapp.limit_markup import limit_cell
from webapp.loss_markup import loss_part
from webapp.markup import escaped, ratio_cell, subheading, table, verdict_mark
from webapp.part_words import bay_groups, numbered, parts_text

Column = tuple[str, str, list[float]]

_POST_COLUMNS = (
    ("base_moment", "moment at the base"),
    ("base_shear", "shear at the base"),
    ("brace_force", "brace force"),
    ("bolt_tension", "tension of a bolt"),
    ("bolt_shear", "shear of a bolt"),
    ("contact_pressure", "under the plate"),
)


def stack_figure(barrier: AssessedClosure) -> str:
    """Logs in place and on hand, for the headline."""
    closure = barrier.record
    placed, on_hand = (set(counts) for counts in (closure.in_place, closure.on_hand))
    told = [
        str(min(counts)) if len(counts) == 1 else f"{min(counts)}–{max(counts)}"
        for counts in (placed, on_hand)
    ]
    return f"<div><b>{told[0]} of {told[1]}</b><span>logs in place in each bay</span></div>"


def _between(counts: set[int]) -> str:
    return str(min(counts)) if len(counts) == 1 else f"{min(counts)}–{max(counts)}"


def checks_table(barrier: Assessed, system: System, more: str) -> str:
    """Most pressing check of each kind, with what one more foot makes of it, and the notes to them."""
    rows, notes = [], []
    for group in check_groups(barrier):
        check = group.check
        parts = group.parts if not check.subject.startswith("closure") else "closure"
        others = f"<br><small>and {group.others} more, none pressed harder</small>" if group.others else ""
        words = ". ".join(text.rstrip(".") for text in (check.source, *check.remarks)) + "."
        if words not in notes:
            notes.append(words)
        rows.append(
            [
                f"{escaped(parts)}{others}",
                escaped(check.name),
                verdict_mark(check.verdict()),
                _demand(float(check.demand[0]), check.kind, check.name, system),
                limit_cell(check, system),
                ratio_cell(check, 0),
                ratio_cell(check, 1),
                str(notes.index(words) + 1),
            ]
        )
    headings = ("part", "check", "verdict", "demand", "limit", "of limit", more, "note")
    listed = "".join(f"<li>{escaped(words[:1].upper() + words[1:])}</li>" for words in notes)
    return table(headings, rows, numeric={3, 4, 5, 6, 7}) + f'<ol class="sh-notes">{listed}</ol>'


def _demand(value: float, kind: str, name: str, system: System) -> str:
    if kind == "number":
        return f"{value:g}"
    return show(value, "deflection" if "deflection" in name else kind, system)


def parts_part(barrier: AssessedClosure, system: System, more: str) -> str:
    """Logs, posts and water of a closure, each under its heading."""
    return (
        subheading("Logs and posts")
        + parts_tables(barrier, system, more)
        + loss_part(barrier, more)
        + subheading("Water over and through it")
        + water_table(barrier, system, more)
    )


def parts_tables(barrier: AssessedClosure, system: System, more: str) -> str:
    """Logs of every kind of bay, then posts and guides; bays that are alike are shown once."""
    layout, ratios = barrier.structure.layout, PartRatios(barrier)
    by_name = {part.id: part for part in barrier.parts}
    kinds = list(zip(layout.clear, layout.counts, strict=True))
    tables = []
    for bays in bay_groups(kinds):
        names = [f"bay {bays[0]} log {row}" for row in range(1, kinds[bays[0] - 1][1] + 1)]
        logs = [by_name[name] for name in names]
        worst = max((ratios.ratio(name, 0) for name in names), default=math.nan)
        tables.append((worst, bays, logs))
    tables.sort(key=lambda item: -item[0] if math.isfinite(item[0]) else math.inf)
    told = ""
    for place, (_, bays, logs) in enumerate(tables):
        title = _bay_title(barrier, bays, system)
        body = _log_table(barrier, ratios, logs, system, more) if logs else ""
        if place == 0 or not logs:
            told += f"<div><b>{title}</b></div>{body}"
        else:
            told += f"<details><summary>{title}</summary>{body}</details>"
    return told + _post_table(barrier, ratios, system, more)


def _bay_title(barrier: AssessedClosure, bays: Sequence[int], system: System) -> str:
    layout, bay = barrier.structure.layout, bays[0] - 1
    words = numbered("bay", bays)
    span = show(float(layout.spans[bay]), "length", system)
    placed, on_hand = layout.counts[bay], barrier.record.on_hand[bay]
    alike = ", each" if len(bays) > 1 else ""
    return (
        f"{words[:1].upper()}{words[1:]}{alike}: {placed} of {on_hand} logs in place, top "
        f"{elevation(float(layout.tops[bay]), system)}, span {span}"
    )


def _log_table(
    barrier: AssessedClosure, ratios: PartRatios, logs: Sequence[Part], system: System, more: str
) -> str:
    columns: list[Column] = [
        ("load along it", "line load", [float(log.line_load[0]) for log in logs]),
        ("moment", "moment", [float(log.moment[0]) for log in logs]),
        ("end reaction", "force", [float(log.reaction[0]) for log in logs]),
        ("bearing", "stress", [_more(log, "bearing_pressure") for log in logs]),
        ("sag", "deflection", [float(log.deflection[0]) for log in logs]),
    ]
    labels = [[log.id.rsplit(" ", 1)[1], _span(log, system)] for log in logs]
    return _part_rows(barrier, ratios, logs, labels, ("log", "from, to"), columns, system, more)


def _span(log: Part, system: System) -> str:
    low = elevation(log.bottom, system).split(NO_BREAK, maxsplit=1)[0]
    return f"{low} to {elevation(log.top, system)}"


def _post_table(barrier: AssessedClosure, ratios: PartRatios, system: System, more: str) -> str:
    uprights = [part for part in barrier.parts if part.kind != "log"]
    groups = [
        [uprights[number - 1] for number in numbers]
        for numbers in bay_groups([_likeness(barrier, part) for part in uprights])
    ]
    firsts = [group[0] for group in groups]
    columns: list[Column] = [
        ("whole load", "force", [float(part.reaction[0]) for part in firsts]),
        ("greatest moment", "moment", [float(part.moment[0]) for part in firsts]),
        *(
            (words, _kind(firsts, name), [_more(part, name) for part in firsts])
            for name, words in _POST_COLUMNS
        ),
        ("deflection", "deflection", [float(part.deflection[0]) for part in firsts]),
    ]
    rows = [
        ["verdict", *(verdict_mark(barrier.verdict_of(part.id)) for part in firsts)],
        ["of limit", *(_ratio(ratios.ratio(part.id, 0)) for part in firsts)],
        [more, *(_ratio(ratios.ratio(part.id, 1)) for part in firsts)],
        *([words, *_column(values, kind, system)] for words, kind, values in columns if _any(values)),
    ]
    names = [parts_text(part.id for part in group) for group in groups]
    headings = ["", *(escaped(name[:1].upper() + name[1:]) for name in names)]
    body = table(headings, rows, numeric=set(range(1, len(headings))))
    return subheading("Posts and guides", small=True) + body


def _likeness(barrier: AssessedClosure, part: Part) -> object:
    pieces = {post.name: post.pieces for post in barrier.structure.layout.posts}
    return pieces.get(part.id, (part.kind, round(float(part.reaction[0]), 6)))


def _kind(parts: Sequence[Part], name: str) -> str:
    return next((figure.kind for part in parts for figure in part.more if figure.name == name), "force")


def _more(part: Part, name: str) -> float:
    return next((float(figure.value[0]) for figure in part.more if figure.name == name), math.nan)


def _part_rows(
    barrier: Assessed,
    ratios: PartRatios,
    parts: Sequence[Part],
    labels: Sequence[Sequence[str]],
    headings: Sequence[str],
    columns: Sequence[Column],
    system: System,
    more: str,
) -> str:
    shown = [column for column in columns if _any(column[2])]
    cells = [_column(values, kind, system) for _, kind, values in shown]
    rows = []
    for place, (part, label) in enumerate(zip(parts, labels, strict=True)):
        verdict: Verdict = barrier.verdict_of(part.id)
        own = [_ratio(ratios.ratio(part.id, index)) for index in (0, 1)]
        rows.append([label[0], verdict_mark(verdict), *own, *label[1:], *(column[place] for column in cells)])
    names = [headings[0], "verdict", "of limit", more, *headings[1:], *(column[0] for column in shown)]
    return f'<div class="sh-tight">{table(names, rows, numeric=set(range(2, len(names))))}</div>'


def _any(values: list[float]) -> bool:
    return not all(math.isnan(value) for value in values)


def _column(values: list[float], kind: str, system: System) -> list[str]:
    texts = show_all(values, kind, system)
    return ["" if math.isnan(value) else text for value, text in zip(values, texts, strict=True)]


def _ratio(value: float) -> str:
    if math.isnan(value):
        return ""
    return significant(value, 3) if math.isfinite(value) else "none allowed"


def water_table(barrier: AssessedClosure, system: System, more: str) -> str:
    """Water over and through the closure, and the logs the level asks for, now and after one more foot."""
    found = barrier.hydraulics
    over, needed = found.overflow, found.needed
    rows = [["over the logs", *(_range(over.total_low[i], over.total_high[i], system) for i in (0, 1))]]
    rows += [
        [escaped(name), *(show(float(flow[i]), "flow", system) for i in (0, 1))]
        for name, flow in found.inflow.parts.items()
        if name != "over the logs"
    ]
    words = ["logs needed, " + _needed_for(barrier, system)]
    for index in (0, 1):
        counts = {int(count) for count in needed.count[index]}
        text = _between(counts)
        short = int(needed.short[index].max())
        words.append(f"{text}, {short} short" if short else text)
    rows.append(words)
    lead = f"Water begins to go over at {elevation(over.level, system)}."
    if min(barrier.structure.layout.counts) == 0:
        lead = f"A bay holds no log: water runs through it from the sill at {elevation(over.level, system)}."
    return f"<div>{lead}</div>" + table(("water and logs", "now", more), rows, numeric={1, 2})


def _needed_for(barrier: AssessedClosure, system: System) -> str:
    closure = barrier.record
    told = [
        f"{name} {show(value.value, 'length', system)}"
        for name, value in (("allowance", closure.allowance), ("freeboard", closure.limits.freeboard))
        if value is not None
    ]
    return " and ".join(told) if told else "no allowance or freeboard entered"


def _range(low: float, high: float, system: System) -> str:
    if float(high) <= 0:
        return "none"
    least, most = show_all([float(low), float(high)], "flow", system)
    return least if least == most else f"{least} to {most}"
