"""The section of a wall as arrays of corners, one section for all states or one section a state.

Corners are (x, z): x from the heel toward the protected side, z elevation. The outline runs anticlockwise
from the heel: along the underside to the toe, up the protected side, over the top, down the flood side.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, replace

import numpy as np

from loads.arrays import FloatArray


@dataclass(frozen=True, kw_only=True)
class SectionPart:
    """One part of m sections.

    Attributes
    ----------
    name
        What it is called in tables.
    x, z
        Corners, shape (m, v). [m]
    unit_weight
        Weight per volume. [N/m³]
    """

    name: str
    x: FloatArray
    z: FloatArray
    unit_weight: float


@dataclass(frozen=True, kw_only=True)
class Stem:
    """Where the stem stands on its base slab, of m sections.

    Attributes
    ----------
    foot, top
        Elevations of its two ends, shape (m,). [m]
    flood_x, protected_x
        Faces at the foot, from the heel, shape (m,). [m]
    slab
        Thickness of the base slab; nil without one, shape (m,). [m]
    """

    foot: FloatArray
    top: FloatArray
    flood_x: FloatArray
    protected_x: FloatArray
    slab: FloatArray


@dataclass(frozen=True, kw_only=True)
class Section:
    """m wall sections with outlines of the same number of corners.

    Attributes
    ----------
    parts
        What it consists of.
    x, z
        Corners of the outline, anticlockwise from the heel, shape (m, k). [m]
    toe, protected_top, flood_top
        Indices of three corners of the outline.
    stem
        None for sections given by their corners.
    """

    parts: tuple[SectionPart, ...]
    x: FloatArray
    z: FloatArray
    toe: int
    protected_top: int
    flood_top: int
    stem: Stem | None

    @property
    def base(self) -> FloatArray:
        """Elevation of the base, shape (m,). [m]."""
        return self.z[:, 0]

    @property
    def base_width(self) -> FloatArray:
        """Width of the base from heel to toe, shape (m,). [m]."""
        return np.asarray(self.x[:, self.toe] - self.x[:, 0])

    @property
    def lowest(self) -> FloatArray:
        """Lowest elevation, that of a key's bottom, shape (m,). [m]."""
        return np.asarray(self.z.min(axis=1))

    @property
    def top(self) -> FloatArray:
        """Highest elevation, shape (m,). [m]."""
        return self.z[:, self.flood_top]

    def chain(self, name: str) -> tuple[FloatArray, FloatArray]:
        """Corners of one run of the outline in its own direction, each (m, j). [m].

        "base" from heel to toe, "protected" up from the toe, "top" across, "flood" down to the heel.
        """
        start, stop = {
            "base": (0, self.toe),
            "protected": (self.toe, self.protected_top),
            "top": (self.protected_top, self.flood_top),
            "flood": (self.flood_top, self.x.shape[1]),
        }[name]
        index = np.arange(start, stop + 1) % self.x.shape[1]
        return self.x[:, index], self.z[:, index]

    def take(self, index: int) -> Section:
        """Return one of the sections."""
        row = slice(index, index + 1) if len(self.x) > 1 else slice(0, 1)
        parts = tuple(replace(part, x=part.x[row], z=part.z[row]) for part in self.parts)
        stem = self.stem and Stem(**{name: value[row] for name, value in vars(self.stem).items()})
        return replace(self, parts=parts, x=self.x[row], z=self.z[row], stem=stem)


def area_and_centroid(x: FloatArray, z: FloatArray) -> tuple[FloatArray, FloatArray, FloatArray]:
    """Area and centroid of polygons by the sum over their edges.

    Parameters
    ----------
    x, z
        Corners of m polygons in order, shape (m, v). [m]

    Returns
    -------
    tuple of FloatArray
        Area [m²] and the centroid's x and z [m], each (m,); the centroid of nothing is its first corner.

    Notes
    -----
    A = ½ Σ (x_i z_j − x_j z_i), positive or negative by the sense of the corners and returned positive;
    taken from the first corner, which keeps the digits of polygons that lie far from the origin.

    Examples
    --------
    >>> area_and_centroid(np.array([[0.0, 2.0, 2.0, 0.0]]), np.array([[0.0, 0.0, 3.0, 3.0]]))
    (array([6.]), array([1.]), array([1.5]))
    """
    u, w = x - x[:, :1], z - z[:, :1]
    u_next, w_next = np.roll(u, -1, axis=1), np.roll(w, -1, axis=1)
    cross = u * w_next - u_next * w
    twice = cross.sum(axis=1)
    sixfold = np.where(twice != 0, 3 * twice, 1.0)
    across = ((u + u_next) * cross).sum(axis=1) / sixfold
    up = ((w + w_next) * cross).sum(axis=1) / sixfold
    return np.abs(twice) / 2, x[:, 0] + across, z[:, 0] + up


def _corners(*pairs: tuple[FloatArray | float, FloatArray | float]) -> tuple[FloatArray, FloatArray]:
    flat = np.broadcast_arrays(*(np.atleast_1d(np.asarray(value, float)) for pair in pairs for value in pair))
    return np.stack(flat[0::2], axis=1), np.stack(flat[1::2], axis=1)


def gravity_section(dimensions: Mapping[str, FloatArray], unit_weight: float) -> Section:
    """Trapezoids.

    Parameters
    ----------
    dimensions
        Arrays of shape (m,) or (1,): base, height, top_width, base_width, flood_batter. [m]
    unit_weight
        Weight per volume. [N/m³]
    """
    d = dimensions
    low, high = d["base"], d["base"] + d["height"]
    lean, width = d["flood_batter"], d["base_width"]
    x, z = _corners((0.0, low), (width, low), (lean + d["top_width"], high), (lean, high))
    part = SectionPart(name="wall", x=x, z=z, unit_weight=unit_weight)
    nil = np.zeros(len(x))
    stem = Stem(foot=z[:, 0], top=z[:, 2], flood_x=x[:, 0], protected_x=x[:, 1], slab=nil)
    return Section(parts=(part,), x=x, z=z, toe=1, protected_top=2, flood_top=3, stem=stem)


def slab_section(dimensions: Mapping[str, FloatArray], unit_weight: float) -> Section:
    """Stems on a base slab, shapes "T" and "L".

    Parameters
    ----------
    dimensions
        Arrays of shape (m,) or (1,): base, height, top_width, flood_batter, stem_width, base_thickness, heel,
        toe; and with keys key_depth, key_width, key_position. [m]
    unit_weight
        Weight per volume. [N/m³]
    """
    d = dimensions
    low, high, slab = d["base"], d["base"] + d["height"], d["base"] + d["base_thickness"]
    heel, stem = d["heel"], d["stem_width"]
    width, crest = heel + stem + d["toe"], heel + d["flood_batter"]
    key = _key_corners(d, low) if "key_depth" in d else ()
    x, z = _corners(
        (0.0, low),
        *key,
        (width, low),
        (width, slab),
        (heel + stem, slab),
        (crest + d["top_width"], high),
        (crest, high),
        (heel, slab),
        (0.0, slab),
    )
    shapes = {
        "stem": _corners((heel, slab), (heel + stem, slab), (crest + d["top_width"], high), (crest, high)),
        "base slab": _corners((0.0, low), (width, low), (width, slab), (0.0, slab)),
    }
    if key:
        shapes["key"] = _corners(*key)
    parts = tuple(
        SectionPart(
            name=name,
            x=np.broadcast_to(u, (len(x), u.shape[1])),
            z=np.broadcast_to(w, (len(x), w.shape[1])),
            unit_weight=unit_weight,
        )
        for name, (u, w) in shapes.items()
    )
    toe = 1 + len(key)
    stands = Stem(
        foot=z[:, toe + 2],
        top=z[:, toe + 3],
        flood_x=x[:, toe + 5],
        protected_x=x[:, toe + 2],
        slab=z[:, toe + 1] - z[:, toe],
    )
    return Section(parts=parts, x=x, z=z, toe=toe, protected_top=toe + 3, flood_top=toe + 4, stem=stands)


def _key_corners(d: Mapping[str, FloatArray], low: FloatArray) -> tuple[tuple[FloatArray, FloatArray], ...]:
    start, stop = d["key_position"], d["key_position"] + d["key_width"]
    foot = low - d["key_depth"]
    return ((start, low), (start, foot), (stop, foot), (stop, low))
