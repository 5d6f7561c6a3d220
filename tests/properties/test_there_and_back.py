"""Relations that undo one another, and what has to hold whatever the numbers."""
from __future__ import annotations

import pytest
from hypothesis import given, settings, strategies as st

from gasbasis import relations

SHARES, CONTENTS = st.floats(1e-9, 0.9), st.floats(1e-12, 1e3)
STATE = st.fixed_dictionaries({"p": st.floats(1e3, 1e7), "T": st.floats(150, 1500), "Z": st.floats(0.7, 1.1), "M": st.floats(0.002, 0.5),
                               "M_gas": st.floats(0.002, 0.2), "V_m": st.floats(1e-3, 0.1), "R": st.just(8.314462618), "h": st.floats(0, 0.9),
                               "A": st.floats(0.205, 0.21), "O_ref": st.floats(0, 0.2), "O": st.floats(0, 0.2)})
PAIRS = [  # there, back, the argument each feeds to the other
    ("mass_concentration_from_amount_fraction", "x", "amount_fraction_from_mass_concentration", "gamma"),
    ("amount_concentration_from_amount_fraction", "x", "amount_fraction_from_amount_concentration", "c"),
    ("partial_pressure_from_amount_fraction", "x", "amount_fraction_from_partial_pressure", "p_i"),
    ("mass_fraction_from_amount_fraction", "x", "amount_fraction_from_mass_fraction", "w"),
    ("mass_concentration_from_mass_fraction", "w", "mass_fraction_from_mass_concentration", "gamma"),
    ("mass_concentration_from_amount_concentration", "c", "amount_concentration_from_mass_concentration", "gamma"),
    ("mass_concentration_from_molar_volume", "x", "amount_fraction_from_molar_volume", "gamma"),
    ("mass_per_amount_of_gas_from_mass_fraction", "w", "mass_fraction_from_mass_per_amount_of_gas", "q"),
    ("dry_from_wet", "y", "wet_from_dry", "y"),
    ("oxygen_dry_from_wet", "O_wet", "oxygen_wet_from_dry", "O_dry"),
    ("corrected_to_reference_oxygen", "y", "uncorrected_from_reference_oxygen", "y"),
]


@pytest.mark.parametrize(("there", "start", "back", "middle"), PAIRS, ids=[pair[0] for pair in PAIRS])
@settings(max_examples=25, deadline=None)
@given(state=STATE, value=SHARES)
def test_there_and_back(there, start, back, middle, state, value):
    def run(identity: str, argument: str, given_value: float) -> float:
        relation = relations.get(identity)
        return relation.value(**{name: given_value if name == argument else state[name] for name in relation.symbols})
    assert run(back, middle, run(there, start, value)) == pytest.approx(value, rel=1e-12)


@settings(max_examples=25, deadline=None)
@given(value=CONTENTS)
def test_dry_is_wet_without_water(value):
    for identity in ("dry_from_wet", "wet_from_dry"):
        assert relations.get(identity).value(y=value, h=0.0) == value
    assert relations.get("dry_from_cooled").value(y=value, h_r=0.0) == value
    assert relations.get("wet_from_cooled").value(y=value, h=0.0, h_r=0.0) == value


@settings(max_examples=25, deadline=None)
@given(value=CONTENTS, h=st.floats(0, 0.9), left=st.floats(0, 1))
def test_behind_a_cooler(value, h, left):
    """Dry first and then wet is the way straight to wet; a cooler that takes nothing out changes nothing."""
    h_r = h * left
    dry = relations.get("dry_from_cooled").value(y=value, h_r=h_r)
    assert relations.get("wet_from_dry").value(y=dry, h=h) == pytest.approx(
        relations.get("wet_from_cooled").value(y=value, h=h, h_r=h_r), rel=1e-12)
    assert relations.get("wet_from_cooled").value(y=value, h=h, h_r=h) == pytest.approx(value, rel=1e-12)


@settings(max_examples=25, deadline=None)
@given(moles=st.floats(0, 1e3), gas=st.floats(1e-3, 1e3))
def test_water_per_dry_gas_and_per_wet_gas_are_the_same_water(moles, gas):
    by_amounts = relations.get("water_from_amounts").value(n_w=moles, n_g=gas)
    assert by_amounts == pytest.approx(relations.get("water_from_water_per_dry_gas").value(X=moles / gas), rel=1e-12, abs=1e-300)
    assert 0 <= by_amounts < 1
