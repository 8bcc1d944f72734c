/** Drives work that is written in slices where nobody has to be let in between. */
export function runToEnd<Result>(steps: Generator<unknown, Result>): Result {
  for (;;) {
    const step = steps.next();
    if (step.done) return step.value;
  }
}
