"""Field sheets on a page: which closure, what stamp, and the two files."""

from __future__ import annotations

from collections.abc import Callable
from datetime import UTC, datetime

import streamlit as st

from loads.assessment import Assessment
from loads.document import check_code, input_digest
from loads.scenario_file import Document
from webapp import state
from webapp.display import barrier_title
from webapp.pdf import pdf_available
from webapp.print_worker import render_pdf
from webapp.sheet import STAMPS, sheet_html, sheet_job
from webapp.sheet.link import file_name

_CLOSURE, _STAMP = "sheet closure", "sheet stamp"


def field_sheets(assessment: Assessment, document: Document, link: str | None) -> None:
    """Choose a closure and a stamp, and take its sheet as PDF or as one HTML file.

    Parameters
    ----------
    assessment
        Of the document.
    document
        What the session holds.
    link
        Frozen link for the code on the sheet; None when the document is too large for one.
    """
    st.subheader("Field sheet")
    names = {closure.id: barrier_title(closure.id, closure.name) for closure in assessment.scenario.closure}
    if not names:
        st.markdown("Field sheets are for closures, and this scenario has none.")
        return
    state.keep_choice(st.session_state, _CLOSURE, list(names))
    state.keep_choice(st.session_state, _STAMP, list(STAMPS[::-1]))
    with st.container(horizontal=True, vertical_alignment="bottom"):
        chosen = st.selectbox("Closure", list(names), key=_CLOSURE, format_func=names.__getitem__)
        st.segmented_control("Stamp", STAMPS[::-1], key=_STAMP, format_func=str.upper, required=True)
    _files(assessment, chosen, document, link)


def _files(assessment: Assessment, chosen: str, document: Document, link: str | None) -> None:
    code, stamp = check_code(input_digest(document)), st.session_state[_STAMP]
    missing = pdf_available()

    def page() -> bytes:
        return sheet_html(
            assessment, chosen, document, stamp=stamp, link=link, now=datetime.now(UTC)
        ).encode()

    def pdf() -> bytes:
        return render_pdf(
            sheet_job(assessment, chosen, document, stamp=stamp, link=link, now=datetime.now(UTC))
        )

    kinds: list[tuple[str, Callable[[], bytes], str, str]] = [
        ("Field sheet (HTML, opens without a network)", page, "html", "text/html")
    ]
    if missing is None:
        kinds.insert(0, ("Field sheet (PDF)", pdf, "pdf", "application/pdf"))
    with st.container(horizontal=True):
        for label, made, ending, kind in kinds:
            st.download_button(label, made, file_name(chosen, code, ending), kind)
