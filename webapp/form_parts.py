"""Forms on a page: fields drawn from their records, and the typed values read back."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any

import streamlit as st

from loads.problems import Problem
from webapp import forms, state
from webapp.markup import escaped

_COLUMNS = 3


def draw_fields(
    record: str, names: Iterable[str], table: Mapping[str, Any], place: str
) -> dict[str, object | None]:
    """Draw fields of a record in rows and return what they hold now, ready for the document."""
    listed = list(names)
    changes: dict[str, object | None] = {}
    plain = [name for name in listed if name not in forms.PEDIGREED or record == "sediment"]
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
    key = _key(place, name, forms.shown(before))
    if field.kind == "choice":
        options = ["", *field.choices] if before is None or not table.get(name) else list(field.choices)
        st.selectbox(field.label, options, key=key, help=field.meaning or None, persist_state="session")
    elif field.kind in ("points", "holes"):
        st.text_area(
            field.label,
            key=key,
            help=field.meaning,
            placeholder=field.example,
            height=150,
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


def panel_form(document: dict[str, Any], index: int, revision: int) -> None:
    """Form of one panel: shape, geometry, rated level and limits."""
    panel = document["panel"][index]
    place = f"{revision}.panel.{index}"
    shapes = list(forms.SHAPE_FIELDS)
    st.selectbox("Shape", shapes, key=_key(place, "shape", str(panel.get("shape", "rectangle"))))
    shape = st.session_state[f"field {place}.shape"]
    with st.form(f"panel {place}", border=True):
        changes = draw_fields(
            "panel", ("id", "name", "bottom", *forms.SHAPE_FIELDS[shape], "note"), panel, place
        )
        st.markdown("**Rated level and limits that somebody set**")
        changes |= draw_fields("panel", ("rated_level",), panel, place)
        limits = draw_fields(
            "limits", ("pressure", "force", "moment", "freeboard"), panel.get("limits", {}), place
        )
        if st.form_submit_button("Take these values", type="primary"):
            kept = forms.without_other(panel, forms.SHAPE_FIELDS, shape)
            changed = forms.merged(kept, {**changes, "shape": shape})
            entered = forms.merged(panel.get("limits", {}), limits)
            changed = forms.merged(changed, {"limits": entered or None})
            if take(state.with_panel(document, index, changed)):
                st.rerun()


def sediment_form(document: dict[str, Any], index: int, revision: int) -> None:
    """Forms of the sediment layers of one panel, one layer each, and a button for another."""
    layers = document["panel"][index].get("sediment", [])
    for number, layer in enumerate(layers):
        with st.expander(
            f"Sediment {number + 1}: {escaped(layer.get('name', ''))} {layer.get('side', '')} side"
        ):
            _layer_form(document, index, number, f"{revision}.panel.{index}.sediment.{number}")
    fresh = {
        "side": "flood",
        "top": forms.shown(document["panel"][index]["bottom"]),
        "pressure": "at rest",
    }
    with st.expander("Add a sediment layer"):
        _layer_form(document, index, len(layers), f"{revision}.panel.{index}.sediment.new", fresh)


def _layer_form(
    document: dict[str, Any], index: int, number: int, place: str, fresh: dict[str, Any] | None = None
) -> None:
    layer = fresh or document["panel"][index]["sediment"][number]
    st.selectbox("Pressure", list(forms.PRESSURE_FIELDS), key=_key(place, "pressure", str(layer["pressure"])))
    pressure = st.session_state[f"field {place}.pressure"]
    with st.form(f"layer {place}", border=False):
        names = ("name", "side", "top", *forms.PRESSURE_FIELDS[pressure])
        changes = draw_fields("sediment", names, layer, place)
        with st.container(horizontal=True):
            taken = st.form_submit_button("Take this layer", type="primary")
            removed = fresh is None and st.form_submit_button("Remove this layer")
        if removed and take(state.with_layer(document, index, number, None)):
            st.rerun()
        if taken:
            kept = forms.without_other(layer, forms.PRESSURE_FIELDS, pressure)
            changed = forms.merged(kept, {**changes, "pressure": pressure})
            if take(state.with_layer(document, index, number, changed)):
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
        if st.form_submit_button("Take these values", type="primary"):
            changed = forms.merged(document, changes)
            changed["water"] = forms.merged(water, described)
            if take(changed):
                st.rerun()
