"""What the gas line comes to: mixtures by amount and by mass, droplets, meter factor, columns of liquid, fuel factor."""
from __future__ import annotations

import json

import pytest

from gasbasis import facts
from gasbasis.answer import answer
from gasbasis.language.gas import read_gas
from gasbasis.physics import liquid


def restate(hold="CO 100 ppmv", owe="ppm by volume", **sheet) -> dict:
    return json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": hold, "owe": owe, **sheet}})))["answer"]


def about(gas: str) -> dict[str, str]:
    return {row["title"]: row["text"] for row in restate(gas=gas)["gas"]["about"]}


def test_a_composition_by_mass() -> None:
    """1 kg of a gas with 90 % CH4 and 10 % N2 by mass holds 0.9/0.016043 + 0.1/0.028014 mol (IUPAC 2021 weights)."""
    amount = 0.9 / 0.016043 + 0.1 / 0.028014
    for text in ("by mass: CH4 90, N2 10", "CH4 90 wt%, N2 10 wt%", "CH4 90 %, N2 10 % (by mass)", "mass %: CH4 90, N2 10"):
        assert about(text)["molar mass, dry"] == f"{1000 / amount:.4g} g/mol", text
    assert about("CH4 90, N2 10")["molar mass, dry"] == "17.24 g/mol"          # 0.9 * 16.043 + 0.1 * 28.014


def test_mass_fractions_become_amount_fractions_for_a_real_gas() -> None:
    x = 0.9 / 0.016043 / (0.9 / 0.016043 + 0.1 / 0.028014)
    real = [restate("Hg 10 ug/m3 at 20 °C, 1 atm", "ug/m3 at 0 °C, 1 atm", gas=gas)["figure"]["value"]
            for gas in ("by mass: CH4 90, N2 10, real gas", f"CH4 {100 * x:.12f}, N2 {100 - 100 * x:.12f}, real gas")]
    assert real[0] == pytest.approx(real[1], rel=1e-11)


def test_the_total_is_shown_and_brought_to_100() -> None:
    assert about("CH4 93.2, C2H6 2.5, N2 4")["composition"] == "adds up to 99.7 %, brought to 100 %"
    assert "composition" not in about("CH4 93.5, C2H6 2.5, N2 4")


def test_relative_density_of_methane() -> None:
    assert about("CH4 99.99, N2 0.01")["relative density"].startswith("0.5539")    # 16.043/28.96546 (ISO 6976:2016 molar mass of air)


def test_fuel_factor() -> None:
    """Fo = (20.9 - O2)/CO2 (US EPA Method 3B): 10 % O2 and 6.2 % CO2 give 1.76, inside the method's 1.600 to 1.836 for natural gas (from memory)."""
    assert about("10 % O2 dry, 6.2 % CO2 dry")["fuel factor Fo"].startswith(f"{(20.9 - 10) / 6.2:.4g}")


def test_droplets_take_the_lower_of_measured_and_saturated() -> None:
    """US EPA Method 4: with droplets present the lower of the two. p_sat(48 °C) = 11.177 kPa (IAPWS), over 100.8 kPa 11.09 %."""
    assert about("48 °C, 1008 hPa, 14 % H2O, with droplets")["water content"] == "11.09 %"
    assert about("48 °C, 1008 hPa, 9 % H2O, with droplets")["water content"] == "9.000 %"
    assert about("48 °C, 1008 hPa, water droplets present")["water content"] == "11.09 %"
    problem = restate("CO 100 ppmv wet", "ppm by volume dry", gas="14 % H2O, droplets")["problems"][0]
    assert problem["field"] == "gas.temperature" and "48 °C" in problem["hint"]


def test_the_meter_factor_multiplies_the_dry_volume() -> None:
    with_factor, larger = (about(f"collected water 34.2 g in {volume} at 293 K, 101.3 kPa{rest}")["water content"]
                           for volume, rest in (("0.5 m3", ", Y 1.02"), ("0.51 m3", "")))
    assert with_factor == larger != about("collected water 34.2 g in 0.5 m3 at 293 K, 101.3 kPa")["water content"]


@pytest.mark.native
def test_the_density_of_water_against_iapws_95() -> None:
    from iapws import IAPWS95
    row = next(row for row in facts.table("liquid_densities")["equations"] if row["id"] == "water")
    for celsius in (0.0, 4.0, 15.0, 25.0, 40.0):
        expected = IAPWS95(T=celsius + 273.15, P=0.101325).rho
        assert liquid.density_of_water(celsius, *map(float, row["a"])) == pytest.approx(expected, rel=5e-6), celsius


@pytest.mark.parametrize(("gas", "pascal", "half_digit"), [
    ("static 1 inHg (60 °F)", 3376.85, 0.05), ("static 1 inH2O (60 °F)", 248.84, 0.005),        # NIST SP 811, Appendix B.8
    ("static 1 mmHg (0 °C)", 133.3224, 0.0005), ("static 1 inH2O (4 °C)", 249.082, 0.001),   # the same; its print is older than the density of 2001, which gives 249.0827
    ("static -12 mmH2O column at 20 °C", -12 * 9.80665 * 0.998207, 0.001)])                     # 998.207 kg/m3: CRC Handbook, from memory
def test_a_column_at_its_temperature(gas: str, pascal: float, half_digit: float) -> None:
    found, problems = read_gas(gas)
    assert not problems and found.pressure_route.get("pressure").si == pytest.approx(pascal, abs=half_digit)


def test_a_column_as_hot_as_the_gas_is_refused() -> None:
    _, problems = read_gas("static 12 mmH2O (182 °C), 182 °C")
    assert "0 to 40 °C" in problems[0].message and problems[0].span == (16, 24)


def test_the_components_are_sent_for_editing() -> None:
    piece = next(piece for piece in restate(gas="by mass: CH4 90,5; N2 9")["gas"]["pieces"] if piece["field"] == "matrix_gas")
    assert piece["components"] == [{"name": "CH4", "text": "90,5"}, {"name": "N2", "text": "9"}] and piece["by_mass"] and piece["total_text"] == "99.5"


@pytest.mark.parametrize("gas", ["CH4 93, Xq 7", "CH4 93, C2H6 5, foo 2", "CH4 93 %, C2H6 5 %, foo 2 %, real gas"])
def test_an_unknown_component_is_named(gas: str) -> None:
    problems = restate("Hg 100 ppb by mass", "ug/m3 at 20 °C, 1 atm", gas=gas)["problems"]
    assert len(problems) == 1 and ("'Xq'" in problems[0]["message"] or "'foo'" in problems[0]["message"]) and "no component" in problems[0]["message"], problems
