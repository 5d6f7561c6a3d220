"""The components of a gas of stated composition: their amount fractions, brought to 100 %, and its molar mass."""
from __future__ import annotations

from gasbasis import relations
from gasbasis.calculation import leaves
from gasbasis.calculation.path import Drafting, Leaf, Shown, Step
from gasbasis.language.basis import MatrixGas
from gasbasis.language.numbers import significant

_FIELD = "gas.matrix_gas"
_GRAM_PER_MOLE, _SHARE = Shown(1e-3, "g/mol"), Shown(1.0, "mol/mol")


def amount_fractions(draft: Drafting, matrix: MatrixGas) -> dict[str, str]:
    """Species id -> the name of its amount fraction. [mol/mol]"""
    if not matrix.by_mass:
        return _whole(draft, matrix, "x")
    masses, M_gas = _whole(draft, matrix, "w"), molar_mass(draft, matrix)
    return {species.id: draft.step(Step(relations.get("amount_fraction_from_mass_fraction"),
                                        {"w": masses[species.id], "M": f"M_{species.id}", "M_gas": M_gas}, f"x_{species.id}", _SHARE))
            for species, _ in matrix.composition}


def molar_mass(draft: Drafting, matrix: MatrixGas) -> str:
    """The name of the molar mass of the gas. [kg/mol]"""
    letter = "w" if matrix.by_mass else "x"
    shares = _whole(draft, matrix, letter)
    arguments: dict[str, str] = {}
    for index, (species, _) in enumerate(matrix.composition, start=1):
        arguments[f"{letter}_{index}"] = shares[species.id]
        arguments[f"M_{index}"] = leaves.species_mass(draft, f"M_{species.id}", species, _FIELD)
    mixture = relations.molar_mass_of_mixture_by_mass if matrix.by_mass else relations.molar_mass_of_mixture
    return draft.step(Step(mixture(len(matrix.composition)), arguments, "M_gas", _GRAM_PER_MOLE))


def total_text(matrix: MatrixGas) -> str:
    """What the composition adds up to as it was typed, in percent."""
    return f"{sum(quantity.number.decimal for _, quantity in matrix.composition):f}"


def _whole(draft: Drafting, matrix: MatrixGas, letter: str) -> dict[str, str]:
    """The stated shares, brought to a total of 1."""
    total = sum(quantity.si for _, quantity in matrix.composition)
    brought = "" if float(total_text(matrix)) == 100.0 else f", brought from a total of {total_text(matrix)} % to 100 %"
    unit_text = "kg/kg" if matrix.by_mass else "mol/mol"
    names = {}
    for species, quantity in matrix.composition:
        share = quantity.si / total
        names[species.id] = draft.leaf(Leaf(f"{letter}_{species.id}", share, significant(share, 6), unit_text, "typed",
                                            f"typed in It was in ({quantity.number.text} %{brought})", _FIELD))
    return names
