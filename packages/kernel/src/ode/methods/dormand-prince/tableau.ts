/**
 * Dormand–Prince 5(4): seven stages, the last of which is the first of the next step; order 5 with an embedded solution
 * of order 4. J. R. Dormand, P. J. Prince, A family of embedded Runge–Kutta formulae, J. Comput. Appl. Math. 6, 1980.
 * Dense output of order 4: Hairer, Nørsett, Wanner, Solving Ordinary Differential Equations I, II.6 (after Shampine 1986).
 */
export const dormandPrince = {
  stages: 7,
  times: [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1],
  a: [
    [],
    [1 / 5],
    [3 / 40, 9 / 40],
    [44 / 45, -56 / 15, 32 / 9],
    [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
    [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
    /** Also the weights of the solution. */
    [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
  ],
  /** Weights of the solution minus those of the embedded one. */
  error: [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40],
  /** Weights of the fifth vector of the dense output. */
  dense: [
    -12715105075 / 11282082432,
    0,
    87487479700 / 32700410799,
    -10690763975 / 1880347072,
    701980252875 / 199316789632,
    -1453857185 / 822651844,
    69997945 / 29380423,
  ],
} as const;
