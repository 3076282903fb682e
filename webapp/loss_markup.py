"""HTML of what a closure would carry with one brace or one post lost."""

from __future__ import annotations

from loads.assessment import AssessedClosure
from loads.checks import Check
from loads.closure.whatif import WhatIf, what_ifs
from webapp.markup import escaped, ratio_cell, subheading, table, verdict_mark
from webapp.part_words import check_title


def loss_part(barrier: AssessedClosure, more: str) -> str:
    """Loss of one brace and of one post under a heading; empty for a closure that has neither."""
    found = what_ifs(barrier)
    if not found:
        return ""
    rows = [_row(one) for one in found]
    headings = ("lost", "verdict", "most pressing", "of limit", more, "what is assumed")
    note = (
        '<div class="sh-note">Computed apart from the checks above, at the level as entered; nothing of it '
        "stands in the verdict of the closure.</div>"
    )
    return subheading("If a part were lost") + table(headings, rows, numeric={3, 4}) + note


def _row(one: WhatIf) -> list[str]:
    if not one.stands:
        return [escaped(one.part), verdict_mark(one.verdict()), "nothing stands", "", "", escaped(one.words)]
    lead: Check | None = one.checks[0] if len(one.checks) else None
    limited = lead is not None and lead.limit is not None
    return [
        escaped(one.part),
        verdict_mark(one.verdict()),
        escaped(check_title(lead, "closure")) if lead is not None and limited else "no limit entered",
        ratio_cell(lead, 0) if lead is not None else "",
        ratio_cell(lead, 1) if lead is not None else "",
        escaped(one.words),
    ]
