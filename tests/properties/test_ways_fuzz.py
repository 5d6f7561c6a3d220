"""Whatever is typed in the lines on sample, prepared gas and emission: nothing raises, every place lies in the text, nothing is dropped."""
from __future__ import annotations

import json

from hypothesis import given, settings
from hypothesis import strategies as st

from gasbasis.answer import answer
from gasbasis.language.emission import read_emission
from gasbasis.language.prepared import read_prepared
from gasbasis.language.sample import read_sample

WORDS = ("Hg", "NO", "12.4 ng", "± 5 %", "(k=2)", "field blank 0.3 ng", "subtracted", "recovery 96 %", "corrected", "meter 1204.3 L to 1324.8 L", "1204 - 1300 L", "Y 1.012", "meter 24 °C",
         "barometer 98.2 kPa", "dry", "wet", "saturated", "trap A:", "trap B:", "60 min", "leak 0.02 L/min", "cylinder", "998 ppm", "250 mL/min", "at 0 °C", "101.325 kPa", "in", "permeation",
         "120 ng/min", "nitrogen", "saturated mercury vapour", "100 uL", "Dumarey", "duct 1.8 m", "1.2 x 2.1 m", "pitot Cp 0.84", "dp 12, 13 mmH2O", "dp", "flow 42000 m3/h", "11 % O2", "actual",
         "fuel natural gas", "fuel C 75, H 5", "fuel", "gross", "net", "29.5 MJ/kg", "20 MW", "output 5 MW", "by CO2", "6500 h/a", "product 12 t/h", "-", ",", ";", "<", "1e99", "0", "-3", "λ", "meter", "Y", "F")
texts = st.one_of(st.lists(st.sampled_from(WORDS), max_size=9).map(" ".join), st.lists(st.sampled_from(WORDS), max_size=9).map(", ".join), st.text(max_size=60))


@settings(max_examples=300, deadline=None)
@given(text=texts)
def test_a_line_is_read_or_named(text: str) -> None:
    for read in (read_sample, read_prepared, read_emission):
        record, problems = read(text)
        for piece in record.pieces:
            assert 0 <= piece.span[0] < piece.span[1] <= len(text) and text[slice(*piece.span)] == piece.text
        for problem in problems:
            assert problem.message and (problem.span is None or 0 <= problem.span[0] <= problem.span[1] <= len(text))


@settings(max_examples=120, deadline=None)
@given(text=texts, side=st.sampled_from(("sample", "prepared", "emission")), owe=st.sampled_from(("ug/m3 at 20 °C, 1 atm", "kg/h", "ng/J", "g/kWh", "ppm by volume", "t/a", "kg/t")))
def test_the_door_never_fails(text: str, side: str, owe: str) -> None:
    sheet = {side: text, "owe": owe, "gas": "12 % H2O, 7 % O2 dry, ambient O2 21 %, 9 % CO2 dry, 182 °C, 100 kPa, M 28.8 g/mol", "hold": "SO2 80 mg/m3 dry at 0 °C, 1 atm" if side == "emission" else ""}
    reply = json.loads(answer(json.dumps({"task": "restate", "usual": True, "quick": True, "sheet": sheet})))
    assert reply["ok"], reply["error"]
    result = reply["answer"]
    assert result["figure"] or result["problems"] or result["doubts"]
    if result["figure"] and side in result:
        assert not [problem for problem in result["problems"] if problem["field"].startswith(side)]
