/**
 * The one table of reasons for which a least-squares fit stops: an id, what it says to a person, and whether the point may be used.
 *
 * `running` is where every fit begins: a fit that forgets to set its status can never look converged.
 */
export type Termination =
  | 'running'
  | 'gradient'
  | 'zero-residual'
  | 'flat-direction'
  | 'step'
  | 'never-moved'
  | 'iteration-limit'
  | 'start-not-finite';

interface TerminationReason {
  /** What happened and what it means, one sentence. */
  sentence: string;
  /** True when the point is a minimum that may be reported. */
  isUsable: boolean;
}

export const TERMINATION_REASONS: Readonly<Record<Termination, TerminationReason>> = {
  running: {
    sentence: 'The search has not finished.',
    isUsable: false,
  },
  gradient: {
    sentence: 'Converged: no small change of the parameters makes the fit better.',
    isUsable: true,
  },
  'zero-residual': {
    sentence: 'Converged: the model passes through every value to within rounding.',
    isUsable: true,
  },
  'flat-direction': {
    sentence:
      'No small change makes the fit better, but at least one combination of parameters has no effect on it at all, so its value is arbitrary.',
    isUsable: false,
  },
  step: {
    sentence:
      'Stalled: the derivatives promise a better fit, yet no step large enough to be seen brings it. The derivatives or the model may be inexact.',
    isUsable: false,
  },
  'never-moved': {
    sentence: 'The search never left its start: no step from there made the fit better.',
    isUsable: false,
  },
  'iteration-limit': {
    sentence: 'Stopped at the limit of iterations before converging; the best point so far is kept.',
    isUsable: false,
  },
  'start-not-finite': {
    sentence: 'The model gives no finite value at the start, so there is nothing to improve.',
    isUsable: false,
  },
};

/** Whether a fit that stopped for this reason ended at a minimum that may be reported. */
export function isUsableTermination(status: Termination): boolean {
  return TERMINATION_REASONS[status].isUsable;
}
