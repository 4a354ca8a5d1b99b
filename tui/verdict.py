"""The verdict line: each requirement with its margin, in words and numbers."""

from __future__ import annotations

import math
from dataclasses import dataclass

from actuator.analysis import Criterion
from actuator.errors import Refusal
from actuator.report.verdicts import UPPER, label_of_requirement
from tui.shown import SIGNS, View, shown_criterion

PLAIN_SIGNS = {"met": "+", "failed": "X", "refused": "?"}
_ORDER = {"failed": 0, "refused": 1, "met": 2}


@dataclass(frozen=True, slots=True)
class Item:
    """One requirement in a few words."""

    verdict: str
    text: str


def verdicts(view: View, plain: bool = False) -> tuple[Item, ...]:
    """Requirements of the actuator, failed ones first; of two directions the worse.

    Parameters
    ----------
    view : View
    plain : bool
        Signs of ASCII only.

    Returns
    -------
    tuple of Item
        Empty where nothing is required.
    """
    result = view.result
    if result is None:
        return ()
    worst: dict[str, Criterion] = {}
    for item in result.criteria:
        if item.name not in worst or _key(item) < _key(worst[item.name]):
            worst[item.name] = item
    signs = PLAIN_SIGNS if plain else SIGNS
    return tuple(
        Item(item.verdict, f"{signs[item.verdict]} {_words(item, view)}") for item in sorted(worst.values(), key=_key)
    )


def _key(item: Criterion) -> tuple[int, float]:
    margin = item.margin
    return _ORDER[item.verdict], math.inf if isinstance(margin, Refusal) else margin


def _words(item: Criterion, view: View) -> str:
    """``"Stroke time met: 0.614 s of 1.200 s allowed (retract), 49 % in hand"``."""
    name = label_of_requirement(item.name)
    wanted, got = shown_criterion(item, view)
    way = f" ({item.direction})" if item.direction else ""
    if item.verdict == "refused":
        return f"{name} not judged{way}: {item.got if isinstance(item.got, Refusal) else 'no figure'}"
    word = "met" if item.verdict == "met" else "FAILED"
    bound = "allowed" if item.name in UPPER else "wanted"
    if isinstance(item.got, Refusal):
        return f"{name} {word}{way}: {item.got}"
    text = f"{name} {word}: {got} of {wanted[2:]} {bound}{way}"
    if isinstance(item.margin, Refusal):
        return text
    percent = f"{abs(item.margin) * 100.0:.0f} %"
    return f"{text}, {percent} {_margin_word(item)}"


def _margin_word(item: Criterion) -> str:
    if not isinstance(item.margin, Refusal) and item.margin >= 0.0:
        return "in hand"
    return "over" if item.name in UPPER else "short"
