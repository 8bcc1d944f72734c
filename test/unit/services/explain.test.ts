import { expect, it } from 'vitest';
import {
  explainAnalysisFailure,
  explainCode,
  explainFailure,
  explainStaleReason,
} from '@/lib/services/explain';

it('every failure has sentences of its own, also one that this version does not know', () => {
  const codes = ['too-short', 'no-usable-data', 'failed', 'engine-error', 'gave-up', 'of-the-future', null];
  const sentences = codes.map((code) => explainFailure(code).what);
  expect(new Set(sentences).size).toBe(codes.length - 1);
  for (const code of codes) {
    for (const sentence of Object.values(explainFailure(code))) expect(sentence).toMatch(/^[A-Z].+\.$/);
  }
});

it('codes and reasons are said in whole sentences', () => {
  for (const sentence of Object.values(explainCode('not-available'))) expect(sentence).toMatch(/^[A-Z].+\.$/);
  for (const reason of ['newer-revision', 'measurement-changed', 'engine-changed'] as const)
    expect(explainStaleReason(reason, { used: 3, newest: 5 })).toMatch(/^[A-Z].+\.$/);
  expect(explainStaleReason('newer-revision', { used: 3, newest: 5 })).toMatch(/revision 3 .*revision 5/);
});

it('an analysis that gave no result says which one it was, and why', () => {
  for (const kind of ['backtest', 'identifiability'] as const) {
    for (const code of ['engine-error', 'gave-up']) {
      const { what } = explainAnalysisFailure(kind, code);
      expect(what).toContain(kind === 'backtest' ? 'past forecasts' : 'what the data can tell');
      for (const sentence of Object.values(explainAnalysisFailure(kind, code)))
        expect(sentence).toMatch(/^[A-Z].+\.$/);
    }
  }
  expect(explainAnalysisFailure('backtest', 'too-few-origins').what).toBe(
    'Past forecasts cannot be tested yet.',
  );
  expect(explainAnalysisFailure('identifiability', 'of-the-future').what).toBe('This failed.');
});
