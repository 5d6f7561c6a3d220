"""Saturation pressures of water over their whole range, and the meter constants of the impinger methods.

Beside test_water.py, which holds the usual temperatures and every way to a water content.
"""
from __future__ import annotations

import pytest

from gasbasis import facts, relations

# Wagner-Pruss is an auxiliary equation fitted to the same data as IAPWS-95; it states 0.025 % at most between 273 and 647 K
FITTED = 1e-4


def _equation(identity: str):
    return next(row for row in facts.table("water_saturation")["equations"] if row["id"] == identity)


def over_water(T: float) -> float:
    row = _equation("wagner-pruss")
    tau = relations.get("reduced_temperature_complement").value(T=T, T_c=float(row["Tc"]))
    return relations.get("saturation_pressure_over_water").value(
        tau=tau, T=T, T_c=float(row["Tc"]), p_c=float(row["pc"]), **{f"a_{i}": float(text) for i, text in enumerate(row["a"], start=1)})


def over_ice(T: float) -> float:
    row = _equation("iapws-r14-08")
    theta = relations.get("reduced_temperature").value(T=T, T_t=float(row["Tt"]))
    return relations.get("sublimation_pressure_over_ice").value(
        theta=theta, p_t=float(row["pt"]), **{f"{letter}_{i}": float(text) for letter in "ab" for i, text in enumerate(row[letter], start=1)})


@pytest.mark.parametrize(("T", "pascal", "within"), [
    (273.16, 611.657, 0.0005),           # the triple point, IAPWS SR1-86(1992) and R14-08 (from memory)
    (373.1243, 101325.0, 0.5),           # the normal boiling point by IAPWS-95 (from memory)
    (647.096, 22.064e6, 0.5)])           # the critical point, exact in the equation
def test_fixed_points(T: float, pascal: float, within: float) -> None:
    assert over_water(T) == pytest.approx(pascal, abs=within)


def test_water_and_ice_meet_at_the_triple_point() -> None:
    # both releases give 611.657 Pa there (from memory)
    assert over_ice(273.16) == pytest.approx(611.657, abs=0.0005)
    assert over_ice(273.16) == pytest.approx(over_water(273.16), abs=0.0005)
    assert over_ice(263.15) < over_ice(268.15) < over_ice(273.16) < over_water(273.17)


@pytest.mark.parametrize(("T", "megapascal"), [(300.0, 3.53658941e-3), (500.0, 2.63889776), (600.0, 12.3443146)])
def test_against_the_industrial_formulation(T: float, megapascal: float) -> None:
    # IAPWS-IF97, Table 35 (from memory): another equation, within 0.025 % of this one
    assert over_water(T) / 1e6 == pytest.approx(megapascal, rel=2.5e-4)


@pytest.mark.native
@pytest.mark.parametrize("T", [274.0, 290.0, 300.0, 330.0, 360.0, 400.0, 450.0, 500.0, 573.15, 640.0])
def test_over_water_against_the_library_of_iapws_95(T: float) -> None:
    iapws = pytest.importorskip("iapws")
    assert over_water(T) == pytest.approx(iapws.IAPWS95(T=T, x=0).P * 1e6, rel=FITTED)


@pytest.mark.native
@pytest.mark.parametrize("T", [60.0, 100.0, 150.0, 180.0, 200.0, 220.0, 240.0, 250.0, 260.0, 270.0])
def test_over_ice_against_the_library(T: float) -> None:
    iapws = pytest.importorskip("iapws")             # the same release, coded by others: the coefficients of our facts are theirs
    assert over_ice(T) == pytest.approx(iapws._iapws._Sublimation_Pressure(T) * 1e6, rel=1e-9)


@pytest.mark.parametrize(("kelvin", "pascal", "over"), [(282.65, 1186.581, over_water), (257.75, 159.145, over_ice)])
def test_the_goff_form_of_the_engine_rule_lies_lower(kelvin: float, pascal: float, over) -> None:
    # 40 CFR 1065.645's examples (from memory) use Goff 1957: 0.08 % below the IAPWS equations, on an older temperature scale
    assert 0.0002 < over(kelvin) / pascal - 1 < 0.0015


@pytest.mark.parametrize(("T_standard", "printed", "within"), [(293.0, 0.3855, 0.00005), (293.15, 0.3857, 0.00005)])
def test_meter_constant(T_standard: float, printed: float, within: float) -> None:
    # US EPA Methods 4 and 5 (from memory): V_std = K1 V p/T, 0.3855 K/mmHg with 293 K; an older print has 0.3858 for 293.2 K.
    # The volume at 760 mmHg of the gas metered at 1 mmHg and 1 K, by the amount metered.
    R = float(facts.constant("molar_gas_constant").number)
    amount = relations.get("amount_of_metered_gas").value(V=1.0, p=101325.0 / 760, T=1.0, Z=1.0, R=R)
    volume = amount * relations.get("molar_volume").value(Z=1.0, R=R, T=T_standard, p=101325.0)
    assert volume == pytest.approx(printed, abs=within)


def test_impinger_constant_in_customary_units() -> None:
    # US EPA Method 4 (from memory): 0.04715 ft3 of vapour per gram of water. The print is the metric 0.001335 m3/g of 293.15 K in cubic
    # feet, one in the last digit low; 528 degR, 29.92 inHg would give 0.04719.
    R, foot = float(facts.constant("molar_gas_constant").number), 0.3048 ** 3
    amount = relations.get("amount_of_collected_water").value(m=1e-3, M_water=18.015e-3)
    volume = amount * relations.get("molar_volume").value(Z=1.0, R=R, T=293.15, p=101325.0)
    assert volume / foot == pytest.approx(0.04715, abs=0.00001)
