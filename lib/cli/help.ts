/**
 * The text of `--help`.
 */
import { DEFAULT_FIT_OPTIONS } from '../estimate/defaults';
import { MAX_SIDE_BY_SIDE, PUSH_KINDS } from '../scenario/push-bounds';
import { MIN_MONTHS_TO_FIT } from '../series/limits';
import { MAX_HORIZON_MONTHS } from './arguments';
import { EXIT_CODES } from './exit-codes';

export const USAGE =
  'elbowroom forecast FILE [--columns month,focal,rival] [--months N] [--seed N] [--json], or elbowroom scenario FILE --push ... (see --help)';

export function helpText(): string {
  const exits = EXIT_CODES.map(({ code, id, meaning }) => `  ${code}  ${id.padEnd(15)}  ${meaning}`);
  return `elbowroom forecast FILE [options]
elbowroom scenario FILE --push PUSH [--push PUSH ...] [--scenario FILE.json ...] [options]

forecast reads two firms' monthly user counts and prints where their market is heading and how sure that is.
scenario says what pushes by either firm would change: destination or path, share and users at 6, 12 and 24 months
against no push, odds before and after, what it is worth, and the smallest push that answers it.

FILE is CSV, TSV or semicolon text or an .xlsx workbook with a header: a month column (2024-03, 03/2024, Mar 2024,
2024-03-31) and one column of users per firm, or one row per month and firm. Days and weeks are brought to months. At least ${MIN_MONTHS_TO_FIT} months in which both are known are needed. "-" reads standard input.

Options
  --columns M,F,R       headers of the month, the focal firm and the rival; without it the month column is found and
                        the first two columns of counts are taken, the first of them as the focal firm
  --sheet NAME          sheet of a workbook; without it the first one with a table
  --firms F,R           focal firm and rival by name, where each row is a month of one firm; --columns then names the
                        month, the column of firms and the one that counts
  --aggregate HOW       mean or last: how days or weeks become months (mean if not given)
  --months N            months to forecast, 1 to ${MAX_HORIZON_MONTHS} (${DEFAULT_FIT_OPTIONS.horizonMonths} if not given)
  --seed N              seed of the random draws; the same seed gives the same numbers (${DEFAULT_FIT_OPTIONS.seed} if not given)
  --decimal-mark MARK   point or comma, for counts such as 1,234 that could be read two ways
  --date-order ORDER    day-first or month-first, for dates such as 03/04/2024
  --json                print one JSON object instead of text; its shape is the schema in lib/cli/forecast-json.ts,
                        for scenario in lib/cli/scenario-output.ts
  --help, --version

Scenarios (months count from the last observed one)
  --push PUSH           key=value,key=value: firm (focal or rival), kind (${PUSH_KINDS.join(', ')}),
                        length (months or lasting), size (users a month for recruits, else a fraction: 0.2 or 20%);
                        and if wanted start, ramp, carry-over (half-life) in months, spend (money a month).
                        Recruits may be bought: spend and cost-per-recruit instead of size, most (a month) if returns
                        diminish. Again for each push, all in one scenario.
  --scenario FILE       a written scenario, {"version": 1, "name": "...", "pushes": [...], "money": {...}}; its schema is
                        in lib/scenario/scenario-json.ts. Up to ${MAX_SIDE_BY_SIDE} scenarios are compared side by side.
  --money MONEY         currency, margin (per user-month of the focal firm), and if wanted rival-margin, discount (a
                        year), months (over which value is counted)
  --keep TARGET         firm, share, month, chance: keep that share in that month with that chance ...
  --counter PUSH        ... by this push: its smallest size, last useful month and break-even spend are printed

  elbowroom scenario counts.csv --push firm=rival,kind=recruits,start=2,length=6,size=5000 \\
    --keep share=40%,month=24,chance=80% --counter kind=growth-lift,start=4,length=9

Exit codes
${exits.join('\n')}

With --json an error too is one object on standard output: {"error": {"code", "message", "problems"}}; code is a
name from this list. Forecasts are estimates and no investment advice.
`;
}
