/**
 * Which single system the phase map draws: the best fit; or, when the best fit stands for another outcome than the decided one and the
 * posterior medians stand for it, the medians. The map must not contradict the verdict where it can be helped.
 */
import { type Outcome as ClassifiedOutcome, classifyOutcome } from '../dynamics/outcome';
import type { CompetitionSystem, State } from '../dynamics/system';
import { decideOutcome } from '../forecast/odds';
import type { Outcome } from '../forecast/outcomes';
import type { FitReport } from '../forecast/report';

export type MapOutcome = Outcome | 'boundary';

export interface MapSystem {
  system: CompetitionSystem;
  outcome: MapOutcome;
  /** Users at the last observed month on this system's path. */
  start: State;
  source: 'best-fit' | 'medians';
}

const NAMES: Record<ClassifiedOutcome, MapOutcome> = {
  coexistence: 'coexistence',
  exclusionByFirst: 'exclusionByFocal',
  exclusionBySecond: 'exclusionByRival',
  headStartDecides: 'headStartDecides',
  boundary: 'boundary',
};

export function chooseMapSystem(report: FitReport): MapSystem {
  const decided = decideOutcome(report.outlook.odds);
  const best = bestFit(report);
  if (decided === null || best.outcome === decided) return best;
  const medians = medianSystem(report);
  return medians?.outcome === decided ? medians : best;
}

function bestFit(report: FitReport): MapSystem {
  const { r1, r2, k1, k2, alpha, beta, n1Last, n2Last } = report.point;
  const system = { r1, r2, k1, k2, alpha, beta };
  return { system, outcome: NAMES[classifyOutcome(system)], start: [n1Last, n2Last], source: 'best-fit' };
}

function medianSystem(report: FitReport): MapSystem | null {
  const median = (id: string) => report.parameters.find((row) => row.id === id)?.posterior.q50;
  const system: Partial<CompetitionSystem> = {};
  for (const id of ['r1', 'r2', 'k1', 'k2', 'alpha', 'beta'] as const) system[id] = median(id);
  const focal = report.history.focal.at(-1)?.q50;
  const rival = report.history.rival.at(-1)?.q50;
  if (focal === undefined || rival === undefined) return null;
  if (Object.values(system).some((value) => value === undefined)) return null;
  const whole = system as CompetitionSystem;
  return { system: whole, outcome: NAMES[classifyOutcome(whole)], start: [focal, rival], source: 'medians' };
}
