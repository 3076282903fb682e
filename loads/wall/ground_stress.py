"""Vertical effective stress of level ground."""

from __future__ import annotations

from collections.abc import Sequence

import numpy as np

from loads.arrays import FloatArray
from loads.records.sediment import Sediment
from loads.sediment import unit_weights


def effective_stress(
    layers: Sequence[Sediment],
    *,
    level: FloatArray,
    water_unit_weight: float,
    z: FloatArray,
    with_surcharge: bool,
) -> FloatArray:
    """Vertical effective stress of the layers above an elevation.

    Parameters
    ----------
    layers
        Layers of one side from the top down.
    level
        Water level of that side, shape (n,). [m]
    water_unit_weight
        Weight per volume of that side's water. [N/m³]
    z
        Elevation, shape (n,) or (1,). [m]
    with_surcharge
        Whether the load on the ground counts.

    Returns
    -------
    FloatArray
        Shape (n,). [Pa]
    """
    load = layers[0].surcharge if layers and with_surcharge else None
    stress = np.full(len(level), load.value if load else 0.0)
    for number, layer in enumerate(layers, 1):
        top = np.maximum(layer.top.value, z)
        foot = np.maximum(layers[number].top.value, z) if number < len(layers) else z
        table = np.clip(level, foot, top)
        if layer.is_fluid:
            assert layer.fluid_unit_weight is not None
            moist = layer.fluid_unit_weight.value
            submerged = moist - water_unit_weight
        else:
            moist, submerged = unit_weights(layer, water_unit_weight)
        stress = stress + moist * (top - table) + submerged * (table - foot)
    return np.asarray(stress)
