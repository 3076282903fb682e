"""Answer of the options page: the map, the least material, the pick, the table side by side."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from typing import Any

import streamlit as st

from loads.barrier import Site
from loads.problems import ScenarioError
from loads.scenario_file import Document
from loads.wall.wall_checks import criteria_of
from webapp import options_base, options_figures, options_markup, options_state
from webapp.display import System
from webapp.markup import block, escaped
from webapp.options_candidate import Candidate, Table, candidate_of, wall_of
from webapp.options_parts import show_problems
from webapp.options_ranges import Range, label
from webapp.options_state import Least, Options

_PICK = "options pick {}"


def map_part(options: Options, site: Site, system: System) -> None:
    """Criteria in force, the least material, the map with its numbers, and all of it as a file."""
    grid, ranges, criteria = options.grid, options.ranges, criteria_of(options.record)
    least = _least(options, site)
    begin = options_state.places_of(grid, len(grid.possible) // 2 if least.number is None else least.number)
    content = options_markup.criteria_line(options.record, criteria)
    content += options_markup.least_words(grid, least, ranges, system)
    st.markdown(block(content), unsafe_allow_html=True)
    marks = {"picked": options_state.number_of(grid, _settled(ranges, begin))}
    if least.number is not None:
        marks["least material"] = least.number
    at = _slice(ranges, begin)
    figure = options_figures.map_figure(grid, ranges, at, marks, options.within)
    words = options_figures.map_text(grid, ranges, options.within)
    st.plotly_chart(figure, alt=words, config={"displaylogo": False, "displayModeBar": False})
    if options_figures.thinned(ranges):
        st.caption("The map shows some of the values only; the numbers and the CSV are of all candidates.")
    content = options_markup.count_table(grid, options.within)
    content += options_markup.held_line(options.record, ranges)
    st.markdown(block(content), unsafe_allow_html=True)
    st.download_button(
        "All candidates as CSV",
        lambda: options_markup.grid_csv(grid, ranges, criteria, options.within),
        "sillhead-options.csv",
        "text/csv",
    )


def _least(options: Options, site: Site) -> Least:
    """Least material; kept in the session with the grid that it follows from."""
    kept = st.session_state.get("options least")
    if kept is None or kept[0] is not options.grid:
        kept = (options.grid, options_state.least_of(options.grid, site, options.record_of))
        st.session_state["options least"] = kept
    least: Least = kept[1]
    return least


def _settled(ranges: Sequence[Range], begin: Sequence[int]) -> list[int]:
    """Place along each dimension of the pick; where none was made yet, or it is gone, where it begins."""
    for one, place in zip(ranges, begin, strict=True):
        key = _PICK.format(one.name)
        if st.session_state.get(key) not in one.texts:
            st.session_state[key] = one.texts[place]
    return [one.texts.index(str(st.session_state[_PICK.format(one.name)])) for one in ranges]


def _slice(ranges: Sequence[Range], begin: Sequence[int]) -> list[int]:
    """Place along the third dimension that the map is drawn for."""
    if len(ranges) < 3:
        return []
    one = ranges[2]
    key = f"options slice {one.name}"
    if st.session_state.get(key) not in one.texts:
        st.session_state[key] = one.texts[begin[2]]
    st.selectbox(f"Map at {label(one.name).lower()}", one.texts, key=key, persist_state="session")
    return [one.texts.index(str(st.session_state[key]))]


def picked_part(options: Options, site: Site, system: System) -> None:
    """One candidate in full, computed by itself, and what can be done with it."""
    ranges = options.ranges
    for one, column in zip(ranges, st.columns(3), strict=False):
        column.selectbox(
            f"Pick {label(one.name).lower()}",
            one.texts,
            key=_PICK.format(one.name),
            persist_state="session",
        )
    places = [one.texts.index(str(st.session_state[_PICK.format(one.name)])) for one in ranges]
    number = options_state.number_of(options.grid, places)
    title = f"Picked: {options_markup.sizes_words(options_state.sizes_of(ranges, places))}"
    try:
        candidate = candidate_of(options.record_of(number), site)
    except ScenarioError as error:
        show_problems(error.problems)
        return
    if not options_state.matches(options.grid, number, candidate):
        st.error(
            "Withheld: the map and this candidate computed by itself do not give the same figures. "
            "Do not use either; report what you typed."
        )
        return
    content = options_markup.candidate_part(title, candidate, system)
    content += f'<div class="sh-note">{escaped(options_markup.pick_words(options.grid, number))}</div>'
    st.markdown(block(content), unsafe_allow_html=True)
    _buttons(options.table_of(number), options.document)


def _buttons(table: Table, document: Document) -> None:
    in_scenario = any(str(one["id"]) == table["id"] for one in document.get("wall", ()))
    words = f"Write these dimensions into wall {escaped(table['id'])}"
    with st.container(horizontal=True):
        st.button(
            "Put beside the others",
            on_click=options_base.put_beside,
            args=(st.session_state, table),
            help=f"Keeps the last {options_base.MOST_BESIDE} candidates for the table side by side.",
        )
        st.button(
            words if in_scenario else "Put this candidate into the scenario",
            on_click=_put,
            args=(table,),
            type="primary",
        )
        if in_scenario:
            another = options_base.as_another(document, table)
            st.button("Put it into the scenario as another wall", on_click=_put, args=(another,))
    note = st.session_state.pop("options note", None)
    if note:
        st.success(escaped(note))
    problems = st.session_state.pop("options problems", ())
    if problems:
        show_problems(problems)


def _put(table: Mapping[str, Any]) -> None:
    problems = options_base.put_into(st.session_state, table)
    st.session_state["options problems"] = problems
    if not problems:
        st.session_state["options note"] = f"Wall {table['id']} of the scenario has these dimensions now."


def beside_part(document: Document, site: Site, system: System) -> None:
    """Candidates side by side, as they stand in the scenario's water now."""
    kept = st.session_state.get("options beside", [])
    if not kept:
        st.markdown("Nothing is side by side yet: pick a candidate and put it beside the others.")
        return
    found: list[Candidate] = []
    for table in kept:
        try:
            found.append(candidate_of(wall_of(document, table), site))
        except ScenarioError as error:
            show_problems(error.problems)
    if found:
        st.markdown(block(options_markup.beside_table(found, system)), unsafe_allow_html=True)
    st.button("Clear the table", on_click=st.session_state.pop, args=("options beside", None))
