/** `elbowroom scenario` as people run it, on a demo market. */
import { spawnSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { afterAll, describe, expect, test } from 'vitest';
import { readArguments } from '@/lib/cli/arguments';
import { exitCodeOf } from '@/lib/cli/exit-codes';
import { errorJsonSchema } from '@/lib/cli/forecast-json';
import { scenarioOutputSchema } from '@/lib/cli/scenario-output';
import { writeScenario } from '@/lib/scenario/scenario-json';

const bin = resolve('lib/cli/elbowroom.mjs');
const ferry = resolve('seed/markets/ferry-passes.csv');
const folder = mkdtempSync(join(tmpdir(), 'elbowroom-cli-'));
afterAll(() => rmSync(folder, { recursive: true }));

const PUSH = 'firm=rival,kind=recruits,start=2,length=6,size=5000,carry-over=2';

function run(...args: string[]) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [bin, 'scenario', ferry, ...args], {
    cwd: folder,
    encoding: 'utf8',
  });
  return { status, stdout, stderr };
}

function fileOf(name: string, content: string): string {
  const file = join(folder, name);
  writeFileSync(file, content);
  return file;
}

const written = fileOf(
  'answer.json',
  writeScenario({
    name: 'Our answer',
    pushes: [
      {
        firm: 1,
        kind: 'growth-lift',
        startMonth: 3,
        lengthMonths: 9,
        size: 0.4,
        rampMonths: 1,
        carryOverHalfLifeMonths: 2,
        spendPerMonth: 10_000,
      },
    ],
    money: {
      currency: 'EUR',
      marginPerUserMonth: { focal: 2, rival: null },
      discountRatePerYear: 0.1,
      months: null,
    },
  }),
);

describe('the words of the command', () => {
  const refusal = (...args: string[]) => {
    const command = readArguments(args);
    return command.kind === 'not-understood' ? command.reason : command.kind;
  };

  test('pushes and written scenarios are taken together, in their order', () => {
    const command = readArguments([
      'scenario',
      'a.csv',
      '--push',
      PUSH,
      '--scenario',
      'b.json',
      '--push',
      PUSH,
    ]);
    if (command.kind !== 'scenario') throw new Error(JSON.stringify(command));
    expect(command.request.pushes).toHaveLength(2);
    expect(command.request).toMatchObject({ scenarioFiles: ['b.json'], money: null, question: null });
  });

  test.each([
    [['scenario', 'a.csv'], 'Say what is pushed'],
    [['scenario'], 'Name a file: elbowroom scenario FILE'],
    [['forecast', 'a.csv', '--push', PUSH], '--push belongs to the command “scenario”'],
    [['scenario', 'a.csv', '--push', 'firm=rival'], '--push: “kind” is missing'],
    [['scenario', 'a.csv', '--push', PUSH, '--keep', 'share=1,month=2,chance=3'], '--keep and --counter go'],
    [
      [
        'scenario',
        'a.csv',
        '--push',
        PUSH,
        '--keep',
        'share=.4,month=61,chance=.8',
        '--counter',
        'kind=pull,length=3',
      ],
      'at most 60',
    ],
    [
      ['scenario', 'a.csv', '--push', PUSH, '--keep', 'share=.4,month=9,chance=.8', '--counter', 'kind=pull'],
      '--counter: “length” is missing',
    ],
    [['scenario', 'a.csv', ...Array(5).fill(['--scenario', 'b.json']).flat()], 'At most 4 scenarios'],
    [['scenario', 'a.csv', ...Array(13).fill(['--push', PUSH]).flat()], 'At most 12 pushes'],
  ])('%j is refused', (args, part) => {
    expect(refusal(...(args as string[]))).toContain(part);
  });
});

describe('a scenario of a file', () => {
  test('text: verdict, path, odds, differences, answers', { timeout: 60_000 }, () => {
    const { status, stdout, stderr } = run(
      ...[
        '--push',
        PUSH,
        '--keep',
        'share=40%,month=24,chance=80%',
        '--counter',
        'kind=growth-lift,length=9',
      ],
      ...['--money', 'currency=EUR,margin=2'],
    );
    expect({ status, stderr }).toEqual({ status: 0, stderr: '' });
    expect(stdout).toMatch(/^Pushes\n- Pelloway: recruits, 5,000 a month from Nov 2025 for 6 months/);
    expect(stdout).toContain('to move the path, not the');
    for (const title of [
      'Odds before and after',
      'Difference to no push',
      'Money',
      'Smallest counter-push',
      'Last useful month',
      'Break-even spend',
      'Cautions',
    ]) {
      expect(stdout).toMatch(new RegExp(`^${title}$`, 'm'));
    }
    expect(stdout).not.toMatch(/undefined|null|NaN|\[object/);
    expect(Math.max(...stdout.split('\n').map((line) => line.length))).toBeLessThan(140);
  });

  test('several side by side, as one table', { timeout: 60_000 }, () => {
    const { status, stdout } = run('--push', PUSH, '--scenario', written);
    expect(status).toBe(0);
    expect(stdout).toMatch(/^Scenarios side by side$/m);
    expect(stdout).toMatch(/No push +Pushes +Our answer/);
  });

  test('--json is one object of the documented shape, the same for the same seed', {
    timeout: 60_000,
  }, () => {
    const once = run('--scenario', written, '--json', '--months', '12', '--seed', '5');
    expect({ status: once.status, stderr: once.stderr }).toEqual({ status: 0, stderr: '' });
    expect(once.stdout.trimEnd().split('\n')).toHaveLength(1);
    const output = scenarioOutputSchema.strict().parse(JSON.parse(once.stdout));
    const [scenario] = output.scenarios;
    expect(scenario!.name).toBe('Our answer');
    expect(scenario!.comparison.money!.focal.spend).toBeGreaterThan(0);
    expect(output.months).toHaveLength(12);
    expect(scenario!.verdict).toMatch(/^It is /);
    expect(run('--scenario', written, '--json', '--months', '12', '--seed', '5').stdout).toBe(once.stdout);
  });

  test.each([
    ['bad-scenario', 'no-json.json', 'name: A', 'is not JSON'],
    ['bad-scenario', 'later.json', '{"version": 9}', 'later release (version 9)'],
    ['bad-scenario', 'none.json', '{"version": 1, "name": "A", "pushes": [{"firm": 3}]}', 'pushes.0.firm'],
  ] as const)('%s: %s is told in one sentence, before the fit', (id, name, content, part) => {
    const { status, stdout, stderr } = run('--scenario', fileOf(name, content));
    expect({ status, stdout }).toEqual({ status: exitCodeOf(id), stdout: '' });
    expect(stderr).toContain(part);
    expect(stderr.trimEnd().split('\n')).toHaveLength(1);
  });

  test('a written scenario that is not there is one object with --json', () => {
    const { status, stdout } = run('--scenario', 'gone.json', '--json');
    expect(status).toBe(exitCodeOf('file-unreadable'));
    expect(errorJsonSchema.parse(JSON.parse(stdout)).error.message).toBe('There is no file gone.json.');
  });
});
