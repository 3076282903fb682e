"""Faces that pressure acts on: plane ones of any outline and tilt, and circular arcs."""

from __future__ import annotations

import math
from dataclasses import dataclass
from typing import Protocol

import numpy as np
from shapely import Polygon

from loads.arc import ArcShape
from loads.arrays import FloatArray
from loads.diagram import Diagram
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


class Face(Protocol):
    """What every face can tell."""

    @property
    def bottom(self) -> float:
        """Elevation of the bottom edge. [m]."""

    @property
    def top(self) -> float:
        """Elevation of the top edge. [m]."""

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face."""

    def x_at(self, z: float) -> float:
        """Position of the face at an elevation, from its bottom edge toward the protected side. [m]."""


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
        return (z - self.bottom) / math.tan(self.tilt) if abs(self.tilt - math.pi / 2) > 1e-12 else 0.0

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face.

        Notes
        -----
        With p(z), width b = b₁ + b′(z − z₁) within a strip and z = z₀ + s·sin θ along the face, normal force
        ∫p b ds = ∫p b dz / sin θ and moment about the bottom edge ∫p b s ds = ∫p b (z − z₀) dz / sin² θ.
        """
        sine = math.sin(self.tilt)
        low = self.bottom + self.strip_table[:, 0] * sine
        high = self.bottom + self.strip_table[:, 1] * sine
        at_low, at_high = self.strip_table[:, 2], self.strip_table[:, 3]
        change = (at_high - at_low) / (high - low)
        zeroth, first, second = diagram.strips(low, high)
        force = zeroth * at_low + first * change
        about_low = first * at_low + second * change
        normal = force.sum(axis=1) / sine
        upright = (about_low + force * (low - self.bottom)).sum(axis=1)
        scale = diagram.gross(self.bottom) * self.area
        return plane_resultant(self.bottom, self.tilt, normal, upright / sine**2, scale)


def plane_resultant(
    bottom: float, tilt: float, normal: FloatArray, moment: FloatArray, scale: FloatArray
) -> Resultant:
    """Parts of a plane face's normal force, which acts along (sin θ, −cos θ)."""
    sine, cosine = math.sin(tilt), math.cos(tilt)
    if abs(cosine) < 1e-15:
        cosine = 0.0
    return Resultant(
        horizontal=normal * sine,
        vertical=-normal * cosine,
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
        return (z - self.bottom) / math.tan(self.tilt) if abs(self.tilt - math.pi / 2) > 1e-12 else 0.0

    def segment(self, chord: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
        """Area of the disc below a chord, and its first and second moment about the disc's middle.

        Parameters
        ----------
        chord
            Height of the chord above the middle along the face, within ±radius. [m]

        Returns
        -------
        tuple of FloatArray
            A [m²], ∫t dA [m³] and ∫t² dA [m⁴], t measured up the face from the middle.
        """
        r = self.radius
        half = np.sqrt(np.maximum(r**2 - chord**2, 0))
        angle = np.arcsin(np.clip(chord / r, -1, 1)) + math.pi / 2
        area = r**2 * angle + chord * half
        first = -2 / 3 * half**3
        second = (r**4 * angle - chord * half * (r**2 - 2 * chord**2)) / 4
        return area, first, second

    def resultant(self, diagram: Diagram) -> Resultant:
        """Force and moment of a pressure diagram on this face, in closed form.

        Notes
        -----
        A ramp of slope g that starts at u above the middle (along the face) gives the force
        g·sin θ·(u·A − Q) and a step s the force s·A, with A, Q, I of the disc's segment below u; moments about
        the bottom point are those about the middle plus radius times force.
        """
        sine = math.sin(self.tilt)
        cut = diagram.below(self.top)
        start = (cut.knot - self.bottom) / sine - self.radius
        chord = np.clip(start, -self.radius, self.radius)
        area, first, second = self.segment(chord)
        ramp = cut.slope * sine
        force = cut.step * area + ramp * (chord * area - first)
        about_middle = cut.step * first + ramp * (chord * first - second)
        normal = force.sum(axis=1)
        moment = about_middle.sum(axis=1) + self.radius * normal
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
        Horizontal: the vertical projection. Vertical: −b∫p dx, the weight of the real or imaginary fluid above.
        All pressures point through the centre, so the moment about it is nil and the moment about the bottom
        edge is that of the resultant placed at the centre.
        """
        arc = self.shape
        cut = diagram.below(self.top)
        bottom, top = np.array([self.bottom]), np.array([self.top])
        zeroth, first, _ = cut.strips(bottom, top)
        horizontal = zeroth[:, 0] * self.width
        centre = self.bottom + arc.centre_z
        rise = np.clip(cut.knot, self.bottom, self.top) - centre
        foot = -arc.centre_z

        def across(height: FloatArray | float) -> FloatArray:
            return arc.bulge * np.sqrt(np.maximum(arc.radius**2 - np.square(height), 0))

        def half_area(height: FloatArray | float) -> FloatArray:
            inner = np.arcsin(np.clip(np.divide(height, arc.radius), -1, 1))
            return (arc.radius**2 * inner - height * arc.bulge * across(height)) / 2

        run = across(rise) - across(foot)
        run_moment = -arc.bulge * (half_area(rise) - half_area(foot))
        vertical = -self.width * (cut.step * run + cut.slope * (rise * run - run_moment)).sum(axis=1)
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
