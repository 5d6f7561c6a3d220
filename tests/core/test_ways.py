"""The lines on sample, prepared gas and emission: what is read, in any order; what is wrong and where; sheets, links, edits, terminal."""
from __future__ import annotations

import json

import pytest

from gasbasis.answer import answer
from gasbasis.language.emission import read_emission
from gasbasis.language.prepared import read_prepared
from gasbasis.language.sample import read_sample
from gasbasis.language.statement import read_statement
from gasbasis.records.link import read_code, write_code
from gasbasis.records.sheet import Sheet, read_sheet, write_sheet

READ = {"sample": read_sample, "prepared": read_prepared, "emission": read_emission}


def task(**request) -> dict:
    return json.loads(answer(json.dumps(request)))


def restate(**sheet) -> dict:
    reply = task(task="restate", usual=True, sheet=sheet)
    assert reply["ok"], reply
    return reply["answer"]


@pytest.mark.parametrize(("side", "text", "found"), [
    ("sample", "dry, barometer 98.2 kPa, meter 24 °C, meter 1204.3 L to 1324.8 L, Y 1.012, Hg 12.4 ng",
     {"mass": "12.4", "meter_start": "1204.3", "meter_end": "1324.8", "meter_factor": "1.012", "temperature": "24", "barometer": "98.2"}),
    ("sample", "Hg < 0.5 ng; gas meter readings 1204.3 - 1324.8 L; ΔH 25 mmH2O; 60 min; leak rate 0.02 L/min",
     {"mass": "< 0.5", "meter_start": "1204.3", "meter_end": "1324.8", "head": "25", "duration": "60", "leak": "0.02"}),
    ("sample", "trap A: 12.4 ng, 120.1 L, trap B: 12.9 ng, 118.8 L, Y 0.998", {"mass": "12.4", "volume": "120.1", "mass_b": "12.9", "volume_b": "118.8", "meter_factor_b": "0.998"}),
    ("prepared", "in 4.75 L/min at 20 °C 1 atm, cylinder NO 998 ppm, 250 mL/min at 0 °C 101.325 kPa",
     {"content": "998", "cylinder_flow": "250", "cylinder_temperature": "0", "flow": "4.75", "flow_temperature": "20", "flow_pressure": "1"}),
    ("prepared", "permeation rate Hg 120 ng/min into 1.5 L/min nitrogen at 0 °C, 101.325 kPa", {"permeation": "120", "flow": "1.5", "flow_temperature": "0"}),
    ("prepared", "saturated mercury vapour 100 uL at 22 °C in 2.0 L at 20 °C, 1 atm", {"vapour_volume": "100", "vapour_temperature": "22", "volume": "2.0", "volume_temperature": "20"}),
    ("emission", "pitot Cp 0.84, duct 1.8 m", {"pitot": "0.84", "diameter": "1.8"}), ("emission", "stack diameter 1.8 m, velocity 14 m/s", {"diameter": "1.8", "velocity": "14"}),
    ("emission", "20 MW gross, fuel natural gas", {"heat": "20"}), ("emission", "F 8710 dscf/MMBtu, output 5 MW net", {"factor": "8710", "output": "5"}),
    ("emission", "42 000 dscm/h", {"flow": "42 000"}), ("emission", "flow 12 000 Nm3/h dry, 6500 h/a", {"flow": "12 000", "hours": "6500"}),
])
def test_clauses_in_any_order(side, text, found) -> None:
    record, problems = READ[side](text)
    assert not problems
    assert {field: getattr(record, field).number.text for field in found} == found
    for piece in record.pieces:
        assert text[slice(*piece.span)] == piece.text


def test_points_sides_and_elements() -> None:
    points = read_emission("dp 12.1, 13.0, 14.2 mmH2O")[0].velocity_pressures
    assert [point.number.text for point in points] == ["12.1", "13.0", "14.2"] and points[0].si == pytest.approx(12.1 * 9.80665)
    assert [side.number.text for side in read_emission("duct 1.2 m x 2.1 m")[0].sides] == ["1.2", "2.1"]
    assert [element for element, _ in read_emission("fuel C 75.2, H 5.1, S 1.2, N 1.5, O 7.9")[0].analysis] == ["C", "H", "S", "N", "O"]


def test_what_a_volume_is_called() -> None:
    assert (read_sample("SO2 1 mg in 1.2 dscm")[0].volume_word, read_sample("SO2 1 mg in 1.2 dscm")[0].water) == ("standard", "dry")
    assert read_emission("flow 12 000 Nm3/h")[0].flow_word == "normal"
    assert read_prepared("cylinder NO 99 ppm, 20 sccm, in 2 slm")[0].flow_word == "standard"


@pytest.mark.parametrize(("text", "kind"), [("kg/h", "mass_rate"), ("lb/h", "mass_rate"), ("g/s", "mass_rate"), ("t/a", "mass_rate"), ("short tons per year", "mass_rate"),
                                            ("ng/J", "mass_per_energy"), ("mg/MJ", "mass_per_energy"), ("lb/MMBtu", "mass_per_energy"), ("lb/10^6 Btu", "mass_per_energy"),
                                            ("lb/TBtu", "mass_per_energy"), ("g/kWh", "mass_per_energy"), ("lb/GWh", "mass_per_energy"), ("kg/t product", "mass_fraction")])
def test_units_that_are_owed(text, kind) -> None:
    statement, problems = read_statement(text, "owe")
    assert not problems and statement.unit.kind == kind
    limit, problems = read_statement(f"not more than 12 {text}", "limit")
    assert not problems and limit.value.unit.kind == kind


# --- bad input names the field, what is needed, and the cure

@pytest.mark.parametrize(("sheet", "field", "said"), [
    ({"sample": "Hg 12 ng, volume -120 L, meter 24 °C, barometer 98 kPa"}, "sample.volume", "above zero"),
    ({"sample": "Hg 12 ng, meter 1324.8 L to 1204.3 L, meter 24 °C, barometer 98 kPa"}, "sample.meter_end", "below its start"),
    ({"sample": "Hg 12 ng, in 120 L, barometer 98 kPa"}, "sample.temperature", "temperature at the meter"),
    ({"sample": "Hg 12 ng, in 120 L, meter 24 °C"}, "sample.barometer", "pressure at the meter"),
    ({"sample": "Hg, in 120 L, meter 24 °C, barometer 98 kPa"}, "sample.mass", "mass found"), ({"sample": "Hg 12 ng, meter 24 °C, barometer 98 kPa"}, "sample.volume", "volume"),
    ({"sample": "Hg 12 ng, in 120 L, leak 0.1 L/min, meter 24 °C, barometer 98 kPa"}, "sample.duration", "duration"),
    ({"sample": "Hg 12 ng, in 120 L, recovery 0 % corrected, meter 24 °C, barometer 98 kPa"}, "sample.recovery", "above zero"),
    ({"sample": "Hg 12 ng, in 120 L, meter 24 °C, barometer 98 kPa", "hold": "Hg 1 ug/m3"}, "hold", "given twice"),
    ({"prepared": "cylinder NO 998 ppm, 250 mL/min at 0 °C, 1 atm"}, "prepared.flow", "diluted in"),
    ({"prepared": "cylinder NO 998 ppm, -250 mL/min at 0 °C, 1 atm, in 4 L/min at 0 °C, 1 atm"}, "prepared.cylinder_flow", "above zero"),
    ({"prepared": "cylinder NO 998 ppm by volume, 250 mL/min at 0 °C, in 4 L/min at 0 °C, 1 atm"}, "prepared.cylinder_pressure", "reference pressure"),
    ({"prepared": "permeation Hg 120 ng/min"}, "prepared.flow", "flow"),
])
def test_bad_input_on_the_way_to_what_is_held(sheet, field, said) -> None:
    problems = restate(owe="ug/m3 at 20 °C, 101.325 kPa", **sheet)["problems"]
    assert problems and problems[0]["field"] == field and said in problems[0]["message"] and problems[0]["hint"], problems


GAS = "12 % H2O, 7 % O2 dry, ambient O2 20.9 %, 182 °C, 100 kPa, M 28.8 g/mol"


@pytest.mark.parametrize(("emission", "owe", "field", "said"), [
    ("", "kg/h", "emission", "what makes a rate"), ("duct 1.8 m", "kg/h", "emission", "needs a flow"), ("duct 1.8 m, pitot Cp 0, dp 120 Pa", "kg/h", "emission.pitot", "above zero"),
    ("pitot Cp 0.84, dp 120 Pa", "kg/h", "emission.area", "cross-section"), ("duct 1.8 m, dp 120 Pa", "kg/h", "emission.pitot", "coefficient"),
    ("duct 1.8 m, pitot Cp 0.84, dp 120, -4 Pa", "kg/h", "emission.velocity_pressures", "not negative"), ("duct -1.8 m, velocity 12 m/s", "kg/h", "emission.diameter", "above zero"),
    ("fuel natural gas", "kg/h", "emission.heat", "heat input"), ("fuel C 0, H 12, S 0, N 0, O 0, gross 120 MJ/kg, by CO2", "ng/J", "emission.analysis", "without carbon"),
    ("fuel H 12, gross 120 MJ/kg, by CO2", "ng/J", "emission.analysis", "without carbon"), ("fuel C 75, H 5, gross 30 MJ/kg", "ng/J", "emission.analysis", "leaves out S, N, O"),
    ("fuel C 75, H 5, S 0, N 1, O 8", "ng/J", "emission.heating_value", "calorific value"), ("fuel C 75, H 5, S 0, N 1, O 8, net 28 MJ/kg", "ng/J", "emission.heating_value", "net"),
    ("fuel natural gas, 20 MW net", "kg/h", "emission.heat", "net"), ("fuel unobtainium", "ng/J", "emission", "no fuel"), ("fuel natural gas, 20 MW gross", "g/kWh", "emission.output", "per output"),
    ("flow 0 m3/h at 0 °C, 1 atm, dry", "kg/h", "emission.flow", "above zero"), ("flow 42000 m3/h at 0 °C, dry", "kg/h", "emission.pressure", "pressure the flow"),
    ("flow 42000 m3/h at 0 °C, 1 atm, dry, 9000 h/a", "t/a", "emission.hours", "hours of a year"), ("fuel municipal solid waste by wet O2", "ng/J", "emission.fuel", "no Fw"),
])
def test_bad_input_on_the_way_to_a_rate(emission, owe, field, said) -> None:
    gas = GAS if "by CO2" not in emission else GAS + ", 9 % CO2 dry"
    problems = restate(hold="SO2 80 mg/m3 dry at 0 °C, 101.325 kPa", gas=gas, owe=owe, emission=emission)["problems"]
    assert problems and problems[0]["field"] == field and said in problems[0]["message"] and problems[0]["hint"], problems


@pytest.mark.parametrize(("sheet", "doubt"), [
    ({"hold": "SO2 80 mg/m3 dry at 0 °C, 1 atm", "emission": "flow 42000 m3/h at 0 °C, 1 atm", "owe": "kg/h"}, "emission.water"),
    ({"hold": "SO2 80 mg/m3 dry at 0 °C, 1 atm", "emission": "flow 42000 Nm3/h dry", "owe": "kg/h"}, "emission.conditions"),
    ({"hold": "SO2 80 mg/m3 dry at 0 °C, 1 atm", "gas": "7 % O2 dry", "emission": "fuel oil, 20 MW", "owe": "kg/h"}, "emission.heat_said"),
    ({"hold": "SO2 80 mg/m3 dry at 0 °C, 1 atm", "gas": "7 % O2 dry", "emission": "fuel oil", "owe": "ng/J"}, "gas.ambient_oxygen"),
    ({"hold": "SO2 80 mg/m3 at 0 °C, 1 atm", "gas": "7 % O2 dry, ambient O2 21 %", "emission": "fuel oil", "owe": "ng/J"}, "hold.water"),
    ({"sample": "SO2 3 mg in 1.2 Nm3", "owe": "mg/m3 at 20 °C, 1 atm"}, "hold.conditions"),
    ({"prepared": "permeation Hg 120 ng/min in 1.5 L/min", "owe": "ug/m3 at 20 °C, 1 atm"}, "hold.conditions"),
    ({"prepared": "cylinder NO 99 ppm, 20 mL/min, in 2 L/min", "owe": "ppm by volume"}, "prepared.flow_conditions"),
])
def test_what_is_left_open_is_a_doubt(sheet, doubt) -> None:
    found = {entry["id"]: entry for entry in task(task="restate", sheet=sheet)["answer"]["doubts"]}
    assert doubt in found and found[doubt]["state"] == "open" and len(found[doubt]["readings"]) > 1


def test_a_flow_as_silent_as_the_concentration_is_not_doubted() -> None:
    result = task(task="restate", sheet={"hold": "SO2 80 mg/m3", "emission": "flow 42000 m3/h", "owe": "kg/h"})["answer"]
    assert result["figure"]["value"] == pytest.approx(3.36) and not result["doubts"] and "as the concentration" in result["figure"]["basis"]


# --- the lines travel like the others

SHEET = Sheet(owe="ug/m3 at 15 °C, 101.325 kPa", sample="Hg 12.4 ng, in 120.5 L, meter 24 °C, barometer 98.2 kPa, dry", emission="flow 42 000 m3/h", prepared="permeation Hg 1 ng/min")


def test_sheet_and_link_carry_them() -> None:
    assert read_sheet(write_sheet(SHEET)) == SHEET
    assert read_code(write_code(SHEET, "0.1 µg/m³")).sheet == SHEET


def test_a_sheet_without_them_writes_what_it_always_wrote() -> None:
    assert set(write_sheet(Sheet(hold="Hg 1 ppb", owe="ug/m3"))) == {"schema", "hold", "owe"}


@pytest.mark.parametrize(("side", "text", "field", "to", "changed"), [
    ("sample", "Hg 12.4 ng, in 120.5 L", "mass", "12.9 ng", "Hg 12.9 ng, in 120.5 L"), ("sample", "Hg 12.4 ng", "temperature", "meter 24 °C", "Hg 12.4 ng, meter 24 °C"),
    ("prepared", "cylinder NO 998 ppm, 250 mL/min", "cylinder_flow", "300 mL/min", "cylinder NO 998 ppm, 300 mL/min"),
    ("emission", "flow 42000 m3/h, dry", "water", "wet", "flow 42000 m3/h, wet"), ("emission", "flow 42000 m3/h, dry", "water", "", "flow 42000 m3/h")])
def test_a_piece_is_edited(side, text, field, to, changed) -> None:
    assert task(task="edit", side=side, text=text, field=field, to=to)["answer"]["text"] == changed


def test_the_answer_has_these_sides_only_where_they_are_wanted() -> None:
    assert not {"sample", "prepared", "emission"} & set(restate(hold="Hg 1 ppb by volume", owe="ug/m3 at 20 °C, 1 atm"))
    side = restate(owe="ug/m3 at 20 °C, 1 atm, dry", sample=SHEET.sample)["sample"]
    assert [piece["title"] for piece in side["pieces"]][:3] == ["species", "mass found", "volume"] and all(piece["help"] for piece in side["pieces"])
    assert {"blank", "recovery", "leak"} <= {entry["field"] for entry in side["adds"]}


@pytest.mark.native    # the page has no command line
def test_from_a_terminal(capsys, tmp_path) -> None:
    from gasbasis.__main__ import main
    assert main(["restate", "--sample", SHEET.sample, "--owe", "ug/m3 at 20 °C, 101.325 kPa, dry"]) == 0
    assert capsys.readouterr().out.startswith("Hg 0.1076 µg/m³")          # 12.4/120.5 x 101.325/98.2 x 297.15/293.15
    file = tmp_path / "sheet.json"
    file.write_text(json.dumps({"schema": 1, "hold": "CO 30 mg/m3 at 0 °C, 1 atm, dry", "owe": "kg/h", "emission": "flow 42000 m3/h at 0 °C, 1 atm, dry"}), encoding="utf-8")
    assert main(["restate", str(file)]) == 0
    assert capsys.readouterr().out.startswith("CO 1.260 kg/h")
    assert main(["restate", str(file), "--owe", "g/s"]) == 0
    assert capsys.readouterr().out.startswith("CO 0.3500 g/s")
    assert main(["restate", str(tmp_path / "none.json")]) == 2
    assert "cannot be read" in capsys.readouterr().err
