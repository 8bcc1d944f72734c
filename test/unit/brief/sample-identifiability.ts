/** An analysis of what the data can tell, with every part, for tests of words and of freezing. */
import { EFFECTS, type IdentifiabilityReport, SIGN_PATTERNS } from '@/lib/forecast/identifiability/report';

type SensitivityRow = NonNullable<IdentifiabilityReport['sensitivity']>['rows'][number];

export function sensitivityRow(
  id: SensitivityRow['id'],
  changes: Partial<SensitivityRow> = {},
): SensitivityRow {
  return {
    id,
    low: id.startsWith('k') ? 400_000 : 0.4,
    high: id.startsWith('k') ? 600_000 : 0.7,
    elasticity: 0.1,
    shareAtLow: 0.5,
    shareAtHigh: 0.52,
    shareExplained: 0.05,
    oddsAtLow: 0.7,
    oddsAtHigh: 0.72,
    oddsElasticity: 0.1,
    oddsExplained: 0.02,
    ...changes,
  };
}

/** Odds of one cell 0.9, the rest even. */
export function signPattern(
  onFocal: (typeof EFFECTS)[number],
  onRival: (typeof EFFECTS)[number],
  odds = 0.9,
): NonNullable<IdentifiabilityReport['signPattern']> {
  const cells = EFFECTS.flatMap((a) =>
    EFFECTS.map((b) => ({
      onFocal: a,
      onRival: b,
      odds: a === onFocal && b === onRival ? odds : (1 - odds) / 8,
      prior: 1 / 9,
    })),
  );
  const interval = { q05: 0.3, q50: 0.5, q95: 0.7 };
  const isCompetition = onFocal === 'takes' && onRival === 'takes';
  const patterns = SIGN_PATTERNS.map((id) => ({
    id,
    odds: id === 'competition' ? (isCompetition ? odds : (1 - odds) / 8) : 0.1,
    prior: 0.1,
  }));
  return { cells, patterns, alpha: interval, beta: interval, effectiveDraws: 500 };
}

export function sampleIdentifiability(changes: Partial<IdentifiabilityReport> = {}): IdentifiabilityReport {
  return {
    profiles: [
      { quantity: 'alpha', estimate: 0.55, low: 0.42, high: 0.71 },
      { quantity: 'beta', estimate: 0.5, low: 0, high: 0.9 },
      { quantity: 'k1', estimate: 420_000, low: 390_000, high: 470_000 },
      { quantity: 'k2', estimate: 380_000, low: 300_000, high: null },
    ],
    collinearity: {
      index: 31.2,
      isPoorlyTold: true,
      weakest: [
        { id: 'k2', weight: 1 },
        { id: 'alpha', weight: 0.9 },
      ],
    },
    decision: {
      futures: 300,
      rows: [
        { months: 3, decided: 0.3, sure: 0.02, effectiveDraws: 700, extrapolated: 0 },
        { months: 6, decided: 0.45, sure: 0.1, effectiveDraws: 300, extrapolated: 0.1 },
        { months: 12, decided: 0.72, sure: 0.3, effectiveDraws: 90, extrapolated: 0.4 },
        { months: 24, decided: 0.9, sure: 0.6, effectiveDraws: 20, extrapolated: 0.9 },
      ],
    },
    sensitivity: {
      horizonMonths: 24,
      leading: 'coexistence',
      leadingOdds: 0.6,
      rows: [
        sensitivityRow('r1'),
        sensitivityRow('r2'),
        sensitivityRow('k1'),
        sensitivityRow('k2'),
        sensitivityRow('alpha', {
          shareAtLow: 0.61,
          shareAtHigh: 0.38,
          shareExplained: 0.8,
          oddsAtLow: 0.95,
          oddsAtHigh: 0.2,
          oddsExplained: 0.7,
        }),
        sensitivityRow('beta'),
      ],
      learnFirst: { share: 'alpha', odds: 'alpha' },
    },
    signPattern: signPattern('takes', 'takes'),
    errorScales: {
      log: { outcome: 'coexistence', alpha: 0.55, beta: 0.5, k1: 420_000, k2: 380_000 },
      raw: { outcome: 'coexistence', alpha: 0.6, beta: 0.5, k1: 420_000, k2: 380_000 },
      disagree: false,
    },
    ...changes,
  };
}
