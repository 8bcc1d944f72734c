/** Sizes and sums that people can write down: three significant digits, at most 1 % from the exact value. */
const DIGITS = 3;

export function roundUpToThreeDigits(value: number): number {
  return roundDigits(value, (steps) => Math.ceil(steps * (1 - 1e-12)));
}

export function roundDownToThreeDigits(value: number): number {
  return roundDigits(value, (steps) => Math.floor(steps * (1 + 1e-12)));
}

/** Divided by a whole power of ten, never multiplied by a broken one, so that 0.124 comes out as it is written. */
function roundDigits(value: number, round: (steps: number) => number): number {
  if (!(value > 0)) return 0;
  const exponent = Math.floor(Math.log10(value)) - (DIGITS - 1);
  if (exponent >= 0) return round(value / 10 ** exponent) * 10 ** exponent;
  return round(value * 10 ** -exponent) / 10 ** -exponent;
}
