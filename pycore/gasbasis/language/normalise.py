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


def normalise(text: str) -> str:
    """The text in plain spelling, of the same length: place n of one is place n of the other. Footnote marks become blanks."""
    unmarked = _FOOTNOTE.sub(lambda found: " " * len(found.group()), text)
    return "".join(_MAP.get(character, character) for character in unmarked)
