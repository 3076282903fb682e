"""Weight that each person carries when a log is placed by hand, and published reductions of what one can."""

from __future__ import annotations

from typing import Final

import numpy as np

from loads.arrays import FloatArray
from loads.limits_of_use import refuse_unless

_TEAM_SHARES: Final = {1: 1.0, 2: 2 / 3, 3: 1 / 2}
_TWIST_REDUCTIONS: Final = ((0.5 * np.pi, 0.20), (0.25 * np.pi, 0.10))
_FREQUENCY_REDUCTIONS: Final = ((8.0 / 60, 0.80), (2.0 / 60, 0.50), (0.5 / 60, 0.30))


def weight_per_person(weight: FloatArray, people: int) -> FloatArray:
    """Share of a log's weight, taken as equal for everybody who lifts it.

    Parameters
    ----------
    weight
        Of each log, shape (k,). [N]
    people
        Who lift together.

    Returns
    -------
    FloatArray
        Shape (k,). [N]

    Raises
    ------
    OutsideFormulaError
        Nobody lifts, or a negative weight.

    Examples
    --------
    >>> weight_per_person(np.array([600.0]), 2)
    array([300.])
    """
    refuse_unless(np.asarray(people >= 1), "people", "must be at least 1")
    refuse_unless(weight >= 0, "weight", "must not be negative")
    return np.asarray(weight / people, dtype=np.float64)


def team_limit(limits: FloatArray) -> FloatArray:
    """Weight that people lift together, from what each may lift alone [HSEL23].

    From memory, to be confirmed.

    Parameters
    ----------
    limits
        What each of p people may lift alone, shape (n, p). [N]

    Returns
    -------
    FloatArray
        Shape (n,). [N]

    Raises
    ------
    OutsideFormulaError
        Nobody, more than three people, for whom no share is published, or a negative limit.

    Notes
    -----
    Two people: two thirds of the sum; three: half of it.

    Examples
    --------
    >>> team_limit(np.array([[240.0, 240.0]]))
    array([320.])
    """
    people = limits.shape[1]
    refuse_unless(np.asarray(people in _TEAM_SHARES), "people", "must be 1, 2 or 3")
    refuse_unless(limits >= 0, "limits", "must not be negative")
    return np.asarray(_TEAM_SHARES[people] * limits.sum(axis=1), dtype=np.float64)


def guideline_factor(twist: FloatArray, frequency: FloatArray) -> FloatArray:
    """Share of a guideline weight that is left when people twist and lift often [INDG143].

    Parameters
    ----------
    twist
        Turn of the trunk, shape (n,). [rad]
    frequency
        Lifts in a second, shape (n,). [1/s]

    Returns
    -------
    FloatArray
        Factor on the guideline weight, shape (n,). [–]

    Raises
    ------
    OutsideFormulaError
        A negative twist or frequency.

    Notes
    -----
    Twist beyond 45°: 10 % less, beyond 90°: 20 % less. Up to 30 lifts an hour: nothing less; once or twice a
    minute: 30 %; five to eight times: 50 %; above 12: 80 %. Between the published bands the next one with
    the greater reduction is taken.

    Examples
    --------
    >>> guideline_factor(np.radians([60.0]), np.array([1.0]) / 60)
    array([0.63])
    """
    refuse_unless(twist >= 0, "twist", "must not be negative")
    refuse_unless(frequency >= 0, "frequency", "must not be negative")
    by_twist = np.select([twist > limit for limit, _ in _TWIST_REDUCTIONS], [0.20, 0.10], 0.0)
    steps = [frequency > limit * (1 + 1e-12) for limit, _ in _FREQUENCY_REDUCTIONS]
    by_frequency = np.select(steps, [reduction for _, reduction in _FREQUENCY_REDUCTIONS], 0.0)
    return np.asarray((1 - by_twist) * (1 - by_frequency), dtype=np.float64)
