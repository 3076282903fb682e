"""The outline of a plane face: a polygon with holes, and its width against height along the face."""

from __future__ import annotations

from collections.abc import Sequence
from itertools import pairwise

import numpy as np
from shapely import Polygon
from shapely.geometry.polygon import orient
from shapely.validation import explain_validity

from loads.arrays import FloatArray

Ring = Sequence[tuple[float, float]]

_LEVEL_SLACK = 1e-9


def outline_problem(points: Ring, holes: Sequence[Ring]) -> tuple[str, str] | None:
    """Say what is wrong with an outline.

    Parameters
    ----------
    points, holes
        Corners (across, up the face). [m]

    Returns
    -------
    tuple of str and str, or None
        The field and the rule that is broken; None when the outline can be used.
    """
    outer = Polygon(points)
    if not outer.is_valid:
        return "points", f"do not make an outline: {explain_validity(outer).lower()} (metres across, up)"
    if outer.area <= 0:
        return "points", "enclose no area; give at least three corners that do not lie on one line"
    if abs(outer.bounds[1]) > _LEVEL_SLACK:
        return "points", "must have their lowest corner at 0 up the face: that is the panel's bottom"
    whole = Polygon(points, holes)
    for index, hole in enumerate(holes):
        cut = Polygon(hole)
        if not cut.is_valid or cut.area <= 0 or not outer.contains(cut):
            return f"holes[{index}]", "must be a closed shape of its own that lies inside the outline"
    if not whole.is_valid:
        return "holes", f"do not fit the outline: {explain_validity(whole).lower()} (metres across, up)"
    return None


def width_strips(outline: Polygon) -> FloatArray:
    """Width of an outline against height, exact, as strips in which it varies linearly.

    Parameters
    ----------
    outline
        Polygon with holes, corners (across, up the face). [m]

    Returns
    -------
    FloatArray
        Shape (m, 4): lower end, upper end, width at the lower end, width at the upper end of each strip,
        from the bottom up. [m]

    Notes
    -----
    Going round the outside anticlockwise and round holes clockwise, an edge that goes up has the face on its
    left. The width at a height is therefore the sum of the rising edges' positions less the falling ones'.

    Examples
    --------
    >>> width_strips(Polygon([(0, 0), (2, 0), (1, 1)]))
    array([[0., 1., 2., 0.]])
    """
    oriented = orient(outline)
    edges = np.array(
        [
            (*start, *end)
            for ring in (oriented.exterior, *oriented.interiors)
            for start, end in pairwise(ring.coords)
            if start[1] != end[1]
        ]
    )
    heights = np.unique(edges[:, [1, 3]])
    low, high = heights[:-1], heights[1:]
    x0, y0, x1, y1 = edges.T
    bottom, top = np.minimum(y0, y1), np.maximum(y0, y1)
    spans = (bottom[None, :] <= low[:, None]) & (top[None, :] >= high[:, None])
    sign = np.where(y1 > y0, 1.0, -1.0)

    def width_at(height: FloatArray) -> FloatArray:
        across = x0 + (x1 - x0) * ((height[:, None] - y0) / (y1 - y0))
        width: FloatArray = np.where(spans, sign * across, 0.0).sum(axis=1)
        return np.maximum(width, 0.0)

    return np.column_stack([low, high, width_at(low), width_at(high)])
