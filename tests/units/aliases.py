"""Every kind of quantity there is, by the name of its alias."""

from __future__ import annotations

from typing import Annotated, get_origin

from actuator import kinds
from actuator.kinds import Kind

KINDS: dict[str, Kind] = {
    name: kinds.kind_of(alias) for name, alias in vars(kinds).items() if get_origin(alias) is Annotated
}
