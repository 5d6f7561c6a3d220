"""What must hold whatever the numbers: there and back, scale, no water no difference, monotony, traced equals computed."""
from __future__ import annotations

import itertools
import json

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from gasbasis.answer import answer

KINDS = {  # a text for each kind of quantity, on conditions of its own
    "volume": "ppm by volume", "amount fraction": "nmol/mol", "mass fraction": "ug/kg", "parts by mass": "ppb by mass",
    "mass concentration": "mg/m3 at {T} K, {p} kPa", "parts in volume": "ppm m/v at {T} K, {p} kPa",
    "amount concentration": "umol/m3 at {T} K, {p} kPa", "partial pressure": "Pa in {p} kPa"}
GAS = "14 % H2O, 9 % O2 dry, 10 % CO2 dry, in combustion gas, ambient O2 21 %"

temperatures = st.floats(230, 400).map(lambda value: round(value, 2))
pressures = st.floats(50, 200).map(lambda value: round(value, 2))
values = st.floats(1e-6, 1e6).map(lambda value: float(f"{value:.6g}"))
bases = st.sampled_from(["", ", dry", ", wet"])


def restate(hold: str, owe: str, gas: str = GAS) -> float:
    reply = json.loads(answer(json.dumps({"task": "restate", "sheet": {"hold": hold, "owe": owe, "gas": gas}})))["answer"]
    assert reply["figure"], (hold, owe, reply["problems"], reply["sentence"])
    return reply["figure"]["value"]


def held(value: float, unit: str, tail: str) -> str:
    number = f"{value:.17g}".replace("+", "")
    return f"SO2 {number} {unit}{tail}"


@pytest.mark.parametrize(("first", "second"), list(itertools.combinations_with_replacement(KINDS, 2)), ids=lambda kind: kind.replace(" ", "-"))
@settings(max_examples=6, deadline=None)
@given(value=values, T1=temperatures, p1=pressures, T2=temperatures, p2=pressures, basis=bases, other=bases)
def test_there_and_back(first, second, value, T1, p1, T2, p2, basis, other):
    if not basis or not other:
        basis = other = ""             # silence on both sides, or a word on both
    one, two = KINDS[first].format(T=T1, p=p1) + basis, KINDS[second].format(T=T2, p=p2) + other
    there = restate(held(value, one, ""), two)
    assert restate(held(there, two, ""), one) == pytest.approx(value, rel=1e-11)


@pytest.mark.parametrize(("first", "second"), list(itertools.product(KINDS, KINDS)), ids=lambda kind: kind.replace(" ", "-"))
def test_twice_the_value_is_twice_the_figure(first, second):
    one, two = KINDS[first].format(T=300, p=99), KINDS[second].format(T=280, p=102)
    assert restate(f"SO2 8.4 {one}", two) == pytest.approx(2 * restate(f"SO2 4.2 {one}", two), rel=1e-12)


@pytest.mark.parametrize("kind", [kind for kind in KINDS if kind not in ("mass fraction", "parts by mass")])
def test_without_water_dry_is_wet(kind):
    unit = KINDS[kind].format(T=300, p=99)
    gas = GAS.replace("14 %", "0 %")
    assert restate(f"SO2 4.2 {unit}, wet", f"{unit}, dry", gas) == pytest.approx(4.2, rel=1e-12)


@pytest.mark.parametrize("kind", [kind for kind in KINDS if kind not in ("mass fraction", "parts by mass")])
def test_dry_is_more_than_wet_by_the_water_left_out(kind):
    unit = KINDS[kind].format(T=300, p=99)
    assert restate(f"SO2 4.2 {unit}, wet", f"{unit}, dry") == pytest.approx(4.2 / 0.86, rel=1e-12)


@settings(max_examples=30, deadline=None)
@given(T1=temperatures, T2=temperatures)
def test_a_warmer_reference_volume_holds_less(T1, T2):
    low, high = sorted((T1, T2))
    if high - low < 0.01:
        return
    assert restate("SO2 10 ppm by volume", f"mg/m3 at {high} K, 100 kPa") < restate("SO2 10 ppm by volume", f"mg/m3 at {low} K, 100 kPa")


@settings(max_examples=30, deadline=None)
@given(p1=pressures, p2=pressures)
def test_a_denser_reference_volume_holds_more(p1, p2):
    low, high = sorted((p1, p2))
    if high - low < 0.01:
        return
    assert restate("SO2 10 ppm by volume", f"mg/m3 at 300 K, {high} kPa") > restate("SO2 10 ppm by volume", f"mg/m3 at 300 K, {low} kPa")


@settings(max_examples=30, deadline=None)
@given(reference=st.floats(0, 18).map(lambda value: round(value, 1)), measured=st.floats(0, 18).map(lambda value: round(value, 1)))
def test_correcting_and_uncorrecting_undo_each_other(reference, measured):
    gas = f"{measured} % O2 dry, ambient O2 20.9 %"
    there = restate("SO2 10 mg/m3 dry", f"mg/m3 dry, {reference} % O2", gas)
    sheet = {"hold": f"SO2 {there!r} mg/m3 dry corrected to {reference} % O2", "owe": "mg/m3 dry", "gas": gas, "settled": {"owe.oxygen": "measured"}}
    back = json.loads(answer(json.dumps({"task": "restate", "sheet": sheet})))["answer"]["figure"]["value"]
    assert back == pytest.approx(10, rel=1e-11)
