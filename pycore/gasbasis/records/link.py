"""A sheet as a short code for a link's fragment, and back. A cut, altered or newer code is refused, never guessed.

Code, all in [A-Za-z0-9_-] and ending in a letter or digit:

    version (1 character) · body form (t plain, z deflated) · length of the figure part (2, base 36)
    · the sender's figure, base64url · the body, base64url · check (7, base 32)

The figure stands apart and uncompressed so that the page can show it "as sent" before the core is up.
The check is a CRC-32 over version, figure and the uncompressed body: it finds accidents, it is no signature.
"""
from __future__ import annotations

import base64
import binascii
import json
import re
import zlib
from dataclasses import dataclass

from gasbasis.errors import NotUnderstood
from gasbasis.records import bounded_json
from gasbasis.records.sheet import Sheet, read_sheet, write_sheet

VERSION = "1"
LONGEST_CODE = 1800                    # characters; above it a file is handed on instead
_LARGEST_BODY = 64_000                 # bytes, against a deflated bomb
_CHECK_LENGTH = 7
_HEAD = 4
_APP = b"gasbasis"
_SHORT = {"hold": "h", "gas": "g", "owe": "o", "limit": "l", "rule_book": "r", "title": "t", "settled": "s", "notes": "n",
          "sample": "c", "prepared": "p", "emission": "e"}
_LONG = {short: name for name, short in _SHORT.items()}
_NAMES = ("title", "notes")            # what may name a site or a person: only on request
_ALPHABET = "0123456789abcdefghijklmnopqrstuv"
_FIGURE_LENGTH_BASE = "0123456789abcdefghijklmnopqrstuvwxyz"

# Frozen with version 1: changing a byte of it breaks every deflated link of that version.
_DICTIONARY = (
    b'nitrogenin dry airin combustion gasmeasured at corrected to , 14 % H2O, 9.2 % O2 dry, ambient O2 20.9 %'
    b'"gas.matrix_gas":"hold.conditions":"owe.conditions":"hold.reported_as":"owe.reported_as":"gas.ambient_oxygen":'
    b'"hold.oxygen_meaning":"measured""hold.oxygen_water":"hold.water":"wet""owe.water":"dry""hold.parts_by":"volume"'
    b'"mass_by_volume"NOxSO2COHClNH3TOCH2SHg ppb v/v ppmvd ppm as NO2 as C \xc2\xb5g/m\xc2\xb3 ug/m3 at 20 \xc2\xb0C, 101.325 kPa'
    b'mg/m3 at 273.15 K, 101.3 kPa, dry, 11 % O2"},"s":{"o":"{"h":"","g":"')


@dataclass(frozen=True)
class Opened:
    """What a code holds: the sheet, and the figure as its sender saw it."""

    sheet: Sheet
    as_sent: str


def write_code(sheet: Sheet, figure_text: str, with_names: bool = False) -> str:
    """The code of a sheet. Names and notes go in only when asked for. Raises NotUnderstood when too long."""
    data = {_SHORT[name]: value for name, value in write_sheet(sheet).items()
            if name in _SHORT and (with_names or name not in _NAMES)}
    try:
        body = json.dumps(data, ensure_ascii=False, separators=(",", ":"), sort_keys=True).encode()
        figure = _base64(figure_text.encode())
    except UnicodeEncodeError as error:
        raise NotUnderstood("A text holds half a character, which no link can carry.", hint="Type it anew.", field="link") from error
    packed = _deflate(body)
    form, carried = ("z", packed) if len(packed) < len(body) else ("t", body)
    code = "".join((VERSION, form, _length_text(len(figure)), figure, _base64(carried), _check(figure_text, body)))
    if len(code) > LONGEST_CODE:
        raise NotUnderstood(f"The link would have {len(code)} characters; {LONGEST_CODE} pass everywhere.",
                            hint="Hand the sheet on as a file, or leave out notes.", field="link")
    return code


def read_code(text: str) -> Opened:
    """The sheet of a link, or of a bare code. Raises NotUnderstood for what is cut, altered or newer."""
    code = _bare(text)
    if not code:
        raise NotUnderstood("There is no gasbasis code in this text.", hint="Paste the whole link.", field="link")
    if code[0] != VERSION:
        raise NotUnderstood(f"This link is of version '{code[0]}'; this gasbasis reads version {VERSION}.",
                            hint="Open it with a newer gasbasis, or ask for the texts.", field="link")
    try:
        figure_text, body = _unpack(code)
    except (ValueError, IndexError, binascii.Error, zlib.error, UnicodeDecodeError) as error:
        raise _damaged() from error
    if code[-_CHECK_LENGTH:] != _check(figure_text, body):
        raise _damaged()
    return Opened(read_sheet(_long_names(body)), figure_text)


def _long_names(body: bytes) -> dict:
    """The sheet's JSON from the body. The check fits here, so what is wrong was made wrong."""
    try:
        return {_LONG[short]: value for short, value in bounded_json.loads(body.decode()).items()}
    except (ValueError, KeyError, AttributeError) as error:
        raise NotUnderstood("This link does not hold a sheet.", hint="Ask its sender for the texts.", field="link") from error


def _unpack(code: str) -> tuple[str, bytes]:
    length = int(code[2:_HEAD], 36)
    figure, carried = code[_HEAD:_HEAD + length], code[_HEAD + length:-_CHECK_LENGTH]
    if code[1] not in "tz" or len(figure) != length or len(code) < _HEAD + length + _CHECK_LENGTH:
        raise ValueError("head")
    body = _bytes(carried)
    return _bytes(figure).decode(), _inflate(body) if code[1] == "z" else body


def _bare(text: str) -> str:
    """The code inside what was pasted: a link, %23 for #, line breaks, a trailing full stop or bracket."""
    joined = re.sub(r"\s+", "", text[:4 * LONGEST_CODE])
    joined = re.sub(r"%(25)*23", "#", joined)
    return re.sub(r"[^A-Za-z0-9]+$", "", joined.rpartition("#")[2])


def _damaged() -> NotUnderstood:
    return NotUnderstood("This link was cut off or altered on its way: its check does not fit.",
                         hint="Ask for it again, as a file if the channel shortens links.", field="link")


def _check(figure_text: str, body: bytes) -> str:
    number = zlib.crc32(b"\0".join((_APP, VERSION.encode(), figure_text.encode(), body)))
    return "".join(_ALPHABET[number >> shift & 31] for shift in range(0, 5 * _CHECK_LENGTH, 5))


def _length_text(length: int) -> str:
    return _FIGURE_LENGTH_BASE[length // 36] + _FIGURE_LENGTH_BASE[length % 36]


def _deflate(body: bytes) -> bytes:
    packer = zlib.compressobj(9, zlib.DEFLATED, -15, 9, zlib.Z_DEFAULT_STRATEGY, _DICTIONARY)
    return packer.compress(body) + packer.flush()


def _inflate(packed: bytes) -> bytes:
    unpacker = zlib.decompressobj(-15, zdict=_DICTIONARY)
    body = unpacker.decompress(packed, _LARGEST_BODY)
    if unpacker.unconsumed_tail or not unpacker.eof:
        raise ValueError("body")
    return body


def _base64(data: bytes) -> str:
    return base64.urlsafe_b64encode(data).rstrip(b"=").decode()


def _bytes(text: str) -> bytes:
    if re.fullmatch(r"[A-Za-z0-9_-]*", text) is None:
        raise ValueError("alphabet")
    data = base64.urlsafe_b64decode(text + "=" * (-len(text) % 4))
    if _base64(data) != text:          # spare bits set: the text was altered
        raise ValueError("spare bits")
    return data
