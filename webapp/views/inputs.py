import streamlit as st

from loads.assessment import assess
from webapp import barrier_state, form_parts, new_barriers, parts, state

document = st.session_state["document"]
parts.heading(assess(state.scenario(st.session_state)))
parts.level_band()
revision = st.session_state["revision"]
parts.barrier_choice(document)
place = barrier_state.place_of(document, st.session_state["barrier"])
with st.container(horizontal=True):
    for kind, begun in (("panel", new_barriers.new_panel), ("closure", new_barriers.new_closure)):
        fresh = begun(document)
        st.button(f"Add a {kind}", on_click=barrier_state.add_barrier, args=(st.session_state, kind, fresh))
    st.button("Copy this barrier", on_click=barrier_state.copy_barrier, args=(st.session_state, place))
    st.button(
        "Remove this barrier",
        on_click=barrier_state.remove_barrier,
        args=(st.session_state, place),
        disabled=len(barrier_state.barrier_titles(document)) < 2,
    )
if place[0] in form_parts.BARRIER_FORMS:
    form_parts.BARRIER_FORMS[place[0]](document, place, revision)
    form_parts.sediment_form(document, place, revision)
else:
    st.info(f"A {place[0]} is changed in the text of the scenario below.")
with st.expander("Water, design basis and description of the plan"):
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
