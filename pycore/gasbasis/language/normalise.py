"""One spelling for the many ways a character is typed, character by character, so that places in the text hold."""
from __future__ import annotations

import re

_MAP = {
    "µ": "u", "μ": "u", "−": "-", "–": "-", "—": "-", "‐": "-", "‑": "-", "×": "x", "⋅": "·", "∙": "·", "•": "·",
    "\u00a0": " ", "\u202f": " ", "\u2009": " ", "\u2007": " ", "\u2002": " ", "\u2003": " ", "\u3000": " ", "\t": " ",
    "\n": " ", "\r": " ", "º": "°", "˚": "°", "’": "'", "‘": "'", "′": "'", "＜": "<", "﹤": "<", "，": ",", "％": "%",
    "⁰": "0", "¹": "1", "²": "2", "³": "3", "⁴": "4", "⁵": "5", "⁶": "6", "⁷": "7", "⁸": "8", "⁹": "9",
    "₀": "0", "₁": "1", "₂": "2", "₃": "3", "₄": "4", "₅": "5", "₆": "6", "₇": "7", "₈": "8", "₉": "9",
    "Ω": "Ω", "‰": "‰", "∕": "/", "⁄": "/", "％": "%", "：": ":", "；": ";", "（": "(", "）": ")",
}
_FOOTNOTE = re.compile(r"(?<=pp[mbtq])[¹²³⁴-⁹]+|(?<=[A-Za-z%)])¹")


# Two numbers in two cells or lines of a table must not join to one: the break between their digits stays one.
_CELLS = re.compile(r"(?<=\d)[\t\n\r](?=\d)")
# What a paste from a document puts inside words and between them: a soft hyphen, marks of no width, a word broken
# at the end of a line, runs of blanks (but not between two numbers, which would then read as one).
_SCATTERED = re.compile(
    "[\u00ad\u200b-\u200d\u2060\ufeff]+(?:\\s*\\n\\s*)?"
    r"|(?<=[A-Za-z][a-z])[-\u2010][ \t]*\r?\n[ \t]*(?=[a-z]{2})"
    r"|(?<=[A-Za-z0-9][-\u2010])[ \t]*\r?\n[ \t]*(?=[a-z])"
    r"|(?<=[^\d\s]\s)\s+|(?<=\d\s)\s+(?=[^\d\s])")


def normalise(text: str) -> str:
    """The text in plain spelling, of the same length: place n of one is place n of the other. Footnote marks become blanks."""
    unmarked = _FOOTNOTE.sub(lambda found: " " * len(found.group()), text)
    plain = "".join(_MAP.get(character, character) for character in unmarked)
    for found in _CELLS.finditer(unmarked):
        plain = plain[:found.start()] + "\n" + plain[found.end():]
    return plain


def gathered(text: str) -> tuple[str, tuple[int, ...]]:
    """The text without what a paste scattered in it, and the place each character left had before."""
    dropped = {place for found in _SCATTERED.finditer(text) for place in range(*found.span())}
    kept = tuple(place for place in range(len(text)) if place not in dropped)
    return "".join(text[place] for place in kept), kept
