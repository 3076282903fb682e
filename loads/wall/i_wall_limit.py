"""Level at which a limit of an I-wall is reached first."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.first_limit import FirstLimit, crossing_levels
from loads.records.i_wall import IWall
from loads.states import DRY, Levels, rising
from loads.wall.i_wall_result import assess_i_wall
from loads.water import Fluid

SEARCH_ABOVE_TOP = 3.0
"""How far above the top a first-limit level is looked for. [m]"""


class _WithheldError(Exception):
    pass


def first_limit_of(
    record: IWall, levels: Levels, fluids: dict[str, Fluid], near_limit: float
) -> FirstLimit | None:
    """Lowest flood-side level at which a limit is reached, the protected side as in the first state.

    Parameters
    ----------
    record
        Validated record.
    levels, fluids, near_limit
        As of `loads.wall.i_wall_result.assess_i_wall`.

    Returns
    -------
    FirstLimit or None
        None without a limit, and where the two computations disagree on the way up.
    """
    protected = float(levels.protected_side[0])
    behind = protected if np.isfinite(protected) else DRY
    low = min(record.ground("flood"), record.ground("protected"))
    ceiling = max(record.top.value, float(levels.flood_side.max())) + SEARCH_ABOVE_TOP
    names = [
        (check.subject, check.name)
        for check in assess_i_wall(record, levels, fluids, near_limit).checks
        if check.limit is not None and check.rises_with_water
    ]
    if not names:
        return None

    def ratios(flood_side: FloatArray) -> FloatArray:
        found = assess_i_wall(record, rising(flood_side, behind), fluids, near_limit)
        if found.withheld:
            raise _WithheldError
        by_name = {check.name: check.ratio for check in found.checks}
        return np.nan_to_num(np.column_stack([by_name[name] for _, name in names]), nan=np.inf, posinf=np.inf)

    try:
        level, reached, at_low = crossing_levels(ratios, low=low, high=ceiling)
    except _WithheldError:
        return None
    if not reached.any():
        return FirstLimit(level=None, subject="", check="", without_water=False, ceiling=ceiling)
    first = int(np.nanargmin(level))
    return FirstLimit(
        level=float(level[first]),
        subject=names[first][0],
        check=names[first][1],
        without_water=bool(at_low[first]),
        ceiling=ceiling,
    )
