"""How small and how large a typed quantity may be: beyond this it is a slip of the keyboard."""

from __future__ import annotations

from actuator.kinds import Kind
from actuator.units import Reading, show

LIMITS: dict[str, tuple[float, float]] = {
    "pressure": (1e3, 1e8),
    "pressure_difference": (1.0, 1e8),
    "temperature": (100.0, 1000.0),
    "temperature_difference": (1e-3, 500.0),
    "length": (1e-5, 100.0),
    "area": (1e-12, 100.0),
    "volume": (1e-12, 1e4),
    "mass": (1e-5, 1e6),
    "force": (1e-6, 1e9),
    "viscous": (1e-6, 1e8),
    "stiffness": (1e-3, 1e9),
    "speed": (1e-5, 100.0),
    "time": (1e-6, 1e6),
    "angle": (0.0, 10.0),
    "share": (1e-6, 1e4),
    "number": (1e-6, 1e6),
    "count": (1.0, 1e6),
    "conductance": (1e-14, 1e-3),
    "heat_transfer": (1e-3, 1e6),
    "hours_per_year": (0.0, 1.0),
    "flow_anr": (1e-9, 1e4),
    "flow_fad": (1e-9, 1e4),
    "power": (1e-3, 1e10),
    "energy_price": (0.0, 1.0),
    "carbon_intensity": (0.0, 1.0),
}
"""Least size that is not zero, and largest, in SI, by dimension. Own choice: wide enough for any air cylinder,
narrow enough that no product of them leaves the range of a float."""


def beyond(value: float, kind: Kind, reading: Reading) -> str:
    """What to say of a value that is out of all proportion; empty for others.

    Parameters
    ----------
    value : float
        Within the kind's own range. [kind.unit]
    kind : Kind
        What it is.
    reading : Reading
        For the limit's text.

    Returns
    -------
    str
    """
    least, most = LIMITS[kind.dimension]
    size = abs(value)
    if size > most:
        return f"is out of proportion: at most {_text(most, kind, reading)} is reckoned with"
    if 0.0 < size < least:
        return f"is out of proportion: at least {_text(least, kind, reading)} is reckoned with"
    return ""


def _text(value: float, kind: Kind, reading: Reading) -> str:
    return " ".join(show(value, kind, reading)).strip()
