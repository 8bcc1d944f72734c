import { expect, test } from 'vitest';
import { MAX_HORIZON_MONTHS, MAX_SEED, readArguments, wantsJson } from '@/lib/cli/arguments';
import { DEFAULT_FIT_OPTIONS } from '@/lib/estimate/defaults';

const understood = (line: string[]) => {
  const command = readArguments(line);
  if (command.kind !== 'forecast') throw new Error(JSON.stringify(command));
  return command.request;
};

test('a file alone takes every default', () => {
  expect(understood(['forecast', 'a.csv'])).toEqual({
    file: 'a.csv',
    columns: null,
    sheet: null,
    firms: null,
    aggregation: undefined,
    decimalMark: undefined,
    dateOrder: undefined,
    horizonMonths: DEFAULT_FIT_OPTIONS.horizonMonths,
    seed: DEFAULT_FIT_OPTIONS.seed,
  });
  expect(DEFAULT_FIT_OPTIONS.horizonMonths).toBe(24);
});

test('every option is read, wherever it stands', () => {
  const line = [
    '--seed=7',
    'forecast',
    '--months',
    '36',
    'a.csv',
    '--columns',
    'Month, Our firm,"Tarn, Ltd"',
    '--json',
  ];
  expect(understood(line)).toMatchObject({
    file: 'a.csv',
    columns: ['Month', 'Our firm', 'Tarn, Ltd'],
    horizonMonths: 36,
    seed: 7,
  });
  expect(understood(['forecast', '-', '--decimal-mark', 'comma', '--date-order', 'day-first'])).toMatchObject(
    {
      file: '-',
      decimalMark: 'comma',
      dateOrder: 'day-first',
    },
  );
});

test('a sheet, firms and the way to months are read', () => {
  const line = [
    'forecast',
    'a.xlsx',
    '--sheet',
    'Users',
    '--firms',
    '"Tarn, Ltd",Ours',
    '--aggregate',
    'last',
  ];
  expect(understood(line)).toMatchObject({
    sheet: 'Users',
    firms: ['Tarn, Ltd', 'Ours'],
    aggregation: 'last',
  });
});

test.each([[['--help']], [['-h']], [['help']], [['forecast', '--help']]])('%j asks for help', (line) => {
  expect(readArguments(line)).toEqual({ kind: 'help' });
});

test.each([
  [[], 'Say what to do'],
  [['predict', 'a.csv'], 'There is no command “predict”'],
  [['forecast'], 'Name a file'],
  [['forecast', 'a.csv', 'b.csv'], '“b.csv” is too much'],
  [['forecast', 'a.csv', '--moths', '3'], "Unknown option '--moths'"],
  [['forecast', 'a.csv', '--months'], "'--months <value>' argument missing"],
  [['forecast', 'a.csv', '--json=yes'], "'--json' does not take an argument"],
  [['forecast', 'a.csv', '--months', '0'], '--months takes'],
  [['forecast', 'a.csv', '--months', String(MAX_HORIZON_MONTHS + 1)], '--months takes'],
  [['forecast', 'a.csv', '--months', '2.5'], '--months takes'],
  [['forecast', 'a.csv', '--months', 'NaN'], '--months takes'],
  [['forecast', 'a.csv', '--seed', '-1'], '--seed'],
  [['forecast', 'a.csv', '--seed=-1'], '--seed takes'],
  [['forecast', 'a.csv', '--seed', String(MAX_SEED + 1)], '--seed takes'],
  [['forecast', 'a.csv', '--seed', '1e3'], '--seed takes'],
  [['forecast', 'a.csv', '--columns', 'a,b'], '--columns takes three'],
  [['forecast', 'a.csv', '--columns', ''], '--columns takes three'],
  [['forecast', 'a.csv', '--decimal-mark', ','], '--decimal-mark takes'],
  [['forecast', 'a.csv', '--date-order', 'us'], '--date-order takes'],
])('%j is refused with one sentence that names the fault', (line, part) => {
  const command = readArguments(line);
  expect(command.kind).toBe('not-understood');
  const { reason } = command as { reason: string };
  expect(reason).toContain(part);
  expect(reason).toMatch(/\.$/);
  expect(reason).not.toContain('\n');
});

test('JSON is asked for even where the rest is not understood', () => {
  expect(wantsJson(['forecast', '--moths', '--json'])).toBe(true);
  expect(wantsJson(['forecast', '--', '--json'])).toBe(false);
  expect(wantsJson(['forecast'])).toBe(false);
});
