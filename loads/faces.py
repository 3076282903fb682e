"""Faces that pressure acts on: plane ones of any outline and tilt, and circular arcs."""

from __future__ import annotations

import math
from dataclasses import dataclass

import numpy as np
from shapely import Polygon

from loads.arc import ArcShape
from loads.arrays import FloatArray
from loads.diagram import Diagram
from loads.disc import segment_moments
from loads.outline import width_strips
from loads.records.panel import Panel, ring_values


@dataclass(frozen=True, kw_only=True)
class Resultant:
    """What a pressure diagram amounts to on a face, for n states.

    Attributes
    ----------
    horizontal
        Horizontal part, positive toward the protected side, shape (n,). [N]
    vertical
        Vertical part, positive up, shape (n,). [N]
    total
        Magnitude of both together with the sign of a plane face's normal force: positive when it pushes from
        flood side to protected side; of an arc the sign of the horizontal part, shape (n,). [N]
    moment
        About the bottom edge, positive when it turns the top toward the protected side, shape (n,). [N·m]
    line_of_action
        Elevation at which the horizontal part acts, shape (n,); NaN when it is nil. [m]
    """

    horizontal: FloatArray
    vertical: FloatArray
    total: FloatArray
    moment: FloatArray
    line_of_action: FloatArray


def line_of_action(bottom: float, force: FloatArray, moment: FloatArray, scale: FloatArray) -> FloatArray:
    """Elevation at which a horizontal force acts.

    Parameters
    ----------
    bottom
        Elevation about which the moment is taken. [m]
    force, moment
        Horizontal force and the moment of horizontal pressure about `bottom`, shape (n,). [N, N·m]
    scale
        Gross force against which `force` may count as nil, shape (n,). [N]

    Returns
    -------
    FloatArray
        Shape (n,), NaN where there is no force to place. [m]
    """
    nil = np.abs(force) <= 1e-12 * scale
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.where(nil, np.nan, bottom + moment / np.where(nil, 1.0, force))


@dataclass(frozen=True, kw_only=True)
class StripFace:
    """Plane face whose width varies linearly within strips: rectangle, trapezoid, triangle, any outline.

    Attributes
    ----------
    bottom
        Elevation of the bottom edge. [m]
    tilt
        Angle from the protected-side horizontal to the face. [rad]
    strip_table
        Shape (m, 4): lower end, upper end (along the face from the bottom edge), width at each. [m]
    """

    bottom: float
    tilt: float
    strip_table: FloatArray

    @property
    def length(self) -> float:
        """Height along the face. [m]."""
        return float(self.strip_table[-1, 1])

    @property
    def top(self) -> float:
        """Elevation of the top edge. [m]."""
        return self.bottom + self.length * math.sin(self.tilt)

    @property
    def area(self) -> float:
        """Area of the face. [m²]."""
        low, high, at_low, at_high = self.strip_table.T
        return float(((high - low) * (at_low + at_high) / 2).sum())

    def x_at(self, z: float) -> float:
        """Position at an elevation, from the bottom edge toward the protected side. [m]."""
        return _plane_x(z - self.bottom, self.tilt)

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face.

        Notes
        -----
        With p(z), width b = b₁ + b′(z − z₁) within a strip and z = z₀ + s·sin θ along the face, normal force
        ∫p b ds = ∫p b dz / sin θ and moment about the bottom edge ∫p b s ds = ∫p b (z − z₀) dz / sin² θ.
        """
        sine = math.sin(self.tilt)
        start, end, at_low, at_high = self.strip_table.T
        change = (at_high - at_low) / ((end - start) * sine)
        low = start * sine
        zeroth, first, second = diagram.raised(-self.bottom).strips(low, end * sine)
        force = zeroth * at_low + first * change
        about_low = first * at_low + second * change
        normal = force.sum(axis=1) / sine
        upright = (about_low + force * low).sum(axis=1)
        scale = diagram.gross(self.bottom) * self.area
        return plane_resultant(self.bottom, self.tilt, normal, upright / sine**2, scale)


def _plane_x(height: float, tilt: float) -> float:
    return height / math.tan(tilt) if abs(tilt - math.pi / 2) > 1e-12 else 0.0


def plane_resultant(
    bottom: float, tilt: float, normal: FloatArray, moment: FloatArray, scale: FloatArray
) -> Resultant:
    """Parts of a plane face's normal force, which acts along (sin θ, −cos θ)."""
    sine, cosine = math.sin(tilt), math.cos(tilt)
    if abs(cosine) < 1e-15:
        cosine = 0.0
    return Resultant(
        horizontal=normal * sine,
        vertical=0.0 - normal * cosine,
        total=normal,
        moment=moment,
        line_of_action=line_of_action(bottom, normal, moment * sine, scale),
    )


@dataclass(frozen=True, kw_only=True)
class CircleFace:
    """Plane circular face, exact.

    Attributes
    ----------
    bottom
        Elevation of the lowest point. [m]
    tilt
        Angle from the protected-side horizontal to the face. [rad]
    radius
        Radius. [m]
    """

    bottom: float
    tilt: float
    radius: float

    @property
    def length(self) -> float:
        """Height along the face. [m]."""
        return 2 * self.radius

    @property
    def top(self) -> float:
        """Elevation of the highest point. [m]."""
        return self.bottom + self.length * math.sin(self.tilt)

    @property
    def area(self) -> float:
        """Area of the face. [m²]."""
        return math.pi * self.radius**2

    def x_at(self, z: float) -> float:
        """Position at an elevation, from the bottom edge toward the protected side. [m]."""
        return _plane_x(z - self.bottom, self.tilt)

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face, in closed form.

        Notes
        -----
        A ramp of slope g that starts at h above the lowest point (along the face) gives the force
        g·sin θ·(h·A − Q) and a step s the force s·A; about the lowest point they have the moments
        g·sin θ·(h·Q − I) and s·Q, with A, Q, I of the disc's segment below h.
        """
        sine = math.sin(self.tilt)
        cut = diagram.below(self.top)
        chord = np.clip((cut.knot - self.bottom) / sine, 0.0, self.length)
        area, first, second = segment_moments(chord, self.radius)
        ramp = cut.slope * sine
        normal = (cut.step * area + ramp * (chord * area - first)).sum(axis=1)
        moment = (cut.step * first + ramp * (chord * first - second)).sum(axis=1)
        scale = diagram.gross(self.bottom) * self.area
        return plane_resultant(self.bottom, self.tilt, normal, moment, scale)


@dataclass(frozen=True, kw_only=True)
class ArcFace:
    """Circular arc of constant width between a bottom and a top edge.

    Attributes
    ----------
    bottom
        Elevation of the bottom edge. [m]
    width
        Width across the face. [m]
    shape
        Geometry of the arc.
    """

    bottom: float
    width: float
    shape: ArcShape

    @property
    def top(self) -> float:
        """Elevation of the top edge. [m]."""
        return self.bottom + self.shape.height

    @property
    def length(self) -> float:
        """Straight distance from edge to edge. [m]."""
        return self.shape.chord

    @property
    def area(self) -> float:
        """Area of the curved face. [m²]."""
        arc = self.shape
        angle = 2 * math.asin(min(1.0, arc.chord / (2 * arc.radius)))
        return self.width * arc.radius * angle

    def x_at(self, z: float) -> float:
        """Position at an elevation, from the bottom edge toward the protected side. [m]."""
        return self.shape.x_at(z - self.bottom)

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face, in closed form.

        Notes
        -----
        Horizontal: the vertical projection. Vertical: −b∫p dx, the weight of the real or imaginary fluid
        above; a ramp that starts at the height h takes the prism ∫x dy from the bottom edge up to h.
        All pressures point through the centre, so the moment about it is nil and the moment about the bottom
        edge is that of the resultant placed at the centre.
        """
        arc = self.shape
        cut = diagram.raised(-self.bottom).below(arc.height)
        zeroth, first, _ = cut.strips(np.zeros(1), np.array([arc.height]))
        horizontal = zeroth[:, 0] * self.width
        rise = np.clip(cut.knot, 0.0, arc.height)
        run, prism = arc.run_and_prism(rise)
        vertical = -self.width * (cut.step * run + cut.slope * prism).sum(axis=1)
        scale = diagram.gross(self.bottom) * self.area
        return Resultant(
            horizontal=horizontal,
            vertical=vertical,
            total=np.copysign(np.hypot(horizontal, vertical), horizontal),
            moment=horizontal * arc.centre_z - vertical * arc.centre_x,
            line_of_action=line_of_action(self.bottom, horizontal, first[:, 0] * self.width, scale),
        )


def face_of(panel: Panel) -> StripFace | CircleFace | ArcFace:
    """Face of a panel record."""
    bottom, tilt = panel.bottom.value, panel.tilt_angle
    if panel.shape == "circle":
        assert panel.diameter is not None
        return CircleFace(bottom=bottom, tilt=tilt, radius=panel.diameter.value / 2)
    if panel.shape == "arc":
        assert panel.width is not None
        return ArcFace(bottom=bottom, width=panel.width.value, shape=panel.arc_shape())
    if panel.shape == "outline":
        assert panel.points is not None
        outline = Polygon(ring_values(panel.points), [ring_values(hole) for hole in panel.holes or ()])
        return StripFace(bottom=bottom, tilt=tilt, strip_table=width_strips(outline))
    assert panel.height is not None
    low, high = (
        (panel.width, panel.width) if panel.shape == "rectangle" else (panel.bottom_width, panel.top_width)
    )
    assert low is not None
    assert high is not None
    table = np.array([[0.0, panel.height.value, low.value, high.value]])
    return StripFace(bottom=bottom, tilt=tilt, strip_table=table)
