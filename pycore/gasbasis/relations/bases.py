"""Relations of water, reference oxygen and 'reported as': what changes a content without changing its kind."""
from __future__ import annotations

from gasbasis.physics import moisture, oxygen, reported_as
from gasbasis.relations.relation import Bound, Relation, Symbol
from gasbasis.relations.symbols import (AMOUNT_CONCENTRATION, AMOUNT_FRACTION, MASS_CONCENTRATION, MASS_FRACTION, MOLAR_MASS,
                                        WATER, WATER_BOUND, marked, positive)

_Y = Symbol("y", "", "1", "content per amount or volume of gas", "dimensionless")
_AMBIENT = Symbol("A", "", "1", "oxygen of ambient air, as the rule counts it", "dimensionless")


def _share(letter: str, mark: str, meaning: str) -> Symbol:
    return Symbol(letter, mark, "1", meaning, "dimensionless")


def _below_ambient(argument: str) -> Bound:
    return Bound(argument, "it must lie below the ambient oxygen the rule counts from",
                 "Check the reading: near ambient oxygen the sample was mostly air, and no correction has meaning.",
                 low=0.0, high="A", low_allowed=True)


_WET, _DRY = marked(_Y, "wet", "content of the wet gas"), marked(_Y, "dry", "content of the dry gas")
_MOISTURE = (
    Relation("dry_from_wet", "Wet to dry", moisture.dry_from_wet, _DRY, {"y": _WET, "h": WATER}, "en-14790", "", (WATER_BOUND,)),
    Relation("wet_from_dry", "Dry to wet", moisture.wet_from_dry, _WET, {"y": _DRY, "h": WATER}, "en-14790", "", (WATER_BOUND,)),
    Relation("oxygen_dry_from_wet", "Oxygen, wet to dry", moisture.oxygen_dry_from_wet, _share("O", "dry", "oxygen of the dry gas"),
             {"O_wet": _share("O", "wet", "oxygen of the wet gas"), "h": WATER}, "en-14790", "", (WATER_BOUND,)),
    Relation("oxygen_wet_from_dry", "Oxygen, dry to wet", moisture.oxygen_wet_from_dry, _share("O", "wet", "oxygen of the wet gas"),
             {"O_dry": _share("O", "dry", "oxygen of the dry gas"), "h": WATER}, "en-14790", "", (WATER_BOUND,)),
    Relation("carbon_dioxide_dry_from_wet", "Carbon dioxide, wet to dry", moisture.carbon_dioxide_dry_from_wet,
             _share("CO₂", "dry", "carbon dioxide of the dry gas"),
             {"CO2_wet": _share("CO₂", "wet", "carbon dioxide of the wet gas"), "h": WATER}, "en-14790", "", (WATER_BOUND,)),
)

_MEASURED = _share("O", "", "measured oxygen, dry")
_REFERENCE = _share("O", "ref", "reference oxygen")
_AT_REFERENCE = marked(_Y, "ref", "content at the reference oxygen")
_AS_MEASURED = marked(_Y, "", "content as measured, dry")
_OXYGEN = (
    Relation("corrected_to_reference_oxygen", "To the reference oxygen", oxygen.corrected_to_reference_oxygen, _AT_REFERENCE,
             {"y": _AS_MEASURED, "A": _AMBIENT, "O_ref": _REFERENCE, "O": _MEASURED}, "eu-2010-75", "Annex VI Part 7",
             (_below_ambient("O"), _below_ambient("O_ref"))),
    Relation("uncorrected_from_reference_oxygen", "Back from the reference oxygen", oxygen.uncorrected_from_reference_oxygen,
             _AS_MEASURED, {"y": _AT_REFERENCE, "A": _AMBIENT, "O_ref": _REFERENCE, "O": _MEASURED}, "eu-2010-75", "Annex VI Part 7",
             (_below_ambient("O"), _below_ambient("O_ref"))),
    Relation("referred_from_one_oxygen_to_another", "From one reference oxygen to another",
             oxygen.referred_from_one_oxygen_to_another, marked(_Y, "owe", "content at the owed oxygen"),
             {"y": marked(_Y, "hold", "content at the held oxygen"), "A": _AMBIENT, "O_hold": _share("O", "hold", "oxygen held at"),
              "O_owe": _share("O", "owe", "oxygen owed at")}, "eu-2010-75", "Annex VI Part 7",
             (_below_ambient("O_hold"), _below_ambient("O_owe"))),
    Relation("corrected_to_reference_carbon_dioxide", "To the reference carbon dioxide", oxygen.corrected_to_reference_carbon_dioxide,
             _AT_REFERENCE, {"y": _AS_MEASURED, "CO2_ref": _share("CO₂", "ref", "reference carbon dioxide"),
                             "CO2": _share("CO₂", "", "measured carbon dioxide, dry")}, "us-40-cfr-60", "Appendix A-7, Method 20",
             (positive("CO2", "it must lie above zero", "Without carbon dioxide in the gas there is nothing to refer to."),)),
    Relation("fuel_factor", "Fuel factor", oxygen.fuel_factor, Symbol("F", "o", "1", "fuel factor", "dimensionless"),
             {"A": _AMBIENT, "O": _MEASURED, "CO2": _share("CO₂", "", "measured carbon dioxide, dry")}, "us-epa-method-3", "",
             (_below_ambient("O"), positive("CO2", "it must lie above zero", "Give the carbon dioxide measured."))),
)

# In the proof the entity reported is a species of its own: as many mol_s, so n has no dimension of proof.
_N = Symbol("n", "", "1", "entities reported per molecule of the species", "dimensionless")
_M_AS = marked(MOLAR_MASS, "as", "molar mass of the entity reported")
_MASS_BOUND = (positive("M", "a molar mass is above zero", "Check the formula."),)
_AS = (
    Relation("amount_fraction_as", "Counted as another entity", reported_as.amount_fraction_as, marked(AMOUNT_FRACTION, "as"),
             {"x": AMOUNT_FRACTION, "n": _N}, "common-practice"),
    Relation("amount_concentration_as", "Counted as another entity", reported_as.amount_concentration_as,
             marked(AMOUNT_CONCENTRATION, "as"), {"c": AMOUNT_CONCENTRATION, "n": _N}, "common-practice"),
    Relation("mass_concentration_as", "Weighed as another entity", reported_as.mass_concentration_as,
             marked(MASS_CONCENTRATION, "as"), {"gamma": MASS_CONCENTRATION, "n": _N, "M_as": _M_AS, "M": MOLAR_MASS},
             "common-practice", "", _MASS_BOUND),
    Relation("mass_fraction_as", "Weighed as another entity", reported_as.mass_fraction_as, marked(MASS_FRACTION, "as"),
             {"w": MASS_FRACTION, "n": _N, "M_as": _M_AS, "M": MOLAR_MASS}, "common-practice", "", _MASS_BOUND),
)

RELATIONS = (*_MOISTURE, *_OXYGEN, *_AS)
