"""The sharp-crest formulas that depend on the crest's height, each with its limits of use."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final, TypeAlias

import numpy as np

from loads.arrays import FloatArray
from loads.closure.weirs import (
    flow_ackers,
    flow_kindsvater_carter,
    flow_kindsvater_carter_contracted,
    flow_rehbock,
)
from loads.limits_of_use import LimitOfUse, outside

Flow: TypeAlias = Callable[[FloatArray, FloatArray, FloatArray], FloatArray]


@dataclass(frozen=True, kw_only=True)
class SharpCrestFormula:
    """A formula, and where it is published.

    Attributes
    ----------
    name
        What people call it.
    flow
        Flow from head, crest height and width.
    head, head_over_crest_height, crest_height, width
        Limits of use.
    """

    name: str
    flow: Flow
    head: LimitOfUse
    head_over_crest_height: LimitOfUse
    crest_height: LimitOfUse
    width: LimitOfUse

    def greatest_head(self, crest_height: FloatArray, width: FloatArray) -> FloatArray:
        """Greatest head for which it is published at each crest; zero where it is for none.

        Parameters
        ----------
        crest_height
            Crest over the ground on the flood side, shape (k,). [m]
        width
            Shape (k,). [m]

        Returns
        -------
        FloatArray
            Shape (k,). [m]
        """
        fits = ~outside(crest_height, self.crest_height) & ~outside(width, self.width)
        most = np.minimum(
            self.head.high, self.head_over_crest_height.high * np.where(fits, crest_height, 0.0)
        )
        return np.asarray(np.where(fits, most, 0.0), dtype=np.float64)


def _formula(
    name: str,
    flow: Flow,
    *,
    head: tuple[float, float],
    ratio: float,
    crest_height: float,
    width: float,
    note: str,
) -> SharpCrestFormula:
    def limit(quantity: str, low: float, high: float, unit: str = "m") -> LimitOfUse:
        return LimitOfUse(quantity=quantity, low=low, high=high, unit=unit, note=f"{name}, {note}")

    return SharpCrestFormula(
        name=name,
        flow=flow,
        head=limit("head", *head),
        head_over_crest_height=limit("head_over_crest_height", 0.0, ratio, "–"),
        crest_height=limit("crest_height", crest_height, np.inf),
        width=limit("width", width, np.inf),
    )


_QUOTED: Final = "as quoted in a handbook of fluid dynamics"

SHARP_CREST_FORMULAS: Final = (
    _formula(
        "Rehbock",
        flow_rehbock,
        head=(0.03, 0.75),
        ratio=1.0,
        crest_height=0.3,
        width=0.3,
        note=_QUOTED,
    ),
    _formula(
        "Ackers",
        flow_ackers,
        head=(0.02, np.inf),
        ratio=2.2,
        crest_height=0.15,
        width=0.0,
        note=_QUOTED,
    ),
    _formula(
        "Kindsvater and Carter, full width",
        flow_kindsvater_carter,
        head=(0.03, np.inf),
        ratio=2.0,
        crest_height=0.1,
        width=0.15,
        note=_QUOTED,
    ),
    _formula(
        "Kindsvater and Carter, contracted",
        flow_kindsvater_carter_contracted,
        head=(0.03, np.inf),
        ratio=2.0,
        crest_height=0.1,
        width=0.15,
        note=f"{_QUOTED}; for a width of at most a fifth of the approach",
    ),
)
"""Formulas of equal standing; what they differ by is part of the answer."""
