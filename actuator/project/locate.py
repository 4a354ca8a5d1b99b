"""Lines of keys in TOML text that has already been found valid."""

from __future__ import annotations

import re
from functools import lru_cache

_KEY = re.compile(r"""[ \t]*(?:([A-Za-z0-9_-]+)|"((?:[^"\\\n]|\\.)*)"|'([^'\n]*)')[ \t]*(\.?)""")
_SPACE = re.compile(r"[ \t]*")
_BLANK = re.compile(r"(?:[ \t\r\n]|#[^\n]*)*")
_STRINGS = re.compile(
    r'"""(?:[^"\\]|\\.|"(?!""))*"{3,5}'
    r"|'''(?:[^']|'(?!''))*'{3,5}"
    r'|"(?:[^"\\\n]|\\.)*"'
    r"|'[^'\n]*'",
    re.DOTALL,
)
_SCALAR = re.compile(r"[^,\]}#\n]*")

Steps = tuple[str | int, ...]


@lru_cache(maxsize=8)
def lines(source: str) -> dict[Steps, int]:
    """Line of every table, key and list item.

    Parameters
    ----------
    source : str
        Valid TOML.

    Returns
    -------
    dict
        1-based line by path in steps. [1]
    """
    return _Scan(source).lines


def line_of(source: str, steps: Steps) -> int:
    """Line of a path, or of the nearest table above it that stands in the text; 0 where none does."""
    known = lines(source)
    while steps and steps not in known:
        steps = steps[:-1]
    return known.get(steps, 0) if steps else 0


class _Scan:
    """One pass over the text; ``lines`` holds the result."""

    def __init__(self, source: str) -> None:
        self.source = source
        self.lines: dict[Steps, int] = {}
        self.counts: dict[Steps, int] = {}
        self.place = 0
        self.line = 1
        self.counted = 0
        table: Steps = ()
        while True:
            self.skip(_BLANK)
            if self.place >= len(source):
                return
            line = self.here()
            if source.startswith("[[", self.place):
                self.place += 2
                table = self.resolved(self.key())
                number = self.counts.get(table, 0) + 1
                self.counts[table] = number
                self.lines.setdefault(table, line)
                table = (*table, number)
                self.lines[table] = line
                self.place += 2
            elif source.startswith("[", self.place):
                self.place += 1
                table = self.resolved(self.key())
                self.lines.setdefault(table, line)
                self.place += 1
            else:
                self.pair(table)

    def skip(self, pattern: re.Pattern[str]) -> None:
        match = pattern.match(self.source, self.place)
        self.place = match.end() if match else self.place + 1

    def here(self) -> int:
        """Line of the present place."""
        self.line += self.source.count("\n", self.counted, self.place)
        self.counted = self.place
        return self.line

    def key(self) -> tuple[str, ...]:
        """Read a dotted key."""
        steps: list[str] = []
        more = "."
        while more:
            match = _KEY.match(self.source, self.place)
            if match is None:
                self.place += 1
                break
            bare, basic, literal, more = match.groups()
            steps.append(next(text for text in (bare, basic, literal) if text is not None))
            self.place = match.end()
        return tuple(steps)

    def resolved(self, keys: tuple[str, ...]) -> Steps:
        """Header keys with the number of the last item put in at each list of tables above."""
        steps: Steps = ()
        for place, key in enumerate(keys):
            steps = (*steps, key)
            if steps in self.counts and place < len(keys) - 1:
                steps = (*steps, self.counts[steps])
        return steps

    def pair(self, table: Steps) -> None:
        """Read ``key = value``."""
        line = self.here()
        path = table
        for key in self.key():
            path = (*path, key)
            self.lines.setdefault(path, line)
        self.skip(_SPACE)
        self.place += 1  # the equals sign
        self.value(path)

    def value(self, path: Steps) -> None:
        """Read any value, the items of lists and inline tables with their lines."""
        self.skip(_SPACE)
        opening = self.source[self.place : self.place + 1]
        if opening in ('"', "'"):
            self.skip(_STRINGS)
        elif opening == "[":
            self.items(path)
        elif opening == "{":
            self.place += 1
            self.skip(_BLANK)
            while self.place < len(self.source) and self.source[self.place] != "}":
                self.pair(path)
                self.skip(_BLANK)
                self.comma()
            self.place += 1
        else:
            self.skip(_SCALAR)

    def items(self, path: Steps) -> None:
        """Read a list."""
        self.place += 1
        number = 1
        self.skip(_BLANK)
        while self.place < len(self.source) and self.source[self.place] != "]":
            self.lines.setdefault((*path, number), self.here())
            self.value((*path, number))
            self.skip(_BLANK)
            self.comma()
            number += 1
        self.place += 1

    def comma(self) -> None:
        if self.source.startswith(",", self.place):
            self.place += 1
        self.skip(_BLANK)
