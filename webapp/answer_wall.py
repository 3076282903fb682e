"""What the JSON of a wall holds besides that of every barrier; forces and moments per metre of wall."""

from __future__ import annotations

from typing import Any

from loads.assessment import AssessedWall
from loads.records.wall import Wall
from loads.wall.i_wall_result import IWallResult
from loads.wall.sliding import DEFINITION, SlidingBand
from loads.wall.wall_result import WallResult
from webapp.answer_parts import number

_BAND = ("factor", "low", "high", "low_without_uplift", "high_without_uplift")


def wall_about(barrier: AssessedWall) -> dict[str, float]:
    """Place that moments of a wall are about: its toe, x from the heel; of an I-wall its ground line."""
    found = barrier.found
    x = 0.0 if isinstance(found, IWallResult) else float(found.section.base_width[0])
    return {"x": x, "z": barrier.face.bottom}


def wall_answer(barrier: AssessedWall, index: int) -> dict[str, Any]:
    """Forces, base, sliding, seepage and members of a wall, or the embedment of an I-wall."""
    found, record = barrier.found, barrier.record
    head = {"shape": record.shape, "per_length": True, "category": record.category}
    if isinstance(found, IWallResult):
        return {**head, "i_wall": _i_wall(found, index)}
    assert isinstance(record, Wall)
    return {
        **head,
        "criteria": _criteria(found),
        "forces": [
            {
                "name": force.name,
                "cause": force.cause,
                "direction": force.direction,
                "value": float(force.value[index]),
                "arm": number(force.arm[index]),
                "moment": float(force.moment[index]),
            }
            for force in found.stability.forces
        ],
        "base": _base(found, index),
        "sliding": [_sliding(band, index) for band in _bands(found)],
        "moment_ratios": {
            "uplift_overturns": number(found.stability.ratios.uplift_overturns[index]),
            "uplift_lightens": number(found.stability.ratios.uplift_lightens[index]),
            "governs": False,
        },
        "flotation": number(found.stability.flotation[index]),
        "seepage": _seepage(found, index),
        "members": [
            {
                "name": member.name,
                "root": float(member.root[index]),
                "shear": number(member.root_shear[index]),
                "moment": number(member.root_moment[index]),
            }
            for member in found.members
        ],
    }


def _criteria(found: WallResult) -> dict[str, Any] | None:
    held = found.criteria
    if held is None:
        return None
    category = found.record.category
    asked = {name: getattr(held, name).get(category) for name in _ASKED}
    return {
        "document": held.document,
        "edition": held.edition,
        "table": held.table,
        "status": held.status,
        "site_information": held.site_information,
        "category": category,
        **asked,
    }


_ASKED = ("sliding", "compression", "flotation", "bearing")


def _bands(found: WallResult) -> list[SlidingBand]:
    key = found.stability.key_sliding
    return [found.stability.sliding, *([key] if key else [])]


def _sliding(band: SlidingBand, index: int) -> dict[str, Any]:
    return {
        "plane": band.plane,
        "definition": DEFINITION,
        "normal": float(band.normal[index]),
        "driving": float(band.driving[index]),
        "passive": float(band.passive[index]),
        **{name: number(getattr(band, name)[index]) for name in _BAND},
    }


def _base(found: WallResult, index: int) -> dict[str, Any]:
    base, stable = found.stability.base, found.stability
    names = (
        "normal",
        "from_toe",
        "eccentricity",
        "compressed",
        "toe",
        "heel",
        "peak",
        "linear_toe",
        "linear_heel",
    )
    return {
        "width": float(found.section.base_width[0]),
        **{name: number(getattr(base, name)[index]) for name in names},
        "crack_heel": float(stable.cracks.heel[index]),
        "crack_toe": float(stable.cracks.toe[index]),
        "crack_settled": bool(stable.settled[index]),
        "crack_runs_through": bool(stable.runs_through[index]),
        "uplift": float(stable.uplift.push.vertical[index]),
    }


def _seepage(found: WallResult, index: int) -> dict[str, Any]:
    screen = found.seepage
    names = ("head", "creep_ratio", "exit_gradient", "critical_gradient")
    return {name: number(getattr(screen, name)[index]) for name in names}


def _i_wall(found: IWallResult, index: int) -> dict[str, Any]:
    depth = found.embedment
    return {
        "method": found.record.method,
        "passive_factor": found.record.passive_factor,
        "gap": found.record.gap,
        "embedment_balanced": number(depth.balanced[index]),
        "embedment_required": number(depth.required[index]),
        "embedment_provided": float(depth.provided[index]),
        "shear": float(found.shear[index]),
        "bending": float(found.bending[index]),
        "exit_gradient": number(found.exit_gradient[index]),
        "critical_gradient": number(found.critical_gradient[index]),
        "creep_ratio": number(found.creep_ratio[index]),
    }
