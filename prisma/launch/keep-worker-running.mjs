/** A worker that ends by itself is started again, each time after a longer wait while it keeps ending soon. */
import { setTimeout as wait } from 'node:timers/promises';

/** Milliseconds. */
const FIRST_WAIT = 1000;
const LONGEST_WAIT = 60_000;
/** A worker that ran so long starts over with the first wait. */
const RAN_WELL = 60_000;

/**
 * @param {() => import('./children.mjs').Child} start
 * @param {{ wait: typeof wait, say: (sentence: string) => void }} [tools]
 * @returns {{ stop: () => Promise<void> }}
 */
export function keepWorkerRunning(start, tools = { wait, say: (text) => process.stderr.write(`${text}\n`) }) {
  const stopping = new AbortController();
  let child = start();
  const finished = keep();

  async function keep() {
    let pause = FIRST_WAIT;
    while (!stopping.signal.aborted) {
      const started = Date.now();
      const end = await child.ended;
      if (stopping.signal.aborted) return;
      if (Date.now() - started >= RAN_WELL) pause = FIRST_WAIT;
      tools.say(`The worker ended by itself (${end}); it starts again in ${pause / 1000} s.`);
      await tools.wait(pause, undefined, { signal: stopping.signal }).catch(() => {});
      pause = Math.min(2 * pause, LONGEST_WAIT);
      if (!stopping.signal.aborted) child = start();
    }
  }

  return {
    stop: async () => {
      stopping.abort();
      await child.stop();
      await finished;
    },
  };
}
