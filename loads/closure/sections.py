"""Properties of a part's cross-section about the axis it bends about when water presses on it."""

from __future__ import annotations

from dataclasses import dataclass

from loads.records.closure_parts import Log, Post
from loads.records.member import Section

UNKNOWN = float("nan")


@dataclass(frozen=True, kw_only=True)
class SectionProperties:
    """Properties of a section; NaN where nobody entered what they need.

    Attributes
    ----------
    section_modulus
        Elastic section modulus S. [m³]
    second_moment
        Second moment of area I. [m⁴]
    shear_area
        Area by which the shear force is the greatest shear stress, I·b/Q at the neutral axis. [m²]
    area
        Area of the material. [m²]
    gross_area
        Area within the outline. [m²]
    """

    section_modulus: float = UNKNOWN
    second_moment: float = UNKNOWN
    shear_area: float = UNKNOWN
    area: float = UNKNOWN
    gross_area: float = UNKNOWN


def rectangle(thickness: float, breadth: float) -> SectionProperties:
    """Properties of a full rectangle [ElementaryBeamTheory].

    Parameters
    ----------
    thickness
        Depth in bending d, along the flow. [m]
    breadth
        Width b, across it. [m]

    Returns
    -------
    SectionProperties
        All of them.

    Notes
    -----
    S = b d²/6, I = b d³/12, A = b d, greatest shear stress 3V/2A.

    Examples
    --------
    >>> round(rectangle(0.05, 0.2).section_modulus * 1e9)
    83333
    """
    area = thickness * breadth
    return SectionProperties(
        section_modulus=area * thickness / 6,
        second_moment=area * thickness**2 / 12,
        shear_area=area * 2 / 3,
        area=area,
        gross_area=area,
    )


def hollow_rectangle(thickness: float, breadth: float, wall: float, ribs: int = 0) -> SectionProperties:
    """Properties of a hollow rectangle with inner ribs along the flow [ElementaryBeamTheory].

    Parameters
    ----------
    thickness
        Outer depth in bending d, along the flow. [m]
    breadth
        Outer width b, across it. [m]
    wall
        Thickness t of the walls and of every rib. [m]
    ribs
        Number of inner ribs r.

    Returns
    -------
    SectionProperties
        All of them; corners square.

    Notes
    -----
    With the hollow b₁ = b − (2 + r)t wide and d₁ = d − 2t deep: I = (b d³ − b₁ d₁³)/12, S = 2I/d,
    A = b d − b₁ d₁, Q = (b d² − b₁ d₁²)/8 and shear area I (2 + r)t / Q.

    Examples
    --------
    >>> log = hollow_rectangle(0.05, 0.2, 0.003, ribs=1)
    >>> round(log.area * 1e6), round(log.second_moment * 1e12), round(log.section_modulus * 1e9, 2)
    (1596, 727488, 29099.52)
    """
    webs = (2 + ribs) * wall
    hollow, depth = breadth - webs, thickness - 2 * wall
    second_moment = (breadth * thickness**3 - hollow * depth**3) / 12
    first_moment = (breadth * thickness**2 - hollow * depth**2) / 8
    return SectionProperties(
        section_modulus=2 * second_moment / thickness,
        second_moment=second_moment,
        shear_area=second_moment * webs / first_moment,
        area=breadth * thickness - hollow * depth,
        gross_area=breadth * thickness,
    )


def log_section(log: Log) -> SectionProperties:
    """Properties of a log's section."""
    section = log.section
    if section is None:
        return SectionProperties()
    return _properties(section, (section.height or log.height).value)


def post_section(post: Post) -> SectionProperties:
    """Properties of a post's section."""
    section = post.section
    if section is None:
        return SectionProperties()
    width = section.width or post.width
    return _properties(section, width.value if width else UNKNOWN)


def _properties(section: Section, breadth: float) -> SectionProperties:
    thickness = section.thickness.value if section.thickness else UNKNOWN
    if section.shape == "rectangle":
        return rectangle(thickness, breadth)
    if section.shape == "hollow rectangle":
        assert section.wall is not None
        return hollow_rectangle(thickness, breadth, section.wall.value, section.ribs)
    modulus, second, shear = section.section_modulus, section.second_moment, section.shear_area
    return SectionProperties(
        section_modulus=modulus.value if modulus else UNKNOWN,
        second_moment=second.value if second else UNKNOWN,
        shear_area=shear.value if shear else UNKNOWN,
        gross_area=thickness * breadth,
    )
