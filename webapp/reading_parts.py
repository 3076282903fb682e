"""The form of one reading on a page."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from typing import Any, get_args

import streamlit as st

from loads.records.reading import ReadingKind
from webapp import form_parts, forms, reading_form, reading_state

_WIDTHS = (3, 2, 2, 4, 2)


def reading_form_of(document: dict[str, Any], place: int, revision: int) -> None:
    """Form of the reading at a place, or of one more: the instrument's kind first, then what it asks."""
    table = reading_state.table_at(document, place)
    is_new = place == len(document.get("reading", ()))
    where = f"{revision}.reading.{place}"
    kind = _choice("Instrument", where, "kind", list(get_args(ReadingKind)), str(table["kind"]))
    ways = _leg_ways(where, table) if kind == "manometer" else []
    with st.form(f"reading {where}", border=True):
        changes = form_parts.draw_fields("reading", reading_form.HEAD_FIELDS, table, where)
        changes |= _draw("reading", reading_form.needed_fields(kind), table, where)
        legs = [_leg(number, way, table, where) for number, way in enumerate(ways)]
        for title, names in (
            ("More about this instrument", reading_form.optional_fields(kind)),
            ("Water at the instrument, where it is not the scenario's", reading_form.water_fields(kind)),
        ):
            if names:
                is_open = kind == "sealed logger" or any(name in table for name in names)
                with st.expander(title, expanded=is_open):
                    changes |= _draw("reading", names, table, where)
        changes |= form_parts.draw_fields("reading", ("note",), table, where)
        with st.container(horizontal=True):
            taken = st.form_submit_button("Take this reading", type="primary")
            removed = not is_new and st.form_submit_button("Remove this reading")
    if removed and form_parts.take(reading_state.with_reading(document, place, None)):
        st.rerun()
    if taken:
        changed = reading_form.reading_table(table, kind, changes, legs)
        if form_parts.take(reading_state.with_reading(document, place, changed)):
            st.session_state["chosen reading"] = str(changed["id"])
            st.rerun()


def _choice(label: str, where: str, name: str, options: list[str], first: str) -> str:
    key = f"field {where}.{name}"
    st.session_state.setdefault(key, first)
    st.selectbox(label, options, key=key, persist_state="session")
    return str(st.session_state[key])


def _text(label: str, key: str, first: str, placeholder: str = "", about: str = "") -> str:
    st.session_state.setdefault(key, first)
    st.text_input(
        label, key=key, placeholder=placeholder or None, help=about or None, persist_state="session"
    )
    return str(st.session_state[key] or "")


def _draw(
    record: str, names: Iterable[str], table: Mapping[str, Any], where: str, before: str = ""
) -> dict[str, object | None]:
    """Draw fields: each measured value with its range, source and date in a row, the others in rows."""
    changes: dict[str, object | None] = {}
    listed = [forms.field_of(record, name) for name in names]
    for field in [field for field in listed if field.kind == "quantity"]:
        changes[field.name] = _band(field, table.get(field.name), where, before)
    others = [field.name for field in listed if field.kind != "quantity"]
    return changes | form_parts.draw_fields(record, others, table, where)


def _band(field: forms.Field, value: object, where: str, before: str) -> object | None:
    shown, typed = reading_form.band_shown(value), {}
    label = f"{before}{field.label.lower()}" if before else field.label
    for part, column in zip(reading_form.BAND, st.columns(_WIDTHS, vertical_alignment="bottom"), strict=True):
        is_value = part == "value"
        with column:
            typed[part] = _text(
                label if is_value else f"{label}: {part}",
                f"field {where}.{field.name}.{part}",
                shown[part],
                placeholder=field.example if is_value else "2031-04-02" if part == "date" else "",
                about=field.meaning if is_value else "",
            )
    return reading_form.band_typed(typed)


def _leg_ways(where: str, table: Mapping[str, Any]) -> list[tuple[str, str]]:
    """How many legs there are, and how the fluid and the rise of each are given."""
    legs = list(table.get("leg", ()))
    key = f"field {where}.legs"
    st.session_state.setdefault(key, max(len(legs), 2))
    st.number_input(
        "Legs, from the tap in the water to the open end", 1, 12, key=key, persist_state="session"
    )
    ways = []
    for number in range(int(st.session_state[key])):
        leg = legs[number] if number < len(legs) else {}
        chosen = []
        for column, (what, options) in zip(
            st.columns(2),
            (("fluid", reading_form.FLUID_WAYS), ("rise", reading_form.RISE_WAYS)),
            strict=True,
        ):
            with column:
                first = reading_form.way_of(leg, options)
                label = f"Leg {number + 1}: {what} given as"
                chosen.append(_choice(label, f"{where}.leg.{number}", what, list(options), first))
        ways.append((chosen[0], chosen[1]))
    return ways


def _leg(number: int, ways: tuple[str, str], table: Mapping[str, Any], where: str) -> dict[str, Any]:
    legs = list(table.get("leg", ()))
    leg = legs[number] if number < len(legs) else {}
    own, before = f"{where}.leg.{number}", f"Leg {number + 1}: "
    fluid = [name for name in reading_form.FLUID_WAYS[ways[0]] if name != "water"]
    st.markdown(f"**Leg {number + 1}**")
    changes = form_parts.draw_fields("reading.leg", ("name",), leg, own)
    changes |= _draw("reading.leg", (*fluid, *reading_form.RISE_WAYS[ways[1]]), leg, own, before)
    if not fluid:
        changes["water"] = True
    return forms.merged({}, changes)
