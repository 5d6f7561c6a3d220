"""A held value from a collected sample: the mass that counts over the volume that passed the meter, at the meter's conditions."""
from __future__ import annotations

from gasbasis import facts, relations
from gasbasis.calculation import leaves, water
from gasbasis.calculation.case import Case
from gasbasis.calculation.path import Drafting, Shown, Step
from gasbasis.calculation.routes.held import Held, plain
from gasbasis.errors import Missing
from gasbasis.language.basis import DRY, Quantity, Statement
from gasbasis.language.sample import SATURATED, Sample
from gasbasis.language.numbers import significant
from gasbasis.language.units import unit

_KILOPASCAL, _LITRE, _PERCENT = Shown(1e3, "kPa"), Shown(1e-3, "L"), Shown(1e-2, "%")
_MICROGRAM = 1e-9                      # kg


def hold_statement(sample: Sample) -> Statement:
    """What is held: a mass concentration at the meter's temperature and pressure. Raises Missing, naming the field."""
    _require(sample.mass, "mass", "the mass found", "Add it, e.g. 'Hg 12.4 ng'.")
    if sample.volume is None and sample.meter_end is None:
        raise Missing("The volume that was sampled is needed.", hint="Add it, e.g. 'meter 1204.3 L to 1324.8 L', or 'in 120.5 L'.", field="sample.volume")
    if sample.paired:
        _require(sample.mass_b, "mass_b", "the mass found in the second train", "Add it behind 'train B', e.g. 'train B: 12.9 ng, 118.8 L'.")
        if sample.volume_b is None and sample.meter_end_b is None:
            raise Missing("The volume of the second train is needed.", hint="Add it behind 'train B', e.g. 'train B: 12.9 ng, 118.8 L'.", field="sample.volume_b")
    for field, start, end in (("meter_start", sample.meter_start, sample.meter_end), ("meter_start_b", sample.meter_start_b, sample.meter_end_b)):
        if (start is None) != (end is None):
            raise Missing("The meter's volume needs its reading at the start and at the end.", hint="For example 'meter 1204.3 L to 1324.8 L'.", field=f"sample.{field}")
    if sample.volume_word is None:
        _require(sample.temperature, "temperature", "the temperature at the meter", "Add it, e.g. 'meter 24 °C'.")
        if sample.pressure is None:
            _require(sample.barometer, "barometer", "the pressure at the meter", "Add it, e.g. 'barometer 98.2 kPa', with the orifice head where there is one.")
    return Statement(text="", species=sample.species, value=plain(sample.mass), unit=unit(f"{sample.mass.unit.id}/m3"),
                     temperature=None if sample.volume_word else plain(sample.temperature),
                     pressure=None if sample.volume_word else plain(sample.pressure or sample.barometer), conditions_word=sample.volume_word,
                     water=DRY if sample.water == SATURATED else sample.water, reported_as=sample.reported_as)


def _require(quantity: Quantity | None, field: str, what: str, hint: str) -> None:
    if quantity is None:
        raise Missing(f"{what[0].upper()}{what[1:]} is needed.", hint=hint, field=f"sample.{field}")


def condition(draft: Drafting, case: Case, letter: str) -> str | None:
    """The name of the temperature or pressure at the meter; None where the volume is already one at reference conditions."""
    sample = case.sample
    if sample.volume_word is not None:
        return None
    return _temperature(draft, case, False) if letter == "T" else _pressure(draft, case, False)


def _temperature(draft: Drafting, case: Case, second: bool) -> str:
    quantity, field = case.sample.of_train("temperature", second)
    return leaves.from_temperature(draft, case, f"T_{field}", quantity, f"sample.{field}")


def _pressure(draft: Drafting, case: Case, second: bool) -> str:
    """At the meter, absolute: stated, or the barometer with the head of the orifice."""
    sample = case.sample
    if sample.pressure is not None:
        return leaves.from_quantity(draft, case, "p_meter", sample.pressure, "sample.pressure")
    barometer = leaves.from_quantity(draft, case, "p_b", sample.barometer, "sample.barometer")
    head, field = sample.of_train("head", second)
    if head is None:
        return barometer
    gauge = leaves.from_quantity(draft, case, f"p_{field}", head, f"sample.{field}")
    return draft.step(Step(relations.get("absolute_pressure"), {"p_b": barometer, "p_g": gauge}, f"p_meter_{field}", _KILOPASCAL))


def held(draft: Drafting, case: Case) -> Held:
    """Lay the steps from the mass found to the concentration at the meter, of one train or of the mean of two."""
    statement = case.hold
    shown = Shown(statement.unit.factor, statement.unit.text)
    first = _train(draft, case, False, shown)
    name = _pair(draft, case, first, shown) if case.sample.paired else first
    if case.sample.water == SATURATED:
        name = _dried(draft, case, name, shown)
    leaf = "" if case.sample.paired else "mass_found"        # of two masses neither alone stands for what is held
    return Held(name, leaf, case.sample.mass.unit.factor, shown)


def _train(draft: Drafting, case: Case, second: bool, shown: Shown) -> str:
    tag = "_b" if second else ""
    mass, volume = _mass(draft, case, second), _volume(draft, case, second)
    _watch_leak(draft, case, second, volume)
    return draft.step(Step(relations.get("mass_concentration_of_sample"), {"m": mass, "V": volume}, f"gamma_meter{tag}", shown, f"mass over volume{' B' if second else ''}"))


def _mass(draft: Drafting, case: Case, second: bool) -> str:
    """The mass found, both sections, less the blank and for recovery as far as the text says so."""
    sample, tag = case.sample, "_b" if second else ""
    found, field = sample.of_train("mass", second)
    shown = Shown(found.unit.factor, found.unit.text)
    mass = leaves.from_quantity(draft, case, f"mass_found{tag}", found, f"sample.{field}")
    back, back_field = sample.of_train("back", second)
    if back is not None:
        behind = leaves.from_quantity(draft, case, f"mass_back{tag}", back, f"sample.{back_field}")
        _watch_breakthrough(draft, case, second, mass, behind)
        mass = draft.step(Step(relations.get("mass_of_sections"), {"m_front": mass, "m_back": behind}, f"m_sections{tag}", shown))
    if sample.blank is not None and sample.blank_subtracted:
        blank = leaves.from_quantity(draft, case, "mass_blank", sample.blank, "sample.blank")
        mass = draft.step(Step(relations.get("mass_less_blank"), {"m": mass, "m_blank": blank}, f"m_net{tag}", shown))
    elif sample.blank is not None and not second:
        draft.choose("The field blank is not subtracted", "methods differ; say 'subtracted' behind it where the method has it so")
    if sample.recovery is not None and sample.recovery_corrected:
        recovery = leaves.from_quantity(draft, case, "recovery", sample.recovery, "sample.recovery")
        mass = draft.step(Step(relations.get("mass_for_recovery"), {"m": mass, "r": recovery}, f"m_recovered{tag}", shown))
    elif sample.recovery is not None and not second:
        draft.choose("The result is not corrected for recovery", "methods differ; say 'corrected' behind the recovery where the method has it so")
    return mass


def _volume(draft: Drafting, case: Case, second: bool) -> str:
    """What passed the meter, with the meter's factor."""
    sample, tag = case.sample, "_b" if second else ""
    total, field = sample.of_train("volume", second)
    if total is not None:
        volume = leaves.from_quantity(draft, case, f"V_read{tag}", total, f"sample.{field}")
    else:
        (start, start_field), (end, end_field) = sample.of_train("meter_start", second), sample.of_train("meter_end", second)
        volume = draft.step(Step(relations.get("volume_between"), {
            "V_end": leaves.from_quantity(draft, case, f"V_end{tag}", end, f"sample.{end_field}"),
            "V_start": leaves.from_quantity(draft, case, f"V_start{tag}", start, f"sample.{start_field}")}, f"V_read{tag}", _LITRE))
    factor, field = sample.of_train("meter_factor", second)
    if factor is None:
        return volume
    Y = leaves.from_quantity(draft, case, f"Y_{field}", factor, f"sample.{field}")
    return draft.step(Step(relations.get("metered_volume"), {"V_read": volume, "Y": Y}, f"V_true{tag}", _LITRE))


def _pair(draft: Drafting, case: Case, first: str, shown: Shown) -> str:
    """The mean of both trains, the second brought to the conditions of the first meter."""
    second = _train(draft, case, True, shown)
    here, there = ((_temperature(draft, case, which), _pressure(draft, case, which)) for which in (False, True)) if case.sample.volume_word is None else ((), ())
    if here != there:
        Z = leaves.ideal(draft, "Z_between_meters")
        second = draft.step(Step(relations.get("mass_concentration_at_conditions"), {
            "gamma": second, "p_1": there[1], "T_1": there[0], "Z_1": Z, "p_2": here[1], "T_2": here[0], "Z_2": Z}, "gamma_meter_b_at_a", shown,
            note="Both meters are near ambient pressure: the compression factors are taken as alike."))
    _accept_pair(draft, case, first, second)
    return draft.step(Step(relations.get("mean_of_two_trains"), {"gamma_a": first, "gamma_b": second}, "gamma_mean", shown))


def _dried(draft: Drafting, case: Case, name: str, shown: Shown) -> str:
    """The metered gas held water, saturated at the meter's temperature."""
    saturation = water.saturation_pressure(draft, case, case.sample.temperature, "sample.temperature", "meter")
    h = draft.step(Step(relations.get("water_from_vapour_pressure"), {"e": saturation, "p": _pressure(draft, case, False)}, "h_meter", _PERCENT))
    return draft.step(Step(relations.get("dry_from_wet"), {"y": name, "h": h}, "gamma_meter_dry", shown))


# --- what the method makes of a sample; it changes no figure ---

def _acceptance() -> tuple:
    table = facts.table("sampling_acceptance")
    return table, f"{facts.source(table['source']).title}, {table['locator']}"


def _level(draft: Drafting, case: Case, gamma: str) -> float | None:
    """The concentration at the method's own 20 °C and 760 mmHg, ideal. [kg/m3] None where the meter's conditions are not known."""
    table, _ = _acceptance()
    if case.sample.volume_word is not None:
        return None
    T, p = (draft.value(name(draft, case, False)) for name in (_temperature, _pressure))
    reference = leaves.fixed_quantity(table["temperature"], "degC").si, leaves.fixed_quantity(table["pressure"], "mmHg").si
    return draft.value(gamma) * reference[1] / p * T / reference[0]


def _is_mercury(case: Case) -> bool:
    return case.sample.species is not None and case.sample.species.id == "Hg"


def _accept_pair(draft: Drafting, case: Case, first: str, second: str) -> None:
    a, b = draft.value(first), draft.value(second)
    if a + b == 0:
        return draft.choose("The two trains do not differ", "both are zero")
    apart = 100 * abs(relations.get("relative_difference_of_trains").value(gamma_a=a, gamma_b=b))
    words = f"|a − b|/(a + b) = {significant(apart, 3)} %"
    level = _level(draft, case, first)
    if not _is_mercury(case) or level is None:
        return draft.choose(f"The two trains differ by {significant(apart, 3)} %", f"{words}; the method of this species says how much may be")
    table, source = _acceptance()
    mean = level * (a + b) / (2 * a) if a else 0.0
    low = mean <= float(table["low_level"]) * _MICROGRAM
    most = table["pair_at_low_level" if low else "pair_above_low_level"]
    absolute = float(table["pair_at_low_level_absolute"]) * _MICROGRAM
    agrees = apart <= float(most) or (low and abs(a - b) * (mean / ((a + b) / 2)) <= absolute)
    also = f", or {table['pair_at_low_level_absolute']} µg/m³ apart" if low else ""
    draft.choose(f"The two trains {'agree' if agrees else 'do not agree'}", f"{words}; at {significant(mean / _MICROGRAM, 3)} µg/m³ up to {most} % is allowed{also}", source)
    if not agrees:
        draft.warnings.append(f"The two trains differ by {significant(apart, 3)} %; the method accepts {most} %{also}.")


def _watch_breakthrough(draft: Drafting, case: Case, second: bool, front: str, back: str) -> None:
    if draft.value(front) <= 0:
        return
    percent = 100 * relations.get("breakthrough").value(m_back=draft.value(back), m_front=draft.value(front))
    train = f" of train {'B' if second else 'A'}" if case.sample.paired else ""
    table, source = _acceptance()
    high, low = table["breakthrough_above_low_level"], table["breakthrough_at_low_level"]
    allowed = f"; {high} % is allowed above {table['low_level']} µg/m³, {low} % at or below it" if _is_mercury(case) else ""
    draft.choose(f"Breakthrough{train} {significant(percent, 3)} %", f"second section over first{allowed}", source if allowed else "")
    if allowed and percent > float(high):
        draft.warnings.append(f"The second section{train} holds {significant(percent, 3)} % of the first: the method allows {high} %, at or below {table['low_level']} µg/m³ {low} %.")


def _watch_leak(draft: Drafting, case: Case, second: bool, volume: str) -> None:
    leak, field = case.sample.of_train("leak", second)
    if leak is None:
        return
    if case.sample.duration is None:
        raise Missing("A leak rate is held against the mean sampling rate, which needs the duration.", hint="Add it, e.g. '60 min'.", field="sample.duration")
    rate = relations.get("mean_rate").value(V=draft.value(volume), t=case.sample.duration.si)
    percent = 100 * leak.si / rate
    table, source = _acceptance()
    most = table["leak_of_mean_rate"]
    draft.choose(f"Leak rate {significant(percent, 2)} % of the mean sampling rate", f"up to {most} % is allowed", source)
    if percent > float(most):
        draft.warnings.append(f"The leak rate is {significant(percent, 2)} % of the mean sampling rate; the method allows {most} %.")
