/**
 * What a nonlinear least-squares fit reads: residuals r(theta) of length m, and their Jacobian, over n parameters theta.
 */
export interface LeastSquaresProblem {
  /** n, at least 1. */
  parameterCount: number;
  /** m, at least 1. */
  residualCount: number;
  /**
   * Fills residuals (m) and, unless null, the Jacobian d residual_i / d theta_j at [i * n + j]. Returns false when any of
   * them is not finite. Must not keep or change `theta`.
   */
  evaluate(theta: Float64Array, residuals: Float64Array, jacobian: Float64Array | null): boolean;
}
