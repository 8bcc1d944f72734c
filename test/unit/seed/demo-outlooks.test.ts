/** What the engine makes of the demo markets, with the options the seed gives it. */
import { expect, test } from 'vitest';
import { runOutlook } from '@/lib/cli/run-outlook';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { DEMO_MARKETS } from '@/seed/demo-markets';
import { readDemoSeries } from '@/seed/seed';

/** "Likely" on the calibrated scale: from here an outcome is named. */
const LIKELY = 0.66;

test.each([
  ['demo-ferry-passes', 'coexistence'],
  ['demo-cargo-bikes', 'exclusionByRival'],
  ['demo-parcel-lockers', 'headStartDecides'],
  ['demo-night-buses', null],
] as const)('%s: %s', { timeout: 30_000 }, (id, decided) => {
  const demo = DEMO_MARKETS.find((market) => market.id === id)!;
  const measurementFloor = { focal: demo.focalError, rival: demo.rivalError };
  const end = runOutlook(
    { series: readDemoSeries(demo), options: { ...DEFAULT_FIT_OPTIONS, measurementFloor } },
    () => {},
  );
  if ('failure' in end) throw new Error(end.failure);
  expect(end.report.diagnostics.status).toBe('converged');
  expect(end.report.outlook.decided).toBe(decided);
  const highest = Math.max(...Object.values(end.report.outlook.odds));
  if (decided === null) expect(highest).toBeLessThan(LIKELY);
  else expect(end.report.outlook.odds[decided]).toBeGreaterThan(LIKELY);
});
