import { mkdtempSync, readFileSync, rmSync, statSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { AppError } from '@/lib/services/app-error';
import { readAuthSecret } from '@/lib/services/auth-secret';
import { readSettings } from '@/lib/services/env';

describe('settings', () => {
  it('an empty environment gives an app on this machine', () => {
    expect(readSettings({})).toEqual({
      appUrl: 'http://localhost:3000',
      isHttps: false,
      authSecret: null,
      dataFolder: '.data',
    });
  });

  it('a blank variable counts as unset', () => {
    expect(readSettings({ APP_URL: '', PORT: ' ', AUTH_SECRET: '' })).toEqual(readSettings({}));
  });

  it('the address is the origin alone, and the port counts only without an address', () => {
    expect(readSettings({ PORT: '8080' }).appUrl).toBe('http://localhost:8080');
    const settings = readSettings({ APP_URL: 'https://forecast.example.org/some/path', PORT: '8080' });
    expect(settings).toMatchObject({ appUrl: 'https://forecast.example.org', isHttps: true });
  });

  it.each([
    ['APP_URL', 'forecast.example.org'],
    ['APP_URL', 'ftp://forecast.example.org'],
    ['PORT', '0'],
    ['PORT', 'http'],
    ['AUTH_SECRET', 'short'],
  ])('%s = %s is refused by name', (name, value) => {
    const read = () => readSettings({ [name]: value });
    expect(read).toThrow(AppError);
    expect(read).toThrow(name);
  });

  it('the value of a refused secret stays out of the message', () => {
    expect(() => readSettings({ AUTH_SECRET: 'hush-hush' })).toThrow(
      expect.objectContaining({ message: expect.not.stringContaining('hush-hush') }),
    );
  });
});

describe('the secret of the session cookies', () => {
  let folder: string;
  beforeEach(() => {
    folder = join(mkdtempSync(join(tmpdir(), 'elbowroom-secret-')), 'data');
  });
  afterEach(() => {
    rmSync(join(folder, '..'), { recursive: true });
  });

  it('is made once, kept, and readable by its owner only', () => {
    const settings = { ...readSettings({}), dataFolder: folder };
    const secret = readAuthSecret(settings);
    expect(secret.length).toBeGreaterThanOrEqual(43);
    expect(readAuthSecret(settings)).toBe(secret);
    const path = join(folder, 'auth-secret');
    expect(readFileSync(path, 'utf8').trim()).toBe(secret);
    expect(statSync(path).mode & 0o777).toBe(0o600);
  });

  it('is the one of the environment where there is one', () => {
    const AUTH_SECRET = 'a'.repeat(40);
    expect(readAuthSecret({ ...readSettings({ AUTH_SECRET }), dataFolder: folder })).toBe(AUTH_SECRET);
  });

  it('that cannot be kept is an error that names the variable', () => {
    const settings = { ...readSettings({}), dataFolder: '/dev/null/data' };
    expect(() => readAuthSecret(settings)).toThrow('AUTH_SECRET');
  });
});
