/**
 * Speed of scenarios: redrawing a comparison of three pushes at 400 draws (what a slider does), and each answer at 1,000 draws with the
 * longest slice that a page would wait for.
 */
import type { DrawSet } from '@/lib/estimate/types';
import type { AnswerRun } from '@/lib/scenario/answer-run';
import { findBreakEven } from '@/lib/scenario/find-break-even';
import { findLastUsefulMonth } from '@/lib/scenario/find-last-month';
import { findSmallestPush } from '@/lib/scenario/find-smallest-push';
import { chooseMapAxes, mapChances } from '@/lib/scenario/map-chances';
import type { Money } from '@/lib/scenario/money';
import { prepareScenario } from '@/lib/scenario/prepare-scenario';
import type { PricedPush } from '@/lib/scenario/spend';

const OPTIONS = { horizonMonths: 36, seed: 1 };
const COLUMNS = ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta', 'n1', 'n2', 'size1', 'size2', 'noise1', 'noise2'];
/** A market in which all four outcomes are open. */
const MIDDLE = [0.15, 0.2, 1e6, 8e5, 0.95, 1.05, 3e5, 2e5, 0.03, 0.05, 0.01, 0.02];
const SPREAD = 0.2;
const REPEATS = 40;

const PUSH: PricedPush = {
  firm: 2,
  kind: 'recruits',
  startMonth: 3,
  lengthMonths: 8,
  size: 12_000,
  rampMonths: 1,
  carryOverHalfLifeMonths: 3,
};
const PUSHES: PricedPush[] = [
  PUSH,
  { ...PUSH, firm: 1, kind: 'growth-lift', size: 0.3, startMonth: 5, spendPerMonth: 40_000 },
  { ...PUSH, kind: 'pull', size: 0.2, lengthMonths: null },
];
const MONEY: Money = {
  currency: 'EUR',
  marginPerUserMonth: { focal: 2, rival: 2 },
  discountRatePerYear: 0.1,
  months: null,
};

function makeDraws(count: number): DrawSet {
  const wave = (i: number, k: number) => Math.exp(SPREAD * Math.sin(1 + i * (k + 1.37)));
  const values = Array.from({ length: count }, (_, i) =>
    MIDDLE.map((middle, k) => middle * wave(i, k)),
  ).flat();
  return { errorModel: 'process-noise', columns: COLUMNS, count, values };
}

export function benchScenario(): void {
  const slider = prepareScenario(makeDraws(400), OPTIONS);
  const report = (name: string, text: string) => console.log(`${name.padEnd(58)} ${text}`);
  for (const [name, money] of [
    ['400 draws, three pushes, comparison', undefined],
    ['the same with money', MONEY],
  ] as const) {
    const times = Array.from({ length: REPEATS }, () => timeCall(() => slider.compare(PUSHES, money)));
    report(
      name,
      `${times.sort((a, b) => a - b)[REPEATS >> 1]!.toFixed(1)} ms (best ${times[0]!.toFixed(1)})`,
    );
  }
  const many = prepareScenario(makeDraws(1000), OPTIONS);
  const counter: PricedPush = { ...PUSH, firm: 1, startMonth: 4, lengthMonths: 12 };
  const question = {
    target: { firm: 1, share: 0.6, month: 24, chance: 0.8 } as const,
    counter,
    pushes: PUSHES,
  };
  const scale = { focalUsers: 3e5, rivalUsers: 2e5, horizonMonths: OPTIONS.horizonMonths };
  const response = { costPerRecruit: 5, mostPerMonth: 30_000 };
  const runs: [string, AnswerRun<unknown>][] = [
    ['smallest counter-push', findSmallestPush(many, question)],
    ['last useful month', findLastUsefulMonth(many, question)],
    ['chance map', mapChances(many, { ...question, ...chooseMapAxes(counter, question.target, scale) })],
    [
      'break-even spend',
      findBreakEven(many, { push: { ...counter, response }, pushes: PUSHES, money: MONEY }),
    ],
  ];
  for (const [name, run] of runs) {
    const slices: number[] = [];
    for (let isDone = false; !isDone; ) slices.push(timeCall(() => (isDone = run.next().done === true)));
    const total = slices.reduce((sum, one) => sum + one, 0);
    report(
      `1,000 draws, ${name}`,
      `${total.toFixed(0)} ms, longest slice ${Math.max(...slices).toFixed(1)} ms`,
    );
  }
}

function timeCall(call: () => void): number {
  const started = performance.now();
  call();
  return performance.now() - started;
}
