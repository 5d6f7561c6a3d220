"""Any text is read without an error of ours and with places that hold; statements put together are read back whole."""
from __future__ import annotations

import json
import time
from decimal import Decimal

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from gasbasis.answer import answer
from gasbasis.errors import NotUnderstood
from gasbasis.language.edit import edit
from gasbasis.language.gas import read_gas
from gasbasis.language.species import find
from gasbasis.language.statement import LONGEST, read_statement

SIDES = ("hold", "owe", "limit", "gas")
quick = settings(max_examples=150, deadline=None, derandomize=True, suppress_health_check=list(HealthCheck))

# --- any text ---

WORDS = ("NOx", "SO2", "Hg", "mercury", "(CH3)2S", "n-hexane", "142", "8,3", "1,234", "1 234,5", "-2", "1e-3", "10⁻³", "< 0.5", "±", "+/-", "5 %", "k=2",
         "ppm", "ppmvd", "ppb(v/v)", "vol%", "mg/m3", "µg/Nm³", "mg/dscm", "gr/100 scf", "lb/MMscf", "ng/L", "mg m-3", "mg", "umol/mol", "Pa", "in 1013 hPa",
         "20 °C", "273.15 K", "68 °F", "101.3 kPa", "62 barg", "14.73 psia", "1 atm", "dry", "wet", "i.N.tr.", "STP", "normal", "at", "@", "15 % O2", "O2 9.2 %",
         "14 % H2O", "corrected to", "ref.", "measured", "as NO2", "as C", "by volume", "m/v", "in nitrogen", "in air", "in", "not more than", "at least", "max.",
         "between", "5-10", "to", "and", "or less", "≤", ">", "8-h TWA", "15 min", "daily mean", "approx.", "~", "(", ")", "[2]", "*", ",", ";", ":", "=", ".", "-",
         "-\n", "\u00ad", "\u200b", "\t", "\r\n", "  ", "é", "水", "🌡", "<b>", "CH4 93.3", "N2 1.0", "M 17.4 g/mol", "ambient O2 21 %", "A=21", "\u0130", "²", "٣")
texts = st.one_of(st.text(max_size=60), st.lists(st.sampled_from(WORDS), max_size=12).map(" ".join), st.lists(st.sampled_from(WORDS), max_size=12).map("".join))


def read(text: str, side: str):
    return read_gas(text) if side == "gas" else read_statement(text, side)


@settings(quick, max_examples=150)
@given(text=texts, side=st.sampled_from(SIDES))
def test_any_text_is_read_and_every_place_holds(text: str, side: str) -> None:
    record, problems = read(text, side)
    assert record.text == text
    for piece in record.pieces:
        start, end = piece.span
        assert 0 <= start < end <= len(text) and text[start:end] == piece.text
    for problem in problems:
        assert problem.message and problem.hint and problem.field.startswith(side)
        if problem.span is not None:
            assert 0 <= problem.span[0] <= problem.span[1] <= len(text)


@settings(quick, max_examples=100)
@given(text=texts, side=st.sampled_from(SIDES), field=st.sampled_from(("value", "water", "oxygen", "temperature", "species", "matrix_gas")), to=texts)
def test_any_edit_reads_or_is_refused(text: str, side: str, field: str, to: str) -> None:
    try:
        changed = edit(text, side, field, to)
    except NotUnderstood as error:
        assert error.message and error.hint and error.field
    else:
        assert any(piece.field == field for piece in read(changed, side)[0].pieces) == bool(to.strip())


# --- statements put together from their parts ---

NUMBERS = (("142", "142"), ("8,3", "8.3"), ("0.05", "0.05"), ("1 234,5", "1234.5"), ("1.2e-3", "0.0012"), ("4.2 x 10^2", "420"), ("-2", "-2"), ("1·10⁻³", "0.001"))
SPECIES = ("NOx", "SO2", "mercury", "hydrogen sulfide", "n-hexane", "CO", "C6H5Cl", "HgCl2")
# as written -> unit, and what is glued to it
UNITS = (("mg/m3", "mg/m3", {}), ("µg/m³", "ug/m3", {}), ("mg/Nm³", "mg/m3", {"conditions_word": "normal"}), ("ng/L", "ng/L", {}), ("ppm", "ppm", {}),
         ("ppmv", "ppm", {"parts_by": "volume"}), ("ppb (m/m)", "ppb", {"parts_by": "mass"}), ("gr/100 scf", "gr/(100 ft3)", {"conditions_word": "standard"}),
         ("umol/mol", "umol/mol", {}), ("mg/kg", "mg/kg", {}), ("mg m⁻³", "mg/m3", {}), ("mmol/m3", "mmol/m3", {}))
TEMPERATURES = (("20 °C", 293.15), ("273.15 K", 273.15), ("68 °F", 293.15))
PRESSURES = (("101.325 kPa", 101325), ("1013 hPa", 101300), ("1 atm", 101325), ("14.696 psia", 101325.35))
OXYGENS = (("at 11 % O2", "11", None), ("@ 15% O2", "15", None), ("corrected to 3 % O2", "3", "corrected"), ("measured at 9,2 % O2", "9.2", "measured"))
AVERAGES = ("8-h TWA", "daily mean", "STEL", "hourly average")
MATRICES = (("in nitrogen", "nitrogen"), ("in air", "dry_air"), ("in flue gas", "combustion_gas"))
SEPARATORS = (", ", "; ", " ", ",\n", "  ")


@st.composite
def statements(draw) -> tuple[str, dict]:
    """A text and the fields it must be read to."""
    number, value = draw(st.sampled_from(NUMBERS))
    written, unit, glued = draw(st.sampled_from(UNITS))
    fields = {"value": Decimal(value), "unit": unit, **glued}
    amount = f"{number} {written}"
    parts = []
    if draw(st.booleans()):
        name = draw(st.sampled_from(SPECIES))
        fields["species"] = find(name)
        amount = draw(st.sampled_from((f"{name} {amount}", f"{name}: {amount}", f"{name} = {amount}", f"{amount} {name}", f"{amount} of {name}")))
    for field, options in (("temperature", TEMPERATURES), ("pressure", PRESSURES), ("oxygen", OXYGENS), ("water", ("dry", "wet")),
                           ("averaging", AVERAGES), ("matrix_gas", MATRICES), ("reported_as", ("as NO2", "as C"))):
        if not draw(st.booleans()):
            continue
        option = draw(st.sampled_from(options))
        if field == "oxygen":
            text, fields["oxygen"], fields["oxygen_meaning"] = option[0], Decimal(option[1]), option[2]
        elif field == "reported_as":
            text, fields[field] = option, find(option.removeprefix("as "))
        else:
            text, fields[field] = (option, option) if isinstance(option, str) else option
        parts.append(text)
    separator = draw(st.sampled_from(SEPARATORS))
    parts = draw(st.permutations(parts))
    bracketed = draw(st.booleans()) and bool(parts)
    rest = separator.join(parts)
    return amount + (f" ({rest})" if bracketed else f"{separator if rest else ''}{rest}"), fields


def fields_of(statement) -> dict:
    found = {name: getattr(statement, name) for name in ("species", "parts_by", "conditions_word", "water", "averaging", "oxygen_meaning", "reported_as")}
    found |= {"value": statement.value.number.decimal, "unit": statement.unit.id,
              "temperature": statement.temperature and round(statement.temperature.si, 2), "pressure": statement.pressure and round(statement.pressure.si, 2),
              "oxygen": statement.oxygen and statement.oxygen.number.decimal, "matrix_gas": statement.matrix_gas and statement.matrix_gas.id}
    return {name: value for name, value in found.items() if value is not None}


@settings(quick, max_examples=150)
@given(statements())
def test_what_was_put_together_is_read_back(case: tuple[str, dict]) -> None:
    text, expected = case
    statement, problems = read_statement(text, "hold")
    assert not problems, (text, [problem.message for problem in problems])
    assert fields_of(statement) == {name: value for name, value in expected.items() if value is not None}, text


OTHERS = {"temperature": "37 °C", "pressure": "98 kPa", "water": ("wet", "dry"), "oxygen": "5 % O2", "reported_as": "as SO2", "matrix_gas": "in nitrogen"}


@settings(quick, max_examples=100)
@given(statements(), st.sampled_from(sorted(OTHERS)))
def test_an_edit_there_and_back_keeps_everything_else(case: tuple[str, dict], field: str) -> None:
    text, expected = case
    statement, _ = read_statement(text, "hold")
    pieces = [piece for piece in statement.pieces if piece.field == field]
    to = OTHERS[field] if isinstance(OTHERS[field], str) else next(word for word in OTHERS[field] if word != statement.water)
    there = edit(text, "hold", field, to)
    changed, problems = read_statement(there, "hold")
    assert not problems, there
    # "corrected to" goes or stays with the oxygen it belongs to
    kept = lambda record: {name: value for name, value in fields_of(record).items() if name not in (field, f"{field}_meaning")}
    assert kept(changed) == kept(statement), there
    back = edit(there, "hold", field, pieces[0].text if pieces else "")
    assert back == text if pieces else fields_of(read_statement(back, "hold")[0]) == fields_of(statement), (text, there, back)


# --- the door ---

values = st.recursive(st.one_of(st.none(), st.booleans(), st.integers(), st.floats(), texts),
                      lambda inner: st.one_of(st.lists(inner, max_size=3), st.dictionaries(st.text(max_size=6), inner, max_size=3)), max_leaves=6)
sheets = st.one_of(values, st.fixed_dictionaries({}, optional={
    "hold": texts, "gas": texts, "owe": texts, "limit": texts, "rule_book": texts, "title": texts, "notes": values,
    "settled": st.dictionaries(st.sampled_from(("hold.parts_by", "owe.conditions", "x")), st.sampled_from(("volume", "mass", "")), max_size=2)}))
requests = st.one_of(texts, values.map(json.dumps), st.fixed_dictionaries(
    {"task": st.sampled_from(("restate", "edit", "search", "link", "open", "version", "worth", "nothing"))},
    optional={"sheet": sheets, "usual": st.booleans(), "text": texts, "side": st.sampled_from(SIDES), "field": st.sampled_from(("value", "water")), "to": texts,
              "what": st.sampled_from(("species", "unit", "rule_book")), "figure": texts, "code": texts}).map(json.dumps))


def strict(text: str) -> dict:
    def refuse(name: str):
        raise AssertionError(f"{name} is no JSON")
    return json.loads(text, parse_constant=refuse)


@settings(quick, max_examples=120)
@given(requests)
def test_the_door_always_answers_in_json(request: str) -> None:
    reply = strict(answer(request))
    assert reply["ok"] or reply["error"]["kind"] != "defect", reply


@pytest.mark.parametrize("request_text", ["", "{}", "[]", "null", '{"task":' * 300, "[" * 500, '{"task":"restate","sheet":{"hold":"\\ud800 1 ppm","owe":"ppb"}}',
                                          '{"task":"restate","sheet":{"hold":"1e999999999 ppm","owe":"ppb"}}', '{"task":"restate","sheet":{"hold":"1e400 ppm","owe":"ppb"}}',
                                          '{"task":"restate","sheet":{"hold":"1e-999999 mg/m3","owe":"ug/m3"}}', '{"task":' + "9" * 5000 + "}", '{"task":["restate"]}'])
def test_the_door_answers_hostile_requests(request_text: str) -> None:
    reply = strict(answer(request_text))
    assert reply["ok"] or reply["error"]["kind"] != "defect", reply


@pytest.mark.parametrize("unit_of_text", ["1 ", "(", "a,", "C", "(CH3)", "1,2-", "5-", "mg/m3 ", "-\n", "ppm", "x10^", "9 % ", "between ", "sulphur ", "n" * 9 + " "])
@pytest.mark.parametrize("side", ["hold", "gas"])
def test_no_text_takes_long(unit_of_text: str, side: str) -> None:
    text = (unit_of_text * LONGEST)[:LONGEST]
    begun = time.process_time()
    read(text, side)
    assert time.process_time() - begun < 10      # a cubic search took minutes
