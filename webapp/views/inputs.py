import streamlit as st

from loads.assessment import assess
from webapp import form_parts, forms, parts, state
from webapp.display import barrier_title

document = st.session_state["document"]
parts.heading(assess(state.scenario(st.session_state)))
parts.level_band()
revision = st.session_state["revision"]
panels = document["panel"]
names = [str(panel["id"]) for panel in panels]
state.keep_choice(st.session_state, "barrier", names)
titles = {str(panel["id"]): barrier_title(str(panel["id"]), str(panel.get("name", ""))) for panel in panels}
st.selectbox("Barrier", names, key="barrier", format_func=titles.__getitem__, persist_state="session")
index = names.index(st.session_state["barrier"])
with st.container(horizontal=True):
    st.button("Add a panel", on_click=state.add_panel, args=(st.session_state, forms.new_panel(document)))
    st.button("Copy this panel", on_click=state.copy_panel, args=(st.session_state, index))
    st.button(
        "Remove this panel",
        on_click=state.remove_panel,
        args=(st.session_state, index),
        disabled=len(panels) < 2,
    )
form_parts.panel_form(document, index, revision)
form_parts.sediment_form(document, index, revision)
with st.expander("Water and description of the plan"):
    form_parts.scenario_form(document, revision)
with st.expander("The whole scenario as text"):
    key = f"field text {revision}"
    st.session_state.setdefault(key, state.as_text(document))
    st.text_area("Scenario file (TOML)", key=key, height=420, persist_state="session")
    if st.button("Take this text"):
        problems = state.take_text(st.session_state, str(st.session_state[key]))
        form_parts.show_problems(problems)
        if not problems:
            st.rerun()
