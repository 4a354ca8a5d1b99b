"""Places of the numbers in the kernel's flat rows; every row holds floats only."""

from __future__ import annotations

# State y: the first six are integrated with error control, the rest are integrals that nothing depends on.
X, V, M_CAP, U_CAP, M_ROD, U_ROD = range(6)
N_STATE = 6

(
    Q_SUPPLIED,
    Q_LOAD,
    Q_FRICTION,
    Q_STOP,
    Q_THETA_SUPPLY,
    Q_XI_SUPPLY,
    Q_XI_EXHAUST,
    Q_EXHAUST_PATH,
    Q_HEAT_LOSS,
    Q_X_SIDE,
    Q_FILLING,
    Q_RETURNED,
    Q_ENTROPY,
    Q_PISTON,
    Q_DRAWN,
    Q_GIVEN_BACK,
    Q_VENTED,
    Q_IN_CAP,
    Q_IN_ROD,
    Q_OUT_CAP,
    Q_OUT_ROD,
    Q_HIN_CAP,
    Q_HIN_ROD,
    Q_HOUT_CAP,
    Q_HOUT_ROD,
    Q_WORK_CAP,
    Q_WORK_ROD,
    Q_WALL_CAP,
    Q_WALL_ROD,
) = range(N_STATE, N_STATE + 29)
N_LEDGER = N_STATE + 29
N_INTEGRAL = N_LEDGER - N_STATE
N_WATCHED = Q_X_SIDE + 1 - N_STATE
"""With the ledger, the step error of the first integrals, up to here, counts as well. [1]"""
N_WORK = 8
N_LOSS = Q_PISTON + 1 - N_STATE
"""Integrals from here on are linear in the transfers of the chambers, those before are not. [1]"""

# Parameters: SI, absolute pressures.
(
    AREA_CAP,
    AREA_ROD,
    BORE,
    STROKE,
    DEAD_CAP,
    DEAD_ROD,
    MASS,
    WEIGHT,
    GUIDE,
    CONSTANT,
    EXTEND_FORCE,
    RETRACT_FORCE,
    BREAKAWAY,
    COULOMB,
    VISCOUS,
    STRIBECK,
    P_LINE,
    P_EXTEND,
    P_RETRACT,
    T_SUPPLY,
    P_AMB,
    T_AMB,
    HEAT,
    INDEX,
    OPENING,
    CUT_EXTEND,
    CUT_RETRACT,
    SPRING_FORCE,
    SPRING_RATE,
    VENTED_CAP,
    VENTED_ROD,
    LEDGER_SCALE,
    CAP_FILL,
) = range(33)
"""WEIGHT = M·g·sin α, GUIDE = μ·M·g·cos α; INDEX 0 = use HEAT; CUT_* positions [m], beyond the end = none;
SPRING_FORCE at the retracted end, positive extending, and its slope over the position [N, N/m]; VENTED_* 1 = this
side is open to the atmosphere, without pressure, flow and balance of its own;
LEDGER_SCALE = exergy of the air of a cycle, against which the step error of the ledger counts [J]."""
PATHS = ("cap fill", "cap back", "cap exhaust", "cap suck", "rod fill", "rod back", "rod exhaust", "rod suck")
"""From CAP_FILL on, three numbers (C, b, m) for each of these paths."""
FILL, BACK, VENT, SUCK = 0, 3, 6, 9
ROD_FILL = CAP_FILL + 12
N_PAR = CAP_FILL + 24

# Mode of motion and connection.
DIRECTION, SIDE, SWITCHED, OPEN_OVER, SHUT, PROCESS, ARMED, STIFF, CAP_LINK = range(9)
"""DIRECTION -1, 0, 1; SIDE 1 = cap on supply, -1 = rod on supply; SWITCHED = time of switching [s];
OPEN_OVER = ramp [s]; SHUT 1 = supply path cut off; PROCESS = process force where the piston is [N];
ARMED 0 = a start has just failed; STIFF 1 = implicit steps while moving."""
PORT_P, PORT_T, INTO, OUT_OF = 0, 1, 2, 5
"""From CAP_LINK and ROD_LINK on, what the chamber is connected to: pressure [Pa] and temperature [K] beyond its port,
(C, b, m) of the path into it and of the path out of it."""
ROD_LINK = CAP_LINK + 8
N_MODE = CAP_LINK + 16

# Event log: one row of EVENT_WIDTH numbers for each event.
E_TIME, E_CODE, E_SIGN, E_X, E_V, E_M_CAP, E_M_ROD = range(7)
EVENT_WIDTH = 7
SWITCH, START, ARRIVE, STICK, CUT = 1.0, 2.0, 3.0, 4.0, 5.0
MAX_EVENTS = 400

# History: time, six states, their six rates, side of the connection.
H_TIME, H_STATE, H_RATE, H_SIDE = 0, 1, 7, 13
HISTORY_WIDTH = 14

# Info returned for a case: counters, then time and speed of the first arrival at each end (batches only).
I_EVENTS, I_ROWS, I_RATES, I_STEPS, I_CYCLES, I_MISMATCH, I_TIME, I_STATUS = range(8)
I_EXTENDED, I_EXTEND_SPEED, I_RETRACTED, I_RETRACT_SPEED = range(8, 12)
N_INFO = 12

# Status.
DONE, STOPPED, TOO_MANY_STEPS, TOO_MANY_EVENTS = 0.0, 1.0, 2.0, 3.0
