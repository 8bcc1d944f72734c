/** A path of this app from an untrusted value; the front page when it would lead anywhere else. */
export function readSafePath(value: unknown): string {
  if (typeof value !== 'string' || !/^\/(?![/\\])/.test(value)) return '/';
  try {
    const base = 'http://app.invalid';
    const url = new URL(value, base);
    return url.origin === base ? `${url.pathname}${url.search}` : '/';
  } catch {
    return '/';
  }
}
