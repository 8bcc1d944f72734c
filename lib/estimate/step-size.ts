/**
 * Dual averaging of the leapfrog step towards a wanted acceptance (Hoffman & Gelman 2014, section 3.2; their constants).
 */
const GAMMA = 0.05;
const SETTLING = 10;
const DECAY = 0.75;

export interface StepSizeTuner {
  /** Step to use now. */
  readonly current: number;
  /** Averaged step to keep when tuning ends. */
  readonly averaged: number;
  update(acceptance: number): void;
  /** Begins again around the current step. */
  restart(): void;
}

export function createStepSizeTuner(first: number, wantedAcceptance: number): StepSizeTuner {
  let logStep = Math.log(first);
  let logAveraged = logStep;
  let error = 0;
  let count = 0;
  let target = Math.log(2 * first);
  return {
    get current() {
      return Math.exp(logStep);
    },
    get averaged() {
      return Math.exp(logAveraged);
    },
    update(acceptance) {
      count++;
      const rate = 1 / (count + SETTLING);
      error = (1 - rate) * error + rate * (wantedAcceptance - acceptance);
      logStep = target - (Math.sqrt(count) / GAMMA) * error;
      const weight = count ** -DECAY;
      logAveraged = weight * logStep + (1 - weight) * logAveraged;
    },
    restart() {
      target = Math.log(2) + logAveraged;
      logStep = logAveraged;
      error = 0;
      count = 0;
    },
  };
}
