"""Parts that several pages share: the levels, the caution, the address."""

from __future__ import annotations

from collections.abc import Callable
from datetime import UTC, datetime
from urllib.parse import urlencode, urljoin

import streamlit as st

from loads.assessment import Assessment
from loads.cautions import HEADLINE
from loads.document import input_digest
from loads.scenario_file import Document
from webapp import barrier_state, state
from webapp.display import System
from webapp.drawing.palette import DARK, LIGHT, Palette
from webapp.links import LinkError
from webapp.markup import block, escaped, source_note, title_block
from webapp.print_worker import render_pdf

ADDRESS = "s"
"""Parameter of the address that holds the packed document."""


def palette() -> Palette:
    """Colours of the drawings for the theme the reader has chosen."""
    return DARK if st.context.theme.type == "dark" else LIGHT


def system() -> System:
    """Unit system in which the session shows values."""
    chosen: System = st.session_state["system"]
    return chosen


def heading(assessment: Assessment) -> None:
    """Title of the scenario with status, datum, check code and age."""
    digest = input_digest(st.session_state["document"])
    problem = st.session_state.get("link problem")
    if problem:
        st.error(f"The link was not opened: {escaped(problem)}")
    st.markdown(block(title_block(assessment, digest, datetime.now(UTC))), unsafe_allow_html=True)


def barrier_choice(document: Document) -> None:
    """Choice of one barrier of the line."""
    titles = barrier_state.barrier_titles(document)
    state.keep_choice(st.session_state, "barrier", list(titles))
    st.selectbox(
        "Barrier",
        list(titles),
        key="barrier",
        format_func=titles.__getitem__,
        persist_state="session",
        width=420,
    )


def level_band() -> None:
    """Both levels with a step up and down, and the unit system."""
    with st.container(horizontal=True, vertical_alignment="bottom", gap="small", key="levels"):
        for side, label in (("flood_side", "Flood side"), ("protected_side", "Protected side")):
            st.text_input(
                label,
                key=state.LEVEL_FIELDS[side],
                on_change=state.change_level,
                args=(st.session_state, side),
                width=130,
            )
            for direction, sign, word in ((-1, "−", "Lower"), (1, "+", "Raise")):
                amount, unit, _ = state.STEPS[system()]
                st.button(
                    f"{sign}{amount}",
                    key=f"{word} {side}",
                    help=f"{word} the {label.lower()} level by {amount} {unit}",
                    on_click=state.move_level,
                    args=(st.session_state, side, direction),
                )
        st.segmented_control("Units", ["US", "SI"], key="system", required=True, persist_state="session")
    for problem in st.session_state["level problems"].values():
        st.error(escaped(problem))


def logs_band(document: Document, barrier_id: str) -> None:
    """Buttons that take a log out of every bay of a closure or put one in; nothing for other barriers."""
    place = barrier_state.place_of(document, barrier_id)
    if place[0] != "closure":
        return
    with st.container(horizontal=True, vertical_alignment="bottom", gap="small", key="logs"):
        for step, sign, word in ((-1, "−", "Take out"), (1, "+", "Put in")):
            st.button(
                f"{sign}1 log",
                key=f"{word} a log",
                help=f"{word} a log in every bay, at the top",
                on_click=barrier_state.move_logs,
                args=(st.session_state, place, step),
                disabled=not barrier_state.can_move_logs(document, place, step),
            )


def caution(assessment: Assessment | None = None) -> None:
    """Sources of the levels and the one sentence that stands beside every result."""
    note = source_note(assessment) if assessment else ""
    st.markdown(block(f'<div class="sh-caution">{HEADLINE}</div>{note}'), unsafe_allow_html=True)


def package_of(document: Document) -> Callable[[], bytes]:
    """Make the calculation package when it is asked for, in the print process."""

    def made() -> bytes:
        from webapp.package import package_job  # noqa: PLC0415  only a print needs the templates

        return render_pdf(package_job(document))

    return made


def write_address() -> None:
    """Put the document into the address, so that reload and copying the address keep it."""
    try:
        packed = state.packed(st.session_state)
    except LinkError:
        return
    if st.query_params.get(ADDRESS) != packed:
        st.query_params[ADDRESS] = packed
    st.session_state["address"] = packed


def frozen_link() -> str:
    """Address that opens this very scenario in any browser.

    Raises
    ------
    LinkError
        The scenario is too large for a link.
    """
    packed = state.packed(st.session_state)
    return f"{urljoin(str(st.context.url), '.')}?{urlencode({ADDRESS: packed})}"
