"""Windows of time that means are taken over, as people write them: "60 min", "day", "rolling 8 h every 1 h",
"run A 2026-03-29 10:00 to 2026-03-29 10:30", "shift 2026-03-29 06:00 to 2026-03-29 14:00, rest unexposed"."""
from __future__ import annotations

import re
from dataclasses import dataclass

from gasbasis.errors import NotUnderstood
from gasbasis.series.times import Clock

FIXED, DAY, ROLLING, RUN, SHIFT = "fixed", "day", "rolling", "run", "shift"
UNEXPOSED, AS_MEASURED = "unexposed", "as_measured"
EIGHT_HOURS = 28_800.0                 # s, the reference period of workplace limits (directive 98/24/EC, article 2)
_SECONDS = {"s": 1.0, "min": 60.0, "h": 3600.0}
_LENGTH = r"(\d+(?:\.\d+)?)\s*(s|min|h)"
_STAMP = r"(\d{4}-\d{2}-\d{2}[T ]\d{2}:\d{2}(?::\d{2})?(?:Z|[+-]\d{2}:\d{2})?)"
_FIXED = re.compile(_LENGTH)
_ROLLING = re.compile(rf"rolling\s+{_LENGTH}\s+every\s+{_LENGTH}")
_SPAN = re.compile(rf"(run|shift)\s*(.*?)\s*{_STAMP}\s+to\s+{_STAMP}(?:\s*,\s*rest\s+(unexposed|as measured))?")
_HINT = "Write '60 min', 'day', 'rolling 8 h every 1 h', 'run A 2026-03-29 10:00 to 2026-03-29 10:30' or 'shift 2026-03-29 06:00 to 2026-03-29 14:00, rest unexposed'."


@dataclass(frozen=True)
class Window:
    kind: str
    title: str                         # as it was written
    length: float                      # s; of a day, when the clock is not changed
    step: float = 0.0                  # s, of a rolling window
    first: float = 0.0                 # moments, of a run or a shift
    last: float = 0.0
    rest: str = ""                     # what the unmeasured rest of a shift counts as

    @property
    def grid(self) -> float:
        """The length of the pieces the window is put together from."""
        return self.step if self.kind == ROLLING else self.length


def read_window(text: str, clock: Clock) -> Window:
    """A window as it was written. Raises NotUnderstood."""
    plain = " ".join(text.strip().split())
    if plain == DAY:
        return Window(DAY, plain, 86400.0)
    if found := _FIXED.fullmatch(plain):
        return Window(FIXED, plain, _divides_day(_seconds(found[1], found[2]), text))
    if found := _ROLLING.fullmatch(plain):
        length, step = _seconds(found[1], found[2]), _divides_day(_seconds(found[3], found[4]), text)
        if length % step or length <= step:
            raise NotUnderstood(f"'{text}': the length is not a multiple of the step.", hint="For example 'rolling 60 min every 10 min'.", field="means.windows")
        return Window(ROLLING, plain, length, step)
    if found := _SPAN.fullmatch(plain):
        return _span(found, plain, clock)
    raise NotUnderstood(f"'{text}' is no window of time.", hint=_HINT, field="means.windows")


def _span(found: re.Match, text: str, clock: Clock) -> Window:
    first, last = clock.read(found[3])[0], clock.read(found[4])[0]
    if not first < last:
        raise NotUnderstood(f"'{text}' ends before it begins.", hint="Swap the two times.", field="means.windows")
    if found[1] == RUN:
        return Window(RUN, text, last - first, first=first, last=last)
    if found[5] is None:
        raise NotUnderstood(f"'{text}': what does the time that was not measured count as?", hint="Add ', rest unexposed' or ', rest as measured'.", field="means.windows")
    return Window(SHIFT, text, last - first, first=first, last=last, rest=found[5].replace(" ", "_"))


def _seconds(number: str, word: str) -> float:
    return float(number) * _SECONDS[word]


def _divides_day(length: float, text: str) -> float:
    if not 0 < length <= 86400 or 86400 % length:
        raise NotUnderstood(f"'{text}' does not divide a day into equal parts.", hint="For example 1, 10, 15, 30 or 60 min, 8 h, or 'day'.", field="means.windows")
    return length


def piece(window: Window, seconds: float, offset: float, clock: Clock) -> tuple[float, float]:
    """Start and end of the piece of the wall clock's grid that a moment lies in. A day with a clock change is 23 or 25 h long."""
    wall = seconds + offset
    if window.kind == DAY:
        midnight = wall // 86400 * 86400
        return clock.moment_of(midnight), clock.moment_of(midnight + 86400)
    start = wall // window.grid * window.grid - offset
    if window.grid > 3600.0 and clock.zone is not None:      # pieces longer than the change: by the wall clock as well
        return clock.moment_of(start + offset), clock.moment_of(start + offset + window.grid)
    return start, start + window.grid
