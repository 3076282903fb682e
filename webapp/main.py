"""Entry script: the document of this session, the pages, the address."""

import logging
from pathlib import Path

import streamlit as st

from webapp import parts, state

HERE = Path(__file__).parent

st.set_page_config(page_title="Sillhead", layout="wide", initial_sidebar_state="collapsed")
st.markdown(f"<style>{(HERE / 'assets' / 'page.css').read_text('utf-8')}</style>", unsafe_allow_html=True)
state.begin(st.session_state, st.query_params.get(parts.ADDRESS))
page = st.navigation(
    [
        st.Page(HERE / "views" / "flood_line.py", title="Flood line", default=True),
        st.Page(HERE / "views" / "barrier.py", title="Barrier", url_path="barrier"),
        st.Page(HERE / "views" / "forecast.py", title="Forecast", url_path="forecast"),
        st.Page(HERE / "views" / "inputs.py", title="Inputs", url_path="inputs"),
        st.Page(HERE / "views" / "readings.py", title="Readings", url_path="readings"),
        st.Page(HERE / "views" / "options.py", title="Options", url_path="options"),
        st.Page(HERE / "views" / "sheets.py", title="Sheets and links", url_path="sheets"),
        st.Page(HERE / "views" / "method.py", title="Method and cautions", url_path="method"),
    ],
    position="top",
)
try:
    page.run()
except Exception:  # whatever fails, no half a result stays without a word
    logging.getLogger("sillhead").exception("a page failed")
    st.error(
        "This page could not be computed, and nothing above this line is to be relied on. What you entered "
        "is kept: go to Sheets and links to save it, and report what you did last."
    )
parts.write_address()
