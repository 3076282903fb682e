"""A closure: an opening shut by stop logs in bays between guides and posts on a sill."""

from __future__ import annotations

from typing import Annotated, Any, ClassVar

from pydantic import Field, field_validator, model_validator

from loads.quantity import Quantity
from loads.records.base import Measure, Name, Note, Record, several_problems
from loads.records.closure_parts import Anchor, Log, Post, Whole
from loads.records.closure_site import Adding, Guide, Handling, HoldDown, Install, Seal
from loads.records.crew import BarrierClock
from loads.records.member import small_size
from loads.records.panel import Elevation, Limits, Panel
from loads.records.per_bay import WholeNumbers, for_each_bay
from loads.records.sediment import Sediment

Problems = list[tuple[str, str, str]]

MOST_BAYS = 60
_SAME = 1e-6
_clear = small_size("Clear width between guides", "8 ft")


class Closure(Record):
    """Bays of logs on one sill, between abutments and removable posts.

    Bays are counted from the left and logs from the sill up, as a crew sees them from the protected side.
    """

    kind: ClassVar[str] = "closure"

    id: Annotated[str, Field(min_length=1, max_length=24, pattern=r"^[^\x00-\x1f\x7f]*$")]
    name: Name = ""
    sill: Elevation
    bays: Annotated[int, Field(ge=1, le=MOST_BAYS)] | None = None
    bay_width: Annotated[Quantity, _clear] | None = None
    bay_widths: (
        Annotated[
            tuple[Annotated[Quantity, _clear], ...], Field(min_length=1, max_length=MOST_BAYS, strict=False)
        ]
        | None
    ) = None
    height: Annotated[Quantity, small_size("Height of the opening above the sill", "7 ft")] | None = None
    logs_in_place: (
        Annotated[
            Whole,
            WholeNumbers(
                meaning="Logs in place in each bay; all that are on hand if left out", least=0, most=200
            ),
        ]
        | None
    ) = None
    log: Log
    post: Post | None = None
    anchor: Anchor | None = None
    guide: Guide = Guide()
    hold_down: HoldDown | None = None
    seal: Seal | None = None
    adding: Adding | None = None
    install: Install | None = None
    clock: BarrierClock | None = None
    handling: Handling | None = None
    parts_short: Annotated[tuple[Note, ...], Field(max_length=50, strict=False)] = ()
    sediment: Annotated[tuple[Sediment, ...], Field(max_length=20, strict=False)] = ()
    limits: Limits = Limits()
    rated_level: Elevation | None = None
    allowance: (
        Annotated[
            Quantity,
            Measure(
                kind="length",
                meaning="What the water may come higher than the level entered",
                least="0 ft",
                most="50 ft",
                example="1 ft",
            ),
        ]
        | None
    ) = None
    note: Note = ""

    @field_validator("bay_widths", "parts_short", "sediment", mode="before")
    @classmethod
    def _lists_become_tuples(cls, value: object) -> object:
        return tuple(value) if isinstance(value, list) else value

    @model_validator(mode="after")
    def _parts_fit_together(self) -> Closure:
        problems = self._bay_problems()
        if not problems:
            problems = self._count_problems() + self._height_problems()
        if self.anchor is not None and self.post is None:
            problems.append(("post", "", "is missing; anchors hold a post"))
        ground: dict[str, Any] = {"bottom": self.sill, "sediment": self.sediment}
        footed = Panel.model_construct(**ground)
        problems += footed.sediment_problems("sill of the closure")
        if problems:
            raise several_problems(problems)
        return self

    @property
    def bay_count(self) -> int:
        """Number of bays."""
        return len(self.bay_widths) if self.bay_widths is not None else self.bays or 0

    @property
    def widths(self) -> tuple[float, ...]:
        """Clear width of each bay. [m]."""
        if self.bay_widths is not None:
            return tuple(width.value for width in self.bay_widths)
        assert self.bay_width is not None
        return (self.bay_width.value,) * self.bay_count

    @property
    def on_hand(self) -> tuple[int, ...]:
        """Logs on hand for each bay."""
        return for_each_bay(self.log.count, self.bay_count)

    @property
    def in_place(self) -> tuple[int, ...]:
        """Logs in place in each bay."""
        counted = self.log.count if self.logs_in_place is None else self.logs_in_place
        return for_each_bay(counted, self.bay_count)

    def _bay_problems(self) -> Problems:
        problems: Problems = []
        if self.bay_widths is None:
            problems += [
                (name, "", "is missing; a closure needs bays and bay_width, or bay_widths")
                for name in ("bays", "bay_width")
                if getattr(self, name) is None
            ]
        elif self.bay_width is not None:
            rule = "it is not used beside bay_widths; leave one of them out"
            problems.append(("bay_width", f'"{self.bay_width.text}"', rule))
        elif self.bays is not None and self.bays != len(self.bay_widths):
            rule = f"bay_widths names {len(self.bay_widths)}; they must agree, or leave bays out"
            problems.append(("bays", str(self.bays), rule))
        for name, value in (("log.count", self.log.count), ("logs_in_place", self.logs_in_place)):
            if isinstance(value, tuple) and not problems and len(value) != self.bay_count:
                rule = f"it must have one number for each of {self.bay_count} bays"
                problems.append((name, f"a list of {len(value)}", rule))
        return problems

    def _count_problems(self) -> Problems:
        pairs = list(zip(self.in_place, self.on_hand, strict=True))
        short = [bay for bay, (placed, had) in enumerate(pairs, 1) if placed > had]
        if not short:
            return []
        placed, had = pairs[short[0] - 1]
        rule = f"it must not be more than the {had} on hand (bay {short[0]})"
        return [("logs_in_place", str(placed), rule)]

    def _height_problems(self) -> Problems:
        problems: Problems = []
        one, stack = self.log.height.value, max(self.in_place) * self.log.height.value
        limits = [("opening", "height", self.height)]
        if self.post is not None:
            limits.append(("post", "post.height", self.post.height))
            brace = self.post.brace
            if brace and self.post.height is None and brace.height.value > self._built() + _SAME:
                rule = "it must not be above the top of the post, which ends with the logs on hand"
                problems.append(("post.brace.height", f'"{brace.height.text}"', rule))
        for words, name, height in limits:
            if height is None:
                continue
            if one > height.value + _SAME:
                rule = f'it must not be taller than the {words}, "{height.text}"'
                problems.append(("log.height", f'"{self.log.height.text}"', rule))
            elif stack > height.value + _SAME:
                rule = f"the {max(self.in_place)} logs in place would stand above the top of the {words}"
                problems.append((name, f'"{height.text}"', rule))
        return problems

    def _built(self) -> float:
        return max(self.on_hand) * self.log.height.value

    @property
    def post_height(self) -> float:
        """Height of the posts above the sill: as entered, or up to the top of all logs on hand. [m]."""
        if self.post is not None and self.post.height is not None:
            return self.post.height.value
        return self._built()
