"""Figures of the forecast page: plain dictionaries for plotly, pure functions of what was told."""

from __future__ import annotations

import math
from collections.abc import Sequence
from datetime import datetime, timedelta
from typing import Any
from zoneinfo import ZoneInfo

import numpy as np

from loads.line_clock import LineClock
from loads.line_watch import GaugeNews
from loads.moments import utc, zone_abbreviation
from loads.plan import Plan, PlannedJob
from loads.series.series import Series
from webapp.clock_words import length
from webapp.display import System, in_unit, unit_label

BLUE, ORANGE, VERMILLION, GREY, GREEN = "#0072B2", "#E69F00", "#D55E00", "#8a93a0", "#009E73"
_STYLE = {
    "low": (BLUE, "dot", 1.5),
    "likely": (BLUE, "solid", 3),
    "high": (BLUE, "dash", 1.5),
}
_ABOVE = (VERMILLION, "dashdot", 1.5)
_HEIGHT, _MARGINS, _LABEL_HEIGHT = 460, 100, 15
_PLOT_ON_A_PHONE = 250
_LEVELS = {
    "sill": ("#1d2733", "solid"),
    "rated level": (GREEN, "longdash"),
    "first-limit level": (VERMILLION, "dash"),
}


def _local(moment: datetime, line: LineClock, zone: ZoneInfo) -> str:
    """Time on the axis: everywhere with the offset that holds now, so that no hour is shown twice."""
    offset = line.now.astimezone(zone).utcoffset() or timedelta(0)
    return (moment + offset).replace(tzinfo=None).isoformat(timespec="seconds")


def _axis(line: LineClock, zone: ZoneInfo) -> dict[str, Any]:
    return {"title": {"text": f"time, {zone_abbreviation(line.now, zone)}"}, "type": "date"}


def _trace(
    series: Series, name: str, style: tuple[str, str, float], line: LineClock, zone: ZoneInfo, system: System
) -> dict[str, Any]:
    colour, dash, width = style
    unit = unit_label("length", system)
    return {
        "type": "scatter",
        "mode": "lines",
        "name": name,
        "x": [_local(utc(time), line, zone) for time in series.times],
        "y": [round(in_unit(float(value), "length", system), 4) for value in series.values],
        "line": {"color": colour, "dash": dash, "width": width},
        "hovertemplate": f"%{{x|%H:%M %a %e %b}}<br>%{{y:.2f}} {unit}<extra>{name}</extra>",
    }


def watched(line: LineClock, news: GaugeNews) -> list[tuple[str, str, float]]:
    """Levels that barriers show across the traces of a gauge: barrier, which level, reading. [m]."""
    found = [
        (one.record.id, "sill", one.clock.sill_stage)
        for one in line.barriers
        if one.news.gauge.id == news.gauge.id
    ]
    own = {
        (one.limit.barrier, one.limit.label): one.limit.stage
        for order in line.orders
        for one in order.reached
        if one.limit.way.gauge.id == news.gauge.id and one.limit.label in _LEVELS
    }
    found += [(barrier, label, stage) for (barrier, label), stage in own.items()]
    return sorted((one for one in found if math.isfinite(one[2])), key=lambda one: one[2])


def levels_figure(line: LineClock, news: GaugeNews, zone: ZoneInfo, system: System) -> dict[str, Any]:
    """Readings against time, past issues behind the newest, with the levels of every barrier across.

    Returns
    -------
    dict
        A plotly figure; readings in the unit shown, times of the zone.
    """
    data = [
        _trace(past.likely, f"issue {number} before", (GREY, "solid", 1), line, zone, system)
        for number, past in zip(range(len(news.forecast.past), 0, -1), news.forecast.past, strict=True)
    ]
    data += [
        _trace(trace, name, _STYLE.get(name, _ABOVE), line, zone, system)
        for name, trace in news.traces.items()
    ]
    if news.observed is not None:
        data.append(_trace(news.observed, "observed", ("#1d2733", "solid", 2), line, zone, system))
    marks = watched(line, news)
    values = [float(y) for one in data for y in one["y"]]
    heights = [in_unit(stage, "length", system) for _, _, stage in marks]
    low, high = min([*values, *heights]), max([*values, *heights])
    room = max(high - low, 0.1) * 0.06
    shapes = [_across(height, _LEVELS[label]) for (_, label, _), height in zip(marks, heights, strict=True)]
    shapes.append(_now_line(line, zone))
    names = [f"{barrier} {label.removesuffix(' level')}" for barrier, label, _ in marks]
    labels = _labels(names, heights, low - room, high + room)
    layout = {
        "height": _HEIGHT,
        "margin": {"l": 55, "r": 105, "t": 40, "b": _MARGINS - 40},
        "xaxis": _axis(line, zone),
        "yaxis": {
            "title": {
                "text": f"reading of {news.gauge.name or news.gauge.id}, {unit_label('length', system)}"
            },
            "range": [low - room, high + room],
        },
        "shapes": shapes,
        "annotations": labels,
        "legend": {"orientation": "h", "y": 1.02, "yanchor": "bottom"},
        "hovermode": "x",
    }
    return {"data": data, "layout": layout}


def _across(height: float, style: tuple[str, str]) -> dict[str, Any]:
    colour, dash = style
    line = {"color": colour, "dash": dash, "width": 1.2}
    return {"type": "line", "xref": "paper", "x0": 0, "x1": 1, "y0": height, "y1": height, "line": line}


def _now_line(line: LineClock, zone: ZoneInfo) -> dict[str, Any]:
    now = _local(line.now, line, zone)
    style = {"color": ORANGE, "width": 2}
    return {"type": "line", "yref": "paper", "y0": 0, "y1": 1, "x0": now, "x1": now, "line": style}


def _labels(names: Sequence[str], heights: Sequence[float], low: float, high: float) -> list[dict[str, Any]]:
    """Labels beside the lines, moved apart where they would lie on one another."""
    least = (high - low) * _LABEL_HEIGHT / _PLOT_ON_A_PHONE
    placed: list[float] = []
    for height in heights:
        placed.append(max(height, placed[-1] + least) if placed else height)
    return [
        {
            "xref": "paper",
            "x": 1.0,
            "y": place,
            "text": name,
            "showarrow": False,
            "xanchor": "left",
            "xshift": 4,
            "font": {"size": 11},
        }
        for name, place in zip(names, placed, strict=True)
    ]


def levels_text(line: LineClock, news: GaugeNews, system: System) -> str:
    """Say what the figure of the levels shows."""
    crests = [
        f"{name} crest {length(float(np.max(trace.values)), system)}" for name, trace in news.traces.items()
    ]
    marks = [f"{barrier} {label} {length(stage, system)}" for barrier, label, stage in watched(line, news)]
    return f"Readings against time at {news.gauge.id}. {'; '.join(crests)}. Across it: {'; '.join(marks)}."


def plan_figure(line: LineClock, plan: Plan, zone: ZoneInfo) -> dict[str, Any]:
    """Crews against time with the arrival of the water at each closure.

    Returns
    -------
    dict
        A plotly figure: a bar for each job, and a mark where the water is there.
    """
    jobs = [job for crew in plan.crews for job in crew.jobs]
    bars = {
        "type": "bar",
        "orientation": "h",
        "name": "at work",
        "base": [_local(job.start, line, zone) for job in jobs],
        "x": [(job.finish - job.start) / timedelta(milliseconds=1) for job in jobs],
        "y": [f"crew {job.crew}" for job in jobs],
        "text": [f"{job.barrier}{' LATE' if job.late else ''}" for job in jobs],
        "textposition": "inside",
        "insidetextanchor": "middle",
        "marker": {
            "color": ["#f3c9ae" if job.late else "#cfe3f1" for job in jobs],
            "line": {"color": [VERMILLION if job.late else BLUE for job in jobs], "width": 2},
            "pattern": {"shape": ["x" if job.late else "" for job in jobs]},
        },
        "textfont": {"color": "#1d2733"},
        "hovertemplate": "%{text}<extra></extra>",
    }
    water = _arrivals(jobs, line, zone)
    crews = len({job.crew for job in jobs})
    layout = {
        "height": 150 + 60 * crews,
        "margin": {"l": 70, "r": 20, "t": 50, "b": 50},
        "xaxis": _axis(line, zone),
        "yaxis": {"autorange": "reversed"},
        "shapes": [_now_line(line, zone)],
        "legend": {"orientation": "h", "y": 1.02, "yanchor": "bottom"},
        "barmode": "overlay",
    }
    return {"data": [bars, water], "layout": layout}


def _arrivals(jobs: Sequence[PlannedJob], line: LineClock, zone: ZoneInfo) -> dict[str, Any]:
    return {
        "type": "scatter",
        "mode": "markers+text",
        "name": "water there",
        "x": [_local(job.due, line, zone) for job in jobs],
        "y": [f"crew {job.crew}" for job in jobs],
        "text": [job.barrier for job in jobs],
        "textposition": "top center",
        "marker": {"symbol": "line-ns", "size": 26, "line": {"color": VERMILLION, "width": 3}},
        "hovertemplate": "water at %{text}<br>%{x|%H:%M %a %e %b}<extra></extra>",
    }


def plan_text(plan: Plan) -> str:
    """Say what the bar chart shows."""
    told = [
        f"crew {crew.crew.id}: {', '.join(job.barrier for job in crew.jobs)}"
        for crew in plan.crews
        if crew.jobs
    ]
    return f"Crews against time. {'; '.join(told) or 'Nobody has anything to do'}."
