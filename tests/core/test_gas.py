"""What is said of the gas. Expected values are read off the texts by hand."""
from __future__ import annotations

import pytest

from gasbasis.language.gas import read_gas


def fields(text: str) -> dict:
    gas, problems = read_gas(text)
    assert not problems, [problem.message for problem in problems]
    found = {name: f"{getattr(gas, name).number.decimal} {getattr(gas, name).unit.id}" for name in
             ("water_content", "oxygen", "carbon_dioxide", "ambient_oxygen", "temperature", "pressure") if getattr(gas, name)}
    found |= {name: getattr(gas, name) for name in ("oxygen_water", "carbon_dioxide_water") if getattr(gas, name)}
    if gas.matrix_gas:
        found["gas"] = gas.matrix_gas.id
    return found


@pytest.mark.parametrize(("text", "expected"), [
    ("12 % H2O, 9.2 % O2 dry, ambient O2 20.9 %, in combustion gas",
     dict(water_content="12 %", oxygen="9.2 %", oxygen_water="dry", ambient_oxygen="20.9 %", gas="combustion_gas")),
    ("O2 9,2 % (dry); CO2 10,1 %; nitrogen", dict(oxygen="9.2 %", oxygen_water="dry", carbon_dioxide="10.1 %", gas="nitrogen")),
    ("wet O2 7.9 %", dict(oxygen="7.9 %", oxygen_water="wet")),
    ("moisture 14 %", dict(water_content="14 %")),
    ("H2O: 14 vol%", dict(water_content="14 %")),
    ("water vapour 14,2 %, O2 9.2 % wet", dict(water_content="14.2 %", oxygen="9.2 %", oxygen_water="wet")),
    ("M 28.9 g/mol", dict(gas="stated")), ("MW = 28.9 g/mol", dict(gas="stated")), ("dry air", dict(gas="dry_air")), ("in N2", dict(gas="nitrogen")),
    ("182 °C, 1008 hPa", dict(temperature="182 degC", pressure="1008 hPa")),
    ("CH4 93.3, C2H6 2.6, C3H8 1.5, CO2 1.6, N2 1.0", dict(gas="composition")),
    ("CH4 93,3; C2H6 2,6; C3H8 1,5; CO2 1,6; N2 1,0", dict(gas="composition")),
    ("CH4: 93.3 %\nC2H6: 2.6 %\nN2: 4.1 %", dict(gas="composition")),
    ("methane 96 %, ethane 3 %, nitrogen 1 %", dict(gas="composition")),
])
def test_gas_as_written(text: str, expected: dict) -> None:
    assert fields(text) == expected


@pytest.mark.parametrize(("text", "message"), [
    ("CH4 60, N2 10", "adds up to 70 %"), ("CH4 50, CH4 50", "given twice"), ("CH4 93.3, Xx2 6.7", "Xx"), ("natural gas", "does not give a molar mass"),
    ("14", "has no unit"), ("12 % H2O, 13 % H2O", "contradicts")])
def test_a_gas_that_cannot_be_read_says_why(text: str, message: str) -> None:
    _, problems = read_gas(text)
    assert any(message in problem.message for problem in problems), [problem.message for problem in problems]
    assert all(problem.hint for problem in problems)
