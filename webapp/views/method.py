import streamlit as st

from loads import __version__
from webapp import markup, method_markup

st.markdown(
    markup.block(
        method_markup.cautions()
        + method_markup.methods()
        + method_markup.sources()
        + f'<div class="sh-note">Sillhead {__version__}. Which published figures the program was held '
        "against, and how closely it meets them, stands in tests/VERIFICATION.md of the source.</div>"
    ),
    unsafe_allow_html=True,
)
