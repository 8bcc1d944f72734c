/**
 * Points on separatrices computed elsewhere (scipy DOP853 backwards from the saddle, five of them again by forward bisection; see
 * `test/reference/data/README.md`), printed to ten digits.
 */
import { describe, expect, it } from 'vitest';
import { separatrixHeight, sideOfSeparatrix, traceSeparatrix } from '@/lib/dynamics/separatrix';
import { findSystem, readReferenceFile } from './read-cases';

const file = readReferenceFile();
/** Ten printed digits of numbers below 1000. */
const PRINTED = 6e-11;
const SIDE_GAP = 1e-7;

describe.each(file.separatrices)('$case', ({ case: id, N1_N2_on_separatrix: points }) => {
  const system = findSystem(file, id);

  it('has the tabled heights', () => {
    for (const [n1, n2] of points) {
      expect(Math.abs(separatrixHeight(system, n1)! - n2)).toBeLessThan(PRINTED * Math.max(10, n2));
    }
  });

  it('parts the starts from which firm 1 and firm 2 win', () => {
    for (const [n1, n2] of points) {
      expect(sideOfSeparatrix(system, [n1, n2 * (1 - SIDE_GAP)])).toBe('firstWins');
      expect(sideOfSeparatrix(system, [n1, n2 * (1 + SIDE_GAP)])).toBe('secondWins');
    }
  });
});

describe('strogatz_6_4', () => {
  it('has slope 1/sqrt 2 at the saddle', () => {
    const trace = traceSeparatrix(findSystem(file, 'strogatz_6_4'), { n1Max: 3, n2Max: 3 });
    if (trace.status !== 'traced') throw new Error('the head start decides here');
    for (const users of trace.saddle) expect(users).toBeCloseTo(1, 14);
    const system = findSystem(file, 'strogatz_6_4');
    const slope = (separatrixHeight(system, 1.001)! - separatrixHeight(system, 0.999)!) / 0.002;
    // A central difference of 0.001: curvature enters at 1e-6.
    expect(Math.abs(slope - Math.SQRT1_2)).toBeLessThan(1e-6);
  });
});
