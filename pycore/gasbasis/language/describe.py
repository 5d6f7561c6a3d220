"""What each piece is called, one sentence on it, an example, and the usual choices: one table for page and terminal."""
from __future__ import annotations

from typing import Mapping

from gasbasis.language.describe_ways import WAY_ADDABLE, WAY_FIELDS
from gasbasis.language.described import Field


FIELDS: Mapping[str, Field] = {
    "species": Field("species", "What was measured, by name or formula; its molar mass is worked out from the formula.", "NOx"),
    "value": Field("value", "The number with its unit, as it was written; '<' and '±' are kept.", "142 ppm", numeric=True),
    "unit": Field("unit", "The unit the figure is owed in.", "mg/m3", ("mg/m3", "µg/m3", "ppm by volume", "ppb by volume", "ng/L", "µmol/mol")),
    "parts_by": Field("parts by", "What the parts count: amounts (volume), masses, or mass in a volume.", "by volume",
                      ("by volume", "by mass", "m/v")),
    "temperature": Field("temperature", "The temperature the volume is counted at, not that of the gas in the duct.", "273.15 K",
                         ("273.15 K", "15 °C", "20 °C", "25 °C", "60 °F", "68 °F"), numeric=True),
    "pressure": Field("pressure", "The absolute pressure the volume is counted at.", "101.325 kPa",
                      ("101.325 kPa", "101.3 kPa", "100 kPa", "1 atm", "14.73 psi"), numeric=True),
    "conditions_word": Field("volume called", "A word such as normal or standard; it has several published meanings.", "normal"),
    "actual_volume": Field("volume", "The volume as it was in the duct or line, at the gas's own temperature and pressure.", "actual"),
    "water": Field("water", "Whether the value counts the water vapour in the gas (wet) or not (dry).", "dry", ("dry", "wet")),
    "water_content": Field("water content", "The share of water vapour in the wet gas, by volume.", "12 % H2O", numeric=True),
    "water_route": Field("water content from", "A dew point, a humidity, wet and dry bulb, water collected, or water per dry gas.", "dew point 45 °C"),
    "droplets": Field("droplets", "Water droplets in the gas: it is saturated, and the lower of measured and saturated water counts.", "with droplets"),
    "meter_factor": Field("meter factor", "What the reading of the dry gas meter is multiplied by, beside collected water.", "Y 1.012", numeric=True),
    "cooler": Field("cooler", "The temperature of the cooler before the analyser: so much water was still in the gas it read.", "cooler 4 °C"),
    "pressure_route": Field("gauge or static", "The difference from the barometer; it may be negative.", "static -12 mmH2O"),
    "barometer": Field("barometer", "The pressure at the station, not reduced to sea level.", "barometer 1008 hPa"),
    "correlations": Field("correlation", "How far the errors of two inputs move together, from -1 to 1: value, O2, CO2, H2O, T or p.", "r(value, O2) = 0.6"),
    "model": Field("gas model", "A real gas, for a stated composition: by ISO 6976 at 0, 15, 15.55 or 20 °C near ambient pressure, by AGA8 DETAIL elsewhere; else ideal.", "real gas",
                   ("real gas", "real gas by ISO 6976", "real gas by AGA8")),
    "barometer_route": Field("barometer from", "An altitude, alone or with a sea-level pressure from a weather report.", "altitude 420 m"),
    "oxygen": Field("oxygen it is stated at", "The oxygen the value was measured at or is referred to.", "11 % O2",
                    ("3 % O2", "6 % O2", "7 % O2", "11 % O2", "15 % O2"), numeric=True),
    "oxygen_meaning": Field("that oxygen is", "Measured in the gas, or the reference the value was corrected to.", "corrected to 11 % O2"),
    "oxygen_water": Field("oxygen read", "Whether the oxygen was read in dry or in wet gas.", "9.2 % O2 dry"),
    "ambient_oxygen": Field("ambient oxygen", "The oxygen of ambient air the rule counts from.", "ambient O2 20.9 %",
                            ("ambient O2 20.9 %", "ambient O2 20.95 %", "ambient O2 21 %"), numeric=True),
    "reported_as": Field("reported as", "The entity the value is counted or weighed as.", "as NO2", ("as NO2", "as NO", "as C", "as propane", "as methane", "as S")),
    "matrix_gas": Field("gas", "The gas that carried the species; parts by mass are parts of its mass.", "in nitrogen",
                        ("in nitrogen", "in dry air", "in combustion gas")),
    "total_pressure": Field("total pressure", "The pressure of the whole gas, for a partial pressure.", "in 1013 hPa", numeric=True),
    "carbon_dioxide": Field("carbon dioxide", "The carbon dioxide of the gas, by volume.", "10.1 % CO2 dry", numeric=True),
    "carbon_dioxide_meaning": Field("that carbon dioxide is", "Measured in the gas, or the reference the value was corrected to.", "corrected to 12 % CO2"),
    "carbon_dioxide_water": Field("carbon dioxide read", "Whether it was read in dry or in wet gas.", "10.1 % CO2 dry"),
    "averaging": Field("averaging time", "The time the value stands for; it changes no figure and is kept as it was written.", "8-h TWA",
                       ("8-h TWA", "daily mean", "hourly mean")),
    "averaging_order": Field("order of averaging", "Whether repeated readings are corrected one by one or their means are.", "141; 143; 142 ppm"),
    "approximate": Field("about", "The number is given as about right only.", "approx."),
    "limit_direction": Field("bounds", "Whether the value is the most or the least that is allowed.", "not more than", ("not more than", "at least")),
    "second_value": Field("said again as", "The same limit in another unit, as it was printed beside it.", "(15 mg/m3)"),
    "coverage": Field("coverage factor", "The k of the stated expanded uncertainty.", "(k=2)", ("(k=1)", "(k=2)", "(k=3)")),
}

# Which pieces can be added to which side, in the order they are offered.
ADDABLE: Mapping[str, tuple[str, ...]] = {
    "hold": ("species", "parts_by", "temperature", "pressure", "water", "oxygen", "reported_as", "matrix_gas"),
    "gas": ("water_content", "water_route", "droplets", "meter_factor", "cooler", "oxygen", "ambient_oxygen", "carbon_dioxide", "matrix_gas", "temperature", "pressure", "pressure_route",
            "barometer", "barometer_route", "model"),
    "owe": ("unit", "parts_by", "temperature", "pressure", "water", "oxygen", "reported_as"),
    **WAY_ADDABLE,
    "limit": ("value", "temperature", "pressure", "water", "oxygen"),
}
# The gas line's own temperature and pressure are those of the gas as it flowed.
GAS_HELP: Mapping[str, str] = {
    "temperature": "The temperature of the gas as it flowed.", "pressure": "The absolute pressure of the gas as it flowed.",
    "oxygen": "The oxygen measured in the gas, and whether it was read dry or wet.",
}
GAS_TITLES: Mapping[str, str] = {"temperature": "gas temperature", "pressure": "gas pressure", "oxygen": "oxygen measured"}
GAS_CHOICES: Mapping[str, tuple[str, ...]] = {
    "temperature": (), "pressure": (), "oxygen": (), "matrix_gas": ("in nitrogen", "in dry air", "in combustion gas", "CH4 93, C2H6 4, CO2 1, N2 2"),
}
GAS_EXAMPLES: Mapping[str, str] = {"temperature": "182 °C", "pressure": "1008 hPa", "oxygen": "9.2 % O2 dry"}

# The parts of the page, each with what to do there; shown when somebody asks.
PARTS: Mapping[str, str] = {
    "hold": "Write or paste the concentration as it stands on the certificate, the display or the report, with all it says of its basis. Both 8,3 and "
            "8.3 are read. What was understood appears below, piece by piece; tap a piece to correct it.",
    "gas": "Write what is known of the gas the value was measured in: water, oxygen, the cooler, temperature, pressure, the carrier. Only what a step needs is "
           "asked for, so this may stay empty.",
    "owe": "Write the unit and the basis the figure has to be on, or take them from a rule-book and change what the permit says otherwise.",
    "limit": "Write the limit with its own basis; what it leaves open is taken from what you owe. With nothing held, the limit itself is "
             "read closely: all it could mean is shown.",
    "figure": "One figure once nothing is open that would change it; until then the range of all that could have been meant.",
    "doubts": "What the texts leave open and what would change the figure, the one that matters most first. Choose what was meant and note why; nothing is assumed "
              "in silence. What has no visible effect is only listed.",
    "steps": "By what factor each correction changed the figure. A correction that should not be there shows here first.",
    "verdict": "The figure is restated onto the limit's basis and compared under the decision rule that was agreed; none is taken for granted. "
               "Turned round: what the display shows when the figure stands at the limit.",
    "working": "Every step with its formula, its numbers, where each comes from and the source, so that somebody else can redo it by hand.",
    "budget": "How far the figure may be off, from the ± of the inputs, each carried through the whole path. The drawing checks the formula against chance itself.",
    "pass-on": "The link holds the whole sheet. Who opens it sees your figure, then whether it comes to the same there. A phone reads the QR code with its camera.",
    "kept": "Sheets stay on this device, under a name or under their figure. What you were working on is kept by itself whenever another sheet takes its place.",
    "receive": "Paste a link or its code, or choose a file: a sheet, a record, or kept sheets. A record is checked: whether it was changed, and whether it comes to the same here.",
    "record": "A record seals the sheet as it is now: date, texts, settled doubts, steps, sources, uncertainty and verdict. To correct one, amend it: the new record names the old.",
    "compare": "Only what differs is listed. Each difference is carried from the other sheet into this one, alone, to see what it does to the figure; then all together.",
}

def fields_of(side: str) -> Mapping[str, Field]:
    """Every piece a side can have."""
    return WAY_FIELDS.get(side, FIELDS)
