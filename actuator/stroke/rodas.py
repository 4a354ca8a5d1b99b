"""Coefficients of the linearly implicit pair RODAS 4(3), six stages, L-stable.

Stage i solves (I/(hγ) - J)·u_i = f(t + T_i·h, y + Σ A_ij·u_j) + Σ C_ij·u_j/h + h·D_i·∂f/∂t. The fifth stage's
state and u₅ make the embedded solution, that and u₆ the solution, of order four.

References
----------
E. Hairer, G. Wanner, Solving Ordinary Differential Equations II, 2nd ed. 1996, section VI.4 (from memory; the test of
convergence shows order four).
"""

from __future__ import annotations

GAMMA = 0.25
T2, T3, T4 = 0.386, 0.21, 0.63
D1, D2, D3, D4 = 0.25, -0.1043, 0.1035, -0.0362
A21 = 1.544
A31, A32 = 0.9466785280815826, 0.2557011698983284
A41, A42, A43 = 3.314825187068521, 2.896124015972201, 0.9986419139977817
A51, A52, A53, A54 = 1.221224509226641, 6.019134481288629, 12.53708332932087, -0.6878860361058950
C21 = -5.6688
C31, C32 = -2.430093356833875, -0.2063599157091915
C41, C42, C43 = -0.1073529058151375, -9.594562251023355, -20.47028614809616
C51, C52, C53, C54 = 7.496443313967647, -10.24680431464352, -33.99990352819905, 11.70890893206160
C61, C62, C63, C64, C65 = (
    8.083246795921522,
    -7.981132988064893,
    -31.52159432874371,
    16.31930543123136,
    -6.058818238834054,
)

_C = ((), (C21,), (C31, C32), (C41, C42, C43), (C51, C52, C53, C54), (C61, C62, C63, C64, C65))


def _weights(*of_increments: float) -> tuple[float, float, float, float, float, float]:
    """Weights of the stages' right-hand sides, h·Σ w_i·(f_i + J·u_i + h·D_i·∂f/∂t) = Σ of_increments_i·u_i.

    The increments are (I/γ - C)·u = h·(right-hand sides), C lower triangular; solved from the last column back.
    """
    found = list(of_increments)
    for i in range(5, -1, -1):
        found[i] = GAMMA * (found[i] + sum(_C[j][i] * found[j] for j in range(i + 1, 6)))
    return found[0], found[1], found[2], found[3], found[4], found[5]


B1, B2, B3, B4, B5, B6 = _weights(A51, A52, A53, A54, 1.0, 1.0)
"""Weights of the solution."""
E1, E2, E3, E4, E5, E6 = _weights(0.0, 0.0, 0.0, 0.0, 0.0, 1.0)
"""Weights of its error."""
BD = B1 * D1 + B2 * D2 + B3 * D3 + B4 * D4
ED = E1 * D1 + E2 * D2 + E3 * D3 + E4 * D4
"""Share of h·∂f/∂t in either."""
