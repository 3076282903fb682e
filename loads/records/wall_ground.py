"""What must hold of the ground and its layers on both sides of a wall."""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from itertools import pairwise

from loads.quantity import Quantity
from loads.records.sediment import Sediment

_SLACK = 1e-9


def ground_problems(
    sediment: Sequence[Sediment],
    grounds: Mapping[str, Quantity | None],
    *,
    bottom: float,
    top: float,
) -> list[tuple[str, str, str]]:
    """Say what is wrong with the ground against a wall.

    Parameters
    ----------
    sediment
        All layers, those of a side from the top down.
    grounds
        Ground elevation entered for "flood" and "protected".
    bottom, top
        Elevations of the wall's base (or sheet's tip) and top. [m]

    Returns
    -------
    list of tuple
        Path within the record, value, rule.
    """
    problems = []
    for side, ground in grounds.items():
        indexed = [(i, layer) for i, layer in enumerate(sediment) if layer.side == side]
        where = f"{side}_ground"
        if ground is not None and ground.value > top + _SLACK:
            problems.append((where, f'"{ground.text}"', "must not lie above the top of the wall"))
        if ground is not None and indexed and abs(indexed[0][1].top.value - ground.value) > _SLACK:
            first = indexed[0][1].top.text
            rule = f'must be the top of the uppermost layer of its side, "{first}"; or leave it out'
            problems.append((where, f'"{ground.text}"', rule))
        for i, layer in indexed:
            problems += _layer_problems(i, layer, bottom=bottom, top=top, first=i == indexed[0][0])
        for (_, upper), (i, lower) in pairwise(indexed):
            problems += _order_problems(i, upper, lower)
    return problems


def _layer_problems(
    i: int, layer: Sediment, *, bottom: float, top: float, first: bool
) -> list[tuple[str, str, str]]:
    problems = []
    if layer.top.value <= bottom:
        rule = "must lie above the base of the wall"
        problems.append((f"sediment[{i}].top", f'"{layer.top.text}"', rule))
    if layer.top.value > top + _SLACK:
        rule = "must not lie above the top of the wall"
        problems.append((f"sediment[{i}].top", f'"{layer.top.text}"', rule))
    if layer.surcharge is not None and not first:
        rule = "belongs to the uppermost layer of its side only"
        problems.append((f"sediment[{i}].surcharge", f'"{layer.surcharge.text}"', rule))
    return problems


def _order_problems(i: int, upper: Sediment, lower: Sediment) -> list[tuple[str, str, str]]:
    if lower.top.value >= upper.top.value:
        rule = f'must lie below the top of the layer above it on that side, "{upper.top.text}"'
        return [(f"sediment[{i}].top", f'"{lower.top.text}"', rule)]
    if "equivalent fluid" in (upper.pressure, lower.pressure) and upper.pressure != lower.pressure:
        rule = "a side is either all equivalent fluid or none of it: it already contains the water"
        return [(f"sediment[{i}].pressure", f'"{lower.pressure}"', rule)]
    if lower.pressure == "fluid mud" and upper.pressure != "fluid mud":
        rule = "must lie above every soil layer of its side"
        return [(f"sediment[{i}].pressure", '"fluid mud"', rule)]
    return []
