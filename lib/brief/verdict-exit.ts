/** The verdict when a firm has left: the other one goes on alone, and the odds are of a contest that would have to begin again. */
import type { Structure } from '../forecast/report';
import { capitalise, run, sentence } from './text';
import type { Verdict } from './types';
import { horizonMonthOf, intervalAt, otherFirm, type Words } from './words';

export function writeExit(words: Words, { firm, month }: NonNullable<Structure['exit']>): Verdict {
  const gone = firm === 1 ? 'focal' : 'rival';
  const left = otherFirm(gone);
  const [goneName, leftName] = [words.name(gone), words.name(left)];
  const { levels } = words.facts.report.outlook;
  const users = intervalAt(levels[left], levels[left].q50.length - 1);
  const horizon = words.months.long(horizonMonthOf(words));
  const end = words.facts.report.outlook.destination[left];
  return {
    decided: null,
    headline: sentence(
      run(goneName, gone),
      ' has left this market; ',
      run(leftName, left),
      ' goes on alone.',
    ),
    support: [
      sentence(
        `${goneName} has had no users since ${words.months.long(month)}: the fit takes it as gone, not as missing.`,
      ),
      sentence(
        `In ${horizon} ${leftName} is near ${words.numbers.users(users.q50, users)} (90\u00a0% interval ${words.numbers.usersInterval(users)}); alone it levels off near ${words.numbers.users(end.q50, end)}.`,
      ),
      sentence(`The odds tell how a contest would end if ${goneName} came back with the strengths it had.`),
    ],
    plain: capitalise(`${goneName} has left; ${leftName} goes on alone`),
  };
}
