"""What can go wrong, said so that the user knows what to write instead."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True, slots=True, kw_only=True)
class Problem:
    """One thing in a document that cannot be used.

    Attributes
    ----------
    path : str
        Dotted path with 1-based numbers, ``machine.1.actuator.2.bore``.
    given : str
        What stands there, verbatim; empty where something is missing.
    allowed : str
        What is allowed, with an example to write instead.
    line : int
        Line in the file, 1-based; 0 where there is none. [1]
    """

    path: str
    given: str
    allowed: str
    line: int = 0

    def __str__(self) -> str:
        """One line for a person."""
        place = f"line {self.line}: " if self.line else ""
        given = f'"{self.given}" given; ' if self.given else ""
        return f"{place}{self.path}: {given}{self.allowed}"


class ActuatorError(Exception):
    """Root of the errors this project raises on purpose."""


class InputError(ActuatorError, ValueError):
    """Input that cannot be used; carries every problem found at once."""

    def __init__(self, *problems: Problem) -> None:
        self.problems = problems
        super().__init__("\n".join(str(problem) for problem in problems))


class Cancelled(ActuatorError):
    """The caller asked a computation to stop."""


@dataclass(frozen=True, slots=True)
class Refusal:
    """Stands in the place of a figure that cannot be had, and says why."""

    reason: str
    field: str = ""

    def __str__(self) -> str:
        """The reason."""
        return self.reason
