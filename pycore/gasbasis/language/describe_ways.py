"""What each piece of the lines on sample, prepared gas and emission is called: one table for page and terminal."""
from __future__ import annotations

from typing import Mapping

from gasbasis.language.described import Field

_METER_FACTOR = Field("meter factor", "What the meter's volume is multiplied by, from its calibration.", "Y 1.012", numeric=True)
_SPECIES = Field("species", "What was measured, by name or formula.", "Hg")

SAMPLE: Mapping[str, Field] = {
    "species": _SPECIES,
    "mass": Field("mass found", "What the laboratory found; '<' and '±' are kept.", "12.4 ng", numeric=True),
    "back": Field("second section", "What the second section of the trap held; both sections count, and breakthrough is shown.", "back 0.2 ng", numeric=True),
    "blank": Field("field blank", "Taken off only where the method has it so: say 'subtracted'.", "field blank 0.3 ng", numeric=True),
    "blank_subtracted": Field("the blank is", "Whether the field blank is taken off.", "subtracted", ("subtracted", "not subtracted")),
    "recovery": Field("recovery", "Corrected for only where the method has it so: say 'corrected'.", "recovery 96 %", numeric=True),
    "recovery_corrected": Field("the recovery is", "Whether the result is corrected for recovery.", "corrected", ("corrected", "not corrected")),
    "detection_limit": Field("detection limit", "As a mass; it is shown as a concentration too.", "LOD 0.5 ng", numeric=True),
    "volume": Field("volume", "What passed the meter in all.", "in 120.5 L", numeric=True),
    "meter_start": Field("meter start", "The meter's reading at the start.", "meter 1204.3 L to 1324.8 L", numeric=True),
    "meter_end": Field("meter end", "The meter's reading at the end.", "1324.8 L", numeric=True),
    "meter_factor": _METER_FACTOR,
    "temperature": Field("meter temperature", "The temperature at the meter, not that of the gas in the duct or line.", "meter 24 °C", numeric=True),
    "pressure": Field("meter pressure", "The absolute pressure at the meter.", "meter 98.4 kPa", numeric=True),
    "barometer": Field("barometer", "The pressure at the station, not reduced to sea level.", "barometer 98.2 kPa", numeric=True),
    "head": Field("orifice head", "How far the meter's pressure lies above the barometer.", "orifice head 25 mmH2O", numeric=True),
    "duration": Field("duration", "How long was sampled; a leak rate needs it.", "60 min", numeric=True),
    "leak": Field("leak rate", "Held against the mean sampling rate.", "leak 0.02 L/min", numeric=True),
    "water": Field("metered gas", "Dry behind a drying tube, wet, or saturated at the meter.", "dry", ("dry", "wet", "saturated at the meter")),
    "reported_as": Field("reported as", "The entity the mass is weighed as.", "as NO2"),
    "mass_b": Field("mass found, B", "What the laboratory found in the second train.", "train B: 12.9 ng", numeric=True),
    "back_b": Field("second section, B", "Of the second train.", "back 0.3 ng", numeric=True),
    "volume_b": Field("volume, B", "What passed the second train's meter in all.", "in 118.8 L", numeric=True),
    "meter_start_b": Field("meter start, B", "Of the second train.", "877.1 L to 994.6 L", numeric=True),
    "meter_end_b": Field("meter end, B", "Of the second train.", "994.6 L", numeric=True),
    "meter_factor_b": Field("meter factor, B", "Of the second train.", "Y 0.998", numeric=True),
    "temperature_b": Field("meter temperature, B", "Of the second train.", "meter 22 °C", numeric=True),
    "head_b": Field("orifice head, B", "Of the second train.", "orifice head 25 mmH2O", numeric=True),
    "leak_b": Field("leak rate, B", "Of the second train.", "leak 0.01 L/min", numeric=True),
}
PREPARED: Mapping[str, Field] = {
    "way": Field("prepared from", "A cylinder, a permeation device, or saturated mercury vapour.", "cylinder", ("cylinder", "permeation", "saturated mercury vapour")),
    "species": _SPECIES,
    "content": Field("certificate", "What the cylinder's certificate says.", "998 ppm", numeric=True),
    "parts_by": Field("parts by", "What the certificate's parts count.", "by volume", ("by volume", "by mass")),
    "permeation": Field("permeation rate", "Mass per time, from the device's certificate.", "120 ng/min", numeric=True),
    "cylinder_flow": Field("cylinder flow", "As its controller counts it.", "250 mL/min", numeric=True),
    "cylinder_temperature": Field("cylinder flow at", "The temperature that controller counts at; it stands in its manual.", "0 °C", ("0 °C", "20 °C", "25 °C"), numeric=True),
    "cylinder_pressure": Field("and", "The pressure that controller counts at.", "101.325 kPa", ("101.325 kPa", "100 kPa"), numeric=True),
    "flow": Field("dilution flow", "As its controller counts it.", "in 4750 mL/min", numeric=True),
    "flow_temperature": Field("dilution flow at", "The temperature that controller counts at; it stands in its manual.", "0 °C", ("0 °C", "20 °C", "25 °C"), numeric=True),
    "flow_pressure": Field("and", "The pressure that controller counts at.", "101.325 kPa", ("101.325 kPa", "100 kPa"), numeric=True),
    "vapour_volume": Field("vapour", "The volume taken from above the mercury.", "100 uL", numeric=True),
    "vapour_temperature": Field("vapour at", "The temperature of the bottle with the mercury.", "22 °C", numeric=True),
    "volume": Field("gas volume", "The volume of gas the vapour is in.", "in 2.0 L", numeric=True),
    "volume_temperature": Field("gas volume at", "The temperature of that gas.", "20 °C", numeric=True),
    "volume_pressure": Field("and", "The pressure of that gas.", "1 atm", numeric=True),
    "equation": Field("vapour equation", "The two in use differ by some 7 %.", "Dumarey", ("Dumarey", "Huber")),
    "conditions": Field("flow counted at", "The temperature and pressure a flow controller counts at.", "0 °C, 101.325 kPa"),
    "matrix_gas": Field("gas", "The gas the flow is of.", "nitrogen", ("nitrogen", "dry air")),
}
EMISSION: Mapping[str, Field] = {
    "diameter": Field("duct diameter", "The inner diameter at the plane of measurement.", "duct 1.8 m diameter", numeric=True),
    "sides": Field("duct sides", "Width and depth of a rectangular duct.", "duct 1.2 m x 2.1 m"),
    "area": Field("cross-section", "Of the duct at the plane of measurement.", "area 2.5 m2", numeric=True),
    "pitot": Field("pitot coefficient", "From the calibration of the tube.", "pitot Cp 0.84", numeric=True),
    "velocity_pressures": Field("velocity pressures", "One a traverse point; their roots are averaged.", "dp 12.1, 13.0, 14.2 mmH2O"),
    "velocity": Field("velocity", "The mean velocity in the duct.", "velocity 14.2 m/s", numeric=True),
    "flow": Field("flow", "With the temperature, pressure and water it is counted on.", "flow 42000 m3/h", numeric=True),
    "temperature": Field("flow at", "The temperature the flow is counted at.", "at 273.15 K", ("273.15 K", "20 °C", "25 °C", "68 °F"), numeric=True),
    "pressure": Field("and", "The pressure the flow is counted at.", "101.325 kPa", ("101.325 kPa", "101.3 kPa"), numeric=True),
    "actual_volume": Field("flow as", "As it flowed in the duct.", "actual"),
    "water": Field("flow of", "Whether the flow counts the water vapour.", "dry", ("dry", "wet")),
    "oxygen": Field("flow referred to", "The oxygen the flow was brought to, where it was.", "11 % O2", numeric=True),
    "fuel": Field("fuel", "A fuel of the F-factor table.", "fuel natural gas", ("fuel natural gas", "fuel oil", "fuel coal", "fuel wood")),
    "analysis": Field("fuel analysis", "C, H, S, N and O in percent by mass.", "fuel C 75.2, H 5.1, S 1.2, N 1.5, O 7.9"),
    "heating_value": Field("calorific value", "Gross: with the heat of condensing the water.", "gross 29.5 MJ/kg", numeric=True),
    "factor": Field("F factor", "One of your own, per gross heat.", "F 8710 dscf/MMBtu", numeric=True),
    "by": Field("counted by", "The measured diluent the F factor goes with.", "by CO2", ("by O2", "by CO2", "by wet O2")),
    "air_water": Field("water of the air", "Of the ambient air, for the wet form.", "air water 2.7 %", numeric=True),
    "heat": Field("heat input", "Of the fuel, gross.", "20 MW gross", numeric=True),
    "heat_said": Field("heat input is", "With the heat of condensing the water, or without.", "gross", ("gross", "net")),
    "output": Field("output", "Electric or heat, gross or net.", "output 5 MW net", numeric=True),
    "output_said": Field("output is", "Before or after what the plant uses itself.", "net", ("gross", "net")),
    "product": Field("product", "Mass of product per time.", "product 12 t/h", numeric=True),
    "hours": Field("operation", "Hours of operation in a year, for a rate per year.", "6500 h/a", numeric=True),
    "conditions": Field("flow counted at", "The temperature and pressure the flow is counted at.", "273.15 K, 101.325 kPa"),
}
WAY_FIELDS: Mapping[str, Mapping[str, Field]] = {"sample": SAMPLE, "prepared": PREPARED, "emission": EMISSION}
WAY_ADDABLE: Mapping[str, tuple[str, ...]] = {
    "sample": ("species", "mass", "volume", "meter_start", "meter_factor", "temperature", "barometer", "head", "water", "blank", "recovery", "back", "detection_limit", "duration", "leak", "mass_b"),
    "prepared": ("way", "species", "content", "cylinder_flow", "permeation", "flow", "vapour_volume", "volume"),
    "emission": ("flow", "diameter", "sides", "pitot", "velocity_pressures", "velocity", "fuel", "factor", "by", "heat", "output", "product", "hours"),
}
