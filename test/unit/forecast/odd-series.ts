/** Series that no market makes and that a tool may be given all the same, and a driver that minds how long a slice takes. */
import fc from 'fast-check';
import type { MonthlySeries } from '@/lib/series/types';
import { FIRST_MONTH } from '../estimate/simulated-market';

type Counts = (number | null)[];

const months = (count: number, of: (t: number) => number | null): Counts =>
  Array.from({ length: count }, (_, t) => of(t));
/** Some 3 % of scatter without a random number. */
const shaken = (t: number) => 1 + 0.03 * Math.sin(7.3 * t * t);
const name = (title: string, focal: Counts, rival: Counts): [string, MonthlySeries] => [
  title,
  { firstMonth: FIRST_MONTH, focal, rival },
];

const bending = months(36, (t) => Math.round((1e5 / (1 + 9 * Math.exp(-0.2 * t))) * shaken(t + 50)));

export const ODD_SERIES: [string, MonthlySeries][] = [
  name(
    'a firm only falls',
    months(36, (t) => Math.round(1e5 * 0.93 ** t * shaken(t))),
    bending,
  ),
  name(
    'both firms only fall',
    months(30, (t) => 1e5 * 0.9 ** t * shaken(t)),
    months(30, (t) => 8e4 * 0.95 ** t * shaken(t + 9)),
  ),
  name(
    'one firm constant',
    months(24, (t) => 100 + 3 * t + (t % 2)),
    months(24, () => 50),
  ),
  name(
    'tiny counts',
    months(24, (t) => 1e-9 * (8 + t)),
    months(24, (t) => 1e-9 * (50 - t)),
  ),
  name(
    'tiny whole numbers',
    months(24, (t) => 1 + ((t * 7) % 3)),
    months(24, (t) => 2 + ((t * 5) % 4)),
  ),
  name(
    'huge counts',
    months(24, (t) => 1e14 * (8 + t)),
    months(24, (t) => 1e14 * (50 - t)),
  ),
  name(
    'white noise',
    months(24, (t) => 1 + ((t * 7919) % 1000)),
    months(24, (t) => 1 + ((t * 104729) % 1000)),
  ),
  name(
    'exact exponentials',
    months(24, (t) => 10 * 1.2 ** t),
    months(24, (t) => 10 * 1.2 ** t),
  ),
  name(
    'a jump of three orders',
    months(24, (t) => (t < 12 ? 10 : 1e4)),
    months(24, (t) => 100 + 7 * t),
  ),
  name(
    'one firm dies',
    months(24, (t) => (t < 18 ? 100 + t : 0)),
    months(24, (t) => 100 + 5 * t),
  ),
  name(
    'launch in the last month',
    months(24, (t) => (t < 23 ? 0 : 5)),
    months(24, (t) => 100 + 5 * t),
  ),
  name(
    'every other month missing',
    months(30, (t) => (t % 2 ? null : 100 + t)),
    months(30, (t) => 90 + t),
  ),
];

const anyCounts = fc.array(
  fc.oneof(
    { weight: 6, arbitrary: fc.integer({ min: 1, max: 1_000_000 }) },
    { weight: 1, arbitrary: fc.constantFrom<number | null>(0, null, 1, 1e15, 0.001) },
  ),
  { minLength: 13, maxLength: 20 },
);

/** 13 to 20 months of anything, some of it no count at all. */
export const anySeries: fc.Arbitrary<MonthlySeries> = fc.tuple(anyCounts, anyCounts).map(([a, b]) => {
  const count = Math.min(a.length, b.length);
  return { firstMonth: FIRST_MONTH, focal: a.slice(0, count), rival: b.slice(0, count) };
});

/**
 * Seconds of processor that one slice may take: a worker that is silent for 8 s loses its claim, and it may share its processor with three
 * others.
 */
const LONGEST_SLICE = 1.5;

/** Drives a run to its end. @throws when a slice takes longer than a worker may be silent */
export function driveInSlices<Step extends { done: boolean }>(run: {
  next(): Step;
}): Extract<Step, { done: true }> {
  for (;;) {
    const before = process.cpuUsage();
    const step = run.next();
    const { user, system } = process.cpuUsage(before);
    const seconds = (user + system) / 1e6;
    if (!(seconds < LONGEST_SLICE)) throw new Error(`a slice took ${seconds} s`);
    if (step.done) return step as Extract<Step, { done: true }>;
  }
}
