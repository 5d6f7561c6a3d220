"""Every registered relation: right dimensions, one formula for floats and for tracing, every kind of number, no choices.

The values themselves are held against published ones in tests/published.
"""
from __future__ import annotations

import math
import re
from importlib import resources

import pint
import pytest
import uncertainties
from uncertainties import umath

from gasbasis import relations
from gasbasis.errors import OutOfRange
from gasbasis.physics import elementary
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.trace import Traced, formula_tree, plain_text, python_source, trace

EVERY = (*relations.every(), relations.molar_mass_of_mixture(3), relations.molar_mass_of_mixture_by_mass(3), relations.summation_factor_of_mixture(3), relations.mean_of(3), relations.mean_of_roots(3))
each_relation = pytest.mark.parametrize("relation", EVERY, ids=lambda relation: relation.id)

# An ordinary value of each argument, in SI, by name; the same quantity has the same name in every relation.
ORDINARY = {
    "x": 2e-4, "w": 3e-4, "gamma": 5e-4, "c": 8e-3, "p_i": 20.0, "q": 9e-6, "p": 101.0e3, "T": 295.0, "Z": 0.9995, "R": 8.314462618,
    "M": 0.046, "M_gas": 0.0289, "V_m": 0.02445, "p_1": 98e3, "p_2": 101325.0, "T_1": 290.0, "T_2": 273.15, "Z_1": 0.9996, "Z_2": 0.9994,
    "y": 1.5e-4, "h": 0.12, "A": 0.209, "O_wet": 0.07, "O_dry": 0.08, "O_ref": 0.11, "O": 0.085, "O_hold": 0.06, "O_owe": 0.03,
    "CO2": 0.09, "M_O2": 0.032, "M_CO2": 0.044, "M_N2": 0.028, "CO2_wet": 0.085, "CO2_ref": 0.12, "O2": 0.08, "n": 3.0, "M_as": 0.046, "M_dry": 0.0297, "M_water": 0.018015,
    "M_air": 0.028965, "M_O2": 0.032, "M_CO2": 0.044, "M_N2": 0.028, "x_1": 0.7, "x_2": 0.2, "x_3": 0.1, "M_1": 0.016, "M_2": 0.03, "M_3": 0.028, "s_1": 0.045, "s_2": 0.09,
    "y_1": 1.4e-4, "y_2": 1.5e-4, "y_3": 1.7e-4, "w_1": 0.7, "w_2": 0.2, "w_3": 0.1, "s_3": 0.017, "tau": 0.544, "T_c": 647.096, "p_c": 22.064e6, "a_1": -7.86, "a_2": 1.84, "a_3": -11.8, "a_4": 22.7, "a_5": -16.0,
    "a_6": 1.8, "T_t": 273.16, "theta": 0.93, "p_t": 611.657, "b_1": 0.0033, "b_2": 1.21, "b_3": 1.70, "e": 2300.0, "phi": 0.6,
    "p_s": 2339.0, "p_w": 1800.0, "T_d": 298.0, "T_w": 290.0, "V_l": 5e-5, "rho": 998.2, "m": 0.05, "V_read": 0.8, "Y": 0.995, "V": 0.79,
    "n_w": 2.8, "n_g": 33.0, "g": 0.1, "r": 0.06, "X": 0.11, "h_r": 0.008, "p_b": 99e3, "p_g": -120.0, "p_0": 101325.0, "T_0": 288.15,
    "C_p": 0.84, "K": 2.66, "pi": math.pi, "t_a": 8760.0, "D": 1.8, "a": 1.2, "b": 2.1, "v": 14.0, "q": 12.0, "m_dry": 0.1,
    "E": 2e-11, "P": 2e7, "F_d": 2.3e-7, "F_w": 2.8e-7, "F_c": 2.8e-8, "B": 0.027, "K_h": 22.7, "K_c": 9.55, "K_s": 3.56, "K_n": 0.874, "K_o": 2.87, "C": 0.75, "N": 0.014,
    "S": 0.012, "Q": 29e6, "dp_1": 120.0, "dp_2": 130.0, "dp_3": 141.0, "V_end": 1.3248, "V_start": 1.2043, "m_front": 12e-12, "m_back": 0.4e-12, "m_blank": 0.3e-12,
    "gamma_a": 1.0e-10, "gamma_b": 1.1e-10, "t": 3600.0, "n_c": 1.8e-4, "n_d": 3.3e-3, "e_2": 1.89, "e_3": 2.0, "e_4": 8.0, "e_5": 8.5, "e_6": 9.0, "d_0": 2858.0, "d": 2858.4, "p_T": 28840.0, "p_d": 1857.0, "f": 1.0, "L": 0.0065, "H": 420.0, "p_sl": 101500.0, "z": 0.05, "s": 0.048,
}
# Where the same letter is another quantity, or another range, in one relation.
IN_ONE = {
    "duct_velocity": {"M": 0.0288, "s": 11.4}, "volume_flow": {"A": 2.5}, "dry_gas_factor": {"H": 0.051, "O": 0.079}, "mass_for_recovery": {"r": 0.96, "m": 12e-12},
    "mass_less_blank": {"m": 12e-12}, "mass_concentration_of_sample": {"m": 12e-12, "V": 0.12}, "mass_per_product": {"m": 0.002, "r": 3.0}, "mass_rate": {"gamma": 2e-4},
    "mass_concentration_of_permeation": {"m": 2e-12, "q": 2.5e-5}, "amount_flow": {"q": 4e-6}, "mass_of_vapour": {"gamma": 1.4e-5, "V": 1e-7},
    "mass_concentration_of_injection": {"m": 1.4e-12, "V": 0.002}, "saturated_mass_concentration": {"A": -8.134459741, "B": 3240.871534, "D": 3.21652261},
    "vapour_pressure_of_mercury": {"T_c": 1764.0, "p_c": 167e6, "a_1": -4.57618368, "a_2": -1.40726277, "a_3": 2.36263541, "a_4": -31.0889985, "a_5": 58.0183959, "a_6": -27.6304546},
    "mass_concentration_of_vapour": {"p_s": 0.17, "M": 0.20059}, "mean_rate": {"V": 0.12}, "carbon_dioxide_factor": {"K_c": 2.0}, "mass_per_output": {"m": 0.002},
    "mass_per_heat_from_mass_rate": {"m": 0.002},
    "amount_density_step": {"p": 6e6, "p_0": 5.99e6, "T": 288.15, "T_0": 288.0}, "compression_factor_from_amount_density": {"p": 6e6, "T": 288.0},
    "vapour_pressure_from_wet_bulb": {"A": 6.62e-4}, "barometer_at_altitude": {"g": 9.80665, "M": 0.0289644},
    "barometer_from_sea_level": {"g": 9.80665, "M": 0.0289644}, "liquid_column": {"g": 9.80665, "rho": 13595.1},
    "sublimation_pressure_over_ice": {"a_1": -21.2, "a_2": 27.3, "a_3": -6.1}, "reduced_temperature": {"T": 253.0},
}


def ordinary(relation: Relation) -> dict[str, float]:
    return {name: {**ORDINARY, **IN_ONE.get(relation.id, {})}[name] for name in relation.symbols}


@pytest.fixture(scope="module")
def proof() -> pint.UnitRegistry:
    """Our units, and beside them amount and mass of the species and of the gas as dimensions of their own."""
    registry = pint.UnitRegistry(None, cache_folder=None)
    registry.load_definitions(resources.files("gasbasis.language").joinpath("units.txt").read_text("utf-8").splitlines())
    for name in ("mol_s", "mol_g", "kg_s", "kg_g"):
        registry.define(f"{name} = [{name}]")
    return registry


def in_notation(text: str) -> str:
    """A unit as the records print it, in pint's notation."""
    return "dimensionless" if text == "1" else re.sub(r"(?<![a-z_])([ms])([23])", r"\1**\2", text.replace(" K)", "*K)"))


def proof_unit(symbol: Symbol, registry: pint.UnitRegistry) -> pint.Unit:
    return registry.Unit(in_notation(symbol.proof or symbol.unit))


def _pint_handler(name: str, value):
    """exp, log, sqrt of a quantity of the proof: sqrt has a dimension, exp and log take none."""
    if name == "sqrt":
        return value ** 0.5
    return getattr(math, name)(value.to("dimensionless").magnitude) * (value / value)


@pytest.fixture(autouse=True)
def handlers(monkeypatch):
    monkeypatch.setitem(elementary._HANDLERS, "pint", _pint_handler)
    monkeypatch.setitem(elementary._HANDLERS, "uncertainties", lambda name, value: getattr(umath, name)(value))


def prove(relation: Relation, registry: pint.UnitRegistry) -> None:
    """Raises unless the formula, worked with quantities, gives the dimension its result says."""
    values = ordinary(relation)
    result = relation(**{name: registry.Quantity(values[name], proof_unit(symbol, registry)) for name, symbol in relation.symbols.items()})
    assert result.dimensionality == proof_unit(relation.result, registry).dimensionality


# --- one test over the register for each use a relation is made for


@each_relation
def test_the_dimensions_are_right(relation, proof):
    prove(relation, proof)


@pytest.mark.parametrize(("relation", "name"), [
    pytest.param(relation, name, id=f"{relation.id}-{name}")
    for relation in EVERY for name, symbol in relation.symbols.items() if (symbol.proof or symbol.unit) not in ("1", "dimensionless")])
def test_the_proof_sees_each_argument(relation, name, proof):
    """An argument that is given another dimension makes the proof fail: it passes nowhere by being blind."""
    symbol = relation.symbols[name]
    wrong = {**relation.symbols, name: Symbol(symbol.letter, symbol.mark, symbol.unit, symbol.meaning, "kg_s**2*K**3")}
    broken = Relation(relation.id, relation.title, relation.function, relation.result, wrong, relation.source)
    with pytest.raises((AssertionError, pint.DimensionalityError)):
        prove(broken, proof)


@each_relation
def test_the_si_unit_and_the_proof_unit_agree(relation, proof):
    """A proof unit is the SI unit with its moles and kilograms told apart, nothing else."""
    plain = {"[mol_s]": "[substance]", "[mol_g]": "[substance]", "[kg_s]": "[mass]", "[kg_g]": "[mass]"}
    for symbol in (*relation.symbols.values(), relation.result):
        merged: dict[str, float] = {}
        for dimension, power in proof_unit(symbol, proof).dimensionality.items():
            merged[plain.get(dimension, dimension)] = merged.get(plain.get(dimension, dimension), 0) + power
        assert {key: power for key, power in merged.items() if power} == dict(proof.Unit(in_notation(symbol.unit)).dimensionality), symbol


@each_relation
def test_the_formula_shown_is_the_function_computed(relation):
    values = ordinary(relation)
    names = {"exp": elementary.exp, "log": elementary.log, "sqrt": elementary.sqrt}
    assert eval(python_source(trace(relation)), {"__builtins__": {}, **names}, values) == relation(**values)   # to the last bit


@each_relation
def test_every_argument_stands_in_the_formula(relation):
    def leaves(node) -> set[str]:
        if not isinstance(node, Traced):
            return set()
        return {node.args[0]} if node.op == "leaf" else set().union(*(leaves(arg) for arg in node.args))
    assert leaves(trace(relation)) == set(relation.symbols)
    text = plain_text(formula_tree(relation))
    assert all(symbol.letter in text for symbol in relation.symbols.values())


@each_relation
def test_uncertain_numbers_carry_the_derivatives(relation):
    """The partial derivative by each argument, against a central difference."""
    values = ordinary(relation)
    uncertain = {name: uncertainties.ufloat(value, abs(value) * 1e-3) for name, value in values.items()}
    result = relation(**uncertain)
    assert result.nominal_value == pytest.approx(relation(**values), rel=1e-13)
    largest = max(abs(result.derivatives[uncertain[name]] * value) for name, value in values.items())
    for name, value in values.items():
        step = abs(value) * 1e-5
        difference = (relation(**{**values, name: value + step}) - relation(**{**values, name: value - step})) / (2 * step)
        assert result.derivatives[uncertain[name]] * value == pytest.approx(difference * value, rel=1e-5, abs=1e-8 * largest), name


@each_relation
def test_the_bounds_hold_for_ordinary_values_and_refuse_the_rest(relation):
    values = ordinary(relation)
    assert math.isfinite(relation.value(**values))
    for bound in relation.validity:
        for end, outside in ((bound.low, lambda end: end - abs(end) * 1e-6 - 1e-9), (bound.high, lambda end: end + abs(end) * 1e-6 + 1e-9)):
            number = values[end] if isinstance(end, str) else end
            if math.isfinite(number):
                with pytest.raises(OutOfRange) as caught:
                    relation.value(**{**values, bound.argument: outside(number)})
                assert caught.value.hint and caught.value.argument in relation.symbols


@each_relation
def test_a_record_is_complete(relation):
    assert relation.title and relation.function.__doc__ or relation.id.endswith("_of_3")
    for symbol in (*relation.symbols.values(), relation.result):
        assert symbol.letter and symbol.unit and symbol.meaning
    for bound in relation.validity:
        assert bound.argument in relation.symbols and bound.need and bound.cure
        assert all(end in relation.symbols for end in (bound.low, bound.high) if isinstance(end, str))


def test_every_source_is_a_fact():
    from gasbasis import facts
    for relation in EVERY:
        assert facts.source(relation.source).title


# --- the checks themselves


def test_a_relation_may_not_choose():
    quantity = Traced("leaf", ("x",))
    for choose in (lambda x: x > 1, lambda x: x >= 1, lambda x: x < 1, lambda x: x <= 1, lambda x: x == 1, lambda x: x != 1, bool, float, int,
                   abs, lambda x: max(x, 0.0), lambda x: x if x else 0.0):
        with pytest.raises(TypeError, match="may not"):
            choose(quantity)

    def clipped(x):
        return x if x > 0 else 0.0
    relation = Relation("clipped", "Clipped", clipped, Symbol("y", "", "1", "a share"), {"x": Symbol("x", "", "1", "a share")}, "common-practice")
    with pytest.raises(TypeError, match="compare"):
        trace(relation)


def test_a_volume_fraction_is_not_a_mass_fraction(proof):
    """What the proof's own dimensions are for: w = x passes plain SI and fails here."""
    share = relations.get("amount_fraction_from_mass_fraction")
    wrong = Relation("wrong", "Wrong", lambda w: w * 1, share.result, {"w": share.symbols["w"]}, "common-practice")
    with pytest.raises(AssertionError):
        prove(wrong, proof)


def test_symbols_must_match_the_arguments():
    with pytest.raises(TypeError, match="do not match"):
        Relation("odd", "Odd", lambda a, b: a + b, Symbol("y", "", "1", "sum"), {"a": Symbol("a", "", "1", "first")}, "common-practice")


def test_ids_are_unique_and_found():
    identities = [relation.id for relation in relations.every()]
    assert len(set(identities)) == len(identities)
    assert all(relations.get(identity).id == identity for identity in identities)
    with pytest.raises(KeyError):
        relations.get("no_such_relation")


def test_a_complex_number_is_refused():
    above_the_air = {**ordinary(relations.get("barometer_at_altitude")), "H": 10_900.0, "L": 0.05}
    with pytest.raises(OutOfRange):
        relations.get("barometer_at_altitude").value(**above_the_air)      # a negative base to a fractional power


def test_a_bound_may_name_another_argument():
    bound = Bound("e", "it lies below p", "Check it.", low=0.0, high="p")
    assert bound.holds({"e": 1.0, "p": 2.0}) and not bound.holds({"e": 2.0, "p": 2.0})


# --- rising and falling as they must


def moved(identity: str, **changes: float) -> tuple[float, float]:
    relation = relations.get(identity)
    values = ordinary(relation)
    return relation.value(**values), relation.value(**{**values, **changes})


@pytest.mark.parametrize(("identity", "change", "rises"), [
    ("mass_concentration_from_amount_fraction", {"p": 110e3}, True), ("mass_concentration_from_amount_fraction", {"T": 320.0}, False),
    ("amount_fraction_from_mass_concentration", {"p": 110e3}, False), ("amount_fraction_from_mass_concentration", {"T": 320.0}, True),
    ("molar_volume", {"T": 320.0}, True), ("molar_volume", {"p": 110e3}, False),
    ("water_from_vapour_pressure", {"p": 110e3}, False), ("water_from_vapour_pressure", {"e": 2400.0}, True),
    ("vapour_pressure_from_wet_bulb", {"T_d": 299.0}, False), ("amount_of_metered_gas", {"T": 300.0}, False),
    ("barometer_at_altitude", {"H": 500.0}, False), ("barometer_from_sea_level", {"p_sl": 102e3}, True),
    ("compression_factor", {"p": 105e3}, False), ("density", {"p": 105e3}, True), ("density", {"T": 300.0}, False),
    ("dry_from_wet", {"h": 0.13}, True), ("wet_from_dry", {"h": 0.13}, False), ("dry_from_cooled", {"h_r": 0.009}, True),
])
def test_it_rises_or_falls(identity, change, rises):
    before, after = moved(identity, **change)
    assert (after > before) is rises and after != before


@pytest.mark.parametrize(("identity", "values", "by_hand"), [
    ("metered_volume", {"V_read": 0.8, "Y": 0.99}, 0.792),
    ("mass_of_collected_water", {"V_l": 2e-4, "rho": 998.0}, 0.1996),
    ("relative_density", {"M_gas": 0.0435, "M_air": 0.029}, 1.5),
    ("vapour_pressure_from_relative_humidity", {"phi": 0.4, "p_s": 2500.0}, 1000.0),
    ("vapour_pressure_from_wet_bulb", {"p_w": 2000.0, "A": 6e-4, "p": 1e5, "T_d": 300.0, "T_w": 290.0}, 1400.0),
    ("dry_from_cooled", {"y": 99.0, "h_r": 0.01}, 100.0), ("wet_from_cooled", {"y": 99.0, "h": 0.2, "h_r": 0.01}, 80.0),
    ("water_from_water_per_dry_gas", {"X": 0.25}, 0.2), ("water_from_amounts", {"n_w": 1.0, "n_g": 4.0}, 0.2),
])
def test_a_value_worked_by_hand(identity, values, by_hand):
    """Where dimensions alone would not see a factor upside down."""
    assert relations.get(identity).value(**values) == pytest.approx(by_hand, rel=1e-12)
