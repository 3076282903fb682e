"""What is odd about a level or a series, as a sentence with its figures as data."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from types import MappingProxyType
from typing import Literal

from loads.units import from_si

_DAYS_FROM = 96.0
"""Hours from which a time span is told in days."""
FigureKind = Literal["level", "difference", "rate", "duration"]


@dataclass(frozen=True, kw_only=True)
class Figure:
    """One figure of a sentence, in SI: metres, metres per second or seconds."""

    value: float
    kind: FigureKind


def in_both_units(figure: Figure) -> str:
    """A figure in metres and feet, or hours.

    Examples
    --------
    >>> in_both_units(Figure(value=3.048, kind="level"))
    '3.05 m (10.00 ft)'
    """
    if figure.kind == "duration":
        hours = figure.value / 3600
        return f"{hours:.3g} h" if hours < _DAYS_FROM else f"{hours / 24:.0f} days"
    if figure.kind == "rate":
        metres, feet = figure.value * 3600, from_si(figure.value * 3600, "ft", "length")
        return f"{metres:.2f} m/h ({feet:.2f} ft/h)"
    return f"{figure.value:.2f} m ({from_si(figure.value, 'ft', 'length'):.2f} ft)"


@dataclass(frozen=True, kw_only=True)
class Trap:
    """One thing that may be wrong with a level, never hidden.

    Attributes
    ----------
    name
        Short name that does not change, for example ``ceiling``.
    template
        The sentence, with the names of its figures in braces.
    figures
        The figures by name.
    """

    name: str
    template: str
    figures: Mapping[str, Figure]

    def __post_init__(self) -> None:
        object.__setattr__(self, "figures", MappingProxyType(dict(self.figures)))

    def sentence(self, show: Callable[[Figure], str] = in_both_units) -> str:
        """The sentence with its figures written by `show`."""
        return self.template.format(**{name: show(figure) for name, figure in self.figures.items()})

    def __str__(self) -> str:
        """Return the sentence in metres and feet."""
        return self.sentence()


def level(value: float) -> Figure:
    """A reading or an elevation, in metres."""
    return Figure(value=value, kind="level")


def difference(value: float) -> Figure:
    """A difference of two levels, in metres."""
    return Figure(value=value, kind="difference")


def rate(value: float) -> Figure:
    """A rate of rise, in metres per second."""
    return Figure(value=value, kind="rate")


def duration(value: float) -> Figure:
    """A time span, in seconds."""
    return Figure(value=value, kind="duration")
