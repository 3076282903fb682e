"""Forms on a page: fields drawn from their records, and the typed values read back."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from itertools import groupby
from typing import Any

import streamlit as st

from loads.problems import Problem
from loads.records.basis import Basis
from webapp import barrier_state, forms, state
from webapp.closure_form import CLOSURE_FORM
from webapp.markup import escaped

_COLUMNS = 3


def draw_fields(
    record: str, names: Iterable[str], table: Mapping[str, Any], place: str
) -> dict[str, object | None]:
    """Draw fields of a record in rows and return what they hold now, ready for the document."""
    listed = list(names)
    changes: dict[str, object | None] = {}
    plain = [name for name in listed if not forms.has_pedigree(record, forms.field_of(record, name))]
    for start in range(0, len(plain), _COLUMNS):
        for column, name in zip(st.columns(_COLUMNS), plain[start : start + _COLUMNS], strict=False):
            with column:
                changes[name] = _draw(record, name, table, place)
    for name in [name for name in listed if name not in plain]:
        changes[name] = _draw_with_pedigree(record, name, table, place)
    return changes


def _key(place: str, name: str, value: str) -> str:
    key = f"field {place}.{name}"
    if key not in st.session_state:
        st.session_state[key] = value
    return key


def _draw(record: str, name: str, table: Mapping[str, Any], place: str) -> object | None:
    field, before = forms.field_of(record, name), table.get(name)
    key = _key(place, name, forms.shown(before, field.kind))
    if field.kind in ("choice", "flag"):
        choices = ["yes", "no"] if field.kind == "flag" else list(field.choices)
        options = ["", *choices]
        st.selectbox(field.label, options, key=key, help=field.meaning or None, persist_state="session")
    elif field.kind in ("points", "holes", "lines"):
        st.text_area(
            field.label,
            key=key,
            help=field.meaning,
            placeholder=field.example or None,
            height=90 if field.kind == "lines" else 150,
            persist_state="session",
        )
    else:
        st.text_input(
            field.label,
            key=key,
            help=field.meaning or None,
            placeholder=field.example or None,
            persist_state="session",
        )
    return forms.typed_value(field, str(st.session_state[key] or ""), before)


def _draw_with_pedigree(record: str, name: str, table: Mapping[str, Any], place: str) -> object | None:
    value_column, source_column, date_column = st.columns((2, 4, 2))
    with value_column:
        value = _draw(record, name, table, place)
    source, day = forms.pedigree_shown(table.get(name))
    label = forms.field_of(record, name).label
    with source_column:
        source_key = _key(place, f"{name} source", source)
        st.text_input(f"{label}: who set it", key=source_key, persist_state="session")
    with date_column:
        date_key = _key(place, f"{name} date", day)
        st.text_input(f"{label}: date", key=date_key, placeholder="2030-03-02", persist_state="session")
    return forms.with_pedigree(value, st.session_state[source_key], st.session_state[date_key])


def take(document: dict[str, Any]) -> bool:
    """Take an edited document into the session, or list what is wrong; what was typed stays either way."""
    problems = state.replace_document(st.session_state, document)
    show_problems(problems)
    return not problems


def show_problems(problems: Iterable[Problem]) -> None:
    """List problems, each on a line of its own."""
    listed = list(problems)
    if listed:
        words = "\n".join(f"- {escaped(str(problem))}" for problem in listed)
        st.error(f"Nothing was changed; what you typed is still here.\n\n{words}")


def panel_form(document: dict[str, Any], place: barrier_state.Place, revision: int) -> None:
    """Form of one panel: shape, geometry, rated level and limits."""
    panel = barrier_state.record_at(document, place)
    where = _where(revision, place)
    shapes = list(forms.SHAPE_FIELDS)
    st.selectbox("Shape", shapes, key=_key(where, "shape", str(panel.get("shape", "rectangle"))))
    shape = st.session_state[f"field {where}.shape"]
    with st.form(f"panel {where}", border=True):
        changes = draw_fields(
            "panel", ("id", "name", "bottom", *forms.SHAPE_FIELDS[shape], "note"), panel, where
        )
        st.markdown("**Rated level and limits that somebody set**")
        changes |= draw_fields("panel", ("rated_level",), panel, where)
        limits = draw_fields(
            "limits", ("pressure", "force", "moment", "freeboard"), panel.get("limits", {}), where
        )
        if st.form_submit_button("Take these values", type="primary"):
            kept = forms.without_other(panel, forms.SHAPE_FIELDS, shape)
            changed = forms.with_table({**kept, "shape": shape}, (), changes)
            changed = forms.with_table(changed, ("limits",), limits)
            if take(barrier_state.with_barrier(document, place, changed)):
                st.rerun()


def closure_form(document: dict[str, Any], place: barrier_state.Place, revision: int) -> None:
    """Form of one closure, section by section; the first stands open."""
    record, where = barrier_state.record_at(document, place), _where(revision, place)
    changed: dict[str, Any] = dict(record)
    with st.form(f"closure {where}", border=True):
        for section, parts in groupby(CLOSURE_FORM, key=lambda part: part.section):
            box = st.expander(section) if section else st.container()
            with box:
                for part in parts:
                    if part.title:
                        st.markdown(f"**{part.title}**")
                    table = forms.table_at(record, part.path)
                    own = ".".join((where, *part.path))
                    changes = draw_fields(part.record_name, part.asked, table, own)
                    changed = forms.with_table(changed, part.path, changes)
        submitted = st.form_submit_button("Take these values", type="primary")
        if submitted and take(barrier_state.with_barrier(document, place, changed)):
            st.rerun()


BARRIER_FORMS = {"panel": panel_form, "closure": closure_form}
"""Form of each kind of barrier."""


def _where(revision: int, place: barrier_state.Place) -> str:
    return f"{revision}.{place[0]}.{place[1]}"


def sediment_form(document: dict[str, Any], place: barrier_state.Place, revision: int) -> None:
    """Forms of the sediment layers of one barrier, one layer each, and a form for another."""
    record = barrier_state.record_at(document, place)
    layers = record.get("sediment", [])
    where = f"{_where(revision, place)}.sediment"
    for number, layer in enumerate(layers):
        title = f"Sediment {number + 1}: {escaped(layer.get('name', ''))} {layer.get('side', '')} side"
        with st.expander(title):
            _layer_form(document, place, number, f"{where}.{number}", layer, new=False)
    foot = forms.shown(record.get("bottom") or record.get("sill"))
    fresh = {"side": "flood", "top": foot, "pressure": "at rest"}
    with st.expander("Add a sediment layer"):
        _layer_form(document, place, len(layers), f"{where}.new", fresh, new=True)


def _layer_form(
    document: dict[str, Any],
    place: barrier_state.Place,
    number: int,
    where: str,
    layer: dict[str, Any],
    *,
    new: bool,
) -> None:
    st.selectbox("Pressure", list(forms.PRESSURE_FIELDS), key=_key(where, "pressure", str(layer["pressure"])))
    pressure = st.session_state[f"field {where}.pressure"]
    with st.form(f"layer {where}", border=False):
        names = ("name", "side", "top", *forms.PRESSURE_FIELDS[pressure])
        changes = draw_fields("sediment", names, layer, where)
        with st.container(horizontal=True):
            taken = st.form_submit_button("Take this layer", type="primary")
            removed = not new and st.form_submit_button("Remove this layer")
        if removed and take(barrier_state.with_layer(document, place, number, None)):
            st.rerun()
        if taken:
            kept = forms.without_other(layer, forms.PRESSURE_FIELDS, pressure)
            changed = forms.merged(kept, {**changes, "pressure": pressure})
            if take(barrier_state.with_layer(document, place, number, changed)):
                st.rerun()


def scenario_form(document: dict[str, Any], revision: int) -> None:
    """Form of the scenario's description and its water."""
    place, water = f"{revision}.scenario", document["water"]
    with st.form("scenario", border=False):
        names = ("title", "location", "purpose", "author", "revision", "status", "datum", "near_limit")
        changes = draw_fields("scenario", names, document, place)
        st.markdown("**Water**")
        own = ("fluid", "temperature", "salinity", "suspended_sediment", "unit_weight")
        described = draw_fields(
            "water", (*own, *(f"protected_{name}" for name in own)), water, f"{place}.water"
        )
        st.markdown("**Design basis of every limit of a part**")
        basis = draw_fields("basis", Basis.model_fields, document.get("basis", {}), f"{place}.basis")
        if st.form_submit_button("Take these values", type="primary"):
            changed = forms.with_table(forms.merged(document, changes), ("water",), described)
            changed = forms.with_table(changed, ("basis",), basis)
            if take(changed):
                st.rerun()
