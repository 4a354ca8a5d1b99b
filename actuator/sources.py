"""Every standard and book that a figure, a constant or a check rests on, once."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

How = Literal["seen", "excerpt", "from memory", "common practice"]


@dataclass(frozen=True, slots=True, kw_only=True)
class Source:
    """A published source.

    Attributes
    ----------
    key : str
        Short name used in the code.
    title : str
        Author or body, title, number.
    edition : str
        Year or edition.
    place : str
        Clause, table, equation or page.
    how : str
        ``"seen"``: the passage itself was read; ``"excerpt"``: an openly published excerpt or companion was
        read; ``"from memory"``; ``"common practice"``: no source.
    """

    key: str
    title: str
    edition: str = ""
    place: str = ""
    how: How = "from memory"

    def __str__(self) -> str:
        """Title, edition, place and how it is known."""
        parts = [self.title, self.edition, self.place]
        return ", ".join(part for part in parts if part) + f" ({self.how})"


PRACTICE = Source(key="practice", title="Common practice, no source", how="common practice")
OWN = Source(key="own", title="Balance of mass, energy or force, derived in this project", how="from memory")
ISO_6358 = Source(
    key="iso6358", title="ISO 6358-1, Pneumatic fluid power: flow-rate characteristics", edition="2013"
)
ISO_8778 = Source(
    key="iso8778", title="ISO 8778, Pneumatic fluid power: standard reference atmosphere", edition="2003"
)

SOURCES: dict[str, Source] = {item.key: item for item in (PRACTICE, OWN, ISO_6358, ISO_8778)}
"""All sources by key; the report prints those that it used."""
