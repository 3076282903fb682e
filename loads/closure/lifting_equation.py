"""The revised NIOSH lifting equation, in its metric and in its US form.

The two forms are published side by side and are not one another's conversion: they differ by up to some 4 %.
The multipliers are computed, not read from the published tables of two figures: those give 16.3 lb for the
worked example of which the equation gives 16.03 lb.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Final, Literal, TypeAlias

import numpy as np

from loads.arrays import FloatArray
from loads.density import STANDARD_GRAVITY
from loads.limits_of_use import refuse_unless

System: TypeAlias = Literal["metric", "US"]
Coupling: TypeAlias = Literal["good", "fair", "poor"]

APPLIES_TO: Final = (
    "a lift with both hands by one person who stands on sound dry footing, not too hot or too cold; "
    "wet ground, wind, ice, gloves and unequal shares of a log make it less"
)
"""What the equation is published for, and what it knows nothing of."""


@dataclass(frozen=True, kw_only=True)
class _Form:
    """Constants of one form; lengths in its own unit."""

    load_constant: float
    unit: float
    reach: float
    farthest: float
    knuckle: float
    per_height: float
    highest: float
    travel: float
    shortest: float
    longest: float


_FORMS: Final = {
    "metric": _Form(
        load_constant=23.0 * STANDARD_GRAVITY,
        unit=0.01,
        reach=25.0,
        farthest=63.0,
        knuckle=75.0,
        per_height=0.003,
        highest=175.0,
        travel=4.5,
        shortest=25.0,
        longest=175.0,
    ),
    "US": _Form(
        load_constant=51.0 * 0.45359237 * STANDARD_GRAVITY,
        unit=0.0254,
        reach=10.0,
        farthest=25.0,
        knuckle=30.0,
        per_height=0.0075,
        highest=70.0,
        travel=1.8,
        shortest=10.0,
        longest=70.0,
    ),
}


@dataclass(frozen=True, kw_only=True)
class Lift:
    """How a load is lifted, in n ways.

    Attributes
    ----------
    horizontal
        Hands ahead of the middle of the ankles, shape (n,). [m]
    vertical
        Hands over the floor, shape (n,). [m]
    travel
        Height through which the load is moved, shape (n,). [m]
    asymmetry
        Turn of the load out of the plane straight ahead, shape (n,). [rad]
    frequency_multiplier
        For how often and how long it is done, entered, shape (n,). [–]
    coupling
        How well the hands hold.
    """

    horizontal: FloatArray
    vertical: FloatArray
    travel: FloatArray
    asymmetry: FloatArray
    frequency_multiplier: FloatArray
    coupling: Coupling


@dataclass(frozen=True, kw_only=True)
class Multipliers:
    """The six multipliers of the load constant, each between 0 and 1.

    Attributes
    ----------
    horizontal, vertical, distance, asymmetry, frequency, coupling
        HM, VM, DM, AM, FM and CM, shape (n,). [–]
    """

    horizontal: FloatArray
    vertical: FloatArray
    distance: FloatArray
    asymmetry: FloatArray
    frequency: FloatArray
    coupling: FloatArray

    def product(self) -> FloatArray:
        """Product of the six, shape (n,)."""
        return np.asarray(
            self.horizontal * self.vertical * self.distance * self.asymmetry * self.frequency * self.coupling,
            dtype=np.float64,
        )


def multipliers(lift: Lift, system: System) -> Multipliers:
    """Multipliers of the revised lifting equation [NIOSH94110].

    Parameters
    ----------
    lift
        The lift.
    system
        Form of the equation, "metric" or "US".

    Returns
    -------
    Multipliers
        Not rounded, bounded to 1 from above; zero where the equation allows no lift.

    Raises
    ------
    OutsideFormulaError
        A length or an angle below zero, or a frequency multiplier outside 0 to 1.

    Notes
    -----
    With H, V, D in cm, in inches in brackets, A in degrees: HM = 25/H [10/H]; VM = 1 − 0.003 |V − 75|
    [1 − 0.0075 |V − 30|]; DM = 0.82 + 4.5/D [0.82 + 1.8/D]; AM = 1 − 0.0032 A. CM is 1.00 for a good hold,
    0.95 for a fair one below and 1.00 from the reference height, 0.90 for a poor one. Zero beyond H 63 [25],
    V and D 175 [70], A 135°. AM, CM and the ends are from memory, to be confirmed.

    Examples
    --------
    >>> one = np.array([1.0])
    >>> lift = Lift(horizontal=0.5 * one, vertical=0.75 * one, travel=0.25 * one, asymmetry=0 * one,
    ...             frequency_multiplier=one, coupling="good")
    >>> multipliers(lift, "metric").horizontal
    array([0.5])
    """
    form = _FORMS[system]
    lengths = (lift.horizontal, lift.vertical, lift.travel)
    # rounded far below any reading, so that 30 in counts as the published 30
    H, V, D = (np.round(length / form.unit, 9) for length in lengths)
    A, FM = np.round(np.degrees(lift.asymmetry), 9), lift.frequency_multiplier
    for quantity, value in (("horizontal", H), ("vertical", V), ("travel", D), ("asymmetry", A)):
        refuse_unless(value >= 0, quantity, "must not be negative")
    refuse_unless((FM >= 0) & (FM <= 1), "frequency_multiplier", "must be between 0 and 1")
    fair = np.where(form.knuckle <= V, 1.0, 0.95)
    CM = {"good": np.ones_like(V), "fair": fair, "poor": np.full_like(V, 0.90)}[lift.coupling]
    return Multipliers(
        horizontal=np.where(form.farthest >= H, form.reach / np.maximum(H, form.reach), 0.0),
        vertical=np.where(form.highest >= V, 1 - form.per_height * np.abs(V - form.knuckle), 0.0),
        distance=np.where(
            form.longest >= D, np.minimum(0.82 + form.travel / np.maximum(D, form.shortest), 1.0), 0.0
        ),
        asymmetry=np.where(A <= 135, 1 - 0.0032 * A, 0.0),
        frequency=FM,
        coupling=CM,
    )


def recommended_weight(lift: Lift, system: System) -> FloatArray:
    """Recommended weight limit of a lift, RWL [NIOSH94110].

    Parameters
    ----------
    lift
        The lift, at its origin or at its destination; the smaller limit of the two governs.
    system
        Form of the equation, "metric" or "US".

    Returns
    -------
    FloatArray
        RWL as a weight, shape (n,). [N]

    Raises
    ------
    OutsideFormulaError
        As `multipliers`.

    Notes
    -----
    RWL = LC · HM · VM · DM · AM · FM · CM with the load constant LC 23 kg in the metric form, 51 lb in the US
    form; `APPLIES_TO`.

    Examples
    --------
    >>> one = np.array([1.0])
    >>> lift = Lift(horizontal=0.25 * one, vertical=0.75 * one, travel=0.25 * one, asymmetry=0 * one,
    ...             frequency_multiplier=one, coupling="good")
    >>> recommended_weight(lift, "metric").round(2)
    array([225.55])
    """
    return np.asarray(_FORMS[system].load_constant * multipliers(lift, system).product(), dtype=np.float64)


def lifting_index(weight: FloatArray, recommended: FloatArray) -> FloatArray:
    """Weight lifted by one person over the recommended limit, LI [NIOSH94110].

    Parameters
    ----------
    weight
        What one person lifts, shape (n,). [N]
    recommended
        RWL, shape (n,). [N]

    Returns
    -------
    FloatArray
        LI, infinite where no lift is recommended, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A weight that is not above zero, or a negative limit.

    Examples
    --------
    >>> lifting_index(np.array([300.0]), np.array([150.0]))
    array([2.])
    """
    refuse_unless(weight > 0, "weight", "must be above zero")
    refuse_unless(recommended >= 0, "recommended", "must not be negative")
    return np.divide(weight, recommended, out=np.full_like(weight, np.inf), where=recommended > 0)
