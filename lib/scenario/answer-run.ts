/**
 * Long questions in slices, so that a page does not freeze: a generator that yields how far it is (0 to 1) every few milliseconds and
 * returns its answer. A page calls `next()` between frames; the server and the command line call `finishRun`.
 */
export type AnswerRun<T> = Generator<number, T, void>;

/** Draws times months followed in one slice: a few milliseconds. */
const SLICE = 12_000;

/** All at once. */
export function finishRun<T>(run: AnswerRun<T>): T {
  for (;;) {
    const step = run.next();
    if (step.done) return step.value;
  }
}

/** Counts the work done and says when a slice is full. */
export class WorkMeter {
  private done = 0;
  private sinceSlice = 0;

  /** @param expected draws times months that the whole question is likely to need */
  constructor(private readonly expected: number) {}

  /** @returns true when it is time to yield */
  add(work: number): boolean {
    this.done += work;
    this.sinceSlice += work;
    if (this.sinceSlice < SLICE) return false;
    this.sinceSlice = 0;
    return true;
  }

  /** Never reaches 1 before the end. */
  get progress(): number {
    return this.done / (this.done + Math.max(this.expected - this.done, 0.1 * this.expected));
  }
}
