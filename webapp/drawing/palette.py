"""Colours of the drawings, after the colour-blind-safe set of Okabe and Ito, and the verdicts' marks."""

from __future__ import annotations

from dataclasses import dataclass

from loads.checks import Verdict


@dataclass(frozen=True, kw_only=True)
class Palette:
    """Colours of one ground. Every meaning they carry is also said by a word, a shape or a hatch.

    Attributes
    ----------
    name
        "light", "dark" or "print".
    ground, face
        Paper, and the fill of what stands on it.
    ink, faint, grid
        Text and outlines, secondary text, grid lines.
    water, water_ink
        Line of a water level and text about it.
    flood_tint, flood_hatch, protected_tint, protected_hatch
        Water of each side.
    soil
        Dots of ground and sediment.
    load
        Fill of the pressure diagram.
    below, near, above, unchecked, withheld
        Outline and hatch of each verdict.
    """

    name: str
    ground: str
    face: str
    ink: str
    faint: str
    grid: str
    water: str
    water_ink: str
    flood_tint: str
    flood_hatch: str
    protected_tint: str
    protected_hatch: str
    soil: str
    load: str
    below: str
    near: str
    above: str
    unchecked: str
    withheld: str

    def colour(self, verdict: Verdict) -> str:
        """Outline and hatch of a verdict."""
        return {
            "below limit": self.below,
            "near limit": self.near,
            "above limit": self.above,
            "not checked": self.unchecked,
            "withheld": self.withheld,
        }[verdict]


@dataclass(frozen=True, kw_only=True)
class Mark:
    """How a verdict is drawn apart from its colour: hatch, line width, dashes, corners of its sign."""

    hatch: str | None
    width: float
    dashes: str | None
    sign: tuple[tuple[float, float], ...]
    """Corners within a unit square; empty for a circle."""


_CUT = 0.3
MARKS: dict[Verdict, Mark] = {
    "below limit": Mark(hatch=None, width=2, dashes=None, sign=()),
    "near limit": Mark(hatch="near", width=3, dashes=None, sign=((0.5, 0), (1, 1), (0, 1))),
    "above limit": Mark(
        hatch="above",
        width=3.6,
        dashes=None,
        sign=(
            (_CUT, 0),
            (1 - _CUT, 0),
            (1, _CUT),
            (1, 1 - _CUT),
            (1 - _CUT, 1),
            (_CUT, 1),
            (0, 1 - _CUT),
            (0, _CUT),
        ),
    ),
    "not checked": Mark(hatch="unchecked", width=2, dashes=None, sign=((0, 0), (1, 0), (1, 1), (0, 1))),
    "withheld": Mark(hatch=None, width=3.6, dashes="8 5", sign=((0.5, 0), (1, 0.5), (0.5, 1), (0, 0.5))),
}

LIGHT = Palette(
    name="light",
    ground="#fbfaf7",
    face="#ffffff",
    ink="#1d2733",
    faint="#4d5966",
    grid="#d9dee4",
    water="#0072b2",
    water_ink="#004f7d",
    flood_tint="#e3eef3",
    flood_hatch="#9cc4dc",
    protected_tint="#e9f3f9",
    protected_hatch="#8fc9ec",
    soil="#a58a5b",
    load="#dce9f0",
    below="#009e73",
    near="#e69f00",
    above="#d55e00",
    unchecked="#78838f",
    withheld="#1d2733",
)

DARK = Palette(
    name="dark",
    ground="#14181d",
    face="#1c2229",
    ink="#eef1f4",
    faint="#b3bdc7",
    grid="#303840",
    water="#56b4e9",
    water_ink="#9ad4f6",
    flood_tint="#17303f",
    flood_hatch="#2f6486",
    protected_tint="#182730",
    protected_hatch="#386079",
    soil="#a58a5b",
    load="#1f3a4b",
    below="#009e73",
    near="#e69f00",
    above="#d55e00",
    unchecked="#98a3ae",
    withheld="#eef1f4",
)

PRINT = Palette(
    name="print",
    ground="#ffffff",
    face="#ffffff",
    ink="#000000",
    faint="#222222",
    grid="#c4c4c4",
    water="#000000",
    water_ink="#000000",
    flood_tint="#ececec",
    flood_hatch="#8a8a8a",
    protected_tint="#f6f6f6",
    protected_hatch="#8a8a8a",
    soil="#555555",
    load="#e4e4e4",
    below="#000000",
    near="#000000",
    above="#000000",
    unchecked="#000000",
    withheld="#000000",
)
