/**
 * One line on the sampler, with its details to fold away. Sound: split R-hat <= 1.01 and bulk effective sample size >= 400
 * (Vehtari et al. 2021, Bayesian Analysis 16(2)), as the fit's status says.
 */
import { sentence, strong } from './text';
import type { SamplerHealth } from './types';
import type { Words } from './words';

/** R-hat is judged in its third decimal. */
const RHAT_DECIMALS = 3;

export function describeSampler(words: Words): SamplerHealth {
  const { diagnostics, seed, engineVersion } = words.facts.report;
  const { numbers } = words;
  const isSound = diagnostics.status === 'converged';
  const agreement =
    diagnostics.rHat === null ? 'not measured' : numbers.decimals(diagnostics.rHat, RHAT_DECIMALS);
  const ess = diagnostics.ess === null ? 'not measured' : numbers.users(Math.floor(diagnostics.ess));
  const line = isSound
    ? sentence(
        strong(`${diagnostics.chains} chains agree`),
        ` (R-hat ${agreement}), and every number rests on draws worth at least ${ess} independent ones.`,
      )
    : sentence(
        strong('The sampler had not settled'),
        ` when it reached its limit (R-hat ${agreement}, ${ess} independent draws): take every number as rough.`,
      );
  const starts = diagnostics.starts.length;
  return {
    isSound,
    line,
    details: [
      { label: 'Chains', value: String(diagnostics.chains) },
      { label: 'Draws kept', value: numbers.users(diagnostics.drawsKept) },
      { label: 'Split R-hat, worst', value: agreement },
      { label: 'Effective draws, fewest', value: ess },
      { label: 'Starts that reached the best fit', value: `${diagnostics.startsAtBest} of ${starts}` },
      { label: 'Model evaluations', value: numbers.users(diagnostics.evaluations) },
      {
        label: 'Condition number',
        value: diagnostics.conditionNumber === null ? 'none' : numbers.users(diagnostics.conditionNumber),
      },
      { label: 'Seed', value: String(seed) },
      { label: 'Engine', value: engineVersion },
    ],
  };
}
