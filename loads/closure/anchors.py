"""Bolts that hold a post's base plate, and the pressure under the plate."""

from __future__ import annotations

from dataclasses import dataclass

import numpy as np

from loads.arrays import FloatArray
from loads.records.closure_parts import Anchor


@dataclass(frozen=True, kw_only=True)
class AnchorForces:
    """Forces of one base plate in n states, each of shape (n,); NaN where the bolts were not entered.

    Attributes
    ----------
    tension
        Of all bolts that are pulled, on whichever side of the plate. [N]
    bolt_tension
        Of the bolt that is pulled most. [N]
    bolt_shear
        Of each bolt that shares the shear. [N]
    contact_pressure
        Under the plate. [Pa]
    """

    tension: FloatArray
    bolt_tension: FloatArray
    bolt_shear: FloatArray
    contact_pressure: FloatArray


def bolt_tensions(moment: FloatArray, distances: FloatArray) -> FloatArray:
    """Tension of each bolt of a stiff plate that turns about its edge [ElementaryBeamTheory].

    Parameters
    ----------
    moment
        On the plate, shape (n,). [N·m]
    distances
        Of the bolts from the edge in compression, shape (b,). [m]

    Returns
    -------
    FloatArray
        T_i = M d_i / Σ d_j², shape (n, b). [N]

    Examples
    --------
    >>> bolt_tensions(np.array([1000.0]), np.array([0.1, 0.1, 0.4])).round(1)
    array([[ 555.6,  555.6, 2222.2]])
    """
    return np.asarray(moment[:, None] * distances / (distances**2).sum())


def anchor_forces(
    anchor: Anchor, *, moment: FloatArray, shear: FloatArray, lift: FloatArray, weight: float
) -> AnchorForces:
    """Forces of the bolts and the plate of one post.

    Parameters
    ----------
    anchor
        The record.
    moment, shear
        At the base, shape (n,). [N·m, N]
    lift
        Vertical part of the brace force, by which it lifts the post, shape (n,). [N]
    weight
        Of the post, zero when not entered. [N]

    Returns
    -------
    AnchorForces
        Magnitudes. A moment toward the flood side pulls the bolts of the other side, taken to be alike.

    Notes
    -----
    T = |M|/a with the lever arm a, or bolt by bolt for a stiff plate. What a brace lifts beyond the weight,
    U = max(lift − weight, 0), is given whole to the bolts that are pulled, which is on the careful side:
    T = |M|/a + U. The plate bears C = |M|/a + max(weight − lift, 0) on its contact area.
    """
    missing = np.full(len(moment), np.nan)
    spare = np.maximum(lift - weight, 0.0)
    tension = bolt = couple = missing
    if anchor.bolt_distances is not None:
        distances = np.array([distance.value for distance in anchor.bolt_distances])
        pulls = bolt_tensions(np.abs(moment), distances)
        couple = pulls.sum(axis=1)
        tension = couple + spare
        bolt = pulls[:, int(distances.argmax())] + spare / len(distances)
    elif anchor.lever_arm is not None and anchor.tension_bolts is not None:
        couple = np.abs(moment) / anchor.lever_arm.value
        tension = couple + spare
        bolt = tension / anchor.tension_bolts
    pressure = missing
    if anchor.plate_width is not None and anchor.contact_length is not None:
        area = anchor.plate_width.value * anchor.contact_length.value
        pressure = (couple + np.maximum(weight - lift, 0.0)) / area
    return AnchorForces(
        tension=tension,
        bolt_tension=bolt,
        bolt_shear=shear / anchor.shear_bolts if anchor.shear_bolts else missing,
        contact_pressure=pressure,
    )
