"""The whole chain on one line, forward and back, with what is missing plainly marked."""

from __future__ import annotations

import numpy as np
import pytest

from loads.chain import GaugeChain, GaugeReading, chain_of
from loads.gauge_conversion import Conversion, conversion
from loads.quantity import Quantity
from tests.clock_cases import DATUM, FOOT, gauge, gauge_of, quantity, way
from tests.test_gauge_record import TOML

SILL = quantity("437.40 ft")


def feet(*stages: float) -> GaugeReading:
    """Readings with their pedigree."""
    return GaugeReading.of(np.array(stages) * FOOT, source="gauge page")


def chain(own: Conversion, *stages: float, sill: Quantity = SILL) -> GaugeChain:
    return chain_of(own, feet(*stages), sill, DATUM)


def test_the_line_adds_up_and_names_its_sources() -> None:
    found = chain(conversion(gauge_of(TOML), "C-07", DATUM), 26.20, 24.00)
    terms = found.terms
    assert [term.sign for term in terms] == ["", "+", "+", "+", "−", "="]
    assert [term.link.name for term in terms] == ["reading", "zero", "shift", "transfer", "sill", "head"]
    values = [term.link.value / FOOT for term in terms]
    signed = values[0] + values[1] + values[2] + values[3] - values[4]
    np.testing.assert_allclose(values[-1], signed, atol=1e-9)
    expected = [stage + 412.70 + 0.34 - 0.60 - 437.40 for stage in (26.20, 24.00)]
    np.testing.assert_allclose(found.head / FOOT, expected, atol=1e-9)
    zero = terms[1].link
    assert (zero.source, str(zero.dated), zero.text) == ("levelling", "2029-10-11", "412.70 ft")
    assert [term.mark for term in terms] == ["no date", "", "", "", "no source and no date", ""]


def test_one_datum_needs_no_shift_and_says_so() -> None:
    shift = chain(way(), 26.2).terms[2]
    assert (float(shift.link.value[0]), shift.link.source, shift.mark) == (
        0.0,
        "gauge and barrier are both in NAVD88",
        "",
    )


@pytest.mark.parametrize(
    ("changes", "link", "sentence"),
    [
        ({"zero": None}, "zero", "nobody entered the zero of gauge G1"),
        (
            {"transfer": []},
            "transfer",
            "nobody entered how the water at C-07 differs from that at gauge G1; it is",
        ),
    ],
)
def test_a_missing_link_is_marked_and_gives_no_head(
    changes: dict[str, object], link: str, sentence: str
) -> None:
    own = way(**changes)
    found = chain(own, 26.2, 20.1)
    assert np.isnan(found.head).all()
    assert found.missing[0].startswith(sentence)
    assert {term.link.name: term.mark for term in found.terms}[link] == "missing: nobody entered it"
    assert np.isnan(own.stage(np.array([437.4 * FOOT]))).all()
    assert np.isnan(own.level(np.array([26.2 * FOOT]))).all()


def test_no_reading_gives_no_head_for_that_state_only() -> None:
    found = chain(way(), 26.2, float("nan"), 27.2)
    np.testing.assert_array_equal(np.isnan(found.head), [False, True, False])
    alone = chain(way(), float("nan"))
    assert alone.terms[0].mark == "no data"


def test_the_range_is_that_of_its_links() -> None:
    stage = np.array([26.2]) * FOOT
    reading = GaugeReading(stage=stage, low=stage - 0.1 * FOOT, high=stage + 0.1 * FOOT, source="page")
    found = chain_of(conversion(gauge_of(TOML), "C-07", DATUM), reading, SILL, DATUM)
    head = 26.2 + 412.70 + 0.34 - 0.60 - 437.40
    assert found.outcome.worst.low[0] / FOOT == pytest.approx(head - 0.1 - 0.14, abs=1e-9)
    assert found.outcome.worst.high[0] / FOOT == pytest.approx(head + 0.1 + 0.16, abs=1e-9)
    assert found.outcome.quadrature.high[0] / FOOT == pytest.approx(head + np.hypot(0.1, 0.16), abs=1e-9)


def test_an_uncertain_slope_widens_the_head_both_ways() -> None:
    found = chain(conversion(gauge_of(TOML), "C-09", DATUM), 26.2)
    assert [term.link.name for term in found.terms][3:5] == ["transfer", "transfer error"]
    zero_and_slope = 26.2 + 412.70 + 0.34 - 0.64 - 437.40
    shift_low, shift_high = 0.14, 0.16
    assert found.outcome.worst.low[0] / FOOT == pytest.approx(zero_and_slope - shift_low - 0.2, abs=1e-9)
    assert found.outcome.worst.high[0] / FOOT == pytest.approx(zero_and_slope + shift_high + 0.2, abs=1e-9)


def test_a_table_is_followed_within_its_ends_and_not_beyond() -> None:
    own = conversion(gauge_of(TOML), "C-10", DATUM)
    found = chain(own, 20.0, 23.0, 32.0, 19.9, 32.1)
    offsets = found.outcome.link("transfer").value / FOOT
    np.testing.assert_allclose(offsets[:3], [-0.4, -0.55, -1.0], atol=1e-9)
    assert np.isnan(offsets[3:]).all()
    assert np.isnan(found.head[3:]).all()
    trusted, table = found.remarks
    assert trusted == "gauge G1 is trusted up to a reading of 31.0 ft, and here is one beyond it"
    assert table == (
        "the table of the transfer to C-10 goes from a reading of 20 ft to one of 32 ft; beyond it there is "
        "no level and no head"
    )


def test_readings_beyond_a_valid_range_are_remarked_on() -> None:
    own = way()
    assert chain(own, 20.0, 31.0).remarks == ()
    assert chain(own, 19.0).remarks == (
        "the transfer to C-07 holds down to a reading of 20 ft, and here is one beyond it",
    )
    assert len(chain(own, 33.0).remarks) == 2


@pytest.mark.parametrize("barrier", ["C-07", "C-09", "C-10"])
def test_back_to_a_reading(barrier: str) -> None:
    own = conversion(gauge_of(TOML), barrier, DATUM)
    stages = np.linspace(20.0, 32.0, 97) * FOOT
    np.testing.assert_allclose(own.stage(own.level(stages)), stages, atol=1e-9)


def test_a_level_off_the_table_is_no_reading() -> None:
    own = conversion(gauge_of(TOML), "C-10", DATUM)
    low, high = own.level(np.array([20.0, 32.0]) * FOOT)
    assert np.isnan(own.stage(np.array([low - 0.01, high + 0.01]))).all()
    assert gauge().transfer_to("C-10") is None
