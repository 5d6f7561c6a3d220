"""Facts with sources: constants, atomic weights, species, reference conditions, rule-books, coefficient tables."""
from gasbasis.facts.load import (ambient_oxygens, atomic_weight, atomic_weights, cautious_names, constant, constants, digest,
                                 reference_conditions, rule_books, source, sources, species, student_t, table)
from gasbasis.facts.records import Datum, ReferenceConditions, RuleBook, Source, SpeciesRow

__all__ = ["Datum", "ReferenceConditions", "RuleBook", "Source", "SpeciesRow", "ambient_oxygens", "atomic_weight",
           "atomic_weights", "cautious_names", "constant", "constants", "digest", "reference_conditions", "rule_books", "source",
           "sources", "species", "student_t", "table"]
