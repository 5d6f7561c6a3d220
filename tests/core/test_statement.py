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
    # analyser screens and hand-held instruments
    ("CO 12 vpm", dict(species="CO", value="12", unit="ppm", by="volume")),
    ("SO2 48 ppmV", dict(species="SO2", value="48", unit="ppm", by="volume")),
    ("NOx = 142 ppm (vol., dry, 3 % O2)", dict(species="NOx", value="142", unit="ppm", by="volume", water="dry", oxygen="3")),
    ("NO 88 ppm v/v dry", dict(species="NO", value="88", unit="ppm", by="volume", water="dry")),
    ("H2S 0,1 ppm(V)", dict(species="H2S", value="0.1", unit="ppm", by="volume")),
    ("O2 20,9 Vol.-%", dict(species="O2", value="20.9", unit="%", by="volume")),
    ("CH4 5 % v/v", dict(species="CH4", value="5", unit="%", by="volume")),
    ("CO2 400 ppm(mol)", dict(species="CO2", value="400", unit="ppm", by="volume")),
    ("H2O 12,4 % vol", dict(species="H2O", value="12.4", unit="%", by="volume")),
    ("Conc. (mg/Nm3): 12,3", dict(value="12.3", unit="mg/m3", word="normal")),
    ("Conc. of SO2 [mg/m³]: 48.0", dict(species="SO2", value="48", unit="mg/m3")),
    ("TVOC 310 ug/m3 as toluene", dict(species="TVOC", value="310", unit="ug/m3", as_="toluene")),
    ("CO [ppm] = 12 @ 15 % O2, dry", dict(species="CO", value="12", unit="ppm", oxygen="15", water="dry")),
    ("propane, 2.1 mole %", dict(species="C3H8", value="2.1", unit="%", by="volume")),
    ("ethylene 12 mol ppm", dict(species="C2H4", value="12", unit="ppm", by="volume")),
    ("HCN 4.7 ppm by vol.", dict(species="HCN", value="4.7", unit="ppm", by="volume")),
    ("ammonia: 25 ppm (volume)", dict(species="NH3", value="25", unit="ppm", by="volume")),
    # European permits, German and French habits
    ("SO2 35 mg/m3(n)", dict(species="SO2", value="35", unit="mg/m3", word="normal")),
    ("NOx 180 mg/m³ i.N.tr.", dict(species="NOx", value="180", unit="mg/m3", word="normal", water="dry")),
    ("CO 50 mg/m³ i. N. tr., 3 % O2", dict(species="CO", value="50", unit="mg/m3", word="normal", water="dry", oxygen="3")),
    ("Hg 12 ug/Nm3 (dry, 11 % O2)", dict(species="Hg", value="12", unit="ug/m3", word="normal", water="dry", oxygen="11")),
    ("dust 5 mg/Nm3 dry", dict(species="dust", value="5", unit="mg/m3", word="normal", water="dry")),
    ("HCl 10 mg/m3 (STP, dry, 11 % O2)", dict(species="HCl", value="10", unit="mg/m3", word="STP", water="dry", oxygen="11")),
    ("NOx, 200 mg/Nm3 d.b.", dict(species="NOx", value="200", unit="mg/m3", word="normal", water="dry")),
    ("SO2 150 mg/m3 (0 °C, 1013 mbar)", dict(species="SO2", value="150", unit="mg/m3", T=273.15, p=101300)),
    ("SO2 150 mg/m3 (0 °C; 1 013 mbar; dry)", dict(species="SO2", value="150", unit="mg/m3", T=273.15, p=101300, water="dry")),
    ("HF < 0,05 mg/Nm³ (wet)", dict(species="HF", value="0.05", unit="mg/m3", word="normal", below=True, water="wet")),
    ("Cd 1.1 µg/m3 @ 273 K, 101,3 kPa abs, dry gas", dict(species="Cd", value="1.1", unit="ug/m3", T=273, p=101300, water="dry")),
    ("NH3: 2,3 mg/Nm³, dry basis, at 15 % oxygen", dict(species="NH3", value="2.3", unit="mg/m3", word="normal", water="dry", oxygen="15")),
    ("at 20 °C and 101.3 kPa: SO2 12 mg/m3", dict(species="SO2", value="12", unit="mg/m3", T=293.15, p=101300)),
    ("dry, 11 % O2, 273.15 K, 101.3 kPa; CO 48 mg/m3", dict(species="CO", value="48", unit="mg/m3", T=273.15, p=101300, water="dry", oxygen="11")),
    # American permits and reports
    ("0.015 grains/dscf", dict(value="0.015", unit="gr/ft3", word="standard", water="dry")),
    ("H2S 4 grains/100 scf", dict(species="H2S", value="4", unit="gr/(100 ft3)", word="standard")),
    ("lead 12 ng/dscm @ 7% O2", dict(species="Pb", value="12", unit="ng/m3", word="standard", water="dry", oxygen="7")),
    ("SO2 0.5 lb/MMscf", dict(species="SO2", value="0.5", unit="lb/(1e6 ft3)", word="standard")),
    ("VOC 20 ppmvd as propane @ 3% O2", dict(species="VOC", value="20", unit="ppm", by="volume", water="dry", as_="C3H8", oxygen="3")),
    ("NOx 25 ppmdv @15% O2", dict(species="NOx", value="25", unit="ppm", by="volume", water="dry", oxygen="15")),
    ("CO 10 ppm, dry basis, corrected to 15 percent O2", dict(species="CO", value="10", unit="ppm", water="dry", oxygen="15", oxygen_is="corrected")),
    ("HCl 4.5 ppmv, dry basis, 7 % oxygen", dict(species="HCl", value="4.5", unit="ppm", by="volume", water="dry", oxygen="7")),
    ("Hg 28 ug/dscm (68 °F, 1 atm)", dict(species="Hg", value="28", unit="ug/m3", word="standard", water="dry", T=293.15, p=101325)),
    ("SO2 62 ppmvd (3-hr average)", dict(species="SO2", value="62", unit="ppm", by="volume", water="dry", averaging="3-hr average")),
    ("Hg 0.7 µg/wscm", dict(species="Hg", value="0.7", unit="ug/m3", word="standard", water="wet")),
    ("CO 3.2 ng/dscm at 29.92 inHg and 68 F", dict(species="CO", value="3.2", unit="ng/m3", word="standard", water="dry", T=293.15, p=101320.7)),
    # contracts, pipelines
    ("H2S 5 mg/m3 at 15 °C and 1,01325 bar", dict(species="H2S", value="5", unit="mg/m3", T=288.15, p=101325)),
    ("total sulphur 30 mg/m3 (15 °C, 101.325 kPa)", dict(species="total sulphur", value="30", unit="mg/m3", T=288.15, p=101325)),
    ("H2S 0.25 grain per 100 cubic feet at 14.73 psia, 60 °F", dict(species="H2S", value="0.25", unit="gr/(100 ft3)", T=288.71, p=101559.8)),
    ("Hg 30 ng/Sm³", dict(species="Hg", value="30", unit="ng/m3", word="standard")),
    ("COS 1.1 mol-ppm", dict(species="COS", value="1.1", unit="ppm", by="volume")),
    ("CO2 2.0 mol%", dict(species="CO2", value="2", unit="%", by="volume")),
    ("water vapour 65 mg/m³ (n)", dict(species="H2O", value="65", unit="mg/m3", word="normal")),
    ("mercury 0.2 ppb w/w", dict(species="Hg", value="0.2", unit="ppb", by="mass")),
    ("methanol 40 ppm wt", dict(species="CH3OH", value="40", unit="ppm", by="mass")),
    ("benzene 3 mg/kg", dict(species="C6H6", value="3", unit="mg/kg")),
    ("Hg 4 wt ppb", dict(species="Hg", value="4", unit="ppb", by="mass")),
    # workplace, ambient
    ("benzene TWA 0.5 ppm", dict(species="C6H6", value="0.5", unit="ppm", averaging="TWA")),
    ("toluene 50 ppm (8-h TWA)", dict(species="C7H8", value="50", unit="ppm", averaging="8-h TWA")),
    ("ammonia STEL 35 ppm, 15 min", dict(species="NH3", value="35", unit="ppm", averaging="STEL, 15 min")),
    ("formaldehyde 0.3 ppm ceiling", dict(species="CH2O", value="0.3", unit="ppm", averaging="ceiling")),
    ("SO2 125 µg/m3 daily mean", dict(species="SO2", value="125", unit="ug/m3", averaging="daily mean")),
    ("NO2 200 µg/m³ (hourly average)", dict(species="NO2", value="200", unit="ug/m3", averaging="hourly average")),
    ("CO 10 mg/m³ (8 h mean) at 20 °C", dict(species="CO", value="10", unit="mg/m3", T=293.15, averaging="8 h mean")),
    ("O3 70 ppb, 8-hour average", dict(species="O3", value="70", unit="ppb", averaging="8-hour average")),
    ("NOx 200 mg/Nm3 (daily average)", dict(species="NOx", value="200", unit="mg/m3", word="normal", averaging="daily average")),
    ("HCl 60 mg/Nm3, half-hourly average", dict(species="HCl", value="60", unit="mg/m3", word="normal", averaging="half-hourly average")),
    # lab reports
    ("Result (µg/m3): < 0.5, toluene", dict(species="C7H8", value="0.5", unit="ug/m3", below=True)),
    ("benzene 3.2 µg/m3 a)", dict(species="C6H6", value="3.2", unit="ug/m3")),
    ("Hg 0,83 ng/L ± 0,05 ng/L (k = 2)", dict(species="Hg", value="0.83", unit="ng/L", plus_minus="0.05", k="2")),
    ("Cr 0.0042 mg/m3 dry 25 deg C 1 atm", dict(species="Cr", value="0.0042", unit="mg/m3", water="dry", T=298.15, p=101325)),
    ("n-hexane 72 mg m⁻³", dict(species="n-hexane", value="72", unit="mg/m3")),
    ("acetone 1 210 mg·m-3 at 20 °C", dict(species="acetone", value="1210", unit="mg/m3", T=293.15)),
    ("isoprene 1.4 nmol mol-1", dict(species="isoprene", value="1.4", unit="nmol/mol")),
    ("CH4 1.9 µmol mol⁻¹ dry", dict(species="CH4", value="1.9", unit="umol/mol", water="dry")),
    ("CO 1.5E+02 mg/m3", dict(species="CO", value="150", unit="mg/m3")),
    ("SO2 4.2 x 10^2 mg/m3", dict(species="SO2", value="420", unit="mg/m3")),
    ("12.5 mg per cubic metre SO2", dict(species="SO2", value="12.5", unit="mg/m3")),
    ("SO2: 12 milligrams per cubic meter", dict(species="SO2", value="12", unit="mg/m3")),
    ("CO 30 parts per million by volume", dict(species="CO", value="30", unit="ppm", by="volume")),
    ("Hg 2 parts per billion", dict(species="Hg", value="2", unit="ppb")),
    ("Hg 8.3 micrograms/m3", dict(species="Hg", value="8.3", unit="ug/m3")),
    ("sulfur dioxide 35 mg/ m3", dict(species="SO2", value="35", unit="mg/m3")),
    ("sulfur dioxide concen-\ntration 35 mg/\nm3", dict(species="SO2", value="35", unit="mg/m3")),
    ("The measured NOx concentration was 142 ppm (dry) at 9,2 % O2.", dict(species="NOx", value="142", unit="ppm", water="dry", oxygen="9.2")),
    ("NOx emission: 142 ppmvd", dict(species="NOx", value="142", unit="ppm", by="volume", water="dry")),
    ("approx. 10 ppm H2S", dict(species="H2S", value="10", unit="ppm", approximate=True)),
    ("ca. 10 ppm H2S", dict(species="H2S", value="10", unit="ppm", approximate=True)),
    ("H2S ~10 ppm", dict(species="H2S", value="10", unit="ppm", approximate=True)),
    ("Hg 1.2 ng/m3 at 62 bara and 35 °C", dict(species="Hg", value="1.2", unit="ng/m3", p=6200000, T=308.15)),
    ("Hg 1.2 ng/m3 at 14.73 psia", dict(species="Hg", value="1.2", unit="ng/m3", p=101559.8)),
    ("Hg 25 ng/m3, actual conditions", dict(species="Hg", value="25", unit="ng/m3")),
    ("Hg 25 ng/am3", dict(species="Hg", value="25", unit="ng/m3")),
    ("NO2 38 µg/m³ at 1013 hPa/293 K", dict(species="NO2", value="38", unit="ug/m3", p=101300, T=293)),
    ("NO2 0.021 ppm @25C & 1 atm", dict(species="NO2", value="0.021", unit="ppm", T=298.15, p=101325)),
    ("NO in N2, 498 ± 5 ppm", dict(species="NO", value="498", unit="ppm", plus_minus="5", gas="nitrogen")),
    ("CO 1,02 % mol/mol in nitrogen", dict(species="CO", value="1.02", unit="%", by="volume", gas="nitrogen")),
    ("0.35 %mol H2S", dict(species="H2S", value="0.35", unit="%", by="volume")),
    ("NH3 slip: 3.1 ppmvd @ 15 % O2", dict(species="NH3", value="3.1", unit="ppm", by="volume", water="dry", oxygen="15")),
    ("particulate matter 34 mg/dscm", dict(species="dust", value="34", unit="mg/m3", word="standard", water="dry")),
    ("0,1 ng TEQ/Nm3", dict(value="0.1", unit="ng/m3", word="normal", as_="TEQ")),
    ("As 12 ppbwt", dict(species="As", value="12", unit="ppb", by="mass")),
    ("benzene 3.2 µg/m3 [2]", dict(species="C6H6", value="3.2", unit="ug/m3")),
    ("Analyte: benzene; Result: 12.3 ug/m3", dict(species="C6H6", value="12.3", unit="ug/m3")),
    ("NO\u00ad2 12 ppm", dict(species="NO2", value="12", unit="ppm")),
    ("Hg (elemental) 25 ng/m3", dict(species="Hg", value="25", unit="ng/m3")),
    ("H2S 1000 ppm = 0.1 %", dict(species="H2S", value="1000", unit="ppm")),
    ("approx.10 ppm H2S", dict(species="H2S", value="10", unit="ppm", approximate=True)),
    ("SO2   35\t mg/m3\r\n dry", dict(species="SO2", value="35", unit="mg/m3", water="dry")),
    ("methyl mer-\ncaptan 2 ppm", dict(species="CH3SH", value="2", unit="ppm")),
    ("72 mg/m3 n-hexane", dict(species="n-hexane", value="72", unit="mg/m3")),
    ("20 mg/m3 S", dict(species="S", value="20", unit="mg/m3")),
    ("n-\nhexane 2 ppm", dict(species="n-hexane", value="2", unit="ppm")),
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
        "averaging": statement.averaging, "approximate": statement.approximate or None,
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
    ("3 ppm 4 ppb", "second value", "4 ppb"),
    ("CO 10 ppm (15 mg/m3)", "second value", "15 mg/m3"),
    ("12\n345 mg/m3", "has no unit", "12"),
    ("12\t345 mg/m3 SO2", "has no unit", "12"),
    ("12   345 mg/m3 SO2", "has no unit", "12"),
    ("SO2 35mg", "is a mass", "35mg"),
    ("SO2 5-10 ppm", "is a range; give one value", "5-10 ppm"),
    ("SO2 between 5 and 10 mg/Nm3", "is a range; give one value", "between 5 and 10 mg/Nm3"),
    ("SO2 35 mg/m3 at 20-25 °C", "is a range; give one value", "20-25 °C"),
    ("CO 35 mg/m3 at 9-11 % O2", "is a range; give one value", "9-11 %"),
    ("NOx-142 ppm", "is not understood", "NOx-142"),
    ("H2S max 4 ppm", "sets a limit", "max"),
    ("SO2 < LOD (0.5 mg/m3)", "is not understood", "< LOD"),
    ("SO2 > 500 ppm", "sets a limit", ">"),
    ("mercury 5 µg/m³ in natural gas", "is not understood", "natural"),
    ("50 ppm SO2 in N2 (± 2 % rel.)", "is not understood", "rel."),
    ("CO 3 ppm at 62 barg", "gauge", "62 barg"),
    ("mer-\ncury 3 ppm foo-\nbarium", "is not understood", "foo-\nbarium"),
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
