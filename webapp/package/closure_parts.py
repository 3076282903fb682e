"""Tables of the logs and of the posts of a closure, those that are alike once."""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass

from loads.assessment import AssessedClosure
from loads.part import Part
from webapp.check_groups import PartRatios
from webapp.display import System, elevation
from webapp.package.grid import Grid, Heading, words
from webapp.package.tables import RESULT_DIGITS, bare, ratio_text
from webapp.part_words import bay_groups, numbered, parts_text
from webapp.step_text import show_column, unit_of, with_unit

_POST_FIGURES = (
    ("base_shear", "shear at the base", "force"),
    ("base_moment", "moment at the base", "moment"),
    ("brace_moment", "moment at the brace", "moment"),
    ("brace_force", "force along the brace", "force"),
    ("anchor_tension", "tension of all bolts pulled", "force"),
    ("bolt_tension", "tension of the bolt pulled most", "force"),
    ("bolt_shear", "shear of each bolt", "force"),
    ("contact_pressure", "pressure under the plate", "stress"),
    ("bending_stress", "bending stress", "stress"),
    ("shear_stress", "shear stress", "stress"),
)


@dataclass(frozen=True, kw_only=True)
class Titled:
    """A table with its title."""

    title: str
    grid: Grid


def log_grids(barrier: AssessedClosure, system: System, datum: str) -> tuple[Titled, ...]:
    """Logs of the first bay of every kind."""
    layout = barrier.structure.layout
    kinds = list(zip(layout.clear, layout.counts, strict=True))
    by_name = {part.id: part for part in barrier.parts}
    tables = []
    for bays in bay_groups(kinds):
        bay = bays[0] - 1
        logs = [by_name[f"bay {bays[0]} log {row}"] for row in range(1, layout.counts[bay] + 1)]
        name = numbered("bay", bays)
        title = (
            f"Logs of {name}{', each' if len(bays) > 1 else ''}: span L = "
            f"{with_unit(float(layout.spans[bay]), 'length', system)}, {len(logs)} of "
            f"{barrier.record.on_hand[bay]} in place, top {elevation(float(layout.tops[bay]), system, datum)}"
        )
        if logs:
            tables.append(Titled(title=title, grid=_log_grid(barrier, logs, system, datum)))
        else:
            tables.append(Titled(title=f"{title}: open", grid=Grid(headings=(words("log"),), rows=())))
    return tuple(tables)


def _log_grid(barrier: AssessedClosure, logs: Sequence[Part], system: System, datum: str) -> Grid:
    ratios = PartRatios(barrier)
    columns = [
        ("w", "line load", [float(log.line_load[0]) for log in logs]),
        ("M", "moment", [float(log.moment[0]) for log in logs]),
        ("R", "force", [float(log.reaction[0]) for log in logs]),
        ("bearing", "stress", [_more(log, "bearing_pressure") for log in logs]),
        ("bending", "stress", [_more(log, "bending_stress") for log in logs]),
        ("shear", "stress", [_more(log, "shear_stress") for log in logs]),
        ("deflection", "deflection", [float(log.deflection[0]) for log in logs]),
    ]
    known = [column for column in columns if not all(math.isnan(value) for value in column[2])]
    level = f"{unit_of('elevation', system)} {datum}"
    headings = (
        Heading(text="log"),
        Heading(text="bottom", unit=level),
        Heading(text="top", unit=level),
        *(Heading(text=text, unit=unit_of(kind, system)) for text, kind, _ in known),
        Heading(text="largest ratio"),
        words("verdict"),
    )
    cells = [show_column(values, kind, system, RESULT_DIGITS) for _, kind, values in known]
    rows = tuple(
        (
            log.id.rsplit(" ", 1)[1],
            bare(log.bottom, system),
            bare(log.top, system),
            *(column[place] for column in cells),
            ratio_text(ratios.ratio(log.id, 0), "part"),
            barrier.verdict_of(log.id),
        )
        for place, log in enumerate(logs)
    )
    return Grid(headings=headings, rows=rows)


def post_grid(barrier: AssessedClosure, system: System) -> Grid:
    """Posts and guides, those alike in one column, figures in rows."""
    ratios = PartRatios(barrier)
    pieces = {upright.name: upright.pieces for upright in barrier.structure.layout.posts}
    uprights = [part for part in barrier.parts if part.kind != "log"]
    keys = [pieces.get(part.id, (part.kind, part.top, float(part.reaction[0]))) for part in uprights]
    groups = [[uprights[number - 1] for number in numbers] for numbers in bay_groups(keys)]
    firsts = [group[0] for group in groups]
    figures = [
        ("whole load", "force", [float(part.reaction[0]) for part in firsts]),
        ("greatest moment", "moment", [float(part.moment[0]) for part in firsts]),
        ("greatest shear", "force", [float(part.shear[0]) for part in firsts]),
        *((text, kind, [_more(part, name) for part in firsts]) for name, text, kind in _POST_FIGURES),
        ("greatest deflection", "deflection", [float(part.deflection[0]) for part in firsts]),
    ]
    rows = [
        (text, *(with_unit(value, kind, system, RESULT_DIGITS) for value in values))
        for text, kind, values in figures
        if not all(math.isnan(value) for value in values)
    ]
    rows.append(("largest ratio", *(ratio_text(ratios.ratio(part.id, 0), "part") for part in firsts)))
    rows.append(("verdict", *(barrier.verdict_of(part.id) for part in firsts)))
    names = (Heading(text=parts_text(part.id for part in group)) for group in groups)
    return Grid(headings=(words("figure"), *names), rows=tuple(rows))


def _more(part: Part, name: str) -> float:
    return next((float(figure.value[0]) for figure in part.more if figure.name == name), math.nan)
