/** How a command ends: what it prints, or one of EXIT_CODES with a sentence. */
import { explainProblem } from '../series/explain';
import { isBlocking } from '../series/problem';
import type { SeriesProblem } from '../series/types';
import type { ExitId } from './exit-codes';

export type CommandFailure = {
  exit: Exclude<ExitId, 'ok'>;
  message: string;
  problems: readonly SeriesProblem[];
};

export type CommandEnd = { exit: 'ok'; output: string } | CommandFailure;

export function fail(
  exit: Exclude<ExitId, 'ok'>,
  message: string,
  problems: readonly SeriesProblem[] = [],
): CommandFailure {
  return { exit, message, problems };
}

/** The message is the first problem that stops the file. */
export function failWithProblems(
  exit: Exclude<ExitId, 'ok'>,
  problems: readonly SeriesProblem[],
): CommandFailure {
  const { what, why, tryThis } = explainProblem(problems.find(isBlocking) ?? problems[0]);
  return fail(exit, `${what} ${why} ${tryThis}`, problems);
}
