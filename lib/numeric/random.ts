/**
 * Seeded random streams. One generator (xoroshiro128+, Blackman & Vigna 2018, by pure-rand), one stream per task:
 * stream k is the seed's sequence moved on by k jumps of 2^64 draws, so streams never overlap and the numbers do not depend on
 * how many workers share the tasks or in which order they run.
 */
import { xoroshiro128plusFromState } from 'pure-rand/generator/xoroshiro128plus';

export interface RandomStream {
  /** Uniform on the open interval (0, 1), 53 bits. */
  uniform(): number;
  /** Standard normal. */
  normal(): number;
  /** Uniform integer in 0 .. n-1. */
  integer(n: number): number;
}

const TWO_POW_32 = 4294967296;
const TWO_POW_MINUS_53 = 2 ** -53;
const HIGH_BITS = 0x7ffffff; // 27 bits
const LOW_BITS = 0x3ffffff; // 26 bits

/**
 * Stream number `stream` of `seed`.
 * @param seed non-negative integer, at most 2^53 - 1
 * @param stream non-negative integer; costs one jump (about a microsecond) each
 * @throws RangeError when either is not such an integer
 */
export function createStream(seed: number, stream: number): RandomStream {
  requireNaturalNumber('seed', seed);
  requireNaturalNumber('stream', stream);
  const generator = xoroshiro128plusFromState(spreadSeed(seed));
  for (let i = 0; i < stream; i++) generator.jump();

  const uniform = () => {
    const high = generator.next() & HIGH_BITS;
    const low = generator.next() & LOW_BITS;
    return (high * 67108864 + low + 0.5) * TWO_POW_MINUS_53;
  };
  let spare = Number.NaN;
  /** Polar method (Marsaglia & Bray 1964): two normals at a time, no trigonometry. */
  const normal = () => {
    if (!Number.isNaN(spare)) {
      const kept = spare;
      spare = Number.NaN;
      return kept;
    }
    for (;;) {
      const u = 2 * uniform() - 1;
      const v = 2 * uniform() - 1;
      const s = u * u + v * v;
      if (s < 1 && s > 0) {
        const factor = Math.sqrt((-2 * Math.log(s)) / s);
        spare = v * factor;
        return u * factor;
      }
    }
  };
  return { uniform, normal, integer: (n) => Math.floor(uniform() * n) };
}

function requireNaturalNumber(name: string, value: number): void {
  if (!(Number.isSafeInteger(value) && value >= 0)) {
    throw new RangeError(`${name} must be a non-negative integer, got ${value}`);
  }
}

/** Four well-mixed 32-bit words from one seed (splitmix32 with the murmur3 finaliser), so that neighbouring seeds share nothing. */
function spreadSeed(seed: number): number[] {
  let state = (seed | 0) ^ Math.imul(Math.floor(seed / TWO_POW_32), 0x85ebca6b);
  const nextWord = () => {
    state = (state + 0x9e3779b9) | 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return z ^ (z >>> 16);
  };
  const words = [nextWord(), nextWord(), nextWord(), nextWord()];
  return words.some((word) => word !== 0) ? words : [1, 2, 3, 4];
}
