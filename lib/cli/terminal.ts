/**
 * What the command says beside its result: progress while somebody watches, warnings. All of it goes to standard error.
 */

export interface Terminal {
  showProgress(line: string): void;
  clearProgress(): void;
  warn(sentence: string): void;
}

/** Moves to the start of the line and clears it. */
const CLEAR_LINE = '\r\u001b[2K';

export function openTerminal(stream: NodeJS.WriteStream): Terminal {
  const isWatched = stream.isTTY === true;
  return {
    showProgress: (line) => {
      if (isWatched) stream.write(`${CLEAR_LINE}${line}`);
    },
    clearProgress: () => {
      if (isWatched) stream.write(CLEAR_LINE);
    },
    warn: (sentence) => {
      stream.write(`elbowroom: ${sentence}\n`);
    },
  };
}
