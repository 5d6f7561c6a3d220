"""The standard uncertainty of one input, from the way it was stated (JCGM 100:2008, clause 4)."""
from __future__ import annotations

import math
from statistics import stdev

from gasbasis.errors import OutOfRange
from gasbasis.language.basis import Quantity, Uncertainty

_HALF_WIDTH = {"rectangular": math.sqrt(3.0), "triangular": math.sqrt(6.0)}   # 4.3.7, 4.3.9
UNSTATED_COVERAGE = 2.0                # how a bare "±" is taken until its doubt is settled; always listed


def standard_uncertainty(quantity: Quantity) -> float:
    """The standard uncertainty. [SI unit of the kind; that of a temperature is a difference] Raises OutOfRange.

    What was stated and the scatter of repeated readings add as variances.
    """
    return math.hypot(_stated(quantity), scatter(quantity))


def scatter(quantity: Quantity) -> float:
    """The standard uncertainty of the mean of repeated readings, s/sqrt(n); 0 without any (JCGM 100:2008, 4.2.3). [SI unit]"""
    readings = quantity.number.readings
    return stdev(map(float, readings)) / math.sqrt(len(readings)) * quantity.unit.factor if readings else 0.0


def _stated(quantity: Quantity) -> float:
    stated = quantity.number.uncertainty
    if stated is None:
        return 0.0
    if stated.amount < 0:
        raise OutOfRange(f"An uncertainty of {stated.amount} was given; it cannot be negative.", hint="Give its size.")
    amount = float(stated.amount)
    if stated.relative:
        amount *= abs(float(quantity.number.decimal)) / 100.0
    return amount / _divisor(stated) * quantity.unit.factor


def _divisor(stated: Uncertainty) -> float:
    if stated.form in _HALF_WIDTH:
        return _HALF_WIDTH[stated.form]
    if stated.form == "standard":
        return 1.0
    factor = UNSTATED_COVERAGE if stated.coverage_factor is None else float(stated.coverage_factor)
    if factor < 1:
        raise OutOfRange(f"A coverage factor of {stated.coverage_factor} was given; k is at least 1.",
                         hint="k = 2 is usual; k = 1 is a standard uncertainty.")
    return factor


def distribution(quantity: Quantity) -> str:
    """normal, rectangular or triangular."""
    stated = quantity.number.uncertainty
    return stated.form if stated is not None and stated.form in _HALF_WIDTH else "normal"


def degrees_of_freedom(quantity: Quantity) -> float:
    """As stated, and n - 1 of repeated readings, brought together (JCGM 100:2008, G.2b); else infinite. Raises OutOfRange."""
    stated = quantity.number.uncertainty
    own = math.inf if stated is None or stated.degrees_of_freedom is None else float(stated.degrees_of_freedom)
    if own <= 0:
        raise OutOfRange(f"{own:g} degrees of freedom were given; they are above zero.", hint="For n repeated readings they are n - 1.")
    repeated = scatter(quantity)
    if not repeated:
        return own
    bottom = repeated**4 / (len(quantity.number.readings) - 1) + _stated(quantity) ** 4 / own
    return standard_uncertainty(quantity) ** 4 / bottom
