/**
 * How the command ends. One table: `--help` prints it, `--json` names the same codes, the tests read it.
 */

export type ExitId =
  | 'ok'
  | 'internal'
  | 'usage'
  | 'file-unreadable'
  | 'data-unusable'
  | 'too-short'
  | 'fit-failed'
  | 'bad-scenario';

export interface ExitCode {
  id: ExitId;
  code: number;
  meaning: string;
}

export const EXIT_CODES: readonly ExitCode[] = [
  {
    id: 'ok',
    code: 0,
    meaning:
      'an outlook or its scenarios were printed; if the sampler stopped short of its target, it says so',
  },
  { id: 'internal', code: 1, meaning: 'a fault of the program itself, or its packages are not installed' },
  { id: 'usage', code: 2, meaning: 'the command was not understood' },
  { id: 'file-unreadable', code: 3, meaning: 'the file could not be opened' },
  { id: 'data-unusable', code: 4, meaning: 'the file holds no two series that can be fitted' },
  { id: 'too-short', code: 5, meaning: 'fewer months than a fit needs' },
  { id: 'fit-failed', code: 6, meaning: 'no start of the fit came to a finite value' },
  { id: 'bad-scenario', code: 7, meaning: 'a file given by --scenario holds no scenario' },
];

export function exitCodeOf(id: ExitId): number {
  return EXIT_CODES.find((exit) => exit.id === id)!.code;
}
