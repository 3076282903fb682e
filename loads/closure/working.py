"""Worked steps of a closure's parts: the log, the post and the anchors that carry most, by hand."""

from __future__ import annotations

import math
from collections.abc import Iterator

import numpy as np

from loads.closure.assess import AssessedClosure
from loads.part import Part
from loads.worked_step import Line, Step, Term, line, term

_WORDS = {
    "section_modulus": ("S", "section modulus", "section modulus"),
    "second_moment": ("I", "second moment of area", "section second moment"),
    "shear_area": ("A_v", "area by which shear is stress", "section area"),
}


def closure_steps(barrier: AssessedClosure, index: int = 0) -> tuple[Step, ...]:
    """Worked steps of one state, for the parts that carry most; none while nothing presses.

    Parameters
    ----------
    barrier
        An assessed closure.
    index
        Which state.
    """
    steps = [*_log(barrier, index), *_post(barrier, index), *_anchor(barrier, index)]
    return tuple(steps)


def _most(barrier: AssessedClosure, kind: str, index: int) -> Part | None:
    parts = [part for part in barrier.parts if part.kind == kind and part.reaction[index] != 0]
    return max(parts, key=lambda part: abs(float(part.reaction[index])), default=None)


def _log(barrier: AssessedClosure, index: int) -> Iterator[Step]:
    part = _most(barrier, "log", index)
    if part is None:
        return
    layout = barrier.structure.layout
    bay = int(part.id.split()[1]) - 1
    span, sag = float(layout.spans[bay]), float(part.deflection[index])
    yield Step(
        title=f"Log that carries most: {part.id}",
        formula="simple beam from middle to middle of its bearings: w = V(bottom) − V(top) = ∫p dz; "
        "M = w·L²/8; R = w·L/2, which is the shear; p_b = R/(b·h); σ = M/S; τ = R/A_v; δ = 5·w·L⁴/(384·E·I)",
        terms=(
            term("c", "clear width of the bay", layout.clear[bay], "length"),
            term("b", "bearing length at each end", layout.bearing, "length"),
            term("L", "span c + b", span, "length"),
            term("h", "effective height of a log", layout.log_height, "length"),
            term("w", "load along the log", float(part.line_load[index]), "line load"),
            *_section_terms(barrier, post=False),
        ),
        lines=(*_load_lines(barrier, part, index), *_log_lines(barrier, part, span, index)),
        results=(
            term("M", "bending moment", float(part.moment[index]), "moment"),
            term("R", "reaction at each end", float(part.reaction[index]), "force"),
            *((term("δ", "deflection", sag, "deflection"),) if math.isfinite(sag) else ()),
        ),
    )


def _log_lines(barrier: AssessedClosure, part: Part, span: float, index: int) -> list[Line]:
    """Moment, reaction, bearing pressure, stresses and deflection with numbers."""
    layout, structure = barrier.structure.layout, barrier.structure
    load, moment, reaction = (float(v[index]) for v in (part.line_load, part.moment, part.reaction))
    lines = [
        line("M = w·L²/8 = {}·{}²/8 = {}", (load, "line load"), (span, "length"), (moment, "moment")),
        line("R = w·L/2 = {}·{}/2 = {}", (load, "line load"), (span, "length"), (reaction, "force")),
    ]
    if layout.bearing > 0:
        area = layout.bearing * layout.log_height
        values = ((reaction, "force"), (layout.bearing, "length"), (layout.log_height, "length"))
        lines.append(line("p_b = R/(b·h) = {}/({}·{}) = {}", *values, (reaction / area, "pressure")))
    lines += _stress_lines(moment, reaction, structure.log.section_modulus, structure.log.shear_area)
    sag = float(part.deflection[index])
    if math.isfinite(sag):
        second = structure.log.second_moment
        bent = (
            (load, "part line load"),
            (span, "part length"),
            (structure.log_stiffness / second, "stress"),
            (second, "section second moment"),
        )
        lines.append(line("δ = 5·w·L⁴/(384·E·I) = 5·{}·{}⁴/(384·{}·{}) = {}", *bent, (sag, "deflection")))
    return lines


def _load_lines(barrier: AssessedClosure, part: Part, index: int) -> list[Line]:
    """Load of a log within whose height the pressure is straight."""
    net = barrier.diagram.take(index)
    inside = (net.knot[0] > part.bottom) & (net.knot[0] < part.top)
    if inside.any():
        return []
    low = float(net.pressure(np.array([part.bottom]))[0, 0])
    high = float(net.pressure(np.array([part.top]), at_underside=True)[0, 0])
    height = part.top - part.bottom
    values = ((height, "length"), (low, "pressure"), (high, "pressure"))
    return [
        line("w = h·(p₁ + p₂)/2 = {}·({} + {})/2 = {}", *values, (float(part.line_load[index]), "line load"))
    ]


def _stress_lines(moment: float, shear: float, modulus: float, area: float) -> list[Line]:
    lines = []
    if math.isfinite(modulus):
        values = ((moment, "part moment"), (modulus, "section modulus"), (moment / modulus, "stress"))
        lines.append(line("σ = M/S = {}/{} = {}", *values))
    if math.isfinite(area):
        values = ((shear, "part force"), (area, "section area"), (shear / area, "stress"))
        lines.append(line("τ = V/A_v = {}/{} = {}", *values))
    return lines


def _section_terms(barrier: AssessedClosure, *, post: bool) -> list[Term]:
    section = barrier.structure.post if post else barrier.structure.log
    found = [
        term(symbol, words, getattr(section, name), kind)
        for name, (symbol, words, kind) in _WORDS.items()
        if math.isfinite(getattr(section, name))
    ]
    stiffness = barrier.structure.post_stiffness if post else barrier.structure.log_stiffness
    if math.isfinite(stiffness):
        found.append(term("E", "modulus of elasticity", stiffness / section.second_moment, "stress"))
    return found


def _figure(part: Part, name: str, index: int) -> float:
    return next((float(one.value[index]) for one in part.more if one.name == name), float("nan"))


def _post(barrier: AssessedClosure, index: int) -> Iterator[Step]:
    part = _most(barrier, "post", index)
    if part is None:
        return
    structure = barrier.structure
    width = structure.layout.posts[int(part.id.split()[1]) - 1].width
    shear, moment = (_figure(part, name, index) for name in ("base_shear", "base_moment"))
    greatest, most_shear = float(part.moment[index]), float(part.shear[index])
    total = float(part.reaction[index])
    lines = list(_whole_lines(barrier, width, total, index))
    results = [
        term("V₀", "shear at the base", shear, "force"),
        term("M₀", "moment at the base", moment, "moment"),
        term("M", "bending moment of greatest magnitude", greatest, "moment"),
    ]
    if structure.prop is not None:
        held = total - shear
        lines.append(line("V₀ = V − H_b = {} − {} = {}", (total, "force"), (held, "force"), (shear, "force")))
        push = ((held, "force"), (structure.prop.angle, "angle"))
        lines.append(
            line("N = H_b/cos α = {}/cos {} = {}", *push, (_figure(part, "brace_force", index), "force"))
        )
        results.append(term("H_b", "horizontal force of the brace", held, "force"))
        results.append(term("N", "force along the brace", _figure(part, "brace_force", index), "force"))
        lift = _figure(part, "brace_lift", index)
        results.append(term("U", "vertical part of it, which lifts the post", lift, "force"))
    lines += _stress_lines(greatest, most_shear, structure.post.section_modulus, structure.post.shear_area)
    yield Step(
        title=f"Post that carries most: {part.id}",
        formula=_post_formula(barrier),
        terms=(
            term("t", "width of water at the foot of the post", width, "length"),
            *_section_terms(barrier, post=True),
            *_prop_terms(barrier),
        ),
        lines=tuple(lines),
        results=tuple(results),
    )


def _post_formula(barrier: AssessedClosure) -> str:
    prop = barrier.structure.prop
    start = "t = (L_left + L_right)/2 + strip of the post; load q(z) = p(z)·t up to the top of the logs; "
    if prop is None:
        return start + "cantilever: V₀ = V, M₀ = ∫q·x dx; σ = M/S; τ = V/A_v"
    if prop.fixity == "pinned":
        return start + "pinned base and brace at h: H_b = ∫q·x dx/h, V₀ = V − H_b, M₀ = 0; σ = M/S; τ = V/A_v"
    return (
        start + "fixed base and stiff brace at h: H_b = [h·N(0) − Q(0) + Q(h)]/(h³/3), N and Q the third and "
        "fourth integral of q; V₀ = V − H_b, M₀ = ∫q·x dx − H_b·h; σ = M/S; τ = V/A_v"
    )


def _prop_terms(barrier: AssessedClosure) -> list[Term]:
    prop = barrier.structure.prop
    if prop is None:
        return []
    return [
        term("h", "height of the brace above the sill", prop.height, "length"),
        term("α", "angle of the brace from the horizontal", prop.angle, "angle"),
    ]


def _whole_lines(barrier: AssessedClosure, width: float, total: float, index: int) -> Iterator[Line]:
    """Share of the whole force that a post takes where all stacks are equally high."""
    layout = barrier.structure.layout
    if len(set(layout.counts)) == 1:
        whole = float(barrier.resultant.horizontal[index])
        values = ((whole, "force"), (width, "length"), (layout.loaded_width, "length"), (total, "force"))
        yield line("V = H·t/B = {}·{}/{} = {}", *values, label="B the loaded width of the closure")


def _anchor(barrier: AssessedClosure, index: int) -> Iterator[Step]:
    part, anchor = _most(barrier, "post", index), barrier.record.anchor
    if part is None or anchor is None:
        return
    moment, shear, lift = (_figure(part, n, index) for n in ("base_moment", "base_shear", "brace_lift"))
    bolt, each = _figure(part, "bolt_tension", index), _figure(part, "bolt_shear", index)
    weight = barrier.structure.post_weight
    spare = max(lift - weight, 0.0)
    lines = []
    if anchor.lever_arm is not None and anchor.tension_bolts is not None:
        tension = _figure(part, "anchor_tension", index)
        values = ((abs(moment), "moment"), (anchor.lever_arm.value, "length"), (spare, "force"))
        lines.append(line("T = |M₀|/a + U₊ = {}/{} + {} = {}", *values, (tension, "force")))
        count = (float(anchor.tension_bolts), "number")
        lines.append(line("T₁ = T/n = {}/{} = {}", (tension, "force"), count, (bolt, "force")))
    if anchor.shear_bolts is not None:
        count = (float(anchor.shear_bolts), "number")
        lines.append(line("V₁ = V₀/n_v = {}/{} = {}", (shear, "force"), count, (each, "force")))
    named = (
        ("T₁", "tension of the bolt pulled most", bolt, "force"),
        ("V₁", "shear of each bolt", each, "force"),
        ("p_c", "pressure under the base plate", _figure(part, "contact_pressure", index), "stress"),
    )
    yield Step(
        title=f"Anchors of {part.id}",
        formula="T = |M₀|/a + U₊, U₊ what the brace lifts beyond the weight of the post, all of it given to "
        "the bolts pulled; for a stiff plate T_i = |M₀|·d_i/Σd² + U₊/n; p_c = (|M₀|/a + what weight is "
        "left)/contact area",
        terms=(
            term("M₀", "moment at the base", moment, "moment"),
            term("V₀", "shear at the base", shear, "force"),
            term("U₊", "lift beyond the weight of the post", spare, "force"),
        ),
        lines=tuple(lines),
        results=tuple(term(*one) for one in named if math.isfinite(one[2])),
    )
