"""What whoever reads a head must know of the readings behind it, one sentence each."""

from __future__ import annotations

import numpy as np

from loads.arrays import FloatArray
from loads.gauge_conversion import Conversion
from loads.quantity import Quantity


def chain_remarks(way: Conversion, stage: FloatArray) -> tuple[str, ...]:
    """Sentences about readings beyond what a gauge and its transfer are good for.

    Parameters
    ----------
    way
        From the gauge to the barrier.
    stage
        Readings, shape (n,). [m]

    Returns
    -------
    tuple of str
        Empty when every reading is within them.
    """
    gauge, transfer = way.gauge, way.transfer
    bounds = [
        (gauge.highest_true_reading, True, f"gauge {gauge.id} is trusted"),
        (gauge.lowest_true_reading, False, f"gauge {gauge.id} is trusted"),
    ]
    if transfer is not None:
        bounds += [
            (transfer.highest_stage, True, f"the transfer to {way.barrier} holds"),
            (transfer.lowest_stage, False, f"the transfer to {way.barrier} holds"),
        ]
    remarks = [
        f"{words} {'up' if upward else 'down'} to a reading of {bound.text}, and here is one beyond it"
        for bound, upward, words in bounds
        if bound is not None and _beyond(stage, bound, upward=upward)
    ]
    if transfer is not None and transfer.table is not None and _off_the_table(way, stage):
        first, last = transfer.table[0][0].text, transfer.table[-1][0].text
        remarks.append(
            f"the table of the transfer to {way.barrier} goes from a reading of {first} to one of {last}; "
            "beyond it there is no level and no head"
        )
    return tuple(remarks)


def _beyond(stage: FloatArray, bound: Quantity, *, upward: bool) -> bool:
    past = stage > bound.value if upward else stage < bound.value
    return bool(past.any())


def _off_the_table(way: Conversion, stage: FloatArray) -> bool:
    return bool(np.isnan(way.offset(stage[np.isfinite(stage)])).any())
