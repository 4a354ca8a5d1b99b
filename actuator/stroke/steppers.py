"""One step of either embedded pair: explicit 5(4) for smooth motion, linearly implicit 4(3) for what is stiff.

Both integrate all ``n`` entries of the state row with one set of weights, so that linear balances (mass, energy)
close to rounding.
"""

from __future__ import annotations

import math

from actuator.stroke import layout as at
from actuator.stroke.equations import Row, rates


def error_norm(y: Row, new: Row, error: Row, par: Row, rtol: float, moving: bool, ledger: bool) -> float:
    """Root mean square of the step error over its allowance; at most 1 is accepted. [1]

    Allowance: ``rtol`` times the value for masses and energies, times the stroke for the position, times
    (speed + 0.1 m/s) for the speed; each item of the ledger on its own, 0.3·``rtol`` times the cycle's exergy.
    """
    worst = 0.0
    if ledger:
        for i in range(at.N_STATE, at.N_WATCHED):
            worst = max(worst, abs(error[i]))
        worst /= 0.3 * rtol * par[at.LEDGER_SCALE]
    total = 0.0
    for i in range(at.M_CAP, at.N_STATE):
        share = error[i] / (rtol * max(abs(y[i]), abs(new[i])))
        total += share * share
    if not moving:
        return max(worst, math.sqrt(total / 4.0))
    share = error[at.X] / (rtol * par[at.STROKE])
    total += share * share
    share = error[at.V] / (rtol * (max(abs(y[at.V]), abs(new[at.V])) + 0.1))
    total += share * share
    return max(worst, math.sqrt(total / 6.0))


def combine(
    out: Row,
    y: Row,
    h: float,
    k: Row,
    n: int,
    a0: float,
    a1: float,
    a2: float,
    a3: float,
    a4: float,
    a5: float,
) -> None:
    """Write y + h·Σ a_j·k_j to ``out``; the six states apart from the rest, so that their loop unrolls.

    Stages whose weight is zero may not have been written yet: they are left out, not multiplied.
    """
    for i in range(at.N_STATE):
        total = a0 * k[i]
        if a1 != 0.0:
            total += a1 * k[n + i]
        if a2 != 0.0:
            total += a2 * k[2 * n + i]
        if a3 != 0.0:
            total += a3 * k[3 * n + i]
        if a4 != 0.0:
            total += a4 * k[4 * n + i]
        if a5 != 0.0:
            total += a5 * k[5 * n + i]
        out[i] = y[i] + h * total
    for i in range(at.N_STATE, n):
        total = a0 * k[i]
        if a1 != 0.0:
            total += a1 * k[n + i]
        if a2 != 0.0:
            total += a2 * k[2 * n + i]
        if a3 != 0.0:
            total += a3 * k[3 * n + i]
        if a4 != 0.0:
            total += a4 * k[4 * n + i]
        if a5 != 0.0:
            total += a5 * k[5 * n + i]
        out[i] = y[i] + h * total


def explicit_step(
    time: float,
    h: float,
    y: Row,
    mode: Row,
    par: Row,
    n: int,
    k: Row,
    stage: Row,
    new: Row,
    error: Row,
    ledger: bool,
) -> float:
    """Dormand-Prince 5(4) step from ``y`` to ``new``; ``k[:n]`` holds the rates at ``y``, ``k[6n:]`` those at ``new``.

    Returns
    -------
    float
        h times the estimate of the dominant eigenvalue; stability ends at about 3.3. [1]

    References
    ----------
    E. Hairer, S. P. Nørsett, G. Wanner, Solving Ordinary Differential Equations I, 2nd ed. 1993, table II.5.2;
    stiffness detection: Hairer and Wanner II, 2nd ed. 1996, equation IV.2.8 (from memory).
    """
    combine(stage, y, h, k, n, 1.0 / 5.0, 0.0, 0.0, 0.0, 0.0, 0.0)
    rates(time + h / 5.0, stage, mode, par, k, n, ledger)
    combine(stage, y, h, k, n, 3.0 / 40.0, 9.0 / 40.0, 0.0, 0.0, 0.0, 0.0)
    rates(time + 0.3 * h, stage, mode, par, k, 2 * n, ledger)
    combine(stage, y, h, k, n, 44.0 / 45.0, -56.0 / 15.0, 32.0 / 9.0, 0.0, 0.0, 0.0)
    rates(time + 0.8 * h, stage, mode, par, k, 3 * n, ledger)
    combine(
        stage, y, h, k, n, 19372.0 / 6561.0, -25360.0 / 2187.0, 64448.0 / 6561.0, -212.0 / 729.0, 0.0, 0.0
    )  # fmt: skip
    rates(time + 8.0 / 9.0 * h, stage, mode, par, k, 4 * n, ledger)
    combine(
        stage, y, h, k, n,
        9017.0 / 3168.0, -355.0 / 33.0, 46732.0 / 5247.0, 49.0 / 176.0, -5103.0 / 18656.0, 0.0,
    )  # fmt: skip
    rates(time + h, stage, mode, par, k, 5 * n, ledger)
    combine(
        new, y, h, k, n, 35.0 / 384.0, 0.0, 500.0 / 1113.0, 125.0 / 192.0, -2187.0 / 6784.0, 11.0 / 84.0
    )  # fmt: skip
    rates(time + h, new, mode, par, k, 6 * n, ledger)
    for i in range(at.N_WATCHED if ledger else at.N_STATE):
        error[i] = h * (
            71.0 / 57600.0 * k[i]
            - 71.0 / 16695.0 * k[2 * n + i]
            + 71.0 / 1920.0 * k[3 * n + i]
            - 17253.0 / 339200.0 * k[4 * n + i]
            + 22.0 / 525.0 * k[5 * n + i]
            - 1.0 / 40.0 * k[6 * n + i]
        )
    change = 0.0
    distance = 0.0
    for i in range(at.N_STATE):
        scale = max(abs(new[i]), 1e-9)
        a = (k[6 * n + i] - k[5 * n + i]) / scale
        b = (new[i] - stage[i]) / scale
        change += a * a
        distance += b * b
    if distance <= 0.0:
        return 0.0
    return h * math.sqrt(change / distance)


def jacobian(
    time: float, y: Row, mode: Row, par: Row, n: int, k: Row, stage: Row, jac: Row, spare: Row, ledger: bool
) -> None:
    """Derivatives of all ``n`` rates by the six states, ``jac[j*n + i]``, and by time, ``jac[6n + i]``; differences.

    ``k[:n]`` holds the rates at ``y``. At rest the columns of position and speed are zero.
    """
    moving = mode[at.DIRECTION] != 0.0
    for i in range(n):
        stage[i] = y[i]
    for j in range(at.N_STATE):
        column = j * n
        if j < at.M_CAP and not moving:
            for i in range(n):
                jac[column + i] = 0.0
            continue
        if j == at.X:
            # a share of the shorter air column, so that neither pressure moves by more than that share
            cap = par[at.DEAD_CAP] / par[at.AREA_CAP] + y[at.X]
            rod = par[at.DEAD_ROD] / par[at.AREA_ROD] + par[at.STROKE] - y[at.X]
            step = 1e-7 * min(cap, rod)
        elif j == at.V:
            step = 1e-7 * (abs(y[at.V]) + 0.1) * mode[at.DIRECTION]
        else:
            step = 1e-7 * y[j]
        stage[j] = y[j] + step
        step = stage[j] - y[j]
        rates(time, stage, mode, par, spare, 0, ledger)
        for i in range(n):
            jac[column + i] = (spare[i] - k[i]) / step
        stage[j] = y[j]
    column = at.N_STATE * n
    if time - mode[at.SWITCHED] < mode[at.OPEN_OVER]:
        step = 1e-6 * mode[at.OPEN_OVER]
        rates(time + step, y, mode, par, spare, 0, ledger)
        for i in range(n):
            jac[column + i] = (spare[i] - k[i]) / step
    else:
        for i in range(n):
            jac[column + i] = 0.0


def factor(h_gamma: float, jac: Row, n: int, lu: Row, pivot: Row) -> None:
    """LU factors, rows exchanged, of I/(hγ) - J for the six states; ``lu[i*6 + j]``."""
    for i in range(6):
        for j in range(6):
            lu[i * 6 + j] = -jac[j * n + i]
        lu[i * 6 + i] += 1.0 / h_gamma
    for c in range(6):
        best = c
        for i in range(c + 1, 6):
            if abs(lu[i * 6 + c]) > abs(lu[best * 6 + c]):
                best = i
        pivot[c] = float(best)
        if best != c:
            for j in range(6):
                keep = lu[c * 6 + j]
                lu[c * 6 + j] = lu[best * 6 + j]
                lu[best * 6 + j] = keep
        for i in range(c + 1, 6):
            share = lu[i * 6 + c] / lu[c * 6 + c]
            lu[i * 6 + c] = share
            if share != 0.0:
                for j in range(c + 1, 6):
                    lu[i * 6 + j] -= share * lu[c * 6 + j]


def solve_stage(h_gamma: float, jac: Row, n: int, lu: Row, pivot: Row, u: Row, base: int) -> None:
    """Solve (I/(hγ) - J)·u = right-hand side in place at ``u[base:base + n]``; integrals follow from the six."""
    for c in range(6):
        best = int(pivot[c])
        if best != c:
            keep = u[base + c]
            u[base + c] = u[base + best]
            u[base + best] = keep
    for c in range(6):
        for i in range(c + 1, 6):
            u[base + i] -= lu[i * 6 + c] * u[base + c]
    for back in range(6):
        c = 5 - back
        value = u[base + c]
        for j in range(c + 1, 6):
            value -= lu[c * 6 + j] * u[base + j]
        u[base + c] = value / lu[c * 6 + c]
    for i in range(6, n):
        value = u[base + i]
        for j in range(6):
            value += jac[j * n + i] * u[base + j]
        u[base + i] = h_gamma * value


def implicit_step(
    time: float,
    h: float,
    y: Row,
    mode: Row,
    par: Row,
    n: int,
    k: Row,
    stage: Row,
    new: Row,
    error: Row,
    jac: Row,
    lu: Row,
    pivot: Row,
    u: Row,
    ledger: bool,
) -> None:
    """RODAS 4(3) step from ``y`` to ``new``, stiffly accurate and L-stable; ``jac`` belongs to ``y``.

    ``k[:n]`` holds the rates at ``y``; those at ``new`` are written to ``k[6n:]``.

    References
    ----------
    E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. 1996, section VI.4, method RODAS
    (coefficients from memory; the test of convergence shows order four).
    """
    gamma = 0.25
    hg = h * gamma
    factor(hg, jac, n, lu, pivot)
    ft = at.N_STATE * n
    # stage 1
    for i in range(n):
        u[i] = k[i] + h * 0.25 * jac[ft + i]
    solve_stage(hg, jac, n, lu, pivot, u, 0)
    # stage 2
    for i in range(n):
        stage[i] = y[i] + 1.544 * u[i]
    rates(time + 0.386 * h, stage, mode, par, u, n, ledger)
    for i in range(n):
        u[n + i] += -5.6688 / h * u[i] - h * 0.1043 * jac[ft + i]
    solve_stage(hg, jac, n, lu, pivot, u, n)
    # stage 3
    for i in range(n):
        stage[i] = y[i] + 0.9466785280815826 * u[i] + 0.2557011698983284 * u[n + i]
    rates(time + 0.21 * h, stage, mode, par, u, 2 * n, ledger)
    for i in range(n):
        u[2 * n + i] += (-2.430093356833875 * u[i] - 0.2063599157091915 * u[n + i]) / h + h * 0.1035 * jac[ft + i]
    solve_stage(hg, jac, n, lu, pivot, u, 2 * n)
    # stage 4
    for i in range(n):
        stage[i] = y[i] + 3.314825187068521 * u[i] + 2.896124015972201 * u[n + i] + 0.9986419139977817 * u[2 * n + i]
    rates(time + 0.63 * h, stage, mode, par, u, 3 * n, ledger)
    for i in range(n):
        u[3 * n + i] += (
            -0.1073529058151375 * u[i] - 9.594562251023355 * u[n + i] - 20.47028614809616 * u[2 * n + i]
        ) / h - h * 0.0362 * jac[ft + i]
    solve_stage(hg, jac, n, lu, pivot, u, 3 * n)
    # stage 5
    for i in range(n):
        stage[i] = (
            y[i]
            + 1.221224509226641 * u[i]
            + 6.019134481288629 * u[n + i]
            + 12.53708332932087 * u[2 * n + i]
            - 0.6878860361058950 * u[3 * n + i]
        )
    rates(time + h, stage, mode, par, u, 4 * n, ledger)
    for i in range(n):
        u[4 * n + i] += (
            7.496443313967647 * u[i]
            - 10.24680431464352 * u[n + i]
            - 33.99990352819905 * u[2 * n + i]
            + 11.70890893206160 * u[3 * n + i]
        ) / h
    solve_stage(hg, jac, n, lu, pivot, u, 4 * n)
    # stage 6: the embedded solution's difference is the error
    for i in range(n):
        stage[i] += u[4 * n + i]
    rates(time + h, stage, mode, par, u, 5 * n, ledger)
    for i in range(n):
        u[5 * n + i] += (
            8.083246795921522 * u[i]
            - 7.981132988064893 * u[n + i]
            - 31.52159432874371 * u[2 * n + i]
            + 16.31930543123136 * u[3 * n + i]
            - 6.058818238834054 * u[4 * n + i]
        ) / h
    solve_stage(hg, jac, n, lu, pivot, u, 5 * n)
    for i in range(n):
        new[i] = stage[i] + u[5 * n + i]
    for i in range(at.N_WATCHED if ledger else at.N_STATE):
        error[i] = u[5 * n + i]
    rates(time + h, new, mode, par, k, 6 * n, ledger)
