"""What there is to choose from: species, units, reference conditions, rule-books, and the words of caution."""
from __future__ import annotations

from gasbasis import __version__, facts
from gasbasis.errors import NotUnderstood
from gasbasis.language import species
from gasbasis.language.describe import PARTS
from gasbasis.language.units import GROUPS, unit

CAUTIONS = (
    "Gases can poison, suffocate, burn or explode, and confined spaces kill. A figure here is no clearance to enter, no alarm "
    "setting and no medical advice.",
    "Local codes, the permit's own text and licensed practice decide. Rule-books change: check the current text.",
    "Check the working before you sign for a figure.",
)


def catalogue() -> dict:
    """All lists the page chooses from."""
    return {
        "version": __version__,
        "units": [{"group": group, "text": unit(text).text} for group, texts in GROUPS.items() for text in texts],
        "species": [{"id": row.id, "name": row.name, "formula": row.formula} for row in facts.species()],
        "conditions": [_conditions(row) for row in facts.reference_conditions()],
        "rule_books": [_rule_book(book) for book in facts.rule_books()],
        "sources": [{"id": source.id, "title": source.title, "edition": source.edition, "read": source.read} for source in facts.sources().values()],
        "cautions": list(CAUTIONS),
        "help": dict(PARTS),
    }


def _conditions(row) -> dict:
    source = facts.source(row.source)
    return {"id": row.id, "name": row.name, "text": f"{row.temperature.text} {row.temperature.unit}, {row.pressure.text} {row.pressure.unit}",
            "source_text": f"{source.title}, {row.locator}", "read": row.read}


def _rule_book(book) -> dict:
    return {"id": book.id, "title": book.title, "clause": f"{book.edition}, {book.clause}", "owe": book.owe, "note": book.note,
            "words": " ".join(book.words), "read": book.read}


def search(what: str, text: str) -> list[dict]:
    """Entries of one list that a text may mean. Raises NotUnderstood for a list that is not searched."""
    if what == "species":
        return list(species.search(text)[:12])
    if what == "rule_book":
        words = text.lower().split()
        return [_rule_book(book) for book in facts.rule_books()
                if all(word in f"{book.title} {book.edition} {book.clause} {book.owe} {' '.join(book.words)}".lower() for word in words)]
    raise NotUnderstood(f"'{what}' is not searched.", hint="Search 'species' or 'rule_book'.")
