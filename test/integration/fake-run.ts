/**
 * Stand-ins for the engine: runs with a chosen number of slices, whose end is one of the samples. They let a test stop,
 * cancel or kill a worker at a known place, which the speed of the real engine would not.
 */
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';
import { ENGINE_VERSION } from '@/lib/estimate/engine-version';
import type { DrawSet, FitInput, FitProgress } from '@/lib/estimate/types';
import type { OutlookRun, OutlookStep } from '@/lib/forecast/outlook-run';
import type { FitReport } from '@/lib/forecast/report';
import { makeSample } from '../unit/brief/sample-report';

export interface FakeOptions {
  slices: number;
  /** How long a slice keeps the processor, as a slice of the engine does. */
  sliceMilliseconds?: number;
  /** Called before each slice with its number, from 1. */
  onSlice?: (slice: number) => void;
  /** What the run ends with; absent: the sample. */
  end?: () => OutlookStep;
}

/** Month-to-month shocks of the level, sd of ln users; the sample itself has none. */
const NOISE = 0.02;

/** The sample's result as this version of the engine would have made it, under the error model that the app asks for. */
export function sampleResult(): { report: FitReport; draws: DrawSet } {
  const { facts, draws } = makeSample('coexistence');
  const { errorModel } = DEFAULT_FIT_OPTIONS;
  return {
    report: { ...facts.report, engineVersion: ENGINE_VERSION, errorModel },
    draws: { ...addColumns(draws, ['noise1', 'noise2'], NOISE), errorModel },
  };
}

function addColumns(draws: DrawSet, names: string[], value: number): DrawSet {
  const width = draws.columns.length;
  const rows = Array.from({ length: draws.count }, (_, i) => [
    ...draws.values.slice(i * width, (i + 1) * width),
    ...names.map(() => value),
  ]);
  return { ...draws, columns: [...draws.columns, ...names], values: rows.flat() };
}

export function createFakeRun({
  slices,
  sliceMilliseconds = 0,
  onSlice,
  end,
}: FakeOptions): (input: FitInput) => OutlookRun {
  return () => {
    let slice = 0;
    return {
      next() {
        slice += 1;
        onSlice?.(slice);
        const until = performance.now() + sliceMilliseconds;
        while (performance.now() < until);
        if (slice <= slices) return { done: false, progress: progressAfter(slice, slices) };
        return end ? end() : { done: true, ...sampleResult() };
      },
    };
  };
}

function progressAfter(slice: number, slices: number): FitProgress {
  return {
    stage: 'sampling',
    startsDone: 12,
    startsTotal: 12,
    bestValue: 31.5,
    drawsKept: slice,
    drawsTarget: slices,
    rHat: null,
    ess: null,
  };
}
