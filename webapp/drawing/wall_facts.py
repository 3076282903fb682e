"""What the drawing of a wall says in words: the resultant on the base, sliding, embedment."""

from __future__ import annotations

import math

from loads.assessment import AssessedWall
from loads.wall.i_wall_result import IWallResult
from loads.wall.wall_result import WallResult
from webapp.display import System, elevation, show, significant
from webapp.drawing.reading import Reading, direction

_DIGITS = 3


def ratio(value: float) -> str:
    """Factor with three figures, a word where it has no bound."""
    if math.isnan(value):
        return "–"
    return significant(value, _DIGITS) if math.isfinite(value) else "no bound"


def share(value: float) -> str:
    """Share in per cent."""
    return f"{value * 100:.0f} %"


def resultant_words(found: WallResult, index: int, system: System) -> str:
    """Where the resultant meets the base."""
    base = found.stability.base
    place = float(base.from_toe[index])
    if math.isnan(place):
        return "nothing presses on the base"
    width = float(found.section.base_width[0])
    if not 0 <= place <= width:
        off = show(-place if place < 0 else place - width, "length", system)
        return f"resultant {off} outside the base, beyond the {'toe' if place < 0 else 'heel'}"
    return f"resultant {show(place, 'length', system)} from the toe of {show(width, 'length', system)}"


def compression_words(found: WallResult, index: int) -> str:
    """How much of the base is pressed, and whether a crack runs through."""
    if found.stability.runs_through[index]:
        return "the crack runs through the base"
    return f"{share(float(found.stability.base.compressed[index]))} of the base in compression"


def sliding_words(found: WallResult, index: int) -> str:
    """Sliding factor with its band over the friction, on the plane that is checked."""
    band = found.stability.key_sliding or found.stability.sliding
    stated, low, high = (float(getattr(band, name)[index]) for name in ("factor", "low", "high"))
    where = "on the base" if band.plane == "base" else "through the key"
    if not math.isfinite(stated):
        return f"nothing drives it {where}"
    words = f"sliding factor {where} {ratio(stated)}"
    return f"{words}, {ratio(low)} to {ratio(high)} over the friction" if low != high else words


def dry_words(found: WallResult, index: int) -> str:
    """The same band as if no water pressed under the base."""
    band = found.stability.key_sliding or found.stability.sliding
    low, high = float(band.low_without_uplift[index]), float(band.high_without_uplift[index])
    if not math.isfinite(low):
        return ""
    return f"without uplift {ratio(low)}" + (f" to {ratio(high)}" if low != high else "")


def pressure_words(found: WallResult, index: int, system: System) -> str:
    """Pressure on the base at its two ends."""
    base = found.stability.base
    toe, heel = (show(float(getattr(base, end)[index]), "pressure", system) for end in ("toe", "heel"))
    return f"base pressure {toe} at the toe, {heel} at the heel"


def force_words(found: WallResult, index: int, system: System) -> list[str]:
    """Horizontal force, compression on the base and uplift."""
    stable = found.stability
    across = float(stable.horizontal[index])
    return [
        f"horizontal force {show(abs(across), 'line load', system)} toward the {direction(across)}",
        f"compression on the base {show(float(stable.base.normal[index]), 'line load', system)}",
        f"uplift {show(float(stable.uplift.push.vertical[index]), 'line load', system)}",
    ]


def sheet_words(found: IWallResult, index: int, system: System) -> list[str]:
    """Force above ground, embedment, shear and moment of an I-wall."""
    depth = found.embedment
    across, moment = float(found.horizontal[index]), float(found.moment[index])
    words = [
        f"force above ground {show(abs(across), 'line load', system)} toward the {direction(across)}",
        f"moment about the ground {show(moment, 'moment per length', system)}",
    ]
    provided = show(float(depth.provided[index]), "length", system)
    if not depth.found[index]:
        return [*words, f"no embedment balances it; the sheet has {provided}"]
    balanced, required = (show(float(getattr(depth, n)[index]), "length", system) for n in _DEPTHS)
    return [
        *words,
        f"embedment needed {required} (balanced at {balanced}), the sheet has {provided}",
        f"greatest moment in the sheet {show(abs(float(found.bending[index])), 'moment per length', system)}",
        f"greatest shear in the sheet {show(abs(float(found.shear[index])), 'line load', system)}",
    ]


_DEPTHS = ("balanced", "required")


def wall_texts(reading: Reading) -> list[str]:
    """What is written beside the drawing, the most wanted first."""
    barrier, index, system = reading.barrier, reading.index, reading.system
    if not isinstance(barrier, AssessedWall):
        return ["The two computations of its load disagree, so every figure is withheld"]
    found = barrier.found
    if isinstance(found, IWallResult):
        return [*sheet_words(found, index, system), _gap_words(found, system)]
    texts = [
        resultant_words(found, index, system),
        compression_words(found, index),
        sliding_words(found, index),
        dry_words(found, index),
        pressure_words(found, index, system),
        *force_words(found, index, system),
    ]
    return [text for text in texts if text]


def _gap_words(found: IWallResult, system: System) -> str:
    wall = found.record
    if wall.gap == "none":
        return "no gap counted: unconservative"
    where = "to the tip" if wall.gap_depth is None else f"{wall.gap_depth.text} deep"
    return f"gap full of water {where}, ground {elevation(wall.ground('flood'), system)}"


def wall_facts(reading: Reading) -> list[str]:
    """Sentences about one wall, per unit of its length."""
    barrier = reading.barrier
    sentences = [text[:1].upper() + text[1:] for text in wall_texts(reading)]
    if isinstance(barrier, AssessedWall) and isinstance(barrier.found, WallResult):
        held = barrier.found.criteria
        words = held.words if held else "none entered"
        sentences.append(f"Criteria in force: {words}")
    return sentences
