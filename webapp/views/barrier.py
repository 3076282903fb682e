from functools import partial

import streamlit as st

from loads.assessment import Assessed, assess
from loads.working import working
from webapp import barrier_markup, figures, markup, parts, state, working_markup
from webapp.display import barrier_title
from webapp.drawing.section import barrier_drawing
from webapp.whatif import neighbours

system, palette = parts.system(), parts.palette()
scenario = state.scenario(st.session_state)
around = neighbours(scenario, system)
assessment = assess(scenario, around.levels)

parts.heading(assessment)
names = {panel.id: barrier_title(panel.id, panel.name) for panel in scenario.panel}
state.keep_choice(st.session_state, "barrier", list(names))
st.selectbox("Barrier", list(names), key="barrier", format_func=names.__getitem__, persist_state="session")
parts.level_band()
barrier = assessment.barrier(st.session_state["barrier"])

if not isinstance(barrier, Assessed):
    st.markdown(markup.block(barrier_markup.withheld_notice(barrier)), unsafe_allow_html=True)
else:
    drawing = partial(barrier_drawing, barrier, system=system, palette=palette, datum=scenario.datum)
    picture = markup.drawings(drawing(), drawing(narrow=True))
    st.markdown(
        markup.block(barrier_markup.headline(barrier, system) + picture + markup.remark_list([barrier])),
        unsafe_allow_html=True,
    )
    parts.caution()
    st.markdown(
        markup.block(
            markup.subheading("Checks")
            + markup.check_table(barrier.checks, system)
            + barrier_markup.levels_note(barrier, system)
            + markup.subheading("If the water stands otherwise")
            + barrier_markup.states_table(barrier, around.labels, system)
            + markup.subheading("What pushes")
            + barrier_markup.load_table(barrier, system)
        ),
        unsafe_allow_html=True,
    )
    if st.toggle("Read the pressure at any elevation", key="read off"):
        figure = figures.pressure_figure(barrier, system)
        st.plotly_chart(figure, alt=figures.pressure_text(barrier, system), config={"displaylogo": False})
    with st.expander("Worked steps", on_change="rerun", key="worked steps") as steps:
        if steps.open:
            st.markdown(
                markup.block(working_markup.worked_steps(working(barrier), system)), unsafe_allow_html=True
            )
