"""Readings: what is refused, what is remarked on, what is withheld, and what every link says."""

from __future__ import annotations

import math
from typing import Any

import numpy as np
import pytest
from pydantic import ValidationError

from loads.arrays import FloatArray
from loads.atmosphere import (
    air_density,
    geopotential_height,
    pressure_ratio,
    station_pressure,
    temperature_at,
)
from loads.limits_of_use import OutsideFormulaError
from loads.manometer import Leg, pressure_change
from loads.reading import LevelReading, level_of, typed_level
from loads.reading_chain import MAX_RANGES, follow
from loads.reading_links import Series, assumed
from loads.records.reading import Reading
from loads.scenario_file import parse_document
from loads.water import Fluid

STAFF = {"kind": "staff", "zero_elevation": "98.20 ft", "staff_reading": "4.62 ft"}
VENTED = {"kind": "vented logger", "sensor_elevation": "90 m", "pressure": "12.5 kPa"}
SEALED = {**VENTED, "kind": "sealed logger", "pressure": "115 kPa", "barometer": "1005 hPa"}
BUBBLER = {**VENTED, "kind": "bubbler"}
MANOMETER = {
    "kind": "manometer",
    "sensor_elevation": "90 m",
    "leg": [{"water": True, "rise": "-2 ft"}, {"specific_gravity": 13.6, "rise": "9 in"}],
}


def read(table: dict[str, Any], **more: Any) -> Reading:
    return Reading.model_validate({"id": "R1", **table, **more})


def level(table: dict[str, Any], **more: Any) -> LevelReading:
    return level_of(read(table, **more))


def one(value: float) -> FloatArray:
    return np.array([value])


def rules(table: dict[str, Any], **more: Any) -> str:
    with pytest.raises(ValidationError) as caught:
        read(table, **more)
    return " ".join(f"{problem['msg']} {problem.get('ctx', '')}" for problem in caught.value.errors())


@pytest.mark.parametrize(
    ("table", "more", "words"),
    [
        (STAFF, {"staff_reading": None}, ["staff_reading", "is missing"]),
        (STAFF, {"pressure": "1 kPa"}, ["pressure", "is not used by kind"]),
        (STAFF, {"temperature": "10 degC"}, ["temperature", "is not used by kind"]),
        (STAFF, {"kind": "radar"}, ["staff", "sealed logger"]),
        (VENTED, {"barometer": "1000 hPa"}, ["barometer", "is not used by kind"]),
        (VENTED, {"sensor_elevation": None}, ["sensor_elevation", "is missing"]),
        (VENTED, {"pressure": "12.5"}, ["needs a unit"]),
        (VENTED, {"pressure": "12.5 ft"}, ["ft is a unit of length"]),
        (VENTED, {"temperature": "10 degC"}, ["fluid", "is missing"]),
        (VENTED, {"fluid": "fresh", "salinity": 5.0}, ["salinity", "sea"]),
        (VENTED, {"fluid": "custom"}, ["unit_weight", "is missing"]),
        (VENTED, {"unit_weight": "63 pcf", "temperature": "10 degC"}, ["would not be used"]),
        (VENTED, {"as_of": "2031-04-02T06:00:00"}, ["needs a time zone"]),
        (VENTED, {"as_of": "yesterday"}, ["no date and time"]),
        (SEALED, {"pressure": "-1 kPa"}, ["must be above zero", "absolute"]),
        (SEALED, {"pressure": {"value": "1 kPa", "low": "-1 kPa", "high": "2 kPa"}}, ["must be above zero"]),
        (SEALED, {"barometer": "29.92 psi"}, ["between 20 and 120 kPa"]),
        (SEALED, {"barometer_altitude": "250 m"}, ["site_altitude", "is missing"]),
        (SEALED, {"barometer_altitude": "10001 m", "site_altitude": "0 m"}, ["between -1000 and 10000 m"]),
        (SEALED, {"barometer_shows": "sea-level pressure"}, ["site_altitude", "is missing"]),
        (
            SEALED,
            {"barometer_shows": "sea-level pressure", "site_altitude": "0 m", "barometer_altitude": "1 m"},
            ["barometer_altitude", "is not used with a sea-level pressure"],
        ),
        (SEALED, {"air_temperature": "10 degC"}, ["is not used unless"]),
        (
            SEALED,
            {
                "barometer_altitude": "250 m",
                "site_altitude": "10 m",
                "air_temperature": "10 degC",
                "sea_level_temperature": "10 degC",
            },
            ["leave one of them out"],
        ),
        (BUBBLER, {"gas_density": "1.2 kg/m3"}, ["gas column", "instrument_elevation"]),
        (
            BUBBLER,
            {
                "instrument_elevation": "99 m",
                "gas_density": "1.2 kg/m3",
                "air_density": "1.2 kg/m3",
                "gas_temperature": "5 degC",
            },
            ["when both gas_density and air_density are entered"],
        ),
        (MANOMETER, {"leg": []}, ["leg", "is missing"]),
        (MANOMETER, {"leg": [{"rise": "1 m"}]}, ["exactly one of water = true, density"]),
        (MANOMETER, {"leg": [{"water": True, "density": "1 kg/m3", "rise": "1 m"}]}, ["exactly one of"]),
        (MANOMETER, {"leg": [{"density": "-1 kg/m3", "rise": "1 m"}]}, ["between 0 and 25000 kg/m3"]),
        (MANOMETER, {"leg": [{"specific_gravity": -0.8, "rise": "1 m"}]}, ["greater than or equal to 0"]),
        (MANOMETER, {"leg": [{"water": True}]}, ["either a rise, or a length and an inclination"]),
        (MANOMETER, {"leg": [{"water": True, "length": "1 m"}]}, ["either a rise"]),
        (
            MANOMETER,
            {"leg": [{"water": True, "rise": "1 m", "length": "1 m", "inclination": "9 deg"}]},
            ["either a rise"],
        ),
        (MANOMETER, {"leg": [{"water": True, "rise": "1 m", "inclination": "9 deg"}]}, ["either a rise"]),
        (MANOMETER, {"nonsense": "1 m"}, ["Extra inputs"]),
    ],
)
def test_what_a_record_refuses(table: dict[str, Any], more: dict[str, Any], words: list[str]) -> None:
    said = rules(table, **more)
    for word in words:
        assert word in said


@pytest.mark.parametrize(
    ("formula", "quantity"),
    [
        (lambda: station_pressure(one(101325), one(10000.1)), "height"),
        (lambda: station_pressure(one(101325), one(-5000.1)), "height"),
        (lambda: station_pressure(one(101325), one(math.nan)), "height"),
        (lambda: station_pressure(one(0), one(0)), "sea_level_pressure"),
        (lambda: pressure_ratio(one(0), one(9000), lapse_rate=0.0), "lapse_rate"),
        (lambda: pressure_ratio(one(0), one(9000), gas_constant=-287.0), "gas_constant"),
        (lambda: temperature_at(one(9000), 50.0), "sea_level_temperature"),
        (lambda: geopotential_height(one(-7e6)), "altitude"),
        (lambda: air_density(one(-1), one(288)), "pressure"),
        (lambda: air_density(one(1e5), one(0)), "temperature"),
        (lambda: air_density(one(1e5), one(288), 0.0), "gas_constant"),
        (lambda: pressure_change([]), "legs"),
        (lambda: pressure_change([Leg(name="a", unit_weight=one(-1), rise=one(1))]), "unit_weight"),
        (lambda: pressure_change([Leg(name="a", unit_weight=one(1), rise=one(math.inf))]), "rise"),
    ],
)
def test_what_a_formula_refuses(formula: Any, quantity: str) -> None:
    with pytest.raises(OutsideFormulaError) as caught:
        formula()
    assert caught.value.quantity == quantity


def test_ten_kilometres_is_the_end_of_the_formula() -> None:
    assert station_pressure(one(101325), one(10000)).item() < 27000


def test_a_dry_sensor_has_no_level() -> None:
    found = level(SEALED, pressure="100 kPa", barometer_altitude="0 m", site_altitude="0 m")
    assert found.head.item() < 0
    assert found.dry.item()
    for value in (
        found.level,
        found.worst.low,
        found.worst.high,
        found.quadrature.low,
        found.quadrature.high,
    ):
        assert np.isnan(value).all()
    assert any("The sensor is dry" in text and "not a level" in text for text in found.remarks)
    with pytest.raises(OutsideFormulaError, match="dry"):
        typed_level(found)
    assert level(VENTED, pressure="0 kPa").dry.item()
    assert not level(STAFF, staff_reading="-0.3 ft").dry.item()


def test_a_sensor_that_may_be_dry_has_no_low_end() -> None:
    found = level(VENTED, pressure={"value": "0.5 kPa", "low": "-0.1 kPa", "high": "1 kPa"})
    assert found.may_be_dry.item()
    assert not found.dry.item()
    assert np.isnan(found.worst.low).all()
    assert np.isnan(found.quadrature.low).all()
    assert found.worst.high > found.level
    assert any("may be dry" in text for text in found.remarks)
    assert set(typed_level(found)) == {"value", "source"}


MILE = {"barometer": "1013 hPa", "pressure": "115 kPa"}


def test_sea_level_pressure_as_station_pressure_is_remarked_on() -> None:
    wrong = level(SEALED, site_altitude="1600 m", **MILE)
    assert any("looks like one reduced to sea level" in text for text in wrong.remarks)
    said = level(SEALED, site_altitude="1600 m", barometer_shows="sea-level pressure", **MILE)
    assert not any("sea level" in text for text in said.remarks)
    expected = station_pressure(one(101300), geopotential_height(one(1600)))
    air = {link.name: link for link in said.links}["air_pressure"]
    np.testing.assert_allclose(air.value, expected, rtol=1e-12)
    assert said.level.item() - wrong.level.item() > 1.7
    other_way = level(
        SEALED, site_altitude="1600 m", barometer_shows="sea-level pressure", barometer="834 hPa"
    )
    assert any("may be a station pressure" in text for text in other_way.remarks)
    station = level(SEALED, site_altitude="1600 m", barometer="834 hPa")
    assert not any("sea level" in text for text in station.remarks)
    unknown = level(SEALED)
    assert any("cannot be told" in text for text in unknown.remarks)
    low = level(SEALED, site_altitude="0 m", barometer="880 hPa")
    assert any("lower than on any ordinary day" in text for text in low.remarks)


@pytest.mark.parametrize(
    ("table", "more", "words"),
    [
        (VENTED, {"pressure": "101 kPa"}, "about one atmosphere"),
        (BUBBLER, {"pressure": "101 kPa"}, "about one atmosphere"),
        (SEALED, {"pressure": "15 kPa"}, "less than the air alone"),
        (VENTED, {"pressure": "400 kPa"}, "more than 15 m"),
        (VENTED, {"fluid": "fresh", "temperature": "-1 degC"}, "would be ice"),
        (VENTED, {"fluid": "fresh", "suspended_sediment": "500 kg/m3"}, "may stand as mud"),
        (VENTED, {}, "No low and high"),
        (VENTED, {"fluid": "sea", "salinity": 8.0}, "No low and high"),
    ],
)
def test_remarks(table: dict[str, Any], more: dict[str, Any], words: str) -> None:
    assert any(words in text for text in level(table, **more).remarks)


def test_an_ordinary_reading_with_ranges_has_no_remark() -> None:
    ordinary = level(
        SEALED,
        pressure={"value": "115 kPa", "low": "114.9 kPa", "high": "115.1 kPa"},
        site_altitude="120 m",
        fluid="fresh",
        temperature="12 degC",
    )
    assert ordinary.remarks == ()


def test_water_of_the_scenario_counts_when_the_reading_says_nothing() -> None:
    fluid = Fluid(unit_weight=10500.0, basis="entered, 66.8 pcf")
    found = level_of(read(VENTED), fluid=fluid)
    weight = {link.name: link for link in found.links}["unit_weight"]
    assert (weight.value.item(), weight.basis, weight.source) == (10500.0, "assumed", fluid.basis)
    np.testing.assert_allclose(found.head, 12500 / 10500)
    own = level_of(read(VENTED, unit_weight="9806.65 N/m3"), fluid=fluid)
    np.testing.assert_allclose(own.head, 12500 / 9806.65)


def test_salt_and_mud_make_less_head_of_one_pressure() -> None:
    fresh = level(VENTED, fluid="fresh", temperature="15 degC").head
    brackish = level(VENTED, fluid="sea", temperature="15 degC", salinity=10.0).head
    sea = level(VENTED, fluid="sea", temperature="15 degC").head
    muddy = level(VENTED, fluid="sea", temperature="15 degC", suspended_sediment="50 kg/m3").head
    assert fresh > brackish > sea > muddy
    np.testing.assert_allclose(level(VENTED).head, 12500 / 9802.257744003)
    np.testing.assert_allclose(level(VENTED, fluid="sea").head, 12500 / (64 * 157.0874638462462))


def test_a_leg_by_its_unit_weight_is_as_by_its_density() -> None:
    by_weight = level(MANOMETER, leg=[{"unit_weight": "133.322387415 kN/m3", "rise": "0.1 m"}])
    by_density = level(MANOMETER, leg=[{"density": "13595.1 kg/m3", "rise": "0.1 m"}])
    np.testing.assert_allclose(by_weight.head, by_density.head, rtol=1e-12)
    pushed = level(
        MANOMETER,
        leg=[{"density": "13595.1 kg/m3", "rise": "0.1 m"}],
        end_pressure="1 kPa",
        unit_weight="9800 N/m3",
    )
    np.testing.assert_allclose(pushed.head, (1000 + 13332.2387415) / 9800, rtol=1e-12)


def test_temperatures_of_a_series_set_the_density_of_each_reading() -> None:
    celsius = np.array([4.0, 25.0])
    found = level_of(read(VENTED, fluid="fresh"), Series(temperature=celsius + 273.15))
    for head, temperature in zip(found.head, celsius, strict=True):
        alone = level(VENTED, fluid="fresh", temperature=f"{temperature} degC")
        np.testing.assert_allclose(head, alone.head[0], rtol=1e-12)


def test_a_chain_without_the_link_says_so() -> None:
    outcome = follow([assumed("head", "h", "Head", "length", 1.0, source="trial")], 1)
    assert outcome.link("head").value.item() == 1.0
    with pytest.raises(KeyError):
        outcome.link("level")


def test_less_than_the_air_alone_is_possible_in_high_country() -> None:
    high = level(SEALED, pressure="58 kPa", barometer="550 hPa", site_altitude="4500 m")
    assert not any("air alone" in text for text in high.remarks)


def test_zero_reading_is_taken_off() -> None:
    np.testing.assert_allclose(
        level(VENTED, zero_pressure="0.5 kPa").head, level(VENTED, pressure="12.0 kPa").head
    )


def test_bubbler_with_its_gas_and_the_air_outside() -> None:
    """Walk the column by hand: instrument, gas down to the orifice, water up, air up to the instrument."""
    found = level(
        BUBBLER,
        pressure="30 kPa",
        instrument_elevation="110 m",
        gas_density="1.6 kg/m3",
        air_density="1.2 kg/m3",
        unit_weight="9800 N/m3",
    )
    surface = found.level.item()
    around = 30000 + 1.6 * 9.80665 * 20 - 9800 * (surface - 90) - 1.2 * 9.80665 * (110 - surface)
    assert around == pytest.approx(0, abs=1e-6)
    plain = level(BUBBLER, pressure="30 kPa", unit_weight="9800 N/m3")
    assert surface - plain.level.item() == pytest.approx(0.4 * 9.80665 * 20 / 9800 + 0.0012 * 3.06, abs=1e-4)
    by_gas_law = level(BUBBLER, pressure="30 kPa", instrument_elevation="110 m", gas_temperature="15 degC")
    links = {link.name: link for link in by_gas_law.links}
    np.testing.assert_allclose(links["gas_density"].value, (101325 + 30000) / (287.05287 * 288.15))
    np.testing.assert_allclose(links["air_density"].value, 101325 / (287.05287 * 288.15))
    assert links["barometer"].basis == "assumed"


def test_air_temperature_at_the_barometer_sets_the_one_at_sea_level() -> None:
    apart = {"barometer_altitude": "1000 m", "site_altitude": "900 m", "barometer": "900 hPa"}
    measured = level(SEALED, air_temperature="281.6510217 K", **apart)
    links = {link.name: link for link in measured.links}
    np.testing.assert_allclose(links["sea_level_temperature"].value, 288.15, atol=1e-6)
    np.testing.assert_allclose(measured.head, level(SEALED, **apart).head, atol=1e-8)
    assert links["air_temperature"].basis == "entered"
    warm = level(SEALED, sea_level_temperature="300 K", **apart)
    assert warm.head > measured.head


def test_links_carry_what_was_typed_and_where_it_comes_from() -> None:
    found = level(
        STAFF,
        zero_elevation={
            "value": "98.20 ft",
            "low": "98.18 ft",
            "high": "98.22 ft",
            "source": "levelling book 4",
            "date": "2030-09-12",
        },
        as_of="2031-04-02T06:00:00-05:00",
        name="pier staff",
    )
    zero, staff, top = found.links
    assert (zero.symbol, zero.text, zero.source, str(zero.dated)) == (
        "z₀",
        "98.20 ft",
        "levelling book 4",
        "2030-09-12",
    )
    assert (zero.basis, staff.basis, top.basis) == ("entered", "entered", "computed")
    np.testing.assert_allclose(zero.rises_by, 0.02 * 0.3048)
    assert not staff.rises_by.any()
    np.testing.assert_allclose(top.value, found.level)
    assert found.worst.method != found.quadrature.method
    assert typed_level(found) == {
        "value": "102.82 ft",
        "low": "102.80 ft",
        "high": "102.84 ft",
        "source": "staff: pier staff",
        "date": "2031-04-02",
    }


def test_more_ranges_than_corners_can_be_walked_are_refused() -> None:
    leg = {
        "density": {"value": "900 kg/m3", "low": "890 kg/m3", "high": "910 kg/m3"},
        "rise": {"value": "1 m", "low": "0.99 m", "high": "1.01 m"},
    }
    half = MAX_RANGES // 2
    assert np.isfinite(level(MANOMETER, leg=[leg] * half).level).all()
    with pytest.raises(OutsideFormulaError, match=f"at most {MAX_RANGES}"):
        level(MANOMETER, leg=[leg] * (half + 1))


@pytest.mark.parametrize(
    ("table", "series"),
    [
        (STAFF, Series(barometer=np.ones(2))),
        (MANOMETER, Series(shown=np.ones(2))),
        (VENTED, Series(barometer=np.ones(2))),
        (VENTED, Series(temperature=np.full(2, 280.0))),
        (BUBBLER, Series(shown=np.ones(2), barometer=np.ones(2))),
        (SEALED, Series(shown=np.ones(2), barometer=np.ones(3))),
    ],
)
def test_a_series_without_a_use_is_refused(table: dict[str, Any], series: Series) -> None:
    with pytest.raises(OutsideFormulaError):
        level_of(read(table), series)


def test_series_with_gaps() -> None:
    shown = np.array([115000.0, math.nan, 100000.0])
    barometer = np.array([100500.0, 100500.0, 100500.0])
    found = level_of(read(SEALED), Series(shown=shown, barometer=barometer))
    np.testing.assert_array_equal(found.no_data, [False, True, False])
    np.testing.assert_array_equal(found.dry, [False, False, True])
    np.testing.assert_array_equal(np.isfinite(found.level), [True, False, False])
    assert any("No data in 1 of 3 readings" in text for text in found.remarks)
    nothing = level_of(read(SEALED), Series(shown=np.full(2, math.nan)))
    assert nothing.no_data.all()


EXAMPLE = b"""
[[reading]]
id = "L1"
name = "logger in the stilling well"
kind = "sealed logger"
side = "flood"
as_of = "2031-04-02T06:00:00-05:00"
sensor_elevation = { value = "94.10 ft", low = "94.08 ft", high = "94.12 ft", source = "levelling book 4" }
pressure = { value = "118.0 kPa", low = "117.9 kPa", high = "118.1 kPa", source = "read at the lid" }
barometer = { value = "980.0 mb", low = "979.7 mb", high = "980.3 mb", source = "pump house" }
barometer_shows = "station pressure"
barometer_altitude = { value = "820 ft", low = "800 ft", high = "840 ft" }
site_altitude = "33 ft"
fluid = "fresh"
temperature = { value = "50 degF", low = "46 degF", high = "54 degF" }
suspended_sediment = "2 kg/m3"

[[reading]]
id = "M1"
kind = "manometer"
sensor_elevation = "94.10 ft"
leg = [
  { name = "hose", water = true, rise = "-14 in" },
  { name = "mercury", specific_gravity = 13.6, rise = { value = "6.5 in", low = "6.4 in", high = "6.6 in" } },
]
"""


def test_an_example_as_a_file_would_hold_it() -> None:
    tables = parse_document(EXAMPLE)["reading"]
    logger, manometer = (level_of(Reading.model_validate(table)) for table in tables)
    air = 98000 * ((288.15 - 0.0065 * 33 * 0.3048) / (288.15 - 0.0065 * 820 * 0.3048)) ** 5.2558798
    density = 999.7025 + 2.0 * (1 - 999.7025 / 2650)
    by_hand = 94.10 * 0.3048 + (118000 - air) / (density * 9.80665)
    assert logger.level.item() == pytest.approx(by_hand, abs=5e-5)
    assert logger.remarks == ()
    assert float(typed_level(logger, "m")["value"].split()[0]) == pytest.approx(by_hand, abs=6e-4)
    pressure = (13.6 * 1000 * 9.80665 * 6.5 + 9802.257744003 * -14) * 0.0254
    np.testing.assert_allclose(manometer.head, pressure / 9802.257744003, rtol=1e-12)
