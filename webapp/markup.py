"""Small pieces of HTML from results. Every text that a person typed is escaped here, by one function."""

from __future__ import annotations

import math
from collections.abc import Sequence
from datetime import datetime

from loads.assessment import Assessed, Assessment, Barrier
from loads.checks import Check, Verdict
from loads.document import check_code
from webapp.display import (
    System,
    age_text,
    as_entered,
    barrier_title,
    elevation,
    load_kind,
    moment_text,
    pedigree,
    show,
    show_all,
    significant,
)
from webapp.part_words import check_title
from webapp.text_table import disagreement_text, first_limit_text, head_on

VERDICT_CLASS: dict[Verdict, str] = {
    "below limit": "sh-below",
    "near limit": "sh-near",
    "above limit": "sh-above",
    "not checked": "sh-none",
    "withheld": "sh-withheld",
}


_SHOWN_AS_TYPED = {ord(c): f"&#{ord(c)};" for c in "&<>\"'*_`[]()~$:\\#|!\n\r"}
"""Characters that mean something in HTML or Markdown, as references to themselves."""


def escaped(text: object) -> str:
    """Text that is shown as it stands, whatever is in it: no markup, no Markdown, no line of its own."""
    return str(text).translate(_SHOWN_AS_TYPED)


def block(content: str) -> str:
    """Wrap content for a page; one line, so that Markdown leaves it alone."""
    return f'<div class="sh">{content}</div>'.replace("\n", " ")


def subheading(text: str, *, small: bool = False) -> str:
    """Heading of a part of a page."""
    mark, level = (" small", 3) if small else ("", 2)
    return f'<div class="sh-h{mark}" role="heading" aria-level="{level}">{escaped(text)}</div>'


def verdict_mark(verdict: Verdict) -> str:
    """Verdict as word with its hatch."""
    return f'<span class="sh-verdict {VERDICT_CLASS[verdict]}">{verdict}</span>'


def table(
    headings: Sequence[str], rows: Sequence[Sequence[str]], *, numeric: set[int], total: bool = False
) -> str:
    """HTML table; cells come escaped."""
    head = "".join(f'<th scope="col"{_num(i, numeric)}>{text}</th>' for i, text in enumerate(headings))
    body = ""
    for position, row in enumerate(rows):
        mark = ' class="total"' if total and position == len(rows) - 1 else ""
        cells = "".join(f"<td{_num(i, numeric)}>{cell}</td>" for i, cell in enumerate(row))
        body += f"<tr{mark}>{cells}</tr>"
    return f'<div class="sh-table"><table><thead><tr>{head}</tr></thead><tbody>{body}</tbody></table></div>'


def _num(column: int, numeric: set[int]) -> str:
    return ' class="num"' if column in numeric else ""


def title_block(assessment: Assessment, digest: str, now: datetime) -> str:
    """Title, status, datum, check code and the age of the levels."""
    scenario = assessment.scenario
    time = scenario.water.as_of
    age = f"levels as of {moment_text(time)}, {age_text(time, now)}" if time else "levels without a time"
    code = check_code(digest)
    return (
        '<div class="sh-title"><div class="sh-name" role="heading" aria-level="1">'
        f"{escaped(scenario.title)}</div>"
        f"<span>{scenario.status} · elevations in {escaped(scenario.datum)} · check code {code}</span></div>"
        f'<div class="sh-note">{escaped(age)}</div>'
    )


def source_note(assessment: Assessment) -> str:
    """Where the two levels come from."""
    water = assessment.scenario.water
    parts = [f"flood side {as_entered(water.flood_side)}: {pedigree(water.flood_side)}"]
    if water.protected_side is None:
        parts.append("protected side dry")
    else:
        parts.append(f"protected side {as_entered(water.protected_side)}: {pedigree(water.protected_side)}")
    return f'<div class="sh-note">{escaped(" · ".join(parts))}</div>'


def line_table(assessment: Assessment, system: System) -> str:
    """Flood line as a table: the same facts as the picture."""
    headings = (
        "barrier",
        "verdict",
        "of limit",
        "check",
        "head",
        "force",
        "moment",
        "acts at",
        "rated",
        "first limit",
    )
    forces = _column(assessment.barriers, "force", system)
    moments = _column(assessment.barriers, "moment", system)
    rows = [
        _line_row(barrier, system, force, moment)
        for barrier, force, moment in zip(assessment.barriers, forces, moments, strict=True)
    ]
    return table(headings, rows, numeric={2, 4, 5, 6, 7, 8, 9})


def _column(barriers: Sequence[Barrier], kind: str, system: System) -> list[str]:
    found = [""] * len(barriers)
    for shown in (kind, load_kind("wall", kind)):
        own = [i for i, barrier in enumerate(barriers) if load_kind(barrier.record.kind, kind) == shown]
        values = [_figure(barriers[i], kind) for i in own]
        for i, value, text in zip(own, values, show_all(values, shown, system), strict=True):
            found[i] = "" if math.isnan(value) else text
    return found


def _figure(barrier: Barrier, kind: str) -> float:
    if not isinstance(barrier, Assessed):
        return math.nan
    return float((barrier.resultant.horizontal if kind == "force" else barrier.resultant.moment)[0])


def _line_row(barrier: Barrier, system: System, force: str, moment: str) -> list[str]:
    record = barrier.record
    name = escaped(barrier_title(record.id, record.name))
    rated = elevation(record.rated_level.value, system) if record.rated_level else "none entered"
    mark = verdict_mark(barrier.verdict())
    if not isinstance(barrier, Assessed):
        return [name, mark, "", "the two computations disagree", "", "", "", "", rated, ""]
    check = barrier.checks[0]
    action = float(barrier.resultant.line_of_action[0])
    return [
        name,
        mark,
        ratio_cell(check, 0),
        escaped(check_title(check, record.kind)) if check.limit else "no limit entered",
        show(head_on(barrier), "length", system),
        force,
        moment,
        elevation(action, system) if math.isfinite(action) else "–",
        rated,
        first_limit_text(barrier, system),
    ]


def line_cards(assessment: Assessment, system: System) -> str:
    """Flood line for a phone: one card for each barrier, in the order of the scenario."""
    return (
        '<div class="sh-cards">'
        + "".join(_card(barrier, system) for barrier in assessment.barriers)
        + "</div>"
    )


def _card(barrier: Barrier, system: System) -> str:
    record = barrier.record
    name = f"<b>{escaped(barrier_title(record.id, record.name))}</b>"
    mark = verdict_mark(barrier.verdict())
    if not isinstance(barrier, Assessed):
        return f'<div class="sh-card">{name}<span class="figure">withheld</span><span>{mark}</span></div>'
    check = barrier.checks[0]
    governs = (
        f"{ratio_words(check)}, {escaped(check_title(check, record.kind))}"
        if check.limit
        else "no limit entered"
    )
    force = show(float(barrier.resultant.horizontal[0]), load_kind(record.kind, "force"), system)
    moment = show(float(barrier.resultant.moment[0]), load_kind(record.kind, "moment"), system)
    return (
        f'<div class="sh-card">{name}<span class="figure">{force}</span><span>{mark}</span>'
        f'<small class="right">{moment}</small><small>{governs}</small>'
        f'<small class="right">head {show(head_on(barrier), "length", system)}</small></div>'
    )


def ratio_cell(check: Check, index: int) -> str:
    """Ratio of a check in one state; empty without a limit."""
    if check.limit is None:
        return ""
    ratio = float(check.ratio[index])
    if math.isfinite(ratio):
        return significant(ratio, 3)
    return "beyond any limit" if check.kind != "elevation" and check.limit_value else "none allowed"


def ratio_words(check: Check) -> str:
    """Ratio of a check in the first state, in words."""
    cell = ratio_cell(check, 0)
    return f"{cell} of limit" if cell[:1].isdigit() else cell


def remark_list(barriers: Sequence[Barrier]) -> str:
    """Remarks of barriers, each under its id."""
    items = ""
    for barrier in barriers:
        if isinstance(barrier, Assessed):
            items += "".join(
                f"<li><b>{escaped(barrier.record.id)}</b> {escaped(r)}</li>" for r in barrier.remarks
            )
        else:
            words = escaped(disagreement_text(barrier.first, barrier.second, barrier.subject))
            items += f"<li><b>{escaped(barrier.record.id)}</b> {words}</li>"
    return f"<ul>{items}</ul>" if items else ""


def drawings(wide: str, narrow: str) -> str:
    """Wide drawing for a desk and narrow one for a phone; the style sheet shows the one that fits."""
    return f'<div class="sh-wide">{wide}</div><div class="sh-narrow">{narrow}</div>'
