"""Water: saturation pressures, the impinger method's constants, water contents by each way, against published values."""
from __future__ import annotations

import json
import math

import pytest

from gasbasis import facts, relations
from gasbasis.answer import answer

# IAPWS-95 values, recomputed with a general library by the compilers of the checks; Pa
LADDER = [(273.16, 611.655), (293.15, 2339.32), (298.15, 3169.93), (313.15, 7384.94), (333.15, 19946.4), (353.15, 47414.5), (373.15, 101418.0)]


def equation(identity: str):
    return next(row for row in facts.table("water_saturation")["equations"] if row["id"] == identity)


def over_water(T: float) -> float:
    row = equation("wagner-pruss")
    T_c, a = float(row["Tc"]), {f"a_{i}": float(text) for i, text in enumerate(row["a"], start=1)}
    tau = relations.get("reduced_temperature_complement").value(T=T, T_c=T_c)
    return relations.get("saturation_pressure_over_water").value(tau=tau, T=T, T_c=T_c, p_c=float(row["pc"]), **a)


def over_ice(T: float) -> float:
    row = equation("iapws-r14-08")
    coefficients = {f"{letter}_{i}": float(text) for letter in "ab" for i, text in enumerate(row[letter], start=1)}
    theta = relations.get("reduced_temperature").value(T=T, T_t=float(row["Tt"]))
    return relations.get("sublimation_pressure_over_ice").value(theta=theta, p_t=float(row["pt"]), **coefficients)


@pytest.mark.parametrize(("kelvin", "pascal"), LADDER)
def test_saturation_over_water(kelvin: float, pascal: float) -> None:
    # Wagner-Pruss is a fit to the same data: it agrees with IAPWS-95 to some 0.01 % (its stated uncertainty is 0.025 %)
    assert over_water(kelvin) == pytest.approx(pascal, rel=1.2e-4)


def test_saturation_over_ice_at_230_kelvin() -> None:
    # IAPWS R14-08(2011), the release's own check value
    assert over_ice(230.0) == pytest.approx(8.94735, abs=0.000005)


@pytest.mark.native
@pytest.mark.parametrize("kelvin", [274, 280, 290, 300, 310, 320, 340, 360, 380, 420])
def test_saturation_against_a_general_library(kelvin: int) -> None:
    iapws97 = pytest.importorskip("iapws.iapws97")
    assert over_water(kelvin) == pytest.approx(iapws97._PSat_T(kelvin) * 1e6, rel=3e-4)


def test_the_older_goff_form_is_eight_hundredths_of_a_percent_apart() -> None:
    # 40 CFR 1065.645 example (from memory): 9.5 degC -> 1.186581 kPa, -15.4 degC over ice -> 0.159145 kPa
    assert 0.0002 < abs(over_water(282.65) / 1186.581 - 1) < 0.0015
    assert 0.0001 < abs(over_ice(257.75) / 159.145 - 1) < 0.0015


def test_impinger_constants() -> None:
    # US EPA Method 4 (from memory): 0.001333 m3/mL, 0.001335 m3/g at 293.15 K, 101.325 kPa (760 mmHg)
    R, M = float(facts.constant("molar_gas_constant").number), 18.015e-3
    per_gram = relations.get("molar_volume").value(Z=1.0, R=R, T=293.15, p=101325.0) * relations.get("amount_of_collected_water").value(m=1e-3, M_water=M)
    density = float(facts.constant("density_of_water").number)
    assert per_gram == pytest.approx(0.001335, abs=0.0000005)
    assert per_gram * density == pytest.approx(0.001333, abs=0.0000005)
    assert per_gram == pytest.approx(float(facts.constant("method_4_volume_per_gram").number), abs=0.0000005)


def dried(gas: str) -> float:
    """The water content that a clause gives, in percent, from what drying 100 ppm does."""
    sheet = {"hold": "SO2 100 ppmv wet", "owe": "ppm by volume, dry", "gas": gas}
    result = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]
    assert result["figure"], result["problems"]
    return 100 * (1 - 100 / result["figure"]["value"])


@pytest.mark.parametrize(("gas", "percent", "within", "source"), [
    ("dew point 20 °C, 101325 Pa", 2.3087, 0.0004, "2339.32 / 101325 by hand"),
    ("saturated at 60 °C, 101.325 kPa", 19.686, 0.003, "19946.4 / 101325 by hand"),
    ("RH 50 % at 25 °C, 101.325 kPa", 1.5642, 0.0003, "0.5 x 3169.93 / 101325 by hand"),
    ("wet bulb 20 °C, dry bulb 30 °C, 101.325 kPa", 1.6467, 0.001, "(2339.3 - 6.62e-4 x 101325 x 10) / 101325 by hand"),
    ("collected water 18.015 g in 0.240551 m3 at 20 °C, 101.325 kPa", 100 / 11, 0.001, "1 mol of water to 10 mol of gas"),
    ("collected water 18.0475 mL in 0.240551 m3 at 20 °C, 101.325 kPa", 100 / 11, 0.003, "the same by volume, 0.9982 g/mL"),
    ("water 80.37 g/m3 dry at 273.15 K, 101.325 kPa", 100 / 11, 0.002, "0.1 mol per mol: 0.1 x 18.015 / 22.414e-3 g/m3"),
    ("water 0.0622 kg/kg dry, dry air", 100 / 11, 0.005, "0.1 x 18.015 / 28.965 = 0.0622 (ratio 0.62198, 40 CFR 86.344-79)"),
    ("frost point -20 °C, 101.325 kPa", 0.10191, 0.0003, "103.26 Pa over ice (handbook, from memory) / 101325"),
])
def test_water_content_by_each_way(gas: str, percent: float, within: float, source: str) -> None:
    assert dried(gas) == pytest.approx(percent, abs=within), source


def test_oxygen_in_saturated_air() -> None:
    # 20.946 (1 - 3169.9/101325) = 20.29 %
    sheet = {"hold": "O2 20.946 % dry", "owe": "% by volume, wet", "gas": "saturated at 25 °C, 101.325 kPa"}
    value = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]["figure"]["value"]
    assert value == pytest.approx(20.29, abs=0.005)


def test_the_coolers_water() -> None:
    # at 4 degC 813.5 Pa (handbook, from memory): 0.803 % of the analyser's gas at 101.3 kPa
    sheet = {"hold": "SO2 100 ppmv dry", "owe": "ppm by volume, dry", "gas": "cooler 4 °C, 101.3 kPa"}
    value = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]["figure"]["value"]
    assert value == pytest.approx(100 / (1 - 813.5 / 101300), abs=0.01)


@pytest.mark.parametrize(("gas", "field", "message"), [
    ("dew point 45 °C, gauge 60 bar, barometer 1 atm", "gas.water_content", "a third too low"),
    ("dew point 45 °C", "gas.pressure", "pressure of the gas is needed"),
    ("dew point 45 °C, static -12 mmH2O", "gas.barometer", "needs the barometer"),
    ("dew point 80 °C, 40 °C, 1 atm", "gas.water_route", "above the gas temperature"),
    ("dew point -20 °C, 1 atm", "gas.water_route", "below freezing"),
    ("saturated at 99 °C, 80 kPa", "", "below the pressure of the gas"),
    ("wet bulb 80 °C, dry bulb 40 °C, 1 atm", "gas.water_route", "not above the dry bulb"),
    ("RH 130 % at 25 °C, 1 atm", "gas.water_route", "0 to 100 %"),
    ("collected water 30 g in 0 m3 at 20 °C, 1 atm", "gas.water_route", "above zero"),
    ("dew point 45 °C, static -2 bar, barometer 1 bar", "gas.pressure_route", "no pressure at all"),
    ("12 % H2O, dew point 45 °C, 1 atm", "gas.water_content", "given twice")])
def test_bad_water_is_refused(gas: str, field: str, message: str) -> None:
    sheet = {"hold": "SO2 100 ppmv wet", "owe": "ppm by volume, dry", "gas": gas}
    result = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]
    assert result["figure"] is None
    assert any(message in problem["message"] and problem["field"] == (field or problem["field"]) and problem["hint"] for problem in result["problems"]), result["problems"]


@pytest.mark.parametrize(("altitude", "hectopascal"), [(0, "1013.25"), (500, "954.608"), (1000, "898.746"), (1500, "845.560"), (2000, "794.952"), (3000, "701.085"), (5000, "540.199")])
def test_barometer_at_altitude(altitude: int, hectopascal: str) -> None:
    # ISO 2533:1975, geopotential altitude (values from memory, recomputed); Pa
    values = {"p_0": 101325.0, "T_0": 288.15, "L": 0.0065, "g": 9.80665, "M": 28.9644e-3, "R": 8.31432}
    value = relations.get("barometer_at_altitude").value(H=float(altitude), **values) / 100
    assert value == pytest.approx(float(hectopascal), abs=0.0051)


def test_a_station_pressure_from_altitude_and_from_a_weather_report() -> None:
    def volume_factor(gas: str) -> float:
        sheet = {"hold": "SO2 1 mg/m3 actual volume", "owe": "mg/m3 at 0 °C, 101.325 kPa", "gas": f"0 °C, {gas}"}
        result = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]
        assert result["figure"], result["problems"]
        return 1 / result["figure"]["value"]
    assert volume_factor("gauge 0 Pa, altitude 1000 m") == pytest.approx(898.746 / 1013.25, rel=1e-5)
    assert volume_factor("gauge 0 Pa, sea level 1000 hPa, altitude 1000 m") == pytest.approx(898.746 / 1013.25 * 1000 / 1013.25, rel=1e-5)
    assert volume_factor("static -12 mmH2O, barometer 1008 hPa") == pytest.approx((100800 - 12 * 9.80665) / 101325, rel=1e-9)
    assert math.isclose(volume_factor("gauge 2.3 bar, barometer 1 bar"), 3.3e5 / 101325, rel_tol=1e-9)
