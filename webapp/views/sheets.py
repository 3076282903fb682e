import json

import streamlit as st

from loads.assessment import assess
from loads.document import check_code, input_digest
from webapp import form_parts, markup, parts, qr, state
from webapp.answer import answer
from webapp.links import MAX_LINK_CHARACTERS, LinkError
from webapp.pdf import pdf_available
from webapp.scenario_files import example_files
from webapp.sheet_form import field_sheets
from webapp.text_table import table_text

document = st.session_state["document"]
assessment = assess(state.scenario(st.session_state))
digest = input_digest(document)
code = check_code(digest)
parts.heading(assessment)

st.subheader("Frozen link")
link = None
try:
    link = parts.frozen_link()
    st.code(link, language=None, wrap_lines=True)
    picture = qr.qr_svg(link)
    if picture:
        st.markdown(markup.block(f'<div class="sh-qr">{picture}</div>'), unsafe_allow_html=True)
    st.markdown(
        f"The whole scenario stands in the link ({len(link)} characters); nothing is kept on the server. "
        "Whoever holds the link holds the plan: levels, limits and all. "
        f"Check code **{code}**; another code, another plan."
    )
except LinkError as error:
    st.warning(f"{error}. A link may hold {MAX_LINK_CHARACTERS} characters.")

field_sheets(assessment, document, link)

st.subheader("Take it with you")
with st.container(horizontal=True):
    toml = state.as_text(document)
    st.download_button("Scenario file", toml, f"sillhead-{code}.toml", "application/toml")
    result = json.dumps(answer(assessment, document), ensure_ascii=False, allow_nan=False, indent=1)
    st.download_button("Results as JSON", result, f"sillhead-{code}.json", "application/json")
    st.download_button(
        "Results as text", table_text(assessment, document), f"sillhead-{code}.txt", "text/plain"
    )
    missing = pdf_available()
    if missing is None:
        package = st.download_button(
            "Calculation package (PDF)", parts.package_of(document), f"sillhead-{code}.pdf", "application/pdf"
        )
if missing is not None:
    st.info(missing)

st.subheader("Open a scenario")
upload = st.file_uploader(
    "Scenario file (TOML, at most 1 MB)", type=["toml", "txt"], key="upload", max_upload_size=1
)
if upload is not None and st.session_state.get("uploaded") != upload.file_id:
    problems = state.open_text(st.session_state, upload.getvalue())
    st.session_state["uploaded"] = upload.file_id
    st.session_state["upload problems"] = problems
    if not problems:
        st.rerun()
form_parts.show_problems(st.session_state.get("upload problems", ()) if upload is not None else ())
examples = {path.stem.replace("-", " ").capitalize(): path for path in example_files()}
chosen = st.selectbox("Examples, in invented places", list(examples), index=None, key="example")
if chosen and st.button("Open this example"):
    problems = state.open_text(st.session_state, examples[chosen].read_bytes())
    form_parts.show_problems(problems)
    if not problems:
        st.rerun()
parts.caution()
st.markdown(markup.block(f'<div class="sh-note sh-mono">{digest}</div>'), unsafe_allow_html=True)
