/** What a kind of push changes and what stays as it was fitted, in words; and the trade's words for the starting points. */
import type { Push } from '../dynamics/push';
import type { StartingPoint, StartingPointId } from '../scenario/starting-points';
import { firmOfPush } from './push-words';
import { possessive } from './text';
import { otherFirm, type Words } from './words';

export interface KindWords {
  /** "growth lift". */
  name: string;
  /** What the push does to the market while it lasts. */
  does: string;
  /** Which coefficients stay fixed, and what follows from it for the levels. */
  fixed: string;
}

/** The names of both firms go in; a push of size 0 is told as one that changes nothing yet. */
export function describeKind(words: Words, push: Pick<Push, 'firm' | 'kind' | 'size'>): KindWords {
  const own = words.name(firmOfPush(push));
  const other = words.name(otherFirm(firmOfPush(push)));
  const size = push.kind === 'recruits' ? words.numbers.number(push.size) : words.numbers.percent(push.size);
  switch (push.kind) {
    case 'recruits':
      return {
        name: 'recruits',
        does: `${own} gains ${size} users a month from outside, on top of its own growth.`,
        fixed:
          'No coefficient changes: growth rates, saturation levels and the room that the firms take from each other stay as fitted. ' +
          `While it lasts, ${own} cannot fall to nothing.`,
      };
    case 'growth-lift':
      return {
        name: 'growth lift',
        does: `${possessive(own)} growth rate is ${size} higher, so each month more people sign up.`,
        fixed:
          'Fixed: how strongly every user crowds its own firm and the other one. ' +
          `So ${possessive(own)} saturation level rises by ${size} as well, ${own} takes more of ${possessive(other)} room, and ${other} takes a smaller part of ${possessive(own)}.`,
      };
    case 'pull':
      return {
        name: `pull on ${possessive(other)} room`,
        does: `Each user of ${own} takes ${size} more of ${possessive(other)} room.`,
        fixed:
          'Fixed: growth rates, saturation levels and how strongly every user crowds its own firm. ' +
          `The room that ${other} takes from ${own} stays as fitted.`,
      };
    case 'room':
      return {
        name: 'more room of its own',
        does: `${possessive(own)} users crowd each other less, as in a new region or a wider offer: its saturation level is ${size} higher.`,
        fixed:
          'Fixed: growth rates, and how much one user of either firm holds back the other firm. ' +
          `So a full ${own} has more users and takes ${size} more of ${possessive(other)} room; ${other} takes the same part of ${possessive(own)} room as before.`,
      };
  }
}

const STARTING_POINT_WORDS: Record<StartingPointId, { name: string; note: string }> = {
  'price-promotion': {
    name: 'Price promotion',
    note: 'A growth lift for a quarter that is soon forgotten.',
  },
  'advertising-burst': {
    name: 'Advertising burst',
    note: 'Recruits for a quarter, building up for a month and remembered for a month or two.',
  },
  'new-region': {
    name: 'New region',
    note: 'More room of its own, opened over a year, for good.',
  },
  'poaching-feature': {
    name: 'Feature that poaches',
    note: 'Each user takes more of the other firm’s room, for good.',
  },
};

const BASIS_WORDS: Record<StartingPoint['basis'], string> = {
  'common-practice': 'Length and fading are common practice, the size is a value to start from.',
  'starting-value': 'All values are places to start from, no findings.',
};

/** "Price promotion", and what its values rest on. */
export function describeStartingPoint({ id, basis }: Pick<StartingPoint, 'id' | 'basis'>): {
  name: string;
  note: string;
} {
  const { name, note } = STARTING_POINT_WORDS[id];
  return { name, note: `${note} ${BASIS_WORDS[basis]}` };
}
