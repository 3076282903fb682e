import streamlit as st

from loads.assessment import assess
from loads.reading import LevelReading
from webapp import markup, parts, reading_markup, reading_parts, reading_state, state

document, system = st.session_state["document"], parts.system()
scenario = state.scenario(st.session_state)
parts.heading(assess(scenario))
parts.level_band()
titles = reading_state.reading_titles(document)
if "chosen reading" in st.session_state:
    st.session_state["reading"] = st.session_state.pop("chosen reading")
state.keep_choice(st.session_state, "reading", list(titles))
st.selectbox("Reading", list(titles), key="reading", format_func=titles.__getitem__, persist_state="session")
place = reading_state.place_of(document, st.session_state["reading"])
if place < len(scenario.reading):
    found = reading_state.found_at(scenario, place)
    st.markdown(
        markup.block(reading_markup.answer_part(found, system, scenario.datum)), unsafe_allow_html=True
    )
    if isinstance(found, LevelReading):
        side = found.reading.side
        usable = reading_state.has_level(found)
        in_use = usable and reading_state.is_in_use(document, found, system)
        st.button(
            f"Use this as the {side}-side level",
            on_click=reading_state.use_level,
            args=(st.session_state, place),
            disabled=in_use or not usable,
            type="primary",
        )
        if in_use:
            st.markdown(f"This is the {side}-side level now, with its range by the worst of all corners.")
        st.markdown(markup.block(reading_markup.chain_part(found, system)), unsafe_allow_html=True)
    parts.caution()
else:
    st.markdown("Enter what an instrument shows; the level follows from it link by link.")
reading_parts.reading_form_of(document, place, st.session_state["revision"])
