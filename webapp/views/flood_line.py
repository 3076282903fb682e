import streamlit as st

from loads.assessment import assess
from webapp import markup, parts, state
from webapp.drawing.line import line_drawing

assessment = assess(state.scenario(st.session_state))
system, palette = parts.system(), parts.palette()

parts.heading(assessment)
parts.level_band()
picture = markup.drawings(
    line_drawing(assessment, system=system, palette=palette),
    line_drawing(assessment, system=system, palette=palette, narrow=True),
)
st.markdown(
    markup.block(markup.line_cards(assessment, system) + picture),
    unsafe_allow_html=True,
)
parts.caution(assessment)
st.markdown(
    markup.block(
        f'<div class="sh-wide">{markup.line_table(assessment, system)}</div>'
        + markup.remark_list(assessment.barriers)
        + '<div class="sh-note">Force: horizontal, positive toward the protected side. Moment: about the '
        "bottom edge. First limit: the computed flood-side level at which the first entered load limit is "
        "reached, a screening figure. Rated: the highest water an engineer has put their name to. Walls: "
        "per unit of length, moment about the toe, of an I-wall about the protected-side ground.</div>"
    ),
    unsafe_allow_html=True,
)
