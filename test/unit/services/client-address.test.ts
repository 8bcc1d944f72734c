import { expect, it } from 'vitest';
import { readClientAddress } from '@/lib/services/client-address';

const addressOf = (value?: string) =>
  readClientAddress(new Headers(value === undefined ? {} : { 'x-forwarded-for': value }));

it('the last forwarded address counts: the ones before are what the visitor says', () => {
  expect(addressOf('203.0.113.9')).toBe('203.0.113.9');
  expect(addressOf('198.51.100.1, 203.0.113.9')).toBe('203.0.113.9');
  expect(addressOf('198.51.100.1,2001:db8::7')).toBe('2001:db8::7');
});

it('without a forwarded address all visitors share one count', () => {
  expect(addressOf()).toBe('unknown');
  expect(addressOf('')).toBe('unknown');
  expect(addressOf('203.0.113.9, ')).toBe('unknown');
});
