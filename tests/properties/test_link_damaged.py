"""Codes cut, altered, spliced and made up: each opens to the very same sheet, or is refused with a clear message, at once."""
from __future__ import annotations

import json
import random
import time
import zlib

import pytest

from gasbasis.errors import NotUnderstood
from gasbasis.records import link
from gasbasis.records.link import read_code, write_code
from gasbasis.records.received import received
from gasbasis.records.sheet import Sheet, write_sheet

COUNT = 20_000
LONGEST_S = 0.2
ALPHABET = "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789-_"
SHEETS = (
    (Sheet(hold="Hg 1 ppb v/v", owe="ug/m3 at 20 °C, 101.325 kPa"), "8.339 µg/m³"),
    (Sheet(hold="NOx 142 ppm as NO2, dry", gas="9,2 % O2 dry, ambient O2 21 %", owe="mg/m3 at 273.15 K, 101.3 kPa, dry, 3 % O2",
           settled={"hold.parts_by": "volume"}), "NOx 444.4 mg/m³"),
    (Sheet(hold="qx", owe="zy"), ""),
    (Sheet(hold="SO2 35 mg/Nm3", limit="not more than 20 ppm", rule_book="eu_incineration", title="T", notes={"hold.water": "clause 4"}), "x" * 60),
    (Sheet(hold="".join(chr(33 + index * 7919 % 90) for index in range(700))), "1"),
)
CODES = tuple(write_code(sheet, figure, with_names=True) for sheet, figure in SHEETS)


def truncated(dice: random.Random) -> str:
    code = dice.choice(CODES)
    start = dice.choice((0, 0, 0, dice.randrange(len(code))))
    return code[start:dice.randrange(start, len(code))]


def altered(dice: random.Random) -> str:
    code = list(dice.choice(CODES))
    for _ in range(dice.choice((1, 1, 1, 2, 5))):
        place = dice.randrange(len(code))
        code[place] = dice.choice(ALPHABET)
        if dice.random() < 0.2:
            code[place:place + 1] = dice.choice(([], [dice.choice(ALPHABET)] * 2))
        if not code:
            break
    return "".join(code)


def swapped(dice: random.Random) -> str:
    code = list(dice.choice(CODES))
    one, other = dice.randrange(len(code)), dice.randrange(len(code))
    code[one], code[other] = code[other], code[one]
    return "".join(code)


def spliced(dice: random.Random) -> str:
    first, second = dice.choice(CODES), dice.choice(CODES)
    return first[:dice.randrange(len(first))] + second[dice.randrange(len(second)):]


def made_up(dice: random.Random) -> str:
    return dice.choice(("", "1", "1z", "1t")) + "".join(dice.choice(ALPHABET) for _ in range(dice.randrange(200)))


def foreign(dice: random.Random) -> str:
    return "".join(chr(dice.choice((dice.randrange(32, 127), dice.randrange(0x20, 0xD7FF), 35, 37))) for _ in range(dice.randrange(80)))


ATTACKS = (truncated, altered, swapped, spliced, made_up, foreign)


def opened_or_refused(code: str):
    """What a code opens to, or None; the time is the processor's, as the machine may be busy."""
    begun = time.process_time()
    try:
        return read_code(code)
    except NotUnderstood as error:
        assert error.message and error.hint and error.field
        return None
    finally:
        assert time.process_time() - begun < LONGEST_S, code[:80]


def test_damaged_codes_open_to_the_same_sheet_or_not_at_all() -> None:
    dice = random.Random(20_250_101)
    genuine = {code: read_code(code) for code in CODES}
    refused = 0
    for _ in range(COUNT):
        code = dice.choice(ATTACKS)(dice)
        opened = opened_or_refused(code)
        assert opened is None or opened in genuine.values(), code
        refused += opened is None
    assert refused > COUNT * 0.9


def test_the_paste_box_is_no_easier_to_deceive() -> None:
    """The same attacks pasted, some inside a sentence: the very sheet, or a message."""
    dice = random.Random(20_250_102)
    genuine = [write_sheet(read_code(code).sheet) for code in CODES]
    for _ in range(COUNT // 4):
        text = dice.choice(("", "https://example.org/x/#", "See https://example.org/%23")) + dice.choice(ATTACKS)(dice) + dice.choice(("", ".", ")\n", " - regards"))
        begun = time.process_time()
        try:
            assert received(text)["sheet"] in genuine, text
        except NotUnderstood as error:
            assert error.message and error.hint
        assert time.process_time() - begun < LONGEST_S, text[:80]


def test_every_single_altered_character_is_noticed() -> None:
    code = CODES[0]
    for place in range(len(code)):
        for character in "Az09-_":
            changed = code[:place] + character + code[place + 1:]
            if changed != code:
                assert opened_or_refused(changed) is None, (place, character)


def sealed(body: bytes, form: str = "t", figure: str = "") -> str:
    """A code whose check fits, as somebody who read this program could make it."""
    carried = body
    if form == "z":
        packer = zlib.compressobj(9, zlib.DEFLATED, -15, 9, zlib.Z_DEFAULT_STRATEGY, link._DICTIONARY)
        carried = packer.compress(body) + packer.flush()
    shown = link._base64(figure.encode())
    return f"1{form}{link._length_text(len(shown))}{shown}{link._base64(carried)}{link._check(figure, body)}"


HOSTILE = {
    "no JSON": b"{", "nothing": b"", "a list": b"[]", "a number": b"7", "null": b"null", "text": b'"h"',
    "a long number": b'{"h":' + b"9" * 600 + b"}", "deep lists": b"[" * 600 + b"]" * 600, "deep objects": b'{"h":' * 200 + b"1" + b"}" * 200,
    "not a number": b'{"h":NaN}', "an unknown part": b'{"__class__":"x"}', "the schema": b'{"schema":2}', "a long name": b'{"hold":"1 ppm"}',
    "a number for a text": b'{"h":1}', "a list for a mapping": b'{"s":[]}', "numbers in a mapping": b'{"s":{"a":1}}', "no UTF-8": b'{"h":"\xff\xfe"}',
}


@pytest.mark.parametrize("body", HOSTILE.values(), ids=HOSTILE.keys())
@pytest.mark.parametrize("form", ["t", "z"])
def test_a_sealed_code_without_a_sheet_is_refused(body: bytes, form: str) -> None:
    assert opened_or_refused(sealed(body, form)) is None


def test_a_sealed_sheet_opens() -> None:
    assert opened_or_refused(sealed(b'{"h":"1 ppm","o":"ppb"}', "z", "1")).sheet == Sheet(hold="1 ppm", owe="ppb")


@pytest.mark.parametrize("size", [100_000, 1_000_000])
def test_a_small_code_that_swells_is_refused(size: int) -> None:
    code = sealed(b'{"h":"' + b"0" * size + b'"}', "z")
    assert len(code) < 2_000 and opened_or_refused(code) is None
