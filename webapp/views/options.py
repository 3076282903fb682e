import streamlit as st

from loads.problems import ScenarioError
from webapp import markup, options_answer, options_candidate, options_parts, options_state, parts, state

document, system = st.session_state["document"], parts.system()
site = options_candidate.site_in(state.scenario(st.session_state))
options_parts.heading(site)
parts.level_band()
base = options_parts.base_choice(document)
answer = st.container()
st.markdown(markup.block(markup.subheading("Dimensions and ranges")), unsafe_allow_html=True)
found = None
try:
    table = options_parts.base_table(document, base, system)
    record = options_candidate.wall_of(document, table)
    ranges = options_parts.ranges_form(record, system)
    with answer:
        grid = options_parts.computed(record, site, ranges)
        found = options_state.Options(document=document, base=table, record=record, ranges=ranges, grid=grid)
        options_answer.map_part(found, site, system)
except ScenarioError as error:
    with answer:
        options_parts.show_problems(error.problems)
if found is not None:
    options_answer.picked_part(found, site, system)
    parts.caution()
    st.markdown(markup.block(markup.subheading("Side by side")), unsafe_allow_html=True)
    options_answer.beside_part(document, site, system)
