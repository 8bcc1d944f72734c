/**
 * The address that tries are counted for. The web server adds the header when no proxy did; behind a proxy the last
 * entry is the one that the proxy itself saw. A visitor who reaches the server directly can invent it, which is why
 * sign-in counts tries for each account as well.
 */
const FORWARDED_FOR = 'x-forwarded-for';
const UNKNOWN = 'unknown';

export function readClientAddress(headers: Headers): string {
  const last = headers.get(FORWARDED_FOR)?.split(',').at(-1)?.trim();
  return last || UNKNOWN;
}
