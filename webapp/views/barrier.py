from functools import partial

import streamlit as st

from loads.assessment import Assessed, AssessedClosure, AssessedWall, assess
from loads.working import working
from webapp import (
    barrier_markup,
    closure_markup,
    figures,
    limit_markup,
    markup,
    parts,
    state,
    wall_markup,
    working_markup,
)
from webapp.drawing.section import barrier_drawing
from webapp.whatif import ONE_MORE, neighbours

system, palette = parts.system(), parts.palette()
scenario = state.scenario(st.session_state)
around = neighbours(scenario, system)
assessment = assess(scenario, around.levels)
more = ONE_MORE[system][1]

parts.heading(assessment)
with st.container(horizontal=True, vertical_alignment="bottom"):
    parts.barrier_choice(st.session_state["document"])
    parts.logs_band(st.session_state["document"], st.session_state["barrier"])
parts.level_band()
barrier = assessment.barrier(st.session_state["barrier"])

if not isinstance(barrier, Assessed):
    st.markdown(markup.block(barrier_markup.withheld_notice(barrier)), unsafe_allow_html=True)
else:
    drawing = partial(barrier_drawing, barrier, system=system, palette=palette, datum=scenario.datum)
    picture = markup.drawings(drawing(), drawing(narrow=True))
    if isinstance(barrier, AssessedWall):
        headline = wall_markup.headline(barrier, system) + wall_markup.criteria_note(barrier)
    else:
        headline = barrier_markup.headline(barrier, system)
    headline += limit_markup.first_row(barrier, system, more)
    st.markdown(
        markup.block(headline + picture + markup.remark_list([barrier])),
        unsafe_allow_html=True,
    )
    parts.caution()
    checks = (
        closure_markup.checks_table(barrier, system, more)
        if isinstance(barrier, AssessedClosure)
        else limit_markup.check_table(barrier.checks, system, more, barrier.record.kind)
    )
    content = (
        markup.subheading("Checks")
        + checks
        + barrier_markup.levels_note(barrier, system)
        + limit_markup.first_part(barrier, system, more)
    )
    if isinstance(barrier, AssessedClosure):
        content += closure_markup.parts_part(barrier, system, more)
    content += (
        wall_markup.wall_part(barrier, around.labels, system)
        if isinstance(barrier, AssessedWall)
        else markup.subheading("If the water stands otherwise")
        + barrier_markup.states_table(barrier, around.labels, system)
        + markup.subheading("What pushes")
        + barrier_markup.load_table(barrier, system)
    )
    st.markdown(markup.block(content), unsafe_allow_html=True)
    if st.toggle("Read the pressure at any elevation", key="read off"):
        figure = figures.pressure_figure(barrier, system)
        st.plotly_chart(figure, alt=figures.pressure_text(barrier, system), config={"displaylogo": False})
    with st.expander("Worked steps", on_change="rerun", key="worked steps") as steps:
        if steps.open:
            st.markdown(
                markup.block(working_markup.worked_steps(working(barrier), system)), unsafe_allow_html=True
            )
