"""What holds for every atmosphere, chain of fluids and reading."""

from __future__ import annotations

import math
from itertools import product
from typing import Any

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from loads.arrays import FloatArray
from loads.atmosphere import (
    geometric_altitude,
    geopotential_height,
    pressure_ratio,
    sea_level_pressure,
    station_pressure,
)
from loads.manometer import Leg, pressure_change
from loads.reading import LevelReading, level_of, typed_level
from loads.reading_links import Series
from loads.records.reading import Reading

heights = st.floats(-400, 9990)
warmth = st.floats(250, 320)
weights = st.floats(0, 140000)
rises = st.floats(-5, 5)


def one(value: float) -> FloatArray:
    return np.array([value])


def level(**fields: Any) -> LevelReading:
    return level_of(Reading.model_validate({"id": "R", **fields}))


def ranged(value: float, half: float, unit: str) -> dict[str, str]:
    return {
        "value": f"{value!r} {unit}",
        "low": f"{value - half!r} {unit}",
        "high": f"{value + half!r} {unit}",
    }


@given(heights, st.floats(0.1, 500), warmth)
def test_pressure_falls_with_height_and_less_in_warm_air(height: float, up: float, sea: float) -> None:
    assume(height + up <= 10000)
    lower, upper = one(height), one(height + up)
    ratio = pressure_ratio(lower, upper, sea)
    assert ratio < 1
    assert pressure_ratio(lower, upper, sea + 1) > ratio


@given(heights, heights, heights, warmth)
def test_pressure_is_carried_in_one_step_or_two(a: float, b: float, c: float, sea: float) -> None:
    in_two = pressure_ratio(one(a), one(b), sea) * pressure_ratio(one(b), one(c), sea)
    np.testing.assert_allclose(in_two, pressure_ratio(one(a), one(c), sea), rtol=1e-12)


@given(st.floats(5e4, 1.1e5), heights, warmth)
def test_down_to_sea_level_and_up_again(pressure: float, height: float, sea: float) -> None:
    there = sea_level_pressure(one(pressure), one(height), sea)
    np.testing.assert_allclose(station_pressure(there, one(height), sea), pressure, rtol=1e-13)


@given(st.floats(-5000, 10015))
def test_altitude_to_height_and_back(altitude: float) -> None:
    height = geopotential_height(one(altitude))
    assert height <= altitude + 1e-9
    np.testing.assert_allclose(geometric_altitude(height), altitude, rtol=1e-12, atol=1e-9)


def legs(parts: list[tuple[float, float]]) -> list[Leg]:
    return [
        Leg(name=str(number), unit_weight=one(weight), rise=one(rise))
        for number, (weight, rise) in enumerate(parts)
    ]


chains = st.lists(st.tuples(weights, rises), min_size=1, max_size=8)


@given(chains)
def test_going_back_the_same_way_returns_to_the_same_pressure(parts: list[tuple[float, float]]) -> None:
    back = [(weight, -rise) for weight, rise in reversed(parts)]
    found = pressure_change(legs(parts + back))
    assert abs(found.total.item()) <= 1e-9 * np.abs(found.by_leg).sum()
    assert abs(found.rise.item()) < 1e-12


@given(chains, st.randoms())
def test_order_of_legs_does_not_matter(parts: list[tuple[float, float]], random: Any) -> None:
    mixed = parts.copy()
    random.shuffle(mixed)
    total = pressure_change(legs(parts)).total
    scale = np.abs(pressure_change(legs(parts)).by_leg).sum()
    np.testing.assert_allclose(pressure_change(legs(mixed)).total, total, rtol=0, atol=1e-12 * scale + 1e-300)


@given(chains)
def test_a_chain_in_one_fluid_depends_on_its_ends_alone(parts: list[tuple[float, float]]) -> None:
    found = pressure_change(legs([(9810.0, rise) for _, rise in parts]))
    np.testing.assert_allclose(found.total, -9810.0 * found.rise, atol=1e-8)


@given(weights, st.floats(0.01, 5))
def test_down_adds_and_up_takes_off(weight: float, height: float) -> None:
    assert pressure_change(legs([(weight, -height)])).total.item() == weight * height
    assert pressure_change(legs([(weight, height)])).total.item() == -weight * height


@given(st.floats(0.01, 10), st.floats(0, 200), st.floats(-2, 40), st.floats(80, 105))
def test_every_instrument_at_one_place_gives_the_staffs_level(
    depth: float, zero: float, celsius: float, air: float
) -> None:
    water = {"fluid": "fresh", "temperature": f"{celsius!r} degC", "sensor_elevation": f"{zero!r} m"}
    links = {
        link.name: link.value.item() for link in level(kind="vented logger", pressure="1 kPa", **water).links
    }
    pressure = links["unit_weight"] * depth
    staff = level(kind="staff", zero_elevation=f"{zero!r} m", staff_reading=f"{depth!r} m")
    others = [
        level(kind="vented logger", pressure=f"{pressure!r} Pa", **water),
        level(kind="bubbler", pressure=f"{pressure!r} Pa", **water),
        level(
            kind="bubbler",
            pressure=f"{pressure!r} Pa",
            instrument_elevation=f"{zero + 20!r} m",
            gas_density="0 kg/m3",
            air_density="0 kg/m3",
            **water,
        ),
        level(
            kind="sealed logger",
            pressure=f"{pressure + air * 1000!r} Pa",
            barometer=f"{air!r} kPa",
            **water,
        ),
        level(
            kind="sealed logger",
            pressure=f"{pressure + air * 1000!r} Pa",
            barometer=f"{air!r} kPa",
            barometer_altitude="321 m",
            site_altitude="321 m",
            **water,
        ),
        level(kind="manometer", leg=[{"water": True, "rise": f"{depth!r} m"}], **water),
        level(
            kind="manometer",
            leg=[
                {"water": True, "rise": "-1 m"},
                {
                    "density": "13595.1 kg/m3",
                    "rise": f"{(pressure + links['unit_weight']) / 13595.1 / 9.80665!r} m",
                },
            ],
            **water,
        ),
    ]
    for other in others:
        np.testing.assert_allclose(other.level, staff.level, rtol=0, atol=1e-9)


@given(st.floats(50, 300), st.floats(0.001, 20), st.floats(20, 90), st.floats(1, 500))
def test_more_pressure_is_more_water_and_more_air_is_less(
    shown: float, more: float, air: float, altitude: float
) -> None:
    common = {"kind": "sealed logger", "sensor_elevation": "0 m", "site_altitude": "0 m"}

    def head(pressure: float, barometer: float, above: float) -> float:
        found = level(
            pressure=f"{pressure!r} kPa",
            barometer=f"{barometer!r} kPa",
            barometer_altitude=f"{above!r} m",
            **common,
        )
        return float(found.head.item())

    base = head(shown, air, altitude)
    assert head(shown + more, air, altitude) > base
    assert head(shown, air + more, altitude) < base
    assert head(shown, air, altitude + 1) < base


@given(st.floats(1, 40), st.floats(0.01, 0.5), st.floats(0, 0.05), st.floats(0.1, 9))
def test_ranges_are_the_corners_and_hold_each_other(
    pressure: float, slack: float, half: float, degrees: float
) -> None:
    found = level(
        kind="vented logger",
        sensor_elevation=ranged(100.0, half, "m"),
        pressure=ranged(pressure, slack, "kPa"),
        fluid="fresh",
        temperature=ranged(20.0, degrees, "degC"),
    )
    corners = [
        level(
            kind="vented logger",
            sensor_elevation=f"{100 + a * half!r} m",
            pressure=f"{pressure + b * slack!r} kPa",
            fluid="fresh",
            temperature=f"{20 + c * degrees!r} degC",
        ).level.item()
        for a, b, c in product((-1, 1), repeat=3)
    ]
    np.testing.assert_allclose(found.worst.low, min(corners), rtol=0, atol=1e-9)
    np.testing.assert_allclose(found.worst.high, max(corners), rtol=0, atol=1e-9)
    assert found.worst.low <= found.quadrature.low + 1e-12
    assert found.quadrature.low <= found.level <= found.quadrature.high
    assert found.quadrature.high <= found.worst.high + 1e-12
    falls = np.sqrt(sum(link.falls_by.item() ** 2 for link in found.links))
    np.testing.assert_allclose(found.level - found.quadrature.low, falls, rtol=0, atol=1e-9)
    lone = level(
        kind="vented logger", sensor_elevation=ranged(100.0, half, "m"), pressure=f"{pressure!r} kPa"
    )
    np.testing.assert_allclose(lone.worst.low, lone.quadrature.low, atol=1e-12)


@given(
    st.lists(st.one_of(st.floats(-5, 60, allow_subnormal=False), st.just(math.nan)), min_size=1, max_size=6)
)
def test_many_readings_are_as_each_alone(kilopascals: list[float]) -> None:
    record = {
        "id": "R",
        "kind": "vented logger",
        "sensor_elevation": "12 m",
        "pressure": ranged(10.0, 0.25, "kPa"),
    }
    many = level_of(Reading.model_validate(record), Series(shown=1000 * np.array(kilopascals)))
    assert len(many.level) == len(kilopascals)
    for index, value in enumerate(kilopascals):
        if math.isnan(value):
            assert many.no_data[index]
            assert np.isnan(many.level[index])
            assert not many.dry[index]
            continue
        alone = level_of(Reading.model_validate({**record, "pressure": ranged(value, 0.25, "kPa")}))
        for name in ("head", "level", "dry", "may_be_dry"):
            np.testing.assert_allclose(getattr(many, name)[index], getattr(alone, name)[0], atol=1e-9)
        for one_way, other in ((many.worst, alone.worst), (many.quadrature, alone.quadrature)):
            np.testing.assert_allclose(one_way.low[index], other.low[0], atol=1e-9)
            np.testing.assert_allclose(one_way.high[index], other.high[0], atol=1e-9)
        assert many.dry[index] == (value <= 0)


@given(st.floats(0.5, 40), st.floats(0, 0.4), st.sampled_from(["ft", "m"]))
def test_a_typed_level_is_the_level_and_its_range_holds_it(shown: float, half: float, unit: str) -> None:
    found = level(
        kind="staff",
        zero_elevation="100 ft",
        staff_reading=ranged(shown, half, "ft"),
    )
    typed = typed_level(found, unit)
    factor, step = {"ft": (0.3048, 0.01), "m": (1.0, 0.001)}[unit]
    value = float(typed["value"].split()[0])
    assert value == pytest.approx(found.level.item() / factor, abs=0.5001 * step)
    if "low" in typed:
        low, high = (float(typed[end].split()[0]) for end in ("low", "high"))
        assert low <= value <= high
        assert low * factor <= found.worst.low.item() + 1e-9
        assert high * factor >= found.worst.high.item() - 1e-9
