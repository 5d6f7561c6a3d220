"""What a sample comes to beside the figure: its detection limit as a concentration, and what a display should read."""
from __future__ import annotations

from gasbasis.calculation.case import Case
from gasbasis.calculation.path import Path, evaluate
from gasbasis.language.numbers import significant

_DIGITS = 3
_NOT_IN_THE_LIMIT = ("mass_back", "mass_blank")     # a detection limit is of the mass found alone


def about_sample(case: Case, path: Path) -> list[dict]:
    """Title and text of each; nothing without a detection limit."""
    limit = case.sample.detection_limit if case.sample is not None else None
    if limit is None:
        return []
    values = {name: 0.0 for name in path.leaves if name.removesuffix("_b") in _NOT_IN_THE_LIMIT}
    values |= {name: limit.si for name in path.leaves if name.removesuffix("_b") == "mass_found"}
    value = evaluate(path, values)[path.figure] / path.shown.factor
    return [{"title": "detection limit", "text": f"{limit.number.text} {limit.unit.text} is {significant(value, _DIGITS)} {path.shown.unit_text} of the figure"}]


def below_detection(case: Case) -> list[str]:
    """A warning for a mass that is given as found though it lies below the detection limit."""
    sample = case.sample
    if sample is None or sample.detection_limit is None or sample.mass.number.below or sample.mass.si >= sample.detection_limit.si:
        return []
    return [f"The mass found, {sample.mass.number.text} {sample.mass.unit.text}, lies below the detection limit of {sample.detection_limit.number.text} {sample.detection_limit.unit.text}: "
            f"report it as '< {sample.detection_limit.number.text} {sample.detection_limit.unit.text}' where the method has it so."]
