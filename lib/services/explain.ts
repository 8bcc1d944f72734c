/** Sentences for the codes that services return and fits end with: what happened, why, what to try. */
import type { BacktestFailure } from '../forecast/backtest/backtest-run';
import type { IdentifiabilityFailure } from '../forecast/identifiability/identifiability-run';
import type { ENGINE_ERROR, FailureCode } from '../jobs/failure';
import type { AnalysisKind } from '../store/analysis-kinds';
import type { GAVE_UP } from '../store/claimed-work';
import type { StaleReason } from './staleness';

export interface Explanation {
  what: string;
  why: string;
  tryThis: string;
}

const EXPLANATIONS = {
  'not-found': {
    what: 'This is not here.',
    why: 'It does not exist in your workspace, or it was removed.',
    tryThis: 'Go back to the list of markets and open it from there.',
  },
  'not-allowed': {
    what: 'Your role does not allow this.',
    why: 'Readers can look at everything but change nothing; only owners invite members.',
    tryThis: 'Ask an owner of the workspace for another role.',
  },
  'invalid-input': {
    what: 'Something in the form cannot be used.',
    why: 'A field is empty, too long, or out of its range.',
    tryThis: 'Correct the marked fields and send the form again.',
  },
  'unreadable-series': {
    what: 'The counts were not stored.',
    why: 'What was sent is no series that can be fitted: at least twelve months in a row of two firms, none left out.',
    tryThis: 'Look at what is listed, correct it, and send the counts again.',
  },
  'same-series': {
    what: 'Nothing was stored.',
    why: 'These counts are the same as in the current revision.',
    tryThis: 'Bring a table with new or corrected months.',
  },
  'newer-revision': {
    what: 'Nothing was stored yet: somebody else stored a revision meanwhile.',
    why: 'Your counts were made from an older one. They are still here, compared with the newest.',
    tryThis: 'Look at the difference, then store your counts on top, or bring both together.',
  },
  'nothing-running': {
    what: 'There is nothing to cancel.',
    why: 'The fit has already ended.',
    tryThis: 'Reload the page to see how it ended.',
  },
  'no-result': {
    what: 'There is no outlook yet.',
    why: 'No fit of this market has ended with a usable result.',
    tryThis: 'Run a fit and wait for it to end.',
  },
  'is-stale': {
    what: 'The outlook is out of date.',
    why: 'The data or the market changed after it was made.',
    tryThis: 'Fit again, then issue the new outlook.',
  },
  'wrong-credentials': {
    what: 'You are not signed in.',
    why: 'E-mail address and password do not belong together.',
    tryThis: 'Check both, small and capital letters included, and try again.',
  },
  'too-many-tries': {
    what: 'Too many tries.',
    why: 'After several failures in a row we stop looking for a while.',
    tryThis: 'Wait a quarter of an hour and try again.',
  },
  'not-available': {
    what: 'This link does not open anything.',
    why: 'It was mistyped, has expired, or was withdrawn; we cannot tell which.',
    tryThis: 'Ask the person who sent it for a new one.',
  },
  'email-taken': {
    what: 'The account was not made.',
    why: 'There is already an account with this e-mail address.',
    tryThis: 'Sign in with it, or use another address.',
  },
} satisfies Record<string, Explanation>;

export type ServiceCode = keyof typeof EXPLANATIONS;

export function explainCode(code: ServiceCode): Explanation {
  return EXPLANATIONS[code];
}

const FAILURES: Record<FailureCode, Explanation> = {
  'too-short': {
    what: 'There are too few months to fit.',
    why: 'A market is fitted from twelve months on in which both firms are known.',
    tryThis: 'Upload a longer series, or wait for more months.',
  },
  'no-usable-data': {
    what: 'There is nothing to fit.',
    why: 'One of the firms has no count above zero, or its counts never change.',
    tryThis: 'Check that the right columns were picked and that they hold user counts.',
  },
  failed: {
    what: 'No curve of two competing firms fits these counts.',
    why: 'None of the starting points led to a finite fit.',
    tryThis: 'Look for a mistyped count or mixed units, and upload the corrected table.',
  },
  'engine-error': {
    what: 'The fit broke off.',
    why: 'The calculation met a fault of its own. It is written in the log of the server.',
    tryThis: 'Fit again after the next update, and report the market if it happens again.',
  },
  'gave-up': {
    what: 'The fit did not end.',
    why: 'Several workers stopped in the middle of it, perhaps for lack of memory.',
    tryThis: 'Look after the server, then fit again.',
  },
};

type AnalysisFailureCode = typeof ENGINE_ERROR | typeof GAVE_UP;

/** Sentences for the ways in which any analysis can end without a result. */
function explainBreakdowns(whatBroke: string, whatStayed: string): Record<AnalysisFailureCode, Explanation> {
  return {
    'engine-error': {
      what: whatBroke,
      why: 'The calculation met a fault of its own. It is written in the log of the server.',
      tryThis: 'Try again after the next update, and report the market if it happens again.',
    },
    'gave-up': {
      what: whatStayed,
      why: 'Several workers stopped in the middle of it, perhaps for lack of memory.',
      tryThis: 'Look after the server, then try again.',
    },
  };
}

const ANALYSIS_FAILURES: {
  backtest: Record<BacktestFailure | AnalysisFailureCode, Explanation>;
  identifiability: Record<IdentifiabilityFailure | AnalysisFailureCode, Explanation>;
} = {
  backtest: {
    'too-few-origins': {
      what: 'Past forecasts cannot be tested yet.',
      why: 'At least three past months are needed from which this market could have been fitted and a later month checked.',
      tryThis: 'Come back with more months; fifteen are the fewest.',
    },
    'too-few-forecasts': {
      what: 'Past forecasts could not be tested.',
      why: 'From too few past months did the model give a forecast at all.',
      tryThis: 'Look for mistyped counts in the early months, or come back with more months.',
    },
    ...explainBreakdowns('The test of past forecasts broke off.', 'The test of past forecasts did not end.'),
  },
  identifiability: {
    'not-fitted': {
      what: 'What the data can tell was not worked out.',
      why: 'The months that are left cannot be fitted.',
      tryThis: 'Fit again, or bring more months.',
    },
    ...explainBreakdowns(
      'Working out what the data can tell broke off.',
      'Working out what the data can tell did not end.',
    ),
  },
};

/** @param code as stored with the analysis, perhaps by another version */
export function explainAnalysisFailure(kind: AnalysisKind, code: string | null): Explanation {
  const failures: Partial<Record<string, Explanation>> = ANALYSIS_FAILURES[kind];
  return (code !== null && failures[code]) || UNKNOWN_FAILURE;
}

const UNKNOWN_FAILURE: Explanation = {
  what: 'This failed.',
  why: 'The reason is not known to this version.',
  tryThis: 'Start it again.',
};

/** @param code as stored with the fit, perhaps by another version */
export function explainFailure(code: string | null): Explanation {
  return FAILURES[code as FailureCode] ?? UNKNOWN_FAILURE;
}

/** Numbers of the revisions: the one that an outlook was made from, and the newest. */
export interface RevisionNumbers {
  used: number;
  newest: number;
}

const STALE_REASONS: Record<StaleReason, (numbers: RevisionNumbers) => string> = {
  'newer-revision': ({ used, newest }) =>
    `It was made from revision ${used} of the counts; revision ${newest} has come since.`,
  'measurement-changed': () =>
    'The measurement errors of the market were changed since this outlook was made.',
  'events-changed': () =>
    'Events from which the firms may behave otherwise were added, moved or removed since this outlook was made.',
  'addressable-changed': () =>
    'The estimate of the addressable market was changed since this outlook was made.',
  'priors-changed': () => 'What is assumed before the counts was changed since this outlook was made.',
  'engine-changed': () => 'The method of calculation was improved since this outlook was made.',
};

export function explainStaleReason(reason: StaleReason, numbers: RevisionNumbers): string {
  return STALE_REASONS[reason](numbers);
}
