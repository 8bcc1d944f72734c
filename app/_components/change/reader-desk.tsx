'use client';

/** The desk on the frozen draws of a forecast link. */
import type { PhaseMap } from '@/lib/brief/types';
import type { Trial } from '@/lib/scenario/trial-draws';
import { ScenarioDesk } from './scenario-desk';
import { usePrepared } from './use-comparison';

export function ReaderDesk({ trial, phaseMap }: { trial: Trial; phaseMap: PhaseMap }) {
  const prepared = usePrepared(trial.draws, trial.horizonMonths, trial.seed);
  return <ScenarioDesk prepared={prepared} phaseMap={phaseMap} waiting={null} />;
}
