import { expect, it } from 'vitest';
import { makeReadable } from '@/prisma/launch/readable-line.mjs';

it('shows the message of a log entry and the first line of its error', () => {
  expect(makeReadable('{"level":40,"time":1,"msg":"fits taken back"}')).toBe('fits taken back');
  expect(makeReadable('{"level":50,"err":{"message":"no such table\\nline 2"},"msg":"queue error"}')).toBe(
    'queue error: no such table',
  );
});

it('leaves every other line as it is', () => {
  for (const line of ['', 'Ready', '{ half', '{"a":1}', '{}', '[1]', 'null'])
    expect(makeReadable(line)).toBe(line);
});
