"""The frozen records a text is read into: numbers, units, species, statements and the gas.

Nothing here computes a result; every value keeps the text it came from.
"""
from __future__ import annotations

from dataclasses import dataclass
from decimal import Decimal

VOLUME, MASS, MASS_BY_VOLUME = "volume", "mass", "mass_by_volume"
WET, DRY = "wet", "dry"
MEASURED, CORRECTED = "measured", "corrected"
UPPER, LOWER = "upper", "lower"
EACH, TOGETHER, APART = "each", "together", "apart"


@dataclass(frozen=True)
class Uncertainty:
    """How far a number may be off, as it was stated (JCGM 100:2008 clause 4)."""

    amount: Decimal
    form: str = "expanded"            # standard | expanded | rectangular | triangular
    relative: bool = False            # percent of the value
    points: bool = False              # "± n %" of a value in %: whether it is points or of the value is settled
    coverage_factor: Decimal | None = None
    degrees_of_freedom: Decimal | None = None


@dataclass(frozen=True)
class Number:
    """A number as somebody typed it. `decimal` is exact; `below` marks a "<" value."""

    decimal: Decimal
    text: str
    below: bool = False
    uncertainty: Uncertainty | None = None
    thousands: Decimal | None = None   # the other reading of "1,234": its separator groups thousands
    readings: tuple[Decimal, ...] = ()  # repeated readings; `decimal` is their mean


@dataclass(frozen=True)
class Unit:
    """A unit of measurement: SI value = number * factor + offset.

    `kind` is one of: parts, amount_fraction, mass_fraction, mass_concentration,
    amount_concentration, pressure, temperature, ...  "parts" (ppm, %, ...) leaves open what the
    parts are counted by. `text` is how we print it.
    """

    id: str
    text: str
    kind: str
    factor: float
    offset: float = 0.0


@dataclass(frozen=True)
class Quantity:
    """A number with its unit."""

    number: Number
    unit: Unit

    @property
    def si(self) -> float:
        """The value in the SI unit of its kind (K, Pa, kg/m3, mol/m3, 1)."""
        return float(self.number.decimal) * self.unit.factor + self.unit.offset


@dataclass(frozen=True)
class Species:
    """A chemical species, or a quantity measured like one. `atoms` is None for dust, TEQ, odour."""

    id: str                            # "Hg", "SO2", "benzene"; a typed formula is its own id
    name: str
    formula: str | None
    atoms: tuple[tuple[str, int], ...] | None
    cas: str | None = None
    needs_reported_as: bool = False    # NOx, TOC, total sulphur: mass has no meaning without "as"
    reported_as: tuple[str, ...] = ()  # what it may be reported as, the usual first where there is one
    usual_reported_as: str | None = None


@dataclass(frozen=True)
class MatrixGas:
    """The gas that carried the species. Exactly one of the three ways to know its molar mass."""

    id: str                            # nitrogen | dry_air | combustion_gas | stated | composition
    molar_mass: Quantity | None = None
    composition: tuple[tuple[Species, Quantity], ...] = ()
    by_mass: bool = False              # the composition's percents count masses


@dataclass(frozen=True)
class Route:
    """A way to something that was not stated itself: its kind and the quantities it was given with."""

    id: str                            # dew_point, relative_humidity, collected, ...; gauge, static, altitude, sea_level
    given: tuple[tuple[str, Quantity], ...]

    def get(self, name: str) -> Quantity | None:
        return dict(self.given).get(name)


@dataclass(frozen=True)
class Piece:
    """One understood part of a text: which field it sets, and the place it was read from."""

    field: str
    text: str
    span: tuple[int, int]


@dataclass(frozen=True)
class Reading:
    """One credible meaning of a doubt. `patch` is what it sets on the record named by the doubt."""

    id: str
    label: str
    patch: tuple[tuple[str, object], ...]
    source: str                        # a facts source id, or "common practice, no source"
    usual_because: str = ""            # non-empty: the trade's usual reading, with the reason


@dataclass(frozen=True)
class Doubt:
    """Something a text or a sheet leaves open."""

    id: str                            # "<side>.<field>", e.g. "hold.parts_by"
    title: str                         # "parts by"
    question: str
    changes: str                       # what it changes, in one plain sentence
    readings: tuple[Reading, ...]


@dataclass(frozen=True)
class Statement:
    """A concentration as somebody wrote it. None means: not stated."""

    text: str = ""
    pieces: tuple[Piece, ...] = ()
    ambiguities: tuple[Doubt, ...] = ()   # open already in the text alone: "1,234", ppt, ...
    species: Species | None = None
    value: Quantity | None = None         # None on an owed side
    unit: Unit | None = None
    unit_in_millions: Unit | None = None  # what the unit is when its M is not the gas trade's thousand
    ton_said: str | None = None           # what a bare "ton" is per: metric, short or long is open
    parts_by: str | None = None           # VOLUME | MASS | MASS_BY_VOLUME, for a unit of kind "parts"
    temperature: Quantity | None = None
    pressure: Quantity | None = None
    conditions_word: str | None = None    # "normal", "standard", "STP", ... as a volume was called
    actual_volume: bool = False           # "actual", "at line conditions"
    water: str | None = None              # WET | DRY
    water_content: Quantity | None = None # stated inside the statement: "14 % H2O"
    oxygen: Quantity | None = None        # "at 9.2 % O2"
    oxygen_meaning: str | None = None     # MEASURED | CORRECTED
    oxygen_water: str | None = None       # WET | DRY, how that oxygen was read
    carbon_dioxide: Quantity | None = None        # "corrected to 12 % CO2"
    carbon_dioxide_meaning: str | None = None     # MEASURED | CORRECTED
    carbon_dioxide_water: str | None = None
    ambient_oxygen: Quantity | None = None
    reported_as: Species | None = None
    matrix_gas: MatrixGas | None = None
    total_pressure: Quantity | None = None  # "15 Pa in 1013 hPa"
    averaging: str | None = None          # "8-h TWA", "daily mean", as it was written
    approximate: bool = False             # "approx. 10 ppm"
    averaging_order: str | None = None    # EACH | TOGETHER | APART: what repeated readings of several quantities have to do with each other
    limit_direction: str | None = None    # UPPER | LOWER, as a limit says it; None with an upper_value: between the two
    upper_value: Quantity | None = None   # "5-10 ppm": `value` is the lower end, this the upper, in the same unit
    second_value: Quantity | None = None  # "10 ppm (15 mg/m3)": the same said a second time, in another unit


@dataclass(frozen=True)
class Gas:
    """The gas it was in. None means: not stated."""

    text: str = ""
    pieces: tuple[Piece, ...] = ()
    ambiguities: tuple[Doubt, ...] = ()
    water_content: Quantity | None = None
    water_route: Route | None = None      # where the water content comes from, when it is not stated in percent
    droplets: bool = False                # the gas carries water as droplets: it is saturated, whatever was collected
    meter_factor: Quantity | None = None  # Y of the meter the dry gas volume of collected water was read on
    cooler: Quantity | None = None        # temperature of the cooler before the analyser that read the held value
    oxygen: Quantity | None = None
    oxygen_water: str | None = None
    carbon_dioxide: Quantity | None = None
    carbon_dioxide_water: str | None = None
    ambient_oxygen: Quantity | None = None
    matrix_gas: MatrixGas | None = None
    temperature: Quantity | None = None   # of the gas as it flowed
    pressure: Quantity | None = None
    pressure_said: str | None = None      # "absolute" where the text says so
    pressure_route: Route | None = None   # gauge or static: the difference from the barometer
    barometer: Quantity | None = None
    barometer_route: Route | None = None  # altitude, alone or with a sea-level pressure
    correlations: tuple[tuple[tuple[str, ...], tuple[str, ...], Quantity], ...] = ()   # "r(NOx, O2) = 0.6": the fields either may be, and the coefficient
    model: str | None = None              # "real" (by the equation that reaches the state), "iso_6976", "aga8_detail"; None: ideal, and said so
