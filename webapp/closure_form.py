"""What the form of a closure asks, table by table of its record."""

from __future__ import annotations

from dataclasses import dataclass

from loads.records.base import Record
from loads.records.closure import Closure
from loads.records.closure_parts import Anchor, Brace, Log, Post
from loads.records.closure_site import Adding, Guide, Handling, HoldDown, Install, Niosh, Seal
from loads.records.crew import BarrierClock
from loads.records.member import LogLimits, LogSection, PostLimits, PostSection
from loads.records.panel import Limits


@dataclass(frozen=True, kw_only=True)
class FormPart:
    """Fields of one table.

    Attributes
    ----------
    section
        Part of the form that it stands in.
    title
        Heading above its fields, or empty.
    path
        Tables that lead to it from the closure's own.
    record
        What the table is.
    names
        Fields asked; all that are values when empty.
    """

    section: str
    title: str
    path: tuple[str, ...]
    record: type[Record]
    names: tuple[str, ...] = ()

    @property
    def record_name(self) -> str:
        """Name under which forms know the record."""
        return ".".join(("closure", *self.path))

    @property
    def asked(self) -> tuple[str, ...]:
        """Fields in order."""
        return self.names or tuple(self.record.model_fields)


CLOSURE_FORM = (
    FormPart(
        section="",
        title="",
        path=(),
        record=Closure,
        names=(
            "id",
            "name",
            "bays",
            "bay_width",
            "bay_widths",
            "height",
            "logs_in_place",
            "note",
            "parts_short",
            "sill",
            "rated_level",
            "allowance",
        ),
    ),
    FormPart(
        section="Limits of the whole closure that somebody set", title="", path=("limits",), record=Limits
    ),
    FormPart(
        section="Logs",
        title="",
        path=("log",),
        record=Log,
        names=("height", "count", "bearing_length", "weight", "material", "modulus", "fills_with_water"),
    ),
    FormPart(section="Logs", title="Section", path=("log", "section"), record=LogSection),
    FormPart(section="Logs", title="Limits that somebody set", path=("log", "limits"), record=LogLimits),
    FormPart(
        section="Posts",
        title="",
        path=("post",),
        record=Post,
        names=("width", "height", "weight", "material", "modulus"),
    ),
    FormPart(section="Posts", title="Section", path=("post", "section"), record=PostSection),
    FormPart(section="Posts", title="Brace", path=("post", "brace"), record=Brace),
    FormPart(section="Posts", title="Anchors", path=("anchor",), record=Anchor),
    FormPart(section="Posts", title="Limits that somebody set", path=("post", "limits"), record=PostLimits),
    FormPart(section="Guides, seals and hold-downs", title="Guides", path=("guide",), record=Guide),
    FormPart(section="Guides, seals and hold-downs", title="Seals and pump", path=("seal",), record=Seal),
    FormPart(
        section="Guides, seals and hold-downs", title="Hold-downs", path=("hold_down",), record=HoldDown
    ),
    FormPart(section="Building and lifting", title="Adding logs in water", path=("adding",), record=Adding),
    FormPart(section="Building and lifting", title="Building", path=("install",), record=Install),
    FormPart(
        section="Building and lifting",
        title="Lifting by hand",
        path=("handling",),
        record=Handling,
        names=("people_per_log", "limit"),
    ),
    FormPart(
        section="Building and lifting",
        title="Lifting equation",
        path=("handling", "niosh"),
        record=Niosh,
    ),
    FormPart(
        section="Clock",
        title="",
        path=("clock",),
        record=BarrierClock,
        names=(
            "install_time",
            "install_people",
            "preparation",
            "wave_allowance",
            "removal_stage",
            "owner",
            "tell_owner_ahead",
            "needs",
            "crew",
            "order",
        ),
    ),
)
"""The form, in order; parts of one section stand together."""
