"""Statements as people write them, and what is understood of each. Expected values are read off the texts by hand."""
from __future__ import annotations

from decimal import Decimal

import pytest

from gasbasis.language.species import find
from gasbasis.language.statement import read_statement

# text -> what must be understood; everything not named must be left unstated
ROWS: list[tuple[str, dict]] = [
    # the forms every reader of this trade must know
    ("8.3 µg/m³ at 20 °C and 101.325 kPa", dict(value="8.3", unit="ug/m3", T=293.15, p=101325)),
    ("Hg 8,3 ug/m3 @ 20C 1atm dry", dict(species="Hg", value="8.3", unit="ug/m3", T=293.15, p=101325, water="dry")),
    ("1 ppb", dict(value="1", unit="ppb")),
    ("1 ppbv", dict(value="1", unit="ppb", by="volume")),
    ("1 ppb(v/v)", dict(value="1", unit="ppb", by="volume")),
    ("1 ppb by volume", dict(value="1", unit="ppb", by="volume")),
    ("1 nmol/mol", dict(value="1", unit="nmol/mol")),
    ("1 ppbw", dict(value="1", unit="ppb", by="mass")),
    ("1 ppb (m/m)", dict(value="1", unit="ppb", by="mass")),
    ("1 ppb by mass", dict(value="1", unit="ppb", by="mass")),
    ("1 ng/g", dict(value="1", unit="ng/g")),
    ("1 ppb w/v", dict(value="1", unit="ppb", by="mass_by_volume")),
    ("1 ppb(m/v)", dict(value="1", unit="ppb", by="mass_by_volume")),
    ("1 ng/mL at 20 °C, 1 atm", dict(value="1", unit="ng/mL", T=293.15, p=101325)),
    ("NOx 142 ppmvd as NO2 at 9.2 % O2", dict(species="NOx", value="142", unit="ppm", by="volume", water="dry", as_="NO2", oxygen="9.2")),
    ("SO2 35 mg/Nm3", dict(species="SO2", value="35", unit="mg/m3", word="normal")),
    ("35 mg/dscm", dict(value="35", unit="mg/m3", word="standard", water="dry")),
    ("0.25 gr/100 scf H2S", dict(species="H2S", value="0.25", unit="gr/(100 ft3)", word="standard")),
    ("CO 85 mg/m3 (273.15 K, 101.3 kPa, dry, 11 % O2)", dict(species="CO", value="85", unit="mg/m3", T=273.15, p=101300, water="dry", oxygen="11")),
    ("12 ng/L Hg", dict(species="Hg", value="12", unit="ng/L")),
    ("3.2 lb/MMscf", dict(value="3.2", unit="lb/(1e6 ft3)", word="standard")),
    ("< 0.5 ng/m3", dict(value="0.5", unit="ng/m3", below=True)),
    ("35.2 ± 1.1 mg/m3 (k=2)", dict(value="35.2", unit="mg/m3", plus_minus="1.1", k="2")),
    ("TOC 12 mgC/m3", dict(species="TOC", value="12", unit="mg/m3", as_="C")),
    ("propane 30 ppm as C", dict(species="C3H8", value="30", unit="ppm", as_="C")),
    ("0.5 vol%", dict(value="0.5", unit="%", by="volume")),
    ("2.4 mmol/m3 at 25 °C", dict(value="2.4", unit="mmol/m3", T=298.15)),
    ("15 Pa in 1013 hPa", dict(value="15", unit="Pa", total=101300)),
    ("50 ppm mol wet, 14 % H2O", dict(value="50", unit="ppm", by="volume", water="wet", h="14")),
    # analyser screens
    ("NOx: 142 ppm (dry)", dict(species="NOx", value="142", unit="ppm", water="dry")),
    ("O2 9,2 % dry", dict(species="O2", value="9.2", unit="%", by="volume", water="dry")),
    ("CO2 12.4 %", dict(species="CO2", value="12.4", unit="%", by="volume")),
    ("H2S 4.1 ppm", dict(species="H2S", value="4.1", unit="ppm")),
    ("CO 12 ppm @ 3% O2", dict(species="CO", value="12", unit="ppm", oxygen="3")),
    ("NOx (ppm): 142", dict(species="NOx", value="142", unit="ppm")),
    ("142 ppm NOx", dict(species="NOx", value="142", unit="ppm")),
    ("ppm NO: 88", dict(species="NO", value="88", unit="ppm")),
    # certificates of gas mixtures
    ("NO 100 ppm in nitrogen", dict(species="NO", value="100", unit="ppm", gas="nitrogen")),
    ("carbon monoxide 250 µmol/mol in N2", dict(species="CO", value="250", unit="umol/mol", gas="nitrogen")),
    ("SO2 98.7 ± 1.0 µmol/mol (k=2) in nitrogen", dict(species="SO2", value="98.7", unit="umol/mol", plus_minus="1.0", k="2", gas="nitrogen")),
    ("propane 15.2 ppm (mol/mol) in air", dict(species="C3H8", value="15.2", unit="ppm", by="volume", gas="dry_air")),
    ("benzene 1.03 ppm ± 2 % in N2", dict(species="C6H6", value="1.03", unit="ppm", plus_minus="2", gas="nitrogen")),
    ("hydrogen sulfide 9.8 ppm mol, balance nitrogen", dict(species="H2S", value="9.8", unit="ppm", by="volume", gas="nitrogen")),
    # European permits and reports
    ("NOx 200 mg/Nm³ als NO2", dict(species="NOx", value="200", unit="mg/m3", word="normal", as_="NO2")),
    ("SO₂ 120 mg/m³N, tr., 6 % O₂", dict(species="SO2", value="120", unit="mg/m3", word="normal", water="dry", oxygen="6")),
    ("HCl 8,1 mg/Nm³", dict(species="HCl", value="8.1", unit="mg/m3", word="normal")),
    ("TOC 20 mg/m3 as C, 11 % O2, dry", dict(species="TOC", value="20", unit="mg/m3", as_="C", oxygen="11", water="dry")),
    ("CO 50 mg/Nm3 dry at 11% O2", dict(species="CO", value="50", unit="mg/m3", word="normal", water="dry", oxygen="11")),
    ("Hg 0,05 mg/m3 (273 K; 101,3 kPa; dry; ref. 11 % O2)", dict(species="Hg", value="0.05", unit="mg/m3", T=273, p=101300, water="dry", oxygen="11", oxygen_is="corrected")),
    ("NH3 5.5 mg/m3 corrected to 3 % O2", dict(species="NH3", value="5.5", unit="mg/m3", oxygen="3", oxygen_is="corrected")),
    ("dust 4.2 mg/m3 on dry gas, reference oxygen 15 %", dict(species="dust", value="4.2", unit="mg/m3", water="dry", oxygen="15", oxygen_is="corrected")),
    ("NOx 142 ppm measured at 9,2 % O2", dict(species="NOx", value="142", unit="ppm", oxygen="9.2", oxygen_is="measured")),
    ("HF 0.8 mg/m3 under normal conditions", dict(species="HF", value="0.8", unit="mg/m3", word="normal")),
    # American permits and reports
    ("0.015 gr/dscf @ 7% O2", dict(value="0.015", unit="gr/ft3", word="standard", water="dry", oxygen="7")),
    ("NOx 9 ppmvd @ 15% O2", dict(species="NOx", value="9", unit="ppm", by="volume", water="dry", oxygen="15")),
    ("CO 100 ppmvd corrected to 7% O2", dict(species="CO", value="100", unit="ppm", by="volume", water="dry", oxygen="7", oxygen_is="corrected")),
    ("THC 20 ppmvw as propane", dict(species="THC", value="20", unit="ppm", by="volume", water="wet", as_="C3H8")),
    ("Hg 1.2 lb/MMscf", dict(species="Hg", value="1.2", unit="lb/(1e6 ft3)", word="standard")),
    ("SO2 2.1e-5 lb/scf", dict(species="SO2", value="0.000021", unit="lb/ft3", word="standard")),
    ("HCl 3.1 mg/dscm at 68 °F, 29.92 in. Hg", dict(species="HCl", value="3.1", unit="mg/m3", word="standard", water="dry", T=293.15, p=101320.7)),
    ("mercury 0.08 ug/dscm", dict(species="Hg", value="0.08", unit="ug/m3", word="standard", water="dry")),
    # contracts, pipelines
    ("total sulphur 20 mg/Sm3", dict(species="total sulphur", value="20", unit="mg/m3", word="standard")),
    ("H2S 0.25 grain per 100 scf", dict(species="H2S", value="0.25", unit="gr/(100 ft3)", word="standard")),
    ("Hg 10 ppb wt", dict(species="Hg", value="10", unit="ppb", by="mass")),
    ("water 7 lb/MMscf", dict(species="H2O", value="7", unit="lb/(1e6 ft3)", word="standard")),
    ("methyl mercaptan 2.4 mg/m3 at 15 °C and 101.325 kPa", dict(species="CH3SH", value="2.4", unit="mg/m3", T=288.15, p=101325)),
    # workplace and ambient
    ("benzene 0.2 ppm at 20 °C", dict(species="C6H6", value="0.2", unit="ppm", T=293.15)),
    ("formaldehyde 0.37 mg/m3 (20 °C, 101,3 kPa)", dict(species="CH2O", value="0.37", unit="mg/m3", T=293.15, p=101300)),
    ("NO2 40 µg/m3 at 293 K and 101.3 kPa", dict(species="NO2", value="40", unit="ug/m3", T=293, p=101300)),
    ("ozone 120 ug/m3 25 °C 760 mmHg", dict(species="O3", value="120", unit="ug/m3", T=298.15, p=101325.0)),
    ("toluene 50 mL/m3", dict(species="C7H8", value="50", unit="mL/m3")),
    ("xylene 100 uL/L", dict(species="xylene", value="100", unit="uL/L")),
    # numbers and characters
    ("mercury 1,234 ng/m3", dict(species="Hg", value="1.234", unit="ng/m3", doubt="hold.number")),
    ("SO2 1 234,5 mg/m3", dict(species="SO2", value="1234.5", unit="mg/m3")),
    ("CO −2 ppm", dict(species="CO", value="-2", unit="ppm")),
    ("Hg 1·10⁻³ mg/m³", dict(species="Hg", value="0.001", unit="mg/m3")),
    ("Hg 1.2e-3 mg/m3", dict(species="Hg", value="0.0012", unit="mg/m3")),
    ("CO\u00a012\u202fppm", dict(species="CO", value="12", unit="ppm")),
    ("35mg/m3 SO2", dict(species="SO2", value="35", unit="mg/m3")),
    ("Hg 8.3 μg/m3", dict(species="Hg", value="8.3", unit="ug/m3")),
    ("(35.2 ± 1.1) mg/m3", dict(value="35.2", unit="mg/m3", plus_minus="1.1")),
    ("142 ppm ± 5 % NOx", dict(species="NOx", value="142", unit="ppm", plus_minus="5")),
    ("Hg 1.234 ug/m3 at 101,325 Pa and 20 °C", dict(species="Hg", value="1.234", unit="ug/m3", p=101325, T=293.15, doubt="hold.number")),
    # formulas nobody listed
    ("C6H5Cl 3 ppm", dict(species="C6H5Cl", value="3", unit="ppm")),
    ("HgCl2 0.4 ug/m3", dict(species="HgCl2", value="0.4", unit="ug/m3")),
    ("(CH3)2S 12 ppb", dict(species="(CH3)2S", value="12", unit="ppb")),
    ("CF3CHFCF3 5 ppm", dict(value="5", unit="ppm", atoms={"C": 3, "F": 7, "H": 1})),
    # a paste with line breaks and footnote marks
    ("NOx\n142 ppm¹", dict(species="NOx", value="142", unit="ppm")),
    ("NO2 *) 0.2 mg/m3 †", dict(species="NO2", value="0.2", unit="mg/m3")),
    ("Result: CO = 45 mg/m3; dry; 25 °C; 101.3 kPa", dict(species="CO", value="45", unit="mg/m3", water="dry", T=298.15, p=101300)),
]


def understood(statement) -> dict:
    """The statement as a flat dictionary in the words of the rows."""
    value = statement.value
    found = {
        "value": f"{value.number.decimal.normalize():f}" if value else None, "unit": statement.unit.id if statement.unit else None,
        "below": value.number.below or None if value else None, "by": statement.parts_by, "word": statement.conditions_word,
        "T": round(statement.temperature.si, 2) if statement.temperature else None,
        "p": round(statement.pressure.si, 1) if statement.pressure else None, "water": statement.water,
        "total": statement.total_pressure.si if statement.total_pressure else None,
        "h": f"{statement.water_content.number.decimal}" if statement.water_content else None,
        "oxygen": f"{statement.oxygen.number.decimal}" if statement.oxygen else None, "oxygen_is": statement.oxygen_meaning,
        "as_": statement.reported_as.id if statement.reported_as else None, "gas": statement.matrix_gas.id if statement.matrix_gas else None,
        "doubt": statement.ambiguities[0].id if statement.ambiguities else None,
    }
    if value and value.number.uncertainty:
        found["plus_minus"] = f"{value.number.uncertainty.amount}"
        found["k"] = f"{value.number.uncertainty.coverage_factor}" if value.number.uncertainty.coverage_factor else None
    return {name: what for name, what in found.items() if what is not None}


@pytest.mark.parametrize(("text", "expected"), ROWS, ids=[text for text, _ in ROWS])
def test_statement_as_written(text: str, expected: dict) -> None:
    statement, problems = read_statement(text, "hold")
    assert not problems, [problem.message for problem in problems]
    expected = dict(expected)
    species, atoms = expected.pop("species", None), expected.pop("atoms", None)
    if atoms:
        assert dict(statement.species.atoms) == atoms
    elif species:
        assert statement.species == find(species)
    else:
        assert statement.species is None
    expected["value"] = f"{Decimal(expected['value']).normalize():f}"
    assert understood(statement) == expected


@pytest.mark.parametrize(("text", "expected"), ROWS, ids=[text for text, _ in ROWS])
def test_pieces_lie_where_they_were_read(text: str, expected: dict) -> None:
    statement, _ = read_statement(text, "hold")
    assert statement.pieces
    for piece in statement.pieces:
        assert text[slice(*piece.span)] == piece.text
        assert piece.text.strip()


def test_the_owed_side_is_a_unit_with_its_basis() -> None:
    statement, problems = read_statement("mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2", "owe")
    assert not problems
    assert understood(statement) == dict(unit="mg/m3", T=273.15, p=101300.0, water="dry", oxygen="11")


UNREADABLE = [
    ("NOx 142", "has no unit", "142"),
    ("foo 3 ppm", "is not understood", "foo"),
    ("Xx2 3 ppm", "'Xx' is not an element", "Xx2"),
    ("3 ppm 4 ppb", "", "4"),
    ("CO 3 ppm dry wet", "contradicts", "wet"),
    ("CO 3 ppm <script>alert</script>", "is not understood", "<script>alert</script>"),
    ("CO 3 ppm at 2 barg", "gauge", "2 barg"),
]


@pytest.mark.parametrize(("text", "message", "place"), UNREADABLE)
def test_what_is_not_understood_is_named_with_its_place(text: str, message: str, place: str) -> None:
    _, problems = read_statement(text, "hold")
    assert any(message in problem.message and text[slice(*problem.span)] == place for problem in problems), [
        (problem.message, text[slice(*problem.span)]) for problem in problems]
    assert all(problem.hint and problem.field == "hold" for problem in problems)


def test_a_document_is_not_read_and_costs_no_time() -> None:
    statement, problems = read_statement("x" * 10_000_000, "hold")
    assert statement.value is None and "10 000 000 characters" in problems[0].message


def test_control_characters_are_named() -> None:
    _, problems = read_statement("CO 3\x00 ppm", "hold")
    assert problems[0].span == (4, 5)
