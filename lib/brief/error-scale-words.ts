/**
 * The second opinion in words: plain least squares without assumptions, once with errors in percent and once with errors of a fixed number.
 * Which of the two it is can turn the answer (Pascual & Kareiva 1996, Ecology 77:337).
 */
import type { IdentifiabilityReport, Verdict } from '../forecast/identifiability/report';
import { subjectOutcome } from './outcomes';
import { capitalise, listWords, possessive, sentence, strong } from './text';
import type { ErrorScaleLine, ErrorScaleTable, Sentence } from './types';
import type { Words } from './words';

type ErrorScales = NonNullable<IdentifiabilityReport['errorScales']>;

/** Half-width, relative, of a value without an interval, for its digits. */
const VAGUE = 0.2;
const ABSENT = 'not told';

export function buildErrorScales(words: Words, scales: ErrorScales): ErrorScaleTable {
  const kinds = [
    ['log', 'in percent'],
    ['raw', 'by a fixed number'],
  ] as const;
  const rows = kinds.map(([id, kind]) => describeScale(words, id, kind, scales[id]));
  return {
    caption: sentence(
      'The best single fit by plain least squares, without assumptions, for either kind of counting error.',
    ),
    columns: [
      'If the counts err',
      'it stands for',
      `Room taken from ${words.focal}`,
      `Room taken from ${words.rival}`,
      `${possessive(words.focal)} saturation level`,
      `${possessive(words.rival)} saturation level`,
    ],
    rows,
  };
}

function describeScale(words: Words, id: 'log' | 'raw', kind: string, verdict: Verdict): ErrorScaleLine {
  const { alpha, beta, k1, k2 } = verdict;
  const around = (value: number) => ({ q05: (1 - VAGUE) * value, q95: (1 + VAGUE) * value });
  const room = (value: number | null) =>
    value === null ? ABSENT : words.numbers.percent(value, around(value));
  const users = (value: number | null) =>
    value === null ? ABSENT : words.numbers.users(value, around(value));
  return {
    id,
    kind,
    verdict: capitalise(spellVerdict(words, verdict)),
    values: [room(alpha), room(beta), users(k1), users(k2)],
  };
}

export function writeErrorScales(words: Words, { log, raw, disagree }: ErrorScales): Sentence {
  if (disagree) {
    return sentence(
      strong('The kind of counting error turns the answer'),
      `: errors that grow with the counts make the best single fit stand for ${spellVerdict(words, log)}, errors of the same size in every month for ${spellVerdict(words, raw)}. Which kind it is, the counts hardly tell.`,
    );
  }
  if (log.outcome === raw.outcome) {
    return log.outcome === 'notIdentified'
      ? sentence(
          `Without assumptions the counts do not settle any outcome, whichever way they err: ${whatIsUnseen(words, log)}.`,
        )
      : sentence(
          `Whether the counts err in percent or by a fixed number, the best single fit stands for ${spellVerdict(words, log)}.`,
        );
  }
  return sentence(
    `If the counts err in percent, the best single fit stands for ${spellVerdict(words, log)}; if by a fixed number, for ${spellVerdict(words, raw)}.`,
  );
}

function spellVerdict(words: Words, { outcome }: Verdict): string {
  if (outcome === 'notIdentified') return 'no outcome at all (not identified)';
  return outcome === 'boundary' ? 'the border between two outcomes' : subjectOutcome(words, outcome);
}

/** Clauses for a firm whose counts show no saturation level: those that only grow, and those that only fall. */
function whatIsUnseen(words: Words, { k1, k2 }: Verdict): string {
  const firms = [k1 === null ? words.focal : null, k2 === null ? words.rival : null].filter(
    (name) => name !== null,
  );
  if (firms.length === 0) return 'no single fit settles';
  return `they do not show how far ${listWords(firms)} would get alone`;
}
