"""The sheet: one whole calculation as its texts, the readings taken, and notes. The texts are the truth."""
from __future__ import annotations

from dataclasses import dataclass, field
from typing import Mapping

from gasbasis.errors import NotUnderstood

SCHEMA = 1
_TEXTS = ("hold", "gas", "owe", "limit", "sample", "prepared", "emission", "rule_book", "title")
_MAPPINGS = ("settled", "notes")


@dataclass(frozen=True)
class Sheet:
    hold: str = ""
    gas: str = ""
    owe: str = ""
    limit: str = ""
    sample: str = ""                   # how the held value came about, where it is no direct reading
    prepared: str = ""
    emission: str = ""                 # what makes a rate of the concentration
    rule_book: str = ""
    title: str = ""
    settled: Mapping[str, str] = field(default_factory=dict)    # doubt id -> reading id
    notes: Mapping[str, str] = field(default_factory=dict)      # doubt id -> why


def read_sheet(data: object) -> Sheet:
    """A sheet from its JSON. Raises NotUnderstood for a newer schema or a value of the wrong shape."""
    if not isinstance(data, Mapping):
        raise NotUnderstood("This is not a sheet: an object with 'hold', 'gas' and 'owe' is needed.",
                            hint="Open a sheet that gasbasis wrote, or type the texts anew.")
    schema = data.get("schema", SCHEMA)
    if schema != SCHEMA:
        raise NotUnderstood(f"This sheet is of schema {schema!r}; this version reads schema {SCHEMA}.",
                            hint="Open it with a newer gasbasis, or ask the sender for the texts.", field="sheet")
    unknown = set(data) - {"schema", *_TEXTS, *_MAPPINGS}
    if unknown:
        raise NotUnderstood(f"The sheet has parts this version does not know: {', '.join(sorted(map(str, unknown)))}.",
                            hint="Open it with the gasbasis that wrote it.", field="sheet")
    for name in _TEXTS:
        if not isinstance(data.get(name, ""), str):
            raise NotUnderstood(f"'{name}' must be text.", hint="Give it as it was written.", field=name)
    for name in _MAPPINGS:
        entries = data.get(name, {})
        if not isinstance(entries, Mapping) or not all(isinstance(v, str) for pair in entries.items() for v in pair):
            raise NotUnderstood(f"'{name}' must map doubts to texts.", hint="Leave it out, or settle again.", field=name)
    return Sheet(**{name: data[name] for name in (*_TEXTS, *_MAPPINGS) if name in data})


def write_sheet(sheet: Sheet) -> dict:
    """The sheet's JSON, defaults left out."""
    given = {name: getattr(sheet, name) for name in (*_TEXTS, *_MAPPINGS)}
    return {"schema": SCHEMA, **{name: value for name, value in given.items() if value}}
