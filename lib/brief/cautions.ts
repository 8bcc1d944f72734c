/** Cautions, shown where they apply. Plain, short, and never a reason to hide a number. */
import { decideOutcome } from '../forecast/odds';

import type { Caution } from './types';
import type { Words } from './words';

/** Chance of an exclusion from which plans about it may follow. */
const EXCLUSION_WORTH_A_WORD = 0.1;

export function writeCautions(words: Words, hasScenario: boolean): Caution[] {
  const { odds } = words.facts.report.outlook;
  const exclusion = odds.exclusionByFocal + odds.exclusionByRival + odds.headStartDecides;
  const isAboutExclusion = exclusion >= EXCLUSION_WORTH_A_WORD || decideOutcome(odds) === null;
  return [
    {
      id: 'estimate',
      text: 'A forecast is an estimate from past counts. It is no promise and no investment advice.',
    },
    {
      id: 'aggregate',
      text: 'Only monthly totals are used; no personal data belongs here.',
    },
    {
      id: 'rival-figures',
      text: `Figures of ${words.rival} must come from lawful sources, and never from an exchange with ${words.rival} itself.`,
    },
    ...(isAboutExclusion || hasScenario
      ? [
          {
            id: 'competition-law',
            text: 'Plans aimed at driving a competitor out can raise questions of competition law. Ask counsel; local law decides.',
          },
        ]
      : []),
    {
      id: 'inside-information',
      text: 'User figures that a listed company has not published may be inside information.',
    },
  ];
}
