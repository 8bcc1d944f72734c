/** The chance of keeping a share against size and start of a push, ready to draw: a grid of cells, the largest size on top. */
import type { ChanceMap } from '../scenario/answers';
import { spellTarget } from './answer-words';
import { firmOfPush, nameKind, spellPushField } from './push-words';
import { possessive, sentence } from './text';
import type { FigureTable, Sentence } from './types';
import type { Words } from './words';

export interface ChanceCell {
  chance: number;
  /** "72 %". */
  text: string;
  meetsTarget: boolean;
  /** For a reader that does not see the grid: "5,000 from Mar 2026: 72 %". */
  label: string;
}

export interface ChanceMapView {
  title: string;
  xLabel: string;
  yLabel: string;
  columns: { startMonth: number; label: string }[];
  /** From the largest size downwards. */
  rows: { size: number; label: string; cells: ChanceCell[] }[];
  /** At least one cell meets the target. */
  canBeMet: boolean;
  caption: Sentence;
  table: FigureTable;
}

export function buildChanceMapView(words: Words, map: ChanceMap): ChanceMapView {
  const { target, push } = map;
  const columns = map.startMonths.map((startMonth) => ({
    startMonth,
    label: spellPushField(words, 'startMonth', { ...push, startMonth }),
  }));
  const rows = map.sizes.map((size, i) => {
    const label = spellPushField(words, 'size', { ...push, size });
    const cells = map.chances[i]!.map((chance, j): ChanceCell => {
      const meetsTarget = chance >= target.chance;
      const text = spellCell(words, chance, target.chance, meetsTarget);
      return {
        chance,
        text,
        meetsTarget,
        label: `${label} from ${columns[j]!.label}: ${text}`,
      };
    });
    return { size, label, cells };
  });
  const canBeMet = rows.some(({ cells }) => cells.some((cell) => cell.meetsTarget));
  const sizeName = push.kind === 'recruits' ? 'recruits per month' : nameKind(push.kind);
  return {
    title: `Chance of keeping ${spellTarget(words, target)}`,
    xLabel: 'start →',
    yLabel: `${possessive(words.name(firmOfPush(push)))} ${sizeName} →`,
    columns,
    rows: [...rows].reverse(),
    canBeMet,
    caption: sentence(
      `Chance of keeping ${spellTarget(words, target)}, by size and start of the push. ` +
        (canBeMet
          ? `Marked: at least ${words.numbers.chance(target.chance)}.`
          : `No cell reaches ${words.numbers.chance(target.chance)}.`),
    ),
    table: {
      title: 'Chance by size and start',
      columns: ['Size', ...columns.map(({ label }) => label)],
      rows: rows.map(({ label, cells }) => [label, ...cells.map(({ text }) => text)]),
      raw: rows.map(({ size, cells }) => [size, ...cells.map(({ chance }) => chance)]),
    },
  };
}

/** A chance just below the wished one must not read like it. */
function spellCell(words: Words, chance: number, wished: number, meetsTarget: boolean): string {
  const text = words.numbers.chance(chance);
  return !meetsTarget && text === words.numbers.chance(wished) && !text.startsWith('<') ? `<${text}` : text;
}
