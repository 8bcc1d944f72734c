/**
 * Coefficients of the explicit Runge-Kutta pair of order 5(4) of Dormand & Prince (1980), J. Comput. Appl. Math. 6:19-26, and of its dense
 * output of order 4 (Hairer, Norsett & Wanner, Solving Ordinary Differential Equations I, section II.6, program DOPRI5).
 *
 *   k_s = f(t + C[s] h, y + h sum_j A[s][j] k_j),   y1 = y + h sum_j A[6][j] k_j  (first same as last: k_7 = f(t + h, y1))
 *   error = h sum_j ERROR[j] k_j                     (order 5 minus order 4)
 */
export const STAGES = 7;

/** Nodes. */
export const C = Float64Array.of(0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1);

/** Lower triangle in rows of STAGES; the last row holds the weights of the fifth-order solution. */
export const A = Float64Array.from(
  [
    [0, 0, 0, 0, 0, 0, 0],
    [1 / 5, 0, 0, 0, 0, 0, 0],
    [3 / 40, 9 / 40, 0, 0, 0, 0, 0],
    [44 / 45, -56 / 15, 32 / 9, 0, 0, 0, 0],
    [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729, 0, 0, 0],
    [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656, 0, 0],
    [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84, 0],
  ].flat(),
);

/** Fifth-order weights minus fourth-order weights. */
export const ERROR = Float64Array.of(
  71 / 57600,
  0,
  -71 / 16695,
  71 / 1920,
  -17253 / 339200,
  22 / 525,
  -1 / 40,
);

/** Weights of the fourth power in the dense output. */
export const DENSE = Float64Array.of(
  -12715105075 / 11282082432,
  0,
  87487479700 / 32700410799,
  -10690763975 / 1880347072,
  701980252875 / 199316789632,
  -1453857185 / 822651844,
  69997945 / 29380423,
);
