"""Pictures of a simulated cycle: position, speed and pressures over time, and the p-V loops."""

from __future__ import annotations

from typing import Any

import numpy as np
from numpy.typing import NDArray

from actuator.errors import Refusal
from actuator.kinds import AbsPressure, Length, Speed, Time, Volume, kind_of
from actuator.stroke.result import StrokeResult
from actuator.units import scale
from tui.shown import View
from tui.widgets.picture import Axis, Curve, Picture

CAP, ROD, IDEAL, MOTION = "●", "○", "◇", "◆"
PLAIN = {CAP: "C", ROD: "R", IDEAL: "I", MOTION: "*"}
"""Marks in a terminal whose font has only ASCII."""
DASH = (3, 3)
GUTTER = 6
"""Cells to the left of plots over time. [1]"""


def pictures(view: View, plain: bool = False) -> dict[str, Picture]:
    """All plots of one actuator, by the id of the widget that shows them.

    Parameters
    ----------
    view : View
    plain : bool
        Marks of ASCII only.

    Returns
    -------
    dict of str to Picture
        Empty where the cycle could not be simulated.
    """
    result = view.result
    if result is None or isinstance(result.stroke, Refusal):
        return {}
    stroke = result.stroke
    time = Axis(unit=_unit(Time, view), tight=True)
    at = _scaled(stroke.time, Time, view)

    def over_time(title: str, axis: Axis, *lines: tuple[str, str, NDArray[np.float64], int]) -> Picture:
        curves = tuple(
            Curve(name=name, mark=PLAIN[mark] if plain else mark, x=at, y=values, tone=tone)
            for name, mark, values, tone in lines
        )
        return Picture(title=title, x=time, y=axis, curves=curves, gutter=GUTTER)

    end = float(_scaled(np.array([result.part.stroke]), Length, view)[0])
    position = Axis(unit=_unit(Length, view), include=(0.0, end))
    speed = Axis(unit=_unit(Speed, view), include=(0.0,))
    supply = view.answer.project.machines[view.machine].supply_pressure if view.answer.project else 0.0
    ends = _scaled(np.array([view.shown.reading.ambient_pressure, supply]), AbsPressure, view)
    pressure = Axis(unit=_unit(AbsPressure, view), include=tuple(ends.tolist()))
    cap, rod = (_scaled(values, AbsPressure, view) for values in (stroke.p_cap, stroke.p_rod))
    return {
        "position": over_time(
            "Position, 0 retracted", position, ("piston", MOTION, _scaled(stroke.position, Length, view), 1)
        ),
        "speed": over_time("Speed, + extending", speed, ("piston", MOTION, _scaled(stroke.speed, Speed, view), 1)),
        "pressures": over_time("Pressures", pressure, ("cap side", CAP, cap, 2), ("rod side", ROD, rod, 3)),
        "cap": _loop("p-V, cap side", "cap", view, stroke, pressure, plain),
        "rod": _loop("p-V, rod side", "rod", view, stroke, pressure, plain),
    }


def _loop(title: str, side: str, view: View, stroke: StrokeResult, pressure: Axis, plain: bool) -> Picture:
    """The simulated loop of one chamber, with the ideal diagram below it."""
    result = view.result
    assert result is not None
    ending = "_retract" if side == "rod" else ""
    ideal_v = result.part.count * np.array(getattr(result.indicator, f"volume{ending}"), dtype=np.float64)
    ideal_p = np.array(getattr(result.indicator, f"pressure{ending}"), dtype=np.float64)
    volume: NDArray[np.float64] = getattr(stroke, f"volume_{side}")
    mark = ROD if side == "rod" else CAP
    ideal = Curve(
        name="ideal",
        mark=PLAIN[IDEAL] if plain else IDEAL,
        x=_scaled(ideal_v, Volume, view),
        y=_scaled(ideal_p, AbsPressure, view),
        tone=4,
        dash=DASH,
    )
    simulated = Curve(
        name="simulated",
        mark=PLAIN[mark] if plain else mark,
        x=_scaled(volume, Volume, view),
        y=_scaled(getattr(stroke, f"p_{side}"), AbsPressure, view),
        at=_scaled(stroke.time, Time, view),
        tone=3 if side == "rod" else 2,
    )
    axis = Axis(unit=_unit(Volume, view), include=(0.0,))
    return Picture(
        title=title,
        x=axis,
        y=pressure,
        curves=(ideal, simulated) if len(ideal_v) else (simulated,),
        reads=_unit(Time, view),
    )


def span(view: View) -> tuple[float, float]:
    """First and last time of the cycle, in the unit shown. [1]"""
    result = view.result
    if result is None or isinstance(result.stroke, Refusal):
        return 0.0, 0.0
    ends = _scaled(result.stroke.time[[0, -1]], Time, view)
    return float(ends[0]), float(ends[1])


def _scaled(values: NDArray[np.float64], alias: Any, view: View) -> NDArray[np.float64]:
    factor, offset, _ = scale(kind_of(alias), view.system, view.shown.reading)
    return values * factor + offset


def _unit(alias: Any, view: View) -> str:
    return scale(kind_of(alias), view.system, view.shown.reading)[2]
