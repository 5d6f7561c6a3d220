"""JSON that is not nested deeper than any of ours: deep nesting would exhaust the stack of the browser's engine, not raise."""
from __future__ import annotations

import json
import re

DEEPEST = 16
_STRING = re.compile(r'"(?:[^"\\]|\\.)*"', re.DOTALL)
_BRACKET = re.compile(r"[\[{\]}]")


def loads(text: str) -> object:
    """The value of a JSON text. Raises ValueError for what is no JSON, or nested deeper than DEEPEST."""
    depth = 0
    for bracket in _BRACKET.findall(_STRING.sub("", text)):
        depth += 1 if bracket in "[{" else -1
        if depth > DEEPEST:
            raise ValueError(f"nested deeper than {DEEPEST}")
    return json.loads(text)
