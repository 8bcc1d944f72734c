/**
 * Reads `test/reference/data/reference_cases.json`: textbook systems, exact trajectories, points on separatrices. The file writes the system per
 * user, dN1/dt = r1 N1 (1 - (N1 + a12 N2)/K1); here it is turned into alpha = a12 K2/K1 and beta = a21 K1/K2.
 */
import { readFileSync } from 'node:fs';
import type { Outcome } from '@/lib/dynamics/outcome';
import type { CompetitionSystem } from '@/lib/dynamics/system';

interface PublishedPoint {
  N: [number, number];
  eigenvalues?: [number, number];
  feasible?: boolean;
}

export interface TextbookCase {
  id: string;
  source: string;
  params: { r1: number; K1: number; a12: number; r2: number; K2: number; a21: number };
  A12: number;
  A21: number;
  verdict: 'coexistence' | 'tipping' | 'firm1_wins' | 'firm2_wins' | 'boundary';
  equilibria: PublishedPoint[];
  interior?: PublishedPoint;
}

export interface ReferenceFile {
  cases: TextbookCase[];
  trajectories: { case: string; N0: [number, number]; t_N1_N2: [number, number, number][] }[];
  separatrices: { case: string; N1_N2_on_separatrix: [number, number][] }[];
}

/** The verdicts of the file in the words of this project. */
export const OUTCOME_OF_VERDICT: Readonly<Record<TextbookCase['verdict'], Outcome>> = {
  coexistence: 'coexistence',
  tipping: 'headStartDecides',
  firm1_wins: 'exclusionByFirst',
  firm2_wins: 'exclusionBySecond',
  boundary: 'boundary',
};

export function readReferenceFile(): ReferenceFile {
  return JSON.parse(readFileSync(new URL('../data/reference_cases.json', import.meta.url), 'utf8'));
}

export function toSystem({ r1, K1, a12, r2, K2, a21 }: TextbookCase['params']): CompetitionSystem {
  return { r1, r2, k1: K1, k2: K2, alpha: (a12 * K2) / K1, beta: (a21 * K1) / K2 };
}

/** The system of a case by its id. */
export function findSystem(file: ReferenceFile, id: string): CompetitionSystem {
  return toSystem(file.cases.find((textbookCase) => textbookCase.id === id)!.params);
}
