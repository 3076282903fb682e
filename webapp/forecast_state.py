"""How series that were pasted or uploaded become part of a session's document. No Streamlit."""

from __future__ import annotations

import copy
from collections.abc import Sequence
from dataclasses import dataclass
from datetime import datetime
from typing import Any

from loads.gauge_conversion import as_readings
from loads.line_series import MOST_KEPT, stored_forecast, stored_observation
from loads.moments import now_of
from loads.problems import Problem, ScenarioError
from loads.records.gauge import Gauge
from loads.scenario_file import Document, scenario_of
from loads.series.issues import forecast_of
from loads.series.read import read_series
from loads.series.refusals import THE_FILE, refusal
from loads.series.series import Kind, Series
from webapp.state import Session, replace_document

MOST_ISSUES = 12
"""Issues of a forecast that a scenario keeps for a gauge; the oldest go first."""


@dataclass(frozen=True, kw_only=True)
class Pasted:
    """A series as it was given, and what its own text does not say.

    Attributes
    ----------
    data
        Its bytes.
    gauge
        Identifier of the gauge in the scenario.
    zone, unit, kind, issued
        Typed beside it; empty when the text says so itself.
    source
        Where it comes from.
    """

    data: bytes
    gauge: str
    zone: str = ""
    unit: str = ""
    kind: Kind | None = None
    issued: str = ""
    source: str = ""


@dataclass(frozen=True, kw_only=True)
class Taken:
    """What came of it: problems, or what was noted on reading."""

    problems: tuple[Problem, ...] = ()
    notes: tuple[str, ...] = ()


def take_series(session: Session, pasted: Pasted) -> Taken:
    """Read a series into the document of a session; the document stays as it was when anything is wrong."""
    document = session["document"]
    try:
        changed, notes = with_series(document, pasted)
    except ScenarioError as error:
        return Taken(problems=error.problems)
    problems = replace_document(session, changed)
    return Taken(problems=problems, notes=() if problems else notes)


def with_series(document: Document, pasted: Pasted) -> tuple[Document, tuple[str, ...]]:
    """Copy of a document with what a text holds for one of its gauges, and what was noted on reading.

    Raises
    ------
    ScenarioError
        The text cannot be read with certainty, or does not belong to the gauge.
    """
    scenario = scenario_of(document)
    gauge = next(one for one in scenario.gauge if one.id == pasted.gauge)
    issued = now_of(pasted.issued, "issued") if pasted.issued.strip() else None
    found = read_series(
        pasted.data,
        zone=pasted.zone.strip() or None,
        unit=pasted.unit.strip() or None,
        kind=pasted.kind,
    )
    own, notes = _own(found, gauge)
    for series in own:
        as_readings(series, gauge, scenario.datum)
        notes += series.notes
    changed = copy.deepcopy(document)
    observed = [series for series in own if series.kind == "observed"]
    if len(observed) > 1:
        names = ", ".join(series.name for series in observed)
        raise refusal(THE_FILE, f"holds several observed series ({names}); give the one that counts")
    for series in observed:
        _put(changed, "observed", stored_observation(series, gauge.id, pasted.source), pasted.gauge, None)
        if len(series) > MOST_KEPT:
            notes.append(f"Of {len(series)} readings the newest {MOST_KEPT} are kept.")
    issues = forecast_of(own).issues
    for issue in issues:
        stored = stored_forecast(issue, gauge.id, pasted.source, issued)
        _put(changed, "forecast", stored, pasted.gauge, stored.get("issued"))
    return changed, (_summary(len(observed), len(issues), gauge), *dict.fromkeys(notes))


def _summary(observed: int, issues: int, gauge: Gauge) -> str:
    parts = ["the readings"] if observed else []
    parts += [f"{issues} {'issue' if issues == 1 else 'issues'} of the forecast"] if issues else []
    return f"Taken for gauge {gauge.id}: {' and '.join(parts)}."


def _own(found: Sequence[Series], gauge: Gauge) -> tuple[list[Series], list[str]]:
    names = {name for name in (gauge.id, gauge.number, gauge.name) if name}
    own = [series for series in found if series.gauge in names]
    if own:
        return own, []
    others = list(dict.fromkeys(series.gauge for series in found))
    if len(others) > 1:
        listed = ", ".join(others[:8])
        raise refusal(THE_FILE, f"holds several gauges ({listed}), and none is {' or '.join(sorted(names))}")
    notes = [f"The text names its gauge {others[0]}; it was taken for {gauge.id}."] if others[0] else []
    return list(found), notes


def _put(document: Document, table: str, stored: dict[str, Any], gauge: str, issued: str | None) -> None:
    def replaced(one: dict[str, Any]) -> bool:
        if one["gauge"] != gauge:
            return False
        return table == "observed" or _same_issue(one.get("issued"), issued)

    kept = [one for one in document.get(table, []) if not replaced(one)]
    own = [one for one in kept if one["gauge"] == gauge]
    if table == "forecast" and len(own) >= MOST_ISSUES:
        dated = [one for one in own if one.get("issued") is not None]
        if dated:
            kept.remove(min(dated, key=lambda one: _when(one["issued"])))
    document[table] = [*kept, stored]


def _same_issue(one: object, other: str | None) -> bool:
    if one is None or other is None:
        return one is None and other is None
    return _when(one) == _when(other)


def _when(issued: object) -> datetime:
    return issued if isinstance(issued, datetime) else datetime.fromisoformat(str(issued))


def without_forecasts(session: Session, gauge: str) -> None:
    """Take every issue of a gauge's forecast out of the document of a session."""
    changed = copy.deepcopy(session["document"])
    changed["forecast"] = [one for one in changed.get("forecast", []) if one["gauge"] != gauge]
    if not changed["forecast"]:
        del changed["forecast"]
    replace_document(session, changed)
