"""Closures worked by hand: count of logs, one log's load, buoyancy and the pull on a log."""

from __future__ import annotations

import numpy as np
import pytest

from loads.closure.buoyancy import buoyancy, displaced_area, flotation
from loads.closure.lifting import lifting_force, seating_force
from loads.closure.logs_needed import Bays, Ceiling, logs_needed
from tests.agreement import Agree, printed
from tests.scenes import FOOT, panel_under


@pytest.mark.source(
    "LogCount",
    "common practice, no source; crest 438.30 ft, 1.0 ft not known, 1.0 ft freeboard, sill 437.40 ft, "
    "logs of 0.50 ft, 14 on hand, rated level 443.40 ft",
)
def test_logs_for_a_forecast_crest(agree: Agree) -> None:
    bays = Bays(sill=np.array([437.40 * FOOT]), log_height=np.array([0.50 * FOOT]), on_hand=np.array([14]))
    found = logs_needed(
        np.array([438.30 * FOOT]),
        bays,
        allowance=1.0 * FOOT,
        freeboard=1.0 * FOOT,
        ceilings=[Ceiling(name="rated level", level=443.40 * FOOT)],
    )
    agree(found.wanted_top / FOOT, printed("440.30"), what="wanted top, ft")
    agree((found.wanted_top[0] / FOOT - 437.40) / 0.50, printed("5.8"), what="logs before rounding up")
    agree(found.count.astype(np.float64), 6, rel=1e-12, what="logs")
    agree(found.top / FOOT, printed("440.40"), what="top, ft")
    assert found.enough.all()
    assert found.stopped_by() == ()


@pytest.mark.source(
    "HeadTable", "common practice, no source; worked by hand: log of 150 mm at the foot of 2.00 m, 9.81 kN/m³"
)
def test_line_load_of_the_bottom_log(agree: Agree) -> None:
    bay = {"width": "3 m", "height": "2 m"}
    loads, _ = panel_under(bay, flood_side="2 m", unit_weight="9.81 kN/m3").diagram.stacked(
        np.array([0.0, 0.15])
    )
    agree(loads / 1e3, printed("2.8326"), abs=1e-4, why="printed with its fifth figure cut", what="kN/m")


PLACE = "common practice, no source; worked by hand with 9.81 kN/m³: logs of 0.10 m by 0.20 m, 3 m long"


@pytest.mark.source("Archimedes", PLACE + ", a closed one of 150 N and one of 4000 mm² of material, 320 N")
def test_stack_of_two_hollow_logs(agree: Agree) -> None:
    gross, material = 0.10 * 0.20, 4000e-6
    areas = np.array([displaced_area("closed", gross, material), displaced_area("fills", gross, material)])
    upward = buoyancy(
        np.array([0.30]),
        np.array([0.0, 0.2]),
        np.array([0.2, 0.2]),
        areas,
        length=np.array([3.0, 3.0]),
        unit_weight=np.array([9810.0]),
    )
    agree(upward[0, 0], printed("588.6"), what="closed log under water, N")
    agree(upward[0, 1], printed("58.86"), what="filled log, half under water, N")
    found = flotation(upward, np.array([150.0, 320.0]), 100.0)
    agree(found.hold_down_demand, printed("177.46"), what="uplift of both, N")
    agree(found.net_uplift, printed("77.46"), what="beyond the hold-down of 100 N, N")
    assert found.rises_from.tolist() == [0]


@pytest.mark.source("SlotFriction", PLACE + "; timber of 6 kN/m³ under 8.5 kN of end reactions, μ 0.4")
def test_pull_and_push_on_a_log(agree: Agree) -> None:
    volume = 0.10 * 0.20 * 3.0
    state = (np.array([[6000.0 * volume]]), np.array([[9810.0 * volume]]), np.array([[8500.0]]), 0.4)
    agree(lifting_force(*state), printed("3171.4"), what="pull to lift, N")
    agree(seating_force(*state), printed("3628.6"), what="push to seat, N")
