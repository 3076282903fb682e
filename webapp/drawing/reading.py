"""What a drawing reads off one barrier in one state, and the same as sentences."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property

from loads.assessment import Assessed, Assessment, Barrier
from loads.checks import SEVERITY, Check, Verdict
from loads.faces import face_of
from loads.first_limit import FirstLimit
from loads.panel_checks import Face
from loads.records.panel import Panel
from loads.states import Levels
from webapp.display import System, barrier_title, elevation, pedigree, show, significant

RATIO_DIGITS = 3
_NIL = 1e-9


@dataclass(frozen=True)
class Reading:
    """One barrier in one state.

    Attributes
    ----------
    barrier
        Assessed or withheld.
    index
        The state.
    system
        Units shown.
    datum
        Of every elevation.
    """

    barrier: Barrier
    index: int
    system: System
    datum: str

    @property
    def record(self) -> Panel:
        """What stands on the line."""
        return self.barrier.record

    @property
    def assessed(self) -> Assessed | None:
        """The barrier while its results may be shown."""
        return self.barrier if isinstance(self.barrier, Assessed) else None

    @cached_property
    def face(self) -> Face:
        """Geometry, also of a withheld barrier."""
        return self.barrier.face if isinstance(self.barrier, Assessed) else face_of(self.record)

    @property
    def verdict(self) -> Verdict:
        """Most pressing verdict."""
        return self.barrier.verdict(self.index)

    @property
    def title(self) -> str:
        """Id and name."""
        return barrier_title(self.record.id, self.record.name)

    def level(self, side: str) -> float:
        """Level of one side, −inf when dry. [m]."""
        return float(self.barrier.setting.levels.of(side)[self.index])

    @cached_property
    def check(self) -> Check | None:
        """Check with a limit that is most pressing in this state."""
        return pressing(self.assessed.checks, self.index) if self.assessed else None

    @property
    def first_limit(self) -> FirstLimit | None:
        """First-limit level, when it was computed for the protected side as it is in this state."""
        if self.assessed is None:
            return None
        protected = self.assessed.levels.protected_side
        return self.assessed.first_limit if protected[self.index] == protected[0] else None

    def length(self, metres: float) -> str:
        """Height difference with the decimals of an elevation."""
        return elevation(metres, self.system)

    def elevation(self, z: float) -> str:
        """Elevation with its datum."""
        return elevation(z, self.system, self.datum)

    def show(self, value: float, kind: str) -> str:
        """Value with its unit."""
        return show(value, kind, self.system)


def bare_elevation(z: float, system: System) -> str:
    """Elevation without its unit, which stands at the axis."""
    return elevation(z, system).split("\u00a0", maxsplit=1)[0]


def pressing(checks: tuple[Check, ...], index: int) -> Check | None:
    """Check with a limit that is most pressing in a state."""
    limited = [check for check in checks if check.limit is not None]
    return max(
        limited,
        key=lambda check: (SEVERITY.index(check.verdict(index)), float(check.ratio[index])),
        default=None,
    )


def ratio_text(check: Check, index: int) -> str:
    """Ratio of a check in words."""
    ratio = float(check.ratio[index])
    return f"{significant(ratio, RATIO_DIGITS)} of limit" if math.isfinite(ratio) else "no head allowed"


def over_top_texts(reading: Reading) -> list[str]:
    """What is said of water that stands over the top."""
    texts = []
    for side, prefix in (("flood", ""), ("protected", "protected side ")):
        over = reading.level(side) - reading.face.top
        if over > _NIL:
            texts.append(f"{prefix}over the top by {reading.length(over)}")
    return texts


def reverse_text(reading: Reading) -> str:
    """What is said of reverse head; empty without it."""
    flood, protected = reading.level("flood"), reading.level("protected")
    if not protected > max(flood, reading.face.bottom):
        return ""
    if flood > reading.face.bottom:
        return f"protected side {reading.length(protected - flood)} higher"
    return f"protected side head {reading.length(protected - reading.face.bottom)}"


def head_text(reading: Reading) -> str:
    """Head of the flood side over the bottom."""
    head = reading.level("flood") - reading.face.bottom
    return f"head {reading.length(head)}" if head > 0 else "no water on the flood side"


def direction(value: float) -> str:
    """Which side a horizontal force pushes toward, or a moment turns the top toward."""
    return "protected side" if value > 0 else "flood side"


def inclined(horizontal: float, vertical: float) -> bool:
    """Whether a force has a vertical part worth a word."""
    return abs(vertical) > _NIL * abs(horizontal)


def _capital(text: str) -> str:
    return text[:1].upper() + text[1:]


def facts(barrier: Barrier, *, index: int = 0, system: System, datum: str) -> tuple[str, ...]:
    """What the drawing of a barrier says, as sentences.

    Parameters
    ----------
    barrier
        Assessed or withheld.
    index
        The state.
    system, datum
        Units, and datum of the elevations.
    """
    reading = Reading(barrier, index, system, datum)
    sentences = [f"{reading.title}: {reading.verdict}"]
    sentences += [_level_fact(reading, side) for side in ("flood", "protected")]
    sentences += [_capital(text) for text in (*over_top_texts(reading), reverse_text(reading)) if text]
    sentences += _load_facts(reading) + _limit_facts(reading)
    return tuple(f"{sentence}." for sentence in sentences)


def _level_fact(reading: Reading, side: str) -> str:
    level, bottom = reading.level(side), reading.face.bottom
    if not math.isfinite(level):
        return f"{_capital(side)} side dry"
    head = f"{reading.length(level - bottom)} above" if level > bottom else "not above"
    place = f"{head} the bottom at {reading.elevation(bottom)}"
    return f"{_capital(side)} side at {reading.elevation(level)}, {place}"


def _load_facts(reading: Reading) -> list[str]:
    if reading.assessed is None:
        return ["The two computations of its load disagree, so force and moment are withheld"]
    resultant, index = reading.assessed.resultant, reading.index
    horizontal, vertical = float(resultant.horizontal[index]), float(resultant.vertical[index])
    moment, acts = float(resultant.moment[index]), float(resultant.line_of_action[index])
    if math.isnan(acts):
        first = "No net horizontal force"
    else:
        rise = acts - reading.face.bottom
        place = f"{reading.length(abs(rise))} {'above' if rise >= 0 else 'below'} the bottom"
        kind = "horizontal force" if inclined(horizontal, vertical) else "force"
        first = (
            f"Net {kind} {reading.show(abs(horizontal), 'force')} toward the {direction(horizontal)}, "
            f"acting at {reading.elevation(acts)}, {place}"
        )
    said = [first]
    if inclined(horizontal, vertical):
        said.append(
            f"Vertical force {reading.show(abs(vertical), 'force')} {'up' if vertical > 0 else 'down'}"
        )
    if abs(moment) > _NIL:
        said.append(
            f"Moment about the bottom {reading.show(abs(moment), 'moment')}, turning the top toward the "
            f"{direction(moment)}"
        )
    return said


def _limit_facts(reading: Reading) -> list[str]:
    said = []
    check = reading.check
    if check is not None:
        said.append(
            f"Most pressing: {check.name}, {ratio_text(check, reading.index)} (set by: {check.source})"
        )
    elif reading.assessed is not None:
        said.append("No limit entered")
    rated = reading.record.rated_level
    if rated is not None:
        said.append(f"Rated level {reading.elevation(rated.value)} ({pedigree(rated)})")
    first = reading.first_limit
    if first is not None:
        said.append(_first_limit_fact(reading, first))
    return said


def _first_limit_fact(reading: Reading, first: FirstLimit) -> str:
    if first.level is None:
        return f"No load limit is reached up to {reading.elevation(first.ceiling)}"
    if first.without_water:
        return f"The limit of {first.check} is reached without water on the flood side"
    return f"First-limit level {reading.elevation(first.level)} by {first.check}, a computed screening figure"


def level_text(levels: Levels, index: int, side: str, system: System, datum: str) -> str:
    """Level of one side in words."""
    level = float(levels.of(side)[index])
    return f"{side} side {elevation(level, system, datum)}" if math.isfinite(level) else f"{side} side dry"


def line_facts(assessment: Assessment, *, index: int = 0, system: System) -> tuple[str, ...]:
    """What the drawing of a flood line says, as sentences.

    Parameters
    ----------
    assessment
        All barriers.
    index
        The state.
    system
        Units.
    """
    datum = assessment.scenario.datum
    sentences = [
        f"{_capital(level_text(assessment.levels, index, side, system, datum))}."
        for side in ("flood", "protected")
    ]
    for barrier in assessment.barriers:
        reading = Reading(barrier, index, system, datum)
        parts = [f"{reading.title}: {reading.verdict}"]
        check = reading.check
        if check is not None:
            parts.append(f"{ratio_text(check, index)}, {check.name}")
        parts += [head_text(reading), *over_top_texts(reading)]
        parts += [reverse_text(reading)] if reverse_text(reading) else []
        sentences.append("; ".join(parts) + ".")
    return tuple(sentences)
