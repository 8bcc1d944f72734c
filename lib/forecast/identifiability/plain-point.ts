/** A plain fit as a point in the parameters of its problem (`plain-problem.ts`), for whatever goes on from there. */
import type { PlainFit } from '../../estimate/plain-fit';

export function toPlainTheta({ estimates }: PlainFit, [s1, s2]: readonly [number, number]): Float64Array {
  const { r1, r2, n1Start, n2Start, b11, b12, b21, b22 } = estimates;
  return Float64Array.of(
    Math.log(r1),
    Math.log(r2),
    Math.log(n1Start / s1),
    Math.log(n2Start / s2),
    b11 * s1,
    b12 * s2,
    b21 * s1,
    b22 * s2,
  );
}
