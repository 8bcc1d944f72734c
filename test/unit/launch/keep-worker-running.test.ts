import { expect, it } from 'vitest';
import { keepWorkerRunning } from '@/prisma/launch/keep-worker-running.mjs';

/** Children that end when told; `starts` counts them. */
function makeWorkers() {
  const ends: ((end: string) => void)[] = [];
  const start = () => {
    let end: (how: string) => void = () => {};
    const ended = new Promise<string>((resolve) => {
      end = resolve;
    });
    ends.push(end);
    return {
      ended,
      stop: async () => {
        end('signal SIGTERM');
      },
    };
  };
  return { start, ends };
}

function makeTools() {
  const pauses: number[] = [];
  const sentences: string[] = [];
  const wait = async (pause: number) => {
    pauses.push(pause);
  };
  return {
    pauses,
    sentences,
    tools: { wait: wait as never, say: (sentence: string) => sentences.push(sentence) },
  };
}

it('starts a worker again each time it ends, after longer and longer pauses up to a minute', async () => {
  const { start, ends } = makeWorkers();
  const { pauses, sentences, tools } = makeTools();
  const worker = keepWorkerRunning(start, tools);
  for (let i = 0; i < 8; i++) {
    ends[i]!('exit code 1');
    await expect.poll(() => ends.length).toBe(i + 2);
  }
  await worker.stop();
  expect(pauses).toEqual([1000, 2000, 4000, 8000, 16_000, 32_000, 60_000, 60_000]);
  expect(sentences[0]).toBe('The worker ended by itself (exit code 1); it starts again in 1 s.');
});

it('does not start a worker again that it stopped', async () => {
  const { start, ends } = makeWorkers();
  const { sentences, tools } = makeTools();
  await keepWorkerRunning(start, tools).stop();
  expect(ends).toHaveLength(1);
  expect(sentences).toEqual([]);
});
