"""What can go wrong, said so that the person can mend it. Any room may import this one."""
from __future__ import annotations


class CoreError(Exception):
    """Base of every error the core raises on purpose.

    `message` says what was given and what is needed, `hint` how to mend it, `field` which input to
    focus ("hold", "gas.water_content", "owe.temperature"), `span` where in the typed text.
    """

    kind = "core"

    def __init__(self, message: str, *, hint: str = "", field: str = "", span: tuple[int, int] | None = None):
        super().__init__(message)
        self.message = message
        self.hint = hint
        self.field = field
        self.span = span

    def at(self, field: str, span: tuple[int, int] | None = None) -> "CoreError":
        """The same error with the field, and the place in its text, that the caller knows."""
        if not self.field:
            self.field = field
        if self.span is None:
            self.span = span
        return self

    def as_json(self) -> dict:
        return {"kind": self.kind, "field": self.field, "message": self.message, "hint": self.hint,
                "span": list(self.span) if self.span else None}


class NotUnderstood(CoreError):
    """The text cannot be read as what its field holds."""

    kind = "not_understood"


class Missing(CoreError):
    """A relation needs something that was not given."""

    kind = "missing"


class OutOfRange(CoreError):
    """A value lies outside what is physical, or outside a method's validity."""

    kind = "out_of_range"


class NotConverged(CoreError):
    """An iterative solution did not settle. No weaker method is used in its place."""

    kind = "not_converged"


class FactsError(CoreError):
    """A row of our own tables is incomplete or contradicts another. Fails the build."""

    kind = "facts"
