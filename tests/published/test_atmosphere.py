"""Barometers by altitude (ISO 2533:1975) and pressures of liquid columns, against printed values.

All expected values are from memory of the named documents, recomputed by the compilers of the checks.
"""
from __future__ import annotations

import pytest

from gasbasis import facts, relations
from gasbasis.errors import OutOfRange

EARTH_RADIUS = 6_356_766.0              # m, ISO 2533: turns a geometric altitude into a geopotential one
G = 9.80665                             # m/s2, exact

GEOPOTENTIAL = [(0, 101325.0), (500, 95460.8), (1000, 89874.6), (1500, 84556.0), (2000, 79495.2), (2500, 74682.5), (3000, 70108.5),
                (4000, 61640.2), (5000, 54019.9)]      # m, Pa
GEOMETRIC = [(500, 95461.3), (1000, 89876.3), (1500, 84559.7), (2000, 79501.4), (2500, 74691.8), (3000, 70121.2), (4000, 61660.4),
             (5000, 54048.3)]
ISO_2533 = [(1000, 898.75), (1500, 845.56), (2000, 794.95), (3000, 701.085), (4000, 616.402)]    # m, hPa as the standard prints them


def standard(name: str) -> float:
    """A constant of the standard in SI."""
    datum = facts.constant(f"iso_2533_{name}")
    return float(datum.number) * {"J/(kmol K)": 1e-3, "kg/kmol": 1e-3, "m/s2": 1.0, "K/km": 1e-3, "K": 1.0, "kPa": 1e3}[datum.unit]


def air() -> dict[str, float]:
    return {"T_0": standard("temperature"), "L": -standard("gradient"), "g": standard("acceleration"), "M": standard("molar_mass"),
            "R": standard("gas_constant")}


def barometer(altitude: float) -> float:
    return relations.get("barometer_at_altitude").value(p_0=standard("pressure"), H=altitude, **air())


@pytest.mark.parametrize(("altitude", "pascal"), GEOPOTENTIAL)
def test_barometer_at_a_geopotential_altitude(altitude: int, pascal: float) -> None:
    assert barometer(altitude) == pytest.approx(pascal, abs=0.05001)


@pytest.mark.parametrize(("altitude", "hectopascal"), ISO_2533)
def test_barometer_as_the_standard_prints_it(altitude: int, hectopascal: float) -> None:
    assert barometer(altitude) / 100 == pytest.approx(hectopascal, abs=0.005001)


@pytest.mark.parametrize(("altitude", "pascal"), GEOMETRIC)
def test_a_geometric_altitude_differs_little(altitude: int, pascal: float) -> None:
    """We take what is typed as geopotential: up to 5 km that is 0.06 % at most from the geometric altitude of a map."""
    assert barometer(EARTH_RADIUS * altitude / (EARTH_RADIUS + altitude)) == pytest.approx(pascal, abs=0.05001)
    assert 0 < 1 - barometer(altitude) / pascal < 6e-4


@pytest.mark.parametrize(("altitude", "pascal"), GEOPOTENTIAL)
def test_a_sea_level_pressure_is_unreduced_by_the_same_ratio(altitude: int, pascal: float) -> None:
    # the formula is proportional to the pressure at sea level, so a report of 1000 hPa scales the table
    station = relations.get("barometer_from_sea_level").value(p_sl=100e3, H=altitude, **air())
    assert station == pytest.approx(pascal * 100e3 / 101325.0, abs=0.05001)


@pytest.mark.parametrize(("liquid", "density", "height", "pascal", "within"), [
    ("mercury at 0 °C, conventional", 13595.1, 1e-3, 133.322, 0.0005),        # SI brochure, conventional millimetre of mercury
    ("mercury at 32 °F", 13595.08, 0.0254, 3386.38, 0.005),                   # NIST SP 811
    ("mercury at 60 °F", 13556.8, 0.0254, 3376.85, 0.005),                    # NIST SP 811; density by a handbook's expansion
    ("water, conventional", 1000.0, 1e-3, 9.80665, 0.000005),                 # NIST SP 811, conventional millimetre of water
    ("water at 4 °C", 999.972, 0.0254, 249.082, 0.0005),                      # NIST SP 811
    ("water at 60 °F", 999.02, 0.0254, 248.84, 0.005),                        # NIST SP 811; density from a handbook
    ("water below the barometer", 1000.0, -12e-3, -117.68, 0.005)])           # by hand: a duct under draught
def test_a_column_of_liquid(liquid: str, density: float, height: float, pascal: float, within: float) -> None:
    assert relations.get("liquid_column").value(rho=density, g=G, z=height) == pytest.approx(pascal, abs=within)


def test_gauge_and_static_pressures_stand_on_the_barometer() -> None:
    # by hand: 1008 hPa with a draught of 117.68 Pa; 1008 hPa under 2.3 bar
    absolute = relations.get("absolute_pressure")
    assert absolute.value(p_b=100.8e3, p_g=-117.68) == pytest.approx(100682.32, abs=0.005)
    assert absolute.value(p_b=100.8e3, p_g=2.3e5) == pytest.approx(330.8e3, abs=0.5)


def test_the_gradient_enters_without_its_sign() -> None:
    with pytest.raises(OutOfRange, match="positive where the air grows colder") as caught:
        relations.get("barometer_at_altitude").value(p_0=101325.0, H=1000.0, **{**air(), "L": standard("gradient")})
    assert caught.value.argument == "L"
