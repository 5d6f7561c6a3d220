"""Trace a relation into a tree: the formula shown is the function computed.

Trees for drawing are JSON lists with explicit parentheses:
["symbol", letter, mark], ["number", text, unit], ["+", a, b], ["-", a, b], ["*", a, b], ["/", a, b],
["^", a, b], ["neg", a], ["call", name, a], ["()", a].
"""
from __future__ import annotations

from dataclasses import dataclass
from functools import lru_cache
from typing import Callable, Mapping

from gasbasis.relations.relation import Relation, Symbol

_STRENGTH = {"+": 1, "-": 1, "neg": 2, "*": 2, "/": 2, "^": 4, "leaf": 9, "number": 9, "call": 9}


@dataclass(frozen=True, eq=False)
class Traced:
    """A node of an expression. Comparing or branching on it is refused: a relation may not choose."""

    op: str
    args: tuple

    def _binary(op: str, swapped: bool = False):  # noqa: N805 - makes the operator methods below
        def method(self, other):
            other = other if isinstance(other, Traced) else Traced("number", (other,))
            return Traced(op, (other, self) if swapped else (self, other))
        return method

    __add__, __radd__ = _binary("+"), _binary("+", True)
    __sub__, __rsub__ = _binary("-"), _binary("-", True)
    __mul__, __rmul__ = _binary("*"), _binary("*", True)
    __truediv__, __rtruediv__ = _binary("/"), _binary("/", True)
    __pow__, __rpow__ = _binary("^"), _binary("^", True)
    del _binary

    def __neg__(self):
        return Traced("neg", (self,))

    def exp(self):
        return Traced("call", ("exp", self))

    def log(self):
        return Traced("call", ("log", self))

    def sqrt(self):
        return Traced("call", ("sqrt", self))

    def __bool__(self):
        raise TypeError("a relation may not branch on a quantity")

    def _refuse(self, *others):
        raise TypeError("a relation may not compare or convert a quantity")

    __lt__ = __le__ = __gt__ = __ge__ = __eq__ = __ne__ = __float__ = __int__ = __abs__ = _refuse
    __hash__ = None


def trace(relation: Relation) -> Traced:
    """The expression tree of a relation over its argument names."""
    return relation.function(**{name: Traced("leaf", (name,)) for name in relation.symbols})


@lru_cache(maxsize=512)
def formula_tree(relation: Relation) -> list:
    """The relation's formula in symbols, as a drawing tree."""
    return _tree(trace(relation), lambda name: symbol_tree(relation.symbols[name]))


def substituted_tree(relation: Relation, numbers: Mapping[str, tuple[str, str]]) -> list:
    """The formula with (text, unit) in place of each symbol."""
    return _tree(trace(relation), lambda name: ["number", *numbers[name]])


def symbol_tree(symbol: Symbol) -> list:
    return ["symbol", symbol.letter, symbol.mark]


def _tree(node: Traced, leaf: Callable[[str], list]) -> list:
    if node.op == "leaf":
        return leaf(node.args[0])
    if node.op == "number":
        return ["number", _constant(node.args[0]), ""]
    if node.op == "call":
        return ["call", node.args[0], _tree(node.args[1], leaf)]
    if node.op == "/":                 # a fraction bar groups by itself
        return ["/", *(_tree(arg, leaf) for arg in node.args)]
    return [node.op, *(_bracketed(arg, node, index, leaf) for index, arg in enumerate(node.args))]


def _bracketed(child: Traced, parent: Traced, index: int, leaf: Callable[[str], list]) -> list:
    tree = _tree(child, leaf)
    weaker = _STRENGTH[child.op] < _STRENGTH[parent.op]
    same_on_right = index == 1 and parent.op == "-" and _STRENGTH[child.op] == _STRENGTH[parent.op]
    base = parent.op == "^" and index == 0 and child.op not in ("leaf", "number")
    exponent = parent.op == "^" and index == 1
    return ["()", tree] if (weaker or same_on_right or base) and not exponent else tree


def _constant(value: float) -> str:
    return str(int(value)) if float(value).is_integer() else repr(value)


def plain_text(tree: list) -> str:
    """A drawing tree as one line of text: γ = x·p·M/(Z·R·T)."""
    kind, *rest = tree
    if kind == "symbol":
        return f"{rest[0]}_{rest[1]}" if rest[1] else rest[0]
    if kind == "number":
        return f"{rest[0]} {rest[1]}".strip()
    if kind == "()":
        return f"({plain_text(rest[0])})"
    if kind == "neg":
        return f"−{plain_text(rest[0])}"
    if kind == "call":
        return f"{rest[0]}({plain_text(rest[1])})"
    first, second = rest
    if kind == "/":
        top = f"({plain_text(first)})" if first[0] in "+-" else plain_text(first)
        bottom = f"({plain_text(second)})" if second[0] in "+-*/" else plain_text(second)
        return f"{top}/{bottom}"
    if kind == "^":
        return f"{plain_text(first)}^{'(' + plain_text(second) + ')' if second[0] not in ('symbol', 'number') else plain_text(second)}"
    return f"{plain_text(first)}{ {'+': ' + ', '-': ' − ', '*': '·'}[kind] }{plain_text(second)}"


def python_source(node: Traced) -> str:
    """The tree as a Python expression over the argument names, evaluated in the same order as the function."""
    if node.op in ("leaf", "number"):
        return str(node.args[0]) if node.op == "leaf" else repr(node.args[0])
    if node.op == "call":
        return f"{node.args[0]}({python_source(node.args[1])})"
    if node.op == "neg":
        return f"(-{python_source(node.args[0])})"
    operator = "**" if node.op == "^" else node.op
    return f"({python_source(node.args[0])}{operator}{python_source(node.args[1])})"
