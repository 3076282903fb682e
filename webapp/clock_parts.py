"""Forms of the forecast page for what the clock is told from: gauges, crews, drills and the local zone."""

from __future__ import annotations

import copy
from typing import Any

import streamlit as st

from loads.scenario_file import Document
from webapp import form_parts, forms
from webapp.clock_form import CLOCK_FIELDS, Path, tables_at, with_table_at
from webapp.markup import escaped

_NEW = "a new one"


def clock_forms(document: Document, revision: int) -> None:
    """Every form, each in a box that opens."""
    with st.expander("Gauges: zero, datum, what they can be trusted for"):
        number = _list_form(document, revision, "gauge", ("gauge",), "id")
        gauges = tables_at(document, ("gauge",))
        if number < len(gauges):
            name = escaped(gauges[number].get("name") or gauges[number]["id"])
            st.markdown(f"**How the water at the barriers differs from that at {name}**")
            _list_form(document, revision, "gauge.transfer", ("gauge", number, "transfer"), "to")
    with st.expander("Crews and what they can do"):
        _list_form(document, revision, "crew", ("crew",), "id")
    closures = {str(one["id"]): number for number, one in enumerate(document.get("closure", []))}
    if closures:
        with st.expander("Drills: what a trial erection took"):
            chosen = st.selectbox("Closure", list(closures), key=f"drill closure {revision}")
            path = ("closure", closures[str(chosen)], "clock", "drill")
            _list_form(document, revision, "clock.drill", path, "date")
    with st.expander("Local zone"), st.form(f"zone {revision}", border=False):
        zone = st.text_input(
            "Zone in which times are told",
            key=_kept(f"field {revision}.zone", str(document.get("zone", ""))),
            placeholder="America/Chicago",
        )
        if st.form_submit_button("Take this zone"):
            changed = forms.merged(document, {"zone": zone.strip() or None})
            if form_parts.take(changed):
                st.rerun()


def _kept(key: str, value: str) -> str:
    st.session_state.setdefault(key, value)
    return key


def _list_form(document: Document, revision: int, record: str, path: Path, named: str) -> int:
    """Choice of one table of a list, or of a new one, and its form; return which was chosen."""
    tables = tables_at(document, path)
    where = f"{revision}.{'.'.join(map(str, path))}"
    options = [*range(len(tables) + 1)]
    number = st.selectbox(
        f"Which {record.rpartition('.')[2]}",
        options,
        key=f"which {where}",
        format_func=lambda n: forms.shown(tables[n].get(named)) if n < len(tables) else _NEW,
    )
    table: dict[str, Any] = copy.deepcopy(tables[number]) if number < len(tables) else {}
    with st.form(f"form {where}.{number}", border=False):
        changes = form_parts.draw_fields(record, CLOCK_FIELDS[record], table, f"{where}.{number}")
        with st.container(horizontal=True):
            taken = st.form_submit_button("Take these values", type="primary")
            removed = number < len(tables) and st.form_submit_button("Remove")
    if removed and form_parts.take(with_table_at(document, path, number, None)):
        st.rerun()
    if taken and form_parts.take(with_table_at(document, path, number, forms.merged(table, changes))):
        st.rerun()
    return int(number)
