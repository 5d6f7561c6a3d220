"""exp, log and sqrt of whatever a relation is called with.

The value's own method comes first (traced symbols, column expressions), then `math` for plain
numbers, then a handler registered by the door that brought the type.
"""
from __future__ import annotations

import math
from typing import Callable

_HANDLERS: dict[str, Callable] = {}    # top-level module of the type -> handler(name, value)


def register(module: str, handler: Callable) -> None:
    """Teach exp, log and sqrt a type by the top-level module it comes from; handler(name, value)."""
    _HANDLERS[module] = handler


def _make(name: str) -> Callable:
    plain = getattr(math, name)

    def function(x):
        own = getattr(x, name, None)
        if own is not None:
            return own()
        if isinstance(x, (int, float)):
            return plain(x)
        module = type(x).__module__.partition(".")[0]
        if module not in _HANDLERS:
            raise TypeError(f"{name} of a {type(x).__name__} is not known")
        return _HANDLERS[module](name, x)

    function.__name__ = name
    function.__doc__ = f"{name} of x, for any type that is known. [1]"
    return function


exp, log, sqrt = _make("exp"), _make("log"), _make("sqrt")
