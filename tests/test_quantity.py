"""What a person may type for a value, and what is refused because it could mean two things."""

from __future__ import annotations

import re

import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from loads.quantity import UnreadableQuantityError, read_quantity
from loads.units import EXAMPLES, from_si, units_of

FOOT = 0.3048
ONE_OF = "write it with one of ft, in, m, cm, mm"
ONE_NUMBER = 'it must be one number and one unit, for example "9 in"'


@pytest.mark.parametrize(
    ("text", "kind", "value", "unit"),
    [
        ("12.5 ft", "length", 12.5 * FOOT, "ft"),
        ("12.5ft", "length", 12.5 * FOOT, "ft"),
        (" 12.5 ft ", "length", 12.5 * FOOT, "ft"),
        ("+12.5 ft", "length", 12.5 * FOOT, "ft"),
        ("-6 in", "length", -0.1524, "in"),
        ("−6 in", "length", -0.1524, "in"),
        (".5 m", "length", 0.5, "m"),
        ("5. m", "length", 5.0, "m"),
        ("1.5e3 mm", "length", 1.5, "mm"),
        ("6 ft 6 in", "length", 6.5 * FOOT, "ft"),
        ("6'-6\"", "length", 6.5 * FOOT, "ft"),
        ("6' 6\"", "length", 6.5 * FOOT, "ft"),
        ("6′ 6″", "length", 6.5 * FOOT, "ft"),
        ("6 ft - 6 in", "length", 6.5 * FOOT, "ft"),
        ("-6 ft 6 in", "length", -6.5 * FOOT, "ft"),
        ("6 ft 6 1/2 in", "length", (6 + 6.5 / 12) * FOOT, "ft"),
        ("6 ft 1/2 in", "length", (6 + 0.5 / 12) * FOOT, "ft"),
        ("6 ft 6.25 in", "length", (6 + 6.25 / 12) * FOOT, "ft"),
        ("1 1/2 in", "length", 0.0381, "in"),
        ("3/4 in", "length", 0.01905, "in"),
        ("-3/4 in", "length", -0.01905, "in"),
        ("6'", "length", 6 * FOOT, "ft"),
        ('9"', "length", 0.2286, "in"),
        ("110 lb/ft³", "unit weight", 110 * 157.0874638462462, "lb/ft3"),
        ("9.81 kN / m3", "unit weight", 9810.0, "kN/m3"),
        ("30 kip * ft", "moment", 30 * 1355.8179483314004, "kip·ft"),
        ("30 kip·ft", "moment", 30 * 1355.8179483314004, "kip·ft"),
        ("0 degC", "temperature", 273.15, "degC"),
        ("50 °F", "temperature", 283.15, "°F"),
        ("62 °", "angle", 1.0821041362364843, "°"),
    ],
)
def test_read(text: str, kind: str, value: float, unit: str) -> None:
    found, symbol = read_quantity(text, kind)
    assert found == pytest.approx(value, rel=1e-14, abs=1e-13)
    assert symbol == unit


@pytest.mark.parametrize(
    "text",
    [
        "1,5 m",
        "1,268 ft",
        "1 268 ft",
        "1'268 ft",
        "1_268 ft",
        "6 ft 13 in",
        "6 ft 12 in",
        "6 ft -6 in",
        "6.5 ft 6 in",
        "6 ft 6",
        "6'6",
        "6 ft 6 ft",
        "6 in 6 ft",
        "6 ft 3/0 in",
        "6 ft 6 3/2 in",
        "3/0 in",
        "1/2 ft",
        "1e400 ft",
        "-1e400 m",
        "1e4000 m",
        "٣ ft",
        "³ ft",
        "2³ ft",
        "2² m",
        "½ in",
        "",
        " ",
        "ft",
        "9",
        "9.",
        "- 9 ft",
        "--9 ft",
        "+-9 ft",
        "9 9 ft",
        "9..5 ft",
        "9.5.1 ft",
        "0x10 ft",
        "nan ft",
        "NaN ft",
        "inf ft",
        "infinity ft",
        "-inf m",
        "9 FT",
        "9 Ft",
        "9 feet of water",
        "9 ft²",
        "9 m3",
        "9 ft in",
        "9 psf",
        "9 ft\n",
        "9\nft\tx",
        "9 ft # about",
        "9 ft<b>",
        "9 ft" + " " * 80,
        "9" * 61 + " ft",
        "about 9 ft",
        "9-10 ft",
        "9 ± 1 ft",
    ],
)
def test_refused(text: str) -> None:
    with pytest.raises(UnreadableQuantityError):
        read_quantity(text, "length")


@pytest.mark.parametrize(
    ("text", "kind", "example", "message"),
    [
        ("9", "length", "", 'it needs a unit, for example "9 in"'),
        ("104.6", "length", "98 ft", 'it needs a unit, for example "104.6 ft"'),
        (
            "400 psf",
            "length",
            "",
            f'psf is a unit of pressure, and this is a length; {ONE_OF}, for example "400 in"',
        ),
        (
            "9 furlong",
            "length",
            "",
            f'the unit "furlong" is not known here; {ONE_OF}, for example "9 in"',
        ),
        ("1,5 m", "length", "", ONE_NUMBER.replace("number and", "number with a decimal point and")),
        (
            "6 ft 13 in",
            "length",
            "",
            f"{ONE_NUMBER}; feet and inches as 6 ft 6 in, the inches below 12",
        ),
        ("1e400 ft", "length", "", 'it is too large a number; write for example "9 in"'),
        ("9 " + "x" * 80, "length", "", ONE_NUMBER),
    ],
)
def test_message(text: str, kind: str, example: str, message: str) -> None:
    with pytest.raises(UnreadableQuantityError) as refusal:
        read_quantity(text, kind, example)
    assert str(refusal.value) == message


def plainly_meant(text: str, kind: str) -> float | None:
    """The number of a text that is nothing but a plain decimal number and one unit of the kind."""
    match = re.fullmatch(r"\s*([+−-]?[0-9]*\.?[0-9]*(?:[eE][+-]?[0-9]{1,3})?)\s*([^0-9\s].*?)\s*", text)
    symbols = {re.sub(r"[\s·*]", "", symbol) for symbol in (*units_of(kind), "'", '"')}
    if not match or re.sub(r"[\s·*]", "", match[2].replace("³", "3").replace("²", "2")) not in symbols:
        return None
    return float(match[1].replace("−", "-"))


FEET_AND_INCHES = re.compile(r"""[+−-]?[0-9]+\s*(ft|'|′)[\s-]*[0-9./ ]+\s*(in|"|″|'')""")
INCH_FRACTION = re.compile(r"""[+−-]?[0-9 ]+/[0-9]+\s*(in|"|″)""")


@given(
    st.one_of(
        st.text(max_size=20),
        st.text(alphabet="0123456789.,+-−eE/' \"ftinmpsk′″", max_size=14),
        st.tuples(st.floats(allow_nan=True), st.sampled_from(["ft", "m", "psf", "", "FT"])).map(
            lambda pair: f"{pair[0]} {pair[1]}"
        ),
    ),
    st.sampled_from(sorted(EXAMPLES)),
)
@example("6 ft 6 in 3", "length")
@example("1e5 ft", "length")
def test_nothing_ambiguous_is_read(text: str, kind: str) -> None:
    try:
        value, unit = read_quantity(text, kind)
    except UnreadableQuantityError:
        return
    plain = plainly_meant(text, kind)
    if plain is None:
        cleaned = text.strip()
        assert kind == "length"
        assert FEET_AND_INCHES.fullmatch(cleaned) or INCH_FRACTION.fullmatch(cleaned)
    else:
        assert from_si(value, unit, kind) == pytest.approx(plain, rel=1e-9, abs=1e-9)


@given(st.integers(0, 10_000), st.integers(0, 11), st.integers(1, 15))
def test_feet_inches_and_sixteenths(feet: int, inches: int, sixteenths: int) -> None:
    value, unit = read_quantity(f"{feet} ft {inches} {sixteenths}/16 in", "length")
    assert value == pytest.approx((12 * feet + inches + sixteenths / 16) * 0.0254, rel=1e-14)
    assert unit == "ft"
