"""A chain of links from what was entered to a result, every link with its value and its range.

A link is either given, with a low and a high, or computed from links before it. The range of the result is
stated in two ways, which are never mixed: the worst of all corners of what was given, and the root of the
summed squares of the changes that each given link makes alone.
"""

from __future__ import annotations

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from datetime import date
from itertools import product
from typing import Final, Literal, TypeAlias

import numpy as np

from loads.arrays import BoolArray, FloatArray
from loads.limits_of_use import refuse_unless

Values: TypeAlias = Mapping[str, FloatArray]
Basis: TypeAlias = Literal["entered", "assumed", "computed"]

MAX_RANGES: Final = 10
"""Most links with a range whose corners are all visited: 1024 corners."""

WORST_CASE: Final = "worst of all corners"
QUADRATURE: Final = "root-sum-square of one-at-a-time changes"


@dataclass(frozen=True, kw_only=True)
class Spread:
    """Range of a result, each end of shape (n,), and how it was combined."""

    method: str
    low: FloatArray
    high: FloatArray


@dataclass(frozen=True, kw_only=True)
class Given:
    """A link that is entered or assumed; value, low and high broadcast to shape (n,), in SI."""

    name: str
    symbol: str
    meaning: str
    kind: str
    value: FloatArray
    low: FloatArray
    high: FloatArray
    basis: Basis = "entered"
    source: str = ""
    dated: date | None = None
    text: str = ""

    @property
    def has_range(self) -> bool:
        """True when low and high differ anywhere."""
        return bool(np.any(self.low < self.high))


@dataclass(frozen=True, kw_only=True)
class Computed:
    """A link that follows from links before it, by a formula with its source."""

    name: str
    symbol: str
    meaning: str
    kind: str
    formula: Callable[[Values], FloatArray]
    source: str


@dataclass(frozen=True, kw_only=True)
class Link:
    """One link as it came out.

    Attributes
    ----------
    name
        Field or step it stands for.
    symbol, meaning, kind
        For the worked line; the kind gives the unit.
    value, low, high
        Shape (n,), SI; of a computed link the low and high over all corners; not a number where no data.
    basis
        Whether it was entered, assumed or computed.
    source, dated, text
        Where it comes from, of which day, and as it was typed.
    falls_by, rises_by
        Most that the result falls and rises while this link alone goes through its range, both at or above
        zero, shape (n,); zero for a link without a range and for a computed one.
    """

    name: str
    symbol: str
    meaning: str
    kind: str
    value: FloatArray
    low: FloatArray
    high: FloatArray
    basis: Basis
    source: str
    dated: date | None
    text: str
    falls_by: FloatArray
    rises_by: FloatArray


@dataclass(frozen=True, kw_only=True)
class Outcome:
    """All links of a chain, and the two ranges of its last one."""

    links: tuple[Link, ...]
    worst: Spread
    quadrature: Spread

    def link(self, name: str) -> Link:
        """Link of a name.

        Raises
        ------
        KeyError
            The chain has no such link.
        """
        for link in self.links:
            if link.name == name:
                return link
        raise KeyError(name)


def follow(chain: Sequence[Given | Computed], states: int) -> Outcome:
    """Values and ranges of every link of a chain.

    Parameters
    ----------
    chain
        Links in order; the last one is the result.
    states
        Number of states n.

    Returns
    -------
    Outcome
        A state with a given value that is not a finite number has no data: every computed link is NaN there.

    Raises
    ------
    OutsideFormulaError
        More than `MAX_RANGES` links with a range; or what a formula refuses, at the entered values or at
        any corner.

    Notes
    -----
    Corners bound the result where it rises or falls throughout each range. The density of water between
    0 and 8 °C does neither; what is missed there is below 0.02 % of the head.
    """
    given = [link for link in chain if isinstance(link, Given)]
    ranged = [link for link in given if link.has_range]
    refuse_unless(
        np.asarray(len(ranged) <= MAX_RANGES),
        "low and high",
        f"may be entered for at most {MAX_RANGES} links of a chain, and here are {len(ranged)}",
    )
    data = np.ones(states, dtype=np.bool_)
    for link in given:
        data &= np.isfinite(link.value)
    entered = {link.name: _states(link.value, states)[data] for link in given}
    ends = {link.name: (_states(link.low, states)[data], _states(link.high, states)[data]) for link in ranged}
    base = _run(chain, entered)
    lows, highs = _corners(chain, entered, ends, base)
    result = chain[-1].name
    changes = {
        name: tuple(_run(chain, {**entered, name: end})[result] - base[result] for end in pair)
        for name, pair in ends.items()
    }
    falls = {name: np.maximum(0.0, np.maximum(-a, -b)) for name, (a, b) in changes.items()}
    rises = {name: np.maximum(0.0, np.maximum(a, b)) for name, (a, b) in changes.items()}
    down, up = (np.sqrt(sum((c**2 for c in each.values()), np.zeros(data.sum()))) for each in (falls, rises))
    return Outcome(
        links=tuple(
            _link(link, base=base, lows=lows, highs=highs, falls=falls, rises=rises, data=data)
            for link in chain
        ),
        worst=Spread(method=WORST_CASE, low=_spread(lows[result], data), high=_spread(highs[result], data)),
        quadrature=Spread(
            method=QUADRATURE,
            low=_spread(base[result] - down, data),
            high=_spread(base[result] + up, data),
        ),
    )


def _run(chain: Sequence[Given | Computed], entered: Values) -> dict[str, FloatArray]:
    values = dict(entered)
    for link in chain:
        if isinstance(link, Computed):
            values[link.name] = link.formula(values)
    return values


def _corners(
    chain: Sequence[Given | Computed],
    entered: Values,
    ends: Mapping[str, tuple[FloatArray, FloatArray]],
    base: Values,
) -> tuple[dict[str, FloatArray], dict[str, FloatArray]]:
    lows, highs = dict(base), dict(base)
    for corner in product(*ends.values()):
        values = _run(chain, {**entered, **dict(zip(ends, corner, strict=True))})
        for name, value in values.items():
            lows[name] = np.minimum(lows[name], value)
            highs[name] = np.maximum(highs[name], value)
    return lows, highs


def _link(
    link: Given | Computed,
    *,
    base: Values,
    lows: Values,
    highs: Values,
    falls: Values,
    rises: Values,
    data: BoolArray,
) -> Link:
    nothing = np.zeros(data.sum())
    given = link if isinstance(link, Given) else None
    return Link(
        name=link.name,
        symbol=link.symbol,
        meaning=link.meaning,
        kind=link.kind,
        value=_spread(base[link.name], data),
        low=_spread(lows[link.name], data),
        high=_spread(highs[link.name], data),
        basis=given.basis if given else "computed",
        source=link.source,
        dated=given.dated if given else None,
        text=given.text if given else "",
        falls_by=_spread(falls.get(link.name, nothing), data),
        rises_by=_spread(rises.get(link.name, nothing), data),
    )


def _states(value: FloatArray, states: int) -> FloatArray:
    return np.broadcast_to(np.asarray(value, dtype=np.float64), (states,))


def _spread(values: FloatArray, data: BoolArray) -> FloatArray:
    everywhere = np.full(len(data), np.nan)
    everywhere[data] = values
    return everywhere
