"""What every part of a closure carries, for n states, from its net pressure."""

from __future__ import annotations

from dataclasses import dataclass, fields
from functools import cached_property
from typing import TypeVar

import numpy as np

from loads.arrays import FloatArray
from loads.closure.anchors import AnchorForces, anchor_forces
from loads.closure.layout import Indices, Layout, Pieces, Upright, layout_of
from loads.closure.logs import LogForces, log_forces
from loads.closure.materials import MATERIALS
from loads.closure.post import PostForces, Prop, post_forces
from loads.closure.sections import SectionProperties, log_section, post_section
from loads.diagram import Diagram
from loads.quantity import Quantity
from loads.records.closure import Closure

Forces = TypeVar("Forces", PostForces, AnchorForces)


@dataclass(frozen=True, kw_only=True)
class Structure:
    """A closure as it bears: layout, sections, stiffnesses and brace.

    Attributes
    ----------
    closure
        The record.
    layout
        Its geometry.
    prop
        Brace of every post, None without one.
    """

    closure: Closure
    layout: Layout
    prop: Prop | None

    @cached_property
    def log(self) -> SectionProperties:
        """Section of a log."""
        return log_section(self.closure.log)

    @cached_property
    def post(self) -> SectionProperties:
        """Section of a post."""
        return post_section(self.closure.post) if self.closure.post else SectionProperties()

    @property
    def log_stiffness(self) -> float:
        """EI of a log, NaN when not known. [N·m²]."""
        log = self.closure.log
        return modulus_of(log.modulus, log.material) * self.log.second_moment

    @property
    def post_stiffness(self) -> float:
        """EI of a post, NaN when not known. [N·m²]."""
        post = self.closure.post
        return modulus_of(post.modulus, post.material) * self.post.second_moment if post else np.nan

    @property
    def post_weight(self) -> float:
        """Weight of a post, zero when not entered. [N]."""
        post = self.closure.post
        return post.weight.value if post and post.weight else 0.0


def structure_of(closure: Closure) -> Structure:
    """How a closure bears."""
    brace = closure.post.brace if closure.post else None
    prop = Prop(height=brace.height.value, angle=brace.angle.value, fixity=brace.fixity) if brace else None
    return Structure(closure=closure, layout=layout_of(closure), prop=prop)


def modulus_of(entered: Quantity | None, material: str | None) -> float:
    """Modulus of elasticity: as entered, or of the reference material; NaN without either. [Pa]."""
    if entered is not None:
        return entered.value
    return MATERIALS[material].modulus.limit().value if material else float("nan")


def upright_load(diagram: Diagram, pieces: Pieces, sill: float) -> Diagram:
    """Load along a post or guide, elevations counted from the sill. [N/m]."""
    if not pieces:
        return Diagram.of_terms(diagram.states, ())
    acting = diagram.shortened()
    return Diagram.joined(acting.below(top).scaled(width) for top, width in pieces).raised(-sill)


@dataclass(frozen=True, kw_only=True)
class Demands:
    """Forces of every part.

    Attributes
    ----------
    structure
        What bears.
    log_columns, post_columns
        Which logs and posts of the layout the columns stand for, shapes (m,) and (p,).
    logs
        Of the m logs.
    posts, anchors
        Of the p posts, every figure of shape (n, p).
    """

    structure: Structure
    log_columns: Indices
    post_columns: Indices
    logs: LogForces
    posts: PostForces
    anchors: AnchorForces

    @cached_property
    def log_names(self) -> tuple[str, ...]:
        """Name of each column of logs."""
        names = self.structure.layout.log_names
        return tuple(names[column] for column in self.log_columns)

    @cached_property
    def post_names(self) -> tuple[str, ...]:
        """Name of each column of posts."""
        return tuple(self.structure.layout.posts[column].name for column in self.post_columns)


def demands_on(structure: Structure, diagram: Diagram) -> Demands:
    """Forces of every log and post of a closure under a net pressure."""
    layout = structure.layout
    return _demands(
        structure,
        diagram,
        np.arange(len(layout.bay_of)),
        np.arange(len(layout.posts)),
        sag=True,
    )


def distinct_demands_on(structure: Structure, diagram: Diagram, *, posts: bool, sag: bool) -> Demands:
    """Forces of logs and posts no two of which are alike, the first of each kind.

    Parameters
    ----------
    posts
        Whether posts are wanted.
    sag
        Whether deflections of posts are wanted.
    """
    layout = structure.layout
    own: dict[object, int] = {}
    for number, upright in enumerate(layout.posts if posts else ()):
        own.setdefault(upright.pieces, number)
    post_columns = np.array(list(own.values()), dtype=np.intp)
    return _demands(structure, diagram, layout.distinct_logs, post_columns, sag=sag)


def _demands(
    structure: Structure, diagram: Diagram, log_columns: Indices, post_columns: Indices, *, sag: bool
) -> Demands:
    layout = structure.layout
    own: dict[Pieces, tuple[PostForces, AnchorForces]] = {}
    uprights = [layout.posts[column] for column in post_columns]
    for post in uprights:
        if post.pieces not in own:
            own[post.pieces] = _post(structure, diagram, post.pieces, sag=sag)
    found = [own[post.pieces] for post in uprights]
    return Demands(
        structure=structure,
        log_columns=log_columns,
        post_columns=post_columns,
        logs=log_forces(diagram, layout, structure.log_stiffness, log_columns),
        posts=_columns(PostForces, [post for post, _ in found], diagram.states),
        anchors=_columns(AnchorForces, [anchor for _, anchor in found], diagram.states),
    )


def _post(
    structure: Structure, diagram: Diagram, pieces: Pieces, *, sag: bool
) -> tuple[PostForces, AnchorForces]:
    found = post_forces(
        upright_load(diagram, pieces, structure.layout.sill),
        height=structure.closure.post_height,
        stiffness=structure.post_stiffness if sag else float("nan"),
        prop=structure.prop,
    )
    anchor = structure.closure.anchor
    if anchor is None:
        missing = np.full(diagram.states, np.nan)
        none = AnchorForces(
            tension=missing, bolt_tension=missing, bolt_shear=missing, contact_pressure=missing
        )
        return found, none
    held = anchor_forces(
        anchor,
        moment=found.base_moment,
        shear=found.base_shear,
        lift=found.brace_lift,
        weight=structure.post_weight,
    )
    return found, held


def guide_forces(diagram: Diagram, guide: Upright, sill: float) -> tuple[FloatArray, FloatArray]:
    """Force on a guide at an abutment [N], and its load just above the sill [N/m], each of shape (n,)."""
    load = upright_load(diagram, guide.pieces, sill)
    foot = np.zeros(1)
    return load.shear(foot)[:, 0], load.pressure(foot)[:, 0]


def _columns(kind: type[Forces], found: list[Forces], states: int) -> Forces:
    """Figures of several posts side by side, each (n, p)."""
    names = [field.name for field in fields(kind)]
    if not found:
        return kind(**dict.fromkeys(names, np.zeros((states, 0))))
    each = {id(one): np.array([getattr(one, name) for name in names]) for one in found}
    together = np.stack([each[id(one)] for one in found], axis=-1)
    return kind(**dict(zip(names, together, strict=True)))
