/** Something that stops the launcher and that a person can act on: one sentence, no stack trace. */
export class LaunchProblem extends Error {
  name = 'LaunchProblem';
}
