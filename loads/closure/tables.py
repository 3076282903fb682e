"""Checks of logs, posts and anchors: every demand against the limit that somebody entered for it."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.check_table import CheckTable, table_of
from loads.closure.demands import Demands
from loads.closure.materials import MATERIALS
from loads.closure.sections import SectionProperties
from loads.quantity import Quantity
from loads.records.basis import Basis
from loads.records.closure_parts import Log, Post
from loads.units import from_si

FROM_MEMORY = "The limit is from memory and still has to be confirmed in the document it names."
NO_SECTION = "A limit of stress was entered, but no section: the stress is not known."
NO_STIFFNESS = "A limit of deflection was entered, but no second moment of area or modulus."


@dataclass(frozen=True, kw_only=True)
class Row:
    """One demand on like parts and its limit.

    Attributes
    ----------
    name
        Which check.
    kind
        Kind of quantity.
    demand
        Shape (n, m), without load factor.
    limit
        As entered or from the table of materials, or None.
    remarks
        On the limit.
    factored
        Whether the factors of the design basis apply.
    """

    name: str
    kind: str
    demand: FloatArray
    limit: Quantity | None
    remarks: tuple[str, ...] = ()
    factored: bool = True


def stress_limit(
    entered: Quantity | None, material: str | None, stress: str, basis: Basis
) -> tuple[Quantity | None, tuple[str, ...]]:
    """Limit of a stress: the one entered, else that of the reference material; and what to know of it."""
    if entered is not None or material is None:
        return entered, ()
    chosen = MATERIALS[material]
    found = chosen.figure(stress, basis.method)
    if found is None:
        return None, ()
    doubt = () if found.standing == "published" else (FROM_MEMORY,)
    return found.limit(), (*doubt, chosen.note)


def greatest_of_row(value: FloatArray) -> FloatArray:
    """Entry of greatest magnitude in each state, with its sign, shape (n,); NaN entries count as nothing."""
    column = np.argmax(np.abs(np.nan_to_num(value)), axis=1)
    return np.take_along_axis(value, column[:, None], axis=1)[:, 0]


def part_tables(demands: Demands, basis: Basis, near: float) -> list[CheckTable]:
    """All checks of logs, posts and anchors.

    A demand without a limit gives one check of the part that carries most; what every part carries is in its
    own record.
    """
    groups = (
        (demands.log_names, "logs", _log_rows(demands, basis)),
        (demands.post_names, "posts", _post_rows(demands, basis)),
    )
    return [
        table
        for names, together, rows in groups
        if names
        for row in rows
        if not np.isnan(row.demand).all()
        for table in (_table(names, together, row, basis, near),)
    ] + _span_tables(demands, near)


def _table(names: tuple[str, ...], together: str, row: Row, basis: Basis, near: float) -> CheckTable:
    demand = row.demand * basis.on_demand if row.factored and row.limit else row.demand
    if row.limit is None:
        demand, names = greatest_of_row(demand)[:, None], (together if len(names) > 1 else names[0],)
    return table_of(
        subjects=names,
        name=row.name,
        kind=row.kind,
        demand=demand,
        limit=row.limit,
        near=near,
        factor=basis.on_limit if row.factored else 1.0,
        basis=basis.words if row.factored else "",
        remarks=row.remarks,
    )


def _either(force: Row, stress: Row, *, section_known: bool) -> Iterator[Row]:
    """A force against its own limit and as a stress against that of the stress; as a force without either."""
    if force.limit is not None:
        yield force
    if stress.limit is not None and section_known:
        yield stress
    elif force.limit is None:
        remarks = (NO_SECTION,) if stress.limit is not None else ()
        yield Row(name=force.name, kind=force.kind, demand=force.demand, limit=None, remarks=remarks)


def _bent_rows(
    moment: FloatArray,
    shear: FloatArray,
    member: Log | Post,
    section: SectionProperties,
    basis: Basis,
) -> Iterator[Row]:
    """Bending and shear of a log or a post, as forces or as stresses."""
    limits, material = member.limits, member.material
    bending, bending_words = stress_limit(limits.bending_stress, material, "bending", basis)
    shearing, shear_words = stress_limit(limits.shear_stress, material, "shear", basis)
    modulus, area = section.section_modulus, section.shear_area
    yield from _either(
        Row(name="bending moment", kind="moment", demand=moment, limit=limits.moment),
        Row(
            name="bending stress",
            kind="stress",
            demand=moment / modulus,
            limit=bending,
            remarks=bending_words,
        ),
        section_known=bool(np.isfinite(modulus)),
    )
    yield from _either(
        Row(name="shear", kind="force", demand=shear, limit=limits.shear),
        Row(name="shear stress", kind="stress", demand=shear / area, limit=shearing, remarks=shear_words),
        section_known=bool(np.isfinite(area)),
    )


def _log_rows(demands: Demands, basis: Basis) -> Iterator[Row]:
    forces, log = demands.logs, demands.structure.closure.log
    limits = log.limits
    yield from _bent_rows(forces.moment, forces.reaction, log, demands.structure.log, basis)
    if limits.line_load is not None:
        yield Row(name="line load", kind="line load", demand=forces.line_load, limit=limits.line_load)
    if limits.reaction is not None:
        yield Row(name="end reaction", kind="force", demand=forces.reaction, limit=limits.reaction)
    bearing, words = stress_limit(limits.bearing_stress, log.material, "bearing", basis)
    yield Row(
        name="bearing pressure", kind="stress", demand=forces.bearing_pressure, limit=bearing, remarks=words
    )
    if limits.deflection is not None or limits.span_over_deflection is None:
        yield _sag_row(forces.deflection, limits.deflection, forces.moment)


def _sag_row(sag: FloatArray, limit: Quantity | None, like: FloatArray) -> Row:
    if np.isnan(sag).all() and limit is not None:
        return Row(
            name="deflection",
            kind="deflection",
            demand=np.zeros_like(like),
            limit=None,
            remarks=(NO_STIFFNESS,),
        )
    return Row(name="deflection", kind="deflection", demand=sag, limit=limit, factored=False)


def _span_tables(demands: Demands, near: float) -> list[CheckTable]:
    """Deflection of logs against a share of their span."""
    log = demands.structure.closure.log
    share, sag = log.limits.span_over_deflection, demands.logs.deflection
    if share is None or not demands.log_names or np.isnan(sag).all():
        return []
    layout = demands.structure.layout
    bays = layout.bay_of[demands.log_columns]
    words = f"span over {share:g}, as entered"
    for_bay = [_made_length(span / share, log.height.unit, words) for span in layout.spans.tolist()]
    limits = tuple(for_bay[bay] for bay in bays)
    values = layout.spans[bays] / share
    return [
        CheckTable(
            subjects=demands.log_names,
            name="deflection, share of span",
            kind="deflection",
            demand=sag,
            limits=limits,
            limit_value=values,
            near=near,
            sources=(words,) * len(limits),
        )
    ]


def _made_length(value: float, unit: str, source: str) -> Quantity:
    text = f"{from_si(value, unit, 'length'):.6g} {unit}"
    return Quantity(text=text, kind="length", unit=unit, value=value, low=value, high=value, source=source)


def _post_rows(demands: Demands, basis: Basis) -> Iterator[Row]:
    """Magnitudes with the sign of the load behind them: a braced post bends both ways under one load."""
    post = demands.structure.closure.post
    forces, anchors = demands.posts, demands.anchors
    if post is None:
        yield Row(name="base moment", kind="moment", demand=forces.base_moment, limit=None)
        yield Row(name="base shear", kind="force", demand=forces.base_shear, limit=None)
        return
    limits = post.limits
    way = np.where(forces.total < 0, -1.0, 1.0)
    moment, shear, sag = (np.abs(v) * way for v in (forces.moment, forces.shear, forces.deflection))
    yield from _bent_rows(moment, shear, post, demands.structure.post, basis)
    yield _sag_row(sag, limits.deflection, moment)
    others = (
        ("brace force", "force", forces.brace_force, limits.brace_force),
        ("bolt tension", "force", anchors.bolt_tension, limits.anchor_tension),
        ("bolt shear", "force", anchors.bolt_shear, limits.anchor_shear),
        ("pressure under the base plate", "stress", anchors.contact_pressure, limits.contact_pressure),
    )
    for name, kind, demand, limit in others:
        yield Row(name=name, kind=kind, demand=np.abs(demand) * way, limit=limit)
