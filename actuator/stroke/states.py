"""Rows and states, the two shapes that all numbers of the kernel have, and arithmetic with states."""

from __future__ import annotations

from actuator.stroke import layout as at

Row = list[float]
"""A list of floats when interpreted, an array when compiled."""
Table = list[Row]
"""Rows of equal length: a list of lists when interpreted, an array of two dimensions when compiled."""
State = tuple[float, float, float, float, float, float]
"""x, v, m₁, U₁, m₂, U₂, or rates or differences of these. [m, m/s, kg, J, kg, J]"""

NOTHING: State = (0.0, 0.0, 0.0, 0.0, 0.0, 0.0)


def shifted(y: State, by: float, k: State) -> State:
    """Return y + by·k."""
    return (
        y[0] + by * k[0],
        y[1] + by * k[1],
        y[2] + by * k[2],
        y[3] + by * k[3],
        y[4] + by * k[4],
        y[5] + by * k[5],
    )


def scaled(by: float, k: State) -> State:
    """Return by·k."""
    return by * k[0], by * k[1], by * k[2], by * k[3], by * k[4], by * k[5]


def sizes(y: State, z: State, par: Row) -> State:
    """What errors are measured against: stroke, speed + 0.1 m/s, and each mass and energy itself."""
    return (
        par[at.STROKE],
        max(abs(y[at.V]), abs(z[at.V])) + 0.1,
        max(abs(y[at.M_CAP]), abs(z[at.M_CAP])),
        max(abs(y[at.U_CAP]), abs(z[at.U_CAP])),
        max(abs(y[at.M_ROD]), abs(z[at.M_ROD])),
        max(abs(y[at.U_ROD]), abs(z[at.U_ROD])),
    )


def spread(a: State, b: State, size: State) -> float:
    """Sum of the squares of (a - b)/size. [1]"""
    d0 = (a[0] - b[0]) / size[0]
    d1 = (a[1] - b[1]) / size[1]
    d2 = (a[2] - b[2]) / size[2]
    d3 = (a[3] - b[3]) / size[3]
    d4 = (a[4] - b[4]) / size[4]
    d5 = (a[5] - b[5]) / size[5]
    return d0 * d0 + d1 * d1 + d2 * d2 + d3 * d3 + d4 * d4 + d5 * d5
