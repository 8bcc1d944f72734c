/**
 * Where the parts of a map stand, in CSS pixels: the margins around its plot, room for tick labels and axis names, and
 * words cut into lines that fit a width.
 */

export const MAP_TOP = 30;
/** Drawing order of layers over Recharts' own marks, the highest of which (scatters) lie at 600. */
export const ABOVE_MARKS = 700;
export const MAP_X_AXIS = 50;
const TICK_LETTER_WIDTH = 7.2;
const LETTER_WIDTH = 7.1;
/** Between a tick's label and its axis, with some air at the left. */
const TICK_ROOM = 14;
/** Half of the widest label under the right end of the horizontal axis. */
const RIGHT_ROOM = 26;

export interface MapLayout {
  margin: { top: number; right: number; bottom: number; left: number };
  yAxisWidth: number;
  plot: { width: number; height: number };
}

export function layOutMap(size: { width: number; height: number }, yLabels: string[]): MapLayout {
  const yAxisWidth =
    Math.ceil(Math.max(...yLabels.map((label) => label.length)) * TICK_LETTER_WIDTH) + TICK_ROOM;
  return {
    margin: { top: MAP_TOP, right: RIGHT_ROOM, bottom: 0, left: 0 },
    yAxisWidth,
    plot: {
      width: Math.max(size.width - yAxisWidth - RIGHT_ROOM, 1),
      height: Math.max(size.height - MAP_TOP - MAP_X_AXIS, 1),
    },
  };
}

/** Words in lines of at most `width` pixels; a longer word stands alone. */
export function wrapWords(text: string, width: number): string[] {
  const lines: string[] = [];
  for (const word of text.split(' ')) {
    const last = lines.at(-1);
    if (last !== undefined && (last.length + 1 + word.length) * LETTER_WIDTH <= width) {
      lines[lines.length - 1] = `${last} ${word}`;
    } else lines.push(word);
  }
  return lines;
}
