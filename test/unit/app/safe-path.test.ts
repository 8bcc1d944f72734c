/** Where a sign-in may lead: only to a path of this app. */
import { describe, expect, it } from 'vitest';
import { readSafePath } from '@/app/_lib/safe-path';

describe('readSafePath', () => {
  it.each(['/', '/markets/abc', '/markets/abc/data?tab=1'])('keeps the path %s of this app', (path) => {
    expect(readSafePath(path)).toBe(path);
  });

  it.each([
    ['another host', 'https://evil.example/'],
    ['a host without a scheme', '//evil.example/'],
    ['a host behind a backslash', '/\\evil.example/'],
    ['a tab that a browser drops before the host', '/\t/evil.example'],
    ['a script', 'javascript:alert(1)'],
    ['a relative path', 'markets'],
    ['nothing', ''],
    ['no text at all', undefined],
    ['several values', ['/markets', '/members']],
  ])('leads to the front page instead of %s', (_, value) => {
    expect(readSafePath(value)).toBe('/');
  });
});
