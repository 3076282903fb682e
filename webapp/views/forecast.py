import streamlit as st

from loads.assessment import assess
from webapp import clock_parts, forecast_figures, forecast_markup, forecast_parts, markup, parts, state
from webapp.answer_clock import zone_of

system = parts.system()
scenario = state.scenario(st.session_state)
zone = zone_of(scenario)

parts.heading(assess(scenario))
forecast_parts.controls(system)
line = forecast_parts.told(scenario, system)
if line is not None:
    forecast_parts.exercise_note(line.raised)
    forecast_parts.age_help(line)
    clock = forecast_markup.status(line, zone) + forecast_markup.clock_table(line, zone, system)
    st.markdown(markup.block(clock), unsafe_allow_html=True)
    parts.caution()
    gauge = forecast_parts.gauge_choice(line)
    news = next(one for one in line.gauges if one.gauge.id == gauge)
    if news.traces or news.observed is not None:
        figure = forecast_figures.levels_figure(line, news, zone, system)
        forecast_parts.chart(figure, forecast_figures.levels_text(line, news, system))
    content = forecast_markup.part(
        "Which limit is reached first", forecast_markup.first_limits(line, zone)
    ) + forecast_markup.part("What the times rest on", forecast_markup.per_closure(line))
    st.markdown(markup.block(content), unsafe_allow_html=True)
    content = forecast_markup.part(
        "From the reading to the head", forecast_markup.chains(line, system, "crest, likely")
    )
    st.markdown(markup.block(content + forecast_markup.part("Plan of the line", "")), unsafe_allow_html=True)
    trace = forecast_parts.trace_choice(line)
    if trace is None or not scenario.crew:
        st.markdown("There is no plan: it needs a forecast and at least one crew.")
    else:
        plan = line.plan(trace)
        if any(crew.jobs for crew in plan.crews):
            figure = forecast_figures.plan_figure(line, plan, zone)
            forecast_parts.chart(figure, forecast_figures.plan_text(plan))
        st.markdown(markup.block(forecast_markup.plan_part(plan, trace, zone)), unsafe_allow_html=True)
    with st.expander("Every limit level, in the order in which each trace reaches it"):
        st.markdown(markup.block(forecast_markup.limits_table(line, zone, system)), unsafe_allow_html=True)
    st.markdown(markup.block(markup.subheading("Readings and forecasts")), unsafe_allow_html=True)
    forecast_parts.series_form(scenario)
    if news.forecast.issues:
        forecast_parts.forget_button(gauge)
clock_parts.clock_forms(st.session_state["document"], st.session_state["revision"])
