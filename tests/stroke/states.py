"""States of the kernel that several tests start from."""

from __future__ import annotations

from dataclasses import replace

from actuator.stroke import layout as at
from actuator.stroke.equations import connect
from actuator.stroke.rows import Case, flow_paths, gather
from actuator.stroke.states import Row, State
from tests.benchmark.cases import different, one


def base() -> Case:
    """One actuator: 50 mm bore, 400 mm stroke, 20 kg."""
    part, machine, site = one()
    return part, machine, site, flow_paths(part)


def moving(
    *, direction: float = 1.0, full: float = 0.7, rest: float = 0.45, over: float = 0.0, index: float = 0.0
) -> tuple[float, State, Row, Row]:
    """Time, state, mode and parameters of a piston halfway; pressures as shares of the supply's."""
    rows = gather([base()], compiled=False)
    mode, par = rows.mode[0], rows.par[0]
    par[at.INDEX] = index
    mode[at.DIRECTION] = mode[at.SIDE] = direction
    mode[at.OPEN_OVER] = over
    connect(mode, par)
    x, v = 0.5 * par[at.STROKE], 0.6 * direction
    volumes = par[at.DEAD_CAP] + par[at.AREA_CAP] * x, par[at.DEAD_ROD] + par[at.AREA_ROD] * (par[at.STROKE] - x)
    shares = (full, rest) if direction > 0.0 else (rest, full)
    energies = [share * par[at.P_LINE] * volume / 0.4 for share, volume in zip(shares, volumes, strict=True)]
    masses = [energy / (717.625 * temp) for energy, temp in zip(energies, (285.0, 270.0), strict=True)]
    return 0.4 * over, (x, v, masses[0], energies[0], masses[1], energies[1]), mode, par


def many(count: int) -> list[Case]:
    """Different cases, one of them with a process force and one that never arrives."""
    cases = different(count)
    part, machine, site, paths = cases[1]
    stuck = replace(part, load=replace(part.load, extend_force=1e6))
    cases[1] = (stuck, machine, site, paths)
    return cases
