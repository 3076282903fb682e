"""HTML of limits: cells of a check, and which limit rising water reaches first."""

from __future__ import annotations

from collections.abc import Sequence

from loads.assessment import Assessed
from loads.checks import Check
from webapp.check_groups import Reached, limits_reached
from webapp.display import System, elevation, show
from webapp.markup import escaped, ratio_cell, subheading, table, verdict_mark
from webapp.part_words import check_title, first_words

_MOST = 6


def limit_cell(check: Check, system: System) -> str:
    """Limit of a check as entered, and the elevation or the factored limit that it amounts to."""
    if check.limit is None:
        return "none entered"
    words = escaped(check.limit.text)
    if abs(check.limit.value - check.limit_value) <= 1e-9 * max(abs(check.limit.value), 1.0):
        return words
    if check.kind == "elevation":
        return f"{words}, level {elevation(check.limit_value, system)}"
    return f"{words}, factored {show(check.limit_value, check.kind, system)}"


def check_table(checks: Sequence[Check], system: System, more: str, kind: str) -> str:
    """Checks of one barrier of a kind, the most pressing first, with what one more foot makes of them."""
    rows = [
        [
            escaped(check_title(check, kind)),
            verdict_mark(check.verdict()),
            show(float(check.demand[0]), check.kind, system),
            limit_cell(check, system),
            ratio_cell(check, 0),
            ratio_cell(check, 1),
            f'<div class="sh-source">{escaped(" ".join((check.source, *check.remarks)))}</div>',
        ]
        for check in checks
    ]
    headings = ("check", "verdict", "demand", "limit as entered", "of limit", more, "source")
    return table(headings, rows, numeric={2, 3, 4, 5})


def first_row(barrier: Assessed, system: System, more: str) -> str:
    """One line: which limit is reached first, at what level, its ratio now and after one more foot."""
    first = barrier.first_limit
    if first is None:
        return '<div class="sh-first">First limit: none, no load limit was entered.</div>'
    if first.level is None:
        return f'<div class="sh-first">First limit: none up to {elevation(first.ceiling, system)}.</div>'
    lead = next(iter(limits_reached(barrier, 1)), None)
    if lead is None:
        return ""
    return (
        f'<div class="sh-first">First limit: <b>{_what(barrier, lead)}</b> at '
        f"<b>{_where(lead, system)}</b>, {_distance(barrier, lead, system)} · now "
        f"<b>{ratio_cell(lead.check, 0)}</b> {verdict_mark(lead.check.verdict(0))} · {escaped(more)} "
        f"<b>{ratio_cell(lead.check, 1)}</b> {verdict_mark(lead.check.verdict(1))}</div>"
    )


def _what(barrier: Assessed, reached: Reached) -> str:
    if reached.first.subject.startswith(barrier.record.kind):
        return escaped(first_words(reached.first, barrier.record.kind))
    return escaped(f"{reached.parts}, {reached.first.check}")


def _where(reached: Reached, system: System) -> str:
    level = reached.first.level
    if level is None or reached.first.without_water:
        return "no water at all"
    return elevation(level, system)


def _distance(barrier: Assessed, reached: Reached, system: System) -> str:
    level = reached.first.level
    if level is None or reached.first.without_water:
        return "reached without water on the flood side"
    rise = level - float(barrier.levels.flood_side[0])
    size = elevation(abs(rise), system)
    return f"{size} above the water now" if rise > 0 else f"passed by {size}"


def first_part(barrier: Assessed, system: System, more: str) -> str:
    """Limits in the order in which rising water reaches them, under a heading; empty for fewer than two."""
    found = limits_reached(barrier, _MOST)
    if len(found) < 2:
        return ""
    rows = [
        [
            _what(barrier, reached),
            _where(reached, system),
            _distance(barrier, reached, system),
            ratio_cell(reached.check, 0),
            ratio_cell(reached.check, 1),
            verdict_mark(reached.check.verdict(0)),
        ]
        for reached in found
    ]
    headings = ("limit", "reached at", "that is", "now", more, "verdict now")
    return subheading("Which limit rising water reaches first") + table(headings, rows, numeric={1, 3, 4})
