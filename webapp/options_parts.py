"""Widgets of the options page that say what to compute: the wall to start from and the ranges."""

from __future__ import annotations

from collections.abc import Sequence

import streamlit as st

from loads.assessment import Assessment
from loads.barrier import Site
from loads.problems import Problem
from loads.records.wall import Wall
from loads.scenario_file import Document
from loads.wall.criteria import CATEGORIES, CRITERIA
from loads.wall.options import OptionGrid
from webapp import options_base, options_ranges, options_state, parts, state
from webapp.display import System
from webapp.markup import escaped
from webapp.options_candidate import Table
from webapp.options_ranges import Range

_NONE = "none"


def show_problems(problems: Sequence[Problem]) -> None:
    """Say what is wrong; what was typed stays."""
    st.error("\n".join(f"- {escaped(str(problem))}" for problem in problems))


def heading(site: Site) -> None:
    """Title of the scenario; its barriers are not computed for this page."""
    parts.heading(Assessment(scenario=site.scenario, levels=site.levels, fluids=site.fluids, barriers=()))


def base_choice(document: Document) -> str:
    """Choice of the wall to start from."""
    titles = options_base.base_titles(document)
    state.keep_choice(st.session_state, "options base", list(titles))
    st.selectbox(
        "Wall to start from",
        list(titles),
        key="options base",
        format_func=titles.__getitem__,
        persist_state="session",
    )
    return str(st.session_state["options base"])


def base_table(document: Document, chosen: str, system: System) -> Table:
    """Table of the wall to start from; of a start with the figures typed for it."""
    if chosen not in options_base.STARTS:
        return options_base.base_table(document, chosen)
    table = options_base.start_table(document, chosen, system)
    with st.expander("Figures of this start: none was surveyed or tested, so type your own", expanded=True):
        return _typed_start(table, f"options {chosen.strip()} {system}")


def _typed_start(table: Table, where: str) -> Table:
    typed = {}
    for row in (options_base.START_FIELDS[:3], options_base.START_FIELDS[3:]):
        for name, column in zip(row, st.columns(3), strict=True):
            first = table["foundation"].get(name, "") or table.get(name, "")
            key = f"{where} {name}"
            st.session_state.setdefault(key, first)
            words = "Base elevation" if name == "base" else options_ranges.label(name)
            column.text_input(words, key=key, persist_state="session")
            typed[name] = str(st.session_state[key] or "")
    for name, options, column in zip(
        ("criteria", "category"), ((*CRITERIA, _NONE), CATEGORIES), st.columns((2, 1)), strict=True
    ):
        key = f"{where} {name}"
        st.session_state.setdefault(key, table[name])
        words = "Criteria set" if name == "criteria" else "Load category"
        column.selectbox(words, options, key=key, persist_state="session")
        typed[name] = "" if st.session_state[key] == _NONE else str(st.session_state[key])
    return options_base.with_typed(table, typed)


def ranges_form(record: Wall, system: System) -> list[Range]:
    """Two or three dimensions with a typed low, high and count.

    Raises
    ------
    ScenarioError
        With everything that is wrong with what stands in the fields.
    """
    names = options_ranges.dimension_names(record)
    own = f"options {st.session_state['options base'].strip()} {record.shape} {system}"
    chosen: list[str] = []
    for number, column in enumerate(st.columns(3)):
        key = f"{own} dimension {number}"
        left = [name for name in names if name not in chosen]
        offered = [_NONE, *left] if number == 2 else left
        state.keep_choice(st.session_state, key, offered)
        words = ("First dimension", "Second dimension", "Third dimension")[number]
        column.selectbox(words, offered, key=key, format_func=options_ranges.label, persist_state="session")
        if st.session_state[key] != _NONE:
            chosen.append(str(st.session_state[key]))
    typed = []
    with st.form(f"{own} {'.'.join(chosen)}", border=True):
        for name in chosen:
            texts = []
            first = options_ranges.start_of(record, name, system)
            for end, text, column in zip(("low", "high", "count"), first, st.columns(3), strict=True):
                key = f"{own} {name} {end}"
                st.session_state.setdefault(key, text)
                column.text_input(f"{options_ranges.label(name)}, {end}", key=key, persist_state="session")
                texts.append(str(st.session_state[key] or ""))
            typed.append((name, texts[0], texts[1], texts[2]))
        st.form_submit_button("Compute these candidates", type="primary")
    return options_ranges.ranges_of(typed)


def computed(record: Wall, site: Site, ranges: Sequence[Range]) -> OptionGrid:
    """The grid, with its progress while it is computed."""
    place = st.empty()
    words = "Computing the candidates"

    def progress(share: float) -> None:
        place.progress(share, text=words)

    grid = options_state.grid_of(st.session_state, record, site, ranges, progress)
    place.empty()
    return grid
