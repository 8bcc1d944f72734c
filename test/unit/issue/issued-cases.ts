/** An issued forecast with a scenario, made from a sample. */
import type { IssuedForecast } from '@/lib/issue/format';
import { freezeForecast } from '@/lib/issue/freeze';
import { compareScenario } from '@/lib/scenario/compare';
import { makeSample } from '../brief/sample-report';
import { pushOf } from '../scenario/draw-cases';

export const sample = makeSample('coexistence');
export const comparison = compareScenario(sample.draws, [pushOf()], { horizonMonths: 36, seed: 1 });

export function issuedOf(hasScenario: boolean): IssuedForecast {
  return freezeForecast({
    facts: structuredClone(sample.facts),
    scenario: hasScenario ? { name: 'Their autumn campaign', comparison } : null,
    issuedAt: '2026-01-08T23:30:00.000Z',
    issuedBy: 'Ada Berg',
  });
}
