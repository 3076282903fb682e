"""HTML of one barrier: headline, neighbouring states, loads by cause, worked steps."""

from __future__ import annotations

import math
from collections.abc import Sequence

from loads.assessment import Assessed, AssessedClosure, Withheld
from webapp.closure_markup import stack_figure
from webapp.display import PRINT_DIGITS, System, elevation, foot_of, load_kind, pedigree, show, show_all
from webapp.markup import escaped, ratio_words, table, verdict_mark
from webapp.part_words import check_title, first_words
from webapp.text_table import disagreement_text, first_limit_text, head_on


def headline(barrier: Assessed, system: System) -> str:
    """Verdict, force, moment and where the force acts, in large figures."""
    found, foot = barrier.resultant, foot_of(barrier.record.kind)
    action = float(found.line_of_action[0])
    arm = (
        show(action - barrier.face.bottom, "length", system) + f" above the {foot}"
        if math.isfinite(action)
        else "–"
    )
    figures = [
        (verdict_mark(barrier.verdict()), _governing(barrier)),
        (show(float(found.horizontal[0]), "force", system), _direction(float(found.horizontal[0]))),
        (show(float(found.moment[0]), "moment", system), f"moment about the {foot}"),
        (arm, "line of action"),
        (show(head_on(barrier), "length", system), "head, flood side"),
    ]
    if abs(float(found.vertical[0])) > 1e-9 * abs(float(found.horizontal[0])):
        way = "up" if found.vertical[0] > 0 else "down"
        figures.insert(2, (show(abs(float(found.vertical[0])), "force", system), f"vertical force, {way}"))
    cells = "".join(f"<div><b>{figure}</b><span>{words}</span></div>" for figure, words in figures)
    if isinstance(barrier, AssessedClosure):
        cells += stack_figure(barrier)
    return f'<div class="sh-big">{cells}</div>'


def _direction(force: float) -> str:
    if force == 0:
        return "horizontal force"
    return "horizontal force toward the " + ("protected side" if force > 0 else "flood side")


def _governing(barrier: Assessed) -> str:
    check = barrier.checks[0]
    if check.limit is None:
        return "no limit entered"
    return f"{ratio_words(check)}, {escaped(check_title(check, barrier.record.kind))}"


def withheld_notice(barrier: Withheld) -> str:
    """Say that a barrier's results are withheld and why."""
    words = escaped(disagreement_text(barrier.first, barrier.second, barrier.subject))
    return f"<p>{verdict_mark('withheld')}</p><p>{words}</p>"


def levels_note(barrier: Assessed, system: System) -> str:
    """Rated and first-limit level beside one another, each labelled as what it is."""
    rated = barrier.record.rated_level
    if rated is None:
        words = "Rated level: none entered. Ask the engineer of record."
    else:
        words = f"Rated level {elevation(rated.value, system)}, set by {pedigree(rated)}."
    first = barrier.first_limit
    if first is None:
        computed = "First-limit level: none can be computed, no load limit was entered."
    else:
        which = f" ({first_words(first, barrier.record.kind)})" if first.level is not None else ""
        computed = (
            f"First-limit level: {first_limit_text(barrier, system)}{which}; computed, a screening figure, "
            "never in place of the rated level."
        )
    agreed = barrier.recheck
    force, moment = (load_kind(barrier.record.kind, kind) for kind in ("force", "moment"))
    apart = float(agreed.difference[0])
    closeness = f"largest difference {apart:.0e} of the figure" if apart else "equal to rounding"
    second = (
        f"Second computation: force {show(float(agreed.horizontal[0]), force, system, PRINT_DIGITS)}, "
        f"moment {show(float(agreed.moment[0]), moment, system, PRINT_DIGITS)}; {closeness}."
    )
    return "".join(f'<div class="sh-note">{escaped(text)}</div>' for text in (words, computed, second))


def states_table(barrier: Assessed, labels: Sequence[str], system: System) -> str:
    """Force and moment in neighbouring states, with the change from the present one."""
    found = barrier.resultant
    forces = show_all([float(v) for v in found.horizontal], load_kind(barrier.record.kind, "force"), system)
    moments = show_all([float(v) for v in found.moment], load_kind(barrier.record.kind, "moment"), system)
    rows = [
        [
            escaped(label),
            elevation(float(barrier.levels.flood_side[i]), system),
            elevation(float(barrier.levels.protected_side[i]), system),
            forces[i],
            _change(float(found.horizontal[i]), float(found.horizontal[0])) if i else "",
            moments[i],
            _change(float(found.moment[i]), float(found.moment[0])) if i else "",
            verdict_mark(barrier.verdict(i)),
        ]
        for i, label in enumerate(labels)
    ]
    headings = ("state", "flood side", "protected side", "force", "change", "moment", "change", "verdict")
    return table(headings, rows, numeric={1, 2, 3, 4, 5, 6})


def _change(value: float, present: float) -> str:
    if present == 0 or value * present < 0:
        return "–"
    share = value / present - 1
    return f"{'+' if share >= 0 else '−'}{abs(share) * 100:.0f} %"


def load_table(barrier: Assessed, system: System) -> str:
    """Force and moment by cause, and their sum."""
    parts = [
        (name, part)
        for name, part in barrier.by_load.items()
        if part.horizontal[0] != 0 or part.moment[0] != 0
    ]
    names = [escaped(name) for name, _ in parts] + ["net"]
    found = [part for _, part in parts] + [barrier.resultant]
    columns = [
        show_all([float(getattr(part, name)[0]) for part in found], kind, system)
        for name, kind in (("horizontal", "force"), ("vertical", "force"), ("moment", "moment"))
    ]
    rows = [list(row) for row in zip(names, *columns, strict=True)]
    headings = (
        "cause",
        "horizontal force",
        "vertical force",
        f"moment about the {foot_of(barrier.record.kind)}",
    )
    return table(headings, rows, numeric={1, 2, 3}, total=True)
