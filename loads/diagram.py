"""Net pressure against elevation as a sum of steps and ramps, and its integrals, for n states at once.

    p(z) = Σ s ⟨k − z⟩⁰ + g ⟨k − z⟩¹          k knot, s step, g slope with depth
    V(z) = Σ s ⟨k − z⟩¹ + g ⟨k − z⟩²/2        force per metre of width above z
    M(z) = Σ s ⟨k − z⟩²/2 + g ⟨k − z⟩³/6      moment about z of everything above z
    N(z) = Σ s ⟨k − z⟩³/6 + g ⟨k − z⟩⁴/24     its integral, for faces whose width varies
    Q(z) = Σ s ⟨k − z⟩⁴/24 + g ⟨k − z⟩⁵/120   the next, for deflections

⟨x⟩ʲ is the Macaulay bracket of beam theory: xʲ for x > 0, else nothing.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from math import factorial

import numpy as np

from loads.arrays import FloatArray

_ROUNDING = 1e-12
_ELEVATION_ROUNDING = 4 * float(np.finfo(float).eps)
_BLOCK_ELEMENTS = 32_768
"""States are taken in blocks of about this many values, which stay in a core's cache."""


def _add_ramp(
    total: FloatArray,
    knot: FloatArray,
    slope: FloatArray,
    factor: FloatArray,
    centre: FloatArray,
    beyond: np.ufunc,
) -> None:
    """Add slope·factor·⟨knot − centre⟩ for every state and strip, block by block, slopes of one sign."""
    rows = max(1, _BLOCK_ELEMENTS // len(centre))
    right = np.stack([factor, -factor * centre])
    left = np.stack([slope * knot, slope], axis=1)
    room = np.empty((rows, len(centre)))
    for start in range(0, len(knot), rows):
        part = room[: len(left) - start]
        np.matmul(left[start : start + rows], right, out=part)
        beyond(part, 0, out=part)
        total[start : start + rows] += part


@dataclass(frozen=True, kw_only=True)
class Diagram:
    """A pressure diagram of n states with k terms.

    Attributes
    ----------
    knot
        Elevation at which each term starts, shape (n, k). [m]
    step
        Pressure that sets in at the knot, shape (n, k). [Pa]
    slope
        Growth of pressure with depth below the knot, shape (n, k). [N/m³]
    """

    knot: FloatArray
    step: FloatArray
    slope: FloatArray

    @classmethod
    def of_terms(cls, states: int, terms: Iterable[tuple[FloatArray | float, ...]]) -> Diagram:
        """Build a diagram from (knot, step, slope) terms, each entry a number or an array of shape (n,)."""
        columns = [[np.broadcast_to(np.asarray(entry, float), (states,)) for entry in term] for term in terms]
        if not columns:
            empty = np.zeros((states, 0))
            return cls(knot=empty, step=empty, slope=empty)
        knot, step, slope = (np.column_stack([column[i] for column in columns]) for i in range(3))
        return cls(knot=knot, step=step, slope=slope)

    @property
    def states(self) -> int:
        """Number of states n."""
        return int(self.knot.shape[0])

    def __add__(self, other: Diagram) -> Diagram:
        """Join the terms: the diagram of both loads together."""
        return Diagram.joined([self, other])

    @classmethod
    def joined(cls, diagrams: Iterable[Diagram]) -> Diagram:
        """Join the terms of several diagrams of the same states."""
        listed = list(diagrams)
        return cls(
            knot=np.concatenate([d.knot for d in listed], axis=1),
            step=np.concatenate([d.step for d in listed], axis=1),
            slope=np.concatenate([d.slope for d in listed], axis=1),
        )

    def scaled(self, factor: float) -> Diagram:
        """Return the diagram times a number; −1 turns a push toward the flood side around."""
        return Diagram(knot=self.knot, step=factor * self.step, slope=factor * self.slope)

    def raised(self, height: float) -> Diagram:
        """Return the diagram shifted up by a height."""
        return Diagram(knot=self.knot + height, step=self.step, slope=self.slope)

    def shortened(self) -> Diagram:
        """Return the diagram without terms that are nil in every state."""
        counts = (self.step != 0).any(axis=0) | (self.slope != 0).any(axis=0)
        if counts.all():
            return self
        return Diagram(knot=self.knot[:, counts], step=self.step[:, counts], slope=self.slope[:, counts])

    def take(self, index: int) -> Diagram:
        """Return one state as a diagram with n = 1."""
        rows = slice(index, index + 1)
        return Diagram(knot=self.knot[rows], step=self.step[rows], slope=self.slope[rows])

    def pressure(self, z: FloatArray, *, at_underside: bool = False) -> FloatArray:
        """Pressure at elevations.

        Parameters
        ----------
        z
            Elevations, shape (m,) or (n, m). [m]
        at_underside
            Where the diagram jumps, the value just below z instead of just above it.

        Returns
        -------
        FloatArray
            Shape (n, m). [Pa]
        """
        points = np.atleast_2d(z)
        total = np.zeros((self.states, points.shape[1]))
        for k in range(self.knot.shape[1]):
            depth = self.knot[:, k, None] - points
            reached = depth >= 0 if at_underside else depth > 0
            total += np.where(
                reached, self.step[:, k, None] + self.slope[:, k, None] * np.maximum(depth, 0), 0
            )
        return total

    def shear(self, z: FloatArray) -> FloatArray:
        """V, force per metre of width of everything above z, shape (n, m). [N/m]."""
        return self._integral(z, 1)

    def moment(self, z: FloatArray) -> FloatArray:
        """M, moment per metre of width about z of everything above z, shape (n, m). [N·m/m]."""
        return self._integral(z, 2)

    def moment_integral(self, z: FloatArray) -> FloatArray:
        """N, integral of M above z, shape (n, m). [N·m]."""
        return self._integral(z, 3)

    def moment_second_integral(self, z: FloatArray) -> FloatArray:
        """Q, integral of N above z, for deflections, shape (n, m). [N·m²]."""
        return self._integral(z, 4)

    def _integral(self, z: FloatArray, order: int) -> FloatArray:
        points = np.atleast_2d(z)
        total = np.zeros((self.states, points.shape[1]))
        for k in range(self.knot.shape[1]):
            depth = np.maximum(self.knot[:, k, None] - points, 0)
            power = depth
            for _ in range(order - 1):
                power = power * depth
            ramp = (self.slope[:, k, None] / factorial(order + 1)) * depth
            total += power * (self.step[:, k, None] / factorial(order) + ramp)
        return total

    def stacked(self, edges: FloatArray) -> tuple[FloatArray, FloatArray]:
        """Force and moment of strips that lie edge to edge, such as the logs of a stack.

        Parameters
        ----------
        edges
            Elevations of the m + 1 edges from the bottom up, shape (m + 1,). [m]

        Returns
        -------
        tuple of FloatArray
            Force per metre of width [N/m] and moment about the strip's own lower edge [N·m/m], each (n, m).

        Notes
        -----
        A ramp that starts above a strip gives F = g·h·(k − middle) and M = g·h²/2·(k − (a + 2h/3)), products
        of a state's figures with a strip's; where these change sign the strip is dry. The one strip in which
        a ramp starts is put right on its own. That is six array passes a ramp.
        """
        low, high = edges[:-1], edges[1:]
        height = high - low
        force, moment = (np.zeros((self.states, len(height))) for _ in range(2))
        centres = ((force, height, low + height / 2), (moment, height**2 / 2, low + 2 * height / 3))
        for k in range(self.knot.shape[1]):
            for slope, beyond in (
                (np.maximum(self.slope[:, k], 0), np.maximum),
                (np.minimum(self.slope[:, k], 0), np.minimum),
            ):
                if slope.any():
                    for total, factor, centre in centres:
                        _add_ramp(total, self.knot[:, k], slope, factor, centre, beyond)
            self._mend_partial(k, edges, force, moment)
        if self.step.any():
            steps = Diagram(knot=self.knot, step=self.step, slope=np.zeros_like(self.slope))
            zeroth, first, _ = steps.strips(low, high)
            force += zeroth
            moment += first
        return force, moment

    def _mend_partial(self, k: int, edges: FloatArray, force: FloatArray, moment: FloatArray) -> None:
        """Replace what `_add_ramp` gave to the strips within which a ramp starts."""
        strip = np.searchsorted(edges, self.knot[:, k]) - 1
        state = np.flatnonzero((strip >= 0) & (strip < len(edges) - 1))
        strip = strip[state]
        slope, depth = self.slope[state, k], self.knot[state, k] - edges[strip]
        height = edges[strip + 1] - edges[strip]
        force[state, strip] += slope * (depth**2 / 2 - height * np.maximum(depth - height / 2, 0))
        moment[state, strip] += slope * (depth**3 / 6 - height**2 / 2 * np.maximum(depth - 2 * height / 3, 0))

    def strips(self, low: FloatArray, high: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
        """Zeroth, first and second moment of the pressure over strips, without loss of digits.

        Parameters
        ----------
        low, high
            Elevations of the strips' ends, shape (m,) or (n, m). [m]

        Returns
        -------
        tuple of FloatArray
            ∫p dz [N/m], ∫p (z − low) dz [N·m/m] and ∫p (z − low)² dz [N·m], each of shape (n, m).

        Notes
        -----
        Within a strip a term that starts above it is a step and a ramp that start at its upper end, so no
        large numbers are subtracted from one another.
        """
        low, high = np.atleast_2d(low), np.atleast_2d(high)
        shape = (self.states, low.shape[1])
        zeroth, first, second = np.zeros(shape), np.zeros(shape), np.zeros(shape)
        for k in range(self.knot.shape[1]):
            knot, slope = self.knot[:, k, None], self.slope[:, k, None]
            above = np.maximum(knot - high, 0)
            depth = np.maximum(np.minimum(knot, high) - low, 0)
            step = self.step[:, k, None] + slope * above
            zeroth += depth * (step + slope * depth / 2)
            first += depth**2 * (step / 2 + slope * depth / 6)
            second += depth**3 * (step / 3 + slope * depth / 12)
        return zeroth, first, second

    def gross(self, z: float) -> FloatArray:
        """Sum of all terms' magnitudes at an elevation, (n,): against it a sum may count as nil. [Pa]."""
        depth = np.maximum(self.knot - z, 0)
        magnitude = (np.abs(self.step) + np.abs(self.slope) * depth) * (depth > 0)
        return np.asarray(magnitude.sum(axis=1))

    def rounding(self, z: float) -> FloatArray:
        """Pressure at an elevation that is only rounding of its terms and of their elevations, (n,). [Pa]."""
        elevations = (np.abs(self.slope) * (np.abs(self.knot) + abs(z))).sum(axis=1)
        return np.asarray(_ROUNDING * self.gross(z) + _ELEVATION_ROUNDING * elevations)

    def below(self, top: float) -> Diagram:
        """Return the diagram cut off at an elevation: the same below it, nothing above it."""
        above = np.maximum(self.knot - top, 0)
        return Diagram(knot=np.minimum(self.knot, top), step=self.step + self.slope * above, slope=self.slope)

    def extremes(self, bottom: float, top: float) -> tuple[FloatArray, FloatArray]:
        """Greatest and least pressure between two elevations, each of shape (n,). [Pa]."""
        knots = np.clip(self.knot, bottom, top)
        inside = np.concatenate(
            [np.full((self.states, 1), bottom), knots, np.full((self.states, 1), top)], axis=1
        )
        over = self.pressure(inside)
        under = self.pressure(inside, at_underside=True)
        over = np.where(inside < top, over, under)
        under = np.where(inside > bottom, under, over)
        both = np.concatenate([over, under], axis=1)
        return both.max(axis=1), both.min(axis=1)

    def rows(self, bottom: float, top: float, index: int = 0) -> list[tuple[float, float]]:
        """Corners of one state's diagram between two elevations, (z, p) from the bottom up, two at a jump."""
        one = self.take(index)
        inside = one.knot[0][(one.knot[0] > bottom) & (one.knot[0] < top)]
        levels = np.unique(np.concatenate([[bottom, top], inside]))
        over, under = one.pressure(levels)[0], one.pressure(levels, at_underside=True)[0]
        rows: list[tuple[float, float]] = []
        for z, p_over, p_under in zip(levels, over, under, strict=True):
            if z > bottom:
                rows.append((float(z), float(p_under)))
            if z < top and (z == bottom or abs(p_over - p_under) > 1e-9 * max(abs(p_over), abs(p_under))):
                rows.append((float(z), float(p_over)))
        return rows
