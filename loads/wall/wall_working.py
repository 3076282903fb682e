"""Worked steps of a wall in one state: every figure as a reviewer follows it by hand."""

from __future__ import annotations

import numpy as np

from loads.wall.seepage_working import seepage_step
from loads.wall.sliding import DEFINITION, SlidingBand
from loads.wall.wall_result import WallResult
from loads.worked_step import Line, Step, Table, column_sum, line, term


def wall_working(result: WallResult, index: int = 0) -> tuple[Step, ...]:
    """Worked steps of one state, from the forces to the ratios."""
    steps = [
        _forces(result, index),
        _uplift(result, index),
        _base(result, index),
        *(_sliding(result, band, index) for band in _bands(result)),
        _ratios(result, index),
        _flotation(result, index),
        seepage_step(result.seepage, index),
        *_members(result, index),
        _checks(result, index),
    ]
    return tuple(step for step in steps if step.lines or step.table or step.results)


def _bands(result: WallResult) -> list[SlidingBand]:
    found = result.stability
    return [found.sliding, *([found.key_sliding] if found.key_sliding else [])]


def _forces(result: WallResult, index: int) -> Step:
    rows = [
        (row.name, row.direction, float(row.value[index]), float(row.arm[index]), float(row.moment[index]))
        for row in result.stability.forces
        if row.value[index] != 0
    ]
    horizontal = sum(row[2] for row in rows if row[1] == "horizontal")
    vertical = sum(row[2] for row in rows if row[1] == "vertical")
    return Step(
        title="Forces per unit length and their moments about the toe",
        formula="moment = value·arm; toward the protected side, upward and turning the top "
        "toward the protected "
        "side positive; arm: height above the toe, or distance from it toward the flood side",
        table=Table(
            headings=(
                ("force", "text"),
                ("direction", "text"),
                ("value", "line load"),
                ("arm", "length"),
                ("moment", "moment per length"),
            ),
            rows=tuple(rows),
            total=("sum of moments", "", "", "", column_sum(list(rows), 4)),
        ),
        results=(
            term("ΣH", "horizontal, toward the protected side", horizontal, "line load"),
            term("ΣV", "vertical, up", vertical, "line load"),
            term("ΣM", "moment about the toe", column_sum(list(rows), 4), "moment per length"),
        ),
    )


def _uplift(result: WallResult, index: int) -> Step:
    lift = result.stability.uplift
    path = result.site.path
    rows = []
    for i in range(lift.start.shape[1]):
        x0, x1 = float(lift.x[index, i]), float(lift.x[index, i + 1])
        z0, z1 = float(lift.z[index, i]), float(lift.z[index, i + 1])
        if x1 > x0 or z0 != z1:
            pressures = float(lift.start[index, i]), float(lift.end[index, i])
            force = (x1 - x0) * sum(pressures) / 2
            rows.append((x0, x1, z0, *pressures, force))
    if path.rule == "none" or not np.isfinite(lift.head_in[index]):
        return Step(title="Uplift", formula="none counted")
    return Step(
        title=f"Uplift by the rule: {path.rule}",
        formula="p = γ·(h − z), h falling in a straight line along the path from end to end; "
        "in an open crack the "
        "full head of its side; force = Δx·(p₁ + p₂)/2, the last piece of a run that "
        "falls dry by its triangle",
        terms=(
            term("h_f", "total head at the flood-side end", float(lift.head_in[index]), "elevation"),
            term("h_p", "total head at the protected-side end", float(lift.head_out[index]), "elevation"),
        ),
        table=Table(
            headings=(
                ("from the heel", "length"),
                ("to", "length"),
                ("elevation", "elevation"),
                ("pressure p₁", "pressure"),
                ("pressure p₂", "pressure"),
                ("force up", "line load"),
            ),
            rows=tuple(rows),
        ),
        results=(term("U", "uplift", float(lift.push.vertical[index]), "line load"),),
    )


def _base(result: WallResult, index: int) -> Step:
    base = result.stability.base
    width = float(result.section.base_width[0])
    normal, moment = float(base.normal[index]), float(result.stability.moment[index])
    lines: list[Line] = []
    if normal > 0:
        place, off = float(base.from_toe[index]), float(base.eccentricity[index])
        lines = [
            line(
                "x = −ΣM/N = −({})/{} = {}",
                (moment, "moment per length"),
                (normal, "line load"),
                (place, "length"),
            ),
            line("e = B/2 − x = {}/2 − {} = {}", (width, "length"), (place, "length"), (off, "length")),
            *(
                line(
                    f"q = N/B·(1 {sign} 6·e/B) = {{}}/{{}}·(1 {sign} 6·{{}}/{{}}) = {{}}",
                    (normal, "line load"),
                    (width, "length"),
                    (off, "length"),
                    (width, "length"),
                    (float(pressure[index]), "pressure"),
                    label=f"straight line, {end}",
                )
                for sign, end, pressure in (("+", "toe", base.linear_toe), ("−", "heel", base.linear_heel))
            ),
        ]
        reach = float(base.compressed[index]) * width
        if 0 < reach < width:
            lines += _without_tension(normal, reach, float(base.peak[index]))
    return Step(
        title="Resultant and pressure on the base",
        formula="N = −ΣV; the resultant acts x from the toe; the base bears no tension",
        terms=(term("B", "width of the base", width, "length"),),
        lines=tuple(lines),
        results=(
            term("N", "compression on the base", normal, "line load"),
            term("", "share of the base in compression", float(base.compressed[index]), "ratio"),
        ),
    )


def _without_tension(normal: float, reach: float, peak: float) -> list[Line]:
    label = "without tension"
    near = (reach / 3, "length"), (reach, "length")
    press = (normal, "line load"), (reach, "length"), (peak, "pressure")
    return [
        line("b = 3·min(x, B − x) = 3·{} = {}", *near, label=label),
        line("q = 2·N/b = 2·{}/{} = {}", *press, label=label),
    ]


def _sliding(result: WallResult, band: SlidingBand, index: int) -> Step:
    friction = result.site.base_friction if band.plane == "base" else result.site.ground_friction
    compressed = float(result.stability.base.compressed[index]) if result.site.opens else 1.0
    reach = compressed * float(result.section.base_width[0])
    driving, passive = float(band.driving[index]), float(band.passive[index])
    values = (
        (max(float(band.normal[index]), 0.0), "line load"),
        (friction.value, "ratio"),
        (friction.adhesion, "pressure"),
        (reach, "length"),
        (passive if driving > 0 else 0.0, "line load"),
        (abs(driving), "line load"),
        (float(band.factor[index]), "ratio"),
    )
    where = "on the base" if band.plane == "base" else "on the level plane at the key's bottom"
    names = (
        ("low friction", band.low),
        ("high friction", band.high),
        ("low friction, without uplift", band.low_without_uplift),
        ("high friction, without uplift", band.high_without_uplift),
    )
    return Step(
        title=f"Sliding {where}",
        formula=DEFINITION,
        lines=(line("({}·{} + {}·{} + {})/{} = {}", *values),),
        results=tuple(term("F", name, float(figure[index]), "ratio") for name, figure in names),
    )


def _ratios(result: WallResult, index: int) -> Step:
    ratios = result.stability.ratios
    resisting, overturning = float(ratios.resisting[index]), float(ratios.overturning[index])
    kind = "moment per length"
    if overturning <= 0:
        return Step(title="Textbook moment ratio", formula="nothing overturns")
    return Step(
        title="Textbook moment ratio, not the governing criterion",
        formula="moments that resist over those that overturn; uplift among the overturning, "
        "or taken off the "
        "resisting",
        lines=(
            line(
                "ΣM_r/ΣM_o = {}/{} = {}",
                (resisting, kind),
                (overturning, kind),
                (float(ratios.uplift_overturns[index]), "ratio"),
                label="uplift overturning",
            ),
            line(
                "(ΣM_r − M_U)/(ΣM_o − M_U) = {}",
                (float(ratios.uplift_lightens[index]), "ratio"),
                label="uplift off the weight",
            ),
        ),
    )


def _flotation(result: WallResult, index: int) -> Step:
    upward = [row for row in result.stability.forces if row.direction == "vertical"]
    weight = -sum(float(row.value[index]) for row in upward if row.cause in ("weight", "soil weight"))
    lifting = sum(float(row.value[index]) for row in upward if row.cause in ("uplift", "water"))
    if lifting <= 0:
        return Step(title="Flotation", formula="nothing lifts")
    return Step(
        title="Flotation",
        formula="(weight of wall and soil)/(uplift less water on the wall)",
        lines=(
            line(
                "{}/{} = {}",
                (weight, "line load"),
                (lifting, "line load"),
                (float(result.stability.flotation[index]), "ratio"),
            ),
        ),
    )


def _members(result: WallResult, index: int) -> list[Step]:
    steps = []
    for member in result.members:
        root, tip = float(member.root[index]), float(member.tip[index])
        sign = -1.0 if member.name == "heel" else 1.0
        places = np.linspace(root, tip, 5)
        shear, moment = member.shear(places)[index], member.moment(places)[index]
        if np.isnan(member.root_shear[index]):
            continue
        kind = "elevation" if member.name == "stem" else "length"
        rows = tuple(
            (sign * float(place), float(v), float(m))
            for place, v, m in zip(places, shear, moment, strict=True)
        )
        where = "elevation" if member.name == "stem" else "from the heel"
        headings = ((where, kind), ("shear", "line load"), ("moment", "moment per length"))
        steps.append(
            Step(
                title=f"Shear and moment in the {member.name}",
                formula="sums of everything beyond the place, by the diagrams",
                table=Table(headings=headings, rows=rows),
            )
        )
    return steps


def _checks(result: WallResult, index: int) -> Step:
    rows = tuple(
        (f"{check.subject}: {check.name}", float(check.ratio[index]), check.verdict(index), check.source)
        for check in result.checks
        if check.limit is not None
    )
    headings = (("check", "text"), ("ratio", "ratio"), ("verdict", "text"), ("limit from", "text"))
    table = Table(headings=headings, rows=rows) if rows else None
    return Step(
        title="Ratios to the limits",
        formula="demand over limit, or factor asked for over factor found",
        table=table,
    )
