"""Time stamps of loggers: read fast, on one line of seconds, with clock changes.

A stamp becomes seconds since 1970: in UTC when the stamps carry an offset or a time zone is named, else as the clock showed it.
`Clock.offset` is what has to be added to come back to the clock on the wall.
"""
from __future__ import annotations

import re
from dataclasses import dataclass
from datetime import date, datetime, timedelta, timezone
from typing import Sequence

from gasbasis.errors import NotUnderstood, OutOfRange

YEAR_FIRST, DAY_FIRST, MONTH_FIRST = "year_first", "day_first", "month_first"
_EPOCH = date(1970, 1, 1).toordinal()
_DATE = r"\d{1,4}[-/.]\d{1,2}[-/.]\d{1,4}"
DATE = re.compile(rf"({_DATE})\.?")
TIME = re.compile(r"\d{1,2}:\d{2}(?::\d{2}(?:[.,]\d+)?)?(?:\s?[AaPp][Mm])?(?:\s?(?:Z|[+-]\d{2}:?\d{2}))?")
STAMP = re.compile(rf"({_DATE})\.?[T ]\s*({TIME.pattern})")
_HEAD = re.compile(r"(\d{1,4})[-/.](\d{1,2})[-/.](\d{1,4})\.?[T ]\s*(\d{1,2})")
_TAIL = re.compile(r"(\d{2})(?::(\d{2})(?:[.,](\d+))?)?\s?([AaPp][Mm])?\s?(Z|[+-]\d{2}:?\d{2})?")
_MOST_KEPT = 200_000                    # texts remembered before the memory is emptied


class Clock:
    """Reads the stamps of one file, in their order."""

    def __init__(self, order: str, zone: str = ""):
        """`zone`: "" for the clock as it is, or a name such as "Europe/Vienna". Raises NotUnderstood for an unknown one."""
        self.order, self.zone = order, _zone(zone)
        self.last = float("-inf")
        self._heads: dict[str, tuple[float, float | None]] = {}   # date and hour -> seconds of the wall clock, offset if constant
        self._tails: dict[str, tuple[float, int, float | None]] = {}   # the rest -> seconds, hours by am/pm, offset stated
        self._plain_heads: dict[str, float] = {}     # of these the ones that only have to be added up
        self._plain_tails: dict[str, float] = {}
        self.carries_offset = False

    def read(self, text: str) -> tuple[float, float]:
        """Seconds and offset of a stamp. Raises NotUnderstood, OutOfRange. Does not move `last`."""
        head, colon, tail = text.partition(":")
        try:
            wall, offset = self._heads[head]
        except KeyError:
            wall, offset = self._head(head, text)
        try:
            seconds, half, stated = self._tails[tail]
        except KeyError:
            seconds, half, stated = self._tail(tail, text)
        if half >= 0:
            hour = wall % 86400 // 3600
            wall, offset = wall + (half * 12 - (12 if hour == 12 else 0)) * 3600, None
        wall += seconds
        if stated is not None:
            return wall - stated, stated
        if self.zone is None:
            return wall, 0.0
        return (wall - offset, offset) if offset is not None else self._changing(wall, text)

    def read_all(self, texts: Sequence[str]) -> list[float]:
        """Seconds of many stamps; several times as fast as one by one where their parts were met before."""
        hours, rest = self._plain_heads, self._plain_tails
        try:
            return [hours[head] + rest[tail] for head, _, tail in [text.partition(":") for text in texts]]
        except KeyError:
            return [self.read(text)[0] for text in texts]

    def _head(self, head: str, text: str) -> tuple[float, float | None]:
        found = _HEAD.fullmatch(head.strip())
        if found is None:
            raise NotUnderstood(f"'{text[:40]}' is no time stamp.", hint="For example 2026-03-29 14:05:00 or 29.03.2026 14:05.", field="time")
        first, second, third, hour = (int(part) for part in found.groups())
        year, month, day = {YEAR_FIRST: (first, second, third), DAY_FIRST: (third, second, first), MONTH_FIRST: (third, first, second)}[self.order]
        if hour > 24:
            raise NotUnderstood(f"'{text[:40]}' has the hour {hour}.", hint="Hours run from 0 to 24.", field="time")
        try:
            days = date(year + 2000 if year < 100 else year, month, day).toordinal() - _EPOCH
        except ValueError:
            raise NotUnderstood(f"'{text[:40]}' is no date ({day}.{month}.{year}).", hint="Check which of day and month comes first.", field="time") from None
        wall = days * 86400.0 + hour * 3600.0
        if len(self._heads) > _MOST_KEPT:
            self._heads.clear()
            self._plain_heads.clear()
        offset = self._constant_offset(wall)
        self._heads[head] = wall, offset
        if offset is not None:
            self._plain_heads[head] = wall - offset
        return self._heads[head]

    def _tail(self, tail: str, text: str) -> tuple[float, int, float | None]:
        found = _TAIL.fullmatch(tail.strip())
        if found is None or int(found[1]) > 59 or int(found[2] or 0) > 60:
            raise NotUnderstood(f"'{text[:40]}' is no time stamp.", hint="For example 2026-03-29 14:05:00 or 29.03.2026 14:05.", field="time")
        seconds = int(found[1]) * 60.0 + float(f"{found[2] or 0}.{found[3] or 0}")
        half = -1 if found[4] is None else int(found[4].lower() == "pm")
        if len(self._tails) > _MOST_KEPT:
            self._tails.clear()
            self._plain_tails.clear()
        self._tails[tail] = seconds, half, _offset(found[5])
        if half < 0 and found[5] is None:
            self._plain_tails[tail] = seconds
        self.carries_offset = self.carries_offset or found[5] is not None
        return self._tails[tail]

    def _constant_offset(self, wall: float) -> float | None:
        """The zone's offset during an hour of the wall clock; None where it changes in it."""
        if self.zone is None:
            return 0.0
        offsets = {self._offset_at(wall + part, fold) for part in (0.0, 3599.0) for fold in (0, 1)}
        return offsets.pop() if len(offsets) == 1 else None

    def _offset_at(self, wall: float, fold: int) -> float:
        return (datetime(1970, 1, 1, fold=0) + timedelta(seconds=wall)).replace(tzinfo=self.zone, fold=fold).utcoffset().total_seconds()

    def _changing(self, wall: float, text: str) -> tuple[float, float]:
        """A stamp in an hour that the clock passes twice, or never. Of two the one that goes on from the stamp before."""
        first, second = self._offset_at(wall, 0), self._offset_at(wall, 1)
        if first < second:              # the offsets on both sides of a gap: the clock jumped over this time
            raise OutOfRange(f"'{text[:40]}' does not exist in {self.zone.key}: the clock is put forward over it.",
                             hint="Check the time zone; a logger that does not change its clock has a fixed offset, e.g. UTC or Etc/GMT-1.", field="time")
        return (wall - first, first) if first == second or wall - first > self.last else (wall - second, second)

    def offset_at(self, seconds: float) -> float:
        """The zone's offset at a moment of UTC; 0 without a zone."""
        if self.zone is None:
            return 0.0
        return datetime.fromtimestamp(seconds, timezone.utc).astimezone(self.zone).utcoffset().total_seconds()

    def moment_of(self, wall: float) -> float:
        """The moment the wall clock shows `wall` (the first of two)."""
        return wall if self.zone is None else wall - self._offset_at(wall, 0)


def _zone(name: str):
    if not name:
        return None
    from zoneinfo import ZoneInfo, ZoneInfoNotFoundError      # rare, and its tables are fetched when asked for
    try:
        return ZoneInfo(name)
    except (ZoneInfoNotFoundError, ValueError, OSError):
        raise NotUnderstood(f"There is no time zone '{name}' here.", hint="Name it like Europe/Vienna; without system tables install tzdata.",
                            field="time.zone") from None


def _offset(text: str | None) -> float | None:
    if text is None:
        return None
    if text == "Z":
        return 0.0
    hours, minutes = int(text[1:3]), int(text[-2:])
    return (hours * 3600.0 + minutes * 60.0) * (-1 if text[0] == "-" else 1)


@dataclass(frozen=True)
class Order:
    """Which part of a date comes first; None where the file leaves it open, with an example of both readings."""

    order: str | None
    why: str
    example: str = ""


def date_order(texts: list[str]) -> Order:
    """The order of year, month and day in stamps like these."""
    parts = [re.split(r"[-/.]", found[1]) for found in map(DATE.match, texts) if found]
    if all(len(first) == 4 for first, _, _ in parts):
        return Order(YEAR_FIRST, "the year comes first")
    if any(int(first) > 12 for first, _, _ in parts):
        return Order(DAY_FIRST, "a first part above 12 is a day")
    if any(int(second) > 12 for _, second, _ in parts):
        return Order(MONTH_FIRST, "a second part above 12 is a day")
    if all("." in text.split()[0] for text in texts):
        return Order(DAY_FIRST, "dates with points put the day first (common practice)")
    if len({tuple(part) for part in parts}) > 1 and len({first for first, _, _ in parts}) > 1 and len({second for _, second, _ in parts}) == 1:
        return Order(DAY_FIRST, "the first part runs on from row to row, the second stands still")
    if len({tuple(part) for part in parts}) > 1 and len({second for _, second, _ in parts}) > 1 and len({first for first, _, _ in parts}) == 1:
        return Order(MONTH_FIRST, "the second part runs on from row to row, the first stands still")
    return Order(None, "", texts[0])


def clock_text(seconds: float, offset: float = 0.0, with_offset: bool = False) -> str:
    """A moment as the wall clock shows it: 2026-03-29 14:05:00, with +01:00 behind it where asked."""
    text = (datetime(1970, 1, 1) + timedelta(seconds=seconds + offset)).isoformat(sep=" ", timespec="seconds")
    sign, minutes = "-" if offset < 0 else "+", round(abs(offset) / 60)
    return f"{text}{sign}{minutes // 60:02d}:{minutes % 60:02d}" if with_offset else text
