"""What a drawing reads off one barrier in one state, and the same as sentences."""

from __future__ import annotations

import math
from dataclasses import dataclass
from functools import cached_property

import numpy as np

from loads.assessment import Assessed, Barrier
from loads.check_table import Checks
from loads.checks import SEVERITY, Check, Verdict
from loads.faces import face_of
from loads.first_limit import FirstLimit
from loads.panel_checks import Face
from loads.records.closure import Closure
from loads.records.i_wall import IWall
from loads.records.panel import Panel
from loads.records.wall import Wall
from loads.wall.assess import head_foot
from webapp.display import System, barrier_title, elevation, foot_of, show, significant
from webapp.drawing.stack_shape import StackShape, shape_of
from webapp.part_words import check_title

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
    def record(self) -> Panel | Closure | Wall | IWall:
        """What stands on the line."""
        return self.barrier.record

    @property
    def panel(self) -> Panel:
        """The face that is pressed: a panel itself, or the logs of a closure."""
        return self.barrier.setting.panel

    @property
    def closure(self) -> Closure | None:
        """The record of a closure, None for a panel."""
        return self.record if isinstance(self.record, Closure) else None

    @property
    def wall(self) -> Wall | IWall | None:
        """The record of a wall, None for any other barrier."""
        return self.record if isinstance(self.record, Wall | IWall) else None

    @property
    def foot(self) -> str:
        """What head is counted from: the bottom of the barrier, or the ground at a wall."""
        return head_foot(self.wall)[1] if self.wall else foot_of(self.record.kind)

    @property
    def foot_level(self) -> float:
        """Elevation from which head is counted. [m]."""
        return head_foot(self.wall)[0].value if self.wall else self.face.bottom

    @property
    def tops(self) -> list[tuple[str, float]]:
        """Name and elevation of the top, of stacks that differ both ends of their range. [m]."""
        if self.stack is None:
            return [("top", self.face.top)]
        layout = self.stack.layout
        tops = dict.fromkeys((layout.highest_top, layout.lowest_top))
        names = ("top of logs",) if len(tops) == 1 else ("highest logs", "lowest logs")
        return [(name, top) for name, top in zip(names, tops, strict=True) if top > layout.sill]

    @property
    def crest(self) -> float:
        """Elevation at which water goes over first. [m]."""
        return self.stack.layout.lowest_top if self.stack else self.face.top

    @cached_property
    def verdicts(self) -> dict[str, Verdict]:
        """Verdict of every part that is checked, by its name."""
        return part_verdicts(self.assessed.checks, self.index) if self.assessed else {}

    @cached_property
    def stack(self) -> StackShape | None:
        """Logs, posts and guides of a closure, None for a panel."""
        if self.closure is None:
            return None
        return shape_of(self.closure, self.verdicts, "not checked" if self.assessed else "withheld")

    @property
    def drawn_top(self) -> float:
        """Highest elevation of the barrier itself, also where no log is in place. [m]."""
        return max(self.face.top, self.stack.top) if self.stack else self.face.top

    @property
    def assessed(self) -> Assessed | None:
        """The barrier while its results may be shown."""
        return self.barrier if isinstance(self.barrier, Assessed) else None

    @cached_property
    def face(self) -> Face:
        """Geometry, also of a withheld barrier."""
        return self.barrier.face if isinstance(self.barrier, Assessed) else face_of(self.panel)

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


def part_verdicts(checks: Checks, index: int) -> dict[str, Verdict]:
    """Most pressing verdict of everything that is checked, by its name."""
    found: dict[str, int] = {}
    for subject, grade in zip(checks.subjects, checks.severity[index].tolist(), strict=True):
        found[subject] = max(found.get(subject, 0), int(grade))
    return {subject: SEVERITY[grade] for subject, grade in found.items()}


def pressing(checks: Checks, index: int) -> Check | None:
    """Check with a limit that is most pressing in a state."""
    limited = np.flatnonzero(checks.limited)
    if not limited.size:
        return None
    ratio = np.nan_to_num(checks.ratio[index, limited], nan=np.inf, posinf=np.inf)
    order = np.lexsort((-limited, ratio, checks.severity[index, limited]))
    return checks[int(limited[order[-1]])]


def ratio_text(check: Check, index: int) -> str:
    """Ratio of a check in words."""
    ratio = float(check.ratio[index])
    nothing = "no head allowed" if check.kind == "elevation" else unbounded(check)
    return f"{significant(ratio, RATIO_DIGITS)} of limit" if math.isfinite(ratio) else nothing


def unbounded(check: Check) -> str:
    """What is said of a ratio without bound: of a limit of nothing, or of a demand that nothing carries."""
    return "none allowed" if check.limit_value == 0 else "beyond any limit"


def over_top_texts(reading: Reading) -> list[str]:
    """What is said of water that stands over the top."""
    texts = []
    for side, prefix in (("flood", ""), ("protected", "protected side ")):
        over = reading.level(side) - reading.crest
        if over > _NIL:
            texts.append(f"{prefix}{_over_what(reading)} by {reading.length(over)}")
    return texts


def _over_what(reading: Reading) -> str:
    if reading.stack is None:
        return "over the top"
    layout = reading.stack.layout
    if layout.lowest_top <= layout.sill:
        return "over the open sill"
    return "over the logs" if layout.lowest_top == layout.highest_top else "over the lowest logs"


def reverse_text(reading: Reading) -> str:
    """What is said of reverse head; empty without it."""
    flood, protected = reading.level("flood"), reading.level("protected")
    if not protected > max(flood, reading.foot_level):
        return ""
    if flood > reading.foot_level:
        return f"protected side {reading.length(protected - flood)} higher"
    return f"protected side head {reading.length(protected - reading.foot_level)}"


def head_text(reading: Reading) -> str:
    """Head of the flood side over the bottom."""
    head = reading.level("flood") - reading.foot_level
    return f"head {reading.length(head)}" if head > 0 else "no water on the flood side"


def direction(value: float) -> str:
    """Which side a horizontal force pushes toward, or a moment turns the top toward."""
    return "protected side" if value > 0 else "flood side"


def inclined(horizontal: float, vertical: float) -> bool:
    """Whether a force has a vertical part worth a word."""
    return abs(vertical) > _NIL * abs(horizontal)


def check_words(reading: Reading, check: Check) -> str:
    """Check with the part it is about, for example "post 2 moment"; of a whole barrier its name alone."""
    return check_title(check, reading.record.kind)
