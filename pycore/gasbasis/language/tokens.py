"""The patterns of a statement's parts, over normalised text. Each is a table row; the reader knows the order."""
from __future__ import annotations

import re

_MASS = r"(?:kilograms?|milligrams?|micrograms?|nanograms?|picograms?|grams?|grains?|pounds?|kg|mg|ug|mcg|ng|pg|fg|gr|g|lbs|lb)"
_AMOUNT = r"(?:kmol|mmol|umol|nmol|pmol|lb-?mol|mol)"
_SMALL_VOLUME = r"(?:mL|ml|uL|ul|nL|nl|cm3|cm\^3|cc|dm3|L|l)"
_CUBIC = (r"(?:cubic (?:metres?|meters?|feet|foot)|cu\.? ?ft\.?|m\^?3|dm\^?3|cm\^?3|ft\^?3|mL|ml|uL|nL|litres?|liters?|L|l|cc|"
          r"(?<=[sdna])(?:cm|cf|cft|L|l)|cbm|cf)")
_COUNT = r"(?:1000|100|million|10\^?6|MM|M)"
# What a volume is called before or behind its unit: N, S, std, dry std, A, R ...
_CALLED = r"(?:(?:dry|wet) std\.?|(?:dry|wet) standard|standard|normal|actual|std\.?|ds|dn|da|ws|wn|N|S|A|R|s|n|a|d)"

MASS_PER_VOLUME = re.compile(
    rf"(?P<mass>{_MASS})(?:\s?(?P<entity>[A-Z][A-Za-z0-9]*))?\s?(?:/|\bper\b)\s?(?P<count>{_COUNT})?\s?(?P<called>{_CALLED})?[ .]?"
    rf"(?P<volume>{_CUBIC})(?P<behind>[ ]?\((?:N|n|stp|STP|S)\)|[ ]?(?:N|n|stp|STP)(?![\w-])|S(?![\w-]))?(?![A-Za-z0-9])")
AMOUNT_PER_VOLUME = re.compile(rf"(?P<amount>{_AMOUNT})\s?(?:/|\bper\b)\s?(?P<called>N|S|n|s)?(?P<volume>{_CUBIC})(?![A-Za-z0-9])")
# "mg m-3", "µg·m⁻³", "nmol mol⁻¹"
POWER_NOTATION = re.compile(rf"(?P<top>{_MASS}|{_AMOUNT})[ ·.*]{{0,2}}(?P<bottom>m|L|l|mol|kg|dm|cm)(?:\^?-|⁻)(?P<power>[13])(?![A-Za-z0-9])")
MASS_PER_MASS = re.compile(rf"(?P<top>{_MASS})\s?/\s?(?P<bottom>kg|mg|ug|g)(?![A-Za-z0-9])")
AMOUNT_PER_AMOUNT = re.compile(rf"(?P<top>{_AMOUNT})\s?/\s?(?P<bottom>mmol|umol|kmol|mol)(?![A-Za-z0-9])")
VOLUME_PER_VOLUME = re.compile(rf"(?P<top>{_SMALL_VOLUME})\s?/\s?(?P<bottom>m3|m\^3|L|l|mL|ml|dm3|cm3)(?![A-Za-z0-9])")
MOLAR_MASS = re.compile(r"(?:kg/kmol|g/mol|kg/mol)(?![A-Za-z0-9])")

# ppm with what may be glued to it: v, w, m, d, in any usual order, or a bracket.
PARTS = re.compile(
    r"(?P<before>vol|v|mol|mole|wt|w|mass|m)?[ .-]{0,2}(?P<parts>ppm|ppb|ppt|ppq|pphm|vpm|parts per (?:million|billion|trillion)|percent|per ?cent|%|‰|permil)"
    r"(?P<glued>vd|vw|dv|wv|md|wd|vol|mol|wt|by ?vol|v|w|m)?(?P<ending_dry>d(?=\b))?(?![A-Za-z0-9])", re.IGNORECASE)

PRESSURE_UNIT = re.compile(
    r"(?:mm ?Hg|in\.? ?Hg|inches (?:of )?(?:Hg|mercury)|mm ?H2O|mm ?WC|mm ?WS|in\.? ?H2O|in\.? ?w\.?c\.?|inWC|inWG|\"Hg|\"H2O|"
    r"MPa|kPa|hPa|Pa|mbar|millibar|mb|bars?|atm(?:osphere)?s?|at|psi|torr|Torr)(?P<gauge>\(g\)|\(a\)|g|a|\s?abs\.?|\s?gauge|\s?absolute)?(?![A-Za-z0-9])")
TEMPERATURE_UNIT = re.compile(r"(?:° ?[CFR]|deg\.? ?[CFR]|degrees? [CFR]|celsius|kelvin|[CFKR])(?![A-Za-z0-9])")

PARTS_BY = (
    ("volume", re.compile(r"\(?\s?(?:v/v|by\s?vol(?:ume)?|vol/vol|v/vol|volumetric|mol/mol|by\s?mole|molar|mol(?:e)?(?=\s|\)|,|;|$)|\(vol(?:\.|ume)?\)|\(?vol\.(?=\s?[,;)])|\(v\)|\(mol\))\s?\)?(?![A-Za-z0-9/])", re.IGNORECASE)),
    ("mass_by_volume", re.compile(r"\(?\s?(?:m/v|w/v|wt/vol|mass in volume|mass by volume|mass per volume)\s?\)?(?![A-Za-z0-9/])", re.IGNORECASE)),
    ("mass", re.compile(r"\(?\s?(?:m/m|w/w|wt/wt|by\s?(?:mass|weight|wt\.?)|\(wt\.?\)|\(w\)|\(m\)|\(mass\)|wt\.?(?=\s|\)|,|;|$))\s?\)?(?![A-Za-z0-9/])", re.IGNORECASE)),
)
WATER = (
    ("dry", re.compile(r"(?:on\s)?(?:a\s)?(?:dry(?:\s(?:basis|gas|volume|flue gas))?|d\.\s?b\.|db|tr\.|trocken)(?![A-Za-z0-9])", re.IGNORECASE)),
    ("wet", re.compile(r"(?:on\s)?(?:a\s)?(?:(?:wet|moist|humid)(?:\s(?:basis|gas|volume|flue gas))?|w\.\s?b\.|wb|as\s?is|feucht)(?![A-Za-z0-9])", re.IGNORECASE)),
)
CONDITIONS_WORD = (
    ("STP", re.compile(r"(?:at\s)?\(?S\.?T\.?P\.?\)?(?![A-Za-z0-9])")),
    ("NTP", re.compile(r"(?:at\s)?\(?N\.?T\.?P\.?\)?(?![A-Za-z0-9])")),
    ("normal", re.compile(r"i\.\s?N\.")),                   # German "im Normzustand", behind mg/m3
    ("normal", re.compile(r"(?:at |under )?normal(?:\sconditions|\sstate|\stemperature and pressure)?(?![A-Za-z0-9])", re.IGNORECASE)),
    ("standard", re.compile(r"(?:at |under )?(?:standard(?:\s(?:conditions|temperature and pressure|state))?|std\.? conditions)(?![A-Za-z0-9])", re.IGNORECASE)),
)
ACTUAL = re.compile(r"(?:at |under )?(?:actual|line|flue|duct|stack|operating)(?:\s(?:conditions|volume))(?![A-Za-z0-9])|\bactual\b", re.IGNORECASE)
REPORTED_AS = re.compile(r"\(?\s?(?:(?:expressed|reported|measured|calculated|calc\.|given|counted)\s)?(?:as|als):?\s+(?P<name>[A-Za-z0-9()\-]+(?:\s(?:equivalent|carbon))?)", re.IGNORECASE)
OXYGEN_NAME = r"(?:O2|oxygen|oxygen content)(?![A-Za-z0-9])"
WATER_NAME = r"(?:H2O|water(?: vapou?r)?|moisture|humidity)(?![A-Za-z0-9])"
CARBON_DIOXIDE_NAME = r"(?:CO2|carbon dioxide)(?![A-Za-z0-9])"
CORRECTED = re.compile(r"(?:corrected(?:\s(?:to|for))?|corr\.?(?:\sto)?|referred to|reference|ref\.?|normali[sz]ed to|norm\. to|standardi[sz]ed to|related to|based on|@\s?ref\.?)\s*:?\s*(?:of\s)?", re.IGNORECASE)
MEASURED = re.compile(r"(?:measured(?:\sat|\swith)?|meas\.?(?:\sat)?|actual|found|operating)\s*:?\s*", re.IGNORECASE)
COVERAGE = re.compile(r"\(?\s?k\s?=\s?(?P<k>\d+(?:[.,]\d+)?)\s?\)?", re.IGNORECASE)
DEGREES_OF_FREEDOM = re.compile(r"\(?\s?(?:dof|d\.o\.f\.|degrees of freedom|ν)\s?[=:]?\s?(?P<dof>-?\d+(?:[.,]\d+)?)\s?\)?", re.IGNORECASE)
MATRIX = (
    ("nitrogen", re.compile(r"(?:in|balance|bal\.?|rest)\s(?:dry\s)?(?:nitrogen|N2)(?![A-Za-z0-9])", re.IGNORECASE)),
    ("dry_air", re.compile(r"in\s(?:dry\s|synthetic\s|zero\s|clean\s)?air(?![A-Za-z0-9])", re.IGNORECASE)),
    ("combustion_gas", re.compile(r"in\s(?:combustion|flue|stack|exhaust|waste)\s?gas(?:es)?(?![A-Za-z0-9])", re.IGNORECASE)),
)
STATED_MOLAR_MASS = re.compile(r"(?:in\s(?:a\s)?gas\s(?:of|with)\s)?(?:M(?:_?gas)?|MW|molar mass|mol\.? wt\.?)\s?(?:=|of|:)?\s?(?=[\d.,])", re.IGNORECASE)
# Which way a limit bounds. Words that mean something else elsewhere ("under normal conditions") count only before a number.
_BEFORE_NUMBER = r"(?=\s*(?:about\s|approx\.?\s|~\s?)?[\d.,])"
_SHALL = r"(?:(?:shall|must|should|may|is|are|to|can|does|do|will)\s)?(?:be\s)?"
LIMIT_DIRECTION = (
    ("upper", re.compile(
        rf"{_SHALL}(?:not (?:to )?(?:be |contain )?(?:exceed(?:ed|ing)?|more than|above|higher than|greater than|over)|no(?:t)? (?:more|higher|greater) than|"
        rf"less than or equal to|at most|max(?:imum|\.)?|upper limit|or (?:less|lower|below)|{_SHALL}(?:below|under|less than|lower than|up to){_BEFORE_NUMBER})(?![A-Za-z0-9])"
        r"|<=?|=<|≤|≯", re.IGNORECASE)),
    ("lower", re.compile(
        rf"{_SHALL}(?:not (?:be )?(?:less than|below|lower than|under)|no(?:t)? (?:less|lower|fewer) than|greater than or equal to|at least|"
        rf"min(?:imum|\.)?|lower limit|or (?:more|higher|greater|above)|{_SHALL}(?:above|over|more than|greater than|higher than){_BEFORE_NUMBER})(?![A-Za-z0-9])"
        r"|>=?|=>|≥|≮", re.IGNORECASE)),
)
RANGE_OPENING = re.compile(r"(?:between|from|in the range(?: of)?)\s+", re.IGNORECASE)
RANGE_SIGN = re.compile(r"\s?(?:-|\.\.\.?|…|\bto\b|\band\b|\bthrough\b)\s?", re.IGNORECASE)
_PERIOD = r"\d+(?:[.,]\d+)?[ -]?(?:h|hrs?|hours?|min|mins|minutes?|d|days?|months?)\.?(?![A-Za-z0-9])"
_MEAN = r"(?:mean|average|avg\.?|averaging (?:time|period))(?: values?)?"
_EVERY = r"(?:half[- ]hourly|half[- ]hour|hourly|daily|weekly|monthly|annual|yearly|rolling|calendar[- ](?:day|year)|moving|arithmetic)"
AVERAGING = re.compile(
    rf"(?:averaged over (?:a |an )?|over (?:a |an )?)?(?:{_PERIOD}[ -]?)?(?:{_EVERY}\s)*"
    rf"(?:TWA|time[- ]weighted average|STEL|short[- ]term exposure limit|ceiling(?: limit)?|{_MEAN}(?!\s?of\s?\d)|(?<=-)value)(?![A-Za-z0-9])(?: over {_PERIOD})?"
    rf"|(?:averaged over |over )?(?:a |an )?{_PERIOD}|{_EVERY}(?: values?)?(?![A-Za-z0-9])", re.IGNORECASE)
APPROXIMATE = re.compile(r"(?:approx(?:\.|imately)?|about|around|circa|ca\.?)(?![A-Za-z0-9])|~|≈", re.IGNORECASE)
# A mass, amount or length alone is no concentration.
NO_CONCENTRATION = re.compile(rf"{_MASS}(?![A-Za-z0-9/])")
CONNECTOR = re.compile(
    r"\[\d{1,2}\]|(?:at|and|of|in|with|on|the|a|an|is|was|are|be|as|by|to|for|result|results|conc(?:entrations?|\.)?|value|reading|measured(?:\svalue)?|found|"
    r"content|basis|gas|vol\.?|emissions?|slip|levels?|limit(?:\svalue)?|total|elemental|gaseous|sample|analyte|component|parameter|certified|nominal|(?:shall |must |may )?contains?)(?![A-Za-z0-9])"
    r"|[,;:()\[\]=*|/†‡#@.&+-]+", re.IGNORECASE)
WORD = re.compile(r"[^\s,;()\[\]]+")
