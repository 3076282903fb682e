"""Parts of the forecast page: the time it is told for, the what-if, and the form that takes a series."""

from __future__ import annotations

from datetime import datetime
from typing import Any, Literal, cast
from zoneinfo import ZoneInfo

import streamlit as st

from loads.line_clock import LineClock, line_clock
from loads.moments import now_of, utc
from loads.problems import ScenarioError
from loads.records.scenario import Scenario
from loads.series.series import KINDS, Kind
from loads.units import to_si
from webapp import forecast_state, form_parts, state
from webapp.display import System
from webapp.markup import escaped

NOW, MOVED = "forecast now", "forecast moved"
_STEPS: dict[System, tuple[str, float]] = {"US": ("ft", 1.0), "SI": ("m", 0.3)}
_ZONES = "an offset, CDT, or a name such as America/Chicago"


def controls(system: System) -> None:
    """The what-if of the crest, the time that everything is told for, and the unit system."""
    unit, step = _STEPS[system]
    st.session_state.setdefault(f"{MOVED} {unit}", 0.0)
    with st.container(horizontal=True, vertical_alignment="bottom", gap="small", key="forecast controls"):
        st.number_input(
            f"Crest above forecast, {unit}",
            key=f"{MOVED} {unit}",
            step=step,
            min_value=-20.0,
            max_value=20.0,
            width=210,
            persist_state="session",
            help="Moves the low, likely and high trace as a whole: a what-if that is kept nowhere.",
        )
        st.text_input(
            "Told for the time",
            key=NOW,
            placeholder="now",
            width=260,
            persist_state="session",
            help="Date and time with its zone, such as 2031-04-02T09:10:00-05:00; now when left empty.",
        )
        st.segmented_control("Units", ["US", "SI"], key="system", required=True, persist_state="session")


def raised(system: System) -> float:
    """How much higher than forecast the traces are taken. [m]."""
    unit, _ = _STEPS[system]
    return to_si(float(st.session_state.get(f"{MOVED} {unit}") or 0.0), unit, "length")


def told(scenario: Scenario, system: System) -> LineClock | None:
    """The clock of the line, or None with what is missing said in its place."""
    if not scenario.gauge:
        st.info(
            "This plan has no gauge yet, so no clock can be told. Enter one with the form below: its zero, "
            "its datum, and how the water at each barrier differs from that at the gauge."
        )
        return None
    try:
        return line_clock(scenario, _now(), raised(system))
    except ScenarioError as error:
        form_parts.show_problems(error.problems)
        return None


def _now() -> datetime:
    return now_of(str(st.session_state.get(NOW) or ""), "told for the time")


def exercise_note(moved: float) -> None:
    """Say that what is shown is a what-if, when it is one."""
    notes = []
    if moved:
        notes.append("the crest is moved: a what-if, not the forecast")
    if str(st.session_state.get(NOW) or "").strip():
        notes.append("told for a time that was typed, not for now: an exercise")
    if notes:
        st.warning("; ".join(notes).capitalize() + ".")


def age_help(line: LineClock) -> None:
    """Offer to tell the clock for the time of the newest issue, for an exercise with an old forecast."""
    issued = [
        utc(when)
        for news in line.gauges
        if news.off and news.forecast.issues and (when := news.forecast.newest.issued) is not None
    ]
    if issued:
        zone = ZoneInfo(line.scenario.zone or "UTC")
        st.button(
            "As an exercise, tell it for the time of the newest forecast",
            on_click=_tell_for,
            args=(max(issued).astimezone(zone).isoformat(),),
        )


def _tell_for(moment: str) -> None:
    st.session_state[NOW] = moment


def gauge_choice(line: LineClock) -> str:
    """Choice of one gauge where there are several."""
    names = {news.gauge.id: news.gauge.name or news.gauge.id for news in line.gauges}
    state.keep_choice(st.session_state, "forecast gauge", list(names))
    if len(names) > 1:
        st.selectbox("Gauge", list(names), key="forecast gauge", format_func=names.__getitem__)
    return str(st.session_state["forecast gauge"])


def trace_choice(line: LineClock) -> str | None:
    """Choice of the trace that the plan is made for; None without a forecast."""
    if not line.traces:
        return None
    options = list(line.traces)
    if st.session_state.get("forecast trace") not in options:
        st.session_state["forecast trace"] = "likely"
    st.segmented_control("Plan for", options, key="forecast trace", required=True, persist_state="session")
    return str(st.session_state["forecast trace"])


def chart(figure: dict[str, Any], words: str) -> None:
    """A figure with its text alternative."""
    st.plotly_chart(figure, alt=words, config={"displaylogo": False, "displayModeBar": False})


def series_form(scenario: Scenario) -> None:
    """Paste or upload readings or a forecast, of any format that is read."""
    note = st.session_state.pop("forecast note", None)
    if note:
        st.success("\n\n".join(escaped(sentence) for sentence in note))
    with st.form("series", border=True):
        pasted = st.text_area(
            "Readings or forecast, pasted",
            key="series text",
            height=160,
            placeholder="time [CDT],stage forecast [ft]\n2031-04-02 13:00,23.1\n2031-04-02 19:00,23.9",
            help="A table with commas, tabs or semicolons, USGS RDB or JSON, WaterML, NWS JSON or SHEF.",
        )
        upload = st.file_uploader("Or a file (at most 50 MB)", key="series file", max_upload_size=50)
        gauge, zone, unit = st.columns(3)
        names = {one.id: one.name or one.id for one in scenario.gauge}
        chosen = gauge.selectbox("Gauge it belongs to", list(names), format_func=names.__getitem__)
        zone.text_input("Zone, if the text has none", key="series zone", placeholder=_ZONES)
        unit.text_input("Unit, if the text has none", key="series unit", placeholder="ft")
        kind, issued, source = st.columns(3)
        told_kind = kind.selectbox("What it is, if the text does not say", ["", *KINDS], key="series kind")
        issued.text_input(
            "Issued, if the text does not say", key="series issued", placeholder="2031-04-02T09:10:00-05:00"
        )
        source.text_input("Where it comes from", key="series source", placeholder="forecast service")
        submitted = st.form_submit_button("Take this series", type="primary")
    if submitted:
        data = upload.getvalue() if upload is not None else str(pasted or "").encode()
        name = upload.name if upload is not None else "pasted"
        _take(data, str(chosen), cast("Literal['', 'observed', 'forecast']", told_kind), name)


def _take(data: bytes, gauge: str, kind: Literal["", "observed", "forecast"], name: str) -> None:
    typed = {part: str(st.session_state[f"series {part}"] or "") for part in ("zone", "unit", "issued")}
    known: Kind | None = kind or None
    pasted = forecast_state.Pasted(
        data=data,
        gauge=gauge,
        kind=known,
        source=str(st.session_state["series source"] or "").strip() or name,
        **typed,
    )
    taken = forecast_state.take_series(st.session_state, pasted)
    form_parts.show_problems(taken.problems)
    if not taken.problems:
        st.session_state["forecast note"] = taken.notes
        st.rerun()


def forget_button(gauge: str) -> None:
    """Take every forecast of a gauge out of the plan."""
    st.button(
        "Forget every forecast of this gauge",
        on_click=forecast_state.without_forecasts,
        args=(st.session_state, gauge),
    )
