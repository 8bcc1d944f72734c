/**
 * Words for probabilities: the calibrated scale of the IPCC (Mastrandrea et al. 2010, Guidance Note for Lead Authors of the IPCC
 * Fifth Assessment Report on Consistent Treatment of Uncertainties, table 1). The scale's ranges overlap; the strongest word that
 * holds is used: virtually certain > 99 %, very likely > 90, likely > 66, about as likely as not 33 to 66, unlikely < 33,
 * very unlikely < 10, exceptionally unlikely < 1.
 */

export type ProbabilityWord =
  | 'virtually certain'
  | 'very likely'
  | 'likely'
  | 'about as likely as not'
  | 'unlikely'
  | 'very unlikely'
  | 'exceptionally unlikely';

/** Above this an outcome counts as decided; the lower end of "likely". */
export const LIKELY_ABOVE = 0.66;
const VERY_LIKELY_ABOVE = 0.9;
const VIRTUALLY_CERTAIN_ABOVE = 0.99;
/** Below this: "unlikely". */
export const UNLIKELY_BELOW = 0.33;
const VERY_UNLIKELY_BELOW = 0.1;
const EXCEPTIONALLY_UNLIKELY_BELOW = 0.01;

/**
 * @param probability 0 to 1
 * @throws RangeError outside that range, NaN included
 */
export function wordProbability(probability: number): ProbabilityWord {
  if (!(probability >= 0 && probability <= 1)) {
    throw new RangeError(`probability must be between 0 and 1, got ${probability}`);
  }
  if (probability > VIRTUALLY_CERTAIN_ABOVE) return 'virtually certain';
  if (probability > VERY_LIKELY_ABOVE) return 'very likely';
  if (probability > LIKELY_ABOVE) return 'likely';
  if (probability < EXCEPTIONALLY_UNLIKELY_BELOW) return 'exceptionally unlikely';
  if (probability < VERY_UNLIKELY_BELOW) return 'very unlikely';
  if (probability < UNLIKELY_BELOW) return 'unlikely';
  return 'about as likely as not';
}

/** "will likely", "will very likely", "is virtually certain to": goes before a verb; for probabilities that pass "likely". */
export function likelyVerb(probability: number, subject: 'one' | 'two' = 'one'): string {
  const word = wordProbability(probability);
  if (word === 'virtually certain') return `${subject === 'one' ? 'is' : 'are'} virtually certain to`;
  return `will ${word}`;
}
