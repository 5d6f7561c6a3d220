"""Mass rates, F factors and rates per output against the rules that print them, and against arithmetic by hand.

Sources beside each row. "M" in a name or comment: the printed value is from memory.
"""
from __future__ import annotations

import json
import math

import pytest

from gasbasis import facts, relations
from gasbasis.answer import answer
from gasbasis.language.units import unit

R = 8.31446261815324
POUND_PER_CUBIC_FOOT = 0.45359237 / 0.3048 ** 3
FAHRENHEIT_68, ATMOSPHERE = 293.15, 101325.0


def restate(**sheet) -> dict:
    usual = sheet.pop("usual", True)
    reply = json.loads(answer(json.dumps({"task": "restate", "usual": usual, "sheet": sheet})))
    assert reply["ok"], reply
    return reply["answer"]


def figure(**sheet) -> float:
    result = restate(**sheet)
    assert result["figure"], (result["problems"], [doubt["id"] for doubt in result["doubts"] if doubt["state"] == "open"])
    return result["figure"]["value"]


# --- ppm to pounds per cubic foot: the K of US 40 CFR 75 Appendix F

def test_the_factor_of_nox_as_no2() -> None:
    """1.194e-7 (lb/scf)/ppm, section 3.3.1."""
    gamma = relations.get("mass_concentration_from_amount_fraction").value(x=1e-6, p=ATMOSPHERE, M=0.046006, Z=1.0, R=R, T=FAHRENHEIT_68)
    assert gamma / POUND_PER_CUBIC_FOOT == pytest.approx(1.194e-7, abs=0.5e-10)


def test_the_factor_of_so2_is_as_printed_with_its_rule_and_exact_without() -> None:
    """Section 2.1 prints 1.660e-7; exact is 1.6626e-7 from 64.06 g/mol and 385.33 scf/lbmol (by hand): 0.16 % between them; 0.14 % from the gas at 29.92 inHg."""
    sheet = {"hold": "SO2 100 ppm by volume dry", "owe": "lb/ft3 at 68 °F, 29.92 inHg, dry"}
    printed, exact = restate(**sheet, rule_book="us_part_75_boiler"), restate(**sheet)
    assert printed["figure"]["value"] == pytest.approx(1.660e-5, rel=1e-12)
    assert exact["figure"]["value"] == pytest.approx(1.6626e-5, rel=2e-4)        # 29.92 inHg is 0.005 % below 1 atm, 64.058 for 64.06
    said = next(step for step in printed["working"] if step["title"] == "The rule's own factor")
    assert "1.660e-7" in said["note"] and "a difference of −0.14 %" in said["note"]


def test_the_factor_of_co_from_memory() -> None:
    """7.268e-8, practice beside Appendix F (M); exact 7.2692e-8."""
    assert figure(hold="CO 100 ppm by volume dry", owe="lb/ft3 at 68 °F, 29.92 inHg, dry", rule_book="us_part_75_boiler") == pytest.approx(7.268e-6, rel=1e-12)


def test_the_constant_of_hazardous_waste_vents() -> None:
    """US 40 CFR 264.1033: K = 1.74e-7 (1/ppm)(g-mol/scm)(MJ/kcal), standard temperature 20 °C."""
    volume = relations.get("molar_volume").value(Z=1.0, R=R, T=293.15, p=ATMOSPHERE)
    assert 1e-6 / volume * 4.184e-3 == pytest.approx(1.74e-7, abs=0.5e-9)


def test_micrograms_per_cubic_metre_times_cubic_feet() -> None:
    """US 40 CFR 63 Subpart UUUUU Appendix A (M): 6.24e-11 lb m3/(ug ft3)."""
    rate = relations.get("mass_rate").value(gamma=1e-9, q=0.3048 ** 3)
    assert rate / 0.45359237 == pytest.approx(6.24e-11, abs=0.5e-13)


def test_pounds_per_megawatt_hour_in_two_other_units() -> None:
    """US 40 CFR 60.45Da (2009): 20e-6 lb/MWh = 0.020 lb/GWh = 0.0025 ng/J."""
    assert 20e-6 * unit("lb/MWh").factor == pytest.approx(0.020 * unit("lb/GWh").factor, rel=1e-12)
    assert 20e-6 * unit("lb/MWh").factor / unit("ng/J").factor == pytest.approx(0.0025, abs=0.00005)


# --- US EPA Method 19 (forms from memory): dry and wet, oxygen and carbon dioxide

@pytest.mark.parametrize(("fuel", "printed"), [("natural gas", 8710), ("oil", 9190), ("anthracite", 10100), ("lignite", 9860), ("coal", 9780), ("wood", 9240)])
def test_dry_factor_and_dry_oxygen(fuel: str, printed: float) -> None:
    """Eq. 19-1, E = Cd Fd 20.9/(20.9 - O2), with the printed K of NOx: 1.194e-7 x 100 ppm x 8710 x 20.9/17.9 = 0.1214 lb/MMBtu for gas."""
    by_hand = 1.194e-7 * 100 * printed * 20.9 / (20.9 - 3.0)
    found = figure(hold="NOx 100 ppm by volume dry as NO2", gas="3.0 % O2 dry, ambient O2 20.9 %", owe="lb/MMBtu", emission=f"fuel {fuel}", rule_book="us_part_75_boiler")
    assert found == pytest.approx(by_hand, rel=1e-9)


C, O_DRY, H = 1.5e-4, 0.045, 0.112      # kg/m3, oxygen, water


@pytest.mark.parametrize(("held", "oxygen", "form"), [
    (C, "4.5 % O2 dry", lambda: C * 20.9 / (20.9 - 4.5)),                                                          # 19-1: both dry
    (C * (1 - H), f"{4.5 * (1 - H):.4f} % O2 wet", lambda: C * (1 - H) * 20.9 / (20.9 * (1 - H) - 4.5 * (1 - H))),   # 19-3: both wet
    (C, f"{4.5 * (1 - H):.4f} % O2 wet", lambda: C * 20.9 / (20.9 - 4.5 * (1 - H) / (1 - H))),                        # 19-4: dry, oxygen wet
    (C * (1 - H), "4.5 % O2 dry", lambda: C * (1 - H) * 20.9 / ((1 - H) * (20.9 - 4.5)))])                           # 19-5: wet, oxygen dry
def test_the_four_wet_and_dry_cases(held, oxygen, form) -> None:
    wet = "wet" if held != C else "dry"
    found = figure(hold=f"SO2 {held * 1e6:.8g} mg/m3 {wet} at 20 °C, 760 mmHg", gas=f"11.2 % H2O, {oxygen}, ambient O2 20.9 %", owe="ng/J", emission="fuel oil")
    assert found == pytest.approx(form() * 9190 * 0.3048 ** 3 / 1055.05585262e6 * 1e12, rel=1e-7)


def test_wet_factor() -> None:
    """Eq. 19-2, E = Cw Fw 20.9/(20.9 (1 - Bwa) - O2w), Bwa = 0.027."""
    found = figure(hold="SO2 120 mg/m3 wet at 20 °C, 760 mmHg", gas="4.0 % O2 wet, ambient O2 20.9 %", owe="ng/J", emission="fuel oil by wet O2, air water 2.7 %")
    assert found == pytest.approx(120e-6 * 10320 * 0.3048 ** 3 / 1055.05585262e6 * 20.9 / (20.9 * (1 - 0.027) - 4.0) * 1e12, rel=1e-9)


def test_carbon_dioxide_factor() -> None:
    """Eq. 19-6, E = Cd Fc 100/CO2; eq. 19-8 for a wet concentration with dry carbon dioxide."""
    by_hand = 120e-6 * 1420 * 0.3048 ** 3 / 1055.05585262e6 * 100 / 12.4 * 1e12
    assert figure(hold="SO2 120 mg/m3 dry at 20 °C, 760 mmHg", gas="12.4 % CO2 dry", owe="ng/J", emission="fuel oil by CO2") == pytest.approx(by_hand, rel=1e-9)
    wet = figure(hold="SO2 108 mg/m3 wet at 20 °C, 760 mmHg", gas="10 % H2O, 12.4 % CO2 dry", owe="ng/J", emission="fuel oil by CO2")
    assert wet == pytest.approx(by_hand, rel=1e-9)


def test_one_and_the_same_rate_in_four_units() -> None:
    sheet = {"hold": "SO2 120 mg/m3 dry at 20 °C, 760 mmHg", "gas": "4 % O2 dry, ambient O2 20.9 %", "emission": "fuel oil"}
    per_joule = figure(owe="ng/J", **sheet)
    assert figure(owe="mg/MJ", **sheet) == pytest.approx(per_joule, rel=1e-12)
    assert figure(owe="lb/MMBtu", **sheet) == pytest.approx(per_joule * 1055.05585262e6 * 1e-9 / 453.59237, rel=1e-9)
    assert figure(owe="lb/TBtu", **sheet) == pytest.approx(figure(owe="lb/MMBtu", **sheet) * 1e6, rel=1e-9)


def test_factors_from_an_ultimate_analysis() -> None:
    """Eqs. 19-13 and 19-15 in customary units: F = 1e6 (3.64 H + 1.53 C + 0.57 S + 0.14 N - 0.46 O)/GCV; Fc = 321 000 C/GCV (coefficients M)."""
    analysis = "fuel C 75.2, H 5.1, S 1.2, N 1.5, O 7.9, gross 13150 Btu/lb"
    F = 1e6 * (3.64 * 5.1 + 1.53 * 75.2 + 0.57 * 1.2 + 0.14 * 1.5 - 0.46 * 7.9) / 13150
    sheet = {"hold": "SO2 120 mg/m3 dry at 20 °C, 760 mmHg", "owe": "ng/J"}
    assert 9700 < F < 10300                                  # near the table's 9,780 for bituminous coal, of which this is one
    assert figure(**sheet, gas="4 % O2 dry, ambient O2 20.9 %", emission=analysis) == pytest.approx(120e-6 * F * 0.3048 ** 3 / 1055.05585262e6 * 20.9 / 16.9 * 1e12, rel=1e-9)
    F_c = 321000 * 75.2 / 13150
    assert figure(**sheet, gas="12 % CO2 dry", emission=f"{analysis} by CO2") == pytest.approx(120e-6 * F_c * 0.3048 ** 3 / 1055.05585262e6 * 100 / 12 * 1e12, rel=1e-9)


def test_factors_of_pure_methane_by_stoichiometry() -> None:
    """CH4 burns with 2 O2 to CO2 and 2 H2O: dry gas per mole 1 + 2 x 79.1/20.9, 890.6 kJ gross at 25 °C (handbook)."""
    volume = R * 293.15 / ATMOSPHERE
    F_d = (1 + 2 * 79.1 / 20.9) * volume / 890.6e3 * 1055.05585262e6 / 0.3048 ** 3
    carbon, hydrogen, gross = 100 * 12.011 / 16.043, 100 * 4 * 1.008 / 16.043, 890.6 / 16.043
    own = figure(hold="CO 100 mg/m3 dry at 20 °C, 760 mmHg", gas="0 % O2 dry, ambient O2 20.9 %", owe="ng/J", emission=f"fuel C {carbon:.4f}, H {hydrogen:.4f}, S 0, N 0, O 0, gross {gross:.5f} MJ/kg")
    assert own / 100e6 * 1e6 / 0.3048 ** 3 * 1055.05585262e6 / 1e6 == pytest.approx(F_d, rel=0.004)     # the coefficients have two decimals
    assert F_d == pytest.approx(8628, rel=0.002)


# --- the pitot traverse: US EPA Method 2

def test_velocity_by_the_methods_own_constant() -> None:
    """Kp = 34.97 m/s (g/mol mmHg/(K mmH2O))^0.5 (M), as printed: v = Kp Cp mean(sqrt dp) sqrt(T/(P M))."""
    roots = (math.sqrt(12.1) + math.sqrt(13.0) + math.sqrt(14.2)) / 3
    by_method = float(facts.constant("method_2_pitot").number) * 0.84 * roots * math.sqrt(455.15 / (755.0 * 28.8))
    flow = figure(hold="dust 1 mg/m3 actual wet", gas="182 °C, 755 mmHg, M 28.8 g/mol", owe="g/s", emission="area 1 m2, pitot Cp 0.84, dp 12.1, 13.0, 14.2 mmH2O") * 1000
    assert flow == pytest.approx(by_method, rel=2e-4)        # four printed digits of Kp


def test_roots_are_averaged_not_pressures() -> None:
    """Two points of 4 and 16: the mean root is 3, that of the mean pressure 3.162."""
    assert relations.mean_of_roots(2).value(dp_1=4.0, dp_2=16.0) == pytest.approx(3.0)


def test_a_stack_test_by_hand() -> None:
    """NOx 142 ppm dry, wet hot duct: every step worked with the gas law by hand."""
    M_dry = 0.320 * 9.2 + 0.440 * 10.1 + 0.280 * 80.7
    M_wet = M_dry * 0.88 + 18.015 * 0.12
    p = 100800.0 - 12 * 9.80665
    roots = sum(math.sqrt(dp * 9.80665) for dp in (12.1, 13.0, 14.2)) / 3
    v = 0.84 * roots * math.sqrt(2 * R * 455.15 / (p * M_wet * 1e-3))
    q_dry_amount = v * math.pi / 4 * 1.8 ** 2 * p / (R * 455.15) * 0.88
    by_hand = q_dry_amount * 142e-6 * 46.005e-3 * 3600
    found = figure(hold="NOx 142 ppm by volume dry as NO2", gas="12 % H2O, 9.2 % O2 dry, 10.1 % CO2 dry, in combustion gas, 182 °C, static -12 mmH2O, barometer 1008 hPa",
                   owe="kg/h", emission="duct 1.8 m diameter, pitot Cp 0.84, dp 12.1, 13.0, 14.2 mmH2O")
    assert found == pytest.approx(by_hand, rel=1e-9)


# --- concentration and flow on one basis

def test_the_rate_is_the_same_whatever_basis_the_flow_is_on() -> None:
    """The same gas, its flow stated wet and actual, and dry at normal conditions (by hand: x 0.88 x 273.15/455.15 x 100/101.325)."""
    hold, gas = "SO2 80 mg/m3 dry at 273.15 K, 101.325 kPa", "12 % H2O, 182 °C, 100 kPa"
    actual = figure(hold=hold, gas=gas, owe="kg/h", emission="flow 100000 m3/h actual wet")
    normal = figure(hold=hold, gas=gas, owe="kg/h", emission=f"flow {100000 * 0.88 * 273.15 / 455.15 * 100 / 101.325:.6f} m3/h at 273.15 K, 101.325 kPa, dry")
    assert actual == pytest.approx(normal, rel=1e-9)
    assert normal == pytest.approx(80e-6 * 100000 * 0.88 * 273.15 / 455.15 * 100 / 101.325, rel=1e-9)


def test_a_corrected_concentration_is_uncorrected_before_it_meets_a_flow() -> None:
    """200 mg/m3 at 3 % is 200 x (21 - 9)/(21 - 3) at the measured 9 %."""
    sheet = {"hold": "NOx 200 mg/m3 dry at 273.15 K, 101.325 kPa as NO2, corrected to 3 % O2", "owe": "kg/h"}
    found = figure(**sheet, gas="9 % O2 dry, ambient O2 21 %", emission="flow 50000 m3/h at 273.15 K, 101.325 kPa, dry")
    assert found == pytest.approx(200e-6 * 12 / 18 * 50000, rel=1e-12)
    assert figure(**sheet, gas="ambient O2 21 %", emission="flow 50000 m3/h at 273.15 K, 101.325 kPa, dry, 3 % O2") == pytest.approx(10.0, rel=1e-12)


def test_it_is_refused_with_the_reason_where_the_measured_oxygen_is_not_known() -> None:
    problems = restate(hold="NOx 200 mg/m3 dry at 273.15 K, 101.325 kPa as NO2, corrected to 3 % O2", gas="ambient O2 21 %", owe="kg/h",
                       emission="flow 50000 m3/h at 273.15 K, 101.325 kPa, dry")["problems"]
    assert [problem["field"] for problem in problems] == ["gas.oxygen"] and "no mass rate" in problems[0]["message"] and "measured oxygen" in problems[0]["hint"]
    problems = restate(hold="NOx 200 mg/m3 dry at 273.15 K, 101.325 kPa as NO2", gas="9 % O2 dry, ambient O2 21 %", owe="kg/h at 11 % O2",
                       emission="flow 50000 m3/h at 273.15 K, 101.325 kPa, dry")["problems"]
    assert "not corrected for oxygen" in problems[0]["message"]


@pytest.mark.parametrize(("owe", "kilograms"), [("t/a", 1000.0), ("short ton/a", 907.18474), ("long ton/a", 1016.0469088)])
def test_three_tons(owe: str, kilograms: float) -> None:
    """2000 lb and 2240 lb of 0.45359237 kg; 8760 h a year."""
    sheet = {"hold": "CO 30 mg/m3 dry at 0 °C, 101.325 kPa", "owe": owe}
    assert figure(**sheet, emission="flow 42000 m3/h at 0 °C, 101.325 kPa, dry") == pytest.approx(30e-6 * 42000 * 8760 / kilograms, rel=1e-9)
    assert figure(**sheet, emission="flow 42000 m3/h at 0 °C, 101.325 kPa, dry, 6500 h/a") == pytest.approx(30e-6 * 42000 * 6500 / kilograms, rel=1e-9)


def test_a_bare_ton_is_a_doubt() -> None:
    result = restate(hold="CO 30 mg/m3 dry at 0 °C, 101.325 kPa", owe="ton/a", emission="flow 42000 m3/h at 0 °C, 101.325 kPa, dry", usual=False)
    doubt = next(doubt for doubt in result["doubts"] if doubt["id"] == "owe.ton")
    assert result["figure"] is None and [reading["id"] for reading in doubt["readings"]] == ["metric", "short", "long"] and doubt["usual"] is None


def test_per_output_and_per_product_by_hand() -> None:
    sheet = {"hold": "CO 30 mg/m3 dry at 0 °C, 101.325 kPa"}
    flow = "flow 42000 m3/h at 0 °C, 101.325 kPa, dry"
    assert figure(**sheet, owe="g/kWh", emission=f"{flow}, output 5 MW net") == pytest.approx(1260 / 5000, rel=1e-12)
    assert figure(**sheet, owe="lb/GWh", emission=f"{flow}, output 5 MW gross") == pytest.approx(1.260 / 0.45359237 / 0.005, rel=1e-9)
    assert figure(**sheet, owe="kg/t", emission=f"{flow}, product 12 t/h") == pytest.approx(1.260 / 12, rel=1e-12)
    assert "gross or net not stated" in restate(**sheet, owe="g/kWh", emission=f"{flow}, output 5 MW")["figure"]["basis"]


def test_the_uncertainty_of_every_input_of_the_route_is_in_the_budget() -> None:
    result = restate(hold="CO 30 ± 2 mg/m3 (k=2) dry at 0 °C, 101.325 kPa", gas="12 ± 1 % H2O, 182 ± 4 °C, 100 kPa, M 28.8 g/mol", owe="kg/h",
                     emission="duct 1.80 ± 0.02 m diameter, pitot Cp 0.84 ± 0.01, dp 120, 130 Pa")
    assert {row["field"] for row in result["uncertainty"]["rows"]} == {"hold.value", "gas.water_content", "gas.temperature", "emission.diameter", "emission.pitot"}
    relative = {row["field"]: row["contribution"] / result["figure"]["value"] for row in result["uncertainty"]["rows"]}
    assert relative["emission.diameter"] == pytest.approx(2 * 0.01 / 1.80, rel=1e-6)           # area goes as the square
    assert relative["gas.temperature"] == pytest.approx(0.5 * 2 / 455.15, rel=1e-6)            # amount as 1/T, velocity as sqrt T: 1/sqrt T in all
