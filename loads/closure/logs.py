"""What logs carry: each a simple beam between its bearings under the exact load on its height."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.closure.layout import Indices, Layout
from loads.diagram import Diagram


@dataclass(frozen=True, kw_only=True)
class LogForces:
    """Forces of m logs in n states, positive toward the protected side.

    Attributes
    ----------
    line_load
        Along the span, shape (n, m). [N/m]
    moment
        At mid-span, shape (n, m). [N·m]
    reaction
        At each end, which is the greatest shear, shape (n, m). [N]
    bearing_pressure
        At each end, shape (n, m); NaN without a bearing length. [Pa]
    deflection
        At mid-span, shape (n, m); NaN without a stiffness. [m]
    """

    line_load: FloatArray
    moment: FloatArray
    reaction: FloatArray
    bearing_pressure: FloatArray
    deflection: FloatArray


def simple_beam(
    line_load: FloatArray, span: FloatArray, stiffness: float
) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Moment, end reaction and deflection of a simple beam under an even load [ElementaryBeamTheory].

    Parameters
    ----------
    line_load
        w, shape (n, m). [N/m]
    span
        L, shape (m,). [m]
    stiffness
        EI; NaN when it is not known. [N·m²]

    Returns
    -------
    tuple of FloatArray
        w L²/8 [N·m], w L/2 [N] and 5 w L⁴/(384 EI) [m], each (n, m).

    Examples
    --------
    >>> moment, reaction, sag = simple_beam(np.array([[10e3]]), np.array([4.0]), 5000e3)
    >>> moment, reaction, sag.round(9)
    (array([[20000.]]), array([[20000.]]), array([[0.00666667]]))
    """
    return (
        line_load * (span**2 / 8),
        line_load * (span / 2),
        line_load * (5 * span**4 / (384 * stiffness)),
    )


def log_forces(diagram: Diagram, layout: Layout, stiffness: float, columns: Indices) -> LogForces:
    """Forces of logs in place.

    Parameters
    ----------
    diagram
        Net pressure.
    layout
        The closure.
    stiffness
        EI of a log; NaN when it is not known. [N·m²]
    columns
        Which of the layout's logs, shape (m,).

    Returns
    -------
    LogForces
        Shape (n, m).

    Notes
    -----
    Line load w = V(bottom) − V(top), exact for any pressure within the log's height. Bearing pressure
    R/(bearing length · height).
    """
    edges = layout.edges
    by_row, _, _ = diagram.strips(edges[:-1], edges[1:])
    line_load = by_row[:, layout.row_of[columns]]
    moment, reaction, deflection = simple_beam(line_load, layout.spans[layout.bay_of[columns]], stiffness)
    area = layout.bearing * layout.log_height
    return LogForces(
        line_load=line_load,
        moment=moment,
        reaction=reaction,
        bearing_pressure=reaction / (area if area > 0 else np.nan),
        deflection=deflection,
    )
