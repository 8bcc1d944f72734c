/**
 * Making and listing problems.
 */
import { cutText } from './clean-name';
import { fixesOf } from './fixes';
import { MAX_QUOTED_LENGTH, MAX_ROW_PROBLEMS } from './limits';
import type { SeriesProblem, SeriesProblemCode } from './types';

type ProblemDetail = Partial<Omit<SeriesProblem, 'code' | 'severity'>>;

export function makeError(code: SeriesProblemCode, detail: ProblemDetail = {}): SeriesProblem {
  return makeProblem(code, 'error', detail);
}

export function makeWarning(code: SeriesProblemCode, detail: ProblemDetail = {}): SeriesProblem {
  return makeProblem(code, 'warning', detail);
}

function makeProblem(
  code: SeriesProblemCode,
  severity: SeriesProblem['severity'],
  detail: ProblemDetail,
): SeriesProblem {
  const value = detail.value == null ? null : cutText(detail.value, MAX_QUOTED_LENGTH);
  const fixes = fixesOf(code);
  return { code, severity, row: null, column: null, ...detail, value, ...(fixes && { fixes }) };
}

/** True when the problem stops the file from being fitted, however good its other rows are. */
export function isBlocking(problem: SeriesProblem): boolean {
  return problem.severity === 'error' && problem.row === null;
}

/** Problems of the whole file first, then by row; beyond MAX_ROW_PROBLEMS only their number is told. */
export function listProblems(problems: readonly SeriesProblem[]): SeriesProblem[] {
  const ofFile = problems.filter((problem) => problem.row === null);
  const ofRows = problems.filter((problem) => problem.row !== null).sort((a, b) => a.row! - b.row!);
  if (ofRows.length <= MAX_ROW_PROBLEMS) return [...ofFile, ...ofRows];
  const left = makeWarning('more-problems', { value: String(ofRows.length - MAX_ROW_PROBLEMS) });
  return [...ofFile, ...ofRows.slice(0, MAX_ROW_PROBLEMS), left];
}
