/**
 * The text of `--help`.
 */
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import { MIN_MONTHS_TO_FIT } from '../series/limits';
import { MAX_HORIZON_MONTHS } from './arguments';
import { EXIT_CODES } from './exit-codes';

export const USAGE = 'elbowroom forecast FILE [--columns month,focal,rival] [--months N] [--seed N] [--json]';

export function helpText(): string {
  const exits = EXIT_CODES.map(({ code, id, meaning }) => `  ${code}  ${id.padEnd(15)}  ${meaning}`);
  return `${USAGE}

Reads two firms' monthly user counts and prints where their market is heading and how sure that is.

FILE is CSV, TSV or semicolon text with a header: a month column (2024-03, 03/2024, Mar 2024, 2024-03-31) and one
column of users per firm. At least ${MIN_MONTHS_TO_FIT} months in which both are known are needed. "-" reads standard input.

Options
  --columns M,F,R       headers of the month, the focal firm and the rival; without it the month column is found and
                        the first two columns of counts are taken, the first of them as the focal firm
  --months N            months to forecast, 1 to ${MAX_HORIZON_MONTHS} (${DEFAULT_FIT_OPTIONS.horizonMonths} if not given)
  --seed N              seed of the random draws; the same seed gives the same numbers (${DEFAULT_FIT_OPTIONS.seed} if not given)
  --decimal-mark MARK   point or comma, for counts such as 1,234 that could be read two ways
  --date-order ORDER    day-first or month-first, for dates such as 03/04/2024
  --json                print one JSON object instead of text; its shape is the schema in lib/cli/forecast-json.ts
  --help, --version

Exit codes
${exits.join('\n')}

With --json an error too is one object on standard output: {"error": {"code", "message", "problems"}}; code is a
name from this list. Forecasts are estimates and no investment advice.
`;
}
