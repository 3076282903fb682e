"""Map of the candidates: a plain dictionary for plotly, and the same in words."""

from __future__ import annotations

import math
from collections.abc import Sequence
from typing import Any

import numpy as np

from loads.units import from_si
from loads.wall.options import OptionGrid
from webapp.options_ranges import Range, label
from webapp.options_state import IMPOSSIBLE, UNHELD, WITHIN, standing

MOST_SHOWN = 41
"""Values of an axis that the map shows; of more it shows every second, third and so on."""
_WITHIN = ("circle", "#009E73")
_GOVERNS = (
    ("x", "#D55E00"),
    ("square-open", "#7b4ea3"),
    ("triangle-up-open", "#0072B2"),
    ("diamond-open", "#a35f00"),
    ("cross-open", "#b0417f"),
    ("star-open", "#1d2733"),
    ("hourglass-open", "#56606d"),
)
_OTHER = {IMPOSSIBLE: ("line-ew-open", "#8a93a0"), UNHELD: ("circle-open", "#8a93a0")}
_WORDS = {IMPOSSIBLE: "no section", UNHELD: "not checked: no limit entered"}


def map_figure(
    grid: OptionGrid, ranges: Sequence[Range], at: Sequence[int], marks: dict[str, int], within: str
) -> dict[str, Any]:
    """Candidates over the first two dimensions: a symbol for each way in which they stand.

    Parameters
    ----------
    ranges
        Of the grid, two or three.
    at
        Place along each further dimension.
    marks
        Candidates to ring, by what they are called.
    within
        What a candidate within the limits is called.

    Returns
    -------
    dict
        A plotly figure; dimensions in the units typed.
    """
    first, second = ranges[0], ranges[1]
    across, up = _shown(len(first.texts)), _shown(len(second.texts))
    plane: tuple[Any, ...] = (slice(None), slice(None), *at)
    where, worst = standing(grid).reshape(grid.shape)[plane], grid.worst.reshape(grid.shape)[plane]
    x, y = _typed(first), _typed(second)
    data: list[dict[str, Any]] = []
    for code in (WITHIN, *range(len(grid.checks)), IMPOSSIBLE, UNHELD):
        places = [(i, j) for i in across for j in up if where[i, j] == code]
        if places:
            ratios = [_ratio(float(worst[i, j])) for i, j in places]
            points = [x[i] for i, _ in places], [y[j] for _, j in places]
            data.append(_trace(_name(grid, code, within), _mark(code), points, ratios))
    for name, number in marks.items():
        place = np.unravel_index(number, grid.shape)
        if tuple(place[2:]) == tuple(at):
            data.append(_ring(name, x[int(place[0])], y[int(place[1])]))
    layout = {
        "height": 520,
        "margin": {"l": 60, "r": 20, "t": 10, "b": 50},
        "xaxis": {"title": {"text": f"{label(first.name)}, {first.unit}"}, "zeroline": False},
        "yaxis": {"title": {"text": f"{label(second.name)}, {second.unit}"}, "zeroline": False},
        "legend": {"orientation": "h", "y": -0.16, "yanchor": "top", "x": 0},
        "hovermode": "closest",
    }
    return {"data": data, "layout": layout}


def _shown(count: int) -> range:
    return range(0, count, math.ceil(count / MOST_SHOWN))


def thinned(ranges: Sequence[Range]) -> bool:
    """Whether the map leaves values out."""
    return any(_shown(len(one.texts)).step > 1 for one in ranges[:2])


def _typed(one: Range) -> list[float]:
    return [round(from_si(float(value), one.unit, "length"), 6) for value in one.values]


def _ratio(ratio: float) -> str:
    return f"{ratio:.3g}" if math.isfinite(ratio) else "no figure"


def _name(grid: OptionGrid, code: int, within: str) -> str:
    if code == WITHIN:
        return within
    return _WORDS[code] if code in _WORDS else f"above limit: {grid.checks[code]} governs"


def _mark(code: int) -> tuple[str, str]:
    if code == WITHIN:
        return _WITHIN
    return _OTHER[code] if code in _OTHER else _GOVERNS[code % len(_GOVERNS)]


def _trace(
    name: str, mark: tuple[str, str], points: tuple[list[float], list[float]], ratios: list[str]
) -> dict[str, Any]:
    return {
        "type": "scatter",
        "mode": "markers",
        "name": name,
        "x": points[0],
        "y": points[1],
        "text": ratios,
        "marker": {"symbol": mark[0], "color": mark[1], "size": 8, "line": {"width": 1.5, "color": mark[1]}},
        "hovertemplate": f"%{{x}}, %{{y}}<br>largest ratio %{{text}}<extra>{name}</extra>",
    }


def _ring(name: str, x: float, y: float) -> dict[str, Any]:
    least = name.startswith("least")
    return {
        "type": "scatter",
        "mode": "markers",
        "name": name,
        "x": [x],
        "y": [y],
        "marker": {
            "symbol": "diamond-open" if least else "square-open",
            "size": 24 if least else 19,
            "color": "#1d2733",
            "line": {"width": 2.5},
        },
        "hovertemplate": f"%{{x}}, %{{y}}<extra>{name}</extra>",
    }


def counts(grid: OptionGrid, within: str) -> list[tuple[str, int]]:
    """How many candidates stand where, those within the limits first."""
    where = standing(grid)
    codes = (WITHIN, *range(len(grid.checks)), IMPOSSIBLE, UNHELD)
    found = [(_name(grid, code, within), int((where == code).sum())) for code in codes]
    return [(name, number) for name, number in found if number or name == within]


def map_text(grid: OptionGrid, ranges: Sequence[Range], within: str) -> str:
    """Say what the map shows."""
    told = "; ".join(f"{number} {name}" for name, number in counts(grid, within))
    axes = " and ".join(
        f"{label(one.name)} from {one.texts[0]} to {one.texts[-1]}, {len(one.texts)} values" for one in ranges
    )
    return f"Map of {len(grid.possible)} candidates over {axes}: {told}."
