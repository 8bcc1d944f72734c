/** Random systems, states and pushes for property tests, in ranges seen in markets (growth 2 to 50 % a month, coefficients 0 to 3). */
import fc from 'fast-check';
import type { Push } from '@/lib/dynamics/push';
import type { CompetitionSystem, State } from '@/lib/dynamics/system';

const rate = fc.double({ min: 0.02, max: 0.5, noNaN: true });
const level = fc.double({ min: 10, max: 1e6, noNaN: true });

/** The same cases on every run: a test that fails must fail again. */
fc.configureGlobal({ seed: 1925, numRuns: 100, endOnFailure: true });

/** A coefficient that is 0 or above 0.001 and at least 0.02 away from 1, so that nothing is a matter of rounding. */
function coefficient(min: number, max: number): fc.Arbitrary<number> {
  return fc
    .double({ min, max, noNaN: true })
    .filter((value) => Math.abs(value - 1) > 0.02 && (value === 0 || value > 0.001));
}

function systemWith(
  alpha: fc.Arbitrary<number>,
  beta: fc.Arbitrary<number>,
): fc.Arbitrary<CompetitionSystem> {
  return fc.record({ r1: rate, r2: rate, k1: level, k2: level, alpha, beta });
}

export const anySystem = systemWith(coefficient(0, 3), coefficient(0, 3));
export const coexistingSystem = systemWith(coefficient(0, 0.95), coefficient(0, 0.95));
export const headStartSystem = systemWith(coefficient(1.05, 3), coefficient(1.05, 3));

/** Users of both firms as shares of their K. */
export const anyShares: fc.Arbitrary<State> = fc.tuple(
  fc.double({ min: 0.01, max: 1.3, noNaN: true }),
  fc.double({ min: 0.01, max: 1.3, noNaN: true }),
);

export function stateOf(system: CompetitionSystem, shares: State): State {
  return [shares[0] * system.k1, shares[1] * system.k2];
}

/** A push whose size is a fraction; for recruits, multiply it by K/100. */
export const anyPush: fc.Arbitrary<Push> = fc.record({
  firm: fc.constantFrom(1 as const, 2 as const),
  kind: fc.constantFrom('recruits' as const, 'growth-lift' as const, 'pull' as const, 'room' as const),
  startMonth: fc.integer({ min: 0, max: 12 }).map((value) => value / 2),
  lengthMonths: fc.option(
    fc.integer({ min: 1, max: 24 }).map((value) => value / 2),
    { nil: null },
  ),
  size: fc.double({ min: 0.01, max: 1, noNaN: true }),
  rampMonths: fc.constantFrom(0, 1, 2.5),
  carryOverHalfLifeMonths: fc.constantFrom(0, 1, 3),
});

/** The push with recruits in users per month of the pushing firm's market size. */
export function scalePush(push: Push, system: CompetitionSystem): Push {
  if (push.kind !== 'recruits') return push;
  return { ...push, size: (push.size * (push.firm === 1 ? system.k1 : system.k2)) / 100 };
}
