/** Values of an option written as "key=value,key=value", read one by one; the first that is wrong is the reason. */

export class KeyValueError extends Error {}

/** @throws KeyValueError for what is no list of pairs, for a key twice, or for a key that is not known */
export function splitKeyValues(text: string, known: readonly string[]): Map<string, string> {
  const values = new Map<string, string>();
  for (const pair of text.split(',')) {
    const equals = pair.indexOf('=');
    const key = (equals < 0 ? pair : pair.slice(0, equals)).trim();
    if (!known.includes(key)) throw new KeyValueError(`There is no “${key}”; there is ${known.join(', ')}.`);
    if (equals < 0) throw new KeyValueError(`“${key}” needs a value: ${key}=...`);
    if (values.has(key)) throw new KeyValueError(`“${key}” stands there twice.`);
    values.set(key, pair.slice(equals + 1).trim());
  }
  return values;
}

/** "0.2" or "20%". */
export function readFraction(key: string, text: string): number {
  return text.endsWith('%') ? readNumber(key, text.slice(0, -1)) / 100 : readNumber(key, text);
}

export function readNumber(key: string, text: string): number {
  const value = text.trim() === '' ? Number.NaN : Number(text);
  if (!Number.isFinite(value)) throw new KeyValueError(`“${key}” takes a number, not “${text}”.`);
  return value;
}

export function readChoice<T extends string>(key: string, text: string, choices: readonly T[]): T {
  const found = choices.find((choice) => choice === text);
  if (found === undefined) throw new KeyValueError(`“${key}” takes ${choices.join(', ')}, not “${text}”.`);
  return found;
}

/** @throws KeyValueError when the key is missing and there is nothing to put in its place */
export function need(values: Map<string, string>, key: string): string {
  const value = values.get(key);
  if (value === undefined) throw new KeyValueError(`“${key}” is missing.`);
  return value;
}
