"""The package as one HTML page: its parts gathered as text and set by the templates."""

from __future__ import annotations

import math
import re
from functools import cache
from pathlib import Path
from typing import Any

from jinja2 import Environment, FileSystemLoader, StrictUndefined
from markupsafe import Markup, escape

from loads.assessment import Assessed, Assessment, Barrier, Withheld, assess
from loads.cautions import ASSUMPTIONS, CAUTIONS, HEADLINE, NOT_COUNTED
from loads.document import check_code
from loads.method import METHODS
from loads.records.scenario import Scenario, zone_name
from loads.references import REFERENCES
from loads.scenario_file import Document, write_document
from webapp.display import System, barrier_title, elevation, load_kind, pedigree
from webapp.package.barrier import (
    BarrierView,
    WithheldView,
    barrier_view,
    withheld_view,
)
from webapp.package.closure import CLOSURE_ASSUMPTIONS
from webapp.package.drawings import flood_line_drawing
from webapp.package.entered import entry_groups, taken
from webapp.package.grid import Grid, Heading, words
from webapp.package.states import levels_of_states, package_states
from webapp.package.tables import RESULT_DIGITS, bare, largest_ratio, ratio_of
from webapp.part_words import check_title
from webapp.step_text import figure, unit_of, with_unit

SHEETS: dict[System, str] = {"US": "letter", "SI": "A4"}
"""Size of the sheet by unit system, as CSS spells it."""
SHEET_NAMES: dict[System, str] = {"US": "US Letter", "SI": "A4"}
NOT_STATED = "not stated"
_COMMENT_ROWS = 8
_LOW = re.compile(r"(?<=\w)_([A-Za-z]+)")


@cache
def _environment() -> Environment:
    environment = Environment(
        loader=FileSystemLoader(Path(__file__).parent / "templates"),
        autoescape=True,
        undefined=StrictUndefined,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    environment.filters["symbols"] = symbols
    return environment


def symbols(text: str) -> Markup:
    """Formula with what follows an underscore set low.

    Examples
    --------
    >>> symbols("h_f = L_f < z")
    Markup('h<sub>f</sub> = L<sub>f</sub> &lt; z')
    """
    return Markup(_LOW.sub(r"<sub>\1</sub>", str(escape(text))))  # noqa: S704  escaped first


def package_html(assessment: Assessment, document: Document, *, digest: str, version: str) -> str:
    """Calculation package of an assessment as one HTML page with its style and drawings in it.

    Parameters
    ----------
    assessment
        Of the scenario's own levels, one state.
    document
        What it was computed from; it is printed as the scenario file.
    digest
        Fingerprint of the document.
    version
        Of the program.

    Returns
    -------
    str
        The same for the same input.
    """
    parts = {
        **_cover(assessment.scenario, digest, version),
        **_computed(assessment),
        **_stated(assessment.scenario),
        "fluids": _fluids(assessment),
        "file_text": write_document(document).decode(),
    }
    return _environment().get_template("package.html").render(parts)


def _cover(scenario: Scenario, digest: str, version: str) -> dict[str, Any]:
    system = scenario.units
    kinds = ("length", "pressure", "unit weight", "force", "moment")
    return {
        "sheet": SHEETS[system],
        "sheet_name": SHEET_NAMES[system],
        "scenario": scenario,
        "not_stated": NOT_STATED,
        "digest": digest,
        "code": check_code(digest),
        "version": version,
        "levels": _levels(scenario),
        "headline": HEADLINE,
        "units": [(kind, unit_of(kind, system)) for kind in kinds],
        "comment_rows": _COMMENT_ROWS,
    }


def _computed(assessment: Assessment) -> dict[str, Any]:
    """Drawing of the line, tables of results, and every barrier."""
    scenario = assessment.scenario
    states = package_states(scenario)
    many = assess(scenario, levels_of_states(states))
    views: list[BarrierView | WithheldView] = [
        barrier_view(barrier, many, states, scenario.datum)
        if isinstance(barrier, Assessed)
        else withheld_view(barrier, scenario.units, scenario.datum)
        for barrier in assessment.barriers
    ]
    return {
        "line": flood_line_drawing(assessment, scenario.units),
        "summary": _summary(assessment),
        "governing": _governing(many, [state.name for state in states]),
        "states": _states_grid(assessment),
        "barriers": views,
    }


def _stated(scenario: Scenario) -> dict[str, Any]:
    """What was entered, what it rests on, and where the methods come from."""
    return {
        "groups": entry_groups(scenario),
        "taken": taken(scenario),
        "assumptions": (*ASSUMPTIONS, *(CLOSURE_ASSUMPTIONS if scenario.closure else ())),
        "not_counted": NOT_COUNTED,
        "methods": METHODS,
        "references": _references(),
        "cautions": CAUTIONS,
    }


def _levels(scenario: Scenario) -> list[tuple[str, str, str]]:
    """Each level with its source; then the time of both."""
    water, system = scenario.water, scenario.units
    rows = []
    for side, level in (("Flood side", water.flood_side), ("Protected side", water.protected_side)):
        if level is None:
            rows.append((side, "dry", "no level entered"))
            continue
        text = elevation(level.value, system, scenario.datum)
        rows.append((side, text, f"entered as {level.text}; {pedigree(level)}"))
    moment = water.as_of
    stamp = f"{moment:%Y-%m-%d %H:%M} {zone_name(moment)}" if moment else "no time stated"
    return [*rows, ("Levels as of", stamp, "")]


def _summary(assessment: Assessment) -> Grid:
    scenario = assessment.scenario
    system, datum = scenario.units, scenario.datum
    level = f"{unit_of('elevation', system)} {datum}"
    headings = (
        words("barrier"),
        Heading(text="bottom", unit=level),
        Heading(text="top", unit=level),
        Heading(text="H", unit=unit_of("force", system)),
        Heading(text="M", unit=unit_of("moment", system)),
        Heading(text="line of action", unit=level),
        Heading(text="largest ratio"),
        words("of"),
        Heading(text="rated level", unit=level),
        Heading(text="first-limit level", unit=level),
        words("verdict"),
    )
    return Grid(headings=headings, rows=tuple(_summary_row(each, system) for each in assessment.barriers))


def _summary_row(barrier: Barrier, system: System) -> tuple[str, ...]:
    record = barrier.record
    name = barrier_title(record.id, record.name)
    rated = _bare(record.rated_level.value, system) if record.rated_level else "–"
    if not isinstance(barrier, Assessed):
        bottom = barrier.setting.panel.bottom.value
        return (name, _bare(bottom, system), *("–",) * 6, rated, "–", barrier.verdict())
    found, face = barrier.resultant, barrier.face
    column = largest_ratio(barrier, 0)
    check = None if column is None else barrier.checks[column]
    first = barrier.first_limit.level if barrier.first_limit else None
    return (
        name,
        _bare(face.bottom, system),
        _bare(face.top, system),
        _load_cell(float(found.horizontal[0]), record.kind, "force", system),
        _load_cell(float(found.moment[0]), record.kind, "moment", system),
        _bare(float(found.line_of_action[0]), system),
        ratio_of(check, 0) if check else "–",
        check_title(check, record.kind) if check else "–",
        rated,
        "–" if first is None else _bare(first, system),
        barrier.verdict(),
    )


def _load_cell(value: float, barrier: str, kind: str, system: System) -> str:
    """Force or moment; that of a wall with its unit, which is per length and not that of the heading."""
    shown = load_kind(barrier, kind)
    if shown == kind:
        return figure(value, kind, system, RESULT_DIGITS)
    return with_unit(value, shown, system, RESULT_DIGITS)


def _bare(level: float, system: System) -> str:
    """Elevation without its unit, which stands in the heading; a dash where there is none."""
    return bare(level, system) if math.isfinite(level) else "–"


def _governing(many: Assessment, names: list[str]) -> list[str]:
    """Which check has the largest ratio, at the entered levels and over all states."""
    found = [
        (float(barrier.checks.ratio[i, column]), i, barrier, column)
        for barrier in many.barriers
        if isinstance(barrier, Assessed)
        for i in range(len(names))
        for column in (largest_ratio(barrier, i),)
        if column is not None
    ]
    if not found and any(isinstance(barrier, Withheld) for barrier in many.barriers):
        return ["Results are withheld, so no ratio is given."]
    if not found:
        return ["No limit was entered for any barrier, so nothing governs."]
    now = max((item for item in found if item[1] == 0), key=lambda item: item[0])
    ever = max(found, key=lambda item: item[0])
    first = f"Largest ratio at the levels entered: {_ratio_words(*now[2:], now[1])}."
    most = f"Largest ratio of all states computed: {_ratio_words(*ever[2:], ever[1])}"
    return [first, f"{most}, state “{names[ever[1]]}”."]


def _ratio_words(barrier: Assessed, column: int, index: int) -> str:
    check, record = barrier.checks[column], barrier.record
    ratio = ratio_of(check, index)
    return f"{ratio}, {record.kind} {record.id}, {check_title(check, record.kind)}"


def _fluids(assessment: Assessment) -> Grid:
    system = assessment.scenario.units
    headings = (words("side"), Heading(text="unit weight"), words("where it comes from"))
    rows = tuple(
        (f"{side} side", with_unit(fluid.unit_weight, "unit weight", system), fluid.basis)
        for side, fluid in assessment.fluids.items()
    )
    return Grid(headings=headings, rows=rows)


def _states_grid(assessment: Assessment) -> Grid:
    scenario = assessment.scenario
    level = f"{unit_of('elevation', scenario.units)} {scenario.datum}"
    headings = (
        Heading(text="no."),
        words("state"),
        Heading(text="flood side", unit=level),
        Heading(text="protected side", unit=level),
        words("loads"),
    )
    rows = tuple(
        (
            str(number),
            state.name,
            bare(state.flood_side, scenario.units),
            bare(state.protected_side, scenario.units),
            "still water and sediment as entered",
        )
        for number, state in enumerate(package_states(scenario), 1)
    )
    return Grid(headings=headings, rows=rows)


def _references() -> list[Any]:
    """References that a method cites, in alphabetical order of their keys."""
    cited = {key for group in METHODS for method in group.methods for key in method.sources}
    return [REFERENCES[key] for key in sorted(cited)]
