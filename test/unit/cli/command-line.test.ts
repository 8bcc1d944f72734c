/** The command as people run it: a process of its own. */
import { spawnSync } from 'node:child_process';
import { copyFileSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { EXIT_CODES, exitCodeOf } from '@/lib/cli/exit-codes';
import { errorJsonSchema, type ForecastJson, forecastJsonSchema } from '@/lib/cli/forecast-json';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';

const bin = resolve('lib/cli/elbowroom.mjs');
const ferry = resolve('seed/markets/ferry-passes.csv');
const folder = mkdtempSync(join(tmpdir(), 'elbowroom-cli-'));
afterAll(() => rmSync(folder, { recursive: true }));

/** Runs from a folder that is not the project's. */
function run(args: string[], options: { input?: string | Buffer; nodeArgs?: string[]; file?: string } = {}) {
  const { input, nodeArgs = [], file = bin } = options;
  const { status, stdout, stderr } = spawnSync(process.execPath, [...nodeArgs, file, ...args], {
    cwd: folder,
    input,
    encoding: 'utf8',
  });
  return { status, stdout, stderr };
}

const stackTrace = /\n\s+at |node:internal/;

test('help names the usage and every exit code', () => {
  const { status, stdout, stderr } = run(['--help']);
  expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
  for (const { code, id, meaning } of EXIT_CODES) {
    expect(stdout).toMatch(new RegExp(`^  ${code}  ${id} +${meaning.replaceAll('.', '\\.')}$`, 'm'));
  }
  expect(stdout).toContain(`${DEFAULT_FIT_OPTIONS.horizonMonths} if not given`);
});

test('the version is the package’s', () => {
  expect(run(['--version']).stdout).toBe(`${JSON.parse(readFileSync('package.json', 'utf8')).version}\n`);
});

describe('errors', () => {
  test('a word that is not understood: one sentence on standard error, nothing on standard output', () => {
    const { status, stdout, stderr } = run(['forecast', ferry, '--moths', '3']);
    expect(status).toBe(exitCodeOf('usage'));
    expect(stdout).toBe('');
    expect(stderr).toMatch(/^elbowroom: Unknown option '--moths'\. Usage: [^\n]+\n$/);
  });

  test('a bad file: each problem with its row, no stack trace', () => {
    const { status, stdout, stderr } = run(['forecast', '-'], {
      input: 'Month,A,B\n2024-01,1,2\n2024-02,x,3\nsoon,4,5\n',
    });
    expect(status).toBe(exitCodeOf('too-short'));
    expect(stdout).toBe('');
    expect(stderr).toContain('Row 3, column “A”');
    expect(stderr).toContain('Row 4, column “Month”');
    expect(stderr).not.toMatch(stackTrace);
  });

  test.each([
    ['usage', ['predict', '--json'], undefined],
    ['file-unreadable', ['forecast', 'none.csv', '--json'], undefined],
    ['data-unusable', ['forecast', '-', '--json'], Buffer.from([0x50, 0x4b, 3, 4, 0])],
  ] as const)('with --json %s is one object on standard output', (code, args, input) => {
    const { status, stdout, stderr } = run([...args], { input });
    expect(status).toBe(exitCodeOf(code));
    expect(stderr).toBe('');
    expect(stdout.trimEnd().split('\n')).toHaveLength(1);
    expect(errorJsonSchema.parse(JSON.parse(stdout)).error.code).toBe(code);
  });

  test('a Node that is too old is told so in one sentence', () => {
    const older =
      'data:text/javascript,Object.defineProperty(process,"versions",{value:{...process.versions,node:"18.20.0"}})';
    const { status, stdout, stderr } = run(['--help'], { nodeArgs: ['--import', older] });
    expect({ status, stdout }).toEqual({ status: exitCodeOf('internal'), stdout: '' });
    expect(stderr).toMatch(/^elbowroom: Node [\d.]+ or newer is needed, this is Node 18\.20\.0\.\n$/);
  });

  test('packages that are not installed are asked for in one sentence', () => {
    mkdirSync(join(folder, 'lib/cli'), { recursive: true });
    copyFileSync('package.json', join(folder, 'package.json'));
    copyFileSync(bin, join(folder, 'lib/cli/elbowroom.mjs'));
    const { status, stderr } = run(['--help'], { file: join(folder, 'lib/cli/elbowroom.mjs') });
    expect(status).toBe(exitCodeOf('internal'));
    expect(stderr).toMatch(/^elbowroom: its packages are not installed; run "npm ci" in [^\n]+ first\.\n$/);
  });
});

describe('a good file', () => {
  test('text: verdict, odds, bands, milestones, parameters, what the data cannot tell, cautions', () => {
    const { status, stdout, stderr } = run(['forecast', ferry, '--months', '6']);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(stdout).toMatch(/^Ostrel and Pelloway /);
    for (const title of [
      'Forecast',
      'Milestones',
      'Why',
      'What the data cannot tell',
      'Data',
      'Sampler',
      'Cautions',
    ]) {
      expect(stdout).toMatch(new RegExp(`^${title}`, 'm'));
    }
    expect(stdout.match(/^20\d\d-\d\d {2}/gm)).toHaveLength(6);
    expect(stdout).not.toMatch(/undefined|null|NaN|\[object/);
  });

  const runJson = (seed: string): ForecastJson => {
    const { status, stdout, stderr } = run(['forecast', ferry, '--months', '12', '--seed', seed, '--json']);
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(stdout.trimEnd().split('\n')).toHaveLength(1);
    return forecastJsonSchema.strict().parse(JSON.parse(stdout));
  };

  test('--json is one object of the documented shape, the same for the same seed', {
    timeout: 60_000,
  }, () => {
    const found = runJson('7');
    const sum = Object.values(found.odds).reduce((total, chance) => total + chance, 0);
    expect(Math.abs(sum - 1)).toBeLessThan(1e-9); // rounding of four shares of draws
    expect([found.focal, found.rival, found.seed]).toEqual(['Ostrel', 'Pelloway', 7]);
    expect(found.series.months.at(-1)).toBe('2025-09');
    expect(found.series.focal).toHaveLength(48);
    expect(found.forecast.months).toEqual(
      Array.from({ length: 12 }, (_, i) =>
        i < 3 ? `2025-${10 + i}` : `2026-${String(i - 2).padStart(2, '0')}`,
      ),
    );
    for (const { q05, q25, q50, q75, q95 } of [
      found.forecast.focal,
      found.forecast.rival,
      found.forecast.share,
    ]) {
      const rows = q05.map((low, month) => [low, q25[month], q50[month], q75[month], q95[month]]);
      expect(rows).toHaveLength(12);
      for (const row of rows) expect(row).toEqual([...row].sort((a, b) => a - b));
    }
    for (const { median, q05, q95 } of Object.values(found.parameters)) {
      expect(q05).toBeLessThan(median);
      expect(median).toBeLessThan(q95);
    }
    expect({ ...runJson('7'), milliseconds: 0 }).toEqual({ ...found, milliseconds: 0 });
    expect(runJson('8').forecast).not.toEqual(found.forecast);
  });
});
