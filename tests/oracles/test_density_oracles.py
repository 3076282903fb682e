"""Density of water against open libraries of IAPWS-95 and TEOS-10, and the 1980 equation as tabulated."""

from __future__ import annotations

import gsw
import numpy as np
import pytest
from chemicals import iapws95_rho

from loads.density import fresh_water_density, sea_water_density
from tests.agreement import Agree

CELSIUS = (0, 4, 10, 15, 20, 25, 30)
ATMOSPHERE = 101325.0
BETWEEN_FORMULAS = 0.01

IAPWS95_TABLE = (999.843086, 999.974869, 999.702470, 999.102621, 998.207150, 997.047637, 995.649454)
EOS80_TABLE = {
    0: (999.842594, 999.974958, 999.701870, 999.101032, 998.205329, 997.046420, 995.648960),
    10: (1007.954808, 1007.947360, 1007.500871, 1006.783303, 1005.791631, 1004.554152, 1003.092974),
    20: (1016.013681, 1015.876446, 1015.268992, 1014.442673, 1013.360840, 1012.048433, 1010.525010),
    35: (1028.106331, 1027.786239, 1026.952000, 1025.971963, 1024.761740, 1023.341235, 1021.726181),
}
TEOS10_TABLE = {
    0: (999.843071, 999.974873, 999.702482, 999.102606, 998.207146, 997.047649, 995.649458),
    10: (1007.955731, 1007.944038, 1007.498924, 1006.784358, 1005.793878, 1004.555139, 1003.092122),
    20: (1016.016069, 1015.874280, 1015.268383, 1014.445193, 1013.364261, 1012.049825, 1010.523604),
    35: (1028.107185, 1027.786383, 1026.954108, 1025.976029, 1024.766000, 1023.343631, 1021.726087),
}
POINTS = [(salinity, i) for salinity in EOS80_TABLE for i in range(len(CELSIUS))]


def iapws95(temperature: float) -> float:
    return float(iapws95_rho(temperature, ATMOSPHERE))  # type: ignore[no-untyped-call]


@pytest.mark.source("IAPWS95", "published; library run at 101 325 Pa, and the figures it gave when tabulated")
@pytest.mark.parametrize("i", range(len(CELSIUS)))
def test_fresh_water_against_iapws95(agree: Agree, i: int) -> None:
    temperature = CELSIUS[i] + 273.15
    library = iapws95(temperature)
    found = fresh_water_density(np.array([temperature]))
    agree(library, IAPWS95_TABLE[i], rel=2e-9, what="library against its own table, kg/m³")
    agree(found, library, abs=BETWEEN_FORMULAS, what=f"fresh water at {CELSIUS[i]} °C, kg/m³")


@pytest.mark.source("IAPWS95", "published; library run at 101 325 Pa, in steps of 1 K")
def test_fresh_water_stays_close_up_to_boiling() -> None:
    temperature = np.arange(273.15, 373.0, 1.0)
    library = np.array([iapws95(t) for t in temperature])
    np.testing.assert_allclose(fresh_water_density(temperature), library, rtol=0, atol=BETWEEN_FORMULAS)


@pytest.mark.source("MilleroPoisson1981", "published; equation tabulated by temperature on the 1990 scale")
@pytest.mark.parametrize(("salinity", "i"), POINTS)
def test_sea_water_against_the_table_of_its_own_equation(agree: Agree, salinity: int, i: int) -> None:
    found = sea_water_density(np.array([CELSIUS[i] + 273.15]), np.array([float(salinity)]))
    agree(found, EOS80_TABLE[salinity][i], abs=1e-6, what=f"S {salinity}, {CELSIUS[i]} °C, kg/m³")


@pytest.mark.source(
    "TEOS10", "published; exact library function at sea pressure 0, and what it gave when tabulated"
)
@pytest.mark.parametrize(("salinity", "i"), POINTS)
def test_sea_water_against_teos10(agree: Agree, salinity: int, i: int) -> None:
    library = float(gsw.rho_t_exact(gsw.SR_from_SP(salinity), CELSIUS[i], 0))
    found = sea_water_density(np.array([CELSIUS[i] + 273.15]), np.array([float(salinity)]))
    agree(library, TEOS10_TABLE[salinity][i], abs=1e-6, what="library against its own table, kg/m³")
    agree(found, library, abs=BETWEEN_FORMULAS, what=f"S {salinity}, {CELSIUS[i]} °C, kg/m³")
