"""HTML and text of the options page: criteria in force, what was found, one candidate, several together."""

from __future__ import annotations

import csv
import io
from collections.abc import Mapping, Sequence
from typing import Any

import numpy as np

from loads.checks import Check
from loads.records.wall import Wall
from loads.units import from_si
from loads.wall.criteria import CriteriaSet
from loads.wall.options import OptionGrid
from webapp.display import NO_BREAK, System, show, significant
from webapp.markup import escaped, subheading, table, verdict_mark
from webapp.options_candidate import Candidate, limits_elsewhere
from webapp.options_figures import counts
from webapp.options_ranges import Range, dimension_names, label, value_of
from webapp.options_state import Least, places_of, sizes_of, standing


def criteria_line(record: Wall, criteria: CriteriaSet | None) -> str:
    """Which criteria, edition and category are in force, what each asks, and what holds no limit."""
    if criteria is None:
        words = "No criteria set is in force: sliding, resultant and flotation are not checked."
        return f'<div class="sh-note"><b>{words}</b></div>'
    asked = []
    for name, values, unit in (
        ("sliding factor", criteria.sliding, ""),
        ("share of the base in compression", criteria.compression, f"{NO_BREAK}%"),
        ("flotation factor", criteria.flotation, ""),
        ("bearing factor", criteria.bearing, ""),
    ):
        least = values.get(record.category)
        asked.append(f"{name} {f'at least {least:g}{unit}' if least is not None else 'not checked'}")
    content = f"<b>Criteria in force: {escaped(criteria.words)}; load category {record.category}</b>"
    content += f"<br>{escaped('; '.join(asked))}"
    if criteria.remark:
        content += f"<br>{escaped(criteria.remark)}"
    return f'<div class="sh-note">{content}</div>'


def held_line(record: Wall, ranges: Sequence[Range]) -> str:
    """Dimensions that do not vary, and limits that the map does not hold."""
    varied = {one.name for one in ranges}
    held = [f"{label(n).lower()} {value_of(record, n)}" for n in dimension_names(record) if n not in varied]
    words = f"Held for all candidates: base at {record.base.text}, {', '.join(held)}."
    elsewhere = limits_elsewhere(record)
    if elsewhere:
        words += (
            f" The map does not hold {', '.join(elsewhere)}: these are checked for the least material, the "
            "candidate that you pick and for those side by side."
        )
    return f'<div class="sh-note">{escaped(words)}</div>'


def count_table(grid: OptionGrid, within: str) -> str:
    """How many candidates stand where."""
    rows = [[escaped(name), f"{number}"] for name, number in counts(grid, within)]
    return table(("candidates", "number"), rows, numeric={1})


def sizes_words(sizes: Mapping[str, str]) -> str:
    """Dimensions of a candidate in words."""
    return ", ".join(f"{label(name).lower()} {text}" for name, text in sizes.items())


def least_words(grid: OptionGrid, least: Least, ranges: Sequence[Range], system: System) -> str:
    """Least material within every limit entered, or why there is none."""
    if not grid.checks:
        words = "The map holds no limit, so no candidate is within any: enter criteria or limits."
    elif least.number is None and least.left:
        words = (
            f"The {least.tried} candidates of least material within the limits of the map are each above "
            f"another limit; {least.left} more were not looked at. Narrow the ranges."
        )
    elif least.number is None:
        words = "No candidate of these ranges is within every limit entered."
    else:
        sizes, area = sizes_of(ranges, places_of(grid, least.number)), float(grid.material[least.number])
        words = (
            f"Least material within every limit entered: {sizes_words(sizes)}; section area "
            f"{show(area, 'area', system)}. It is the least of these candidates only."
        )
    return f'<div class="sh-note"><b>{escaped(words)}</b></div>'


def candidate_part(title: str, candidate: Candidate, system: System) -> str:
    """All checks of one candidate, the governing one first."""
    head = subheading(title)
    head += (
        f'<div class="sh-line">{verdict_mark(candidate.verdict)} {escaped(governs(candidate))}; '
        f"section area {escaped(show(candidate.material, 'area', system))}</div>"
    )
    rows = [
        [
            escaped(check_name(check.subject, check.name)),
            verdict_mark(check.verdict()),
            _ratio(check),
            escaped(_demand(check, system)),
            escaped(check.limit.text) if check.limit else "",
            escaped(_set_by(check.source, candidate.criteria)),
        ]
        for check in candidate.checks
    ]
    headings = ("check", "verdict", "of limit", "demand", "limit", "limit set by")
    return head + table(headings, rows, numeric={2, 3})


def _set_by(source: str, criteria: CriteriaSet | None) -> str:
    return "criteria in force" if criteria and source.startswith(criteria.words) else source


def check_name(subject: str, name: str) -> str:
    """Check with the part that it is of, without the wall's id.

    Examples
    --------
    >>> check_name("wall W2, stem", "shear"), check_name("wall W2", "flotation")
    ('stem, shear', 'flotation')
    """
    part = subject.rpartition(", ")[2] if ", " in subject else ""
    return f"{part}, {name}" if part in ("stem", "heel", "toe") else name


def governs(candidate: Candidate) -> str:
    """Which check governs and how much of its limit it takes."""
    if not candidate.agrees:
        return "the two computations disagree; do not use this candidate's figures, report it"
    if not candidate.held:
        return "no limit entered"
    check = candidate.held[0]
    name, ratio = check_name(check.subject, check.name), float(check.ratio[0])
    share = f"{significant(ratio, 3)} of its limit" if np.isfinite(ratio) else "no figure below its limit"
    return f"{name} governs, {share}"


def _demand(check: Check, system: System) -> str:
    demand = float(check.demand[0])
    return show(demand, check.kind, system) if np.isfinite(demand) else "–"


def _ratio(check: Check) -> str:
    if check.limit is None:
        return ""
    ratio = float(check.ratio[0])
    return significant(ratio, 3) if np.isfinite(ratio) else "no figure"


def beside_table(candidates: Sequence[Candidate], system: System) -> str:
    """Candidates side by side: a column each, a row for each dimension and check."""
    records = [one.record for one in candidates]
    rows = [["shape", *(escaped(record.shape) for record in records)]]
    rows.append(["base", *(escaped(record.base.text) for record in records)])
    names = list(dict.fromkeys(name for record in records for name in dimension_names(record)))
    rows += [
        [
            label(name).lower(),
            *(escaped(value_of(r, name)) if name in dimension_names(r) else "–" for r in records),
        ]
        for name in names
    ]
    rows.append(["section area", *(escaped(show(one.material, "area", system)) for one in candidates)])
    rows.append(["verdict", *(verdict_mark(one.verdict) for one in candidates)])
    rows.append(["governs", *(escaped(governs(one)) for one in candidates)])
    held = [{check_name(c.subject, c.name): _ratio(c) for c in one.held} for one in candidates]
    for name in dict.fromkeys(name for checks in held for name in checks):
        rows.append([f"{escaped(name)}, of limit", *(checks.get(name, "not checked") for checks in held)])
    rows.append(["no limit entered for", *(escaped(_unheld(one)) for one in candidates)])
    rows.append(["criteria in force", *(escaped(_criteria(one)) for one in candidates)])
    headings = ("", *(f"{number}: {escaped(r.id)}" for number, r in enumerate(records, 1)))
    return table(headings, rows, numeric=set())


def _unheld(candidate: Candidate) -> str:
    names = [check_name(check.subject, check.name) for check in candidate.checks if check.limit is None]
    return "; ".join(names)


def _criteria(candidate: Candidate) -> str:
    criteria = candidate.criteria
    return f"{criteria.words}; {candidate.record.category}" if criteria else "none"


def grid_csv(grid: OptionGrid, ranges: Sequence[Range], criteria: CriteriaSet | None, within: str) -> bytes:
    """Every candidate as a row: dimensions in the unit typed, area, every ratio, how it stands.

    The first lines, each with a # before it, say the criteria in force and what a ratio is.
    """
    text = io.StringIO()
    text.write(f"# criteria in force: {criteria.words if criteria else 'none'}\n")
    text.write("# ratio: demand over limit, or factor asked for over factor found; screening figures\n")
    writer = csv.writer(text, lineterminator="\n")
    heads = [f"{one.name} [{one.unit}]" for one in ranges]
    ratios = [f"{name} [ratio]" for name in grid.checks]
    writer.writerow([*heads, "section area [m2]", *ratios, "largest ratio", "governs", "standing"])
    mesh = np.meshgrid(*(from_si(one.values, one.unit, "length") for one in ranges), indexing="ij")
    sizes = np.column_stack([axis.ravel() for axis in mesh])
    where = standing(grid)
    told = {-1: within, -2: "no section", -3: "not checked"}
    for number in range(len(where)):
        code, governing = int(where[number]), int(grid.governing[number])
        row: list[Any] = [f"{size:.10g}" for size in sizes[number]]
        row += [_plain(value) for value in (grid.material[number], *grid.ratios[number], grid.worst[number])]
        row += [grid.checks[governing] if governing >= 0 else "", told.get(code, "above limit")]
        writer.writerow(row)
    return text.getvalue().encode()


def _plain(value: float) -> str:
    return "" if np.isnan(value) else f"{value:.10g}"


def pick_words(grid: OptionGrid, number: int) -> str:
    """Figures of the map for a candidate, to hold against those of its own table."""
    told = [
        f"{name} {significant(float(ratio), 3)}"
        for name, ratio in zip(grid.checks, grid.ratios[number], strict=True)
        if np.isfinite(ratio)
    ]
    return f"In the map: {'; '.join(told)}." if told else "In the map: no limit is held."
