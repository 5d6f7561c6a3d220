"""What a series is restated by: the sheet's texts with columns in braces, the file's own habits, the means and their rules. From JSON."""
from __future__ import annotations

from dataclasses import dataclass, field
from typing import Mapping

from gasbasis.errors import Missing, NotUnderstood
from gasbasis.series.template import Texts

SCHEMA = 1
KEEP, ZERO, HALF, FULL, LEAVE_OUT = "keep", "zero", "half", "full", "leave_out"
BELOW_RULES = {ZERO: "counted as zero", HALF: "counted as half the value", FULL: "counted as the value", LEAVE_OUT: "left out"}
NEGATIVE_RULES = {KEEP: "kept as they are", ZERO: "counted as zero", LEAVE_OUT: "left out"}
ORDERS = {"mean_of_corrected": "mean of the restated rows", "corrected_mean": "the mean row restated"}
STAMPS = {"start": "a stamp is the start of its interval", "end": "a stamp is the end of its interval"}
_TOP = ("schema", "title", "species", "gas", "rule_book", "settled", "usual", "file", "time", "status", "missing", "below", "negatives", "means", "flow", "digits", "limit")


@dataclass(frozen=True)
class SpeciesSettings:
    name: str
    texts: Texts
    settled: Mapping[str, str] = field(default_factory=dict)


@dataclass(frozen=True)
class Limit:
    """How exceedances are judged. The limit itself stands in the species' text."""

    rule: str
    percent: float | None = None       # the expanded uncertainty (k = 2) of one mean, in percent of it
    number: float | None = None        # what a rule asks for: a guard band, a percentage


@dataclass(frozen=True)
class Flow:
    """The duct's flow: column, unit, and the basis its volume is counted on, as an owed text says it."""

    column: str
    unit: str
    basis: str
    weighs: bool = False               # means are weighted by it


@dataclass(frozen=True)
class Settings:
    species: tuple[SpeciesSettings, ...]
    usual: bool = False
    title: str = ""
    file: Mapping[str, object] = field(default_factory=dict)
    zone: str = ""
    stamp: str | None = None
    interval: float | None = None      # s
    between: tuple[str | None, str | None] = (None, None)
    status_column: str | None = None
    status_valid: tuple[str, ...] = ()
    missing: tuple[str, ...] = ()
    below: str | None = None
    negatives: str = KEEP              # a negative reading is a reading: it is never clipped unasked
    windows: tuple[str, ...] = ()
    order: str | None = None
    capture_percent: float | None = None
    percentiles: tuple[float, ...] = ()
    limit: Limit | None = None
    flow: Flow | None = None
    digits: int = 6                    # significant digits of the rows written; said in the header block


def read_settings(data: object) -> Settings:
    """The settings of a JSON object. Raises NotUnderstood, Missing; nothing that is not known is passed over."""
    if not isinstance(data, Mapping):
        raise NotUnderstood("The settings of a series are one JSON object.", hint='For example {"species": [{"name": "NOx", "hold": "NOx {NOx} ppm dry", "owe": "mg/m3 ..."}]}.')
    _refuse_unknown(data, _TOP, "settings")
    if data.get("schema", SCHEMA) != SCHEMA:
        raise NotUnderstood(f"These settings are of schema {data['schema']!r}; this version reads {SCHEMA}.", hint="Use a newer gasbasis.", field="settings")
    time, means, status = (_part(data, name) for name in ("time", "means", "status"))
    _refuse_unknown(time, ("columns", "date_order", "zone", "stamp", "interval_s", "from", "to"), "time")
    _refuse_unknown(means, ("windows", "order", "capture_percent", "percentiles"), "means")
    _refuse_unknown(status, ("column", "valid"), "status")
    file = dict(_part(data, "file"))
    _refuse_unknown(file, ("encoding", "delimiter", "decimal"), "file")
    file |= {name: time[key] for name, key in (("time_columns", "columns"), ("date_order", "date_order")) if time.get(key)}
    return Settings(
        _species(data), data.get("usual") is True, str(data.get("title", "")), file, str(time.get("zone", "")),
        _one_of(time.get("stamp"), STAMPS, "time.stamp"), _positive(time.get("interval_s"), "time.interval_s"), (time.get("from"), time.get("to")),
        status.get("column"), tuple(map(str, status.get("valid", ()))), tuple(map(str, data.get("missing", ()))),
        _one_of(data.get("below"), BELOW_RULES, "below"), _one_of(data.get("negatives", KEEP), NEGATIVE_RULES, "negatives"),
        tuple(map(str, means.get("windows", ()))), _order(means), _percent(means.get("capture_percent"), "means.capture_percent"),
        tuple(_percent(number, "means.percentiles") for number in means.get("percentiles", ())), _limit(data), _flow(data), int(_positive(data.get("digits", 6), "digits")))


def _species(data: Mapping) -> tuple[SpeciesSettings, ...]:
    entries = data.get("species")
    if not isinstance(entries, (list, tuple)) or not entries:
        raise Missing("A series names at least one species.", hint='Give "species": [{"name": ..., "hold": ..., "owe": ...}].', field="species")
    found = []
    for entry in entries:
        _refuse_unknown(entry, ("name", "hold", "gas", "owe", "limit", "rule_book", "settled"), "species")
        for name in ("name", "hold", "owe"):
            if not isinstance(entry.get(name), str) or not entry[name].strip():
                raise Missing(f"A species of the series needs '{name}' as text.", hint="For example hold 'NOx {NOx} ppm dry as NO2'.", field=f"species.{name}")
        texts = Texts(entry["hold"], str(entry.get("gas", data.get("gas", ""))), entry["owe"], str(entry.get("limit", "")), str(entry.get("rule_book", data.get("rule_book", ""))))
        found.append(SpeciesSettings(entry["name"].strip(), texts, {**_part(data, "settled"), **_part(entry, "settled")}))
    names = [entry.name for entry in found]
    if len(set(names)) < len(names):
        raise NotUnderstood(f"Two species are called the same: {', '.join(names)}.", hint="Give each its own name.", field="species.name")
    return tuple(found)


def _order(means: Mapping) -> str | None:
    order = _one_of(means.get("order"), ORDERS, "means.order")
    if means.get("windows") and order is None:
        raise Missing("Means of restated rows and the restated mean row differ; which is owed?", hint='Give means.order: "mean_of_corrected" or "corrected_mean".',
                      field="means.order")
    return order


def _limit(data: Mapping) -> Limit | None:
    limit = _part(data, "limit")
    if not limit:
        return None
    _refuse_unknown(limit, ("rule", "percent", "number"), "limit")
    if not limit.get("rule"):
        raise Missing("Exceedances need the decision rule that was agreed.", hint='Give limit.rule, e.g. "simple".', field="limit.rule")
    return Limit(str(limit["rule"]), _percent(limit.get("percent"), "limit.percent"), None if limit.get("number") is None else float(limit["number"]))


def _flow(data: Mapping) -> Flow | None:
    flow = _part(data, "flow")
    if not flow:
        return None
    _refuse_unknown(flow, ("column", "unit", "basis", "weighs"), "flow")
    for name, example in (("column", "Flow"), ("unit", "m3/h"), ("basis", "273.15 K, 101.3 kPa, dry")):
        if not flow.get(name):
            raise Missing(f"A flow needs its {name}.", hint=f"For example '{example}'.", field=f"flow.{name}")
    return Flow(str(flow["column"]), str(flow["unit"]), str(flow["basis"]), flow.get("weighs") is True)


def _part(data: Mapping, name: str) -> Mapping:
    part = data.get(name, {})
    if not isinstance(part, Mapping):
        raise NotUnderstood(f"'{name}' must be an object.", hint="See the example settings in demo/.", field=name)
    return part


def _refuse_unknown(data: object, known: tuple[str, ...], where: str) -> None:
    if not isinstance(data, Mapping):
        raise NotUnderstood(f"'{where}' must be an object.", hint="See the example settings in demo/.", field=where)
    unknown = [name for name in data if name not in known]
    if unknown:
        raise NotUnderstood(f"'{where}' has parts that are not known: {', '.join(map(str, unknown))}.", hint=f"Known are: {', '.join(known)}.", field=where)


def _one_of(value: object, known: Mapping[str, str], where: str) -> str | None:
    if value is not None and value not in known:
        raise NotUnderstood(f"'{where}' is {value!r}.", hint=f"It is one of {', '.join(known)}.", field=where)
    return value


def _positive(value: object, where: str) -> float | None:
    if value is None:
        return None
    if isinstance(value, bool) or not isinstance(value, (int, float)) or not value > 0:
        raise NotUnderstood(f"'{where}' is {value!r}; a number above zero is needed.", hint="Leave it out, or type a number.", field=where)
    return float(value)


def _percent(value: object, where: str) -> float | None:
    number = _positive(value, where)
    if number is not None and number > 100:
        raise NotUnderstood(f"'{where}' is {number:g}; it lies between 0 and 100.", hint="Type a percentage.", field=where)
    return number
